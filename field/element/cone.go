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
// and 6.6e-14, TestRingReference). The gradient to 1e-9 max(|grad g|, 1e-3 |P|/size) (worst 6.2e-11 of the gradient references in
// field/bound), but inside next to the tip of a needle, of radius s times the distance from it, to about 5e-15/s^3 of |grad g|
// (measured down to s = 1e-3): the charge all round nearly cancels there. The estimate holds.
// Source: ends as discs (see Disc); the wall as rings of charge and of charge cos(phi) by Gauss-Legendre in panels graded
// towards the point (see ringView, march); close to the wall the gradient from its derivative along it (ringAlong);
// multipoles beyond 2.5 bounding radii.
type Cone struct {
	frustum
	p   r3.Vec
	far roundMultipoles
}

// frustum is the shape of the cones.
type frustum struct {
	shape geom.Cone
	half  float64
	bound float64 // radius of a sphere about the origin that holds it
	wall  line
}

// newFrustum returns the error of shape.Check.
func newFrustum(shape geom.Cone) (f frustum, err error) {
	half := shape.Height / 2
	f = frustum{shape: shape, half: half, bound: math.Hypot(max(shape.Bottom, shape.Top), half)}
	f.wall = newLine(shape.Bottom, -half, shape.Top, half)
	return f, shape.Check()
}

// Bounds returns the box of the body.
func (f *frustum) Bounds() r3.Box { return f.shape.Bounds() }

// NewCone returns the cone polarized with p.
func NewCone(shape geom.Cone, p r3.Vec) (*Cone, error) {
	f, err := newFrustum(shape)
	if err != nil {
		return nil, err
	}
	if err := finitePolarization(p); err != nil {
		return nil, err
	}
	b := &Cone{frustum: f, p: p}
	b.far = roundMultipoles{bound: b.bound}
	acrossRing(-b.half, b.half, func(z, wz float64) {
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

func (b *Cone) value(x field.Point, side field.Side, want field.Want) field.Value {
	p := newRoundPoint(x, 0, b.bound)
	t := r3.Vec{X: b.p.X, Y: b.p.Y}
	if b.far.far(&p) {
		c, k := b.far.sum(&p, want)
		return p.value(&c, &k, t, want)
	}
	v := b.wall.view(&p)
	end := b.p.Z != 0
	status, face := b.place(&p, &v, [3]bool{end, end, end && v.nz != 0 || b.p.X != 0 || b.p.Y != 0})
	bottom, top := p.rim(b.shape.Bottom, -b.half), p.rim(b.shape.Top, b.half)
	switch out := sideSign(side); {
	case status != field.OnFace:
	case face == bottomFace:
		bottom.sign = -out
	case face == topFace:
		top.sign = out
	}
	if status == field.OnEdge {
		want = field.WantPhi | want&field.WantErr
	}
	var c constant
	var k cosine
	if end {
		b.addEnds(&bottom, &top, &c, want)
	}
	s := newRingSurface(b.p, want)
	s.evaluate(&v, &c, &k, status == field.OnFace && face == wallFace, side)
	r := p.value(&c, &k, t, want)
	switch status {
	case field.OnEdge:
		return onEdge(r)
	case field.OnFace:
		r.Status, r.ErrGrad = field.OnFace, math.Inf(1)
	}
	return s.settled(r)
}

// The faces of a frustum.
const (
	noFace = iota - 1
	bottomFace
	topFace
	wallFace
)

// place tells which face the point is on, and what that makes of it if these faces are charged. Where faces meet the place
// is an edge if one of them is.
func (f *frustum) place(p *roundPoint, v *ringView, charged [3]bool) (status field.Status, face int) {
	h := [3]float64{bottomFace: -p.height(-f.half), topFace: p.height(f.half), wallFace: v.d}
	if most := max(h[0], h[1], h[2]); most > p.tol || most < -p.tol {
		return field.Regular, noFace
	}
	face = noFace
	met, live := 0, false
	for k, d := range h {
		if d >= -p.tol {
			met, face = met+1, k
			live = live || charged[k]
		}
	}
	switch {
	case !live:
		return field.Regular, face
	case met > 1:
		return field.OnEdge, face
	}
	return field.OnFace, face
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
