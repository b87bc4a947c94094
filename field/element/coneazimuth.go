package element

import (
	"math"

	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

// conePoint is a field point seen from the wall of a cone. Its frame has e from the axis to the point, across it in the sense
// of growing azimuth, and z.
type conePoint struct {
	e      r3.Vec
	rho    float64
	d      float64 // distance from the wall, positive outside
	nr, nz float64 // normal in the half plane of the point; the generator there has the direction (-nz, nr)
	lo, hi float64 // its ends, counted from the foot of the point
	foot   float64 // distance of the foot from the axis
	radius [2]float64
	half   float64
	zeta   [2]float64 // heights of bottom and top less that of the point
	r2     [2]float64 // squared distances from the ends of the generator
	scale  float64    // b of the map of the azimuth
	p      r3.Vec     // affine polarization at the origin, in the frame
	g      tensor     // and its gradient
	rho0   float64    // volume charge
}

// at returns the point seen from the wall; v is its view.
func (b *AffineCone) at(p *roundPoint, v *ringView) (c conePoint) {
	c = conePoint{e: p.e, rho: p.rho, d: v.d, nr: v.nr, nz: v.nz, lo: v.lo, hi: v.hi, half: b.half, rho0: b.rho}
	if c.rho == 0 {
		c.e = r3.Vec{X: 1}
	}
	if least := ringLeast * max(v.length(), c.rho); math.Abs(c.d) < least {
		c.d = math.Copysign(least, c.d)
	}
	c.foot = c.rho - c.d*c.nr
	c.radius = [2]float64{b.shape.Bottom, b.shape.Top}
	c.zeta = [2]float64{-p.height(-b.half), -p.height(b.half)}
	c.scale = 1
	for i, a := range c.radius {
		gap := -c.rho
		if a > 0 {
			gap = p.inward(a)
		}
		c.r2[i] = gap*gap + c.zeta[i]*c.zeta[i]
		if least := c.d * c.d; c.r2[i] < least {
			c.r2[i] = least
		}
		if a > 0 && c.rho > 0 {
			c.scale = min(c.scale, sectorScale(math.Sqrt(c.r2[i]), a, c.rho))
		}
	}
	if d := math.Abs(c.d); c.lo <= d && c.hi >= -d && c.rho > 0 {
		if a := 0.5 * (c.foot + math.Hypot(c.foot, c.nz*c.d)); a > 0 {
			c.scale = min(c.scale, sectorScale(d, a, c.rho))
		}
	}
	ax := [3]r3.Vec{c.e, {X: -c.e.Y, Y: c.e.X}, {Z: 1}}
	c.p = r3.Vec{X: r3.Dot(b.value0, ax[0]), Y: r3.Dot(b.value0, ax[1]), Z: b.value0.Z}
	for i := range ax {
		row := tensorTimes(&b.grad, ax[i]) // column of the frame
		for j := range ax {
			c.g[j][i] = r3.Dot(ax[j], row)
		}
	}
	return c
}

// turned returns a vector over 4 pi in the frame of the body.
func (c *conePoint) turned(v r3.Vec) r3.Vec {
	return r3.Vec{X: over4P * (v.X*c.e.X - v.Y*c.e.Y), Y: over4P * (v.X*c.e.Y + v.Y*c.e.X), Z: over4P * v.Z}
}

// coneSum gathers 4 pi phi, 4 pi g and 4 pi grad g of the wall in the frame of a conePoint, with sums of the sizes of the terms.
//
// At the azimuth delta from the point the wall is a generator v + tau t from the point, t from the foot of the point on it,
// v across it, and its element is (a + tau_r t) dt d delta. With the density sigma, R^2 = v^2 + t^2 and the normal n
//
//	4 pi phi = int sigma/R,  4 pi g = -int sigma (v + tau t)/R^3,  4 pi grad g = int sigma (1/R^3 - 3 (v + tau t)(v + tau t)/R^5).
//
// With s = sin^2(delta/2), foot the distance of the meridian's foot from the axis and d that of the point from the wall
//
//	t = t(0) + 2 tau_r rho s,   v^2 = d^2 + 4 rho s (foot - tau_r^2 rho s),
//
// so that nothing cancels however close the point is. Volume charge rho0 adds rho0 oint n/R dA to 4 pi g and half of
// rho0 oint n.(r - x)/R dA to 4 pi phi; n.(r - x) is constant along a generator.
type coneSum struct {
	phi                   float64
	g                     r3.Vec
	t                     tensor
	sizePhi, sizeG, sizeT float64
}

// sweep integrates over the azimuth.
func (c *conePoint) sweep(rule *sectorRule, want field.Want) (s coneSum) {
	var panel sectorPanel
	for _, span := range [2]sectorSpan{{-1, 0}, {0, 1}} {
		d := rule.over(span, c.scale)
		for k := range d.n {
			d.panel(&panel, k)
			for j := range panel.n {
				s.add(c, &panel.node[j], want)
			}
		}
	}
	return s
}

// add adds one azimuth.
func (s *coneSum) add(c *conePoint, nd *sectorNode, want field.Want) {
	ss := nd.sin * nd.sin
	cos, sin := 1-2*ss, 2*nd.sin*nd.cos
	kr, kz := -c.nz, c.nr // direction of the generator, away from the axis and up
	tau := r3.Vec{X: kr * cos, Y: kr * sin, Z: kz}
	n := r3.Vec{X: c.nr * cos, Y: c.nr * sin, Z: c.nz}
	shift := 2 * kr * c.rho * ss
	v := r3.Vec{X: -c.d*c.nr - 2*c.foot*ss - shift*tau.X, Y: c.foot*sin - shift*tau.Y, Z: -c.d*c.nz - shift*kz}
	line := segment{t0: c.lo + shift, t1: c.hi + shift, length: c.hi - c.lo}
	line.w2 = max(c.d*c.d+4*c.rho*ss*(c.foot-kr*kr*c.rho*ss), 0x1p-1000)
	line.r0 = math.Sqrt(c.r2[0] + 4*c.radius[0]*c.rho*ss)
	line.r1 = math.Sqrt(c.r2[1] + 4*c.radius[1]*c.rho*ss)

	// the place next to the point: at tc from the foot, a from the axis
	tc := min(max(0, line.t0), line.t1)
	a, z := c.radius[0]+kr*(tc-line.t0), -c.half+kz*(tc-line.t0)
	if line.t1-tc < tc-line.t0 {
		a, z = c.radius[1]-kr*(line.t1-tc), c.half-kz*(line.t1-tc)
	}
	g := (*[3][3]float64)(&c.g)
	sigma := r3.Dot(n, r3.Add(c.p, tensorTimes(g, r3.Vec{X: a * cos, Y: a * sin, Z: z})))
	slope := r3.Dot(n, tensorTimes(g, tau))
	q := newConeDensity(nd.w*sigma*a, nd.w*(sigma*kr+slope*a), nd.w*slope*kr, tc)
	e := newConeDensity(nd.w*a, nd.w*kr, 0, tc)

	i := lineIntegralsOf(&line)
	base := e.of(i.one[0], i.one[1], 0)
	normal := 2*c.nr*c.rho*ss - c.d // n.(r - x)
	s.phi += q.of(i.one[0], i.one[1], i.one[2]) + 0.5*c.rho0*normal*base
	f0, f1 := q.of(i.cube[0], i.cube[1], i.cube[2]), q.of(i.cube[1], i.cube[2], i.cube[3])
	s.g = r3.Sub(s.g, r3.Add(r3.Scale(f0, v), r3.Scale(f1, tau)))
	s.g = r3.Add(s.g, r3.Scale(c.rho0*base, n))
	if want&field.WantErr != 0 {
		w, most := math.Sqrt(line.w2), max(math.Abs(line.t0), math.Abs(line.t1))
		one, cube := line.sizes(w) // of the integrals with a factor |t|
		slope, vol := 2*q.slope(most), math.Abs(c.rho0)*(math.Abs(e.q0)*i.one[0]+2*e.slope(most)*one)
		spread := math.Abs(q.q0)*i.cube[0] + slope*cube
		s.sizePhi += math.Abs(q.q0)*i.one[0] + slope*one + vol*math.Abs(normal)
		s.sizeG += w*spread + math.Abs(q.q0)*cube + slope*i.one[0] + vol
		s.sizeT += 8*spread + math.Abs(c.rho0)*(math.Abs(e.q0)*(w*i.cube[0]+cube)+e.slope(most)*i.one[0])
	}
	if want&field.WantGrad != 0 {
		s.addTensor(c, &line, &i, &q, &e, n, v, tau)
	}
}

// addTensor adds one azimuth to the gradient.
func (s *coneSum) addTensor(c *conePoint, line *segment, i *lineIntegrals, q, e *coneDensity, n, v, tau r3.Vec) {
	h := i.fifth(line)
	f0, f1, f2 := 3*q.of(h[0], h[1], h[2]), 3*q.of(h[1], h[2], h[3]), 3*q.of(h[2], h[3], h[4])
	s.t.addOuter(-f0, v, v)
	s.t.addOuter(-f1, v, tau)
	s.t.addOuter(-f1, tau, v)
	s.t.addOuter(-f2, tau, tau)
	own := q.of(i.cube[0], i.cube[1], i.cube[2])
	for k := range s.t {
		s.t[k][k] += own
	}
	if c.rho0 != 0 {
		s.t.addOuter(c.rho0*e.of(i.cube[0], i.cube[1], 0), n, v)
		s.t.addOuter(c.rho0*e.of(i.cube[1], i.cube[2], 0), n, tau)
	}
}

// coneDensity is a density q0 + q1 (t - tc) + q2 (t - tc)^2 along a generator, as c0 + c1 t + c2 t^2.
type coneDensity struct{ c0, c1, c2, q0, q1 float64 }

func newConeDensity(q0, q1, q2, tc float64) coneDensity {
	return coneDensity{c0: q0 - tc*(q1-q2*tc), c1: q1 - 2*q2*tc, c2: q2, q0: q0, q1: q1}
}

// of returns the integral from those with the factors 1, t and t^2.
func (d *coneDensity) of(i0, i1, i2 float64) float64 { return d.c0*i0 + d.c1*i1 + d.c2*i2 }

// slope bounds the size of what varies along the generator, over t, for |t| up to most.
func (d *coneDensity) slope(most float64) float64 { return math.Abs(d.q1) + 3*math.Abs(d.c2)*most }

// sizes returns the integrals of |t| dt/R and |t| dt/R^3; w is the distance of the line.
func (s *segment) sizes(w float64) (one, cube float64) {
	if s.t0*s.t1 > 0 {
		return math.Abs(s.rise()), math.Abs(s.inverse())
	}
	return s.r0 + s.r1 - 2*w, 2/w - 1/s.r0 - 1/s.r1
}

// lineIntegrals holds int t^k dt/R, k to 2, and int t^k dt/R^3, k to 3, along a segment.
type lineIntegrals struct {
	one  [3]float64
	cube [4]float64
}

func lineIntegralsOf(s *segment) (i lineIntegrals) {
	i.one[0], i.one[1] = s.log(), s.rise()
	i.one[2] = 0.5 * (s.t1*s.r1 - s.t0*s.r0 - s.w2*i.one[0])
	i.cube[0], i.cube[1] = s.cube(), -s.inverse()
	i.cube[2] = i.one[0] - s.w2*i.cube[0]
	i.cube[3] = i.one[1] - s.w2*i.cube[1]
	return i
}

// fifth returns int t^k dt/R^5, k to 4. With q = t/R, int dt/R^5 = [q - q^3/3]/w^4 = (1/3) int dt/R^3 times
// (3 - q0^2 - q0 q1 - q1^2)/w^2 [own derivation].
func (i *lineIntegrals) fifth(s *segment) (h [5]float64) {
	a, b := 1/(s.r0*s.r0), 1/(s.r1*s.r1)
	r, t := s.r0*s.r1, s.t0*s.t1
	mixed := (s.t0*s.t0 + s.t1*s.t1 + s.w2) / (r * (r + t)) // (1 - q0 q1)/w^2
	if t < 0 {
		mixed = (r - t) / (r * s.w2)
	}
	h[0] = i.cube[0] / 3 * (a + b + mixed)
	h[1] = (a/s.r0 - b/s.r1) / 3
	h[2] = i.cube[0] - s.w2*h[0]
	h[3] = i.cube[1] - s.w2*h[1]
	h[4] = i.cube[2] - s.w2*h[2]
	return h
}
