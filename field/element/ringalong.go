package element

import "math"

// ringAlong holds the gradient of the derivative K of the two potentials along the generatrix.
//
// Close to the surface the second derivatives of a ring grow as 1/R^2, and what is left of their sum is smaller by the
// distance. A motion of the half plane that takes the generatrix into itself, V at the point, changes the distances to a ring
// only through a rho in R^2 = q1 + 2 a rho (1 - cos phi). So with H = oint dphi/R or oint cos phi dphi/R, F the charge and N
// the change of a rho,
//
//	K = V.grad u = -[F a H] + int (F a)' H ds - int F a N D ds,   D = oint (1 - cos phi)/R^3 or oint cos phi (1 - cos phi)/R^3
//
// and grad K has terms in 1/R only, as the field has. V.grad grad u and Laplace's equation give all second derivatives
// [own derivation].
type ringAlong struct {
	u, f         [2]float64 // by rho and z
	sizeU, sizeF float64
}

// grazes reports whether the point is so close to the generatrix that ringAlong serves.
func (v *ringView) grazes() bool {
	d := 10 * math.Abs(v.d)
	return d < v.rho && d < v.length()
}

// add adds a ring: charges wu, of the derivative su along the generatrix, and wf cos(phi) for a normal component of 1, axial
// and radial.
func (o *ringAlong) add(v *ringView, r *rim, i *rimValues, h *ringFifth, nr, nz, wu, su, wf float64) {
	a, rho, b := r.a, r.rho, v.bend
	// F a and its derivative; a' = -nz on a line, and per angle -b nz, nz' = nr, nr' = -nz on an arc. The weight has the unit.
	step := -v.unit() * nz
	fu, fuS, ff, ffS := nz*a, nz*step, nr*a, nr*step
	across, byRho, byZ := -(b+v.d)*v.nz, -b*nz, -a // change of rho; gradient of N
	if b > 0 {
		fuS += nr * a
		ffS -= nz * a
	} else {
		across, byRho, byZ = -v.nz, -v.nz, 0
	}
	change := a*across + rho*step
	d3 := i.d3a / a
	sin3 := i.t1r / (a * a)
	f3, f5 := sin3-d3, h.sin5-h.d5 // oint cos (1 - cos)/R^3 and R^5
	// oint (1 - cos)^2/R^5 and with a factor cos
	e5, g5 := 2*h.d5-h.sin5, 2*f5-(h.s3-2*sin3)/(3*a*rho)
	if q1, ar := r.d*r.d+r.z*r.z, 2*a*rho; q1 < 0.2*ar {
		e5, g5 = (d3-q1*h.d5)/ar, (f3-q1*f5)/ar
	}
	d3r, d3z := -3*(a*e5-r.d*h.d5), -3*r.z*h.d5
	if wu != 0 || su != 0 {
		x, y := (r.d*i.s3a-a*i.d3a)/a, -r.z*h.s3
		o.u[0] += (wu*fuS+su*fu)*x - wu*fu*(change*d3r+byRho*d3)
		o.u[1] += (wu*fuS+su*fu)*y - wu*fu*(change*d3z+byZ*d3)
		o.sizeU += (math.Abs(wu*fuS) + math.Abs(su*fu)) * (math.Abs(r.d) + math.Abs(r.z)) * h.s3
		o.sizeU += math.Abs(wu) * (math.Abs(fu) * (math.Abs(change)*(math.Abs(d3r)+math.Abs(d3z)) + (math.Abs(byRho)+math.Abs(byZ))*d3))
	}
	f3r, f3z := -3*(a*g5-r.d*f5), -3*r.z*f5
	x, y := (i.bz-i.t1r)/a, -i.br/a
	o.f[0] += wf * (ffS*x - ff*(change*f3r+byRho*f3))
	o.f[1] += wf * (ffS*y - ff*(change*f3z+byZ*f3))
	o.sizeF += math.Abs(wf) * (math.Abs(ffS)*((math.Abs(r.d)+math.Abs(r.z))*h.s3+i.t1r/a) +
		math.Abs(ff)*(math.Abs(change)*(math.Abs(f3r)+math.Abs(f3z))+(math.Abs(byRho)+math.Abs(byZ))*(sin3+d3)))
}

// addEnds adds the rings at the ends of a line.
func (o *ringAlong) addEnds(v *ringView, surface *ringSurface) {
	for _, end := range [2]struct{ s, sign float64 }{{v.lo, 1}, {v.hi, -1}} {
		r, nr, nz := v.at(end.s)
		if !(r.a > 0) {
			continue
		}
		i := r.values(needLoop)
		axial, _ := surface.density(v, end.s)
		fu, ff := end.sign*axial*nz, end.sign*nr
		size := (math.Abs(r.d) + math.Abs(r.z)) * i.s3a
		o.u[0] += fu * (r.d*i.s3a - r.a*i.d3a)
		o.u[1] -= fu * r.z * i.s3a
		o.sizeU += math.Abs(fu) * size
		o.f[0] += ff * (i.bz - i.t1r)
		o.f[1] -= ff * i.br
		o.sizeF += math.Abs(ff) * (size + i.t1r)
	}
}

// turn sets the second derivatives of both potentials.
func (o *ringAlong) turn(v *ringView, c *constant, k *cosine) {
	length, turned := 1.0, 0.0 // |V|, and whether V turns with the point
	if v.bend > 0 {
		length, turned = v.bend+v.d, 1
	}
	tr, tz := -v.nz, v.nr
	solve := func(h [2]float64, rho, z, lap float64) (zz, rhoZ float64) {
		hr, hz := (h[0]-turned*z)/length, (h[1]+turned*rho)/length
		return hz*tz - hr*tr + lap*tr*tr, hr*tz + hz*tr - lap*tr*tz
	}
	c.zz, c.rhoZ = solve(o.u, c.rho, c.z, -c.byRho)
	k.zz, k.rho = solve(o.f, k.tau+k.s, k.z, -k.tauByRho)
	c.sizeH += (o.sizeU + turned*c.sizeG) / length
	k.sizeH += (o.sizeF + turned*k.sizeG) / length
}
