package main

import (
	"bytes"
	"context"
	"encoding/json"
	"errors"
	"io/fs"
	"math"
	"os"
	"path/filepath"
	"runtime"
	"slices"
	"strings"
	"testing"
)

// results is results.json, as far as the tests read it.
type results struct {
	Version   int
	Title     string
	Constants struct{ Epsilon0, Mu0 float64 }
	Cautions  []string
	Warnings  []string
	Answers   []struct {
		Request, Name string
		Parts         []struct {
			Part, Kind   string
			Volume       *float64
			Faces        []struct{ Face string }
			TotalCharge  float64 `json:"total_charge"`
			VolumeCharge float64 `json:"volume_charge"`
			Moment       []float64
		}
		Force   []float64
		Records []record
		Checks  []struct {
			Quantity string
			OK       bool
		}
	}
}

type record struct {
	X        []float64
	Inside   *string
	V, Vm    *float64
	E, D     []float64
	H, B     []float64
	Status   string
	Missed   []string `json:"accuracy_missed"`
	Estimate map[string]*float64
	ByPart   []struct {
		Part string
		E, B []float64
	} `json:"by_part"`
}

// solved runs a scene and returns status, report and results.
func solved(t *testing.T, scene string) (int, string, *results) {
	t.Helper()
	dir := t.TempDir()
	args := []string{"-out", filepath.Join(dir, "out")}
	if scene != "" {
		args = append(args, put(t, dir, "scene.json", scene))
	}
	status, stdout, stderr := start(t, args...)
	if status == wrong || stderr != "" {
		t.Fatalf("status %d: %s", status, stderr)
	}
	return status, stdout, readResults(t, filepath.Join(dir, "out"))
}

func readResults(t *testing.T, dir string) *results {
	t.Helper()
	data, err := os.ReadFile(filepath.Join(dir, "results.json"))
	if err != nil {
		t.Fatal(err)
	}
	var r results
	if err := json.Unmarshal(data, &r); err != nil {
		t.Fatal(err)
	}
	return &r
}

// near fails unless got is within rel of want.
func near(t *testing.T, what string, got, want, rel float64) {
	t.Helper()
	if !(math.Abs(got-want) <= rel*math.Abs(want)) {
		t.Errorf("%s: got %.10g, want %.10g within %.1g of it", what, got, want, rel)
	}
}

// TestDefaultScene holds the default scene against the figures of its description; tolerances are half a unit of the last
// digit that is given there.
func TestDefaultScene(t *testing.T) {
	status, report, r := solved(t, "")
	if status != done || !strings.Contains(report, "All hand checks hold (25).") {
		t.Errorf("status %d, want %d and all hand checks held:\n%s", status, done, report)
	}
	names := []string{"charges", "Hall plate", "magnet face, air side", "magnet face, metal side", "magnet centre and rim",
		"film and plate", "one metre above", "lid travel", "section", "pull of the trim bar", "where 0.5 mT ends"}
	for i, a := range r.Answers {
		if a.Name != names[i] && a.Request != names[i] {
			t.Errorf("answer %d is %q %q, want %q", i, a.Request, a.Name, names[i])
		}
	}
	near(t, "moment of the magnet", r.Answers[0].Parts[0].Moment[2], 0.10800, 5e-5)
	near(t, "moment of the film", r.Answers[0].Parts[2].Moment[2], 1.11265e-13, 5e-6)
	plate := r.Answers[1].Records[0]
	near(t, "B at the Hall plate", plate.B[2], 81.155e-3, 1e-5)
	near(t, "of the magnet", plate.ByPart[0].B[2], 81.798e-3, 1e-5)
	near(t, "of the trim bar", plate.ByPart[1].B[2], -0.6427e-3, 1e-4)
	air, metal := r.Answers[2].Records[0], r.Answers[3].Records[0]
	near(t, "jump of H at the face", air.H[2]-metal.H[2], 954.93e3, 1e-5)
	near(t, "B on both sides", air.B[2], metal.B[2], 1e-14)
	if air.Inside != nil || metal.Inside == nil || *metal.Inside != "lid magnet" {
		t.Errorf("inside at the face: %v and %v, want null and the magnet", air.Inside, metal.Inside)
	}
	rim := r.Answers[4].Records[1]
	if rim.B != nil || rim.H != nil || rim.Vm == nil || rim.E == nil || rim.Status != "on an edge" {
		t.Errorf("rim: %+v, want no B and H, and the status", rim)
	}
	near(t, "E in the film", r.Answers[5].Records[0].E[2], -9.969e6, 1e-4)
	near(t, "D in the film", r.Answers[5].Records[0].D[2], 2.77e-7, 5e-3)
	near(t, "V over the film", *r.Answers[5].Records[1].V, 50.033, 1e-5)
	near(t, "E over the film", r.Answers[5].Records[1].E[2], 16.012e3, 5e-5)
	near(t, "B one metre above", r.Answers[6].Records[0].B[2], 23.03e-9, 5e-4)
	near(t, "force of the trim bar, z", r.Answers[9].Force[2], 10.69e-3, 5e-4)
	near(t, "force of the trim bar, x", r.Answers[9].Force[0], 2.14e-3, 2.5e-3)
	if n, m := len(r.Answers[7].Records), len(r.Answers[8].Records); n != 28 || m != 121*41 {
		t.Errorf("%d and %d records on line and plane, want 28 and %d", n, m, 121*41)
	}
	for _, words := range []string{"µrec 1.05 (N 0.405, Pc 1.47) the magnet would be about 2.0 % weaker", "16 N", "250 V"} {
		if !strings.Contains(strings.Join(strings.Fields(report), " "), words) {
			t.Errorf("the report does not say %q", words)
		}
	}
}

