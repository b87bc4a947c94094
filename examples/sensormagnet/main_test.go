package main

import (
	"testing"

	"example.com/boundpole/examples/internal/given"
)

// TestRun holds the report against values for the same sensor magnet that were computed by hand, to the digits printed.
func TestRun(t *testing.T) {
	lacking, report, err := given.Lacking(run, "181.179", "201.958", "162.338", "66.03", "157.5", "208.0", "20.5", "194.224", "158.351", "0.5434", "0.573")
	if err != nil || lacking != nil {
		t.Errorf("%v; the report lacks %q:\n%s", err, lacking, report)
	}
}

func TestRefusals(t *testing.T) {
	if accepted := given.Accepted(run, "-none", "-gap 0mm", "-gap 5", "-gap 5T"); accepted != nil {
		t.Errorf("accepted: %q", accepted)
	}
}
