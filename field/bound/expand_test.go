package bound_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// TestExpandFar holds expansions of round bodies against their own far fields, which come from other formulas and are held
// against references: order by order, at the distance where the order leaves out 1e-15.
func TestExpandFar(t *testing.T) {
	affine := field.Affine{Value: r3.Vec{X: 0.6, Y: 0.3, Z: -1}, Gradient: [3][3]float64{{0.5, -1.25, 0.75}, {2, -0.25, 1.5}, {-1, 0.625, 1.75}}}
	uniform, axial := field.Uniform{P: affine.Value}, field.AxialPower{Coefficient: 1, Power: 3}
	cylinder, tube := geom.Cylinder{Radius: 1, Height: 1.5}, geom.Tube{Inner: 0.25, Outer: 1, Height: 0.5}
	pose, err := geom.Frame(r3.Vec{X: 1, Y: 2, Z: 2}, r3.Vec{X: 1})
	if err != nil {
		t.Fatal(err)
	}
	rng := rand.New(rand.NewPCG(21, 22))
	for _, c := range []struct {
		name string
		body geom.Body
		p    field.Polarization
	}{
		{"cylinder", cylinder, uniform}, {"cylinder affine", cylinder, affine}, {"cylinder axial", cylinder, axial},
		{"cylinder radial", cylinder, field.RadialPower{Coefficient: 1, Power: 2}},
		{"cylinder root", cylinder, field.RadialPower{Coefficient: 1, Power: 0.5}},
		{"cylinder unit", cylinder, field.RadialPower{Coefficient: 1}},
		{"tube root", tube, field.RadialPower{Coefficient: 1, Power: 0.5}}, {"tube inverse", tube, field.RadialPower{Coefficient: 1, Power: -1}},
		{"tube affine", tube, affine}, {"cone", geom.Cone{Bottom: 1, Top: 0.25, Height: 1.5}, uniform},
		{"cone affine", geom.Cone{Bottom: 1, Height: 1.5}, affine}, {"cone axial", geom.Cone{Bottom: 0.5, Top: 1, Height: 1}, axial},
		{"torus", geom.Torus{Major: 1, Minor: 0.25}, uniform}, {"sphere", geom.Sphere{Radius: 1}, affine},
		{"hollow sphere", geom.HollowSphere{Inner: 0.5, Outer: 1}, affine}, {"ellipsoid", geom.Ellipsoid{SemiAxes: r3.Vec{X: 1, Y: 0.25, Z: 0.5}}, affine},
		{"arc", geom.Arc{Inner: 0.5, Outer: 1, Height: 1, From: 0.2, To: 2.5}, affine},
	} {
		charge, err := bound.Of(geom.At(c.body, pose), c.p)
		if err != nil {
			t.Fatal(err)
		}
		worst := 0.0
		for _, order := range []int{8, 13} {
			centre := r3.Scale(0.125, r3.Vec{X: rng.NormFloat64(), Y: rng.NormFloat64(), Z: rng.NormFloat64()})
			m := charge.Expand(centre, order)
			distance := m.Radius() * math.Pow(10, 16/float64(order-1))
			for range 12 {
				d := r3.Unit(r3.Vec{X: rng.NormFloat64(), Y: rng.NormFloat64(), Z: rng.NormFloat64()})
				x := r3.Add(centre, r3.Scale(distance, d))
				got, want := field.At(m, x, field.Mean, field.WantG|field.WantErr), field.At(charge, x, field.Mean, field.WantG|field.WantErr)
				e := r3.Norm(r3.Sub(got.G, want.G))
				worst = max(worst, e/r3.Norm(want.G))
				const tol = 2e-13 // where the low orders cancel the size is some hundredths of that of the moments
				if !(e <= tol*r3.Norm(want.G)) || !(e <= got.ErrG+want.ErrG) {
					t.Errorf("%s: order %d at %v: %v, want %v, off by %.2g; tolerance %g, estimates %.2g, %.2g", c.name, order, x, got.G, want.G,
						e/r3.Norm(want.G), tol, got.ErrG, want.ErrG)
				}
			}
		}
		t.Logf("%s: worst %.2g", c.name, worst)
	}
	hollow, err := bound.Of(geom.HollowSphere{Inner: 0.5, Outer: 1}, field.CentralPower{Coefficient: 1, Power: 2})
	if err != nil {
		t.Fatal(err)
	}
	if v := field.At(hollow.Expand(r3.Vec{}, 8), r3.Vec{X: 3}, field.Mean, field.WantPhi|field.WantG); v.Phi != 0 || v.G != (r3.Vec{}) {
		t.Errorf("a sphere polarized from its centre has the far field %v, want none", v)
	}
}
