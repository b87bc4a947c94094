package force

import (
	"context"
	"math"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// TestStiffness compares the stiffness with differences of force and torque of the moved part, near (faces) and far (dipoles), for
// uniform and affine polarization, and checks its symmetries.
func TestStiffness(t *testing.T) {
	turn, err := geom.Turn(r3.Vec{X: 1, Y: 2, Z: 3}, 40)
	if err != nil {
		t.Fatal(err)
	}
	affine := field.Affine{Value: r3.Vec{X: 0.3, Y: -0.2, Z: 1}, Gradient: [3][3]float64{{0.5, 0.1, 0}, {-0.2, 0.3, 0.4}, {0.1, 0, 0.7}}}
	below := uniform(t, geom.Box{Size: r3.Vec{X: 1, Y: 0.8, Z: 0.6}}, r3.Vec{X: 0.2, Y: 0.1, Z: 1})
	for _, c := range []struct {
		name  string
		body  geom.Body
		p     field.Polarization
		above float64
		by    field.Source
	}{
		{"near", geom.Cylinder{Radius: 0.4, Height: 0.5}, field.Uniform{P: r3.Vec{X: 0.5, Z: 1}}, 0.9, below},
		{"affine", geom.Box{Size: r3.Vec{X: 0.5, Y: 0.6, Z: 0.4}}, affine, 1, below},
		{"far", geom.Box{Size: r3.Vec{X: 0.5, Y: 0.6, Z: 0.4}}, affine, 9, below},
		{"constant", geom.Box{Size: r3.Vec{X: 0.5, Y: 0.6, Z: 0.4}}, affine, 1, field.Constant{G: r3.Vec{X: 1, Y: 2, Z: -1}}},
	} {
		about := r3.Vec{X: 0.1, Y: -0.2, Z: c.above + 0.1}
		part := polarized(t, geom.At(c.body, turn.Then(geom.Translate(r3.Vec{X: 0.1, Y: 0.2, Z: c.above}))), c.p)
		act := func(q *bound.Charge, about r3.Vec, stiff bool) Result {
			r, err := On(context.Background(), q, c.by, &Settings{Accuracy: 1e-10, About: about, Stiffness: stiff})
			if err != nil {
				t.Fatal(c.name, err)
			}
			return r
		}
		got := act(part, about, true)
		const h = 1e-3
		var size, off, asym float64
		for j := range 6 {
			slope := func(h float64) (v [6]float64) {
				for _, side := range [2]float64{-1, 1} {
					e := [3]r3.Vec{{X: 1}, {Y: 1}, {Z: 1}}[j%3]
					at := about
					pose := geom.Translate(r3.Scale(side*h, e))
					if j > 2 {
						turn, err := geom.Turn(e, side*h*180/math.Pi)
						if err != nil {
							t.Fatal(err)
						}
						pose = turn.About(about)
					} else {
						at = r3.Add(about, r3.Scale(side*h, e))
					}
					r := act(part.At(pose), at, false)
					for i, x := range [6]float64{r.Force.X, r.Force.Y, r.Force.Z, r.Torque.X, r.Torque.Y, r.Torque.Z} {
						v[i] -= side * x / (2 * h)
					}
				}
				return v
			}
			one, two := slope(h), slope(2*h)
			for i := range 6 {
				want := (4*one[i] - two[i]) / 3
				off = max(off, math.Abs(want-got.Stiffness[i][j]))
				size = max(size, math.Abs(want))
				if i < 3 || j < 3 {
					asym = max(asym, math.Abs(got.Stiffness[i][j]-got.Stiffness[j][i]))
				}
			}
		}
		if off > 1e-7*size { // forces to 1e-10 over 2e-3, and the fourth power of the step
			t.Errorf("%s: stiffness off by %.3g of %.3g", c.name, off, size)
		}
		k := &got.Stiffness
		if trace := k[0][0] + k[1][1] + k[2][2]; math.Abs(trace) > 1e-9*size { // the law demands zero; accuracy asked for 1e-10
			t.Errorf("%s: trace %.3g of %.3g", c.name, trace, size)
		}
		if asym > 1e-9*size {
			t.Errorf("%s: blocks of displacement unsymmetric by %.3g of %.3g", c.name, asym, size)
		}
		// the antisymmetric part of the block of rotation is half the torque
		tq := [3]float64{got.Torque.X, got.Torque.Y, got.Torque.Z}
		for i := range 3 {
			a, b := (i+1)%3, (i+2)%3
			if d := math.Abs(k[3+a][3+b]-k[3+b][3+a]) - math.Abs(tq[i]); math.Abs(d) > 1e-9*size {
				t.Errorf("%s: rotation block unsymmetric by %v, torque %v", c.name, k[3+a][3+b]-k[3+b][3+a], tq[i])
			}
		}
	}
}
