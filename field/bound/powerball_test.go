package bound_test

import (
	"math"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// TestCentralPowers holds central power laws on an ellipsoid that is a sphere, which goes over faces and cells, against the closed form of
// the sphere: near the origin, amid, beside the surface and outside.
func TestCentralPowers(t *testing.T) {
	const a = 0.8
	for _, n := range []float64{0, 0.5, 2} {
		p := field.CentralPower{Coefficient: 1.3, Power: n}
		parts, err := bound.Of(geom.Ellipsoid{SemiAxes: r3.Vec{X: a, Y: a, Z: a}}, p)
		if err != nil {
			t.Fatal(err)
		}
		form, err := bound.Of(geom.Sphere{Radius: a}, p)
		if err != nil {
			t.Fatal(err)
		}
		for _, x := range []r3.Vec{{X: 1e-4, Y: -2e-4}, {X: 0.1, Y: 0.2, Z: 0.3}, {X: 0.3, Y: -0.5, Z: 0.1}, {Z: a - 1e-7}, {X: 0.6, Y: 0.8, Z: 0.2}, {Y: 2.5}} {
			got, want := field.At(parts, x, field.Mean, field.WantPhi|field.WantG|field.WantErr), field.At(form, x, field.Mean, field.WantPhi|field.WantG)
			scale := max(r3.Norm(want.G), p.Coefficient*math.Pow(a, n)*math.Pow(min(1, a/r3.Norm(x)), 3))
			if e := r3.Norm(r3.Sub(got.G, want.G)); !(e <= 1e-10*scale) || !(e <= got.ErrG+1e-15*scale) || got.Status != field.Regular { // the contract; the form rounds too
				t.Errorf("n = %v at %v: g %v (%.2g), want %v: %.3g, %v", n, x, got.G, got.ErrG, want.G, e, got.Status)
			}
			if e := math.Abs(got.Phi - want.Phi); !(e <= 1e-10*max(math.Abs(want.Phi), a*scale)) { // the contract
				t.Errorf("n = %v at %v: phi %v, want %v: %.3g", n, x, got.Phi, want.Phi, e)
			}
		}
	}
}
