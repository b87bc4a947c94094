// Package magnet gives equivalent sources their magnetic meaning, in the Coulombian model: magnetization M in A/m,
// magnetic surface charge density sigma = M.n in A/m, magnetic volume charge density rho = -div M in A/m^2, pole strength
// in A m, magnetic scalar potential Vm in A, field H in A/m, flux density B in tesla.
//
//	Vm = phi,   H = g,   B = mu0 (H + M)
//
// Free currents are parts too (Loop, Wire, Solenoid). The other picture of the same fields is Amperian: bound currents, with the
// vector potential A in T m; FluxTube is the tube of circulating flux, with A and no B around it.
//
// North is +sigma. Lengths are in metres unless a Model says otherwise, frames right-handed, normals outward. M is rigid here;
// package field/response has recoil and iron. No saturation, no eddy currents. On a face the mean of both sides is given, or
// the side asked for. Models are immutable once built and safe for concurrent use.
//
// Inside flat magnets H is nearly -M, so B is a small difference: its error is absolute, of the order of u mu0 |M|.
//
// Caution: strong magnets attract suddenly, pinch, crush and shatter; fields of about 0.5 to 1 mT may affect implants; a
// swallowed magnet is a medical emergency. Results are calculations, not safety determinations: local rules, current
// standards, makers' instructions, clinicians and licensed practitioners take precedence.
package magnet

import (
	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/codata"
	"example.com/boundpole/field/element"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// Mu0 is the vacuum permeability in H/m, CODATA 2022.
const Mu0 = codata.Mu0

// Part is a magnetized body or another source of magnetic field.
type Part = bound.Member

// Reading is the magnetic field at a point.
type Reading struct {
	Vm          float64 // A; that of an applied field is zero at the origin
	H           r3.Vec  // A/m
	B           r3.Vec  // T
	ErrVm, ErrH float64 // bounds on the numerical error, A and A/m; +Inf: no claim
	ErrB        float64 // T; absolute
	Inside      int     // first part that contains the point, -1 if none
	Status      field.Status
}

// Model is magnetized parts in one frame, with a uniform field applied from outside.
//
// Lengths are in metres, or in a unit of Unit metres: geometry is then computed as given and only results are converted.
// Magnetizations stay in A/m; their gradients are per unit of length, poles in A m/Unit^2, dipoles in A m^2/Unit^3.
type Model struct {
	Parts   bound.Assembly
	Applied r3.Vec  // flux density in T
	Unit    float64 // metres; 0 means 1
}

// Remanence returns the magnetization J/mu0 in A/m that belongs to a magnetic polarization J in tesla: for a rigid magnet
// J is its remanence Br.
func Remanence(j r3.Vec) r3.Vec { return r3.Scale(1/Mu0, j) }

// Magnetized returns a body with magnetization m in A/m, given in the body's own frame.
func Magnetized(body geom.Body, m field.Polarization) (Part, error) {
	c, err := bound.Of(body, m)
	return Part{Charge: c}, err
}

// WithRemanence returns a body with the uniform magnetic polarization j in tesla, given in the body's own frame.
func WithRemanence(body geom.Body, j r3.Vec) (Part, error) {
	return Magnetized(body, field.Uniform{P: Remanence(j)})
}

// Dipole returns a point dipole of m ampere square metres at x.
func Dipole(x, m r3.Vec) Part {
	return Part{Source: element.Dipole{At: x, Moment: m}}
}

// Pole returns a point pole of strength q ampere metres at x: half of a pair, for the idealization of a long thin bar.
func Pole(x r3.Vec, q float64) Part {
	return Part{Source: element.Point{At: x, Charge: q}}
}

// PoleFlux returns the flux in webers that belongs to a pole strength in ampere metres.
func PoleFlux(q float64) float64 { return Mu0 * q }

// Field returns H at x in A/m: a Model is a source of its own.
func (m Model) Field(x r3.Vec) r3.Vec {
	return r3.Add(m.Parts.Field(x), r3.Scale(1/Mu0, m.Applied))
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
	s := m.Parts.Sample(at, side, ways, field.WantPhi|field.WantG|field.WantErr, r3.Scale(1/Mu0, m.Applied))
	out := make([]Reading, at.Len())
	unit := metres(m.Unit)
	for i := range out {
		v := s.Values.At(i)
		out[i] = Reading{
			Vm: v.Phi * unit, H: v.G, B: r3.Scale(Mu0, r3.Add(v.G, s.P[i])),
			ErrVm: v.ErrPhi * unit, ErrH: v.ErrG, ErrB: Mu0 * (v.ErrG + 0x1p-53*r3.Norm(s.P[i])),
			Inside: s.Inside[i], Status: v.Status,
		}
	}
	return out
}
