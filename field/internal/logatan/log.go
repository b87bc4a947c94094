package logatan

import "math"

// Method of both logarithms, with u = 2^-53.
//
// log(p/q) = k log 2 + log(m/w), where k, m and w come from integer arithmetic
// on the bit patterns: the difference of two patterns, rounded to a multiple
// of 2^52, is k, and what remains is added to the pattern of w. Patterns are
// piecewise linear in the logarithm, which leaves 2/3 <= m/w <= 3/2. Hence
// f = m - w is exact (Sterbenz), and with
//
//	s = f/(2w+f),  |s| <= 1/5,  z = s²,
//	log(m/w) = log((1+s)/(1-s)) = 2s + s z P(z).
//
// P has degree 7. It minimizes the largest |z/2 (P - exact)|, the error
// relative to 2s, over 0 <= z <= 0.0401 (Remez exchange in 60 digits): 1.4e-19,
// and 2.5e-19 = 0.0023 u with coefficients rounded to float64.
//
// The quotient is formed with the reciprocal of the rounded divisor and mended
// with the remainder by math.FMA; the mend lies below the last bit of s and
// carries the rounding of the divisor too. The sum k log 2 + 2s is rounded
// once, and once more when the small terms (below 0.02 of the result) are
// added: below 1.6 ulp for k != 0 (the first sum may lie one binade above the
// result), and below 0.6 ulp for k = 0, where 2s is exact.
const (
	logP0 = 0x1.555555555554fp-1
	logP1 = 0x1.999999999c1aep-2
	logP2 = 0x1.24924921e1831p-2
	logP3 = 0x1.c71c74920356dp-3
	logP4 = 0x1.745c4a5cf1343p-3
	logP5 = 0x1.3b35d0158725ep-3
	logP6 = 0x1.0dcaa008fca2ep-3
	logP7 = 0x1.1b87d63fd2387p-3

	ln2   = 0x1.62e42fefa39efp-1  // log 2 rounded
	ln2Lo = 0x1.abc9e3b39803fp-56 // log 2 - ln2 rounded
)

const (
	fracBits = 1<<52 - 1    // fraction of a float64
	oneBits  = 1023 << 52   // 1.0
	tinyBits = 1 << 52      // smallest normal number
	halfStep = 1 << 51      // half of one binade in bit patterns
	midBits  = 523 << 52    // 2^-500
	midSpan  = 1000<<52 + 1 // from 2^-500 to 2^500
	signBit  = 1 << 63      // sign of a float64
	normSpan = 2046 << 52   // from the smallest normal number to +Inf
	scaleUp  = 0x1p600      // lifts subnormal numbers
	noDigit  = 0x1p-60      // a ratio that 1 + ratio does not feel
)

// LogRatio returns the natural logarithm of p/q, with relative accuracy also
// where p/q is close to 1, overflows or underflows.
//
// Domain: p > 0, q > 0, normal or subnormal; a zero of either sign counts as
// the limit from above.
// Accuracy: error <= 2 ulp (worst measured 1.50 ulp, TestLogRatioReference).
//
// Special cases are:
//
//	LogRatio(p, p) = +0, and LogRatio(p, q) = -LogRatio(q, p) within 2 ulp
//	LogRatio(+Inf, q) = +Inf for finite q
//	LogRatio(p, +Inf) = -Inf for finite p
//	LogRatio(p, 0) = +Inf for p > 0
//	LogRatio(0, q) = -Inf for q > 0
//	LogRatio(0, 0) = LogRatio(+Inf, +Inf) = NaN
//	LogRatio(p, q) = NaN if p < 0 or q < 0 or either is NaN
func LogRatio(p, q float64) float64 {
	pb, qb := math.Float64bits(p), math.Float64bits(q)
	if pb-tinyBits >= normSpan || qb-tinyBits >= normSpan {
		return logRatioRare(p, q)
	}
	dif := pb - qb
	k := int64(dif+halfStep) >> 52
	wb := qb&fracBits | oneBits
	w := math.Float64frombits(wb)
	f := math.Float64frombits(wb+dif-uint64(k)<<52) - w
	w += w
	g := w + f
	inv := 1 / g
	s := float64(f * inv)
	r := math.FMA(-s, g, f)
	r = math.FMA(-s, f-(g-w), r)
	sl := float64(r * inv)
	z := s * s
	kf := float64(k)
	lo := math.FMA(s*z, logPoly(z), math.FMA(kf, ln2Lo, sl+sl))
	return math.FMA(kf, ln2, s+s) + lo
}

