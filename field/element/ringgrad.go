package element

import "math"

// ringFifth holds the integrals over a ring that second derivatives are made of, R the distance:
//
//	s5, c5    oint dphi/R^5, oint cos phi dphi/R^5
//	d5        oint (1 - cos phi) dphi/R^5
//	sin5      oint sin^2 phi dphi/R^5
//	s3, c3r   oint dphi/R^3, oint cos phi dphi/R^3/rho
type ringFifth struct{ s5, c5, d5, sin5, s3, c3r float64 }

// ringFifthOf returns the integrals over a ring. With P = a^2 + rho^2 + z^2, by parts and from
// R^2 = P - 2 a rho cos phi = q1 + 2 a rho (1 - cos phi),
//
//	s5 = (2 (Q + q1) S3 - U/a)/(3 q1 Q),   sin5 = C3/(3 a rho)
//	c5 = (C3 + 2 a rho (s5 - sin5))/P,     d5 = (S3 - q1 s5)/(2 a rho) near the ring
//
// [own derivation]; no difference loses more than a factor 4.
func ringFifthOf(r *rim, v *rimValues) (h ringFifth) {
	a, rho, zz := r.a, r.rho, r.z*r.z
	sum := a + rho
	q1, q := r.d*r.d+zz, sum*sum+zz
	h.s3 = v.s3a / a
	h.s5 = (2*(q+q1)*h.s3 - v.u/a) / (3 * q1 * q)
	if rho > 0 {
		h.c3r = v.c3a / (a * rho)
	} else {
		h.c3r = 3 * math.Pi * a / (q * q * math.Sqrt(q))
	}
	h.sin5 = h.c3r / (3 * a)
	ar := 2 * a * rho
	h.c5 = (v.c3a/a + ar*(h.s5-h.sin5)) / (a*a + rho*rho + zz)
	if q1 < 0.2*ar {
		h.d5 = (h.s3 - q1*h.s5) / ar
	} else {
		h.d5 = h.s5 - h.c5
	}
	return h
}

// addSecond adds the second derivatives of a ring of charge w; without those of d/dz if part.
func (c *constant) addSecond(r *rim, v *rimValues, h *ringFifth, w float64, part bool) {
	a, z := r.a, r.z
	if 10*math.Hypot(r.d, z) < r.rho {
		c.byRho += w * (r.d*v.s3a - a*v.d3a) / r.rho
		c.sizeH += math.Abs(w) * (math.Abs(r.d)*v.s3a + a*math.Abs(v.d3a)) / r.rho
	} else {
		c.byRho += w * a * (a*h.c3r - h.s3)
		c.sizeH += math.Abs(w) * a * (a*h.c3r + h.s3)
	}
	if part {
		return
	}
	across := a*h.d5 - r.d*h.s5 // oint (rho - a cos)/R^5
	c.zz += w * a * (3*z*z*h.s5 - h.s3)
	c.rhoZ += w * 3 * a * z * across
	c.sizeH += math.Abs(w) * 3 * a * math.Abs(z) * (math.Abs(z)*h.s5 + a*math.Abs(h.d5) + math.Abs(r.d)*h.s5)
}

// addSecond adds the second derivatives of a ring of charge w cos(phi); see that of constant.
func (k *cosine) addSecond(r *rim, v *rimValues, h *ringFifth, w float64, part bool) {
	a, z := r.a, r.z
	zz := 3*a*z*z*h.c5 - v.c3a
	if reach := a*a + z*z; r.rho*r.rho < 1e-10*reach {
		k.tauByRho += w * -0.25 * zz // from Laplace's equation, good to rho^2/R^2
		k.sizeH += math.Abs(w*zz) + math.Abs(w)*1e-10*v.t1r/math.Sqrt(reach)
	} else {
		k.tauByRho += w * (v.bz - 2*v.t1r) / r.rho
		k.sizeH += math.Abs(w) * (math.Abs(r.d)*v.s3a + r.rho*math.Abs(v.d3a) + 2*v.t1r) / r.rho
	}
	k.zByRho -= w * a * z * h.c3r
	k.sizeH += math.Abs(w*z) * a * h.c3r
	if part {
		return
	}
	across := a*(h.sin5-h.d5) - r.d*h.c5 // oint cos (rho - a cos)/R^5
	k.zz += w * zz
	k.rho += w * 3 * a * z * across
	k.sizeH += math.Abs(w) * (v.c3a + 3*a*math.Abs(z)*(math.Abs(z)*h.c5+a*math.Abs(h.sin5)+a*math.Abs(h.d5)+math.Abs(r.d)*h.c5))
}

// join adds another potential.
func (k *cosine) join(o *cosine) {
	k.s += o.s
	k.tau += o.tau
	k.z += o.z
	k.tauByRho += o.tauByRho
	k.zByRho += o.zByRho
	k.zz += o.zz
	k.rho += o.rho
	k.sizeS += o.sizeS
	k.sizeG += o.sizeG
	k.sizeH += o.sizeH
}
