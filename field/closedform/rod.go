package closedform

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// EndlessCylinderPotential returns phi of the endless cylinder of radius a about the z
// axis with the uniform polarization p: p_t.s/2 inside, a^2 p_t.s/(2 s^2) outside, with s
// the part of x across the axis. The axial part of p has no effect.
//
// Units: p times length.
// Frame: axis z.
// Domain: a > 0, all finite. NaN otherwise.
// Singular: nowhere; continuous.
// Accuracy: relative error <= 1e-14 (worst 2e-15 of 13 points, TestReference).
// Source: [Griffiths2013] problem 4.13.
func EndlessCylinderPotential(p r3.Vec, a float64, x r3.Vec) float64 {
	if !finiteVec(p, x) || !positive(a) {
		return math.NaN()
	}
	t := 1.0
	if s := math.Hypot(x.X, x.Y); s > a {
		t = a / s
	}
	return (p.X*(t*x.X) + p.Y*(t*x.Y)) * t / 2
}

// EndlessCylinderField returns g of the endless cylinder of radius a about the z axis
// with the uniform polarization p: -p_t/2 inside (the limit of a long rod: 0 along it,
// half across it), the plane dipole field (a^2/(2 s^2))(2 (p_t.u) u - p_t) outside, the
// mean on the surface.
//
// Units: those of p.
// Frame: axis z.
// Domain: a > 0, all finite. NaN otherwise.
// Singular: jumps by p.n n across the surface.
// Accuracy: relative error <= 5e-15 (worst 1e-15 of 13 points, TestReference).
// Source: [Griffiths2013] problem 4.13.
func EndlessCylinderField(p r3.Vec, a float64, x r3.Vec) r3.Vec {
	if !finiteVec(p, x) || !positive(a) {
		return nanVec()
	}
	s := math.Hypot(x.X, x.Y)
	pt := r3.Vec{X: p.X, Y: p.Y}
	inside := r3.Scale(-0.5, pt)
	if s < a {
		return inside
	}
	u := r3.Vec{X: x.X / s, Y: x.Y / s}
	along := r3.Scale(r3.Dot(pt, u), u)
	outside := r3.Scale(a/s*(a/s)/2, r3.Sub(r3.Scale(2, along), pt))
	if s > a {
		return outside
	}
	return r3.Scale(0.5, r3.Add(inside, outside))
}

// LinePotential returns phi = -(lambda/2pi) log(s/s0) at the distance s from an endless
// line with the density lambda, zero at the distance s0.
//
// Units: those of lambda.
// Frame: s is the distance from the line.
// Domain: s, s0 > 0, all finite. NaN otherwise.
// Singular: logarithmic at the line and far away.
// Accuracy: relative error <= 1e-15 (worst 0 of 4 points, TestReference).
// Source: [Griffiths2013] problem 2.22.
func LinePotential(lambda, s, s0 float64) float64 {
	if !finite(lambda) || !positive(s, s0) {
		return math.NaN()
	}
	return lambda / (2 * math.Pi) * powerDifference(s0, s, 0)
}

// LineField returns the component of g away from an endless line with the density
// lambda, at the distance s: lambda/(2 pi s).
//
// Units: lambda over length.
// Frame: s is the distance from the line.
// Domain: s > 0, all finite. NaN otherwise.
// Singular: 1/s at the line.
// Accuracy: relative error <= 1e-15 (worst 1.9e-16 of 3 points, TestReference).
// Source: [Griffiths2013] problem 2.13.
func LineField(lambda, s float64) float64 {
	if !finite(lambda) || !positive(s) {
		return math.NaN()
	}
	return lambda / (2 * math.Pi) / s
}

// SegmentPotential returns phi of the straight segment |z| <= L/2 of the z axis with the
// line density lambda, at the distance s >= 0 from the axis and the height z.
//
// Units: those of lambda.
// Frame: centre at the origin, axis z.
// Domain: L > 0, s >= 0, all finite. NaN otherwise.
// Singular: logarithmic; NaN on the segment.
// Accuracy: relative error <= 2e-15 (worst 3.6e-16 of 28 points, TestReference).
// Source: [Kellogg1929] (homogeneous straight wire), (lambda/4pi) log((R1 + R2 + L)/(R1 + R2 - L)),
// with the denominator in a form that does not cancel.
func SegmentPotential(lambda, L, s, z float64) float64 {
	m := math.Abs(z)
	if !finite(lambda, s, z) || !positive(L) || s < 0 || s == 0 && m <= L/2 {
		return math.NaN()
	}
	lo, hi := m-L/2, m+L/2
	if lo < 0 {
		return lambda / fourPi * (math.Asinh(hi/s) - math.Asinh(lo/s))
	}
	r1, r2 := math.Hypot(s, lo), math.Hypot(s, hi)
	return lambda / fourPi * math.Log1p(L*(r1+r2+L)/(r1*r2+lo*hi+s*s))
}
