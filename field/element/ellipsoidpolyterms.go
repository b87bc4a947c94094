package element

import (
	"cmp"
	"math"
	"slices"

	"example.com/boundpole/field"
)

// polyFactor is b_1^q1 b_2^q2 b_3^q3 al_l, b_i = s/A_i; no al for l = -1.
type polyFactor struct {
	q [3]uint8
	l int8
}

// polyPart is c times a factor; size is the size of the terms of c.
type polyPart struct {
	c, size float64
	factor  uint16
}

// polyGroup is e_1^n1 e_2^n2 e_3^n3 U^n4 times the sum of its parts, e_i = al_i x_i/a_i.
type polyGroup struct {
	n     [4]uint8
	parts []polyPart
}

// polyTable is a sum of groups.
type polyTable struct {
	groups  []polyGroup
	factors []polyFactor
	top     [4]int // the highest powers
}

// total returns the sum of the sizes of all coefficients.
func (t *polyTable) total() float64 {
	s := 0.0
	for _, g := range t.groups {
		for _, p := range g.parts {
			s += p.size
		}
	}
	return s
}

// polyKey names a term.
type polyKey struct {
	n [4]uint8
	polyFactor
}

// plainKey is that of x^n without factors.
func plainKey(n [4]uint8) polyKey { return polyKey{n, polyFactor{l: -1}} }

// compare orders keys, those of one group beside each other.
func (k polyKey) compare(o polyKey) int {
	return cmp.Or(slices.Compare(k.n[:], o.n[:]), slices.Compare(k.q[:], o.q[:]), cmp.Compare(k.l, o.l))
}

// polyTerms collects terms.
type polyTerms map[polyKey][2]float64

func (m polyTerms) put(k polyKey, c, size float64) {
	v := m[k]
	m[k] = [2]float64{v[0] + c, v[1] + size}
}

// table returns the terms in order.
func (m polyTerms) table() (t polyTable) {
	keys := make([]polyKey, 0, len(m))
	for k := range m {
		keys = append(keys, k)
	}
	slices.SortFunc(keys, polyKey.compare)
	index := map[polyFactor]uint16{}
	for _, k := range keys {
		if last := len(t.groups) - 1; last < 0 || t.groups[last].n != k.n {
			t.groups = append(t.groups, polyGroup{n: k.n})
			for i, n := range k.n {
				t.top[i] = max(t.top[i], int(n))
			}
		}
		f, ok := index[k.polyFactor]
		if !ok {
			f = uint16(len(t.factors))
			index[k.polyFactor] = f
			t.factors = append(t.factors, k.polyFactor)
		}
		g := &t.groups[len(t.groups)-1]
		g.parts = append(g.parts, polyPart{c: m[k][0], size: m[k][1], factor: f})
	}
	return t
}

// integrandOf returns -sum d_i of what stands in the integrals of [Dyson1891] for p_i, p in the coordinates x_i/a_i. In them
// L = sum b_i d_i^2, so that a term c e^n of p_i has, with m = q_1+q_2+q_3 and falling powers n_(k),
//
//	sum_q w b^q U^(m+1) e^(n-2q),   w = c prod (n_j)_(2 q_j)/(4^m (m+1)! q_1! q_2! q_3!),
//
// and with dU/dx_i = -2 e_i/a_i, de_i/dx_i = al_i/a_i the derivative follows.
func integrandOf(p field.Polynomial, axes *[3]float64) polyTable {
	terms := polyTerms{}
	for _, t := range p {
		for i := 0; 2*i <= t.Powers[0]; i++ {
			for j := 0; 2*j <= t.Powers[1]; j++ {
				for k := 0; 2*k <= t.Powers[2]; k++ {
					terms.putDerivative(t, [3]int{i, j, k}, axes)
				}
			}
		}
	}
	return terms.table()
}

func (m polyTerms) putDerivative(t field.Term, q [3]int, axes *[3]float64) {
	w := t.Coefficient / axes[t.Component]
	order := 0
	key := plainKey([4]uint8{})
	for i, k := range q {
		n := t.Powers[i]
		for l := range k { // one (n)(n-1)/(4 (m+1) q) after the other: no overflow
			order++
			w *= float64((n-2*l)*(n-2*l-1)) / float64(4*(order+1)*(l+1))
		}
		key.q[i], key.n[i] = uint8(k), uint8(n-2*k)
	}
	left := int(key.n[t.Component])
	up := key
	up.n[t.Component]++
	up.n[3] = uint8(order)
	c := 2 * float64(order+1) * w
	m.put(up, c, math.Abs(c))
	if left > 0 {
		down := key
		down.n[t.Component]--
		down.n[3] = uint8(order + 1)
		down.l = int8(t.Component)
		c := -float64(left) * w
		m.put(down, c, math.Abs(c))
	}
}
