package geom

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// SphereSurface is the surface of a sphere about the origin, with the normal away from it.
type SphereSurface struct {
	Radius float64
}

// Area returns 4 pi a^2.
func (s SphereSurface) Area() float64 { return 4 * math.Pi * s.Radius * s.Radius }

// Bounds returns the smallest box along the axes.
func (s SphereSurface) Bounds() r3.Box { return cube(s.Radius) }

// Nodes visits the points of the rule that is Gauss in the cosine of the polar angle and equally spaced in azimuth.
func (s SphereSurface) Nodes(n int, visit func(x, normal r3.Vec, weight float64)) {
	visitSphere(n, func(e r3.Vec, weight float64) {
		visit(r3.Scale(s.Radius, e), e, weight*s.Radius*s.Radius)
	})
}
