package solve

import (
	"testing"

	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

// TestPoints checks that points made one by one are those of the library, bit for bit, and start anywhere.
func TestPoints(t *testing.T) {
	a, b, c := r3.Vec{X: 0.1, Y: -0.7, Z: 1e3}, r3.Vec{X: 1. / 3, Y: 5e-9, Z: 17}, r3.Vec{X: -2, Y: 0.3}
	for _, n := range []struct{ i, j, k int }{{1, 1, 1}, {2, 3, 5}, {7, 1, 4}} {
		for _, x := range []struct {
			name string
			q    scenefile.Request
			want *field.Points
		}{
			{"line", scenefile.Request{Kind: "line", Line: &scenefile.Line{From: a, To: b, Count: n.i * n.k}}, field.Line(a, b, n.i*n.k)},
			{"plane", scenefile.Request{Kind: "plane", Plane: &scenefile.Parallelogram{Corner: a, Edge1: b, Edge2: c, Counts: [2]int{n.i, n.j}}},
				field.Plane(a, b, c, n.i, n.j)},
			{"grid", scenefile.Request{Kind: "grid", Grid: &scenefile.Grid{Min: c, Max: b, Counts: [3]int{n.i, n.j, n.k}}},
				field.Grid(r3.Box{Min: c, Max: b}, n.i, n.j, n.k)},
			{"points", scenefile.Request{Kind: "points", Points: []r3.Vec{a, b, c}}, field.PointsOf(a, b, c)},
		} {
			if x.q.Count() != x.want.Len() {
				t.Fatalf("%s: %d points, want %d", x.name, x.q.Count(), x.want.Len())
			}
			for lo := 0; lo < x.want.Len(); lo += 3 {
				hi := min(lo+3, x.want.Len())
				got := batch(pointOf(&x.q), lo, hi)
				for i := range hi - lo {
					if got.Vec(i) != x.want.Vec(lo+i) {
						t.Errorf("%s point %d: got %v, want %v", x.name, lo+i, got.Vec(i), x.want.Vec(lo+i))
					}
				}
			}
		}
	}
}
