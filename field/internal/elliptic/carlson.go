package elliptic

import (
	"math"

	"example.com/boundpole/field/internal/logatan"
)

// The duplication theorem quarters the spread of the arguments; what remains
// is a series in symmetric functions. A loop ends when the neglected terms of
// order 8 are below a quarter unit of rounding: (3u)^(-1/8) and (u/4)^(-1/8)
// times the first spread, u = 2^-53.
const (
	spreadF = 86
	spreadD = 117
)

// RF returns Carlson's R_F(x,y,z) = 1/2 ∫ dt/sqrt((t+x)(t+y)(t+z)), t from 0
// to infinity.
//
// Domain: x, y, z >= 0, at most one of them zero; finite.
// Accuracy: relative error <= 1e-15 (TestCarlsonReference).
// Source: [Carlson1995]; series [DLMF] 19.36.1,
// https://dlmf.nist.gov/19.36.E1 (from memory).
func RF(x, y, z float64) float64 {
	if !inDomain(x, y, z) {
		return math.NaN()
	}
	a0 := (x + y + z) / 3
	a, f := a0, 1.0
	spread := spreadF * max(math.Abs(a0-x), math.Abs(a0-y), math.Abs(a0-z))
	x0, y0 := x, y
	for spread*f > a {
		lam := lambda(math.Sqrt(x), math.Sqrt(y), math.Sqrt(z))
		a, x, y, z = (a+lam)*0.25, (x+lam)*0.25, (y+lam)*0.25, (z+lam)*0.25
		f *= 0.25
	}
	u, v := (a0-x0)*f/a, (a0-y0)*f/a
	w := -u - v
	e2 := math.FMA(u, v, -float64(w*w))
	e3 := float64(u*v) * w
	s := math.FMA(e2, -5.0/208, 1.0/24)
	s = math.FMA(s, e2, -0.1)
	s = math.FMA(e3, math.FMA(e2, 1.0/16, -3.0/44), s)
	s = math.FMA(s, e2, float64(e3*math.FMA(e3, 3.0/104, 1.0/14)))
	return (1 + s) / math.Sqrt(a)
}

// RC returns Carlson's R_C(x,y) = R_F(x,y,y).
//
// Domain: x >= 0, y > 0; finite. (The principal value for y < 0 is not
// offered.)
// Accuracy: relative error <= 1e-15, also for x close to y
// (TestCarlsonReference).
func RC(x, y float64) float64 {
	if !(x >= 0 && y > 0 && x <= math.MaxFloat64 && y <= math.MaxFloat64) {
		return math.NaN()
	}
	switch {
	case x < y:
		r := math.Sqrt(y - x)
		return logatan.Atan2(r, math.Sqrt(x)) / r
	case x > y: // log((√x+r)²/y)/2r, (√x+r)²/y = 1 + 2r(√x+r)/y
		r := math.Sqrt(x - y)
		return logatan.Log1pRatio(2*r*(math.Sqrt(x)+r), y) / (2 * r)
	}
	return 1 / math.Sqrt(x)
}

// RD returns Carlson's R_D(x,y,z) = R_J(x,y,z,z).
//
// Domain: x, y >= 0, at most one of them zero, z > 0; finite.
// Accuracy: relative error <= 1e-15 (TestCarlsonReference).
// Source: as RF.
func RD(x, y, z float64) float64 {
	if !inDomain(x, y, z) || z == 0 {
		return math.NaN()
	}
	a0 := float64((x + y + float64(3*z)) * 0.2)
	a, f, sum := a0, 1.0, 0.0
	spread := spreadD * max(math.Abs(a0-x), math.Abs(a0-y), math.Abs(a0-z))
	x0, y0 := x, y
	for spread*f > a {
		rz := math.Sqrt(z)
		lam := lambda(math.Sqrt(x), math.Sqrt(y), rz)
		sum += f / (rz * (z + lam))
		a, x, y, z = (a+lam)*0.25, (x+lam)*0.25, (y+lam)*0.25, (z+lam)*0.25
		f *= 0.25
	}
	u, v := (a0-x0)*f/a, (a0-y0)*f/a
	w := -(u + v) / 3
	uv, ww := float64(u*v), float64(w*w)
	e2 := uv - float64(6*ww)
	e3 := (float64(3*uv) - float64(8*ww)) * w
	e4 := 3 * (uv - ww) * ww
	e5 := uv * ww * w
	return math.FMA(3, sum, f*seriesJ(e2, e3, e4, e5)/(a*math.Sqrt(a)))
}

