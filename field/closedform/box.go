package closedform

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// BoxMagnetometricFactor returns the demagnetizing factor along z of the box with the
// edges (or semi-axes) size, uniformly polarized along z: the mean of -g_z/p over its
// volume. The factors along x and y follow by cyclic exchange; the three sum to 1.
//
// Units: none.
// Frame: edges along x, y, z.
// Domain: edges finite and positive, ratios up to 1e30. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 2e-15 (worst 4.9e-16 of 39 points, TestReference).
// Source: [Aharoni1998] eq. (1), regrouped as in the comment below the declaration.
func BoxMagnetometricFactor(size r3.Vec) float64 {
	// The printed formula loses (c/a)^3 units of rounding for bars and c^-1 for plates. Its
	// logarithms are asinh's; each pair differs by asinh(x sqrt(1+y^2) - y sqrt(1+x^2)). In its
	// algebraic tail every difference of diagonals is rationalized: with d = sqrt(a^2+b^2),
	// a^2 b^2 (1/(r+ca) + 1/(r+bc)) + a^3 + b^3 - d^3 becomes -a^2 b^2 c^2 edge, and the rest
	// 2 a^2 b^2 c^2 (1/(r+ca) + 1/(bc+c))/((ca+c)(r+bc)). [Own]
	if !positive(size.X, size.Y, size.Z) {
		return math.NaN()
	}
	m := math.Max(size.X, math.Max(size.Y, size.Z))
	a, b, c := size.X/m, size.Y/m, size.Z/m
	if math.Min(a, math.Min(b, c)) < 1e-30 {
		return math.NaN()
	}
	ab, bc, ca := math.Hypot(a, b), math.Hypot(b, c), math.Hypot(c, a)
	r := math.Hypot(ab, c)
	s := b/c*math.Asinh(a/b*(c/bc)*(c/(r+ab))) + a/c*math.Asinh(b/a*(c/ca)*(c/(r+ab)))
	s -= c/b*math.Asinh(a/c*(b/bc)*(b/(ca+r))) + c/a*math.Asinh(b/c*(a/ca)*(a/(bc+r)))
	s += 2 * math.Atan(a/c*(b/r))
	edge := (1/(ab+r)+1/(a+ca))/((r+ca)*(ab+a)) + (1/(ab+r)+1/(b+bc))/((r+bc)*(ab+b))
	cross := 2 * (1/(r+ca) + 1/(bc+c)) / ((ca + c) * (r + bc))
	return (s + a*b/3*c*(cross-edge)) / math.Pi
}

// cubeExcess returns ((a^2+b^2)^(3/2) - a^3 - b^3)/(a b).
func cubeExcess(a, b float64) float64 {
	lo, hi := math.Min(a, b), math.Max(a, b)
	d := math.Hypot(lo, hi)
	return lo/hi*(d*d+d*hi+hi*hi)/(d+hi) - lo*(lo/hi)
}

// BoxCentreFactor returns the demagnetizing factor along z at the centre of the box with
// the edges (or semi-axes) size: (2/pi) atan(ab/(c sqrt(a^2+b^2+c^2))).
//
// Units: none.
// Frame: edges along x, y, z.
// Domain: edges finite and positive. NaN otherwise.
// Singular: nowhere; 1/3 for the cube.
// Accuracy: relative error <= 2e-15 (worst 3.4e-16 of 39 points, TestReference).
// Source: solid angle of the two faces, [Kellogg1929]; see RectangleAxisField.
func BoxCentreFactor(size r3.Vec) float64 {
	if !positive(size.X, size.Y, size.Z) {
		return math.NaN()
	}
	return 2 / math.Pi * math.Atan(size.X/size.Z*(size.Y/norm(size)))
}

// BoxAxisInduction returns g_z at the height z >= 0 above the centre of the upper face
// (edges a, b) of a box of length L along z, uniformly polarized along z by p:
// (p/pi)[ w(z) - w(z+L) ], w(u) = atan(ab/(2u sqrt(4u^2+a^2+b^2))). At z = 0 it is g_z + p
// just below as well as g_z just above.
//
// Units: those of p; with p = Br it is the flux density.
// Frame: origin in the face, z outward.
// Domain: a, b, L > 0, z >= 0, all finite. NaN otherwise.
// Singular: nowhere on the axis.
// Accuracy: relative error <= 1e-14 (worst 2.2e-15 of 4 points, TestReference).
// Far away the two faces cancel: the error grows as z/L units of rounding.
// Source: solid angles of the two faces, [Kellogg1929]; see RectangleAxisField.
func BoxAxisInduction(p, a, b, L, z float64) float64 {
	if !finite(p) || !positive(a, b, L) || !(z >= 0) || !finite(z) {
		return math.NaN()
	}
	return p / math.Pi * (rectangleAngle(a, b, z) - rectangleAngle(a, b, z+L))
}

// rectangleAngle returns a quarter of the solid angle of an a by b rectangle seen from
// the height u >= 0 above its centre.
func rectangleAngle(a, b, u float64) float64 {
	return math.Atan2(a*(b/math.Hypot(2*u, math.Hypot(a, b))), 2*u)
}

// BoxCentrePotential returns phi at the centre of the box with the edges size and the
// volume density rho.
//
// Units: rho times length squared.
// Frame: edges along x, y, z.
// Domain: edges finite and positive. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 1e-15 (worst 1.5e-16 of 2 points, TestReference).
// Source: [Kellogg1929], int dV/R = (1/2) sum over the faces of height times int dA/R,
// with RectangleAxisPotential.
func BoxCentrePotential(rho float64, size r3.Vec) float64 {
	a, b, c := size.X, size.Y, size.Z
	return c/2*RectangleAxisPotential(rho, a, b, c/2) +
		a/2*RectangleAxisPotential(rho, b, c, a/2) +
		b/2*RectangleAxisPotential(rho, c, a, b/2)
}

// CubeCentrePotential returns phi at the centre of a cube of the given side and volume
// density rho: rho side^2 (3 log(2 + sqrt 3) - pi/2)/(4 pi).
//
// Units: rho times length squared.
// Frame: any.
// Domain: side > 0, all finite. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 1e-15 (worst 0 of 2 points, TestReference).
// Source: [Hummer1996].
func CubeCentrePotential(rho, side float64) float64 {
	if !finite(rho) || !positive(side) {
		return math.NaN()
	}
	return rho * side * side * (3*math.Log(2+math.Sqrt(3)) - math.Pi/2) / fourPi
}

// CubeCornerPotential returns phi at a corner of a cube of the given side and volume
// density rho: half of that at the centre (eight cubes about the corner make one of
// twice the side).
//
// Units: rho times length squared.
// Frame: any.
// Domain: side > 0, all finite. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 1e-15 (worst 0 of 2 points, TestReference).
// Source: [Hummer1996].
func CubeCornerPotential(rho, side float64) float64 {
	return CubeCentrePotential(rho, side) / 2
}
