package closedform

import "math"

// CylinderCentreFactor returns the axial demagnetizing factor -g_z/p at the centre of a
// uniformly polarized cylinder of radius a and length L: 1 - L/sqrt(L^2 + 4 a^2).
//
// Units: none.
// Frame: polarization along the axis.
// Domain: a, L > 0. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 2e-15 (worst 3.5e-16 of 66 points, TestReference).
// Source: [Jackson1999] problem 5.19 at the centre; written as 4 a^2/(s (s + L)).
func CylinderCentreFactor(a, L float64) float64 {
	if !positive(a, L) {
		return math.NaN()
	}
	s := math.Hypot(L, 2*a)
	return (2 * a / s) * (2 * a / (s + L))
}

// CylinderMagnetometricFactor returns the axial demagnetizing factor of a uniformly
// polarized cylinder (chi = 0) of radius a and length L, the mean of -g_z/p over its
// volume: 1 - (4/(3 pi k')) [ (k'^2/k^2)(K - E) + E - k ], k^2 = 1/(1 + c^2), c = L/(2 a).
//
// Units: none.
// Frame: polarization along the axis.
// Domain: a, L > 0. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 5e-15 (worst 1.5e-15 of 66 points, TestReference).
// Source: one minus the coefficient of [Nagaoka1909]; values in [Chen1991]; series of
// [Lundin1985] for long ones; for c >= 1 by the energy of the two end discs,
// (4/(3 pi) - int J1^2 exp(-2cx) dx/x^2)/c.
func CylinderMagnetometricFactor(a, L float64) float64 {
	if !positive(a, L) {
		return math.NaN()
	}
	c := L / 2 / a
	if c < 1 {
		return 1 - nagaoka(c)
	}
	return (4/(3*math.Pi) - discLink(c)) / c
}

// nagaoka returns the end correction of a solenoid with length/diameter c < 1, as a sum
// of positive terms: (4/(3 pi)) k' [ D + (E - 1)/k'^2 + 1/(1 + k) ].
func nagaoka(c float64) float64 {
	s := math.Hypot(1, c)
	kc := c / s
	return 4 / (3 * math.Pi) * kc * (legendreD(kc) + legendreEExcess(kc) + 1/(1+1/s))
}

// CylinderTransverseFactor returns the transverse magnetometric demagnetizing factor
// (chi = 0) of a cylinder of radius a and length L: half of what the axial one leaves of 1.
//
// Units: none.
// Frame: polarization across the axis.
// Domain: a, L > 0. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 5e-15 (worst 8.3e-16 of 66 points, TestReference).
// Source: trace of the tensor, with CylinderMagnetometricFactor; [Nagaoka1909] for flat ones.
func CylinderTransverseFactor(a, L float64) float64 {
	if !positive(a, L) {
		return math.NaN()
	}
	if c := L / 2 / a; c < 1 {
		return nagaoka(c) / 2
	}
	return (1 - CylinderMagnetometricFactor(a, L)) / 2
}

// CylinderFluxmetricFactor returns the axial ballistic demagnetizing factor of a
// uniformly polarized cylinder (chi = 0) of radius a and length L, the mean of -g_z/p
// over the middle plane: 2 int_0^inf J1(x)^2 exp(-x L/(2a)) dx/x.
//
// Units: none.
// Frame: polarization along the axis.
// Domain: a, L > 0. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 1e-14 (worst 2.8e-15 of 66 points, TestReference).
// Source: [Joseph1966]; the flux of a charged disc through an equal one is the force of
// DiscPairForce over sigma, at the distance L/2.
func CylinderFluxmetricFactor(a, L float64) float64 {
	if !positive(a, L) {
		return math.NaN()
	}
	return discCoupling(L / 2 / a)
}
