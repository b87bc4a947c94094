package element

import (
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// roundBenches lists what is timed and held at zero allocations.
func roundBenches() []struct {
	name string
	src  field.Evaluator
	x    r3.Vec
	want field.Want
} {
	near, rim, far := r3.Vec{X: 0.3, Y: -0.4, Z: 1.1}, r3.Vec{X: 0.6, Y: 0.8, Z: 0.75 + 1e-9}, r3.Vec{X: 3, Y: 4, Z: 5}
	shape := geom.Cylinder{Radius: 1, Height: 1.5}
	axial, across := must(NewCylinder(shape, r3.Vec{Z: 1}, 0)), must(NewCylinder(shape, r3.Vec{X: 1}, 0))
	slope := must(NewCylinder(shape, r3.Vec{}, 1))
	disc := must(NewDisc(geom.Disc{Radius: 1}, 1))
	tube := must(NewTube(geom.Tube{Inner: 0.999, Outer: 1, Height: 1.5}, r3.Vec{X: 1, Z: 1}, 0))
	plate := must(NewCylinder(geom.Cylinder{Radius: 1, Height: 1e-3}, r3.Vec{X: 1, Z: 1}, 0))
	const g, phi, all = field.WantG, field.WantPhi | field.WantG, field.WantPhi | field.WantG | field.WantGrad | field.WantErr
	return []struct {
		name string
		src  field.Evaluator
		x    r3.Vec
		want field.Want
	}{
		{"disc/near", disc, near, g},
		{"axial/near", axial, near, g},
		{"axial/near/all", axial, near, all},
		{"axial/rim", axial, rim, g},
		{"axial/far", axial, far, g},
		{"across/near", across, near, g},
		{"slope/near", slope, near, g},
		{"slope/near/phi", slope, near, phi},
		{"thin tube/near", tube, near, g},
		{"plate/near", plate, near, g},
	}
}

func BenchmarkRound(b *testing.B) {
	for _, c := range roundBenches() {
		b.Run(c.name, func(b *testing.B) {
			const n = 64
			x := make([]r3.Vec, n)
			for i := range x {
				x[i] = r3.Add(c.x, r3.Vec{Z: float64(i) * 1e-12})
			}
			pts, dst := field.PointsOf(x...), field.NewValues(n, c.want)
			b.ReportAllocs()
			for b.Loop() {
				c.src.Evaluate(dst, pts, field.Mean)
			}
			b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N)/n, "ns/point")
		})
	}
}

func TestRoundAllocs(t *testing.T) {
	for _, c := range roundBenches() {
		pts, dst := field.PointsOf(c.x, c.x), field.NewValues(2, c.want)
		if n := testing.AllocsPerRun(20, func() { c.src.Evaluate(dst, pts, field.Mean) }); n > 0 {
			t.Errorf("%s: %v allocations", c.name, n)
		}
		f := c.src.(field.Source)
		if n := testing.AllocsPerRun(20, func() { f.Field(c.x) }); n > 0 {
			t.Errorf("%s: Field makes %v allocations", c.name, n)
		}
	}
}
