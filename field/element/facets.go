package element

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// facets is charge on plane faces that share vertices and edges, linear over each face, with uniform volume charge
// between them: what Polygon and Polyhedron have in common.
//
// With L the integral of 1/R along an edge, K that of R, d and h the distances of x from the edge line (in the plane)
// and from the plane, m the outward normal of the edge in the plane and Omega the solid angle [Wilton1984]:
//
//	I0_f  = sum_k d L - h Omega,   grad I0_f = -(sum_k m L + n Omega)
//	4 pi phi = sum_f (sigma_f(x) - rho h_f/2) I0_f + sum_e c_e K_e
//	4 pi g   = sum_f [ sigma_f(x) (sum_k m L + n Omega) - (gamma_f - rho n_f) I0_f ] - sum_e c_e grad K_e
//
// sigma_f(x) is the density continued to the foot of x on the plane, gamma_f its gradient, c_e the sum of gamma.m over
// the faces at the edge. L and K belong to the edge, so neighbouring faces share them.
//
// Accuracy comes from three things. Edge logarithms have one formula without cancellation. The solid angle is a product
// of one complex number an edge near the face, of one a triangle of its fan away from it [VanOosterom1983]: each loses
// digits in the domain of the other. And a, d and h are taken in pairs of float64 where x is within 1e-2 lengths of an
// edge, because there the rounding of the difference x - vertex would be amplified by length/distance.
type facets struct {
	unit   float64 // power of two near the size; everything below is in this unit
	per    float64 // 1/unit
	size   float64 // bounding radius about centre
	centre r3.Vec
	bounds r3.Box  // in the caller's unit
	extent float64 // |centre| + half diagonal, in the caller's unit
	verts  []pair.Vec
	edges  []facetEdge
	faces  []facet
	rho    float64
	linear bool    // some gamma or rho is not zero
	dense  float64 // largest |sigma| on a face

	bundled bundles
	exact   bool // no vertex has a low part
}

// facetEdge is an edge and what it contributes whatever the position of x.
type facetEdge struct {
	from, to int
	length   float64
	t        r3.Vec
	w        r3.Vec  // sum of sigma m over its faces (uniform charge)
	c        float64 // sum of gamma.m over its faces
	live     bool    // the field is infinite on it
	face     [2]int  // faces at the edge, -1 for none
	corner   [2]int  // its place in the corners of those faces
}

// facet is one plane face.
type facet struct {
	n       r3.Vec
	np      pair.Vec
	sigma   float64 // density at vertex ref
	gamma   r3.Vec  // gradient of the density, in the plane
	ref     int
	corners []facetCorner
	fan     [][3]int  // triangles from the first vertex
	twice   []float64 // their signed double areas
	centre  r3.Vec
	radius  float64
	charged bool
}

// facetCorner is an edge seen from a face, in the sense that runs round the face.
type facetCorner struct {
	edge     int
	from, to int
	sign     float64
	m        r3.Vec
	mp       pair.Vec
}

// facetSpec is one face to be built: vertex indices counter-clockwise about the normal and the density at a point.
type facetSpec struct {
	loop    []int
	density func(x r3.Vec) float64 // at a vertex, caller's unit
	gamma   r3.Vec                 // gradient of the density per caller's length, any direction
}

// newFacets builds the shared geometry. Vertices are in the caller's unit; what Check of the shape demands is assumed.
func newFacets(verts []pair.Vec, specs []facetSpec, rho float64) *facets {
	f := &facets{bounds: boxOf(verts), rho: rho}
	half := r3.Scale(0.5, r3.Sub(f.bounds.Max, f.bounds.Min))
	f.extent = geom.OnTolerance(f.bounds, r3.Vec{}, 0) / (4 * 0x1p-53)
	f.unit = math.Ldexp(1, math.Ilogb(r3.Norm(half)))
	f.per = 1 / f.unit
	s := f.per
	f.rho *= f.unit
	f.centre = r3.Scale(0.5*s, r3.Add(f.bounds.Min, f.bounds.Max))
	c := pair.VecOf(f.centre)
	f.exact = true
	for _, v := range verts {
		f.exact = f.exact && v.X.Lo == 0 && v.Y.Lo == 0 && v.Z.Lo == 0
		w := pair.Vec{X: v.X.Scale(s), Y: v.Y.Scale(s), Z: v.Z.Scale(s)}
		f.verts = append(f.verts, w)
		f.size = max(f.size, r3.Norm(w.Sub(c).Value()))
	}
	f.size *= 1 + 0x1p-50
	seen := map[[2]int]int{}
	for _, spec := range specs {
		f.addFace(spec, seen)
	}
	for i := range f.edges {
		f.finishEdge(&f.edges[i])
	}
	f.setBundles()
	return f
}

