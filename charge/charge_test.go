package charge_test

import (
	"errors"
	"math"
	"strings"
	"testing"

	"example.com/boundpole/charge"
	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// near fails unless got is within tol of want.
func near(t *testing.T, what string, got, want, tol float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tol) {
		t.Errorf("%s: got %.12g, want %.12g within %.3g", what, got, want, tol)
	}
}

// TestGradedFilm checks the electret film of the default scene, in mm: p_z = P (1 + z/t) about mid-height, so 1.5 P on top,
// -0.5 P at the bottom, -P/t inside.
func TestGradedFilm(t *testing.T) {
	const p, thick, radius = 8.8541878188e-05, 0.025, 4.0
	pol := field.Affine{Value: r3.Vec{Z: p}}
	pol.Gradient[2][2] = p / thick
	part, err := charge.Polarized(geom.At(geom.Cylinder{Radius: radius, Height: thick}, geom.Translate(r3.Vec{X: 30, Z: thick / 2})), pol)
	if err != nil {
		t.Fatal(err)
	}
	area := math.Pi * radius * radius
	c := part.Charge
	near(t, "charge on top", c.Layers[1].Charge, 1.5*p*area, 1e-14*p*area)
	near(t, "charge at the bottom", c.Layers[0].Charge, -0.5*p*area, 1e-14*p*area)
	near(t, "charge of the wall", c.Layers[2].Charge, 0, 0)
	near(t, "charge inside", c.Volumes[0].Charge, -p*area, 1e-14*p*area)
	near(t, "total", c.Total(), 0, 0)
	near(t, "moment", c.Moment.Z, p*area*thick, 1e-14*p*area*thick)
	m := charge.Model{Parts: []charge.Part{part}, Unit: 1e-3}
	mid := m.At(r3.Vec{X: 30, Z: thick / 2}, field.Mean)
	near(t, "E in the film", mid.E.Z, -9.969e6, 1e3) // value of the scene's description, 4 digits
	near(t, "D in the film", mid.D.Z, 2.77e-7, 1e-9) // 3 digits
	up := m.At(r3.Vec{X: 30, Z: thick/2 + 3}, field.Mean)
	near(t, "V 3 mm up", up.V, 50.033, 1e-3)
	near(t, "E 3 mm up", up.E.Z, 16012, 1)
}

// TestSphere checks Jackson, Classical Electrodynamics, sec. 4.4: inside a uniformly polarized sphere E = -P/(3 eps0), and
// D = 2P/3.
func TestSphere(t *testing.T) {
	part, err := charge.Polarized(geom.Sphere{Radius: 2e-3}, field.Uniform{P: r3.Vec{X: 3e-6}})
	if err != nil {
		t.Fatal(err)
	}
	m := charge.Model{Parts: []charge.Part{part}}
	r := m.At(r3.Vec{Y: 1e-3}, field.Mean)
	near(t, "E", r.E.X, -1e-6/charge.Epsilon0, 1e-9)
	near(t, "D", r.D.X, 2e-6, 1e-21)
	if r.Inside != 0 {
		t.Errorf("the point is in part %d, want 0", r.Inside)
	}
}

// TestCapacitor checks two charged sheets of opposite density: sigma/eps0 between them near the middle, nothing outside, and
// the jump of the field on a sheet.
func TestCapacitor(t *testing.T) {
	const sigma = 2e-6
	var parts []charge.Part
	for _, s := range []struct{ z, sigma float64 }{{0, sigma}, {1e-3, -sigma}} {
		part, err := charge.Sheet(geom.SheetAt(geom.Disc{Radius: 1}, geom.Translate(r3.Vec{Z: s.z})), s.sigma, r3.Vec{})
		if err != nil {
			t.Fatal(err)
		}
		parts = append(parts, part)
	}
	m := charge.Model{Parts: parts}
	near(t, "E between", m.At(r3.Vec{Z: 5e-4}, field.Mean).E.Z, sigma/charge.Epsilon0, 1e-3*sigma/charge.Epsilon0) // edge: gap/radius
	above, below := m.At(r3.Vec{}, field.Outside), m.At(r3.Vec{}, field.Inside)
	near(t, "jump", above.E.Z-below.E.Z, sigma/charge.Epsilon0, 1e-9)
	near(t, "V", above.V, below.V, 0)
}

