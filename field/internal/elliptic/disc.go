package elliptic

import "math"

// Derivation, continued from circle.go. With g = (a-rho)/(a+rho), γ = |g|:
// q² = (a+rho)² (cos²θ + γ² sin²θ). Write [A,B]p for
// ∫ (A cos²θ + B sin²θ)/((cos²θ + γ² sin²θ) Δ) dθ. For z > 0
//
//	C     = [1,g]p
//	Omega = 2π [rho<a] - 4a z/((a+rho) √Q) C
//	E     = 4a z/((a+rho) √Q) [1,-g]p
//	S     = 16 a² z/((a+rho)² √Q) G,  G = ∫ sin²θ cos²θ/((cos²θ + γ² sin²θ) Δ) dθ.
//
// So inside (rho < a) Omega needs [1,γ]p and E needs [1,-γ]p; outside they
// change places. [1,γ]p is positive throughout. Bartky's step for a numerator
// (A,B), characteristic p and e = (mean)(√Q kc) is
//
//	(a, b, p) -> (a + b/p, 2(b + a e/p), p + e/p),  started with a = A, b = B/γ, p = γ.
//
// One step by hand, multiplied by γ, gives a = 1±γ, b = 2(γ ± kc)·(±1), that is
//
//	[1,γ]p  ~ (1+γ, 2(γ+kc))              positive
//	[1,-γ]p ~ -(1-γ) (1, -2κ),  κ = (kc-γ)/(1-γ) = 2 max(a,rho) z²/((a+rho) Q (kc+γ)),
//
// which factors out 1-γ = 2 min(a,rho)/(a+rho). The second keeps its digits
// but for a factor (√Q+√q1)²/(4 max²), which is small for |z| <= max(a,rho);
// beyond, smooth.go takes over. With ι = 1/p in place of p everything stays
// finite at rho = a.
//
// G by partial fractions is (D - γ² [0,1]p)/n, n = 1-γ², which cancels as
// n -> 0, near the axis and far away. The same after one step is the
// difference of (1, 2) with p = mean and of (1, 2γ) with p = γ + kc/γ. Both
// recursions differ by multiples of n throughout, so the divided differences
//
//	u = (a - a')/n,  v = (b - b')/n,  x = (1 - mean ι)/n
//
// are carried themselves, mean, geo = m, k:
//
//	u -> u + b x/m + v ι
//	v -> 2 (v + k a x + m k ι u)
//	x -> x (1 - k ι)/(1 + m k ι²),  ι -> ι/(1 + m k ι²)
//
// from u = 0, v = 2/(1+γ), x = (kc-γ)/((1+γ)(γ²+kc)); all terms are positive,
// and at the end
//
//	G = π/2 ((b + a m) x + 2 m ι (v + u m)) / (2 m² (1 + m ι)).

// Disc returns U, T1 and Omega of OfCircle, with the same bits. The disc of
// radius a and unit charge density has the radial field T1, the axial field
// Omega and the potential a U - rho T1 - z Omega (times 1/4π).
//
// Units, Domain, Accuracy: as OfCircle.
// Singular: on the rim, q1 = 0, U and T1 are +Inf and Omega is NaN.
func Disc(a, rho, z, gap, q1 float64) (u, t1, omega float64) {
	sum, abs := a+rho, math.Abs(z)
	q := float64(sum*sum) + float64(z*z)
	far, near := math.Sqrt(q), math.Sqrt(q1)
	first := far + near
	if !(a > 0 && rho >= 0 && q1 > 0 && first <= math.MaxFloat64) || gap != gap {
		v := onCircle(a, rho, q, q1)
		if gap != gap {
			v = gap
		}
		return v, v, math.NaN()
	}
	mean, geo := first, 2*math.Sqrt(far*near)
	e := mean * geo
	k, xa, xb := 2.0, 0.0, 1.0
	wide := max(a, rho)
	if abs >= wide {
		for {
			im := 1 / mean
			xa, xb = xa+float64(xb*im), 2*(xb+float64(geo*xa))
			k += k
			old := mean
			mean += geo
			if math.Abs(old-geo) <= agmEnd*old {
				break
			}
			geo = 2 * math.Sqrt(e)
			e = geo * mean
		}
		u, t1 = closePotential(a, rho, first, mean, k, xb+float64(xa*mean))
		omega, _ = smooth(a, rho, abs)
		return u, t1, math.Copysign(omega, z)
	}
	// Everything of the characteristic is multiplied by a+rho where that
	// saves a division: tau = ι/|gap|, p0 = 1+γ or 1.
	ag := math.Abs(gap)
	sn, gf := float64(sum*near), float64(ag*far)
	tau := sum / (float64(sum*sn) + float64(ag*gf))
	iota := ag * tau
	pa, pb := sum+ag, 2*(gf+sn)
	if gap < 0 {
		pa, pb = 1, float64(-4*wide*(z*z/(sn+gf)))
	}
	for {
		im := 1 / mean
		ei := e * iota
		iw := 1 / (1 + float64(ei*iota))
		pa, pb = pa+float64(pb*iota), 2*(pb+float64(ei*pa))
		xa, xb = xa+float64(xb*im), 2*(xb+float64(geo*xa))
		iota *= iw
		tau *= iw
		k += k
		old := mean
		mean += geo
		if math.Abs(old-geo) <= agmEnd*old {
			break
		}
		geo = 2 * math.Sqrt(e)
		e = geo * mean
	}
	u, t1 = closePotential(a, rho, first, mean, k, xb+float64(xa*mean))
	if z == 0 {
		return u, t1, 0
	}
	if gap < 0 {
		tau *= 2 * min(a, rho)
	}
	omega = 2 * math.Pi * a * abs * ((pb + float64(pa*mean)) * tau) / (mean * (1 + float64(mean*iota)) * sum)
	if gap >= 0 {
		omega = 2*math.Pi - omega
	}
	return u, t1, math.Copysign(1, z) * omega
}
