package pair

import (
	"math"
	"math/big"
	"math/rand/v2"
	"testing"
)

const (
	u      = 0x1p-53
	digits = 200    // bits of the reference
	rounds = 20_000 // inputs a test
)

// exact returns the number as a reference value.
func (a Float) exact() *big.Float {
	hi, lo := ref().SetFloat64(a.Hi), ref().SetFloat64(a.Lo)
	return hi.Add(hi, lo)
}

func ref() *big.Float { return new(big.Float).SetPrec(digits) }

// off returns |got - want| / size in units of u^2; 0 if they agree.
func off(got Float, want, size *big.Float) float64 {
	d := ref().Sub(got.exact(), want)
	if d.Sign() == 0 {
		return 0
	}
	q, _ := d.Quo(d, size).Float64()
	return math.Abs(q) / (u * u)
}

// relative returns the relative error of got in units of u^2.
func relative(got Float, want *big.Float) float64 { return off(got, want, want) }

// number returns a random pair of a magnitude within 2^(+-reach). Mantissas close to 1 and 2, low parts of half a unit
// and of none are frequent, because errors are greatest there.
func number(rng *rand.Rand, reach int) Float {
	m := 1 + rng.Float64()
	switch rng.IntN(4) {
	case 0:
		m = 1 + float64(rng.IntN(64))*0x1p-52
	case 1:
		m = 2 - float64(1+rng.IntN(64))*0x1p-52
	}
	lo := u * (2*rng.Float64() - 1)
	switch rng.IntN(4) {
	case 0:
		lo = math.Copysign(u*(1-0x1p-40*rng.Float64()), lo)
	case 1:
		lo *= math.Ldexp(1, -rng.IntN(40))
	case 2:
		if rng.IntN(4) == 0 {
			lo = 0
		}
	}
	scale := math.Ldexp(float64(1-2*rng.IntN(2)), rng.IntN(2*reach+1)-reach)
	return Sum(m*scale, lo*scale)
}

// normal reports whether Hi is the number rounded to float64.
func (a Float) normal() bool { return a.Hi+a.Lo == a.Hi }

func TestSumExact(t *testing.T) {
	rng := rand.New(rand.NewPCG(1, 1))
	wide := func() *big.Float { return new(big.Float).SetPrec(2200) } // holds any sum of two float64
	for range rounds {
		a := math.Ldexp(rng.Float64()-0.5, rng.IntN(1800)-900)
		b := math.Ldexp(rng.Float64()-0.5, rng.IntN(1800)-900)
		if rng.IntN(2) == 0 {
			b = math.Ldexp(rng.Float64()-0.5, math.Ilogb(a)+rng.IntN(120)-60)
		}
		s := Sum(a, b)
		want := wide().Add(wide().SetFloat64(a), wide().SetFloat64(b))
		got := wide().Add(wide().SetFloat64(s.Hi), wide().SetFloat64(s.Lo))
		if got.Cmp(want) != 0 || !s.normal() {
			t.Fatalf("Sum(%v, %v) = %v", a, b, s)
		}
	}
}

func TestProductExact(t *testing.T) {
	rng := rand.New(rand.NewPCG(2, 2))
	for range rounds {
		a, b := number(rng, 400).Hi, number(rng, 400).Hi
		p := Product(a, b)
		if want := ref().Mul(ref().SetFloat64(a), ref().SetFloat64(b)); p.exact().Cmp(want) != 0 || !p.normal() {
			t.Fatalf("Product(%v, %v) = %v", a, b, p)
		}
	}
}

// Every operation keeps the bound of its documentation over 800 powers of two, and returns Hi rounded to nearest.
func TestArithmetic(t *testing.T) {
	type op struct {
		name  string
		bound float64 // of the documentation, in u^2
		floor float64 // an error that some input must reach, in u^2: the test tries hard inputs
		got   func(a, b Float) Float
		want  func(a, b *big.Float) *big.Float
	}
	wide := func(a, b *big.Float, f func(z, a, b *big.Float) *big.Float) *big.Float { return f(ref(), a, b) }
	hi := func(b *big.Float) *big.Float { v, _ := b.Float64(); return ref().SetFloat64(v) }
	ops := []op{
		{"Add", 4, 1.5, Float.Add, func(a, b *big.Float) *big.Float { return wide(a, b, (*big.Float).Add) }},
		{"Sub", 4, 1.5, Float.Sub, func(a, b *big.Float) *big.Float { return wide(a, b, (*big.Float).Sub) }},
		{"AddFloat", 3, 1, func(a, b Float) Float { return a.AddFloat(b.Hi) },
			func(a, b *big.Float) *big.Float { return wide(a, hi(b), (*big.Float).Add) }},
		{"Mul", 6, 3, Float.Mul, func(a, b *big.Float) *big.Float { return wide(a, b, (*big.Float).Mul) }},
		{"Scale", 3, 1, func(a, b Float) Float { return a.Scale(b.Hi) },
			func(a, b *big.Float) *big.Float { return wide(a, hi(b), (*big.Float).Mul) }},
		{"Div", 12, 4, Float.Div, func(a, b *big.Float) *big.Float { return wide(a, b, (*big.Float).Quo) }},
		{"Sqrt", 4, 1.5, func(a, _ Float) Float { return a.Abs().Sqrt() },
			func(a, _ *big.Float) *big.Float { return ref().Sqrt(ref().Abs(a)) }},
	}
	for i, c := range ops {
		rng := rand.New(rand.NewPCG(3, uint64(i)))
		worst := 0.0
		for k := range rounds {
			a, b := number(rng, 400), number(rng, 400)
			switch {
			case k%4 == 1: // of like size
				b = b.Scale(math.Ldexp(1, math.Ilogb(a.Hi)-math.Ilogb(b.Hi)+rng.IntN(5)-2))
			case k%4 == 2: // a difference that takes many digits
				b = Sum(-a.Hi*(1+math.Ldexp(rng.Float64(), -rng.IntN(53))), -a.Lo*rng.Float64())
			case k%4 == 3: // the low parts decide
				b = Sum(-a.Hi, a.Lo+u*u*a.Hi*rng.Float64())
			}
			got, want := c.got(a, b), c.want(a.exact(), b.exact())
			e := relative(got, want)
			if !(e <= c.bound) || !got.normal() {
				t.Fatalf("%s(%v, %v) = %v, want %v: error %.3g u^2, bound %v", c.name, a, b, got, want, e, c.bound)
			}
			worst = max(worst, e)
		}
		if worst < c.floor {
			t.Errorf("%s: worst error %.3g u^2, the inputs are too easy", c.name, worst)
		}
		t.Logf("%s: worst %.2f u^2 of %d", c.name, worst, rounds)
	}
}

