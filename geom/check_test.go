package geom

import (
	"math"
	"strings"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"
)

// square is a unit square in the plane z = 0.
var square = []r3.Vec{{}, {X: 1}, {X: 1, Y: 1}, {Y: 1}}

// with returns the vertices with v added.
func with(vertices []r3.Vec, v ...r3.Vec) []r3.Vec {
	return append(append([]r3.Vec(nil), vertices...), v...)
}

// moved returns p with its vertices shifted by d.
func moved(p Polyhedron, d r3.Vec) Polyhedron {
	q := Polyhedron{Loops: p.Loops}
	for _, v := range p.Vertices {
		q.Vertices = append(q.Vertices, r3.Add(v, d))
	}
	return q
}

// joined returns a and b as one polyhedron.
func joined(a, b Polyhedron) Polyhedron {
	p := Polyhedron{Vertices: with(a.Vertices, b.Vertices...), Loops: append([][]int(nil), a.Loops...)}
	for _, face := range b.Loops {
		f := make([]int, len(face))
		for k, i := range face {
			f[k] = i + len(a.Vertices)
		}
		p.Loops = append(p.Loops, f)
	}
	return p
}

// inverted returns p with all faces reversed.
func inverted(p Polyhedron) Polyhedron {
	q := Polyhedron{Vertices: p.Vertices}
	for _, face := range p.Loops {
		f := append([]int(nil), face...)
		reverse(f)
		q.Loops = append(q.Loops, f)
	}
	return q
}

// edited returns the unit cube after a change.
func edited(change func(p *Polyhedron)) Polyhedron {
	p := Box{Size: r3.Vec{X: 1, Y: 1, Z: 1}}.Polyhedron()
	change(&p)
	return p
}

type checker interface{ Check() error }

