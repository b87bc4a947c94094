package geom

import (
	"math"
	"math/rand/v2"
	"strings"
	"testing"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/num/dual"
	"gonum.org/v1/gonum/spatial/r3"
)

var (
	_ Body    = &Parametric{}
	_ Charted = Patch{}
	_ Blocked = CurvedPyramid{}
)

// globe is a sphere of radius a in longitude and latitude, by differences; its poles are drawn together.
func globe(a float64) Patch {
	return Patch{Parts: [2]int{4, 2}, Point: func(u, v float64) r3.Vec {
		sin, cos := math.Sincos(2 * math.Pi * u)
		up, flat := math.Sincos(math.Pi * (v - 0.5))
		return r3.Vec{X: a * flat * cos, Y: a * flat * sin, Z: a * up}
	}}
}

// ring is a torus by dual numbers.
func ring(major, minor float64) Patch {
	p := DualPatch(func(u, v dual.Number) (x, y, z dual.Number) {
		a, b := dual.Scale(2*math.Pi, u), dual.Scale(2*math.Pi, v)
		s := dual.Add(dual.Number{Real: major}, dual.Scale(minor, dual.Cos(b)))
		return dual.Mul(s, dual.Cos(a)), dual.Mul(s, dual.Sin(a)), dual.Scale(minor, dual.Sin(b))
	})
	p.Parts = [2]int{4, 4}
	return p
}

// mantle is the wall of a cone with its tip at the height h, by given derivatives.
func mantle(a, h float64) Patch {
	return Patch{
		Parts: [2]int{4, 1},
		Point: func(u, v float64) r3.Vec {
			sin, cos := math.Sincos(2 * math.Pi * u)
			return r3.Vec{X: a * (1 - v) * cos, Y: a * (1 - v) * sin, Z: h * v}
		},
		Tangents: func(u, v float64) (xu, xv r3.Vec) {
			sin, cos := math.Sincos(2 * math.Pi * u)
			w := 2 * math.Pi * a * (1 - v)
			return r3.Vec{X: -w * sin, Y: w * cos}, r3.Vec{X: -a * cos, Y: -a * sin, Z: h}
		},
	}
}

// vault is the unit square under the surface z = 1 + x y/2, of patches and polygons.
func vault() []Face {
	roof := Patch{Point: func(u, v float64) r3.Vec { return r3.Vec{X: u, Y: v, Z: 1 + u*v/2} }}
	side := func(at func(t float64) (x, y float64)) Patch {
		return Patch{Point: func(u, v float64) r3.Vec {
			x, y := at(u)
			return r3.Vec{X: x, Y: y, Z: v * (1 + x*y/2)}
		}}
	}
	return []Face{
		{Name: "floor", Surface: Polygon{Vertices: square}, Inward: true},
		{Name: "roof", Surface: roof},
		{Name: "-y", Surface: side(func(t float64) (x, y float64) { return t, 0 })},
		{Name: "+x", Surface: side(func(t float64) (x, y float64) { return 1, t })},
		{Name: "+y", Surface: side(func(t float64) (x, y float64) { return t, 1 }), Inward: true},
		{Name: "-x", Surface: side(func(t float64) (x, y float64) { return 0, t }), Inward: true},
	}
}

