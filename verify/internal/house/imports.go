package house

import (
	"cmp"
	"strconv"
	"strings"
)

// stages is the order of the rooms. A package may import the rooms of the stages above its own, none of its own stage
// (but the packages of one /... room know each other) and none below.
var stages = []string{
	"geom/pair",
	"geom/gauss",
	"geom",
	"geom/panel",
	"field/internal/...",
	"field",
	"field/element",
	"field/cubature",
	"field/bound",
	"field/current field/image field/flux field/handover",
	"geom/meshfile field/multipole field/force field/response field/inverse field/fieldfile field/plot",
	"charge magnet",
	"verify/... examples/...",
}

// apart lists the rooms for which the order is not the whole rule. They come before stages.
var apart = []struct {
	room    string
	may     string // all of this module that the room may import; empty: nothing
	foreign string // all foreign packages that the room may import; empty: those of every room
	users   string // who may import the room; empty: by the order
}{
	{room: "field/codata", users: "charge magnet magnet/grade field/handover verify/... examples/..."},
	{room: "field/closedform", foreign: "gonum.org/v1/gonum/spatial/r3 gonum.org/v1/gonum/mathext",
		users: "verify/... examples/..."},
	{room: "magnet/cgs", users: "magnet verify/... examples/..."},
	{room: "magnet/grade", may: "field/codata", users: "magnet verify/... examples/..."},
	{room: "geom/meshfile", may: "geom/pair geom"},
	{room: "verify/law", may: "geom/pair geom/gauss geom field", users: "verify/... examples/..."},
	{room: "verify/refcase", may: "geom/pair geom"},
}

const (
	// foreignAny lists what every room may import from other modules, foreignTests what tests may import besides.
	foreignAny   = "gonum.org/v1/gonum/... golang.org/x/exp/..."
	foreignTests = "github.com/google/go-cmp/... golang.org/x/tools/..."

	// programsOnly lists what of the standard library only programs and tests may import.
	programsOnly = "os/... log/... flag/... testing/..."
)

// Imports holds the imports of all files against the policy. Which room imports which is not asked of tests.
func (t *Tree) Imports() []Violation {
	var found []Violation
	for _, f := range t.Files {
		for _, spec := range f.Syntax.Imports {
			name, err := strconv.Unquote(spec.Path.Value)
			if err != nil {
				continue // the parser has accepted it: cannot be
			}
			if rule := t.breach(f, name); rule != "" {
				found = append(found, Violation{t.at(spec.Pos()), "imports " + name, rule})
			}
		}
	}
	return found
}

// breach returns the rule that an import breaks, or nothing.
func (t *Tree) breach(f *File, name string) string {
	first, _, _ := strings.Cut(name, "/")
	room, ours := strings.CutPrefix(name, t.Module+"/")
	switch {
	case ours && f.Test:
		return ""
	case ours:
		return between(f.Dir, room)
	case strings.Contains(first, "."):
		return foreign(f, name)
	case !f.Test && !f.program() && anyWithin(programsOnly, name):
		return "libraries neither print, log, exit nor read files by name: only programs and tests may import " + name
	}
	return ""
}

// foreign returns the rule that the import of another module breaks.
func foreign(f *File, name string) string {
	if f.Test && anyWithin(foreignTests, name) {
		return ""
	}
	for _, a := range apart {
		if !f.Test && within(a.room, f.Dir) && a.foreign != "" && !anyWithin(a.foreign, name) {
			return a.room + " imports of other modules only " + a.foreign
		}
	}
	if !anyWithin(foreignAny, name) {
		return "other modules: only " + foreignAny + ", in tests also " + foreignTests
	}
	return ""
}

// between returns the rule that the import of one folder by another breaks.
func between(from, to string) string {
	for _, a := range apart {
		if within(a.room, to) && a.users != "" && !anyWithin(a.users, from) {
			return a.room + " is imported only by " + a.users
		}
	}
	for _, a := range apart {
		if within(a.room, from) {
			if !anyWithin(a.may, to) {
				return a.room + " imports of this module only " + cmp.Or(a.may, "(nothing)")
			}
			return ""
		}
	}
	own, room := stageOf(from)
	other, _ := stageOf(to)
	switch {
	case own < 0:
		return "every package stands in the table of rooms; add " + from + " to verify/internal/house/imports.go"
	case within(room, to), isApart(to):
		return ""
	case other < 0:
		return "every package stands in the table of rooms; add " + to + " to verify/internal/house/imports.go"
	case other == own:
		return "rooms of one stage do not know each other: " + strings.ReplaceAll(stages[own], " ", ", ")
	case other > own:
		return "a room imports only what stands above it: " + to + " is below " + from
	}
	return ""
}

// stageOf returns the index of the stage of a folder and the room in it, or -1.
func stageOf(dir string) (int, string) {
	for i, s := range stages {
		for _, room := range strings.Fields(s) {
			if within(room, dir) {
				return i, room
			}
		}
	}
	return -1, ""
}

// isApart reports whether a folder has users of its own, by which it has been judged already.
func isApart(dir string) bool {
	for _, a := range apart {
		if a.users != "" && within(a.room, dir) {
			return true
		}
	}
	return false
}

// Rooms returns a violation for each folder with library code that has no room in the policy.
func (t *Tree) Rooms() []Violation {
	var found []Violation
	seen := map[string]bool{}
	for _, f := range t.Files {
		stage, _ := stageOf(f.Dir)
		if seen[f.Dir] || f.Test || stage >= 0 || isApart(f.Dir) {
			continue
		}
		seen[f.Dir] = true
		found = append(found, Violation{f.Dir, "package has no room",
			"every package stands in the table of rooms; add it to verify/internal/house/imports.go"})
	}
	return found
}
