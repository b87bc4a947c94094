package element

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// sectorSum gathers 4 pi phi and 4 pi g in the frame of a sectorPoint, with sums of the sizes of the terms.
type sectorSum struct {
	phi       float64
	e, t, z   float64
	sizePhi   float64
	sizeG     float64
	flat      [2]flatSum
	potential bool // phi is wanted
	size      bool // the sizes are wanted
}

// flatSum gathers the integrals along the outline of a flat face, m being the outward normal in the plane, P the vector
// from the foot of the point and h the distance from the plane.
type flatSum struct {
	m     [2]float64 // of m/R
	gamma [2]float64 // of (gamma.P) m/R
	r     [2]float64 // of m R
	omega float64    // of m.P/(R (R + h))
	base  float64    // of m.P/(R + h)
	sizeM float64    // sums of the sizes of the terms of m and base
	sizeB float64
}

// vec returns the field in the frame of the body.
func (s *sectorSum) vec(p *sectorPoint) r3.Vec {
	return r3.Vec{X: s.e*p.e.X + s.t*p.t.X, Y: s.e*p.e.Y + s.t*p.t.Y, Z: s.z}
}

// add adds the arcs of one panel. With P = a s - rho e the vector from the axis through the point to the wall, Z the
// height above the point, q^2 = P^2, R^2 = q^2 + Z^2 and the density sigma0 + sigma1 (Z - c) on a wall, here for c = 0,
//
//	4 pi g_t = - int sigma0 P S + sigma1 P [-1/R] a dphi,   S = int dZ/R^3
//	4 pi g_z = int sigma0 [1/R] + sigma1 ([Z/R] - L) a dphi,  L = int dZ/R
//	4 pi phi = int sigma0 L + sigma1 [R] a dphi
//
// and volume charge rho adds rho oint n/R dA to 4 pi g, half of rho oint n.(r - x)/R dA to 4 pi phi.
func (s *sectorSum) add(b *sector, p *sectorPoint, n *sectorPanel) {
	for i, a := range b.radius {
		if a > 0 {
			s.addArcs(b, p, n, i, a)
		}
	}
}

func (s *sectorSum) addArcs(b *sector, p *sectorPoint, n *sectorPanel, i int, a float64) {
	out := float64(2*i - 1) // of the outward normal against s
	d, d2, four := p.gap[i], p.wide[i]*p.wide[i], 4*a*p.rho
	z0, z1 := p.zeta[0], p.zeta[1]
	zz0, zz1 := z0*z0, z1*z1
	logs := s.potential || b.bent
	for k := range n.n {
		nd := &n.node[k]
		ss := nd.sin * nd.sin
		c, sn := 1-2*ss, 2*nd.sin*nd.cos
		pe, pt, t := d-2*a*ss, a*sn, d+2*p.rho*ss
		q2 := d2 + four*ss
		r1 := math.Sqrt(q2 + zz1)
		i1 := 1 / r1
		w := a * nd.w
		if !b.bare[1] {
			s.flat[1].add(b, p, w*out, c, sn, pe, pt, t, r1, i1, 1, s)
		}
		if b.sheet {
			continue
		}
		r0 := math.Sqrt(q2 + zz0)
		i0 := 1 / r0
		if !b.bare[0] {
			s.flat[0].add(b, p, w*out, c, sn, pe, pt, t, r0, i0, 0, s)
		}
		if !b.walls {
			continue
		}
		sigma, slope := out*(c*p.p.X+sn*p.p.Y), 0.0
		if b.linear {
			sigma += out * (c*(p.g[0][0]*pe+p.g[0][1]*pt) + sn*(p.g[1][0]*pe+p.g[1][1]*pt))
			slope = out * (c*p.g[0][2] + sn*p.g[1][2])
		}
		line := segment{z0, z1, b.level[1] - b.level[0], q2, r0, r1}
		j, di := line.cube(), line.inverse()
		f := w * sigma * j
		gz := w * sigma * di
		if logs {
			l := line.log()
			f -= w * slope * (di + p.clamp*j)
			gz += w * slope * (z1*i1 - z0*i0 - l - p.clamp*di)
			if s.potential {
				s.phi += w * (sigma*l + slope*(line.rise()-p.clamp*l) + 0.5*b.rho*out*t*l)
				if s.size {
					s.sizePhi += w * (math.Abs(sigma*l) + math.Abs(slope*(r1-r0)) + math.Abs(b.rho*t*l))
				}
			}
			s.e += b.rho * out * w * c * l
			s.t += b.rho * out * w * sn * l
			if s.size {
				s.sizeG += w * (math.Abs(b.rho)*l + math.Abs(slope)*(1+l))
			}
		}
		s.e -= f * pe
		s.t -= f * pt
		s.z += gz
		if s.size {
			s.sizeG += math.Abs(f)*(math.Abs(pe)+math.Abs(pt)) + math.Abs(w*sigma)*(i0+i1)
		}
	}
}

