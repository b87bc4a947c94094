package geom

import (
	"math"

	"example.com/boundpole/geom/gauss"
	"gonum.org/v1/gonum/spatial/r3"
)

// node is a point of a rule on an interval and its weight.
type node struct{ x, w float64 }

// legendre returns the Gauss-Legendre rule with n points on [a, b], ascending and symmetric about the middle.
func legendre(n int, a, b float64) []node {
	x, w := gauss.On(n, a, b)
	rule := make([]node, len(x))
	for k := range rule {
		rule[k] = node{x[k], w[k]}
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
	for _, c := range legendre(n, -1, 1) {
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
	rule := legendre(n, 0, 1)
	ab, bc := r3.Sub(b, a), r3.Sub(c, b)
	for _, s := range rule {
		for _, t := range rule {
			x := r3.Add(a, r3.Scale(s.x, r3.Add(ab, r3.Scale(t.x, bc))))
			visit(x, s.w*s.x*t.w)
		}
	}
}
