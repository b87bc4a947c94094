package geom

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"
)

// sums returns volume, centroid and second moment about the centroid from the nodes of the cells.
func sums(b Body) (volume float64, c r3.Vec, m [3][3]float64) {
	each := func(visit func(x r3.Vec, w float64)) {
		for _, cell := range b.Cells() {
			cell.Nodes(2, visit) // degree 2 suffices
		}
	}
	each(func(x r3.Vec, w float64) {
		volume += w
		c = r3.Add(c, r3.Scale(w, x))
	})
	c = r3.Scale(1/volume, c)
	each(func(x r3.Vec, w float64) {
		d := r3.Sub(x, c)
		v := [3]float64{d.X, d.Y, d.Z}
		for i := range v {
			for j := range v {
				m[i][j] += w * v[i] * v[j]
			}
		}
	})
	return volume, c, m
}

func TestMomentsEqualNodes(t *testing.T) {
	rng := rand.New(rand.NewPCG(1, 2))
	for _, b := range bodies() {
		for _, body := range []Body{b.body, At(b.body, randomPose(t, rng, 1))} {
			volume, c, m := sums(body)
			size := diameter(body.Bounds())
			if v := body.Volume(); !near(v, volume, 200*u*volume) { // sums of some hundred terms
				t.Errorf("%s: volume %v, nodes give %v", b.name, v, volume)
			}
			if d := r3.Norm(r3.Sub(body.Centroid(), c)); d > 200*u*size { // as above
				t.Errorf("%s: centroid %v, nodes give %v", b.name, body.Centroid(), c)
			}
			s := body.SecondMoment()
			for i := range m {
				for j := range m {
					if !near(s[i][j], m[i][j], 200*u*volume*size*size) { // as above
						t.Errorf("%s: second moment [%d][%d] %v, nodes give %v", b.name, i, j, s[i][j], m[i][j])
					}
				}
			}
		}
	}
}

