package current_test

import (
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/current"
	"gonum.org/v1/gonum/spatial/r3"
)

// BenchmarkInduction evaluates a and b with estimates at one near point.
func BenchmarkInduction(b *testing.B) {
	at, v := field.PointsOf(r3.Vec{X: 0.3, Y: 0.2, Z: 1.25}), current.NewValues(1)
	all := every(b)
	for _, name := range []string{"loop", "segment", "wire", "solenoid", "box", "radial", "axial"} {
		b.Run(name, func(b *testing.B) {
			b.ReportAllocs()
			for b.Loop() {
				all[name].Induction(v, at, field.Mean)
			}
		})
	}
}
