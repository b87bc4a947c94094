package element

import (
	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// Annulus is the field of a uniformly charged annulus, however narrow.
//
// Units: natural; g in the unit of the density, phi in that times the unit of length.
// Frame: that of the shape, about the z axis; the normal is +z.
// Domain: all finite x; radii within 1e-70 and 1e70. NaN in, NaN out. Built by NewAnnulus; immutable.
// Singular: |g| grows as log(1/d) at distance d from a rim; on it G is NaN, Phi finite, field.OnEdge. On the face the
// mean of both sides, or the side asked for; Outside is above.
// Accuracy: |error| <= 1e-13 max(|g|, 1e-3 g0) for g, g0 = |Density| min(1, (a/R)^2) with a the outer radius; 2e-14 for phi
// likewise (TestRoundReference).
// Source: the outer disc less the inner one, see Disc; where that would cancel, Gauss-Legendre over rings, and for the
// potential close by product integration of the logarithm.
type Annulus struct {
	flat flatRing
}

// NewAnnulus returns the annulus with a charge density.
func NewAnnulus(shape geom.Annulus, density float64) (*Annulus, error) {
	if err := shape.Check(); err != nil {
		return nil, err
	}
	f, err := newFlatRing(shape.Inner, shape.Outer, shape.Z, density)
	if err != nil {
		return nil, err
	}
	return &Annulus{f}, nil
}

// Field returns g at x.
func (a *Annulus) Field(x r3.Vec) r3.Vec { return a.flat.field(x) }

// Evaluate computes the arrays of dst; see field.Evaluator.
func (a *Annulus) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	a.flat.evaluate(dst, at, side)
}

// Bounds returns the box of the annulus.
func (a *Annulus) Bounds() r3.Box { return a.flat.bounds() }
