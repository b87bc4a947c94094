package scenefile

import "gonum.org/v1/gonum/spatial/r3"

// A Request is one thing wanted. Kind names it; the field of that kind is set.
type Request struct {
	Kind string      // "charges", "points", "reading", …
	Name string      `key:"name"`
	Hand []HandCheck `key:"hand"`

	Charges    bool           `key:"charges"`
	Points     []r3.Vec       `key:"points"`      // of points, and of points_file as read
	PointsFile string         `key:"points_file"` // as named in the scene
	Line       *Line          `key:"line"`
	Plane      *Parallelogram `key:"plane"`
	Grid       *Grid          `key:"grid"`

	Reading  *Reading `key:"reading"`
	Linkage  *Linkage `key:"linkage"`
	Force    *Force   `key:"force"`
	Energy   []string `key:"energy"` // two names
	Reach    *Reach   `key:"reach"`
	Travel   *Travel  `key:"travel"`
	HandOver string   `key:"hand_over"` // name of a file to write
	Charge   string   `key:"kind"`      // of hand_over: "electric" or "magnetic"; "" where the scene has one only

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

// A Reading is the area of a sensor; exactly one of Disc and Rectangle is set.
type Reading struct {
	At        r3.Vec    `key:"at"`
	Normal    r3.Vec    `key:"normal"`    // not 0
	Disc      *float64  `key:"disc"`      // radius
	Rectangle []float64 `key:"rectangle"` // width along Along, height
	Along     *r3.Vec   `key:"along"`     // not parallel to Normal
}

// A Linkage is a coil; exactly one of Circle and Polygon is set.
type Linkage struct {
	Circle  *Circle  `key:"circle"`
	Polygon []r3.Vec `key:"polygon"`
	Turns   float64  `key:"turns"`
}

// A Circle is a round coil.
type Circle struct {
	Centre r3.Vec  `key:"centre"`
	Normal r3.Vec  `key:"normal"` // not 0
	Radius float64 `key:"radius"`
}

// A Force is asked on a part; About is nil for the part's centre.
type Force struct {
	On    string  `key:"on"`
	About *r3.Vec `key:"about"`
}

// A Reach asks how far a flux density is reached.
type Reach struct {
	FluxDensity float64 `key:"flux_density"` // T
}

// A Travel asks requests at Count positions of a part.
type Travel struct {
	Part     string    `key:"part"`
	Shift    r3.Vec    `key:"shift"`
	Rotation *Turn     `key:"rotation"`
	Count    int       `key:"count"`
	Ask      []Request `key:"ask"`
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
	case "travel":
		n := 0
		for i := range r.Travel.Ask {
			n = min(n+product(max(r.Travel.Ask[i].Count(), 1), r.Travel.Count), MaxPoints+1)
		}
		return n
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
