package closedform

import "math"

// SphereInnerRatio returns 3/(eps+2), the field inside a sphere of relative permittivity
// (or permeability) eps over the uniform applied field.
//
// Units: none.
// Frame: along the applied field.
// Domain: eps >= 0, +Inf allowed. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 1e-15 (worst 0 of 8 points, TestReference).
// Source: [Griffiths2013] example 4.7, eq. (4.49).
func SphereInnerRatio(eps float64) float64 {
	if !(eps >= 0) {
		return math.NaN()
	}
	return 3 / (eps + 2)
}

// SpherePolarizability returns 3 (eps-1)/(eps+2), the dipole moment of a sphere of
// relative permittivity eps over its volume and the uniform applied field. It is also
// the greatest surface density over that field.
//
// Units: none.
// Frame: along the applied field.
// Domain: eps >= 0, +Inf allowed. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 1e-15 (worst 1.9e-16 of 9 points, TestReference).
// Source: [Griffiths2013] example 4.7; [Sihvola1999].
func SpherePolarizability(eps float64) float64 {
	if !(eps >= 0) {
		return math.NaN()
	}
	return 3 * contrast(eps, 2)
}

// EllipsoidPolarizability returns (eps-1)/(1 + N (eps-1)), the dipole moment of an
// ellipsoid of relative permittivity eps over its volume and the field applied along the
// axis with the demagnetizing factor N; 1/N for eps = +Inf.
//
// Units: none.
// Frame: along a principal axis.
// Domain: 0 <= N <= 1, eps >= 0, +Inf allowed for N > 0. NaN otherwise.
// Singular: unbounded for N = 0 with eps = +Inf and for N = 1 with eps = 0, both NaN.
// Accuracy: relative error <= 1e-15 (worst 1.8e-16 of 6 points, TestReference).
// Source: [Landau1984] section 8.
func EllipsoidPolarizability(n, eps float64) float64 {
	switch {
	case !(n >= 0 && n <= 1) || !(eps >= 0):
		return math.NaN()
	case math.IsInf(eps, 1) && n > 0:
		return 1 / n
	case math.IsInf(eps, 1) || n == 1 && eps == 0:
		return math.NaN()
	}
	return (eps - 1) / (1 - n + n*eps)
}

// CoatedSpherePolarizability returns the dipole moment of a core of radius a and relative
// permittivity core under a coat of outer radius b and relative permittivity coat, over
// the outer volume and the uniform applied field.
//
// Units: none.
// Frame: along the applied field.
// Domain: 0 < a < b, core, coat >= 0, all finite. NaN otherwise.
// Singular: NaN for coat = core = 0.
// Accuracy: relative error <= 1e-15 (worst 2.1e-16 of 5 points, TestReference).
// Source: [Sihvola1999], 3 [(e2-1)(e1+2e2) + f(2e2+1)(e1-e2)]/[(e2+2)(e1+2e2) + 2f(e2-1)(e1-e2)],
// f = (a/b)^3, e1 = core, e2 = coat.
func CoatedSpherePolarizability(core, coat, a, b float64) float64 {
	if !coated(core, coat, a, b) {
		return math.NaN()
	}
	f := a / b * (a / b) * (a / b)
	e1, e2 := core, coat
	return 3 * ((e2-1)*(e1+2*e2) + f*(2*e2+1)*(e1-e2)) / coatedDivisor(core, coat, f)
}

// CoatedSphereCoreRatio returns the field in the core of a coated sphere over the uniform
// applied field: 9 e2/[(e2+2)(e1+2e2) + 2f(e2-1)(e1-e2)], f = (a/b)^3, e1 = core, e2 = coat.
//
// Units: none.
// Frame: along the applied field.
// Domain: 0 < a < b, core, coat >= 0, all finite. NaN otherwise.
// Singular: NaN for coat = core = 0.
// Accuracy: relative error <= 1e-15 (worst 0 of 5 points, TestReference).
// Source: [Sihvola1999].
func CoatedSphereCoreRatio(core, coat, a, b float64) float64 {
	if !coated(core, coat, a, b) {
		return math.NaN()
	}
	return 9 * coat / coatedDivisor(core, coat, a/b*(a/b)*(a/b))
}

// coated reports whether the arguments describe a coated sphere.
func coated(core, coat, a, b float64) bool {
	return finite(core, coat) && core >= 0 && coat >= 0 && core+coat > 0 && positive(a, b, b-a)
}

// coatedDivisor returns (e2+2)(e1+2e2) + 2f(e2-1)(e1-e2).
func coatedDivisor(e1, e2, f float64) float64 {
	return (e2+2)*(e1+2*e2) + 2*f*(e2-1)*(e1-e2)
}
