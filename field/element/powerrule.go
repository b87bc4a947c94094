package element

import (
	"math"

	"gonum.org/v1/gonum/mat"
)

// powerRule is a rule for integrals from 0 of s^n times a smooth function: x in 0..1 and w such that sum w f(x) is the
// integral of f.
type powerRule [16]node

// newPowerRule returns the Gauss rule for the weight s^n, n > -1, from the eigenvalues of the Jacobi matrix and the first
// components of its eigenvectors (Golub and Welsch (1969) Math. Comput. 23, 221, from memory).
func newPowerRule(n float64) (r powerRule, ok bool) {
	const size = len(r)
	t := mat.NewSymDense(size, nil)
	for k := range size {
		f := 2*float64(k) + n
		// recurrence of the Jacobi polynomials of (1+x)^n on -1..1 (DLMF 18.9.2), moved to 0..1
		a := n / (n + 2)
		if k > 0 {
			a = n * n / (f * (f + 2))
			b := 2 * float64(k) * (float64(k) + n) / (f * math.Sqrt((f-1)*(f+1)))
			t.SetSym(k, k-1, 0.5*b)
		}
		t.SetSym(k, k, 0.5*(1+a))
	}
	var e mat.EigenSym
	if !e.Factorize(t, true) {
		return r, false
	}
	var v mat.Dense
	e.VectorsTo(&v)
	for i, x := range e.Values(nil) {
		f := v.At(0, i)
		r[i] = node{x, f * f / (n + 1) * math.Pow(x, -n)}
	}
	return r, true
}

// each visits places and weights from 0 to end.
func (r *powerRule) each(end float64, visit func(s, w float64)) {
	for _, g := range r {
		visit(end*g.x, end*g.w)
	}
}
