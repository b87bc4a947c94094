package house_test

import (
	"strings"
	"testing"
	"testing/fstest"

	"example.com/boundpole/verify/internal/house"
)

const doc = "// Package p is here.\n"

// tree parses files given as name, text, name, text.
func tree(t *testing.T, files ...string) *house.Tree {
	t.Helper()
	root := fstest.MapFS{"go.mod": {Data: []byte("module m.test/x\n")}}
	for i := 0; i < len(files); i += 2 {
		root[files[i]] = &fstest.MapFile{Data: []byte(files[i+1])}
	}
	tr, err := house.Read(root)
	if err != nil {
		t.Fatal(err)
	}
	return tr
}

// hold demands one violation that contains all parts of want, separated by |, or none if want is empty.
func hold(t *testing.T, name string, got []house.Violation, want string) {
	t.Helper()
	if want == "" {
		for _, v := range got {
			t.Errorf("%s: got %v, want no violation", name, v)
		}
		return
	}
	if len(got) != 1 {
		t.Errorf("%s: got %d violations %v, want one with %q", name, len(got), got, want)
		return
	}
	for part := range strings.SplitSeq(want, "|") {
		if !strings.Contains(got[0].String(), part) {
			t.Errorf("%s: got %q, want it to contain %q", name, got[0], part)
		}
	}
}

func TestImports(t *testing.T) {
	for _, c := range []struct{ file, imports, want string }{
		{"geom/box.go", "m.test/x/geom/pair", ""},
		{"geom/box.go", "m.test/x/field", "geom/box.go:2|imports m.test/x/field|below geom"},
		{"geom/pair/f.go", "m.test/x/geom", "below geom/pair"},
		{"geom/meshfile/f.go", "m.test/x/geom", ""},
		{"geom/meshfile/f.go", "m.test/x/field", "geom/meshfile imports of this module only"},
		{"field/bound/b.go", "m.test/x/geom/meshfile", "below field/bound"},
		{"field/f.go", "m.test/x/field/element", "below field"},
		{"field/internal/a/f.go", "m.test/x/field/internal/b", ""},
		{"field/internal/a/f.go", "m.test/x/field", "below field/internal/a"},
		{"field/element/f.go", "m.test/x/field/internal/a", ""},
		{"field/element/f.go", "m.test/x/field/codata", "imported only by charge magnet"},
		{"field/force/f.go", "m.test/x/field/plot", "do not know each other"},
		{"field/element/f.go", "m.test/x/field/closedform", "imported only by verify"},
		{"field/closedform/f.go", "m.test/x/geom", "(nothing)"},
		{"field/closedform/f.go", "gonum.org/v1/gonum/spatial/r3", ""},
		{"field/closedform/f.go", "gonum.org/v1/gonum/mat", "of other modules only"},
		{"charge/c.go", "m.test/x/magnet", "do not know each other"},
		{"charge/c.go", "m.test/x/field/codata", ""},
		{"charge/c.go", "m.test/x/verify/law", "verify/law is imported only by"},
		{"charge/c.go", "m.test/x/verify/refcase", "below charge"},
		{"verify/law/l.go", "m.test/x/field/element", "verify/law imports of this module only"},
		{"verify/law/l.go", "testing", "may import testing"},
		{"verify/refcase/r.go", "m.test/x/field", "verify/refcase imports of this module only"},
		{"verify/report/r.go", "m.test/x/verify/law", ""},
		{"verify/report/r.go", "os", ""},
		{"examples/scene/s.go", "m.test/x/verify/law", ""},
		{"examples/scene/s.go", "m.test/x/verify/refcase", "do not know each other"},
		{"field/f.go", "os", "may import os"},
		{"field/f.go", "log/slog", "may import log/slog"},
		{"field/f_test.go", "os", ""},
		{"field/f_test.go", "m.test/x/charge", ""},
		{"field/f.go", "github.com/google/go-cmp/cmp", "in tests also"},
		{"field/f_test.go", "github.com/google/go-cmp/cmp", ""},
		{"field/f_test.go", "example.org/other", "other modules"},
		{"field/f.go", "C", ""},
		{"newroom/f.go", "m.test/x/geom", "add newroom"},
		{"charge/c.go", "m.test/x/newroom", "add newroom"},
	} {
		tr := tree(t, c.file, "package p\nimport _ \""+c.imports+"\"\n")
		hold(t, c.file+" imports "+c.imports, tr.Imports(), c.want)
	}
	hold(t, "room", tree(t, "newroom/f.go", "package p\n").Rooms(), "newroom|has no room")
	hold(t, "testdata", tree(t, "testdata/f.go", "package\n", "_gen/f.go", "no", "field/.f.go", "no").Rooms(), "")
}

