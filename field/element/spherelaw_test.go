package element_test

import (
	"math"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/element"
	"example.com/boundpole/geom"
	"example.com/boundpole/verify/law"
	"gonum.org/v1/gonum/spatial/r3"
)

var sheared = field.Affine{Value: r3.Vec{X: 0.3, Y: -0.2, Z: 0.5},
	Gradient: [3][3]float64{{0.5, 1.25, -0.75}, {2, -1, 0.375}, {0.25, 1.5, 2}}}

// TestAffineSphere holds affine spheres, full and hollow, against the laws of the field with all their faces, and a case by
// hand: p = x k on the unit sphere has S with xz = 1/2, so phi = x z/5 inside.
func TestAffineSphere(t *testing.T) {
	for _, inner := range []float64{0, 0.6, 0.999} {
		src, err := element.NewAffineSphere(inner, 1, sheared)
		if err != nil {
			t.Fatal(err)
		}
		var body geom.Body = geom.Sphere{Radius: 1}
		moment := r3.Scale(4*math.Pi/3*(1-inner*inner*inner), sheared.Value)
		if inner > 0 {
			body = geom.HollowSphere{Inner: inner, Outer: 1}
		}
		err = law.Source(src, law.Claims{
			Bodies: []geom.Body{body}, Total: &law.Total{Moment: &moment}, Faces: law.FacesOf(body, sheared, 6, 0.4*(1-inner)),
			Accuracy: 1e-12, Potential: true, Seed: 3,
		})
		if err != nil {
			t.Errorf("inner radius %g: %v", inner, err)
		}
	}
	tilt := field.Affine{Gradient: [3][3]float64{{}, {}, {1, 0, 0}}}
	src, err := element.NewAffineSphere(0, 1, tilt)
	if err != nil {
		t.Fatal(err)
	}
	x := r3.Vec{X: 0.3, Y: 0.1, Z: -0.4}
	v := field.At(src, x, field.Mean, field.WantPhi|field.WantG|field.WantGrad)
	if want := -0.12 / 5; math.Abs(v.Phi-want) > 1e-17 { // one rounding
		t.Errorf("phi %v, want %v", v.Phi, want)
	}
	if math.Abs(v.Grad[4]+0.2) > 1e-16 || math.Abs(v.G.X-0.08) > 1e-16 { // a few roundings
		t.Errorf("gradient xz %v, want -0.2; g %v", v.Grad[4], v.G)
	}
}

// TestCentralPower holds centrally polarized spheres against the laws of the field, and against phi = c (r^(n+1) -
// a^(n+1))/(n+1), g = -p by hand.
func TestCentralPower(t *testing.T) {
	for _, c := range []struct{ inner, power float64 }{{0, 0.5}, {0, 3}, {0.4, 2}, {0.4, -1}, {0.9, -2.5}} {
		src, err := element.NewCentralPower(c.inner, 1.5, 2, c.power)
		if err != nil {
			t.Fatal(err)
		}
		pol := field.CentralPower{Coefficient: 2, Power: c.power}
		var body geom.Body = geom.Sphere{Radius: 1.5}
		if c.inner > 0 {
			body = geom.HollowSphere{Inner: c.inner, Outer: 1.5}
		}
		x := r3.Vec{X: 0.6, Y: -0.9, Z: 0.2} // r = 1.1
		v := field.At(src, x, field.Mean, field.WantPhi|field.WantG|field.WantErr)
		want := 2 * math.Log(1.1/1.5)
		if k := c.power + 1; k != 0 {
			want = 2 * (math.Pow(1.1, k) - math.Pow(1.5, k)) / k
		}
		if math.Abs(v.Phi-want) > 1e-14*math.Abs(want) { // a few roundings of the difference
			t.Errorf("%+v: phi %v, want %v", c, v.Phi, want)
		}
		if d := r3.Norm(r3.Add(v.G, pol.At(x))); d > 1e-14*r3.Norm(v.G) {
			t.Errorf("%+v: g %v, want minus %v", c, v.G, pol.At(x))
		}
		for _, f := range law.FacesOf(body, pol, 6, 0.05) {
			out, in := field.At(src, f.X, field.Outside, field.WantG), field.At(src, f.X, field.Inside, field.WantG)
			if jump := r3.Dot(f.Normal, r3.Sub(out.G, in.G)); math.Abs(jump-f.Sigma) > 1e-13*math.Abs(f.Sigma) {
				t.Errorf("%+v at %v: jump %v, want %v", c, f.X, jump, f.Sigma)
			}
		}
	}
	zero, err := element.NewCentralPower(0, 1, 1, 0)
	if err != nil {
		t.Fatal(err)
	}
	if v := field.At(zero, r3.Vec{}, field.Mean, field.WantPhi|field.WantG); v.Status != field.AtPoint || v.Phi != -1 {
		t.Errorf("at the centre of p = r-hat: %+v, want phi -1 and no field", v)
	}
	for _, bad := range [][4]float64{{1, 1, 1, 1}, {-1, 1, 1, 1}, {0, 1, 1, -1}, {0, math.Inf(1), 1, 1}, {0, 1, math.NaN(), 1}} {
		if _, err := element.NewCentralPower(bad[0], bad[1], bad[2], bad[3]); err == nil {
			t.Errorf("%v was accepted", bad)
		}
	}
}
