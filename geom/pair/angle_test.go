package pair

import (
	"math"
	"math/big"
	"math/rand/v2"
	"testing"
)

// The digits of pi beyond the 50 of DLMF 3.12.1 are checked by TestReferencePi.
const piDecimals = "3.14159265358979323846264338327950288419716939937510582097494459230781640628620899"

func pi() *big.Float {
	v, _, err := big.ParseFloat(piDecimals, 10, digits+64, big.ToNearestEven)
	if err != nil {
		panic(err)
	}
	return v
}

// The sine of pi vanishes to the digits of the reference, and that at pi/6 is one half.
func TestReferencePi(t *testing.T) {
	s, c := sinCosRef(pi())
	if e, _ := s.Float64(); math.Abs(e) > 0x1p-190 { // 200 bits less those of 100 terms up to pi^3/3!
		t.Errorf("sin pi = %v", e)
	}
	if e, _ := ref().Add(c, ref().SetInt64(1)).Float64(); math.Abs(e) > 0x1p-190 { // the same
		t.Errorf("cos pi + 1 = %v", e)
	}
	s, _ = sinCosRef(ref().Quo(pi(), ref().SetInt64(6)))
	if e, _ := ref().Sub(s, ref().SetFloat64(0.5)).Float64(); math.Abs(e) > 0x1p-190 { // the same
		t.Errorf("sin pi/6 - 1/2 = %v", e)
	}
}

// sinCosRef sums the series in the reference precision, for |x| <= 2 pi.
func sinCosRef(x *big.Float) (sin, cos *big.Float) {
	sin, cos = ref().Set(x), ref().SetInt64(1)
	term := ref().Set(x)
	for k := int64(2); k < 100; k++ { // (2 pi)^100/100! = 1e-78
		term.Quo(term.Mul(term, x), ref().SetInt64(k))
		sum := sin
		if k%2 == 0 {
			sum = cos
		}
		if k%4 >= 2 {
			sum.Sub(sum, term)
		} else {
			sum.Add(sum, term)
		}
	}
	return sin, cos
}

// sinCosDegreesRef reduces an angle exactly before it sums the series.
func sinCosDegreesRef(degrees float64) (sin, cos *big.Float) {
	r := math.Remainder(degrees, 360) // exact
	quarter := math.Round(r / 90)
	rest := ref().SetFloat64(r - 90*quarter) // exact: r and 90 quarter differ by a factor of at most 2
	x := new(big.Float).SetPrec(digits+64).Mul(rest, pi())
	s, c := sinCosRef(x.Quo(x, ref().SetInt64(180)))
	switch (int(quarter) + 4) % 4 {
	case 1:
		s, c = c, s.Neg(s)
	case 2:
		s, c = s.Neg(s), c.Neg(c)
	case 3:
		s, c = c.Neg(c), s
	}
	return s, c
}

func TestSinCosDegrees(t *testing.T) {
	rng := rand.New(rand.NewPCG(5, 5))
	angles := []float64{0.1, 30, 45, 60, 89.99999999999999, 90.00000000000001, 135, 225, 315, 1e15 + 7, 1e-250}
	for len(angles) < rounds/2 {
		v := 720 * (rng.Float64() - 0.5)
		switch rng.IntN(4) {
		case 0:
			v = 90*float64(rng.IntN(9)-4) + math.Ldexp(rng.Float64(), -rng.IntN(45))
		case 1:
			v = math.Ldexp(rng.Float64()-0.5, rng.IntN(900)-800)
		}
		angles = append(angles, v)
	}
	worst := 0.0
	for _, v := range angles {
		s, c := SinCosDegrees(v)
		ws, wc := sinCosDegreesRef(v)
		for _, e := range []float64{relative(s, ws), relative(c, wc)} {
			if !(e*u*u <= 1e-30) { // the bound of the documentation
				t.Fatalf("%v degrees: sine %v, cosine %v, error %.3g u^2", v, s, c, e)
			}
			worst = max(worst, e)
		}
	}
	t.Logf("worst relative error %.2f u^2 of %d", worst, len(angles))
}

func TestSinCosDegreesSpecial(t *testing.T) {
	for k := -9; k <= 9; k++ {
		s, c := SinCosDegrees(90 * float64(k))
		q := (k%4 + 4) % 4
		if s != Of([4]float64{0, 1, 0, -1}[q]) || c != Of([4]float64{1, 0, -1, 0}[q]) {
			t.Errorf("%d quarter turns: sine %v, cosine %v", k, s, c)
		}
	}
	if s, c := SinCosDegrees(360e15 + 90*64); s != (Float{}) || c != Of(1) {
		t.Errorf("many turns: sine %v, cosine %v", s, c)
	}
	for _, v := range []float64{math.NaN(), math.Inf(1), math.Inf(-1)} {
		if s, c := SinCosDegrees(v); !math.IsNaN(s.Value()) || !math.IsNaN(c.Value()) {
			t.Errorf("%v degrees: sine %v, cosine %v, want NaN", v, s, c)
		}
	}
}

func TestSinCos(t *testing.T) {
	rng := rand.New(rand.NewPCG(6, 6))
	one := ref().SetInt64(1)
	worst := 0.0
	for k := range rounds / 2 {
		x := Sum(2*math.Pi*(2*rng.Float64()-1), u*rng.Float64())
		if k%4 == 0 {
			x = number(rng, 100)
			x = x.Scale(math.Ldexp(1, min(0, -math.Ilogb(x.Hi)+rng.IntN(2))))
		}
		s, c := SinCos(x)
		ws, wc := sinCosRef(x.exact())
		for _, e := range []float64{off(s, ws, one), off(c, wc, one)} {
			if !(e*u*u <= 1e-30) { // the bound of the documentation
				t.Fatalf("%v: sine %v, cosine %v, error %.3g u^2", x, s, c, e)
			}
			worst = max(worst, e)
		}
	}
	t.Logf("worst error %.2f u^2 of %d", worst, rounds/2)
	for _, v := range []float64{6.3, -6.3, math.NaN(), math.Inf(1)} {
		if s, c := SinCos(Of(v)); !math.IsNaN(s.Value()) || !math.IsNaN(c.Value()) {
			t.Errorf("%v: sine %v, cosine %v, want NaN", v, s, c)
		}
	}
	if s, c := SinCos(Float{}); s != (Float{}) || c != Of(1) {
		t.Errorf("0: sine %v, cosine %v", s, c)
	}
}
