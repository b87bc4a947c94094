package cubature

import (
	"fmt"
	"math"
)

// Settings say how hard to try. The zero value, or nil, is the default.
type Settings struct {
	// Accuracy is the wanted error relative to the natural scale, the greatest density times what its size makes of it at the
	// distance (see NewLayer). Points whose estimate is above it get status NotConverged. Default 1e-10, range 1e-14 to 1e-2.
	Accuracy float64
	// MaxNodes caps the evaluations of charts or blocks for one field point: no finer rule is tried where it would take more.
	// The coarsest rules always run. Default 4 000 000, at least 1000.
	MaxNodes int
	// MaxPanels caps the panels into which charts or blocks are cut when the source is built. Default 1024, at least 1.
	MaxPanels int
	// Neutral says that the total charge is known to be zero, as that of a polarized body is: then it is exactly zero far away.
	Neutral bool
}

// checked returns the settings with defaults filled in.
func (s *Settings) checked() (Settings, error) {
	var t Settings
	if s != nil {
		t = *s
	}
	if t.Accuracy == 0 {
		t.Accuracy = 1e-10
	}
	if t.MaxNodes == 0 {
		t.MaxNodes = 4_000_000
	}
	if t.MaxPanels == 0 {
		t.MaxPanels = 1024
	}
	switch {
	case !(t.Accuracy >= 1e-14 && t.Accuracy <= 1e-2):
		return t, fmt.Errorf("cubature: accuracy %v is not between 1e-14 and 1e-2; leave it 0 for 1e-10", t.Accuracy)
	case t.MaxNodes < 1000:
		return t, fmt.Errorf("cubature: node cap %d is below 1000; leave it 0 for the default", t.MaxNodes)
	case t.MaxPanels < 1:
		return t, fmt.Errorf("cubature: panel cap %d is not positive; leave it 0 for the default", t.MaxPanels)
	}
	return t, nil
}

// u is the rounding unit of float64.
const u = 0x1p-53

const over4Pi = 1 / (4 * math.Pi)
