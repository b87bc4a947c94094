package geom

import (
	"math"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Sphere is a ball centred at the origin. Face: surface.
type Sphere struct {
	Radius float64
}

// Check refuses a radius that is not a positive length.
func (s Sphere) Check() error { return checkLength("sphere radius", s.Radius) }

// Bounds returns the smallest box along the axes.
func (s Sphere) Bounds() r3.Box { return cube(s.Radius) }

// cube returns the bounds of a sphere.
func cube(a float64) r3.Box {
	return r3.Box{Min: r3.Vec{X: -a, Y: -a, Z: -a}, Max: r3.Vec{X: a, Y: a, Z: a}}
}

// Volume returns 4 pi a^3/3.
func (s Sphere) Volume() float64 { return 4 * math.Pi / 3 * s.Radius * s.Radius * s.Radius }

// Centroid returns the origin.
func (s Sphere) Centroid() r3.Vec { return r3.Vec{} }

// SecondMoment returns V a^2/5 on the diagonal.
func (s Sphere) SecondMoment() [3][3]float64 {
	return diagonal(s.Volume()/5, r3.Vec{X: s.Radius, Y: s.Radius, Z: s.Radius})
}

// Locate tells where x lies.
func (s Sphere) Locate(x pair.Vec, slack float64) Place {
	bounds, v := s.Bounds(), x.Value()
	tol := OnTolerance(bounds, v, slack)
	if beyond(bounds, v, tol) {
		return outside()
	}
	switch d := aboveRound(x.Dot(x), s.Radius); {
	case d > tol:
		return outside()
	case d < -tol:
		return inside()
	}
	return Place{Region: On, Normal: r3.Unit(v)}
}

// Faces returns the surface.
func (s Sphere) Faces() []Face {
	return []Face{{Name: "surface", Surface: SphereSurface(s)}}
}

// Cells returns the sphere itself.
func (s Sphere) Cells() []Cell { return []Cell{s} }

// Nodes visits the points of the rule that is Gauss in radius and in the cosine of the polar angle and equally spaced
// in azimuth.
func (s Sphere) Nodes(n int, visit func(x r3.Vec, weight float64)) { visitBall(n, 0, s.Radius, visit) }

// visitBall visits the points of the product rule between two spheres, exact for polynomials of degree 2n-2. The
// Jacobian r^2 takes two degrees, hence one point more along the radius.
func visitBall(n int, inner, outer float64, visit func(x r3.Vec, weight float64)) {
	radial := legendre(max(n, 1)+1, inner, outer)
	visitSphere(n, func(e r3.Vec, weight float64) {
		for _, r := range radial {
			visit(r3.Scale(r.x, e), weight*r.w*r.x*r.x)
		}
	})
}
