package current

import (
	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

// Sum is the superposition of sources in one frame, added in order; the empty sum is the absence of field. Estimates add, the
// status is the gravest of the parts. Inside and Outside ask every part for its own side.
type Sum []Source

// Induction computes the arrays of dst; see Source.
func (s Sum) Induction(dst *Values, at *field.Points, side field.Side) {
	Fill(dst, at, func(field.Point) Value { return Value{} })
	part := dst.alike(at.Len())
	for _, src := range s {
		src.Induction(part, at, side)
		for i := range at.Len() {
			a, b := dst.At(i), part.At(i)
			dst.Set(i, Value{A: r3.Add(a.A, b.A), B: r3.Add(a.B, b.B), ErrA: a.ErrA + b.ErrA, ErrB: a.ErrB + b.ErrB,
				Status: max(a.Status, b.Status)})
		}
	}
}

// alike returns values for n points with the arrays that v has.
func (v *Values) alike(n int) *Values {
	w := NewValues(n)
	if v.AX == nil {
		w.AX, w.AY, w.AZ = nil, nil, nil
	}
	if v.BX == nil {
		w.BX, w.BY, w.BZ = nil, nil, nil
	}
	if v.ErrA == nil {
		w.ErrA = nil
	}
	if v.ErrB == nil {
		w.ErrB = nil
	}
	return w
}

// Uniform is a uniform field applied from outside, with a = B x x/2: of all vector potentials in Coulomb gauge the one that vanishes
// at the origin and turns with B. Its currents are far away.
type Uniform struct{ B r3.Vec }

// Induction computes the arrays of dst; see Source.
func (c Uniform) Induction(dst *Values, at *field.Points, _ field.Side) {
	Fill(dst, at, func(p field.Point) Value {
		x := p.X.Value()
		return Value{A: r3.Scale(0.5, r3.Cross(c.B, x)), B: c.B, ErrA: 4 * u * r3.Norm(c.B) * r3.Norm(x)}
	})
}
