package element

import (
	"cmp"
	"math"
	"slices"

	"example.com/boundpole/field"
)

// polyPart is c b_1^q1 b_2^q2 b_3^q3 al_l, b_i = s/A_i; no al for l = -1. size is the size of the terms of c.
type polyPart struct {
	c, size float64
	q       [3]uint8
	l       int8
}

// polyGroup is e_1^n1 e_2^n2 e_3^n3 U^n4 times the sum of its parts, e_i = al_i x_i/a_i.
type polyGroup struct {
	n     [4]uint8
	parts []polyPart
}

// polyTable is a sum of groups.
type polyTable []polyGroup

// total returns the sum of the sizes of all coefficients.
func (t polyTable) total() float64 {
	s := 0.0
	for _, g := range t {
		for _, p := range g.parts {
			s += p.size
		}
	}
	return s
}

// polyKey names a term.
type polyKey struct {
	n [4]uint8
	q [3]uint8
	l int8
}

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
	for _, k := range keys {
		if len(t) == 0 || t[len(t)-1].n != k.n {
			t = append(t, polyGroup{n: k.n})
		}
		g := &t[len(t)-1]
		g.parts = append(g.parts, polyPart{c: m[k][0], size: m[k][1], q: k.q, l: k.l})
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
	key := polyKey{l: -1}
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

// interior returns phi inside as a polynomial in x_i/a_i: the integral from 0 with U = 1 - sum al_i (x_i/a_i)^2 multiplied out.
func (e *PolynomialEllipsoid) interior() polyTable {
	terms := polyTerms{}
	least := e.base.squares[e.base.least].Hi
	o := confocalPoly{base: e.base, excess: &e.excess, from: least}
	var n polyNode
	e.each(&o, func(t, w float64) {
		o.node(t, &n)
		n.fill()
		for k := range e.outer {
			g := &e.outer[k]
			c, size := n.weight(g)
			for i := range 3 {
				f := powerOf(n.alpha[i], int(g.n[i]))
				c, size = c*f, size*f
			}
			terms.expand(g.n, c*w, size*w, &n.alpha)
		}
	})
	return terms.table()
}

// expand puts c x^n (1 - sum al_i x_i^2)^n4.
func (m polyTerms) expand(n [4]uint8, c, size float64, alpha *[3]float64) {
	top := int(n[3])
	fi := 1.0 // (-al)^i top!/(i! (top-i)!), and so on
	for i := 0; i <= top; i++ {
		fj := fi
		for j := 0; i+j <= top; j++ {
			fk := fj
			for k := 0; i+j+k <= top; k++ {
				key := polyKey{l: -1, n: [4]uint8{n[0] + uint8(2*i), n[1] + uint8(2*j), n[2] + uint8(2*k)}}
				m.put(key, c*fk, size*math.Abs(fk))
				fk *= -alpha[2] * float64(top-i-j-k) / float64(k+1)
			}
			fj *= -alpha[1] * float64(top-i-j) / float64(j+1)
		}
		fi *= -alpha[0] * float64(top-i) / float64(i+1)
	}
}

// powerOf returns x^n.
func powerOf(x float64, n int) float64 {
	v := 1.0
	for range n {
		v *= x
	}
	return v
}
