package closedform

import "math"

// ChargedShellPotential returns phi at the distance r from the centre of a spherical
// surface of radius a with density sigma: sigma a^2/max(r, a).
//
// Units: sigma times length.
// Frame: centre at the origin; r is the distance from it.
// Domain: a > 0, r >= 0, all finite. NaN otherwise.
// Singular: nowhere; continuous.
// Accuracy: relative error <= 1e-15 (worst 1.7e-16 of 6 points, TestReference).
// Source: [Griffiths2013] example 2.7 (Newton's shell theorem).
func ChargedShellPotential(sigma, a, r float64) float64 {
	if !finite(sigma, r) || !positive(a) || r < 0 {
		return math.NaN()
	}
	return sigma * a * (a / math.Max(r, a))
}

// ChargedShellField returns the radial component of g at the distance r from the centre
// of a spherical surface of radius a with density sigma: 0 inside, sigma (a/r)^2
// outside, sigma/2 on the surface.
//
// Units: those of sigma.
// Frame: centre at the origin; outward component.
// Domain: a > 0, r >= 0, all finite. NaN otherwise.
// Singular: jumps by sigma across the surface.
// Accuracy: relative error <= 1e-15 (worst 0 of 3 points, TestReference).
// Source: [Griffiths2013] example 2.7.
func ChargedShellField(sigma, a, r float64) float64 {
	switch {
	case !finite(sigma, r) || !positive(a) || r < 0:
		return math.NaN()
	case r < a:
		return 0
	case r == a:
		return sigma / 2
	}
	return sigma * (a / r) * (a / r)
}

// ChargedSpherePotential returns phi at the distance r from the centre of a ball of
// radius a with density rho: rho (a^2/2 - r^2/6) inside, rho a^3/(3 r) outside.
//
// Units: rho times length squared.
// Frame: centre at the origin; r is the distance from it.
// Domain: a > 0, r >= 0, all finite. NaN otherwise.
// Singular: nowhere; continuous with its derivative.
// Accuracy: relative error <= 1e-15 (worst 1.7e-16 of 6 points, TestReference).
// Source: [Griffiths2013] problem 2.21.
func ChargedSpherePotential(rho, a, r float64) float64 {
	if !finite(rho, r) || !positive(a) || r < 0 {
		return math.NaN()
	}
	if r <= a {
		return rho * (3*a*a - r*r) / 6
	}
	return rho * a * a / 3 * (a / r)
}

// ChargedSphereField returns the radial component of g at the distance r from the
// centre of a ball of radius a with density rho: rho r/3 inside, rho a^3/(3 r^2) outside.
//
// Units: rho times length.
// Frame: centre at the origin; outward component.
// Domain: a > 0, r >= 0, all finite. NaN otherwise.
// Singular: nowhere; continuous.
// Accuracy: relative error <= 1e-15 (worst 1.7e-16 of 6 points, TestReference).
// Source: [Griffiths2013] example 2.3 and problem 2.12.
func ChargedSphereField(rho, a, r float64) float64 {
	if !finite(rho, r) || !positive(a) || r < 0 {
		return math.NaN()
	}
	if r <= a {
		return rho * r / 3
	}
	return rho * a / 3 * (a / r) * (a / r)
}
