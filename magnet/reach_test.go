package magnet_test

import (
	"math"
	"strings"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"example.com/boundpole/magnet"
	"gonum.org/v1/gonum/spatial/r3"
)

func TestReachOfDipoles(t *testing.T) {
	for _, c := range []struct{ b, want float64 }{{0.5e-3, 0.373}, {0.9e-3, 0.306}, {1e-3, 0.296}} { // m, printed in trade tables for 129.3 A m2
		m := magnet.Model{Parts: []magnet.Part{magnet.Dipole(r3.Vec{X: 3}, r3.Scale(129.3/3, r3.Vec{X: 1, Y: 2, Z: 2}))}}
		r, err := m.Reach(c.b)
		if err != nil {
			t.Fatal(err)
		}
		exact := math.Cbrt(magnet.Mu0 * 129.3 / (2 * math.Pi * c.b)) // on the axis
		if math.Abs(r.Distance-c.want) > 0.5e-3 || math.Abs(r.Distance-exact) > max(r.ErrDistance, 1e-12*exact) {
			t.Errorf("%v T: %v ± %v, want %v, exactly %v", c.b, r.Distance, r.ErrDistance, c.want, exact)
		}
	}
}

func TestReachOfSphere(t *testing.T) {
	const radius, br, b = 0.02, 1.2, 2e-3
	part, err := magnet.WithRemanence(geom.At(geom.Sphere{Radius: radius}, geom.Translate(r3.Vec{X: 1})), r3.Vec{X: br})
	if err != nil {
		t.Fatal(err)
	}
	r, err := magnet.Model{Parts: []magnet.Part{part}}.Reach(b)
	if err != nil {
		t.Fatal(err)
	}
	want := radius * math.Cbrt(2*br/(3*b)) // B = (2/3) Br (a/r)^3 on the axis
	if math.Abs(r.Distance-want) > max(r.ErrDistance, 1e-12) || math.Abs(r.FromSurface-(want-radius)) > max(r.ErrDistance, 1e-12) {
		t.Errorf("distance %v, from the surface %v ± %v, want %v and %v", r.Distance, r.FromSurface, r.ErrDistance, want, want-radius)
	}
	if r.ErrDistance > 1e-10*want {
		t.Errorf("error estimate %v of %v", r.ErrDistance, want)
	}
}

// TestReachOfBox holds the search against a fine scan of one octant.
func TestReachOfBox(t *testing.T) {
	const b = 5e-3
	size := r3.Vec{X: 0.03, Y: 0.02, Z: 0.008}
	part, err := magnet.WithRemanence(geom.Box{Size: size}, r3.Vec{Z: 1.3})
	if err != nil {
		t.Fatal(err)
	}
	m := magnet.Model{Parts: []magnet.Part{part}}
	r, err := m.Reach(b)
	if err != nil {
		t.Fatal(err)
	}
	var far, off float64
	const n, end = 60, 0.09
	for i := range n {
		for j := range n {
			for k := range n {
				x := r3.Vec{X: end * float64(i) / n, Y: end * float64(j) / n, Z: end * float64(k) / n}
				d := r3.Vec{X: max(x.X-size.X/2, 0), Y: max(x.Y-size.Y/2, 0), Z: max(x.Z-size.Z/2, 0)}
				if d != (r3.Vec{}) && r3.Norm(m.At(x, field.Mean).B) >= b {
					far, off = max(far, r3.Norm(x)), max(off, r3.Norm(d))
				}
			}
		}
	}
	const cell = 2 * end / n // the diagonal of the scan, rounded up
	if r.Distance < far || r.Distance > far+cell || r.FromSurface < off || r.FromSurface > off+cell {
		t.Errorf("distance %v, from the surface %v; the scan found %v and %v", r.Distance, r.FromSurface, far, off)
	}
	for _, x := range []r3.Vec{r.At, r.FromAt} {
		if got := r3.Norm(m.At(x, field.Mean).B); math.Abs(got-b) > 1e-11*b { // ErrDistance times the slope
			t.Errorf("at %v B = %v T, want %v", x, got, b)
		}
	}
}

// TestReachInBore: in a ring of magnets, each turned by twice its azimuth, the place farthest from every surface is within the ring.
func TestReachInBore(t *testing.T) {
	var parts []magnet.Part
	for i := range 8 {
		turn, err := geom.Turn(r3.Vec{Z: 1}, 45*float64(i))
		if err != nil {
			t.Fatal(err)
		}
		out := geom.Translate(r3.Vec{X: 0.03})
		part, err := magnet.WithRemanence(geom.At(geom.Cylinder{Radius: 8e-3, Height: 60e-3}, turn.Then(out).Then(turn)), r3.Vec{X: 1.3})
		if err != nil {
			t.Fatal(err)
		}
		parts = append(parts, part)
	}
	m := magnet.Model{Parts: parts}
	b := r3.Norm(m.At(r3.Vec{}, field.Mean).B)
	r, err := m.Reach(0.5 * b)
	if err != nil {
		t.Fatal(err)
	}
	const bore = 0.03 - 8e-3
	if r.FromSurface < bore*(1-1e-6) {
		t.Errorf("%v T in the bore; from the surface %v at %v, want at least the radius of the bore, %v", b, r.FromSurface, r.FromAt, bore)
	}
}

func TestReachNowhere(t *testing.T) {
	part, err := magnet.WithRemanence(geom.Sphere{Radius: 1}, r3.Vec{Z: 1})
	if err != nil {
		t.Fatal(err)
	}
	m := magnet.Model{Parts: []magnet.Part{part}}
	if r, err := m.Reach(0.7); err != nil || r.Reached { // outside a sphere B is at most 2/3 of Br
		t.Errorf("0.7 T outside a sphere of 1 T: %+v, %v", r, err)
	}
	for _, c := range []struct {
		m    magnet.Model
		b    float64
		want string
	}{{m, 0, "positive"}, {m, math.NaN(), "positive"}, {magnet.Model{}, 1, "nothing"}} {
		if _, err := c.m.Reach(c.b); err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("%v T: error %v, want one with %q", c.b, err, c.want)
		}
	}
}
