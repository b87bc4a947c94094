package bound

import (
	"math"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// TestPolynomialBodies holds the closed forms of ellipsoids and spheres with polynomial polarization against integration over
// faces and cells.
func TestPolynomialBodies(t *testing.T) {
	want := field.WantPhi | field.WantG | field.WantErr
	bent := field.Polynomial{{Component: 0, Coefficient: 1, Powers: [3]int{1, 2, 1}}, {Component: 2, Coefficient: -0.5, Powers: [3]int{0, 0, 2}}}
	hollow := geom.HollowSphere{Inner: 0.5, Outer: 1}
	for _, c := range []struct {
		body geom.Body
		p    field.Polarization
	}{{geom.Ellipsoid{SemiAxes: r3.Vec{X: 1, Y: 0.75, Z: 0.5}}, bent}, {geom.Sphere{Radius: 1}, bent}, {hollow, bent}, {hollow, field.RadialPower{Coefficient: 1, Power: 3}}} {
		charge, err := Of(c.body, c.p)
		if err != nil {
			t.Fatal(err)
		}
		parts, err := charge.integrated()
		if err != nil {
			t.Fatal(err)
		}
		for _, x := range []r3.Vec{{X: 0.4, Y: 0.3, Z: 0.3}, {X: 0.9, Y: 0.6, Z: -0.8}} {
			got, ref := field.At(charge, x, field.Mean, want), field.At(parts, x, field.Mean, want)
			const tol = 1e-10 // the contract of the integration; p is about 1
			if d := r3.Norm(r3.Sub(got.G, ref.G)); !(d <= min(tol, got.ErrG+ref.ErrG)) || got.ErrG > 1e-13 {
				t.Errorf("%T %T at %v: g %v, integrated %v, off by %.2g of %.2g", c.body, c.p, x, got.G, ref.G, d, got.ErrG+ref.ErrG)
			}
			if d := math.Abs(got.Phi - ref.Phi); !(d <= min(tol, got.ErrPhi+ref.ErrPhi)) || got.ErrPhi > 1e-13 {
				t.Errorf("%T %T at %v: phi %v, integrated %v, off by %.2g of %.2g", c.body, c.p, x, got.Phi, ref.Phi, d, got.ErrPhi+ref.ErrPhi)
			}
		}
	}
}
