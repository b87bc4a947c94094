package closedform

import "math"

// TubeAxisPotential returns phi on the axis of a tube with the radii inner and outer and
// the length L, uniformly polarized along its axis by p, at the height z.
//
// Units: p times length.
// Frame: centre at the origin, axis z.
// Domain: 0 < inner < outer, L > 0, all finite. NaN otherwise.
// Singular: nowhere on the axis.
// Accuracy: relative error <= 1e-14 (worst 2.1e-15 of 10 points, TestReference).
// Far away the two ends cancel: the error grows as |z|/L units of rounding.
// Source: [Griffiths2013] problem 2.25, two annuli.
func TubeAxisPotential(p, inner, outer, L, z float64) float64 {
	if !positive(L) {
		return math.NaN()
	}
	return AnnulusAxisPotential(p, inner, outer, z-L/2) - AnnulusAxisPotential(p, inner, outer, z+L/2)
}

// TubeAxisField returns g_z on the axis of a tube with the radii inner and outer and the
// length L, uniformly polarized along its axis by p, at the height z. The axis is outside
// the material, so times mu0 this is also B.
//
// Units: those of p.
// Frame: centre at the origin, axis z.
// Domain: 0 < inner < outer, L > 0, all finite. NaN otherwise.
// Singular: nowhere on the axis. Near its zeros the bound refers to the larger of the two ends.
// Accuracy: relative error <= 5e-15 (worst 1.4e-15 of 12 points, TestReference).
// Far away the two ends cancel: the error grows as |z|/L units of rounding.
// Source: [Griffiths2013] problem 2.6, two annuli.
func TubeAxisField(p, inner, outer, L, z float64) float64 {
	if !positive(L) {
		return math.NaN()
	}
	return AnnulusAxisField(p, inner, outer, z-L/2) - AnnulusAxisField(p, inner, outer, z+L/2)
}

// RadialTubeAxisField returns g_z on the axis of a tube with the radii inner and outer
// and the length L, polarized away from the axis with the constant magnitude p, at the
// height z. The volume charge -p/s counts; without it the result is wrong by a factor.
// With f(u) = outer/sqrt(outer^2 + u^2) - inner/sqrt(inner^2 + u^2) - asinh(outer/|u|) +
// asinh(inner/|u|) it is (p/2)[f(z - L/2) - f(z + L/2)].
//
// Units: those of p.
// Frame: centre at the origin, axis z.
// Domain: 0 < inner < outer, L > 0, all finite. NaN otherwise.
// Singular: nowhere on the axis; odd in z.
// Accuracy: relative error <= 1e-13 (worst 3.3e-14 of 21 points, TestReference).
// Source: [Own] bands of sigma = +-p and discs of rho = -p/s integrated along z; f grouped
// as a difference of asinh(t) - t/sqrt(1+t^2) so that it does not cancel far away.
func RadialTubeAxisField(p, inner, outer, L, z float64) float64 {
	if !finite(p, z) || !positive(inner, outer, outer-inner, L) {
		return math.NaN()
	}
	return p / 2 * (radialEnd(inner, outer, z+L/2) - radialEnd(inner, outer, z-L/2))
}

// radialEnd returns -f(u) = e(outer) - e(inner), e(a) = asinh(a/|u|) - a/sqrt(a^2 + u^2);
// near u = 0 the two logarithms are merged.
func radialEnd(inner, outer, u float64) float64 {
	if math.Abs(u) > inner {
		return asinhExcess(outer, u) - asinhExcess(inner, u)
	}
	si, so := math.Hypot(inner, u), math.Hypot(outer, u)
	width := outer - inner
	ds := width * ((outer + inner) / (so + si))
	return math.Log1p((width+ds)/(inner+si)) - (outer/so - inner/si)
}