func TestMomentsByHand(t *testing.T) {
	// A square base of edge 2 about the origin with the top at 1 + x/2, the bottom at -1: V = 8, the centroid is at
	// int x (2 + x/2) dA / V = (1/2)(4/3)/8 = 1/12 and int ((1+x/2)^2 - 1)/2 dA / V = (1/8)(4/3)/8 = 1/48.
	wedge := Prism{Base: [][2]float64{{-1, -1}, {1, -1}, {1, 1}, {-1, 1}}, Height: 2, TopSlope: [2]float64{0.5, 0}}
	cases := []struct {
		name     string
		body     Body
		volume   float64
		centroid r3.Vec
		moment   [3][3]float64 // not compared if zero
	}{
		{"box", Box{Size: r3.Vec{X: 1, Y: 2, Z: 3}}, 6, r3.Vec{}, [3][3]float64{{0.5, 0, 0}, {0, 2, 0}, {0, 0, 4.5}}},
		{"cylinder", Cylinder{Radius: 2, Height: 3}, 12 * math.Pi, r3.Vec{}, [3][3]float64{{12 * math.Pi, 0, 0}, {0, 12 * math.Pi, 0}, {0, 0, 9 * math.Pi}}},
		{"tube", Tube{Inner: 1, Outer: 2, Height: 3}, 9 * math.Pi, r3.Vec{}, [3][3]float64{{45 * math.Pi / 4, 0, 0}, {0, 45 * math.Pi / 4, 0}, {0, 0, 27 * math.Pi / 4}}},
		// A quarter of a ring: 4/(3 pi) (b^3 - a^3)/(b^2 - a^2) along each axis; half and none of the polar moment beside it.
		{"quarter wedge", ArcDegrees(0, 3, 2, 0, 90), 9 * math.Pi / 2, r3.Vec{X: 4 / math.Pi, Y: 4 / math.Pi}, [3][3]float64{
			{81*math.Pi/8 - 72/math.Pi, 81.0/4 - 72/math.Pi, 0}, {81.0/4 - 72/math.Pi, 81*math.Pi/8 - 72/math.Pi, 0}, {0, 0, 3 * math.Pi / 2}}},
		{"half arc", Arc{Inner: 1, Outer: 2, Height: 2, From: -math.Pi / 2, To: math.Pi / 2}, 3 * math.Pi, r3.Vec{X: 28 / (9 * math.Pi)}, [3][3]float64{
			{15*math.Pi/4 - 784/(27*math.Pi), 0, 0}, {0, 15 * math.Pi / 4, 0}, {0, 0, math.Pi}}},
		{"cone", Cone{Bottom: 2, Height: 3}, 4 * math.Pi, r3.Vec{Z: -0.75}, [3][3]float64{{12 * math.Pi / 5, 0, 0}, {0, 12 * math.Pi / 5, 0}, {0, 0, 27 * math.Pi / 20}}},
		{"torus", Torus{Major: 2, Minor: 1}, 4 * math.Pi * math.Pi, r3.Vec{}, [3][3]float64{
			{19 * math.Pi * math.Pi / 2, 0, 0}, {0, 19 * math.Pi * math.Pi / 2, 0}, {0, 0, math.Pi * math.Pi}}},
		{"sphere", Sphere{Radius: 3}, 36 * math.Pi, r3.Vec{}, [3][3]float64{{324 * math.Pi / 5, 0, 0}, {0, 324 * math.Pi / 5, 0}, {0, 0, 324 * math.Pi / 5}}},
		{"hollow sphere", HollowSphere{Inner: 1, Outer: 2}, 28 * math.Pi / 3, r3.Vec{}, [3][3]float64{{124 * math.Pi / 15, 0, 0}, {0, 124 * math.Pi / 15, 0}, {0, 0, 124 * math.Pi / 15}}},
		{"ellipsoid", Ellipsoid{SemiAxes: r3.Vec{X: 1, Y: 2, Z: 3}}, 8 * math.Pi, r3.Vec{}, [3][3]float64{{8 * math.Pi / 5, 0, 0}, {0, 32 * math.Pi / 5, 0}, {0, 0, 72 * math.Pi / 5}}},
		{"ell", Prism{Base: ell, Height: 2}, 6, r3.Vec{X: 5.0 / 6, Y: 5.0 / 6}, [3][3]float64{{11.0 / 6, -2.0 / 3, 0}, {-2.0 / 3, 11.0 / 6, 0}, {0, 0, 2}}},
		{"wedge", wedge, 8, r3.Vec{X: 1.0 / 12, Z: 1.0 / 48}, [3][3]float64{}},
		{"tetrahedron", tetrahedron(), 1.0 / 6, r3.Vec{X: 0.25, Y: 0.25, Z: 0.25}, [3][3]float64{{1.0 / 160, -1.0 / 480, -1.0 / 480}, {-1.0 / 480, 1.0 / 160, -1.0 / 480}, {-1.0 / 480, -1.0 / 480, 1.0 / 160}}},
		// (4^5 - 2^5)/12 on the diagonal
		{"cube with cavity", cavity(), 56, r3.Vec{}, [3][3]float64{{992.0 / 12, 0, 0}, {0, 992.0 / 12, 0}, {0, 0, 992.0 / 12}}},
	}
	for _, c := range cases {
		if v := c.body.Volume(); !near(v, c.volume, 4*u*c.volume) { // a few roundings of products
			t.Errorf("%s: volume %v, want %v", c.name, v, c.volume)
		}
		size := diameter(c.body.Bounds())
		if d := r3.Norm(r3.Sub(c.body.Centroid(), c.centroid)); d > 2*u*size { // one rounding a component
			t.Errorf("%s: centroid %v, want %v", c.name, c.body.Centroid(), c.centroid)
		}
		m := c.body.SecondMoment()
		if c.moment == ([3][3]float64{}) {
			continue
		}
		for i := range m {
			for j := range m {
				if !near(m[i][j], c.moment[i][j], 8*u*math.Abs(c.moment[i][i])) { // a few roundings of products
					t.Errorf("%s: second moment [%d][%d] %v, want %v", c.name, i, j, m[i][j], c.moment[i][j])
				}
			}
		}
	}
}

