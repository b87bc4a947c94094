package cubature

import (
	"math"

	"example.com/boundpole/field/internal/logatan"
	"gonum.org/v1/gonum/spatial/r3"
)

// facetPowers holds the integrals of powers x^i y^j over a plane face and round its rim, as seen from a target at height h over
// the origin of x and y, with R the distance from it:
//
//	over = int x^i y^j/R dA            angle = h int x^i y^j/R^3 dA
//	rim[a] = oint m_a x^i y^j/R dl     cube[a] = oint m_a x^i y^j/R^3 dl
//
// m is the outward normal of the rim in the plane. From the divergence theorem in the plane, with K the rim integral of R,
//
//	over(i+1, j)  = K_x(i, j) - i/(i+j+2) (D(i-1, j) + h^2 over(i-1, j)),   D = oint (m.(x, y)) x^i y^j R dl
//	angle(i+1, j) = h (i over(i-1, j) - rim_x(i, j))
//
// and alike in y. The sizes bound the magnitudes behind them by total degree. Source: the identities of [Graglia1993].
type facetPowers struct {
	degree      int
	h           float64
	over, angle square
	rim, cube   [2]square
	along       [2]square // K
	across      square    // D

	overSize, angleSize, rimSize, cubeSize []float64

	line, wide, thin []float64 // along an edge: int s^k/R, s^k R, s^k/R^3
	coefficient      []float64 // of (x0 + tx s)^i (y0 + ty s)^j
}

// resize makes room for powers up to a degree.
func (f *facetPowers) resize(degree int) {
	f.degree = degree
	n := (degree + 3) * (degree + 4) / 2
	make1 := func(s *square) { *s = make(square, n) }
	for _, s := range []*square{&f.over, &f.angle, &f.rim[0], &f.rim[1], &f.cube[0], &f.cube[1], &f.along[0], &f.along[1], &f.across} {
		make1(s)
	}
	for _, s := range []*[]float64{&f.overSize, &f.angleSize, &f.rimSize, &f.cubeSize, &f.line, &f.wide, &f.thin, &f.coefficient} {
		*s = make([]float64, degree+6)
	}
}

// fill computes everything for one face. corners are those of the face in its own coordinates.
func (f *facetPowers) fill(corners [][2]float64, x, y, h float64, grad bool) {
	for _, s := range [...][]float64{f.rim[0], f.rim[1], f.cube[0], f.cube[1], f.along[0], f.along[1], f.across, f.overSize, f.rimSize, f.cubeSize} {
		clear(s)
	}
	f.h = h
	var low, lowSize float64
	n := len(corners)
	for k := range corners {
		a, b := corners[k], corners[(k+1)%n]
		d, l := f.edge([2]float64{a[0] - x, a[1] - y}, [2]float64{b[0] - x, b[1] - y}, grad)
		low += d * l
		lowSize += math.Abs(d) * l
	}
	omega := solidAngle(corners, x, y, h)
	f.over[0], f.angle[0] = low-math.Abs(h)*omega, math.Copysign(omega, h)
	if h == 0 {
		f.angle[0] = 0
	}
	f.overSize[0] = lowSize + math.Abs(h)*omega
	f.climb()
}

// climb fills over and angle from the rim.
func (f *facetPowers) climb() {
	h2 := f.h * f.h
	for n := 0; n < f.degree; n++ {
		for j := range n + 2 { // total degree n + 1
			i := n + 1 - j
			axis, a, b := 0, i-1, j
			if i == 0 {
				axis, a, b = 1, 0, j-1
			}
			to, from := flat(i, j), flat(a, b)
			v, w := f.along[axis][from], -f.h*f.rim[axis][from]
			if p := [2]int{a, b}[axis]; p > 0 {
				under := flat(a-1+axis, b-axis)
				v -= float64(p) / float64(n+2) * (f.across[under] + h2*f.over[under])
				w += f.h * float64(p) * f.over[under]
			}
			f.over[to], f.angle[to] = v, w
		}
	}
	for n := 1; n <= f.degree; n++ { // K and D are R^2 times the rim integrals, with R^2 = s^2 + d^2 + h^2
		f.overSize[n] = f.rimSize[n+1] + h2*f.rimSize[n-1]
		if n >= 2 {
			f.overSize[n] += h2 * f.overSize[n-2]
		}
	}
	f.angleSize[0] = 2 * math.Pi
	for n := 1; n <= f.degree; n++ {
		f.angleSize[n] = math.Abs(f.h) * f.rimSize[n-1]
		if n >= 2 {
			f.angleSize[n] += math.Abs(f.h) * float64(n) * f.overSize[n-2]
		}
	}
}

