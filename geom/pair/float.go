// Package pair carries geometry in pairs of float64, a leading part and what rounding it left out.
//
// A Float is the unevaluated sum Hi + Lo with |Lo| <= u |Hi| (u = 2^-53), so it holds about 106 bits. Lengths,
// angles and positions that are rounded once to float64 lose everything that a point 1e-12 of a size away from an edge
// needs; held as pairs they lose nothing that matters.
//
// Conventions: plain values, no aliasing, safe for concurrent use. Non-finite inputs give NaN parts, never a panic.
// Results are the same bits on every platform: products that are summed are written with math.FMA.
//
// The package does geometry, not analysis: sums, products, quotients, roots, vectors, and the sine and cosine of an
// angle in degrees. It has no logarithms and no general functions.
//
// Source: T. J. Dekker, Numer. Math. 18 (1971) 224; D. E. Knuth, The Art of Computer Programming 2, sec. 4.2.2;
// M. Joldes, J.-M. Muller, V. Popescu, ACM Trans. Math. Softw. 44 (2017) 15 (error bounds).
package pair

import "math"

// Float is the number Hi + Lo.
type Float struct{ Hi, Lo float64 }

// Of returns x as a pair, exactly.
func Of(x float64) Float { return Float{Hi: x} }

// Sum returns a + b, exactly.
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

// Add returns a + b. Accuracy: relative error below 3 u^2 of |a| + |b| at worst 4 u^2 of the result.
func (a Float) Add(b Float) Float {
	s := Sum(a.Hi, b.Hi)
	t := Sum(a.Lo, b.Lo)
	s = quick(s.Hi, s.Lo+t.Hi)
	return quick(s.Hi, s.Lo+t.Lo)
}

// Sub returns a - b.
func (a Float) Sub(b Float) Float { return a.Add(b.Neg()) }

// AddFloat returns a + x.
func (a Float) AddFloat(x float64) Float {
	s := Sum(a.Hi, x)
	return quick(s.Hi, s.Lo+a.Lo)
}

// Mul returns a b. Accuracy: relative error below 5 u^2.
func (a Float) Mul(b Float) Float {
	p := Product(a.Hi, b.Hi)
	return quick(p.Hi, math.FMA(a.Hi, b.Lo, math.FMA(a.Lo, b.Hi, p.Lo)))
}

// Scale returns a x.
func (a Float) Scale(x float64) Float {
	p := Product(a.Hi, x)
	return quick(p.Hi, math.FMA(a.Lo, x, p.Lo))
}

// Div returns a / b. Accuracy: relative error below 10 u^2. Division by zero gives non-finite parts.
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
func (a Float) Sqrt() Float {
	if a.Hi == 0 {
		return Float{}
	}
	s := math.Sqrt(a.Hi)
	r := a.Sub(Product(s, s))
	return quick(s, r.Hi/(2*s))
}

// Less reports whether a < b.
func (a Float) Less(b Float) bool { return a.Sub(b).Sign() < 0 }

// pi/180 to 107 bits.
var perDegree = Float{0.017453292519943295, 2.9486522708701687e-19}

// SinCosDegrees returns the sine and the cosine of an angle in degrees.
//
// Accuracy: relative error below 1e-30; multiples of 90 degrees are exact.
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
// Domain: |angle| <= 2 pi. Accuracy: absolute error below 1e-30.
func SinCos(angle Float) (sin, cos Float) {
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
