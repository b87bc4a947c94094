package element

import (
	"encoding/json"
	"errors"
	"io/fs"
	"math"
	"os"
	"slices"
	"strings"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// ringCase is one body of revolution of a reference file.
type ringCase struct {
	ID   string
	Body struct {
		Type              string
		Radius            float64
		Bottom            float64 `json:"radius_bottom_at_z=-half_length"`
		Top               float64 `json:"radius_top_at_z=+half_length"`
		Inner             float64 `json:"r1"`
		Outer             float64 `json:"r2"`
		Major             float64 `json:"major_radius"`
		Minor             float64 `json:"minor_radius"`
		HalfLength        float64 `json:"half_length"`
		Centre, Axis, Ref [3]float64
	}
	Polarization struct {
		Kind string
		C, N float64
		P    [3]float64
	}
	referencePoints
}

// build returns the source in its own frame, the pose, the bounding radius and the largest polarization; nil if it is none
// of this package's integrated bodies.
func (c *ringCase) build(t *testing.T) (src field.Evaluator, pose geom.Pose, bound, pmax float64) {
	t.Helper()
	turn, err := geom.Frame(vec(c.Body.Axis), vec(c.Body.Ref))
	if err != nil {
		t.Fatal(err)
	}
	pose = turn.Then(geom.Translate(vec(c.Body.Centre)))
	b, q := c.Body, c.Polarization
	p := turn.VectorToLocal(vec(q.P))
	switch {
	case b.Type == "truncated_cone" && q.Kind == "uniform":
		src, err = NewCone(geom.Cone{Bottom: b.Bottom, Top: b.Top, Height: 2 * b.HalfLength}, p)
		bound, pmax = math.Hypot(max(b.Bottom, b.Top), b.HalfLength), r3.Norm(p)
	case strings.HasPrefix(q.Kind, "axial_"):
		tube, n := c.tube(), int(c.power())
		src, err = NewAxialPower(tube, q.C, n)
		bound, pmax = math.Hypot(tube.Outer, b.HalfLength), math.Abs(q.C)*math.Pow(b.HalfLength, float64(n))
	case strings.HasPrefix(q.Kind, "radial_"):
		tube, n := c.tube(), c.power()
		src, err = NewRadialPower(tube, q.C, n)
		bound, pmax = math.Hypot(tube.Outer, b.HalfLength), math.Abs(q.C)*math.Pow(tube.Outer, n)
	case b.Type == "torus" && q.Kind == "uniform":
		src, err = NewTorus(geom.Torus{Major: b.Major, Minor: b.Minor}, p)
		bound, pmax = b.Major+b.Minor, r3.Norm(p)
	}
	if err != nil {
		t.Fatal(err)
	}
	return src, pose, bound, pmax
}

// power returns the power of a power law: n, or the digit at the end of its name, or 1.
func (c *ringCase) power() float64 {
	kind := c.Polarization.Kind
	switch last := kind[len(kind)-1]; {
	case strings.HasSuffix(kind, "_power"):
		return c.Polarization.N
	case last >= '0' && last <= '9':
		return float64(last - '0')
	}
	return 1
}

// tube returns the shape of a cylinder or tube.
func (c *ringCase) tube() geom.Tube {
	b := c.Body
	return geom.Tube{Inner: b.Inner, Outer: max(b.Radius, b.Outer), Height: 2 * b.HalfLength}
}

// loadRings returns the cases of all reference files of verify.
func loadRings(t *testing.T) (all []ringCase) {
	t.Helper()
	for _, name := range []string{"dev.json", "hard.json", "more.json"} {
		data, err := os.ReadFile("../../verify/testdata/" + name)
		if errors.Is(err, fs.ErrNotExist) {
			continue
		}
		if err != nil {
			t.Fatal(err)
		}
		var cases []ringCase
		if err := json.Unmarshal(data, &cases); err != nil {
			t.Fatal(err)
		}
		all = append(all, cases...)
	}
	return all
}

// TestRingReference holds potential, field and estimates against reference values, by the contract of integrated shapes.
func TestRingReference(t *testing.T) {
	cases := loadRings(t)
	var j judge
	found := 0
	for _, c := range cases {
		if !slices.Contains([]string{"truncated_cone", "torus", "cylinder", "tube"}, c.Body.Type) {
			continue
		}
		src, pose, a, peak := c.build(t)
		if src == nil {
			continue
		}
		found++
		aim := 3e-12 // what the docs say
		if c.Polarization.Kind == "axial_z2" && c.Body.HalfLength < 0.005*c.Body.Radius {
			aim = 1e-10 // a plate, as the docs say: the contract of integrated shapes
		}
		j.hold(t, &referenceCase{id: c.ID, src: src, pose: pose, centre: c.Body.Centre, bound: a, peak: peak, aim: aim,
			referencePoints: &c.referencePoints})
	}
	if found < 2 {
		t.Fatalf("only %d cases", found)
	}
	j.settle(t)
}
