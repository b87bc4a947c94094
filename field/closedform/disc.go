package closedform

import "math"

// RingAxisPotential returns phi on the axis of a ring of radius a with the line density
// lambda, at the height z: lambda a/(2 sqrt(a^2 + z^2)).
//
// Units: those of lambda.
// Frame: ring in the plane z = 0, axis z.
// Domain: a > 0, all finite. NaN otherwise.
// Singular: nowhere on the axis.
// Accuracy: relative error <= 1e-15 (worst 1.9e-16 of 10 points, TestReference).
// Source: [Griffiths2013] problem 2.5, integrated: all charge at one distance.
func RingAxisPotential(lambda, a, z float64) float64 {
	if !finite(lambda, z) || !positive(a) {
		return math.NaN()
	}
	return lambda / 2 * (a / math.Hypot(a, z))
}

// RingAxisField returns g_z on the axis of a ring of radius a with the line density
// lambda, at the height z: lambda a z/(2 (a^2 + z^2)^(3/2)).
//
// Units: lambda over length.
// Frame: ring in the plane z = 0, axis z.
// Domain: a > 0, all finite. NaN otherwise.
// Singular: nowhere on the axis.
// Accuracy: relative error <= 2e-15 (worst 3.7e-16 of 9 points, TestReference).
// Source: [Griffiths2013] problem 2.5.
func RingAxisField(lambda, a, z float64) float64 {
	if !finite(lambda, z) || !positive(a) {
		return math.NaN()
	}
	r := math.Hypot(a, z)
	return lambda / 2 * (a / r) * (z / r) / r
}

// DiscAxisPotential returns phi on the axis of a disc of radius a with the density
// sigma, at the height z: (sigma/2)(sqrt(z^2 + a^2) - |z|).
//
// Units: sigma times length.
// Frame: disc in the plane z = 0, axis z.
// Domain: a > 0, all finite. NaN otherwise.
// Singular: nowhere; a kink at z = 0.
// Accuracy: relative error <= 1e-15 (worst 1.7e-16 of 9 points, TestReference).
// Source: [Griffiths2013] problem 2.25; the difference written as a^2 over the sum.
func DiscAxisPotential(sigma, a, z float64) float64 {
	if !finite(sigma, z) || !positive(a) {
		return math.NaN()
	}
	return sigma / 2 * overhang(a, z)
}

// overhang returns sqrt(z^2 + a^2) - |z| without cancellation.
func overhang(a, z float64) float64 {
	return a * (a / (math.Hypot(a, z) + math.Abs(z)))
}

// DiscAxisField returns g_z on the axis of a disc of radius a with the density sigma,
// at the height z: (sigma/2)(sgn z - z/sqrt(z^2 + a^2)), 0 on the disc (mean of both sides).
//
// Units: those of sigma.
// Frame: disc in the plane z = 0, axis z.
// Domain: a > 0, all finite. NaN otherwise.
// Singular: jumps by sigma at z = 0.
// Accuracy: relative error <= 1e-15 (worst 3.1e-16 of 7 points, TestReference).
// Source: [Griffiths2013] problem 2.6; the difference written as in DiscAxisPotential.
func DiscAxisField(sigma, a, z float64) float64 {
	if !finite(sigma, z) || !positive(a) {
		return math.NaN()
	}
	return sigma / 2 * sign(z) * (overhang(a, z) / math.Hypot(a, z))
}

// AnnulusAxisPotential returns phi on the axis of an annulus with the radii inner and
// outer and the density sigma, at the height z.
//
// Units: sigma times length.
// Frame: annulus in the plane z = 0, axis z.
// Domain: 0 < inner < outer, all finite. NaN otherwise.
// Singular: nowhere on the axis.
// Accuracy: relative error <= 1e-15 (worst 2.1e-16 of 18 points, TestReference).
// Source: [Griffiths2013] problem 2.25, difference of two discs, factored by
// (outer - inner)(outer + inner).
func AnnulusAxisPotential(sigma, inner, outer, z float64) float64 {
	if !finite(sigma, z) || !positive(inner, outer, outer-inner) {
		return math.NaN()
	}
	si, so := math.Hypot(inner, z), math.Hypot(outer, z)
	return sigma / 2 * (outer - inner) * ((outer + inner) / (so + si))
}

// AnnulusAxisField returns g_z on the axis of an annulus with the radii inner and outer
// and the density sigma, at the height z: (sigma z/2)(1/sqrt(z^2 + inner^2) -
// 1/sqrt(z^2 + outer^2)).
//
// Units: those of sigma.
// Frame: annulus in the plane z = 0, axis z.
// Domain: 0 < inner < outer, all finite. NaN otherwise.
// Singular: nowhere on the axis.
// Accuracy: relative error <= 2e-15 (worst 4.4e-16 of 18 points, TestReference).
// Source: [Griffiths2013] problem 2.6, difference of two discs, factored by
// (outer - inner)(outer + inner).
func AnnulusAxisField(sigma, inner, outer, z float64) float64 {
	if !finite(sigma, z) || !positive(inner, outer, outer-inner) {
		return math.NaN()
	}
	si, so := math.Hypot(inner, z), math.Hypot(outer, z)
	return sigma / 2 * (z / so) * ((outer - inner) / si) * ((outer + inner) / (so + si))
}

// DiscRimPotential returns phi = sigma a/pi at the rim of a disc of radius a with the
// density sigma.
//
// Units: sigma times length.
// Frame: any point of the rim.
// Domain: a > 0, all finite. NaN otherwise.
// Singular: the value is finite; the field at the rim is not.
// Accuracy: relative error <= 1e-15 (worst 1.9e-16 of 3 points, TestReference).
// Source: [Own] polar coordinates about the rim point, (sigma/4pi) int 2 a cos(t) dt over half a turn.
func DiscRimPotential(sigma, a float64) float64 {
	if !finite(sigma) || !positive(a) {
		return math.NaN()
	}
	return sigma * a / math.Pi
}

// DiscSelfEnergy returns (1/2) int sigma phi dA = (2/3) sigma^2 a^3 of a disc of radius
// a with the density sigma.
//
// Units: sigma squared times length cubed (times mu0, or over eps0).
// Frame: any.
// Domain: a > 0, all finite. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 1e-15 (worst 0 of 3 points, TestReference).
// Source: [Own] rings brought to the rim: int_0^a (sigma s/pi) 2 pi s sigma ds.
func DiscSelfEnergy(sigma, a float64) float64 {
	if !finite(sigma) || !positive(a) {
		return math.NaN()
	}
	return 2.0 / 3 * (sigma * a) * (sigma * a) * a
}
