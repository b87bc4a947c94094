package force

import (
	"errors"
	"fmt"

	"gonum.org/v1/gonum/spatial/r3"
)

// Result is what a field does to a part.
type Result struct {
	Force  r3.Vec  // int (sigma, rho) g
	Torque r3.Vec  // int (r - About) x (sigma, rho) g
	Energy float64 // int (sigma, rho) phi of the pair; zero potential at infinity, and at the origin for an applied field

	// Stiffness is minus the change of force and torque for a small displacement (columns 0 to 2) and a small rotation about
	// Settings.About in radians (columns 3 to 5) of the part, where the point About moves with the part: rows 0 to 2 for the force,
	// 3 to 5 for the torque. The blocks of displacement are symmetric, the first with trace zero ([Earnshaw1842]); the block of
	// rotation is symmetric but for half the torque. Zero unless Settings.Stiffness; infinite where edges touch.
	Stiffness [6][6]float64

	Error Bounds // on the error
	Size  Bounds // sum of the magnitudes that cancel in each
	Nodes int    // points at which a field was computed
}

// Bounds holds a number for each quantity: for the vectors the Euclidean norm, for the stiffness the Frobenius norm of the block of
// displacements; the mixed blocks have that times the size of the part, the block of rotation times its square.
type Bounds struct {
	Force, Torque, Energy, Stiffness float64
}

// Settings say what is wanted and how well. The zero value, or nil, is the default.
type Settings struct {
	// About is the point about which the torque is taken. Units: length. Default: the origin.
	About r3.Vec
	// Accuracy is the wanted error relative to the value, or to 1e-6 of Result.Size where that is larger. Range 1e-13 to 0.1;
	// default 1e-6. Accepted beside
	// are what the field itself claims, within 1e-12 of Result.Size, and an error within 1e-10 of it where the value is zero within
	// that error.
	Accuracy float64
	// Stiffness asks for the stiffness too.
	Stiffness bool
	// MaxNodes bounds the points at which the field is computed, for each pair. Range from 1e3; default 2e6.
	MaxNodes int
	// Overlaps leaves out the search for bodies that stand in each other, for callers that have made it: the result means nothing
	// if they do. Default: search.
	Overlaps bool
}

// ErrNotConverged is returned beside the best result where the accuracy asked for was not reached. Ask for less, or allow more
// nodes.
var ErrNotConverged = errors.New("accuracy not reached; ask for less or allow more nodes")

func (s *Settings) checked() (Settings, error) {
	var t Settings
	if s != nil {
		t = *s
	}
	if t.Accuracy == 0 {
		t.Accuracy = 1e-6
	}
	if t.MaxNodes == 0 {
		t.MaxNodes = 2e6
	}
	switch {
	case !(t.Accuracy >= 1e-13 && t.Accuracy <= 0.1):
		return t, fmt.Errorf("force: accuracy %v; give 1e-13 to 0.1, or 0 for 1e-6", t.Accuracy)
	case t.MaxNodes < 1000:
		return t, fmt.Errorf("force: at most %d nodes; give 1000 or more, or 0 for 2e6", t.MaxNodes)
	case !finite(t.About):
		return t, fmt.Errorf("force: torque about %v; give a finite point", t.About)
	}
	return t, nil
}

func finite(v r3.Vec) bool { return v.X-v.X+(v.Y-v.Y)+(v.Z-v.Z) == 0 }
