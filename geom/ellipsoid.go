package geom

import (
	"math"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Ellipsoid is centred at the origin with its axes along x, y and z. Face: surface.
type Ellipsoid struct {
	SemiAxes r3.Vec
}

// Check refuses semi-axes that are not positive lengths.
func (e Ellipsoid) Check() error {
	return first(
		checkLength("ellipsoid semi-axis x", e.SemiAxes.X),
		checkLength("ellipsoid semi-axis y", e.SemiAxes.Y),
		checkLength("ellipsoid semi-axis z", e.SemiAxes.Z),
	)
}

// Bounds returns the smallest box along the axes.
func (e Ellipsoid) Bounds() r3.Box {
	return r3.Box{Min: r3.Scale(-1, e.SemiAxes), Max: e.SemiAxes}
}

// Volume returns 4 pi a b c/3.
func (e Ellipsoid) Volume() float64 {
	return 4 * math.Pi / 3 * e.SemiAxes.X * e.SemiAxes.Y * e.SemiAxes.Z
}

// Centroid returns the origin.
func (e Ellipsoid) Centroid() r3.Vec { return r3.Vec{} }

// SecondMoment returns V/5 times the squares of the semi-axes on the diagonal.
func (e Ellipsoid) SecondMoment() [3][3]float64 { return diagonal(e.Volume()/5, e.SemiAxes) }

// Locate tells where x lies. The distance from the surface is taken to first order, |f|/|grad f| with
// f = (x/a)^2 + (y/b)^2 + (z/c)^2 - 1 in pairs; the sign is that of f.
func (e Ellipsoid) Locate(x pair.Vec, slack float64) Place {
	bounds, v := e.Bounds(), x.Value()
	tol := OnTolerance(bounds, v, slack)
	if beyond(bounds, v, tol) {
		return outside()
	}
	a := e.SemiAxes
	q := pair.Vec{X: x.X.Div(pair.Of(a.X)), Y: x.Y.Div(pair.Of(a.Y)), Z: x.Z.Div(pair.Of(a.Z))}
	f := q.Dot(q).AddFloat(-1).Value()
	slope := r3.Vec{X: q.X.Hi / a.X, Y: q.Y.Hi / a.Y, Z: q.Z.Hi / a.Z} // grad f / 2
	switch reach := 2 * r3.Norm(slope) * tol; {
	case f > reach:
		return outside()
	case f < -reach:
		return inside()
	}
	return Place{Region: On, Normal: r3.Unit(slope)}
}

// Faces returns the surface.
func (e Ellipsoid) Faces() []Face {
	return []Face{{Name: "surface", Surface: EllipsoidSurface(e)}}
}

// Cells returns the ellipsoid itself.
func (e Ellipsoid) Cells() []Cell { return []Cell{e} }

// Nodes visits the points of the rule of the unit sphere, stretched.
func (e Ellipsoid) Nodes(n int, visit func(x r3.Vec, weight float64)) {
	a := e.SemiAxes
	stretch := a.X * a.Y * a.Z
	visitBall(n, 0, 1, func(x r3.Vec, weight float64) {
		visit(r3.Vec{X: a.X * x.X, Y: a.Y * x.Y, Z: a.Z * x.Z}, stretch*weight)
	})
}
