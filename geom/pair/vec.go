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

// Dot returns a.b.
func (a Vec) Dot(b Vec) Float { return a.X.Mul(b.X).Add(a.Y.Mul(b.Y)).Add(a.Z.Mul(b.Z)) }

// Cross returns a x b.
func (a Vec) Cross(b Vec) Vec {
	return Vec{
		a.Y.Mul(b.Z).Sub(a.Z.Mul(b.Y)),
		a.Z.Mul(b.X).Sub(a.X.Mul(b.Z)),
		a.X.Mul(b.Y).Sub(a.Y.Mul(b.X)),
	}
}

// Norm returns |a|. Components are scaled by a power of two first, so it neither overflows nor underflows.
func (a Vec) Norm() Float {
	m := max(math.Abs(a.X.Hi), math.Abs(a.Y.Hi), math.Abs(a.Z.Hi))
	if m == 0 || math.IsInf(m, 0) || math.IsNaN(m) {
		return Of(m)
	}
	_, e := math.Frexp(m)
	down, up := math.Ldexp(1, -e), math.Ldexp(1, e)
	if e < -1021 || e > 1022 { // the inverse scale would itself leave the range
		return a.Dot(a).Sqrt()
	}
	b := Vec{a.X.Scale(down), a.Y.Scale(down), a.Z.Scale(down)}
	return b.Dot(b).Sqrt().Scale(up)
}

// Unit returns a/|a|; of the zero vector it returns NaN components.
func (a Vec) Unit() Vec {
	n := a.Norm()
	return Vec{a.X.Div(n), a.Y.Div(n), a.Z.Div(n)}
}
