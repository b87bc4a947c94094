package main

import (
	"testing"

	"example.com/boundpole/examples/internal/given"
)

// TestRun holds the report against values for the same carton of 24 discs that were computed by hand, to the digits printed.
func TestRun(t *testing.T) {
	lacking, report, err := given.Lacking(run, "0.3444", "0.22446", "3.250", "1.681", "0.1602")
	if err != nil || lacking != nil {
		t.Errorf("%v; the report lacks %q:\n%s", err, lacking, report)
	}
}

func TestRefusals(t *testing.T) {
	if accepted := given.Accepted(run, "-none", "-pitch 0mm", "-pitch 5", "-pitch 5T"); accepted != nil {
		t.Errorf("accepted: %q", accepted)
	}
}
