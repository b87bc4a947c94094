package element

import (
	"math"

	"example.com/boundpole/field"
)

// tubePoint is a point not far from a tube: where it is with respect to the faces.
type tubePoint struct {
	roundPoint
	body        *Tube
	zb, zt      float64 // heights over the bottom and the top
	bottom, top float64 // side of the end planes: sign(z - end), or as asked for on a face
	walls       [2]tubeWall
	layered     float64 // what of the point lies within walls evaluated by layers
	count       int     // of walls: outer, inner if there is a bore
}

// tubeWall is one wall as seen from the point.
type tubeWall struct {
	radius, sign float64 // +1 for the outer wall, -1 for the inner one
	d            float64 // radius - rho
	within       float64 // 1 where rho < radius, 0 beyond, or as asked for on the wall
}

// place finds the position and returns what kind of place it is.
func (n *tubePoint) place(side field.Side) field.Status {
	b := n.body
	zb, zt := n.height(-b.half), n.height(b.half)
	n.zb, n.zt, n.bottom, n.top = zb, zt, sign(zb), sign(zt)
	n.walls[0] = tubeWall{radius: b.outer, sign: 1, d: n.inward(b.outer)}
	n.count = 1
	if b.inner > 0 {
		n.walls[1] = tubeWall{radius: b.inner, sign: -1, d: n.inward(b.inner)}
		n.count = 2
	}
	outside := -n.walls[0].d // how far beyond the nearer wall
	for i := range n.count {
		w := &n.walls[i]
		w.within = 0.5 + 0.5*sign(w.d)
		outside = max(outside, -w.sign*w.d)
	}
	beyond := max(-zb, zt) // how far beyond the nearer end
	if max(outside, beyond) > n.tol || max(outside, beyond) < -n.tol || math.Hypot(max(0, outside), max(0, beyond)) > n.tol {
		return field.Regular
	}
	onEnd, onWall := beyond >= -n.tol, outside >= -n.tol
	bottom, top := b.charges()
	end := top
	if math.Abs(zb) < math.Abs(zt) {
		end = bottom
	}
	transverse := b.p.X != 0 || b.p.Y != 0
	out := float64(sideSign(side))
	switch {
	case onEnd && onWall:
		if end != 0 || transverse {
			return field.OnEdge
		}
		return field.Regular
	case onEnd:
		if math.Abs(zb) < math.Abs(zt) {
			n.bottom = -out
		} else {
			n.top = out
		}
		if end == 0 {
			return field.Regular
		}
		return field.OnFace
	}
	for i := range n.count {
		if w := &n.walls[i]; math.Abs(w.d) <= n.tol {
			w.within = 0.5 - 0.5*out*w.sign
		}
	}
	if !transverse {
		return field.Regular
	}
	return field.OnFace
}

// inside is 1 in the material, 0 outside, or a part as asked for on a face.
func (n *tubePoint) inside() float64 {
	f := 0.5 * (n.bottom - n.top)
	in := n.walls[0].within
	if n.count == 2 {
		in -= n.walls[1].within
	}
	return f * in
}

// away returns the distance to a wall, a segment of the generatrix.
func (n *tubePoint) away(w *tubeWall) float64 {
	return math.Hypot(w.d, max(0, -n.zb, n.zt))
}

// near evaluates the body by its faces, or by layers or shells where faces would cancel.
func (n *tubePoint) near(want field.Want) field.Value {
	b := n.body
	var c constant
	var k cosine
	flat := 2*b.half < thin*b.outer
	var layered [2]bool
	all := true
	for i := range n.count {
		layered[i] = flat && n.away(&n.walls[i]) > clearBy*2*b.half
		all = all && layered[i]
	}
	transverse := b.p.X != 0 || b.p.Y != 0
	axial := b.p.Z != 0 || b.slope != 0
	shells := transverse && !all && n.clearOfShell()
	if shells {
		n.addShells(&k, want)
	}
	for i := range n.count {
		w := &n.walls[i]
		if layered[i] {
			n.addLayers(i, &c, &k, axial, transverse && !shells, want)
			continue
		}
		if transverse && !shells {
			n.addWall(w, &k, want)
		}
		if axial && flat {
			if b.slope != 0 {
				n.addCloseLayers(i, &c, want)
			} else {
				n.addFlat(i, &c, want)
			}
		}
	}
	if axial && !flat {
		n.addEnds(n.walls[:n.count], &c, want)
	}
	n.addStep(&c)
	if b.slope != 0 {
		c.lap = 4 * math.Pi * b.slope * n.inside()
	}
	return n.value(&c, &k, b.across(), want)
}

