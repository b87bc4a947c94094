package closedform

import "math"

// PermeanceCoefficient returns (1-N)/N, the ratio of induction to reversed field on the
// load line of a body with the demagnetizing factor N.
//
// Units: none.
// Frame: along the polarization.
// Domain: 0 < N <= 1. NaN otherwise.
// Singular: grows without bound as N goes to 0.
// Accuracy: relative error <= 1e-15 (worst 0 of 5 points, TestReference).
// Source: g = -N p and b = (1-N) p, [Own].
func PermeanceCoefficient(n float64) float64 {
	if !(n > 0 && n <= 1) {
		return math.NaN()
	}
	return (1 - n) / n
}

// OperatingPoint returns the induction b = p (1-N)/(1 - N + mur N) and the field
// h = -p N/(1 - N + mur N) at which the load line of the demagnetizing factor N meets the
// recoil line b = p + mur h.
//
// Units: both as p; with p = Br/mu0, b is B/mu0 and h is H.
// Frame: components along p.
// Domain: 0 <= N <= 1, mur > 0, all finite. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 1e-15 (worst 0 of 4 points, TestReference).
// Source: crossing of the two straight lines, [Own]; with Pc = (1-N)/N these are
// p Pc/(Pc + mur) and -p/(Pc + mur).
func OperatingPoint(p, n, mur float64) (b, h float64) {
	if !finite(p) || !positive(mur) || !(n >= 0 && n <= 1) {
		return math.NaN(), math.NaN()
	}
	d := 1 - n + mur*n
	return p * (1 - n) / d, -p * n / d
}
