package element

import (
	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// Arc is the bound charge of a tube or a part of it between two azimuths, with the polarization P(x) + Radial s, where P
// is affine and s the unit vector away from the axis.
//
// Units: natural; P, Radial and g in the unit of the polarization, phi in that times the unit of length.
// Frame: that of the shape, about the z axis.
// Domain: all finite x; lengths of the shape within 1e-60 and 1e60. NaN in, NaN out. Built by NewArc; immutable.
// Singular: |g| grows as log(1/d) at distance d from an edge next to a charged face; on it G is NaN, Phi finite,
// field.OnEdge. On a charged face the mean of both sides, or the side asked for, and no gradient.
// Accuracy: |error| <= 3e-12 max(|g|, 1e-3 g0) for g, g0 = (max|P| + |grad P| a + |Radial|) min(1, (a/R)^3) with a the bounding
// radius, and for phi likewise, from 1e-12 of the size off edges and faces to 1e6 sizes away; the worst is 1.9e-12, in walls
// of 1e-3 radii, else 2e-13 (TestSectorReference). The gradient: 1e-12 of the sum of the magnitudes behind it.
// Source: own derivation: walls and flat faces with one direction in closed form and the azimuth by Gauss-Legendre, sinh
// map after [Johnston2005]; ends as Polyhedron; the radial part by the currents that are its dual. Expansion of the
// whole, neutral body beyond 3 bounding radii. The estimates come from a second rule.
type Arc struct {
	sector *sector
}

// NewArc returns the arc polarized with p + radial s; the shape may be a full turn.
func NewArc(shape geom.Arc, p field.Affine, radial float64) (*Arc, error) {
	if err := shape.Check(); err != nil {
		return nil, err
	}
	half := shape.Height / 2
	spec := sectorSpec{inner: shape.Inner, outer: shape.Outer, bottom: -half, top: half, box: shape.Bounds(), full: shape.Full()}
	spec.turn(shape)
	b, err := newSector(spec, p, radial)
	if err != nil {
		return nil, err
	}
	return &Arc{b}, nil
}

// Field returns g at x.
func (a *Arc) Field(x r3.Vec) r3.Vec { return a.sector.field(x) }

// Evaluate computes the arrays of dst; see field.Evaluator.
func (a *Arc) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	a.sector.evaluate(dst, at, side)
}

// Bounds returns the box of the arc.
func (a *Arc) Bounds() r3.Box { return a.sector.box }

// Moments returns the expansion of the charge about the centre of a bounding sphere.
func (a *Arc) Moments() *field.Moments { return a.sector.moments() }
