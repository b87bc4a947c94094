package element

import (
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// Tube is the field of a cylinder or tube polarized with p = P + Slope z k, z from mid-height and k along the axis.
//
// Units: natural; P and g in the unit of the polarization, Slope in that by length, phi in that times length.
// Frame: that of the shape, about the z axis.
// Domain: all finite x; lengths of the shape within 1e-70 and 1e70. NaN in, NaN out. Built by NewTube or NewCylinder;
// immutable.
// Singular: |g| grows as log(1/d) at distance d from a rim next to a charged face, whatever the azimuth; on such a rim G is
// NaN, Phi finite, field.OnEdge. On a charged face the mean of both sides, or the side asked for. Where all faces next
// to a point carry no charge the point is regular.
// Accuracy: |error| <= 1e-13 max(|g|, 1e-3 g0) for g, 2e-13 max(|phi|, 1e-3 phi0) for phi, with g0 = max|p| min(1, (a/R)^3),
// phi0 = max|p| a min(1, (a/R)^2), a the bounding radius (worst of 5000 points 7.2e-14 and 1.9e-13, TestRoundReference).
// Source: end faces as discs (see Disc); transverse P as cos(phi) on the walls, [Caciagli2018]
// in the form W_rho = -W/rho - Omega_1 + Omega_2 + 4 pi [inside]; the volume charge -Slope by
// the divergence theorem. Multipoles of the whole, neutral body beyond 2.5 bounding radii; stacked dipole layers for
// flat bodies and nested dipole shells for thin walls, which keep the small difference of their faces.
type Tube struct {
	inner, outer, half float64
	p                  r3.Vec
	slope              float64
	bound              float64
	lean               bool // axialField serves
	far                roundMultipoles
}

// NewTube returns the tube polarized with p + slope z k.
func NewTube(shape geom.Tube, p r3.Vec, slope float64) (*Tube, error) {
	if err := shape.Check(); err != nil {
		return nil, err
	}
	return newTube(shape.Inner, shape.Outer, shape.Height, p, slope)
}

// NewCylinder returns the cylinder polarized with p + slope z k: a tube without a bore.
func NewCylinder(shape geom.Cylinder, p r3.Vec, slope float64) (*Tube, error) {
	if err := shape.Check(); err != nil {
		return nil, err
	}
	return newTube(0, shape.Radius, shape.Height, p, slope)
}

func newTube(inner, outer, height float64, p r3.Vec, slope float64) (*Tube, error) {
	if s := p.X + p.Y + p.Z + slope; s-s != 0 {
		return nil, fmt.Errorf("element: polarization %v with slope %v is not finite; give finite numbers", p, slope)
	}
	b := &Tube{inner: inner, outer: outer, half: height / 2, p: p, slope: slope}
	b.bound = math.Hypot(outer, b.half)
	b.far = roundMultipoles{bound: b.bound}
	b.lean = inner == 0 && slope == 0 && p.X == 0 && p.Y == 0 && height > thin*outer
	acrossRing(inner, outer, func(s, ws float64) {
		acrossRing(-b.half, b.half, func(z, wz float64) {
			b.far.addDipoles(s, z, 2*math.Pi*s*ws*wz, p.Z, slope)
		})
	})
	// the first moments exactly
	volume := math.Pi * (outer - inner) * (outer + inner) * height
	b.far.a[1], b.far.b[1] = p.Z*volume/b.bound, volume/b.bound
	if p.X == 0 && p.Y == 0 {
		b.far.b = [farOrder + 1]float64{}
	}
	b.far.a[2] = slope * volume * height * height / 6 / (b.bound * b.bound)
	return b, nil
}

// Field returns g at x.
func (b *Tube) Field(x r3.Vec) r3.Vec {
	return single(x, func(p field.Point, side field.Side) field.Value { return b.value(p, side, field.WantG) })
}

// Evaluate computes the arrays of dst; see field.Evaluator.
func (b *Tube) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	field.Fill(dst, at, func(p field.Point, want field.Want) field.Value { return b.value(p, side, want) })
}

// Bounds returns the box of the body.
func (b *Tube) Bounds() r3.Box {
	c := r3.Vec{X: b.outer, Y: b.outer, Z: b.half}
	return r3.Box{Min: r3.Scale(-1, c), Max: c}
}

func (b *Tube) value(x field.Point, side field.Side, want field.Want) field.Value {
	p := newRoundPoint(x, 0, b.bound)
	if b.far.far(&p) {
		c, k := b.far.sum(&p, want)
		return p.value(&c, &k, b.across(), want)
	}
	n := newTubePoint(b, p)
	status := n.settle(side)
	if status == field.OnEdge {
		return onEdge(n.near(field.WantPhi | want&field.WantErr))
	}
	v := n.near(want)
	if status == field.OnFace {
		v.Status, v.ErrGrad = field.OnFace, math.Inf(1)
	}
	return v
}

// across returns the transverse part of P.
func (b *Tube) across() r3.Vec { return r3.Vec{X: b.p.X, Y: b.p.Y} }

// charges returns the charge densities of the bottom and the top face.
func (b *Tube) charges() (bottom, top float64) {
	return -(b.p.Z - b.slope*b.half), b.p.Z + b.slope*b.half
}