// A body far from its own origin keeps its digits.
func TestMomentsFarFromOrigin(t *testing.T) {
	p := tetrahedron()
	shift := r3.Vec{X: 1 << 30, Y: -1 << 29, Z: 3 << 28}
	want := p.SecondMoment()
	for i := range p.Vertices {
		p.Vertices[i] = r3.Add(p.Vertices[i], shift)
	}
	if v := p.Volume(); v != 1.0/6 {
		t.Errorf("volume %v, want %v", v, 1.0/6)
	}
	got := p.SecondMoment()
	for i := range got {
		for j := range got {
			if !near(got[i][j], want[i][j], 4*u*want[0][0]) { // the same sum up to the rounding of the result
				t.Errorf("second moment [%d][%d] %v, want %v", i, j, got[i][j], want[i][j])
			}
		}
	}
}

func TestAreas(t *testing.T) {
	cases := []struct {
		name    string
		surface Surface
		want    float64
	}{
		{"disc", Disc{Radius: 2}, 4 * math.Pi},
		{"annulus", Annulus{Inner: 1, Outer: 2}, 3 * math.Pi},
		{"wall", Wall{Radius: 2, Z1: -1, Z2: 2}, 12 * math.Pi},
		{"sphere", SphereSurface{Radius: 2}, 16 * math.Pi},
		{"sector", Sector{Inner: 1, Outer: 2, From: 1, To: 2}, 1.5},
		{"sector in degrees", Sector{Inner: 1, Outer: 2, From: 350, To: 380, Degrees: true}, math.Pi / 4},
		{"wall sector", WallSector{Radius: 2, Z1: -1, Z2: 2, From: -60, To: 0, Degrees: true}, 2 * math.Pi},
		{"cone wall", ConeWall{R1: 3, R2: 0, Z1: -2, Z2: 2}, 15 * math.Pi},
		{"truncated cone wall", ConeWall{R1: 1, R2: 4, Z1: 0, Z2: 4}, 25 * math.Pi},
		{"torus", TorusSurface{Major: 2, Minor: 1}, 8 * math.Pi * math.Pi},
		{"tilted triangle", Polygon{Vertices: []r3.Vec{{X: 1}, {Y: 1}, {Z: 1}}}, math.Sqrt(3) / 2},
		// 25 digits of 4 pi R_G((ab)^2, (ac)^2, (bc)^2) by mpmath, the first two also by integration of the element
		{"ellipsoid 1 2 3", EllipsoidSurface{r3.Vec{X: 1, Y: 2, Z: 3}}, 48.88214630258205969571955},
		{"ellipsoid 3 1 2", EllipsoidSurface{r3.Vec{X: 3, Y: 1, Z: 2}}, 48.88214630258205969571955},
		{"needle", EllipsoidSurface{r3.Vec{X: 0.5, Y: 0.5, Z: 2}}, 10.12437561618306397611809},
		{"lens", EllipsoidSurface{r3.Vec{X: 0x1p-20, Y: 1, Z: 1}}, 6.283185307262767603420316},
		{"thin needle", EllipsoidSurface{r3.Vec{X: 0x1p-20, Y: 0x1p-20, Z: 1}}, 0.00000941238823041329077878665},
		{"nearly a sphere", EllipsoidSurface{r3.Vec{X: 1, Y: 1.0625, Z: 1}}, 13.09312911540892350924648},
		{"leaf", EllipsoidSurface{r3.Vec{X: 2, Y: 1, Z: 0x1p-10}}, 12.56642912961133368337169},
		{"flat disc", EllipsoidSurface{r3.Vec{X: 2, Y: 1, Z: 1e-50}}, 4 * math.Pi},
	}
	for _, c := range cases {
		if a := c.surface.Area(); !near(a, c.want, 8*u*c.want) { // R_F and R_D are good to some u
			t.Errorf("%s: area %.17g, want %.17g, error %.2g", c.name, a, c.want, a/c.want-1)
		}
	}
}