func TestExactOperations(t *testing.T) {
	rng := rand.New(rand.NewPCG(4, 4))
	for range rounds {
		a := number(rng, 200)
		if got := a.Scale(0x1p37); got != (Float{a.Hi * 0x1p37, a.Lo * 0x1p37}) {
			t.Fatalf("%v scaled by 2^37 is %v", a, got)
		}
		if got := a.Sub(a); got != (Float{}) {
			t.Fatalf("%v less itself is %v", a, got)
		}
		if got := a.Div(a); got != Of(1) {
			t.Fatalf("%v divided by itself is %v", a, got)
		}
		if got := Product(a.Hi, a.Hi).Sqrt(); got != Of(math.Abs(a.Hi)) {
			t.Fatalf("root of the square of %v is %v", a.Hi, got)
		}
		if a.Add(Float{}) != a || a.Mul(Of(1)) != a || a.AddFloat(0) != a || a.Neg().Neg() != a || a.Value() != a.Hi {
			t.Fatalf("%v is changed by 0, 1 or two signs", a)
		}
	}
}

// Sign, Less and Abs look at the low part where the leading ones agree.
func TestOrder(t *testing.T) {
	tiny := Float{1, 0x1p-80}
	for _, c := range []struct {
		a, b Float
		less bool
	}{
		{Of(1), tiny, true}, {tiny, Of(1), false}, {tiny, tiny, false},
		{tiny.Neg(), Of(-1), true}, {Of(-1), Of(1), true}, {Of(0), tiny, true},
		{Of(math.NaN()), Of(1), false}, {Of(1), Of(math.NaN()), false},
	} {
		if got := c.a.Less(c.b); got != c.less {
			t.Errorf("%v < %v is %v", c.a, c.b, got)
		}
	}
	for _, c := range []struct {
		a    Float
		sign int
	}{{Of(2), 1}, {Of(-2), -1}, {Of(0), 0}, {Float{0, 1e-300}, 1}, {Float{0, -1e-300}, -1}, {Of(math.NaN()), 0}} {
		if got := c.a.Sign(); got != c.sign {
			t.Errorf("sign of %v is %d", c.a, got)
		}
		if got := c.a.Abs().Sign(); got < 0 || (c.sign != 0 && got != 1) {
			t.Errorf("sign of |%v| is %d", c.a, got)
		}
	}
}

func TestSpecialCases(t *testing.T) {
	inf, nan := math.Inf(1), math.NaN()
	finite := func(a Float) bool { return !math.IsNaN(a.Hi-a.Hi) && !math.IsNaN(a.Lo-a.Lo) }
	for _, bad := range []float64{inf, -inf, nan} {
		a := Of(bad)
		for name, got := range map[string]Float{
			"Sum": Sum(bad, 1), "Product": Product(1, bad), "Add": a.Add(Of(1)), "Sub": Of(1).Sub(a), "AddFloat": Of(1).AddFloat(bad),
			"Mul": a.Mul(Of(2)), "Scale": Of(2).Scale(bad), "Div": a.Div(Of(2)), "Sqrt": a.Sqrt(), "Neg": a.Neg(), "Abs": a.Abs(),
		} {
			if finite(got) {
				t.Errorf("%s of %v is %v", name, bad, got)
			}
		}
	}
	if got := Of(1).Div(Float{}); finite(got) {
		t.Errorf("1/0 = %v", got)
	}
	if got := (Float{}).Div(Float{}); finite(got) {
		t.Errorf("0/0 = %v", got)
	}
	if got := Of(0).Sqrt(); got != (Float{}) {
		t.Errorf("root of 0 is %v", got)
	}
	for _, a := range []float64{-1, inf} {
		if got := Of(a).Sqrt(); !math.IsNaN(got.Value()) {
			t.Errorf("root of %v is %v, want NaN", a, got)
		}
	}
	if got := Of(0).Div(Of(3)); got != (Float{}) {
		t.Errorf("0/3 = %v", got)
	}
}

func TestFloatAllocatesNothing(t *testing.T) {
	a, b := Float{1.5, 1e-17}, Float{2.5, -1e-17}
	var c Float
	if n := testing.AllocsPerRun(20, func() {
		c = a.Add(b).Sub(b).Mul(b).Div(a).Sqrt().Scale(2).AddFloat(1)
		s, k := SinCosDegrees(c.Hi)
		c = s.Add(k)
		s, k = SinCos(c)
		c = s.Add(k)
	}); n != 0 {
		t.Errorf("%v allocations", n)
	}
}