func TestCheckRefuses(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	cube := Box{Size: r3.Vec{X: 1, Y: 1, Z: 1}}.Polyhedron()
	bar := Box{Size: r3.Vec{X: 0.2, Y: 0.2, Z: 3}}.Polyhedron()
	cases := []struct {
		name  string
		bad   checker
		wants []string // fragments of the message
	}{
		{"box zero", Box{Size: r3.Vec{X: 1, Y: 0, Z: 1}}, []string{"box size y is 0", "positive"}},
		{"box negative", Box{Size: r3.Vec{X: -1, Y: 1, Z: 1}}, []string{"box size x is -1"}},
		{"box NaN", Box{Size: r3.Vec{X: 1, Y: 1, Z: nan}}, []string{"box size z is NaN", "finite"}},
		{"box infinite", Box{Size: r3.Vec{X: inf, Y: 1, Z: 1}}, []string{"box size x is +Inf", "finite"}},
		{"box tiny", Box{Size: r3.Vec{X: 1e-200, Y: 1, Z: 1}}, []string{"1e-200", "out of the range", "another unit"}},
		{"box huge", Box{Size: r3.Vec{X: 1e200, Y: 1, Z: 1}}, []string{"1e+200", "another unit"}},
		{"cylinder radius", Cylinder{Radius: -2, Height: 1}, []string{"cylinder radius is -2"}},
		{"cylinder height", Cylinder{Radius: 2}, []string{"cylinder height is 0"}},
		{"tube inner", Tube{Outer: 1, Height: 1}, []string{"tube inner radius is 0"}},
		{"tube inverted", Tube{Inner: 2, Outer: 1, Height: 1}, []string{"tube inner radius 2", "outer radius 1", "exchange"}},
		{"tube without wall", Tube{Inner: 1, Outer: 1, Height: 1}, []string{"no thickness"}},
		{"tube thinner than rounding", Tube{Inner: 1, Outer: 1 + 4*u, Height: 1}, []string{"thinner than the rounding"}},
		{"tube height", Tube{Inner: 1, Outer: 2, Height: nan}, []string{"tube height is NaN"}},
		{"arc inner", Arc{Inner: -1, Outer: 2, Height: 1, To: 1}, []string{"arc inner radius is -1", "positive"}},
		{"arc inverted", Arc{Inner: 2, Outer: 1, Height: 1, To: 1}, []string{"arc inner radius 2", "outer radius 1"}},
		{"arc height", Arc{Inner: 1, Outer: 2, To: 1}, []string{"arc height is 0"}},
		{"arc NaN", Arc{Inner: 1, Outer: 2, Height: 1, From: nan, To: 1}, []string{"arc from angle is NaN", "radians"}},
		{"arc infinite", ArcDegrees(1, 2, 1, 0, inf), []string{"arc to angle is +Inf", "degrees"}},
		{"arc far", ArcDegrees(1, 2, 1, 36001, 36002), []string{"arc from angle 36001 is beyond 36000 degrees", "whole turns"}},
		{"arc empty", Arc{Inner: 1, Outer: 2, Height: 1, From: 1, To: 1}, []string{"from angle 1 is not below the to angle 1", "exchange"}},
		{"arc thin", Arc{Inner: 1, Outer: 2, Height: 1, From: 1, To: 1 + 2*u}, []string{"thinner than the rounding"}},
		{"arc of more than a turn", ArcDegrees(1, 2, 1, -10, 350.0000001), []string{"more than one turn", "degrees"}},
		{"arc of more than a turn in radians", Arc{Inner: 1, Outer: 2, Height: 1, To: 6.2831854}, []string{"more than one turn", "radians"}},
		{"arc without bore", ArcDegrees(0, 2, 1, 0, 360), []string{"full turn", "give a cylinder"}},
		{"cone negative", Cone{Bottom: -1, Top: 1, Height: 1}, []string{"cone bottom radius is -1"}},
		{"cone NaN", Cone{Bottom: 1, Top: nan, Height: 1}, []string{"cone top radius is NaN"}},
		{"cone height", Cone{Bottom: 1, Height: -1}, []string{"cone height is -1"}},
		{"cone of two tips", Cone{Height: 1}, []string{"both 0"}},
		{"cone nearly a tip", Cone{Bottom: 1, Top: 1e-16, Height: 1}, []string{"cone radius 1e-16", "give 0 for a tip"}},
		{"torus minor", Torus{Major: 1}, []string{"torus minor radius is 0"}},
		{"torus major", Torus{Major: inf, Minor: 1}, []string{"torus major radius is +Inf"}},
		{"torus closed", Torus{Major: 1, Minor: 1}, []string{"torus minor radius 1", "major radius 1", "hole is closed"}},
		{"torus nearly closed", Torus{Major: 1, Minor: 1 - 2*u}, []string{"narrower than their rounding"}},
		{"torus thread", Torus{Major: 1, Minor: 1e-16}, []string{"below the rounding", "thicker"}},
		{"sphere", Sphere{Radius: -inf}, []string{"sphere radius is -Inf"}},
		{"hollow sphere", HollowSphere{Inner: 3, Outer: 2}, []string{"hollow sphere inner radius 3"}},
		{"ellipsoid", Ellipsoid{SemiAxes: r3.Vec{X: 1, Y: 1}}, []string{"semi-axis z is 0"}},
		{"disc", Disc{Radius: 0}, []string{"disc radius is 0"}},
		{"disc height", Disc{Radius: 1, Z: nan}, []string{"disc height z is NaN"}},
		{"annulus", Annulus{Inner: 2, Outer: 2}, []string{"annulus inner radius 2"}},
		{"placed", At(Sphere{}, Pose{}), []string{"sphere radius is 0"}},
		{"placed sheet", SheetAt(Disc{}, Pose{}), []string{"disc radius is 0"}},

		{"polygon of two", Polygon{Vertices: square[:2]}, []string{"polygon has 2 vertices", "at least 3"}},
		{"polygon NaN", Polygon{Vertices: with(square, r3.Vec{Y: nan})}, []string{"vertex 4 coordinate y is NaN"}},
		{"polygon far", Polygon{Vertices: with(square, r3.Vec{Z: 1e70})}, []string{"vertex 4 coordinate z", "another unit"}},
		{"polygon repeated", Polygon{Vertices: with(square, square[3])}, []string{"vertices 3 and 4 coincide"}},
		{"polygon closed by hand", Polygon{Vertices: with(square, square[0])}, []string{"vertices 4 and 0 coincide"}},
		{"polygon on a line", Polygon{Vertices: []r3.Vec{{}, {X: 1, Y: 2, Z: 3}, {X: 2, Y: 4, Z: 6}}}, []string{"turns back on itself"}},
		{"polygon spike", Polygon{Vertices: []r3.Vec{{}, {X: 1}, {X: 1, Y: 1}, {X: 1, Y: 0.5}, {Y: 1}}}, []string{"turns back on itself at vertex 2"}},
		{"polygon bow tie", Polygon{Vertices: []r3.Vec{{}, {X: 1, Y: 1}, {X: 1}, {Y: 1}}}, []string{"encloses no area", "edges cross"}},
		{"polygon crossed", Polygon{Vertices: []r3.Vec{{}, {X: 3}, {X: 3, Y: 2}, {X: 1, Y: 2}, {X: 1, Y: -1}, {Y: -1}}}, []string{"edges 0-1 and 3-4 cross"}},
		{"polygon touching itself", Polygon{Vertices: []r3.Vec{{}, {X: 2}, {X: 2, Y: 2}, {X: 1, Y: 0}, {Y: 2}}}, []string{"cross or touch"}},
		{"polygon bent", Polygon{Vertices: []r3.Vec{{}, {X: 1}, {X: 1, Y: 1, Z: 1e-9}, {Y: 1}}}, []string{"not plane", "vertex", "triangles"}},
		{"polygon low count", Polygon{Vertices: square, Low: make([]r3.Vec, 3)}, []string{"3 low parts for 4 vertices"}},
		{"polygon low size", Polygon{Vertices: square, Low: []r3.Vec{{}, {X: 1e-3}, {}, {}}}, []string{"vertex 1", "low part 0.001"}},
		{"polygon low NaN", Polygon{Vertices: square, Low: []r3.Vec{{}, {X: nan}, {}, {}}}, []string{"vertex 1", "low part NaN"}},
		{"polygon tiny", Polygon{Vertices: []r3.Vec{{}, {X: 1e-80}, {Y: 1e-80}}}, []string{"across", "another unit"}},

		{"prism of two", Prism{Base: ell[:2], Height: 1}, []string{"prism base has 2 vertices"}},
		{"prism height", Prism{Base: ell, Height: -1}, []string{"prism height is -1"}},
		{"prism slope", Prism{Base: ell, Height: 1, TopSlope: [2]float64{0, nan}}, []string{"prism top slope b is NaN"}},
		{"prism bottom slope", Prism{Base: ell, Height: 1, BottomSlope: [2]float64{inf, 0}}, []string{"prism bottom slope a is +Inf"}},
		{"prism base NaN", Prism{Base: [][2]float64{{0, 0}, {1, nan}, {0, 1}}, Height: 1}, []string{"prism base vertex 1 coordinate y is NaN"}},
		{"prism base crossed", Prism{Base: [][2]float64{{0, 0}, {2, 1}, {2, 0}, {0, 3}}, Height: 1}, []string{"prism base edges 0-1 and 2-3 cross"}},
		{"prism base repeated", Prism{Base: [][2]float64{{0, 0}, {1, 0}, {1, 0}, {0, 1}}, Height: 1}, []string{"vertices 1 and 2 coincide"}},
		{"prism ends meet", Prism{Base: ell, Height: 1, TopSlope: [2]float64{-0.5, 0}}, []string{"ends meet at base vertex 1 (2, 0)", "height is 0"}},
		{"prism ends cross", Prism{Base: ell, Height: 1, BottomSlope: [2]float64{0, 0.75}}, []string{"ends meet at base vertex 4", "height is -0.5"}},

		{"polyhedron of three faces", Polyhedron{Vertices: square, Loops: cube.Loops[:3]}, []string{"3 faces", "at least 4"}},
		{"polyhedron index", edited(func(p *Polyhedron) { p.Loops[2][1] = 8 }), []string{"face 2 names vertex 8", "0 to 7"}},
		{"polyhedron negative index", edited(func(p *Polyhedron) { p.Loops[0][0] = -1 }), []string{"face 0 names vertex -1"}},
		{"polyhedron short face", edited(func(p *Polyhedron) { p.Loops[5] = []int{0, 1} }), []string{"face 5 has 2 vertices"}},
		{"polyhedron NaN", edited(func(p *Polyhedron) { p.Vertices[3].Z = nan }), []string{"polyhedron vertex 3 coordinate z is NaN"}},
		{"polyhedron unused vertex", edited(func(p *Polyhedron) { p.Vertices = with(p.Vertices, r3.Vec{}) }), []string{"vertex 8 belongs to no face"}},
		{"polyhedron vertex twice", edited(func(p *Polyhedron) { p.Loops[4] = []int{0, 2, 3, 1, 2} }), []string{"face 4 visits vertex 2 twice", "hole"}},
		{"polyhedron open", edited(func(p *Polyhedron) { p.Loops = p.Loops[:5] }), []string{"edge", "belongs to face 0 only", "open"}},
		{"polyhedron face reversed", edited(func(p *Polyhedron) { reverse(p.Loops[3]) }), []string{"faces", "and 3 both run from vertex", "reverse one"}},
		{"polyhedron coincident", edited(func(p *Polyhedron) { p.Vertices[1] = p.Vertices[0] }), []string{"vertices 0 and 1 coincide"}},
		{"polyhedron bent face", edited(func(p *Polyhedron) { p.Vertices[7].Z += 1e-6 }), []string{"polyhedron face", "not plane"}},
		{"polyhedron inverted", inverted(cube), []string{"clockwise seen from outside", "reverse them"}},
		{"one of two inverted", joined(cube, inverted(moved(cube, r3.Vec{X: 3}))), []string{"clockwise seen from outside", "face 6"}},
		{"cavity like a body", joined(Box{Size: r3.Vec{X: 4, Y: 4, Z: 4}}.Polyhedron(), cube), []string{"cavity", "face 6", "reverse"}},
		{"bar through a cube", joined(cube, bar), []string{"cross or touch", "goes through face"}},
		{"cubes overlapping at a corner", joined(cube, moved(cube, r3.Vec{X: 0.5, Y: 0.3, Z: 0.4})), []string{"cross or touch"}},
		{"cubes glued in part", joined(cube, moved(cube, r3.Vec{X: 1, Y: 0.5, Z: 0.25})), []string{"cross or touch"}},
		{"bar standing on a cube", joined(cube, moved(bar, r3.Vec{Z: 2})), []string{"faces 5 and 6 cross or touch", "vertex 8 is on face 5"}},
		{"bars glued crosswise", joined(Box{Size: r3.Vec{X: 4, Y: 1, Z: 1}}.Polyhedron(), moved(Box{Size: r3.Vec{X: 1, Y: 4, Z: 1}}.Polyhedron(), r3.Vec{Z: 1})), []string{"cross or touch"}},
		{"ridges that touch crosswise", joined(
			Polyhedron{Vertices: []r3.Vec{{X: -1}, {X: 1}, {Y: 1, Z: -1}, {Y: -1, Z: -1}}, Loops: [][]int{{0, 2, 1}, {0, 1, 3}, {0, 3, 2}, {1, 2, 3}}},
			Polyhedron{Vertices: []r3.Vec{{Y: -1}, {Y: 1}, {X: 1, Z: 1}, {X: -1, Z: 1}}, Loops: [][]int{{0, 1, 2}, {0, 3, 1}, {0, 2, 3}, {1, 3, 2}}},
		), []string{"cross or touch", " meet)"}},
		{"cubes joined at a doubled vertex", joined(cube, moved(cube, r3.Vec{X: 1, Y: 1, Z: 1})), []string{"vertices 7 and 8 coincide"}},
		{"flat", Polyhedron{Vertices: square, Loops: [][]int{{0, 1, 2}, {0, 2, 3}, {0, 2, 1}, {0, 3, 2}}}, []string{"belongs to 4 faces"}},
		{"thinner than rounding", Polyhedron{
			Vertices: []r3.Vec{{}, {X: 1}, {Y: 1}, {X: 0.3, Y: 0.3, Z: 3e-15}},
			Loops:    tetrahedron().Loops,
		}, []string{"encloses no volume", "face 0", "thickness"}},
		{"flap", Polyhedron{
			Vertices: with(square, r3.Vec{X: 0.2, Y: 0.8, Z: -1}),
			Loops:    [][]int{{0, 1, 2, 3}, {0, 2, 1}, {0, 3, 4}, {3, 2, 4}, {2, 0, 4}},
		}, []string{"cross or touch", "edge 0-2 is on face 0"}},
		{"flat folded", Polyhedron{Vertices: square, Loops: [][]int{{0, 1, 2}, {0, 2, 3}, {0, 3, 1}, {1, 3, 2}}}, []string{"cross or touch"}},
		{"three cubes at an edge", Polyhedron{
			Vertices: with(square, r3.Vec{Z: 1}, r3.Vec{X: 1, Z: 1}),
			Loops:    [][]int{{0, 1, 2}, {0, 2, 1}, {0, 1, 4}, {0, 4, 1}, {3, 5, 1}},
		}, []string{"edge 0-1 belongs to 4 faces"}},
	}
	if len(cases) < 40 {
		t.Fatalf("only %d cases", len(cases))
	}
	for _, c := range cases {
		err := c.bad.Check()
		if err == nil {
			t.Errorf("%s: no error", c.name)
			continue
		}
		message := err.Error()
		if !strings.HasPrefix(message, "geom: ") || strings.Contains(message, "\n") {
			t.Errorf("%s: %q is not one line with the prefix of the package", c.name, message)
		}
		for _, want := range c.wants {
			if !strings.Contains(message, want) {
				t.Errorf("%s: %q does not say %q", c.name, message, want)
			}
		}
	}
}

