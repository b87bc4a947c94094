package closedform

import "math"

// CylinderAxisPotential returns phi on the axis of a cylinder of radius a and length L,
// uniformly polarized along its axis by p, at the height z.
//
// Units: p times length.
// Frame: centre at the origin, axis z.
// Domain: a, L > 0, all finite. NaN otherwise.
// Singular: nowhere; kinks at the faces.
// Accuracy: relative error <= 2e-15 (worst 5.6e-16 of 22 points, TestReference).
// Source: [Jackson1999] problem 5.19, two charged discs; the difference is
// rationalized so that nothing cancels far away.
func CylinderAxisPotential(p, a, L, z float64) float64 {
	if !finite(p, z) || !positive(a, L) {
		return math.NaN()
	}
	return p / 2 * overhangDifference(a, L, z)
}

// overhangDifference returns o(z - L/2) - o(z + L/2), o(u) = sqrt(u^2 + a^2) - |u|.
// Beyond a face the two moduli differ by exactly L; with o = a^2/(s + |u|) the
// difference is L (1 + (|u0| + |u1|)/(s0 + s1)) a^2/((s0 + |u0|)(s1 + |u1|)). [Own]
func overhangDifference(a, L, z float64) float64 {
	m := math.Abs(z)
	lo, hi := math.Abs(m-L/2), m+L/2
	s0, s1 := math.Hypot(a, lo), math.Hypot(a, hi)
	gap := math.Min(2*m, L) // |u1| - |u0|
	return sign(z) * gap * (1 + (lo+hi)/(s0+s1)) * (a / (s0 + lo)) * (a / (s1 + hi))
}

// CylinderAxisField returns g_z on the axis of a cylinder of radius a and length L,
// uniformly polarized along its axis by p, at the height z; on a face the mean of both sides.
//
// Units: those of p.
// Frame: centre at the origin, axis z.
// Domain: a, L > 0, all finite. NaN otherwise.
// Singular: jumps by p at the faces.
// Accuracy: relative error <= 2e-15 (worst 4.2e-16 of 22 points, TestReference).
// Source: [Jackson1999] problem 5.19; inside the sum of two terms of one sign, outside
// the form of CylinderAxisInduction.
func CylinderAxisField(p, a, L, z float64) float64 {
	if !finite(p, z) || !positive(a, L) {
		return math.NaN()
	}
	m := math.Abs(z)
	if m > L/2 {
		return CylinderAxisInduction(p, a, L, z)
	}
	return DiscAxisField(p, a, m-L/2) - DiscAxisField(p, a, m+L/2)
}

// CylinderAxisInduction returns g_z + p_z on the axis of a cylinder of radius a and
// length L, uniformly polarized along its axis by p, at the height z; p_z counts inside
// only. Times mu0 this is B. With u = z +- L/2: (p/2)(u+/sqrt(u+^2 + a^2) - u-/sqrt(u-^2 + a^2)).
//
// Units: those of p.
// Frame: centre at the origin, axis z.
// Domain: a, L > 0, all finite. NaN otherwise.
// Singular: nowhere on the axis.
// Accuracy: relative error <= 2e-15 (worst 4.2e-16 of 22 points, TestReference).
// Source: [Jackson1999] problem 5.3 (solenoid) and 5.19; beyond the faces the difference is
// rationalized to a^2 (u+^2 - u-^2) over positive terms.
func CylinderAxisInduction(p, a, L, z float64) float64 {
	if !finite(p, z) || !positive(a, L) {
		return math.NaN()
	}
	m := math.Abs(z)
	lo, hi := m-L/2, m+L/2
	s0, s1 := math.Hypot(a, lo), math.Hypot(a, hi)
	if lo <= 0 {
		return p / 2 * (hi/s1 - lo/s0)
	}
	return p * (a / s0) * (a / s1) * (L * m / (hi*s0 + lo*s1))
}

// TwoDiscAxisField returns g_z on the axis of the two discs that a cylinder of radius a
// and length L with the axial polarization p amounts to: sigma = +p at z = L/2 and -p at
// z = -L/2. It is CylinderAxisField by plain addition.
//
// Units: those of p.
// Frame: centre at the origin, axis z.
// Domain: a, L > 0, all finite. NaN otherwise.
// Singular: jumps by p at the discs.
// Accuracy: relative error <= 1e-14 (worst 1.9e-15 of 16 points, TestReference).
// Far away the two terms cancel: the error grows as |z|/L units of rounding.
// Source: [Griffiths2013] problem 2.6, twice.
func TwoDiscAxisField(p, a, L, z float64) float64 {
	if !positive(L) {
		return math.NaN()
	}
	return DiscAxisField(p, a, z-L/2) - DiscAxisField(p, a, z+L/2)
}

// ChargedCylinderAxisField returns g_z on the axis of a cylinder of radius a and length
// L with the volume density rho, at the height z.
//
// Units: rho times length.
// Frame: centre at the origin, axis z.
// Domain: a, L > 0, all finite. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 2e-15 (worst 5.6e-16 of 22 points, TestReference).
// Source: [Griffiths2013] problem 2.27 (potential of the same body), differentiated; the
// same difference as in CylinderAxisPotential.
func ChargedCylinderAxisField(rho, a, L, z float64) float64 {
	return CylinderAxisPotential(rho, a, L, z)
}

// LinearCylinderAxisField returns g_z on the axis of a cylinder of radius a and length L
// with the axial polarization p_z = c z: end discs of density c L/2 and the volume
// density -c.
//
// Units: c times length.
// Frame: centre at the origin, axis z.
// Domain: a, L > 0, all finite. NaN otherwise.
// Singular: jumps by c L/2 at the faces.
// Accuracy: relative error <= 2e-12 (worst 3.6e-13 of 16 points, TestReference).
// The body has no dipole moment: far away the error grows as (z/L)^2 units of rounding.
// Source: [Griffiths2013] section 4.2, bound charge; sum of the two exact parts.
func LinearCylinderAxisField(c, a, L, z float64) float64 {
	if !finite(c) || !positive(L) {
		return math.NaN()
	}
	sigma := c * L / 2
	ends := DiscAxisField(sigma, a, z-L/2) + DiscAxisField(sigma, a, z+L/2)
	return ends + ChargedCylinderAxisField(-c, a, L, z)
}

// FaceCentreInduction returns g_z + p_z = (p/2) L/sqrt(L^2 + a^2) at the centre of the
// end face of a cylinder of radius a and length L, uniformly polarized along its axis by
// p; p/2 for a long rod. With p = Br it is the flux density there.
//
// Units: those of p.
// Frame: axis z.
// Domain: a, L > 0, all finite. NaN otherwise.
// Singular: nowhere: the normal component of g + p is continuous.
// Accuracy: relative error <= 1e-15 (worst 1.1e-16 of 3 points, TestReference).
// Source: [Jackson1999] problem 5.19 at the face.
func FaceCentreInduction(p, a, L float64) float64 {
	if !finite(p) || !positive(a, L) {
		return math.NaN()
	}
	return p / 2 * (L / math.Hypot(a, L))
}
