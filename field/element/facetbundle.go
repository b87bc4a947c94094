package element

import (
	"math"

	"example.com/boundpole/field/internal/logatan"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// bundles is the field of a uniformly polarized body away from its charged faces, prepared: edges whose vectors w are the same
// but for the sign share one logarithm of a product, faces whose vectors sigma n are share one arctangent. Products of scalar
// products serve edges and faces alike.
type bundles struct {
	edges []bundledEdge // all edges of charged faces
	logs  []edgeBundle
	fans  []faceBundle
}

type bundledEdge struct {
	from, to int32
	length   float64
}

type edgeBundle struct {
	v      r3.Vec
	member []int32 // indices of bundles.edges
	minus  []int32 // those whose vector is minus v
}

type faceBundle struct {
	v     r3.Vec
	faces []fanFace
}

// fanFace is a face as a fan of triangles from its first vertex.
type fanFace struct {
	n       r3.Vec
	sign    float64 // -1 where sigma n is minus the vector of the bundle
	close   float64 // the fan keeps its digits beyond this height
	centre  r3.Vec
	around2 float64 // or beyond this squared distance from the centre
	verts   []int32
	edges   []int32 // edge k runs from vertex k on; indices of bundles.edges
	twice   []float64
	four    bool // a quadrangle; its numbers stand here again, side by side
	v, e    [4]int32
	t       [2]float64
}

// mostBundled is how many factors a product may have: lengths lie between 0.05 and 10 units, so 8 of them stay in range.
const mostBundled = 8

// setBundles groups edges and faces. Only uniform charge can be grouped.
func (f *facets) setBundles() {
	if f.linear {
		return
	}
	index := make([]int32, len(f.edges))
	for i := range f.edges {
		e := &f.edges[i]
		index[i] = int32(len(f.bundled.edges))
		if e.face[0] >= 0 && f.faces[e.face[0]].charged || e.face[1] >= 0 && f.faces[e.face[1]].charged {
			f.bundled.edges = append(f.bundled.edges, bundledEdge{int32(e.from), int32(e.to), e.length})
		}
	}
	for i := range f.edges {
		if e := &f.edges[i]; e.w != (r3.Vec{}) {
			f.bundled.joinEdge(e.w, index[i], f.dense)
		}
	}
	for i := range f.faces {
		if q := &f.faces[i]; q.charged {
			f.bundled.joinFace(r3.Scale(q.sigma, q.n), q, index, f.dense)
		}
	}
}

// sameVector reports whether v is w (+1) or minus w (-1), but for rounding; 0 if neither.
func sameVector(v, w r3.Vec, size float64) float64 {
	switch {
	case r3.Norm(r3.Sub(v, w)) <= 4*0x1p-53*size:
		return 1
	case r3.Norm(r3.Add(v, w)) <= 4*0x1p-53*size:
		return -1
	}
	return 0
}

// joinEdge adds an edge to the bundle that has its vector, or makes one.
func (b *bundles) joinEdge(v r3.Vec, i int32, size float64) {
	for k := range b.logs {
		l := &b.logs[k]
		switch s := sameVector(v, l.v, size); {
		case s == 0 || len(l.member)+len(l.minus) == mostBundled:
			continue
		case s > 0:
			l.member = append(l.member, i)
		default:
			l.minus = append(l.minus, i)
		}
		return
	}
	b.logs = append(b.logs, edgeBundle{v: v, member: []int32{i}})
}

// joinFace adds a face to the bundle that has its vector, or makes one.
func (b *bundles) joinFace(v r3.Vec, q *facet, index []int32, size float64) {
	face := fanFace{n: q.n, sign: 1, close: 0.05 * q.radius, centre: q.centre, around2: 1.44 * q.radius * q.radius, twice: q.twice}
	for k := range q.corners {
		face.verts = append(face.verts, int32(q.corners[k].from))
		face.edges = append(face.edges, index[q.corners[k].edge])
	}
	if len(face.verts) == 4 {
		face.four = true
		copy(face.v[:], face.verts)
		copy(face.e[:], face.edges)
		copy(face.t[:], face.twice)
	}
	for k := range b.fans {
		l := &b.fans[k]
		if s := sameVector(v, l.v, size); s != 0 && len(l.faces) < mostBundled {
			face.sign = s
			l.faces = append(l.faces, face)
			return
		}
	}
	b.fans = append(b.fans, faceBundle{v, []fanFace{face}})
}

// value returns 4 pi g where x is away from every charged face; ok is false elsewhere. It uses w.l for scalar products.
func (b *bundles) value(w *facetRoom, at *pair.Vec) (g r3.Vec, ok bool) {
	if b.logs == nil {
		return g, false
	}
	var room [mostBundled]float64
	heights := room[:0]
	for k := range b.fans {
		for j := range b.fans[k].faces {
			q := &b.fans[k].faces[j]
			a := &w.a[q.verts[0]]
			h := q.n.X*a.X + q.n.Y*a.Y + q.n.Z*a.Z
			if math.Abs(h) <= q.close {
				dx, dy, dz := at.X.Hi-q.centre.X, at.Y.Hi-q.centre.Y, at.Z.Hi-q.centre.Z
				if dx*dx+dy*dy+dz*dz <= q.around2 {
					return g, false
				}
			}
			if len(heights) < len(room) {
				heights = append(heights, -q.sign*h)
			}
		}
	}
	dots := w.l[:len(b.edges)]
	for i := range b.edges {
		p, q := &w.a[b.edges[i].from], &w.a[b.edges[i].to]
		dots[i] = math.FMA(p.X, q.X, math.FMA(p.Y, q.Y, float64(p.Z*q.Z)))
	}
	for k := range b.logs {
		l := b.logarithm(&b.logs[k], w, dots)
		v := &b.logs[k].v
		g.X, g.Y, g.Z = math.FMA(v.X, l, g.X), math.FMA(v.Y, l, g.Y), math.FMA(v.Z, l, g.Z)
	}
	for k := range b.fans {
		n := min(len(b.fans[k].faces), len(heights))
		o := b.fans[k].angle(w, dots, heights[:n])
		heights = heights[n:]
		v := &b.fans[k].v
		g.X, g.Y, g.Z = math.FMA(v.X, o, g.X), math.FMA(v.Y, o, g.Y), math.FMA(v.Z, o, g.Z)
	}
	return g, true
}

// logarithm returns the signed sum of the logarithms log(1 + n/d) of a bundle's edges.
func (b *bundles) logarithm(l *edgeBundle, w *facetRoom, dots []float64) float64 {
	num, den := 1.0, 1.0
	for _, i := range l.member {
		d, nd := b.edges[i].quotient(w, dots[i])
		num, den = num*nd, den*d
	}
	for _, i := range l.minus {
		d, nd := b.edges[i].quotient(w, dots[i])
		num, den = num*d, den*nd
	}
	return logatan.LogRatio(num, den)
}

// quotient returns d and d + n of an edge with the scalar product ab of its ends.
func (e *bundledEdge) quotient(w *facetRoom, ab float64) (d, nd float64) {
	ra, rb := w.r[e.from], w.r[e.to]
	if ab < 0 {
		return e.beside(w, ab)
	}
	d = ra*rb + ab
	return d, d + e.length*(ra+rb+e.length)
}

// beside is quotient where x lies between the ends.
func (e *bundledEdge) beside(w *facetRoom, ab float64) (d, nd float64) {
	ra, rb := w.r[e.from], w.r[e.to]
	p, q := &w.a[e.from], &w.a[e.to]
	cx, cy, cz := p.Y*q.Z-p.Z*q.Y, p.Z*q.X-p.X*q.Z, p.X*q.Y-p.Y*q.X
	d = (cx*cx + cy*cy + cz*cz) / (ra*rb - ab)
	return d, d + e.length*(ra+rb+e.length)
}

// angle returns the signed sum of the solid angles of a bundle of faces; heights holds those of the first of them.
func (l *faceBundle) angle(w *facetRoom, dots, heights []float64) float64 {
	re, im, turns := 1.0, 0.0, 0.0
	for j := range l.faces {
		q := &l.faces[j]
		var h float64
		if j < len(heights) {
			h = heights[j]
		} else {
			a := &w.a[q.verts[0]]
			h = -q.sign * (q.n.X*a.X + q.n.Y*a.Y + q.n.Z*a.Z)
		}
		if !q.four {
			re, im, turns = q.turn(h, w, dots, re, im, turns)
			continue
		}
		fr, fi := q.quadrangle(h, w, dots)
		if fr >= 0 && re >= 0 { // less than a quarter turn each: no full turn
			re, im = re*fr-im*fi, re*fi+im*fr
		} else {
			re, im, turns = q.turn(h, w, dots, re, im, turns)
		}
	}
	return 2 * (logatan.Atan2(im, re) + turns)
}

// quadrangle returns the product of the factors of the two triangles of a face with four corners; the real part is negative
// where an argument may be more than a quarter turn.
func (q *fanFace) quadrangle(h float64, w *facetRoom, dots []float64) (re, im float64) {
	v, r := &q.v, w.r
	r0, r1, r2, r3 := r[v[0]], r[v[1]], r[v[2]], r[v[3]]
	d01, d12, d23, d30 := dots[q.e[0]], dots[q.e[1]], dots[q.e[2]], dots[q.e[3]]
	a, c := &w.a[v[0]], &w.a[v[2]]
	d02 := math.FMA(a.X, c.X, math.FMA(a.Y, c.Y, float64(a.Z*c.Z)))
	t1 := (r0*r1+d01)*r2 + d02*r1 + d12*r0
	t2 := (r0*r2+d02)*r3 + d30*r2 + d23*r0
	if t1 < 0 || t2 < 0 {
		return -1, 0
	}
	n1, n2 := h*q.t[0], h*q.t[1]
	return t1*t2 - n1*n2, t1*n2 + n1*t2
}

// turn multiplies the factors of a face's triangles one by one into re + i im, counting turns.
func (q *fanFace) turn(h float64, w *facetRoom, dots []float64, re, im, turns float64) (float64, float64, float64) {
	v0 := q.verts[0]
	a, ra := &w.a[v0], w.r[v0]
	rb, ab := w.r[q.verts[1]], dots[q.edges[0]]
	for k := range q.twice {
		vc := q.verts[k+2]
		c, rc, bc := &w.a[vc], w.r[vc], dots[q.edges[k+1]]
		ac := math.FMA(a.X, c.X, math.FMA(a.Y, c.Y, float64(a.Z*c.Z)))
		num := h * q.twice[k]
		den := (ra*rb+ab)*rc + ac*rb + bc*ra
		re, im, turns = turn(re, im, den, num, turns)
		rb, ab = rc, ac
	}
	return re, im, turns
}
