package closedform

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// DipolePotential returns phi = m.x/(4 pi r^3) of the point dipole m at the origin.
//
// Units: m over length squared.
// Frame: dipole at the origin; m and x in the same frame.
// Domain: finite m and x. NaN otherwise.
// Singular: NaN at the dipole.
// Accuracy: relative error <= 2e-15 (worst 5.9e-16 of 14 points, TestReference).
// Source: [Jackson1999] eq. (4.10), dipole term.
func DipolePotential(m, x r3.Vec) float64 {
	r := norm(x)
	if !finiteVec(m) || !positive(r) {
		return math.NaN()
	}
	return r3.Dot(m, r3.Scale(1/r, x)) / fourPi / r / r
}

// DipoleField returns g = (3 (m.u) u - m)/(4 pi r^3), u = x/r, of the point dipole m
// at the origin.
//
// Units: m over length cubed.
// Frame: dipole at the origin; m, x and the result in the same frame.
// Domain: finite m and x. NaN otherwise.
// Singular: NaN at the dipole; the contact term -m/3 delta(x) is left out.
// Accuracy: relative error <= 5e-15 (worst 8.1e-16 of 14 points, TestReference).
// Source: [Jackson1999] eq. (4.13).
func DipoleField(m, x r3.Vec) r3.Vec {
	r := norm(x)
	if !finiteVec(m) || !positive(r) {
		return nanVec()
	}
	u := r3.Scale(1/r, x)
	return r3.Scale(1/fourPi/r/r/r, r3.Sub(r3.Scale(3*r3.Dot(m, u), u), m))
}

// DipoleGradient returns dg_i/dx_j = 3/(4 pi r^4) [ (m.u)(delta_ij - 5 u_i u_j) +
// m_i u_j + u_i m_j ], u = x/r, of the point dipole m at the origin; row i belongs to
// component i of g.
//
// Units: m over length to the fourth.
// Frame: dipole at the origin; m, x and the result in the same frame.
// Domain: finite m and x. NaN otherwise.
// Singular: NaN at the dipole.
// Accuracy: relative error <= 5e-15 (worst 9.1e-16 of 14 points, TestReference).
// Source: derivative of [Jackson1999] eq. (4.13); symmetric, trace 0.
func DipoleGradient(m, x r3.Vec) [3][3]float64 {
	r := norm(x)
	if !finiteVec(m) || !positive(r) {
		return nanTensor()
	}
	u := r3.Scale(1/r, x)
	c := 3 / fourPi / r / r / r / r
	mu := r3.Dot(m, u)
	w := r3.Sub(r3.Scale(2, m), r3.Scale(5*mu, u)) // w u^T symmetrized: -5 (m.u) u u^T + m u^T + u m^T
	return tensor(c*mu, c, w, u)
}

// DipoleForce returns the force on the point dipole m2 at x by the point dipole m1 at
// the origin, F_i = m2_j dg_i/dx_j.
//
// Units: product of the moments over length to the fourth (times mu0, or over eps0).
// Frame: m1 at the origin, m2 at x; all vectors in the same frame.
// Domain: finite m1, m2 and x. NaN otherwise.
// Singular: NaN at x = 0.
// Accuracy: relative error <= 5e-15 (worst 1.1e-15 of 11 points, TestReference).
// Source: [Jackson1999] section 5.7, F = grad (m.B) for a fixed m.
func DipoleForce(m1, m2, x r3.Vec) r3.Vec {
	if !finiteVec(m2) {
		return nanVec()
	}
	t := DipoleGradient(m1, x)
	row := func(i int) float64 { return t[i][0]*m2.X + t[i][1]*m2.Y + t[i][2]*m2.Z }
	return r3.Vec{X: row(0), Y: row(1), Z: row(2)}
}

// DipoleEnergy returns the interaction energy -m2.g1(x) of the point dipoles m1 at the
// origin and m2 at x; the force on m2 is minus its gradient.
//
// Units: product of the moments over length cubed (times mu0, or over eps0).
// Frame: m1 at the origin, m2 at x; all vectors in the same frame.
// Domain: finite m1, m2 and x. NaN otherwise.
// Singular: NaN at x = 0. The zero at the magic angle is met to rounding of the terms only.
// Accuracy: relative error <= 5e-15 (worst 9e-16 of 11 points, TestReference).
// Source: [Jackson1999] eq. (4.26).
func DipoleEnergy(m1, m2, x r3.Vec) float64 {
	return -r3.Dot(m2, DipoleField(m1, x))
}

// DipoleTorque returns the torque m2 x g1(x) on the point dipole m2 at x by the point
// dipole m1 at the origin, about x.
//
// Units: product of the moments over length cubed (times mu0, or over eps0).
// Frame: m1 at the origin, m2 at x; all vectors in the same frame.
// Domain: finite m1, m2 and x. NaN otherwise.
// Singular: NaN at x = 0.
// Accuracy: relative error <= 5e-15 (worst 1e-15 of 10 points, TestReference).
// Source: [Jackson1999] section 5.7, N = m x B.
func DipoleTorque(m1, m2, x r3.Vec) r3.Vec {
	return FieldTorque(m2, DipoleField(m1, x))
}

// FieldTorque returns the torque m x g on the dipole m in the field g.
//
// Units: product of those of m and g (with B in place of g: newton metre).
// Frame: m, g and the result in the same frame.
// Domain: finite m and g. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 1e-15 (worst 1.8e-16 of 9 points, TestReference).
// Source: [Jackson1999] section 5.7.
func FieldTorque(m, g r3.Vec) r3.Vec {
	if !finiteVec(m, g) {
		return nanVec()
	}
	return r3.Cross(m, g)
}

// DipoleAxialDistance returns the distance (m/(2 pi g))^(1/3) on its axis at which the
// dipole of magnitude m still has the field g; across the axis it is 2^(1/3) shorter.
//
// Units: cube root of m over g, a length.
// Frame: any; distance from the dipole along its axis.
// Domain: m and g finite and positive. NaN otherwise.
// Singular: grows without bound as g goes to 0.
// Accuracy: relative error <= 1e-15 (worst 1.2e-16 of 4 points, TestReference).
// Source: [Jackson1999] eq. (4.13) on the axis, solved for r.
func DipoleAxialDistance(m, g float64) float64 {
	if !positive(m, g) {
		return math.NaN()
	}
	return math.Cbrt(m / (2 * math.Pi) / g)
}