// TestShapes runs the scene of shapes and laws: all hand checks hold, and what has no number is null.
func TestShapes(t *testing.T) {
	dir := t.TempDir()
	status, report, stderr := start(t, "-out", dir, "testdata/shapes.json")
	if status != done || !strings.Contains(report, "All hand checks hold (24).") {
		t.Errorf("status %d, want %d and all hand checks held: %s\n%s", status, done, stderr, report)
	}
	data, err := os.ReadFile(filepath.Join(dir, "results.json"))
	if err != nil {
		t.Fatal(err)
	}
	if !strings.Contains(string(data), `"volume_density": {"min": null, "max": -7.5e-4}`) {
		t.Error("the infinite density at the axis is not null")
	}
}

// TestFiles checks what lies in the folder, and that it is there as a whole.
func TestFiles(t *testing.T) {
	dir := t.TempDir()
	out := filepath.Join(dir, "deep", "out")
	if status, _, stderr := start(t, "-out", out); status != done {
		t.Fatalf("status %d: %s", status, stderr)
	}
	if got, want := list(t, out), []string{"results.json", "section.csv"}; !slices.Equal(got, want) {
		t.Errorf("files %q, want %q", got, want)
	}
	info, err := os.Stat(filepath.Join(out, "results.json"))
	if err != nil || info.Mode().Perm()&0o444 != 0o444 {
		t.Errorf("results.json: %v, %v; want one that others can read", info, err)
	}
	// A second run replaces the files.
	if status, _, stderr := start(t, "-out", out); status != done {
		t.Errorf("second run: status %d: %s", status, stderr)
	}
}

// list returns the names in a folder.
func list(t *testing.T, dir string) []string {
	t.Helper()
	entries, err := os.ReadDir(dir)
	if err != nil {
		t.Fatal(err)
	}
	var names []string
	for _, e := range entries {
		names = append(names, e.Name())
	}
	return names
}

// brokenPipe is a standard output that nobody reads.
type brokenPipe struct{}

func (brokenPipe) Write([]byte) (int, error) {
	return 0, &fs.PathError{Op: "write", Path: "/dev/stdout", Err: errors.New("broken pipe")}
}

// TestNothingHalf checks the ways in which a run fails late: old results stay, nothing else does.
func TestNothingHalf(t *testing.T) {
	stopped, stop := context.WithCancel(context.Background())
	stop()
	for _, c := range []struct {
		name    string
		ctx     context.Context
		stdout  interface{ Write([]byte) (int, error) }
		prepare func(dir string) error
		words   string
	}{
		{"broken pipe", context.Background(), brokenPipe{}, nil, "broken pipe; no file is written"},
		{"signal", stopped, &bytes.Buffer{}, nil, "stopped by a signal"},
		{"name taken by a folder", context.Background(), &bytes.Buffer{}, func(dir string) error { return os.MkdirAll(filepath.Join(dir, "section.csv"), 0o755) },
			"a folder of that name is in the way"},
	} {
		t.Run(c.name, func(t *testing.T) {
			dir := filepath.Join(t.TempDir(), "made", "out")
			var before []string
			if c.prepare != nil {
				if err := c.prepare(dir); err != nil {
					t.Fatal(err)
				}
				put(t, dir, "results.json", "old")
				before = list(t, dir)
			}
			var stderr bytes.Buffer
			status := run(c.ctx, []string{"-out", dir}, c.stdout, &stderr)
			if status != wrong || strings.Count(stderr.String(), "\n") != 1 || !strings.Contains(stderr.String(), c.words) {
				t.Errorf("status %d, stderr %q; want %d and the words %q", status, stderr.String(), wrong, c.words)
			}
			if before == nil {
				if _, err := os.Stat(filepath.Dir(dir)); err == nil {
					t.Error("folders were left behind")
				}
			} else if after := list(t, dir); !slices.Equal(after, before) {
				t.Errorf("files %q, want %q", after, before)
			}
		})
	}
}

