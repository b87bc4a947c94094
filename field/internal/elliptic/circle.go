package elliptic

import "math"

// Derivation. Circle of radius a about the z axis in z = 0, target at distance
// rho from the axis and height z; φ is the angle between them,
//
//	q² = a² + rho² - 2 a rho cos φ,  R² = q² + z²,
//	Q = (a+rho)² + z²,  q1 = (a-rho)² + z²,  kc² = q1/Q,  m = 1 - kc² = 4 a rho/Q.
//
// With φ = π - 2θ: R² = Q (cos²θ + kc² sin²θ), cos φ = sin²θ - cos²θ, and a
// full turn of φ is four quarter turns of θ. Write [A,B] for
// ∫ (A cos²θ + B sin²θ)/Δ dθ, so that K = [1,1], E = [1,kc²]. Then
//
//	∮ dφ/R       = 4/√Q [1,1],      ∮ cos φ dφ/R   = 4/√Q [-1,1],
//	∮ dφ/R³      = 4/(√Q q1) [1,kc²],  ∮ cos φ dφ/R³ = 4/(√Q q1) [1,-kc²].
//
// The last three need care: [-1,1] and [1,-kc²] cancel far off and near the
// axis. Bulirsch's step (a Landen transformation) from kc to 2√kc/(1+kc) maps
// [A,B] to (A+B, 2(B + kc A)) at the new mean 1+kc, so after one step by hand
//
//	[-1,1]  -> (0, 2m/(1+kc))          = m · 2/(1+kc) · X
//	[1,-kc²] -> (m, 2 kc m/(1+kc))      = m · (Y + 2kc/(1+kc) X)
//	[1,kc²]  -> (1+kc²) (Y + 2kc/(1+kc) X) + 4kc²/(1+kc) X
//
// with X = (0,1), Y = (1,0): the factor m is explicit, all the rest positive.
// The loop carries X and Y; K comes with the mean itself. All means are
// multiplied by √Q, which saves a division.

// Ring returns the integrals over the circle of radius a
//
//	U = a ∮ dφ/R,  T1 = a ∮ cos φ dφ/R,  S3 = ∮ dφ/R³,  C3 = ∮ cos φ dφ/R³
//
// at distance rho from its axis and height z over its plane. A ring of unit
// line charge has the potential U (times 1/4π), the radial field
// a (rho S3 - a C3) and the axial field a z S3.
//
// Units: those of a; U and T1 have none, S3 and C3 are 1/length³.
// Domain: a > 0, rho >= 0, q1 = (a-rho)² + z² > 0, given apart so that it may
// be better known than a - rho. Lengths within 1e±70.
// Singular: on the circle, q1 = 0, all four are +Inf.
// Accuracy: relative error <= 1.5e-15 each, also as rho -> 0, near the circle
// and far away (TestCircleReference).
func Ring(a, rho, z, q1 float64) (u, t1, s3, c3 float64) {
	sum := a + rho
	q := float64(sum*sum) + float64(z*z)
	far, near := math.Sqrt(q), math.Sqrt(q1)
	first := far + near
	if !(a > 0 && rho >= 0 && q1 > 0 && first <= math.MaxFloat64) {
		v := onCircle(a, rho, q, q1)
		return v, v, v, v
	}
	mean, geo := first, 2*math.Sqrt(far*near)
	e := mean * geo
	k, xa, xb, ya, yb := 2.0, 0.0, 1.0, 1.0, 0.0
	for {
		im := 1 / mean
		xa, xb = xa+float64(xb*im), 2*(xb+float64(geo*xa))
		ya, yb = ya+float64(yb*im), 2*(yb+float64(geo*ya))
		k += k
		old := mean
		mean += geo
		if math.Abs(old-geo) <= agmEnd*old {
			break
		}
		geo = 2 * math.Sqrt(e)
		e = geo * mean
	}
	x, y := xb+float64(xa*mean), yb+float64(ya*mean)
	u, t1 = closePotential(a, rho, first, mean, k, x)
	s3, c3 = closeField(a*rho, q, q1, float64(far*near), first, mean, x, y)
	return u, t1, s3, c3
}

// onCircle returns +Inf on the circle and NaN outside the domain of Ring.
func onCircle(a, rho, q, q1 float64) float64 {
	if a > 0 && rho >= 0 && q1 == 0 && q <= math.MaxFloat64 {
		return math.Inf(1)
	}
	return math.NaN()
}

// closePotential returns U and T1 from the first and last mean, twice the power of
// two k between them, and the sum x = b + a·mean of X.
func closePotential(a, rho, first, mean, k, x float64) (u, t1 float64) {
	im := 1 / mean
	return 2 * math.Pi * a * k * im, 8 * math.Pi * a * a * rho * (x * im * im * (1 / first))
}

// closeField returns S3 and C3 from a rho, Q, q1, √Q √q1, the first and last
// mean and the sums x and y of X and Y.
func closeField(ar, q, q1, fn, first, mean, x, y float64) (s3, c3 float64) {
	im, i1 := 1/mean, 1/first
	h := 0.5 * im * im
	x *= h * i1
	y = float64(y*h) + float64(2*fn*x)
	qq := q * q1
	iq := 2 * math.Pi / qq
	return iq * (float64((q+q1)*y) + float64(4*qq*x)), iq * 4 * ar * y
}
