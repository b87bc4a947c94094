package elliptic

import (
	"math"
	"math/rand/v2"
	"testing"
)

// values lists the fields of c in the order of their declaration.
func values(c Circle) [9]float64 {
	return [9]float64{c.U, c.T1, c.S3, c.C3, c.Omega, c.S, c.E, c.C, c.G}
}

// places calls f at seeded places round a circle of radius 1, until t fails.
func places(t *testing.T, n int, f func(a, rho, z, gap, q1 float64)) {
	rnd := rand.New(rand.NewPCG(3, 5))
	for i := 0; i < n && !t.Failed(); i++ {
		gap := 1 - 3*rnd.Float64()
		if rnd.IntN(2) == 0 {
			gap = math.Ldexp(gap, -rnd.IntN(30))
		}
		z := math.Ldexp(rnd.Float64()-0.5, 3-rnd.IntN(12))
		gap = min(gap, 1)
		f(1, 1-gap, z, 1-(1-gap), (1-(1-gap))*(1-(1-gap))+z*z)
	}
}

// near compares with a tolerance relative to scale.
func near(t *testing.T, what string, got, want, scale, tol float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tol*math.Abs(scale)) {
		t.Errorf("%s: got %v, want %v, error %.2e of %v, tolerance %.1e", what, got, want, math.Abs((got-want)/scale), scale, tol)
	}
}

// TestRingBits: Ring, Disc and OfCircle agree bit by bit.
func TestRingBits(t *testing.T) {
	places(t, 2000, func(a, rho, z, gap, q1 float64) {
		c := OfCircle(a, rho, z, gap, q1)
		u, t1, s3, c3 := Ring(a, rho, z, q1)
		if du, dt1, omega := Disc(a, rho, z, gap, q1); du != u || dt1 != t1 || omega != c.Omega {
			t.Errorf("Disc(%v, %v, %v, %v, %v) = %v %v %v, OfCircle has %v %v %v", a, rho, z, gap, q1, du, dt1, omega, c.U, c.T1, c.Omega)
		}
		if u != c.U || t1 != c.T1 || s3 != c.S3 || c3 != c.C3 {
			t.Errorf("Ring(%v, %v, %v, %v) = %v %v %v %v, OfCircle has %v %v %v %v", a, rho, z, q1, u, t1, s3, c3, c.U, c.T1, c.S3, c.C3)
		}
	})
}

// TestCircleCarlson compares with the classical forms in Carlson's integrals,
// where these do not cancel.
func TestCircleCarlson(t *testing.T) {
	places(t, 2000, func(a, rho, z, gap, q1 float64) {
		if rho < 0.2 {
			return
		}
		c := OfCircle(a, rho, z, gap, q1)
		sum := a + rho
		big := sum*sum + z*z
		k2, g := q1/big, gap/sum
		n := 4 * a * rho / (sum * sum)
		k, d, j := RF(0, k2, 1), RD(0, k2, 1)/3, RJ(0, k2, 1, g*g)/3
		near(t, "U", c.U, 4*a/math.Sqrt(big)*k, c.U, 2e-15)                                            // a few roundings
		near(t, "T1", c.T1, 4*a/math.Sqrt(big)*(2*d-k), c.U, 4e-15)                                    // 2D-K cancels
		near(t, "C", c.C, k+g*(1-g)*j, k+math.Abs(g*(1-g)*j), 4e-15)                                   // sum cancels outside
		near(t, "G", c.G, (d-g*g*j)/n, d/n, 4e-15)                                                     // difference cancels
		near(t, "S", c.S, 16*a*a*z/(sum*sum*math.Sqrt(big))*c.G, c.S, 2e-15)                           // definition
		near(t, "rho E", rho*c.E, z*c.U+a*c.Omega-wall(a, z, gap), math.Abs(z*c.U)+2*math.Pi*a, 3e-15) // identity, absolute
	})
}

// wall returns 2π a sgn z inside the cylinder, 0 outside, the mean on it.
func wall(a, z, gap float64) float64 {
	switch {
	case gap > 0:
		return math.Copysign(2*math.Pi*a, z)
	case gap == 0:
		return math.Copysign(math.Pi*a, z)
	}
	return 0
}

// TestCircleScaling: a power of two in all lengths changes no bit but the
// unit; the mirror in the plane changes the sign of Omega, S and E.
func TestCircleScaling(t *testing.T) {
	places(t, 2000, func(a, rho, z, gap, q1 float64) {
		v := values(OfCircle(a, rho, z, gap, q1))
		const f = 0x1p40
		w := values(OfCircle(f*a, f*rho, f*z, f*gap, f*f*q1))
		w[2], w[3] = w[2]*f*f*f, w[3]*f*f*f
		if v != w {
			t.Errorf("at (%v, %v, %v): %v, scaled %v", a, rho, z, v, w)
		}
		m := values(OfCircle(a, rho, -z, gap, q1))
		m[4], m[5], m[6] = -m[4], -m[5], -m[6]
		if v != m {
			t.Errorf("at (%v, %v, %v): %v, mirrored %v", a, rho, z, v, m)
		}
	})
}

