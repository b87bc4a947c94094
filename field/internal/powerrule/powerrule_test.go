package powerrule

import (
	"math"
	"testing"
)

func TestExact(t *testing.T) {
	for _, power := range []float64{-0.75, -0.5, 0, 0.5, 1, 2.25, 17} {
		for _, n := range []int{1, 2, 9, 24} {
			x, w, ok := Of(n, power)
			if !ok || len(x) != n || len(w) != n {
				t.Fatalf("no rule of %d points for the power %v", n, power)
			}
			for degree := range 2 * n {
				sum := 0.0
				for i := range x {
					sum += w[i] * math.Pow(x[i], float64(degree))
				}
				const tol = 4e-14 // eigenvalues are good to some u, times the degree
				if want := 1 / (power + float64(degree) + 1); math.Abs(sum-want) > tol*want {
					t.Errorf("%d points, power %v, degree %d: %v, want %v, tolerance %g", n, power, degree, sum, want, tol)
				}
			}
		}
	}
	if _, _, ok := Of(4, -1); ok {
		t.Error("a rule for the power -1 was made")
	}
}
