package geom

import (
	"math"
	"slices"

	"gonum.org/v1/gonum/mathext"
	"gonum.org/v1/gonum/spatial/r3"
)

// EllipsoidSurface is the surface of an ellipsoid about the origin with its axes along x, y and z, with the normal
// outward.
type EllipsoidSurface struct {
	SemiAxes r3.Vec
}

// Area returns the area.
//
// Source: [Carlson1977] and [DLMF] 19.33.1: 4 pi R_G((ab)^2, (ac)^2,
// (bc)^2), with R_G from R_F and R_D by DLMF 19.21.10.
func (e EllipsoidSurface) Area() float64 {
	axes := []float64{e.SemiAxes.X, e.SemiAxes.Y, e.SemiAxes.Z}
	slices.Sort(axes)
	a, b, c := axes[0], axes[1], axes[2]
	if b/a > 1e40 { // a flat disc with two sides, to the last bit; R_D would leave its domain
		return 2 * math.Pi * b * c
	}
	// Divided by (ac)^2, the middle one of the three products, which stands last in R_D, so that all terms are positive.
	x, y := (b/c)*(b/c), (b/a)*(b/a)
	rg := (mathext.EllipticRF(x, y, 1) + (1-x)*(y-1)*mathext.EllipticRD(x, y, 1)/3 + math.Sqrt(x*y)) / 2
	return 4 * math.Pi * a * c * rg
}

// Bounds returns the smallest box along the axes.
func (e EllipsoidSurface) Bounds() r3.Box { return Ellipsoid(e).Bounds() }

// Nodes visits the points of the rule of the unit sphere, stretched. It is exact for polynomials of degree 2n-2 times
// one component of the normal, because the normal times the area element is a polynomial on the sphere; without the
// normal it converges geometrically, the slower the longer the ellipsoid.
func (e EllipsoidSurface) Nodes(n int, visit func(x, normal r3.Vec, weight float64)) {
	a := e.SemiAxes
	visitSphere(n, func(u r3.Vec, weight float64) {
		area := r3.Vec{X: a.Y * a.Z * u.X, Y: a.X * a.Z * u.Y, Z: a.X * a.Y * u.Z}
		size := r3.Norm(area)
		visit(r3.Vec{X: a.X * u.X, Y: a.Y * u.Y, Z: a.Z * u.Z}, r3.Scale(1/size, area), weight*size)
	})
}
