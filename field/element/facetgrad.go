package element

import (
	"math"

	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

// tensor is a 3 by 3 matrix under construction.
type tensor [3][3]float64

// addOuter adds k a b^T.
func (t *tensor) addOuter(k float64, a, b r3.Vec) {
	for i, x := range [3]float64{k * a.X, k * a.Y, k * a.Z} {
		t[i][0] = math.FMA(x, b.X, t[i][0])
		t[i][1] = math.FMA(x, b.Y, t[i][1])
		t[i][2] = math.FMA(x, b.Z, t[i][2])
	}
}

// symmetric returns xx, yy, zz, xy, xz, yz of k times the symmetric part.
func (t *tensor) symmetric(k float64) [6]float64 {
	return [6]float64{k * t[0][0], k * t[1][1], k * t[2][2],
		0.5 * k * (t[0][1] + t[1][0]), 0.5 * k * (t[0][2] + t[2][0]), 0.5 * k * (t[1][2] + t[2][1])}
}

// gradient returns 4 pi times the gradient of g in units of f.unit, and the sum of the magnitudes behind it. The edge
// logarithms and their flags stand in w already.
//
//	grad g = sum_f [ gamma S^T + S gamma^T - rho n S^T + sigma_f(x) n gO^T ] + sum_f,k sigma_f(x) m gL^T - sum_e c_e HK
//
// with S = sum m L + n Omega, gL and gO the gradients of L and Omega, HK the second derivatives of K.
func (f *facets) gradient(w *facetRoom, sum *facetSums, side field.Side) (tensor, float64) {
	var t tensor
	size := 0.0
	for i := range f.faces {
		q := &f.faces[i]
		if !q.charged && f.rho == 0 {
			continue
		}
		sx := q.sigma - r3.Dot(q.gamma, w.a[q.ref])
		rough := math.Abs(sx) // what the rounding of sx goes with: it vanishes where linear charge changes sign
		if f.linear {
			rough = f.dense + r3.Norm(q.gamma)*w.r[q.ref]
		}
		var turn r3.Vec // gO, summed over the rim
		var s r3.Vec
		for k := range q.corners {
			c := &q.corners[k]
			gl, spin := f.edgeSlopes(c, q, w, sum)
			t.addOuter(sx, c.m, gl)
			turn = r3.Sub(turn, spin)
			s = r3.Add(s, r3.Scale(w.l[c.edge], c.m))
			size += rough * (r3.Norm(gl) + r3.Norm(spin))
		}
		t.addOuter(sx, q.n, turn)
		if !f.linear {
			continue
		}
		h := -r3.Dot(q.n, w.a[q.corners[0].from])
		var omega float64
		if f.away(q, h, sum) {
			omega = q.fanAngle(h, w)
		} else {
			status := sum.status
			omega, _ = f.edgeAngle(q, w, sum, side)
			sum.status = status
		}
		s = r3.Add(s, r3.Scale(omega, q.n))
		t.addOuter(1, q.gamma, s)
		t.addOuter(1, s, q.gamma)
		t.addOuter(-f.rho, q.n, s)
		size += r3.Norm(s) * (2*r3.Norm(q.gamma) + math.Abs(f.rho))
	}
	for i := range f.edges {
		if e := &f.edges[i]; e.c != 0 {
			size += f.addEdgeTensor(e, i, w, sum, &t)
		}
	}
	return t, size
}

// edgeSlopes returns the gradient of the logarithm of a corner's edge and (a x b) S/(R1 R2 D), the field of a unit current
// along the edge in the sense of the face.
func (f *facets) edgeSlopes(c *facetCorner, q *facet, w *facetRoom, sum *facetSums) (gl, spin r3.Vec) {
	e := &f.edges[c.edge]
	a, b, r1, r2 := w.a[c.from], w.a[c.to], w.r[c.from], w.r[c.to]
	l := e.length
	t := r3.Scale(c.sign, e.t)
	ab := r3.Dot(a, b)
	if ab >= 0 {
		d := r1*r2 + ab
		gl = r3.Scale(l/d, r3.Add(r3.Scale(1/r1, a), r3.Scale(1/r2, b)))
		spin = r3.Scale((r1+r2)/(r1*r2*d), r3.Cross(a, b))
		return gl, spin
	}
	u := f.edgeOffset(c, q, w, sum)
	p2 := r3.Dot(u, u)
	s1, s2 := r3.Dot(t, a), r3.Dot(t, b)
	gl = r3.Add(r3.Scale(-(s2/r2-s1/r1)/p2, u), r3.Scale(1/r1-1/r2, t))
	d := l * l * p2 / (r1*r2 - ab)
	spin = r3.Scale(-l*(r1+r2)/(r1*r2*d), r3.Cross(u, t))
	return gl, spin
}

// edgeOffset returns h n - d m, the vector from the edge line to x.
func (f *facets) edgeOffset(c *facetCorner, q *facet, w *facetRoom, sum *facetSums) r3.Vec {
	k := c.from
	if w.r[c.to] < w.r[k] {
		k = c.to
	}
	d, h := r3.Dot(c.m, w.a[k]), -r3.Dot(q.n, w.a[k])
	if w.close[c.edge] {
		a := f.verts[k].Sub(sum.x)
		d, h = c.mp.Dot(a).Value(), -q.np.Dot(a).Value()
	}
	return r3.Sub(r3.Scale(h, q.n), r3.Scale(d, c.m))
}

// addEdgeTensor subtracts c HK, HK = (1 - t t^T) L - t (e2 - e1)^T + u gL^T, and returns the magnitude.
func (f *facets) addEdgeTensor(e *facetEdge, i int, w *facetRoom, sum *facetSums, t *tensor) float64 {
	q := &f.faces[e.face[0]]
	c := &q.corners[e.corner[0]]
	el := w.l[i]
	gl, _ := f.edgeSlopes(c, q, w, sum)
	u := f.edgeOffset(c, q, w, sum)
	a, b, r1, r2 := w.a[c.from], w.a[c.to], w.r[c.from], w.r[c.to]
	along := r3.Scale(c.sign, e.t)
	de := r3.Sub(r3.Scale(1/r1, a), r3.Scale(1/r2, b)) // e2 - e1
	for k := range 3 {
		t[k][k] -= e.c * el
	}
	t.addOuter(e.c*el, e.t, e.t)
	t.addOuter(e.c, along, de)
	t.addOuter(-e.c, u, gl)
	return math.Abs(e.c) * (el + 2 + r3.Norm(u)*r3.Norm(gl))
}
