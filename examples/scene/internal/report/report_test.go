package report

import (
	"bytes"
	"fmt"
	"math"
	"strconv"
	"strings"
	"testing"
	"unicode/utf8"

	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/examples/scene/internal/solve"
	"gonum.org/v1/gonum/spatial/r3"
)

// printed returns the report of a scene.
func printed(t *testing.T, text string, files bool) string {
	t.Helper()
	scene, err := scenefile.Parse("scene.json", []byte(text), nil)
	if err != nil {
		t.Fatal(err)
	}
	s, err := solve.Build(scene)
	if err != nil {
		t.Fatal(err)
	}
	r := New(s, files)
	charges := s.Charges()
	r.Charges(charges)
	var watch solve.Watch
	for i := range scene.Wanted {
		q := &scene.Wanted[i]
		checks := make([]solve.Check, len(q.Hand))
		if q.Kind == "charges" {
			for k := range q.Hand {
				checks[k] = s.CheckCharge(&q.Hand[k], charges)
			}
			r.Checks(q, checks)
			continue
		}
		see, end := r.Points(q)
		err := s.Records(t.Context(), q, func(i int, rec *solve.Record) error {
			watch.See(rec, solve.SideOf(q.Side))
			see(i, rec)
			for k := range q.Hand {
				if q.Hand[k].At == i {
					checks[k] = solve.CheckRecord(&q.Hand[k], rec)
				}
			}
			return nil
		})
		if err != nil {
			t.Fatal(err)
		}
		end()
		r.Checks(q, checks)
	}
	var b bytes.Buffer
	r.Print(&b, s.Cautions(watch))
	return b.String()
}

const (
	longName = "a part whose name is far longer than any column of a table ought to be"
	crowd    = `{"title": "a crowd\\u0007", "length": "mm", "accuracy": 1e-13, "parts": [
	{"name": "` + longName + `", "shape": "box", "size": [2,2,2], "magnetized": {"remanence": [0,0,1.2]}},
	{"name": "ring", "shape": "box", "size": [2,2,2], "centre": [20,0,0], "magnetized": {"remanence": [0,0,1e-7]},
		"copies": {"count": 30, "rotation": {"axis": [0,0,1], "degrees": 12}, "alternate": true}},
	{"name": "film", "shape": "box", "size": [9,9,0.01], "centre": [0,0,50], "polarized": {"uniform": [0,0,3e-4]}},
	{"name": "twin", "shape": "box", "size": [9,9,0.01], "centre": [0,0,50], "polarized": {"uniform": [0,0,3e-4]}},
	{"name": "ion", "shape": "point", "centre": [0,0,-50], "charged": {"charge": 1.6e-19}},
	{"name": "dipole", "shape": "point", "centre": [0,0,-60], "polarized": {"moment": [0,0,1e-30]}},
	{"name": "bare", "shape": "sphere", "radius": 1, "centre": [0,0,-70]}],
	"wanted": [
	{"charges": true, "hand": [{"quantity": "film/+z/charge", "value": 2.43e-8, "within": 1e-3, "formula": "a formula that goes on and on so that the table gets far too wide for any paper, and then goes on a little more so that it has to be folded at least once, which is long"}]},
	{"name": "points", "points": [[0,0,1],[1,1,1],[0,0,50.01],[3,4,1e6]], "by_part": true, "side": "outside"},
	{"grid": {"min": [-3,-3,-3], "max": [3,3,3], "counts": [5,5,5]}, "csv": "g.csv", "vtk": "g.vti"}]}`
)

// TestSections checks that every heading stands where it applies, in order, and nowhere else.
func TestSections(t *testing.T) {
	text := printed(t, crowd, true)
	last := 0
	for _, head := range []string{"a crowd\\u0007\n", "\nWhat each face carries\n", "\nSums that must vanish\n", "\nField where asked\n", "\nBy hand\n",
		"\nNot written\n", "\nWarnings\n", "\nNot included\n", "\nCautions\n"} {
		i := strings.Index(text[last:], head)
		if i < 0 {
			t.Fatalf("no heading %q in its place in\n%s", head, text)
		}
		last += i
	}
	for _, words := range []string{"ring 2 … 30", "even numbers reversed", "g.vti (vtk asked for at /wanted/2/vtk)", "film and twin overlap", "Real charge need not vanish", "All 36 parts: ", "on an edge", "all 125 points: g.csv"} {
		if !strings.Contains(text, words) {
			t.Errorf("the report does not say %q:\n%s", words, text)
		}
	}
	bare := printed(t, `{"parts": [{"name": "a", "shape": "sphere", "radius": 1}]}`, false)
	for _, head := range []string{"Sums", "Field", "By hand", "Not written", "Warnings", "Cautions", "Accuracy"} {
		if strings.Contains(bare, head) {
			t.Errorf("heading %q does not apply to\n%s", head, bare)
		}
	}
	if !strings.Contains(printed(t, crowd, false), "-out DIR writes them to g.csv") {
		t.Error("without files the report does not say how to get them")
	}
}

