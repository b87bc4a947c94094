package gauss_test

import (
	"math"
	"testing"

	"example.com/boundpole/geom/gauss"
)

// TestLegendre integrates every even power that n points must integrate, for every n up to 130.
func TestLegendre(t *testing.T) {
	for n := 1; n <= 130; n++ {
		r := gauss.Legendre(n)
		for p := 0; p <= 2*n-2; p += max(2, n/8*2) {
			var got float64
			for i, x := range r.X {
				got += r.W[i] * math.Pow(x, float64(p))
			}
			want := 2 / float64(p+1)
			// half a rounding of each node counts p times, those of weight, power and sum a few
			if e := math.Abs(got - want); e > (8+float64(p)/2+float64(n)/8)*0x1p-53*want {
				t.Errorf("n = %d, x^%d: %.17g, want %.17g", n, p, got, want)
			}
		}
	}
}

// TestLegendreOrder demands ascending, symmetric nodes and the known rule of two points.
func TestLegendreOrder(t *testing.T) {
	if r := gauss.Legendre(2); r.X[1] != 0.57735026918962576451 || r.W[0] != 1 {
		t.Errorf("two points: %v %v, want 1/sqrt 3 and 1", r.X, r.W)
	}
	for _, n := range []int{1, 2, 25, 26, 27, 64} {
		r := gauss.Legendre(n)
		for i := range r.X {
			if r.X[i] != -r.X[n-1-i] || r.W[i] != r.W[n-1-i] || !(r.W[i] > 0) || i > 0 && !(r.X[i] > r.X[i-1]) {
				t.Errorf("n = %d, point %d: %v weight %v is out of order", n, i, r.X[i], r.W[i])
			}
		}
	}
}

// TestOn maps the rule to an interval: the integral of x^3 over [1, 3] is 20.
func TestOn(t *testing.T) {
	x, w := gauss.On(2, 1, 3)
	if got := w[0]*x[0]*x[0]*x[0] + w[1]*x[1]*x[1]*x[1]; math.Abs(got-20) > 20*8*0x1p-53 { // a rounding each of 8 operations
		t.Errorf("%v, want 20", got)
	}
	if x, _ := gauss.On(0, 0, 1); len(x) != 1 {
		t.Errorf("no points gives %d, want one", len(x))
	}
}
