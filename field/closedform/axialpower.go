package closedform

import "math"

// AxialPowerCharge returns the bound charge of a straight body of cross section area
// between z0 and z1 with the polarization c z^n along z: -c z0^n A on the bottom,
// c z1^n A on the top, and what makes the sum zero in the volume.
//
// Units: c times length^n times those of area.
// Frame: z along the body; the origin of z is that of the power law.
// Domain: z0 < z1, area > 0, n an integer >= 0, all finite. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 1e-15 (worst 0 of 6 points, TestReference).
// Source: [Griffiths2013] section 4.2, sigma = P.n and rho = -div P.
func AxialPowerCharge(c float64, n int, z0, z1, area float64) (bottom, top, volume float64) {
	if n < 0 || !finite(c, z0, z1) || !positive(area, z1-z0) {
		return math.NaN(), math.NaN(), math.NaN()
	}
	k := c * area
	return -k * integerPower(z0, n), k * integerPower(z1, n), -k * (z1 - z0) * meanSlope(z0, z1, n)
}

// AxialPowerDensity returns rho = -c n z^(n-1) of the polarization c z^n along z.
//
// Units: c times length^(n-1).
// Frame: the origin of z is that of the power law.
// Domain: n an integer >= 0, finite c and z. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 1e-15 (worst 0 of 4 points, TestReference).
// Source: [Griffiths2013] section 4.2, rho = -div P.
func AxialPowerDensity(c float64, n int, z float64) float64 {
	if n < 0 || !finite(c, z) {
		return math.NaN()
	}
	if n == 0 {
		return 0
	}
	return -c * float64(n) * integerPower(z, n-1)
}

// AxialPowerSlabField returns g_z of the endless slab z0 <= z <= z1 with the
// polarization c z^n along z: -c z^n inside, exactly 0 outside, half on a face.
//
// Units: c times length^n.
// Frame: z across the slab; the origin of z is that of the power law.
// Domain: z0 < z1, n an integer >= 0, all finite. NaN otherwise. Nothing else in space:
// no field far off on either side.
// Singular: jumps by p.n across the faces.
// Accuracy: relative error <= 1e-15 (worst 0 of 6 points, TestReference).
// Source: [Griffiths2013] section 4.3: D = 0, so g = -p.
func AxialPowerSlabField(c float64, n int, z0, z1, z float64) float64 {
	switch {
	case n < 0 || !finite(c, z0, z1, z) || !(z0 < z1):
		return math.NaN()
	case z < z0 || z > z1:
		return 0
	case z == z0 || z == z1:
		return -c * integerPower(z, n) / 2
	}
	return -c * integerPower(z, n)
}

// AxialPowerSlabVoltage returns phi(z1) - phi(z0) = c (z1^(n+1) - z0^(n+1))/(n+1) across
// the endless slab with the polarization c z^n along z.
//
// Units: c times length^(n+1).
// Frame: z across the slab; the origin of z is that of the power law.
// Domain: z0 < z1, n an integer >= 0, all finite. NaN otherwise.
// Singular: nowhere. For odd n the value vanishes at z0 = -z1, exactly.
// Accuracy: relative error <= 1e-15 (worst 0 of 6 points, TestReference).
// Source: integral of g = -p, [Griffiths2013] section 4.3.
func AxialPowerSlabVoltage(c float64, n int, z0, z1 float64) float64 {
	if n < 0 || !finite(c, z0, z1) || !(z0 < z1) {
		return math.NaN()
	}
	return c * (z1 - z0) * meanSlope(z0, z1, n+1) / float64(n+1)
}

// meanSlope returns (b^n - a^n)/(b - a) = sum of a^i b^(n-1-i); neighbours are paired
// as b^(n-2-i) a^i (a + b) so that mixed signs cancel before rounding.
func meanSlope(a, b float64, n int) float64 {
	s, i := 0.0, 0
	for ; i+1 < n; i += 2 {
		s += integerPower(a, i) * integerPower(b, n-2-i) * (a + b)
	}
	if i < n {
		s += integerPower(a, n-1)
	}
	return s
}

// integerPower returns z^n for n >= 0, with 0^0 = 1.
func integerPower(z float64, n int) float64 {
	return math.Pow(z, float64(n))
}
