package magnet

import (
	"errors"
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// Reach is how far a flux density is reached outside all bodies. Lengths are in the unit of the model.
//
// It is a contour, never a clearance: see the caution of the package.
type Reach struct {
	FluxDensity float64 // T, what was asked
	Reached     bool    // somewhere outside; where not, the rest is zero
	Distance    float64 // greatest distance from the centre of the magnets
	At          r3.Vec  // where; any one point where several tie
	FromSurface float64 // greatest distance from the surfaces of the magnets
	FromAt      r3.Vec  // where
	ErrDistance float64 // bound on the numerical error of both distances
}

// Reach returns how far from the model's parts their own flux density is at least b tesla, without the applied field. The
// centre is the common centroid of volume of the magnetized bodies, or the mean place of the dipoles and poles if there are
// no bodies. Parts without charge or source that have a body take no part in the field, but their inside is left out.
//
// Units: b in T; lengths in the unit of the model.
// Frame: that of the model.
// Domain: b > 0 and finite, at least one magnetized part; an error otherwise.
// Singular: the flux density grows without bound at edges, so that any b is reached there; places of such a kind that are
// smaller than 1/64 of the size of the model may be missed.
// Accuracy: ErrDistance, if the highest of the contours was found: the search looks along 500 directions from the centre,
// and away from every face.
// Source: outside a sphere that holds all charge |B| has its maximum on the sphere (the components of B are harmonic
// there), which ends the search outwards; inwards by sampling, then by compass search on the contour, [Own].
func (m Model) Reach(b float64) (Reach, error) {
	if !(b > 0) || math.IsInf(b, 1) {
		return Reach{}, fmt.Errorf("magnet: reach of %v T; want a positive flux density", b)
	}
	s, err := m.contour(b)
	if err != nil {
		return Reach{}, err
	}
	r := Reach{FluxDensity: b}
	starts := s.reached()
	if len(starts) == 0 {
		return r, nil
	}
	r.Reached = true
	var far, off float64
	r.At, far = s.farthest(starts, func(x r3.Vec) float64 { return r3.Norm(r3.Sub(x, s.centre)) })
	r.FromAt, off = s.farthest(starts, s.fromSurface)
	r.Distance, r.FromSurface = r3.Norm(r3.Sub(r.At, s.centre)), s.fromSurface(r.FromAt)
	r.ErrDistance = max(far, off)
	return r, nil
}

// contour is the search for the region in which a flux density is reached.
type contour struct {
	source  bound.Assembly
	magnets []geom.Body // whose surfaces count
	bodies  []geom.Body // whose inside is left out
	places  []r3.Vec    // of dipoles and poles
	least   float64     // A/m, the field H that has to be reached
	centre  r3.Vec
	radius  float64 // of a sphere about the centre that holds all parts
}

// contour returns the search for b tesla, or an error if nothing is magnetized.
func (m Model) contour(b float64) (*contour, error) {
	s := &contour{source: m.Parts, least: b / Mu0}
	var volume float64
	var sum r3.Vec
	for i := range m.Parts {
		p := &m.Parts[i]
		switch {
		case p.Charge != nil:
			body := p.Charge.Body()
			s.magnets, s.bodies = append(s.magnets, body), append(s.bodies, body)
			volume += body.Volume()
			sum = r3.Add(sum, r3.Scale(body.Volume(), body.Centroid()))
		case p.Body != nil:
			s.bodies = append(s.bodies, p.Body)
		case p.Source != nil:
			box, ok := field.BoundsOf(p.Source)
			if !ok || math.IsInf(box.Max.X, 0) {
				return nil, fmt.Errorf("magnet: part %d does not say where its sources are, so its reach has no end; give the source a Bounds method", i)
			}
			s.places = append(s.places, r3.Scale(0.5, r3.Add(box.Min, box.Max)))
		}
	}
	if len(s.magnets) == 0 && len(s.places) == 0 {
		return nil, errors.New("magnet: nothing is magnetized, so no flux density is reached; add a part")
	}
	if volume > 0 {
		s.centre = r3.Scale(1/volume, sum)
	} else {
		for _, x := range s.places {
			s.centre = r3.Add(s.centre, r3.Scale(1/float64(len(s.places)), x))
		}
	}
	box := m.Parts.Bounds()
	for i := range 8 {
		corner := box.Min
		if i&1 != 0 {
			corner.X = box.Max.X
		}
		if i&2 != 0 {
			corner.Y = box.Max.Y
		}
		if i&4 != 0 {
			corner.Z = box.Max.Z
		}
		s.radius = max(s.radius, r3.Norm(r3.Sub(corner, s.centre)))
	}
	if s.radius == 0 { // one dipole or pole: a length of the right order
		s.radius = math.Cbrt(r3.Norm(m.Parts.Field(r3.Add(s.centre, r3.Vec{Z: 1}))) / s.least)
	}
	return s, nil
}

// fromSurface returns the distance of x from the nearest magnet.
func (s *contour) fromSurface(x r3.Vec) float64 {
	d := math.Inf(1)
	for _, b := range s.magnets {
		_, to := geom.Nearest(b, x)
		d = min(d, to)
	}
	for _, p := range s.places {
		d = min(d, r3.Norm(r3.Sub(x, p)))
	}
	return d
}
