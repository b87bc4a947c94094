package geom

import (
	"math"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Cylinder is a circular cylinder centred at the origin with its axis along z. Faces: bottom top wall.
type Cylinder struct {
	Radius, Height float64
}

// Check refuses dimensions that are not positive lengths.
func (c Cylinder) Check() error {
	return first(checkLength("cylinder radius", c.Radius), checkLength("cylinder height", c.Height))
}

// Bounds returns the smallest box along the axes.
func (c Cylinder) Bounds() r3.Box { return roundBounds(c.Radius, c.Height) }

// roundBounds returns the bounds of a cylinder.
func roundBounds(radius, height float64) r3.Box {
	corner := r3.Vec{X: radius, Y: radius, Z: height / 2}
	return r3.Box{Min: r3.Scale(-1, corner), Max: corner}
}

// Volume returns pi a^2 h.
func (c Cylinder) Volume() float64 { return math.Pi * c.Radius * c.Radius * c.Height }

// Centroid returns the origin.
func (c Cylinder) Centroid() r3.Vec { return r3.Vec{} }

// SecondMoment returns V a^2/4 across the axis and V h^2/12 along it.
func (c Cylinder) SecondMoment() [3][3]float64 {
	return roundMoment(c.Volume(), c.Radius*c.Radius, c.Height)
}

// roundMoment returns the second moment of a tube of volume v with the sum q of the squared radii.
func roundMoment(v, q, height float64) (m [3][3]float64) {
	m[0][0] = v * q / 4
	m[1][1] = m[0][0]
	m[2][2] = v * height * height / 12
	return m
}

// Locate tells where x lies.
func (c Cylinder) Locate(x pair.Vec, slack float64) Place {
	bounds, v := c.Bounds(), x.Value()
	tol := OnTolerance(bounds, v, slack)
	if beyond(bounds, v, tol) {
		return outside()
	}
	q := x.X.Mul(x.X).Add(x.Y.Mul(x.Y))
	region, near := meet([3]float64{above(x.Z, c.Height/2), aboveRound(q, c.Radius), math.Inf(-1)}, tol)
	switch {
	case region == Outside:
		return outside()
	case region == Inside:
		return inside()
	case near == 0 && v.Z < 0:
		return Place{Region: On, Face: 0, Normal: along(-1)}
	case near == 0:
		return Place{Region: On, Face: 1, Normal: along(1)}
	case near == 1:
		return Place{Region: On, Face: 2, Normal: radial(v)}
	}
	return onEdge()
}

// Faces returns the two discs and the wall.
func (c Cylinder) Faces() []Face {
	half := c.Height / 2
	return []Face{
		{Name: "bottom", Surface: Disc{Radius: c.Radius, Z: -half}, Inward: true},
		{Name: "top", Surface: Disc{Radius: c.Radius, Z: half}},
		{Name: "wall", Surface: Wall{Radius: c.Radius, Z1: -half, Z2: half}},
	}
}

// Cells returns the cylinder itself.
func (c Cylinder) Cells() []Cell { return []Cell{c} }

// Nodes visits the points of the rule that is Gauss along radius and axis and equally spaced in angle.
func (c Cylinder) Nodes(n int, visit func(x r3.Vec, weight float64)) {
	visitTube(n, 0, c.Radius, c.Height, visit)
}

// visitTube visits the points of the product rule on a tube, exact for polynomials of degree 2n-2.
func visitTube(n int, inner, outer, height float64, visit func(x r3.Vec, weight float64)) {
	axial := legendre(n, -height/2, height/2)
	visitRing(n, inner, outer, func(x r3.Vec, weight float64) {
		for _, z := range axial {
			visit(r3.Vec{X: x.X, Y: x.Y, Z: z.x}, weight*z.w)
		}
	})
}

// visitRing visits the points of the product rule on an annulus in the plane z = 0, exact for degree 2n-2.
func visitRing(n int, inner, outer float64, visit func(x r3.Vec, weight float64)) {
	ring := circle(2 * max(n, 1))
	step := 2 * math.Pi / float64(len(ring))
	for _, s := range legendre(n, inner, outer) {
		for _, d := range ring {
			visit(r3.Vec{X: s.x * d.cos, Y: s.x * d.sin}, step*s.x*s.w)
		}
	}
}
