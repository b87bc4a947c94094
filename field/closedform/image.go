package closedform

import "math"

// ImageFactor returns k = (eps-1)/(eps+1): a charge q before the half space of relative
// permittivity (or permeability) eps acts on its own side as if the mirror charge -k q
// stood behind the plane; k = 1 for eps = +Inf.
//
// Units: none.
// Frame: any.
// Domain: eps >= 0, +Inf allowed. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 1e-15 (worst 0 of 7 points, TestReference).
// Source: [Jackson1999] eq. (4.45).
func ImageFactor(eps float64) float64 {
	if !(eps >= 0) {
		return math.NaN()
	}
	return contrast(eps, 1)
}

// ImageTransmission returns 2/(eps+1): inside the half space a charge q outside it acts
// with the field of this multiple of q at its own place.
//
// Units: none (field strength, not displacement).
// Frame: any.
// Domain: eps >= 0, +Inf allowed. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 1e-15 (worst 0 of 3 points, TestReference).
// Source: [Jackson1999] eq. (4.45), q” over eps.
func ImageTransmission(eps float64) float64 {
	if !(eps >= 0) {
		return math.NaN()
	}
	return 2 / (eps + 1)
}

// ImageChargeForce returns the force -k q^2/(16 pi d^2) on a charge q at the distance d
// from a half space with the image factor k; negative attracts.
//
// Units: q squared over length squared (over eps0, or times mu0).
// Frame: positive away from the plane.
// Domain: d > 0, |k| <= 1, all finite. NaN otherwise.
// Singular: 1/d^2 at the plane.
// Accuracy: relative error <= 1e-15 (worst 0 of 2 points, TestReference).
// Source: [Jackson1999] section 2.2; the full pair force at the distance 2d.
func ImageChargeForce(q, k, d float64) float64 {
	if !finite(q) || !positive(d) || !(math.Abs(k) <= 1) {
		return math.NaN()
	}
	return -k * (q / d) * (q / d) / (4 * fourPi)
}

// ImageDipoleForce returns the force -3 k m^2 (1 + cos^2 t)/(64 pi d^4) on a dipole m at
// the distance d from a half space with the image factor k, at the angle t to the
// normal; negative attracts.
//
// Units: m squared over length to the fourth (times mu0, or over eps0).
// Frame: positive away from the plane.
// Domain: d > 0, |k| <= 1, all finite. NaN otherwise.
// Singular: 1/d^4 at the plane.
// Accuracy: relative error <= 1e-15 (worst 2.1e-16 of 5 points, TestReference).
// Source: [Jackson1999] section 2.2 with eq. (4.26); minus the slope of ImageDipoleEnergy.
func ImageDipoleForce(m, k, d, t float64) float64 {
	return 3 * ImageDipoleEnergy(m, k, d, t) / d
}

// ImageDipoleEnergy returns the energy -k m^2 (1 + cos^2 t)/(64 pi d^3) of a dipole m at
// the distance d from a half space with the image factor k, at the angle t to the
// normal; half of the pair energy with the image at 2d.
//
// Units: m squared over length cubed (times mu0, or over eps0).
// Frame: any.
// Domain: d > 0, |k| <= 1, all finite. NaN otherwise.
// Singular: 1/d^3 at the plane.
// Accuracy: relative error <= 1e-15 (worst 2e-16 of 5 points, TestReference).
// Source: [Jackson1999] section 2.2 with eq. (4.26).
func ImageDipoleEnergy(m, k, d, t float64) float64 {
	if !finite(m, t) || !positive(d) || !(math.Abs(k) <= 1) {
		return math.NaN()
	}
	c := math.Cos(t)
	return -k * (m / d) * (m / d) / d * (1 + c*c) / (16 * fourPi)
}
