package geom

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"
)

// overCharts integrates f over charts by product Gauss rules, and returns the integral of |f| with it.
func overCharts(charts []Chart, n int, f func(x, normal r3.Vec) float64) (sum, size float64) {
	rule := legendre(n, 0, 1)
	for _, c := range charts {
		for _, u := range rule {
			for _, v := range rule {
				x, xu, xv := c.At(u.x, v.x)
				area := r3.Cross(xu, xv)
				a := r3.Norm(area)
				term := f(x, r3.Scale(1/a, area)) * a * u.w * v.w
				sum += term
				size += math.Abs(term)
			}
		}
	}
	return sum, size
}

// overBlocks integrates f over blocks by product Gauss rules, and returns the integral of |f| with it.
func overBlocks(blocks []Block, n int, f func(x r3.Vec) float64) (sum, size float64) {
	rule := legendre(n, 0, 1)
	for _, b := range blocks {
		for _, u := range rule {
			for _, v := range rule {
				for _, w := range rule {
					x, xu, xv, xw := b.At(u.x, v.x, w.x)
					term := f(x) * r3.Dot(r3.Cross(xu, xv), xw) * u.w * v.w * w.w
					sum += term
					size += math.Abs(term)
				}
			}
		}
	}
	return sum, size
}

// The charts of every face give the area, and the moments with each component of the normal that the nodes give, so they
// cover the face once and have its orientation.
func TestChartsEqualNodes(t *testing.T) {
	rng := rand.New(rand.NewPCG(51, 52))
	for _, b := range bodies() {
		for _, body := range []Body{b.body, At(b.body, randomPose(t, rng, 0.3))} {
			for _, face := range body.Faces() {
				s, ok := face.Surface.(Charted)
				if !ok || len(s.Charts()) == 0 {
					t.Errorf("%s %s has no charts", b.name, face.Name)
					continue
				}
				const n = 20   // enough for a sixth of a sphere
				tol := 500 * u // sums of some hundred terms
				if b.name == "ellipsoid" {
					tol = 1e-9 // its area element has roots nearer by: axes 0.3 0.7 1.1
				}
				area, _ := overCharts(s.Charts(), n, func(_, _ r3.Vec) float64 { return 1 })
				if !near(area, s.Area(), tol*area) {
					t.Errorf("%s %s: charts have the area %v, want %v", b.name, face.Name, area, s.Area())
				}
				reach := r3.Norm(body.Bounds().Max) + diameter(body.Bounds())
				for _, p := range [][3]int{{}, {1, 0, 0}, {0, 1, 0}, {0, 0, 1}, {1, 1, 0}, {0, 1, 1}} {
					for c := range 3 {
						f := func(x, normal r3.Vec) float64 {
							return monomial(r3.Scale(1/reach, x), p[0], p[1], p[2]) * [3]float64{normal.X, normal.Y, normal.Z}[c]
						}
						got, _ := overCharts(s.Charts(), n, f)
						if want, _ := onto(s, 3, f); !near(got, want, tol*area) {
							t.Errorf("%s %s: powers %v, component %d: charts give %v, nodes %v", b.name, face.Name, p, c, got, want)
						}
					}
				}
			}
		}
	}
}

// The blocks of every cell give the moments that the nodes give.
func TestBlocksEqualNodes(t *testing.T) {
	rng := rand.New(rand.NewPCG(53, 54))
	for _, b := range bodies() {
		for _, body := range []Body{b.body, At(b.body, randomPose(t, rng, 0.3))} {
			for _, cell := range body.Cells() {
				c, ok := cell.(Blocked)
				if !ok || len(c.Blocks()) == 0 {
					t.Errorf("%s: a cell has no blocks", b.name)
					continue
				}
				const n = 12                                                                                                   // enough for a sixth of a ball
				if v, size := overBlocks(c.Blocks(), n, func(r3.Vec) float64 { return 1 }); !near(v, c.Volume(), 500*u*size) { // sums of some thousand terms
					t.Errorf("%s: blocks have the volume %v, want %v", b.name, v, c.Volume())
				}
				for _, p := range [][3]int{{1, 0, 0}, {0, 1, 0}, {0, 0, 1}, {1, 1, 0}, {0, 1, 1}} {
					f := func(x r3.Vec) float64 { return monomial(x, p[0], p[1], p[2]) }
					got, size := overBlocks(c.Blocks(), n, f)
					want, _ := over([]Cell{c}, 2, f)
					if !near(got, want, 1000*u*size) { // sums of some thousand terms
						t.Errorf("%s: powers %v: blocks give %v, nodes %v", b.name, p, got, want)
					}
				}
			}
		}
	}
}

