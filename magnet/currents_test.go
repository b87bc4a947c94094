package magnet_test

import (
	"context"
	"fmt"
	"math"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/current"
	"example.com/boundpole/geom"
	"example.com/boundpole/magnet"
	"gonum.org/v1/gonum/spatial/r3"
)

// A disc magnet as poles and as currents, and the flux through a sensing loop in front of it.
func ExampleAmperian() {
	shape := geom.Cylinder{Radius: 3, Height: 4} // mm
	m := field.Uniform{P: magnet.Remanence(r3.Vec{Z: 1.2})}
	currents, err := current.Of(shape, m)
	if err != nil {
		fmt.Println(err)
		return
	}
	poles, err := magnet.Magnetized(shape, m)
	if err != nil {
		fmt.Println(err)
		return
	}
	amp := magnet.Amperian{Parts: []current.Source{currents}, Unit: 1e-3}
	model := magnet.Model{Parts: []magnet.Part{poles}, Unit: 1e-3}
	inside := r3.Vec{X: 1, Z: 1.5}
	fmt.Printf("B by currents %.6f T, by poles %.6f T\n", amp.At(inside, field.Mean).B.Z, model.At(inside, field.Mean).B.Z)
	loop := current.Circle{Radius: 2, Pose: geom.Translate(r3.Vec{Z: 4})}
	flux, _, err := amp.Linkage(context.Background(), loop)
	fmt.Printf("flux through the loop %.4f uWb %v\n", flux*1e6, err)
	// Output:
	// B by currents 0.569493 T, by poles 0.569493 T
	// flux through the loop 2.2563 uWb <nil>
}

// A long tube with 1 uWb by metre in its wall: outside there is A and no B.
func ExampleStraightFluxTube() {
	tube, err := magnet.StraightFluxTube(geom.Cylinder{Radius: 5, Height: 100}, 1e-6, 1e-3)
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("A in the middle %.4f nT m, beside it %.4f nT m\n", tube.At(r3.Vec{}, field.Mean).A.Z*1e9, tube.At(r3.Vec{X: 10}, field.Mean).A.Z*1e9)
	// Output:
	// A in the middle 995.0372 nT m, beside it -4.6838 nT m
}

// TestFreeCurrents: parts of a model that are currents give H in A/m in any unit of length, and no Vm.
func TestFreeCurrents(t *testing.T) {
	const i = 2.5
	mm, err := magnet.Loop(geom.Disc{Radius: 20}, geom.Translate(r3.Vec{Z: 5}), i/1e-3)
	if err != nil {
		t.Fatal(err)
	}
	model := magnet.Model{Parts: []magnet.Part{mm}, Unit: 1e-3, Applied: r3.Vec{X: 0.25}}
	r := model.At(r3.Vec{Z: 5}, field.Mean)
	near(t, "H at the centre, i/2a", r.H.Z, i/0.04, 1e-12)
	near(t, "B applied", r.B.X, 0.25, 1e-15)
	if !math.IsNaN(r.Vm) || r.Status != field.NoPotential || !(r.ErrB > 0 && r.ErrB < 1e-14) {
		t.Errorf("reading %+v", r)
	}
	amp := magnet.Amperian{Parts: []current.Source{mm.Source.(current.Source)}, Unit: 1e-3, Applied: r3.Vec{X: 0.25}}
	x := r3.Vec{X: 4, Y: 3, Z: 9}
	v, w := amp.At(x, field.Mean), model.At(x, field.Mean)
	near(t, "B of both", r3.Norm(r3.Sub(v.B, w.B)), 0, 1e-15)
	square := []r3.Vec{{X: 1, Y: -1}, {X: 1, Y: 1}, {X: -1, Y: 1}, {X: -1, Y: -1}}
	wire, err := magnet.Wire(square, true, i)
	if err != nil {
		t.Fatal(err)
	}
	metre := magnet.Model{Parts: []magnet.Part{wire}}
	near(t, "H at the centre of a square, 2 sqrt2 i/(pi 2a)", metre.At(r3.Vec{}, field.Mean).H.Z, math.Sqrt2*i/math.Pi, 1e-15)
	coil, err := magnet.Solenoid(geom.Cylinder{Radius: 10, Height: 60}, geom.Pose{}, 1000)
	if err != nil {
		t.Fatal(err)
	}
	long := magnet.Model{Parts: []magnet.Part{coil}, Unit: 1e-3}
	near(t, "H in a solenoid, K cos", long.At(r3.Vec{}, field.Mean).H.Z, 1000*30/math.Hypot(30, 10), 1e-11)
}

