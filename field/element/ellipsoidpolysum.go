package element

import (
	"math"

	"example.com/boundpole/field"
)

// polySizes is the length of tables of powers: one more than any reaches. polyFactors is the number of factors there can be: l of
// four kinds, q with a sum up to half the degree.
const (
	polySizes   = PolynomialDegree + 2
	polyHalf    = PolynomialDegree / 2
	polyFactors = 4 * (polyHalf + 1) * (polyHalf + 2) * (polyHalf + 3) / 6
)

// polyNode is a place of a table. Its fourth variable z has the derivatives -2 slope e_i by x_i/a_i, and second ones
// -2 slope al_i delta_ij + bend e_i e_j, and its powers are those of the table and half more. In the integrand z is U, slope 1, bend
// and half 0.
type polyNode struct {
	alpha, beta, eta  [3]float64
	over              float64 // z
	slope, bend, half float64
	factors           [polyFactors]float64
}

// fill fills in the factors of a table.
func (n *polyNode) fill(t *polyTable) {
	var powers [3][polyHalf + 1]float64
	for i, b := range n.beta {
		p := 1.0
		for k := range powers[i] {
			powers[i][k] = p
			p *= b
		}
	}
	for k, f := range t.factors {
		v := powers[0][f.q[0]] * powers[1][f.q[1]] * powers[2][f.q[2]]
		if f.l >= 0 {
			v *= n.alpha[f.l]
		}
		n.factors[k] = v
	}
}

// weight returns the sum of the parts of a group and the size of its terms.
func (n *polyNode) weight(g *polyGroup) (w, size float64) {
	for k := range g.parts {
		p := &g.parts[k]
		f := n.factors[p.factor]
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

// polyPowers holds z^k, k z^(k-1), k (k-1) z^(k-2), k whole, or half more than whole.
type polyPowers [polySizes][3]float64

func (p *polyPowers) fill(z, half float64, top int) {
	p[0] = [3]float64{1}
	if half != 0 {
		root := math.Sqrt(z)
		p[0] = [3]float64{root, 0.5 / root, -0.25 / (root * z)}
	}
	for k := 1; k <= top; k++ {
		l, m := &p[k-1], float64(k)+half
		p[k] = [3]float64{l[0] * z, m * l[0], m * l[1]}
	}
}

// sizes fills in the magnitudes of others.
func (p *polyPowers) sizes(o *polyPowers, top int) {
	for k := range top + 1 {
		p[k] = [3]float64{math.Abs(o[k][0]), math.Abs(o[k][1]), math.Abs(o[k][2])}
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
func (t *polyTable) jets(n *polyNode, want field.Want) (value, size polyJet) {
	n.fill(t)
	var p, q [4]polyPowers
	for i, z := range [4]float64{n.eta[0], n.eta[1], n.eta[2], n.over} {
		half := 0.0
		if i == 3 {
			half = n.half
		}
		p[i].fill(z, half, t.top[i])
		q[i].sizes(&p[i], t.top[i])
	}
	value.slopes = want&(field.WantG|field.WantGrad) != 0
	value.twice = want&field.WantGrad != 0
	size.slopes, size.twice = value.slopes, value.twice
	for k := range t.groups {
		g := &t.groups[k]
		w, s := n.weight(g)
		value.add(w, &g.n, &p)
		if want&field.WantErr != 0 {
			size.add(s, &g.n, &q)
		}
	}
	return value, size
}

// polySum adds up phi, g and its gradient, with the sizes of the terms; lengths in units.
type polySum struct {
	phi, phiSize float64
	g, gSize     [3]float64
	grad         [6]float64
	gradSize     float64
}

// add adds w times the table at a node as phi, with d/dx_i = (al_i d/de_i - 2 slope e_i d/dz)/a_i.
func (s *polySum) add(t *polyTable, n *polyNode, axes *[3]float64, w float64, want field.Want) {
	v, size := t.jets(n, want)
	s.phi += w * v.v
	s.phiSize += w * size.v
	if want&(field.WantG|field.WantGrad) == 0 {
		return
	}
	for i, a := range axes {
		s.g[i] -= w / a * (n.alpha[i]*v.d[i] - 2*n.slope*n.eta[i]*v.d[3])
		s.gSize[i] += w / a * (n.alpha[i]*size.d[i] + 2*n.slope*math.Abs(n.eta[i])*size.d[3])
	}
	if want&field.WantGrad == 0 {
		return
	}
	down := 2 * n.slope
	for k, ij := range tensorOrder {
		i, j := ij[0], ij[1]
		ai, aj, ei, ej := n.alpha[i], n.alpha[j], n.eta[i], n.eta[j]
		d := ai*aj*v.dd[k] - down*(ai*ej*v.du[i]+aj*ei*v.du[j]) + ei*ej*(down*down*v.du[3]+n.bend*v.d[3])
		ei, ej = math.Abs(ei), math.Abs(ej)
		b := ai*aj*size.dd[k] + down*(ai*ej*size.du[i]+aj*ei*size.du[j]) + ei*ej*(down*down*size.du[3]+n.bend*size.d[3])
		if i == j {
			d -= down * ai * v.d[3]
			b += down * ai * size.d[3]
		} else {
			b *= 2 // twice in the norm
		}
		s.grad[k] -= w / (axes[i] * axes[j]) * d
		s.gradSize += w / (axes[i] * axes[j]) * b
	}
}
