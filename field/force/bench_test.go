package force

import (
	"context"
	"testing"

	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

func benchmark(b *testing.B, one, two *bound.Charge, set *Settings) {
	b.ReportAllocs()
	nodes := 0
	for b.Loop() {
		r, err := On(context.Background(), one, two, set)
		if err != nil {
			b.Fatal(err)
		}
		nodes = r.Nodes
	}
	b.ReportMetric(float64(nodes), "nodes")
}

// placed returns a body above the origin, turned by an angle about a slanted axis.
func placed(b *testing.B, body geom.Body, at r3.Vec, degrees float64) geom.Body {
	turn, err := geom.Turn(r3.Vec{X: 1, Y: 2, Z: 0.5}, degrees)
	if err != nil {
		b.Fatal(err)
	}
	if degrees == 0 {
		turn = geom.Pose{}
	}
	return geom.At(body, turn.Then(geom.Translate(at)))
}

func BenchmarkParallelBoxes(b *testing.B) {
	one := uniform(b, placed(b, geom.Box{Size: r3.Vec{X: 12, Y: 20, Z: 6}}, r3.Vec{X: 3, Y: -4, Z: 8}, 0), r3.Vec{X: 0.2, Y: 0.3, Z: 1})
	benchmark(b, one, uniform(b, geom.Box{Size: r3.Vec{X: 20, Y: 12, Z: 6}}, r3.Vec{Z: 1}), nil)
}

func BenchmarkObliqueBoxes(b *testing.B) {
	for name, p := range map[string]r3.Vec{"one pair of faces": {Z: 1}, "three pairs": {X: 0.2, Y: 0.3, Z: 1}} {
		b.Run(name, func(b *testing.B) {
			one := uniform(b, placed(b, geom.Box{Size: r3.Vec{X: 12, Y: 20, Z: 6}}, r3.Vec{X: 3, Y: -4, Z: 20}, 33), p)
			benchmark(b, one, uniform(b, geom.Box{Size: r3.Vec{X: 20, Y: 12, Z: 6}}, p), nil)
		})
	}
}

func BenchmarkFar(b *testing.B) {
	one := uniform(b, placed(b, geom.Box{Size: r3.Vec{X: 12, Y: 20, Z: 6}}, r3.Vec{Z: 2000}, 33), r3.Vec{Z: 1})
	benchmark(b, one, uniform(b, geom.Box{Size: r3.Vec{X: 20, Y: 12, Z: 6}}, r3.Vec{Z: 1}), nil)
}

func BenchmarkCoaxialCylinders(b *testing.B) {
	one := uniform(b, placed(b, geom.Cylinder{Radius: 5, Height: 4}, r3.Vec{Z: 4.2}, 0), r3.Vec{Z: 1})
	benchmark(b, one, uniform(b, geom.Cylinder{Radius: 6, Height: 4}, r3.Vec{Z: 1}), nil)
}

// BenchmarkClose is a twentieth of the size apart.
func BenchmarkClose(b *testing.B) {
	for name, body := range map[string]geom.Body{"cylinder": geom.Cylinder{Radius: 0.6, Height: 1}, "box": geom.Box{Size: r3.Vec{X: 1, Y: 1, Z: 1}},
		"arc": geom.ArcDegrees(0.4, 0.9, 1, 0, 70), "cone": geom.Cone{Bottom: 0.5, Top: 0.3, Height: 1}, "torus": geom.Torus{Major: 0.5, Minor: 0.5 - 0x1p-4}} {
		b.Run(name, func(b *testing.B) {
			turn, err := geom.Turn(r3.Vec{Z: 1}, 33)
			if err != nil {
				b.Fatal(err)
			}
			one := uniform(b, geom.At(body, turn.Then(geom.Translate(r3.Vec{X: 0.3, Y: 0.2, Z: 1.05}))), r3.Vec{X: 0.3, Z: 1})
			benchmark(b, one, uniform(b, geom.Box{Size: r3.Vec{X: 1, Y: 1, Z: 1}}, r3.Vec{Z: 1}), nil)
		})
	}
}

// BenchmarkContact has touching faces at an angle.
func BenchmarkContact(b *testing.B) {
	turn, err := geom.Turn(r3.Vec{Z: 1}, 33)
	if err != nil {
		b.Fatal(err)
	}
	one := uniform(b, geom.At(geom.Box{Size: r3.Vec{X: 1, Y: 1, Z: 1}}, turn.Then(geom.Translate(r3.Vec{X: 0.3, Y: 0.2, Z: 1}))), r3.Vec{Z: 1})
	benchmark(b, one, uniform(b, geom.Box{Size: r3.Vec{X: 1, Y: 1, Z: 1}}, r3.Vec{Z: 1}), nil)
}

func BenchmarkStiffness(b *testing.B) {
	one := uniform(b, placed(b, geom.Box{Size: r3.Vec{X: 12, Y: 20, Z: 6}}, r3.Vec{X: 3, Y: -4, Z: 20}, 33), r3.Vec{Z: 1})
	benchmark(b, one, uniform(b, geom.Box{Size: r3.Vec{X: 20, Y: 12, Z: 6}}, r3.Vec{Z: 1}), &Settings{Stiffness: true})
}
