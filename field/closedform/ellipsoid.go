package closedform

import (
	"math"

	"gonum.org/v1/gonum/mathext"
	"gonum.org/v1/gonum/spatial/r3"
)

// EllipsoidFactors returns the demagnetizing factors of the ellipsoid with the semi-axes
// s along x, y, z: N_x = (s_x s_y s_z/3) R_D(s_y^2, s_z^2, s_x^2) and cyclic; sum 1.
//
// Units: none.
// Frame: principal axes along x, y, z.
// Domain: semi-axes finite and positive, ratios up to 1e30. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 1e-15 (worst 3.3e-16 of 29 points, TestReference).
// Source: [Osborn1945], [Stoner1945]; Carlson's form, https://dlmf.nist.gov/19.33.E8 [DLMF].
func EllipsoidFactors(s r3.Vec) r3.Vec {
	if !positive(s.X, s.Y, s.Z) {
		return nanVec()
	}
	s = r3.Scale(1/math.Max(s.X, math.Max(s.Y, s.Z)), s)
	if math.Min(s.X, math.Min(s.Y, s.Z)) < 1e-30 {
		return nanVec()
	}
	xx, yy, zz := s.X*s.X, s.Y*s.Y, s.Z*s.Z
	return r3.Scale(s.X*s.Y*s.Z/3, r3.Vec{
		X: mathext.EllipticRD(yy, zz, xx),
		Y: mathext.EllipticRD(zz, xx, yy),
		Z: mathext.EllipticRD(xx, yy, zz),
	})
}

// SphereFactors returns the demagnetizing factors of the sphere, 1/3 each.
//
// Units: none.
// Frame: any.
// Domain: no arguments.
// Singular: nowhere.
// Accuracy: relative error <= 1e-15 (worst 0 of 1 points, TestReference).
// Source: [Osborn1945].
func SphereFactors() r3.Vec { return r3.Vec{X: 1.0 / 3, Y: 1.0 / 3, Z: 1.0 / 3} }

// EndlessCylinderFactors returns the demagnetizing factors of the endless circular
// cylinder about z: 1/2, 1/2, 0.
//
// Units: none.
// Frame: axis z.
// Domain: no arguments.
// Singular: nowhere.
// Accuracy: relative error <= 1e-15 (worst 0 of 1 points, TestReference).
// Source: [Osborn1945].
func EndlessCylinderFactors() r3.Vec { return r3.Vec{X: 0.5, Y: 0.5} }

// PlateFactors returns the demagnetizing factors of the endless plate across z: 0, 0, 1.
//
// Units: none.
// Frame: plate across z.
// Domain: no arguments.
// Singular: nowhere.
// Accuracy: relative error <= 1e-15 (worst 0 of 1 points, TestReference).
// Source: [Osborn1945].
func PlateFactors() r3.Vec { return r3.Vec{Z: 1} }

// EllipticCylinderFactors returns the demagnetizing factors of the endless cylinder about
// z with the semi-axes a along x and b along y: b/(a+b), a/(a+b), 0.
//
// Units: none.
// Frame: axis z, principal axes x and y.
// Domain: a, b finite and positive. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 1e-15 (worst 1.1e-16 of 3 points, TestReference).
// Source: [Osborn1945], limit of one infinite axis.
func EllipticCylinderFactors(a, b float64) r3.Vec {
	if !positive(a, b) {
		return nanVec()
	}
	m := math.Max(a, b)
	a, b = a/m, b/m
	return r3.Vec{X: b / (a + b), Y: a / (a + b)}
}

// EllipsoidInnerField returns g = -(N_x p_x, N_y p_y, N_z p_z), the same everywhere inside
// the uniformly polarized ellipsoid with the semi-axes s.
//
// Units: those of p.
// Frame: principal axes along x, y, z.
// Domain: as EllipsoidFactors, finite p. NaN otherwise.
// Singular: nowhere inside.
// Accuracy: relative error <= 1e-15 (worst 3.1e-16 of 29 points, TestReference).
// Source: [Maxwell1873] vol. 2 arts. 437-438; [Osborn1945].
func EllipsoidInnerField(p, s r3.Vec) r3.Vec {
	n := EllipsoidFactors(s)
	if !finiteVec(p, n) {
		return nanVec()
	}
	return r3.Vec{X: -n.X * p.X, Y: -n.Y * p.Y, Z: -n.Z * p.Z}
}

// EllipsoidAxisField returns g_x at the point (x, 0, 0), |x| > s_x, outside the ellipsoid
// with the semi-axes s, uniformly polarized along x by p. The confocal ellipsoid through
// the point has the semi-axes |x|, B, C with B^2 = x^2 - s_x^2 + s_y^2 and likewise C;
// g_x = p s_x s_y s_z [ 1/(|x| B C) - R_D(B^2, C^2, x^2)/3 ].
//
// Units: those of p.
// Frame: principal axes along x, y, z.
// Domain: semi-axes finite and positive, |x| > s_x, all finite. NaN otherwise.
// Singular: nowhere outside; the limit on the surface is (1 - N_x) p.
// Accuracy: relative error <= 1e-15 (worst 3.2e-16 of 8 points, TestReference).
// Source: [Stratton1941] section 3.27; Carlson's form, https://dlmf.nist.gov/19.33.E8 [DLMF].
func EllipsoidAxisField(p float64, s r3.Vec, x float64) float64 {
	x = math.Abs(x)
	if !finite(p, x) || !positive(s.X, s.Y, s.Z, x-s.X) {
		return math.NaN()
	}
	a, b, c := s.X/x, s.Y/x, s.Z/x
	shift := (x - s.X) / x * (1 + a) // lambda/x^2
	bb, cc := shift+b*b, shift+c*c
	return p * a * b * c * (1/math.Sqrt(bb*cc) - mathext.EllipticRD(bb, cc, 1)/3)
}

// EllipsoidSelfEnergy returns (1/2) int sigma phi dA = (V/2) sum N_i p_i^2 of the
// uniformly polarized ellipsoid with the semi-axes s.
//
// Units: p squared times length cubed (times mu0, or over eps0).
// Frame: principal axes along x, y, z.
// Domain: as EllipsoidFactors, finite p. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 2e-15 (worst 4.3e-16 of 30 points, TestReference).
// Source: [Osborn1945]; the half of p.g over the volume.
func EllipsoidSelfEnergy(p, s r3.Vec) float64 {
	return -2 * math.Pi / 3 * s.X * s.Y * s.Z * r3.Dot(p, EllipsoidInnerField(p, s))
}
