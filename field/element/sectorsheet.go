package element

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// LinearDisc is the field of a disc, an annulus or a sector of one, with the charge density Density + Gradient.x.
//
// Units: natural; Density and g in the unit of the density, Gradient in that by length, phi in that times the unit of length.
// Frame: that of the shape, about the z axis; the normal is +z.
// Domain: all finite x; radii within 1e-60 and 1e60. NaN in, NaN out. Built by NewLinearDisc, NewLinearAnnulus and
// NewLinearSector; immutable.
// Singular: |g| grows as log(1/d) at distance d from the outline; on it G is NaN, Phi finite, field.OnEdge. On the face the
// mean of both sides, or the side asked for, and no gradient; Outside is above.
// Accuracy: |error| <= 1e-12 max(|g|, 1e-3 g0) for g, g0 = max|density| min(1, (a/R)^2) with a the bounding radius, and for phi
// likewise (TestSectorReference).
// Source: as Arc; the expansion beyond 3 radii is that of the charge.
type LinearDisc struct {
	sector *sector
}

// NewLinearDisc returns the disc with a charge density linear in x and y; the z component of the gradient acts as density.
func NewLinearDisc(shape geom.Disc, density float64, gradient r3.Vec) (*LinearDisc, error) {
	if err := shape.Check(); err != nil {
		return nil, err
	}
	spec := sectorSpec{outer: shape.Radius, bottom: shape.Z, top: shape.Z, box: shape.Bounds(), full: true}
	return newLinearDisc(spec, density, gradient)
}

// NewLinearAnnulus returns the annulus with a charge density linear in x and y.
func NewLinearAnnulus(shape geom.Annulus, density float64, gradient r3.Vec) (*LinearDisc, error) {
	if err := shape.Check(); err != nil {
		return nil, err
	}
	spec := sectorSpec{inner: shape.Inner, outer: shape.Outer, bottom: shape.Z, top: shape.Z, box: shape.Bounds(), full: true}
	return newLinearDisc(spec, density, gradient)
}

// NewLinearSector returns the sector with a charge density linear in x and y.
func NewLinearSector(shape geom.Sector, density float64, gradient r3.Vec) (*LinearDisc, error) {
	solid := geom.Arc{Inner: shape.Inner, Outer: shape.Outer, Height: 1, From: shape.From, To: shape.To, Degrees: shape.Degrees}
	if err := solid.Check(); err != nil {
		return nil, err
	}
	spec := sectorSpec{inner: shape.Inner, outer: shape.Outer, bottom: shape.Z, top: shape.Z, box: shape.Bounds(), full: solid.Full()}
	spec.turn(solid)
	return newLinearDisc(spec, density, gradient)
}

// turn sets the azimuths of the ends to those of the arc.
func (s *sectorSpec) turn(a geom.Arc) {
	if s.full {
		s.angle = 2 * math.Pi
		return
	}
	s.from, s.angle = a.From, a.Angle()
	if a.Degrees {
		s.from *= math.Pi / 180
	}
	s.end[0], s.end[1] = a.Ends()
}

// newLinearDisc returns the sheet: the top of a body whose p has the z component density + gradient.x.
func newLinearDisc(s sectorSpec, density float64, gradient r3.Vec) (*LinearDisc, error) {
	s.sheet = true
	p := field.Affine{Value: r3.Vec{Z: density}}
	p.Gradient[2] = [3]float64{gradient.X, gradient.Y, gradient.Z}
	b, err := newSector(s, p, 0)
	if err != nil {
		return nil, err
	}
	return &LinearDisc{b}, nil
}

// Field returns g at x.
func (d *LinearDisc) Field(x r3.Vec) r3.Vec { return d.sector.field(x) }

// Evaluate computes the arrays of dst; see field.Evaluator.
func (d *LinearDisc) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	d.sector.evaluate(dst, at, side)
}

// Bounds returns the box of the sheet.
func (d *LinearDisc) Bounds() r3.Box { return d.sector.box }

// Moments returns the expansion of the charge about the centre of a bounding sphere.
func (d *LinearDisc) Moments() *field.Moments { return d.sector.moments() }
