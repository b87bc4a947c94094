package element

import (
	"math"

	"example.com/boundpole/field/internal/elliptic"
)

// need says which integrals of a rim are wanted beside T1.
type need uint8

const (
	needDisc   need = 1 << iota // potential of the disc, U
	needSolid                   // solid angle
	needShell                   // cos-phi wall
	needRadial                  // uniform wall
	needLoop                    // field of the loop
)

// rimValues holds the integrals over one rim of radius a at (rho, z); R is the distance to a point of the rim at the azimuth
// phi from the field point, Omega the solid angle of the disc:
//
//	u            a oint dphi/R
//	t1, t1r      T1 = a oint cos phi dphi/R, and T1/rho
//	disc         potential of the disc of unit density, a U - rho T1 - z Omega
//	solid        Omega, odd in z
//	s, sat       S(z) = (1/rho) int_0^z T1 dz as sat S_inf + s
//	e, full      int_0^z of the ring's field across the axis as full E_inf + e
//	s3a, c3a     a oint dphi/R^3, a oint cos phi dphi/R^3; d3a is their difference
//	bz, br, brr  field of the unit loop, -dOmega/dz, -dT1/dz, and br/rho
type rimValues struct {
	u, t1, t1r, disc, solid, s, sat, e, full, bz, br, brr, s3a, c3a, d3a float64
}

// values computes the integrals of a rim.
func (r *rim) values(what need) (v rimValues) {
	q1 := r.d*r.d + r.z*r.z
	if what&(needShell|needRadial|needLoop) == 0 {
		var omega float64
		v.u, v.t1, omega = elliptic.Disc(r.a, r.rho, r.z, r.d, q1)
		r.setDisc(&v, omega)
		v.t1r = r.overRho(v.t1)
		return v
	}
	var s3, c3 float64
	if what&(needDisc|needSolid|needShell|needRadial) == 0 {
		v.u, v.t1, s3, c3 = elliptic.Ring(r.a, r.rho, r.z, q1)
	} else {
		o := elliptic.OfCircle(r.a, r.rho, r.z, r.d, q1)
		v.u, v.t1, s3, c3 = o.U, o.T1, o.S3, o.C3
		v.s, v.e = o.S, o.E
		r.setDisc(&v, o.Omega)
	}
	v.s3a, v.c3a = r.a*s3, r.a*c3
	v.d3a = lessCosine(r.a, r.rho, q1, v.u, s3, c3)
	v.t1r = r.overRho(v.t1)
	if r.rho > 0 {
		v.brr = v.c3a * r.z / r.rho
	} else {
		v.brr = 3 * v.t1r * r.z / (r.a*r.a + r.z*r.z)
	}
	v.bz = r.d*v.s3a + r.rho*v.d3a
	v.br = v.c3a * r.z
	return v
}

// axialSize returns the magnitude behind bz, far off the difference of larger terms.
func (r *rim) axialSize(v *rimValues) float64 { return math.Abs(r.d)*v.s3a + r.rho*math.Abs(v.d3a) }

// setDisc sets the solid angle on the side that sign says, and what else comes from series far off.
func (r *rim) setDisc(v *rimValues, omega float64) {
	v.solid = onSide(omega, r.z, r.sign, r.d)
	if r.away {
		far, side := r.series(), sign(r.z)
		v.disc = far.i
		v.s, v.sat = -side*far.s, side
		v.e, v.full = -side*far.e, side
		return
	}
	v.disc = r.d*v.u + r.rho*(v.u-v.t1) - r.z*omega
}

// onSide returns the solid angle of a disc on the wanted side of its plane, from the one at height z, d within its rim.
func onSide(omega, z, side, d float64) float64 {
	if at := sign(z); at != side {
		omega += math.Pi * (1 + sign(d)) * (side - at)
	}
	return omega
}

// overRho returns T1/rho, on the axis its limit.
func (r *rim) overRho(t1 float64) float64 {
	if r.rho > 0 {
		return t1 / r.rho
	}
	i2 := 1 / (r.a*r.a + r.z*r.z)
	return math.Pi * r.a * r.a * i2 * math.Sqrt(i2)
}

// lessCosine returns a oint (1 - cos phi)/R^3 dphi. Close to the circle the two parts cancel; there it comes from
// R^2 = q1 + 2 a rho (1 - cos phi): U = a (q1 S3 + 2 a rho (S3 - C3)).
func lessCosine(a, rho, q1, u, s3, c3 float64) float64 {
	if f := 2 * a * rho; q1 < 0.2*f {
		return (u - a*q1*s3) / f
	}
	return a * (s3 - c3)
}

// ringRadial returns the ring's field across the axis, a (rho S3 - a C3), from d = a - rho.
func ringRadial(a, rho, d, q1, u, s3, c3 float64) float64 {
	return a*lessCosine(a, rho, q1, u, s3, c3) - d*a*s3
}

