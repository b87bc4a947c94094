package closedform

import "math"

// CentralPowerPotential returns phi at the distance r from the centre of a sphere of
// radius a with the radial polarization c r^n: c (r^(n+1) - a^(n+1))/(n+1) inside
// (c log(r/a) for n = -1), 0 outside.
//
// Units: c times length^(n+1).
// Frame: centre at the origin; r is the distance from it.
// Domain: a > 0, r >= 0, n > -2, all finite. NaN otherwise.
// Singular: NaN at r = 0 for n <= -1.
// Accuracy: relative error <= 1e-15 (worst 2.9e-16 of 23 points, TestReference).
// Source: Gauss's law, [Griffiths2013] problems 4.10 (ball, n = 1) and 4.15 (shell, n = -1).
func CentralPowerPotential(c, n, a, r float64) float64 {
	if !finite(c, r) || !positive(a, n+2) || r < 0 {
		return math.NaN()
	}
	return radialPotential(c, n, a, r)
}

// radialPotential integrates g = -c r^n from the surface r = a inwards.
func radialPotential(c, n, a, r float64) float64 {
	if r >= a {
		return 0
	}
	return c * powerDifference(r, a, n+1)
}

// CentralPowerField returns the radial component of g at the distance r from the centre
// of a sphere of radius a with the radial polarization c r^n: -c r^n inside, exactly 0
// outside, -c a^n/2 on the surface.
//
// Units: c times length^n.
// Frame: centre at the origin; outward component.
// Domain: a > 0, r >= 0, n > -2, all finite. NaN otherwise.
// Singular: NaN at r = 0 for n <= 0, where the direction or the value is lost.
// Accuracy: relative error <= 1e-15 (worst 1.9e-16 of 23 points, TestReference).
// Source: [Griffiths2013] problems 4.10 and 4.15: D = 0, so g = -p.
func CentralPowerField(c, n, a, r float64) float64 {
	if !finite(c, r) || !positive(a, n+2) || r < 0 {
		return math.NaN()
	}
	return radialField(c, n, a, r)
}

// radialField is -c r^n inside r = a, half of it on r = a, 0 outside.
func radialField(c, n, a, r float64) float64 {
	switch {
	case r > a:
		return 0
	case r == a:
		return -c * math.Pow(a, n) / 2
	case r == 0 && n <= 0:
		return math.NaN()
	}
	return -c * math.Pow(r, n)
}

// CentralPowerCharge returns the bound charge of a sphere of radius a with the radial
// polarization c r^n: 4 pi c a^(n+2) on the surface, minus the same in the volume.
//
// Units: c times length^(n+2).
// Frame: any.
// Domain: a > 0, n > -2, all finite. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 1e-15 (worst 1.4e-16 of 4 points, TestReference).
// Source: [Griffiths2013] section 4.2, sigma = P.n and rho = -div P.
func CentralPowerCharge(c, n, a float64) (surface, volume float64) {
	if !finite(c) || !positive(a, n+2) {
		return math.NaN(), math.NaN()
	}
	q := fourPi * c * math.Pow(a, n+2)
	return q, -q
}

// CentralPowerDensity returns rho = -(n+2) c r^(n-1) of the radial polarization c r^n.
//
// Units: c times length^(n-1).
// Frame: centre at the origin; r is the distance from it.
// Domain: r > 0, finite c and n. NaN otherwise.
// Singular: for n < 1 the density is unbounded towards the centre.
// Accuracy: relative error <= 1e-15 (worst 0 of 3 points, TestReference).
// Source: divergence in spherical coordinates, [Griffiths2013] section 1.4.
func CentralPowerDensity(c, n, r float64) float64 {
	if !finite(c, n) || !positive(r) {
		return math.NaN()
	}
	return -(n + 2) * c * math.Pow(r, n-1)
}

// RadialPowerPotential returns phi at the distance s from the axis of an endless
// cylinder of radius a with the polarization c s^n away from the axis:
// c (s^(n+1) - a^(n+1))/(n+1) inside (c log(s/a) for n = -1), 0 outside.
//
// Units: c times length^(n+1).
// Frame: axis z; s is the distance from it.
// Domain: a > 0, s >= 0, n > -1, all finite. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 1e-15 (worst 2.9e-16 of 20 points, TestReference).
// Source: Gauss's law as for CentralPowerPotential, [Griffiths2013] section 4.3.
func RadialPowerPotential(c, n, a, s float64) float64 {
	if !finite(c, s) || !positive(a, n+1) || s < 0 {
		return math.NaN()
	}
	return radialPotential(c, n, a, s)
}

// RadialPowerField returns the component of g away from the axis at the distance s from
// the axis of an endless cylinder of radius a with the polarization c s^n away from the
// axis: -c s^n inside, exactly 0 outside, -c a^n/2 on the surface.
//
// Units: c times length^n.
// Frame: axis z; component away from it.
// Domain: a > 0, s >= 0, n > -1, all finite. NaN otherwise.
// Singular: NaN at s = 0 for n <= 0, where the direction or the value is lost.
// Accuracy: relative error <= 1e-15 (worst 1.9e-16 of 20 points, TestReference).
// Source: Gauss's law, [Griffiths2013] section 4.3: D = 0, so g = -p.
func RadialPowerField(c, n, a, s float64) float64 {
	if !finite(c, s) || !positive(a, n+1) || s < 0 {
		return math.NaN()
	}
	return radialField(c, n, a, s)
}

// RadialPowerCharge returns the bound charge of a tube of the given height with the
// polarization c s^n away from the axis: 2 pi h c outer^(n+1) on the outer wall,
// -2 pi h c inner^(n+1) on the inner one, and what makes the sum zero in the volume.
//
// Units: c times length^(n+2).
// Frame: any; the flat ends carry nothing.
// Domain: 0 < inner < outer, height > 0, finite c and n; inner = 0 (solid) for n > -1. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 1e-15 (worst 1e-16 of 5 points, TestReference).
// Source: [Griffiths2013] section 4.2, sigma = P.n and rho = -div P.
func RadialPowerCharge(c, n, inner, outer, height float64) (onOuter, onInner, volume float64) {
	solid := inner == 0 && n > -1
	if !finite(c, n) || !positive(outer, height, outer-inner) || !(inner > 0 || solid) {
		return math.NaN(), math.NaN(), math.NaN()
	}
	k := 2 * math.Pi * height * c
	onOuter = k * math.Pow(outer, n+1)
	if n == -1 {
		return onOuter, -onOuter, 0
	}
	if !solid {
		onInner = -k * math.Pow(inner, n+1)
	}
	return onOuter, onInner, k * (n + 1) * powerDifference(inner, outer, n+1)
}

// RadialPowerDensity returns rho = -(n+1) c s^(n-1) of the polarization c s^n away from
// the z axis.
//
// Units: c times length^(n-1).
// Frame: axis z; s is the distance from it.
// Domain: s > 0, finite c and n. NaN otherwise.
// Singular: for n < 1, n != -1 the density is unbounded towards the axis.
// Accuracy: relative error <= 1e-15 (worst 0 of 3 points, TestReference).
// Source: divergence in cylindrical coordinates, [Griffiths2013] section 1.4.
func RadialPowerDensity(c, n, s float64) float64 {
	if !finite(c, n) || !positive(s) {
		return math.NaN()
	}
	return -(n + 1) * c * math.Pow(s, n-1)
}