// What looks odd and is right passes.
func TestCheckAccepts(t *testing.T) {
	third := 1.0 / 3
	far := moved(Box{Size: r3.Vec{X: 1, Y: 1, Z: 1}}.Polyhedron(), r3.Vec{X: 12345.1, Y: -54321.3, Z: 1e6 + 0.7})
	corner := joined(edited(func(*Polyhedron) {}), moved(edited(func(*Polyhedron) {}), r3.Vec{X: 1, Y: 1, Z: 1}))
	for _, face := range corner.Loops { // one number for the common corner, the last vertex takes the free place
		for k, i := range face {
			switch i {
			case 8:
				face[k] = 7
			case 15:
				face[k] = 8
			}
		}
	}
	corner.Vertices[8] = corner.Vertices[15]
	corner.Vertices = corner.Vertices[:15]
	cases := []struct {
		name string
		good checker
	}{
		{"vertex on a straight edge", Polygon{Vertices: []r3.Vec{{}, {X: 0.5}, {X: 1}, {X: 1, Y: 1}, {Y: 1}}}},
		{"decimals of a tilted plane", Polygon{Vertices: []r3.Vec{ // x + 2 y + 3 z = 1 at decimals
			{X: 0.1, Y: 0.3, Z: 0.1}, {X: 0.7, Y: 0.3, Z: -0.1}, {X: 0.9, Y: 0.8, Z: -0.5}, {X: 0.3, Y: 0.8, Z: -0.3}}}},
		{"the same far off", Polygon{Vertices: []r3.Vec{
			{X: 1000.1, Y: 0.3, Z: 0.1}, {X: 1000.7, Y: 0.3, Z: -0.1}, {X: 1000.9, Y: 0.8, Z: -0.5}, {X: 1000.3, Y: 0.8, Z: -0.3}}}},
		{"clockwise base", Prism{Base: star, Height: 1}},
		{"ends that nearly meet", Prism{Base: [][2]float64{{0, 0}, {3, 0}, {0, 3}}, Height: 1, TopSlope: [2]float64{-third, 0}}},
		{"film", Box{Size: r3.Vec{X: 1, Y: 1, Z: 1e-12}}},
		{"thin tube", Tube{Inner: 1, Outer: 1 + 1e-12, Height: 1}},
		{"cavity", cavity()},
		{"two apart", joined(tetrahedron(), moved(tetrahedron(), r3.Vec{X: 5}))},
		{"two that share a corner", corner},
		{"body in a cavity", joined(cavity(), Box{Size: r3.Vec{X: 1, Y: 1.9, Z: 1}}.Polyhedron())},
		{"far from the origin", far},
		{"seams", triangulated(Box{Size: r3.Vec{X: 1, Y: 2, Z: 3}})},
		{"sphere of triangles", geodesic(3)},
		{"prism as polyhedron", Prism{Base: star, Height: 1.1, BottomSlope: [2]float64{0.1, -0.2}, TopSlope: [2]float64{0.3, 0.07}}.Polyhedron()},
	}
	for _, c := range cases {
		if err := c.good.Check(); err != nil {
			t.Errorf("%s: %v", c.name, err)
		}
	}
}

