package magnet

import (
	"context"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/current"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// FluxTube is a tube in whose wall magnetic flux circulates. Around it B is zero, and A is not: it is the field of charges at the
// ends of the tube, with the guided potential in the bore beside it. See current.Guide for the claim and its limits: Coulomb
// gauge, static, B zero outside the wall, no effect on charges at rest.
//
// Lengths are in metres, or in a unit of Unit metres. Built by StraightFluxTube, BentFluxTube and ThickFluxTube.
type FluxTube struct {
	Guide *current.Guide
	Unit  float64 // metres; 0 means 1
}

// StraightFluxTube returns the tube with the bore of a cylinder, tube, box or prism along its own z axis. a0 in T m, webers by metre of
// tube, circulate in its thin wall, right-handed about z: far from the ends A is a0 along z in the bore and zero outside.
func StraightFluxTube(bore geom.Body, a0, unit float64) (FluxTube, error) {
	g, err := current.NewGuide(bore, a0)
	return FluxTube{g, unit}, err
}

// BentFluxTube returns the tube with the bore of an arc: flux webers by radian of it circulate in its thin wall, right-handed about
// the direction of growing azimuth. A full turn is closed, and leaves no A outside.
func BentFluxTube(bore geom.Arc, pose geom.Pose, flux, unit float64) (FluxTube, error) {
	g, err := current.NewArcGuide(bore, pose, flux/metres(unit))
	return FluxTube{g, unit}, err
}

// ThickFluxTube returns the straight tube with the uniform flux density b in T in its wall, right-handed about z.
func ThickFluxTube(wall geom.Tube, pose geom.Pose, b, unit float64) (FluxTube, error) {
	g, err := current.NewThickGuide(wall, pose, b*metres(unit))
	return FluxTube{g, unit}, err
}

// FluxReading is what a flux tube gives at a point.
type FluxReading struct {
	A            r3.Vec  // vector potential in Coulomb gauge, T m
	Chi          float64 // potential of the charges at the ends, T m^2
	ErrA, ErrChi float64 // bounds on the numerical error; +Inf: no claim
	Inside       bool    // the point is in the bore
	Status       field.Status
}

// At returns the reading at x. On the wall A is the mean of both sides, or that of the side asked for.
func (f FluxTube) At(x r3.Vec, side field.Side) FluxReading {
	return f.Readings(field.PointsOf(x), side)[0]
}

// Readings returns the readings at a batch of points.
func (f FluxTube) Readings(at *field.Points, side field.Side) []FluxReading {
	values := f.Guide.Values(at, side)
	out := make([]FluxReading, len(values))
	unit := metres(f.Unit)
	for i, v := range values {
		out[i] = FluxReading{A: v.A, Chi: v.Chi * unit, ErrA: v.ErrA, ErrChi: v.ErrChi * unit, Inside: v.Inside, Status: v.Status}
	}
	return out
}

// Linkage returns the flux in webers that a closed curve encloses, the loop integral of A along it, with an estimate of its
// error. It does not depend on the gauge. Errors are those of current.LoopIntegral.
func (f FluxTube) Linkage(ctx context.Context, curve current.Curve) (flux, estimate float64, err error) {
	flux, estimate, err = current.LoopIntegral(ctx, f.Guide, curve, 0)
	k := metres(f.Unit)
	return k * flux, k * estimate, err
}

// Charge returns the charge of the ends of a straight tube, nil for others: densities in T m, charges in T m times Unit^2, their
// moment in T m times Unit^3.
func (f FluxTube) Charge() *bound.Charge {
	c, _ := f.Guide.Ends().(*bound.Charge)
	return c
}
