package geom

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"
)

// Random star-shaped polygons, combs and polygons with straight angles are cut into n-2 triangles of the sense of the
// polygon whose areas sum to its area.
func TestTriangles(t *testing.T) {
	rng := rand.New(rand.NewPCG(17, 18))
	polygons := [][]r3.Vec{
		square,
		{{}, {X: 0.5}, {X: 1}, {X: 1, Y: 0.5}, {X: 1, Y: 1}, {Y: 1}, {Y: 0.5}}, // straight angles
		{{}, {X: 0.5}, {X: 1}, {Y: 1}, {Y: 0.5}},
	}
	var comb []r3.Vec
	for k := range 10 {
		comb = append(comb, r3.Vec{X: float64(k), Y: float64(5 * (k % 2))})
	}
	polygons = append(polygons, append(comb, r3.Vec{X: 9, Y: -1}, r3.Vec{Y: -1}))
	for n := 3; n < 40; n++ {
		var star []r3.Vec
		for k := range n {
			s, c := math.Sincos(2 * math.Pi * float64(k) / float64(n))
			r := 0.1 + rng.Float64()
			star = append(star, r3.Vec{X: r * c, Y: r * s})
		}
		polygons = append(polygons, star)
	}
	for i, vertices := range polygons {
		turn := randomPose(t, rng, 1)
		tilted := make([]r3.Vec, len(vertices))
		reversed := make([]r3.Vec, len(vertices))
		for k, v := range vertices {
			tilted[k] = turn.point(v)
			reversed[len(vertices)-1-k] = v
		}
		for _, v := range [][]r3.Vec{vertices, tilted, reversed} {
			p := Polygon{Vertices: v}
			normal := p.Normal().Value()
			cut := triangles(p.loop())
			if len(cut) != len(v)-2 {
				t.Errorf("polygon %d: %d triangles for %d vertices", i, len(cut), len(v))
			}
			sum := 0.0
			for _, c := range cut {
				a := r3.Dot(normal, r3.Cross(r3.Sub(v[c[1]], v[c[0]]), r3.Sub(v[c[2]], v[c[0]]))) / 2
				if !(a > 0) {
					t.Errorf("polygon %d: triangle %v has area %v", i, c, a)
				}
				sum += a
			}
			if area := p.Area(); !near(sum, area, 100*u*area) { // a sum of at most 40 terms
				t.Errorf("polygon %d: triangles sum to %v, area %v", i, sum, area)
			}
		}
	}
}

// A loop that is not simple neither hangs nor panics.
func TestTrianglesOfCrossedLoop(t *testing.T) {
	crossed := Polygon{Vertices: []r3.Vec{{}, {X: 1, Y: 1}, {X: 1}, {Y: 1}, {X: 2, Y: -1}, {}}}
	if cut := triangles(crossed.loop()); len(cut) != 4 {
		t.Errorf("%d triangles, want 4", len(cut))
	}
	if cut := triangles(Polygon{Vertices: square[:2]}.loop()); cut != nil {
		t.Errorf("two vertices give %v", cut)
	}
}
