package element

import (
	"math"
	"math/rand/v2"
	"slices"
	"testing"
)

// TestMarch holds the panels against integrals known in closed form, of the kinds that rings have: with foot at 0 and b beside
// it, b/(b^2 + s^2), s/(b^2 + s^2) and ln(b^2 + s^2), times a factor with a singularity at (x, y).
func TestMarch(t *testing.T) {
	for _, c := range []struct{ lo, hi, b float64 }{
		{-1, 2, 1}, {-1, 2, 1e-3}, {-0.5, 0.5, 1e-12}, {1e-12, 3, 1e-12}, {1e-9, 1, 0x1p-60}, {-5, -1e-3, 1e-6}, {-1, 1, 30}, {-1e-12, 4, 1e-6},
	} {
		for _, x := range []float64{-2, 0, 0.3, 7} {
			const y = 1.5
			m := march{lo: c.lo, hi: c.hi}
			m.put(0, c.b)
			m.put(x, y)
			var pole, odd, logarithm, wide float64
			m.each(true, func(s, w float64) (p, q float64) {
				p, q = c.b/(c.b*c.b+s*s), s/(c.b*c.b+s*s)
				pole += w * p
				odd += w * q
				logarithm += w * 2 * math.Log(math.Hypot(c.b, s))
				wide += w * y / (y*y + (s-x)*(s-x))
				return p, q
			})
			primitive := func(s float64) float64 {
				return 2*(s*math.Log(math.Hypot(c.b, s))-s) + 2*c.b*math.Atan(s/c.b)
			}
			// magnitudes add up to pi, 60, 10 and pi
			for name, e := range map[string]float64{
				"pole":  pole - math.Atan(c.hi/c.b) + math.Atan(c.lo/c.b),
				"odd":   (odd - math.Log(math.Hypot(c.hi, c.b)/math.Hypot(c.lo, c.b))) / 20,
				"log":   (logarithm - primitive(c.hi) + primitive(c.lo)) / 10,
				"wide":  wide - math.Atan((c.hi-x)/y) + math.Atan((c.lo-x)/y),
				"claim": m.left / 100, // four panels a decade
			} {
				if !(math.Abs(e) < 4e-15) { // 40 u
					t.Errorf("%+v, other singularity at %v: %s off by %.2g", c, x, name, e)
				}
			}
		}
	}
}

// TestMarchLeft checks the estimate of what the rules leave out where they leave out much: panels that take the
// singularities to be farther than they are.
func TestMarchLeft(t *testing.T) {
	rng := rand.New(rand.NewPCG(8, 1))
	var over []float64
	under, tried := 0, 0
	for range 4000 {
		b, x := math.Pow(10, -3*rng.Float64()), 2*rng.Float64()-1
		trust := 1 + 3*rng.Float64()
		m := march{lo: -1 - rng.Float64(), hi: 1 + rng.Float64()}
		m.put(x, trust*b)
		sum := 0.0
		m.each(true, func(s, w float64) (p, q float64) {
			f := b / (b*b + (s-x)*(s-x))
			sum += w * f
			return f, 0
		})
		e := math.Abs(sum - math.Atan((m.hi-x)/b) + math.Atan((m.lo-x)/b))
		if e < 1e-13 { // rounding
			continue
		}
		tried++
		if e > m.left {
			under++
		}
		over = append(over, m.left/e)
	}
	slices.Sort(over)
	t.Logf("%d of %d too small; median %.3g, 1 %% %.3g", under, tried, over[len(over)/2], over[len(over)/100])
	if 1000*under > tried || over[len(over)/2] > 100 || tried < 500 { // the contract on estimates
		t.Errorf("%d of %d estimates too small, median overestimate %.3g", under, tried, over[len(over)/2])
	}
}

// TestPowerRule checks the rule for s^n against the moments 1/(n + k + 1), to which it is exact up to degree 31.
func TestPowerRule(t *testing.T) {
	for _, n := range []float64{0.5, -0.5, 0.001, 3.25, 39.5} {
		r, ok := newPowerRule(n)
		if !ok {
			t.Fatalf("no rule for %v", n)
		}
		for k := range 32 {
			sum := 0.0
			r.each(1, func(s, w float64) { sum += w * math.Pow(s, n) * powInt(s, k) })
			if want := 1 / (n + float64(k) + 1); math.Abs(sum/want-1) > 1e-13 { // eigenvectors good to 1e-15, the small ones in proportion less
				t.Errorf("weight s^%v, degree %d: %v, want %v", n, k, sum, want)
			}
		}
	}
}
