// Package powerrule makes Gauss rules for integrals from 0 to 1 of a power times a smooth function.
package powerrule

import (
	"math"

	"gonum.org/v1/gonum/mat"
)

// Of returns n places x in 0..1 and weights w such that sum w f(x) is the integral of s^power f(s) from 0 to 1, exactly for
// polynomials f of degree 2n-1; ok is false unless power > -1.
//
// Source: eigenvalues of the Jacobi matrix and first components of its eigenvectors [Golub1969]; recurrence of the Jacobi
// polynomials of (1+x)^power on -1..1 ([DLMF] 18.9.2, https://dlmf.nist.gov/18.9#E2), moved to 0..1.
func Of(n int, power float64) (x, w []float64, ok bool) {
	if !(power > -1) || n < 1 {
		return nil, nil, false
	}
	t := mat.NewSymDense(n, nil)
	for k := range n {
		f := 2*float64(k) + power
		a := power / (power + 2)
		if k > 0 {
			a = power * power / (f * (f + 2))
			b := 2 * float64(k) * (float64(k) + power) / (f * math.Sqrt((f-1)*(f+1)))
			t.SetSym(k, k-1, 0.5*b)
		}
		t.SetSym(k, k, 0.5*(1+a))
	}
	var e mat.EigenSym
	if !e.Factorize(t, true) {
		return nil, nil, false
	}
	var v mat.Dense
	e.VectorsTo(&v)
	x = e.Values(nil)
	for i := range x {
		w = append(w, v.At(0, i)*v.At(0, i)/(power+1))
	}
	return x, w, true
}
