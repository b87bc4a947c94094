package geom

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// hardPoints returns points around the vertices, edges and faces of a body of plane faces: on them, a few tolerances and
// a few rays' lengths off them, and with the shadow exactly on theirs.
func hardPoints(rng *rand.Rand, p Polyhedron) (points []pair.Vec) {
	size := diameter(p.Bounds())
	ray := pair.VecOf(r3.Vec{X: -slantX, Y: -slantY, Z: 1})
	add := func(at pair.Vec) {
		tol := OnTolerance(p.Bounds(), at.Value(), 0)
		points = append(points, at)
		for _, d := range []float64{0.9 * tol, 1.1 * tol, 8 * tol, 1e-9 * size, 0.1 * size} {
			points = append(points, at.Add(pair.VecOf(r3.Scale(d, r3.Unit(randomVec(rng))))))
			for _, sense := range []float64{-1, 1} {
				points = append(points, at.Add(ray.Scale(pair.Of(sense*d))))
			}
		}
	}
	faces := rng.Perm(len(p.Loops))
	if len(faces) > 12 {
		faces = faces[:4] // Polyhedron.Locate takes its time
	}
	for _, f := range faces {
		l := p.face(f)
		for k := range min(l.len(), 8) {
			a, b := l.at(k), l.at(k+1)
			add(a)
			add(a.Add(b.Sub(a).Scale(pair.Of(rng.Float64()))))
			add(a.Add(l.mean().Sub(a).Scale(pair.Of(rng.Float64()))))
		}
		add(l.mean())
	}
	return points
}

// moreFlats returns bodies of plane faces beside those of bodies: with many faces, with a face of many vertices, far from
// the origin, tiny, and with a tree that cannot be divided by centres.
func moreFlats() []named {
	gear := make([][2]float64, 120)
	for k := range gear {
		s, c := math.Sincos(2 * math.Pi * float64(k) / float64(len(gear)))
		r := 1 + 0.1*float64(k%4/2)
		gear[k] = [2]float64{r * c, r * s}
	}
	var stack Polyhedron
	for k := range 20 {
		plate := moved(Box{Size: r3.Vec{X: 1, Y: 1, Z: 0x1p-8}}.Polyhedron(), r3.Vec{X: -slantX * float64(k) / 64, Y: -slantY * float64(k) / 64, Z: float64(k) / 64})
		stack = joined(stack, plate)
	}
	return []named{
		{"geodesic", geodesic(2)},
		{"512 triangles", geodesic(3)},
		{"gear", Prism{Base: gear, Height: 0.5, TopSlope: [2]float64{0.01, 0.02}}},
		{"stack along the ray", stack},
		{"far geodesic", moved(geodesic(2), r3.Vec{X: 1000.1, Y: -2000.2, Z: 500.3})},
		{"tiny", scaledBy(geodesic(2), 1e-40)},
		{"renumbered", renumbered(Prism{Base: ell, Height: 2}.Polyhedron())},
	}
}

// scaledBy returns p with its coordinates multiplied by s.
func scaledBy(p Polyhedron, s float64) Polyhedron {
	q := Polyhedron{Loops: p.Loops}
	for _, v := range p.Vertices {
		q.Vertices = append(q.Vertices, r3.Scale(s, v))
	}
	return q
}

// A locator gives the very answers of the body that it was made from, in its own frame and in another.
func TestLocatorAgrees(t *testing.T) {
	rng := rand.New(rand.NewPCG(41, 1))
	for _, b := range append(bodies(), moreFlats()...) {
		var points []pair.Vec
		box := b.body.Bounds()
		size := diameter(box)
		if flat, ok := b.body.(Flat); ok {
			points = hardPoints(rng, flat.Polyhedron())
		}
		for range 200 {
			x := r3.Add(r3.Scale(0.5, r3.Add(box.Min, box.Max)), r3.Scale(size/3, randomVec(rng)))
			points = append(points, pair.VecOf(x), pair.WithLow(x, r3.Scale(u*size/8, randomVec(rng))))
		}
		nan := math.NaN()
		for _, x := range []r3.Vec{{X: nan, Y: nan, Z: nan}, {Z: math.Inf(1)}, {Y: 1e200}, {X: -math.MaxFloat64}} {
			points = append(points, pair.VecOf(x))
		}
		for i, pose := range []Pose{{}, Translate(r3.Scale(3*size, randomVec(rng))), randomPose(t, rng, size)} {
			placed := At(b.body, pose)
			var body Body = placed
			if i == 0 {
				body = b.body
			}
			locator := LocatorOf(body)
			if i == 2 {
				locator = LocatorAt(LocatorOf(b.body), b.body.Bounds(), pose)
			}
			var count [3]int
			for _, x := range points {
				if i > 0 {
					x = pose.ToOuter(x)
				}
				for _, slack := range []float64{0, 1e-6 * size} {
					got, want := locator.Locate(x, slack), body.Locate(x, slack)
					if got != want {
						t.Errorf("%s, pose %d: %v with slack %v: got %+v, want %+v", b.name, i, x, slack, got, want)
					}
					count[want.Region]++
				}
			}
			if count[Outside] < 20 || count[Inside] < 20 && b.name != "thin tube" {
				t.Errorf("%s: %d points inside and %d outside are too few", b.name, count[Inside], count[Outside])
			}
		}
	}
}

