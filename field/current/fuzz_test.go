package current_test

import (
	"math"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/current"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// every returns a source of each kind; sizes are about 1.
func every(t testing.TB) map[string]current.Source {
	must := func(s current.Source, err error) current.Source {
		if err != nil {
			t.Fatal(err)
		}
		return s
	}
	all := map[string]current.Source{"applied": current.Uniform{B: oblique}}
	add := func(name string, s current.Source, err error) { all[name] = must(s, err) }
	loop, err := current.NewLoop(geom.Disc{Radius: 1, Z: 0.5}, 1)
	add("loop", loop, err)
	wire, err := current.NewWire([]r3.Vec{{X: 1}, {Y: 1}, {Z: 1}}, true, 1)
	add("wire", wire, err)
	segment, err := current.NewSegment(r3.Vec{}, r3.Vec{X: 1}, 1)
	add("segment", segment, err)
	coil, err := current.NewSolenoid(geom.Cylinder{Radius: 1, Height: 1}, 1)
	add("solenoid", coil, err)
	box, err := current.Of(geom.Box{Size: r3.Vec{X: 2, Y: 1.5, Z: 1}}, sheared)
	add("box", box, err)
	disc, err := current.Of(geom.Cylinder{Radius: 1, Height: 0.5}, field.RadialPower{Coefficient: 1})
	add("radial", disc, err)
	tube, err := current.Of(geom.Tube{Inner: 0.5, Outer: 1, Height: 0.5}, field.AxialPower{Coefficient: 1, Power: 3})
	add("axial", tube, err)
	guide, err := current.NewGuide(geom.Tube{Inner: 0.5, Outer: 1, Height: 4}, 1)
	add("guide", guide, err)
	arc, err := current.NewArcGuide(geom.ArcDegrees(1, 2, 1, 0, 360), geom.Pose{}, 1)
	add("closed guide", arc, err)
	bent, err := current.NewArcGuide(geom.ArcDegrees(1, 2, 1, 0, 90), geom.Pose{}, 1)
	add("bent guide", bent, err)
	turn, err := geom.Turn(r3.Vec{X: 1, Y: 1}, 25)
	add("turned loop", current.Posed{Source: loop, Pose: turn.Then(geom.Translate(r3.Vec{X: 3}))}, err)
	return all
}

// FuzzPlaces asks for values anywhere: nothing panics, and a value that is not a number says so in its status.
func FuzzPlaces(f *testing.F) {
	for _, x := range []r3.Vec{{}, {X: 1, Z: 0.5}, {X: 1}, {X: 1, Z: 0.25}, {X: 0.6, Y: 0.8, Z: 0.5}, {X: 0.5, Z: 2}, {Z: 1e-300}, {X: 1e-200, Y: -1e-160},
		{X: 1e300, Y: 1e300}, {Z: -1e155}, {X: 1e80, Z: 1e70}, {X: 2e9, Y: 1e8}, {X: math.Inf(1)}, {Y: math.NaN()}, {X: 1 + 1e-12, Z: 0.5 - 1e-12}, {X: 5e-324}, {X: 1.5}, {Y: 1.5, Z: 0.5}, {Z: 0.5}, {X: 1e-200, Y: -1e-160, Z: -0.25}} {
		f.Add(x.X, x.Y, x.Z, 0)
		f.Add(x.X, x.Y, x.Z, 1)
	}
	all := every(f)
	f.Fuzz(func(t *testing.T, x, y, z float64, side int) {
		p := r3.Vec{X: x, Y: y, Z: z}
		for name, src := range all {
			v := current.At(src, p, field.Side(((side%3)+3)%3))
			sum := v.A.X + v.A.Y + v.A.Z + v.B.X + v.B.Y + v.B.Z
			switch {
			case math.IsNaN(x-x+(y-y)+(z-z)) != (v.Status == field.BadInput):
				t.Errorf("%s at %v: %v", name, p, v.Status)
			case math.IsNaN(sum) && (v.Status == field.Regular || v.Status == field.NotConverged):
				t.Errorf("%s at %v: %+v", name, p, v)
			case math.IsNaN(v.ErrA+v.ErrB) || v.ErrA < 0 || v.ErrB < 0:
				t.Errorf("%s at %v: estimates %v, %v", name, p, v.ErrA, v.ErrB)
			}
			if free, ok := src.(current.Free); ok && v.Status != field.BadInput {
				g := field.At(free, p, field.Mean, field.WantG|field.WantGrad|field.WantErr)
				for _, d := range g.Grad {
					if math.IsNaN(d) && g.Status == field.Regular {
						t.Errorf("%s at %v: gradient %v", name, p, g.Grad)
						break
					}
				}
			}
		}
	})
}
