package element

import (
	"math"

	"example.com/boundpole/field"
)

// addLayers adds the body within a wall as stacked dipole layers, 8 of them or, with a slope, 16.
func (n *tubePoint) addLayers(i int, c *constant, k *cosine, axial, transverse bool, want field.Want) {
	w, h := &n.walls[i], n.body.half
	rule := gauss8[:]
	if n.body.slope != 0 {
		rule = gauss16[:]
	}
	for _, g := range rule {
		for _, t := range [2]float64{-g.x, g.x} {
			n.addLayer(w, h*t, h*g.w, c, k, axial, transverse, want)
		}
	}
	if axial {
		n.layered += w.sign * w.within
	}
	if want&field.WantGrad != 0 {
		n.gradLayers(i, c, k, axial, transverse)
	}
}

// gradLayers sets the second derivatives from the two ends.
func (n *tubePoint) gradLayers(i int, c *constant, k *cosine, axial, transverse bool) {
	if axial {
		var only constant
		n.addEnds(n.walls[i:i+1], &only, field.WantG|field.WantGrad)
		c.byRho += only.byRho
		c.zz += only.zz
		c.rhoZ += only.rhoZ
		c.sizeH += only.sizeH
	}
	if transverse {
		var only cosine
		n.addWall(&n.walls[i], &only, field.WantG|field.WantGrad)
		k.zByRho += only.zByRho
		k.zz += only.zz
		k.rho += only.rho
		k.tauByRho += only.tauByRho
		k.sizeH += only.sizeH
	}
}

// addLayer adds one layer of thickness dz at height z': axial dipoles (P_z + Slope z') dz on a disc, whose potential is its
// solid angle, and the ring of charge cos(phi) round it. The step of the solid angle through the disc is left to addStep.
func (n *tubePoint) addLayer(w *tubeWall, at, dz float64, c *constant, k *cosine, axial, transverse bool, want field.Want) {
	r := rimAt(w.radius, n.rho, w.d, n.height(at))
	what := needLoop
	if axial && want&field.WantPhi != 0 {
		what |= needSolid
	}
	v := r.values(what)
	dz *= w.sign
	if axial {
		c.addDipoles(&r, &v, dz*(n.body.p.Z+n.body.slope*at), w.within, 1, want)
	}
	if transverse {
		k.s += dz * v.t1r
		k.z -= dz * v.br
		k.tau += dz * (v.bz - 2*v.t1r)
		k.sizeS += math.Abs(dz) * v.t1r
		k.sizeG += math.Abs(dz) * (2*v.t1r + math.Abs(v.br) + math.Abs(v.bz))
	}
}

// addStep adds what the step of 4 pi through each disc makes of the layers: 2 pi int p sgn(z - z') dz' within the walls
// that were evaluated by layers. It is added once, for the parts of outer and inner wall cancel in the bore.
func (n *tubePoint) addStep(c *constant) {
	if n.layered == 0 {
		return
	}
	b := n.body
	h, z := b.half, n.z.Hi
	in := 2 * math.Pi * n.layered
	cut := min(max(z, -h), h)
	c.u += in * (2*b.p.Z*cut + b.slope*(cut-h)*(cut+h))
	step := in * (n.bottom - n.top) * (b.p.Z + b.slope*z)
	c.z += step
	c.sizeU += math.Abs(in) * (2*math.Abs(b.p.Z*cut) + math.Abs(b.slope*(cut-h)*(cut+h)))
	c.sizeG += math.Abs(step)
}

// addCloseLayers is addLayers for axial dipoles at a point close to the wall: the heights are spread as |d| sinh(v) about
// the foot of the point on the wall, in panels of 16 nodes no wider than 2, which leave 3.4^-32 (Johnston and Elliott
// (2005) Int. J. Numer. Methods Eng. 62, 564, from memory).
func (n *tubePoint) addCloseLayers(i int, c *constant, want field.Want) {
	near := n.walls[i]
	near.d = math.Copysign(max(math.Abs(near.d), 0x1p-60*near.radius), near.d) // on the wall: the limit
	d := math.Abs(near.d)
	lo, hi := math.Asinh(n.zt/d), math.Asinh(n.zb/d)
	panels := math.Ceil((hi - lo) / 2)
	half := (hi - lo) / panels / 2
	if near.within = 0; near.d > 0 {
		near.within = 1
	}
	for j := range int(panels) {
		mid := lo + float64(2*j+1)*half
		for _, g := range gauss16 {
			for _, t := range [2]float64{-g.x, g.x} {
				n.addCloseLayer(&near, mid+half*t, d, half*g.w, c, want)
			}
		}
	}
	n.layered += near.sign * near.within
	if want&field.WantGrad != 0 {
		n.gradLayers(i, c, nil, true, false)
	}
}

