package response

import (
	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

// Uniform is a field that is the same everywhere, to apply from outside: g = G, phi = -G.x.
type Uniform struct{ G r3.Vec }

// Field returns G.
func (u Uniform) Field(r3.Vec) r3.Vec { return u.G }

// Evaluate computes the arrays of dst; see field.Evaluator.
func (u Uniform) Evaluate(dst *field.Values, at *field.Points, _ field.Side) {
	field.Fill(dst, at, func(p field.Point, _ field.Want) field.Value {
		x := p.X.Value()
		phi := -r3.Dot(u.G, x)
		return field.Value{Phi: phi, G: u.G, ErrPhi: 0x1p-51 * r3.Norm(u.G) * r3.Norm(x)}
	})
}
