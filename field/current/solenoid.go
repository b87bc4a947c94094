package current

import (
	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// Solenoid is a thin coil of finite length: a current sheet on the wall of a cylinder, right-handed about +z. It is the bound
// current of the cylinder magnetized along z with M = Density: outside its b is the h of that magnet, inside h + M.
//
// Units: natural; Density, the current by length (turns times current over height), and b in one unit, a in that times length.
// Frame: that of the cylinder, about the z axis; Posed places it.
// Domain: all finite x; lengths within 1e-60 and 1e60. NaN in, NaN out. Built by NewSolenoid; immutable.
// Singular: |b| grows as log(1/d) at distance d from the rims; on them B is NaN, A finite, field.OnEdge. On the sheet the mean of
// both sides of b, or the side asked for, and no gradient. Seen as a field.Source it has no potential.
// Accuracy: |error| <= 1e-13 max(|b|, 1e-3 Density min(1, (a/R)^3)), a the bounding radius; of a likewise (as the
// cylinder of TestAgainstPoles).
// Source: as Bound; [Jackson1999] sec. 5.8.
type Solenoid struct {
	sheet *Bound
}

// NewSolenoid returns the solenoid on the wall of a cylinder.
func NewSolenoid(shape geom.Cylinder, density float64) (*Solenoid, error) {
	b, err := Of(shape, field.Uniform{P: r3.Vec{Z: density}})
	if err != nil {
		return nil, err
	}
	return &Solenoid{b}, nil
}

// Moment returns the dipole moment, density times volume.
func (s *Solenoid) Moment() r3.Vec { return s.sheet.Moment }

// Field returns b at x, the mean of both sides on the sheet.
func (s *Solenoid) Field(x r3.Vec) r3.Vec {
	w := scratches.Get().(*scratch)
	defer scratches.Put(w)
	if !isFinite(x) {
		return field.Nowhere(field.BadInput).G
	}
	at := w.only(x)
	s.sheet.evaluate(w, at, field.Mean, wantB)
	return s.sheet.value(w, at, 0).B
}

// Evaluate computes the arrays of dst with b for the field; see field.Evaluator.
func (s *Solenoid) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	w := scratches.Get().(*scratch)
	defer scratches.Put(w)
	asked := dst.Want()
	for lo := 0; lo < at.Len(); lo += chunk {
		hi := min(lo+chunk, at.Len())
		part := dst.Slice(lo, hi)
		w.cut(at, lo, hi)
		s.sheet.evaluate(w, &w.points, side, fromField(asked))
		for i := range hi - lo {
			part.Set(i, toField(s.sheet.value(w, &w.points, i), asked))
		}
	}
}

// Induction computes the arrays of dst; see Source.
func (s *Solenoid) Induction(dst *Values, at *field.Points, side field.Side) {
	s.sheet.Induction(dst, at, side)
}

// Bounds returns the box of the solenoid.
func (s *Solenoid) Bounds() r3.Box { return s.sheet.Bounds() }
