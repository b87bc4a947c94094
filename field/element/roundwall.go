package element

import "math"

// addUniformWall adds the field of the wall of unit density between two rims, r1 the lower one; within is 1 for a point
// on the axis' side of the wall, 0 beyond, 1/2 for the mean on it. The potential is left out.
func (c *constant) addUniformWall(r1, r2 *rim, v1, v2 *rimValues, within float64) {
	a := r1.a
	full := v1.full - v2.full
	e := full*r1.eInf() + v1.e - v2.e
	// the closed form belongs to the side of d; the field steps by 4 pi across the wall, by 2 pi sign(z) for each rim
	if move := r1.within() - within; move != 0 && r1.rho > 0 {
		e += 2 * math.Pi * a / r1.rho * move * (r1.sign - r2.sign)
	}
	c.rho -= e
	c.z += v1.u - v2.u
	c.sizeG += math.Abs(full)*r1.eInf() + math.Abs(v1.e) + math.Abs(v2.e) + v1.u + v2.u
	c.zz -= r1.z*v1.s3a - r2.z*v2.s3a
	c.rhoZ -= a*(v1.d3a-v2.d3a) - r1.d*(v1.s3a-v2.s3a)
	c.sizeH += math.Abs(r1.z)*v1.s3a + math.Abs(r2.z)*v2.s3a
	c.byRho -= perRho(e, r1.rho, a, 0.5*c.zz)
	c.sizeH += math.Abs(e) / max(r1.rho, 1e-5*a)
}

// addCosine adds w times the wall with charge cos(phi), see addUniformWall: with S = W/rho,
// tau = dW/drho - W/rho = Omega_2 - Omega_1 + 4 pi [inside] - 2 S.
func (k *cosine) addCosine(r1, r2 *rim, v1, v2 *rimValues, within, w float64) {
	full := (v1.sat - v2.sat) * r1.sInf()
	s := full + v1.s - v2.s
	jump := 2 * math.Pi * within * (r1.sign - r2.sign)
	tau := v2.solid - v1.solid + jump - 2*s
	k.s += w * s
	k.tau += w * tau
	k.z += w * (v1.t1 - v2.t1)
	k.zByRho += w * (v1.t1r - v2.t1r)
	k.zz += w * (v2.br - v1.br)
	k.rho += w * (v1.bz - v1.t1r - v2.bz + v2.t1r)
	// near the axis tau/rho = -rho s_zz/4 from Laplace's equation
	k.tauByRho += w * perRho(tau, r1.rho, r1.a, -0.25*r1.rho*(v2.brr-v1.brr))
	w = math.Abs(w)
	size := math.Abs(full) + math.Abs(v1.s) + math.Abs(v2.s)
	k.sizeS += w * size
	k.sizeG += w * (2*size + math.Abs(v1.solid) + math.Abs(v2.solid) + math.Abs(jump) + v1.t1 + v2.t1)
	k.sizeH += w * (v1.t1r + v2.t1r + math.Abs(v1.br) + math.Abs(v2.br) + r1.axialSize(v1) + r2.axialSize(v2) +
		size/max(r1.rho, 1e-5*r1.a))
}

// perRho returns f/rho, or its limit close to the axis, where f is the difference of larger terms. The limit is good to
// (rho/a)^2.
func perRho(f, rho, a, limit float64) float64 {
	if rho < 1e-5*a {
		return limit
	}
	return f / rho
}

// scale multiplies all by w.
func (c *constant) scale(w float64) {
	c.u, c.rho, c.z, c.byRho, c.zz, c.rhoZ, c.lap = w*c.u, w*c.rho, w*c.z, w*c.byRho, w*c.zz, w*c.rhoZ, w*c.lap
	w = math.Abs(w)
	c.sizeU, c.sizeG, c.sizeH = w*c.sizeU, w*c.sizeG, w*c.sizeH
}
