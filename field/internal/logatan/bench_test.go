package logatan

import (
	"math"
	"testing"
)

// benchData returns n seeded pairs with ratios within e^±4, mixed signs for
// angles.
func benchData(n int) (a, b, c []float64) {
	rnd := seeded(1)
	for range n {
		a = append(a, math.Exp(4*rnd.Float64()-2))
		b = append(b, math.Exp(4*rnd.Float64()-2))
		c = append(c, rnd.NormFloat64())
	}
	return a, b, c
}

var sink float64

func benchPair(b *testing.B, f func(a, b float64) float64, signed bool) {
	p, q, r := benchData(1024)
	if signed {
		p = r
		for i := range q {
			q[i] = math.Copysign(q[i], r[(i+7)&1023])
		}
	}
	b.ReportAllocs()
	for i := 0; b.Loop(); i++ {
		sink = f(p[i&1023], q[i&1023])
	}
}

func BenchmarkLogRatio(b *testing.B)   { benchPair(b, LogRatio, false) }
func BenchmarkLog1pRatio(b *testing.B) { benchPair(b, Log1pRatio, false) }
func BenchmarkAtan2(b *testing.B)      { benchPair(b, Atan2, true) }
func BenchmarkMathLog(b *testing.B) {
	benchPair(b, func(p, q float64) float64 { return math.Log(p / q) }, false)
}
func BenchmarkMathLog1p(b *testing.B) {
	benchPair(b, func(n, d float64) float64 { return math.Log1p(n / d) }, false)
}
func BenchmarkMathAtan2(b *testing.B) { benchPair(b, math.Atan2, true) }

func benchSlice(b *testing.B, f func(dst, p, q []float64), signed bool) {
	p, q, r := benchData(1024)
	if signed {
		p = r
	}
	dst := make([]float64, len(p))
	b.ReportAllocs()
	for b.Loop() {
		f(dst, p, q)
	}
	b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N)/1024, "ns/element")
}

func BenchmarkLogRatioTo(b *testing.B)   { benchSlice(b, LogRatioTo, false) }
func BenchmarkLog1pRatioTo(b *testing.B) { benchSlice(b, Log1pRatioTo, false) }
func BenchmarkAtan2To(b *testing.B)      { benchSlice(b, Atan2To, true) }
