package element

import "math"

// polyCube holds the coefficients of x^i y^j z^k and the sizes of their terms.
type polyCube [PolynomialDegree + 2][PolynomialDegree + 2][PolynomialDegree + 2][2]float64

// interior returns phi inside as a polynomial in x_i/a_i: the integral from 0 with U = 1 - sum al_i (x_i/a_i)^2 multiplied out.
func (e *PolynomialEllipsoid) interior() polyTable {
	sums := new(polyCube)
	o := confocalPoly{base: e.base, excess: &e.excess, from: e.base.squares[e.base.least].Hi}
	var n polyNode
	e.each(&o, func(t, w float64) {
		o.node(t, &n)
		n.fill(&e.outer)
		for k := range e.outer.groups {
			g := &e.outer.groups[k]
			c, size := n.weight(g)
			for i := range 3 {
				for range g.n[i] {
					c, size = c*n.alpha[i], size*n.alpha[i]
				}
			}
			sums.expand(&g.n, c*w, size*w, &n.alpha)
		}
	})
	terms := polyTerms{}
	for i := range sums {
		for j := range sums[i] {
			for k, v := range sums[i][j] {
				if v[1] != 0 {
					terms.put(plainKey([4]uint8{uint8(i), uint8(j), uint8(k)}), v[0], v[1])
				}
			}
		}
	}
	return terms.table()
}

// expand adds c x^n (1 - sum al_i x_i^2)^n4.
func (m *polyCube) expand(n *[4]uint8, c, size float64, alpha *[3]float64) {
	top := int(n[3])
	fi := 1.0 // (-al)^i top!/(i! (top-i)!), and so on
	for i := 0; i <= top; i++ {
		fj := fi
		for j := 0; i+j <= top; j++ {
			fk := fj
			for k := 0; i+j+k <= top; k++ {
				v := &m[int(n[0])+2*i][int(n[1])+2*j][int(n[2])+2*k]
				v[0] += c * fk
				v[1] += size * math.Abs(fk)
				fk *= -alpha[2] * float64(top-i-j-k) / float64(k+1)
			}
			fj *= -alpha[1] * float64(top-i-j) / float64(j+1)
		}
		fi *= -alpha[0] * float64(top-i) / float64(i+1)
	}
}

// seriesReach is the distance, in radii, up to which the series of a sphere serves: farther off its powers would underflow.
const seriesReach = 1024

// series returns phi outside a sphere as a sum over x^n r^-(2k+1), x and r over the radius a. With R = 1/r^2 the quantities of
// the integral are al = R t^2, b = 1 - R t^2, U = 1 - t^2 and (a^3/4) ds/D = (a^2/2) sqrt(R) dt, and
//
//	int_0^1 t^(2m) (1-t^2)^u dt = 2u (2u-2) ... 2/((2m+1) (2m+3) ... (2m+2u+1)).
//
// The fourth power of the table is k, of R^(k+1/2).
func (e *PolynomialEllipsoid) series() polyTable {
	terms := polyTerms{}
	f := 0.5 * e.base.axes[0] * e.base.axes[0]
	for _, g := range e.outer.groups {
		for _, p := range g.parts {
			factor := e.outer.factors[p.factor]
			q := int(factor.q[0]) + int(factor.q[1]) + int(factor.q[2])
			m := int(g.n[0]) + int(g.n[1]) + int(g.n[2])
			if factor.l >= 0 {
				m++
			}
			c, size := p.c*f, p.size*f
			for j := range q + 1 { // of (1 - R t^2)^q
				w := 1 / float64(2*(m+j)+1)
				for i := 1; i <= int(g.n[3]); i++ {
					w *= float64(2*i) / float64(2*(m+j+i)+1)
				}
				terms.put(plainKey([4]uint8{g.n[0], g.n[1], g.n[2], uint8(m + j)}), c*w, size*w)
				c *= -float64(q-j) / float64(j+1)
				size *= float64(q-j) / float64(j+1)
			}
		}
	}
	return terms.table()
}

// seriesNode fills in the node of the series at x, in units.
func (e *PolynomialEllipsoid) seriesNode(x *[3]float64, n *polyNode) {
	square := 0.0
	for i, c := range x {
		n.alpha[i], n.eta[i] = 1, c/e.base.axes[i]
		square += n.eta[i] * n.eta[i]
	}
	n.over = 1 / square
	n.half = 0.5
	n.slope, n.bend = n.over*n.over, 8*n.over*n.over*n.over
}
