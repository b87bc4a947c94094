package element_test

import (
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/element"
	"example.com/boundpole/geom"
	"example.com/boundpole/verify/law"
	"gonum.org/v1/gonum/spatial/r3"
)

func build[T any](t *testing.T) func(v T, err error) T {
	return func(v T, err error) T {
		t.Helper()
		if err != nil {
			t.Fatal(err)
		}
		return v
	}
}

// TestRingLaws holds the integrated bodies against the laws of the field.
func TestRingLaws(t *testing.T) {
	p := r3.Vec{X: 0.6, Y: 0.3, Z: -1}
	frustum, tip := geom.Cone{Bottom: 1, Top: 0.5, Height: 1.5}, geom.Cone{Bottom: 0, Top: 0.75, Height: 1}
	ring := geom.Torus{Major: 1, Minor: 0.375}
	shape := geom.Tube{Inner: 0.25, Outer: 1, Height: 1.5}
	rod := geom.Cylinder{Radius: 1, Height: 1.5}
	axial := field.AxialPower{Coefficient: 1.5, Power: 3}
	affine := field.Affine{Value: p, Gradient: [3][3]float64{{0.5, -1.25, 0.75}, {2, -0.25, 1.5}, {-1, 0.625, 1.75}}}
	full := field.RadialPower{Coefficient: -1, Power: 0.5}
	for _, c := range []struct {
		name  string
		src   field.Source
		body  geom.Body
		p     field.Polarization
		reach float64
	}{
		{"frustum", build[*element.Cone](t)(element.NewCone(frustum, p)), frustum, field.Uniform{P: p}, 0.02},
		{"tip", build[*element.Cone](t)(element.NewCone(tip, p)), tip, field.Uniform{P: p}, 0.01},
		{"affine", build[*element.AffineCone](t)(element.NewAffineCone(frustum, affine)), frustum, affine, 0.02},
		{"affine tip", build[*element.AffineCone](t)(element.NewAffineCone(tip, affine)), tip, affine, 0.01},
		{"axial cone", build[*element.AxialPowerCone](t)(element.NewAxialPowerCone(frustum, 1.5, 3)), frustum, axial, 0.02},
		{"torus", build[*element.Torus](t)(element.NewTorus(ring, p)), ring, field.Uniform{P: p}, 0.2},
		{"axial", build[*element.AxialPower](t)(element.NewAxialPower(shape, 1.5, 3)), shape, axial, 0.02},
		{"radial", build[*element.RadialPower](t)(element.NewRadialPower(geom.Tube{Outer: 1, Height: 1.5}, -1, 0.5)), rod, full, 0.02},
	} {
		var moment r3.Vec
		for _, cell := range c.body.Cells() {
			cell.Nodes(12, func(x r3.Vec, w float64) { moment = r3.Add(moment, r3.Scale(w, c.p.At(x))) })
		}
		claims := law.Claims{
			Bodies: []geom.Body{c.body}, Clear: clearOf(c.body), Total: &law.Total{Moment: &moment},
			Faces: law.FacesOf(c.body, c.p, 1, c.reach), Accuracy: 1e-12, Potential: true, Seed: 7, Samples: 3,
		}
		t.Run(c.name, func(t *testing.T) {
			if err := law.Source(c.src, claims); err != nil {
				t.Error(err)
			}
		})
	}
}

// clearOf returns a lower bound for the distance from the bounds of a body.
func clearOf(body geom.Body) func(x r3.Vec) float64 {
	b := body.Bounds()
	return func(x r3.Vec) float64 {
		d := r3.Vec{X: max(b.Min.X-x.X, 0, x.X-b.Max.X), Y: max(b.Min.Y-x.Y, 0, x.Y-b.Max.Y), Z: max(b.Min.Z-x.Z, 0, x.Z-b.Max.Z)}
		return r3.Norm(d)
	}
}
