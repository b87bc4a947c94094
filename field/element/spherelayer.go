package element

import (
	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// spherical is charge between two concentric spheres about the origin, inner 0 for none, whose field has one formula in each
// of three regions.
type spherical interface {
	cavity(x r3.Vec, r float64) field.Value
	// wall is at the heights up above the inner and down below the outer sphere, both with all their digits.
	wall(x, n r3.Vec, r, up, down float64) field.Value
	outside(x, n r3.Vec, r float64) field.Value
}

// between evaluates a spherical source at a point, with the limits on both of its spheres.
func between[S spherical](s S, inner, outer float64, p field.Point, side field.Side) field.Value {
	x := p.X.Value()
	n, r := direction(x)
	bounds := cube(outer)
	up, in := height(p, r, inner, bounds)
	down, out := height(p, r, outer, bounds)
	wall := func() field.Value { return s.wall(x, n, r, up, -down) }
	switch {
	case inner > 0 && in == geom.Inside:
		return s.cavity(x, r)
	case inner > 0 && in == geom.On:
		return onFace(wall(), s.cavity(x, r), side)
	case out == geom.On:
		return onFace(wall(), s.outside(x, n, r), side)
	case out == geom.Outside:
		return s.outside(x, n, r)
	}
	return wall()
}

// cube returns the box of a sphere about the origin.
func cube(a float64) r3.Box {
	return r3.Box{Min: r3.Vec{X: -a, Y: -a, Z: -a}, Max: r3.Vec{X: a, Y: a, Z: a}}
}
