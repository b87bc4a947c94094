package elliptic

import "math"

// Circle holds the integrals over a circle that discs and cylinder walls are
// made of; q² = a² + rho² - 2 a rho cos φ and R² = q² + z².
type Circle struct {
	U, T1, S3, C3 float64 // as Ring returns them

	// Omega is the solid angle of the disc, with the sign of z; in the plane
	// z = 0 it is 0, the mean of both sides (which are ±2π inside). Inside and
	// outside, near the rim and far away its relative error is bounded.
	Omega float64
	// S = a² z ∮ sin²φ/(q² R) dφ, no unit. rho S is the integral of T1 over the
	// height from 0 to z: the potential of a wall charged with cos φ.
	S float64
	// E = a z ∮ (rho - a cos φ)/(q² R) dφ, no unit: the radial field of a
	// uniformly charged wall from height 0 to z, seen at height z of the
	// circle at its foot (times 1/4π). At gap = 0, on the wall, it is the mean
	// of both sides; outside less inside is 2π with the sign of z.
	E float64

	// C = ∫ (cos²θ + g sin²θ)/((cos²θ + g² sin²θ) Δ) dθ, g = (a-rho)/(a+rho), 0
	// to π/2. Outside and for z >> rho it loses digits that Omega keeps.
	C float64
	// G = ∫ sin²θ cos²θ/((cos²θ + g² sin²θ) Δ) dθ, 0 to π/2; with
	// n = 1 - g² it is (R_D - g² R_J)/3n.
	G float64
}

// OfCircle returns all integrals over the circle of radius a at distance
// rho = a - gap from its axis and height z.
//
// Units: those of a; S3 and C3 are 1/length³, all others have none.
// Domain: a > 0, rho >= 0, gap = a - rho and q1 = gap² + z² > 0, given apart so
// that they may be better known than rho. Lengths within 1e±70.
// Singular: on the circle, q1 = 0, U, T1, S3, C3 are +Inf, S is 0 and the rest
// NaN.
// Accuracy: relative error <= 1.5e-15 for U, T1, S3, C3, S, and <= 3e-15 for
// Omega and E, at every place from 1e-12 a off the circle to 1e6 a away, the
// axis included (worst of 1001 places: 5e-16, 1.1e-15, 9e-16, 1.1e-15, 1.1e-15;
// 1.6e-15, 9e-16; TestCircleReference).
// Identities: rho E = z U + a Omega - 2π a sgn z for gap > 0 (the last term
// absent for gap < 0).
func OfCircle(a, rho, z, gap, q1 float64) Circle {
	sum, abs := a+rho, math.Abs(z)
	q := float64(sum*sum) + float64(z*z)
	far, near := math.Sqrt(q), math.Sqrt(q1)
	first := far + near
	if !(a > 0 && rho >= 0 && q1 > 0 && first <= math.MaxFloat64) || gap != gap {
		return noCircle(onCircle(a, rho, q, q1), gap)
	}
	mean, geo := first, 2*math.Sqrt(far*near)
	e := mean * geo
	wide, slim := max(a, rho), 2*min(a, rho)
	ag := math.Abs(gap)
	sn, gf := float64(sum*near), float64(ag*far)
	tau := sum / (float64(sum*sn) + float64(ag*gf))
	iota := ag * tau
	zk := z * z / (sn + gf)
	k, xa, xb, ya, yb := 2.0, 0.0, 1.0, 1.0, 0.0
	pa, pb := sum+ag, 2*(gf+sn)
	na, nb := 1.0, float64(-4*wide*zk)
	u, v, x := 0.0, far*sum/wide, slim*zk*(sum*tau)
	twoFar := 2 * far
	for {
		im := 1 / mean
		ei := e * iota
		iw := 1 / (1 + float64(ei*iota))
		da, db := ya+float64(twoFar*xa), yb+float64(twoFar*xb)
		u, v = u+float64(float64(db*im)*x)+float64(v*iota), 2*(v+float64(float64(geo*da)*x)+float64(ei*u))
		x *= (1 - float64(geo*iota)) * iw
		pa, pb = pa+float64(pb*iota), 2*(pb+float64(ei*pa))
		na, nb = na+float64(nb*iota), 2*(nb+float64(ei*na))
		xa, xb = xa+float64(xb*im), 2*(xb+float64(geo*xa))
		ya, yb = ya+float64(yb*im), 2*(yb+float64(geo*ya))
		iota *= iw
		tau *= iw
		k += k
		old := mean
		mean += geo
		if math.Abs(old-geo) <= agmEnd*old {
			break
		}
		geo = 2 * math.Sqrt(e)
		e = geo * mean
	}
	var c Circle
	sx, sy := xb+float64(xa*mean), yb+float64(ya*mean)
	c.U, c.T1 = closePotential(a, rho, first, mean, k, sx)
	c.S3, c.C3 = closeField(a*rho, q, q1, float64(far*near), first, mean, sx, sy)
	it := mean * (1 + float64(mean*iota))
	plus := (pb + float64(pa*mean)) * tau
	minus := (nb + float64(na*mean)) * (tau * slim)
	g := (float64((sy+float64(twoFar*sx))*x*0.5/mean) + float64(iota*(v+float64(u*mean)))) / it
	c.G = math.Pi / 2 * far * g
	c.C = math.Pi / 2 * far / it
	if gap >= 0 {
		c.C *= plus
	} else {
		c.C *= -minus
	}
	if z == 0 {
		return c
	}
	sign := math.Copysign(1, z)
	wall := 2 * math.Pi * a * abs
	c.S = sign * (4 * a * wall * g / (sum * sum))
	it *= sum
	switch {
	case abs >= wide:
		c.Omega, c.E = smooth(a, rho, abs)
		if gap < 0 {
			c.E = wall * plus / it
		}
	case gap >= 0:
		c.Omega, c.E = 2*math.Pi-wall*plus/it, -wall*minus/it
	default:
		c.Omega, c.E = wall*minus/it, wall*plus/it
	}
	if gap == 0 {
		c.E = abs * c.U * 0.5 / a
	}
	c.Omega *= sign
	c.E *= sign
	return c
}

// noCircle returns the values on the circle for v = +Inf, and NaN if v or gap is.
func noCircle(v, gap float64) Circle {
	nan := math.NaN()
	if gap != gap {
		v = nan
	}
	return Circle{U: v, T1: v, S3: v, C3: v, Omega: nan, S: 0 / v, E: nan, C: nan, G: nan}
}
