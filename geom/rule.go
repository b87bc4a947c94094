package geom

import (
	"math"

	"gonum.org/v1/gonum/integrate/quad"
	"gonum.org/v1/gonum/spatial/r3"
)

// node is a point of a rule on an interval and its weight.
type node struct{ x, w float64 }

// gauss returns the Gauss-Legendre rule with n points on [a, b], ascending and exactly symmetric about the middle. It
// is exact for polynomials of degree 2n-1. Fewer than one point counts as one.
func gauss(n int, a, b float64) []node {
	n = max(n, 1)
	rule := make([]node, n)
	middle, half := a+(b-a)/2, (b-a)/2
	for k := 0; 2*k < n; k++ {
		t, w := quad.Legendre{}.FixedLocationSingle(n, k, -1, 1)
		t = math.Abs(t)
		if n == 26 && k == 0 {
			w = 0.010551372617343007156 // the table of gonum v0.17.0 has 0
		}
		if 2*k+1 == n {
			t = 0
		}
		rule[k] = node{middle - half*t, half * w}
		rule[n-1-k] = node{middle + half*t, half * w}
	}
	return rule
}

// direction is a point (cos, sin) of the unit circle.
type direction struct{ cos, sin float64 }

// circle returns m directions at equal angles, the first at half a step. Equal weights 2 pi/m integrate trigonometric
// polynomials of degree m-1 exactly.
func circle(m int) []direction {
	ring := make([]direction, m)
	for k := range ring {
		s, c := math.Sincos((float64(k) + 0.5) * (2 * math.Pi / float64(m)))
		ring[k] = direction{c, s}
	}
	return ring
}

// visitSphere visits the points of the product rule on the unit sphere, exact for polynomials of degree 2n-1. The
// weights sum to 4 pi.
func visitSphere(n int, visit func(e r3.Vec, weight float64)) {
	ring := circle(2 * max(n, 1))
	step := 2 * math.Pi / float64(len(ring))
	for _, c := range gauss(n, -1, 1) {
		s := math.Sqrt((1 - c.x) * (1 + c.x))
		for _, d := range ring {
			visit(r3.Vec{X: s * d.cos, Y: s * d.sin, Z: c.x}, step*c.w)
		}
	}
}

// visitTriangle visits the points of the collapsed product rule on the triangle abc, exact for polynomials of degree
// 2n-2. The weights are those of a triangle of area 1/2: multiply by twice the area.
//
// The square (s, t) is mapped to a + s ((b - a) + t (c - b)) with Jacobian s, which costs one degree.
func visitTriangle(n int, a, b, c r3.Vec, visit func(x r3.Vec, weight float64)) {
	rule := gauss(n, 0, 1)
	ab, bc := r3.Sub(b, a), r3.Sub(c, b)
	for _, s := range rule {
		for _, t := range rule {
			x := r3.Add(a, r3.Scale(s.x, r3.Add(ab, r3.Scale(t.x, bc))))
			visit(x, s.w*s.x*t.w)
		}
	}
}
