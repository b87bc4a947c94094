package current_test

import (
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/current"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// azimuthal is a uniform magnetization along phi: it has no poles, so that b is m inside and zero outside, and the current
// m/s along z inside.
var azimuthal = field.Func{P: func(r3.Vec) [3]float64 { return [3]float64{0, 1, 0} }, Components: field.Cylindrical}

var quadratic = field.Polynomial{
	{Component: 0, Coefficient: 1, Powers: [3]int{0, 1, 1}}, {Component: 1, Coefficient: -0.5, Powers: [3]int{2, 0, 0}},
	{Component: 2, Coefficient: 0.75, Powers: [3]int{0, 2, 0}}, {Component: 2, Coefficient: 1},
}

// TestOwnFunction integrates the currents of laws without closed forms over faces and cells, which takes up to a second a point.
func TestOwnFunction(t *testing.T) {
	if testing.Short() {
		t.Skip("takes seconds; run without -short")
	}
	near := func(t *testing.T, x, got, want r3.Vec, claim float64) {
		t.Helper()
		if miss := r3.Norm(r3.Sub(got, want)); !(miss <= 1e-10*max(1, r3.Norm(want))) || !(miss <= claim+4*u) { // contract of integrated bodies
			t.Errorf("at %v: b %v, want %v, off by %.3g, estimate %.3g", x, got, want, miss, claim)
		}
	}
	ring, err := current.Of(geom.Tube{Inner: 0.5, Outer: 1, Height: 1.5}, azimuthal)
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range []struct{ x, b r3.Vec }{{r3.Vec{X: 0.7, Z: 0.2}, r3.Vec{Y: 1}}, {r3.Vec{X: 3}, r3.Vec{}}} {
		v := current.At(ring, c.x, field.Mean)
		near(t, c.x, v.B, c.b, v.ErrB)
	}
	body := geom.Box{Size: r3.Vec{X: 2, Y: 1.5, Z: 1}}
	box, err := current.Of(body, quadratic)
	if err != nil {
		t.Fatal(err)
	}
	poles, err := bound.Of(body, quadratic)
	if err != nil {
		t.Fatal(err)
	}
	for _, x := range []r3.Vec{{X: 0.7, Y: 0.749999, Z: 0.1}} {
		v, h := current.At(box, x, field.Mean), field.At(poles, x, field.Mean, field.WantG|field.WantErr)
		near(t, x, v.B, r3.Add(h.G, quadratic.At(x)), v.ErrB+h.ErrG)
	}
}

// TestWrongCurrents: a body whose faces do not close cannot pass.
func TestWrongCurrents(t *testing.T) {
	if _, err := current.Of(geom.Box{Size: r3.Vec{X: 1, Y: 1, Z: -1}}, sheared); err == nil {
		t.Error("a box of negative height was accepted")
	}
	if _, err := current.Of(geom.Cylinder{Radius: 1, Height: 1}, field.Polynomial{{Component: 3, Coefficient: 1}}); err == nil {
		t.Error("component 3 was accepted")
	}
}
