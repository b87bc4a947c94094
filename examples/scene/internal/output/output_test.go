package output

import (
	"bytes"
	"encoding/csv"
	"encoding/json"
	"math"
	"math/rand/v2"
	"os"
	"path/filepath"
	"slices"
	"strconv"
	"strings"
	"testing"

	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/examples/scene/internal/solve"
)

// TestNumbers checks that every number reads back to the same bits and that no form of it is shorter.
func TestNumbers(t *testing.T) {
	for v, want := range map[float64]string{0: "0", 1: "1", -2.5: "-2.5", 1e-6: "1e-6", 4e-6: "4e-6", 0.001: "1e-3", 0.015: "0.015", 1e21: "1e21", 1e22: "1e22", 100: "100",
		1e5: "1e5", 123456: "123456", 1.25663706127e-6: "1.25663706127e-6", -0.0006427186648: "-6.427186648e-4", 5e-324: "5e-324", math.MaxFloat64: "1.7976931348623157e308"} {
		if got := string(appendNumber(nil, v, "null")); got != want {
			t.Errorf("%v: %q, want %q", v, got, want)
		}
	}
	if got := string(appendNumber([]byte("x"), math.NaN(), "null")); got != "xnull" {
		t.Errorf("NaN: %q, want null", got)
	}
	r := rand.New(rand.NewPCG(1, 2))
	for range 20_000 {
		v := math.Float64frombits(r.Uint64())
		if math.IsNaN(v) || math.IsInf(v, 0) {
			continue
		}
		if r.IntN(2) == 0 {
			v = r.NormFloat64() * math.Pow(10, float64(r.IntN(40)-20))
		}
		text := appendNumber(nil, v, "null")
		var back float64
		if err := json.Unmarshal(text, &back); err != nil || math.Float64bits(back) != math.Float64bits(v) {
			t.Fatalf("%x is written as %s and reads back as %x, %v", v, text, back, err)
		}
		if plain := strconv.FormatFloat(v, 'f', -1, 64); len(plain) < len(text) {
			t.Fatalf("%s is longer than %s", text, plain)
		}
	}
}

// filled returns the records and setup of a scene with one request.
func filled(t *testing.T, text string) (*solve.Setup, []solve.Record) {
	t.Helper()
	scene, err := scenefile.Parse("scene.json", []byte(text), nil)
	if err != nil {
		t.Fatal(err)
	}
	s, err := solve.Build(scene)
	if err != nil {
		t.Fatal(err)
	}
	var out []solve.Record
	if err := s.Records(t.Context(), &scene.Wanted[0], func(_ int, r *solve.Record) error { out = append(out, *r); return nil }); err != nil {
		t.Fatal(err)
	}
	return s, out
}

const bothKinds = `{"title": "two\nlines", "length": "mm", "parts": [
	{"name": "a, \"b\" <&>", "shape": "box", "size": [2,2,2], "magnetized": {"uniform": [0,0,5]}},
	{"name": "e", "shape": "sphere", "radius": 1, "centre": [9,0,0], "polarized": {"uniform": [0,0,1e-6]}}],
	"wanted": [{"name": "n", "line": {"from": [-13,0,0], "to": [1,1,1], "count": 2}, "csv": "x.csv"}]}`

