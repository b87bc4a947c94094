package element

import (
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// RadialPower is the field of a cylinder or tube polarized away from the axis with p = c s^n, s from the axis.
//
// Units: natural; c s^n and g in the unit of the polarization, phi in that times length.
// Frame: that of the shape, about the z axis.
// Domain: all finite x; lengths of the shape within 1e-60 and 1e60, -40 <= n <= 40, n >= 0 if the body reaches the axis. NaN in,
// NaN out. Built by NewRadialPower; immutable.
// Singular: |g| grows as log(1/d) at distance d from a rim; there G is NaN, Phi finite, field.OnEdge. On a wall the mean of
// both sides, or the side asked for. The ends carry no charge. On the axis the gradient is infinite for n < 1.
// Accuracy: |error| <= 3e-12 max(|g|, 1e-3 g0) for g, 3e-12 max(|phi|, 1e-3 phi0) for phi, with g0 = max|p| min(1, (a/R)^3),
// phi0 = max|p| a min(1, (a/R)^2), a the bounding radius (worst 8.4e-13 and 2.5e-14, on bodies 1e-3 radii thick; else 2.8e-14
// and 1.6e-14, TestRingReference).
// Source: g of the charge c a^n of the outer wall, -c a^n of the inner one and -c (n+1) s^(n-1) of the volume as nested walls
// (see Wall), phi as that of nested shells of dipoles (see addVolume), by Gauss-Legendre in panels graded towards the point
// (see march), next to the axis for broken n by the Gauss rule for the weight s^n; multipoles beyond 2.5 bounding radii.
type RadialPower struct {
	powerBody
	axis  powerRule // next to the axis
	sharp bool      // it is needed: the power is not a whole number and the body reaches the axis
}

// NewRadialPower returns the tube, or with Inner 0 the cylinder, polarized with c s^n away from the axis.
func NewRadialPower(shape geom.Tube, c, n float64) (*RadialPower, error) {
	if n < 0 && shape.Inner == 0 {
		return nil, fmt.Errorf("element: radial power %v is infinite on the axis; give a power of at least 0, or a tube", n)
	}
	body, err := newPowerBody(shape, c, n)
	if err != nil {
		return nil, err
	}
	b := &RadialPower{powerBody: body}
	f := &b.faces
	if f.inner == 0 && b.rough() {
		if b.axis, b.sharp = newPowerRule(n); !b.sharp {
			return nil, fmt.Errorf("element: found no rule for the radial power %v; give a power closer to a whole number", n)
		}
	}
	f.p.X = c // the walls are charged, the ends are not
	b.peak = max(math.Abs(b.power(f.outer)), math.Abs(b.power(f.inner)))
	acrossRing(-f.half, f.half, func(z, wz float64) {
		b.radii(func(s, ws float64) {
			f.far.addRadial(s, z, 2*math.Pi*s*ws*wz*b.power(s))
		})
	})
	for l := 1; l <= farOrder; l += 2 {
		f.far.a[l] = 0 // even in z
	}
	f.far.a[2] = -4 * math.Pi * f.half * b.moment() / (f.bound * f.bound) // exactly
	return b, nil
}

// rough reports whether s^n is not smooth at s = 0.
func (b *RadialPower) rough() bool { return b.n < 0 || b.n != math.Floor(b.n) }

// radii visits the nodes of a rule for the moments.
func (b *RadialPower) radii(visit func(s, w float64)) {
	lo, hi := b.faces.inner, b.faces.outer
	if b.sharp {
		lo = 0.5 * hi
		b.axis.each(lo, visit)
	}
	for ; b.rough() && lo < 0.5*hi; lo *= 2 {
		powerPanels(lo, 2*lo, b.n, visit)
	}
	powerPanels(lo, hi, b.n, visit)
}

// moment returns the integral of p s^2 from the inner to the outer radius.
func (b *RadialPower) moment() float64 {
	f, n := &b.faces, b.n+3
	if f.inner == 0 {
		return b.power(f.outer) * f.outer * f.outer * f.outer / n
	}
	ratio := math.Log(f.inner / f.outer)
	if n == 0 {
		return -b.c * ratio
	}
	return -b.power(f.outer) * f.outer * f.outer * f.outer * math.Expm1(n*ratio) / n
}

// power returns p at the distance s.
func (b *RadialPower) power(s float64) float64 {
	if s == 0 && b.n > 0 {
		return 0
	}
	return b.c * math.Pow(s, b.n)
}

// charge returns the volume charge -d(s p)/ds/s at the distance s.
func (b *RadialPower) charge(s float64) float64 {
	if b.n == -1 {
		return 0
	}
	return -b.c * (b.n + 1) * math.Pow(s, b.n-1)
}

// Field returns g at x.
func (b *RadialPower) Field(x r3.Vec) r3.Vec {
	return single(x, func(p field.Point, side field.Side) field.Value { return b.value(p, side, field.WantG) })
}

// Evaluate computes the arrays of dst; see field.Evaluator.
func (b *RadialPower) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	field.Fill(dst, at, func(p field.Point, want field.Want) field.Value { return b.value(p, side, want) })
}

