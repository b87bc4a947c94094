package main

import (
	"bytes"
	"context"
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"testing"
)

// part returns a scene of one magnetized part with the given keys.
func part(keys string) string {
	return `{"parts": [{"name": "a", ` + keys + `, "magnetized": {"remanence": [0, 0, 1.2]}}]}`
}

// powered returns a scene of one polarized part with a law of a power.
func powered(shape, law, power string) string {
	return `{"parts": [{"name": "a", ` + shape + `, "polarized": {"` + law + `": {"coefficient": 1, "power": ` + power + `}}}]}`
}

// ask returns a scene of one box with the given requests.
func ask(requests string) string {
	return strings.TrimSuffix(part(`"shape": "box", "size": [1, 1, 1]`), "}") + `, "wanted": [` + requests + `]}`
}

func polyhedron(vertices, faces string) string {
	return part(`"shape": "polyhedron", "vertices": [` + vertices + `], "faces": [` + faces + `]`)
}

const (
	corners = "[0,0,0],[1,0,0],[1,1,0],[0,1,0],[0,0,1],[1,0,1],[1,1,1],[0,1,1]"
	sides   = "[0,1,5,4],[1,2,6,5],[2,3,7,6],[3,0,4,7]"
)

// refusals are scenes with one fault each, the place of it in the file and words of the error.
var refusals = []struct {
	name, scene string
	pointer     string
	words       []string
}{
	{"open polyhedron", polyhedron(corners, "[0,3,2,1],"+sides), "/parts/0", []string{"open", "edge"}},
	{"inverted polyhedron", polyhedron(corners, "[0,1,2,3],[7,6,5,4],[4,5,1,0],[5,6,2,1],[6,7,3,2],[7,4,0,3]"), "/parts/0", []string{"clockwise", "reverse"}},
	{"one face inverted", polyhedron(corners, "[0,1,2,3],[4,5,6,7],"+sides), "/parts/0", []string{"reverse one"}},
	{"face not plane", polyhedron(strings.Replace(corners, "[1,1,1]", "[1,1,1.2]", 1), "[0,3,2,1],[4,5,6,7],"+sides), "/parts/0", []string{"not plane", "triangles"}},
	{"hole in a face", polyhedron(corners, "[0,3,2,1,0,4,5],[4,5,6,7],"+sides), "/parts/0/faces/0/4", []string{"twice"}},
	{"self-crossing base", part(`"shape": "prism", "height": 1, "base": [[0,0],[1,1],[1,0],[0,1]]`), "/parts/0", []string{"cross", "simple polygon"}},
	{"base that touches itself", part(`"shape": "prism", "height": 1, "base": [[0,0],[2,0],[2,2],[1,0],[0,2]]`), "/parts/0", []string{"touch"}},
	{"ends meet", part(`"shape": "prism", "height": 1, "base": [[-1,-1],[1,-1],[1,1],[-1,1]], "top_slope": [0.5, 0.5]`), "/parts/0/top_slope", []string{"ends of the prism meet"}},
	{"zero thickness", part(`"shape": "cylinder", "radius": 1, "height": 0`), "/parts/0/height", []string{"positive length"}},
	{"thinner than rounding", part(`"shape": "tube", "inner": 1, "outer": 1.0000000000000002, "height": 1`), "/parts/0", []string{"thicker"}},
	{"too small", part(`"shape": "sphere", "radius": 1e-80`), "/parts/0", []string{"1e-60", "unit of length"}},
	{"slope beyond reason", part(`"shape": "prism", "height": 1, "base": [[0,0],[1,0],[0,1]], "top_slope": [1e300, 0], "bottom_slope": [1e300, 0]`), "/parts/0", []string{"slope"}},
	{"not a number", part(`"shape": "sphere", "radius": NaN`), "/parts/0/radius", []string{"NaN"}},
	{"decimal comma", part(`"shape": "sphere", "radius": 1,5`), "/parts/0", []string{"key"}},
	{"polarization overflows", part(`"shape": "sphere", "radius": 1, "scale": 1e308`), "/parts/0/magnetized", []string{"overflows", "smaller"}},
	{"centre too far", part(`"shape": "sphere", "radius": 1, "centre": [1e70, 0, 0]`), "/parts/0/centre", []string{"beyond 1e+60"}},
	{"copies too far", part(`"shape": "sphere", "radius": 1, "copies": {"count": 100000, "step": [1e307, 0, 0]}`), "/parts/0/copies", []string{"copy 2", "beyond"}},
	{"negative power at the axis", powered(`"shape": "cylinder", "radius": 1, "height": 1`, "radial_power", "-0.5"), "/parts/0/polarized/radial_power/power", []string{"negative", "axis", "-0.5", "at least 0"}},
	{"negative power on a box", powered(`"shape": "box", "size": [1,1,1]`, "radial_power", "-1"), "/parts/0/polarized/radial_power/power", []string{"axis", "keeps off"}},
	{"negative power in a wedge", powered(`"shape": "arc", "inner": 0, "outer": 1, "height": 1, "from": 0, "to": 90`, "radial_power", "-1"), "/parts/0/polarized/radial_power/power", []string{"axis"}},
	{"negative power in the poles of a shell", powered(`"shape": "hollow_sphere", "inner": 1, "outer": 2`, "radial_power", "-1"), "/parts/0/polarized/radial_power/power", []string{"axis"}},
	{"negative power at the centre", powered(`"shape": "sphere", "radius": 1`, "central_power", "-1"), "/parts/0/polarized/central_power/power", []string{"negative", "centre"}},
	{"negative power at a corner", powered(`"shape": "polyhedron", "vertices": [`+corners+`], "faces": [[0,3,2,1],[4,5,6,7],`+sides+`]`, "central_power", "-2"), "/parts/0/polarized/central_power/power", []string{"centre"}},
	{"polynomial overflows", `{"parts": [{"name": "a", "shape": "box", "size": [1e30,1,1], "polarized": {"polynomial": [{"component": "x", "coefficient": 1, "powers": [64,0,0]}]}}]}`, "/parts/0/polarized", []string{"overflows"}},
	{"power overflows", powered(`"shape": "sphere", "radius": 1e10`, "central_power", "64"), "/parts/0/polarized", []string{"overflows"}},
	{"arc beyond a turn", part(`"shape": "arc", "inner": 1, "outer": 2, "height": 1, "from": 0, "to": 400`), "/parts/0/to", []string{"more than one turn", "360"}},
	{"arc far from zero", part(`"shape": "arc", "inner": 1, "outer": 2, "height": 1, "from": 1e9, "to": 1000000090`), "/parts/0", []string{"whole turns"}},
	{"full arc without a bore", part(`"shape": "arc", "inner": 0, "outer": 2, "height": 1, "from": 0, "to": 360`), "/parts/0", []string{"give a cylinder"}},
	{"cone end below rounding", part(`"shape": "cone", "bottom": 1, "top": 1e-20, "height": 1`), "/parts/0", []string{"give 0 for a tip"}},
	{"density overflows", `{"parts": [{"name": "a", "shape": "disc", "radius": 1e10, "charged": {"density": 1, "gradient": [1e300,0,0]}}]}`, "/parts/0/charged", []string{"overflows"}},
	{"sheet not plane", `{"parts": [{"name": "a", "shape": "polygon", "vertices": [[0,0,0],[1,0,0],[1,1,0.3],[0,1,0]], "charged": {"density": 1}}]}`,
		"/parts/0", []string{"not plane"}},
	{"inert body that is none", `{"parts": [{"name": "a", "shape": "prism", "height": 1, "base": [[0,0],[1,1],[1,0],[0,1]]}]}`, "/parts/0", []string{"cross"}},
	{"later shape", part(`"shape": "mesh", "file": "a.stl"`), "/parts/0/shape", []string{"not supported yet"}},
	{"missing points file", ask(`{"points_file": "nope.csv"}`), "/wanted/0/points_file", []string{"nope.csv"}},
	{"points file with decimal commas", ask(`{"points_file": "comma.csv"}`), "/wanted/0/points_file", []string{"comma.csv:1", "decimal comma"}},
	{"binary points file", ask(`{"points_file": "binary.csv"}`), "/wanted/0/points_file", []string{"binary.csv:1"}},
	{"too many points", ask(`{"grid": {"min": [0,0,0], "max": [1,1,1], "counts": [1000, 1000, 1000]}}`), "/wanted/0/grid", []string{"10000000"}},
	{"output outside the folder", ask(`{"line": {"from": [0,0,2], "to": [0,0,3], "count": 2}, "csv": "../x.csv"}`), "/wanted/0/csv", []string{"plain name"}},
	{"output over the results", ask(`{"line": {"from": [0,0,2], "to": [0,0,3], "count": 2}, "csv": "Results.json"}`), "/wanted/0/csv", []string{"taken"}},
	{"deep nesting", `{"parts": ` + strings.Repeat("[", 100_000), "/parts/0", []string{"deeper than 32"}},
	{"empty", "", "(root)", []string{"empty"}},
}

