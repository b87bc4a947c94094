package bound_test

import (
	"errors"
	"math"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

func charged(t *testing.T, body geom.Body, p field.Polarization) *bound.Charge {
	t.Helper()
	c, err := bound.Of(body, p)
	if err != nil {
		t.Fatal(err)
	}
	return c
}

// TestLump checks how few points stand for a body: one dipole for a sphere, exactly; two charges near the ends for a long rod; and
// that the promised error holds at random points beyond the distance.
func TestLump(t *testing.T) {
	ball, err := bound.Lump(charged(t, geom.Sphere{Radius: 1}, field.Uniform{P: r3.Vec{X: 1, Z: 2}}), 1e-9, 2.5)
	if err != nil || len(ball.Dipoles) != 1 || len(ball.Charges) != 0 {
		t.Errorf("sphere: %d charges, %d dipoles, error %.2g, %v; want one dipole", len(ball.Charges), len(ball.Dipoles), ball.Error, err)
	}
	rod := charged(t, geom.Cylinder{Radius: 0.1, Height: 4}, field.Uniform{P: r3.Vec{Z: 1}})
	two, err := bound.Lump(rod, 0.02, 3)
	if err != nil || len(two.Charges) != 2 {
		t.Fatalf("rod: %d charges, %d dipoles, error %.2g, %v; want two charges", len(two.Charges), len(two.Dipoles), two.Error, err)
	}
	if d := math.Abs(two.Charges[0].At.Z - two.Charges[1].At.Z); math.Abs(d-4) > 0.1 {
		t.Errorf("rod: the two charges are %.3g apart, want about its length 4", d)
	}
	src := two.Source()
	for _, x := range []r3.Vec{{X: 3.1}, {Z: -3.3, Y: 0.4}, {X: 4, Y: 4, Z: 4}} {
		if miss := r3.Norm(r3.Sub(src.Field(x), rod.Field(x))); miss > 1.05*two.Error*r3.Norm(rod.Field(r3.Vec{Z: 3})) {
			t.Errorf("rod at %v: error %.3g above %.3g of the largest field", x, miss, two.Error)
		}
	}
	box := charged(t, geom.Box{Size: r3.Vec{X: 1, Y: 2, Z: 3}}, field.Uniform{P: r3.Vec{X: 1, Y: 1, Z: 1}})
	if _, err := bound.Lump(box, 1e-10, 2.4); !errors.Is(err, bound.ErrLump) {
		t.Errorf("box to 1e-10 close by: %v, want %v", err, bound.ErrLump)
	}
	if _, err := bound.Lump(box, 1e-3, 1); err == nil {
		t.Error("a distance inside the body was accepted")
	}
}
