package geom

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// Wall is the curved surface of a circular cylinder about the z axis between two heights, with the normal away from
// the axis.
type Wall struct {
	Radius float64
	Z1, Z2 float64 // heights of the ends, Z1 < Z2
}

// Area returns 2 pi a h.
func (w Wall) Area() float64 { return 2 * math.Pi * w.Radius * (w.Z2 - w.Z1) }

// Bounds returns the smallest box along the axes.
func (w Wall) Bounds() r3.Box {
	a := w.Radius
	return r3.Box{Min: r3.Vec{X: -a, Y: -a, Z: w.Z1}, Max: r3.Vec{X: a, Y: a, Z: w.Z2}}
}

// Nodes visits the points of the rule that is equally spaced in angle and Gauss along the axis.
func (w Wall) Nodes(n int, visit func(x, normal r3.Vec, weight float64)) {
	ring, axial := circle(2*max(n, 1)), legendre(n, w.Z1, w.Z2)
	step := 2 * math.Pi / float64(len(ring)) * w.Radius
	for _, d := range ring {
		for _, z := range axial {
			visit(r3.Vec{X: w.Radius * d.cos, Y: w.Radius * d.sin, Z: z.x}, r3.Vec{X: d.cos, Y: d.sin}, step*z.w)
		}
	}
}
