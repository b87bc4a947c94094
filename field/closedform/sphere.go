package closedform

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// SpherePotential returns phi of the uniformly polarized sphere of radius a: p.x/3
// inside, that of the dipole 4 pi a^3 p/3 outside.
//
// Units: p times length.
// Frame: centre at the origin.
// Domain: a > 0, finite p and x. NaN otherwise.
// Singular: nowhere; continuous.
// Accuracy: relative error <= 1e-15 (worst 3e-16 of 13 points, TestReference).
// Source: [Griffiths2013] example 4.2.
func SpherePotential(p r3.Vec, a float64, x r3.Vec) float64 {
	if !positive(a) || !finiteVec(p, x) {
		return math.NaN()
	}
	if r := norm(x); r > a {
		t := a / r
		x = r3.Scale(t*t*t, x)
	}
	return r3.Dot(p, x) / 3
}

// SphereField returns g of the uniformly polarized sphere of radius a: -p/3 inside,
// the dipole field outside, the mean of both on the surface.
//
// Units: those of p.
// Frame: centre at the origin.
// Domain: a > 0, finite p and x. NaN otherwise.
// Singular: jumps by p.n n across the surface.
// Accuracy: relative error <= 2e-15 (worst 5.7e-16 of 13 points, TestReference).
// Source: [Griffiths2013] example 4.2; [Jackson1999] section 5.10 (H = -M/3).
func SphereField(p r3.Vec, a float64, x r3.Vec) r3.Vec {
	if !positive(a) || !finiteVec(p, x) {
		return nanVec()
	}
	r := norm(x)
	inside := r3.Scale(-1.0/3, p)
	if r < a {
		return inside
	}
	outside := dipoleBeyond(p, a, x, r)
	if r > a {
		return outside
	}
	return r3.Scale(0.5, r3.Add(inside, outside))
}

// dipoleBeyond returns the field of the dipole 4 pi a^3 p/3 at x, |x| = r.
func dipoleBeyond(p r3.Vec, a float64, x r3.Vec, r float64) r3.Vec {
	u, t := r3.Scale(1/r, x), a/r
	return r3.Scale(t*t*t/3, r3.Sub(r3.Scale(3*r3.Dot(p, u), u), p))
}

// HollowSpherePotential returns phi of a uniformly polarized hollow sphere with the
// radii inner and outer: 0 in the cavity, (1 - (inner/r)^3) p.x/3 in the wall, that of
// the dipole 4 pi (outer^3 - inner^3) p/3 outside.
//
// Units: p times length.
// Frame: centre at the origin.
// Domain: 0 < inner < outer, finite p and x. NaN otherwise.
// Singular: nowhere; continuous.
// Accuracy: relative error <= 2e-14 (worst 4.3e-15 of 9 points, TestReference).
// Source: difference of two spheres, [Griffiths2013] example 4.2; cube differences factored.
func HollowSpherePotential(p r3.Vec, inner, outer float64, x r3.Vec) float64 {
	if !positive(inner, outer, outer-inner) || !finiteVec(p, x) {
		return math.NaN()
	}
	r := norm(x)
	if r <= inner {
		return 0
	}
	return hollowFraction(inner, math.Min(r, outer), r) * r3.Dot(p, x) / 3
}

// hollowFraction returns (b^3 - a^3)/r^3.
func hollowFraction(a, b, r float64) float64 {
	return (b - a) / r * ((b/r)*(b/r) + (a/r)*(b/r) + (a/r)*(a/r))
}

// HollowSphereField returns g of a uniformly polarized hollow sphere: exactly 0 in the
// cavity, -p/3 less the field of the missing core in the wall, a dipole field outside,
// the mean of both sides on either surface.
//
// Units: those of p.
// Frame: centre at the origin.
// Domain: 0 < inner < outer, finite p and x. NaN otherwise.
// Singular: jumps by p.n n across both surfaces.
// Accuracy: relative error <= 5e-15 (worst 1.2e-15 of 9 points, TestReference).
// Source: difference of two spheres, [Griffiths2013] example 4.2; cube differences factored.
func HollowSphereField(p r3.Vec, inner, outer float64, x r3.Vec) r3.Vec {
	if !positive(inner, outer, outer-inner) || !finiteVec(p, x) {
		return nanVec()
	}
	r := norm(x)
	if r < inner {
		return r3.Vec{}
	}
	u := r3.Scale(1/r, x)
	along := r3.Scale(r3.Dot(p, u), u)
	t := inner / r
	wall := r3.Sub(r3.Scale(-hollowFraction(inner, r, r)/3, p), r3.Scale(t*t*t, along))
	beyond := r3.Scale(hollowFraction(inner, outer, r)/3, r3.Sub(r3.Scale(3, along), p))
	switch {
	case r == inner:
		return r3.Scale(0.5, wall)
	case r < outer:
		return wall
	case r == outer:
		return r3.Scale(0.5, r3.Add(wall, beyond))
	}
	return beyond
}