// TestOmegaAcrossSurfaces: Omega is continuous across rho = a, E and Omega
// jump by 2π across the wall and the disc.
func TestOmegaAcrossSurfaces(t *testing.T) {
	const h = 1e-13
	at := func(gap, z float64) Circle { return OfCircle(1, 1-gap, z, gap, gap*gap+z*z) }
	for _, z := range []float64{0.01, 0.7, 0.999, 1.001, 3, 50} {
		in, on, out := at(h, z), at(0, z), at(-h, z)
		near(t, "Omega inside-on", in.Omega, on.Omega, 1, 1e-10) // slope below 1/z
		near(t, "Omega on-outside", on.Omega, out.Omega, 1, 1e-10)
		near(t, "E outside-inside", out.E-in.E, 2*math.Pi, 1, 1e-10)
		near(t, "E mean", on.E, (in.E+out.E)/2, 1, 1e-10)
	}
	for _, gap := range []float64{1, 0.5, 0.01} {
		up, on, down := at(gap, h), at(gap, 0), at(gap, -h)
		near(t, "Omega over the disc", up.Omega, 2*math.Pi, 1, 1e-10)
		near(t, "Omega under the disc", down.Omega, -2*math.Pi, 1, 1e-10)
		near(t, "Omega in the disc", on.Omega, 0, 1, 0)
	}
}

func TestCircleSpecial(t *testing.T) {
	inf, nan := math.Inf(1), math.NaN()
	if v := values(OfCircle(1, 1, 0, 0, 0)); v[0] != inf || v[1] != inf || v[2] != inf || v[3] != inf || v[5] != 0 ||
		v[4] == v[4] || v[6] == v[6] || v[7] == v[7] || v[8] == v[8] {
		t.Errorf("on the circle: %v, want +Inf +Inf +Inf +Inf NaN 0 NaN NaN NaN", v)
	}
	if u, t1, omega := Disc(1, 1, 0, 0, 0); u != inf || t1 != inf || omega == omega {
		t.Errorf("Disc on its rim: %v %v %v, want +Inf +Inf NaN", u, t1, omega)
	}
	for _, x := range [][5]float64{
		{nan, 1, 1, 0, 1}, {1, nan, 1, 0, 1}, {1, 1, nan, 0, 1}, {1, 1, 1, nan, 1}, {1, 1, 1, 0, nan},
		{0, 1, 1, -1, 2}, {-1, 1, 1, -2, 5}, {1, -1, 1, 2, 5}, {1, 1, 1, 0, -1},
		{inf, 1, 1, inf, inf}, {1, inf, 1, -inf, inf}, {1, 1, inf, 0, inf}, {1, 2, 0, -1, inf},
	} {
		for i, v := range values(OfCircle(x[0], x[1], x[2], x[3], x[4])) {
			if v == v {
				t.Errorf("OfCircle%v: value %d is %v, want NaN", x, i, v)
			}
		}
		if u, t1, omega := Disc(x[0], x[1], x[2], x[3], x[4]); u == u || t1 == t1 || omega == omega {
			t.Errorf("Disc%v = %v %v %v, want NaN", x, u, t1, omega)
		}
		if u, t1, s3, c3 := Ring(x[0], x[1], x[2], x[4]); x[3] == x[3] && (u == u || t1 == t1 || s3 == s3 || c3 == c3) {
			t.Errorf("Ring%v = %v %v %v %v, want NaN", x, u, t1, s3, c3)
		}
	}
	v := values(OfCircle(2, 0, 0, 2, 4))
	for i, want := range [9]float64{2 * math.Pi, 0, math.Pi / 4, 0, 0, 0, 0, math.Pi / 2, math.Pi / 16} {
		near(t, "value in the centre", v[i], want, want, 1e-15) // documented bound
	}
}

// TestSmoothRule: the nodes are those of the midpoint rule, and each rule
// agrees at the end of its range with the longest.
func TestSmoothRule(t *testing.T) {
	last := smoothRule[len(smoothRule)-1].cos2
	for _, r := range smoothRule {
		n := 2 * len(r.cos2)
		for j, c := range r.cos2 {
			w := math.Cos((float64(j) + 0.5) * math.Pi / float64(n))
			near(t, "cos²", c, w*w, 1, 2.5e-16) // one rounding of cos and of the square
		}
		for _, ratio := range []float64{0.01, 0.1, 0.7, 1, 1.9, 40} { // rho/a
			z := math.Sqrt(2*ratio/r.limit - 1 - ratio*ratio) // w/s = limit
			if !(z >= max(1, ratio)) {
				continue
			}
			o1, e1 := midpoint(1, ratio, z, r.cos2)
			o2, e2 := midpoint(1, ratio, z, last)
			near(t, "Omega by two rules", o1, o2, o2, 2e-15) // a few roundings
			if ratio <= 1 {
				near(t, "E by two rules", e1, e2, e2, 2e-15)
			}
		}
	}
}

func TestNoAllocation(t *testing.T) {
	if n := testing.AllocsPerRun(100, func() {
		c := OfCircle(1, 0.5, 2, 0.5, 4.25)
		u, _, _, _ := Ring(1, 0.5, 0.2, 0.29)
		_, _, w := Disc(1, 0.5, 0.2, 0.5, 0.29)
		sink = c.Omega + u + w + RJ(0, 1, 2, 3) + Cel(0.3, 0.2, 1, 1)
	}); n != 0 {
		t.Errorf("%v allocations, want 0", n)
	}
}
