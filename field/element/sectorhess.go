package element

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// sectorHess gathers 4 pi times the gradient of g of the affine part, in the frame of a sectorPoint.
//
// Walls: the row of z follows from 4 pi g_z = int [sigma/R] - sigma1 L a dphi by derivation. Across z, with complex
// P = a e - rho (e the direction to the wall, rho that to the point, both from the axis) and J = int dZ/R^3,
// 4 pi (g_x - i g_y) = - int a sigma P* J dphi and
//
//	(d_x - i d_y)(g_x - i g_y) = H_xx - H_yy - 2i H_xy = 2 int a sigma d_P (P* J) dphi
//	d_P (P* J) = (e*/ia) d_phi (P* J) + e*^2 T,   T = d_P* (P* J) = -[Z/R^3]/2,
//
// and the first term is integrated by parts, so that the kernel is no more singular at the wall than that of g itself.
// H_xx + H_yy = -H_zz. The parts with sigma1 Z have J1 = -[1/R], T1 = -[1/R] + q^2 [1/R^3]/2 in place of J and T.
//
// Flat faces: rows across z by derivation of g_t, the rest by symmetry and Laplace's equation. Own derivation.
type sectorHess struct {
	turn  complex128   // H_xx - H_yy - 2i H_xy of the walls
	axial [3]float64   // row of z of the walls
	rim   [2]rimTensor // of bottom and top
	rest  tensor       // of the volume charge
	size  float64
}

// rimTensor is the integral of sigma m (r - x)/R^3 along the outline of a flat face.
type rimTensor [2][3]float64

// sweep adds all panels, of the affine or of the radial part.
func (s *sectorHess) sweep(b *sector, p *sectorPoint, rule *sectorRule, radial bool) {
	scale := p.scale(b, radial)
	var panel sectorPanel
	for _, span := range p.spans[:p.count] {
		d := rule.over(span, scale)
		for k := range d.n {
			d.panel(&panel, k)
			for j := range panel.n {
				nd := &panel.node[j]
				if radial {
					s.addRadial(b, p, nd)
					continue
				}
				for i, a := range b.radius {
					if a > 0 {
						s.addNode(b, p, nd, i, a)
					}
				}
			}
		}
	}
}

func (s *sectorHess) addNode(b *sector, p *sectorPoint, nd *sectorNode, i int, a float64) {
	out := float64(2*i - 1)
	ss := nd.sin * nd.sin
	c, sn := 1-2*ss, 2*nd.sin*nd.cos
	pe, pt := p.gap[i]-2*a*ss, a*sn
	q2 := p.wide[i]*p.wide[i] + 4*a*p.rho*ss
	w := a * nd.w
	var r, inv, cube [2]float64
	for k, z := range p.zeta {
		r[k] = math.Sqrt(q2 + z*z)
		inv[k] = 1 / r[k]
		cube[k] = inv[k] * inv[k] * inv[k]
		if b.flatCharged[k] {
			sigma := float64(2*k-1) * (p.p.Z + p.g[2][2]*(z-p.clamp) + p.g[2][0]*pe + p.g[2][1]*pt)
			f := w * out * sigma * cube[k]
			s.rim[k].add(f*c, f*sn, pe, pt, z)
			s.size += math.Abs(f) * r[k]
		}
	}
	if !b.walls {
		return
	}
	along, across := p.p.X+p.g[0][0]*pe+p.g[0][1]*pt, p.p.Y+p.g[1][0]*pe+p.g[1][1]*pt
	sigma := out * (c*along + sn*across)
	ds := out * (c*across - sn*along + c*a*(p.g[0][1]*c-p.g[0][0]*sn) + sn*a*(p.g[1][1]*c-p.g[1][0]*sn))
	slope, dslope := out*(c*p.g[0][2]+sn*p.g[1][2]), out*(c*p.g[1][2]-sn*p.g[0][2])
	z0, z1 := p.zeta[0], p.zeta[1]
	line := segment{z0, z1, b.level[1] - b.level[0], q2, r[0], r[1]}
	j, j1 := line.cube(), -line.inverse()
	e := complex(c, -sn)
	// 2 [ i (sigma' - i sigma) e* P* J dphi + a sigma e*^2 T dphi ], and likewise for the slope
	sigma0, ds0 := sigma-slope*p.clamp, ds-dslope*p.clamp // at the height of the point
	f := complex(sigma0*j+slope*j1, ds0*j+dslope*j1) * e * complex(pe, -pt)
	t := -0.5*sigma0*(z1*cube[1]-z0*cube[0]) + slope*(j1+0.5*q2*(cube[1]-cube[0]))
	s.turn += complex(2*nd.w, 0)*f + complex(2*w*t, 0)*e*e
	f0, f1 := w*(sigma0+slope*z0)*cube[0], w*(sigma0+slope*z1)*cube[1]
	d := f1 - f0 - w*slope*j
	s.axial[0] += d * pe
	s.axial[1] += d * pt
	s.axial[2] += f1*z1 - f0*z0 - w*slope*j1
	if b.rho != 0 {
		v := b.rho * out * w
		for row, m := range [2]float64{c, sn} {
			s.rest[row][0] += v * m * j * pe
			s.rest[row][1] += v * m * j * pt
			s.rest[row][2] += v * m * j1
		}
		s.size += math.Abs(v) * (j*(math.Abs(pe)+math.Abs(pt)) + math.Abs(j1))
	}
	s.size += 2*nd.w*(math.Hypot(real(f), imag(f))+a*math.Abs(t)) + math.Abs(f0)*r[0] + math.Abs(f1)*r[1] +
		math.Abs(w*slope)*(inv[0]+inv[1]+j*(math.Abs(pe)+math.Abs(pt)))
}

