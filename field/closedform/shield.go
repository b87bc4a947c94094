package closedform

import "math"

// SphericalShieldRatio returns the field in the cavity of a spherical shell of relative
// permeability mu with the radii a (inner) and b (outer) over the uniform applied field:
// 9 mu/((2mu+1)(mu+2) - 2(mu-1)^2 (a/b)^3). The shielding factor is its reciprocal.
//
// Units: none.
// Frame: along the applied field.
// Domain: 0 < a < b, mu > 0, all finite. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 1e-15 (worst 1.2e-16 of 5 points, TestReference).
// Source: [Jackson1999] eq. (5.121); divisor as 9 mu + 2 (mu-1)^2 (1 - (a/b)^3).
func SphericalShieldRatio(mu, a, b float64) float64 {
	if !positive(mu, a, b, b-a) {
		return math.NaN()
	}
	return 9 * mu / (9*mu + 2*(mu-1)*(mu-1)*hollowFraction(a, b, b))
}

// SphericalShieldMoment returns the dipole moment of a spherical shell of relative
// permeability mu with the radii a (inner) and b (outer) over the uniform applied field
// and the volume 4 pi b^3/3 of the full ball.
//
// Units: none.
// Frame: along the applied field.
// Domain: 0 < a < b, mu > 0, all finite. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 1e-15 (worst 2.6e-16 of 5 points, TestReference).
// Source: [Jackson1999] eq. (5.121), 3 (2mu+1)(mu-1)(1 - (a/b)^3) over the same divisor.
func SphericalShieldMoment(mu, a, b float64) float64 {
	if !positive(mu, a, b, b-a) {
		return math.NaN()
	}
	w := hollowFraction(a, b, b)
	return 3 * (2*mu + 1) * (mu - 1) * w / (9*mu + 2*(mu-1)*(mu-1)*w)
}

// CylindricalShieldRatio returns the field in the bore of an endless tube of relative
// permeability mu with the radii a (inner) and b (outer) over the uniform field applied
// across it: 4 mu/((mu+1)^2 - (mu-1)^2 (a/b)^2).
//
// Units: none.
// Frame: along the applied field, across the axis.
// Domain: 0 < a < b, mu > 0, all finite. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 1e-15 (worst 1.7e-16 of 5 points, TestReference).
// Source: [Jackson1999] problem 5.14; divisor as 4 mu + (mu-1)^2 (1 - (a/b)^2).
func CylindricalShieldRatio(mu, a, b float64) float64 {
	if !positive(mu, a, b, b-a) {
		return math.NaN()
	}
	w := (b - a) / b * (1 + a/b)
	return 4 * mu / (4*mu + (mu-1)*(mu-1)*w)
}
