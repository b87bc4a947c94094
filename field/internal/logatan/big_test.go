package logatan

import (
	"math"
	"math/big"
	"math/rand/v2"
)

// prec is the precision in bits of the reference arithmetic.
const prec = 128

func seeded(n uint64) *rand.Rand { return rand.New(rand.NewPCG(n, 0x9e3779b97f4a7c15)) }

func bf(x float64) *big.Float        { return new(big.Float).SetPrec(prec).SetFloat64(x) }
func flo() *big.Float                { return new(big.Float).SetPrec(prec) }
func add(a, b *big.Float) *big.Float { return flo().Add(a, b) }
func sub(a, b *big.Float) *big.Float { return flo().Sub(a, b) }
func mul(a, b *big.Float) *big.Float { return flo().Mul(a, b) }
func quo(a, b *big.Float) *big.Float { return flo().Quo(a, b) }

// oddInverse[k] = 1/(2k+1).
var oddInverse = func() (c [90]*big.Float) {
	for k := range c {
		c[k] = quo(bf(1), bf(float64(2*k+1)))
	}
	return c
}()

// oddSeries returns the sum of (sign s²)^k s/(2k+1): atanh s for sign = 1 and
// atan s for sign = -1, for |s| <= 0.51.
func oddSeries(s *big.Float, sign float64) *big.Float {
	if s.Sign() == 0 {
		return flo()
	}
	z := mul(mul(s, s), bf(sign))
	bits := -2 * (s.MantExp(nil))
	terms := len(oddInverse)
	if bits > 0 {
		terms = min(terms, prec/bits+2)
	}
	sum := flo()
	for k := terms - 1; k >= 0; k-- {
		sum = add(mul(sum, z), oddInverse[k])
	}
	return mul(sum, s)
}

var (
	bigLn2 = mul(bf(2), oddSeries(quo(bf(1), bf(3)), 1))
	// Machin 1706: π/4 = 4 atan 1/5 - atan 1/239.
	bigPi = mul(bf(4), sub(mul(bf(4), oddSeries(quo(bf(1), bf(5)), -1)), oddSeries(quo(bf(1), bf(239)), -1)))
	// bigAtan[k] = atan(k/16), by atan(a) = atan(b) + atan((a-b)/(1+ab)).
	bigAtan = func() (t [17]*big.Float) {
		t[0] = flo()
		for k := 1; k < len(t); k++ {
			a, b := bf(float64(k)/16), bf(float64(k-1)/16)
			t[k] = add(t[k-1], oddSeries(quo(sub(a, b), add(bf(1), mul(a, b))), -1))
		}
		return t
	}()
)

// bigLog[k] = log(k/16) for 11 <= k <= 24.
var bigLog = func() (t [25]*big.Float) {
	for k := 11; k < len(t); k++ {
		t[k] = mul(bf(2), oddSeries(quo(bf(float64(k-16)), bf(float64(k+16))), 1))
	}
	return t
}()

// bigLogRatio returns log(p/q) of positive numbers: halving steps, a table in
// steps of 1/16, and the series of atanh.
func bigLogRatio(p, q *big.Float) *big.Float {
	k := p.MantExp(nil) - q.MantExp(nil)
	r := quo(flo().SetMantExp(p, -k), q)
	if f, _ := r.Float64(); f > 1.5 {
		r, k = quo(r, bf(2)), k+1
	} else if f < 0.7 {
		r, k = mul(r, bf(2)), k-1
	}
	f, _ := r.Float64()
	if k == 0 && math.Abs(f-1) < 0x1p-5 {
		return mul(bf(2), oddSeries(quo(sub(p, q), add(p, q)), 1))
	}
	j := int(math.Round(16 * f))
	c := bf(float64(j) / 16)
	t := add(bigLog[j], mul(bf(2), oddSeries(quo(sub(r, c), add(r, c)), 1)))
	return add(mul(bigLn2, bf(float64(k))), t)
}

// bigAtan2 returns the angle of finite (x, y), not both zero.
func bigAtan2(y, x float64) *big.Float {
	a, b := bf(math.Abs(y)), bf(math.Abs(x))
	steep := a.Cmp(b) > 0
	if steep {
		a, b = b, a
	}
	t := quo(a, b)
	approx, _ := t.Float64()
	k := int(math.Round(16 * approx))
	c := bf(float64(k) / 16)
	r := add(bigAtan[k], oddSeries(quo(sub(t, c), add(bf(1), mul(t, c))), -1))
	if steep {
		r = sub(quo(bigPi, bf(2)), r)
	}
	if math.Signbit(x) {
		r = sub(bigPi, r)
	}
	if math.Signbit(y) {
		r.Neg(r)
	}
	return r
}

// ulps returns |got - want| in units in the last place of want.
func ulps(got float64, want *big.Float) float64 {
	w, _ := want.Float64()
	if math.IsInf(w, 0) || w == 0 {
		if got == w {
			return 0
		}
		return math.Inf(1)
	}
	w = math.Abs(w)
	unit := math.Nextafter(w, math.Inf(1)) - w
	d, _ := sub(bf(got), want).Float64()
	return math.Abs(d) / unit
}