// parametrics are bodies of patches beside the same bodies in closed form.
func parametrics(t *testing.T) []struct {
	name string
	body *Parametric
	want Body
} {
	t.Helper()
	build := func(faces ...Face) *Parametric {
		p, err := NewParametric(faces)
		if err != nil {
			t.Fatal(err)
		}
		return p
	}
	lift := Translate(r3.Vec{Z: 0.35})
	sheared := Box{Size: r3.Vec{X: 1, Y: 1, Z: 1}}.Polyhedron()
	for i := range sheared.Vertices {
		v := &sheared.Vertices[i]
		v.X += 3*v.Y + v.Z
		v.Y -= 2 * v.Z
	}
	return []struct {
		name string
		body *Parametric
		want Body
	}{
		{"globe", build(Face{Name: "surface", Surface: globe(1.1)}), Sphere{Radius: 1.1}},
		{"ring", build(Face{Name: "surface", Surface: ring(1.1, 0.3)}), Torus{Major: 1.1, Minor: 0.3}},
		{"mantle", build(Face{Name: "bottom", Surface: Disc{Radius: 0.9}, Inward: true}, Face{Name: "wall", Surface: mantle(0.9, 0.7)}), At(Cone{Bottom: 0.9, Height: 0.7}, lift)},
		{"own box", build(Box{Size: r3.Vec{X: 1, Y: 2, Z: 3}}.Faces()...), Box{Size: r3.Vec{X: 1, Y: 2, Z: 3}}},
		{"sheared box", build(sheared.Faces()...), sheared},
		{"own arc", build(ArcDegrees(0.3, 0.7, 1.3, -30, 150).Faces()...), ArcDegrees(0.3, 0.7, 1.3, -30, 150)},
	}
}

func TestParametricMoments(t *testing.T) {
	for _, c := range parametrics(t) {
		size, v := diameter(c.want.Bounds()), c.want.Volume()
		if err := c.body.Check(); err != nil {
			t.Errorf("%s: %v", c.name, err)
		}
		if got := c.body.Volume(); !near(got, v, 1e-11*v) { // derivatives by differences are good to 1e-12
			t.Errorf("%s: volume %v, want %v", c.name, got, v)
		}
		if d := r3.Norm(r3.Sub(c.body.Centroid(), c.want.Centroid())); d > 1e-11*size { // as above
			t.Errorf("%s: centroid %v, want %v", c.name, c.body.Centroid(), c.want.Centroid())
		}
		got, want := c.body.SecondMoment(), c.want.SecondMoment()
		for i := range got {
			for j := range got {
				if !near(got[i][j], want[i][j], 1e-11*v*size*size) { // as above
					t.Errorf("%s: second moment [%d][%d] %v, want %v", c.name, i, j, got[i][j], want[i][j])
				}
			}
		}
		cells, blocks := 0.0, 0.0
		for _, cell := range c.body.Cells() {
			cells += cell.Volume()
			sum, _ := overBlocks(cell.(Blocked).Blocks(), 12, func(r3.Vec) float64 { return 1 })
			blocks += sum
		}
		if !near(cells, v, 1e-11*v) || !near(blocks, v, 1e-11*v) { // as above
			t.Errorf("%s: cells sum to %v, blocks to %v, want %v", c.name, cells, blocks, v)
		}
		box, want3 := c.body.Bounds(), c.want.Bounds()
		if beyond(box, want3.Min, 0) || beyond(box, want3.Max, 0) || diameter(box) > 1.1*diameter(want3) { // second differences of quarters in eighths
			t.Errorf("%s: bounds %v, want a little more than %v", c.name, box, want3)
		}
	}
	p, err := NewParametric(vault())
	if err != nil {
		t.Fatal(err)
	}
	if v := p.Volume(); !near(v, 1.125, 1e-12) { // 1 + 1/8; derivatives by differences are good to 1e-12
		t.Errorf("vault: volume %v, want 1.125", v)
	}
}

