package element

import "math"

// rim is a circle of radius a about the axis seen from a point: d = a - rho and z, the height of the point over the plane
// of the circle, both with their full relative accuracy.
type rim struct {
	a, rho, d, z float64
	sign         float64 // side of the plane of the circle: -1, 0, +1; the caller may set it for a point on a face
	away         bool    // beyond rimFar radii, where the series take over
}

// rimFar is the distance in radii from which the potential of a disc comes from a series, for its closed form loses
// u (R/a)^2, and from which S and E are counted from infinity, for they level off. Free.
const rimFar = 3

// rim returns the circle of radius a in the plane z = end as seen from p.
func (p *roundPoint) rim(a, end float64) rim { return rimAt(a, p.rho, p.inward(a), p.height(end)) }

// rimAt returns the circle of radius a at d = a - rho and z.
func rimAt(a, rho, d, z float64) rim {
	if d == 0 && z == 0 {
		d = 0x1p-60 * a // on the rim itself: the potential to full precision, all else infinite
	}
	return rim{a: a, rho: rho, d: d, z: z, sign: sign(z), away: rho*rho+z*z > rimFar*rimFar*a*a}
}

// within is 1 inside the cylinder through the circle, 0 outside and 1/2 on it.
func (r *rim) within() float64 { return 0.5 + 0.5*sign(r.d) }

// rimSeries holds the sums over the far series of one rim.
type rimSeries struct{ i, s, e float64 }

// series sums, for R > rimFar a and z >= 0, with x = a/R, c = z/R,
//
//	I     = 2 pi a sum P_2k(0)/(2k+2) x^(2k+1) P_2k(c)                     potential of the disc
//	S     = (1/rho) int_z^inf T1 dz,   E = int_z^inf (ring field across the axis) dz
//
// the last two from int_z^inf sin P_l+1'/R^(l+2) dz = sin P_l'/(l R^(l+1)), and for l = 0 rho/(R (R + z)).
func (r *rim) series() (o rimSeries) {
	z := math.Abs(r.z)
	dist := math.Sqrt(r.rho*r.rho + z*z)
	x, c := r.a/dist, z/dist
	x2 := x * x
	p0, p1 := 1.0, c
	d0, d1 := 0.0, 1.0
	xp := 1.0
	for k, w := range ringSeries {
		n := float64(2 * k)
		t := w * xp
		o.i += t / (n + 2) * p0
		if k == 0 {
			o.s, o.e = t/2*dist/(dist+z), t*dist/(dist+z)
		} else {
			o.s += t / (n + 2) * d0 / n
			o.e += t * d0 / n
		}
		if xp < 1e-18 {
			break
		}
		p2 := ((2*n+3)*c*p1 - (n+1)*p0) / (n + 2)
		d2 := d0 + (2*n+3)*p1
		p3 := ((2*n+5)*c*p2 - (n+2)*p1) / (n + 3)
		d3 := d1 + (2*n+5)*p2
		p0, p1, d0, d1 = p2, p3, d2, d3
		xp *= x2
	}
	o.i *= 2 * math.Pi * r.a * x
	o.s *= 2 * math.Pi * x2
	o.e *= 2 * math.Pi * x * r.rho / dist
	return o
}

// ringSeries holds P_2k(0), enough for (1/rimFar)^(2k) < 1e-18.
var ringSeries = func() (t [21]float64) {
	t[0] = 1
	for k := 1; k < len(t); k++ {
		t[k] = -t[k-1] * float64(2*k-1) / float64(2*k)
	}
	return t
}()
