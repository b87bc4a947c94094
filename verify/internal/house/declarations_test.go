package house_test

import (
	"go/ast"
	"go/importer"
	"go/parser"
	"go/token"
	"go/types"
	"testing"

	"example.com/boundpole/verify/internal/house"
	"github.com/google/go-cmp/cmp"
)

// check type-checks one file as the package "p".
func check(t *testing.T, text string) *types.Package {
	t.Helper()
	fset := token.NewFileSet()
	f, err := parser.ParseFile(fset, "p.go", text, 0)
	if err != nil {
		t.Fatal(err)
	}
	c := types.Config{Importer: importer.ForCompiler(fset, "source", nil), IgnoreFuncBodies: true}
	pkg, err := c.Check("p", fset, []*ast.File{f}, nil)
	if err != nil {
		t.Fatal(err)
	}
	return pkg
}

const source = `package p

import "errors"

var Err = errors.New("p: no")

var hidden = 1

type base struct {
	Shown float64
	not   float64
}

func (*base) Moved() {}

type Box struct {
	base
	Size [3]float64
	f    func()
}

func (b Box) Volume() float64 { return 0 }
func (b *Box) Check() error   { return nil }
func (b *Box) unseen()        {}

type Kind uint8

func (Kind) String() string { return "" }

type Crate struct{ Kind }

const (
	Near Kind = iota
	Far
)

const Half, Whole, Name = 0.5, 2.0, "n"

type Source interface {
	Field(x float64) (g float64)
}

type List = []Box

func Of(b *Box, rest ...Source) (n int, err error) { return 0, nil }
`

const recorded = `package p

type Box struct {
	Shown float64
	Size  [3]float64
	_     [0]func() // not comparable
}

func (*Box) Check() error
func (*Box) Moved()
func (Box) Volume() float64

type Crate struct {
	Kind
}

var Err error

const Far Kind = 1
const Half = 0.5

type Kind uint8

func (Kind) String() string

type List = []Box

const Name = "n"
const Near Kind = 0

func Of(b *Box, rest ...Source) (n int, err error)

type Source interface {
	Field(x float64) (g float64)
}

const Whole = 2.0
`

// TestDeclarations also reads the result back: the declarations of the declarations are the same.
func TestDeclarations(t *testing.T) {
	for _, text := range []string{source, recorded} {
		got, err := house.Declarations(check(t, text))
		if err != nil {
			t.Fatal(err)
		}
		if diff := cmp.Diff(recorded, got); diff != "" {
			t.Errorf("(-want +got)\n%s", diff)
		}
	}
}
