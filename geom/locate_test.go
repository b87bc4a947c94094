package geom

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Points 1e-12 sizes off every face are told apart on both sides, and points on a face are on that face, in the own
// frame and after any pose.
func TestLocateNearFaces(t *testing.T) {
	rng := rand.New(rand.NewPCG(7, 8))
	for _, b := range bodies() {
		size := diameter(b.body.Bounds())
		for f, face := range b.body.Faces() {
			face.Surface.Nodes(3, func(x, normal r3.Vec, _ float64) {
				out := r3.Scale(face.Sign(), normal)
				for _, pose := range []Pose{{}, randomPose(t, rng, size), Translate(r3.Scale(100*size, randomVec(rng)))} {
					checkNearFace(t, b, f, x, out, size, pose)
				}
			})
		}
	}
}

func checkNearFace(t *testing.T, b named, f int, x, out r3.Vec, size float64, pose Pose) {
	t.Helper()
	placed := At(b.body, pose)
	outer := pose.ToOuter(pair.VecOf(x))
	tol := OnTolerance(placed.Body.Bounds(), x, pose.slack(outer))
	for _, d := range []float64{1e-12 * size, 3 * tol} { // 3: a node is rounded, the offset too
		step := pair.VecOf(r3.Scale(d, out))
		for sign, want := range map[float64]Region{1: Outside, -1: Inside} {
			at := pose.ToOuter(pair.VecOf(x).Add(step.Scale(pair.Of(sign))))
			if got := placed.Locate(at, 0); d > 2*tol && (got.Region != want || got.Face != -1) {
				t.Errorf("%s: %v + %v: got %+v, want region %v", b.name, x, sign*d, got, want)
			}
		}
	}
	for _, at := range []pair.Vec{outer, pair.VecOf(outer.Value())} {
		got := placed.Locate(at, 0)
		normal := pose.VectorToOuter(out)
		if got.Region != On || got.Face != f || got.Edge || r3.Norm(r3.Sub(got.Normal, normal)) > 1e-6 {
			t.Errorf("%s: %v: got %+v, want on face %d with normal %v", b.name, x, got, f, normal)
		}
	}
}

// Points on the edges and vertices of flat bodies and the rims of round ones are on an edge.
func TestLocateEdges(t *testing.T) {
	rng := rand.New(rand.NewPCG(9, 10))
	for _, b := range bodies() {
		for _, x := range edgePoints(b.body) {
			for _, pose := range []Pose{{}, randomPose(t, rng, 1)} {
				for _, at := range []pair.Vec{pose.ToOuter(x), pair.VecOf(pose.ToOuter(x).Value())} {
					got := At(b.body, pose).Locate(at, 0)
					if got.Region != On || !got.Edge || got.Face != -1 || got.Normal != (r3.Vec{}) {
						t.Errorf("%s: %v: got %+v, want an edge", b.name, x.Value(), got)
					}
				}
			}
		}
	}
}

// edgePoints returns vertices and points of edges and rims.
func edgePoints(b Body) (points []pair.Vec) {
	ring := func(a, half float64) {
		for k := range 12 {
			s, c := pair.SinCosDegrees(float64(30*k) + 7)
			for _, z := range []float64{-half, half} {
				points = append(points, pair.Vec{X: c.Scale(a), Y: s.Scale(a), Z: pair.Of(z)})
			}
		}
	}
	switch b := b.(type) {
	case Cylinder:
		ring(b.Radius, b.Height/2)
	case Tube:
		ring(b.Inner, b.Height/2)
		ring(b.Outer, b.Height/2)
	case Arc:
		return arcEdges(b)
	case Cone:
		return coneEdges(b)
	case Flat:
		p := b.Polyhedron()
		for f := range p.Loops {
			l := p.face(f)
			for k := range l.len() {
				a, d := l.at(k), l.at(k+1)
				if !p.seam(l.label(k), l.label(k+1)) {
					points = append(points, a, a.Add(d.Sub(a).Scale(pair.Of(0.3))))
				}
			}
		}
	}
	return points
}

// seam reports whether the faces at an edge are in one plane.
func (p Polyhedron) seam(i, j int) bool {
	e, _ := edgeOf(i, j)
	use := p.edges()[e]
	n, m := p.face(use.face[0]).area().Unit().Value(), p.face(use.face[1]).area().Unit().Value()
	return r3.Norm(r3.Sub(n, m)) < 1e-12
}

