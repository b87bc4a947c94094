package element

import (
	"math"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/internal/elliptic"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// graded integrates f over lo..hi by 16-point rules on panels that halve towards 0, down to the scale small.
func graded(lo, hi, small float64, f func(s float64) float64) float64 {
	rule := func(lo, hi, sign float64) (sum float64) {
		c, h := 0.5*(lo+hi), 0.5*(hi-lo)
		for _, g := range gauss16 {
			sum += h * g.w * (f(sign*(c-h*g.x)) + f(sign*(c+h*g.x)))
		}
		return sum
	}
	side := func(from, to, sign float64) (sum float64) {
		for to > from {
			mid := max(0.5*to, from)
			if to < small {
				mid = from
			}
			sum += rule(mid, to, sign)
			to = mid
		}
		return sum
	}
	return side(max(lo, 0), hi, 1) + side(max(-hi, 0), -lo, -1)
}

// TestBandIntegral holds the product rule against graded panels of the ring potential.
func TestBandIntegral(t *testing.T) {
	for _, c := range []struct{ rho, lo, hi float64 }{
		{0.5, -0.3, 1.1}, {1.3, -2, 5}, {1.1, 0.5, 0.7}, {0, -0.7, 0.7}, {1e-6, 0.2, 3}, {1, -1000, 1000}, {1, -0.001, 0}, {1, 0.1, 0.2}, {0.9, -2, -1},
	} {
		for _, d := range []float64{1 - c.rho, 1e-2, 1e-5, -1e-8, 1e-12} {
			rho := 1 - d
			line := band{a: 1, rho: rho, near: d, axial: true}
			if d == 0 {
				continue
			}
			got := line.integral(c.lo, c.hi)
			want := graded(c.lo, c.hi, 0.25*math.Abs(d), func(s float64) float64 {
				u, _, _, _ := elliptic.Ring(1, rho, s, d*d+s*s)
				return u
			})
			if e := math.Abs(got/want - 1); !(e < 4e-15) { // 20 u: two rules of some hundred positive terms
				t.Errorf("wall at rho = %v, %v..%v: got %v want %v, %.2g", rho, c.lo, c.hi, got, want, e)
			}
		}
	}
	for _, z := range []float64{0.1, 1e-3, -1e-6, 1e-12} {
		const lo, hi, rho = -0.02, 0.05, 0.98
		line := band{a: 1, rho: rho, near: z}
		got := line.integral(lo, hi)
		want := graded(lo, hi, 0.25*math.Abs(z), func(s float64) float64 {
			u, _, _, _ := elliptic.Ring(rho+s, rho, z, s*s+z*z)
			return u
		})
		if e := math.Abs(got/want - 1); !(e < 4e-15) { // as above
			t.Errorf("annulus at z = %v: got %v want %v, %.2g", z, got, want, e)
		}
	}
}

// TestWallRings holds walls against rings of charge summed by graded panels.
func TestWallRings(t *testing.T) {
	const density, cos, sin = 0.7, 1.1, -0.4
	for _, shape := range []geom.Wall{{Radius: 0.9, Z1: -0.5, Z2: 1.1}, {Radius: 1, Z1: 0.25, Z2: 0.251}, {Radius: 0.1, Z1: -20, Z2: 20}} {
		w := must(NewWall(shape, density, cos, sin))
		a, h, zc := shape.Radius, 0.5*(shape.Z2-shape.Z1), 0.5*(shape.Z1+shape.Z2)
		for _, d := range []float64{-0.5, -0.05, -1e-3, 1e-3, 0.02, 0.3, 0.5, 2, 20, 300} { // rho - a by a
			for _, f := range []float64{-3, -1.001, -0.7, 0, 0.99, 1.2, 40} { // height by h
				rho, z := a*(1+d), zc+f*h
				gap := -a * d
				ring := func(q func(u, t1, s3, c3, zeta float64) float64) float64 {
					return over4P * graded(shape.Z1-z, shape.Z2-z, 0.2*math.Abs(gap), func(s float64) float64 {
						u, t1, s3, c3 := elliptic.Ring(a, rho, s, gap*gap+s*s)
						return q(u, t1, s3, c3, -s)
					})
				}
				ex, ey := 0.6, 0.8
				k, across := cos*ex+sin*ey, sin*ex-cos*ey
				t1 := ring(func(_, t1, _, _, _ float64) float64 { return t1 })
				phi := density*ring(func(u, _, _, _, _ float64) float64 { return u }) + k*t1
				// of the ring cos(phi): -dT1/drho = T1/rho - a (a S3 - rho C3)
				radial := density*ring(func(_, _, s3, c3, _ float64) float64 { return a * (rho*s3 - a*c3) }) +
					k*ring(func(_, t1, s3, c3, _ float64) float64 { return t1/rho - a*(a*s3-rho*c3) })
				axial := ring(func(_, _, s3, c3, zeta float64) float64 { return a * zeta * (density*s3 + k*c3) })
				g := r3.Vec{X: radial*ex + across*t1/rho*ey, Y: radial*ey - across*t1/rho*ex, Z: axial}
				v := field.At(w, r3.Vec{X: rho * ex, Y: rho * ey, Z: z}, field.Mean, field.WantPhi|field.WantG|field.WantErr)
				bound := math.Hypot(a, h)
				near := min(1, bound/math.Hypot(rho, z-zc))
				if e := math.Abs(v.Phi - phi); !(e <= 1e-13*max(math.Abs(phi), 1.9e-3*bound*near)) { // the aim of the contract
					t.Errorf("%+v at rho %v z %v: phi %v, rings %v", shape, rho, z, v.Phi, phi)
				}
				// rounding of x moves a point 1e-3 a from the wall by 2e-13 of that distance
				if e := r3.Norm(r3.Sub(v.G, g)); !(e <= 2e-13*max(r3.Norm(g), 1.9e-3*near*near)) {
					t.Errorf("%+v at rho %v z %v: g %v, rings %v, %.2g", shape, rho, z, v.G, g, e/r3.Norm(g))
				}
			}
		}
	}
}
