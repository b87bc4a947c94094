package element

import (
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// BenchmarkSector measures one point of an arc.
func BenchmarkSector(b *testing.B) {
	shape := geom.Arc{Inner: 0.5, Outer: 1, Height: 0.75, From: -0.3, To: 1.1}
	affine := field.Affine{Value: r3.Vec{X: 1, Y: -0.5, Z: 0.25}, Gradient: [3][3]float64{{0.1, 0.2, 0.3}, {-0.1, 0.4, 0.2}, {0.5, 0.6, -0.7}}}
	for _, body := range []struct {
		name   string
		p      field.Affine
		radial float64
	}{{"uniform", field.Affine{Value: affine.Value}, 0}, {"radial", field.Affine{}, 1}, {"affine", affine, 0}} {
		src, err := NewArc(shape, body.p, body.radial)
		if err != nil {
			b.Fatal(err)
		}
		for _, at := range []struct {
			name string
			x    r3.Vec
		}{{"0.1", r3.Vec{X: 1.05, Y: 0.4, Z: 0.1}}, {"1e-6", r3.Vec{X: 0.6, Y: 0.8000001, Z: 0.1}}, {"2", r3.Vec{X: 0.6, Y: 0.8, Z: 2}}} {
			for _, w := range []struct {
				name string
				want field.Want
			}{{"g", field.WantG}, {"g,err", field.WantG | field.WantErr}, {"all", field.WantPhi | field.WantG | field.WantErr},
				{"grad", field.WantG | field.WantGrad}} {
				b.Run(body.name+"/"+at.name+"/"+w.name, func(b *testing.B) {
					v, p := field.NewValues(1, w.want), field.PointsOf(at.x)
					b.ReportAllocs()
					for b.Loop() {
						src.Evaluate(v, p, field.Mean)
					}
				})
			}
		}
	}
}
