package house

import (
	"fmt"
	"go/ast"
	"regexp"
	"strings"
)

var (
	// key is the shape of a reference: surname and year, or the digital library.
	key = regexp.MustCompile(`\[((?:[A-Z][A-Za-z]+(?:1[6-9]|20)\d\d[a-z]?)|DLMF)\]`)
	// year is the year of a publication.
	year = regexp.MustCompile(`\b(?:1[6-9]|20)\d\d\b`)
	// entry is a line of the list: key, authors, title where known, place, year, DOI.
	entry = regexp.MustCompile(`^- \[(\w+)\] (.+)$`)
	// listed is a key where a package comment repeats its entry.
	listed = regexp.MustCompile(`(?m)^[ \t]*- \[\w+\]`)
)

// References holds the keys used in comments, and in strings of code, against the list, a text with one entry a line
// that begins "- [". Other lines of the list are free. Each key has an entry, each entry is cited (a list in a package
// comment does not cite), entries are sorted and bear the year of their key, and what a Source names by year has a key.
func (t *Tree) References(name, list string) []Violation {
	entries, found := readEntries(name, list)
	cited := map[string]bool{}
	for _, f := range t.Files {
		for _, text := range t.texts(f) {
			for _, m := range key.FindAllStringSubmatch(text.s, -1) {
				if entries[m[1]] == "" {
					found = append(found, Violation{text.at, "reference " + m[0], "every key has an entry in " + name})
				}
			}
			for _, m := range key.FindAllStringSubmatch(listed.ReplaceAllString(text.s, ""), -1) {
				cited[m[1]] = true
			}
			if y := bareYear(text.s); y != "" && !f.Test {
				found = append(found, Violation{text.at, "Source names a publication of " + y,
					"publications are cited by a key of " + name})
			}
		}
	}
	for _, line := range strings.Split(list, "\n") {
		if m := entry.FindStringSubmatch(line); m != nil && !cited[m[1]] {
			found = append(found, Violation{name, "entry " + m[1], "every entry is cited in the code; remove it"})
		}
	}
	return found
}

// readEntries returns the line of each key.
func readEntries(name, list string) (map[string]string, []Violation) {
	entries := map[string]string{}
	var found []Violation
	last := ""
	for i, line := range strings.Split(list, "\n") {
		if !strings.HasPrefix(line, "- ") {
			continue
		}
		at := fmt.Sprintf("%s:%d", name, i+1)
		m := entry.FindStringSubmatch(line)
		if m == nil {
			found = append(found, Violation{at, "entry " + line, "an entry is - [Key] authors, title, place (year), DOI"})
			continue
		}
		k := m[1]
		switch {
		case entries[k] != "":
			found = append(found, Violation{at, "entry " + k, "every key is listed once"})
		case k < last:
			found = append(found, Violation{at, "entry " + k + " after " + last, "entries are sorted by key"})
		}
		if y := strings.TrimLeft(k, letters); y != "" && !strings.Contains(m[2], strings.TrimRight(y, letters)) {
			found = append(found, Violation{at, "entry " + k, "an entry bears the year of its key"})
		}
		entries[k], last = line, k
	}
	return entries, found
}

const letters = "ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz"

// bareYear returns a year in a Source paragraph that is not part of a key or of an address.
func bareYear(text string) string {
	_, source, ok := strings.Cut("\n"+text, "\nSource:")
	if !ok {
		return ""
	}
	source, _, _ = strings.Cut(source, "\n\n")
	return year.FindString(key.ReplaceAllString(source, ""))
}

// located is a text and where it stands.
type located struct{ at, s string }

// texts returns the comments of a file, and its strings if it is no test.
func (t *Tree) texts(f *File) []located {
	var all []located
	for _, c := range f.Syntax.Comments {
		all = append(all, located{t.at(c.Pos()), c.Text()})
	}
	if f.Test {
		return all
	}
	ast.Inspect(f.Syntax, func(n ast.Node) bool {
		if lit, ok := n.(*ast.BasicLit); ok {
			all = append(all, located{t.at(lit.Pos()), lit.Value})
		}
		return true
	})
	return all
}
