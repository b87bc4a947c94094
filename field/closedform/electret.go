package closedform

import "math"

// ElectretPotential returns the surface potential sigma d/eps of a film of thickness d and
// relative permittivity eps with the trapped surface density sigma on a grounded back
// electrode, nothing above.
//
// Units: sigma times length (over eps0: volt).
// Frame: surface against electrode.
// Domain: d, eps > 0, all finite. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 1e-15 (worst 0 of 2 points, TestReference).
// Source: [Sessler1987] (parallel-plate electret).
func ElectretPotential(sigma, d, eps float64) float64 {
	if !finite(sigma) || !positive(d, eps) {
		return math.NaN()
	}
	return sigma * d / eps
}

// ElectretGapField returns the field sigma d/(d + eps gap) in the air gap between the
// surface of such a film and a second electrode joined to the first.
//
// Units: those of sigma (over eps0: volt per metre); also the charge density induced on
// the second electrode, with the sign reversed.
// Frame: from the film to the second electrode.
// Domain: d, eps, gap > 0, all finite. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 1e-15 (worst 0 of 2 points, TestReference).
// Source: [Sessler1987] (parallel-plate electret).
func ElectretGapField(sigma, d, eps, gap float64) float64 {
	if !finite(sigma) || !positive(d, eps, gap) {
		return math.NaN()
	}
	return sigma * (d / (d + eps*gap))
}