// TestVarying checks what is printed of cylinders whose polarization varies, and of gradients.
func TestVarying(t *testing.T) {
	text := printed(t, `{"length": "mm", "parts": [
		{"name": "rod", "shape": "cylinder", "radius": 2, "height": 6, "polarized": {"axial_power": {"coefficient": 1e-6, "power": 1}}},
		{"name": "fan", "shape": "cylinder", "radius": 3, "height": 1, "centre": [0,0,20], "polarized": {"radial_power": {"coefficient": 1e-6, "power": 1}}},
		{"name": "hedgehog", "shape": "cylinder", "radius": 4, "height": 1, "centre": [0,0,40], "polarized": {"radial_power": {"coefficient": 1e-6, "power": 0.5}}},
		{"name": "ring", "shape": "torus", "major": 3, "minor": 1, "centre": [0,0,60], "magnetized": {"uniform": [0,0,1e6]}}],
		"wanted": [{"points": [[0,0,10],[0,0,3]], "gradient": true}]}`, false)
	flat := strings.Join(strings.Fields(text), " ")
	for _, words := range []string{
		"rod bottom 12.566 mm² 3.0000 µC/m² 37.699 pC rod top 12.566 mm² 3.0000 µC/m² 37.699 pC rod wall 75.398 mm² 0 0 rod (inside) 75.398 mm³ -1.0000 mC/m³ -75.398 pC",
		"fan wall 18.850 mm² 3.0000 µC/m² 56.549 pC fan (inside) 28.274 mm³ -2.0000 mC/m³ -56.549 pC",
		"hedgehog (inside) 50.265 mm³ -750.00 µC/m³ … infinite at the axis -50.265 pC",
		"rod 0 150.80 pC", "fan 0 113.10 pC", "hedgehog 0 100.53 pC",
		"dBx/dx dBx/dy dBx/dz", "dEx/dx dEx/dy dEx/dz", "5.5807 mT/m", "-425.20 kV/m²", "0 0 3 none none none none none none none none none",
	} {
		if !strings.Contains(flat, words) {
			t.Errorf("the report does not say %q:\n%s", words, text)
		}
	}
}

// TestWidth checks that no line is too wide for paper or steers a terminal.
func TestWidth(t *testing.T) {
	for _, line := range strings.Split(printed(t, crowd, true), "\n") {
		if n := utf8.RuneCountInString(line); n > mostWidth+4 {
			t.Errorf("a line of %d characters, want at most %d:\n%s", n, mostWidth, line)
		}
		if strings.ContainsAny(line, "\a\x1b\t") || line != strings.TrimRight(line, " ") {
			t.Errorf("a line with control characters or blanks at its end: %q", line)
		}
	}
}

// TestUnits checks that numbers are printed with the digits that inputs deserve, in a unit that keeps them short.
func TestUnits(t *testing.T) {
	for _, c := range []struct {
		quantity string
		v        float64
		want     string
	}{
		{"B", 0.0811553, "81.155 mT"}, {"B", 2.30254e-8, "23.025 nT"}, {"B", 1.2, "1200.0 mT"}, {"H", 64581.3, "64.581 kA/m"}, {"E", 9.96881e6, "9.9688 MV/m"},
		{"q", 6.6759e-9, "6.6759 nC"}, {"g", -27.0000000036, "-27.000 A·m"}, {"V", 50.0332, "50.033 V"}, {"V", -0.99999, "-0.99999 V"}, {"Wb", 3.3929e-5, "33.929 µWb"},
		{"q", 1.6e-19, "1.6000e-04 fC"}, {"E", 1e20, "1.0000e+14 MV/m"}, {"B", 0, "0"}, {"B", math.NaN(), "none"}, {"B", math.Inf(1), "none"},
	} {
		if got := value(c.quantity, c.v); got != c.want {
			t.Errorf("%s of %g: %q, want %q", c.quantity, c.v, got, c.want)
		}
	}
	x, y, z, n, u := vector("B", r3.Vec{X: -3.4736e-6, Z: 81.1553e-3})
	if got := strings.Join([]string{x, y, z, n, u}, " "); got != "-0.003 0 81.155 81.155 mT" {
		t.Errorf("vector: %q: components have the decimals of the norm", got)
	}
	for q, steps := range ladders {
		for i := 1; i < len(steps); i++ {
			if r := steps[i-1].factor / steps[i].factor; math.Abs(r-1000) > 1e-9 { // a rounding
				t.Errorf("steps %s and %s of %s are a factor of %g apart, want 1000", steps[i-1].unit, steps[i].unit, q, r)
			}
		}
	}
}

// TestRelative checks differences in percent.
func TestRelative(t *testing.T) {
	for _, c := range []struct {
		rel, within float64
		want        string
	}{{-6.1e-5, 2e-4, "-0.006 %"}, {1e-10, 1e-4, "0 %"}, {3.5, 0.5, "+350 %"}, {0.0123, 0.01, "+1.2 %"}, {1e-7, 0, "+0.000010 %"}} {
		if got := relative(c.rel, c.within); got != c.want {
			t.Errorf("%g within %g: %q, want %q", c.rel, c.within, got, c.want)
		}
	}
}

// TestShort checks what is said of values that did not reach the accuracy.
func TestShort(t *testing.T) {
	r := New(&solve.Setup{Scene: &scenefile.Scene{Accuracy: 1e-13}}, true)
	for i := range 12 {
		r.miss(fmt.Sprintf("points file, point %d: V, E.", i))
	}
	got := r.unreached()
	if len(got) != 2+mostShort || got[1] != "points file, point 0: V, E." || got[len(got)-1] != "and "+strconv.Itoa(2)+" more." {
		t.Errorf("%q", got)
	}
}
