package cubature_test

import (
	"errors"
	"math"
	"testing"

	"example.com/boundpole/field/cubature"
)

const u = 0x1p-53

func TestLegendreExact(t *testing.T) {
	for n := 1; n <= cubature.MostPoints; n++ {
		r := cubature.Legendre(n)
		for p := 0; p <= 2*n-1; p++ {
			got := 0.0
			for i, x := range r.X {
				got += r.W[i] * math.Pow(x, float64(p))
			}
			want := 0.0
			if p%2 == 0 {
				want = 2 / float64(p+1)
			}
			if d := math.Abs(got - want); d > 16*u { // weights sum to 2: 8 u of it
				t.Errorf("%d points, power %d: got %v, want %v, error %.3g above %.3g", n, p, got, want, d, 16*u)
			}
		}
	}
}

// nearly integrates s/(s^2 + b^2)^{3/2}, the normal field of a charged plane at height b times 1/b, over [0, 1].
func nearly(r cubature.Rule, b float64) (relative float64) {
	got := 0.0
	for i, s := range r.X {
		q := math.Hypot(s, b)
		got += r.W[i] * b * s / (q * q * q)
	}
	want := 1 - b/math.Hypot(1, b)
	return math.Abs(got/want - 1)
}

func TestPieces(t *testing.T) {
	for _, b := range []float64{1e-16, 1e-12, 1e-8, 1e-5, 1e-3, 1e-2, 0.1, 0.3} {
		if e := nearly(cubature.PiecesFor(16, 1.8, b).Rule, b); e > 1e-13 { // the claim; 20 u of rounding
			t.Errorf("distance %v: relative error %.3g above 1e-13", b, e)
		}
	}
}

// TestPiecesConverge asserts the observed order: the singularity at pi/2 i of pieces 1.8 long lies on an ellipse of 3.7, so that
// each point more divides the error by at least 3.7^2 but for the polynomial factor in front.
func TestPiecesConverge(t *testing.T) {
	for _, b := range []float64{1e-10, 1e-4} {
		prev := math.NaN()
		for n := 4; n <= 10; n += 3 {
			e := nearly(cubature.PiecesFor(n, 1.8, b).Rule, b)
			if rate := math.Pow(prev/e, 1.0/3); rate < 8 { // 13.7 less the factor
				t.Errorf("distance %v, %d points: error %.3g after %.3g, a factor %.3g a point below 8", b, n, e, prev, rate)
			}
			prev = e
		}
	}
}

func TestTanhSinh(t *testing.T) {
	for _, c := range []struct {
		name string
		f    func(left, right float64) float64
		want float64
	}{
		{"log^2 s^-1/4", func(s, _ float64) float64 { l := math.Log(s); return l * l / math.Sqrt(math.Sqrt(s)) }, 2 / (0.75 * 0.75 * 0.75)},
		{"arcsine", func(s, r float64) float64 { return 1 / math.Sqrt(s*r) }, math.Pi},
		{"log at the far end", func(_, r float64) float64 { return math.Log(r) }, -1},
		{"smooth", func(s, _ float64) float64 { return math.Exp(s) }, math.E - 1},
	} {
		got, est, err := cubature.TanhSinh(c.f, 1, 0)
		if e := math.Abs(got - c.want); err != nil || e > 1e-14*math.Abs(c.want) || e > est { // the claim
			t.Errorf("%s: got %v, want %v, error %.3g, estimate %.3g, %v", c.name, got, c.want, e, est, err)
		}
	}
	jump := func(s, _ float64) float64 {
		if s < 0.3 {
			return 1
		}
		return 0
	}
	if got, est, err := cubature.TanhSinh(jump, 1, 0); !errors.Is(err, cubature.ErrNotConverged) || math.Abs(got-0.3) > est {
		t.Errorf("a jump: got %v, estimate %v, error %v; want ErrNotConverged and a true estimate", got, est, err)
	}
}
