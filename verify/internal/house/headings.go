package house

import (
	"go/ast"
	"go/token"
	"slices"
	"strings"
)

// headings of the doc comment of a physical quantity, in order. Each begins a line and is followed by text; what is
// singular nowhere says "Singular: nowhere".
var headings = []string{"Units:", "Frame:", "Domain:", "Singular:", "Accuracy:", "Source:"}

// Headings looks for the headings in the doc comments that must have them: of field.Moments, of the exported types of
// field/element that have a method Evaluate or Field, and of the exported functions of field/closedform.
func (t *Tree) Headings() []Violation {
	evaluate := t.evaluating()
	var found []Violation
	check := func(pos token.Pos, name string, doc *ast.CommentGroup) {
		if what := missing(doc.Text()); what != "" {
			found = append(found, Violation{t.at(pos), "doc comment of " + name + ": " + what,
				"a physical quantity is documented under " + strings.Join(headings, " ") + " in this order"})
		}
	}
	for _, f := range t.Files {
		if f.Test {
			continue
		}
		for _, d := range f.Syntax.Decls {
			switch d := d.(type) {
			case *ast.FuncDecl:
				if f.Dir == "field/closedform" && d.Recv == nil && d.Name.IsExported() {
					check(d.Pos(), d.Name.Name, d.Doc)
				}
			case *ast.GenDecl:
				for name, s := range typesOf(d) {
					if f.Dir == "field" && name == "Moments" || f.Dir == "field/element" && ast.IsExported(name) &&
						evaluate[f.Dir+"."+name] {
						check(s.Pos(), name, docOf(d, s))
					}
				}
			}
		}
	}
	return found
}

// missing tells the first heading that is absent, out of order, repeated or empty.
func missing(doc string) string {
	if doc == "" {
		return "there is none"
	}
	var got []string
	for line := range strings.Lines(doc) {
		for _, h := range headings {
			if text, ok := strings.CutPrefix(line, h); ok {
				if strings.TrimSpace(text) == "" {
					return "nothing after " + h
				}
				got = append(got, h)
			}
		}
	}
	for _, h := range headings {
		if !slices.Contains(got, h) {
			return "no " + h
		}
	}
	if !slices.Equal(got, headings) {
		return "has " + strings.Join(got, " ")
	}
	return ""
}

// evaluating returns the types, as folder.Name, that have a method Evaluate or Field, their own or of an embedded type
// of the same folder.
func (t *Tree) evaluating() map[string]bool {
	has := map[string]bool{}
	embeds := map[string][]string{}
	for _, f := range t.Files {
		for _, d := range f.Syntax.Decls {
			switch d := d.(type) {
			case *ast.FuncDecl:
				if d.Recv != nil && (d.Name.Name == "Evaluate" || d.Name.Name == "Field") {
					has[f.Dir+"."+baseName(d.Recv.List[0].Type)] = true
				}
			case *ast.GenDecl:
				for name, s := range typesOf(d) {
					st, ok := s.Type.(*ast.StructType)
					if !ok {
						continue
					}
					for _, field := range st.Fields.List {
						if len(field.Names) == 0 {
							embeds[f.Dir+"."+name] = append(embeds[f.Dir+"."+name], f.Dir+"."+baseName(field.Type))
						}
					}
				}
			}
		}
	}
	for range embeds { // each round goes one embedding deeper
		for name, inner := range embeds {
			has[name] = has[name] || slices.ContainsFunc(inner, func(s string) bool { return has[s] })
		}
	}
	return has
}

// baseName returns the name of a type without pointer, package and type arguments.
func baseName(e ast.Expr) string {
	switch e := e.(type) {
	case *ast.Ident:
		return e.Name
	case *ast.StarExpr:
		return baseName(e.X)
	case *ast.IndexExpr:
		return baseName(e.X)
	case *ast.IndexListExpr:
		return baseName(e.X)
	}
	return ""
}

// typesOf ranges over the types declared by d.
func typesOf(d *ast.GenDecl) func(yield func(string, *ast.TypeSpec) bool) {
	return func(yield func(string, *ast.TypeSpec) bool) {
		for _, s := range d.Specs {
			if s, ok := s.(*ast.TypeSpec); ok && !yield(s.Name.Name, s) {
				return
			}
		}
	}
}

func docOf(d *ast.GenDecl, s *ast.TypeSpec) *ast.CommentGroup {
	if s.Doc != nil {
		return s.Doc
	}
	return d.Doc
}
