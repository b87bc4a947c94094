package magnet_test

import (
	"math"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"example.com/boundpole/magnet"
	"gonum.org/v1/gonum/spatial/r3"
)

// near fails unless got is within tol of want.
func near(t *testing.T, what string, got, want, tol float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tol) {
		t.Errorf("%s: got %.12g, want %.12g within %.3g", what, got, want, tol)
	}
}

// lid is the axially magnetized disc of the default scene, in mm.
func lid(t *testing.T) magnet.Model {
	t.Helper()
	part, err := magnet.WithRemanence(geom.At(geom.Cylinder{Radius: 3, Height: 4}, geom.Translate(r3.Vec{Z: 5})), r3.Vec{Z: 1.2})
	if err != nil {
		t.Fatal(err)
	}
	return magnet.Model{Parts: []magnet.Part{part}, Unit: 1e-3}
}

// TestLidMagnet checks the hand values of a disc magnet on its axis: B = (Br/2)[(d+t)/sqrt((d+t)^2+R^2) - d/sqrt(d^2+R^2)], the
// textbook formula of makers' catalogues.
func TestLidMagnet(t *testing.T) {
	m := lid(t)
	axis := func(d float64) float64 {
		return 0.6 * ((d+4)/math.Hypot(d+4, 3) - d/math.Hypot(d, 3))
	}
	face := r3.Vec{Z: 3}
	out, in, mean := m.At(face, field.Outside), m.At(face, field.Inside), m.At(face, field.Mean)
	near(t, "B outside the face", out.B.Z, 0.48, 1e-15)
	near(t, "B inside the face", in.B.Z, 0.48, 1e-15)
	mag := 1.2 / magnet.Mu0
	near(t, "H outside", out.H.Z, 0.48/magnet.Mu0, 1e-9)
	near(t, "H inside", in.H.Z, 0.48/magnet.Mu0-mag, 1e-9)
	near(t, "mean H", mean.H.Z, 0.48/magnet.Mu0-mag/2, 1e-9)
	near(t, "mean B", mean.B.Z, 0.48, 1e-15)
	near(t, "B at the Hall plate", m.At(r3.Vec{Z: -1}, field.Mean).B.Z, axis(4), 1e-15) // 81.798 mT
	near(t, "B at the centre", m.At(r3.Vec{Z: 5}, field.Mean).B.Z, 1.2*2/math.Hypot(2, 3), 1e-15)
	rim := m.At(r3.Vec{X: 3, Z: 3}, field.Mean)
	if rim.Status != field.OnEdge || !math.IsNaN(rim.H.X) || !math.IsNaN(rim.B.Z) || math.IsNaN(rim.Vm) {
		t.Errorf("rim: got %+v, want NaN field, finite potential, status %v", rim, field.OnEdge)
	}
	if out.Inside != -1 || in.Inside != 0 || m.At(r3.Vec{Z: 5}, field.Mean).Inside != 0 {
		t.Errorf("parts that contain the points: %d, %d", out.Inside, in.Inside)
	}
	// Far off B is that of the dipole mu0 m/(2 pi r^3), with the correction of relative size (3/2)(h^2/r^2)...: 1 m above
	// the magnet r = 1000 mm, half height 2 mm, radius 3 mm, so 1e-5 relative.
	moment := mag * math.Pi * 9e-6 * 4e-3
	near(t, "dipole moment", m.Parts[0].Charge.Moment.Z*1e-9, moment, 1e-16)
	near(t, "B 1 m above", m.At(r3.Vec{Z: 1005}, field.Mean).B.Z, magnet.Mu0*moment/(2*math.Pi), 1e-5*2.2e-8)
}

// TestApplied checks that an applied flux density adds to H and B, inside and outside alike.
func TestApplied(t *testing.T) {
	m := lid(t)
	x := r3.Vec{X: 1, Y: 0.5, Z: 4}
	before := m.At(x, field.Mean)
	m.Applied = r3.Vec{X: 0.25}
	after := m.At(x, field.Mean)
	near(t, "B", after.B.X-before.B.X, 0.25, 1e-15)
	near(t, "H", after.H.X-before.H.X, 0.25/magnet.Mu0, 1e-9)
	near(t, "Vm", after.Vm-before.Vm, -0.25/magnet.Mu0*1e-3, 1e-9)
}

// TestUnit checks that a model in millimetres is the model in metres.
func TestUnit(t *testing.T) {
	mm := lid(t)
	part, err := magnet.WithRemanence(geom.At(geom.Cylinder{Radius: 3e-3, Height: 4e-3}, geom.Translate(r3.Vec{Z: 5e-3})), r3.Vec{Z: 1.2})
	if err != nil {
		t.Fatal(err)
	}
	m := magnet.Model{Parts: []magnet.Part{part}}
	a, b := mm.At(r3.Vec{X: 2, Y: -1, Z: 9}, field.Mean), m.At(r3.Vec{X: 2e-3, Y: -1e-3, Z: 9e-3}, field.Mean)
	near(t, "Vm", a.Vm, b.Vm, 1e-13*math.Abs(b.Vm))
	near(t, "H", r3.Norm(r3.Sub(a.H, b.H)), 0, 1e-13*r3.Norm(b.H))
}

// TestTouchingMagnets checks that two halves that touch give the field of the whole on both sides of the joint.
func TestTouchingMagnets(t *testing.T) {
	whole, err := magnet.WithRemanence(geom.Box{Size: r3.Vec{X: 2, Y: 2, Z: 2}}, r3.Vec{Z: 1})
	if err != nil {
		t.Fatal(err)
	}
	var halves []magnet.Part
	for _, z := range []float64{-0.5, 0.5} {
		half, err := magnet.WithRemanence(geom.At(geom.Box{Size: r3.Vec{X: 2, Y: 2, Z: 1}}, geom.Translate(r3.Vec{Z: z})), r3.Vec{Z: 1})
		if err != nil {
			t.Fatal(err)
		}
		halves = append(halves, half)
	}
	one, two := magnet.Model{Parts: []magnet.Part{whole}}, magnet.Model{Parts: halves}
	for _, side := range []field.Side{field.Mean, field.Inside, field.Outside} {
		x := r3.Vec{X: 0.3, Y: -0.2}
		a, b := one.At(x, side), two.At(x, side)
		near(t, "H in the joint", b.H.Z, a.H.Z, 1e-9) // 1e6 A/m, a few u
		near(t, "B in the joint", b.B.Z, a.B.Z, 1e-15)
		if b.Inside < 0 && side != field.Mean {
			t.Errorf("side %d: the joint is in no part", side)
		}
	}
}
