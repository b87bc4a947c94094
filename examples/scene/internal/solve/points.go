package solve

import (
	"math"

	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

// pointOf returns the function that gives point i of a request, in the unit of the file. The points of lines, planes and
// grids are those of field.Line, field.Plane and field.Grid bit for bit, made when they are needed: ten millions of them
// would fill the memory.
func pointOf(q *scenefile.Request) func(i int) r3.Vec {
	switch q.Kind {
	case "line":
		l := q.Line
		return func(i int) r3.Vec {
			return r3.Vec{X: between(l.From.X, l.To.X, i, l.Count), Y: between(l.From.Y, l.To.Y, i, l.Count), Z: between(l.From.Z, l.To.Z, i, l.Count)}
		}
	case "plane":
		p := q.Plane
		return func(i int) r3.Vec {
			u := r3.Scale(share(i%p.Counts[0], p.Counts[0]), p.Edge1)
			v := r3.Scale(share(i/p.Counts[0], p.Counts[1]), p.Edge2)
			return r3.Add(p.Corner, r3.Add(u, v))
		}
	case "grid":
		g := q.Grid
		n, m := g.Counts[0], g.Counts[1]
		return func(i int) r3.Vec {
			return r3.Vec{X: between(g.Min.X, g.Max.X, i%n, n), Y: between(g.Min.Y, g.Max.Y, i/n%m, m),
				Z: between(g.Min.Z, g.Max.Z, i/n/m, g.Counts[2])}
		}
	}
	return func(i int) r3.Vec { return q.Points[i] }
}

// between returns a + (b - a) k/(n - 1), and b itself for the last.
func between(a, b float64, k, n int) float64 {
	switch {
	case k == 0:
		return a
	case k == n-1:
		return b
	}
	return math.FMA(b-a, share(k, n), a)
}

func share(k, n int) float64 {
	if n < 2 {
		return 0
	}
	return float64(k) / float64(n-1)
}

// batch returns the points lo <= i < hi.
func batch(point func(i int) r3.Vec, lo, hi int) *field.Points {
	p := &field.Points{X: make([]float64, hi-lo), Y: make([]float64, hi-lo), Z: make([]float64, hi-lo)}
	for i := range hi - lo {
		x := point(lo + i)
		p.X[i], p.Y[i], p.Z[i] = x.X, x.Y, x.Z
	}
	return p
}