// The diagonal of a side cut in two triangles is no edge.
func TestLocateSeam(t *testing.T) {
	b := Box{Size: r3.Vec{X: 1, Y: 2, Z: 3}}
	p := triangulated(b)
	for f := 0; f < len(p.Loops); f += 2 {
		l := p.face(f)
		middle := r3.Scale(0.5, r3.Add(l.value(0), l.value(2)))
		got, want := p.Locate(pair.VecOf(middle), 0), b.Locate(pair.VecOf(middle), 0)
		if got.Region != On || got.Edge || got.Face != f || got.Normal != want.Normal {
			t.Errorf("%v: got %+v, want on face %d with normal %v", middle, got, f, want.Normal)
		}
	}
}

// A point beyond an edge in the plane of a face is outside, also within tolerance of the plane.
func TestLocateInPlaneOutside(t *testing.T) {
	p := Prism{Base: ell, Height: 1}
	for _, b := range []Body{p, At(p, Translate(r3.Vec{X: 0.1, Y: 0.2, Z: 0.3}))} {
		for _, x := range []r3.Vec{{X: 1.5, Y: 1.5, Z: 0.5}, {X: 1.5, Y: 1.5, Z: -0.5}, {X: 1, Y: 3}, {X: -1, Y: 1}, {X: 2, Y: 1.5}, {X: 1.5, Y: 2}} {
			at := pair.VecOf(x)
			if q, ok := b.(Placed); ok {
				at = q.Pose.ToOuter(at)
			}
			if got := b.Locate(at, 0); got.Region != Outside || got.Face != -1 {
				t.Errorf("%v: got %+v, want outside", x, got)
			}
		}
	}
}

// On a lattice that meets every face, edge and vertex of a body of unit cubes, and lies in the planes of its faces
// beyond them, the place follows from the cubes around the point.
func TestLocateLattice(t *testing.T) {
	prism := Prism{Base: ell, Height: 2}
	solid := func(x, y, z float64) bool {
		return math.Abs(z) < 1 && x > 0 && y > 0 && (x < 2 && y < 1 || x < 1 && y < 2)
	}
	for i := -2; i <= 10; i++ {
		for j := -2; j <= 10; j++ {
			for k := -6; k <= 6; k++ {
				x := r3.Vec{X: float64(i) / 4, Y: float64(j) / 4, Z: float64(k) / 4}
				full := 0
				for c := range 8 {
					d := func(bit int) float64 { return 0.01 * float64(2*(c>>bit&1)-1) }
					if solid(x.X+d(0), x.Y+d(1), x.Z+d(2)) {
						full++
					}
				}
				got := prism.Locate(pair.VecOf(x), 0)
				want := map[int]Region{0: Outside, 8: Inside}[full]
				if full > 0 && full < 8 {
					want = On
				}
				if got.Region != want || got.Edge != (full > 0 && full < 8 && full != 4) {
					t.Errorf("%v: got %+v, want region %v with %d octants full", x, got, want, full)
				}
			}
		}
	}
}

// Random points are where the sum of the solid angles of the faces puts them.
func TestLocateSolidAngle(t *testing.T) {
	rng := rand.New(rand.NewPCG(11, 12))
	for _, b := range bodies() {
		body, ok := b.body.(Flat)
		if !ok {
			continue
		}
		box := body.Bounds()
		count := [3]int{}
		for range 300 {
			x := r3.Vec{
				X: box.Min.X + (box.Max.X-box.Min.X)*(1.2*rng.Float64()-0.1),
				Y: box.Min.Y + (box.Max.Y-box.Min.Y)*(1.2*rng.Float64()-0.1),
				Z: box.Min.Z + (box.Max.Z-box.Min.Z)*(1.2*rng.Float64()-0.1),
			}
			want := Outside
			if solidAngle(body.Polyhedron(), x) > 2*math.Pi {
				want = Inside
			}
			for _, p := range []Body{body, body.Polyhedron()} {
				if got := p.Locate(pair.VecOf(x), 0); got.Region != want {
					t.Errorf("%s: %v: got %+v, want region %v", b.name, x, got, want)
				}
			}
			count[want]++
		}
		if count[Inside] < 10 || count[Outside] < 10 {
			t.Errorf("%s: only %d points inside and %d outside were tried", b.name, count[Inside], count[Outside])
		}
	}
}

