package element

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// polyScale is what the estimates of a polynomial ellipsoid are held against.
type polyScale struct {
	peak float64 // the largest polarization found
	weak bool    // estimates may come near the contract, so that they are always made
}

// polyAccuracy is the contract on integrated fields, relative to the natural scale; estimates below polySafe of it at the surface
// are not looked at again.
const (
	polyAccuracy = 1e-10
	polySafe     = 0.01
)

// scaleOf looks for the largest polarization, p in the coordinates x_i/a_i, and the largest estimates, which belong to points on
// the surface: there all powers are largest.
func (e *PolynomialEllipsoid) scaleOf(p field.Polynomial) (s polyScale) {
	const rings, turns = 12, 24 // close enough: a scale is wanted
	visit := func(n r3.Vec) {
		for _, f := range []float64{1, 0.8, 0.5, 0} {
			s.peak = max(s.peak, r3.Norm(p.At(r3.Scale(f, n))))
		}
	}
	for i := range rings + 1 {
		sin, cos := math.Sincos(math.Pi * float64(i) / rings)
		for j := range turns {
			y, x := math.Sincos(2 * math.Pi * float64(j) / turns)
			visit(r3.Vec{X: sin * x, Y: sin * y, Z: cos})
		}
	}
	a := e.base.axes
	for _, n := range []r3.Vec{{X: 1}, {Y: 1}, {Z: 1}, {X: 0.6, Y: 0.8}, {X: 0.6, Z: -0.8}, {Y: 0.8, Z: 0.6}, {X: 0.48, Y: -0.64, Z: 0.6}} {
		x := pair.VecOf(r3.Vec{X: n.X * a[0], Y: n.Y * a[1], Z: n.Z * a[2]})
		for _, v := range []field.Value{e.inside(x, field.WantPhi|field.WantG|field.WantErr), e.outside(x, true, field.WantPhi|field.WantG|field.WantErr)} {
			s.weak = s.weak || !(max(v.ErrG, v.ErrPhi/e.base.unit) <= polySafe*polyAccuracy*s.peak)
		}
	}
	return s
}

// judge sets the status of a value at distance r, in units, by its estimates.
func (e *PolynomialEllipsoid) judge(v *field.Value, r float64) {
	a := max(e.base.axes[0], e.base.axes[1], e.base.axes[2])
	q := min(1, a/r)
	scale := polyAccuracy * e.scale.peak * q * q
	if e.scale.weak && (v.ErrG > scale*q || v.ErrPhi > scale*a*e.base.unit) {
		v.Status = field.NotConverged
	}
}