// edge adds the rim integrals of the edge from a to b, and returns its distance from the origin and int dl/R.
func (f *facetPowers) edge(a, b [2]float64, grad bool) (d, log float64) {
	tx, ty := b[0]-a[0], b[1]-a[1]
	length := math.Sqrt(tx*tx + ty*ty)
	tx, ty = tx/length, ty/length
	mx, my := ty, -tx
	s1, s2 := tx*a[0]+ty*a[1], tx*b[0]+ty*b[1]
	d = mx*a[0] + my*a[1]
	if math.Abs(s2) < math.Abs(s1) {
		d = mx*b[0] + my*b[1]
	}
	p2 := d*d + f.h*f.h
	r1, r2 := math.Sqrt(s1*s1+p2), math.Sqrt(s2*s2+p2)
	den := r1*r2 + (s1*s2 + p2)
	if s1*s2+p2 < 0 {
		den = length * length * p2 / (r1*r2 - (s1*s2 + p2))
	}
	if den > 0 {
		log = logatan.Log1pRatio(length*(r1+r2+length), den)
	}
	top := f.degree + 2
	f.powers(s1, s2, r1, r2, p2, log, top, grad)
	x0, y0 := d*mx, d*my
	most := max(math.Hypot(a[0], a[1]), math.Hypot(b[0], b[1]))
	reach := 1.0
	for n := 0; n <= top; n++ {
		f.rimSize[n] += reach * log
		reach *= most
	}
	if grad {
		f.thinSizes(s1, s2, d, p2, log, top)
	}
	c := f.coefficient
	for j := range top + 1 {
		clear(c)
		c[0] = 1
		for k := range j {
			raise(c, k, y0, ty)
		}
		for i := 0; i+j <= top; i++ {
			if i > 0 {
				raise(c, i+j-1, x0, tx)
			}
			var l, w, t float64
			for k := range i + j + 1 {
				l += c[k] * f.line[k]
				w += c[k] * f.wide[k]
				t += c[k] * f.thin[k]
			}
			at := flat(i, j)
			f.rim[0][at] += mx * l
			f.rim[1][at] += my * l
			f.along[0][at] += mx * w
			f.along[1][at] += my * w
			f.across[at] += d * w
			f.cube[0][at] += mx * t
			f.cube[1][at] += my * t
		}
	}
	return d, log
}

// raise multiplies the polynomial of degree k by x0 + t s.
func raise(c []float64, k int, x0, t float64) {
	c[k+1] = t * c[k]
	for n := k; n > 0; n-- {
		c[n] = x0*c[n] + t*c[n-1]
	}
	c[0] *= x0
}

// powers fills the integrals along an edge from s1 to s2 of s^k/R, s^k R and s^k/R^3, R^2 = s^2 + p2, for k <= top.
func (f *facetPowers) powers(s1, s2, r1, r2, p2, log float64, top int, grad bool) {
	line := f.line
	line[0] = log
	line[1] = (s2 - s1) * (s2 + s1) / (r1 + r2)
	if r1+r2 == 0 {
		line[1] = 0
	}
	q1, q2 := r1, r2
	for k := 2; k <= top+2; k++ {
		q1, q2 = q1*s1, q2*s2
		line[k] = (q2 - q1 - float64(k-1)*p2*line[k-2]) / float64(k)
	}
	for k := 0; k <= top; k++ {
		f.wide[k] = line[k+2] + p2*line[k]
	}
	clear(f.thin)
	if !grad {
		return
	}
	if p2 > 0 {
		// s2/r2 - s1/r1, which cancels where both have one sign
		if s1*s2 > 0 {
			f.thin[0] = (s2 - s1) * (s2 + s1) / (s2*r1 + s1*r2) / (r1 * r2)
		} else {
			f.thin[0] = (s2/r2 - s1/r1) / p2
		}
		f.thin[1] = (s2 - s1) * (s2 + s1) / ((r1 + r2) * r1 * r2)
	}
	for k := 2; k <= top; k++ {
		f.thin[k] = line[k-2] - p2*f.thin[k-2]
	}
}

// thinSizes adds what bounds int |x^i y^j|/R^3 along an edge.
func (f *facetPowers) thinSizes(s1, s2, d, p2, log float64, top int) {
	p := math.Sqrt(p2)
	if p == 0 {
		p = 1e-300
	}
	most := max(math.Abs(s1), math.Abs(s2))
	reach, near := 1.0, 1.0
	for n := 0; n <= top; n++ {
		v := near * math.Abs(f.thin[0])
		switch {
		case n == 1:
			v += 2 / p
		case n >= 2:
			v += reach * log
			reach *= most
		}
		f.cubeSize[n] += math.Ldexp(v, n/2)
		near *= math.Abs(d)
	}
}

// solidAngle returns the absolute solid angle of a plane face from height h over (x, y): edge by edge near the plane
// [Wilton1984], as a fan of triangles away from it [VanOosterom1983].
func solidAngle(corners [][2]float64, x, y, h float64) float64 {
	h = math.Abs(h)
	if h == 0 {
		return 0
	}
	n := len(corners)
	at := func(k int) r3.Vec {
		c := corners[k%n]
		return r3.Vec{X: c[0] - x, Y: c[1] - y, Z: h}
	}
	total, radius := 0.0, 0.0
	for _, c := range corners {
		radius = max(radius, math.Hypot(c[0], c[1]))
	}
	if h > 0.05*radius || math.Hypot(x, y) > 1.2*radius {
		a := at(0)
		ra := r3.Norm(a)
		for k := 1; k+1 < n; k++ {
			b, c := at(k), at(k+1)
			rb, rc := r3.Norm(b), r3.Norm(c)
			twice := (b.X-a.X)*(c.Y-a.Y) - (b.Y-a.Y)*(c.X-a.X)
			total += 2 * math.Atan2(h*twice, ra*rb*rc+r3.Dot(a, b)*rc+r3.Dot(b, c)*ra+r3.Dot(c, a)*rb)
		}
		return total
	}
	for k := range corners {
		a, b := at(k), at(k+1)
		tx, ty := b.X-a.X, b.Y-a.Y
		length := math.Sqrt(tx*tx + ty*ty)
		tx, ty = tx/length, ty/length
		s1, s2 := tx*a.X+ty*a.Y, tx*b.X+ty*b.Y
		d := ty*a.X - tx*a.Y
		p2 := d*d + h*h
		total += math.Atan(d*s2/(p2+h*math.Sqrt(s2*s2+p2))) - math.Atan(d*s1/(p2+h*math.Sqrt(s1*s1+p2)))
	}
	return total
}
