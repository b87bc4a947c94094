package closedform

import "math"

// LoopAxisField returns b_z = I a^2/(2 (a^2+z^2)^(3/2)) on the axis of a circular loop of
// radius a with the current I, right-handed about +z. It is at the same time the vector
// potential on the axis of a thin ring in which the flux I circulates.
//
// Units: current over length (times mu0); flux over length for the ring.
// Frame: loop at z = 0.
// Domain: a > 0, all finite. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 2e-15 (worst 6.4e-16 of 5 points, TestReference).
// Source: [Griffiths2013] eq. 5.41.
func LoopAxisField(current, a, z float64) float64 {
	if !finite(current, z) || !positive(a) {
		return math.NaN()
	}
	r := math.Hypot(a, z)
	t := a / r
	return current / 2 * (t * t) / r
}

// SegmentField returns b = I sin(alpha)/(2 pi s), tan(alpha) = L/2s, at the distance s from the
// middle of a straight piece of length L of a circuit with the current I.
//
// Units: current over length (times mu0).
// Frame: the component along current x way from the segment.
// Domain: L and s finite and positive. NaN otherwise.
// Singular: as 1/s at the wire.
// Accuracy: relative error <= 2e-15 (worst 0 of 4 points, TestReference).
// Source: [Griffiths2013] eq. 5.37.
func SegmentField(current, L, s float64) float64 {
	if !finite(current) || !positive(L, s) {
		return math.NaN()
	}
	return current / (2 * math.Pi * s) * (L / 2 / math.Hypot(L/2, s))
}

// CoaxialLoopInductance returns the mutual inductance of two thin coaxial circles of radii
// a and b at the distance d, which is also the flux of one through the other by current:
// sqrt(ab) [(2/k - k) K - (2/k) E], k^2 = 4ab/((a+b)^2 + d^2).
//
// Units: length (times mu0).
// Frame: common axis.
// Domain: a and b finite and positive, d finite. NaN otherwise.
// Singular: as log(1/distance) where the circles coincide; +Inf there.
// Accuracy: relative error <= 5e-15 (worst 4e-16 of 7 points, TestReference).
// Source: [Maxwell1873] vol. 2 art. 701, after one Landen step: with k' the complement of k it
// is 4 a b k^2 D(k1)/(sqrt((a+b)^2+d^2) (1+k')^3), k1' = 2 sqrt(k')/(1+k'), which does not cancel.
func CoaxialLoopInductance(a, b, d float64) float64 {
	if !finite(d) || !positive(a, b) {
		return math.NaN()
	}
	far, near := math.Hypot(a+b, d), math.Hypot(a-b, d)
	if near == 0 {
		return math.Inf(1)
	}
	k := near / far
	m := 4 * (a / far) * (b / far)
	return 4 * a * (b / far) * m * legendreD(2*math.Sqrt(k)/(1+k)) / ((1 + k) * (1 + k) * (1 + k))
}
