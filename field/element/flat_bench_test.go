package element_test

import (
	"math"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/element"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

var sink float64

// BenchmarkBoxField times the field of a uniformly polarized box one size away.
func BenchmarkBoxField(b *testing.B) {
	box := element.NewPolyhedron(geom.Box{Size: r3.Vec{X: 1, Y: 1.5, Z: 2}}.Polyhedron(), field.Affine{Value: r3.Vec{X: 0.3, Y: -0.7, Z: 1.1}})
	x := r3.Vec{X: 0.4, Y: 0.3, Z: 2.1}
	b.ReportAllocs()
	for b.Loop() {
		x.X += 1e-9
		sink += box.Field(x).Z
	}
}

// BenchmarkBoxYardstick times 8 Sqrt + 12 Log1p + 6 Atan2 of the standard library, what a box field is measured against.
func BenchmarkBoxYardstick(b *testing.B) {
	x := 0.7
	for b.Loop() {
		x += 1e-9
		s := 0.0
		for k := range 8 {
			s += math.Sqrt(x + float64(k))
		}
		for k := range 12 {
			s += math.Log1p(x + float64(k))
		}
		for k := range 6 {
			s += math.Atan2(x+float64(k), 1.3)
		}
		sink += s
	}
}
