// Package gauss has the Gauss-Legendre rules of the whole module: right for every number of points, each node and weight rounded once.
//
// Rules have no units. Tables are made once, shared and safe for concurrent use; they give the same bits each time.
package gauss

import (
	"math"
	"sync"

	"example.com/boundpole/geom/pair"
)

// Rule is a quadrature rule: the integral of f is the sum of W[i] f(X[i]).
type Rule struct {
	X, W []float64
}

var tables sync.Map // of int to Rule

// Legendre returns the rule with n points on [-1, 1], ascending and exactly symmetric: exact for polynomials of degree 2n-1. The table is
// shared: do not write to it. Fewer than one point counts as one.
//
// Accuracy: nodes and weights are rounded once (TestLegendre).
func Legendre(n int) Rule {
	n = max(n, 1)
	if r, ok := tables.Load(n); ok {
		return r.(Rule)
	}
	r, _ := tables.LoadOrStore(n, newRule(n))
	return r.(Rule)
}

// On returns the rule with n points on [a, b], ascending and symmetric about the middle, in slices of the caller's own.
func On(n int, a, b float64) (x, w []float64) {
	r := Legendre(n)
	x, w = make([]float64, len(r.X)), make([]float64, len(r.X))
	middle, half := a+(b-a)/2, (b-a)/2
	for i, t := range r.X {
		x[i], w[i] = middle+half*t, half*r.W[i]
	}
	return x, w
}

func newRule(n int) Rule {
	r := Rule{X: make([]float64, n), W: make([]float64, n)}
	for k := 0; 2*k < n; k++ {
		x, w := root(n, k)
		r.X[k], r.X[n-1-k] = -x, x
		r.W[k], r.W[n-1-k] = w, w
	}
	return r
}

// root returns the root number k of P_n from above and its weight, rounded once: Newton's method in pairs, from the guess
// cos(pi (k + 3/4)/(n + 1/2)).
func root(n, k int) (x, w float64) {
	r := pair.Of(math.Cos(math.Pi * (float64(k) + 0.75) / (float64(n) + 0.5)))
	if 2*k+1 == n {
		r = pair.Float{}
	}
	var slope pair.Float
	one := pair.Of(1)
	for range 8 {
		p0, p1 := one, r
		for j := 1; j < n; j++ {
			next := r.Mul(p1).Scale(float64(2*j + 1)).Sub(p0.Scale(float64(j))).Div(pair.Of(float64(j + 1)))
			p0, p1 = p1, next
		}
		slope = p0.Sub(r.Mul(p1)).Scale(float64(n)).Div(one.Sub(r.Mul(r)))
		r = r.Sub(p1.Div(slope))
	}
	return r.Value(), pair.Of(2).Div(one.Sub(r.Mul(r)).Mul(slope.Mul(slope))).Value()
}