// The ends of this prism meet at a vertex but for the rounding of 1/3 in its slope: the height there is 1 - 3 fl(1/3),
// which is 2^-54 exactly and 0 in float64.
func TestPrismEndsExact(t *testing.T) {
	p := Prism{Base: [][2]float64{{0, 0}, {3, 0}, {0, 3}}, Height: 1, TopSlope: [2]float64{-1.0 / 3, 0}}
	if err := p.Check(); err != nil {
		t.Errorf("slope just below 1/3: %v", err)
	}
	p.TopSlope[0] = math.Nextafter(p.TopSlope[0], -1)
	if err := p.Check(); err == nil || !strings.Contains(err.Error(), "base vertex 1") {
		t.Errorf("slope just above 1/3: got %v, want ends that meet at base vertex 1", err)
	}
}

// geodesic returns an octahedron whose faces were cut in four n times and drawn out to the unit sphere.
func geodesic(n int) Polyhedron {
	p := Polyhedron{
		Vertices: []r3.Vec{{X: 1}, {X: -1}, {Y: 1}, {Y: -1}, {Z: 1}, {Z: -1}},
		Loops:    [][]int{{0, 2, 4}, {2, 1, 4}, {1, 3, 4}, {3, 0, 4}, {2, 0, 5}, {1, 2, 5}, {3, 1, 5}, {0, 3, 5}},
	}
	for range n {
		middles := make(map[edge]int)
		middle := func(i, j int) int {
			e, _ := edgeOf(i, j)
			if k, ok := middles[e]; ok {
				return k
			}
			p.Vertices = append(p.Vertices, r3.Unit(r3.Add(p.Vertices[i], p.Vertices[j])))
			middles[e] = len(p.Vertices) - 1
			return middles[e]
		}
		var loops [][]int
		for _, f := range p.Loops {
			a, b, c := middle(f[0], f[1]), middle(f[1], f[2]), middle(f[2], f[0])
			loops = append(loops, []int{f[0], a, c}, []int{a, f[1], b}, []int{c, b, f[2]}, []int{a, b, c})
		}
		p.Loops = loops
	}
	return p
}

