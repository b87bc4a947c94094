package element

import (
	"math"

	"example.com/boundpole/field"
)

// farOrder is the highest degree kept of a multipole series: (1/farFrom)^farOrder < 1e-17 with a margin for the growth
// of the derivatives.
const (
	farOrder = 52
	farFrom  = 2.5
)

// roundMultipoles is the potential of a round source away from it,
//
//	u = sum A_l t^l P_l(c)/R,   f = sum B_l t^l sin(theta) P_l'(c)/R,   t = a/R, c = cos(theta),
//
// about a centre on its axis, with a the bounding radius. Only every second degree differs from zero in each sum if the
// source is even or odd in z, which all round sources are.
type roundMultipoles struct {
	centre, bound float64
	a, b          [farOrder + 1]float64
}

// far reports whether the series serves at the point.
func (m *roundMultipoles) far(p *roundPoint) bool { return p.reach > farFrom*m.bound }

// addDipoles adds the moments of volume dipoles at (rho, z) about the centre with weight w: of axial strength
// pz + slope z, and of unit transverse strength. Sources are even in z, so pz and the transverse part have odd degrees
// only and the slope has even ones.
//
// The mean over the azimuth of d_z (r^l P_l) is l r^(l-1) P_(l-1), that of d_x (r^l P_l^1 cos phi) is
// l(l+1)/2 r^(l-1) P_(l-1) [own derivation, from the ladder relations of solid harmonics].
func (m *roundMultipoles) addDipoles(rho, z, w, pz, slope float64) {
	x0, x1 := 1.0, z/m.bound
	c, r2 := x1, (rho*rho+z*z)/(m.bound*m.bound)
	w /= m.bound
	for l := 1; l <= farOrder; l++ {
		if l%2 == 1 {
			m.a[l] += w * pz * float64(l) * x0
			m.b[l] += w * x0
		} else {
			m.a[l] += w * slope * z * float64(l) * x0
		}
		x0, x1 = x1, (float64(2*l+1)*c*x1-float64(l)*r2*x0)/float64(l+1)
	}
}

// addRing adds the moments of a ring of charge w at (rho, z) about the centre of a source even in z, and to b those of a
// ring with the charge w/(2 pi) cos(phi) an angle.
func (m *roundMultipoles) addRing(rho, z, w float64) {
	c, r2 := z/m.bound, (rho*rho+z*z)/(m.bound*m.bound)
	x0, x1 := 1.0, c // r^l P_l
	d0, d1 := 0.0, 1.0
	for l := 0; l <= farOrder; l++ {
		if l%2 == 0 {
			m.a[l] += w * x0
		} else { // d0 holds r^(l-1) P_l' = (r^l P_l^1)/rho
			m.b[l] += w * d0 * rho / m.bound / float64(l*(l+1))
		}
		// P_(l+1)' = z P_l' + (l+1) P_l of solid harmonics
		x0, x1, d0, d1 = x1, (float64(2*l+3)*c*x1-float64(l+1)*r2*x0)/float64(l+2), d1, c*d1+float64(l+2)*x1
	}
}

// sum evaluates the series.
func (m *roundMultipoles) sum(p *roundPoint, want field.Want) (c constant, k cosine) {
	hess := want&field.WantGrad != 0
	z := p.height(m.centre)
	ir := 1 / p.reach
	t, x, sin := m.bound*ir, z*ir, p.rho*ir
	last := min(farOrder, int(2+42/math.Log(1/t))) // t^l below 1e-18
	// P_l, P_(l+1), P_(l+2) and their first and second derivatives
	p0, p1 := 1.0, x
	d0, d1 := 0.0, 1.0
	e0, e1 := 0.0, 0.0
	tl := 1.0
	for l := 0; l <= last; l++ {
		fl := float64(l)
		p2 := ((2*fl+3)*x*p1 - (fl+1)*p0) * inverse[l+2]
		d2 := d0 + (2*fl+3)*p1
		e2 := e0 + (2*fl+3)*d1
		if a := m.a[l] * tl; a != 0 {
			c.u += a * p0
			c.z -= a * (fl + 1) * p1
			c.byRho -= a * d1
			if hess {
				c.zz += a * (fl + 1) * (fl + 2) * p2
				c.rhoZ += a * (fl + 1) * d2
			}
		}
		if b := m.b[l] * tl; b != 0 {
			k.s += b * d0
			k.zByRho -= b * fl * d1
			k.tauByRho -= b * e1
			if hess {
				k.zz += b * fl * (fl + 1) * d2
				k.rho += b * fl * (e2*sin*sin - d1)
			}
		}
		p0, p1, d0, d1, e0, e1 = p1, p2, d1, d2, e1, e2
		tl *= t
	}
	ir2 := ir * ir
	ir3 := ir2 * ir
	c.rho = c.byRho * sin * ir2
	c.u, c.z, c.byRho, c.zz, c.rhoZ = c.u*ir, c.z*ir2, c.byRho*ir3, c.zz*ir3, c.rhoZ*sin*ir3
	k.tau = k.tauByRho * sin * sin * ir2
	k.z = k.zByRho * sin * ir2
	k.s, k.zByRho, k.tauByRho, k.zz, k.rho = k.s*ir2, k.zByRho*ir3, k.tauByRho*sin*ir3, k.zz*sin*ir3, k.rho*ir3
	if want&field.WantErr != 0 {
		m.sizes(&c, &k, t, ir)
	}
	return c, k
}

// sizes bounds the sums of the sizes of the terms by those of the first terms; the degrees above fall like t^l. Degree l feels
// the rounding of 1/R, 2 u, l + 1 times and that of c, 3.5 u, up to l(l+1)/2 times: more than value allows from l = 2 on.
func (m *roundMultipoles) sizes(c *constant, k *cosine, t, ir float64) {
	tl := 1.0
	for l := range 12 {
		n := float64(l + 1)
		w := tl * ir * (1 + float64(l*l)/6)
		a, b := math.Abs(m.a[l])*w, math.Abs(m.b[l])*w*ir
		c.sizeU += a
		c.sizeG += a * n * ir
		c.sizeH += a * n * (n + 1) * ir * ir
		k.sizeS += b * n
		k.sizeG += b * n * n
		k.sizeH += b * n * n * (n + 1) * ir
		tl *= t
	}
}

// inverse holds 1/n.
var inverse = func() (t [farOrder + 4]float64) {
	for n := 1; n < len(t); n++ {
		t[n] = 1 / float64(n)
	}
	return t
}()
