package geom

import (
	"math"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// HollowSphere is the space between two concentric spheres about the origin. Faces: inner outer.
type HollowSphere struct {
	Inner, Outer float64 // radii
}

// Check refuses radii that are not positive lengths, and a wall without thickness.
func (s HollowSphere) Check() error {
	return first(
		checkLength("hollow sphere inner radius", s.Inner),
		checkLength("hollow sphere outer radius", s.Outer),
		checkSpan("hollow sphere", s.Inner, s.Outer),
	)
}

// Bounds returns the smallest box along the axes.
func (s HollowSphere) Bounds() r3.Box { return cube(s.Outer) }

// Volume returns 4 pi (b^3 - a^3)/3.
func (s HollowSphere) Volume() float64 {
	a, b := s.Inner, s.Outer
	return 4 * math.Pi / 3 * (b - a) * (b*b + a*b + a*a)
}

// Centroid returns the origin.
func (s HollowSphere) Centroid() r3.Vec { return r3.Vec{} }

// SecondMoment returns 4 pi (b^5 - a^5)/15 on the diagonal.
func (s HollowSphere) SecondMoment() [3][3]float64 {
	a, b := s.Inner, s.Outer
	m := 4 * math.Pi / 15 * (b - a) * (b*b*b*b + a*b*b*b + a*a*b*b + a*a*a*b + a*a*a*a)
	return diagonal(m, r3.Vec{X: 1, Y: 1, Z: 1})
}

// Locate tells where x lies.
func (s HollowSphere) Locate(x pair.Vec, slack float64) Place {
	bounds, v := s.Bounds(), x.Value()
	tol := OnTolerance(bounds, v, slack)
	if beyond(bounds, v, tol) {
		return outside()
	}
	q := x.Dot(x)
	cavity, wall := -aboveRound(q, s.Inner), aboveRound(q, s.Outer)
	switch d := max(cavity, wall); {
	case d > tol:
		return outside()
	case d < -tol:
		return inside()
	case cavity > wall:
		return Place{Region: On, Face: 0, Normal: r3.Scale(-1, r3.Unit(v))}
	}
	return Place{Region: On, Face: 1, Normal: r3.Unit(v)}
}

// Faces returns the two spheres.
func (s HollowSphere) Faces() []Face {
	return []Face{
		{Name: "inner", Surface: SphereSurface{Radius: s.Inner}, Inward: true},
		{Name: "outer", Surface: SphereSurface{Radius: s.Outer}},
	}
}

// Cells returns the hollow sphere itself.
func (s HollowSphere) Cells() []Cell { return []Cell{s} }

// Nodes visits the points of the rule that is Gauss in radius and in the cosine of the polar angle and equally spaced
// in azimuth.
func (s HollowSphere) Nodes(n int, visit func(x r3.Vec, weight float64)) {
	visitBall(n, s.Inner, s.Outer, visit)
}