// The same for sheets.
func TestSheetLocatorAgrees(t *testing.T) {
	rng := rand.New(rand.NewPCG(41, 2))
	base := make([]r3.Vec, len(star))
	low := make([]r3.Vec, len(star))
	for k, b := range star {
		z := pair.Product(0.3, b[0]).Add(pair.Product(-0.7, b[1]))
		base[k], low[k] = r3.Vec{X: b[0], Y: b[1], Z: z.Hi}, r3.Vec{Z: z.Lo}
	}
	for name, sheet := range map[string]Sheet{
		"square": Polygon{Vertices: square}, "star": Polygon{Vertices: base}, "star with low parts": Polygon{Vertices: base, Low: low},
		"disc": Disc{Radius: 1}, "annulus": Annulus{Inner: 0.5, Outer: 1},
	} {
		for i, pose := range []Pose{{}, randomPose(t, rng, 2)} {
			placed := sheet
			if i > 0 {
				placed = SheetAt(sheet, pose)
			}
			locator := LocatorOf(placed)
			var count [3]int
			placed.Nodes(6, func(x, normal r3.Vec, _ float64) {
				tol := OnTolerance(sheet.Bounds(), x, 0)
				for _, d := range []float64{0, 0.9 * tol, -1.1 * tol, 5 * tol, 1e-9, 0.1} {
					for _, step := range []r3.Vec{normal, randomVec(rng)} {
						at := pair.VecOf(r3.Add(x, r3.Scale(d, step)))
						for _, slack := range []float64{0, 1e-6} {
							got, want := locator.Locate(at, slack), placed.Locate(at, slack)
							if got != want {
								t.Errorf("%s, pose %d: %v with slack %v: got %+v, want %+v", name, i, at, slack, got, want)
							}
							count[want.Region]++
						}
					}
				}
			})
			if count[On] < 50 || count[Outside] < 50 {
				t.Errorf("%s: %d points on the sheet and %d off it are too few", name, count[On], count[Outside])
			}
		}
	}
}

// Plain arithmetic answers nearly all points; on shadows of edges it never does.
func TestLocatorShadesIsSure(t *testing.T) {
	rng := rand.New(rand.NewPCG(41, 3))
	p := newFacets(geodesic(2))
	asked, sure := 0, 0
	for range 1000 {
		v := randomVec(rng)
		q := p.probe(pair.VecOf(v), v, OnTolerance(p.box, v, 0))
		for k := range p.faces {
			if q.misses(&p.faces[k].box) {
				continue
			}
			asked++
			if _, ok := p.shades(&p.faces[k], &q); ok {
				sure++
			}
		}
	}
	if asked < 500 || sure < asked-asked/100 { // doubt needs a shadow within 1e-14 of an edge
		t.Errorf("sure of %d faces of %d", sure, asked)
	}
	for k := range p.faces {
		l := p.body.face(p.faces[k].number)
		middle := l.at(0).Add(l.at(1)).Scale(pair.Of(0.5))
		q := p.probe(middle, middle.Value(), OnTolerance(p.box, middle.Value(), 0))
		if _, ok := p.shades(&p.faces[k], &q); ok {
			t.Errorf("face %d: sure of the shadow of the middle of its edge", k)
		}
	}
}

// The tree holds every face once, in boxes that hold those below.
func TestLocatorTree(t *testing.T) {
	for _, b := range moreFlats() {
		p := newFacets(b.body.(Flat).Polyhedron())
		seen := make([]int, len(p.faces))
		for at, n := range p.tree {
			for below := at + 1; below < n.skip; below++ {
				if c := p.tree[below]; c.skip > n.skip || include(include(n.box, c.box.Min), c.box.Max) != n.box {
					t.Fatalf("%s: branch %d %+v is not in %d %+v", b.name, below, c, at, n)
				}
			}
			for _, f := range p.faces[n.first:n.end] {
				seen[f.number]++
				if include(include(n.box, f.box.Min), f.box.Max) != n.box {
					t.Fatalf("%s: face %d is not in branch %d", b.name, f.number, at)
				}
			}
			if fork := n.first == n.end; fork && n.skip < at+3 || !fork && n.skip != at+1 {
				t.Errorf("%s: branch %d %+v skips to the wrong place", b.name, at, n)
			}
			if n.end-n.first > leafSize {
				t.Errorf("%s: leaf %d has %d faces", b.name, at, n.end-n.first)
			}
		}
		q := p.probe(p.faces[0].mean, p.faces[0].base, 0)
		if p.next(&walk{}, &q) == nil {
			t.Errorf("%s: a point of a face meets none", b.name)
		}
		p.tree[0].box = nothing()
		if f := p.next(&walk{}, &q); f != nil {
			t.Errorf("%s: a walk past the root meets face %d", b.name, f.number)
		}
		for f, count := range seen {
			if count != 1 {
				t.Errorf("%s: face %d is in %d leaves", b.name, f, count)
			}
		}
	}
	if got := LocatorOf(Polyhedron{}).Locate(pair.Vec{}, 0); got != outside() {
		t.Errorf("nothing: got %+v", got)
	}
}

