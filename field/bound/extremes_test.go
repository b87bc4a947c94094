package bound_test

import (
	"math"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// TestExtremes checks the extremes of sigma on sectors and cones, and of rho, against values by hand.
func TestExtremes(t *testing.T) {
	along, across := field.Uniform{P: r3.Vec{Z: 2}}, field.Uniform{P: r3.Vec{X: 2}}
	arc := geom.ArcDegrees(0.5, 1, 1, -60, 30)
	far := geom.ArcDegrees(0.5, 1, 1, 100, 260)
	cone := geom.Cone{Bottom: 2, Top: 1, Height: 1} // slope 45 degrees
	type range2 struct {
		face   string // "" for the density inside
		lo, hi float64
	}
	for _, c := range []struct {
		name string
		body geom.Body
		p    field.Polarization
		want []range2
	}{
		{"arc along", arc, along, []range2{{"top", 2, 2}, {"bottom", -2, -2}, {"inner", 0, 0}, {"outer", 0, 0}, {"", 0, 0}}},
		{"arc across", arc, across, []range2{{"top", 0, 0}, {"outer", 1, 2}, {"inner", -2, -1}}},
		{"arc on the other side", far, across, []range2{{"outer", -2, 2 * math.Cos(100*math.Pi/180)}}},
		{"cone along", cone, along, []range2{{"wall", math.Sqrt2, math.Sqrt2}}},
		{"cone across", cone, across, []range2{{"wall", -math.Sqrt2, math.Sqrt2}}},
		{"torus", geom.Torus{Major: 2, Minor: 1}, across, []range2{{"surface", -2, 2}}},
		{"cylinder, z squared", geom.Cylinder{Radius: 1, Height: 4}, field.AxialPower{Coefficient: 1, Power: 2}, []range2{{"", -4, 4}, {"top", 4, 4}}},
		{"box, a polynomial", geom.Box{Size: r3.Vec{X: 2, Y: 2, Z: 2}}, field.Polynomial{{Component: 0, Coefficient: 1, Powers: [3]int{2, 1, 0}}},
			[]range2{{"", -2, 2}}},
		{"cylinder, root of s", geom.Cylinder{Radius: 4, Height: 1}, field.RadialPower{Coefficient: 2, Power: 0.5},
			[]range2{{"", math.Inf(-1), -1.5}}},
	} {
		b, err := bound.Of(c.body, c.p)
		if err != nil {
			t.Fatalf("%s: %v", c.name, err)
		}
		for _, w := range c.want {
			lo, hi := b.Volumes[0].Min, b.Volumes[0].Max
			for _, l := range b.Layers {
				if l.Face.Name == w.face {
					lo, hi = l.Min, l.Max
				}
			}
			same := func(a, b float64) bool { return a == b || math.Abs(a-b) <= 1e-15 } // a rounding of 2
			if !same(lo, w.lo) || !same(hi, w.hi) {
				t.Errorf("%s, face %q: %v … %v, want %v … %v", c.name, w.face, lo, hi, w.lo, w.hi)
			}
		}
	}
}
