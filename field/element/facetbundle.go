package element

import (
	"math"

	"example.com/boundpole/field/internal/logatan"
	"gonum.org/v1/gonum/spatial/r3"
)

// bundle is edges (or faces) of a uniformly polarized body whose vectors w (or sigma n) are the same but for the sign: their
// logarithms become one logarithm of a product, their solid angles one arctangent.
type bundle struct {
	v      r3.Vec
	member []int
	plus   []bool
}

// mostBundled is how many factors a product may have: lengths lie between 0.05 and 10 units, so 8 of them stay in range.
const mostBundled = 8

// setBundles groups edges and faces. Only uniform charge can be grouped.
func (f *facets) setBundles() {
	if f.linear {
		return
	}
	for i := range f.edges {
		if e := &f.edges[i]; e.w != (r3.Vec{}) {
			f.edgeBundles = join(f.edgeBundles, e.w, i, f.dense)
		}
	}
	for i := range f.faces {
		if q := &f.faces[i]; q.charged {
			f.faceBundles = join(f.faceBundles, r3.Scale(q.sigma, q.n), i, f.dense)
		}
	}
}

// join adds member i with vector v to the bundle that has it, or makes one.
func join(all []bundle, v r3.Vec, i int, size float64) []bundle {
	for k := range all {
		b := &all[k]
		if len(b.member) == mostBundled {
			continue
		}
		same := r3.Norm(r3.Sub(v, b.v)) <= 4*0x1p-53*size
		if same || r3.Norm(r3.Add(v, b.v)) <= 4*0x1p-53*size {
			b.member, b.plus = append(b.member, i), append(b.plus, same)
			return all
		}
	}
	return append(all, bundle{v: v, member: []int{i}, plus: []bool{true}})
}

// bundled returns 4 pi g where x is away from every charged face; ok is false elsewhere.
func (f *facets) bundled(w *facetRoom, sum *facetSums) (g r3.Vec, ok bool) {
	if f.edgeBundles == nil {
		return g, false
	}
	x := sum.x.Value()
	for k := range f.faceBundles {
		for _, i := range f.faceBundles[k].member {
			q := &f.faces[i]
			if h := r3.Dot(q.n, w.a[q.ref]); math.Abs(h) <= 0.05*q.radius {
				d := r3.Sub(x, q.centre)
				if r3.Dot(d, d) <= 1.44*q.radius*q.radius {
					return g, false
				}
			}
		}
	}
	for k := range f.edgeBundles {
		b := &f.edgeBundles[k]
		num, den := 1.0, 1.0
		for j, i := range b.member {
			n, d := f.edgeQuotient(&f.edges[i], w)
			if b.plus[j] {
				num, den = num*(n+d), den*d
			} else {
				num, den = num*d, den*(n+d)
			}
		}
		l := logatan.LogRatio(num, den)
		g.X, g.Y, g.Z = math.FMA(b.v.X, l, g.X), math.FMA(b.v.Y, l, g.Y), math.FMA(b.v.Z, l, g.Z)
	}
	for k := range f.faceBundles {
		b := &f.faceBundles[k]
		o := f.bundleAngle(b, w)
		g.X, g.Y, g.Z = math.FMA(b.v.X, o, g.X), math.FMA(b.v.Y, o, g.Y), math.FMA(b.v.Z, o, g.Z)
	}
	return g, true
}

// edgeQuotient returns n and d with L = log(1 + n/d).
func (f *facets) edgeQuotient(e *facetEdge, w *facetRoom) (n, d float64) {
	a, b, ra, rb := &w.a[e.from], &w.a[e.to], w.r[e.from], w.r[e.to]
	l := e.length
	ab := math.FMA(a.X, b.X, math.FMA(a.Y, b.Y, float64(a.Z*b.Z)))
	n = l * (ra + rb + l)
	if ab >= 0 {
		return n, math.FMA(ra, rb, ab)
	}
	cx, cy, cz := a.Y*b.Z-a.Z*b.Y, a.Z*b.X-a.X*b.Z, a.X*b.Y-a.Y*b.X
	return n, (cx*cx + cy*cy + cz*cz) / (ra*rb - ab)
}

// bundleAngle returns the signed sum of the solid angles of a bundle of faces.
func (f *facets) bundleAngle(b *bundle, w *facetRoom) float64 {
	re, im, turns := 1.0, 0.0, 0.0
	for j, i := range b.member {
		q := &f.faces[i]
		h := -r3.Dot(q.n, w.a[q.ref])
		if !b.plus[j] {
			h = -h
		}
		re, im, turns = q.fanFactor(h, w, re, im, turns)
	}
	return 2 * (logatan.Atan2(im, re) + turns)
}

// fanFactor multiplies the factors of the face's triangles into re + i im.
func (q *facet) fanFactor(h float64, w *facetRoom, re, im, turns float64) (float64, float64, float64) {
	v0 := q.fan[0][0]
	a, ra := &w.a[v0], w.r[v0]
	i := q.fan[0][1]
	b, rb := &w.a[i], w.r[i]
	ab := a.X*b.X + a.Y*b.Y + a.Z*b.Z
	for k := range q.fan {
		i := q.fan[k][2]
		c, rc := &w.a[i], w.r[i]
		ac := a.X*c.X + a.Y*c.Y + a.Z*c.Z
		bc := b.X*c.X + b.Y*c.Y + b.Z*c.Z
		num := h * q.twice[k]
		den := (ra*rb+ab)*rc + ac*rb + bc*ra
		re, im, turns = turn(re, im, den, num, turns)
		b, rb, ab = c, rc, ac
	}
	return re, im, turns
}
