package grade_test

import (
	"bytes"
	"math"
	"strings"
	"testing"

	"example.com/boundpole/field/closedform"
	"example.com/boundpole/field/codata"
	"example.com/boundpole/magnet/grade"
	"github.com/google/go-cmp/cmp"
)

// disc is the invented material of a sensor magnet.
func disc() grade.Grade {
	return grade.Grade{
		Name: "Quillon K130", Source: "invented", Reference: 20, Br: grade.Range{Min: 1.27, Typical: 1.30, Max: 1.33},
		HcJ: grade.Range{Min: 955e3}, Recoil: 1.05, Alpha: -0.12e-2, Beta: -0.75e-2, From: -40, To: 150,
	}
}

// TestTemperature holds the flux density of a sensor disc at two temperatures against hand values, and a measured pair of
// coercivities against its own coefficients.
func TestTemperature(t *testing.T) {
	g := disc()
	for _, c := range []struct{ temperature, want float64 }{{-40, 194.224}, {20, 181.179}, {125, 158.351}} { // mT, by hand
		m, err := g.At(c.temperature)
		if err != nil {
			t.Fatal(err)
		}
		b := 1e3 * codata.Mu0 * axial(m.Br.Value()/codata.Mu0)
		if math.Abs(b-c.want) > 0.5e-3 { // the last printed digit
			t.Errorf("at %v °C B = %.4f mT, want %v", c.temperature, b, c.want)
		}
	}
	sh := grade.Grade{
		Name: "SH", Source: "common practice, no source", Reference: 20, Br: grade.Range{Typical: 1.382}, HcJ: grade.Range{Typical: 21.06},
		Recoil: 1.05, Alpha: -0.1186e-2, Beta: -0.5395e-2, From: 20, To: 150,
	}
	m, err := sh.At(150)
	if err != nil {
		t.Fatal(err)
	}
	if br, hc := m.Br.Typical, m.HcJ.Typical; math.Abs(br-1.169) > 5e-4 || math.Abs(hc-6.29) > 5e-3 { // printed digits
		t.Errorf("at 150 °C %v T and %v kOe, want 1.169 and 6.29", br, hc)
	}
}

// axial returns B/mu0 on the axis of a disc of 8 mm by 3 mm, 2.5 mm before its face.
func axial(m float64) float64 {
	const r, z, l = 4e-3, 2.5e-3, 3e-3
	return m / 2 * ((z+l)/math.Hypot(z+l, r) - z/math.Hypot(z, r))
}

// TestOperating holds the mean and the local operating point of that disc against hand values.
func TestOperating(t *testing.T) {
	g := disc()
	mean := closedform.CylinderMagnetometricFactor(4e-3, 3e-3)
	centre := closedform.CylinderCentreFactor(4e-3, 3e-3)
	for _, c := range []struct{ temperature, n, use, digit float64 }{
		{20, mean, 0.573, 1e-3}, {80, mean, 0.967, 1e-3}, {125, mean, 2.36, 1e-2}, {20, centre, 0.681, 1e-3}, {80, centre, 1.149, 1e-3},
	} {
		m, err := g.At(c.temperature)
		if err != nil {
			t.Fatal(err)
		}
		p := m.Operating(m.Br.Value(), c.n, 0)
		if math.Abs(p.Use-c.use) > c.digit/2 { // the printed digits
			t.Errorf("at %v °C, N %.4f: use %.4f, want %v", c.temperature, c.n, p.Use, c.use)
		}
		if (p.Margin < 0) != (p.Use > 1) {
			t.Errorf("at %v °C margin %v A/m and use %v do not agree", c.temperature, p.Margin, p.Use)
		}
	}
	m, _ := g.At(20)
	p := m.Operating(1.3, mean, 0)
	if math.Abs(p.H+547.3e3) > 50 || math.Abs(p.B-0.5779) > 5e-5 || math.Abs((1-mean)/mean-0.8403) > 5e-5 { // printed digits
		t.Errorf("H %v A/m, B %v T, want -547.3e3 and 0.5779", p.H, p.B)
	}
	b, h := closedform.OperatingPoint(1.3/codata.Mu0, mean, 1.05)
	if math.Abs(p.H-h) > 1e-14*math.Abs(h) || math.Abs(p.B-codata.Mu0*b) > 1e-14*p.B || // a few roundings
		math.Abs(p.Pc-(1-mean)/mean) > 1e-13 || math.Abs(p.B-codata.Mu0*(p.H+p.M)) > 1e-14 {
		t.Errorf("point %+v does not agree with the catalogue: H %v, B %v", p, h, codata.Mu0*b)
	}
	if p := m.Operating(1.3, 0, 100e3); p.Use != 0 || p.Margin != 955e3 {
		t.Errorf("a field along M uses %v of the limit with a margin of %v A/m, want 0 and 955e3", p.Use, p.Margin)
	}
}

