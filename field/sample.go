package field

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// Line returns n points from a to b, both ends exact: point k is a + (b - a) k/(n - 1); n == 1 gives a.
func Line(a, b r3.Vec, n int) *Points {
	p := room(n)
	for k := range n {
		p.put(k, along(a, b, k, n))
	}
	return p
}

// Plane returns n times m points of the parallelogram corner + s edge1 + t edge2 with 0 <= s, t <= 1, s fastest.
func Plane(corner, edge1, edge2 r3.Vec, n, m int) *Points {
	p := room(n * m)
	for j := range m {
		for i := range n {
			u, v := r3.Scale(share(i, n), edge1), r3.Scale(share(j, m), edge2)
			p.put(j*n+i, r3.Add(corner, r3.Add(u, v)))
		}
	}
	return p
}

// Grid returns nx times ny times nz points of the box, x fastest, both ends of each direction exact.
func Grid(box r3.Box, nx, ny, nz int) *Points {
	p := room(nx * ny * nz)
	for k := range nz {
		z := between(box.Min.Z, box.Max.Z, k, nz)
		for j := range ny {
			y := between(box.Min.Y, box.Max.Y, j, ny)
			for i := range nx {
				p.put((k*ny+j)*nx+i, r3.Vec{X: between(box.Min.X, box.Max.X, i, nx), Y: y, Z: z})
			}
		}
	}
	return p
}

func room(n int) *Points {
	n = max(n, 0)
	return &Points{X: make([]float64, n), Y: make([]float64, n), Z: make([]float64, n)}
}

func (p *Points) put(i int, x r3.Vec) { p.X[i], p.Y[i], p.Z[i] = x.X, x.Y, x.Z }

func along(a, b r3.Vec, k, n int) r3.Vec {
	return r3.Vec{X: between(a.X, b.X, k, n), Y: between(a.Y, b.Y, k, n), Z: between(a.Z, b.Z, k, n)}
}

// between returns a + (b - a) k/(n - 1), rounded once where it matters, and b itself for the last.
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
