// Package pair carries geometry in pairs of float64, a leading part and what rounding it left out.
//
// A Float is the unevaluated sum Hi + Lo where Hi is the sum rounded to float64, so |Lo| <= u |Hi| (u = 2^-53) and it
// holds about 106 bits. Lengths, angles and positions that are rounded once to float64 lose everything that a point
// 1e-12 of a size away from an edge needs; held as pairs they lose nothing that matters.
//
// Conventions: plain values, no aliasing, safe for concurrent use. Non-finite inputs give non-finite parts, never a
// panic. Results are the same bits on every platform: products that are summed are written with math.FMA.
//
// Accuracy: the bounds hold for pairs as above while no part of a result or of a product on the way leaves the normal
// numbers; magnitudes from 1e-120 to 1e120 keep well off that.
//
// The package does geometry, not analysis: sums, products, quotients, roots, vectors, and the sine and cosine of an
// angle in degrees. It has no logarithms and no general functions.
//
// Source: [Dekker1971]; [Joldes2017] (sums, products, quotients and their error bounds); [Lefevre2023] (root). All recalled
// from memory; the tests hold the bounds against 200 bits.
package pair

import "math"

// Float is the number Hi + Lo, Hi being the number rounded to float64.
type Float struct{ Hi, Lo float64 }

// Of returns x as a pair, exactly.
func Of(x float64) Float { return Float{Hi: x} }

// Sum returns a + b, exactly unless it overflows.
func Sum(a, b float64) Float {
	s := a + b
	t := s - a
	return Float{s, (a - (s - t)) + (b - t)}
}

// quick returns a + b exactly when |a| >= |b| or a == 0.
func quick(a, b float64) Float {
	s := a + b
	return Float{s, b - (s - a)}
}

// Product returns a b, exactly unless it underflows.
func Product(a, b float64) Float {
	p := a * b
	return Float{p, math.FMA(a, b, -p)}
}

// Value returns the pair rounded to float64.
func (a Float) Value() float64 { return a.Hi + a.Lo }

// Neg returns -a.
func (a Float) Neg() Float { return Float{-a.Hi, -a.Lo} }

// Abs returns |a|.
func (a Float) Abs() Float {
	if a.Hi < 0 || (a.Hi == 0 && a.Lo < 0) {
		return a.Neg()
	}
	return a
}

// Sign returns -1, 0 or +1 as a is negative, zero or positive.
func (a Float) Sign() int {
	switch {
	case a.Hi > 0 || (a.Hi == 0 && a.Lo > 0):
		return 1
	case a.Hi < 0 || (a.Hi == 0 && a.Lo < 0):
		return -1
	}
	return 0
}

// Add returns a + b. Accuracy: relative error of the result below 4 u^2, also where a and b cancel.
func (a Float) Add(b Float) Float {
	s := Sum(a.Hi, b.Hi)
	t := Sum(a.Lo, b.Lo)
	s = quick(s.Hi, s.Lo+t.Hi)
	return quick(s.Hi, s.Lo+t.Lo)
}

// Sub returns a - b. Accuracy: that of Add.
func (a Float) Sub(b Float) Float { return a.Add(b.Neg()) }

// AddFloat returns a + x. Accuracy: relative error of the result below 3 u^2, also where a and x cancel.
func (a Float) AddFloat(x float64) Float {
	s := Sum(a.Hi, x)
	return quick(s.Hi, s.Lo+a.Lo)
}

// Mul returns a b. Accuracy: relative error below 6 u^2.
//
// With |a.Hi| and |b.Hi| in [1, 2) the two fused sums err by at most 2 u^2 each, and a.Lo b.Lo <= u^2 is left out; where
// the product is above 2 these are 2 u^2, 4 u^2 and u^2 of it. Both give 5 u^2, up to terms in u^3.
func (a Float) Mul(b Float) Float {
	p := Product(a.Hi, b.Hi)
	return quick(p.Hi, math.FMA(a.Hi, b.Lo, math.FMA(a.Lo, b.Hi, p.Lo)))
}

