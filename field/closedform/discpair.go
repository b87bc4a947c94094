package closedform

import "math"

// DiscPairForce returns the repulsion of two equal coaxial discs of radius a with the
// densities sigma1 and sigma2 at the distance d > 0:
// pi a^2 sigma1 sigma2 int_0^inf J1(x)^2 exp(-x d/a) dx/x. The limit d -> 0 is
// pi a^2 sigma1 sigma2/2.
//
// Units: densities squared times length squared (times mu0, or over eps0).
// Frame: common axis; positive pushes apart.
// Domain: a and d finite and positive. NaN otherwise.
// Singular: nowhere for d > 0.
// Accuracy: relative error <= 2e-14 (worst 4.4e-15 of 43 points, TestReference).
// Source: [Eason1955] integral I(1,1;-1), here with one complete elliptic integral.
func DiscPairForce(sigma1, sigma2, a, d float64) float64 {
	if !finite(sigma1, sigma2) || !positive(a, d) {
		return math.NaN()
	}
	return math.Pi / 2 * (sigma1 * a) * (sigma2 * a) * discCoupling(d/a)
}

// discCoupling returns 2 int J1(x)^2 exp(-x h) dx/x = 1 - (4/pi) k' D(k) with
// k^2 = 4/(4+h^2), k' = h/sqrt(4+h^2); beyond h = 3.5 by the equivalent series
// 1 - 2F1(1/2,1/2;2;-4/h^2), which does not cancel.
func discCoupling(h float64) float64 {
	if h > 3.5 {
		return -hyperTail(0.5, 0.5, -4/h/h)
	}
	kc := h / math.Hypot(2, h)
	return 1 - 4/math.Pi*kc*legendreD(kc)
}

// DiscPairEnergy returns the interaction energy int sigma2 phi1 dA of two equal coaxial
// discs of radius a with the densities sigma1 and sigma2 at the distance d > 0:
// pi a^3 sigma1 sigma2 int_0^inf J1(x)^2 exp(-x d/a) dx/x^2. The limit d -> 0 is twice
// the self energy for equal densities.
//
// Units: densities squared times length cubed (times mu0, or over eps0).
// Frame: common axis.
// Domain: a and d finite and positive. NaN otherwise.
// Singular: nowhere for d > 0.
// Accuracy: relative error <= 5e-15 (worst 1.3e-15 of 43 points, TestReference).
// Source: [Eason1955] integral I(1,1;-2), here with complete elliptic integrals.
func DiscPairEnergy(sigma1, sigma2, a, d float64) float64 {
	if !finite(sigma1, sigma2) || !positive(a, d) {
		return math.NaN()
	}
	return math.Pi * (sigma1 * a) * (sigma2 * a) * a * discLink(d/a/2)
}

// discLink returns int J1(x)^2 exp(-2 x c) dx/x^2 =
// (4/3pi) sqrt(1+c^2) (k'^2 D + E) - c with k^2 = 1/(1+c^2); beyond c = 1.6 by the
// equivalent series c (2F1(-1/2,1/2;2;-1/c^2) - 1), which does not cancel.
func discLink(c float64) float64 {
	if c > 1.6 {
		return c * hyperTail(-0.5, 0.5, -1/c/c)
	}
	s := math.Hypot(1, c)
	kc := c / s
	return 4/(3*math.Pi)*s*(kc*kc*legendreD(kc)+legendreE(kc)) - c
}

// CoaxialCylinderForce returns the axial force on the upper of two coaxial cylinders of
// equal radius a, lengths L1 (lower) and L2 (upper), uniformly polarized along +z by p1
// and p2, faces the gap > 0 apart. Negative values attract. A plate of infinite
// permeability at the distance d acts like the mirror twin at gap = 2 d.
//
// Units: p squared times length squared (times mu0, or over eps0).
// Frame: common axis z; positive pushes the upper cylinder up.
// Domain: lengths finite and positive. NaN otherwise.
// Singular: nowhere for gap > 0; the contact limit is finite.
// Accuracy: relative error <= 1e-13 (worst 1.7e-14 of 25 points, TestReference).
// Beyond gap = 10 a the second difference loses about (gap/L)^2 units of rounding.
// Source: [Akoun1984] principle (four pairs of faces) with DiscPairForce for each.
func CoaxialCylinderForce(p1, p2, a, L1, L2, gap float64) float64 {
	if !finite(p1, p2) || !positive(a, L1, L2, gap) {
		return math.NaN()
	}
	near := discCoupling(gap/a) - discCoupling((gap+L1)/a)
	far := discCoupling((gap+L2)/a) - discCoupling((gap+L1+L2)/a)
	return math.Pi / 2 * (p1 * a) * (p2 * a) * (far - near)
}
