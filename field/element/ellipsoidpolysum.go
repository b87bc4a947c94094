package element

import (
	"math"

	"example.com/boundpole/field"
)

// polySizes is the length of tables of powers: those of e_i up to PolynomialDegree+1, of U up to PolynomialDegree/2+1.
const polySizes = PolynomialDegree + 3

// polyNode is a place of the integrand.
type polyNode struct {
	alpha, beta, eta [3]float64
	over             float64 // U
	powers           [3][PolynomialDegree/2 + 1]float64
}

// fill fills the powers of beta.
func (n *polyNode) fill() {
	for i, b := range n.beta {
		p := 1.0
		for k := range n.powers[i] {
			n.powers[i][k] = p
			p *= b
		}
	}
}

// weight returns the sum of the parts of a group and the size of its terms.
func (n *polyNode) weight(g *polyGroup) (w, size float64) {
	for k := range g.parts {
		p := &g.parts[k]
		f := n.powers[0][p.q[0]] * n.powers[1][p.q[1]] * n.powers[2][p.q[2]]
		if p.l >= 0 {
			f *= n.alpha[p.l]
		}
		w += p.c * f
		size += p.size * f
	}
	return w, size
}

// polyJet is a function of e_1, e_2, e_3, U: value, first and second derivatives, the latter in the order of tensorOrder and then
// by U and the others.
type polyJet struct {
	v      float64
	d      [4]float64
	dd     [6]float64
	du     [4]float64
	slopes bool // d is wanted
	twice  bool // dd and du too
}

// polyPowers holds z^k, k z^(k-1), k (k-1) z^(k-2).
type polyPowers [polySizes][3]float64

func (p *polyPowers) fill(z float64, top int) {
	p[0] = [3]float64{1}
	for k := 1; k <= top; k++ {
		l := &p[k-1]
		p[k] = [3]float64{l[0] * z, float64(k) * l[0], float64(k) * l[1]}
	}
}

// add adds w times a group.
func (j *polyJet) add(w float64, n *[4]uint8, p *[4]polyPowers) {
	x, y, z, t := &p[0][n[0]], &p[1][n[1]], &p[2][n[2]], &p[3][n[3]]
	xy, zt := w*x[0]*y[0], z[0]*t[0]
	j.v += xy * zt
	if !j.slopes {
		return
	}
	x1, y1 := w*x[1]*y[0], w*x[0]*y[1]
	z1, t1 := z[1]*t[0], z[0]*t[1]
	j.d[0] += x1 * zt
	j.d[1] += y1 * zt
	j.d[2] += xy * z1
	j.d[3] += xy * t1
	if !j.twice {
		return
	}
	j.dd[0] += w * x[2] * y[0] * zt
	j.dd[1] += w * x[0] * y[2] * zt
	j.dd[2] += xy * z[2] * t[0]
	j.dd[3] += w * x[1] * y[1] * zt
	j.dd[4] += x1 * z1
	j.dd[5] += y1 * z1
	j.du[0] += x1 * t1
	j.du[1] += y1 * t1
	j.du[2] += xy * z[1] * t[1]
	j.du[3] += xy * z[0] * t[2]
}

// jets returns the table at a node and the sizes of its terms, those only if estimates are wanted.
func (t polyTable) jets(n *polyNode, want field.Want) (value, size polyJet) {
	n.fill()
	var p, q [4]polyPowers
	top := t.top()
	for i, z := range [4]float64{n.eta[0], n.eta[1], n.eta[2], n.over} {
		p[i].fill(z, top[i])
		q[i].fill(math.Abs(z), top[i])
	}
	value.slopes = want&(field.WantG|field.WantGrad) != 0
	value.twice = want&field.WantGrad != 0
	size.slopes, size.twice = value.slopes, value.twice
	for k := range t {
		g := &t[k]
		w, s := n.weight(g)
		value.add(w, &g.n, &p)
		if want&field.WantErr != 0 {
			size.add(s, &g.n, &q)
		}
	}
	return value, size
}

// top returns the highest powers of a table.
func (t polyTable) top() (top [4]int) {
	for k := range t {
		for i, n := range t[k].n {
			top[i] = max(top[i], int(n))
		}
	}
	return top
}

// polySum adds up phi, g and its gradient, with the sizes of the terms; lengths in units.
type polySum struct {
	phi, phiSize float64
	g, gSize     [3]float64
	grad         [6]float64
	gradSize     float64
}

// add adds w times the table at a node as phi, with d/dx_i = (al_i d/de_i - 2 e_i d/dU)/a_i.
func (s *polySum) add(t *polyTable, n *polyNode, axes *[3]float64, w float64, want field.Want) {
	v, size := t.jets(n, want)
	s.phi += w * v.v
	s.phiSize += w * size.v
	if want&(field.WantG|field.WantGrad) == 0 {
		return
	}
	for i, a := range axes {
		s.g[i] -= w / a * (n.alpha[i]*v.d[i] - 2*n.eta[i]*v.d[3])
		s.gSize[i] += w / a * (n.alpha[i]*size.d[i] + 2*math.Abs(n.eta[i])*size.d[3])
	}
	if want&field.WantGrad == 0 {
		return
	}
	for k, ij := range tensorOrder {
		i, j := ij[0], ij[1]
		ai, aj, ei, ej := n.alpha[i], n.alpha[j], n.eta[i], n.eta[j]
		d := ai*aj*v.dd[k] - 2*(ai*ej*v.du[i]+aj*ei*v.du[j]) + 4*ei*ej*v.du[3]
		ei, ej = math.Abs(ei), math.Abs(ej)
		b := ai*aj*size.dd[k] + 2*(ai*ej*size.du[i]+aj*ei*size.du[j]) + 4*ei*ej*size.du[3]
		if i == j {
			d -= 2 * ai * v.d[3]
			b += 2 * ai * size.d[3]
		} else {
			b *= 2 // twice in the norm
		}
		s.grad[k] -= w / (axes[i] * axes[j]) * d
		s.gradSize += w / (axes[i] * axes[j]) * b
	}
}