// solidAngle sums the solid angles of triangles by A. Van Oosterom and J. Strackee, IEEE Trans. Biomed. Eng. 30 (1983)
// 125.
func solidAngle(p Polyhedron, x r3.Vec) (sum float64) {
	for f := range p.Loops {
		l := p.face(f)
		a := r3.Sub(l.value(0), x)
		for k := 1; k+1 < l.len(); k++ {
			b, c := r3.Sub(l.value(k), x), r3.Sub(l.value(k+1), x)
			na, nb, nc := r3.Norm(a), r3.Norm(b), r3.Norm(c)
			sum += 2 * math.Atan2(r3.Dot(a, r3.Cross(b, c)), na*nb*nc+r3.Dot(a, b)*nc+r3.Dot(a, c)*nb+r3.Dot(b, c)*na)
		}
	}
	return sum
}

// Random points of round bodies are where the plain formula puts them.
func TestLocateRound(t *testing.T) {
	rng := rand.New(rand.NewPCG(13, 14))
	square := func(v float64) float64 { return v * v }
	cases := []struct {
		name string
		body Body
		in   func(x r3.Vec) bool
	}{
		{"cylinder", Cylinder{Radius: 1, Height: 1}, func(x r3.Vec) bool { return math.Hypot(x.X, x.Y) < 1 && math.Abs(x.Z) < 0.5 }},
		{"tube", Tube{Inner: 0.5, Outer: 1, Height: 1}, func(x r3.Vec) bool {
			s := math.Hypot(x.X, x.Y)
			return s > 0.5 && s < 1 && math.Abs(x.Z) < 0.5
		}},
		{"sphere", Sphere{Radius: 1}, func(x r3.Vec) bool { return r3.Norm(x) < 1 }},
		{"hollow sphere", HollowSphere{Inner: 0.5, Outer: 1}, func(x r3.Vec) bool { return r3.Norm(x) < 1 && r3.Norm(x) > 0.5 }},
		{"ellipsoid", Ellipsoid{SemiAxes: r3.Vec{X: 0.5, Y: 1, Z: 2}}, func(x r3.Vec) bool { return square(2*x.X)+square(x.Y)+square(x.Z/2) < 1 }},
	}
	for _, c := range cases {
		if got := c.body.Locate(pair.Vec{}, 0); got.Region == Inside != c.in(r3.Vec{}) || got.Region == On {
			t.Errorf("%s: origin: got %+v", c.name, got)
		}
		for range 300 {
			x := randomVec(rng)
			if got := c.body.Locate(pair.VecOf(x), 0); got.Region == Inside != c.in(x) || got.Region == On {
				t.Errorf("%s: %v: got %+v, inside by formula %v", c.name, x, got, c.in(x))
			}
		}
	}
}

