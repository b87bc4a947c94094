package element

import (
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// Cone is the field of a uniformly polarized cone or truncated cone.
//
// Units: natural; P and g in the unit of the polarization, phi in that times length.
// Frame: that of the shape, about the z axis.
// Domain: all finite x; lengths of the shape within 1e-60 and 1e60. NaN in, NaN out. Built by NewCone; immutable.
// Singular: |g| grows as log(1/d) at distance d from a rim or tip next to a charged face, whatever the azimuth; there G is NaN,
// Phi finite, field.OnEdge. On a charged face the mean of both sides, or the side asked for. Where the faces next to a point
// carry no charge the point is regular.
// Accuracy: |error| <= 3e-12 max(|g|, 1e-3 g0) for g, 3e-12 max(|phi|, 1e-3 phi0) for phi, with g0 = |P| min(1, (a/R)^3),
// phi0 = |P| a min(1, (a/R)^2), a the bounding radius (worst 6.6e-13 and 2.3e-12, both on a cone 1e-3 radii high; else 3.8e-14
// and 6.6e-14, TestRingReference). The gradient to 1e-9 max(|grad g|, 1e-3 |P|/size) (worst 6.2e-11, TestGradientReference in
// field/bound), but inside next to the tip of a needle, of radius s times the distance from it, to about 5e-15/s^3 of |grad g|
// (measured down to s = 1e-3): the charge all round nearly cancels there. The estimate holds.
// Source: ends as discs (see Disc); the wall as rings of charge and of charge cos(phi) by Gauss-Legendre in panels graded
// towards the point (see ringView, march); close to the wall the gradient from its derivative along it (ringAlong);
// multipoles beyond 2.5 bounding radii.
type Cone struct {
	shape geom.Cone
	p     r3.Vec
	half  float64
	bound float64
	wall  line
	far   roundMultipoles
}

// NewCone returns the cone polarized with p.
func NewCone(shape geom.Cone, p r3.Vec) (*Cone, error) {
	if err := shape.Check(); err != nil {
		return nil, err
	}
	if err := finitePolarization(p); err != nil {
		return nil, err
	}
	half := shape.Height / 2
	b := &Cone{shape: shape, p: p, half: half, bound: math.Hypot(max(shape.Bottom, shape.Top), half)}
	b.wall = newLine(shape.Bottom, -half, shape.Top, half)
	b.far = roundMultipoles{bound: b.bound}
	acrossRing(-half, half, func(z, wz float64) {
		t := 0.5 + z/shape.Height
		acrossRing(0, shape.Bottom*(1-t)+shape.Top*t, func(s, ws float64) {
			b.far.addUniform(s, z, 2*math.Pi*s*ws*wz, p.Z)
		})
	})
	b.far.a[1], b.far.b[1] = p.Z*shape.Volume()/b.bound, shape.Volume()/b.bound // exactly
	return b, nil
}

// finitePolarization refuses a polarization that is not finite.
func finitePolarization(p r3.Vec) error {
	if s := p.X + p.Y + p.Z; s-s != 0 {
		return fmt.Errorf("element: polarization %v is not finite; give finite numbers", p)
	}
	return nil
}

// Field returns g at x.
func (b *Cone) Field(x r3.Vec) r3.Vec {
	return single(x, func(p field.Point, side field.Side) field.Value { return b.value(p, side, field.WantG) })
}

// Evaluate computes the arrays of dst; see field.Evaluator.
func (b *Cone) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	field.Fill(dst, at, func(p field.Point, want field.Want) field.Value { return b.value(p, side, want) })
}

// Bounds returns the box of the body.
func (b *Cone) Bounds() r3.Box { return b.shape.Bounds() }

func (b *Cone) value(x field.Point, side field.Side, want field.Want) field.Value {
	p := newRoundPoint(x, 0, b.bound)
	t := r3.Vec{X: b.p.X, Y: b.p.Y}
	if b.far.far(&p) {
		c, k := b.far.sum(&p, want)
		return p.value(&c, &k, t, want)
	}
	v := b.wall.view(&p)
	bottom, top := p.rim(b.shape.Bottom, -b.half), p.rim(b.shape.Top, b.half)
	status, onWall := b.place(&p, &v, &bottom, &top, sideSign(side))
	if status == field.OnEdge {
		want = field.WantPhi | want&field.WantErr
	}
	var c constant
	var k cosine
	if b.p.Z != 0 {
		b.addEnds(&bottom, &top, &c, want)
	}
	s := newRingSurface(b.p, want)
	s.evaluate(&v, &c, &k, onWall, side)
	r := p.value(&c, &k, t, want)
	switch status {
	case field.OnEdge:
		return onEdge(r)
	case field.OnFace:
		r.Status, r.ErrGrad = field.OnFace, math.Inf(1)
	}
	return s.settled(r)
}

// place tells what kind of place the point is on, and whether that is the wall; on an end it sets the side.
func (b *Cone) place(p *roundPoint, v *ringView, bottom, top *rim, out float64) (status field.Status, onWall bool) {
	if most := max(-bottom.z, top.z, v.d); most > p.tol || most < -p.tol {
		return field.Regular, false
	}
	onBottom, onTop := bottom.z <= p.tol, top.z >= -p.tol
	onWall = v.d >= -p.tol
	end := b.p.Z != 0
	wall := b.p.X != 0 || b.p.Y != 0 || b.p.Z != 0 && v.nz != 0
	switch {
	case onWall && (onBottom || onTop), onBottom && onTop:
		if end || wall {
			return field.OnEdge, false
		}
	case onWall && wall:
		return field.OnFace, true
	case onBottom && end:
		bottom.sign = -out
		return field.OnFace, false
	case onTop && end:
		top.sign = out
		return field.OnFace, false
	}
	return field.Regular, false
}

// addEnds adds the end faces.
func (b *Cone) addEnds(bottom, top *rim, c *constant, want field.Want) {
	what := needsOf(want)
	if bottom.a > 0 {
		s := bottom.disc(what)
		c.add(&s, -b.p.Z)
	}
	if top.a > 0 {
		s := top.disc(what)
		c.add(&s, b.p.Z)
	}
}