// addFace builds one face, with the edges that no face before it has.
func (f *facets) addFace(spec facetSpec, seen map[[2]int]int) {
	q := facet{ref: spec.loop[0], np: newell(f.verts, spec.loop)}
	q.n = q.np.Value()
	q.sigma = spec.density(r3.Scale(f.unit, f.verts[q.ref].Value()))
	g := r3.Scale(f.unit, spec.gamma)
	q.gamma = r3.Sub(g, r3.Scale(r3.Dot(g, q.n), q.n))
	if r3.Norm(q.gamma) <= 4*0x1p-53*r3.Norm(g) {
		q.gamma = r3.Vec{}
	}
	q.charged = q.sigma != 0 || q.gamma != r3.Vec{}
	f.linear = f.linear || q.gamma != r3.Vec{} || f.rho != 0
	index := len(f.faces)
	for k, from := range spec.loop {
		to := spec.loop[(k+1)%len(spec.loop)]
		key := [2]int{min(from, to), max(from, to)}
		e, ok := seen[key]
		if !ok {
			e = len(f.edges)
			seen[key] = e
			f.edges = append(f.edges, newEdge(f.verts, key[0], key[1]))
		}
		edge := &f.edges[e]
		slot := 0
		if ok {
			slot = 1
		}
		edge.face[slot], edge.corner[slot] = index, k
		cr := facetCorner{edge: e, from: from, to: to, sign: 1}
		if from > to {
			cr.sign = -1
		}
		along := f.verts[to].Sub(f.verts[from]).Unit()
		cr.mp = along.Cross(q.np)
		cr.m = cr.mp.Value()
		q.corners = append(q.corners, cr)
		sigma := q.sigma + r3.Dot(q.gamma, f.verts[from].Sub(f.verts[q.ref]).Value())
		f.dense = max(f.dense, math.Abs(sigma))
	}
	q.setFan(f.verts)
	f.faces = append(f.faces, q)
}

func newEdge(verts []pair.Vec, from, to int) facetEdge {
	d := verts[to].Sub(verts[from])
	return facetEdge{from: from, to: to, length: d.Norm().Value(), t: d.Unit().Value(), face: [2]int{-1, -1}}
}

// setFan cuts the face into triangles from its first vertex, with signed areas so that reflex corners are right.
func (q *facet) setFan(verts []pair.Vec) {
	v0 := verts[q.corners[0].from]
	var sum r3.Vec
	for _, c := range q.corners {
		sum = r3.Add(sum, verts[c.from].Sub(v0).Value())
	}
	q.centre = r3.Add(v0.Value(), r3.Scale(1/float64(len(q.corners)), sum))
	for k := 1; k+1 < len(q.corners); k++ {
		i, j := q.corners[k].from, q.corners[k+1].from
		a, b := verts[i].Sub(v0), verts[j].Sub(v0)
		q.fan = append(q.fan, [3]int{q.corners[0].from, i, j})
		q.twice = append(q.twice, a.Cross(b).Dot(q.np).Value())
	}
	for _, c := range q.corners {
		q.radius = max(q.radius, r3.Norm(r3.Sub(verts[c.from].Value(), q.centre)))
	}
}

// finishEdge sums over the faces at an edge. Where coplanar faces of equal density meet, nothing of the edge is left.
func (f *facets) finishEdge(e *facetEdge) {
	var gamma float64
	for k, i := range e.face {
		if i < 0 {
			continue
		}
		q := &f.faces[i]
		m := q.corners[e.corner[k]].m
		e.w = r3.Add(e.w, r3.Scale(q.sigma, m))
		e.c += r3.Dot(q.gamma, m)
		gamma += r3.Norm(q.gamma)
		e.live = e.live || q.charged
	}
	if e.face[1] >= 0 && r3.Norm(e.w) <= 8*0x1p-53*f.dense && gamma == 0 {
		e.w, e.live = r3.Vec{}, false
	}
}

// newell returns the unit normal of a loop by Newell's sum, in pairs.
func newell(verts []pair.Vec, loop []int) pair.Vec {
	v0 := verts[loop[0]]
	var n pair.Vec
	for k := 1; k+1 < len(loop); k++ {
		n = n.Add(verts[loop[k]].Sub(v0).Cross(verts[loop[k+1]].Sub(v0)))
	}
	return n.Unit()
}

func boxOf(verts []pair.Vec) r3.Box {
	v := verts[0].Value()
	b := r3.Box{Min: v, Max: v}
	for _, p := range verts {
		v := p.Value()
		b.Min = r3.Vec{X: min(b.Min.X, v.X), Y: min(b.Min.Y, v.Y), Z: min(b.Min.Z, v.Z)}
		b.Max = r3.Vec{X: max(b.Max.X, v.X), Y: max(b.Max.Y, v.Y), Z: max(b.Max.Z, v.Z)}
	}
	return b
}

// smallVerts and smallEdges are what fits on the stack; larger bodies take their room from a pool.
const (
	smallVerts = 12
	smallEdges = 20
)

// facetRoom is the working memory of one evaluation.
type facetRoom struct {
	a     []r3.Vec  // vertex - x
	r     []float64 // |a|
	l     []float64 // edge logarithms
	close []bool    // edges whose geometry is taken in pairs
}

// value evaluates at one point, near or far.
func (f *facets) value(p field.Point, side field.Side, want field.Want) field.Value {
	if len(f.verts) <= smallVerts && len(f.edges) <= smallEdges {
		var a [smallVerts]r3.Vec
		var r [smallVerts]float64
		var l [smallEdges]float64
		var c [smallEdges]bool
		return f.near(p, side, want, facetRoom{a[:len(f.verts)], r[:len(f.verts)], l[:len(f.edges)], c[:len(f.edges)]})
	}
	room := facetRooms.Get().(*facetRoom)
	defer facetRooms.Put(room)
	room.grow(len(f.verts), len(f.edges))
	return f.near(p, side, want, *room)
}

// tolerance is the distance, in units of f.unit, below which p counts as on a face: geom.OnTolerance with the norms of the
// bounds taken once.
func (f *facets) tolerance(p field.Point) float64 {
	x := r3.Vec{X: p.X.X.Hi, Y: p.X.Y.Hi, Z: p.X.Z.Hi}
	return (p.Slack + 4*0x1p-53*(math.Sqrt(r3.Norm2(x))+f.extent)) / f.unit
}
