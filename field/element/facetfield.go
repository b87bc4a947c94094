package element

import (
	"math"
	"sync"

	"example.com/boundpole/field"
	"example.com/boundpole/field/internal/logatan"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

var facetRooms = sync.Pool{New: func() any { return new(facetRoom) }}

func (w *facetRoom) grow(verts, edges int) {
	if cap(w.a) < verts {
		w.a, w.r = make([]r3.Vec, verts), make([]float64, verts)
	}
	if cap(w.l) < edges {
		w.l, w.close = make([]float64, edges), make([]bool, edges)
	}
	w.a, w.r, w.l, w.close = w.a[:verts], w.r[:verts], w.l[:edges], w.close[:edges]
	clear(w.close)
}

// facetSums gathers one evaluation.
type facetSums struct {
	x      pair.Vec // the point in units of f.unit
	tol    float64
	phi    float64
	g      r3.Vec
	size   float64 // sum of magnitudes behind g
	shaky  float64 // what rounding of the geometry may do to g, in units of u
	claims bool    // estimates are wanted
	behind float64 // sum of magnitudes behind phi; wherever a distance enters, of the vector that it is taken from
	status field.Status
}

// near evaluates the closed form.
func (f *facets) near(p field.Point, side field.Side, want field.Want, w facetRoom) field.Value {
	s := f.per
	sum := facetSums{
		x:   pair.Vec{X: p.X.X.Scale(s), Y: p.X.Y.Scale(s), Z: p.X.Z.Scale(s)},
		tol: f.tolerance(p), claims: want&field.WantErr != 0,
	}
	f.offsets(&w, &sum.x)
	together, ok := f.bundled.value(&w, &sum.x)
	if ok && want == field.WantG {
		return field.Value{G: r3.Scale(over4P, together)}
	}
	for i := range f.edges {
		f.edgeLog(i, &w, &sum, want)
	}
	for i := range f.faces {
		q := &f.faces[i]
		if q.charged || f.rho != 0 {
			f.addFacet(q, &w, &sum, side)
		}
	}
	if ok {
		sum.g = together
	}
	v := f.finish(&sum, want)
	if want&field.WantGrad != 0 {
		f.finishGradient(&v, &w, &sum, side)
	}
	return v
}

// quick returns the field of a small body away from its faces, the same bits as value without its preparations.
func (f *facets) quick(x r3.Vec) (g r3.Vec, ok bool) {
	if f.bundled.logs == nil || len(f.verts) > smallVerts || len(f.edges) > smallEdges || x.X-x.X+(x.Y-x.Y)+(x.Z-x.Z) != 0 {
		return g, false
	}
	var a [smallVerts]r3.Vec
	var r [smallVerts]float64
	var l [smallEdges]float64
	s := f.per
	at := pair.Vec{X: pair.Of(x.X * s), Y: pair.Of(x.Y * s), Z: pair.Of(x.Z * s)}
	w := facetRoom{a: a[:len(f.verts)], r: r[:len(f.verts)], l: l[:len(f.edges)]}
	f.offsets(&w, &at)
	g, ok = f.bundled.value(&w, &at)
	return r3.Vec{X: over4P * g.X, Y: over4P * g.Y, Z: over4P * g.Z}, ok
}

// finishGradient adds the gradient tensor and its estimate.
func (f *facets) finishGradient(v *field.Value, w *facetRoom, sum *facetSums, side field.Side) {
	k := 0.25 / math.Pi / f.unit
	if v.Status == field.OnEdge {
		v.Grad, v.ErrGrad = field.Nowhere(field.OnEdge).Grad, math.Inf(1)
		return
	}
	t, size := f.gradient(w, sum, side)
	v.Grad = t.symmetric(k)
	v.ErrGrad = k * 0x1p-53 * (8*size + 4*sum.shaky*size/(sum.size+1))
}

// offsets fills w.a with vertex - x and w.r with its norm.
func (f *facets) offsets(w *facetRoom, x *pair.Vec) {
	if f.exact && x.X.Lo == 0 && x.Y.Lo == 0 && x.Z.Lo == 0 { // the same bits: one difference, rounded once
		for i := range f.verts {
			v := &f.verts[i]
			ax, ay, az := v.X.Hi-x.X.Hi, v.Y.Hi-x.Y.Hi, v.Z.Hi-x.Z.Hi
			w.a[i], w.r[i] = r3.Vec{X: ax, Y: ay, Z: az}, math.Sqrt(ax*ax+ay*ay+az*az)
		}
		return
	}
	for i := range f.verts {
		v := &f.verts[i]
		ax, ay, az := offset(v.X, x.X), offset(v.Y, x.Y), offset(v.Z, x.Z)
		w.a[i], w.r[i] = r3.Vec{X: ax, Y: ay, Z: az}, math.Sqrt(ax*ax+ay*ay+az*az)
	}
}

// offset returns v - x rounded once.
func offset(v, x pair.Float) float64 {
	d := pair.Sum(v.Hi, -x.Hi)
	return d.Hi + (d.Lo + (v.Lo - x.Lo))
}

// edgeLog computes the logarithm of edge i, and adds what belongs to the edge alone.
func (f *facets) edgeLog(i int, w *facetRoom, sum *facetSums, want field.Want) {
	e := &f.edges[i]
	a, b, ra, rb := w.a[e.from], w.a[e.to], w.r[e.from], w.r[e.to]
	l := e.length
	ab := math.FMA(a.X, b.X, math.FMA(a.Y, b.Y, float64(a.Z*b.Z)))
	s := ra + rb
	den := ra*rb + ab
	var p2 float64
	beside := ab < 0
	if beside {
		p2 = f.distance2(e, w, sum, i)
		den = l * l * p2 / (ra*rb - ab)
	}
	if e.live && (ra <= sum.tol || rb <= sum.tol || beside && p2 <= sum.tol*sum.tol) {
		sum.status = field.OnEdge
	}
	if den == 0 { // on the edge: d L tends to 0
		w.l[i] = 0
		if f.linear && e.c != 0 {
			f.addLinearEdge(e, 0, w, sum)
		}
		return
	}
	el := logatan.Log1pRatio(l*(s+l), den)
	w.l[i] = el
	if want&field.WantErr != 0 {
		mag := r3.Norm(e.w)
		sum.size += mag * el
		if beside && !w.close[i] {
			sum.shaky += (mag + f.dense) * min(ra, rb) / math.Sqrt(p2)
		}
		if !f.linear {
			sum.behind += (mag + 2.5*vague*f.dense) * w.reach(e, i, el, p2) // w is a sum over faces
		}
	}
	if !f.linear {
		f.addUniformEdge(e, el, w, sum, w.close[i])
		return
	}
	if e.c != 0 {
		f.addLinearEdge(e, el, w, sum)
	}
}

// vague is the share of the largest density that the estimates add to every density: it bounds what rounding does to a
// small one, of a polarization that a pose has turned or of faces that nearly cancel at an edge.
const vague = 0.2

// linearShare is what is counted of the magnitudes of linear charge, which are many and of which each bound is wide.
const linearShare = 0.3

// reach returns the magnitude behind d L of edge i with the logarithm el, d the distance of x from its line: el times that of the
// vector to a vertex, or the distance itself where it is taken in pairs. Beside an edge the logarithm too feels the
// rounding of the vector, by |vector|/d.
func (w *facetRoom) reach(e *facetEdge, i int, el, p2 float64) float64 {
	if w.close[i] {
		return math.Sqrt(p2) * el
	}
	near := min(w.r[e.from], w.r[e.to])
	if p2 > 0 {
		return near * (el + 1)
	}
	return near * el
}

// distance2 returns the squared distance of x from the line of edge e, in pairs where x is close to the edge.
func (f *facets) distance2(e *facetEdge, w *facetRoom, sum *facetSums, i int) float64 {
	q := &f.faces[e.face[0]]
	c := &q.corners[e.corner[0]]
	k := e.from
	if w.r[e.to] < w.r[k] {
		k = e.to
	}
	a := w.a[k]
	d, h := r3.Dot(c.m, a), r3.Dot(q.n, a)
	p2 := d*d + h*h
	if p2 < 1e-4*e.length*e.length {
		w.close[i] = true
		ap := f.verts[k].Sub(sum.x)
		d, h = c.mp.Dot(ap).Value(), q.np.Dot(ap).Value()
		p2 = d*d + h*h
	}
	return p2
}

// addUniformEdge adds the terms m L and d L of uniform faces.
func (f *facets) addUniformEdge(e *facetEdge, el float64, w *facetRoom, sum *facetSums, close bool) {
	sum.g.X = math.FMA(e.w.X, el, sum.g.X)
	sum.g.Y = math.FMA(e.w.Y, el, sum.g.Y)
	sum.g.Z = math.FMA(e.w.Z, el, sum.g.Z)
	k := e.from
	if w.r[e.to] < w.r[k] {
		k = e.to
	}
	if !close {
		sum.phi = math.FMA(r3.Dot(e.w, w.a[k]), el, sum.phi)
		return
	}
	a := f.verts[k].Sub(sum.x)
	for j, fi := range e.face {
		if fi >= 0 {
			q := &f.faces[fi]
			sum.phi = math.FMA(q.sigma*q.corners[e.corner[j]].mp.Dot(a).Value(), el, sum.phi)
		}
	}
}

// addLinearEdge adds c K and c grad K.
func (f *facets) addLinearEdge(e *facetEdge, el float64, w *facetRoom, sum *facetSums) {
	a, b, ra, rb := w.a[e.from], w.a[e.to], w.r[e.from], w.r[e.to]
	s1, s2 := r3.Dot(e.t, a), r3.Dot(e.t, b)
	near, sn := a, s1
	if rb < ra {
		near, sn = b, s2
	}
	u := r3.Sub(r3.Scale(sn, e.t), near)
	p2 := r3.Dot(u, u)
	k := 0.5 * (s2*rb - s1*ra + p2*el)
	sum.phi += e.c * k
	dr := e.length * (s1 + s2) / (ra + rb) // rb - ra
	sum.g = r3.Sub(sum.g, r3.Scale(e.c, r3.Sub(r3.Scale(el, u), r3.Scale(dr, e.t))))
	if !sum.claims {
		return
	}
	sum.size += math.Abs(e.c) * (math.Sqrt(p2)*el + e.length)
	sum.behind += linearShare * math.Abs(e.c) * (math.Abs(s1)*ra + math.Abs(s2)*rb + p2*el)
}

// addFacet adds the solid angle of a face and, for linear charge, the rest of its terms.
func (f *facets) addFacet(q *facet, w *facetRoom, sum *facetSums, side field.Side) {
	ref := q.corners[0].from
	h := -r3.Dot(q.n, w.a[ref])
	omega, slack := 0.0, 0.0 // slack: magnitude of the vector that h is taken from
	if f.away(q, h, sum) {
		omega = q.fanAngle(h, w)
		slack = w.r[ref]
	} else {
		omega, h = f.edgeAngle(q, w, sum, side)
	}
	if !f.linear {
		sum.phi = math.FMA(-q.sigma*h, omega, sum.phi)
		so := q.sigma * omega
		sum.g.X = math.FMA(q.n.X, so, sum.g.X)
		sum.g.Y = math.FMA(q.n.Y, so, sum.g.Y)
		sum.g.Z = math.FMA(q.n.Z, so, sum.g.Z)
		if sum.claims {
			sum.size += math.Abs(q.sigma) * angleSize(omega)
			sum.behind += (math.Abs(q.sigma) + vague*f.dense) * (math.Abs(h)*angleSize(omega) + slack*math.Abs(omega))
		}
		return
	}
	sx := q.sigma - r3.Dot(q.gamma, w.a[q.ref])
	i0 := -h * omega
	slope := r3.Scale(omega, q.n)
	for k := range q.corners {
		c := &q.corners[k]
		el := w.l[c.edge]
		i0 = math.FMA(f.edgeDistance(c, w, sum), el, i0)
		slope = r3.Add(slope, r3.Scale(el, c.m))
	}
	sum.phi += (sx - 0.5*f.rho*h) * i0
	sum.g = r3.Add(sum.g, r3.Scale(sx, slope))
	sum.g = r3.Sub(sum.g, r3.Scale(i0, r3.Sub(q.gamma, r3.Scale(f.rho, q.n))))
	if sum.claims {
		f.sizeLinear(q, w, sum, sx, h, omega, slack, r3.Norm(slope))
	}
}

// angleSize returns the magnitude behind a solid angle.
func angleSize(omega float64) float64 { return min(2*math.Pi, math.Abs(omega)+4) }

// sizeLinear adds the magnitudes behind the terms of a face with linear charge.
func (f *facets) sizeLinear(q *facet, w *facetRoom, sum *facetSums, sx, h, omega, slack, slope float64) {
	angle := angleSize(omega)
	sum.size += math.Abs(q.sigma) * angle
	term, logs := math.Abs(h)*angle+slack*math.Abs(omega), 0.0 // behind I0
	for k := range q.corners {
		c := &q.corners[k]
		d := f.edgeDistance(c, w, sum)
		term += w.reach(&f.edges[c.edge], c.edge, w.l[c.edge], d*d)
		logs += w.l[c.edge]
	}
	steep := r3.Norm(q.gamma)
	loose := math.Abs(sx) + 0.5*(math.Abs(q.sigma)+steep*w.r[q.ref]) // sx may be a small difference
	sum.size += term*(steep+math.Abs(f.rho)) + loose*(slope+0.2*(logs+angle))
	sum.behind += linearShare * (loose + vague*f.dense + math.Abs(f.rho)*(math.Abs(h)+slack)) * term
}

// away reports whether x is so far from the face that the fan of triangles keeps its digits: outside 1.2 bounding
// radii, or 0.05 of one above the plane. Measured: 1e-15 there, where edges lose u/distance times 0.02.
func (f *facets) away(q *facet, h float64, sum *facetSums) bool {
	if math.Abs(h) > 0.05*q.radius {
		return true
	}
	d := r3.Sub(sum.x.Value(), q.centre)
	return r3.Dot(d, d) > 1.44*q.radius*q.radius
}

// fanAngle returns the solid angle as one arctangent of the product over the triangles of the fan [VanOosterom1983].
func (q *facet) fanAngle(h float64, w *facetRoom) float64 {
	re, im, turns := 1.0, 0.0, 0.0
	for k, t := range q.fan {
		a, b, c := w.a[t[0]], w.a[t[1]], w.a[t[2]]
		ra, rb, rc := w.r[t[0]], w.r[t[1]], w.r[t[2]]
		den := (ra*rb+r3.Dot(a, b))*rc + r3.Dot(a, c)*rb + r3.Dot(b, c)*ra
		re, im, turns = turn(re, im, den, h*q.twice[k], turns)
	}
	return 2 * (logatan.Atan2(im, re) + turns)
}

// edgeAngle returns the solid angle edge by edge [Wilton1984], with the height taken in pairs, and the height. A point
// within the tolerance of the face gets the angle of the side that was asked for.
func (f *facets) edgeAngle(q *facet, w *facetRoom, sum *facetSums, side field.Side) (omega, height float64) {
	h := -q.np.Dot(f.verts[q.corners[0].from].Sub(sum.x)).Value()
	ah := math.Abs(h)
	re, im, turns := 1.0, 0.0, 0.0
	inner := true // not on an edge line, such as one that coplanar faces share
	for k := range q.corners {
		c := &q.corners[k]
		t := r3.Scale(c.sign, f.edges[c.edge].t)
		d := f.edgeDistance(c, w, sum)
		s1, s2 := r3.Dot(t, w.a[c.from]), r3.Dot(t, w.a[c.to])
		p2 := d*d + ah*ah
		if math.Abs(d) <= sum.tol {
			inner = false
		}
		if p2 == 0 || d == 0 {
			continue
		}
		r1, r2 := w.r[c.from], w.r[c.to]
		p, pp := p2+ah*r1, p2+ah*r2
		zr := p*pp + d*d*s1*s2
		var zi float64
		if s1*s2 > 0 { // divided by p2, which is common to both parts
			l := f.edges[c.edge].length
			zi = d * l * (1 + ah*(s1+s2)/(s2*r1+s1*r2))
			zr = zr / p2
		} else {
			zi = d * (s2*p - s1*pp)
		}
		re, im, turns = turn(re, im, zr, zi, turns)
	}
	total := logatan.Atan2(im, re) + turns
	if ah > sum.tol || total <= 1 {
		return math.Copysign(total, h), h
	}
	sum.status = max(sum.status, field.OnFace)
	full := 2 * math.Pi
	if !inner {
		full = total
	}
	omega = math.Copysign(1, h) * (total - full) // what is the same on both sides
	switch side {
	case field.Inside:
		omega -= full
	case field.Outside:
		omega += full
	}
	return omega, 0
}

// edgeDistance returns m.a, the distance of x from the edge line in the plane, positive inside.
func (f *facets) edgeDistance(c *facetCorner, w *facetRoom, sum *facetSums) float64 {
	k := c.from
	if w.r[c.to] < w.r[k] {
		k = c.to
	}
	if w.close[c.edge] {
		return c.mp.Dot(f.verts[k].Sub(sum.x)).Value()
	}
	return r3.Dot(c.m, w.a[k])
}

// turn multiplies re + i im by the factor zr + i zi, whose argument lies between -pi and pi with the sign of zi, and
// keeps count of full turns; the product is kept in range by powers of two.
func turn(re, im, zr, zi, turns float64) (float64, float64, float64) {
	nr := re*zr - im*zi
	ni := re*zi + im*zr
	switch {
	case zi > 0 && im >= 0 && ni < 0:
		turns += 2 * math.Pi
	case zi < 0 && im < 0 && ni >= 0:
		turns -= 2 * math.Pi
	}
	if m := max(math.Abs(nr), math.Abs(ni)); m < 0x1p-200 {
		nr, ni = nr*0x1p400, ni*0x1p400
	} else if m > 0x1p200 {
		nr, ni = nr*0x1p-400, ni*0x1p-400
	}
	return nr, ni, turns
}

// finish scales the sums and attaches the estimates.
func (f *facets) finish(sum *facetSums, want field.Want) field.Value {
	const k = over4P
	v := field.Value{Phi: k * sum.phi * f.unit, G: r3.Scale(k, sum.g), Status: sum.status}
	if want&field.WantErr != 0 {
		const u = 0x1p-53
		v.ErrG = k * u * (6*sum.size + 8*sum.shaky)
		v.ErrPhi = k * u * 5 * sum.behind * f.unit // measured, as linearShare: the triples of package verify
	}
	if sum.status == field.OnEdge {
		nan := math.NaN()
		v.G = r3.Vec{X: nan, Y: nan, Z: nan}
		v.ErrG = math.Inf(1)
	}
	return v
}
