package geom

import (
	"math"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Sector is a flat part of a ring about the z axis at the height Z, between two azimuths counted from +x towards +y,
// with the normal +z. From and To are in radians, or in degrees if Degrees is set.
type Sector struct {
	Inner, Outer float64 // radii; Inner may be 0
	From, To     float64 // From < To <= From + one turn
	Degrees      bool    // From and To are in degrees
	Z            float64
}

func (s Sector) span() span { return span{s.From, s.To, s.Degrees} }

// Angle returns To - From in radians.
func (s Sector) Angle() float64 { return s.span().angle() }

// Ends returns the unit vectors away from the axis at the azimuths From and To.
func (s Sector) Ends() (from, to pair.Vec) { return s.span().ends() }

// Area returns (b^2 - a^2) angle/2.
func (s Sector) Area() float64 { return s.Angle() / 2 * (s.Outer - s.Inner) * (s.Outer + s.Inner) }

// Bounds returns the smallest box along the axes, up to rounding.
func (s Sector) Bounds() r3.Box { return s.span().bounds(s.Inner, s.Outer, s.Z, s.Z) }

// Nodes visits the points of the rule that is Gauss along radius and azimuth.
func (s Sector) Nodes(n int, visit func(x, normal r3.Vec, weight float64)) {
	visitSector(n, s.Inner, s.Outer, s.span(), func(x r3.Vec, weight float64) {
		visit(r3.Vec{X: x.X, Y: x.Y, Z: s.Z}, r3.Vec{Z: 1}, weight)
	})
}

// visitSector visits the points of the product rule on a sector in the plane z = 0, exact for degree 2n-2.
func visitSector(n int, inner, outer float64, s span, visit func(x r3.Vec, weight float64)) {
	arc := s.rule(2*max(n, 1) - 2)
	for _, r := range legendre(n, inner, outer) {
		for _, d := range arc {
			visit(r3.Vec{X: r.x * d.cos, Y: r.x * d.sin}, d.w*r.x*r.w)
		}
	}
}

// WallSector is a part of the curved surface of a circular cylinder about the z axis between two heights and two
// azimuths counted from +x towards +y, with the normal away from the axis. From and To are in radians, or in degrees if
// Degrees is set.
type WallSector struct {
	Radius   float64
	Z1, Z2   float64 // heights of the ends, Z1 < Z2
	From, To float64 // From < To <= From + one turn
	Degrees  bool    // From and To are in degrees
}

func (w WallSector) span() span { return span{w.From, w.To, w.Degrees} }

// Angle returns To - From in radians.
func (w WallSector) Angle() float64 { return w.span().angle() }

// Ends returns the unit vectors away from the axis at the azimuths From and To.
func (w WallSector) Ends() (from, to pair.Vec) { return w.span().ends() }

// Area returns a h angle.
func (w WallSector) Area() float64 { return w.Angle() * w.Radius * (w.Z2 - w.Z1) }

// Bounds returns the smallest box along the axes, up to rounding.
func (w WallSector) Bounds() r3.Box { return w.span().bounds(w.Radius, w.Radius, w.Z1, w.Z2) }

// Nodes visits the points of the rule that is Gauss along azimuth and axis.
func (w WallSector) Nodes(n int, visit func(x, normal r3.Vec, weight float64)) {
	axial := legendre(n, w.Z1, w.Z2)
	for _, d := range w.span().rule(2*max(n, 1) - 1) { // the normal takes one degree
		for _, z := range axial {
			visit(r3.Vec{X: w.Radius * d.cos, Y: w.Radius * d.sin, Z: z.x}, d.normal(), d.w*w.Radius*z.w)
		}
	}
}

// normal returns d as a unit vector.
func (d direction) normal() r3.Vec {
	l := math.Hypot(d.cos, d.sin)
	return r3.Vec{X: d.cos / l, Y: d.sin / l}
}
