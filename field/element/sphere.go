package element

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Sphere is the field of a uniformly polarized sphere about the origin.
//
// Units: P is the polarization; g has its unit, phi its unit times length.
// Frame: the sphere's own.
// Domain: all finite x, for a shape whose Check is nil. NaN in, NaN out.
// Singular: nowhere. On the surface (geom.OnTolerance) g jumps by (P.n) n; the gradient has no claim there.
// Accuracy: |error| <= 2e-15 of phi and |g|, 4e-15 of |grad g| (TestSimpleReference, TestGradientDifferences).
// Source: [Maxwell1873] art. 437: uniform inside, a dipole outside.
type Sphere struct {
	Shape geom.Sphere
	P     r3.Vec
}

// Field returns g at x.
func (s Sphere) Field(x r3.Vec) r3.Vec { return single(x, s.value) }

// Evaluate computes the arrays of dst; see field.Evaluator.
func (s Sphere) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	field.Fill(dst, at, func(p field.Point, _ field.Want) field.Value { return s.value(p, side) })
}

// Bounds returns the box of the sphere.
func (s Sphere) Bounds() r3.Box { return s.Shape.Bounds() }

func (s Sphere) value(p field.Point, side field.Side) field.Value {
	a := s.Shape.Radius
	n, r := direction(p.X.Value())
	switch _, where := height(p, r, a, s.Bounds()); where {
	case geom.Inside:
		return s.inside(p.X)
	case geom.Outside:
		return s.outside(p.X, n, r)
	}
	return onFace(s.inside(p.X), s.outside(p.X, n, r), side)
}

// inside returns phi = P.x/3, g = -P/3. The estimates of this and of what follows allow for components of P that a turn
// into the frame of the sphere has rounded: u |P|, which phi feels where x is across P.
func (s Sphere) inside(x pair.Vec) field.Value {
	phi, size := along(s.P, x, 3), r3.Norm(s.P)
	return field.Value{
		Phi: phi, G: r3.Scale(-1.0/3, s.P),
		ErrPhi: u * (4*math.Abs(phi) + size*r3.Norm(x.Value())/2), ErrG: 2 * u * size,
	}
}

// outside returns the dipole of moment (4 pi/3) a^3 P.
func (s Sphere) outside(x pair.Vec, n r3.Vec, r float64) field.Value {
	a := s.Shape.Radius
	q := a / r
	e := q * q * a / 3
	v := dipolar(s.P, along(s.P, x, r), e, n, r)
	v.ErrPhi += 2 * u * e * r3.Norm(s.P)
	return v
}

// HollowSphere is the field of a uniformly polarized hollow sphere about the origin: the sphere Outer less Inner.
//
// Units: P is the polarization; g has its unit, phi its unit times length.
// Frame: the sphere's own.
// Domain: all finite x, for a shape whose Check is nil. NaN in, NaN out. In the cavity phi and g are zero.
// Singular: nowhere. On both surfaces (geom.OnTolerance) g jumps by (P.n) n; field.Inside is in the wall.
// Accuracy: |error| <= 4e-15 of phi and |g|, also for thin walls (TestSimpleReference).
// Source: superposition of two spheres, see Sphere; differences of cubes are factored.
type HollowSphere struct {
	Shape geom.HollowSphere
	P     r3.Vec
}

// Field returns g at x.
func (s HollowSphere) Field(x r3.Vec) r3.Vec { return single(x, s.value) }

// Evaluate computes the arrays of dst; see field.Evaluator.
func (s HollowSphere) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	field.Fill(dst, at, func(p field.Point, _ field.Want) field.Value { return s.value(p, side) })
}

// Bounds returns the box of the outer sphere.
func (s HollowSphere) Bounds() r3.Box { return s.Shape.Bounds() }

func (s HollowSphere) value(p field.Point, side field.Side) field.Value {
	n, r := direction(p.X.Value())
	h, inner := height(p, r, s.Shape.Inner, s.Bounds())
	switch inner {
	case geom.Inside:
		return field.Value{}
	case geom.On:
		return onFace(s.wall(p.X, n, r, h), field.Value{}, side)
	}
	switch _, outer := height(p, r, s.Shape.Outer, s.Bounds()); outer {
	case geom.Inside:
		return s.wall(p.X, n, r, h)
	case geom.On:
		return onFace(s.wall(p.X, n, r, h), s.outside(p.X, n, r), side)
	}
	return s.outside(p.X, n, r)
}

// wall returns the value at height h above the inner surface: with c = (Inner/r)^3 and k = 1 - c,
//
//	phi = k P.x/3,   g = -k P/3 - c (P.n) n.
func (s HollowSphere) wall(x pair.Vec, n r3.Vec, r, h float64) field.Value {
	q := s.Shape.Inner / r
	c := q * q * q
	k := h / r * (1 + q + q*q)
	pn := along(s.P, x, r)
	phi := k * along(s.P, x, 3)
	v := dipolar(s.P, pn, -c*r/3, n, r)
	v.Phi = phi
	v.G = r3.Vec{X: -k/3*s.P.X - c*pn*n.X, Y: -k/3*s.P.Y - c*pn*n.Y, Z: -k/3*s.P.Z - c*pn*n.Z}
	v.ErrPhi = 64*u*math.Abs(phi) + u*math.Abs(k)*r/2*r3.Norm(s.P) // h alone: 28 u
	v.ErrG = 64*u*math.Abs(k)/3*r3.Norm(s.P) + 28*u*c*math.Abs(pn)
	return v
}

