package main

import (
	"testing"

	"example.com/boundpole/examples/internal/given"
)

// TestRun holds the report against values for the same microphone capsule that were computed by hand, to the digits printed.
func TestRun(t *testing.T) {
	lacking, report, err := given.Lacking(run, "201.68", "7.7712", "155.42", "267.36", "7.5593", "9.6464", "77.712", "582.55")
	if err != nil || lacking != nil {
		t.Errorf("%v; the report lacks %q:\n%s", err, lacking, report)
	}
}

func TestRefusals(t *testing.T) {
	if accepted := given.Accepted(run, "-none", "-gap 0mm", "-gap 5", "-gap 5T"); accepted != nil {
		t.Errorf("accepted: %q", accepted)
	}
}
