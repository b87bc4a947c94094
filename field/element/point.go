package element

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

const (
	u      = 0x1p-53           // rounding unit of float64
	over4P = 1 / (4 * math.Pi) // 1/(4 pi)
)

// Point is the field of a point charge.
//
// Units: Charge in units of the polarization times length^2.
// Frame: At and x are in the same frame.
// Domain: all finite x. NaN in, NaN out.
// Singular: |g| grows as 1/d^2 at distance d. At the charge, or within the slack of the point: NaN, field.AtPoint.
// Accuracy: |error| <= 2e-15 of phi, |g| and |grad g| each (worst 1.2e-15 of 4000 points, TestPointDipoleReference).
// Source: Coulomb's law.
type Point struct {
	At     r3.Vec
	Charge float64
}

// Field returns g at x.
func (c Point) Field(x r3.Vec) r3.Vec { return single(x, c.value) }

// Evaluate computes the arrays of dst; see field.Evaluator.
func (c Point) Evaluate(dst *field.Values, at *field.Points, _ field.Side) {
	field.Fill(dst, at, func(p field.Point, _ field.Want) field.Value { return c.value(p, field.Mean) })
}

// Bounds returns the box of no size at the charge.
func (c Point) Bounds() r3.Box { return r3.Box{Min: c.At, Max: c.At} }

func (c Point) value(p field.Point, _ field.Side) field.Value {
	n, r := direction(p.X.Sub(pair.VecOf(c.At)).Value())
	if r <= p.Slack {
		return field.Nowhere(field.AtPoint)
	}
	return monopole(over4P*c.Charge/r, n, r)
}

// monopole returns the value at distance r in direction n from a charge whose potential there is phi.
//
// The bounds count: phi 6 u (r 3.5 u, three operations), f twice r and one operation more, n 4.5 u.
func monopole(phi float64, n r3.Vec, r float64) field.Value {
	f := phi / r
	t := f / r
	return field.Value{
		Phi: phi,
		G:   r3.Scale(f, n),
		Grad: [6]float64{t * (1 - 3*n.X*n.X), t * (1 - 3*n.Y*n.Y), t * (1 - 3*n.Z*n.Z),
			-3 * t * n.X * n.Y, -3 * t * n.X * n.Z, -3 * t * n.Y * n.Z},
		ErrPhi:  8 * u * math.Abs(phi),
		ErrG:    16 * u * math.Abs(f),
		ErrGrad: 64 * u * math.Abs(t),
	}
}

// single returns g at x from a source written for one point; NaN where x is not finite.
func single(x r3.Vec, one func(field.Point, field.Side) field.Value) r3.Vec {
	if x.X-x.X+(x.Y-x.Y)+(x.Z-x.Z) != 0 {
		return field.Nowhere(field.BadInput).G
	}
	return one(field.Point{X: pair.VecOf(x)}, field.Mean).G
}

// direction returns d/|d| and |d|, with relative errors of at most 3.5 u and 2.5 u, for all finite d that are not
// zero; the direction of zero is zero. Components that would overflow or underflow when squared are scaled first.
func direction(d r3.Vec) (n r3.Vec, r float64) {
	s := d.X*d.X + d.Y*d.Y + d.Z*d.Z
	if s > 0x1p-900 && s < 0x1p1000 {
		r = math.Sqrt(s)
		return r3.Vec{X: d.X / r, Y: d.Y / r, Z: d.Z / r}, r
	}
	m := max(math.Abs(d.X), math.Abs(d.Y), math.Abs(d.Z))
	if m == 0 {
		return r3.Vec{}, 0
	}
	e := math.Ilogb(m)
	n, r = direction(r3.Vec{X: math.Ldexp(d.X, -e), Y: math.Ldexp(d.Y, -e), Z: math.Ldexp(d.Z, -e)})
	return n, math.Ldexp(r, e)
}
