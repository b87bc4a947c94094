package force

import (
	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/element"
	"gonum.org/v1/gonum/spatial/r3"
)

// exact returns what a source does to bound charge where that is known without integration.
func exact(p *part, o *other, g goal, about r3.Vec) (out outcome, ok bool) {
	if p.charge == nil {
		return out, false
	}
	out.met = true
	switch s := o.src.(type) {
	case field.Constant:
		out.total = inConstant(p.charge, s.G)
		out.error = least(&out.total)
		if g.stiff {
			turned(&out.total, p.charge.Moment, s.G)
		}
		return out, true
	case element.Point:
		if g.stiff {
			return out, false
		}
		v := field.At(p.charge, s.At, field.Outside, field.WantPhi|field.WantG|field.WantErr)
		if v.Status != field.Regular {
			return out, false
		}
		out.total.charge(s.Charge, r3.Sub(s.At, about), &v, false)
		out.error = least(&out.total)
		return out.reaction(), true
	case element.Dipole:
		if g.stiff {
			return out, false
		}
		v := field.At(p.charge, s.At, field.Outside, field.WantG|field.WantGrad|field.WantErr)
		if v.Status != field.Regular {
			return out, false
		}
		out.total.dipole(s.Moment, r3.Sub(s.At, about), &v)
		out.error = least(&out.total)
		return out.reaction(), true
	}
	return out, false
}

// inConstant returns what a uniform field does: no force, the torque p x g on the moment, the energy -p.g.
func inConstant(c *bound.Charge, g r3.Vec) (s sums) {
	m := c.Moment
	s.push(r3.Vec{}, r3.Cross(m, g), -r3.Dot(m, g))
	size := r3.Norm(m) * r3.Norm(g)
	s.size = Bounds{Torque: size, Energy: size}
	return s
}

// turned adds the change of the torque of a dipole with a rotation in a uniform field: (e x m) x g.
func turned(s *sums, m, g r3.Vec) {
	for k, e := range [3]r3.Vec{{X: 1}, {Y: 1}, {Z: 1}} {
		t := r3.Cross(r3.Cross(e, m), g)
		s.v[atTurn+k] += t.X
		s.v[atTurn+3+k] += t.Y
		s.v[atTurn+6+k] += t.Z
	}
}
