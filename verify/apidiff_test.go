package verify_test

import (
	"errors"
	"fmt"
	"go/ast"
	"go/parser"
	"go/token"
	"go/types"
	"os"
	"strings"
	"testing"

	"golang.org/x/exp/apidiff"
)

// parseAPI type-checks a record, against the packages of the module as they stand.
func parseAPI(deps types.Importer, path, text string) (*types.Package, error) {
	fset := token.NewFileSet()
	f, err := parser.ParseFile(fset, path, text, parser.SkipObjectResolution)
	if err != nil {
		return nil, err
	}
	var all []error
	config := types.Config{Importer: deps, IgnoreFuncBodies: true, Error: func(err error) {
		if e, ok := err.(types.Error); ok && e.Soft {
			return // a generic function without body
		}
		all = append(all, err)
	}}
	pkg, _ := config.Check(path, fset, []*ast.File{f}, nil) // its error is the first of all
	return pkg, errors.Join(all...)
}

// judgeAPI returns the changes from one record of a package to another, incompatible ones apart.
func judgeAPI(deps types.Importer, path, old, now string) (breaking, harmless []string, err error) {
	is, err := parseAPI(deps, path, now)
	if err != nil {
		return nil, nil, fmt.Errorf("%s: the exported API mentions what is not exported: %w", path, err)
	}
	was, err := parseAPI(deps, path, old)
	if err != nil {
		return []string{fmt.Sprintf("the record no longer fits the packages it imports: %v", err)}, nil, nil
	}
	for _, c := range apidiff.Changes(was, is).Changes {
		if c.Compatible {
			harmless = append(harmless, c.Message)
		} else {
			breaking = append(breaking, c.Message)
		}
	}
	return breaking, harmless, nil
}

// TestAPICompatible judges what TestAPI finds: it fails if code written against a record would no longer compile.
func TestAPICompatible(t *testing.T) {
	e := loadExports(t)
	for _, path := range e.library {
		now := e.declarations(t, path)
		old, err := os.ReadFile(e.record(path))
		if err != nil {
			old = []byte(now) // a new package: TestAPI asks for its record
		}
		breaking, harmless, err := judgeAPI(e.importer, path, string(old), now)
		if err != nil {
			t.Error(err)
		}
		for _, c := range breaking {
			t.Errorf("%s: incompatible: %s; %s", path, c, apiHint)
		}
		for _, c := range harmless {
			t.Logf("%s: compatible: %s", path, c)
		}
	}
}

// TestJudgeAPI tries the judgement on changes whose answer is known.
func TestJudgeAPI(t *testing.T) {
	const old = "package p\ntype T struct { A int; _ struct{} }\nfunc (T) M()\nfunc F(x float64) T\nfunc G[E any](x E) E\n" +
		"type S interface{ Field(x float64) float64 }\nconst C = 2\n"
	for _, c := range []struct{ name, from, to, breaking, harmless string }{
		{"nothing", "", "", "", ""},
		{"function added", "const C = 2\n", "const C = 2\nfunc H()\n", "", "H: added"},
		{"function removed", "func F(x float64) T\n", "", "F: removed", ""},
		{"parameter added", "F(x float64)", "F(x, y float64)", "F: changed from", ""},
		{"field added", "A int;", "A int; B int;", "", "T.B: added"},
		{"no longer comparable", "_ struct{}", "_ [0]func()", "T: old is comparable, new is not", ""},
		{"method of an interface added", "S interface{", "S interface{ More();", "S.More: added", ""},
		{"value changed", "C = 2", "C = 3", "C: value changed", ""},
	} {
		breaking, harmless, err := judgeAPI(nil, "p", old, strings.Replace(old, c.from, c.to, 1))
		if err != nil {
			t.Errorf("%s: %v", c.name, err)
		}
		for got, want := range map[string]string{strings.Join(breaking, "; "): c.breaking, strings.Join(harmless, "; "): c.harmless} {
			if !strings.Contains(got, want) || (got == "") != (want == "") {
				t.Errorf("%s: got breaking %q, harmless %q; want %q, %q", c.name, breaking, harmless, c.breaking, c.harmless)
			}
		}
	}
	if _, _, err := judgeAPI(nil, "p", old, old+"func H() hidden\n"); err == nil {
		t.Error("an API that mentions an unexported type: got no error")
	}
}