// outside returns the dipole of moment (4 pi/3) (Outer^3 - Inner^3) P.
func (s HollowSphere) outside(x pair.Vec, n r3.Vec, r float64) field.Value {
	a, b := s.Shape.Inner, s.Shape.Outer
	e := (b - a) / r * (b*(b/r) + a*(b/r) + a*(a/r)) / 3
	v := dipolar(s.P, along(s.P, x, r), e, n, r)
	v.ErrPhi += 2 * u * e * r3.Norm(s.P)
	return v
}

// ChargedBall is the field of a sphere about the origin with uniform volume charge.
//
// Units: Density in units of the polarization per length.
// Frame: the sphere's own.
// Domain: all finite x, for a shape whose Check is nil. NaN in, NaN out.
// Singular: nowhere; only the gradient jumps on the surface and has no claim there.
// Accuracy: |error| <= 2e-15 of phi and |g| (TestChargedSpheres).
// Source: [Newton1687] book 1, props. 71 and 73.
type ChargedBall struct {
	Shape   geom.Sphere
	Density float64
}

// Field returns g at x.
func (s ChargedBall) Field(x r3.Vec) r3.Vec { return single(x, s.value) }

// Evaluate computes the arrays of dst; see field.Evaluator.
func (s ChargedBall) Evaluate(dst *field.Values, at *field.Points, _ field.Side) {
	field.Fill(dst, at, func(p field.Point, _ field.Want) field.Value { return s.value(p, field.Mean) })
}

// Bounds returns the box of the sphere.
func (s ChargedBall) Bounds() r3.Box { return s.Shape.Bounds() }

func (s ChargedBall) value(p field.Point, _ field.Side) field.Value {
	a, x := s.Shape.Radius, p.X.Value()
	n, r := direction(x)
	_, where := height(p, r, a, s.Bounds())
	if where == geom.Outside {
		return monopole(s.Density/3*(a/r)*a*a, n, r)
	}
	t := s.Density / 3
	phi := t / 2 * (3*a*a - r*r) // at most one digit in binary is lost: 3 a^2 - r^2 >= 2 a^2
	v := field.Value{Phi: phi, G: r3.Scale(t, x), Grad: [6]float64{t, t, t},
		ErrPhi: 20 * u * math.Abs(phi), ErrG: 4 * u * math.Abs(t) * r, ErrGrad: 4 * u * math.Abs(t)}
	if where == geom.On {
		v.ErrGrad = math.Inf(1)
	}
	return v
}

// ChargedSphere is the field of a sphere about the origin with uniform charge on its surface.
//
// Units: Density in units of the polarization.
// Frame: the sphere's own.
// Domain: all finite x, for a shape whose Check is nil. NaN in, NaN out.
// Singular: nowhere. On the surface (geom.OnTolerance) g jumps by Density n.
// Accuracy: |error| <= 2e-15 of phi and |g| (TestChargedSpheres).
// Source: [Newton1687] book 1, props. 70 and 71.
type ChargedSphere struct {
	Shape   geom.Sphere
	Density float64
}

// Field returns g at x.
func (s ChargedSphere) Field(x r3.Vec) r3.Vec { return single(x, s.value) }

// Evaluate computes the arrays of dst; see field.Evaluator.
func (s ChargedSphere) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	field.Fill(dst, at, func(p field.Point, _ field.Want) field.Value { return s.value(p, side) })
}

// Bounds returns the box of the sphere.
func (s ChargedSphere) Bounds() r3.Box { return s.Shape.Bounds() }

func (s ChargedSphere) value(p field.Point, side field.Side) field.Value {
	a := s.Shape.Radius
	n, r := direction(p.X.Value())
	inside := field.Value{Phi: s.Density * a, ErrPhi: u * math.Abs(s.Density*a)}
	_, where := height(p, r, a, s.Bounds())
	if where == geom.Inside {
		return inside
	}
	outside := monopole(s.Density*(a/r)*a, n, r)
	if where == geom.Outside {
		return outside
	}
	return onFace(inside, outside, side)
}

// height returns r - a, r = |x|, and on which side of the sphere of radius a the point lies.
//
// Where r - a would lose more than three bits it comes from the pairs of the point; its error is at most 28 u |r - a|.
func height(p field.Point, r, a float64, bounds r3.Box) (float64, geom.Region) {
	h := r - a
	if math.Abs(h) < a/8 {
		h = p.X.Norm().Sub(pair.Of(a)).Value()
	} else if math.Abs(h) > p.Slack {
		return h, sideOf(h)
	}
	if math.Abs(h) <= geom.OnTolerance(bounds, p.X.Value(), p.Slack) {
		return h, geom.On
	}
	return h, sideOf(h)
}

// sideOf returns the side of a point at height h off the surface.
func sideOf(h float64) geom.Region {
	if h < 0 {
		return geom.Inside
	}
	return geom.Outside
}

// onFace returns the value on a charged face from its limits.
func onFace(inside, outside field.Value, side field.Side) field.Value {
	v := inside
	switch side {
	case field.Outside:
		v = outside
	case field.Mean:
		v.Phi = 0.5*inside.Phi + 0.5*outside.Phi
		v.G = r3.Scale(0.5, r3.Add(inside.G, outside.G))
		for k := range v.Grad {
			v.Grad[k] = 0.5*inside.Grad[k] + 0.5*outside.Grad[k]
		}
		v.ErrPhi = max(inside.ErrPhi, outside.ErrPhi) + u*math.Abs(v.Phi)
		v.ErrG = max(inside.ErrG, outside.ErrG) + 2*u*r3.Norm(v.G)
	}
	v.ErrGrad, v.Status = math.Inf(1), max(field.OnFace, inside.Status, outside.Status)
	return v
}
