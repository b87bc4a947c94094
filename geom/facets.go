package geom

import (
	"math"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// facets is a polyhedron prepared for many questions. It decides as Polyhedron.Locate does: plain arithmetic answers
// where its error bound leaves no doubt, the same arithmetic in pairs answers elsewhere.
//
// Along the ray of Locate, points keep the place of their shadow. In the coordinates (shadow, z) the ray runs along z,
// so one tree of boxes finds both the faces that a point may touch and those that its ray may meet.
type facets struct {
	extent
	body    Polyhedron
	reach   float64  // the largest magnitude of a coordinate
	shadows []r3.Vec // of the vertices: the shadow and z
	faces   []facet  // in the order of the leaves
	tree    []branch
}

// facet is a face of facets.
type facet struct {
	preparedPlane
	box    r3.Box // bounds of the vertices in (shadow, z)
	number int    // of the face
	rise   int    // sign of the normal along the ray
}

// newFacets prepares a polyhedron.
func newFacets(body Polyhedron) *facets {
	p := &facets{extent: extentOf(body.Bounds()), body: body, reach: largest(body.Vertices)}
	p.shadows = make([]r3.Vec, len(body.Vertices))
	all := loop{vertices: body.Vertices, low: body.Low}
	for i, v := range body.Vertices {
		s := shadow(all.at(i))
		p.shadows[i] = r3.Vec{X: s.u.Value(), Y: s.v.Value(), Z: v.Z}
	}
	p.faces = make([]facet, len(body.Loops))
	for f, index := range body.Loops {
		l := body.face(f)
		box := nothing()
		for _, i := range index {
			box = include(box, p.shadows[i])
		}
		p.faces[f] = facet{preparedPlane: l.prepare(), box: box, number: f, rise: rise(l.area()).Sign()}
	}
	p.grow(0, len(p.faces))
	return p
}

// probe is a point with what the walk over the faces needs.
type probe struct {
	x      pair.Vec
	v      r3.Vec // x rounded
	tol    float64
	u, w   float64 // shadow of v
	margin float64 // far above the rounding of a plain shadow
	window r3.Box  // around the point in (shadow, z), wider than tol and margin
}

func (p *facets) probe(x pair.Vec, v r3.Vec, tol float64) probe {
	q := probe{x: x, v: v, tol: tol, u: v.X + slantX*v.Z, w: v.Y + slantY*v.Z}
	q.margin = grain * (p.reach + r3.Norm(v))
	wide := 2*tol + q.margin // a step of tol moves the shadow by up to 1.4 tol
	q.window.Min = r3.Vec{X: q.u - wide, Y: q.w - wide, Z: v.Z - wide}
	q.window.Max = r3.Vec{X: q.u + wide, Y: q.w + wide, Z: v.Z + wide}
	return q
}

// misses reports whether the point and the ray up from it are beyond doubt off a box of (shadow, z).
func (q *probe) misses(b *r3.Box) bool {
	return b.Max.X < q.window.Min.X || b.Min.X > q.window.Max.X ||
		b.Max.Y < q.window.Min.Y || b.Min.Y > q.window.Max.Y ||
		b.Max.Z < q.window.Min.Z
}

// Locate tells where x lies.
func (p *facets) Locate(x pair.Vec, slack float64) Place {
	v := x.Value()
	tol := p.tolerance(v, slack)
	if beyond(p.box, v, tol) {
		return outside()
	}
	q := p.probe(x, v, tol)
	in, doubt := false, false
	var met touched
	var w walk
	for f := p.next(&w, &q); f != nil; f = p.next(&w, &q) {
		h := f.height(v)
		if c := p.touch(f, &q, h); c != apart {
			met.add(f, c)
		}
		hidden, sure := p.hides(f, &q, h)
		in, doubt = in != hidden, doubt || !sure
	}
	if met.count > 0 {
		return p.placeOn(&q, &met)
	}
	if doubt {
		in = in != p.settle(&q)
	}
	if in {
		return inside()
	}
	return outside()
}

// settle reports whether the ray from the point meets an odd number of the faces about which hides is not sure.
func (p *facets) settle(q *probe) bool {
	in, at := false, shadow(q.x)
	var w walk
	for f := p.next(&w, q); f != nil; f = p.next(&w, q) {
		if _, sure := p.hides(f, q, f.height(q.v)); !sure {
			in = in != p.body.face(f.number).hides(q.x, at, q.v)
		}
	}
	return in
}

// touched are the faces that a point touches.
type touched struct {
	count int
	first *facet // the one with the lowest number
	last  *facet // the one with the highest number that has the point within, nil if none
}

func (m *touched) add(f *facet, c contact) {
	m.count++
	if m.first == nil || f.number < m.first.number {
		m.first = f
	}
	if c == within && (m.last == nil || f.number > m.last.number) {
		m.last = f
	}
}

// placeOn returns the place of a point on the surface, as Polyhedron.locateOn does: an edge if a normal differs from
// that of the first face, else the last face that has the point within, else the first.
func (p *facets) placeOn(q *probe, met *touched) Place {
	first := met.first
	var w walk
	for f := p.next(&w, q); f != nil && met.count > 1; f = p.next(&w, q) {
		if r3.Norm(r3.Sub(f.out, first.out)) > alike && p.touch(f, q, f.height(q.v)) != apart {
			return onEdge()
		}
	}
	place := Place{Region: On, Face: first.number, Normal: first.out}
	if met.last != nil {
		place.Face = met.last.number
	}
	return place
}

// touch tells whether the point is on the face or its rim; h is its height.
func (p *facets) touch(f *facet, q *probe, h float64) contact {
	if f.clear(h, q.tol) || f.box.Min.Z > q.window.Max.Z {
		return apart
	}
	return p.body.face(f.number).touchIn(f.plane, q.x, q.tol)
}

// hides reports whether the ray from the point meets the face, in plain arithmetic, and whether that is sure; h is the
// height of the point. Without being sure it reports false.
func (p *facets) hides(f *facet, q *probe, h float64) (yes, sure bool) {
	in, sure := p.shades(f, q)
	switch {
	case !sure:
		return false, false
	case !in || q.v.Z > f.box.Max.Z:
		return false, true
	case q.v.Z < f.box.Min.Z:
		return true, true
	case math.Abs(h) > 4*q.tol: // the sign of h is that of the height
		return h > 0 && f.rise < 0 || h < 0 && f.rise > 0, true
	}
	return false, false
}

// shades tells whether the shadow of the point is in that of the face, in plain arithmetic, and whether that is sure.
//
// With coordinates up to M, the shadow of a vertex errs by 1.4 u M, that of the point, whose low part is left out, by
// 3.2 u |v|, and their difference by 1.4 u (M + |v|) more: below 0.3 margin, as crosses wants.
func (p *facets) shades(f *facet, q *probe) (in, sure bool) {
	index := p.body.Loops[f.number]
	s := &p.shadows[index[len(index)-1]]
	ax, ay := s.X-q.u, s.Y-q.w
	for _, i := range index {
		s = &p.shadows[i]
		bx, by := s.X-q.u, s.Y-q.w
		c, sure := crosses(ax, ay, bx, by, q.margin)
		if !sure {
			return false, false
		}
		in = in != c
		ax, ay = bx, by
	}
	return in, true
}
