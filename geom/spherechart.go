package geom

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// cubeSide is a sixth of the unit sphere: what the side of a cube covers as seen from the centre. Its lines u and v are
// equally spaced in angle in the middle of the side, so that the area changes by a factor of sqrt 2 at most.
type cubeSide struct {
	axis int // of x, y, z
	sign float64
}

// cubeSides returns the six sides.
func cubeSides() []cubeSide {
	sides := make([]cubeSide, 0, 6)
	for axis := range 3 {
		sides = append(sides, cubeSide{axis, -1}, cubeSide{axis, 1})
	}
	return sides
}

// at returns the unit vector e and its derivatives, with e.(eu x ev) > 0.
//
// With p = (1, a, b), a and b the tangents of the angles, e = p/|p| and de/da = (pa - e (e.pa))/|p|.
func (c cubeSide) at(u, v float64) (e, eu, ev r3.Vec) {
	a, b := math.Tan((u-0.5)*(math.Pi/2)), math.Tan((v-0.5)*(math.Pi/2))
	l := math.Sqrt(1 + a*a + b*b)
	e = r3.Vec{X: 1 / l, Y: a / l, Z: b / l}
	da, db := math.Pi/2*(1+a*a)/l, math.Pi/2*(1+b*b)/l
	eu = r3.Vec{X: -da * e.X * e.Y, Y: da * (1 + b*b) / (l * l), Z: -da * e.Z * e.Y}
	ev = r3.Vec{X: -db * e.X * e.Z, Y: -db * e.Y * e.Z, Z: db * (1 + a*a) / (l * l)}
	return c.turned(e), c.turned(eu), c.turned(ev)
}

// turned takes +x to the side by a rotation.
func (c cubeSide) turned(v r3.Vec) r3.Vec {
	if c.sign < 0 { // half a turn about z
		v.X, v.Y = -v.X, -v.Y
	}
	switch c.axis {
	case 1:
		return r3.Vec{X: v.Z, Y: v.X, Z: v.Y}
	case 2:
		return r3.Vec{X: v.Y, Y: v.Z, Z: v.X}
	}
	return v
}

// ballChart is a side of an ellipsoid.
type ballChart struct {
	side     cubeSide
	semiAxes r3.Vec
}

// At returns the point and its derivatives.
func (c ballChart) At(u, v float64) (x, xu, xv r3.Vec) {
	e, eu, ev := c.side.at(u, v)
	return stretched(c.semiAxes, e), stretched(c.semiAxes, eu), stretched(c.semiAxes, ev)
}

// stretched returns the products of the components.
func stretched(a, v r3.Vec) r3.Vec { return r3.Vec{X: a.X * v.X, Y: a.Y * v.Y, Z: a.Z * v.Z} }

// Charts returns six sides that meet like those of a cube.
func (s SphereSurface) Charts() []Chart {
	return EllipsoidSurface{r3.Vec{X: s.Radius, Y: s.Radius, Z: s.Radius}}.Charts()
}

// Charts returns six sides that meet like those of a cube, stretched.
func (e EllipsoidSurface) Charts() []Chart {
	charts := make([]Chart, 0, 6)
	for _, side := range cubeSides() {
		charts = append(charts, ballChart{side, e.SemiAxes})
	}
	return charts
}

// ballBlock is the part of a ball or ellipsoid under a side, from the share inner of the semi-axes outwards along w.
type ballBlock struct {
	chart ballChart
	inner float64
}

// At returns the point and its derivatives.
func (b ballBlock) At(u, v, w float64) (x, xu, xv, xw r3.Vec) {
	x, xu, xv = b.chart.At(u, v)
	s := between(b.inner, 1, w)
	return r3.Scale(s, x), r3.Scale(s, xu), r3.Scale(s, xv), r3.Scale(1-b.inner, x)
}

// ballBlocks returns the parts under the six sides.
func ballBlocks(semiAxes r3.Vec, inner float64) []Block {
	blocks := make([]Block, 0, 6)
	for _, side := range cubeSides() {
		blocks = append(blocks, ballBlock{ballChart{side, semiAxes}, inner})
	}
	return blocks
}

// Blocks returns six parts that meet in the centre.
func (s Sphere) Blocks() []Block {
	return ballBlocks(r3.Vec{X: s.Radius, Y: s.Radius, Z: s.Radius}, 0)
}

// Blocks returns the six parts under the charts of the outer sphere.
func (s HollowSphere) Blocks() []Block {
	return ballBlocks(r3.Vec{X: s.Outer, Y: s.Outer, Z: s.Outer}, s.Inner/s.Outer)
}

// Blocks returns six parts that meet in the centre.
func (e Ellipsoid) Blocks() []Block { return ballBlocks(e.SemiAxes, 0) }
