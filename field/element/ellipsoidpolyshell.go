package element

import (
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// PolynomialSphere is the bound charge of a sphere, hollow or not, with polynomial polarization.
//
// Units: natural; g in the unit of p, phi in that times the length unit.
// Frame: the sphere's own.
// Domain: all finite x. NaN in, NaN out. Built by NewPolynomialSphere; immutable.
// Singular: nowhere. On the surfaces g jumps by (p.n) n; field.Inside is in the wall.
// Accuracy: that of PolynomialEllipsoid; of a thin wall too, the scale of its field is the largest polarization.
// Source: superposition of two PolynomialEllipsoid.
type PolynomialSphere struct {
	inner, outer float64
	hole, ball   *PolynomialEllipsoid // hole nil: full
}

// NewPolynomialSphere returns the charge between the radii inner (0 for a full sphere) and outer, p of degree 20 at most.
func NewPolynomialSphere(inner, outer float64, p field.Polynomial) (*PolynomialSphere, error) {
	if !(inner >= 0 && inner < outer && outer < math.Inf(1)) {
		return nil, fmt.Errorf("element: radii %v and %v of a sphere; give 0 <= inner < outer", inner, outer)
	}
	s := &PolynomialSphere{inner: inner, outer: outer}
	var err error
	if s.ball, err = newPolynomialBall(outer, p); err == nil && inner > 0 {
		s.hole, err = newPolynomialBall(inner, p)
	}
	if err != nil {
		return nil, err
	}
	return s, nil
}

func newPolynomialBall(a float64, p field.Polynomial) (*PolynomialEllipsoid, error) {
	return NewPolynomialEllipsoid(geom.Ellipsoid{SemiAxes: r3.Vec{X: a, Y: a, Z: a}}, p)
}

// Field returns g at x.
func (s *PolynomialSphere) Field(x r3.Vec) r3.Vec {
	return single(x, func(p field.Point, side field.Side) field.Value { return s.value(p, field.WantG, side) })
}

// Evaluate computes the arrays of dst; see field.Evaluator.
func (s *PolynomialSphere) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	field.Fill(dst, at, func(p field.Point, want field.Want) field.Value { return s.value(p, want, side) })
}

// Bounds returns the box of the sphere.
func (s *PolynomialSphere) Bounds() r3.Box { return cube(s.outer) }

func (s *PolynomialSphere) value(p field.Point, want field.Want, side field.Side) field.Value {
	if s.ball.scale.weak || s.hole != nil && s.hole.scale.weak {
		want |= field.WantErr
	}
	return between(polynomialShell{s, p.X, want}, s.inner, s.outer, p, side)
}

// polynomialShell is the sphere at a point.
type polynomialShell struct {
	s    *PolynomialSphere
	x    pair.Vec
	want field.Want
}

// of returns the value of a ball inside or outside of it; outside the point may be on the surface.
func (s polynomialShell) of(b *PolynomialEllipsoid, inside bool) field.Value {
	x := s.x.Scale(pair.Of(1 / b.base.unit))
	if inside {
		return b.inside(x, s.want)
	}
	return b.outside(x, false, s.want)
}

func (s polynomialShell) cavity(r3.Vec, float64) field.Value {
	return less(s.of(s.s.ball, true), s.of(s.s.hole, true))
}

func (s polynomialShell) wall(_, _ r3.Vec, _, _, _ float64) field.Value {
	v := s.of(s.s.ball, true)
	if s.s.hole != nil {
		v = less(v, s.of(s.s.hole, false))
	}
	return v
}

func (s polynomialShell) outside(r3.Vec, r3.Vec, float64) field.Value {
	v := s.of(s.s.ball, false)
	if s.s.hole != nil {
		v = less(v, s.of(s.s.hole, false))
	}
	return v
}

// less returns a - b.
func less(a, b field.Value) field.Value {
	a.Phi -= b.Phi
	a.G = r3.Sub(a.G, b.G)
	for k := range a.Grad {
		a.Grad[k] -= b.Grad[k]
	}
	a.ErrPhi += b.ErrPhi
	a.ErrG += b.ErrG
	a.ErrGrad += b.ErrGrad
	a.Status = max(a.Status, b.Status)
	return a
}
