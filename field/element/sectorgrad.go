package element

import (
	"math"

	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

// gradient sets the gradient of g at the point q; on a charged face, on an edge and where the
// radial p has no direction there is none.
func (b *sector) gradient(v *field.Value, p *sectorPoint, q field.Point) {
	tip := b.radial != 0 && b.radius[0] == 0 && p.rho <= p.tol // the radial p has no direction there
	if v.Status != field.Regular || tip {
		w := field.Nowhere(v.Status)
		v.Grad, v.ErrGrad = w.Grad, w.ErrGrad
		return
	}
	t, claim := b.slope(p)
	v.Grad = t.symmetric(over4P)
	v.ErrGrad = over4P * claim
	if b.ends != nil && !b.plain {
		w := b.ends.value(q, field.Mean, field.WantGrad|field.WantErr)
		for i := range v.Grad {
			v.Grad[i] += w.Grad[i]
		}
		v.ErrGrad += w.ErrGrad
	}
	for i := range v.Grad {
		v.Grad[i] /= b.unit
	}
	v.ErrGrad /= b.unit
}

// slope returns 4 pi times the gradient of what the faces of revolution and the radial charge give, and a bound for its
// error.
func (b *sector) slope(p *sectorPoint) (tensor, float64) {
	main, size := b.slopeBy(p, &sectorMain)
	check, _ := b.slopeBy(p, &sectorCheck)
	off := 0.0
	for i := range main {
		for j := range main {
			d := main[i][j] - check[i][j]
			off += d * d
		}
	}
	return main.turned(p.e), 10*math.Sqrt(off) + 16*u*size
}

func (b *sector) slopeBy(p *sectorPoint, rule *sectorRule) (t tensor, size float64) {
	if b.radial != 0 {
		var s sectorHess
		s.sweep(b, p, rule, true)
		s.addCorners(b, p, true)
		if p.within > 0 && p.rho > 0 { // the step of the field through the half-plane of the point
			s.rest[1][1] -= 4 * math.Pi * p.within * b.radial / p.rho
		}
		t, size = s.total(b, p, nil), s.size
	}
	if b.plain {
		return t, size
	}
	var s sectorHess
	s.sweep(b, p, rule, false)
	s.addCorners(b, p, false)
	if !b.full {
		for k := range s.rim {
			if b.flatCharged[k] {
				s.addRays(b, p, k)
			}
		}
	}
	var sum sectorSum // for the integrals along the outlines of the flat faces
	sum.affinely(b, p, rule)
	h := s.total(b, p, &sum.flat)
	for i := range t {
		for j := range t {
			t[i][j] += h[i][j]
		}
	}
	size += s.size + (math.Abs(b.rho)+r3.Norm(column(&b.grad, 0))+r3.Norm(column(&b.grad, 1)))*4*math.Pi
	return t, size
}
