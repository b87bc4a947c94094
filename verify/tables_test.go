package verify_test

import (
	"context"
	"encoding/json"
	"os"
	"strings"
	"testing"

	"example.com/boundpole/verify"
	"example.com/boundpole/verify/refcase"
)

// notHere says why an entry of tables.json is no case, by the beginning of its ID.
var notHere = map[string]string{
	"polarizability-":  "induced polarization of polyhedra is not computed",
	"coated-sphere-":   "the induced polarization of a coat is not uniform",
	"dipole-torque":    "a definition, no field in it",
	"far-dipole-limit": "no number in the entry; see the family thin rod and the expansions",
	"five-gauss":       "a conversion of units, no field in it",
	"air-transport-":   "limits of a rule, no field in them",
}

// TestTablesUsed demands that every entry of tables.json is a case or is left out for a reason.
func TestTablesUsed(t *testing.T) {
	raw, err := os.ReadFile("testdata/tables.json")
	if err != nil {
		t.Fatal(err)
	}
	var entries []struct{ ID string }
	if err := json.Unmarshal(raw, &entries); err != nil {
		t.Fatal(err)
	}
	var names strings.Builder
	for _, family := range []string{"boxes", "ellipsoid factors", "prism factors", "cylinder factors", "energies", "forces", "flux tubes", "worked examples"} {
		cases, err := verify.Run(context.Background(), &verify.Options{Family: family})
		if err != nil {
			t.Fatal(err)
		}
		for _, c := range cases {
			names.WriteString(c.ID + " ")
		}
	}
	used := 0
next:
	for _, e := range entries {
		for prefix := range notHere {
			if strings.HasPrefix(e.ID, prefix) {
				continue next
			}
		}
		used++
		if !strings.Contains(names.String(), "/"+strings.TrimPrefix(e.ID, "fluxtube-biot-savart-")) {
			t.Errorf("entry %s is no case and not left out for a reason", e.ID)
		}
	}
	t.Logf("%d entries used of %d", used, len(entries))
	if used < 85 { // 92 of 102 at the time of writing
		t.Errorf("%d entries used of %d, want at least 85", used, len(entries))
	}
}

// TestReferencesUsed demands a case for each reference body that the library computes.
func TestReferencesUsed(t *testing.T) {
	raw, err := os.ReadFile("testdata/dev.json")
	if err != nil {
		t.Fatal(err)
	}
	all, err := refcase.Parse("dev.json", raw)
	if err != nil {
		t.Fatal(err)
	}
	cases, err := verify.Run(context.Background(), &verify.Options{Family: "reference values"})
	if err != nil {
		t.Fatal(err)
	}
	have := map[string]bool{}
	for _, c := range cases {
		have[c.Name] = true
	}
	integrators := []string{"sector", "ball-r", "frustum", "torus", "axial_z2", "radial_s", "fluxtube"} // not closed forms, or no body
	for _, c := range all {
		later := false
		for _, s := range integrators {
			later = later || strings.Contains(c.ID, s)
		}
		if have[c.ID] == later {
			t.Errorf("reference case %s: is a case %v, needs what the library does not have yet %v", c.ID, have[c.ID], later)
		}
	}
}
