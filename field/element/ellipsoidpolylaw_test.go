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

var bent = field.Polynomial{
	{Component: 0, Coefficient: 0.5, Powers: [3]int{2, 1, 0}}, {Component: 0, Coefficient: -0.25, Powers: [3]int{0, 0, 3}},
	{Component: 1, Coefficient: 1, Powers: [3]int{1, 1, 1}}, {Component: 2, Coefficient: 0.75, Powers: [3]int{0, 2, 4}},
	{Component: 2, Coefficient: -0.5}, {Component: 1, Coefficient: 0.5, Powers: [3]int{0, 0, 2}},
}

// TestPolynomialLaws holds polynomial ellipsoids and spheres against the laws of the field and all their faces, and the trace of
// the gradient against the charge.
func TestPolynomialLaws(t *testing.T) {
	shape := geom.Ellipsoid{SemiAxes: r3.Vec{X: 1, Y: 0.75, Z: 0.5}}
	ellipsoid, err := element.NewPolynomialEllipsoid(shape, bent)
	if err != nil {
		t.Fatal(err)
	}
	full, err := element.NewPolynomialSphere(0, 1, bent)
	if err != nil {
		t.Fatal(err)
	}
	hollow, err := element.NewPolynomialSphere(0.5, 1, bent)
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range []struct {
		src  field.Evaluator
		body geom.Body
	}{{ellipsoid, shape}, {full, geom.Sphere{Radius: 1}}, {hollow, geom.HollowSphere{Inner: 0.5, Outer: 1}}} {
		err := law.Source(c.src.(field.Source), law.Claims{
			Bodies: []geom.Body{c.body}, Total: &law.Total{}, Faces: law.FacesOf(c.body, bent, 6, 0.2), Accuracy: 1e-12, Potential: true, Seed: 3,
		})
		if err != nil {
			t.Errorf("%T: %v", c.body, err)
		}
		for _, x := range []r3.Vec{{X: 0.3, Y: 0.45, Z: -0.1}, {X: -0.6, Y: 0.1, Z: 0.2}, {X: 1, Y: 0.5, Z: -0.75}, {X: -3, Y: 2}, {Z: 0.4}} {
			want := 0.0
			if c.body.Locate(field.PointsOf(x).At(0).X, 0).Region == geom.Inside {
				want = -bent.Divergence(x)
			}
			v := field.At(c.src.(field.Source), x, field.Mean, field.WantGrad|field.WantErr)
			if d := math.Abs(v.Grad[0] + v.Grad[1] + v.Grad[2] - want); !(d <= math.Sqrt(3)*v.ErrGrad+1e-15) { // the trace of an error; rounding of the divergence
				t.Errorf("%T at %v: divergence of g off by %.3g, estimate %.3g", c.body, x, d, v.ErrGrad)
			}
		}
	}
}

// TestPolynomialGradient holds the gradient against differences of g.
func TestPolynomialGradient(t *testing.T) {
	for _, axes := range []r3.Vec{{X: 1, Y: 0.75, Z: 0.5}, {X: 0.5, Y: 1, Z: 0.125}, {X: 1, Y: 1, Z: 1}} {
		src, err := element.NewPolynomialEllipsoid(geom.Ellipsoid{SemiAxes: axes}, bent)
		if err != nil {
			t.Fatal(err)
		}
		const h = 0x1p-13
		order := [6][2]int{{0, 0}, {1, 1}, {2, 2}, {0, 1}, {0, 2}, {1, 2}}
		for _, x := range []r3.Vec{{X: 0.25, Y: 0.375, Z: -0.0625}, {X: 0.75, Y: -0.75, Z: 0.5}, {X: -0.5, Y: 1.25, Z: 0.25}, {Z: 1.5}, {X: 3, Y: -2, Z: 1}} {
			v := field.At(src, x, field.Mean, field.WantGrad)
			for k, ij := range order {
				e := [3]r3.Vec{{X: h}, {Y: h}, {Z: h}}[ij[1]]
				g := func(s float64) float64 {
					w := src.Field(r3.Add(x, r3.Scale(s, e)))
					return [3]float64{w.X, w.Y, w.Z}[ij[0]]
				}
				want := (8*(g(1)-g(-1)) - (g(2) - g(-2))) / (12 * h)
				const tol = 1e-11 // fourth order: h^4 = 2e-16 times fifth derivatives; rounding u/h = 1e-12
				if math.Abs(v.Grad[k]-want) > tol {
					t.Errorf("axes %v at %v: gradient %d is %v, differences %v", axes, x, k, v.Grad[k], want)
				}
			}
		}
	}
}
