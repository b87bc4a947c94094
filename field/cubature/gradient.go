package cubature

import (
	"math"

	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

// steep is the distance from the face below which the gradient is taken from farther away. The terms of the gradient grow as
// 1/distance, and as 1/distance^2 beside a seam of charts, and their rounding with them.
func (l *Layer) steep(w *work, t *target) float64 {
	if len(w.feet) == 0 {
		return 0
	}
	return 4e-4 * min(l.radius, t.rim, w.nearest().bend())
}

// bend returns about the radius of curvature at the foot, from normals a little aside.
func (f *placedFoot) bend() float64 {
	p, n := f.panel, f.normal(f.panel)
	r := math.Inf(1)
	for k := range 2 {
		c := f.c
		c[k] += math.Copysign(1e-2*(p.hi[k]-p.lo[k]), p.lo[k]+p.hi[k]-2*c[k])
		x, xu, xv := p.chart.At(c[0], c[1])
		r = min(r, r3.Norm(r3.Sub(x, f.x))/(r3.Norm(r3.Sub(unit(r3.Cross(xu, xv)), n))+1e-300))
	}
	return r
}

// gradient extrapolates the gradient to a point very near the face along the line away from it, on which it is smooth: by the
// quartic through points at h, 2h .. 5h. It errs by a small part of what its last power contributes.
func (l *Layer) gradient(w *work, t *target, v *field.Value) {
	h := t.steep
	const n = 5
	var grads [n][6]float64
	var errs [n]float64
	for k := range grads {
		s := *t
		s.want, s.status, s.hugs, s.plain = field.WantGrad, field.Regular, false, true
		s.low = r3.Add(t.low, r3.Scale(float64(k+1)*h-t.offset, t.away))
		p := l.close(w, &s)
		grads[k], errs[k] = p.Grad, p.ErrGrad
	}
	z := t.offset / h
	fourth := [n]float64{1, -4, 6, -4, 1}
	power := (z - 1) * (z - 2) * (z - 3) * (z - 4) / 24
	var last [6]float64
	v.Grad, v.ErrGrad = [6]float64{}, 0
	for k := range grads {
		c := 1.0
		for j := range grads {
			if j != k {
				c *= (z - float64(j+1)) / float64(k-j)
			}
		}
		for i := range v.Grad {
			v.Grad[i] += c * grads[k][i]
			last[i] += power * fourth[k] * grads[k][i]
		}
		v.ErrGrad += math.Abs(c) * errs[k]
	}
	v.ErrGrad += 0.1 * frobenius(&last)
	if t.rim < math.Inf(1) {
		v.ErrGrad += 2 * u * (l.scale + scaleOf(t.x)) * t.ends / (math.Pi * t.rim * t.rim)
	}
}
