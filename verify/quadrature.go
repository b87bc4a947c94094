package verify

import (
	"math"
	"sync"

	rules "example.com/boundpole/geom/gauss"
)

// node is a point and weight of a rule on [0, 1]. Near 1 the distance to it is kept, so that nothing is lost there.
type node struct{ x, rest, weight float64 } // x + rest = 1

// graded returns the double exponential rule (tanh-sinh) of H. Takahasi and M. Mori, Publ. RIMS 9 (1974) 721, from memory,
// on [0, 1]: exact to rounding for integrands that are analytic inside, whatever algebraic or logarithmic singularity they
// have at the ends. That is what the potential of a charged face has at its rim.
var graded = sync.OnceValue(func() []node {
	const step, half = 0.075, 42 // the last weight is below u
	var all []node
	for k := range 2*half + 1 {
		t := step * float64(k-half)
		s := math.Pi / 2 * math.Sinh(t)
		e := math.Exp(-2 * math.Abs(s))
		near, far := e/(1+e), 1/(1+e)
		n := node{x: near, rest: far, weight: step * math.Pi * math.Cosh(t) * near * far}
		if s > 0 {
			n.x, n.rest = far, near
		}
		all = append(all, n)
	}
	return all
})

// gauss returns the Gauss-Legendre rule with n points on [0, 1].
func gauss(n int) []node {
	x, w := rules.On(n, 0, 1)
	all := make([]node, n)
	for i := range all {
		all[i] = node{x[i], 1 - x[i], w[i]}
	}
	return all
}

// mean returns the mean of f over [0, 1] by a rule.
func mean(rule []node, f func(n node) float64) float64 {
	var sum, weight float64
	for _, n := range rule {
		sum += n.weight * f(n)
		weight += n.weight
	}
	return sum / weight
}