// add adds the element with normal times density over R^3 equal to (me, mt), at (pe, pt, z) from the point.
func (t *rimTensor) add(me, mt, pe, pt, z float64) {
	for row, m := range [2]float64{me, mt} {
		t[row][0] += m * pe
		t[row][1] += m * pt
		t[row][2] += m * z
	}
}

// addCorners adds what the integration by parts leaves at the ends of the walls.
func (s *sectorHess) addCorners(b *sector, p *sectorPoint, radial bool) {
	if b.full || !radial && !b.walls {
		return
	}
	for i, a := range b.radius {
		if a == 0 {
			continue
		}
		for j := range p.across {
			x, y := p.beyond[j][i], p.across[j]
			c, sn := p.cos[j], p.sin[j]
			pe, pt := c*x-sn*y, sn*x+c*y
			q2 := x*x + y*y
			z0, z1 := p.zeta[0], p.zeta[1]
			line := segment{z0, z1, b.level[1] - b.level[0], q2, math.Sqrt(q2 + z0*z0), math.Sqrt(q2 + z1*z1)}
			out := float64(2*i - 1)
			f := out * b.radial * line.cube()
			if !radial {
				sigma := out * (c*(p.p.X+p.g[0][0]*pe+p.g[0][1]*pt) + sn*(p.p.Y+p.g[1][0]*pe+p.g[1][1]*pt))
				slope := out * (c*p.g[0][2] + sn*p.g[1][2])
				f = (sigma-slope*p.clamp)*line.cube() - slope*line.inverse()
			}
			e := complex(c, -sn)
			s.turn += complex(0, -2*float64(2*j-1)*f) * e * e * complex(x, -y)
			s.size += 2 * math.Abs(f) * math.Sqrt(q2)
		}
	}
}

// addRays adds the straight edges of the flat face k.
func (s *sectorHess) addRays(b *sector, p *sectorPoint, k int) {
	n, z := float64(2*k-1), p.zeta[k]
	for j := range p.across {
		out := float64(2*j - 1)
		d := out * p.across[j]
		line := segment{t0: p.beyond[j][0], t1: p.beyond[j][1], length: b.radius[1] - b.radius[0], w2: d*d + z*z}
		line.r0, line.r1 = math.Sqrt(line.t0*line.t0+line.w2), math.Sqrt(line.t1*line.t1+line.w2)
		me, mt, c, sn := -out*p.sin[j], out*p.cos[j], p.cos[j], p.sin[j]
		at := n * (p.p.Z + p.g[2][2]*(z-p.clamp) + d*(p.g[2][0]*me+p.g[2][1]*mt))
		slope := n * (p.g[2][0]*c + p.g[2][1]*sn)
		c0, c1 := line.cube(), -line.inverse()
		c2 := line.log() - (line.t1/line.r1 - line.t0/line.r0)
		f0, f1 := at*c0+slope*c1, at*c1+slope*c2
		s.rim[k].add(me, mt, f1*c+f0*d*me, f1*sn+f0*d*mt, f0*z)
		s.size += math.Abs(f1) + math.Abs(f0)*math.Sqrt(line.w2)
	}
}

// total returns the sum; flat holds the integrals along the outlines of the flat faces, nil for the radial part.
func (s *sectorHess) total(b *sector, p *sectorPoint, flat *[2]flatSum) (t tensor) {
	t = s.rest
	half := 0.5 * s.axial[2]
	t[0][0] += -half + 0.5*real(s.turn)
	t[1][1] += -half - 0.5*real(s.turn)
	t[0][1] -= 0.5 * imag(s.turn)
	t[1][0] -= 0.5 * imag(s.turn)
	t[2][2] += s.axial[2]
	for i := range 2 {
		t[2][i] += s.axial[i]
		t[i][2] += s.axial[i]
	}
	if flat == nil {
		return t
	}
	for k := range s.rim {
		n, f := float64(2*k-1), &flat[k]
		slope := [3]float64{f.m[0], f.m[1], p.up[k] * f.omega}
		if b.flatCharged[k] {
			var h tensor
			for i := range 2 {
				for j := range h {
					h[i][j] = s.rim[k][i][j] + n*p.g[2][i]*slope[j]
				}
				t[i][0] += h[i][0]
				t[i][1] += h[i][1]
				t[i][2] += h[i][2]
				t[2][i] += h[i][2]
			}
			t[2][2] -= h[0][0] + h[1][1]
		}
		if b.rho != 0 {
			for j := range slope {
				t[2][j] -= b.rho * n * slope[j]
			}
		}
	}
	return t
}

