package main

import (
	"bytes"
	"strings"
	"testing"
)

// TestRun holds the report against values for the same microphone capsule that were computed by hand, to the digits printed.
func TestRun(t *testing.T) {
	var b bytes.Buffer
	if err := run(nil, &b); err != nil {
		t.Fatalf("%v\n%s", err, b.String())
	}
	for _, want := range []string{"201.68", "7.7712", "155.42", "267.36", "7.5593", "9.6464", "77.712", "582.55"} {
		if !strings.Contains(b.String(), want) {
			t.Errorf("the report lacks %s:\n%s", want, b.String())
		}
	}
}

func TestRefusals(t *testing.T) {
	for _, args := range [][]string{{"-none"}, {"-gap", "0mm"}, {"-gap", "5"}} {
		var b bytes.Buffer
		if err := run(args, &b); err == nil || b.Len() > 0 {
			t.Errorf("%v: error %v and %d bytes of a report, want an error and nothing", args, err, b.Len())
		}
	}
}