// TestRefusals checks that every fault gives status 1 and one line that names place, fault and remedy, and writes nothing.
func TestRefusals(t *testing.T) {
	dir := t.TempDir()
	put(t, dir, "comma.csv", "1,5,2,0,3,1\n")
	put(t, dir, "binary.csv", "\x7fELF\x02\x01\x00\x00\n")
	for _, c := range refusals {
		t.Run(c.name, func(t *testing.T) {
			file := put(t, dir, "scene.json", c.scene)
			out := filepath.Join(t.TempDir(), "out")
			line := refused(t, "-out", out, file)
			if _, err := os.Stat(out); err == nil {
				t.Error("the folder for results was made")
			}
			place := regexp.MustCompile(`^` + regexp.QuoteMeta(file) + `:\d+:\d+: ` + regexp.QuoteMeta(c.pointer) + `[:/]`)
			if !place.MatchString(line) {
				t.Errorf("got %q, want the place file:line:column: %s", line, c.pointer)
			}
			for _, w := range c.words {
				if !strings.Contains(line, w) {
					t.Errorf("got %q, want the words %q", line, w)
				}
			}
			for _, prefix := range []string{"geom:", "bound:", "charge:"} {
				if strings.Contains(line, prefix) {
					t.Errorf("got %q: the name of a package says nothing to the reader", line)
				}
			}
			if line != refused(t, "-check", file) {
				t.Error("-check says something else")
			}
		})
	}
}

