package element

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// AffineTube is the bound charge of a cylinder or tube with the polarization P(x) + Radial s, where P is any affine one and
// s the unit vector away from the axis. Tube has closed forms for what it covers, and is faster there.
//
// Units: natural; P, Radial and g in the unit of the polarization, phi in that times the unit of length.
// Frame: that of the shape, about the z axis.
// Domain: all finite x; lengths of the shape within 1e-60 and 1e60. NaN in, NaN out. Built by NewAffineTube and
// NewAffineCylinder; immutable.
// Singular: |g| grows as log(1/d) at distance d from a rim next to a charged face; on it G is NaN, Phi finite, field.OnEdge.
// On a charged face the mean of both sides, or the side asked for, and no gradient. On the axis of a cylinder the radial part
// has no direction: g is the mean over all azimuths.
// Accuracy: that of Arc (TestSectorReference).
// Source: as Arc.
type AffineTube struct {
	sector *sector
}

// NewAffineTube returns the tube polarized with p + radial s.
func NewAffineTube(shape geom.Tube, p field.Affine, radial float64) (*AffineTube, error) {
	if err := shape.Check(); err != nil {
		return nil, err
	}
	return newAffineTube(shape.Inner, shape.Outer, shape.Height, shape.Bounds(), p, radial)
}

// NewAffineCylinder returns the cylinder polarized with p + radial s.
func NewAffineCylinder(shape geom.Cylinder, p field.Affine, radial float64) (*AffineTube, error) {
	if err := shape.Check(); err != nil {
		return nil, err
	}
	return newAffineTube(0, shape.Radius, shape.Height, shape.Bounds(), p, radial)
}

func newAffineTube(inner, outer, height float64, box r3.Box, p field.Affine, radial float64) (*AffineTube, error) {
	spec := sectorSpec{inner: inner, outer: outer, bottom: -height / 2, top: height / 2, box: box, full: true, angle: 2 * math.Pi}
	b, err := newSector(spec, p, radial)
	if err != nil {
		return nil, err
	}
	return &AffineTube{b}, nil
}

// Field returns g at x.
func (a *AffineTube) Field(x r3.Vec) r3.Vec { return a.sector.field(x) }

// Evaluate computes the arrays of dst; see field.Evaluator.
func (a *AffineTube) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	a.sector.evaluate(dst, at, side)
}

// Bounds returns the box of the body.
func (a *AffineTube) Bounds() r3.Box { return a.sector.box }

// Moments returns the expansion of the charge about the centre.
func (a *AffineTube) Moments() *field.Moments { return a.sector.moments() }
