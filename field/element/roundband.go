package element

import (
	"math"

	"example.com/boundpole/field/internal/elliptic"
)

// band is a charged wall or annulus seen from a point at rho: rings along a straight generatrix, with the position s
// counted from the foot of the point on it.
//
// With q1 and Q the squares of the smallest and the largest distance to a ring and m1 = q1/Q, the ring potential
// U = a oint dphi/R is
//
//	U = 2 pi a / agm(sqrt Q, sqrt q1)
//	  = A ( ln(1/q1) + ln Q + L ),   A = (4/pi) a K(m1)/sqrt Q,   L = -ln(q(m1)/m1),   q the elliptic nome
//
// (Gauss's mean, DLMF 19.8(i), and K'/K from the nome, DLMF 20.9(i); from memory, held by TestBandIntegral). A and L are
// smooth where the band comes close, so the logarithm is integrated in closed form against the Legendre polynomials of
// the rule (product integration) and no distance is too small.
type band struct {
	a, rho float64
	near   float64 // distance from the line that carries the generatrix: a - rho of a wall, z of an annulus
	axial  bool
}

// ring returns q1 and Q of the ring at position s along the generatrix, measured from the foot of the point, and its radius.
func (b *band) ring(s float64) (q1, q, a float64) {
	if b.axial {
		sum := b.a + b.rho
		return b.near*b.near + s*s, sum*sum + s*s, b.a
	}
	a = b.rho + s
	sum := a + b.rho
	return s*s + b.near*b.near, sum*sum + b.near*b.near, a
}

// integral returns the integral of U over lo <= s <= hi.
func (b *band) integral(lo, hi float64) float64 {
	if lo > hi {
		return 0
	}
	// U of a wall is singular at s = +-i near, the factors A and L at s = +-i (a + rho). Panels end at 0 and +-first, then
	// grow threefold: the Bernstein ellipses are wider than 3.2 for plain Gauss (3.2^-32 = 1e-16) and wider than 10 for
	// the factors, which the product rule takes to degree 15 only.
	first := max(0.4*(b.a+b.rho), 1.35*math.Abs(b.near))
	if !b.axial || hi-lo <= first {
		return b.panel(lo, hi)
	}
	sum := 0.0
	for lo < hi {
		end := 0.0
		switch {
		case lo >= first:
			end = 3 * lo
		case lo >= 0:
			end = first
		case lo < -first:
			end = min(lo/3, -first)
			if lo > -1.5*first {
				end = -first
			}
		}
		end = min(end, hi)
		sum += b.panel(lo, end)
		lo = end
	}
	return sum
}

// panel integrates U over one panel with 16 nodes.
func (b *band) panel(lo, hi float64) float64 {
	c, h := 0.5*(lo+hi), 0.5*(hi-lo)
	x, y := -c/h, math.Abs(b.near)/h // singularities of U in the variable of the rule
	// sum of the semi-axes of the ellipse through them: plain Gauss where 3.2^-32 < 1e-16
	major := 0.5 * (math.Hypot(x-1, y) + math.Hypot(x+1, y))
	if major+math.Sqrt(max(0, major*major-1)) > 3.2 {
		sum := 0.0
		for _, g := range gauss16 {
			sum += g.w * (b.plain(c-h*g.x) + b.plain(c+h*g.x))
		}
		return h * sum
	}
	weight := logWeights(x, y)
	sum := 0.0
	for i, g := range gauss16 {
		for side, s := range [2]float64{-g.x, g.x} {
			a, l := b.split(c+h*s, h)
			sum += a * (g.w*l - weight[2*i+side])
		}
	}
	return h * sum
}

// plain returns U.
func (b *band) plain(s float64) float64 {
	q1, q, a := b.ring(s)
	return 2 * math.Pi * a / agm(math.Sqrt(q), math.Sqrt(q1))
}

// split returns A and ln Q + L.
func (b *band) split(s, h float64) (a, l float64) {
	q1, q, a := b.ring(s)
	m1 := q1 / q
	k := math.Sqrt(max(0, 1-m1))
	r := math.Sqrt(k)
	// q = e + 2 e^5 + 15 e^9 + 150 e^13 + 1707 e^17, e = (1 - sqrt k)/(2 (1 + sqrt k)) (Jacobi)
	f := 0.5 / ((1 + k) * (1 + r) * (1 + r))
	e4 := f * m1
	e4 *= e4
	e4 *= e4
	f *= 1 + e4*(2+e4*(15+e4*(150+e4*1707)))
	return 2 * a / (math.Sqrt(q) * agm(1, k)), math.Log(q / (h * h) / f)
}

