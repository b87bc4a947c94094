package cubature

import (
	"math"

	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

// rim is a side of a panel close to the target: where it is nearest, its direction and what charge ends there.
type rim struct {
	at       r3.Vec // from the target
	tangent  r3.Vec // unit
	m        r3.Vec // outward in the surface, times density
	whole    r3.Vec // the same with nothing left out
	n        r3.Vec // normal of the surface
	distance float64
	done     bool
	own      bool // the geometry of its panel could not be tied to that of the others
	tip      bool
}

// edgeReach is the distance in panel radii within which sides are looked at.
const edgeReach = 1e-2

// place puts the target as seen from all feet into one consistent geometry, tells whether it is on the charge or on an edge,
// and finds the live edges close to it.
//
// Two charts that meet round their common edge differently, by u of the coordinates; a target at distance d from the edge
// would see a line of charge u/d between them. So the vectors from all feet derive from the foot that is nearest, by
// integrals of the chart's derivatives between the feet.
func (l *Layer) place(w *work, t *target) {
	t.offset, t.rim, t.ends = math.Inf(1), math.Inf(1), 0
	if len(w.feet) == 0 {
		return
	}
	first := 0
	for i := range w.feet {
		f := &w.feet[i]
		f.w = r3.Add(r3.Sub(t.x, f.x), t.low)
		f.aligned = false
		if f.distance < w.feet[first].distance {
			first = i
		}
	}
	f := &w.feet[first]
	t.offset = r3.Norm(f.w)
	if t.offset > 0 {
		t.away = r3.Scale(1/t.offset, f.w)
	}
	onFace := t.offset <= t.tol
	f.aligned = true
	normal := f.normal(f.panel)
	if onFace { // the limit from the outside
		f.w = r3.Scale(1e-16*max(f.panel.scale, f.panel.radius), normal)
		t.status, t.away = field.OnFace, normal
	}
	if t.offset < 0x1p-5*f.panel.scale {
		for i := range w.feet {
			if i != first {
				w.feet[i].align(f)
			}
		}
	}
	l.rims(w, t)
	if t.rim <= t.tol {
		t.status = field.OnEdge
	}
}

// normal returns the unit normal at the foot; at a tip that from just inside.
func (f *foot) normal(p *panel) r3.Vec {
	if n := unit(r3.Cross(f.xu, f.xv)); n != (r3.Vec{}) {
		return n
	}
	return p.inward(f.c)
}

// inward returns the unit normal 1e-13 of the panel's size inside the point c of its rim.
func (p *panel) inward(c [2]float64) r3.Vec {
	for k := range c {
		c[k] += 1e-13 * ((p.lo[k]+p.hi[k])/2 - c[k])
	}
	_, xu, xv := p.chart.At(c[0], c[1])
	return unit(r3.Cross(xu, xv))
}

// sharpness returns the density times the change of the normal round a tip: zero on a smooth surface.
func (p *panel) sharpness(c [2]float64, axis int, less r3.Vec) (m, whole r3.Vec) {
	a, b := c, c
	a[1-axis], b[1-axis] = p.lo[1-axis], p.hi[1-axis]
	turn := r3.Sub(p.inward(a), p.inward(b))
	if r3.Norm(turn) < 1e-9 {
		return m, whole
	}
	x, _, _ := p.chart.At(c[0], c[1])
	return r3.Scale(p.left(x, p.inward(c), less), turn), r3.Scale(p.left(x, p.inward(c), r3.Vec{}), turn)
}

func unit(v r3.Vec) r3.Vec {
	n := r3.Norm(v)
	if n == 0 {
		return v
	}
	return r3.Scale(1/n, v)
}

// align derives the vector from g to the target from that of f, where the two feet are close and lie on one chart, or on two
// that meet: then by way of the point of g's chart rim that is nearest to g.
func (g *placedFoot) align(f *placedFoot) {
	p, q := f.panel, g.panel
	reach := 0.1 * max(p.radius, q.radius)
	if r3.Norm(r3.Sub(g.x, f.x)) > reach {
		g.aligned = true // too far for the rounding of places to matter
		return
	}
	if p.index == q.index {
		g.accept(f, p.along(f.c, g.c))
		return
	}
	best := reach
	x := r3.Add(f.x, f.w)
	for axis := range 2 {
		for _, end := range [2]float64{0, 1} {
			lo, hi := [2]float64{}, [2]float64{1, 1}
			lo[axis], hi[axis] = end, end
			c := g.c
			c[axis] = end
			side := descend(q.chart, g.x, c, lo, hi)
			if !(side.distance < best) {
				continue
			}
			if g.joinAt(f, q.corner(x, side), reach) || g.joinAt(f, side, reach) {
				best = side.distance
			}
		}
	}
}

// joinAt ties g to f by a point of the rim of g's chart, if it is on that of f too.
func (g *placedFoot) joinAt(f *placedFoot, rim foot, reach float64) bool {
	if rim.distance > reach {
		return false
	}
	to, ok := f.meet(rim.x, max(f.panel.scale, g.panel.scale))
	return ok && g.accept(f, r3.Sub(f.panel.along(f.c, to), g.panel.along(g.c, rim.c)))
}

// corner returns the corner of the chart next to a point on its rim, if that is the better point to join at. Charts joined at a
// point inside an edge may slip along it by u, which opens a gap where other charts come in, at the corner: an error of u/D,
// D its distance. Joining at the corner costs u D/e, e the distance of the edge.
func (p *panel) corner(x r3.Vec, side foot) foot {
	c := side.c
	for k := range c {
		c[k] = math.Round(c[k])
	}
	h := footAt(p.chart, x, c)
	d, e := h.distance, r3.Norm(r3.Sub(x, side.x))
	h.distance = r3.Norm(r3.Sub(h.x, side.x)) + side.distance
	if d*d > e*max(p.scale, p.radius) {
		h.distance = math.Inf(1)
	}
	return h
}

// meet returns the parameters of f's chart at the place x, which is on its rim if on it at all.
func (f *placedFoot) meet(x r3.Vec, scale float64) (c [2]float64, ok bool) {
	tol := 32 * u * scale
	h := descend(f.panel.chart, x, f.c, [2]float64{}, [2]float64{1, 1})
	if h.distance > tol {
		return c, false
	}
	c = h.c
	for k, d := range [2]r3.Vec{h.xu, h.xv} { // a common edge is met exactly
		n := r3.Norm(d)
		switch {
		case c[k]*n <= 1e3*tol && h.c[k] < 0.5:
			c[k] = 0
		case (1-c[k])*n <= 1e3*tol && h.c[k] > 0.5:
			c[k] = 1
		}
	}
	if y, _, _ := f.panel.chart.At(c[0], c[1]); r3.Norm(r3.Sub(x, y)) > tol {
		c = h.c
	}
	return c, true
}

// accept sets the vector to the target as that of f less d, if this agrees with the rounded places.
func (g *placedFoot) accept(f *placedFoot, d r3.Vec) bool {
	v := r3.Sub(f.w, d)
	g.aligned = r3.Norm(r3.Sub(v, g.w)) <= 512*u*max(f.panel.scale, g.panel.scale)
	if g.aligned {
		g.w = v
	}
	return g.aligned
}

// rims finds the live edges near the target.
func (l *Layer) rims(w *work, t *target) {
	w.rims = w.rims[:0]
	for i := range w.feet {
		f := &w.feet[i]
		if f.distance > edgeReach*f.panel.radius {
			continue
		}
		for axis := range 2 {
			for _, end := range [2]bool{false, true} {
				f.rim(w, t.less, axis, end, 0)
			}
		}
	}
	for i := range w.rims {
		a := &w.rims[i]
		if a.done {
			continue
		}
		m, whole, size := a.m, a.whole, r3.Norm(a.whole)
		for j := i + 1; j < len(w.rims); j++ {
			b := &w.rims[j]
			if !b.done && a.with(b, t.tol) {
				b.done = true
				m, whole, size = r3.Add(m, b.m), r3.Add(whole, b.whole), size+r3.Norm(b.whole)
			}
		}
		if r3.Norm(whole) > 1e-9*size {
			t.rim, t.ends = min(t.rim, a.distance), max(t.ends, r3.Norm(m))
			a.m = m
		} else {
			a.done = true
		}
	}
}

// with reports whether two sides are one edge.
func (a *rim) with(b *rim, tol float64) bool {
	same := r3.Norm(r3.Sub(a.at, b.at)) <= 0.05*a.distance+16*tol
	return same && !a.tip && !b.tip && r3.Norm(r3.Cross(a.tangent, b.tangent)) < 1e-3
}

// rim adds a side of the panel if it is close; the density is that of a panel that has none.
func (f *placedFoot) rim(w *work, less r3.Vec, axis int, end bool, density float64) {
	p := f.panel
	to := f.c
	to[axis] = p.lo[axis]
	if end {
		to[axis] = p.hi[axis]
	}
	rate := [2]r3.Vec{f.xu, f.xv}
	if math.Abs(to[axis]-f.c[axis])*r3.Norm(rate[axis]) > 4*edgeReach*p.radius {
		return
	}
	lo, hi := p.lo, p.hi
	lo[axis], hi[axis] = to[axis], to[axis]
	x := r3.Add(f.x, f.w)
	h := descend(p.chart, x, to, lo, hi)
	rate = [2]r3.Vec{h.xu, h.xv}
	along := r3.Norm(rate[1-axis])
	at := r3.Sub(p.along(f.c, h.c), f.w)
	if along < 1e-12*p.radius {
		if p.density == nil {
			return
		}
		if m, whole := p.sharpness(h.c, axis, less); whole != (r3.Vec{}) {
			w.rims = append(w.rims, rim{at: at, m: m, whole: whole, distance: r3.Norm(at), tip: true})
		}
		return
	}
	n := h.normal(p)
	tangent := r3.Scale(1/along, rate[1-axis])
	m := r3.Cross(tangent, n)
	if (axis == 0) != end { // xu x xv = n: xv x n points along xu, n x xu along xv
		m = r3.Scale(-1, m)
	}
	whole := density
	if p.density != nil {
		density, whole = p.left(h.x, n, less), p.left(h.x, n, r3.Vec{})
	}
	w.rims = append(w.rims, rim{at: at, tangent: tangent, m: r3.Scale(density, m), whole: r3.Scale(whole, m), n: n, distance: r3.Norm(at), own: !f.aligned})
}

// onFace turns the outside limit into what was asked for.
func (l *Layer) onFace(w *work, t *target, v *field.Value) {
	v.Status = t.status
	switch t.status {
	case field.OnEdge:
		nan := math.NaN()
		v.G, v.Grad = r3.Vec{X: nan, Y: nan, Z: nan}, [6]float64{nan, nan, nan, nan, nan, nan}
		v.ErrG, v.ErrGrad = math.Inf(1), math.Inf(1)
	case field.OnFace:
		f := w.nearest()
		n := f.normal(f.panel)
		sigma := f.panel.left(f.x, n, t.less)
		v.ErrGrad = math.Inf(1)
		switch t.side {
		case field.Mean:
			v.G = r3.Sub(v.G, r3.Scale(sigma/2, n))
		case field.Inside:
			v.G = r3.Sub(v.G, r3.Scale(sigma, n))
		}
	}
}

func (w *work) nearest() *placedFoot {
	best := &w.feet[0]
	for i := range w.feet {
		if w.feet[i].distance < best.distance {
			best = &w.feet[i]
		}
	}
	return best
}

// rounding adds what the rounding of places and coordinates does: the change of the field over a few u of the coordinates.
// Beside a live edge with end density m, |grad g| = |m|/(2 pi d).
func (l *Layer) rounding(w *work, t *target, v *field.Value) {
	shift := 2 * u * (l.scale + scaleOf(t.x))
	if v.Status == field.OnEdge {
		v.ErrPhi += shift * l.peak * 40 // |g| within the tolerance of the edge: log(1/u)
		return
	}
	v.ErrPhi += shift * r3.Norm(v.G)
	v.ErrG += shift * l.peak / l.radius
	for i := range w.rims {
		a := &w.rims[i]
		if a.done && !a.own {
			continue
		}
		m := r3.Norm(a.m)
		v.ErrG += shift * m / (2 * math.Pi * a.distance)
		v.ErrGrad += shift * m / (math.Pi * a.distance * a.distance)
	}
}
