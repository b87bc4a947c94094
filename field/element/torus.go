package element

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// Torus is the field of a uniformly polarized torus.
//
// Units: natural; P and g in the unit of the polarization, phi in that times length.
// Frame: that of the shape, about the z axis.
// Domain: all finite x; lengths of the shape within 1e-60 and 1e60. NaN in, NaN out. Built by NewTorus; immutable.
// Singular: nowhere. On the surface the mean of both sides, or the side asked for.
// Accuracy: |error| <= 3e-12 max(|g|, 1e-3 g0) for g, 3e-12 max(|phi|, 1e-3 phi0) for phi, with g0 = |P| min(1, (a/R)^3),
// phi0 = |P| a min(1, (a/R)^2), a the outer radius (worst 2.5e-14 and 9e-13, TestRingReference).
// Source: rings of charge and of charge cos(phi) around the cross-section by Gauss-Legendre in panels graded towards the
// point (see ringView, march); close to the surface the gradient from its derivative along it (ringAlong); multipoles
// beyond 2.5 outer radii.
type Torus struct {
	shape geom.Torus
	p     r3.Vec
	bound float64
	far   roundMultipoles
}

// NewTorus returns the torus polarized with p.
func NewTorus(shape geom.Torus, p r3.Vec) (*Torus, error) {
	if err := shape.Check(); err != nil {
		return nil, err
	}
	if err := finitePolarization(p); err != nil {
		return nil, err
	}
	b := &Torus{shape: shape, p: p, bound: shape.Major + shape.Minor}
	b.far = roundMultipoles{bound: b.bound}
	const around = 64
	acrossRing(0, shape.Minor, func(s, ws float64) {
		for i := range around {
			sin, cos := math.Sincos(2 * math.Pi * (float64(i) + 0.5) / around)
			rho := shape.Major + s*cos
			b.far.addUniform(rho, s*sin, 4*math.Pi*math.Pi/around*ws*s*rho, p.Z)
		}
	})
	b.far.a[1], b.far.b[1] = p.Z*shape.Volume()/b.bound, shape.Volume()/b.bound // exactly
	for l := 2; l <= farOrder; l += 2 {
		b.far.a[l], b.far.b[l] = 0, 0 // even in z
	}
	return b, nil
}

// Field returns g at x.
func (b *Torus) Field(x r3.Vec) r3.Vec {
	return single(x, func(p field.Point, side field.Side) field.Value { return b.value(p, side, field.WantG) })
}

// Evaluate computes the arrays of dst; see field.Evaluator.
func (b *Torus) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	field.Fill(dst, at, func(p field.Point, want field.Want) field.Value { return b.value(p, side, want) })
}

// Bounds returns the box of the body, up to rounding.
func (b *Torus) Bounds() r3.Box { return b.shape.Bounds() }

func (b *Torus) value(x field.Point, side field.Side, want field.Want) field.Value {
	p := newRoundPoint(x, 0, b.bound)
	t := r3.Vec{X: b.p.X, Y: b.p.Y}
	if b.far.far(&p) {
		c, k := b.far.sum(&p, want)
		return p.value(&c, &k, t, want)
	}
	v := arcView(&p, b.shape.Major, b.shape.Minor)
	s := newRingSurface(b.p, want)
	on := b.p != r3.Vec{} && math.Abs(v.d) <= p.tol
	var c constant
	var k cosine
	s.evaluate(&v, &c, &k, on, side)
	r := p.value(&c, &k, t, want)
	if on {
		r.Status, r.ErrGrad = field.OnFace, math.Inf(1)
	}
	return s.settled(r)
}
