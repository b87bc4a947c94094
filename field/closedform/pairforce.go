package closedform

import (
	"math"

	"gonum.org/v1/gonum/mathext"
	"gonum.org/v1/gonum/spatial/r3"
)

// CoaxialPairForce returns the axial force on the upper of two coaxial cylinders of the
// different radii a1 (lower) and a2 (upper) and lengths L1 and L2, uniformly polarized
// along +z by p1 and p2, faces the gap > 0 apart.
//
// Units: p squared times length squared (times mu0, or over eps0).
// Frame: common axis z; positive pushes the upper cylinder up.
// Domain: radii, lengths and gap finite and positive, a1 != a2 (see CoaxialCylinderForce).
// NaN otherwise.
// Singular: nowhere for gap > 0; the contact limit is finite.
// Accuracy: relative error <= 1e-12 (worst 4.5e-14 of 6 points, TestReference).
// The four terms cancel far away, by about (gap/L)^2 (gap/a)^2 units.
// Source: [Robertson2012] (from memory): p1 p2/2 times the second difference of
// z a2 a3 (K - E/a2 + (z^2/a3^2 - 1) Pi(a4/(1-a2) | a4)), a2 = 1 + (R1-R2)^2/z^2,
// a3^2 = (R1+R2)^2 + z^2, a4 = 4 R1 R2/a3^2.
func CoaxialPairForce(p1, p2, a1, L1, a2, L2, gap float64) float64 {
	if !finite(p1, p2) || !positive(a1, L1, a2, L2, gap) || a1 == a2 {
		return math.NaN()
	}
	near := solenoidEnds(a1, a2, gap) - solenoidEnds(a1, a2, gap+L1)
	far := solenoidEnds(a1, a2, gap+L2) - solenoidEnds(a1, a2, gap+L1+L2)
	return p1 * p2 / 2 * (near - far)
}

// solenoidEnds is the term of one pair of ends of CoaxialPairForce.
func solenoidEnds(a, b, z float64) float64 {
	q := (a - b) / z
	a2 := 1 + q*q
	a3 := math.Hypot(a+b, z)
	m := 4 * (a / a3) * (b / a3)
	kc := math.Hypot(a-b, z) / a3 // kc^2 = 1 - m
	s := (a + b) / a3             // 1 - z^2/a3^2
	return z * a2 * a3 * (mathext.CompleteK(m) - mathext.CompleteE(m)/a2 - s*s*legendrePi(kc, 1+m/(q*q)))
}

// legendrePi returns the complete integral Pi(n | 1 - kc^2) for p = 1 - n > 0 by Bartky's
// transformation [Bulirsch1965].
func legendrePi(kc, p float64) float64 {
	a, b, e, m := 1.0, 1.0, kc, 1.0
	p = math.Sqrt(p)
	b /= p
	for {
		f := a
		a += b / p
		g := e / p
		b = 2 * (b + f*g)
		p += g
		g = m
		m += kc
		if math.Abs(g-kc) <= 1e-8*g {
			break
		}
		kc = 2 * math.Sqrt(e)
		e = kc * m
	}
	return math.Pi / 2 * (b + a*m) / (m * (m + p))
}

// CuboidForce returns the force on a box with the edges s2 and its centre at d by a box
// with the edges s1 and its centre at the origin, edges parallel, polarized along z by
// p1 and p2.
//
// Units: p squared times length squared (times mu0, or over eps0).
// Frame: edges along x, y and z; d from the centre of the first box to that of the second.
// Domain: edges finite and positive, d finite, no overlap. NaN for other edges; boxes that
// overlap get a value that means nothing.
// Singular: nowhere; in contact along z and elsewhere the limit is finite, but an edge on
// an edge gives NaN.
// Accuracy: relative error <= 1e-12 (worst 4.8e-15 of 4 points, TestReference) up to two
// sizes of distance; the sum of 64 terms loses the fourth power of the distance in sizes.
// Source: [Akoun1984]; sum of (+-)/4pi of x: (V^2-W^2)/2 log(r-U) + UV log(r-V) + VW
// atan(UV/(rW)) + rU/2, z: -UW log(r-U) - VW log(r-V) + UV atan(UV/(rW)) - rW.
func CuboidForce(p1, p2 float64, s1, s2, d r3.Vec) r3.Vec {
	if !finite(p1, p2) || !positive(s1.X, s1.Y, s1.Z, s2.X, s2.Y, s2.Z) || !finiteVec(d) {
		return nanVec()
	}
	unit := math.Ldexp(1, -math.Ilogb(s1.X)) // the logarithms of lengths cancel only in exact arithmetic
	s1, s2, d = r3.Scale(unit, s1), r3.Scale(unit, s2), r3.Scale(unit, d)
	var f r3.Vec
	ends := [2]float64{-0.5, 0.5}
	for i, a := range ends {
		for j, b := range ends {
			for k, c := range ends {
				for l, e := range ends {
					for p, g := range ends {
						for q, h := range ends {
							t := cuboidCorner(d.X+e*s2.X-a*s1.X, d.Y+g*s2.Y-b*s1.Y, d.Z+h*s2.Z-c*s1.Z)
							if (i+j+k+l+p+q)%2 != 0 {
								t = r3.Scale(-1, t)
							}
							f = r3.Add(f, t)
						}
					}
				}
			}
		}
	}
	return r3.Scale(p1/unit*(p2/unit)/fourPi, f)
}

// cuboidCorner returns the term of one pair of corners.
func cuboidCorner(u, v, w float64) r3.Vec {
	r := norm(r3.Vec{X: u, Y: v, Z: w})
	lu, lv := lessLog(r, u, v, w), lessLog(r, v, u, w)
	angle := math.Atan2(u*v, r*w)
	if w < 0 {
		angle = -math.Atan2(u*v, -r*w)
	}
	return r3.Vec{
		X: (v*v-w*w)/2*lu + u*v*lv + v*w*angle + r*u/2,
		Y: (u*u-w*w)/2*lv + u*v*lu + u*w*angle + r*v/2,
		Z: -u*w*lu - v*w*lv + u*v*angle - r*w,
	}
}

// lessLog returns log(r - u) with r^2 = u^2 + v^2 + w^2.
func lessLog(r, u, v, w float64) float64 {
	if u <= 0 {
		return math.Log(r - u)
	}
	return math.Log((v*v + w*w) / (r + u))
}