// TestFlags checks command lines that are wrong.
func TestFlags(t *testing.T) {
	dir := t.TempDir()
	file := put(t, dir, "file", "")
	for _, c := range []struct {
		args  []string
		words string
	}{
		{[]string{"-bogus"}, "see scene -help"},
		{[]string{"a.json", "b.json"}, "one scene file"},
		{[]string{"a.json", "-out", "x"}, "flags stand before the file"},
		{[]string{""}, "empty"},
		{[]string{"-out"}, "needs an argument"},
		{[]string{"-out", ""}, "write -out DIR"},
		{[]string{"-schema", "a.json"}, "stand alone"},
		{[]string{dir}, "folder"},
		{[]string{filepath.Join(dir, "nope.json")}, "no such file"},
		{[]string{"-out", file}, "folder"},
		{[]string{"-out", filepath.Join(file, "x")}, "folder"},
	} {
		if line := refused(t, c.args...); !strings.Contains(line, c.words) {
			t.Errorf("%q: got %q, want the words %q", c.args, line, c.words)
		}
	}
}

// TestHelp checks what is printed without a scene.
func TestHelp(t *testing.T) {
	for flag, words := range map[string]string{"-help": "usage: scene", "-schema": `"$schema"`, "-format": "`remanence`"} {
		status, stdout, stderr := start(t, flag)
		if status != done || stderr != "" || !strings.Contains(stdout, words) {
			t.Errorf("%s: status %d, stderr %q, stdout %.80q; want %q", flag, status, stderr, stdout, words)
		}
	}
}

// refused runs the program, which must fail in one line; it returns the line.
func refused(t *testing.T, args ...string) string {
	t.Helper()
	status, stdout, stderr := start(t, args...)
	if status != wrong || stdout != "" {
		t.Errorf("%q: status %d and stdout %.80q, want status %d and nothing", args, status, stdout, wrong)
	}
	line, ok := strings.CutSuffix(stderr, "\n")
	if !ok || strings.Contains(line, "\n") || line == "" {
		t.Errorf("%q: stderr %q, want one line", args, stderr)
	}
	return line
}

// start runs the program.
func start(t *testing.T, args ...string) (status int, stdout, stderr string) {
	t.Helper()
	var out, err bytes.Buffer
	status = run(context.Background(), args, &out, &err)
	return status, out.String(), err.String()
}

// put writes a file and returns its name.
func put(t *testing.T, dir, name, text string) string {
	t.Helper()
	file := filepath.Join(dir, name)
	if err := os.WriteFile(file, []byte(text), 0o644); err != nil {
		t.Fatal(err)
	}
	return file
}