// sInf returns S at infinite height, pi min(1, (a/rho)^2).
func (r *rim) sInf() float64 {
	if r.rho <= r.a {
		return math.Pi
	}
	q := r.a / r.rho
	return math.Pi * q * q
}

// eInf returns the integral of the ring's field up to infinite height: half the field 4 pi a/rho of the endless wall
// outside it, and the mean of both sides on it.
func (r *rim) eInf() float64 {
	switch {
	case r.d > 0:
		return 0
	case r.d == 0:
		return math.Pi * r.a / r.rho
	}
	return 2 * math.Pi * r.a / r.rho
}

// sheet is an axially symmetric sheet of unit density in a plane: a disc or an annulus.
type sheet struct {
	u, rho, z, byRho, zz, rhoZ float64
	sizeU, sizeG, sizeH        float64
}

// addDisc adds a disc of density w.
func (s *sheet) addDisc(r *rim, v *rimValues, w float64) {
	s.u += w * v.disc
	s.rho -= w * v.t1
	s.z -= w * v.solid
	s.byRho -= w * v.t1r
	s.zz += w * v.bz
	s.rhoZ += w * v.br
	w = math.Abs(w)
	s.sizeU += w * (math.Abs(r.d)*v.u + r.rho*(v.u+v.t1)*0.5 + 2*math.Pi*math.Abs(r.z))
	s.sizeG += w * (v.t1 + 2*math.Pi)
	s.sizeH += w * (v.t1r + r.axialSize(v) + math.Abs(v.br))
}

// add adds w times a sheet.
func (c *constant) add(s *sheet, w float64) {
	c.u += w * s.u
	c.rho += w * s.rho
	c.z += w * s.z
	c.byRho += w * s.byRho
	c.zz += w * s.zz
	c.rhoZ += w * s.rhoZ
	w = math.Abs(w)
	c.sizeU += w * s.sizeU
	c.sizeG += w * s.sizeG
	c.sizeH += w * s.sizeH
}

// join adds another potential.
func (c *constant) join(o *constant) {
	c.u += o.u
	c.rho += o.rho
	c.z += o.z
	c.byRho += o.byRho
	c.zz += o.zz
	c.rhoZ += o.rhoZ
	c.lap += o.lap
	c.sizeU += o.sizeU
	c.sizeG += o.sizeG
	c.sizeH += o.sizeH
}

// Below thin times the radius the extent of a part is small enough for Gauss-Legendre across it where the point is more
// than clearBy extents away: 8 nodes then leave 9.9^-16 = 1e-16, while differences lose radius/extent. Elsewhere the
// differences lose nothing. Both free.
const (
	thin    = 0.1
	clearBy = 2
)

// disc returns the disc with the rim o.
func (o *rim) disc(what need) (s sheet) {
	v := o.values(what)
	s.addDisc(o, &v, 1)
	return s
}

// annulus returns the sheet between two rims in one plane, i the inner one.
func annulus(o, i *rim, what need) (s sheet) {
	width := o.a - i.a
	if width > thin*o.a {
		vo, vi := o.values(what), i.values(what)
		s.addDisc(o, &vo, 1)
		s.addDisc(i, &vi, -1)
		return s
	}
	if math.Hypot(o.z, max(0, -o.d, i.d)) > clearBy*width {
		s.addRings(o, width)
		if what&needLoop != 0 {
			vo, vi := o.values(needLoop), i.values(needLoop)
			s.byRho, s.zz, s.rhoZ = vi.t1r-vo.t1r, vo.bz-vi.bz, vo.br-vi.br
			s.sizeH = vi.t1r + vo.t1r + o.axialSize(&vo) + i.axialSize(&vi) + math.Abs(vo.br) + math.Abs(vi.br)
		}
		return s
	}
	vo, vi := o.values(what&^needDisc|needSolid), i.values(what&^needDisc|needSolid)
	s.addDisc(o, &vo, 1)
	s.addDisc(i, &vi, -1)
	if what&needDisc != 0 {
		line := band{a: o.a, rho: o.rho, near: o.z}
		s.u = line.integral(i.d, o.d)
		s.sizeU = s.u
	}
	return s
}

// addRings adds the annulus that ends at the rim o as rings.
func (s *sheet) addRings(o *rim, width float64) {
	for _, g := range gauss8 {
		for _, t := range [2]float64{0.5 * (1 - g.x), 0.5 * (1 + g.x)} {
			a, d, w := o.a-t*width, o.d-t*width, 0.5*g.w*width
			q1 := d*d + o.z*o.z
			pot, _, s3, c3 := elliptic.Ring(a, o.rho, o.z, q1)
			radial, axial := ringRadial(a, o.rho, d, q1, pot, s3, c3), a*o.z*s3
			s.u += w * pot
			s.rho -= w * radial
			s.z -= w * axial
			s.sizeG += w * (a*math.Abs(d)*s3 + math.Abs(radial) + math.Abs(axial))
		}
	}
	s.sizeU = s.u
}