// A parametric body tells the same as the closed form at random points, and 1e-12 off its faces on both sides.
func TestParametricLocate(t *testing.T) {
	rng := rand.New(rand.NewPCG(61, 62))
	for _, c := range parametrics(t) {
		box := c.want.Bounds()
		size := diameter(box)
		count := [3]int{}
		for range 200 {
			x := r3.Vec{
				X: box.Min.X + (box.Max.X-box.Min.X)*(1.2*rng.Float64()-0.1),
				Y: box.Min.Y + (box.Max.Y-box.Min.Y)*(1.2*rng.Float64()-0.1),
				Z: box.Min.Z + (box.Max.Z-box.Min.Z)*(1.2*rng.Float64()-0.1),
			}
			want := c.want.Locate(pair.VecOf(x), 0)
			if got := c.body.Locate(pair.VecOf(x), 0); got.Region != want.Region {
				t.Errorf("%s: %v: got %+v, want %+v", c.name, x, got, want)
			}
			count[want.Region]++
		}
		if count[Inside] < 3 || count[Outside] < 5 {
			t.Errorf("%s: only %d points inside and %d outside were tried", c.name, count[Inside], count[Outside])
		}
		for f, face := range c.want.Faces() {
			i := 0
			face.Surface.Nodes(2, func(x, normal r3.Vec, _ float64) {
				if i++; i%3 != 0 {
					return
				}
				out := r3.Scale(face.Sign(), normal)
				for d, want := range map[float64]Region{-1e-3: Inside, -1e-12: Inside, 1e-12: Outside, 1e-3: Outside} {
					at := pair.VecOf(x).Add(pair.VecOf(r3.Scale(d*size, out)))
					if got := c.body.Locate(at, 0); got.Region != want {
						t.Errorf("%s: %v %+v sizes off face %d: got %+v", c.name, x, d, f, got)
					}
				}
				got := c.body.Locate(pair.VecOf(x), 1e-15*size) // the functions of the faces round
				if got.Region != On || got.Face != f || got.Edge || r3.Norm(r3.Sub(got.Normal, out)) > 1e-9 {
					t.Errorf("%s: %v: got %+v, want on face %d with normal %v", c.name, x, got, f, out)
				}
			})
		}
	}
}

// Poles are smooth, tips, rims and corners are edges, and what lies over them is outside.
func TestParametricEdges(t *testing.T) {
	all := parametrics(t)
	globe, mantle, box := all[0].body, all[2].body, all[3].body
	cases := []struct {
		name string
		body *Parametric
		x    r3.Vec
		want Place
	}{
		{"pole", globe, r3.Vec{Z: 1.1}, Place{Region: On, Normal: r3.Vec{Z: 1}}},
		{"over the pole", globe, r3.Vec{Z: 1.1 + 1e-12}, outside()},
		{"under the pole", globe, r3.Vec{Z: 1.1 - 1e-12}, inside()},
		{"centre", globe, r3.Vec{}, inside()},
		{"tip", mantle, r3.Vec{Z: 0.7}, onEdge()},
		{"over the tip", mantle, r3.Vec{Z: 0.7 + 1e-12}, outside()},
		{"under the tip", mantle, r3.Vec{Z: 0.7 - 1e-12}, inside()},
		{"rim", mantle, r3.Vec{X: 0.9}, onEdge()},
		{"beyond the rim", mantle, r3.Vec{X: 0.9 + 1e-12}, outside()},
		{"within the rim", mantle, r3.Vec{X: 0.9 - 2e-12, Z: 1e-13}, inside()},
		{"corner", box, r3.Vec{X: 0.5, Y: -1, Z: 1.5}, onEdge()},
		{"beyond the corner", box, r3.Vec{X: 0.5 + 1e-12, Y: -1 - 1e-12, Z: 1.5 + 1e-12}, outside()},
		{"within the corner", box, r3.Vec{X: 0.5 - 1e-12, Y: -1 + 2e-12, Z: 1.5 - 1e-12}, inside()},
		{"not finite", box, r3.Vec{X: math.NaN()}, outside()},
	}
	for _, c := range cases {
		got := c.body.Locate(pair.VecOf(c.x), 0)
		if r3.Norm(r3.Sub(got.Normal, c.want.Normal)) > 1e-4 { // taken 1e-5 beside the pole
			t.Errorf("%s: normal %v, want %v", c.name, got.Normal, c.want.Normal)
		}
		got.Normal = c.want.Normal
		if got != c.want {
			t.Errorf("%s: got %+v, want %+v", c.name, got, c.want)
		}
	}
}