func TestQuiet(t *testing.T) {
	for _, c := range []struct{ file, call, want string }{
		{"field/f.go", `fmt.Printf("x")`, "field/f.go:3|calls fmt.Printf"},
		{"field/f.go", `fmt.Fprintf(w, "x")`, ""},
		{"field/f.go", `println("x")`, "calls println"},
		{"field/f.go", `panic("p: " + text)`, ""},
		{"field/f.go", `panic(err)`, "panics with a text that is not constant"},
		{"field/f.go", `panic(fmt.Sprintf("p: %d", n))`, "panics with a text that is not constant"},
		{"field/f_test.go", `panic(err)`, ""},
		{"examples/a/main.go", `fmt.Println("x")`, ""},
	} {
		tr := tree(t, c.file, "package p\nconst text = `t`\nfunc f() { "+c.call+" }\n")
		hold(t, c.file+": "+c.call, tr.Quiet(), c.want)
	}
}

func TestHeadings(t *testing.T) {
	const full = "// Units: a\n// Frame: b\n// Domain: c\n// Singular: nowhere\n// Accuracy: d\n// Source: e\n"
	without := func(h string) string {
		return strings.Join(strings.SplitAfter(full, "\n")[:3], "") + h
	}
	for _, c := range []struct{ file, text, want string }{
		{"field/closedform/f.go", full + "func F() {}\n", ""},
		{"field/closedform/f.go", "func F() {}\n", "F: there is none"},
		{"field/closedform/f.go", "func f() {}\n", ""},
		{"field/closedform/f.go", without("// Accuracy: d\n// Source: e\n") + "func F() {}\n", "no Singular:"},
		{"field/closedform/f.go", full + "// Units: f\nfunc F() {}\n", "has Units:"},
		{"field/closedform/f.go", without("// Source: e\n// Singular: n\n// Accuracy: d\n") + "func F() {}\n", "has Units:"},
		{"field/closedform/f.go", without("// Singular:\n// Accuracy: d\n// Source: e\n") + "func F() {}\n", "nothing after Singular:"},
		{"field/element/f.go", "type D struct{}\nfunc (D) Field() {}\n", "D: there is none"},
		{"field/element/f.go", full + "type D struct{}\nfunc (*D) Evaluate() {}\n", ""},
		{"field/element/f.go", "type D struct{ *inner }\ntype inner[T any] struct{}\nfunc (inner[T]) Field() {}\n", "D: there is none"},
		{"field/element/f.go", "type Settings struct{}\n", ""},
		{"field/f.go", "// Domain: c\ntype Moments struct{}\n", "Moments: no Units:"},
	} {
		tr := tree(t, c.file, "package p\n\n"+c.text)
		hold(t, c.file+": "+c.text, tr.Headings(), c.want)
	}
}

func TestComments(t *testing.T) {
	hold(t, "no package comment", tree(t, "field/f.go", "package p\n").PackageComments(), "field: no package comment")
	hold(t, "two", tree(t, "field/f.go", doc+"package p\n", "field/g.go", doc+"package p\n").PackageComments(), "several")
	hold(t, "one", tree(t, "field/f.go", doc+"package p\n", "field/g.go", "package p\n").PackageComments(), "")
	const claim = "package p\n\n// F is exact (TestF).\nfunc F() {}\n"
	hold(t, "no test", tree(t, "field/f.go", claim).Claims(), "field/f.go:3|quotes TestF")
	const test = "package p\nfunc TestF() {}\n"
	hold(t, "test", tree(t, "field/f.go", claim, "field/f_test.go", test).Claims(), "")
	hold(t, "elsewhere", tree(t, "field/f.go", claim, "geom/f_test.go", test).Claims(), "quotes TestF")
	hold(t, "verify", tree(t, "field/f.go", claim, "verify/f_test.go", test).Claims(), "")
}

func TestReferences(t *testing.T) {
	const list = "- [Abel1823] N. H. Abel (1823)\n- [DLMF] the library\n"
	const cites = "// See [Abel1823] and [DLMF].\npackage p\n"
	for _, c := range []struct{ name, code, list, want string }{
		{"good", cites, list, ""},
		{"unknown", cites + "// From [Gauss1813].\n", list, "f.go:3|reference [Gauss1813]"},
		{"in a string", cites + "const c = `[Gauss1813]`\n", list, "reference [Gauss1813]"},
		{"unused", cites, list + "- [Gauss1813] C. F. Gauss (1813)\n", "entry Gauss1813|every entry is cited"},
		{"only listed", cites + "//   - [Gauss1813] again\n", list + "- [Gauss1813] C. F. Gauss (1813)\n", "every entry is cited"},
		{"twice", cites, list + "- [DLMF] the library\n", "listed once"},
		{"unsorted", cites + "// [Aa1900]\n", list + "- [Aa1900] A (1900)\n", "sorted"},
		{"year", cites + "// [Gauss1813]\n", list + "- [Gauss1813] C. F. Gauss (1814)\n", "year of its key"},
		{"shape", cites, list + "- Gauss (1814)\n", "an entry is"},
		{"no key", cites + "// Source: Gauss 1813, sec. 2.\n", list, "Source names a publication of 1813"},
		{"key", cites + "// Source: [Abel1823] sec. 2.\n//\n// It was 1813.\n", list, ""},
	} {
		hold(t, c.name, tree(t, "field/f.go", c.code).References("list.md", c.list), c.want)
	}
}