// RJ returns Carlson's
// R_J(x,y,z,p) = 3/2 ∫ dt/((t+p) sqrt((t+x)(t+y)(t+z))), t from 0 to infinity.
//
// Domain: x, y, z >= 0, at most one of them zero, p > 0; finite. (The
// principal value for p < 0 is not offered.)
// Accuracy: relative error <= 2e-15 (TestCarlsonReference).
// Source: as RF. The published step takes R_C(1,1+e) with an e that cancels
// in 1+e for p << x,y,z; with λ = √x√y+√x√z+√y√z and
//
//	s = p(√x+√y+√z) + √x√y√z,  t = √p(p+λ),  s + t = (√p+√x)(√p+√y)(√p+√z)
//
// both e = (t-s)/(s+t) and 1+e = 2t/(s+t) keep their digits.
func RJ(x, y, z, p float64) float64 {
	if !inDomain(x, y, z) || !(p > 0 && p <= math.MaxFloat64) {
		return math.NaN()
	}
	a0 := float64((x + y + z + 2*p) * 0.2)
	a, f, sum := a0, 1.0, 0.0
	spread := spreadD * max(math.Abs(a0-x), math.Abs(a0-y), math.Abs(a0-z), math.Abs(a0-p))
	x0, y0, z0 := x, y, z
	for spread*f > a {
		rx, ry, rz, rp := math.Sqrt(x), math.Sqrt(y), math.Sqrt(z), math.Sqrt(p)
		lam := lambda(rx, ry, rz)
		s := math.FMA(p, rx+ry+rz, rx*ry*rz)
		t := float64(rp * (p + lam))
		d := s + t
		sum += float64(f / d * rcNear(t-s, t, d))
		a, x, y, z, p = (a+lam)*0.25, (x+lam)*0.25, (y+lam)*0.25, (z+lam)*0.25, (p+lam)*0.25
		f *= 0.25
	}
	u, v, w := (a0-x0)*f/a, (a0-y0)*f/a, (a0-z0)*f/a
	q := -(u + v + w) * 0.5
	uvw, qq := float64(u*v*w), float64(q*q)
	e2 := math.FMA(u, v, float64(w*(u+v))) - float64(3*qq)
	e3 := math.FMA(2*q, e2+float64(2*qq), uvw)
	e4 := q * math.FMA(q, e2+float64(3*qq), 2*uvw)
	e5 := uvw * qq
	return math.FMA(6, sum, f*seriesJ(e2, e3, e4, e5)/(a*math.Sqrt(a)))
}

// rcNear returns R_C(1, 1+e) with e = diff/d and 1+e = 2t/d.
func rcNear(diff, t, d float64) float64 {
	switch {
	case diff > 0:
		r := math.Sqrt(diff / d)
		return logatan.Atan(r) / r
	case diff < 0:
		r := math.Sqrt(-diff / d)
		return logatan.Log1pRatio(r*(1+r)*d, t) / (2 * r)
	}
	return 1
}

// seriesJ returns the series DLMF 19.36.2 of R_J and R_D about equal
// arguments, to order 7 (from memory; held by TestCarlsonReference).
func seriesJ(e2, e3, e4, e5 float64) float64 {
	s := math.FMA(e2, -1.0/16, 9.0/88)
	s = math.FMA(s, e2, -3.0/14)
	s = math.FMA(e3, math.FMA(e2, 45.0/272, -9.0/52), s)
	s = math.FMA(e4, 3.0/20, s)
	s = math.FMA(e5, -9.0/68, s)
	s = math.FMA(s, e2, 3.0/26*e5)
	s = math.FMA(e4, math.FMA(e3, -9.0/68, -3.0/22), s)
	return 1 + math.FMA(e3, math.FMA(e3, 3.0/40, 1.0/6), s)
}

// lambda returns xy + xz + yz.
func lambda(x, y, z float64) float64 { return math.FMA(x, y, float64(z*(x+y))) }

// inDomain reports whether x, y, z are finite, not negative, and at most one
// of them is zero.
func inDomain(x, y, z float64) bool {
	return x >= 0 && y >= 0 && z >= 0 && max(x, y, z) <= math.MaxFloat64 &&
		x+y > 0 && x+z > 0 && y+z > 0
}