// TestWorkers checks that no byte depends on how many processors work.
func TestWorkers(t *testing.T) {
	scene := strings.Replace(ask(`{"charges": true}, {"grid": {"min": [-2,-2,-2], "max": [2,2,2], "counts": [21,17,9]}, "csv": "grid.csv"},
		{"points": [[0,0,1],[0.5,0.5,0.2],[0.5,0.1,0.2],[3,3,3]], "by_part": true, "side": "outside"}`), `"name": "a"`,
		`"name": "a", "copies": {"count": 3, "step": [0.7, 0.1, 0], "rotation": {"axis": [0,0,1], "degrees": 31}, "alternate": true}`, 1)
	dir := t.TempDir()
	file := put(t, dir, "scene.json", scene)
	first := map[string][]byte{}
	defer runtime.GOMAXPROCS(runtime.GOMAXPROCS(0))
	for _, workers := range []int{1, 2, 7} {
		runtime.GOMAXPROCS(workers)
		out := filepath.Join(dir, "out")
		status, stdout, stderr := start(t, "-out", out, file)
		if status != done {
			t.Fatalf("status %d: %s", status, stderr)
		}
		got := map[string][]byte{"report": []byte(stdout)}
		for _, name := range []string{"results.json", "grid.csv"} {
			data, err := os.ReadFile(filepath.Join(out, name))
			if err != nil {
				t.Fatal(err)
			}
			got[name] = data
		}
		for name, data := range got {
			if first[name] == nil {
				first[name] = data
			} else if !bytes.Equal(first[name], data) {
				t.Errorf("%s with %d workers differs from that with 1", name, workers)
			}
		}
	}
}

// TestStatus checks exit status 2: everything is written and says what was missed.
func TestStatus(t *testing.T) {
	request := func(within string) string {
		return ask(`{"points": [[0,0,2]], "hand": [{"quantity": "B.z", "value": 0.05, "within": ` + within + `, "formula": "a guess"}]}`)
	}
	for within, want := range map[string]int{"0.001": missed, "1": done} {
		status, report, r := solved(t, request(within))
		if status != want || r.Answers[0].Checks[0].OK != (want == done) {
			t.Errorf("hand check within %s: status %d, ok %t; want status %d", within, status, r.Answers[0].Checks[0].OK, want)
		}
		if strings.Contains(report, "MISSED") != (want == missed) || !strings.Contains(report, "a guess") {
			t.Errorf("the report does not say so:\n%s", report)
		}
	}
	fine := strings.Replace(ask(`{"grid": {"min": [-1.3,-1.1,-1.7], "max": [1.1,1.3,1.9], "counts": [9,9,9]}}`), "{", `{"accuracy": 1e-13, `, 1)
	status, report, r := solved(t, fine)
	short := 0
	for _, rec := range r.Answers[0].Records {
		if len(rec.Missed) > 0 {
			short++
		}
	}
	if (status == missed) != (short > 0) || strings.Contains(report, "Accuracy not reached") != (short > 0) {
		t.Errorf("accuracy 1e-13: status %d with %d short records; want them to agree, report too:\n%s", status, short, report)
	}
	// What overflows is missed at any accuracy.
	status, _, r = solved(t, ask(`{"points": [[1e308, 1e308, 1e308]]}`))
	if rec := r.Answers[0].Records[0]; rec.B == nil && (status != missed || len(rec.Missed) == 0) {
		t.Errorf("a value that overflows: status %d, record %+v; want status %d and the name", status, rec, missed)
	}
}

// TestCheck checks that -check neither computes nor writes.
func TestCheck(t *testing.T) {
	dir := t.TempDir()
	out := filepath.Join(dir, "out")
	status, stdout, stderr := start(t, "-check", "-out", out)
	if status != done || stderr != "" || !strings.HasPrefix(stdout, "The scene is right: 3 parts, 11 requests") {
		t.Errorf("status %d, stdout %q, stderr %q", status, stdout, stderr)
	}
	if _, err := os.Stat(out); err == nil {
		t.Error("-check made the folder for results")
	}
}

// TestExamples runs the scenes of testdata.
func TestExamples(t *testing.T) {
	files, err := filepath.Glob("testdata/*.json")
	if err != nil || len(files) < 3 {
		t.Fatalf("scenes in testdata: %q, %v", files, err)
	}
	for _, f := range files {
		if status, _, stderr := start(t, "-out", t.TempDir(), f); status != done || stderr != "" {
			t.Errorf("%s: status %d: %s", f, status, stderr)
		}
	}
}
