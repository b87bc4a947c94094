package element

import (
	"encoding/json"
	"math"
	"os"
	"path/filepath"
	"slices"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// sectorCase is one body of testdata/sector.json or of the reference files of verify.
type sectorCase struct {
	ID   string
	Body struct {
		Type              string
		R1, R2            float64
		Radius            float64
		Phi1, Phi2        float64
		HalfLength        float64 `json:"half_length"`
		Centre, Axis, Ref [3]float64
	}
	Polarization struct {
		Kind  string
		A, C  float64
		N     float64
		P, P0 [3]float64
		B     [3]float64
		G     [3][3]float64
	}
	referencePoints
}

// build returns the source in its own frame, the pose, the radius of a ball round it and the largest polarization.
func (c *sectorCase) build(t *testing.T) (src field.Evaluator, pose geom.Pose, bound, most float64) {
	t.Helper()
	turn, err := geom.Frame(vec(c.Body.Axis), vec(c.Body.Ref))
	if err != nil {
		t.Fatal(err)
	}
	pose = turn.Then(geom.Translate(vec(c.Body.Centre)))
	b := c.Body
	bound = math.Hypot(b.R2+b.Radius, b.HalfLength)
	p, radial, pmax := c.polarization(t, turn, bound)
	switch b.Type {
	case "tube_sector":
		src, err = NewArc(geom.Arc{Inner: b.R1, Outer: b.R2, Height: 2 * b.HalfLength, From: b.Phi1, To: b.Phi2}, p, radial)
	case "tube":
		src, err = NewAffineTube(geom.Tube{Inner: b.R1, Outer: b.R2, Height: 2 * b.HalfLength}, p, radial)
	case "cylinder":
		src, err = NewAffineCylinder(geom.Cylinder{Radius: b.Radius, Height: 2 * b.HalfLength}, p, radial)
	case "disc":
		src, err = NewLinearDisc(geom.Disc{Radius: b.Radius}, p.Value.Z, column(&p.Gradient, 0))
	case "annulus":
		src, err = NewLinearAnnulus(geom.Annulus{Inner: b.R1, Outer: b.R2}, p.Value.Z, column(&p.Gradient, 0))
	}
	if err != nil {
		t.Fatal(err)
	}
	return src, pose, bound, pmax
}

// polarization returns the affine p in the frame of the body, the radial part and the largest |p|. The density of a sheet
// comes as the z component, its gradient as column 0.
func (c *sectorCase) polarization(t *testing.T, turn geom.Pose, bound float64) (p field.Affine, radial, pmax float64) {
	t.Helper()
	switch q := c.Polarization; q.Kind {
	case "uniform":
		p.Value = turn.VectorToLocal(vec(q.P))
		pmax = r3.Norm(p.Value)
	case "radial_unit", "radial_power":
		radial = q.C
		pmax = math.Abs(q.C)
	case "axial_z":
		p.Gradient[2][2] = q.C
		pmax = math.Abs(q.C) * bound
	case "sheet_linear":
		b := turn.VectorToLocal(vec(q.B))
		p.Value.Z = q.A + r3.Dot(vec(q.B), vec(c.Body.Centre)) // of the absolute position
		p.Gradient[0][0], p.Gradient[1][0] = b.X, b.Y
		pmax = math.Abs(q.A) + r3.Norm(b)*bound
	case "affine": // p0 + G r in the outer frame
		m := turn.Matrix()
		var at [3]float64 // p at the centre, where p0 and G r may cancel
		for i := range at {
			sum := pair.Of(q.P0[i])
			for j, x := range c.Body.Centre {
				sum = sum.Add(pair.Product(q.G[i][j], x))
			}
			at[i] = sum.Value()
		}
		p.Value = turn.VectorToLocal(vec(at))
		for i := range 3 {
			for j := range 3 {
				for k := range 3 {
					for l := range 3 {
						p.Gradient[i][j] += m[k][i] * q.G[k][l] * m[l][j]
					}
				}
			}
		}
		pmax = r3.Norm(p.Value)
		for _, row := range q.G {
			pmax += bound * r3.Norm(vec(row))
		}
	}
	return p, radial, pmax
}

// loadSectors returns what this engine covers of the reference cases of verify and of testdata/sector.json.
func loadSectors(t *testing.T) (all []sectorCase) {
	t.Helper()
	paths, err := filepath.Glob("../../verify/testdata/*.json")
	if err != nil {
		t.Fatal(err)
	}
	for _, path := range append(paths, "testdata/sector.json") {
		data, err := os.ReadFile(path)
		if err != nil {
			t.Fatal(err)
		}
		var cases []sectorCase
		if json.Unmarshal(data, &cases) != nil {
			continue // of another form
		}
		for _, c := range cases {
			if c.covered() {
				all = append(all, c)
			}
		}
	}
	if len(all) < 20 {
		t.Fatalf("only %d cases found", len(all))
	}
	return all
}

func (c *sectorCase) covered() bool {
	if !slices.Contains([]string{"tube_sector", "tube", "cylinder", "disc", "annulus"}, c.Body.Type) {
		return false
	}
	kind := c.Polarization.Kind
	affine := []string{"uniform", "radial_unit", "axial_z", "sheet_linear", "affine"}
	return slices.Contains(affine, kind) || kind == "radial_power" && c.Polarization.N == 0
}

// TestSectorReference holds potential, field and estimates against reference values, those of the closed forms of other
// elements included. The docs quote what is measured here; the contract for integrated shapes is 1e-10.
func TestSectorReference(t *testing.T) {
	var j judge
	for _, c := range loadSectors(t) {
		src, pose, a, peak := c.build(t)
		j.hold(t, &referenceCase{id: c.ID, src: src, pose: pose, centre: c.Body.Centre, bound: a, peak: peak,
			sheet: c.Polarization.Kind == "sheet_linear", aim: 3e-12, // the worst is 1.9e-12, by the cancellation in thin walls
			referencePoints: &c.referencePoints})
	}
	j.settle(t)
}