// Derivatives by differences are good to 1e-12 of the size all over the square, for a whole turn.
func TestPatchDifferences(t *testing.T) {
	exact := ring(1.1, 0.3)
	rough := Patch{Point: func(u, v float64) r3.Vec {
		if clamp(u) != u || clamp(v) != v {
			t.Errorf("asked for the point at (%v, %v), outside the square", u, v)
		}
		return exact.Point(u, v)
	}}
	worst := 0.0
	for i := range 41 {
		for j := range 41 {
			u, v := float64(i)/40, float64(j)/40
			xu, xv := exact.tangents(u, v)
			du, dv := rough.tangents(u, v)
			worst = max(worst, r3.Norm(r3.Sub(xu, du)), r3.Norm(r3.Sub(xv, dv)))
		}
	}
	if scale := 2 * math.Pi * 1.4; worst > 1e-12*scale { // the bound of the documentation
		t.Errorf("derivatives are %v of the size off", worst/scale)
	}
}

func TestParametricRefuses(t *testing.T) {
	without := func(f int) []Face {
		faces := vault()
		return append(faces[:f:f], faces[f+1:]...)
	}
	turned := func(f int) []Face {
		faces := vault()
		faces[f].Inward = !faces[f].Inward
		return faces
	}
	all := vault()
	for f := range all {
		all[f].Inward = !all[f].Inward
	}
	single := func(s Surface) []Face { return []Face{{Name: "lid", Surface: s}} }
	wrong := mantle(1, 1)
	wrong.Tangents = func(u, v float64) (xu, xv r3.Vec) { return r3.Vec{X: 1}, r3.Vec{Y: 1} }
	cases := []struct {
		name  string
		faces []Face
		cells []Cell
		wants []string
	}{
		{"none", nil, nil, []string{"no faces"}},
		{"open", without(1), nil, []string{"open", "missing face"}},
		{"open pipe", single(Wall{Radius: 1, Z1: -1, Z2: 1}), nil, []string{"along x, y and z", "missing face"}},
		{"one turned", turned(3), nil, []string{"open", "reversed"}},
		{"all turned", all, nil, []string{"turned inward", "Inward"}},
		{"cells", vault(), []Cell{Box{Size: r3.Vec{X: 1, Y: 1, Z: 1}}}, []string{"volume 1.125", "cells add up to 1", "fill"}},
		{"no charts", single(bare{}), nil, []string{"face 0 (lid)", "without charts", "Patch"}},
		{"no function", single(Patch{}), nil, []string{"face 0 (lid)", "no function Point"}},
		{"negative parts", single(Patch{Point: globe(1).Point, Parts: [2]int{-1, 1}}), nil, []string{"parts [-1 1]"}},
		{"NaN", single(Patch{Point: func(u, v float64) r3.Vec { return r3.Vec{X: math.Sqrt(0.4 - u), Y: v} }}), nil, []string{"patch point", "coordinate x is NaN", "finite"}},
		{"wrong derivatives", single(wrong), nil, []string{"differences give", "correct Tangents"}},
		{"no normal", single(Patch{Point: func(u, v float64) r3.Vec { return r3.Vec{X: u + v} }}), nil, []string{"no normal at (0.5, 0.5)", "cut it"}},
		{"kink", single(Patch{Point: func(u, v float64) r3.Vec { return r3.Vec{X: u, Y: v, Z: math.Abs(u - 0.61)} }}), nil, []string{"settle", "kinks"}},
		{"bad polygon", single(Polygon{Vertices: square[:2]}), nil, []string{"face 0 (lid)", "polygon has 2 vertices"}},
	}
	for _, c := range cases {
		p, err := NewParametric(c.faces, c.cells...)
		if err == nil || p != nil {
			t.Errorf("%s: accepted", c.name)
			continue
		}
		for _, want := range c.wants {
			if !strings.Contains(err.Error(), want) {
				t.Errorf("%s: error %q does not say %q", c.name, err, want)
			}
		}
		if !strings.HasPrefix(err.Error(), "geom: ") {
			t.Errorf("%s: error %q lacks the prefix", c.name, err)
		}
	}
	if err := (&Parametric{}).Check(); err == nil {
		t.Error("a body that NewParametric did not make is accepted")
	}
}