// TestLinkage: by Stokes the loop integral of the applied A is B times area; that of a tube is its flux.
func TestLinkage(t *testing.T) {
	a := magnet.Amperian{Applied: r3.Vec{X: 0.1, Z: 0.5}, Unit: 1e-3}
	got, estimate, err := a.Linkage(t.Context(), current.Circle{Radius: 2, Pose: geom.Translate(r3.Vec{X: 7, Y: -3})})
	want := 0.5 * math.Pi * 4e-6
	if err != nil || math.Abs(got-want) > 1e-12*want || math.Abs(got-want) > estimate { // terms of 10 mm cancel to 1 mm
		t.Errorf("applied flux %v, want %v, estimate %v, %v", got, want, estimate, err)
	}
	bent, err := magnet.BentFluxTube(geom.ArcDegrees(10, 20, 10, 0, 360), geom.Pose{}, 3e-6, 1e-3)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "A in a bent tube", bent.At(r3.Vec{X: 15}, field.Mean).A.Y, 3e-6/15e-3, 1e-18)
	flux, _, err := bent.Linkage(t.Context(), current.Circle{Radius: 12})
	near(t, "flux of a closed tube", flux, 2*math.Pi*3e-6, 1e-17)
	if err != nil {
		t.Error(err)
	}
	thick, err := magnet.ThickFluxTube(geom.Tube{Inner: 5, Outer: 8, Height: 100000}, geom.Pose{}, 0.2, 1e-3)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "A in a long thick tube", thick.At(r3.Vec{}, field.Mean).A.Z, 0.2*3e-3, 1e-11) // the ends take (a/h)^2/2 of it
	thin, err := magnet.StraightFluxTube(geom.Cylinder{Radius: 5, Height: 100}, 1e-6, 1e-3)
	if err != nil {
		t.Fatal(err)
	}
	if c := thin.Charge(); c == nil || math.Abs(c.Layers[1].Charge-1e-6*math.Pi*25) > 1e-20 || bent.Charge() != nil {
		t.Errorf("charge of the upper end %+v", c)
	}
}

// TestHelmholtzPair checks the hand values of a moment coil: 50 turns each of radius 0.15 m give 0.29973 mT/A at the centre, mu0 n/R
// (4/5)^1.5, and by reciprocity a magnet of 3.25 A m^2 there links 0.97411 mWb, whatever its size.
func TestHelmholtzPair(t *testing.T) {
	const n, radius, moment = 50, 0.15, 3.25
	var pair magnet.Model
	for _, z := range []float64{-radius / 2, radius / 2} {
		coil, err := magnet.Loop(geom.Disc{Radius: radius, Z: z}, geom.Pose{}, n)
		if err != nil {
			t.Fatal(err)
		}
		pair.Parts = append(pair.Parts, coil)
	}
	k := pair.At(r3.Vec{}, field.Mean).B.Z
	near(t, "B by ampere", k, magnet.Mu0*n/radius*math.Pow(0.8, 1.5), 1e-18)
	near(t, "B by ampere, printed digits", k, 0.29973e-3, 0.5e-8)
	ball := geom.Sphere{Radius: 0.03}
	bound, err := current.Of(ball, field.Uniform{P: r3.Vec{Z: moment / ball.Volume()}})
	if err != nil {
		t.Fatal(err)
	}
	amp := magnet.Amperian{Parts: []current.Source{bound}}
	linkage := 0.0
	for _, z := range []float64{-radius / 2, radius / 2} {
		flux, _, err := amp.Linkage(t.Context(), current.Circle{Radius: radius, Pose: geom.Translate(r3.Vec{Z: z})})
		if err != nil {
			t.Error(err)
		}
		linkage += n * flux
	}
	near(t, "linkage, k m", linkage, k*moment, 1e-17)
	near(t, "linkage, printed digits", linkage, 0.97411e-3, 0.5e-8)
}