// addEnds adds the end faces within the given walls, and the volume charge if there is a slope: the whole body for all
// walls, the part that belongs to one rim for one wall.
func (n *tubePoint) addEnds(walls []tubeWall, c *constant, want field.Want) {
	b := n.body
	what := needsOf(want)
	if b.slope != 0 {
		what |= needDisc | needSolid
	}
	var bottom, top sheet
	ob, ot := n.ends(&walls[0])
	if len(walls) == 2 {
		ib, it := n.ends(&walls[1])
		bottom, top = annulus(&ob, &ib, what), annulus(&ot, &it, what)
	} else {
		bottom, top = ob.disc(what), ot.disc(what)
	}
	w := walls[0].sign
	sb, st := b.charges()
	c.add(&bottom, w*sb)
	c.add(&top, w*st)
	if b.slope != 0 {
		n.addVolume(walls, &bottom, &top, c, want)
	}
}

// addFlat is addEnds for a flat body of uniform polarization at a point close to its wall: only the potential cancels,
//
//	I = d U + rho (U - T1) - z Omega,
//
// and in it only the middle term.
func (n *tubePoint) addFlat(i int, c *constant, want field.Want) {
	w := &n.walls[i]
	var s constant
	n.addEnds(n.walls[i:i+1], &s, want)
	if want&field.WantPhi != 0 {
		rb, rt := n.ends(w)
		vb, vt := rb.values(needSolid), rt.values(needSolid)
		p := w.sign * n.body.p.Z
		s.u = p * (w.d*(vt.u-vb.u) - n.rho*rimDifference(&rb, &rt) - (rt.z*vt.solid - rb.z*vb.solid))
		s.sizeU = math.Abs(p) * (math.Abs(w.d)*(vt.u+vb.u) + 2*math.Pi*(math.Abs(rt.z)+math.Abs(rb.z)))
	}
	c.join(&s)
}

// addVolume adds the uniform volume charge -Slope between the two end faces of unit density: by the divergence theorem
//
//	grad u = -oint n I,   u = (1/2) oint (n.(r - x))/R,
//
// so that axially the ends enter with their potentials and radially the walls with that of their cos(phi) charge.
func (n *tubePoint) addVolume(walls []tubeWall, bottom, top *sheet, c *constant, want field.Want) {
	b := n.body
	s, w := b.slope, walls[0].sign
	zb, zt := n.zb, n.zt
	c.z += s * w * (top.u - bottom.u)
	c.zz += s * w * (top.z - bottom.z)
	c.rhoZ += s * w * (top.rho - bottom.rho)
	c.sizeG += math.Abs(s) * (top.sizeU + bottom.sizeU)
	c.sizeH += math.Abs(s) * (top.sizeG + bottom.sizeG)
	pot := w * (zb*bottom.u - zt*top.u)
	sizePot := math.Abs(zb)*bottom.sizeU + math.Abs(zt)*top.sizeU
	radial := n.radial(walls)
	c.byRho += s * radial.s
	c.rho += s * radial.s * n.rho
	c.sizeG += math.Abs(s) * radial.sizeS * n.rho
	c.sizeH += math.Abs(s) * radial.sizeS
	if want&field.WantPhi != 0 {
		pot -= n.rho * n.rho * radial.s
		sizePot += n.rho * n.rho * radial.sizeS
		for i := range walls {
			w := &walls[i]
			line := band{a: w.radius, rho: n.rho, near: w.d, axial: true}
			o := w.radius * line.integral(zt, zb)
			pot += w.sign * o
			sizePot += o
		}
	}
	c.u -= 0.5 * s * pot
	c.sizeU += 0.5 * math.Abs(s) * sizePot
}

// ends returns the rims of a wall: bottom, top.
func (n *tubePoint) ends(w *tubeWall) (bottom, top rim) {
	bottom, top = rimAt(w.radius, n.rho, w.d, n.zb), rimAt(w.radius, n.rho, w.d, n.zt)
	bottom.sign, top.sign = n.bottom, n.top
	return bottom, top
}

// radial returns the sum of W/rho over the walls, W cos(phi) being the potential of a wall with charge cos(phi).
func (n *tubePoint) radial(walls []tubeWall) (k cosine) {
	if len(walls) == 2 && n.clearOfShell() {
		n.addShells(&k, field.WantG)
		return k
	}
	for i := range walls {
		n.addWall(&walls[i], &k, field.WantG)
	}
	return k
}

// addWall adds the wall with charge cos(phi) by its closed form.
func (n *tubePoint) addWall(w *tubeWall, k *cosine, want field.Want) {
	what := needShell | needSolid
	if want&field.WantGrad != 0 {
		what |= needLoop
	}
	rb, rt := n.ends(w)
	vb, vt := rb.values(what), rt.values(what)
	k.addCosine(&rb, &rt, &vb, &vt, w.within, w.sign)
}
