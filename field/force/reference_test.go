package force

import (
	"context"
	"encoding/json"
	"math"
	"os"
	"strconv"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/element"
	"example.com/boundpole/field/image"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

func number(t testing.TB, s string) float64 {
	t.Helper()
	v, err := strconv.ParseFloat(s, 64)
	if err != nil {
		t.Fatal(err)
	}
	return v
}

func vector(t testing.TB, s []string) r3.Vec {
	t.Helper()
	return r3.Vec{X: number(t, s[0]), Y: number(t, s[1]), Z: number(t, s[2])}
}

// referenceCase is a line of testdata/forces.json.
type referenceCase struct {
	Kind             string
	Gap              float64
	Source, Part, At []float64
	Force, Torque    []string
	Energy           string
}

// charges returns the bodies of a case, the part and what acts on it, both in a pose.
func (c *referenceCase) charges(t testing.TB, pose geom.Pose) (part, source *bound.Charge) {
	z := r3.Vec{Z: 1}
	if c.Kind == "boxes" {
		box := func(s []float64) geom.Box { return geom.Box{Size: r3.Vec{X: s[0], Y: s[1], Z: s[2]}} }
		at := geom.Translate(r3.Vec{X: c.At[0], Y: c.At[1], Z: c.At[2]})
		return uniform(t, geom.At(box(c.Part), at.Then(pose)), z), uniform(t, geom.At(box(c.Source), pose), z)
	}
	cylinder := func(s []float64) geom.Cylinder { return geom.Cylinder{Radius: s[0], Height: s[1]} }
	at := geom.Translate(r3.Vec{Z: c.Source[1]/2 + c.Gap + c.Part[1]/2})
	return uniform(t, geom.At(cylinder(c.Part), at.Then(pose)), z), uniform(t, geom.At(cylinder(c.Source), pose), z)
}

func readReference(t testing.TB) (cases []referenceCase) {
	t.Helper()
	data, err := os.ReadFile("testdata/forces.json")
	if err != nil {
		t.Fatal(err)
	}
	if err := json.Unmarshal(data, &cases); err != nil {
		t.Fatal(err)
	}
	if len(cases) != 8 {
		t.Fatalf("%d cases, want 8", len(cases))
	}
	return cases
}

// TestReference compares boxes and coaxial cylinders at gaps of 0.01 to 100 sizes with values of 25 digits, by whatever way is chosen
// and by integration over faces, in the frame of the source and turned.
func TestReference(t *testing.T) {
	turn, err := geom.Turn(r3.Vec{X: 1, Y: -2, Z: 0.5}, 77)
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range readReference(t) {
		for i, pose := range []geom.Pose{{}, turn} {
			part, source := c.charges(t, pose)
			about := part.Body().Centroid()
			got, err := On(context.Background(), part, source, &Settings{Accuracy: 1e-10, About: about})
			if err != nil {
				t.Errorf("%s at %g: %v", c.Kind, c.Gap, err)
			}
			c.compare(t, pose, got, 1e-9) // asked for 1e-10
			if c.Gap > 1 || i > 0 {
				continue // the floor of digits that drown
			}
			o, err := acting(part, source, Settings{Accuracy: 1e-10, About: about, MaxNodes: 500_000})
			if err != nil {
				t.Fatal(err)
			}
			c.compare(t, pose, o.result(false), 1e-9)
		}
	}
}

// compare holds a result against the case; a torque that vanishes is measured by the size of what cancels.
func (c *referenceCase) compare(t *testing.T, pose geom.Pose, got Result, tol float64) {
	t.Helper()
	force, torque := pose.VectorToOuter(vector(t, c.Force)), pose.VectorToOuter(vector(t, c.Torque))
	energy := number(t, c.Energy)
	check := func(what string, miss, size, floor, estimate float64) {
		if !(miss <= tol*max(size, floor)) {
			t.Errorf("%s at %g: %s off by %.3g of %.3g, tolerance %g", c.Kind, c.Gap, what, miss, size, tol)
		}
		if !(miss <= estimate+2*0x1p-53*size) { // the reference itself is rounded
			t.Errorf("%s at %g: %s off by %.3g, estimate %.3g", c.Kind, c.Gap, what, miss, estimate)
		}
	}
	check("force", r3.Norm(r3.Sub(got.Force, force)), r3.Norm(force), 0, got.Error.Force)
	check("torque", r3.Norm(r3.Sub(got.Torque, torque)), r3.Norm(torque), 1e-6*got.Size.Torque+r3.Norm(force)*1e-15, got.Error.Torque+r3.Norm(force)*1e-15)
	check("energy", math.Abs(got.Energy-energy), math.Abs(energy), 0, got.Error.Energy)
}

// TestTables compares with the forces, torques and energies of verify/testdata/tables.json.
func TestTables(t *testing.T) {
	data, err := os.ReadFile("../../verify/testdata/tables.json")
	if err != nil {
		t.Fatal(err)
	}
	var list []struct {
		ID         string
		Recomputed json.RawMessage
	}
	if err := json.Unmarshal(data, &list); err != nil {
		t.Fatal(err)
	}
	entries := map[string]json.RawMessage{}
	for _, e := range list {
		entries[e.ID] = e.Recomputed
	}
	z := r3.Vec{Z: 1}
	on := func(c *bound.Charge, by field.Source) Result {
		r, err := On(context.Background(), c, by, &Settings{Accuracy: 1e-10})
		if err != nil {
			t.Error(err)
		}
		return r
	}
	scalar := func(id string, got float64) {
		var s string
		if err := json.Unmarshal(entries[id], &s); err != nil {
			t.Fatal(id, err)
		}
		if want := number(t, s); !(math.Abs(got-want) <= 1e-9*math.Abs(want)) { // asked for 1e-10
			t.Errorf("%s: %v, want %v within 1e-9", id, got, want)
		}
	}
	cylinder := func(radius, length, foot float64) *bound.Charge {
		return uniform(t, geom.At(geom.Cylinder{Radius: radius, Height: length}, geom.Translate(r3.Vec{Z: foot + length/2})), z)
	}
	scalar("force-coaxial-1-2-1-2-gap0.5", on(cylinder(1, 2, 0.5), cylinder(1, 2, -2)).Force.Z)
	scalar("force-coaxial-1-1-0.5-1-gap0.25", on(cylinder(0.5, 1, 0.25), cylinder(1, 1, -1)).Force.Z)
	scalar("force-coaxial-1-1-1-1-gap0.01", on(cylinder(1, 1, 0.01), cylinder(1, 1, -1)).Force.Z)
	iron := image.Iron(r3.Vec{}, z)
	before := func(c *bound.Charge) Result { return on(c, image.Image{Source: c, Plane: iron}) }
	scalar("force-image-cylinder-1-2-d0.25", before(cylinder(1, 2, 0.25)).Force.Z)
	scalar("force-image-cylinder-1-1-d1", before(cylinder(1, 1, 1)).Force.Z)
	for id, angle := range map[string]float64{"force-image-dipole-0": 0, "force-image-dipole-45": 45, "force-image-dipole-90": 90} {
		s, c := math.Sincos(angle * math.Pi / 180)
		d := element.Dipole{At: z, Moment: r3.Vec{X: s, Z: c}}
		r, err := OnDipole(d, image.Image{Source: d, Plane: iron}, nil)
		if err != nil {
			t.Fatal(err)
		}
		scalar(id, r.Force.Z)
		scalar(id, 3*r.Energy/2) // the energy of the pair, 2/3 F at distance 1: half of it is that of the dipole before iron
	}
	r, err := OnDipole(element.Dipole{At: z, Moment: z}, element.Dipole{Moment: z}, nil)
	if err != nil {
		t.Fatal(err)
	}
	scalar("dipole-dipole-axial", r.Force.Z)
	for id, dx := range map[string]float64{"force-cuboids-akoun-yonnet-dx0": 0, "force-cuboids-akoun-yonnet-dx10": 10} {
		var e struct {
			Natural []string `json:"natural_mm2"`
		}
		if err := json.Unmarshal(entries[id], &e); err != nil {
			t.Fatal(err)
		}
		part := uniform(t, geom.At(geom.Box{Size: r3.Vec{X: 12, Y: 20, Z: 6}}, geom.Translate(r3.Vec{X: dx - 4, Y: -4, Z: 8})), z)
		got, want := on(part, uniform(t, geom.Box{Size: r3.Vec{X: 20, Y: 12, Z: 6}}, z)).Force, vector(t, e.Natural)
		if d := r3.Norm(r3.Sub(got, want)); !(d <= 1e-9*r3.Norm(want)) { // asked for 1e-10
			t.Errorf("%s: %v, want %v", id, got, want)
		}
	}
	torque, err := OnDipole(element.Dipole{Moment: r3.Vec{X: 1, Y: 2, Z: 3}}, field.Constant{G: r3.Vec{X: 0.1, Y: -0.2, Z: 0.3}}, nil)
	if err != nil {
		t.Fatal(err)
	}
	var want []string
	if err := json.Unmarshal(entries["dipole-torque"], &want); err != nil {
		t.Fatal(err)
	}
	if d := r3.Norm(r3.Sub(torque.Torque, vector(t, want))); !(d <= 1e-15) { // three products of numbers rounded once
		t.Errorf("dipole-torque: %v, want %v", torque.Torque, want)
	}
}