// agm returns the arithmetic-geometric mean of x > 0 and y >= 0.
func agm(x, y float64) float64 {
	for range 40 {
		d := x - y
		x, y = 0.5*(x+y), math.Sqrt(x*y)
		if math.Abs(d) <= 3e-8*x { // the next mean differs by d^2/16x
			break
		}
	}
	return 0.5 * (x + y)
}

// logWeights returns the weights for which sum weight f(node) is the integral over [-1, 1] of f(t) ln((t-x)^2 + y^2), f
// of degree below 16, in the order -x0, x0, -x1, x1 ... of gauss16.
//
// With tau = x + iy, int P_n ln(t - tau) dt = 2 (Q_(n+1) - Q_(n-1))/(2n+1) for n > 0 (by parts, with
// Neumann's integral of Q_n). Q_n goes upward, which is stable enough inside the ellipse of sum 3.2: errors grow no faster
// than the coefficients of f fall.
func logWeights(x, y float64) (weight [16]float64) {
	if y < 1e-40 && math.Abs(math.Abs(x)-1) < 1e-40 {
		y = 1e-40 // on the end itself: the limit
	}
	tau := complex(x, y)
	// ln(1 - tau), ln(-1 - tau) up to their common branch, real parts and angles
	ra, rb := math.Log(math.Hypot(1-x, y)), math.Log(math.Hypot(1+x, y))
	ta, tb := math.Atan2(-y, 1-x), math.Atan2(-y, -1-x)
	q0 := complex(0.5*(rb-ra), 0.5*(tb-ta))
	q1 := tau*q0 - 1
	// n = 0: 2 Re[(1-tau) ln(1-tau) + (1+tau) ln(-1-tau) - 2]
	m := [16]float64{2 * ((1-x)*ra + y*ta + (1+x)*rb - y*tb - 2)}
	before, now := q0, q1
	for n := 1; n < 16; n++ {
		fn := float64(n)
		next := (complex(2*fn+1, 0)*tau*now - complex(fn, 0)*before) / complex(fn+1, 0)
		m[n] = 4 / (2*fn + 1) * real(next-before)
		before, now = now, next
	}
	for i, g := range gauss16 {
		p0, p1 := 1.0, g.x
		even, odd := 0.5*m[0], 0.0
		for n := 1; n < 16; n++ {
			fn := float64(n)
			if n%2 == 0 {
				even += (fn + 0.5) * m[n] * p1
			} else {
				odd += (fn + 0.5) * m[n] * p1
			}
			p0, p1 = p1, ((2*fn+1)*g.x*p1-fn*p0)/(fn+1)
		}
		weight[2*i], weight[2*i+1] = g.w*(even-odd), g.w*(even+odd)
	}
	return weight
}

// rimDifference returns V(r1) - V(r2) for two circles of one radius, V = a oint (1 - cos phi)/R dphi, without the
// cancellation of close circles: the integral of dV/dz = -z a oint (1 - cos phi)/R^3 dphi over the height. With K and E
// at m = 1 - m1 and K', E' at m1,
//
//	a oint (1 - cos phi)/R^3 dphi = 2 (K - E)/(rho sqrt Q),   K - E = (E'/pi)(ln(1/m1) + L) - pi/(2 K')
//
// by Legendre's relation; the logarithm is integrated as in panel. Domain: |r1.z - r2.z| below a tenth of the radius, the
// point closer than that.
func rimDifference(r1, r2 *rim) float64 {
	line := band{a: r1.a, rho: r1.rho, near: r1.d, axial: true}
	c, h := 0.5*(r1.z+r2.z), 0.5*(r1.z-r2.z)
	weight := logWeights(-c/h, math.Abs(r1.d)/h)
	sum := 0.0
	for i, g := range gauss16 {
		for side, t := range [2]float64{-g.x, g.x} {
			s := c + h*t
			q1, q, _ := line.ring(s)
			kp, ep, _, _ := elliptic.Complete(1 - q1/q)
			_, l := line.split(s, h)
			f := 2 * s / (r1.rho * math.Sqrt(q))
			sum -= f * (ep/math.Pi*(g.w*l-weight[2*i+side]) - g.w*math.Pi/2/kp)
		}
	}
	return h * sum
}
