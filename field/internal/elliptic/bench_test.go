package elliptic

import (
	"math"
	"testing"
)

var sink float64

func BenchmarkRing(b *testing.B) {
	rows := load[circleRow](b, "circle.json")
	for _, group := range []string{"middle", "rim", "plane", "far"} {
		var v [][5]float64
		for _, r := range rows {
			if r.Group == group {
				v = append(v, [5]float64{float64(r.A), float64(r.Rho), float64(r.Z), float64(r.Gap), float64(r.Q1)})
			}
		}
		b.Run(group, func(b *testing.B) {
			b.ReportAllocs()
			for i := 0; b.Loop(); i++ {
				w := &v[i%len(v)]
				u, _, _, c3 := Ring(w[0], w[1], w[2], w[4])
				sink = u + c3
			}
		})
		b.Run(group+"/Disc", func(b *testing.B) {
			b.ReportAllocs()
			for i := 0; b.Loop(); i++ {
				w := &v[i%len(v)]
				u, t1, omega := Disc(w[0], w[1], w[2], w[3], w[4])
				sink = u + t1 + omega
			}
		})
		b.Run(group+"/OfCircle", func(b *testing.B) {
			b.ReportAllocs()
			for i := 0; b.Loop(); i++ {
				w := &v[i%len(v)]
				c := OfCircle(w[0], w[1], w[2], w[3], w[4])
				sink = c.U + c.E
			}
		})
	}
}

func BenchmarkComplete(b *testing.B) {
	for i := 0; b.Loop(); i++ {
		k, _, _, d := Complete(0.1 + float64(i&63)/64)
		sink = k + d
	}
}

func BenchmarkCarlson(b *testing.B) {
	x := func(i int) float64 { return 0.1 + float64(i&63)/64 }
	for _, c := range []struct {
		name string
		f    func(x float64) float64
	}{
		{"RF", func(x float64) float64 { return RF(0, x, 1) }},
		{"RD", func(x float64) float64 { return RD(0, x, 1) }},
		{"RJ", func(x float64) float64 { return RJ(0, x, 1, 0.3*x) }},
		{"RC", func(x float64) float64 { return RC(x, 0.3) }},
		{"Cel", func(x float64) float64 { return Cel(x, 0.3*x, 1, 2) }},
		{"Sqrt", math.Sqrt},
	} {
		b.Run(c.name, func(b *testing.B) {
			for i := 0; b.Loop(); i++ {
				sink = c.f(x(i))
			}
		})
	}
}
