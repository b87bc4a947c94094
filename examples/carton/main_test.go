package main

import (
	"bytes"
	"strings"
	"testing"
)

// TestRun holds the report against values for the same carton of 24 discs that were computed by hand, to the digits printed.
func TestRun(t *testing.T) {
	var b bytes.Buffer
	if err := run(nil, &b); err != nil {
		t.Fatalf("%v\n%s", err, b.String())
	}
	for _, want := range []string{"0.3444", "0.22446", "3.250", "1.681", "0.1602"} {
		if !strings.Contains(b.String(), want) {
			t.Errorf("the report lacks %s:\n%s", want, b.String())
		}
	}
}

func TestRefusals(t *testing.T) {
	for _, args := range [][]string{{"-none"}, {"-pitch", "0mm"}, {"-pitch", "5"}} {
		var b bytes.Buffer
		if err := run(args, &b); err == nil || b.Len() > 0 {
			t.Errorf("%v: error %v and %d bytes of a report, want an error and nothing", args, err, b.Len())
		}
	}
}
