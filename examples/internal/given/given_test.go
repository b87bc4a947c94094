package given_test

import (
	"bytes"
	"flag"
	"io"
	"math"
	"strings"
	"testing"

	"example.com/boundpole/examples/internal/given"
)

func TestParse(t *testing.T) {
	for _, c := range []struct {
		text  string
		units []given.Unit
		want  float64
	}{
		{"2.5mm", given.Length, 2.5e-3}, {" 12.5 um ", given.Length, 12.5e-6}, {"1e-3m", given.Length, 1e-3}, {"-40C", given.Celsius, -40},
		{"-0.30 mC/m2", given.Density, -0.3e-3}, {"3 %", given.Share, 0.03}, {"1.3T", given.Flux, 1.3},
	} {
		if got, err := given.Parse(c.text, c.units); err != nil || math.Abs(got-c.want) > 1e-15*math.Abs(c.want) { // one multiplication
			t.Errorf("%q: %v, %v, want %v", c.text, got, err, c.want)
		}
	}
	for text, want := range map[string]string{"2.5": "no unit", "2.5ft": "no number", "mm": "no number", "": "no number", "1e999m": "no number"} {
		if _, err := given.Parse(text, given.Length); err == nil || !strings.Contains(err.Error(), want) {
			t.Errorf("%q: %v, want %q", text, err, want)
		}
	}
}

func TestFlag(t *testing.T) {
	set := flag.NewFlagSet("test", flag.ContinueOnError)
	set.SetOutput(io.Discard)
	gap := given.Flag(set, "gap", given.Length, "1 mm", "gap")
	if err := set.Parse([]string{"-gap", "0 mm"}); err != nil || *gap != 0 {
		t.Errorf("gap %v, %v", *gap, err)
	}
	if err := given.Positive(set, "gap"); err == nil || !strings.Contains(err.Error(), "-gap is 0 mm") {
		t.Errorf("a gap of 0: %v", err)
	}
	if err := set.Parse([]string{"-gap", "3"}); err == nil {
		t.Error("a gap without unit is accepted")
	}
}

func TestChecks(t *testing.T) {
	var c given.Checks
	c.Add("near", 100, 101, "mT", 0.02)
	var b bytes.Buffer
	if !c.Print(&b) || strings.Contains(b.String(), "MISSED") {
		t.Errorf("%s", b.String())
	}
	c.Add("far", 100, 110, "mT", 0.02)
	if b.Reset(); c.Print(&b) || !strings.Contains(b.String(), "MISSED") {
		t.Errorf("%s", b.String())
	}
}
