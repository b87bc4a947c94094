// Package field is the vocabulary of static fields of charge: sources, points, values, and how they combine.
//
// Everything is in natural units: with surface charge sigma and volume charge rho
//
//	phi(x) = (1/4pi) [ int sigma/|x-r| dA + int rho/|x-r| dV ],   g = -grad phi,
//
// without eps0 or mu0. The electric meaning is V = phi/eps0, E = g/eps0 (package charge), the magnetic one Vm = phi,
// H = g (package magnet). If a density is given in [S] per length^2, g is in [S]/length^2 times 1, that is in the unit
// of the polarization, and phi in that unit times the unit of length.
//
// Frames are right-handed; x and g are in the frame of the source. Sources are immutable once built and safe for
// concurrent use; results are the same bits for any GOMAXPROCS, and a batch gives the same bits as its points one by
// one. Destination slices belong to the caller and must not overlap the inputs.
//
// The package does not know any shape: closed forms are in field/element, bodies with polarization in field/bound.
package field

import (
	"math"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Source is a static source of field. It is all that a source defined elsewhere must have.
type Source interface {
	// Field returns g at x: the mean of the two sides on a charged face, NaN in all components where the field does not
	// exist (on an edge, at a point charge) or where x is not finite.
	Field(x r3.Vec) r3.Vec
}

// Evaluator is the numeric upgrade of a Source: potential, field, gradient and error estimates, for many points.
type Evaluator interface {
	// Evaluate computes at all points every array of dst that is not nil. See Values for what each holds.
	Evaluate(dst *Values, at *Points, side Side)
}

// Side says which value is wanted for a point on a charged face.
type Side int

// The sides. On a body Inside and Outside are its two sides; on a sheet Outside is where the normal points.
const (
	Mean Side = iota
	Inside
	Outside
)

// Status says what a value is worth. Higher values are graver; a sum takes the gravest of its parts.
type Status uint8

const (
	Regular      Status = iota
	OnFace              // the field jumps here; the side that was asked for is given
	OnEdge              // the field is infinite, the potential finite
	AtPoint             // on a point charge or dipole: neither exists
	NotConverged        // the best value found, worse than asked
	NoPotential         // the source offers no potential
	BadInput            // the point is not finite
)

// String returns the words used in reports and result files.
func (s Status) String() string {
	switch s {
	case Regular:
		return "regular"
	case OnFace:
		return "on a face"
	case OnEdge:
		return "on an edge"
	case AtPoint:
		return "at a point source"
	case NotConverged:
		return "not converged"
	case NoPotential:
		return "no potential"
	case BadInput:
		return "point is not finite"
	}
	return "unknown status"
}

// Want is a set of quantities to compute.
type Want uint8

const (
	WantPhi Want = 1 << iota
	WantG
	WantGrad
	WantErr
)

// Point is one field point. Slack is the distance within which it counts as on a face because its coordinates were
// rounded in an outer frame.
type Point struct {
	X     pair.Vec
	Slack float64
}

// Value is what a source gives at one point. Fields that were not wanted are unspecified.
type Value struct {
	Phi     float64    // potential
	G       r3.Vec     // g = -grad phi
	Grad    [6]float64 // gradient of g, symmetric: xx, yy, zz, xy, xz, yz
	ErrPhi  float64    // bound on |error of Phi|; +Inf: no claim
	ErrG    float64    // bound on the Euclidean norm of the error of G; +Inf: no claim
	ErrGrad float64    // bound on the Frobenius norm of the error of Grad; +Inf: no claim
	Status  Status
}

// Nowhere returns the value where nothing exists: NaN throughout, no claim, and the status.
func Nowhere(s Status) Value {
	nan, inf := math.NaN(), math.Inf(1)
	return Value{
		Phi: nan, G: r3.Vec{X: nan, Y: nan, Z: nan},
		Grad:   [6]float64{nan, nan, nan, nan, nan, nan},
		ErrPhi: inf, ErrG: inf, ErrGrad: inf, Status: s,
	}
}