func FuzzPolyhedronCheck(f *testing.F) {
	f.Add([]byte{0, 0, 0, 1, 0, 0, 0, 1, 0, 0, 0, 1}, []byte{0, 2, 1, 255, 0, 1, 3, 255, 0, 3, 2, 255, 1, 2, 3}, 1.0)
	f.Add([]byte{0, 0, 0, 1, 0, 0, 1, 1, 0, 0, 1, 0}, []byte{0, 1, 2, 255, 0, 2, 3, 255, 0, 3, 1, 255, 1, 3, 2}, 1e-3)
	f.Add([]byte{0, 0, 0, 1, 0, 0, 1, 1, 0, 0, 1, 7}, []byte{0, 1, 255, 255, 9, 2, 3, 255}, math.Inf(1))
	f.Add([]byte{}, []byte{}, math.NaN())
	f.Fuzz(func(t *testing.T, coordinates, numbers []byte, scale float64) {
		if len(coordinates) > 90 || len(numbers) > 200 {
			return
		}
		var p Polyhedron
		for i := 0; i+2 < len(coordinates); i += 3 {
			c := coordinates[i:]
			p.Vertices = append(p.Vertices, r3.Scale(scale, r3.Vec{X: float64(int8(c[0])), Y: float64(int8(c[1])), Z: float64(int8(c[2]))}))
		}
		face := []int{}
		for _, b := range numbers {
			if b == 255 {
				p.Loops = append(p.Loops, face)
				face = []int{}
				continue
			}
			face = append(face, int(int8(b)))
		}
		p.Loops = append(p.Loops, face)
		if err := p.Check(); err != nil {
			if !strings.HasPrefix(err.Error(), "geom: ") {
				t.Errorf("error without prefix: %v", err)
			}
			return
		}
		// What passes is a body: positive volume, centroid inside the bounds.
		if v := p.Volume(); !(v > 0) {
			t.Errorf("%v passes with volume %v", p, v)
		}
		if beyond(p.Bounds(), p.Centroid(), 1e-9*diameter(p.Bounds())) {
			t.Errorf("%v passes with centroid %v", p, p.Centroid())
		}
	})
}

func BenchmarkPolyhedronCheck(b *testing.B) {
	p := geodesic(4) // 2048 faces
	for b.Loop() {
		if err := p.Check(); err != nil {
			b.Fatal(err)
		}
	}
}
