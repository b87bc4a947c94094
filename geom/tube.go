package geom

import (
	"math"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Tube is a hollow circular cylinder, open at both ends of its bore, centred at the origin with its axis along z.
// Faces: bottom top inner outer.
type Tube struct {
	Inner, Outer float64 // radii
	Height       float64
}

// Check refuses dimensions that are not positive lengths, and a wall without thickness.
func (t Tube) Check() error {
	return first(
		checkLength("tube inner radius", t.Inner),
		checkLength("tube outer radius", t.Outer),
		checkLength("tube height", t.Height),
		checkSpan("tube", t.Inner, t.Outer),
	)
}

// Bounds returns the smallest box along the axes.
func (t Tube) Bounds() r3.Box { return roundBounds(t.Outer, t.Height) }

// Volume returns pi (b^2 - a^2) h.
func (t Tube) Volume() float64 {
	return math.Pi * (t.Outer - t.Inner) * (t.Outer + t.Inner) * t.Height
}

// Centroid returns the origin.
func (t Tube) Centroid() r3.Vec { return r3.Vec{} }

// SecondMoment returns V (a^2 + b^2)/4 across the axis and V h^2/12 along it.
func (t Tube) SecondMoment() [3][3]float64 {
	return roundMoment(t.Volume(), t.Inner*t.Inner+t.Outer*t.Outer, t.Height)
}

// Locate tells where x lies.
func (t Tube) Locate(x pair.Vec, slack float64) Place {
	bounds, v := t.Bounds(), x.Value()
	tol := OnTolerance(bounds, v, slack)
	if beyond(bounds, v, tol) {
		return outside()
	}
	q := x.X.Mul(x.X).Add(x.Y.Mul(x.Y))
	bore, wall := -aboveRound(q, t.Inner), aboveRound(q, t.Outer)
	region, near := meet([3]float64{above(x.Z, t.Height/2), max(bore, wall), math.Inf(-1)}, tol)
	switch {
	case region == Outside:
		return outside()
	case region == Inside:
		return inside()
	case near == 0 && v.Z < 0:
		return Place{Region: On, Face: 0, Normal: along(-1)}
	case near == 0:
		return Place{Region: On, Face: 1, Normal: along(1)}
	case near == 1 && bore > wall:
		return Place{Region: On, Face: 2, Normal: r3.Scale(-1, radial(v))}
	case near == 1:
		return Place{Region: On, Face: 3, Normal: radial(v)}
	}
	return onEdge()
}

// Faces returns the two annuli and the two walls.
func (t Tube) Faces() []Face {
	half := t.Height / 2
	return []Face{
		{Name: "bottom", Surface: Annulus{Inner: t.Inner, Outer: t.Outer, Z: -half}, Inward: true},
		{Name: "top", Surface: Annulus{Inner: t.Inner, Outer: t.Outer, Z: half}},
		{Name: "inner", Surface: Wall{Radius: t.Inner, Z1: -half, Z2: half}, Inward: true},
		{Name: "outer", Surface: Wall{Radius: t.Outer, Z1: -half, Z2: half}},
	}
}

// Cells returns the tube itself.
func (t Tube) Cells() []Cell { return []Cell{t} }

// Nodes visits the points of the rule that is Gauss along radius and axis and equally spaced in angle.
func (t Tube) Nodes(n int, visit func(x r3.Vec, weight float64)) {
	visitTube(n, t.Inner, t.Outer, t.Height, visit)
}
