package element

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// Arcs of any proportions, from thin shells and plates to slivers and long bars, are the sums of their parts.
func TestSectorProportions(t *testing.T) {
	rng := rand.New(rand.NewPCG(11, 13))
	span := func(decades float64) float64 { return math.Pow(10, -decades*rng.Float64()) }
	worst, worstPhi, under, count := 0.0, 0.0, 0, 0
	for range 150 {
		inner := 1 - span(4)
		if rng.IntN(4) == 0 {
			inner = 0
		}
		height := 2 * span(4)
		if rng.IntN(3) == 0 {
			height = 4 / span(2)
		}
		from, angle := 360*rng.Float64()-180, 359*span(4)
		mid := from + angle*(0.2+0.6*rng.Float64())
		var p field.Affine
		radial := 0.0
		switch rng.IntN(3) {
		case 0:
			p = sectorAffine
			if height > 2 { // keep |p| near 1
				for i := range 3 {
					p.Gradient[i][2] = 0
				}
			}
		case 1:
			p.Value = sectorAffine.Value
		case 2:
			radial = 1
		}
		arc := func(from, to float64) *Arc {
			return must(NewArc(geom.ArcDegrees(inner, 1, height, from, to), p, radial))
		}
		whole, sum := arc(from, from+angle), field.Sum{arc(from, mid), arc(mid, from+angle)}
		for range 10 {
			s, f, z := inner+(1-inner)*rng.Float64(), from+angle*rng.Float64(), height*(rng.Float64()-0.5)
			d := span(10)
			f = f*math.Pi/180 + d*rng.NormFloat64()
			s += d * rng.NormFloat64()
			z += d * rng.NormFloat64()
			x := r3.Vec{X: s * math.Cos(f), Y: s * math.Sin(f), Z: z}
			a, b := field.At(whole, x, field.Mean, sectorWant), field.At(sum, x, field.Mean, sectorWant)
			if a.Status != field.Regular || b.Status != field.Regular {
				continue
			}
			phi, g, _ := differ(a, b)
			count += 2
			if g > a.ErrG+b.ErrG {
				under++
			}
			if phi > a.ErrPhi+b.ErrPhi {
				under++
			}
			worst = max(worst, g)
			worstPhi = max(worstPhi, phi)
		}
	}
	if !(worst < 1e-14 && worstPhi < 3e-13) { // the height of the longest is 400
		t.Errorf("g off by %.2g, phi by %.2g", worst, worstPhi)
	}
	if 1000*under > count {
		t.Errorf("%d of %d claims too small", under, count)
	}
	t.Logf("g off by %.2g, phi by %.2g, %d of %d claims too small", worst, worstPhi, under, count)
}
