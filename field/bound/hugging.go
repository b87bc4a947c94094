package bound

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// unitForms returns the field of the body with polarization 1 along x, y and z, nil if there is no closed form for it.
func unitForms(body geom.Body) (forms []field.Source) {
	for _, e := range [3]r3.Vec{{X: 1}, {Y: 1}, {Z: 1}} {
		src, err := wholeBody(body, field.Affine{Value: e})
		if src == nil || err != nil {
			return nil
		}
		forms = append(forms, src)
	}
	return forms
}

// hugging evaluates at a point close to the surface. The charts of faces place an edge by a few u of its coordinates, which at a
// distance d from it changes the field by u/d. So the body is taken with the uniform polarization that p has at its point nearest to x,
// by its closed form, whose geometry is exact beside edges; what p is more than that vanishes at the edge, and the place of the edge
// with it.
func (s *integrated) hugging(p field.Point, side field.Side, want field.Want) field.Value {
	x := p.X.Value()
	var foot r3.Vec
	least := math.Inf(1)
	for _, l := range s.layers {
		if y, d := l.Nearest(x); d < least {
			foot, least = y, d
		}
	}
	base := s.charge.p.At(foot)
	if !finiteVec(base) {
		base = r3.Vec{}
	}
	var v field.Value
	for k, c := range [3]float64{base.X, base.Y, base.Z} {
		if c != 0 {
			add(&v, atPoint(s.base[k], p, side, want), c)
		}
	}
	for _, l := range s.layers {
		add(&v, l.Less(base, p, side, want), 1)
	}
	status := v.Status
	for _, src := range s.volumes {
		add(&v, atPoint(src, p, side, want), 1)
	}
	v.Status = status
	s.judge(&v, x, want)
	return v
}

func finiteVec(v r3.Vec) bool { return v.X-v.X+(v.Y-v.Y)+(v.Z-v.Z) == 0 }

// atPoint evaluates a source at one point.
func atPoint(src field.Source, p field.Point, side field.Side, want field.Want) field.Value {
	at := field.Points{
		X: []float64{p.X.X.Hi}, Y: []float64{p.X.Y.Hi}, Z: []float64{p.X.Z.Hi},
		XLo: []float64{p.X.X.Lo}, YLo: []float64{p.X.Y.Lo}, ZLo: []float64{p.X.Z.Lo}, Slack: []float64{p.Slack},
	}
	dst := field.NewValues(1, want)
	field.Evaluate(src, dst, &at, side)
	return dst.At(0)
}

// add adds k times a value to v.
func add(v *field.Value, w field.Value, k float64) {
	v.Phi += k * w.Phi
	v.G = r3.Add(v.G, r3.Scale(k, w.G))
	for i := range v.Grad {
		v.Grad[i] += k * w.Grad[i]
	}
	k = math.Abs(k)
	v.ErrPhi += k * w.ErrPhi
	v.ErrG += k * w.ErrG
	v.ErrGrad += k * w.ErrGrad
	v.Status = max(v.Status, w.Status)
}
