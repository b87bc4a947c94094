package geom

import (
	"math"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Annulus is a flat ring about the z axis at the height Z, with the normal +z.
type Annulus struct {
	Inner, Outer float64 // radii
	Z            float64
}

// Check refuses radii that are not positive lengths or leave no ring, and a height that is not finite.
func (a Annulus) Check() error {
	return first(
		checkLength("annulus inner radius", a.Inner),
		checkLength("annulus outer radius", a.Outer),
		checkSpan("annulus", a.Inner, a.Outer),
		checkCoordinate("annulus height z", a.Z),
	)
}

// Area returns pi (b^2 - a^2).
func (a Annulus) Area() float64 { return math.Pi * (a.Outer - a.Inner) * (a.Outer + a.Inner) }

// Bounds returns the smallest box along the axes.
func (a Annulus) Bounds() r3.Box { return ringBounds(a.Outer, a.Z) }

// Centroid returns the centre.
func (a Annulus) Centroid() r3.Vec { return r3.Vec{Z: a.Z} }

// Locate tells whether x lies on the annulus.
func (a Annulus) Locate(x pair.Vec, slack float64) Place {
	return locateRing(a.Inner, a.Outer, a.Z, x, slack)
}

// Nodes visits the points of the rule that is Gauss along the radius and equally spaced in angle.
func (a Annulus) Nodes(n int, visit func(x, normal r3.Vec, weight float64)) {
	visitRing(n, a.Inner, a.Outer, func(x r3.Vec, weight float64) {
		visit(r3.Vec{X: x.X, Y: x.Y, Z: a.Z}, r3.Vec{Z: 1}, weight)
	})
}
