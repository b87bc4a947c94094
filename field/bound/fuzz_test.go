package bound_test

import (
	"math"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// fuzzBody returns a body of a kind with dimensions that may be anything.
func fuzzBody(kind uint8, a, b, c float64) geom.Body {
	switch kind % 8 {
	case 0:
		return geom.Box{Size: r3.Vec{X: a, Y: b, Z: c}}
	case 1:
		return geom.Cylinder{Radius: a, Height: b}
	case 2:
		return geom.Tube{Inner: a, Outer: b, Height: c}
	case 3:
		return geom.Sphere{Radius: a}
	case 4:
		return geom.HollowSphere{Inner: a, Outer: b}
	case 5:
		return geom.Ellipsoid{SemiAxes: r3.Vec{X: a, Y: b, Z: c}}
	case 6:
		return geom.Prism{Base: [][2]float64{{0, 0}, {a, 0}, {a, b}}, Height: c, TopSlope: [2]float64{0.1, 0}}
	}
	return geom.Polyhedron{Vertices: []r3.Vec{{}, {X: a}, {Y: b}, {X: 0.1 * a, Y: 0.2 * b, Z: c}},
		Loops: [][]int{{0, 2, 1}, {0, 1, 3}, {1, 2, 3}, {2, 0, 3}}}
}

// FuzzBound builds any body with any polarization and evaluates it anywhere. A body is refused with an error or evaluates
// without a panic; a regular point has finite values and estimates that are neither negative nor NaN; a batch gives the bits
// of a point.
func FuzzBound(f *testing.F) {
	for kind := range uint8(8) {
		for _, x := range []r3.Vec{{X: 0.3, Y: 0.2, Z: 0.1}, {X: 1, Z: 0.5}, {Z: 1}, {X: 1e6}, {X: 1 + 1e-12, Y: 1e-13, Z: 0.5}} {
			f.Add(kind, 1.0, 1.5, 2.0, x.X, x.Y, x.Z, 0.5)
		}
	}
	f.Fuzz(func(t *testing.T, kind uint8, a, b, c, x, y, z, slope float64) {
		body := fuzzBody(kind, a, b, c)
		pol := field.Affine{Value: r3.Vec{X: 1, Y: -2, Z: 0.5}}
		pol.Gradient[2][2] = slope
		if kind >= 8 && kind%8 > 2 && kind%8 < 6 {
			pol.Gradient[2][2] = 0
		}
		src, err := bound.Of(body, pol)
		if err != nil {
			return
		}
		at := r3.Vec{X: x, Y: y, Z: z}
		for _, side := range []field.Side{field.Mean, field.Inside, field.Outside} {
			v := field.At(src, at, side, field.WantPhi|field.WantG|field.WantErr)
			if v.ErrPhi < 0 || v.ErrG < 0 || math.IsNaN(v.ErrPhi) || math.IsNaN(v.ErrG) {
				t.Errorf("%+v at %v: estimates %v, %v", body, at, v.ErrPhi, v.ErrG)
			}
			finite := !math.IsNaN(v.Phi+v.G.X+v.G.Y+v.G.Z) && !math.IsInf(v.Phi+v.G.X+v.G.Y+v.G.Z, 0)
			if v.Status <= field.OnFace && !finite && r3.Norm(at) < 1e60 && math.Abs(slope) < 1e60 {
				t.Errorf("%+v at %v: %v with status %v", body, at, v, v.Status)
			}
			if side == field.Mean {
				if g := src.Field(at); !same(g.X, v.G.X) || !same(g.Y, v.G.Y) || !same(g.Z, v.G.Z) {
					t.Errorf("%+v at %v: Field %v, Evaluate %v", body, at, g, v.G)
				}
			}
		}
	})
}

// same compares bits, but for NaN.
func same(a, b float64) bool { return a == b || math.IsNaN(a) && math.IsNaN(b) }