// Scale returns a x. Accuracy: relative error below 3 u^2; exact if x is a power of two.
func (a Float) Scale(x float64) Float {
	p := Product(a.Hi, x)
	return quick(p.Hi, math.FMA(a.Lo, x, p.Lo))
}

// Div returns a / b. Accuracy: relative error below 12 u^2. Division by zero gives non-finite parts.
//
// The remainder r = a - q b is at most 3 u |a|. It errs by 2 u^2 |a| (Scale), and rounding it, dividing by b.Hi in place
// of b and rounding the quotient add u |r| each: 11 u^2, up to terms in u^3.
func (a Float) Div(b Float) Float {
	q := a.Hi / b.Hi
	r := a.Sub(b.Scale(q))
	return quick(q, r.Hi/b.Hi)
}

// Sqrt returns the square root of a. Accuracy: relative error below 4 u^2.
//
// Special cases are:
//
//	Sqrt(0) = 0
//	Sqrt(x < 0) = NaN
//	Sqrt(+Inf) = NaN
func (a Float) Sqrt() Float {
	if a.Hi == 0 {
		return Float{}
	}
	s := math.Sqrt(a.Hi)
	r := a.Sub(Product(s, s))
	return quick(s, r.Hi/(2*s))
}

// Less reports whether a < b; false if either is NaN.
func (a Float) Less(b Float) bool { return a.Sub(b).Sign() < 0 }

// pi/180 to 107 bits.
var perDegree = Float{0.017453292519943295, 2.9486522708701687e-19}

// SinCosDegrees returns the sine and the cosine of an angle in degrees.
//
// Accuracy: relative error below 1e-30 for multiples of 1e-250 degrees, see the package comment for smaller ones;
// multiples of 90 degrees are exact.
// Domain: finite angles. NaN otherwise.
func SinCosDegrees(degrees float64) (sin, cos Float) {
	if math.IsInf(degrees, 0) || math.IsNaN(degrees) {
		nan := Of(math.NaN())
		return nan, nan
	}
	r := math.Remainder(degrees, 360)
	quarter := math.RoundToEven(r / 90)
	s, c := sinCosSmall(Of(math.FMA(-90, quarter, r)).Mul(perDegree))
	switch (int(quarter)%4 + 4) % 4 {
	case 1:
		return c, s.Neg()
	case 2:
		return s.Neg(), c.Neg()
	case 3:
		return c.Neg(), s
	}
	return s, c
}

// SinCos returns the sine and the cosine of an angle in radians held as a pair.
//
// Domain: |angle| <= 2 pi. NaN otherwise. Accuracy: absolute error below 1e-30.
func SinCos(angle Float) (sin, cos Float) {
	if !(math.Abs(angle.Hi) <= 2*math.Pi) {
		nan := Of(math.NaN())
		return nan, nan
	}
	const pieces = 8 // the series runs on an angle of at most pi/4
	s, c := sinCosSmall(angle.Scale(1.0 / pieces))
	for n := 1; n < pieces; n *= 2 {
		s, c = s.Mul(c).Scale(2), c.Mul(c).Sub(s.Mul(s))
	}
	return s, c
}

// sinCosSmall sums the Taylor series of sine and cosine for |x| <= pi/4.
func sinCosSmall(x Float) (sin, cos Float) {
	sin, cos = x, Of(1)
	term := x
	for k := 2; k < 32; k++ { // (pi/4)^32/32! = 2e-39
		term = term.Mul(x).Div(Of(float64(k)))
		signed := term
		if k%4 >= 2 {
			signed = term.Neg()
		}
		if k%2 == 0 {
			cos = cos.Add(signed)
		} else {
			sin = sin.Add(signed)
		}
	}
	return sin, cos
}