// TestTable checks header, metadata and rows of a data file.
func TestTable(t *testing.T) {
	s, recs := filled(t, bothKinds)
	recs = append(recs, recs[0])
	recs[0].Inside, recs[2].Missed = 0, []string{"V", "H"}
	var b bytes.Buffer
	table := NewTable(s, &s.Scene.Wanted[0], &b)
	for i := range recs {
		if err := table.Record(&recs[i]); err != nil {
			t.Fatal(err)
		}
	}
	if err := table.Flush(); err != nil {
		t.Fatal(err)
	}
	for _, line := range []string{"# scene: two\\nlines\n", "# request: line\n", "# name: n\n", "# side: mean\n", "# units: SI, lengths in m", "# constants: "} {
		if !strings.Contains(b.String(), line) {
			t.Errorf("no metadata %q in\n%s", line, b.String())
		}
	}
	read := csv.NewReader(&b)
	read.Comment = '#'
	rows, err := read.ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	const header = "x[m],y[m],z[m],V[V],Ex[V/m],Ey[V/m],Ez[V/m],Dx[C/m^2],Dy[C/m^2],Dz[C/m^2],Vm[A],Hx[A/m],Hy[A/m],Hz[A/m],Bx[T],By[T],Bz[T],inside,status"
	if got := strings.Join(rows[0], ","); got != header {
		t.Errorf("header %s, want %s", got, header)
	}
	if rows[1][0] != "-0.013" || rows[1][17] != `a, "b" <&>` || rows[1][18] != "" {
		t.Errorf("first row %q: want x = -0.013 m, the part and no status", rows[1])
	}
	if got := rows[2][11:17]; !slices.Equal(got, make([]string, 6)) || rows[2][18] != "on an edge" || rows[2][10] == "" {
		t.Errorf("row of an edge %q: want no H and B, but Vm, and the status", rows[2])
	}
	if got := rows[3][18]; got != "accuracy missed: V H" {
		t.Errorf("status %q, want what was missed", got)
	}
	for i, r := range recs { // the numbers read back
		if v, err := strconv.ParseFloat(rows[i+1][3], 64); err != nil || v != r.Electric.V {
			t.Errorf("V of row %d reads back as %v, %v, want %v", i, v, err, r.Electric.V)
		}
	}
}

// TestGradient checks gradients in the document: three rows a kind, null where there is none.
func TestGradient(t *testing.T) {
	s, recs := filled(t, strings.Replace(bothKinds, `"line": {"from": [-13,0,0], "to": [1,1,1], "count": 2}, "csv": "x.csv"`, `"points": [[-13,0,0],[1,1,1]], "gradient": true`, 1))
	var b bytes.Buffer
	r := NewResults(s, &b)
	r.Open(&s.Scene.Wanted[0])
	r.OpenRecords()
	for i := range recs {
		if err := r.Record(i, &recs[i]); err != nil {
			t.Fatal(err)
		}
	}
	r.CloseRecords()
	if err := r.Close(nil); err != nil {
		t.Fatal(err)
	}
	if err := r.Flush(); err != nil {
		t.Fatal(err)
	}
	var answer struct {
		Records []struct{ Gradient struct{ E, B *[3][3]float64 } }
	}
	if err := json.Unmarshal(b.Bytes(), &answer); err != nil {
		t.Fatalf("%v in\n%s", err, b.String())
	}
	for i, want := range []bool{true, false} { // the second point lies on a corner
		if got := answer.Records[i].Gradient.B != nil; got != want {
			t.Errorf("record %d: gradient of B there: %t, want %t", i, got, want)
		}
		e, b := answer.Records[i].Gradient.E, answer.Records[i].Gradient.B
		if e == nil || solve.Tensor(*e) != *recs[i].Gradient.E || b != nil && solve.Tensor(*b) != *recs[i].Gradient.B {
			t.Errorf("record %d: gradients %v and %v, want %v", i, e, b, recs[i].Gradient)
		}
	}
}

