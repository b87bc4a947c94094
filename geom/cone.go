package geom

import (
	"errors"
	"fmt"
	"math"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Cone is a circular cone or truncated cone about the z axis with the origin at mid-height. Faces: bottom top wall; an end
// of radius 0 is a tip and no face.
type Cone struct {
	Bottom, Top float64 // radii at z = -Height/2 and +Height/2; one may be 0
	Height      float64
}

// Check refuses a height that is not a positive length, radii that are not positive lengths or zero, two tips, and an end
// too small to tell from a tip.
func (c Cone) Check() error {
	if err := first(
		checkRadius("cone bottom radius", c.Bottom),
		checkRadius("cone top radius", c.Top),
		checkLength("cone height", c.Height),
	); err != nil {
		return err
	}
	small, large := min(c.Bottom, c.Top), max(c.Bottom, c.Top)
	switch {
	case large == 0:
		return errors.New("geom: cone bottom and top radius are both 0; give at least one a positive length")
	case small > 0 && small < grain*large:
		return fmt.Errorf("geom: cone radius %v is below the rounding of the other radius %v; give 0 for a tip", small, large)
	}
	return nil
}

// Bounds returns the smallest box along the axes.
func (c Cone) Bounds() r3.Box { return roundBounds(max(c.Bottom, c.Top), c.Height) }

// Volume returns pi h (a^2 + a b + b^2)/3.
func (c Cone) Volume() float64 {
	a, b := c.Bottom, c.Top
	return math.Pi / 3 * c.Height * (a*a + a*b + b*b)
}

// Centroid returns the centre of volume, on the axis.
func (c Cone) Centroid() r3.Vec {
	a, b := c.Bottom, c.Top
	return r3.Vec{Z: c.Height / 4 * (b - a) * (b + a) / (a*a + a*b + b*b)}
}

// SecondMoment returns pi h (a^4 + a^3 b + a^2 b^2 + a b^3 + b^4)/20 across the axis and
//
//	3/20 V h^2 (5 m^4 - 2 m^2 d^2 + d^4)/(3 m^2 + d^2)^2,  m = (a + b)/2, d = (b - a)/2
//
// along it.
func (c Cone) SecondMoment() (m [3][3]float64) {
	a, b, h := c.Bottom, c.Top, c.Height
	m[0][0] = math.Pi / 20 * h * (a*a*a*a + a*a*a*b + a*a*b*b + a*b*b*b + b*b*b*b)
	m[1][1] = m[0][0]
	q := (b - a) / (a + b) * (b - a) / (a + b)
	m[2][2] = 3.0 / 20 * c.Volume() * h * h * (5 - 2*q + q*q) / ((3 + q) * (3 + q))
	return m
}

// Locate tells where x lies. The wall and the ends meet at any angle, so the distances from all of them count. Near a
// tip, and in a needle thinner than the tolerance, the far side of the wall counts too.
func (c Cone) Locate(x pair.Vec, slack float64) Place {
	bounds, v := c.Bounds(), x.Value()
	tol := OnTolerance(bounds, v, slack)
	if beyond(bounds, v, tol) {
		return outside()
	}
	s := x.X.Mul(x.X).Add(x.Y.Mul(x.Y)).Sqrt()
	wall, off := c.fromWall(s, x.Z)
	opposite, _ := c.fromWall(s.Neg(), x.Z)
	bottom, top := c.fromEnd(s, x.Z, -1), c.fromEnd(s, x.Z, 1)
	switch {
	case bottom > tol && top > tol && wall > tol:
		if off < 0 && math.Abs(v.Z) < c.Height/2 {
			return inside()
		}
		return outside()
	case wall <= tol && opposite <= tol, wall <= tol && min(bottom, top) <= tol, bottom <= tol && top <= tol:
		return onEdge()
	case bottom <= tol:
		return Place{Region: On, Face: 0, Normal: along(-1)}
	case top <= tol:
		return Place{Region: On, Face: c.faces() - 2, Normal: along(1)}
	}
	e := radial(v)
	l := math.Hypot(c.Height, c.Top-c.Bottom)
	slope := c.Height / l
	return Place{Region: On, Face: c.faces() - 1, Normal: r3.Vec{X: slope * e.X, Y: slope * e.Y, Z: (c.Bottom - c.Top) / l}}
}

// faces returns how many faces the cone has.
func (c Cone) faces() int {
	if c.Bottom == 0 || c.Top == 0 {
		return 2
	}
	return 3
}

// fromWall returns the distance of a point from the segment of the wall, in the half plane of the coordinates s away from
// the axis and z, and its height above the line of the wall, negative on the side of the axis.
func (c Cone) fromWall(s, z pair.Float) (distance, height float64) {
	rise := pair.Sum(c.Top, -c.Bottom)
	l := rise.Mul(rise).Add(pair.Product(c.Height, c.Height)).Sqrt()
	ds, dz := s.AddFloat(-c.Bottom), z.AddFloat(c.Height/2)
	height = ds.Scale(c.Height).Sub(dz.Mul(rise)).Div(l).Value()
	t := ds.Mul(rise).Add(dz.Scale(c.Height)).Div(l)
	return math.Hypot(height, max(-t.Value(), t.Sub(l).Value(), 0)), height
}

// fromEnd returns the distance of a point from the end at the height sign Height/2, infinite if that is a tip.
func (c Cone) fromEnd(s, z pair.Float, sign float64) float64 {
	radius := c.Top
	if sign < 0 {
		radius = c.Bottom
	}
	if radius == 0 {
		return math.Inf(1)
	}
	return math.Hypot(z.AddFloat(-sign*c.Height/2).Value(), max(s.AddFloat(-radius).Value(), 0))
}

// Faces returns the two discs, as far as they are no tips, and the wall.
func (c Cone) Faces() []Face {
	half := c.Height / 2
	faces := make([]Face, 0, 3)
	if c.Bottom > 0 {
		faces = append(faces, Face{Name: "bottom", Surface: Disc{Radius: c.Bottom, Z: -half}, Inward: true})
	}
	if c.Top > 0 {
		faces = append(faces, Face{Name: "top", Surface: Disc{Radius: c.Top, Z: half}})
	}
	return append(faces, Face{Name: "wall", Surface: ConeWall{R1: c.Bottom, R2: c.Top, Z1: -half, Z2: half}})
}

// Cells returns the cone itself.
func (c Cone) Cells() []Cell { return []Cell{c} }

// Nodes visits the points of the rule that is Gauss along radius and axis and equally spaced in azimuth. The area across
// the axis takes two degrees, hence one point more along it.
func (c Cone) Nodes(n int, visit func(x r3.Vec, weight float64)) {
	rule := legendre(max(n, 1)+1, -0.5, 0.5)
	visitRing(n, 0, 1, func(x r3.Vec, weight float64) {
		for _, z := range rule {
			r := c.radius(z.x)
			visit(r3.Vec{X: r * x.X, Y: r * x.Y, Z: c.Height * z.x}, weight*r*r*c.Height*z.w)
		}
	})
}

// radius returns the radius at the height t Height.
func (c Cone) radius(t float64) float64 { return c.Bottom*(0.5-t) + c.Top*(0.5+t) }
