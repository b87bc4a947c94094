package scenefile

import (
	"os"
	"path/filepath"
	"testing"

	"github.com/google/go-cmp/cmp"
	"gonum.org/v1/gonum/spatial/r3"
)

// sampleScenes are the scenes of the example folder.
func sampleScenes(t testing.TB) []string {
	t.Helper()
	names, err := filepath.Glob("../../testdata/*.json")
	if err != nil || len(names) < 3 {
		t.Fatalf("sample scenes: %v, %v; want at least 3", names, err)
	}
	return append(names, "../../default.json")
}

func TestSampleScenes(t *testing.T) {
	for _, name := range sampleScenes(t) {
		if _, err := Read(name); err != nil {
			t.Errorf("Read: %v", err)
		}
	}
}

func TestReadFS(t *testing.T) {
	want, err := Read("../../testdata/array.json")
	if err != nil {
		t.Fatal(err)
	}
	got, err := ReadFS(os.DirFS("../.."), "testdata/array.json")
	if err != nil {
		t.Fatal(err)
	}
	if diff := cmp.Diff(want, got, ignoreDocument); diff != "" {
		t.Errorf("ReadFS and Read differ (-Read +ReadFS):\n%s", diff)
	}
}

func TestScene(t *testing.T) {
	s, err := Read("../../testdata/array.json")
	if err != nil {
		t.Fatal(err)
	}
	if len(s.Parts) != 3 || len(s.Wanted) != 4 {
		t.Fatalf("%d parts, %d requests; want 3, 4", len(s.Parts), len(s.Wanted))
	}
	wantPart := Part{
		Name: "pole", Kind: "box", Shape: &Box{Size: [3]float64{4, 4, 2}}, Centre: r3.Vec{X: -14, Z: 3},
		Rotations:  []Rotation{{Axis: r3.Vec{Z: 1}, Degrees: 90}, {Axis: r3.Vec{X: 1}, Degrees: 180}},
		Copies:     &Copies{Count: 8, Step: r3.Vec{X: 4}, Alternate: true},
		Scale:      1,
		Magnetized: &Polarization{Uniform: &r3.Vec{Z: 950000}},
	}
	if diff := cmp.Diff(wantPart, s.Parts[0]); diff != "" {
		t.Errorf("part 0 (-want +got):\n%s", diff)
	}
	wantPoints := Request{
		Kind: "points_file", Name: "strip", PointsFile: "probes/strip.csv", Side: "mean", ByPart: true,
		Points: []r3.Vec{{X: -14}, {X: -10}, {X: -6}, {Z: -1.6}},
	}
	if diff := cmp.Diff(wantPoints, s.Wanted[1]); diff != "" {
		t.Errorf("request 1 (-want +got):\n%s", diff)
	}
	wantSkipped := []SkippedKey{{"/wanted/2/plot", "plot", "along.svg"}, {"/wanted/3/vtk", "vtk", "above.vtk"}}
	if diff := cmp.Diff(wantSkipped, s.Skipped); diff != "" {
		t.Errorf("skipped (-want +got):\n%s", diff)
	}
	if got, want := s.Parts[0].Names()[7], "pole 8"; got != want {
		t.Errorf("last copy is called %q, want %q", got, want)
	}
	if got := s.Wanted[3].Count(); got != 41*11 {
		t.Errorf("plane has %d points, want %d", got, 41*11)
	}
}

func TestDefaults(t *testing.T) {
	s, err := Parse("scene.json", []byte(withPart(ball)), nil)
	if err != nil {
		t.Fatal(err)
	}
	want := &Scene{
		Version: 1, Length: "m", Accuracy: 1e-9, Temperature: 20,
		Parts:  []Part{{Name: "a", Kind: "sphere", Shape: &Sphere{Radius: 1}, Scale: 1, Magnetized: &Polarization{Uniform: &r3.Vec{Z: 1}}}},
		Wanted: []Request{{Kind: "charges", Charges: true}},
	}
	if diff := cmp.Diff(want, s, ignoreDocument); diff != "" {
		t.Errorf("defaults (-want +got):\n%s", diff)
	}
}

func TestUnits(t *testing.T) {
	for unit, metres := range map[Unit]float64{"m": 1, "cm": 0.01, "mm": 0.001, "um": 1e-6} {
		if got := unit.Metres(); got != metres {
			t.Errorf("%s is %g m, want %g", unit, got, metres)
		}
	}
}

func TestHandQuantities(t *testing.T) {
	scene := withPart(`{"name":"lid/magnet","shape":"prism","base":[[0,0],[1,0],[0,1]],"height":1,"magnetized":{"uniform":[0,0,1]}}`)
	scene = scene[:len(scene)-1] + `,"wanted":[{"points":[[0,0,0]],"hand":[{"quantity":"B.z","value":1,"within":0},{"quantity":"|H|","value":1,"within":0},` +
		`{"quantity":"B","value":[1,2,3],"within":0},{"quantity":"Vm","value":1,"within":0}]},` +
		`{"charges":true,"hand":[{"quantity":"lid/magnet/side 2/density.max","value":1,"within":0},{"quantity":"lid/magnet/|moment|","value":1,"within":0},` +
		`{"quantity":"lid/magnet/top/charge","value":1,"within":0},{"quantity":"lid/magnet/total_charge","value":0,"within":0}]}]}`
	s, err := Parse("scene.json", []byte(scene), nil)
	if err != nil {
		t.Fatal(err)
	}
	want := []Quantity{
		{Name: "B", Of: "z"}, {Name: "H", Of: "norm"}, {Name: "B"}, {Name: "Vm"},
		{Part: "lid/magnet", Face: "side 2", Name: "density", Of: "max"}, {Part: "lid/magnet", Name: "moment", Of: "norm"},
		{Part: "lid/magnet", Face: "top", Name: "charge"}, {Part: "lid/magnet", Name: "total_charge"},
	}
	var got []Quantity
	for _, r := range s.Wanted {
		for _, h := range r.Hand {
			got = append(got, h.Quantity)
		}
	}
	if diff := cmp.Diff(want, got); diff != "" {
		t.Errorf("quantities (-want +got):\n%s", diff)
	}
	bad := scene[:len(scene)-1]
	bad = bad[:len(bad)-len(`]}]`)] + `,{"quantity":"lid/magnet/side 3/charge","value":1,"within":0}]}]}`
	if _, err := Parse("scene.json", []byte(bad), nil); err == nil {
		t.Error("face side 3 of a prism over a triangle was accepted")
	}
}

func TestErrorAt(t *testing.T) {
	s, err := Parse("scene.json", []byte("{\"parts\": [\n  "+ball+",\n  "+`{"name":"b","shape":"sphere","radius":1}`+"\n]}"), nil)
	if err != nil {
		t.Fatal(err)
	}
	for pointer, want := range map[string]string{
		"/parts/1/radius": "scene.json:3:41: /parts/1/radius: wrong; mend it",
		"/parts/1/centre": "scene.json:3:3: /parts/1/centre: wrong; mend it",
		"/parts/0":        "scene.json:2:3: /parts/0: wrong; mend it",
		"":                "scene.json:1:1: (root): wrong; mend it",
	} {
		if got := s.ErrorAt(pointer, "wrong", "mend it").Error(); got != want {
			t.Errorf("ErrorAt(%q) = %s, want %s", pointer, got, want)
		}
	}
}