// add adds the element w of an arc with the normal (c, sn).
func (f *flatSum) add(b *sector, p *sectorPoint, w, c, sn, pe, pt, t, r, inv float64, k int, s *sectorSum) {
	x := w * inv
	f.m[0] += x * c
	f.m[1] += x * sn
	v := x * t / (r + math.Abs(p.zeta[k]))
	f.omega += v
	f.base += v * r
	if s.size {
		f.sizeM += math.Abs(x)
		f.sizeB += math.Abs(v) * r
	}
	if b.linear {
		g := x * (p.g[2][0]*pe + p.g[2][1]*pt)
		f.gamma[0] += g * c
		f.gamma[1] += g * sn
		if s.potential {
			f.r[0] += w * r * c
			f.r[1] += w * r * sn
		}
	}
}

// addRays adds the straight edges of the flat face k to the outline.
func (f *flatSum) addRays(b *sector, p *sectorPoint, k int) {
	h := math.Abs(p.zeta[k])
	for j := range p.across {
		out := float64(2*j - 1)
		d := out * p.across[j]
		m := [2]float64{-out * p.sin[j], out * p.cos[j]}
		line := segment{t0: p.beyond[j][0], t1: p.beyond[j][1], length: b.radius[1] - b.radius[0], w2: d*d + h*h}
		line.r0, line.r1 = math.Sqrt(line.t0*line.t0+line.w2), math.Sqrt(line.t1*line.t1+line.w2)
		l := line.log()
		angle := line.angle(d, h)
		gm := p.g[2][0]*m[0] + p.g[2][1]*m[1]
		gl := p.g[2][0]*p.cos[j] + p.g[2][1]*p.sin[j]
		g := gm*d*l + gl*line.rise()
		sq := line.square(l)
		for c, mc := range m {
			f.m[c] += mc * l
			f.gamma[c] += mc * g
			f.r[c] += mc * sq
		}
		f.omega += angle
		f.base += d*l - h*angle
		f.sizeM += l
		f.sizeB += math.Abs(d)*l + math.Abs(h*angle)
	}
}

// addFlat adds the flat face k from the integrals along its outline: with the density sigma + gamma.P,
//
//	I = int dA/R = oint m.P/(R + h) dl,   Omega = sgn h oint m.P/(R (R + h)) dl
//	4 pi phi = sigma I + gamma.oint m R dl
//	4 pi g_t = oint (sigma + gamma.P) m/R dl - gamma I,   4 pi g_z = sigma Omega + Z gamma.oint m/R dl.
func (s *sectorSum) addFlat(b *sector, p *sectorPoint, k int) {
	f := &s.flat[k]
	out, z := float64(2*k-1), p.zeta[k]
	sigma := out * (p.p.Z + p.g[2][2]*(z-p.clamp))
	ge, gt := out*p.g[2][0], out*p.g[2][1]
	s.e += sigma*f.m[0] + out*f.gamma[0] - ge*f.base
	s.t += sigma*f.m[1] + out*f.gamma[1] - gt*f.base
	s.z += sigma*p.up[k]*f.omega + z*(ge*f.m[0]+gt*f.m[1]) + b.rho*out*f.base
	slope := math.Hypot(ge, gt)
	mm := f.sizeM
	s.phi += sigma*f.base + ge*f.r[0] + gt*f.r[1] + 0.5*b.rho*out*z*f.base
	if s.size {
		s.sizeG += math.Abs(sigma)*(mm+2*math.Pi) + slope*(f.sizeB+math.Abs(z)*mm+1) +
			math.Hypot(f.gamma[0], f.gamma[1]) + math.Abs(b.rho)*f.sizeB
		s.sizePhi += math.Abs(sigma)*f.sizeB + slope*math.Hypot(f.r[0], f.r[1]) + math.Abs(b.rho*z)*f.sizeB
	}
}
