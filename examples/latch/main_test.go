package main

import (
	"bytes"
	"strings"
	"testing"
)

// TestRun holds the report against values for the same latch on an ideal plate that were computed by hand, to the digits printed.
func TestRun(t *testing.T) {
	var b bytes.Buffer
	if err := run(nil, &b); err != nil {
		t.Fatalf("%v\n%s", err, b.String())
	}
	for _, want := range []string{"36.7931", "31.2417", "26.4306", "21.0939", "14.5421", "7.8530", "2.8356", "76.05"} {
		if !strings.Contains(b.String(), want) {
			t.Errorf("the report lacks %s:\n%s", want, b.String())
		}
	}
}

func TestRefusals(t *testing.T) {
	for _, args := range [][]string{{"-none"}, {"-travel", "0mm"}, {"-travel", "5"}} {
		var b bytes.Buffer
		if err := run(args, &b); err == nil || b.Len() > 0 {
			t.Errorf("%v: error %v and %d bytes of a report, want an error and nothing", args, err, b.Len())
		}
	}
}
