package elliptic

import "math"

// agmEnd ends an arithmetic-geometric mean: numbers that differ by less than
// this relatively agree to 2^-54 after one more step, for a difference δ
// becomes δ²/8 and is felt by half.
const agmEnd = 2e-8

// Complete returns the complete elliptic integrals at the complementary
// modulus kc²: with Δ² = cos²θ + kc² sin²θ and θ from 0 to π/2,
//
//	K = ∫ dθ/Δ,  E = ∫ Δ dθ,  B = ∫ cos²θ/Δ dθ,  D = ∫ sin²θ/Δ dθ.
//
// Identities: K = B + D, E = B + kc² D.
// Domain: kc² >= 0; values above 1 (imaginary modulus) included.
// Accuracy: relative error <= 1.5e-15 (TestCompleteReference, kc² from 1e-45).
//
// Special cases are:
//
//	Complete(0) = +Inf, 1, 1, +Inf
//	Complete(+Inf) = 0, +Inf, 0, 0
//
// Source: [Bulirsch1965] (cel2, from memory): one
// arithmetic-geometric mean carries the numerators (1,0) and (0,1); every term
// is positive.
func Complete(kc2 float64) (k, e, b, d float64) {
	switch {
	case !(kc2 >= 0):
		nan := math.NaN()
		return nan, nan, nan, nan
	case kc2 == 0:
		return math.Inf(1), 1, 1, math.Inf(1)
	case kc2 > math.MaxFloat64:
		return 0, math.Inf(1), 0, 0
	}
	kc := math.Sqrt(kc2)
	m, g := 1.0, kc
	var ba, bb, da, db float64 = 1, 0, 0, 1
	for {
		im := 1 / m
		ba, bb = ba+float64(bb*im), 2*(bb+float64(g*ba))
		da, db = da+float64(db*im), 2*(db+float64(g*da))
		old := m
		m += g
		if math.Abs(old-g) <= agmEnd*old {
			break
		}
		g = 2 * math.Sqrt(old*g)
	}
	c := math.Pi / 4 / m / m
	b = float64(c * (bb + float64(ba*m)))
	d = float64(c * (db + float64(da*m)))
	return b + d, b + float64(kc2*d), b, d
}

// K returns the complete integral of the first kind at kc²; see Complete.
func K(kc2 float64) float64 { k, _, _, _ := Complete(kc2); return k }

// E returns the complete integral of the second kind at kc²; see Complete.
func E(kc2 float64) float64 { _, e, _, _ := Complete(kc2); return e }

// B returns ∫ cos²θ/Δ dθ at kc²; see Complete.
func B(kc2 float64) float64 { _, _, b, _ := Complete(kc2); return b }

// D returns ∫ sin²θ/Δ dθ at kc²; see Complete.
func D(kc2 float64) float64 { _, _, _, d := Complete(kc2); return d }

// Cel returns Bulirsch's general complete integral
//
//	∫ (a cos²θ + b sin²θ)/((cos²θ + p sin²θ) sqrt(cos²θ + kc² sin²θ)) dθ,
//
// θ from 0 to π/2. Identity: Cel(kc,1,1,1) = K(kc²).
//
// Domain: kc != 0 (its sign is ignored), p > 0.
// Accuracy: relative error <= 2e-15 if a and b do not differ in sign
// (TestCelReference); where they do, the two parts cancel.
// Source: [Bulirsch1969].
func Cel(kc, p, a, b float64) float64 {
	kc = math.Abs(kc)
	if !(kc > 0 && p > 0 && kc <= math.MaxFloat64 && p <= math.MaxFloat64) {
		return math.NaN()
	}
	p = math.Sqrt(p)
	b /= p
	m, g, e := 1.0, kc, kc
	for {
		ip := 1 / p
		h := float64(e * ip)
		a, b = a+float64(b*ip), 2*(b+float64(a*h))
		p += h
		old := m
		m += g
		if math.Abs(old-g) <= agmEnd*old {
			return math.Pi / 2 * (b + float64(a*m)) / (m * (m + p))
		}
		g = 2 * math.Sqrt(e)
		e = g * m
	}
}
