package closedform

import (
	"math"

	"gonum.org/v1/gonum/mathext"
)

// powerDifference returns (r^e - a^e)/e, and log(r/a) for e = 0, without
// cancellation for r near a or e near 0. It is NaN for r = 0 and e <= 0.
func powerDifference(r, a, e float64) float64 {
	if r == 0 {
		if e > 0 {
			return -math.Pow(a, e) / e
		}
		return math.NaN()
	}
	l := math.Log(r / a)
	if math.Abs(r-a) < a/2 {
		l = math.Log1p((r - a) / a)
	}
	switch {
	case e == 0:
		return l
	case math.Abs(e*l) > 1:
		return (math.Pow(r, e) - math.Pow(a, e)) / e
	}
	return math.Pow(a, e) * math.Expm1(e*l) / e
}

// asinhExcess returns asinh(a/|u|) - t = atanh(t) - t with t = a/sqrt(a^2 + u^2).
func asinhExcess(a, u float64) float64 {
	t := a / math.Hypot(a, u)
	if t > 0.4 {
		return math.Asinh(a/math.Abs(u)) - t
	}
	return t * oddTail(t*t)
}

// oddTail returns sum over k >= 1 of q^k/(2k+1), |q| <= 0.16: 22 terms leave
// less than 2^-56 of the first.
func oddTail(q float64) float64 {
	s := 0.0
	for k := 22; k >= 1; k-- {
		s = q * (1/float64(2*k+1) + s)
	}
	return s
}

// hyperTail returns 2F1(a,b;2;x) - 1 for |x| <= 0.4 by its series
// (https://dlmf.nist.gov/15.2.E1).
func hyperTail(a, b, x float64) float64 {
	term, sum := 1.0, 0.0
	for n := 0.0; n < 60; n++ {
		term *= (a + n) * (b + n) / ((2 + n) * (1 + n)) * x
		sum += term
		if math.Abs(term) <= 0x1p-56*math.Abs(sum) {
			break
		}
	}
	return sum
}

// legendreD returns D = (K-E)/k^2 from the complementary modulus kc > 0
// (https://dlmf.nist.gov/19.25.E1); below 1e-15 by its leading term, exact to rounding.
func legendreD(kc float64) float64 {
	if kc < 1e-15 {
		return math.Log(4/kc) - 1
	}
	return mathext.EllipticRD(0, kc*kc, 1) / 3
}

// legendreE returns E from the complementary modulus kc > 0
// (https://dlmf.nist.gov/19.25.E1, sum of two positive terms); 1 below 1e-15.
func legendreE(kc float64) float64 {
	if kc < 1e-15 {
		return 1
	}
	return kc * kc * (mathext.EllipticRD(0, kc*kc, 1) + mathext.EllipticRD(0, 1, kc*kc)) / 3
}

// legendreEExcess returns (E - 1)/kc^2 from the complementary modulus kc > 0, by the
// logarithmic series (https://dlmf.nist.gov/19.12.E2) where E is near 1.
func legendreEExcess(kc float64) float64 {
	if kc > 0.45 {
		return (legendreE(kc) - 1) / (kc * kc)
	}
	c, d, sum := 1.0, 2*math.Ln2-math.Log(kc), 0.0
	for n := 0.0; n < 30; n++ {
		pair := (2*n + 1) * (2*n + 2)
		term := c * (d - 1/pair)
		sum += term
		if term <= 0x1p-56*sum {
			break
		}
		c *= (n + 0.5) * (n + 1.5) / ((n + 2) * (n + 1)) * (kc * kc)
		d -= 2 / pair
	}
	return sum / 2
}
