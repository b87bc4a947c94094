package element

import (
	"math"

	"example.com/boundpole/field/internal/logatan"
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
	plus   []bool
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
		if s := sameVector(v, l.v, size); s != 0 && len(l.member) < mostBundled {
			l.member, l.plus = append(l.member, i), append(l.plus, s > 0)
			return
		}
	}
	b.logs = append(b.logs, edgeBundle{v, []int32{i}, []bool{true}})
}

// joinFace adds a face to the bundle that has its vector, or makes one.
func (b *bundles) joinFace(v r3.Vec, q *facet, index []int32, size float64) {
	face := fanFace{n: q.n, sign: 1, close: 0.05 * q.radius, centre: q.centre, around2: 1.44 * q.radius * q.radius, twice: q.twice}
	for k := range q.corners {
		face.verts = append(face.verts, int32(q.corners[k].from))
		face.edges = append(face.edges, index[q.corners[k].edge])
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
func (b *bundles) value(w *facetRoom, sum *facetSums) (g r3.Vec, ok bool) {
	if b.logs == nil {
		return g, false
	}
	x := r3.Vec{X: sum.x.X.Hi, Y: sum.x.Y.Hi, Z: sum.x.Z.Hi}
	for k := range b.fans {
		for j := range b.fans[k].faces {
			q := &b.fans[k].faces[j]
			a := &w.a[q.verts[0]]
			if h := q.n.X*a.X + q.n.Y*a.Y + q.n.Z*a.Z; math.Abs(h) <= q.close {
				dx, dy, dz := x.X-q.centre.X, x.Y-q.centre.Y, x.Z-q.centre.Z
				if dx*dx+dy*dy+dz*dz <= q.around2 {
					return g, false
				}
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
		o := b.fans[k].angle(w, dots)
		v := &b.fans[k].v
		g.X, g.Y, g.Z = math.FMA(v.X, o, g.X), math.FMA(v.Y, o, g.Y), math.FMA(v.Z, o, g.Z)
	}
	return g, true
}

// logarithm returns the signed sum of the logarithms log(1 + n/d) of a bundle's edges.
func (b *bundles) logarithm(l *edgeBundle, w *facetRoom, dots []float64) float64 {
	num, den := 1.0, 1.0
	for j, i := range l.member {
		e := &b.edges[i]
		ra, rb, ab := w.r[e.from], w.r[e.to], dots[i]
		n := e.length * (ra + rb + e.length)
		d := math.FMA(ra, rb, ab)
		if ab < 0 {
			p, q := &w.a[e.from], &w.a[e.to]
			cx, cy, cz := p.Y*q.Z-p.Z*q.Y, p.Z*q.X-p.X*q.Z, p.X*q.Y-p.Y*q.X
			d = (cx*cx + cy*cy + cz*cz) / (ra*rb - ab)
		}
		if l.plus[j] {
			num, den = num*(n+d), den*d
		} else {
			num, den = num*d, den*(n+d)
		}
	}
	return logatan.LogRatio(num, den)
}

// angle returns the signed sum of the solid angles of a bundle of faces.
func (l *faceBundle) angle(w *facetRoom, dots []float64) float64 {
	re, im, turns := 1.0, 0.0, 0.0
	for j := range l.faces {
		q := &l.faces[j]
		a := &w.a[q.verts[0]]
		h := -q.sign * (q.n.X*a.X + q.n.Y*a.Y + q.n.Z*a.Z)
		fr, fi, small := q.factor(h, w, dots)
		if small {
			re, im, turns = turn(re, im, fr, fi, turns)
			continue
		}
		re, im, turns = q.turn(h, w, dots, re, im, turns)
	}
	return 2 * (logatan.Atan2(im, re) + turns)
}

// factor returns the product of the factors of a face's triangles; small is false where an argument may pass pi, which takes
// more than two triangles of more than a quarter turn.
func (q *fanFace) factor(h float64, w *facetRoom, dots []float64) (re, im float64, small bool) {
	if len(q.twice) > 2 {
		return 0, 0, false
	}
	v0 := q.verts[0]
	a, ra := &w.a[v0], w.r[v0]
	rb, ab := w.r[q.verts[1]], dots[q.edges[0]]
	re, im = 1, 0
	last := len(q.twice) - 1
	for k := range q.twice {
		vc := q.verts[k+2]
		rc, bc := w.r[vc], dots[q.edges[k+1]]
		var ac float64
		if k == last {
			ac = dots[q.edges[k+2]]
		} else {
			c := &w.a[vc]
			ac = math.FMA(a.X, c.X, math.FMA(a.Y, c.Y, float64(a.Z*c.Z)))
		}
		num := h * q.twice[k]
		den := (ra*rb+ab)*rc + ac*rb + bc*ra
		if den < 0 {
			return 0, 0, false
		}
		re, im = re*den-im*num, re*num+im*den
		rb, ab = rc, ac
	}
	return re, im, true
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
