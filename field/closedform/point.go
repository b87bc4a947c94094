package closedform

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// PointPotential returns phi = q/(4 pi r) of the point charge q at the origin.
//
// Units: q over length.
// Frame: charge at the origin; x is the field point.
// Domain: finite q and x. NaN otherwise.
// Singular: NaN at the charge.
// Accuracy: relative error <= 1e-15 (worst 2.3e-16 of 16 points, TestReference).
// Source: [Jackson1999] section 1.5 (Coulomb's law).
func PointPotential(q float64, x r3.Vec) float64 {
	r := norm(x)
	if !finite(q) || !positive(r) {
		return math.NaN()
	}
	return q / fourPi / r
}

// PointField returns g = q x/(4 pi r^3) of the point charge q at the origin.
//
// Units: q over length squared.
// Frame: charge at the origin; x and the result in the same frame.
// Domain: finite q and x. NaN otherwise.
// Singular: NaN at the charge.
// Accuracy: relative error <= 2e-15 (worst 4e-16 of 14 points, TestReference).
// Source: [Jackson1999] section 1.2 (Coulomb's law).
func PointField(q float64, x r3.Vec) r3.Vec {
	r := norm(x)
	if !finite(q) || !positive(r) {
		return nanVec()
	}
	return r3.Scale(q/fourPi/r/r, r3.Scale(1/r, x))
}

// PointGradient returns dg_i/dx_j = q/(4 pi r^3) (delta_ij - 3 u_i u_j), u = x/r, of
// the point charge q at the origin; row i belongs to component i of g.
//
// Units: q over length cubed.
// Frame: charge at the origin; x and the result in the same frame.
// Domain: finite q and x. NaN otherwise.
// Singular: NaN at the charge.
// Accuracy: relative error <= 5e-15 (worst 8.3e-16 of 8 points, TestReference).
// Source: derivative of Coulomb's law, [Jackson1999] section 4.1; symmetric, trace 0.
func PointGradient(q float64, x r3.Vec) [3][3]float64 {
	r := norm(x)
	if !finite(q) || !positive(r) {
		return nanTensor()
	}
	u := r3.Scale(1/r, x)
	c := q / fourPi / r / r / r
	return tensor(c, -3*c, u, u)
}

// tensor returns c 1 + d (a b^T + b a^T)/2.
func tensor(c, d float64, a, b r3.Vec) [3][3]float64 {
	av, bv := [3]float64{a.X, a.Y, a.Z}, [3]float64{b.X, b.Y, b.Z}
	var t [3][3]float64
	for i := range t {
		for j := range t {
			t[i][j] = d * (av[i]*bv[j] + bv[i]*av[j]) / 2
		}
		t[i][i] += c
	}
	return t
}

// nanTensor returns nine NaN.
func nanTensor() [3][3]float64 {
	n := math.NaN()
	return [3][3]float64{{n, n, n}, {n, n, n}, {n, n, n}}
}

// TwoPolePotential returns phi of the point charges +q at z = L/2 and -q at
// z = -L/2: the two-pole model of a long thin rod with q = p A.
//
// Units: q over length.
// Frame: centre at the origin, axis z, +q above.
// Domain: finite q and x, L > 0. NaN otherwise.
// Singular: NaN at the poles. Not a rod near its ends: see TwoDiscAxisField.
// Accuracy: relative error <= 2e-15 (worst 4e-16 of 11 points, TestReference).
// Source: [Maxwell1873] vol. 2, part III, chapter 1; difference of the reciprocals as
// 2 L z/((r+ + r-) r+ r-).
func TwoPolePotential(q, L float64, x r3.Vec) float64 {
	up, down, ok := poleDistances(q, L, x)
	if !ok {
		return math.NaN()
	}
	return q / fourPi * (2 * L / (up + down)) * (x.Z / up / down)
}

// TwoPoleField returns g of the point charges +q at z = L/2 and -q at z = -L/2.
//
// Units: q over length squared.
// Frame: centre at the origin, axis z, +q above.
// Domain: finite q and x, L > 0. NaN otherwise.
// Singular: NaN at the poles. Not a rod near its ends: see TwoDiscAxisField.
// Accuracy: relative error <= 2e-15 (worst 5.8e-16 of 11 points, TestReference).
// Source: [Maxwell1873] vol. 2, part III, chapter 1; sum and difference of the
// reciprocal cubes kept apart so that nothing cancels far away.
func TwoPoleField(q, L float64, x r3.Vec) r3.Vec {
	up, down, ok := poleDistances(q, L, x)
	if !ok {
		return nanVec()
	}
	a, b := 1/up, 1/down
	difference := 2 * L * x.Z / (up + down) * (a * b) * (a*a + a*b + b*b)
	g := r3.Scale(difference, x)
	g.Z -= L / 2 * (a*a*a + b*b*b)
	return r3.Scale(q/fourPi, g)
}

// poleDistances returns the distances of x from (0, 0, +-L/2).
func poleDistances(q, L float64, x r3.Vec) (up, down float64, ok bool) {
	s := math.Hypot(x.X, x.Y)
	up, down = math.Hypot(s, x.Z-L/2), math.Hypot(s, x.Z+L/2)
	return up, down, finite(q) && positive(L, up, down)
}