// TestPointAndDipole checks Coulomb's law and the dipole law with numbers of a textbook kind.
func TestPointAndDipole(t *testing.T) {
	m := charge.Model{Parts: []charge.Part{charge.Point(r3.Vec{X: 1}, 1e-9)}}
	near(t, "V", m.At(r3.Vec{X: 3}, field.Mean).V, 1e-9/(4*math.Pi*charge.Epsilon0*2), 1e-14)
	m = charge.Model{Parts: []charge.Part{charge.Dipole(r3.Vec{}, r3.Vec{Z: 1e-12})}}
	near(t, "E", m.At(r3.Vec{Z: 0.1}, field.Mean).E.Z, 2e-12/(4*math.Pi*charge.Epsilon0*1e-3), 1e-14)
	if s := m.At(r3.Vec{}, field.Mean).Status; s != field.AtPoint {
		t.Errorf("status at the dipole: %v, want %v", s, field.AtPoint)
	}
}

// TestLinearSheets checks a density that grows along x on a disc and an annulus: far away the total charge a A and the dipole
// b pi (R^4 - r^4)/4 about the centre, on the face half the jump sigma/eps0 of the place.
func TestLinearSheets(t *testing.T) {
	const a, b, inner, outer = 2e-6, 3e-6, 0.5, 1.0
	for _, c := range []struct {
		name  string
		sheet geom.Sheet
		inner float64
	}{{"disc", geom.Disc{Radius: outer}, 0}, {"annulus", geom.Annulus{Inner: inner, Outer: outer}, inner}} {
		tilted, err := geom.Turn(r3.Vec{Y: 1}, 90) // normal along x, the gradient along -z
		if err != nil {
			t.Fatal(err)
		}
		part, err := charge.Sheet(geom.SheetAt(c.sheet, tilted), a, r3.Vec{X: b})
		if err != nil {
			t.Fatalf("%s: %v", c.name, err)
		}
		m := charge.Model{Parts: []charge.Part{part}}
		q := a * math.Pi * (outer*outer - c.inner*c.inner)
		p := b * math.Pi / 4 * (math.Pow(outer, 4) - math.Pow(c.inner, 4))
		const far = 1e4
		up, down := m.At(r3.Vec{Z: far}, field.Mean), m.At(r3.Vec{Z: -far}, field.Mean)
		scale := 4 * math.Pi * charge.Epsilon0 * far
		near(t, c.name+" charge from afar", (up.V+down.V)/2*scale, q, 1e-8*q)     // the quadrupole is (R/far)^2
		near(t, c.name+" dipole from afar", (down.V-up.V)/2*scale*far, p, 1e-7*p) // the octupole likewise, and V cancels by 1e4
		x := r3.Vec{Y: 0.1, Z: -0.75}                                             // x = 0.75 of the sheet
		jump := r3.Sub(m.At(x, field.Outside).E, m.At(x, field.Inside).E)
		near(t, c.name+" jump", jump.X*charge.Epsilon0, a+0.75*b, 1e-12*a) // rounding of E, of which the jump is the larger part
	}
}

// strange is a sheet that the package does not know.
type strange struct{ geom.Sheet }

// TestRefusals checks that what cannot be computed is refused in words.
func TestRefusals(t *testing.T) {
	if _, err := charge.Sheet(strange{geom.Disc{Radius: 1}}, 1, r3.Vec{}); !errors.Is(err, bound.ErrUnsupported) {
		t.Errorf("a sheet of an unknown kind: %v, want %v", err, bound.ErrUnsupported)
	}
	if _, err := charge.Sheet(geom.Disc{Radius: -1}, 1, r3.Vec{}); err == nil || !strings.Contains(err.Error(), "radius") {
		t.Errorf("negative radius: %v", err)
	}
	if _, err := charge.Sheet(geom.Disc{Radius: 1}, math.NaN(), r3.Vec{}); err == nil {
		t.Error("a density that is not a number was accepted")
	}
	spokes := field.RadialPower{Coefficient: 1, Power: -1}
	if _, err := charge.Polarized(geom.Box{Size: r3.Vec{X: 1, Y: 1, Z: 1}}, spokes); err == nil {
		t.Error("a polarization that is infinite on the axis of a box was accepted")
	}
}