// TestResults checks the document that is written: valid, keys in order, null with status, names as they are.
func TestResults(t *testing.T) {
	s, recs := filled(t, bothKinds)
	recs[0].Missed = []string{"E"}
	var b bytes.Buffer
	if err := Head(&b, s.Scene, nil, []string{"w"}); err != nil {
		t.Fatal(err)
	}
	r := NewResults(s, &b)
	r.Open(&s.Scene.Wanted[0])
	r.OpenRecords()
	for i := range recs {
		if err := r.Record(i, &recs[i]); err != nil {
			t.Fatal(err)
		}
	}
	r.CloseRecords()
	check := solve.Check{Quantity: "B", Hand: []float64{1, 2, 3}, Value: []float64{1, 2, math.NaN()}, Difference: math.NaN(), Formula: "a < b"}
	if err := r.Close([]solve.Check{check}); err != nil {
		t.Fatal(err)
	}
	r.Open(&scenefile.Request{Kind: "charges"})
	if err := r.Charges(s.Charges()); err != nil {
		t.Fatal(err)
	}
	if err := r.Close(nil); err != nil {
		t.Fatal(err)
	}
	if err := r.Flush(); err != nil {
		t.Fatal(err)
	}
	if err := Tail(&b); err != nil {
		t.Fatal(err)
	}
	text := b.String()
	if !json.Valid(b.Bytes()) {
		t.Fatalf("no valid JSON:\n%s", text)
	}
	last := 0
	for _, key := range []string{`"version": 1`, `"title": "two\nlines"`, `"constants": {"epsilon0": 8.8541878188e-12, "mu0": 1.25663706127e-6}`, `"cautions": []`, `"warnings": ["w"]`, `"answers"`,
		`"request": "line", "name": "n", "records"`, `"x": [-0.013, 0, 0], "inside": null, "V"`, `"E"`, `"D"`, `"Vm"`, `"H"`, `"B"`, `"error_estimate": {"V": `, `"accuracy_missed": ["E"]`,
		`"H": null, "B": null`, `"status": "on an edge"`, `"checks": [{"quantity": "B", "at": 0, "hand": [1, 2, 3], "value": null, "difference": null, "within": 0, "formula": "a < b", "ok": false}]`,
		`"request": "charges"`, `"part": "a, \"b\" <&>", "kind": "magnetized", "volume": 8e-9, "faces": [{"face": "-x", "area": 4e-6, "normal": [-1, 0, 0], "charge": 0, "density": {"min": 0, "max": 0}}`,
		`"volume_charge"`, `"volume_density"`, `"total_charge"`, `"moment": [0, 0, 4e-8]`} {
		i := strings.Index(text[last:], key)
		if i < 0 {
			t.Fatalf("%s is not there, or not in order, in\n%s", key, text)
		}
		last += i
	}
}

// TestFolder checks that files come whole or not at all, and that nothing else is left.
func TestFolder(t *testing.T) {
	top := t.TempDir()
	dir := filepath.Join(top, "a", "b")
	open := func() *Folder {
		t.Helper()
		f, err := OpenFolder(dir)
		if err != nil {
			t.Fatal(err)
		}
		for _, name := range []string{"", "one", "two"} {
			file, err := f.Create(name)
			if err != nil {
				t.Fatal(err)
			}
			if _, err := file.Write([]byte(name)); err != nil {
				t.Fatal(err)
			}
		}
		return f
	}
	open().Discard()
	if _, err := os.Stat(filepath.Join(top, "a")); err == nil {
		t.Error("Discard left the folders that OpenFolder made")
	}
	f := open()
	entries, err := os.ReadDir(dir)
	if err != nil {
		t.Fatal(err)
	}
	for _, e := range entries { // what a kill in the middle would leave
		if !strings.HasPrefix(e.Name(), ".boundpole-") {
			t.Errorf("%s is there before Commit", e.Name())
		}
	}
	if err := f.Close(); err != nil {
		t.Fatal(err)
	}
	if err := f.Commit(); err != nil {
		t.Fatal(err)
	}
	f.Discard() // as deferred
	entries, err = os.ReadDir(dir)
	if err != nil || len(entries) != 2 || entries[0].Name() != "one" || entries[1].Name() != "two" {
		t.Errorf("files after Commit: %v, %v; want one and two", entries, err)
	}
	if text, err := os.ReadFile(filepath.Join(dir, "two")); err != nil || string(text) != "two" {
		t.Errorf("two holds %q, %v", text, err)
	}
}
