package logatan

import "math"

// Method of the arctangent, with u = 2^-53.
//
// Let x >= y >= 0 be the ordered absolute values. The angle is reduced once,
// by atan 1/2 and without division, where y > x/4:
//
//	h = 1/2 or 0,  n = y - h x,  d = x + h y,  t = n/d,
//	atan(y/x) = atan h + atan t,  |t| <= 1/3,
//	atan t = t + t z P(z),  z = t².
//
// n is exact (Sterbenz) and the rounding of d is recovered exactly; t is
// mended as in LogRatio, so that t + tl is the quotient to about u². P has
// degree 9 and minimizes the largest |z (P - exact)|, the error relative to t,
// over 0 <= z <= 1/9 + 1e-6 (Remez exchange in 60 digits): 3.9e-19, and
// 3.0e-18 = 0.027 u with coefficients rounded to float64.
//
// The octant adds one of eight constants, each a float64 and its remainder.
// One rounding where the constant is 0, two otherwise.
const (
	atanP0 = -0x1.555555555554cp-2
	atanP1 = 0x1.99999999977d7p-3
	atanP2 = -0x1.249249234f65cp-3
	atanP3 = 0x1.c71c7107c1416p-4
	atanP4 = -0x1.745cf6a0452e6p-4
	atanP5 = 0x1.3b103c58e1fa0p-4
	atanP6 = -0x1.10d4d40e79961p-4
	atanP7 = 0x1.dc92d79db1742p-5
	atanP8 = -0x1.893db0ef9392dp-5
	atanP9 = 0x1.c9f730d52e2cdp-6

	pi     = 0x1.921fb54442d18p+1
	piLo   = 0x1.1a62633145c07p-53
	pi2    = 0x1.921fb54442d18p+0
	pi2Lo  = 0x1.1a62633145c07p-54
	halfHi = 0x1.dac670561bb4fp-2 // atan 1/2
	halfLo = 0x1.a2b7f222f65e2p-56
	lessHi = 0x1.1b6e192ebbe44p+0 // π/2 - atan 1/2
	lessLo = 0x1.b1b466a88828ep-54
	moreHi = 0x1.0468a8ace4df6p+1 // π/2 + atan 1/2
	moreLo = 0x1.0620bf7406affp-55
	backHi = 0x1.56c6e7397f5aep+1 // π - atan 1/2
	backLo = 0x1.660b64ece6f4bp-53

	twoSteps = 2 << 52 // a factor 4 in bit patterns
)

// octants lists h, the sign of t, and the constant with its remainder. Bit 0
// of the index: reduced by atan 1/2; bit 1: |y| > |x|; bit 2: x < 0; bit 3:
// y < 0, where all signs are turned.
var octants = [16]struct{ h, sign, hi, lo float64 }{
	{0, 1, 0, 0},
	{0.5, 1, halfHi, halfLo},
	{0, -1, pi2, pi2Lo},
	{0.5, -1, lessHi, lessLo},
	{0, -1, pi, piLo},
	{0.5, -1, backHi, backLo},
	{0, 1, pi2, pi2Lo},
	{0.5, 1, moreHi, moreLo},
	{0, -1, 0, 0},
	{0.5, -1, -halfHi, -halfLo},
	{0, 1, -pi2, -pi2Lo},
	{0.5, 1, -lessHi, -lessLo},
	{0, 1, -pi, -piLo},
	{0.5, 1, -backHi, -backLo},
	{0, -1, -pi2, -pi2Lo},
	{0.5, -1, -moreHi, -moreLo},
}

// Atan2 returns the angle of the point (x, y) from the x axis, in -π to π,
// with the sign of y.
//
// Accuracy: error <= 2 ulp (worst measured 1.09 ulp, TestAtan2Reference).
//
// Special cases are, as in IEEE 754 and math.Atan2:
//
//	Atan2(±0, x) = ±0 for x > 0 or x = +0
//	Atan2(±0, x) = ±π for x < 0 or x = -0
//	Atan2(y, ±0) = ±π/2 with the sign of y
//	Atan2(±y, +Inf) = ±0 for finite y > 0
//	Atan2(±y, -Inf) = ±π for finite y > 0
//	Atan2(±Inf, x) = ±π/2 for finite x
//	Atan2(±Inf, +Inf) = ±π/4
//	Atan2(±Inf, -Inf) = ±3π/4
//	Atan2(y, x) = NaN if either is NaN
func Atan2(y, x float64) float64 {
	yb, xb := math.Float64bits(y), math.Float64bits(x)
	ya, xa := yb&^signBit, xb&^signBit
	if ya-midBits >= midSpan || xa-midBits >= midSpan {
		return atan2Rare(y, x)
	}
	var steep, far uint64
	if ya > xa {
		steep = 1
	}
	swap := (ya ^ xa) & -steep
	ya ^= swap
	xa ^= swap
	if ya > xa-twoSteps {
		far = 1
	}
	o := &octants[(yb>>63<<3|xb>>63<<2|steep<<1|far)&15]
	h := o.h
	v, w := math.Float64frombits(ya), math.Float64frombits(xa)
	n := v - float64(h*w)
	hv := float64(h * v)
	d := w + hv
	inv := 1 / d
	t := float64(n * inv)
	r := math.FMA(-t, d, n)
	r = math.FMA(-t, hv-(d-w), r)
	z := t * t
	z2 := z * z
	z4 := z2 * z2
	a := math.FMA(z, atanP1, atanP0)
	b := math.FMA(z, atanP3, atanP2)
	c := math.FMA(z, atanP5, atanP4)
	e := math.FMA(z, atanP7, atanP6)
	g := math.FMA(z, atanP9, atanP8)
	a = math.FMA(z2, b, a)
	c = math.FMA(z2, e, c)
	c = math.FMA(z4, g, c)
	a = math.FMA(z4, c, a)
	lo := math.FMA(t*z, a, r*inv)
	return (float64(t*o.sign) + o.hi) + (float64(lo*o.sign) + o.lo)
}

// atan2Rare is Atan2 where an absolute value is outside 2^±500.
func atan2Rare(y, x float64) float64 {
	if y != y || x != x {
		return math.NaN()
	}
	ya, xa := math.Abs(y), math.Abs(x)
	if ya > math.MaxFloat64 && xa > math.MaxFloat64 {
		ya, xa = 1, 1
	}
	var a float64
	switch {
	case xa > ya*(1/noDigit) || ya == 0:
		if !math.Signbit(x) {
			if ya == 0 {
				return y
			}
			return y / xa
		}
		a = pi
	case ya > xa*(1/noDigit):
		a = pi2
	case max(xa, ya) > 1:
		a = Atan2(ya*(1/scaleUp), math.Copysign(xa*(1/scaleUp), x))
	default:
		a = Atan2(ya*scaleUp, math.Copysign(xa*scaleUp, x))
	}
	return math.Copysign(a, y)
}

// Atan returns the arctangent of x, in -π/2 to π/2, with the bits of
// Atan2(x, 1).
//
// Special cases are:
//
//	Atan(±0) = ±0
//	Atan(±Inf) = ±π/2
//	Atan(NaN) = NaN
func Atan(x float64) float64 { return Atan2(x, 1) }
