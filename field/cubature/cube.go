package cubature

import (
	"math"

	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

// cube is a polynomial in three variables of total degree up to its degree; the coefficient of x^i y^j z^k stands at (i, j, k).
type cube struct {
	degree int
	c      []float64 // (degree+1)^3
}

func newCube(degree int) cube {
	m := degree + 1
	return cube{degree, make([]float64, m*m*m)}
}

func (p *cube) place(i, j, k int) int { return (i*(p.degree+1)+j)*(p.degree+1) + k }

// zero reports whether all coefficients vanish.
func (p *cube) zero() bool {
	for _, c := range p.c {
		if c != 0 {
			return false
		}
	}
	return true
}

// shift rewrites the polynomial in x - a, by Horner's scheme in each variable in turn.
func (p *cube) shift(a [3]float64) {
	m := p.degree + 1
	stride := [3]int{m * m, m, 1}
	for axis, t := range a {
		if t == 0 {
			continue
		}
		u, v := stride[(axis+1)%3], stride[(axis+2)%3]
		for i := range m {
			for j := range m - i {
				line := p.c[i*u+j*v:]
				top := p.degree - i - j
				for k := range top {
					for n := top - 1; n >= k; n-- {
						line[n*stride[axis]] += t * line[(n+1)*stride[axis]]
					}
				}
			}
		}
	}
}

// derive sets p to the derivative of q by one variable; both have the same degree.
func (p *cube) derive(q *cube, axis int) {
	clear(p.c)
	for i := range q.degree + 1 {
		for j := range q.degree + 1 - i {
			for k := range q.degree + 1 - i - j {
				n := [3]int{i, j, k}
				f := float64(n[axis])
				if f == 0 {
					continue
				}
				n[axis]--
				p.c[p.place(n[0], n[1], n[2])] = f * q.c[q.place(i, j, k)]
			}
		}
	}
}

// turned returns f, a polynomial in x given by terms, in the coordinates y of x = centre + unit (y_0 axes_0 + y_1 axes_1 + ...).
func turned(terms []scalarTerm, degree int, centre r3.Vec, unit float64, axes [3]r3.Vec) cube {
	sum := newCube(degree)
	linear := [3][4]float64{
		{centre.X, unit * axes[0].X, unit * axes[1].X, unit * axes[2].X},
		{centre.Y, unit * axes[0].Y, unit * axes[1].Y, unit * axes[2].Y},
		{centre.Z, unit * axes[0].Z, unit * axes[1].Z, unit * axes[2].Z},
	}
	for _, t := range terms {
		p := newCube(degree)
		p.c[0] = t.coefficient
		for axis, n := range t.powers {
			for range n {
				p.multiply(linear[axis])
			}
		}
		for i, c := range p.c {
			sum.c[i] += c
		}
	}
	return sum
}

// multiply multiplies by l_0 + l_1 x + l_2 y + l_3 z; the degree must leave room.
func (p *cube) multiply(l [4]float64) {
	for i := p.degree; i >= 0; i-- {
		for j := p.degree - i; j >= 0; j-- {
			for k := p.degree - i - j; k >= 0; k-- {
				v := l[0] * p.c[p.place(i, j, k)]
				if i > 0 {
					v += l[1] * p.c[p.place(i-1, j, k)]
				}
				if j > 0 {
					v += l[2] * p.c[p.place(i, j-1, k)]
				}
				if k > 0 {
					v += l[3] * p.c[p.place(i, j, k-1)]
				}
				p.c[p.place(i, j, k)] = v
			}
		}
	}
}

// scalarTerm is one term of a polynomial in x.
type scalarTerm struct {
	coefficient float64
	powers      [3]int
}

// alongNormal returns the terms of p.n.
func alongNormal(p field.Polynomial, n r3.Vec) (terms []scalarTerm) {
	for _, t := range p {
		if k := [3]float64{n.X, n.Y, n.Z}[t.Component]; k != 0 {
			terms = append(terms, scalarTerm{k * t.Coefficient, t.Powers})
		}
	}
	return terms
}

// minusDivergence returns the terms of -div p.
func minusDivergence(p field.Polynomial) (terms []scalarTerm) {
	for _, t := range p {
		if n := t.Powers[t.Component]; n > 0 {
			d := scalarTerm{-float64(n) * t.Coefficient, t.Powers}
			d.powers[t.Component]--
			terms = append(terms, d)
		}
	}
	return terms
}

// square is a polynomial in two variables; the coefficient of x^i y^j stands at flat(i, j).
type square []float64

// flat is the place of x^i y^j, degree by degree.
func flat(i, j int) int { return (i+j)*(i+j+1)/2 + j }

// cut sets s to the polynomial on the plane z = t. Where weighted, every term is divided by its total degree plus 2: what the
// integral of it along the ray from the origin, with weight r, makes of it.
func (s square) cut(p *cube, t float64, weighted bool) {
	clear(s)
	for i := range p.degree + 1 {
		for j := range p.degree + 1 - i {
			v, power := 0.0, 1.0
			for k := range p.degree + 1 - i - j {
				c := p.c[p.place(i, j, k)] * power
				if weighted {
					c /= float64(i + j + k + 2)
				}
				v += c
				power *= t
			}
			s[flat(i, j)] = v
		}
	}
}

// derive sets s to the derivative of q by one variable.
func (s square) derive(q square, degree, axis int) {
	clear(s)
	for n := 1; n <= degree; n++ {
		for j := range n + 1 {
			i := n - j
			c := q[flat(i, j)]
			if axis == 0 && i > 0 {
				s[flat(i-1, j)] = float64(i) * c
			}
			if axis == 1 && j > 0 {
				s[flat(i, j-1)] = float64(j) * c
			}
		}
	}
}

// size returns the sum over degrees of the magnitudes of the coefficients times a magnitude for that degree.
func (s square) size(by []float64, degree int) (v float64) {
	for n := 0; n <= degree; n++ {
		m := 0.0
		for _, c := range s[flat(n, 0) : flat(0, n)+1] {
			m += math.Abs(c)
		}
		if m != 0 {
			v += m * by[n]
		}
	}
	return v
}
