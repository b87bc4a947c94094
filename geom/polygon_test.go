package geom

import (
	"math"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"
)

// The weights of a polygon sum to its area to a few roundings and centre on its centroid, also on thin strips and far from the origin, where
// rounded vertices, or the skew that rounding gives to a parallelogram, would cost most digits.
func TestPolygonNodesArea(t *testing.T) {
	strip := func(film Prism) Polygon { return film.Faces()[2].Surface.(Polygon) }
	slope := [2]float64{0.3, 0.07}
	side := Prism{Base: star, Height: 1e-9, BottomSlope: slope, TopSlope: slope}
	wedge := Prism{Base: star, Height: 1e-9, BottomSlope: slope, TopSlope: [2]float64{slope[0] + 1e-10, slope[1]}}
	for _, c := range []struct {
		name string
		p    Polygon
	}{
		{"parallelogram with low parts", strip(side)},
		{"trapezoid with low parts", strip(wedge)},
		{"far parallelogram", Polygon{Vertices: []r3.Vec{{X: 1000.1}, {X: 1000.3}, {X: 1000.3, Y: 1e-9}, {X: 1000.1, Y: 1e-9}}}},
		{"far skew parallelogram", Polygon{Vertices: []r3.Vec{{X: 1000.1, Y: 7}, {X: 1000.3, Y: 7}, {X: 1000.3, Y: 7 + 0x1p-50}, {X: 1000.1, Y: 7 + 0x1p-49}}}},
		{"the same from the next vertex", Polygon{Vertices: []r3.Vec{{X: 1000.3, Y: 7}, {X: 1000.3, Y: 7 + 0x1p-50}, {X: 1000.1, Y: 7 + 0x1p-49}, {X: 1000.1, Y: 7}}}},
		{"far triangle", Polygon{Vertices: []r3.Vec{{X: 1000.1}, {X: 1001.1, Y: 1}, {X: 1002.1, Y: 2 + 1e-9}}}},
	} {
		want := c.p.Area()
		for n := 1; n <= 5; n++ {
			sum := 0.0
			var mean r3.Vec
			c.p.Nodes(n, func(x, _ r3.Vec, weight float64) {
				sum += weight
				mean = r3.Add(mean, r3.Scale(weight/want, x))
			})
			if tol := 64 * u * want; !(math.Abs(sum-want) <= tol) { // the roundings of 25 weights and of the rule
				t.Errorf("%s, %d points: the weights sum to %v, want %v (relative error %.2g)", c.name, n, sum, want, sum/want-1)
			}
			centre := c.p.Centroid()
			if d := r3.Norm(r3.Sub(mean, centre)); n > 1 && !(d <= 64*u*r3.Norm(centre)) { // the same, on coordinates
				t.Errorf("%s, %d points: the centre is %v, want %v", c.name, n, mean, centre)
			}
		}
	}
	if p := strip(side); len(p.Low) == 0 || !p.parallelogram() {
		t.Error("the parallelogram with low parts has none or is none")
	}
	if strip(wedge).parallelogram() {
		t.Error("the trapezoid is taken for a parallelogram")
	}
}
