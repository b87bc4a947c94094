package main

import (
	"bytes"
	"context"
	"encoding/json"
	"maps"
	"math"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"
	"unicode/utf8"

	"example.com/boundpole/verify"
)

// call runs the program.
func call(args ...string) (status int, out, complaints string) {
	var o, c bytes.Buffer
	status = run(context.Background(), args, &o, &c)
	return status, o.String(), c.String()
}

func TestPass(t *testing.T) {
	status, out, complaints := call("-family", "iron rod")
	if status != 0 || complaints != "" || !strings.Contains(out, "PASS: 15 cases\n") {
		t.Errorf("status %d, complaints %q, last line %q", status, complaints, out[strings.LastIndex(out[:len(out)-1], "\n")+1:])
	}
	for line := range strings.Lines(out) {
		if n := utf8.RuneCountInString(line) - 1; n > 120 {
			t.Errorf("line of %d characters, want at most 120: %s", n, line)
		}
	}
}

func TestFail(t *testing.T) {
	status, out, _ := call("-family", "iron rod", "-spoil", "1e-9")
	if status != 1 || !strings.Contains(out, "\nFAIL: 5 of 15 cases\n") || strings.Count(out, "\nx ") != 5 {
		t.Errorf("status %d, want 1 and five cases marked:\n%s", status, out)
	}
}

func TestMistakes(t *testing.T) {
	for _, args := range [][]string{{"-family", "nonsense"}, {"-nonsense"}, {"more"}, {"-family", "iron rod", "-json", "missing/folder/file"}} {
		if status, out, complaints := call(args...); status != 2 || out != "" || complaints == "" {
			t.Errorf("%q: status %d, printed %q, complained %q; want 2, nothing, a reason", args, status, out, complaints)
		}
	}
}

// TestJSON holds the file against the cases, and its keys against the list.
func TestJSON(t *testing.T) {
	file := filepath.Join(t.TempDir(), "cases.json")
	if status, _, complaints := call("-family", "reference values", "-json", file); status != 0 {
		t.Fatalf("status %d: %s", status, complaints)
	}
	raw, err := os.ReadFile(file)
	if err != nil {
		t.Fatal(err)
	}
	var list []map[string]any
	if err := json.Unmarshal(raw, &list); err != nil {
		t.Fatal(err)
	}
	cases, err := verify.Run(context.Background(), &verify.Options{Family: "reference values"})
	if err != nil {
		t.Fatal(err)
	}
	if len(list) != len(cases) {
		t.Fatalf("%d objects for %d cases", len(list), len(cases))
	}
	want := []string{"error", "expected", "family", "got", "id", "kind", "ok", "source", "tolerance"}
	for i, o := range list {
		if keys := slices.Sorted(maps.Keys(o)); !slices.Equal(keys, want) {
			t.Errorf("%v: keys %v, want %v", o["id"], keys, want)
		}
		c := &cases[i]
		if o["id"] != c.ID || o["expected"] != nil || o["got"] != c.Got || o["tolerance"] != c.Tolerance || o["ok"] != c.OK {
			t.Errorf("case %+v became %v", c, o)
		}
	}
	left, err := os.ReadDir(filepath.Dir(file))
	if err != nil || len(left) != 1 {
		t.Errorf("files beside the report: %v, %v", left, err)
	}
}

// TestWholeOrNot demands that a file that cannot be put in place leaves nothing behind.
func TestWholeOrNot(t *testing.T) {
	folder := t.TempDir()
	target := filepath.Join(folder, "taken")
	if err := os.MkdirAll(filepath.Join(target, "full"), 0o755); err != nil {
		t.Fatal(err)
	}
	if err := writeJSON(target, []verify.Case{{ID: "a", Got: math.NaN()}}); err == nil {
		t.Error("a folder was replaced by the report")
	}
	if left, err := os.ReadDir(folder); err != nil || len(left) != 1 {
		t.Errorf("files left: %v, %v", left, err)
	}
}
