package scenefile

import "gonum.org/v1/gonum/spatial/r3"

// A Request is one thing wanted. Kind names it; the field of that kind is set.
type Request struct {
	Kind string      // "charges", "points", "points_file", "line", "plane" or "grid"
	Name string      `key:"name"`
	Hand []HandCheck `key:"hand"`

	Charges    bool           `key:"charges"`
	Points     []r3.Vec       `key:"points"`      // of points, and of points_file as read
	PointsFile string         `key:"points_file"` // as named in the scene
	Line       *Line          `key:"line"`
	Plane      *Parallelogram `key:"plane"`
	Grid       *Grid          `key:"grid"`

	Side   Side `key:"side"`
	ByPart bool `key:"by_part"`

	Gradient bool   `key:"gradient"` // of points and points_file
	CSV      string `key:"csv"`      // name of a file to write, or ""
	Plot     string `key:"plot"`
	VTK      string `key:"vtk"`
}

// A Side is "mean", "inside" or "outside".
type Side string

// A Line has Count points from From to To.
type Line struct {
	From  r3.Vec `key:"from"`
	To    r3.Vec `key:"to"`
	Count int    `key:"count"`
}

// A Parallelogram has Counts points along its edges, the first running fastest.
type Parallelogram struct {
	Corner r3.Vec `key:"corner"`
	Edge1  r3.Vec `key:"edge1"`
	Edge2  r3.Vec `key:"edge2"`
	Counts [2]int `key:"counts"`
}

// A Grid has Counts points along x, y, z, x running fastest.
type Grid struct {
	Min    r3.Vec `key:"min"`
	Max    r3.Vec `key:"max"`
	Counts [3]int `key:"counts"`
}

// Count returns the number of points that the request asks for, at most
// MaxPoints, or MaxPoints + 1 where there are more.
func (r *Request) Count() int {
	switch r.Kind {
	case "points", "points_file":
		return min(len(r.Points), MaxPoints+1)
	case "line":
		return product(r.Line.Count)
	case "plane":
		return product(r.Plane.Counts[:]...)
	case "grid":
		return product(r.Grid.Counts[:]...)
	}
	return 0
}

// product returns the product of positive numbers, cut at MaxPoints + 1.
func product(counts ...int) int {
	n := 1
	for _, c := range counts {
		if c > MaxPoints/n {
			return MaxPoints + 1
		}
		n *= c
	}
	return n
}

// A HandCheck is a value computed by hand. It holds where the computed value
// differs from Value by no more than Within·|Value| (norms, for a vector).
type HandCheck struct {
	Text     string    `key:"quantity"`
	Quantity Quantity  // Text, parsed
	At       int       `key:"at"`    // number of the point
	Value    []float64 `key:"value"` // one number, or three for a whole vector
	Within   float64   `key:"within"`
	Formula  string    `key:"formula"`
}

// A Quantity names a number or a vector of an answer: B.z, |B|, B, or with the
// part and face that carry it, "lid magnet/top/charge", "film/moment.z".
type Quantity struct {
	Part string // where the quantity belongs to a part or a face
	Face string // where it belongs to a face
	Name string // key in the answer
	Of   string // "x", "y", "z", "min", "max", "norm", or "" for the whole
}
