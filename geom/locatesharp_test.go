package geom

import (
	"math"
	"math/rand/v2"
	"slices"
	"testing"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// exactPoints returns points of the faces of a body in pairs, away from edges.
func exactPoints(b Body) (points []pair.Vec, normals []pair.Vec) {
	add := func(x, n pair.Vec) { points, normals = append(points, x), append(normals, n) }
	for k := range 9 {
		s, c := pair.SinCosDegrees(float64(40*k) + 3)
		e := pair.Vec{X: c, Y: s}
		up, _ := pair.SinCosDegrees(float64(20*k) - 77)
		flat := pair.Of(1).Sub(up.Mul(up)).Sqrt()
		sphere := pair.Vec{X: c.Mul(flat), Y: s.Mul(flat), Z: up}
		z := pair.Of(0.1 * float64(k-4))
		switch b := b.(type) {
		case Cylinder:
			x := e.Scale(pair.Of(b.Radius))
			add(pair.Vec{X: x.X, Y: x.Y, Z: z}, e)
			add(pair.Vec{X: x.X.Scale(0.3), Y: x.Y.Scale(0.3), Z: pair.Of(b.Height / 2)}, pair.Vec{Z: pair.Of(1)})
		case Tube:
			for a, n := range map[float64]pair.Vec{b.Inner: e.Neg(), b.Outer: e} {
				add(pair.Vec{X: c.Scale(a), Y: s.Scale(a), Z: z}, n)
			}
		case Arc:
			x, n := arcPoint(b, k)
			add(x, n)
		case Cone:
			x, n := conePoint(b, k, e)
			add(x, n)
		case Torus:
			add(torusPoint(b, k, e))
		case Sphere:
			add(sphere.Scale(pair.Of(b.Radius)), sphere)
		case HollowSphere:
			add(sphere.Scale(pair.Of(b.Inner)), sphere.Neg())
			add(sphere.Scale(pair.Of(b.Outer)), sphere)
		case Ellipsoid:
			a := b.SemiAxes
			n := pair.Vec{X: sphere.X.Div(pair.Of(a.X)), Y: sphere.Y.Div(pair.Of(a.Y)), Z: sphere.Z.Div(pair.Of(a.Z))}
			add(pair.Vec{X: sphere.X.Scale(a.X), Y: sphere.Y.Scale(a.Y), Z: sphere.Z.Scale(a.Z)}, n.Unit())
		}
	}
	if b, ok := b.(Flat); ok {
		p := b.Polyhedron()
		for f := range p.Loops {
			l := p.face(f)
			t := triangles(l)[0]
			all := loop{vertices: p.Vertices, low: p.Low}
			middle := all.at(t[0]).Add(all.at(t[1])).Add(all.at(t[2])).Scale(pair.Of(1).Div(pair.Of(3)))
			add(middle, l.area().Unit())
		}
	}
	return points, normals
}

// The tolerance is sharp: with points held in pairs, 0.99 tolerances off a face is on it and 1.01 is not. Plain
// float64 fails this: the products lose half a tolerance.
func TestLocateSharp(t *testing.T) {
	for _, b := range bodies() {
		points, normals := exactPoints(b.body)
		if len(points) == 0 {
			t.Errorf("%s: no points", b.name)
		}
		for i, x := range points {
			tol := OnTolerance(b.body.Bounds(), x.Value(), 0)
			for d, want := range map[float64]Region{-1.01: Inside, -0.99: On, 0: On, 0.99: On, 1.01: Outside} {
				at := x.Add(normals[i].Scale(pair.Of(d * tol)))
				if got := b.body.Locate(at, 0); got.Region != want || got.Edge {
					t.Errorf("%s: %v %+v tolerances off: got %+v, want region %v", b.name, x.Value(), d, got, want)
				}
			}
		}
	}
}

// The ray of Locate that passes exactly through vertices and edges counts each face once.
func TestLocateRayThroughEdges(t *testing.T) {
	octahedron := geodesic(0)
	cases := []struct {
		name string
		body Polyhedron
	}{
		{"octahedron", octahedron},
		{"cavity", cavity()},
		{"tetrahedron", tetrahedron()},
		{"ell", Prism{Base: ell, Height: 2}.Polyhedron()},
		{"renumbered", renumbered(Prism{Base: ell, Height: 2}.Polyhedron())},
	}
	for _, c := range cases {
		tried := 0
		for f := range c.body.Loops {
			l := c.body.face(f)
			for k := range l.len() {
				for _, s := range []float64{0, 0.25, 0.5} {
					on := l.at(k).Add(l.at(k + 1).Sub(l.at(k)).Scale(pair.Of(s)))
					for _, length := range []float64{0.125, 0.25, 0.5, 1} {
						x := on.Add(pair.VecOf(r3.Vec{X: slantX * length, Y: slantY * length, Z: -length}))
						if at, want := shadow(x), shadow(on); at != want {
							continue // rounded, so the ray passes beside
						}
						if slices.ContainsFunc(c.body.Vertices, func(v r3.Vec) bool { return v.Z == x.Z.Hi }) {
							continue // in the plane of a level face, where the solid angle is undefined
						}
						tried++
						want := Outside
						if solidAngle(c.body, x.Value()) > 2*math.Pi {
							want = Inside
						}
						if got := c.body.Locate(x, 0); got.Region != want && got.Region != On {
							t.Errorf("%s: %v: got %+v, want region %v", c.name, x.Value(), got, want)
						}
					}
				}
			}
		}
		if tried < 50 {
			t.Errorf("%s: only %d rays pass exactly through an edge", c.name, tried)
		}
	}
}

// renumbered returns p with its vertices in another order.
func renumbered(p Polyhedron) Polyhedron {
	order := rand.New(rand.NewPCG(23, 24)).Perm(len(p.Vertices))
	q := Polyhedron{Vertices: make([]r3.Vec, len(p.Vertices))}
	for i, j := range order {
		q.Vertices[j] = p.Vertices[i]
	}
	for _, face := range p.Loops {
		f := make([]int, len(face))
		for k, i := range face {
			f[k] = order[i]
		}
		q.Loops = append(q.Loops, f)
	}
	return q
}

// Under a slack the point that counts is the foot on the plane, not what lies below along an axis.
func TestLocateFoot(t *testing.T) {
	p := Polygon{Vertices: []r3.Vec{{X: 1}, {Y: 1}, {Z: 1}}}
	const slack = 0.01
	n := p.Normal().Value()
	inward := r3.Unit(r3.Vec{X: 2, Y: -1, Z: -1}) // in the plane, away from the edge between the second and third vertex
	foot := r3.Add(r3.Vec{Y: 0.5, Z: 0.5}, r3.Scale(1.2*slack, inward))
	if got := p.Locate(pair.VecOf(r3.Add(foot, r3.Scale(0.99*slack, n))), slack); got.Region != On || got.Edge {
		t.Errorf("got %+v, want on the polygon", got)
	}
}

// Bounds contain the vertices to their last bit.
func TestBoundsContainPairs(t *testing.T) {
	for _, b := range bodies() {
		p, ok := b.body.(Prism)
		if !ok {
			continue
		}
		q := p.Polyhedron()
		low := 0
		for _, box := range []r3.Box{p.Bounds(), q.Bounds()} {
			for i := range q.Vertices {
				v := loop{vertices: q.Vertices, low: q.Low}.at(i)
				if v.Z.Lo != 0 {
					low++
				}
				if v.Z.Less(pair.Of(box.Min.Z)) || pair.Of(box.Max.Z).Less(v.Z) {
					t.Errorf("%s: vertex %d at %v beyond %v", b.name, i, v, box)
				}
			}
		}
		if b.name == "sloped prism" && low == 0 {
			t.Error("no vertex of the sloped prism has a low part")
		}
	}
}