// Bounds returns the box of the body.
func (b *RadialPower) Bounds() r3.Box { return b.faces.Bounds() }

func (b *RadialPower) value(x field.Point, side field.Side, want field.Want) field.Value {
	f := &b.faces
	p := newRoundPoint(x, 0, f.bound)
	if f.far.far(&p) {
		return b.away(&p, want)
	}
	n := newTubePoint(f, p)
	status := n.settle(side)
	if status == field.OnEdge {
		want = field.WantPhi | want&field.WantErr
	}
	var c constant
	if want&(field.WantG|field.WantGrad) != 0 {
		for i := range n.count {
			w := &n.walls[i]
			b.addWall(&n, w, &c, w.sign*b.power(w.radius))
		}
	}
	left := b.addVolume(&n, &c, want)
	if in := n.inside(); in != 0 {
		lap := 4 * math.Pi * b.charge(n.rho) * in
		c.lap -= lap
		c.sizeH += math.Abs(lap)
	}
	return b.finish(&p, &c, left, status, want)
}

// addWall adds the field of a wall of charge density f. It returns the derivatives of the potential.
func (b *RadialPower) addWall(n *tubePoint, w *tubeWall, c *constant, f float64) (rho, z float64) {
	rb, rt := n.ends(w)
	vb, vt := rb.values(needRadial), rt.values(needRadial)
	var one constant
	one.addUniformWall(&rb, &rt, &vb, &vt, w.within)
	one.sizeH += w.radius*(math.Abs(vb.d3a)+math.Abs(vt.d3a)) + math.Abs(w.d)*(vb.s3a+vt.s3a)
	one.scale(f)
	c.join(&one)
	return one.rho, one.z
}

// addVolume adds the volume: its field as that of nested walls of charge, the potential of the whole body as that of nested
// shells of dipoles. It returns what the rules may have left out.
//
// A shell at s of dipoles p away from the axis has the potential p s dV/ds, V = int dz oint dphi/R. V knows no difference
// between s and the distance rho of the point from the axis, so dV/ds is -1/rho times the field at the distance s of a wall
// of radius rho, a closed form.
func (b *RadialPower) addVolume(n *tubePoint, c *constant, want field.Want) float64 {
	f := &b.faces
	m := march{lo: -n.rho, hi: n.walls[0].d}
	if n.count == 2 {
		m.lo = n.walls[1].d
	}
	m.degree = math.Abs(b.n)
	m.scale = (f.outer - f.inner) / (m.hi - m.lo)
	m.longest = (f.outer - f.inner) / (1 + math.Abs(b.n)/4)
	zb, zt := n.zb, n.zt
	least := ringLeast * f.bound
	m.put(0, max(math.Abs(zb), least))
	m.put(0, max(math.Abs(zt), least))
	m.put(-2*n.rho, zb)
	m.put(-2*n.rho, zt)
	add := func(d, wd float64) (p, q float64) {
		s := n.rho + d
		if !(s > 0) {
			return 0, 0
		}
		if want&(field.WantG|field.WantGrad) != 0 {
			w := tubeWall{radius: s, d: d, within: 0.5 + 0.5*sign(d)}
			p, q = b.addWall(n, &w, c, wd*b.charge(s))
			p, q = p/wd, q/wd
		}
		if want&field.WantPhi != 0 {
			v, size := b.shell(n, s, d)
			f := b.power(s) * wd
			c.u += f * v
			c.sizeU += math.Abs(f) * size
		}
		return p, q
	}
	if b.sharp {
		end := m.step(m.lo, m.hi, 1)
		if n.rho > 0 {
			end = min(end, n.rho) // not across the point
		}
		b.axis.each(end, func(s, w float64) { add(s-n.rho, w) })
		m.lo += end
	}
	if b.rough() {
		m.putPole(-n.rho, 0, 1+max(0, -b.n/4))
	}
	m.each(true, add)
	return m.left
}

// shell returns s dV/ds, see addVolume, and the sum of the sizes of its terms.
func (b *RadialPower) shell(n *tubePoint, s, d float64) (v, size float64) {
	a := n.rho
	if least := 1e-10 * s; a < least { // V is even in rho
		a, d = least, s-least
	}
	rb, rt := rimAt(a, s, -d, n.zb), rimAt(a, s, -d, n.zt)
	vb, vt := rb.values(needRadial), rt.values(needRadial)
	full := (vb.full - vt.full) * rb.eInf()
	return -s / a * (full + vb.e - vt.e), s / a * (math.Abs(full) + math.Abs(vb.e) + math.Abs(vt.e))
}
