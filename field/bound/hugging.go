package bound

import (
	"math"
	"sync"

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

// single is a batch of one point, reused between calls.
type single struct {
	x, y, z, xLo, yLo, zLo, slack [1]float64
	at                            field.Points
	all                           *field.Values
	part                          field.Values // what is wanted of all
}

var singles = sync.Pool{New: func() any {
	s := &single{all: field.NewValues(1, field.WantPhi|field.WantG|field.WantGrad|field.WantErr)}
	s.at = field.Points{X: s.x[:], Y: s.y[:], Z: s.z[:], XLo: s.xLo[:], YLo: s.yLo[:], ZLo: s.zLo[:], Slack: s.slack[:]}
	return s
}}

// atPoint evaluates a source at one point.
func atPoint(src field.Source, p field.Point, side field.Side, want field.Want) field.Value {
	s := singles.Get().(*single)
	defer singles.Put(s)
	s.x[0], s.y[0], s.z[0] = p.X.X.Hi, p.X.Y.Hi, p.X.Z.Hi
	s.xLo[0], s.yLo[0], s.zLo[0], s.slack[0] = p.X.X.Lo, p.X.Y.Lo, p.X.Z.Lo, p.Slack
	dst := &s.part
	*dst = field.Values{Status: s.all.Status}
	if want&field.WantPhi != 0 {
		dst.Phi = s.all.Phi
	}
	if want&field.WantG != 0 {
		dst.GX, dst.GY, dst.GZ = s.all.GX, s.all.GY, s.all.GZ
	}
	if want&field.WantGrad != 0 {
		dst.Grad = s.all.Grad
	}
	if want&field.WantErr != 0 {
		dst.ErrPhi, dst.ErrG, dst.ErrGrad = s.all.ErrPhi, s.all.ErrG, s.all.ErrGrad
	}
	field.Evaluate(src, dst, &s.at, side)
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