// addRadial adds one azimuth of the charge of the radial part: c on the outer wall, -c on the inner one, and -c/s
// between, which is the density -c on a rectangle of the half-plane. With t along the radius, Z along z and D across,
// all from the point, and S, C the integrals of dZ/R^3 and dt/R^3 along its sides, the rectangle of unit density has
//
//	H_tt = [t S], H_tD = D [S], H_ZZ = [Z C], H_ZD = D [C], H_tZ = -[[1/R]], H_DD = -(H_tt + H_ZZ).
func (s *sectorHess) addRadial(b *sector, p *sectorPoint, nd *sectorNode) {
	ss := nd.sin * nd.sin
	c, sn := 1-2*ss, 2*nd.sin*nd.cos
	across := p.rho * sn
	var t, side, top [2]float64
	var r [2][2]float64 // [wall][level]
	for i, a := range b.radius {
		t[i] = p.gap[i] + 2*p.rho*ss
		q2 := p.wide[i]*p.wide[i] + 4*a*p.rho*ss
		if a == 0 {
			q2 = p.rho * p.rho
		}
		line := segment{t0: p.zeta[0], t1: p.zeta[1], length: b.level[1] - b.level[0], w2: q2}
		line.r0, line.r1 = math.Sqrt(q2+line.t0*line.t0), math.Sqrt(q2+line.t1*line.t1)
		r[i] = [2]float64{line.r0, line.r1}
		side[i] = line.cube()
		if a > 0 {
			s.addRound(nd.w, a, float64(2*i-1)*b.radial, c, sn, p.gap[i]-2*a*ss, a*sn, &line, side[i])
		}
	}
	for k, z := range p.zeta {
		line := segment{t[0], t[1], b.radius[1] - b.radius[0], across*across + z*z, r[0][k], r[1][k]}
		top[k] = line.cube()
	}
	w := -b.radial * nd.w
	tt, td := w*(t[1]*side[1]-t[0]*side[0]), w*across*(side[1]-side[0])
	zz, zd := w*(p.zeta[1]*top[1]-p.zeta[0]*top[0]), w*across*(top[1]-top[0])
	tz := -w * (1/r[1][1] - 1/r[1][0] - 1/r[0][1] + 1/r[0][0])
	dd := -tt - zz
	h := &s.rest
	h[0][0] += c*c*tt - 2*c*sn*td + sn*sn*dd
	h[1][1] += sn*sn*tt + 2*c*sn*td + c*c*dd
	ht := c*sn*(tt-dd) + (c*c-sn*sn)*td
	h[0][1] += ht
	h[1][0] += ht
	h[2][2] += zz
	x, y := c*tz-sn*zd, sn*tz+c*zd
	h[0][2] += x
	h[2][0] += x
	h[1][2] += y
	h[2][1] += y
	s.size += math.Abs(tt) + math.Abs(td) + math.Abs(zz) + math.Abs(zd) + math.Abs(tz) +
		math.Abs(w)*(math.Abs(t[1])*side[1]+math.Abs(t[0])*side[0]+math.Abs(across)*(side[0]+side[1]+top[0]+top[1]))
}

// addRound adds the angle w of a wall of the radius a with the density sigma all over.
func (s *sectorHess) addRound(w, a, sigma, c, sn, pe, pt float64, line *segment, j float64) {
	e := complex(c, -sn)
	cube0, cube1 := 1/(line.r0*line.r0*line.r0), 1/(line.r1*line.r1*line.r1)
	t := line.t1*cube1 - line.t0*cube0
	f := complex(2*w*sigma*j, 0) * e * complex(pe, -pt)
	w *= a
	s.turn += f - complex(w*sigma*t, 0)*e*e
	d := w * sigma * (cube1 - cube0)
	s.axial[0] += d * pe
	s.axial[1] += d * pt
	s.axial[2] += w * sigma * t
	s.size += math.Hypot(real(f), imag(f)) + math.Abs(w*sigma)*(cube0*line.r0+cube1*line.r1)
}

// turned returns the tensor in the frame of the body, from that of e, the unit vector across it, and z.
func (t *tensor) turned(e r3.Vec) (r tensor) {
	x := [3][3]float64{{e.X, -e.Y, 0}, {e.Y, e.X, 0}, {0, 0, 1}}
	for i := range r {
		for j := range r {
			for k := range r {
				for l := range r {
					r[i][j] += x[i][k] * t[k][l] * x[j][l]
				}
			}
		}
	}
	return r
}
