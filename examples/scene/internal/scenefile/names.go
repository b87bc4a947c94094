package scenefile

import (
	"fmt"
	"io/fs"
	"slices"
	"strconv"
	"strings"
	"unicode"
)

// checkWord holds a text against its type.
func (d *decoder) checkWord(n uint32, t *Type, text string) error {
	problem, remedy := "", ""
	switch t.Base {
	case Choice:
		if !slices.Contains(t.Words, text) {
			problem, remedy = "must be "+oneOf(t.Words), suggest(text, t.Words)
		}
	case Name:
		problem, remedy = nameFault(text)
	case Input:
		problem, remedy = inputFault(text)
	case Output:
		if problem, remedy = outputFault(text); problem == "" {
			problem, remedy = d.claim(n, text)
		}
	}
	if problem == "" {
		return nil
	}
	return d.errorOn(n, fmt.Sprintf("%s %s (got %s)", d.label(n), problem, d.quoted(n)), remedy)
}

// nameFault says what is wrong with a name of a part or a request.
func nameFault(name string) (problem, remedy string) {
	control := func(r rune) bool { return unicode.IsControl(r) || r == '\u2028' || r == '\u2029' }
	switch {
	case strings.TrimSpace(name) == "":
		return "must not be empty", "give a name"
	case strings.IndexFunc(name, control) >= 0:
		return "must not contain control characters or line ends", "write it on one line"
	}
	return "", ""
}

// inputFault says what is wrong with the name of an input file.
func inputFault(name string) (problem, remedy string) {
	const inside = "name a file in the scene's folder or below, as in data/probe.csv"
	switch {
	case name == "":
		return "must not be empty", inside
	case strings.ContainsAny(name, `\`):
		return "must not contain backslashes", `separate folders by "/"`
	case strings.HasPrefix(name, "/") || len(name) > 1 && name[1] == ':':
		return "must not be an absolute path", inside
	case slices.Contains(strings.Split(name, "/"), ".."):
		return "must not leave the scene's folder", inside
	case !fs.ValidPath(name) || name == "." || strings.ContainsRune(name, 0):
		return "is not a plain relative path", inside
	}
	return "", ""
}

// outputFault says what is wrong with the name of an output file. What some
// operating system refuses is refused on all.
func outputFault(name string) (problem, remedy string) {
	const plain = "give a plain name such as values.csv"
	odd := func(r rune) bool { return r < 0x20 || 0x7f <= r && r < 0xa0 || strings.ContainsRune(`<>:"|?*`, r) }
	stem, _, _ := strings.Cut(name, ".")
	switch {
	case name == "":
		return "must not be empty", plain
	case strings.ContainsAny(name, `/\`):
		return "must not contain / or \\", plain + "; the folder is chosen with -out"
	case strings.HasPrefix(name, "."):
		return "must not start with a dot", plain
	case strings.HasSuffix(name, ".") || strings.HasSuffix(name, " ") || strings.HasPrefix(name, " "):
		return "must not start with a space or end with a space or a dot", plain
	case strings.IndexFunc(name, odd) >= 0:
		return `must not contain control characters or any of < > : " | ? *`, plain
	case len(name) > 200:
		return "must not be longer than 200 bytes", plain
	case reserved(strings.TrimRight(stem, " ")):
		return "is a device name on Windows", plain
	case fold(name) == "results.json":
		return "is taken by the results themselves", plain
	}
	return "", ""
}

// reserved reports whether a name, without extension, is a device on Windows.
func reserved(stem string) bool {
	stem = strings.ToUpper(stem)
	switch stem {
	case "CON", "PRN", "AUX", "NUL", "CONIN$", "CONOUT$":
		return true
	}
	number, ok := strings.CutPrefix(stem, "COM")
	if !ok {
		if number, ok = strings.CutPrefix(stem, "LPT"); !ok {
			return false
		}
	}
	return slices.Contains([]string{"0", "1", "2", "3", "4", "5", "6", "7", "8", "9", "¹", "²", "³"}, number)
}

// fold returns a name as file systems without upper and lower case see it.
func fold(name string) string { return strings.ToLower(strings.ToUpper(name)) }

// claim records an output name, or says that it is taken.
func (d *decoder) claim(n uint32, name string) (problem, remedy string) {
	if at, ok := d.outputs[fold(name)]; ok {
		return "is already the name of the output at " + at, "output names are unique; upper and lower case count as the same"
	}
	d.outputs[fold(name)] = d.pointer(n)
	return "", ""
}

// claimNames records the names of a part and its copies; n is the part.
func (d *decoder) claimNames(n uint32, i int) error {
	p := &d.scene.Parts[i]
	at, _ := d.member(n, "name")
	if p.Copies != nil && p.Copies.Count > MaxBodies-len(d.bodies) || len(d.bodies) == MaxBodies {
		return d.errorOn(n, "more than "+strconv.Itoa(MaxBodies)+" bodies, copies counted", "place fewer")
	}
	for _, name := range p.Names() {
		if j, ok := d.bodies[name]; ok {
			return d.errorOn(at, fmt.Sprintf("name %q is already that of a body of /parts/%d", shorten(name), j), `names are unique; copies are called "name 1", "name 2", …`)
		}
		d.bodies[name] = i
	}
	return nil
}
