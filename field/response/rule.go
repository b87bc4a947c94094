package response

import (
	"math"

	"gonum.org/v1/gonum/integrate/quad"
)

// points is the number of points a direction of the rule on a piece of a panel: with a piece no larger than apart times its
// distance from the point it leaves out about 1e-10 (methods: the singularity lies at 1.4 half lengths, (3.1)^-2n).
const points = 10

// maxOrder is the largest order of a panel.
const maxOrder = 14

// rule is a Gauss rule on [0, 1] with the barycentric weights of interpolation through its nodes.
type rule struct {
	x, w, b []float64
}

// newRule returns the rule with n nodes. The barycentric weights of Gauss nodes x on [-1, 1] are proportional to
// (-1)^k sqrt((1 - x_k^2) w_k) [Berrut2004].
func newRule(n int) *rule {
	r := &rule{x: make([]float64, n), w: make([]float64, n), b: make([]float64, n)}
	quad.Legendre{}.FixedLocations(r.x, r.w, 0, 1)
	for k, x := range r.x {
		r.b[k] = math.Sqrt(x * (1 - x) * r.w[k])
		if k%2 != 0 {
			r.b[k] = -r.b[k]
		}
	}
	return r
}

// basis fills dst with the values at x of the polynomials that are 1 at one node and 0 at the others.
func (r *rule) basis(dst []float64, x float64) {
	sum := 0.0
	for k, node := range r.x {
		d := x - node
		if d == 0 {
			clear(dst)
			dst[k] = 1
			return
		}
		dst[k] = r.b[k] / d
		sum += dst[k]
	}
	for k := range dst {
		dst[k] /= sum
	}
}

// span is an interval of a parameter: the k-th of 2^level equal parts of [0, 1], or any interval if level is negative.
type span struct {
	level, k int
	from, to float64
}

// halves returns the two halves.
func (s span) halves() [2]span {
	middle := (s.from + s.to) / 2
	level := s.level + 1
	if s.level < 0 {
		level = -1
	}
	return [2]span{{level, 2 * s.k, s.from, middle}, {level, 2*s.k + 1, middle, s.to}}
}

// tabled is the level of spans up to which their tables are kept.
const tabled = 6

// table[a*n+k] is the value of the k-th polynomial of a rule with n nodes at the a-th point of the rule on a span.
type table []float64

// tables holds what a rule is on all spans up to a level.
type tables struct {
	rule  *rule
	inner *rule // the rule of the pieces
	kept  [tabled + 1][]table
}

func newTables(order int, inner *rule) *tables {
	t := &tables{rule: newRule(order), inner: inner}
	for level := range t.kept {
		n := 1 << level
		t.kept[level] = make([]table, n)
		for k := range n {
			s := span{level, k, float64(k) / float64(n), float64(k+1) / float64(n)}
			t.kept[level][k] = make(table, points*order)
			t.fill(t.kept[level][k], s)
		}
	}
	return t
}

// on returns the table of a span, in room if it is not kept.
func (t *tables) on(s span, room table) table {
	if s.level >= 0 && s.level <= tabled {
		return t.kept[s.level][s.k]
	}
	room = room[:points*len(t.rule.x)]
	t.fill(room, s)
	return room
}

func (t *tables) fill(dst table, s span) {
	n := len(t.rule.x)
	for a, x := range t.inner.x {
		t.rule.basis(dst[a*n:a*n+n], s.from+x*(s.to-s.from))
	}
}
