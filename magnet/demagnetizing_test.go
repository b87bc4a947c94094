package magnet_test

import (
	"context"
	"math"
	"testing"

	"example.com/boundpole/field/closedform"
	"example.com/boundpole/geom"
	"example.com/boundpole/magnet"
	"example.com/boundpole/magnet/cgs"
	"gonum.org/v1/gonum/spatial/r3"
)

func TestDemagnetizing(t *testing.T) {
	turn, err := geom.Turn(r3.Vec{X: 1, Y: 1, Z: 1}, 120) // x to y to z to x
	if err != nil {
		t.Fatal(err)
	}
	box := r3.Vec{X: 20, Y: 10, Z: 5}
	factors := closedform.EllipsoidFactors(r3.Vec{X: 1, Y: 2, Z: 3})
	for _, c := range []struct {
		name    string
		body    geom.Body
		x, y, z float64
	}{
		{"box", geom.Box{Size: box}, 0.14314, 0.29392, 0.56294 /* trade tables, five digits */},
		{"turned box", geom.At(geom.Box{Size: box}, turn), 0.56294, 0.14314, 0.29392},
		{"cylinder", geom.Cylinder{Radius: 1, Height: 2}, closedform.CylinderTransverseFactor(1, 2), closedform.CylinderTransverseFactor(1, 2),
			closedform.CylinderMagnetometricFactor(1, 2)},
		{"ellipsoid", geom.Ellipsoid{SemiAxes: r3.Vec{X: 1, Y: 2, Z: 3}}, factors.X, factors.Y, factors.Z},
	} {
		got, err := magnet.Demagnetizing(context.Background(), c.body)
		if err != nil {
			t.Fatalf("%s: %v", c.name, err)
		}
		tol := got.Estimate
		if c.body == (geom.Box{Size: box}) || c.name == "turned box" {
			tol = 0.5e-5 // the printed digits
		}
		for i, want := range [3]float64{c.x, c.y, c.z} {
			if math.Abs(got.N[i][i]-want) > tol {
				t.Errorf("%s: N%d = %v ± %v, want %v", c.name, i, got.N[i][i], got.Estimate, want)
			}
		}
		trace := got.N[0][0] + got.N[1][1] + got.N[2][2]
		if math.Abs(trace-1) > 3*got.Estimate || got.Estimate > 1e-8 || math.Abs(got.N[0][1]) > got.Estimate {
			t.Errorf("%s: trace %v, off the diagonal %v, estimate %v", c.name, trace, got.N[0][1], got.Estimate)
		}
		if along := got.Along(r3.Vec{Z: 7}); along != got.N[2][2] {
			t.Errorf("%s: along z %v, want %v", c.name, along, got.N[2][2])
		}
	}
}

// TestSheared repeats the correction of a stubby cylinder, measured in CGS: hand values to the printed digits.
func TestSheared(t *testing.T) {
	m := cgs.EMUPerCubicCentimetre(1.51875 / 0.0212058)
	h := cgs.Oersted(500)
	n := closedform.CylinderMagnetometricFactor(1.5, 3)
	loop, err := magnet.Sheared([]magnet.LoopPoint{{H: h, M: m}}, n)
	if err != nil {
		t.Fatal(err)
	}
	chi := magnet.Susceptibility(m/h, n)
	if math.Abs(loop[0].H-17474) > 0.5 || math.Abs(cgs.ToOersted(loop[0].H)-219.6) > 0.05 || math.Abs(chi-4.0987) > 5e-4 ||
		math.Abs(cgs.ToSusceptibility(chi)-0.32617) > 5e-5 || loop[0].M != m { // printed digits; chi moves five times as much as its apparent value
		t.Errorf("inner field %v A/m, chi %v, want 17474 and 4.0987", loop[0].H, chi)
	}
	if got := magnet.Susceptibility(4, 0.25); !math.IsInf(got, 1) {
		t.Errorf("an apparent 1/N is %v, want +Inf", got)
	}
	for _, bad := range []float64{-0.1, 1.1, math.NaN()} {
		if _, err := magnet.Sheared(nil, bad); err == nil {
			t.Errorf("factor %v is accepted", bad)
		}
	}
	if _, err := magnet.Sheared([]magnet.LoopPoint{{H: math.NaN()}}, 0.3); err == nil {
		t.Error("a NaN is accepted")
	}
}
