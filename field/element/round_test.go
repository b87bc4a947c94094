package element

import (
	"encoding/json"
	"math"
	"os"
	"slices"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// roundCase is one body of testdata/round.json.
type roundCase struct {
	ID   string
	Body struct {
		Type              string
		Radius, R1, R2    float64
		HalfLength        float64 `json:"half_length"`
		Z1, Z2            float64
		Centre, Axis, Ref [3]float64
	}
	Polarization struct {
		Kind     string
		A, C     float64
		Cos, Sin float64
		P        [3]float64
	}
	referencePoints
}

// build returns the source in its own frame, the pose, the bounding radius and the largest density or polarization.
func (c *roundCase) build(t *testing.T) (src field.Evaluator, pose geom.Pose, bound, pmax float64) {
	t.Helper()
	turn, err := geom.Frame(vec(c.Body.Axis), vec(c.Body.Ref))
	if err != nil {
		t.Fatal(err)
	}
	pose = turn.Then(geom.Translate(vec(c.Body.Centre)))
	q := c.Polarization
	var p r3.Vec
	slope := 0.0
	switch q.Kind {
	case "uniform":
		p = turn.VectorToLocal(vec(q.P))
		pmax = r3.Norm(p)
	case "axial_z":
		slope = q.C
		pmax = math.Abs(slope) * c.Body.HalfLength
	case "sheet_linear":
		pmax = math.Abs(q.A)
	case "wall":
		pmax = math.Abs(q.A) + math.Hypot(q.Cos, q.Sin)
	}
	b := c.Body
	switch b.Type {
	case "disc":
		src, err = NewDisc(geom.Disc{Radius: b.Radius}, q.A)
		bound = b.Radius
	case "annulus":
		src, err = NewAnnulus(geom.Annulus{Inner: b.R1, Outer: b.R2}, q.A)
		bound = b.R2
	case "wall":
		src, err = NewWall(geom.Wall{Radius: b.Radius, Z1: b.Z1, Z2: b.Z2}, q.A, q.Cos, q.Sin)
		bound = math.Hypot(b.Radius, (b.Z2-b.Z1)/2)
	case "cylinder":
		src, err = NewCylinder(geom.Cylinder{Radius: b.Radius, Height: 2 * b.HalfLength}, p, slope)
		bound = math.Hypot(b.Radius, b.HalfLength)
	case "tube":
		src, err = NewTube(geom.Tube{Inner: b.R1, Outer: b.R2, Height: 2 * b.HalfLength}, p, slope)
		bound = math.Hypot(b.R2, b.HalfLength)
	}
	if err != nil {
		t.Fatal(err)
	}
	return src, pose, bound, pmax
}

// roundAt returns the source's value at an outer point, with the field turned into the outer frame.
func roundAt(src field.Evaluator, pose geom.Pose, x r3.Vec, size float64, side field.Side, want field.Want) field.Value {
	l := pose.ToLocal(pair.VecOf(x))
	h, o := l.Value(), l.Low()
	p := field.Points{X: []float64{h.X}, Y: []float64{h.Y}, Z: []float64{h.Z}}
	if pose.Turned() {
		p.XLo, p.YLo, p.ZLo = []float64{o.X}, []float64{o.Y}, []float64{o.Z}
		p.Slack = []float64{4 * u * (r3.Norm(x) + r3.Norm(pose.Origin().Value()) + size)}
	}
	v := field.NewValues(1, want)
	src.Evaluate(v, &p, side)
	r := v.At(0)
	r.G = pose.VectorToOuter(r.G)
	return r
}

// loadRound returns the round cases of the reference files of verify and of testdata/round.json, which holds seeded ones.
func loadRound(t *testing.T) []roundCase {
	t.Helper()
	var round []roundCase
	for _, path := range []string{"../../verify/testdata/dev.json", "../../verify/testdata/hard.json", "testdata/round.json"} {
		data, err := os.ReadFile(path)
		if err != nil {
			t.Fatal(err)
		}
		var cases []roundCase
		if err := json.Unmarshal(data, &cases); err != nil {
			t.Fatal(err)
		}
		for _, c := range cases {
			if slices.Contains([]string{"disc", "annulus", "wall", "cylinder", "tube"}, c.Body.Type) &&
				slices.Contains([]string{"uniform", "axial_z", "sheet_linear", "wall"}, c.Polarization.Kind) {
				round = append(round, c)
			}
		}
	}
	if len(round) < 80 {
		t.Fatalf("only %d round cases found", len(round))
	}
	return round
}

// TestRoundReference holds potential, field and estimates against reference values, by the contract: an error is at
// most 1e-12 of the value or 1e-15 of what the density could give there. The docs of the sources quote what is measured here.
func TestRoundReference(t *testing.T) {
	var j judge
	for _, c := range loadRound(t) {
		src, pose, a, peak := c.build(t)
		kind := c.Polarization.Kind
		j.hold(t, &referenceCase{id: c.ID, src: src, pose: pose, centre: c.Body.Centre, bound: a, peak: peak,
			sheet: kind == "sheet_linear" || kind == "wall", aim: 1e-12, referencePoints: &c.referencePoints})
	}
	j.settle(t)
}

// offBy returns |got - want| and |want|.
func offBy(t *testing.T, got r3.Vec, want [3]string) (e, size float64) {
	t.Helper()
	dx, x := minus(t, got.X, want[0])
	dy, y := minus(t, got.Y, want[1])
	dz, z := minus(t, got.Z, want[2])
	return math.Hypot(math.Hypot(dx, dy), dz), math.Hypot(math.Hypot(x, y), z)
}