// TestWriteRead reads back what was written.
func TestWriteRead(t *testing.T) {
	g := disc()
	g.Hk = 900e3
	var b bytes.Buffer
	if err := g.Write(&b); err != nil {
		t.Fatal(err)
	}
	got, err := grade.Read(&b)
	if err != nil {
		t.Fatal(err)
	}
	if d := cmp.Diff(&g, got); d != "" {
		t.Error(d)
	}
}

const good = `{"format": "boundpole magnet grade", "version": 1, "name": "K", "source": "invented", "reference_temperature_C": 20,
 "remanence_T": {"min": 1.27, "typical": 1.30}, "intrinsic_coercivity_A_per_m": {"min": 955e3}, "recoil_permeability": 1.05,
 "remanence_percent_per_K": -0.12, "coercivity_percent_per_K": -0.6, "coefficients_hold_C": {"from": -40, "to": 125}}`

// TestRefusals breaks a good file in one place at a time.
func TestRefusals(t *testing.T) {
	if _, err := grade.Read(strings.NewReader(good)); err != nil {
		t.Fatalf("the good file: %v", err)
	}
	for _, c := range []struct{ old, new, want string }{
		{good, "", "EOF"},
		{good, "[]", "array"},
		{good, good + "{}", "text after"},
		{`"version": 1`, `"version": 2`, "want 1"},
		{`boundpole magnet grade`, `table`, "want \"boundpole"},
		{`"name": "K"`, `"name": ""`, "name is missing"},
		{`"source": "invented"`, `"source": ""`, "no source"},
		{`"source"`, `"Source"`, "not known"},
		{`"version": 1`, `"version": 1, "version": 1`, "twice"},
		{`"min": 1.27`, `"min": 1.27, "min": 1.2`, "twice"},
		{`"min": 1.27`, `"min": 1.37`, "below min"},
		{`"min": 1.27, "typical": 1.30`, ``, "no remanence"},
		{`"min": 1.27`, `"min": -1`, "positive"},
		{`"min": 1.27`, `"min": 1e999`, "1e999"},
		{`1.27, "typical": 1.30`, `12700, "typical": 13000`, "not gauss"},
		{`"recoil_permeability": 1.05`, `"recoil_permeability": 0.95`, "relative one"},
		{`"recoil_permeability": 1.05,`, ``, "recoil_permeability is missing"},
		{`"reference_temperature_C": 20,`, ``, "reference_temperature_C is missing"},
		{`"reference_temperature_C": 20`, `"reference_temperature_C": -300`, "temperature -300"},
		{`, "coefficients_hold_C": {"from": -40, "to": 125}`, ``, "coefficients_hold_C is missing"},
		{`"from": -40`, `"from": 30`, "leaves out"},
		{`-0.12`, `-12`, "at most 2"},
		{`-0.6`, `-1.5`, "is gone"},
		{`955e3`, `955e3, "max": 900e3`, "below min"},
		{`"recoil_permeability"`, `"knee_field_A_per_m": 2e6, "recoil_permeability"`, "above the coercivity"},
		{`"invented"`, "\"\xff\"", "UTF-8"},
	} {
		text := strings.Replace(good, c.old, c.new, 1)
		if text == good {
			t.Fatalf("%q is not in the good file", c.old)
		}
		if _, err := grade.Read(strings.NewReader(text)); err == nil || !strings.Contains(err.Error(), c.want) ||
			!strings.HasPrefix(err.Error(), "grade: ") {
			t.Errorf("%q for %q: error %v, want one with %q", c.new, c.old, err, c.want)
		}
	}
	if _, err := grade.Read(strings.NewReader(strings.Repeat(" ", 2<<20))); err == nil {
		t.Error("two megabytes are accepted")
	}
	g := disc()
	for _, temperature := range []float64{-41, 151, math.NaN()} {
		if m, err := g.At(temperature); err == nil {
			t.Errorf("at %v °C: %+v, want an error", temperature, m)
		}
	}
}

// FuzzRead: whatever is read is a grade that checks, and reads back equal.
func FuzzRead(f *testing.F) {
	f.Add([]byte(good))
	f.Add([]byte(`{"format": {"format": [{}]}}`))
	f.Fuzz(func(t *testing.T, data []byte) {
		g, err := grade.Read(bytes.NewReader(data))
		if err != nil {
			return
		}
		var b bytes.Buffer
		if err := g.Write(&b); err != nil {
			t.Fatalf("%+v was read but is not written: %v", g, err)
		}
		if _, err := grade.Read(&b); err != nil {
			t.Fatalf("%s: %v", b.Bytes(), err)
		}
	})
}
