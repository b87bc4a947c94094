package logatan

import (
	"math"
	"testing"
)

func TestSliceBits(t *testing.T) {
	p, q := logPairs(9000, 61)
	rnd := seeded(62)
	for i := range p {
		switch rnd.IntN(16) {
		case 0:
			p[i] = -p[i]
		case 1:
			q[i] = 0
		case 2:
			p[i] = math.Inf(1)
		case 3:
			q[i] = math.NaN()
		}
	}
	for _, c := range []struct {
		name string
		f    func(a, b float64) float64
		to   func(dst, a, b []float64)
	}{{"LogRatio", LogRatio, LogRatioTo}, {"Log1pRatio", Log1pRatio, Log1pRatioTo}, {"Atan2", Atan2, Atan2To}} {
		dst := make([]float64, len(p))
		c.to(dst, p, q)
		own := append([]float64(nil), p...)
		c.to(own, own, q) // dst may be an argument
		for i := range p {
			if w := c.f(p[i], q[i]); !same(dst[i], w) || !same(own[i], w) {
				t.Fatalf("%sTo of (%x, %x): %x, in place %x, want the scalar bits %x", c.name, p[i], q[i], dst[i], own[i], w)
			}
		}
		if n := testing.AllocsPerRun(10, func() { c.to(dst, p, q) }); n != 0 {
			t.Errorf("%sTo allocates %v times, want 0", c.name, n)
		}
		for _, bad := range [][3]int{{2, 1, 2}, {2, 2, 1}, {1, 2, 2}} {
			func() {
				defer func() {
					if recover() == nil {
						t.Errorf("%sTo with lengths %v: no panic", c.name, bad)
					}
				}()
				c.to(dst[:bad[0]], p[:bad[1]], q[:bad[2]])
			}()
		}
	}
}

// TestBits pins results, so that a change of architecture, GOAMD64 level or
// compiler that fuses or reorders an operation is seen. The values were
// printed by this code; TestLogRatioReference and its like judge them.
func TestBits(t *testing.T) {
	var h [3]uint64
	rnd := seeded(71)
	for range 20000 {
		a, b := math.Ldexp(1+rnd.Float64(), rnd.IntN(9)-4), math.Ldexp(1+rnd.Float64(), rnd.IntN(9)-4)
		for i, f := range []func(a, b float64) float64{LogRatio, Log1pRatio, Atan2} {
			h[i] = h[i]*0x100000001b3 ^ math.Float64bits(f(a, b))
		}
	}
	if want := [3]uint64{0x70d031eac261144, 0xea084865a8338be7, 0x959c38738c2e0682}; h != want {
		t.Errorf("digest of 20000 results %#x, want %#x", h, want)
	}
}
