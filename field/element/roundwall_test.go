package element

import (
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// TestWallItself checks points exactly on a wall and in its continuation: the sides are the limits from both sides, also
// where one rim or both are so far that their integrals come from series.
func TestWallItself(t *testing.T) {
	for _, shape := range []geom.Wall{{Radius: 1, Z1: -1, Z2: 1}, {Radius: 1, Z1: -5, Z2: 5}, {Radius: 1, Z1: -1, Z2: 9}} {
		w := must(NewWall(shape, 1, 0.5, 0))
		for _, z := range []float64{0, 0.5, shape.Z2 - 1, shape.Z2 + 0.5, shape.Z2 + 1.9} {
			const d = 1e-9
			at := func(rho float64, side field.Side) r3.Vec {
				return field.At(w, r3.Vec{X: rho, Z: z}, side, field.WantG).G
			}
			in, out := at(1-d, field.Mean), at(1+d, field.Mean)
			for side, want := range map[field.Side]r3.Vec{
				field.Inside: in, field.Outside: out, field.Mean: r3.Scale(0.5, r3.Add(in, out)),
			} {
				if e := r3.Norm(r3.Sub(at(1, side), want)); e > 20*d { // |grad g| is below 20
					t.Errorf("%+v at z = %v, side %v: %v, want %v", shape, z, side, at(1, side), want)
				}
			}
		}
	}
}
