package element

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/internal/elliptic"
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

// newTubePoint returns where p is with respect to b.
func newTubePoint(b *Tube, p roundPoint) tubePoint {
	n := tubePoint{roundPoint: p, body: b, zb: p.height(-b.half), zt: p.height(b.half), count: 1}
	n.bottom, n.top = sign(n.zb), sign(n.zt)
	n.walls[0] = tubeWall{radius: b.outer, sign: 1, d: p.inward(b.outer)}
	if b.inner > 0 {
		n.walls[1] = tubeWall{radius: b.inner, sign: -1, d: p.inward(b.inner)}
		n.count = 2
	}
	for i := range n.count {
		w := &n.walls[i]
		w.within = 0.5 + 0.5*sign(w.d)
	}
	return n
}

// settle returns what kind of place the point is on, and on a face sets its sides as asked for.
func (n *tubePoint) settle(side field.Side) field.Status {
	outside := -n.walls[0].d // how far beyond the nearer wall
	if n.count == 2 {
		outside = max(outside, n.walls[1].d)
	}
	beyond := max(-n.zb, n.zt) // how far beyond the nearer end
	most := max(outside, beyond)
	if most > n.tol || most < -n.tol || math.Hypot(max(0, outside), max(0, beyond)) > n.tol {
		return field.Regular
	}
	b := n.body
	onBottom := math.Abs(n.zb) < math.Abs(n.zt)
	bottom, top := b.charges()
	end := top != 0
	if onBottom {
		end = bottom != 0
	}
	wall := b.p.X != 0 || b.p.Y != 0
	out := sideSign(side)
	charged, status := wall, field.OnFace
	switch onEnd, onWall := beyond >= -n.tol, outside >= -n.tol; {
	case onEnd && onWall:
		charged, status = end || wall, field.OnEdge
	case onEnd && onBottom:
		charged, n.bottom = end, -out
	case onEnd:
		charged, n.top = end, out
	default:
		for i := range n.count {
			if w := &n.walls[i]; math.Abs(w.d) <= n.tol {
				w.within = 0.5 - 0.5*out*w.sign
			}
		}
	}
	if !charged {
		return field.Regular
	}
	return status
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

// With a slope the charge of the volume nearly cancels that of the ends, the more the lower the body. Up to slopeLayers
// times the radius in height it is evaluated by 16 layers where the point is more than slopeClear heights away from the
// wall (3.5^-32 = 4e-18 is left), and up to slopeClose times the radius by layers graded towards it elsewhere. Measured:
// the faces of taller bodies stay within a fifth of the tolerance (TestRoundReference).
const (
	slopeLayers = 1.5
	slopeClear  = 0.8
	slopeClose  = 1
)

// layers reports whether the body within a wall is to be evaluated by layers.
func (n *tubePoint) layers(w *tubeWall) bool {
	b := n.body
	height, clear := 2*b.half, float64(clearBy)
	if height > thin*b.outer {
		if b.slope == 0 || height > slopeLayers*b.outer {
			return false
		}
		clear = slopeClear
	}
	return n.away(w) > clear*height
}

// near evaluates the body by its faces, or by layers or shells where faces would cancel.
func (n *tubePoint) near(want field.Want) field.Value {
	b := n.body
	if b.lean && want == field.WantG {
		return n.axialField()
	}
	var c constant
	var k cosine
	var layered [2]bool
	all, some := true, false
	for i := range n.count {
		layered[i] = n.layers(&n.walls[i])
		all, some = all && layered[i], some || layered[i]
	}
	transverse := b.p.X != 0 || b.p.Y != 0
	axial := b.p.Z != 0 || b.slope != 0
	shells := transverse && !all && n.clearOfShell()
	if shells {
		n.addShells(&k, want)
	}
	form := b.closeForm()
	for i := range n.count {
		switch {
		case layered[i]:
			n.addLayers(i, &c, &k, axial, transverse && !shells, want)
			continue
		case !axial:
		case form == closeFlat && 2*b.half <= thin*n.walls[i].radius:
			n.addFlat(i, &c, want)
		case form == closeFlat: // a bore that is narrow beside the height: its potentials hardly cancel
			n.addEnds(n.walls[i:i+1], &c, want)
		case form == closeLayers:
			n.addCloseLayers(i, &c, want)
		case some:
			n.addEnds(n.walls[i:i+1], &c, want)
		}
		if transverse && !shells {
			n.addWall(&n.walls[i], &k, want)
		}
	}
	if axial && !some && form == closeFaces {
		n.addEnds(n.walls[:n.count], &c, want)
	}
	n.addStep(&c)
	if b.slope != 0 {
		c.lap = 4 * math.Pi * b.slope * n.inside()
	}
	return n.value(&c, &k, b.across(), want)
}

// axialField is near for the field alone of a cylinder polarized along its axis.
func (n *tubePoint) axialField() field.Value {
	w, p := &n.walls[0], n.body.p.Z
	var c constant // summed as in addEnds, bit for bit
	_, t1, solid := elliptic.Disc(w.radius, n.rho, n.zb, w.d, w.d*w.d+n.zb*n.zb)
	c.add(&sheet{rho: -t1, z: -onSide(solid, n.zb, n.bottom, w.d)}, -p)
	_, t1, solid = elliptic.Disc(w.radius, n.rho, n.zt, w.d, w.d*w.d+n.zt*n.zt)
	c.add(&sheet{rho: -t1, z: -onSide(solid, n.zt, n.top, w.d)}, p)
	n.addStep(&c)
	return n.value(&c, &cosine{}, n.body.across(), field.WantG)
}

// closeForm returns how the ends are evaluated at a point close to the wall.
func (b *Tube) closeForm() closeForm {
	height := 2 * b.half
	switch {
	case b.slope == 0 && height <= thin*b.outer:
		return closeFlat
	case b.slope == 0:
		return closeFaces
	case height <= thin*b.outer, height <= slopeClose*b.outer && b.outer-b.inner >= thin*b.outer:
		return closeLayers
	}
	return closeFaces
}

// closeForm is a way to evaluate the ends of a body at a point close to its wall.
type closeForm int

const (
	closeFaces  closeForm = iota // disc by disc
	closeFlat                    // the same, with the difference of their potentials taken under the integral
	closeLayers                  // as layers graded towards the point
)

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

// addFlat is addEnds for a flat body of uniform polarization at a point close to its wall, which is lower than thin radii:
// only the potential cancels,
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
	radial := n.radial(walls)
	c.byRho += s * radial.s
	c.rho += s * radial.s * n.rho
	c.sizeG += math.Abs(s) * radial.sizeS * n.rho
	c.sizeH += math.Abs(s) * radial.sizeS
	if want&field.WantPhi == 0 {
		return
	}
	if len(walls) == 2 && n.clearOfShell() {
		o := n.shellPotential()
		c.u -= s * o
		c.sizeU += math.Abs(s) * o
		return
	}
	pot := w*(zb*bottom.u-zt*top.u) - n.rho*n.rho*radial.s
	size := math.Abs(zb)*bottom.sizeU + math.Abs(zt)*top.sizeU + n.rho*n.rho*radial.sizeS
	for i := range walls {
		w := &walls[i]
		o := w.radius * n.wallPotential(w)
		pot += w.sign * o
		size += o
	}
	c.u -= 0.5 * s * pot
	c.sizeU += 0.5 * math.Abs(s) * size
}

// wallPotential returns the potential of a wall of unit charge.
func (n *tubePoint) wallPotential(w *tubeWall) float64 {
	line := band{a: w.radius, rho: n.rho, near: w.d, axial: true}
	return line.integral(n.zt, n.zb)
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