func TestLocatorAllocatesNothing(t *testing.T) {
	rng := rand.New(rand.NewPCG(41, 4))
	for _, b := range append(bodies(), moreFlats()...) {
		for _, body := range []Body{b.body, At(b.body, randomPose(t, rng, 0.1))} {
			locator := LocatorOf(body)
			points := []pair.Vec{pair.VecOf(r3.Vec{X: 0.1, Y: 0.2, Z: 0.15})}
			for _, f := range body.Faces() {
				f.Surface.Nodes(1, func(x, _ r3.Vec, _ float64) { points = append(points, pair.VecOf(x)) })
			}
			if flat, ok := b.body.(Flat); ok {
				points = append(points, pair.VecOf(flat.Polyhedron().Vertices[0]))
			}
			if n := testing.AllocsPerRun(2, func() {
				for _, x := range points {
					locator.Locate(x, 0)
				}
			}); n != 0 {
				t.Errorf("%s: %v allocations", b.name, n)
			}
		}
	}
}

// FuzzLocator compares the locator of a body with holes and one of decimals with the bodies themselves.
func FuzzLocator(f *testing.F) {
	pose, err := Turn(r3.Vec{X: 1, Y: 2, Z: 3}, 40)
	if err != nil {
		f.Fatal(err)
	}
	parts := []Body{cavity(), Prism{Base: star, Height: 1.1, TopSlope: [2]float64{0.3, 0.07}}, geodesic(2)}
	for _, p := range parts[:len(parts):len(parts)] {
		parts = append(parts, At(p, pose.Then(Translate(r3.Vec{X: 0.1, Y: 0.2, Z: 0.3}))))
	}
	locators := make([]Locator, len(parts))
	for i, p := range parts {
		locators[i] = LocatorOf(p)
	}
	f.Add(1.0, 1.0, 1.0, 0.0)
	f.Add(0.1, 1.3, -0.55, 1e-9)
	f.Add(2.0, 0.5, -0.25, 0.0)
	f.Add(1-slantX/4, 1-slantY/4, 0.25, 0.0)
	f.Fuzz(func(t *testing.T, x, y, z, slack float64) {
		at := pair.VecOf(r3.Vec{X: x, Y: y, Z: z})
		for i, p := range parts {
			if got, want := locators[i].Locate(at, math.Abs(slack)), p.Locate(at, math.Abs(slack)); got != want {
				t.Errorf("part %d: %v with slack %v: got %+v, want %+v", i, at, slack, got, want)
			}
		}
	})
}

func BenchmarkLocator(b *testing.B) {
	pose, err := Turn(r3.Vec{X: 1, Y: 2, Z: 3}, 40)
	if err != nil {
		b.Fatal(err)
	}
	run := func(name string, body Body, x r3.Vec) {
		locator, at := LocatorOf(body), pair.VecOf(x)
		b.Run(name, func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				locator.Locate(at, 0)
			}
		})
	}
	for _, c := range append(append(bodies(), moreFlats()...), named{"2048 triangles", geodesic(4)}) {
		if _, ok := c.body.(Flat); !ok {
			continue
		}
		run(c.name, c.body, r3.Add(c.body.Centroid(), r3.Scale(diameter(c.body.Bounds()), r3.Vec{X: 0.05, Y: 0.1, Z: 0.08})))
		if p := c.body.(Flat).Polyhedron(); len(p.Loops) < 100 {
			run(c.name+"/on a face", c.body, p.face(0).mean().Value())
			run(c.name+"/on a vertex", c.body, p.Vertices[0])
		}
	}
	prism := Prism{Base: ell, Height: 0.3}
	run("turned prism", At(prism, pose), r3.Vec{X: 0.1, Y: 0.2, Z: 0.15})
	run("turned prism/far", At(prism, pose), r3.Vec{X: 10, Y: 0.2, Z: 0.15})
	b.Run("prepare 2048 triangles", func(b *testing.B) {
		body := geodesic(4)
		b.ReportAllocs()
		for b.Loop() {
			LocatorOf(body)
		}
	})
}