func TestLocateSheets(t *testing.T) {
	tilted := Polygon{Vertices: []r3.Vec{{X: 1}, {Y: 1}, {Z: 1}}}
	cases := []struct {
		name  string
		sheet Sheet
		x     r3.Vec
		want  Place
	}{
		{"disc", Disc{Radius: 2, Z: 1}, r3.Vec{X: 1, Z: 1}, Place{Region: On, Normal: r3.Vec{Z: 1}}},
		{"disc centre", Disc{Radius: 2, Z: 1}, r3.Vec{Z: 1}, Place{Region: On, Normal: r3.Vec{Z: 1}}},
		{"disc above", Disc{Radius: 2, Z: 1}, r3.Vec{Z: 1 + 1e-12}, outside()},
		{"disc rim", Disc{Radius: 2, Z: 1}, r3.Vec{Y: 2, Z: 1}, onEdge()},
		{"disc beyond", Disc{Radius: 2, Z: 1}, r3.Vec{Y: 2 + 1e-12, Z: 1}, outside()},
		{"annulus", Annulus{Inner: 1, Outer: 2}, r3.Vec{X: -1.5}, Place{Region: On, Normal: r3.Vec{Z: 1}}},
		{"annulus hole", Annulus{Inner: 1, Outer: 2}, r3.Vec{X: 0.5}, outside()},
		{"annulus inner rim", Annulus{Inner: 1, Outer: 2}, r3.Vec{X: 1}, onEdge()},
		{"annulus outer rim", Annulus{Inner: 1, Outer: 2}, r3.Vec{Y: -2}, onEdge()},
		{"polygon", tilted, r3.Vec{X: 0.25, Y: 0.25, Z: 0.5}, Place{Region: On, Normal: r3.Unit(r3.Vec{X: 1, Y: 1, Z: 1})}},
		{"polygon above", tilted, r3.Vec{X: 0.25 + 1e-12, Y: 0.25, Z: 0.5}, outside()},
		{"polygon edge", tilted, r3.Vec{X: 0.5, Y: 0.5}, onEdge()},
		{"polygon vertex", tilted, r3.Vec{Z: 1}, onEdge()},
		{"polygon beyond", tilted, r3.Vec{X: 0.75, Y: 0.5, Z: -0.25}, outside()},
	}
	rng := rand.New(rand.NewPCG(15, 16))
	for _, c := range cases {
		for _, pose := range []Pose{{}, randomPose(t, rng, 1)} {
			got := SheetAt(c.sheet, pose).Locate(pose.ToOuter(pair.VecOf(c.x)), 0)
			normal := pose.VectorToOuter(c.want.Normal)
			if d := r3.Norm(r3.Sub(got.Normal, normal)); d > 4*u { // roundings of the normal
				t.Errorf("%s: normal %v, want %v", c.name, got.Normal, normal)
			}
			got.Normal = c.want.Normal
			if got != c.want {
				t.Errorf("%s: got %+v, want %+v", c.name, got, c.want)
			}
		}
	}
}

// The slack widens what counts as on a face.
func TestLocateSlack(t *testing.T) {
	for _, b := range bodies() {
		size := diameter(b.body.Bounds())
		if b.name == "film" || b.name == "thin tube" {
			continue // thinner than the slack of this test
		}
		for f, face := range b.body.Faces() {
			face.Surface.Nodes(1, func(x, normal r3.Vec, _ float64) {
				for _, d := range []float64{-1e-4 * size, 1e-4 * size} {
					at := pair.VecOf(r3.Add(x, r3.Scale(d, normal)))
					if got := b.body.Locate(at, 2e-4*size); got.Region != On || got.Face != f {
						t.Errorf("%s: %v off face %d with slack: got %+v", b.name, d, f, got)
					}
					if got := b.body.Locate(at, 0); got.Region == On {
						t.Errorf("%s: %v off face %d without slack: got %+v", b.name, d, f, got)
					}
				}
			})
		}
	}
}

// What is not finite, or so far that squares overflow, is outside.
func TestLocateBadPoints(t *testing.T) {
	for _, b := range bodies() {
		for _, v := range []float64{math.NaN(), math.Inf(1), math.Inf(-1), 1e200, -math.MaxFloat64} {
			for _, x := range []r3.Vec{{X: v}, {Y: v}, {Z: v}, {X: v, Y: v, Z: v}} {
				for _, body := range []Body{b.body, At(b.body, Translate(r3.Vec{X: 1}))} {
					if got := body.Locate(pair.VecOf(x), 0); got.Region != Outside || got.Face != -1 {
						t.Errorf("%s: %v: got %+v, want outside", b.name, x, got)
					}
				}
			}
		}
	}
}

func TestLocateAllocatesNothing(t *testing.T) {
	x := pair.VecOf(r3.Vec{X: 0.1, Y: 0.2, Z: 0.15})
	for _, b := range bodies() {
		if _, ok := b.body.(Prism); ok {
			continue // makes its polyhedron
		}
		if n := testing.AllocsPerRun(20, func() { b.body.Locate(x, 0) }); n != 0 {
			t.Errorf("%s: %v allocations", b.name, n)
		}
	}
}

func BenchmarkLocate(b *testing.B) {
	x := pair.VecOf(r3.Vec{X: 0.1, Y: 0.2, Z: 0.15})
	for _, c := range append(bodies(), named{"2048 triangles", geodesic(4)}) {
		b.Run(c.name, func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				c.body.Locate(x, 0)
			}
		})
	}
}