// The derivatives of charts and blocks are those of their points, and blocks are right-handed inside, but for pyramids
// that count as negative.
func TestChartDerivatives(t *testing.T) {
	rng := rand.New(rand.NewPCG(55, 56))
	const h = 0x1p-10 // error h^4 f^(5)/30 = 3e-11 for angles of pi/2 and rounding u/h = 1e-13
	slope := func(at func(d float64) r3.Vec) r3.Vec {
		near, far := r3.Sub(at(h), at(-h)), r3.Sub(at(2*h), at(-2*h))
		return r3.Scale(1/(12*h), r3.Sub(r3.Scale(8, near), far))
	}
	for _, b := range bodies() {
		body := At(b.body, randomPose(t, rng, 0.3))
		size := diameter(b.body.Bounds())
		check := func(what string, got, want r3.Vec) {
			if r3.Norm(r3.Sub(got, want)) > 1e-9*size { // the error above with some room
				t.Errorf("%s: %s: derivative %v, differences give %v", b.name, what, got, want)
			}
		}
		parameter := func() float64 { return 0.01 + 0.98*rng.Float64() }
		for _, face := range body.Faces() {
			for _, c := range face.Surface.(Charted).Charts() {
				at := func(u, v float64) r3.Vec { x, _, _ := c.At(u, v); return x }
				u, v := parameter(), parameter()
				_, xu, xv := c.At(u, v)
				check(face.Name, xu, slope(func(d float64) r3.Vec { return at(u+d, v) }))
				check(face.Name, xv, slope(func(d float64) r3.Vec { return at(u, v+d) }))
			}
		}
		for _, cell := range body.Cells() {
			for _, c := range cell.(Blocked).Blocks() {
				at := func(u, v, w float64) r3.Vec { x, _, _, _ := c.At(u, v, w); return x }
				u, v, w := parameter(), parameter(), parameter()
				_, xu, xv, xw := c.At(u, v, w)
				check("cell", xu, slope(func(d float64) r3.Vec { return at(u+d, v, w) }))
				check("cell", xv, slope(func(d float64) r3.Vec { return at(u, v+d, w) }))
				check("cell", xw, slope(func(d float64) r3.Vec { return at(u, v, w+d) }))
				if det := r3.Dot(r3.Cross(xu, xv), xw); det > 0 != (cell.Volume() > 0) {
					t.Errorf("%s: determinant %v in a cell of volume %v", b.name, det, cell.Volume())
				}
			}
		}
	}
}

// Sheets have charts, in any pose.
func TestSheetCharts(t *testing.T) {
	rng := rand.New(rand.NewPCG(57, 58))
	for _, s := range []Sheet{Disc{Radius: 2, Z: 1}, Annulus{Inner: 1, Outer: 2}, Polygon{Vertices: square}} {
		placed := SheetAt(s, randomPose(t, rng, 1))
		area, _ := overCharts(placed.Charts(), 8, func(_, _ r3.Vec) float64 { return 1 })
		if !near(area, s.Area(), 100*u*area) { // sums of some hundred terms
			t.Errorf("%T: charts have the area %v, want %v", s, area, s.Area())
		}
	}
}

// Placing what has no charts or blocks gives none.
func TestPlacedWithoutCharts(t *testing.T) {
	if c := (PlacedSurface{Surface: bare{}}).Charts(); c != nil {
		t.Errorf("charts %v", c)
	}
	if b := (PlacedCell{Cell: struct{ Cell }{Box{}}}).Blocks(); b != nil {
		t.Errorf("blocks %v", b)
	}
}

// bare is a surface without charts.
type bare struct{ Surface }

// The lines of a chart that lie on a rim are those of the rim: the ends of quarter turns are exact, and pieces of arcs
// meet to rounding.
func TestChartRims(t *testing.T) {
	for k, c := range (Wall{Radius: 0.7, Z1: -0.3, Z2: 0.9}).Charts() {
		e := direction{cos: 1}.quarterTurns(k)
		for v, z := range map[float64]float64{0: -0.3, 1: 0.9} {
			if x, _, _ := c.At(0, v); x != (r3.Vec{X: 0.7 * e.cos, Y: 0.7 * e.sin, Z: z}) {
				t.Errorf("chart %d starts at %v at the height %v", k, x, z)
			}
			if x, _, _ := c.At(0.3, v); x.Z != z || !near(math.Hypot(x.X, x.Y), 0.7, 2*u) { // rounding of x, y and the root
				t.Errorf("chart %d: rim point %v at the height %v", k, x, z)
			}
		}
	}
	s := Sector{Inner: 1, Outer: 2, From: 10, To: 280, Degrees: true}
	charts := s.Charts()
	if len(charts) != 3 {
		t.Fatalf("%d charts of three quarter turns", len(charts))
	}
	from, to := s.Ends()
	ends := []r3.Vec{from.Value(), to.Value()}
	start, _, _ := charts[0].At(0, 1)
	stop, _, _ := charts[2].At(1, 1)
	for i, x := range []r3.Vec{start, stop} {
		if r3.Norm(r3.Sub(x, ends[i])) > 4*u { // rounding of two turns
			t.Errorf("end %d at %v, want %v", i, x, ends[i])
		}
	}
	for k := 1; k < 3; k++ {
		a, _, _ := charts[k-1].At(1, 0.3)
		b, _, _ := charts[k].At(0, 0.3)
		if r3.Norm(r3.Sub(a, b)) > 8*u { // as above, at the radius 1.7
			t.Errorf("charts %d and %d meet at %v and %v", k-1, k, a, b)
		}
	}
}
