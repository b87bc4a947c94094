package closedform

import "math"

// RectangleAxisPotential returns phi at the height z over the centre of a rectangle with
// the edges a, b and the density sigma.
//
// Units: sigma times length.
// Frame: rectangle in the plane z = 0, centre at the origin.
// Domain: a, b > 0, all finite. NaN otherwise.
// Singular: nowhere; a kink at z = 0.
// Accuracy: relative error <= 2e-15 (worst 4.5e-16 of 8 points, TestReference).
// Source: [Kellogg1929]; (sigma/4pi) 4 [A asinh(B/sqrt(A^2+z^2)) + B asinh(A/sqrt(B^2+z^2)) -
// |z| atan(AB/(|z| R))] with A = a/2, B = b/2.
func RectangleAxisPotential(sigma, a, b, z float64) float64 {
	if !finite(sigma, z) || !positive(a, b) {
		return math.NaN()
	}
	a, b, z = a/2, b/2, math.Abs(z)
	i := a*math.Asinh(b/math.Hypot(a, z)) + b*math.Asinh(a/math.Hypot(b, z)) - z*rectangleAngle(2*a, 2*b, z)
	return sigma / math.Pi * i
}

// RectangleAxisField returns g_z at the height z over the centre of a rectangle with the
// edges a, b and the density sigma: (sigma/pi) atan(ab/(2z sqrt(4z^2+a^2+b^2))), 0 on the
// face (mean of both sides).
//
// Units: those of sigma.
// Frame: rectangle in the plane z = 0, centre at the origin.
// Domain: a, b > 0, all finite. NaN otherwise.
// Singular: jumps by sigma at z = 0.
// Accuracy: relative error <= 1e-15 (worst 2.2e-16 of 6 points, TestReference).
// Source: solid angle of a rectangle over 4 pi, [Kellogg1929].
func RectangleAxisField(sigma, a, b, z float64) float64 {
	if !finite(sigma, z) || !positive(a, b) {
		return math.NaN()
	}
	return sigma / math.Pi * sign(z) * rectangleAngle(a, b, math.Abs(z))
}

// RectangleSelfEnergy returns (1/2) int sigma phi dA of a rectangle with the edges a, b
// and the density sigma.
//
// Units: sigma squared times length cubed (times mu0, or over eps0).
// Frame: any.
// Domain: a, b > 0, all finite. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 1e-15 (worst 1.2e-16 of 4 points, TestReference).
// Source: leading term for long bars of [Aharoni1998]:
// (sigma^2/4pi) [a^2 b asinh(b/a) + a b^2 asinh(a/b) - ((a^2+b^2)^(3/2) - a^3 - b^3)/3].
func RectangleSelfEnergy(sigma, a, b float64) float64 {
	if !finite(sigma) || !positive(a, b) {
		return math.NaN()
	}
	i := a*math.Asinh(b/a) + b*math.Asinh(a/b) - cubeExcess(a, b)/3
	return (sigma * a) * (sigma * b) * i / fourPi
}

// SquareCentrePotential returns phi = sigma side log(1 + sqrt 2)/pi at the centre of a
// square of the given side and density sigma.
//
// Units: sigma times length.
// Frame: any.
// Domain: side > 0, all finite. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 1e-15 (worst 1.3e-16 of 2 points, TestReference).
// Source: [Hummer1996].
func SquareCentrePotential(sigma, side float64) float64 {
	if !finite(sigma) || !positive(side) {
		return math.NaN()
	}
	return sigma * side * math.Log(1+math.Sqrt2) / math.Pi
}
