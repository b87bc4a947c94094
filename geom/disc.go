package geom

import (
	"math"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Disc is a flat disc about the z axis at the height Z, with the normal +z.
type Disc struct {
	Radius, Z float64
}

// Check refuses a radius that is not a positive length and a height that is not finite.
func (d Disc) Check() error {
	return first(checkLength("disc radius", d.Radius), checkCoordinate("disc height z", d.Z))
}

// Area returns pi a^2.
func (d Disc) Area() float64 { return math.Pi * d.Radius * d.Radius }

// Bounds returns the smallest box along the axes.
func (d Disc) Bounds() r3.Box { return ringBounds(d.Radius, d.Z) }

// ringBounds returns the bounds of a disc.
func ringBounds(a, z float64) r3.Box {
	return r3.Box{Min: r3.Vec{X: -a, Y: -a, Z: z}, Max: r3.Vec{X: a, Y: a, Z: z}}
}

// Centroid returns the centre.
func (d Disc) Centroid() r3.Vec { return r3.Vec{Z: d.Z} }

// Locate tells whether x lies on the disc.
func (d Disc) Locate(x pair.Vec, slack float64) Place { return locateRing(0, d.Radius, d.Z, x, slack) }

// locateRing tells whether x lies on an annulus; an inner radius 0 makes a disc.
func locateRing(inner, outer, z float64, x pair.Vec, slack float64) Place {
	bounds, v := ringBounds(outer, z), x.Value()
	tol := OnTolerance(bounds, v, slack)
	if beyond(bounds, v, tol) {
		return outside()
	}
	q := x.X.Mul(x.X).Add(x.Y.Mul(x.Y))
	h := x.Z.AddFloat(-z).Value()
	rim := aboveRound(q, outer)
	if inner > 0 {
		rim = max(rim, -aboveRound(q, inner))
	}
	switch {
	case math.Hypot(h, max(rim, 0)) > tol:
		return outside()
	case rim >= -tol:
		return onEdge()
	}
	return Place{Region: On, Normal: along(1)}
}

// Nodes visits the points of the rule that is Gauss along the radius and equally spaced in angle.
func (d Disc) Nodes(n int, visit func(x, normal r3.Vec, weight float64)) {
	Annulus{Outer: d.Radius, Z: d.Z}.Nodes(n, visit)
}