// logPoly returns P(z), by pairs (Estrin).
func logPoly(z float64) float64 {
	y := z * z
	a := math.FMA(z, logP1, logP0)
	b := math.FMA(z, logP3, logP2)
	c := math.FMA(z, logP5, logP4)
	d := math.FMA(z, logP7, logP6)
	return math.FMA(y*y, math.FMA(y, d, c), math.FMA(y, b, a))
}

// logRatioRare is LogRatio where an argument is not positive and normal.
func logRatioRare(p, q float64) float64 {
	switch {
	case !(p >= 0 && q >= 0), p == 0 && q == 0, p > math.MaxFloat64 && q > math.MaxFloat64:
		return math.NaN()
	case q == 0, p > math.MaxFloat64:
		return math.Inf(1)
	case p == 0, q > math.MaxFloat64:
		return math.Inf(-1)
	}
	if q < 0x1p400 && p < 0x1p400 {
		return LogRatio(p*scaleUp, q*scaleUp)
	}
	if p < q {
		return -logHuge(q, p)
	}
	return logHuge(p, q)
}

// logHuge returns log(p/q) for p >= 2^400 and subnormal q.
func logHuge(p, q float64) float64 {
	const n = 600 // log2 of scaleUp
	return math.FMA(n, ln2, LogRatio(p, q*scaleUp)+n*ln2Lo)
}

// Log1pRatio returns the natural logarithm of 1 + n/d, with relative accuracy
// for n << d as for n >> d. With n = Ra + Rb - L and so on it serves
// log(p/q) where p - q is known better than p and q.
//
// Domain: n >= 0, d >= 0, normal or subnormal; a zero of either sign counts as
// the limit from above.
// Accuracy: error <= 2 ulp (worst measured 1.01 ulp, TestLog1pRatioReference).
//
// Special cases are:
//
//	Log1pRatio(0, d) = 0 for d > 0
//	Log1pRatio(n, 0) = +Inf for n > 0
//	Log1pRatio(+Inf, d) = +Inf for finite d
//	Log1pRatio(n, +Inf) = 0 for finite n
//	Log1pRatio(0, 0) = Log1pRatio(+Inf, +Inf) = NaN
//	Log1pRatio(n, d) = NaN if n < 0 or d < 0 or either is NaN
func Log1pRatio(n, d float64) float64 {
	if math.Float64bits(n)-midBits >= midSpan || math.Float64bits(d)-midBits >= midSpan {
		return log1pRatioRare(n, d)
	}
	// p + pl = d + n exactly (Knuth's two-sum), and log((p+pl)/d) runs as in
	// LogRatio with pl kept. If k = 0 the sum (m - d) + ml restores n exactly,
	// which is where the relative accuracy for n << d comes from.
	p := d + n
	t := p - d
	pl := (d - (p - t)) + (n - t)
	pb := math.Float64bits(p)
	k := int64(pb-math.Float64bits(d)+halfStep) >> 52
	m := math.Float64frombits(pb-uint64(k)<<52) - d
	ml := float64(pl * math.Float64frombits(oneBits-uint64(k)<<52))
	f := m + ml
	t = f - m
	fl := (m - (f - t)) + (ml - t)
	w := d + d
	g := w + f
	inv := 1 / g
	s := float64(f * inv)
	r := math.FMA(-s, g, f)
	r = math.FMA(-s, f-(g-w), r) + fl
	sl := float64(r * inv)
	z := s * s
	kf := float64(k)
	lo := math.FMA(s*z, logPoly(z), math.FMA(kf, ln2Lo, sl+sl))
	return math.FMA(kf, ln2, s+s) + lo
}

// log1pRatioRare is Log1pRatio where an argument is outside 2^±500. Where n/d
// is below 2^-60 it is the result, and where n/d is above 2^60 the 1 is not
// felt; otherwise both can be scaled by a power of two without rounding.
func log1pRatioRare(n, d float64) float64 {
	switch {
	case !(n >= 0 && d >= 0), n == 0 && d == 0, n > math.MaxFloat64 && d > math.MaxFloat64:
		return math.NaN()
	case n <= d*noDigit && d > 0:
		return math.Abs(n / d)
	case d <= n*noDigit:
		return LogRatio(n, d)
	case d > 1:
		return Log1pRatio(n*(1/scaleUp), d*(1/scaleUp))
	default:
		return Log1pRatio(n*scaleUp, d*scaleUp)
	}
}
