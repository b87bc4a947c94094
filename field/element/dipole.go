package element

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Dipole is the field of a point dipole.
//
// Units: Moment in units of the polarization times length^3 (a uniform body: polarization times volume).
// Frame: At, Moment and x are in the same frame.
// Domain: all finite x. NaN in, NaN out.
// Singular: |g| grows as 1/d^3 at distance d. At the dipole, or within the slack of the point: NaN, field.AtPoint.
// Accuracy: |error| <= 3e-15 of phi, |g| and |grad g| each (worst 1.9e-15 of 4000 points, TestPointDipoleReference).
// Source: the gradient of Coulomb's law along Moment.
type Dipole struct {
	At     r3.Vec
	Moment r3.Vec
}

// Field returns g at x.
func (d Dipole) Field(x r3.Vec) r3.Vec { return single(x, d.value) }

// Evaluate computes the arrays of dst; see field.Evaluator.
func (d Dipole) Evaluate(dst *field.Values, at *field.Points, _ field.Side) {
	field.Fill(dst, at, func(p field.Point, _ field.Want) field.Value { return d.value(p, field.Mean) })
}

// Bounds returns the box of no size at the dipole.
func (d Dipole) Bounds() r3.Box { return r3.Box{Min: d.At, Max: d.At} }

func (d Dipole) value(p field.Point, _ field.Side) field.Value {
	x := p.X.Sub(pair.VecOf(d.At))
	n, r := direction(x.Value())
	if r <= p.Slack {
		return field.Nowhere(field.AtPoint)
	}
	return dipolar(d.Moment, along(d.Moment, x, r), over4P/r/r, n, r)
}

// along returns m.x/r. The products are compensated, so that it keeps its digits where x is across m.
func along(m r3.Vec, x pair.Vec, r float64) float64 { return pair.VecOf(m).Dot(x).Value() / r }

// dipolar returns the value at distance r in direction n of a dipole along m whose potential is e (m.n), mn = m.n:
// e = 1/(4 pi r^2) for the moment m.
//
//	phi = e mn,   g = (e/r) (3 mn n - m),   grad g = (3 e/r^2) (m n + n m + mn (1 - 5 n n))
//
// The bounds count: e 12 u, mn 6 u, n 4.5 u, and the operations.
func dipolar(m r3.Vec, mn, e float64, n r3.Vec, r float64) field.Value {
	f := e / r
	t := 3 * f / r
	size, part := r3.Norm(m), math.Abs(mn)
	return field.Value{
		Phi: e * mn,
		G:   r3.Vec{X: f * (3*mn*n.X - m.X), Y: f * (3*mn*n.Y - m.Y), Z: f * (3*mn*n.Z - m.Z)},
		Grad: [6]float64{
			t * (2*m.X*n.X + mn*(1-5*n.X*n.X)),
			t * (2*m.Y*n.Y + mn*(1-5*n.Y*n.Y)),
			t * (2*m.Z*n.Z + mn*(1-5*n.Z*n.Z)),
			t * (m.X*n.Y + m.Y*n.X - 5*mn*n.X*n.Y),
			t * (m.X*n.Z + m.Z*n.X - 5*mn*n.X*n.Z),
			t * (m.Y*n.Z + m.Z*n.Y - 5*mn*n.Y*n.Z),
		},
		ErrPhi:  20 * u * math.Abs(e*mn),
		ErrG:    32 * u * math.Abs(f) * (size + 3*part),
		ErrGrad: 40 * u * math.Abs(t) * (2*size + 7*part),
	}
}
