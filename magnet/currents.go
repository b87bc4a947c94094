package magnet

import (
	"context"

	"example.com/boundpole/field"
	"example.com/boundpole/field/current"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// Loop returns a circular loop of current, the rim of a disc, right-handed about the disc's normal. As a part of a Model its B/mu0
// stands for H, as it does outside magnetized parts; it has no Vm, so that readings of a model with currents have Vm NaN and
// the status field.NoPotential.
//
// The current is in A/Unit of the model: amperes where lengths are in metres, 1000 for 1 A in millimetres.
func Loop(shape geom.Disc, pose geom.Pose, amperes float64) (Part, error) {
	l, err := current.NewLoop(shape, amperes)
	if err != nil {
		return Part{}, err
	}
	return Part{Source: current.Posed{Source: l, Pose: pose}}, nil
}

// Wire returns a thin current along straight segments, back to the first point if closed; an open wire is a part of a circuit and
// means nothing by itself. For units and Vm see Loop.
func Wire(points []r3.Vec, closed bool, amperes float64) (Part, error) {
	w, err := current.NewWire(points, closed, amperes)
	if err != nil {
		return Part{}, err
	}
	return Part{Source: w}, nil
}

// Solenoid returns a thin coil on the wall of a cylinder, right-handed about its axis; density is turns times current by length, in
// A/m whatever the unit of length. For Vm see Loop.
func Solenoid(shape geom.Cylinder, pose geom.Pose, density float64) (Part, error) {
	s, err := current.NewSolenoid(shape, density)
	if err != nil {
		return Part{}, err
	}
	return Part{Source: current.Posed{Source: s, Pose: pose}}, nil
}

// Amperian is magnetized bodies and free currents in one frame in the Amperian picture: bodies are their bound currents
// (current.Of, with the magnetization in A/m), and B needs no M inside them. It gives the vector potential as well; for H and Vm
// use a Model. The two agree on B, and are computed from different charges.
//
// Inside flat magnets, where H is nearly -M, this B keeps its digits: its error is relative to the field of the edges, though the
// estimate may not show it.
type Amperian struct {
	Parts   []current.Source // current.Bound, current.Wire, current.Posed …
	Applied r3.Vec           // flux density in T; its vector potential is B x r/2, zero at the origin
	Unit    float64          // metres; 0 means 1
}

// Induction is vector potential and flux density at a point.
type Induction struct {
	A, B       r3.Vec  // T m, Coulomb gauge; T
	ErrA, ErrB float64 // bounds on the numerical error, T m and T; +Inf: no claim
	Status     field.Status
}

// At returns vector potential and flux density at x. On a face A is continuous and B the mean of both sides, or that of the side
// asked for; where bodies touch every one is asked for its own side.
func (a Amperian) At(x r3.Vec, side field.Side) Induction {
	return a.Inductions(field.PointsOf(x), side)[0]
}

// Inductions returns vector potential and flux density at a batch of points.
func (a Amperian) Inductions(at *field.Points, side field.Side) []Induction {
	v := current.NewValues(at.Len())
	a.source().Induction(v, at, side)
	out := make([]Induction, at.Len())
	unit := metres(a.Unit)
	for i := range out {
		w := v.At(i)
		out[i] = Induction{
			A: r3.Scale(Mu0*unit, w.A), B: r3.Scale(Mu0, w.B),
			ErrA: Mu0 * unit * w.ErrA, ErrB: Mu0 * w.ErrB, Status: w.Status,
		}
	}
	return out
}

// Linkage returns the flux in webers through a closed curve, that is through a loop of one turn, as the loop integral of A, with
// an estimate of its error. Errors are those of current.LoopIntegral.
func (a Amperian) Linkage(ctx context.Context, curve current.Curve) (flux, estimate float64, err error) {
	flux, estimate, err = current.LoopIntegral(ctx, a.source(), curve, 0)
	k := Mu0 * metres(a.Unit) * metres(a.Unit)
	return k * flux, k * estimate, err
}

// source returns all parts and the applied field, in A/m.
func (a Amperian) source() current.Source {
	if a.Applied == (r3.Vec{}) {
		return current.Sum(a.Parts)
	}
	return append(append(current.Sum{}, a.Parts...), current.Uniform{B: r3.Scale(1/Mu0, a.Applied)})
}

// metres returns a unit of length, 1 for 0.
func metres(unit float64) float64 {
	if unit == 0 {
		return 1
	}
	return unit
}
