// Package house holds the rules of this repository that a program can check: who may import whom, that libraries
// neither print nor exit, the headings of doc comments, references, and the record of the exported API.
//
// A Tree is the parsed source of a module; each check returns the violations it found, in the order of the files.
// Nothing is type-checked here except what Declarations is given, nothing is built, and the file system is only read.
// The package knows the names of this module's rooms; it is of no use to another module.
package house

import (
	"fmt"
	"go/ast"
	"go/parser"
	"go/token"
	"io/fs"
	"path"
	"strings"
)

// Tree is the source of a module.
type Tree struct {
	Module string // module path, from go.mod
	Files  []*File
	fset   *token.FileSet
}

// File is one Go file of a Tree.
type File struct {
	Path   string // slash-separated, relative to the root of the module
	Dir    string // folder of Path; "." for the root
	Test   bool   // name ends in _test.go
	Syntax *ast.File
}

// Violation is one breach of a rule.
type Violation struct {
	At   string // file:line, or folder
	What string // the offending thing
	Rule string // the rule broken, and the remedy where it is not obvious
}

// String returns one line.
func (v Violation) String() string { return v.At + ": " + v.What + "; rule: " + v.Rule }

// Read parses all Go files below the root of a module, with comments. Folders named testdata or beginning with a dot or
// an underscore are left out, as the go command does.
func Read(root fs.FS) (*Tree, error) {
	mod, err := fs.ReadFile(root, "go.mod")
	if err != nil {
		return nil, fmt.Errorf("house: %w; give the root of a module", err)
	}
	t := &Tree{fset: token.NewFileSet()}
	for line := range strings.Lines(string(mod)) {
		if name, ok := strings.CutPrefix(line, "module "); ok {
			t.Module = strings.TrimSpace(name)
		}
	}
	err = fs.WalkDir(root, ".", func(name string, d fs.DirEntry, err error) error {
		if err != nil {
			return err
		}
		base := path.Base(name)
		hidden := name != "." && (base[0] == '.' || base[0] == '_' || base == "testdata")
		switch {
		case d.IsDir() && hidden:
			return fs.SkipDir
		case d.IsDir() || hidden || path.Ext(base) != ".go":
			return nil
		}
		return t.add(root, name)
	})
	return t, err
}

func (t *Tree) add(root fs.FS, name string) error {
	text, err := fs.ReadFile(root, name)
	if err != nil {
		return fmt.Errorf("house: %w", err)
	}
	syntax, err := parser.ParseFile(t.fset, name, text, parser.ParseComments|parser.SkipObjectResolution)
	if err != nil {
		return fmt.Errorf("house: %w", err)
	}
	t.Files = append(t.Files, &File{
		Path:   name,
		Dir:    path.Dir(name),
		Test:   strings.HasSuffix(name, "_test.go"),
		Syntax: syntax,
	})
	return nil
}

// program reports whether a file may print and exit: a main package, the two programs of verify and the examples.
func (f *File) program() bool {
	return f.Syntax.Name.Name == "main" || within("verify/report/...", f.Dir) || within("verify/speed/...", f.Dir) ||
		within("examples/...", f.Dir)
}

// within reports whether a folder matches a pattern: the folder itself, or with a final /... also all below it.
func within(pattern, dir string) bool {
	stem, below := strings.CutSuffix(pattern, "/...")
	return dir == stem || below && strings.HasPrefix(dir, stem+"/")
}

// anyWithin reports whether a folder matches one of the patterns of a space-separated list.
func anyWithin(patterns, dir string) bool {
	for _, p := range strings.Fields(patterns) {
		if within(p, dir) {
			return true
		}
	}
	return false
}

// at returns file:line of a position.
func (t *Tree) at(pos token.Pos) string {
	p := t.fset.Position(pos)
	return fmt.Sprintf("%s:%d", p.Filename, p.Line)
}
