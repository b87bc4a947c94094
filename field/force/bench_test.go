package force

import (
	"context"
	"testing"

	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

func BenchmarkObliqueBoxes(b *testing.B) {
	tn, err := geom.Turn(r3.Vec{X: 1, Y: 2, Z: 0.5}, 33)
	if err != nil {
		b.Fatal(err)
	}
	one := uniform(b, geom.At(geom.Box{Size: r3.Vec{X: 12, Y: 20, Z: 6}}, tn.Then(geom.Translate(r3.Vec{X: 3, Y: -4, Z: 20}))), r3.Vec{Z: 1})
	two := uniform(b, geom.Box{Size: r3.Vec{X: 20, Y: 12, Z: 6}}, r3.Vec{Z: 1})
	b.ReportAllocs()
	for b.Loop() {
		if _, err := On(context.Background(), one, two, nil); err != nil {
			b.Fatal(err)
		}
	}
}
