package house

import (
	"go/ast"
	"go/token"
	"slices"
)

// Quiet finds calls by which a library would print, and panics whose text is not constant.
func (t *Tree) Quiet() []Violation {
	var found []Violation
	constants := t.constants()
	for _, f := range t.Files {
		if f.Test || f.program() {
			continue
		}
		ast.Inspect(f.Syntax, func(n ast.Node) bool {
			call, ok := n.(*ast.CallExpr)
			if !ok {
				return true
			}
			if what, rule := loud(call, constants[f.Dir]); what != "" {
				found = append(found, Violation{t.at(call.Pos()), what, rule})
			}
			return true
		})
	}
	return found
}

// loud returns what is wrong with a call, and the rule.
func loud(call *ast.CallExpr, constants map[string]bool) (what, rule string) {
	switch fun := call.Fun.(type) {
	case *ast.Ident:
		switch {
		case fun.Name == "print" || fun.Name == "println":
			return "calls " + fun.Name, "libraries print nothing"
		case fun.Name == "panic" && len(call.Args) == 1 && !constantText(call.Args[0], constants):
			return "panics with a text that is not constant",
				"panic only for mistakes of the programmer, with constant text; return an error for bad data"
		}
	case *ast.SelectorExpr:
		pkg, ok := fun.X.(*ast.Ident)
		if ok && pkg.Name == "fmt" && slices.Contains([]string{"Print", "Printf", "Println"}, fun.Sel.Name) {
			return "calls fmt." + fun.Sel.Name, "libraries print nothing; write to an io.Writer given by the caller"
		}
	}
	return "", ""
}

// constantText reports whether an expression is a literal, a constant of the package, or a sum of such.
func constantText(e ast.Expr, constants map[string]bool) bool {
	switch e := e.(type) {
	case *ast.BasicLit:
		return true
	case *ast.Ident:
		return constants[e.Name]
	case *ast.BinaryExpr:
		return constantText(e.X, constants) && constantText(e.Y, constants)
	case *ast.ParenExpr:
		return constantText(e.X, constants)
	}
	return false
}

// constants returns the names of the package-level constants of each folder.
func (t *Tree) constants() map[string]map[string]bool {
	all := map[string]map[string]bool{}
	for _, f := range t.Files {
		if all[f.Dir] == nil {
			all[f.Dir] = map[string]bool{}
		}
		for _, d := range f.Syntax.Decls {
			d, ok := d.(*ast.GenDecl)
			if !ok || d.Tok != token.CONST {
				continue
			}
			for _, s := range d.Specs {
				for _, name := range s.(*ast.ValueSpec).Names {
					all[f.Dir][name.Name] = true
				}
			}
		}
	}
	return all
}
