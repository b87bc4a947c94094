package closedform

import "math"

// HalbachField returns the uniform cross field p log(outer/inner) in the bore of an
// endless tube of constant magnitude p whose direction turns twice as fast as the polar
// angle.
//
// Units: those of p.
// Frame: axis z; along the polarization at polar angle 0.
// Domain: 0 < inner < outer, all finite. NaN otherwise.
// Singular: grows without bound as inner goes to 0.
// Accuracy: relative error <= 1e-15 (worst 0 of 2 points, TestReference).
// Source: [Halbach1980].
func HalbachField(p, inner, outer float64) float64 {
	if !finite(p) || !positive(inner, outer, outer-inner) {
		return math.NaN()
	}
	return p * powerDifference(outer, inner, 0)
}

// HalbachCentreField returns the cross field at the centre of the same tube of length L.
//
// Units: those of p.
// Frame: axis z, centre at the origin; along the polarization at polar angle 0.
// Domain: 0 < inner < outer, L > 0, all finite. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 2e-15 (worst 3.7e-16 of 4 points, TestReference).
// Source: [Own] dipole volume integral (3p/4) int s^3 (s^2+z^2)^(-5/2) ds dz:
// p [log(outer/inner) + (h/2)(1/si - 1/so) - log((h+so)/(h+si))], h = L/2, s = sqrt(h^2 + radius^2);
// for short tubes the logarithms are asinh(h/inner) - asinh(h/outer).
func HalbachCentreField(p, inner, outer, L float64) float64 {
	if !finite(p) || !positive(inner, outer, outer-inner, L) {
		return math.NaN()
	}
	h := L / 2
	si, so := math.Hypot(h, inner), math.Hypot(h, outer)
	end := h / 2 * ((outer - inner) / si) * ((outer + inner) / so) / (si + so)
	if h < inner {
		return p * (math.Asinh(h/inner) - math.Asinh(h/outer) + end)
	}
	cut := math.Log1p((outer - inner) * ((outer + inner) / (so + si)) / (h + si))
	return p * (powerDifference(outer, inner, 0) - cut + end)
}

// HalbachSegmentFactor returns sin(2 pi/n)/(2 pi/n), by which n equal annular sectors of
// uniform polarization weaken the bore field of the ideal tube.
//
// Units: none.
// Frame: any.
// Domain: n >= 3. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 2e-15 (worst 4e-16 of 5 points, TestReference).
// Source: [Halbach1980].
func HalbachSegmentFactor(n int) float64 {
	if n < 3 {
		return math.NaN()
	}
	t := 2 * math.Pi / float64(n)
	return math.Sin(t) / t
}

// HalbachQuadrupoleGradient returns the field gradient 2 p (1/inner - 1/outer) in the bore
// of an endless tube of constant magnitude p whose direction turns three times as fast as
// the polar angle.
//
// Units: p over length.
// Frame: axis z.
// Domain: 0 < inner < outer, all finite. NaN otherwise.
// Singular: grows without bound as inner goes to 0.
// Accuracy: relative error <= 1e-15 (worst 0 of 2 points, TestReference).
// Source: [Halbach1980].
func HalbachQuadrupoleGradient(p, inner, outer float64) float64 {
	if !finite(p) || !positive(inner, outer, outer-inner) {
		return math.NaN()
	}
	return 2 * p * ((outer - inner) / inner) / outer
}

// HalbachArrayField returns the magnitude p (1 - exp(-k t)) exp(-k z), k = 2 pi/period, of
// the field at the height z over the strong side of an endless flat array of thickness t
// whose polarization of constant magnitude p turns once per period.
//
// Units: those of p.
// Frame: height above the strong face.
// Domain: period, t > 0, z >= 0, all finite. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 1e-15 (worst 1.9e-16 of 3 points, TestReference).
// Source: [Halbach1980]; for m blocks per period the fundamental has the factor
// sin(pi/m)/(pi/m).
func HalbachArrayField(p, period, t, z float64) float64 {
	if !finite(p, z) || !positive(period, t) || z < 0 {
		return math.NaN()
	}
	k := 2 * math.Pi / period
	return -p * math.Expm1(-k*t) * math.Exp(-k*z)
}
