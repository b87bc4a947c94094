package pair

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// Vec is a vector of three pairs.
type Vec struct{ X, Y, Z Float }

// VecOf returns v as pairs, exactly.
func VecOf(v r3.Vec) Vec { return Vec{Of(v.X), Of(v.Y), Of(v.Z)} }

// WithLow returns the vector hi + lo.
func WithLow(hi, lo r3.Vec) Vec { return Vec{Sum(hi.X, lo.X), Sum(hi.Y, lo.Y), Sum(hi.Z, lo.Z)} }

// Value returns the vector rounded to float64.
func (a Vec) Value() r3.Vec { return r3.Vec{X: a.X.Value(), Y: a.Y.Value(), Z: a.Z.Value()} }

// Low returns what Value left out.
func (a Vec) Low() r3.Vec {
	v := a.Value()
	return r3.Vec{X: (a.X.Hi - v.X) + a.X.Lo, Y: (a.Y.Hi - v.Y) + a.Y.Lo, Z: (a.Z.Hi - v.Z) + a.Z.Lo}
}

// Add returns a + b.
func (a Vec) Add(b Vec) Vec { return Vec{a.X.Add(b.X), a.Y.Add(b.Y), a.Z.Add(b.Z)} }

// Sub returns a - b.
func (a Vec) Sub(b Vec) Vec { return Vec{a.X.Sub(b.X), a.Y.Sub(b.Y), a.Z.Sub(b.Z)} }

// Neg returns -a.
func (a Vec) Neg() Vec { return Vec{a.X.Neg(), a.Y.Neg(), a.Z.Neg()} }

// Scale returns s a.
func (a Vec) Scale(s Float) Vec { return Vec{a.X.Mul(s), a.Y.Mul(s), a.Z.Mul(s)} }

// Dot returns a.b. Accuracy: error below 12 u^2 of the sum of the magnitudes of the three products.
func (a Vec) Dot(b Vec) Float { return a.X.Mul(b.X).Add(a.Y.Mul(b.Y)).Add(a.Z.Mul(b.Z)) }

// Cross returns a x b. Accuracy: the error of a component is below 9 u^2 of the sum of the magnitudes of its two products;
// if all Lo of a and b are zero, below 4 u^2 of the component itself, however small.
func (a Vec) Cross(b Vec) Vec {
	return Vec{
		a.Y.Mul(b.Z).Sub(a.Z.Mul(b.Y)),
		a.Z.Mul(b.X).Sub(a.X.Mul(b.Z)),
		a.X.Mul(b.Y).Sub(a.Y.Mul(b.X)),
	}
}

// Norm returns |a|. It neither overflows, unless |a| does, nor underflows. Accuracy: relative error below 10 u^2.
func (a Vec) Norm() Float {
	m := a.reach()
	if m == 0 || math.IsInf(m, 0) || math.IsNaN(m) {
		return Of(m)
	}
	b, up := a.scaled(m)
	return b.Dot(b).Sqrt().Scale(up)
}

// Unit returns a/|a|, for a of any length; of the zero vector and of vectors that are not finite it returns NaN
// components. Accuracy: the relative error of each component is below 22 u^2.
func (a Vec) Unit() Vec {
	b, _ := a.scaled(a.reach())
	n := b.Dot(b).Sqrt()
	return Vec{b.X.Div(n), b.Y.Div(n), b.Z.Div(n)}
}

// reach returns the greatest magnitude of a component.
func (a Vec) reach() float64 { return max(math.Abs(a.X.Hi), math.Abs(a.Y.Hi), math.Abs(a.Z.Hi)) }

// scaled returns a divided by a power of two that brings its reach m close to 1, and that power.
func (a Vec) scaled(m float64) (b Vec, up float64) {
	_, e := math.Frexp(m)
	e = min(max(e, -1021), 1021) // so that both powers are normal numbers
	down := Of(math.Ldexp(1, -e))
	return a.Scale(down), math.Ldexp(1, e)
}
