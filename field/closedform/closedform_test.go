package closedform_test

import (
	"encoding/json"
	"go/ast"
	"go/parser"
	"go/token"
	"io/fs"
	"math"
	"os"
	"reflect"
	"regexp"
	"strconv"
	"strings"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"
)

// call applies a catalogue function to a flat list of arguments and flattens its results.
func call(t *testing.T, name string, args []float64) []float64 {
	t.Helper()
	fn := reflect.ValueOf(catalogue[name])
	var in []reflect.Value
	for i := range fn.Type().NumIn() {
		switch fn.Type().In(i) {
		case reflect.TypeFor[r3.Vec]():
			in = append(in, reflect.ValueOf(r3.Vec{X: args[0], Y: args[1], Z: args[2]}))
			args = args[3:]
		case reflect.TypeFor[int]():
			in = append(in, reflect.ValueOf(int(args[0])))
			args = args[1:]
		default:
			in = append(in, reflect.ValueOf(args[0]))
			args = args[1:]
		}
	}
	if len(args) != 0 {
		t.Fatalf("%s: %d arguments too many", name, len(args))
	}
	var out []float64
	for _, v := range fn.Call(in) {
		out = append(out, flat(v.Interface())...)
	}
	return out
}

func flat(v any) []float64 {
	switch v := v.(type) {
	case float64:
		return []float64{v}
	case r3.Vec:
		return []float64{v.X, v.Y, v.Z}
	case [3][3]float64:
		var out []float64
		for _, row := range v {
			out = append(out, row[:]...)
		}
		return out
	}
	panic("unknown result type")
}

// relative returns |got - want|/|want| in the Euclidean norm.
func relative(got, want []float64) float64 {
	if len(got) != len(want) {
		return math.NaN()
	}
	var e, w float64
	for i := range got {
		e = math.Hypot(e, got[i]-want[i])
		w = math.Hypot(w, want[i])
	}
	if e == 0 {
		return 0
	}
	return e / w
}

// docs returns the comment of every exported function in the package, and doc.go.
func docs(t *testing.T) (funcs map[string]string, pkg string) {
	t.Helper()
	set := token.NewFileSet()
	names, err := fs.Glob(os.DirFS("."), "*.go")
	if err != nil {
		t.Fatal(err)
	}
	funcs = map[string]string{}
	for _, name := range names {
		if strings.HasSuffix(name, "_test.go") {
			continue
		}
		file, err := parser.ParseFile(set, name, nil, parser.ParseComments)
		if err != nil {
			t.Fatal(err)
		}
		pkg += file.Doc.Text()
		for _, d := range file.Decls {
			if f, ok := d.(*ast.FuncDecl); ok && f.Name.IsExported() {
				funcs[f.Name.Name] = f.Doc.Text()
			}
		}
	}
	return funcs, pkg
}

type reference struct {
	Cases []struct {
		F   string
		X   []any
		Y   []string
		How string
	}
}

func readReference(t *testing.T) reference {
	t.Helper()
	data, err := os.ReadFile("testdata/reference.json")
	if err != nil {
		t.Fatal(err)
	}
	var ref reference
	if err := json.Unmarshal(data, &ref); err != nil {
		t.Fatal(err)
	}
	return ref
}

func number(t *testing.T, v any) float64 {
	t.Helper()
	switch v := v.(type) {
	case float64:
		return v
	case string:
		f, err := strconv.ParseFloat(v, 64)
		if err != nil {
			t.Fatal(err)
		}
		return f
	}
	t.Fatalf("not a number: %v", v)
	return 0
}

var claim = regexp.MustCompile(`relative error <= (\S+) \(worst (\S+) of (\d+) points, TestReference\)`)

// TestReference holds every function to the error bound in its own comment, and the
// comment to the number of points; every function must have some.
func TestReference(t *testing.T) {
	ref := readReference(t)
	funcs, _ := docs(t)
	worst, count := map[string]float64{}, map[string]int{}
	for _, c := range ref.Cases {
		if catalogue[c.F] == nil {
			t.Fatalf("reference for unknown function %s", c.F)
		}
		var x, y []float64
		for _, v := range c.X {
			x = append(x, number(t, v))
		}
		for _, v := range c.Y {
			y = append(y, number(t, v))
		}
		got := call(t, c.F, x)
		e := relative(got, y)
		if math.IsNaN(e) {
			t.Errorf("%s%v = %v, want %v (%s)", c.F, x, got, y, c.How)
		}
		count[c.F]++
		if e >= worst[c.F] {
			worst[c.F] = e
		}
		bound := 1e-12 // replaced by the claim of the comment
		if m := claim.FindStringSubmatch(strings.Join(strings.Fields(funcs[c.F]), " ")); m != nil {
			bound = number(t, m[1])
		}
		if e > bound {
			t.Errorf("%s%v = %v, want %v, relative error %.2g > %.2g (%s)", c.F, x, got, y, e, bound, c.How)
		}
	}
	for name := range catalogue {
		t.Logf("measured %s %.2g %d", name, worst[name], count[name])
		m := claim.FindStringSubmatch(strings.Join(strings.Fields(funcs[name]), " "))
		if m == nil {
			t.Errorf("%s: no accuracy claim in the comment", name)
		} else if n := number(t, m[3]); int(n) != count[name] {
			t.Errorf("%s: the comment speaks of %v points, there are %d", name, n, count[name])
		}
	}
}
