package house

import (
	"go/ast"
	"regexp"
)

// PackageComments finds packages without a package comment, or with more than one.
func (t *Tree) PackageComments() []Violation {
	count := map[string]int{}
	var dirs []string
	for _, f := range t.Files {
		if f.Test {
			continue
		}
		if _, seen := count[f.Dir]; !seen {
			dirs = append(dirs, f.Dir)
			count[f.Dir] = 0
		}
		if f.Syntax.Doc.Text() != "" {
			count[f.Dir]++
		}
	}
	var found []Violation
	for _, dir := range dirs {
		switch n := count[dir]; {
		case n == 0:
			found = append(found, Violation{dir, "no package comment", "every package has one"})
		case n > 1:
			found = append(found, Violation{dir, "package comments in several files", "every package has one"})
		}
	}
	return found
}

// testName has the shape of a test quoted as the proof of a claim.
var testName = regexp.MustCompile(`\b(?:Test|Fuzz|Benchmark)[A-Z]\w*`)

// Claims finds names of tests quoted in comments of code that are no tests of the same folder or of verify.
func (t *Tree) Claims() []Violation {
	tests := map[string]bool{}
	for _, f := range t.Files {
		for _, d := range f.Syntax.Decls {
			if d, ok := d.(*ast.FuncDecl); ok && f.Test {
				tests[f.Dir+"."+d.Name.Name] = true
				if within("verify/...", f.Dir) {
					tests[d.Name.Name] = true
				}
			}
		}
	}
	var found []Violation
	for _, f := range t.Files {
		if f.Test {
			continue
		}
		for _, c := range f.Syntax.Comments {
			for _, name := range testName.FindAllString(c.Text(), -1) {
				if !tests[name] && !tests[f.Dir+"."+name] {
					found = append(found, Violation{t.at(c.Pos()), "quotes " + name,
						"a test quoted for a claim exists in the same folder or in verify"})
				}
			}
		}
	}
	return found
}
