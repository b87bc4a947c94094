package closedform

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// PlaneField returns g_z of the endless plane z = 0 with the density sigma: (sigma/2) sgn z.
//
// Units: those of sigma.
// Frame: plane z = 0.
// Domain: all finite. NaN otherwise.
// Singular: jumps by sigma at z = 0, where the mean 0 is returned.
// Accuracy: relative error <= 1e-15 (worst 0 of 2 points, TestReference).
// Source: [Griffiths2013] example 2.5.
func PlaneField(sigma, z float64) float64 {
	if !finite(sigma, z) {
		return math.NaN()
	}
	return sigma / 2 * sign(z)
}

// PlanePotential returns phi = -sigma |z|/2 of the endless plane z = 0 with the density
// sigma, zero on the plane itself.
//
// Units: sigma times length.
// Frame: plane z = 0.
// Domain: all finite. NaN otherwise.
// Singular: grows without bound; a kink at z = 0.
// Accuracy: relative error <= 1e-15 (worst 1.9e-16 of 2 points, TestReference).
// Source: [Griffiths2013] example 2.5, integrated.
func PlanePotential(sigma, z float64) float64 {
	if !finite(sigma, z) {
		return math.NaN()
	}
	return -sigma / 2 * math.Abs(z)
}

// SlabField returns g of the endless slab |z| <= t/2 with the uniform polarization p:
// (0, 0, -p_z) inside, 0 outside, half on a face. The tangential part of p has no effect.
//
// Units: those of p.
// Frame: centre plane z = 0.
// Domain: t > 0, all finite. NaN otherwise.
// Singular: jumps by p_z at the faces.
// Accuracy: relative error <= 1e-15 (worst 0 of 2 points, TestReference).
// Source: [Griffiths2013] section 4.3: D_n and g_t are continuous.
func SlabField(p r3.Vec, t, z float64) r3.Vec {
	if !finiteVec(p) || !finite(z) || !positive(t) {
		return nanVec()
	}
	switch m := math.Abs(z); {
	case m > t/2:
		return r3.Vec{}
	case m == t/2:
		return r3.Vec{Z: -p.Z / 2}
	}
	return r3.Vec{Z: -p.Z}
}

// SlabPotential returns phi of the endless slab |z| <= t/2 with the uniform polarization
// p: p_z z inside, +-p_z t/2 outside, zero in the centre plane.
//
// Units: p times length.
// Frame: centre plane z = 0.
// Domain: t > 0, all finite. NaN otherwise.
// Singular: nowhere; kinks at the faces.
// Accuracy: relative error <= 1e-15 (worst 1.9e-16 of 2 points, TestReference).
// Source: integral of SlabField, [Griffiths2013] section 4.3.
func SlabPotential(p r3.Vec, t, z float64) float64 {
	if !finiteVec(p) || !finite(z) || !positive(t) {
		return math.NaN()
	}
	return p.Z * math.Max(-t/2, math.Min(z, t/2))
}

// ChargedSlabField returns g_z of the endless slab |z| <= t/2 with the volume density
// rho: rho z inside, +-rho t/2 outside.
//
// Units: rho times length.
// Frame: centre plane z = 0.
// Domain: t > 0, all finite. NaN otherwise.
// Singular: nowhere; continuous.
// Accuracy: relative error <= 1e-15 (worst 0 of 2 points, TestReference).
// Source: [Griffiths2013] problem 2.17.
func ChargedSlabField(rho, t, z float64) float64 {
	if !finite(rho, z) || !positive(t) {
		return math.NaN()
	}
	return rho * math.Max(-t/2, math.Min(z, t/2))
}