// addCloseLayer adds the layer at the height z - d sinh(v).
func (n *tubePoint) addCloseLayer(w *tubeWall, v, d, dv float64, c *constant, want field.Want) {
	zeta := d * math.Sinh(v)
	r := rimAt(w.radius, n.rho, w.d, zeta)
	what := needLoop
	if want&field.WantPhi != 0 {
		what |= needSolid
	}
	o := r.values(what)
	p := w.sign * dv * d * math.Cosh(v) * (n.body.p.Z + n.body.slope*(n.z.Hi-zeta))
	c.addDipoles(&r, &o, p, w.within, 1+0.3*math.Abs(v), want) // v times u is the error of sinh
}

// addDipoles adds a disc of axial dipoles p, without the step of its potential 4 pi p from side to side; loss raises the
// sizes that the estimate is made of.
func (c *constant) addDipoles(r *rim, v *rimValues, p, within, loss float64, want field.Want) {
	size := math.Abs(p) * loss
	if want&field.WantPhi != 0 {
		c.u += p * (v.solid - 2*math.Pi*within*r.sign)
		c.sizeU += size * 2 * math.Pi
	}
	c.rho -= p * v.br
	c.z -= p * v.bz
	c.sizeG += size * (math.Abs(v.br) + math.Abs(v.bz))
}

// clearOfShell reports whether the wall of the tube is thin and the point clear of its ends, or of all of it.
func (n *tubePoint) clearOfShell() bool {
	b := n.body
	width := b.outer - b.inner
	if b.inner == 0 || width > thin*b.outer {
		return false
	}
	across := max(0, -n.walls[0].d, n.walls[1].d)
	beyond := max(-n.zb, n.zt)
	return math.Hypot(across, beyond) > clearBy*width
}

// addShells adds a thin-walled tube of unit transverse polarization as nested shells of dipoles. With Phi the potential of
// a shell of unit charge, f = -dPhi/drho, and by Laplace's equation df/drho = Phi_zz - f/rho. In the wall the shells
// within the point and those around it make one panel each, and the step of f by 4 pi from one to the other adds to
// df/drho.
func (n *tubePoint) addShells(k *cosine, want field.Want) {
	r := n.shells()
	for i := range r.count {
		n.addShell(&r.shells[i], k)
	}
	step := 4 * math.Pi * n.inside()
	k.tau += step
	k.sizeG += step
	if want&field.WantGrad != 0 {
		var only cosine
		for i := range n.count {
			n.addWall(&n.walls[i], &only, want)
		}
		k.zByRho, k.zz, k.rho, k.tauByRho, k.sizeH = only.zByRho, only.zz, only.rho, only.tauByRho, only.sizeH
	}
}

// shellRule is a rule of at most two panels of 8 nodes across a thin wall; sign is the thickness of a shell.
type shellRule struct {
	shells [16]tubeWall
	count  int
}

// shells returns the rule for the thin wall as seen from the point.
func (n *tubePoint) shells() (r shellRule) {
	width := n.body.outer - n.body.inner
	cut := min(max(n.walls[0].d/width, 0), 1) // the place of the point, in thicknesses below the outer radius
	for _, p := range [2][2]float64{{0, cut}, {cut, 1}} {
		half := 0.5 * (p[1] - p[0])
		if half == 0 {
			continue
		}
		for _, g := range gauss8 {
			for _, t := range [2]float64{p[0] + half*(1-g.x), p[0] + half*(1+g.x)} {
				r.shells[r.count] = tubeWall{radius: n.body.outer - t*width, sign: g.w * half * width, d: n.walls[0].d - t*width}
				r.count++
			}
		}
	}
	return r
}

// shellPotential returns the potential of the thin wall filled with unit charge.
func (n *tubePoint) shellPotential() (sum float64) {
	r := n.shells()
	for i := range r.count {
		sum += r.shells[i].sign * n.wallPotential(&r.shells[i])
	}
	return sum
}

// addShell adds one shell; sign is its thickness.
func (n *tubePoint) addShell(w *tubeWall, k *cosine) {
	rb, rt := n.ends(w)
	vb, vt := rb.values(needRadial|needLoop), rt.values(needRadial|needLoop)
	f := (vb.full-vt.full)*rb.eInf() + vb.e - vt.e
	var s float64
	if n.rho > 0 {
		s = f / n.rho
	}
	a := w.radius
	zz := rt.z*vt.s3a - rb.z*vb.s3a
	if n.rho == 0 {
		s = 0.5 * zz
	}
	k.s += w.sign * s
	k.tau += w.sign * (zz - 2*s)
	k.z += w.sign * (a*(vb.d3a-vt.d3a) - w.d*(vb.s3a-vt.s3a))
	size := (math.Abs(vb.full-vt.full)*rb.eInf() + math.Abs(vb.e) + math.Abs(vt.e))
	if n.rho > 0 {
		size /= n.rho
	}
	k.sizeS += w.sign * size
	k.sizeG += w.sign * (2*size + math.Abs(rb.z)*vb.s3a + math.Abs(rt.z)*vt.s3a)
}
