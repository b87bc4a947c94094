package element

import (
	"math"

	"example.com/boundpole/field/internal/powerrule"
)

// powerRule is a rule for integrals from 0 of s^n times a smooth function: x in 0..1 and w such that sum w f(x) is the
// integral of f.
type powerRule [16]node

// newPowerRule returns the Gauss rule for the weight s^n, n > -1.
func newPowerRule(n float64) (r powerRule, ok bool) {
	x, w, ok := powerrule.Of(len(r), n)
	for i := range x {
		r[i] = node{x[i], w[i] * math.Pow(x[i], -n)}
	}
	return r, ok
}

// each visits places and weights from 0 to end.
func (r *powerRule) each(end float64, visit func(s, w float64)) {
	for _, g := range r {
		visit(end*g.x, end*g.w)
	}
}
