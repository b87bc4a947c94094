package element

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

func TestEllipsoidRefuses(t *testing.T) {
	if _, err := NewEllipsoid(geom.Ellipsoid{SemiAxes: r3.Vec{X: 1, Y: -1, Z: 1}}, r3.Vec{}); err == nil {
		t.Error("a negative semi-axis was taken, want an error")
	}
	if _, err := NewEllipsoid(geom.Ellipsoid{SemiAxes: r3.Vec{X: 1, Y: 1, Z: 1}}, r3.Vec{Y: math.NaN()}); err == nil {
		t.Error("a polarization of NaN was taken, want an error")
	}
}

// TestFactors checks the depolarizing factors against the closed forms of spheroids.
func TestFactors(t *testing.T) {
	factors := func(a, b, c float64) r3.Vec {
		t.Helper()
		e, err := NewEllipsoid(geom.Ellipsoid{SemiAxes: r3.Vec{X: a, Y: b, Z: c}}, r3.Vec{})
		if err != nil {
			t.Fatal(err)
		}
		return e.Factors()
	}
	for _, m := range []float64{1.5, 2, 10, 1000} {
		root := math.Sqrt(m*m - 1)
		long := (m/root*math.Log(m+root) - 1) / (m*m - 1)
		flat := m * m / (m*m - 1) * (1 - math.Asin(root/m)/root)
		const tol = 1e-13 // the closed forms cancel: 1/(m^2-1) u at m = 1.5 twice, and asin near 1 loses m u
		if got := factors(1, 1, m).Z; math.Abs(got-long) > tol*long {
			t.Errorf("prolate %g: N_z = %v, want %v, tolerance %g", m, got, long, tol)
		}
		if got := factors(m, m, 1).Z; math.Abs(got-flat) > tol*flat {
			t.Errorf("oblate %g: N_z = %v, want %v, tolerance %g", m, got, flat, tol)
		}
	}
	for _, a := range []r3.Vec{{X: 1, Y: 1, Z: 1}, {X: 3, Y: 0.01, Z: 0.5}, {X: 1, Y: 2, Z: 1e-6}, {X: 1e-50, Y: 1e-50, Z: 2e-50}} {
		n := factors(a.X, a.Y, a.Z)
		if d := math.Abs(n.X + n.Y + n.Z - 1); d > 4*u || n.X <= 0 || n.Y <= 0 || n.Z <= 0 { // three roundings
			t.Errorf("axes %v: factors %v, sum off 1 by %g; want positive with sum 1", a, n, d)
		}
	}
}

// TestEllipsoidIsSphere checks an ellipsoid of equal axes against the sphere, gradient included.
func TestEllipsoidIsSphere(t *testing.T) {
	p := r3.Vec{X: 0.25, Y: -0.5, Z: 1}
	e, err := NewEllipsoid(geom.Ellipsoid{SemiAxes: r3.Vec{X: 1.25, Y: 1.25, Z: 1.25}}, p)
	if err != nil {
		t.Fatal(err)
	}
	s := Sphere{geom.Sphere{Radius: 1.25}, p}
	rng := rand.New(rand.NewPCG(9, 10))
	for range 2000 {
		x := r3.Scale(1.25*(1+math.Exp2(60*rng.Float64()-25)), unit(rng))
		v, w := at(e, x, field.Mean), at(s, x, field.Mean)
		if d := r3.Norm(r3.Sub(v.G, w.G)); d > v.ErrG+w.ErrG {
			t.Errorf("at %v: g %v, sphere %v, estimates %g and %g", x, v.G, w.G, v.ErrG, w.ErrG)
		}
		if d := math.Abs(v.Phi - w.Phi); d > v.ErrPhi+w.ErrPhi {
			t.Errorf("at %v: phi %v, sphere %v, estimates %g and %g", x, v.Phi, w.Phi, v.ErrPhi, w.ErrPhi)
		}
		for k := range v.Grad {
			if d := math.Abs(v.Grad[k] - w.Grad[k]); d > v.ErrGrad+w.ErrGrad {
				t.Errorf("at %v: grad[%d] %v, sphere %v, estimates %g and %g", x, k, v.Grad[k], w.Grad[k], v.ErrGrad, w.ErrGrad)
			}
		}
	}
}
