package handover_test

import (
	"bytes"
	"errors"
	"io"
	"strconv"
	"strings"
	"testing"
	"testing/iotest"

	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/element"
	"example.com/boundpole/field/handover"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// small is a magnet of two charged faces with one point each, and its files.
func small(t testing.TB) (set *handover.Set, csv, json string) {
	t.Helper()
	s := scenes(t)[0]
	s.settings.Points, s.settings.Names = 1, []string{"magnet"}
	set = of(t, s)
	var c, j bytes.Buffer
	if err := errors.Join(set.WriteCSV(&c), set.WriteJSON(&j)); err != nil {
		t.Fatal(err)
	}
	return set, c.String(), j.String()
}

// change returns text with old replaced by new everywhere; it fails if there is nothing to replace.
func change(t *testing.T, text, old, new string) string {
	t.Helper()
	if !strings.Contains(text, old) {
		t.Fatalf("there is no %q to damage in:\n%s", old, text)
	}
	return strings.ReplaceAll(text, old, new)
}

// digits returns a number as it stands in files.
func digits(x float64) string { return strconv.FormatFloat(x, 'g', -1, 64) }

// damage is what is done to a file, and words of the error by which it is refused.
type damage struct{ name, old, new, words string }

func TestDamagedCSV(t *testing.T) {
	set, csv, _ := small(t)
	for _, d := range []damage{
		{"lost row", "0,0,-0.0025,-200,magnet,-z\n", "", `face "-z" of part "magnet" has 0 points and 0 dipoles, and 1 and 0 are announced`},
		{"row twice", "0,0,-0.0025,-200,magnet,-z\n", "0,0,-0.0025,-200,magnet,-z\n0,0,-0.0025,-200,magnet,-z\n", "has 2 points"},
		{"sign of a row", "-0.0025,-200,magnet", "-0.0025,200,magnet", `"-z" of part "magnet": the charges of the points sum to 200, and -200 is stated; the signs are turned`},
		{"rows in mm", "0.0025,", "2.5,", "the moment of the points is {0 0 1000}, and {0 0 1} is stated; they differ by the factor 1e3"},
		{"charges in mA m", "200,magnet", "200000,magnet", "factor 1e3"},
		{"charges in webers", "0.0025,200,magnet", "0.0025,0.000251327412254,magnet", "they differ by mu0"},
		{"unit of a column", "x[m]", "x[mm]", `line 18: column "x[mm]"; want "x[m]": convert`},
		{"unit of the metadata", "total[A m]", "total[mA m]", `line 7: metadata "total[mA m]" are not known; want format, kind`},
		{"units", "length m", "length mm", `line 4: units "length mm,charge A m`},
		{"semicolons", "0,0,-0.0025,-200,magnet,-z", "0;0;-0,0025;-200;magnet;-z", `line 19: columns are separated by ";", so decimals may have commas`},
		{"decimal comma", "-0.0025,-200,magnet", "-0,0025,-200,magnet", "line 19: 7 columns; want 6: do the decimals have commas?"},
		{"decimal comma in the metadata", "magnitudes[A m],400", "magnitudes[A m],400,0", "line 8: 2 values; want 1, with decimal points"},
		{"NaN", "-0.0025,-200,magnet", "-0.0025,NaN,magnet", `line 19: "NaN" is no finite decimal number`},
		{"infinity", "-0.0025,-200,magnet", "-0.0025,1e999,magnet", `"1e999" is no finite decimal number`},
		{"unknown face", "-200,magnet,-z", "-200,magnet,-y", `line 19: face "-y" of part "magnet" has no line "# group"`},
		{"unknown key", "# about", "# around", `"around[m]" are not known`},
		{"repeated key", "# total[A m],0\n", "# total[A m],0\n# total[A m],0\n", `line 8: "total[A m]" stands too often; keep one`},
		{"repeated group", "# group,magnet,-z,face,1,0,-200\n", "# group,magnet,-z,face,1,0,-200\n# group,magnet,-z,face,1,0,-200\n", "stands twice"},
		{"lost key", "# about[m],0,0,0\n", "", `metadata "about[m]" are missing`},
		{"order", "# kind,magnetic\n", "", `line 2: metadata begin with "convention"; want "kind"`},
		{"other kind", "# kind,magnetic", "# kind,electric", "convention"},
		{"other format", "equivalent charge,1", "equivalent charge,2", "line 1: format"},
		{"other constant", "1.25663706127e-06", "1.2566", "mu0 is 1.2566; want about"},
		{"empty", csv, "", "line 0: the file ends before the header"},
		{"not UTF-8", "magnet,-z", "magn\xff,-z", "not UTF-8"},
		{"total", "# total[A m],0", "# total[A m],5", "the charges of all points sum to 0, and 5 is stated"},
		{"magnitudes", "[A m],400", "[A m],401", "the magnitudes of all points sum to 400, and 401 is stated; a row is lost"},
		{"moment", "# moment[A m^2],0,0,1", "# moment[A m^2],0,0,-1", "the signs are turned"},
		{"within", "# within field[A/m]," + digits(set.Within.Field), "# within field[A/m],600", "the field of the points at probe 0 is"},
		{"negative within", "# within field[A/m],", "# within field[A/m],-", "within is negative"},
	} {
		_, err := handover.ReadCSV(strings.NewReader(change(t, csv, d.old, d.new)))
		if err == nil || !strings.Contains(err.Error(), d.words) {
			t.Errorf("%s: error %v, want one with %q", d.name, err, d.words)
		}
	}
}

func TestDamagedJSON(t *testing.T) {
	set, _, json := small(t)
	for _, d := range []damage{
		{"lost row", "        [0,0,-0.0025,-200]\n", "", `face "-z" of part "magnet": has no points`},
		{"sign of a row", "-0.0025,-200]", "-0.0025,200]", "the signs are turned"},
		{"vertices in mm", "-0.0025]]", "-2.5]]", "facet 0"},
		{"sigma in tesla", `"sigma": 1000000`, `"sigma": 1.25663706127`, "facet 0: sigma times area is 0.000251327"},
		{"inward normal", `"normal": [0,0,1]`, `"normal": [0,0,-1]`, "facet 0: the normal points to the other side of its vertices"},
		{"crooked normal", `"normal": [0,0,1]`, `"normal": [0,0.6,0.8]`, "facet 0: the normal {0 0.6 0.8} is not the unit normal"},
		{"vertex off the plane", "[-0.01,0.005,0.0025]]", "[-0.01,0.005,0.0026]]", "facet 0"},
		{"two vertices", "[[-0.01,-0.005,0.0025],[0.01,-0.005,0.0025],[0.01,0.005,0.0025],[-0.01,0.005,0.0025]]", "[[-0.01,-0.005,0.0025],[0.01,-0.005,0.0025]]", "facet 0 has 2 vertices; want 3 or 4"},
		{"five numbers", "[0,0,-0.0025,-200]", "[0,0,-0.0025,-200,1]", "line 24, groups.0.points.0: more than 4 elements"},
		{"three numbers", "[0,0,-0.0025,-200]", "[0,0,-0.0025]", "groups.0.points.0: 3 numbers; want 4"},
		{"text for a number", "[0,0,-0.0025,-200]", `[0,0,"-0.0025",-200]`, "groups.0.points.0.2: -0.0025 stands here; want a number"},
		{"NaN", "[0,0,-0.0025,-200]", "[0,0,-0.0025,NaN]", "NaN and infinity are no numbers"},
		{"infinity", "[0,0,-0.0025,-200]", "[0,0,-0.0025,1e999]", "groups.0.points.0.3: 1e999 is out of the range"},
		{"unknown key", `"about":`, `"About":`, `line 8, document: key "About" is not known; want about, constant`},
		{"repeated key", `"total": 0,`, `"total": 0, "total": 0,`, `key "total" stands twice; keep one`},
		{"lost key", `"total": 0,`, "", `key "total" is missing`},
		{"units", `"length": "m"`, `"length": "mm"`, `units: length is in "mm"; want "m"`},
		{"other kind", `"kind": "magnetic"`, `"kind": "electric"`, "convention"},
		{"no kind", `"kind": "magnetic"`, `"kind": "magnet"`, `kind "magnet"; want electric or magnetic`},
		{"other format", handover.Format, "some charge", `line 2, format: "some charge" stands here; want "boundpole equivalent charge"`},
		{"other version", `"version": 1`, `"version": 2`, "line 3, version: version 2; this package reads version 1"},
		{"other constant", `"name": "mu0"`, `"name": "epsilon0"`, `constant "epsilon0"`},
		{"cut off", json[len(json)/2:], "", "it is cut off"},
		{"text after", json, json + "{}", "text after the end"},
		{"array", json, "[]", "document: [ stands here; want an object"},
		{"null", `"groups": [`, `"groups": null, "more": [`, "groups: null stands here; want an array"},
		{"two probes", `"probes": [`, `"probes": [], "groups": [`, "probes: 0 probes; want 3"},
		{"form", `"form": "face"`, `"form": "sheets"`, `form "sheets" is not known`},
		{"face with dipoles", `"points": [`, `"dipoles": [[0,0,0,1,0,0]], "points": [`, "has dipoles; only a group of points has"},
		{"group twice", `"place": "+z"`, `"place": "-z"`, `"-z" of part "magnet" stands twice`},
		{"name", `"place": "+z"`, `"place": "a,b"`, "printable characters"},
		{"probe", `"potential": ` + digits(set.Probes[0].Potential), `"potential": 302`, "the potential of the points at probe 0 is"},
	} {
		_, err := handover.ReadJSON(strings.NewReader(change(t, json, d.old, d.new)))
		if err == nil || !strings.Contains(err.Error(), d.words) {
			t.Errorf("%s: error %v, want one with %q", d.name, err, d.words)
		}
	}
}

// TestTurnedSigns turns all charges consistently but for the probes: only the field tells.
func TestTurnedSigns(t *testing.T) {
	set, _, _ := small(t)
	turned := *set
	turned.Moment = r3.Scale(-1, set.Moment)
	turned.Groups = nil
	for _, g := range set.Groups {
		g.Charge = -g.Charge
		g.Facets = nil
		g.Points = []element.Point{{At: g.Points[0].At, Charge: -g.Points[0].Charge}}
		turned.Groups = append(turned.Groups, g)
	}
	turned.Within.Potential, turned.Within.Field = 1, 100
	if err := turned.Check(); err == nil || !strings.Contains(err.Error(), "potential of the points at probe 0") {
		t.Errorf("all signs turned: error %v, want one of the potential at a probe", err)
	}
	if err := turned.WriteCSV(io.Discard); err == nil {
		t.Error("a set that does not agree was written")
	}
}

// TestReaderFails checks that errors of readers and writers come back.
func TestReaderFails(t *testing.T) {
	set, csv, _ := small(t)
	gone := errors.New("gone")
	for _, read := range []func(io.Reader) (*handover.Set, error){handover.ReadCSV, handover.ReadJSON} {
		if _, err := read(io.MultiReader(strings.NewReader(csv), iotest.ErrReader(gone))); !errors.Is(err, gone) {
			t.Errorf("error %v, want %v", err, gone)
		}
		if _, err := read(endless{}); err == nil || !strings.Contains(err.Error(), "more than 134217728 bytes") {
			t.Errorf("an endless file: error %v", err)
		}
	}
	for _, write := range []func(io.Writer) error{set.WriteCSV, set.WriteJSON} {
		if err := write(full{}); !errors.Is(err, io.ErrShortWrite) {
			t.Errorf("error %v, want %v", err, io.ErrShortWrite)
		}
	}
}

type endless struct{}

func (endless) Read(b []byte) (int, error) { return len(b), nil }

type full struct{}

func (full) Write([]byte) (int, error) { return 0, io.ErrShortWrite }

// FuzzRead demands of both readers that they never panic, and that what they accept is written and read back the same.
func FuzzRead(f *testing.F) {
	for _, parts := range []bound.Assembly{
		{body(f, geom.Box{Size: r3.Vec{X: 2, Y: 1, Z: 1}}, graded(r3.Vec{Z: 1}, 0.5))},
		{{Source: element.Point{At: r3.Vec{X: 1}, Charge: 2e-9}}, {Source: element.Dipole{Moment: r3.Vec{X: 1e-12}}}},
	} {
		set := of(f, scene{parts: parts, settings: handover.Settings{Points: 1, Pieces: 1}})
		var c, j bytes.Buffer
		if err := errors.Join(set.WriteCSV(&c), set.WriteJSON(&j)); err != nil {
			f.Fatal(err)
		}
		f.Add(c.Bytes())
		f.Add(j.Bytes())
	}
	f.Add([]byte("# format,boundpole equivalent charge,1\n# kind,electric\nx[m]"))
	f.Add([]byte(`{"groups": [{"points": [[1e308, 0, 0, 1]]}]}`))
	f.Fuzz(func(t *testing.T, data []byte) {
		for _, c := range []struct {
			read  func(io.Reader) (*handover.Set, error)
			write func(*handover.Set, io.Writer) error
		}{{handover.ReadCSV, (*handover.Set).WriteCSV}, {handover.ReadJSON, (*handover.Set).WriteJSON}} {
			set, err := c.read(bytes.NewReader(data))
			if err != nil {
				continue
			}
			var first, second bytes.Buffer
			if err := c.write(set, &first); err != nil {
				t.Fatalf("read, but not written: %v", err)
			}
			again, err := c.read(bytes.NewReader(first.Bytes()))
			if err != nil {
				t.Fatalf("not read back: %v\n%s", err, first.Bytes())
			}
			if err := c.write(again, &second); err != nil || !bytes.Equal(first.Bytes(), second.Bytes()) {
				t.Fatalf("other bytes the second time: %v", err)
			}
		}
	})
}

// TestLumped hands over the few points that stand for a magnet from afar.
func TestLumped(t *testing.T) {
	l, err := bound.Lump(scenes(t)[0].parts[0].Charge, 1e-3, 60)
	if err != nil {
		t.Fatal(err)
	}
	set, err := handover.Of(bound.Assembly{{Source: l.Source()}}, handover.Settings{Kind: handover.Magnetic, Unit: 1e-3})
	if err != nil {
		t.Fatal(err)
	}
	near(t, "moment", r3.Norm(r3.Sub(set.Moment, r3.Vec{Z: 1})), 0, 2e-3) // the accuracy asked for, and as much for the moment
	if set.Within.Field > 1e-9 {
		t.Errorf("points stand for themselves to %v A/m, want rounding", set.Within.Field)
	}
}
