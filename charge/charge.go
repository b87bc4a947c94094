// Package charge gives equivalent sources their electric meaning: polarization P in C/m^2, bound surface charge
// sigma = P.n in C/m^2, bound volume charge rho = -div P in C/m^3, potential V in volts, field E in V/m, displacement D in
// C/m^2, beside real (trapped) charge on sheets and points.
//
//	V = phi/eps0,   E = g/eps0,   D = eps0 E + P
//
// Lengths are in metres unless a Model says otherwise, frames right-handed, normals of bodies outward. P is rigid: no dielectric response, no
// conductors, no free charge that moves; a film's own permittivity has to be in the polarization that is given. On a face
// the mean of both sides is given, or the side asked for. Models are immutable once built and safe for concurrent use.
//
// Caution: charged films and poled parts carry hundreds to thousands of volts; sparks can ignite vapours and damage inputs,
// and charging stations are high-voltage equipment for trained staff. Results are calculations, not safety
// determinations: local electrical codes, makers' instructions and licensed practitioners take precedence.
package charge

import (
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/codata"
	"example.com/boundpole/field/element"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// Epsilon0 is the vacuum permittivity in F/m, CODATA 2022.
const Epsilon0 = codata.Epsilon0

// Part is a polarized body, a charged sheet or another source of electric field.
type Part = bound.Member

// Reading is the electric field at a point.
type Reading struct {
	V          float64 // V; that of an applied field is zero at the origin
	E          r3.Vec  // V/m
	D          r3.Vec  // C/m^2
	ErrV, ErrE float64 // bounds on the numerical error, V and V/m; +Inf: no claim
	ErrD       float64 // C/m^2; absolute: D is a small difference inside thin films
	Inside     int     // first part that contains the point, -1 if none
	Status     field.Status
}

// Model is electric parts in one frame, with a uniform field applied from outside.
//
// Lengths are in metres, or in a unit of Unit metres: geometry is then computed as given and only results are converted.
// Densities stay in C/m^2; gradients of densities are per unit of length, charges of points in C/Unit^2, dipoles in
// C m/Unit^3.
type Model struct {
	Parts   bound.Assembly
	Applied r3.Vec  // V/m
	Unit    float64 // metres; 0 means 1
}

// Polarized returns a body with polarization p in C/m^2, given in the body's own frame.
func Polarized(body geom.Body, p field.Polarization) (Part, error) {
	c, err := bound.Of(body, p)
	return Part{Charge: c}, err
}

// Sheet returns a sheet with the trapped charge density + gradient.x, in C/m^2 and C/m^3, x in the sheet's own frame.
// On a sheet of a kind that is none of package geom it fails with bound.ErrUnsupported.
func Sheet(sheet geom.Sheet, density float64, gradient r3.Vec) (Part, error) {
	if err := sheet.Check(); err != nil {
		return Part{}, err
	}
	if s := density + gradient.X + gradient.Y + gradient.Z; math.IsNaN(s) || math.IsInf(s, 0) {
		return Part{}, fmt.Errorf("charge: density %v with gradient %v is not finite; give finite numbers", density, gradient)
	}
	src, err := onSheet(sheet, density, gradient)
	return Part{Source: src, Sheet: sheet}, err
}

func onSheet(sheet geom.Sheet, density float64, gradient r3.Vec) (field.Source, error) {
	switch s := sheet.(type) {
	case geom.PlacedSheet:
		src, err := onSheet(s.Sheet, density, gradient)
		return field.Posed{Source: src, Pose: s.Pose}, err
	case geom.Polygon:
		return element.NewPolygon(s, density, gradient), nil
	case geom.Disc:
		if gradient.X == 0 && gradient.Y == 0 {
			return element.NewDisc(s, density+gradient.Z*s.Z)
		}
		return element.NewLinearDisc(s, density, gradient)
	case geom.Annulus:
		if gradient.X == 0 && gradient.Y == 0 {
			return element.NewAnnulus(s, density+gradient.Z*s.Z)
		}
		return element.NewLinearAnnulus(s, density, gradient)
	}
	return nil, fmt.Errorf("charge: a sheet of type %T: %w; give a polygon, disc or annulus", sheet, bound.ErrUnsupported)
}

// Point returns a point charge of q coulombs at x.
func Point(x r3.Vec, q float64) Part {
	return Part{Source: element.Point{At: x, Charge: q}}
}

// Dipole returns a point dipole of p coulomb metres at x.
func Dipole(x, p r3.Vec) Part {
	return Part{Source: element.Dipole{At: x, Moment: p}}
}

// Field returns E at x in V/m: a Model is a source of its own.
func (m Model) Field(x r3.Vec) r3.Vec {
	return r3.Add(r3.Scale(1/Epsilon0, m.Parts.Field(x)), m.Applied)
}

// At returns the reading at x.
func (m Model) At(x r3.Vec, side field.Side) Reading { return m.Readings(field.PointsOf(x), side)[0] }

// Readings returns the readings at a batch of points.
func (m Model) Readings(at *field.Points, side field.Side) []Reading {
	return m.ReadingsTowards(at, side, nil)
}

// ReadingsTowards is Readings where parts outside the model decide which side of a point is meant: ways gives for each point
// the direction in which that side lies, zero for the mean; nil leaves it to the model.
func (m Model) ReadingsTowards(at *field.Points, side field.Side, ways []r3.Vec) []Reading {
	s := m.Parts.Sample(at, side, ways, field.WantPhi|field.WantG|field.WantErr, r3.Scale(Epsilon0, m.Applied))
	out := make([]Reading, at.Len())
	unit := m.Unit
	if unit == 0 {
		unit = 1
	}
	for i := range out {
		v := s.Values.At(i)
		out[i] = Reading{
			V: v.Phi * unit / Epsilon0, E: r3.Scale(1/Epsilon0, v.G), D: r3.Add(v.G, s.P[i]),
			ErrV: v.ErrPhi * unit / Epsilon0, ErrE: v.ErrG / Epsilon0, ErrD: v.ErrG + 0x1p-53*r3.Norm(s.P[i]),
			Inside: s.Inside[i], Status: v.Status,
		}
	}
	return out
}
