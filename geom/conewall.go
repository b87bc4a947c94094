package geom

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// ConeWall is the curved surface of a circular cone or truncated cone about the z axis between two heights, with the
// normal away from the axis.
type ConeWall struct {
	R1, R2 float64 // radii at Z1 and Z2; one may be 0
	Z1, Z2 float64 // heights of the ends, Z1 < Z2
}

// Slant returns the length of a straight line from end to end.
func (w ConeWall) Slant() float64 { return math.Hypot(w.R2-w.R1, w.Z2-w.Z1) }

// Area returns pi (a + b) times the slant length.
func (w ConeWall) Area() float64 { return math.Pi * (w.R1 + w.R2) * w.Slant() }

// Bounds returns the smallest box along the axes.
func (w ConeWall) Bounds() r3.Box {
	a := max(w.R1, w.R2)
	return r3.Box{Min: r3.Vec{X: -a, Y: -a, Z: w.Z1}, Max: r3.Vec{X: a, Y: a, Z: w.Z2}}
}

// Nodes visits the points of the rule that is equally spaced in azimuth and Gauss along the slant.
func (w ConeWall) Nodes(n int, visit func(x, normal r3.Vec, weight float64)) {
	ring, rule := circle(2*max(n, 1)), legendre(n, 0, 1)
	l := w.Slant()
	out, up := (w.Z2-w.Z1)/l, (w.R1-w.R2)/l
	step := 2 * math.Pi / float64(len(ring)) * l
	for _, d := range ring {
		normal := r3.Vec{X: out * d.cos, Y: out * d.sin, Z: up}
		for _, t := range rule {
			r, z := w.R1+t.x*(w.R2-w.R1), w.Z1+t.x*(w.Z2-w.Z1)
			visit(r3.Vec{X: r * d.cos, Y: r * d.sin, Z: z}, normal, step*r*t.w)
		}
	}
}
