package main

import (
	"testing"

	"example.com/boundpole/examples/internal/given"
)

// TestRun holds the report against values for the same latch on an ideal plate that were computed by hand, to the digits printed.
func TestRun(t *testing.T) {
	lacking, report, err := given.Lacking(run, "36.7931", "31.2417", "26.4306", "21.0939", "14.5421", "7.8530", "2.8356", "76.05")
	if err != nil || lacking != nil {
		t.Errorf("%v; the report lacks %q:\n%s", err, lacking, report)
	}
}

func TestRefusals(t *testing.T) {
	if accepted := given.Accepted(run, "-none", "-travel 0mm", "-travel 5", "-travel 5T"); accepted != nil {
		t.Errorf("accepted: %q", accepted)
	}
}
