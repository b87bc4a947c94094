package handover

import (
	"bytes"
	"fmt"
	"io"
	"math"
	"slices"
	"strconv"
	"strings"

	"example.com/boundpole/field/element"
	"gonum.org/v1/gonum/spatial/r3"
)

// ReadCSV reads the points of a set that WriteCSV, or anybody by the documentation of the package, has written, and checks them.
// Lines may also end in CR LF.
func ReadCSV(r io.Reader) (*Set, error) {
	data, err := slurp(r)
	if err != nil {
		return nil, err
	}
	t := &table{rest: data, seen: map[string]int{}, groups: map[[2]string]*tableGroup{}}
	if err := t.readHead(); err != nil {
		return nil, err
	}
	if err := t.readRows(); err != nil {
		return nil, err
	}
	if err := t.complete(); err != nil {
		return nil, err
	}
	if err := t.set.Check(); err != nil {
		return nil, err
	}
	return &t.set, nil
}

// table is a CSV file while it is read.
type table struct {
	rest    []byte
	line    int // number of the line read last
	set     Set
	units   units
	keys    csvKeys
	seen    map[string]int // keys of the metadata, and how often
	groups  map[[2]string]*tableGroup
	order   []*tableGroup
	dipoles bool
}

// tableGroup is a group and how many rows its line of metadata announces.
type tableGroup struct {
	group           Group
	points, dipoles int
}

// fail returns an error at the line read last.
func (t *table) fail(format string, a ...any) error {
	return fmt.Errorf("handover: line %d: %s", t.line, fmt.Sprintf(format, a...))
}

// next returns the next line; false at the end.
func (t *table) next() (string, bool) {
	if len(t.rest) == 0 {
		return "", false
	}
	line, rest, _ := bytes.Cut(t.rest, []byte{'\n'})
	t.rest = rest
	t.line++
	return string(bytes.TrimSuffix(line, []byte{'\r'})), true
}

// readHead reads the metadata and the header.
func (t *table) readHead() error {
	for {
		line, ok := t.next()
		if !ok {
			return t.fail("the file ends before the header of the columns; it is cut off")
		}
		body, meta := strings.CutPrefix(line, "# ")
		if !meta {
			return t.readColumns(line)
		}
		key, value, _ := strings.Cut(body, ",")
		if err := t.readMeta(key, value); err != nil {
			return err
		}
	}
}

// first are the keys with which a file begins, in this order: they say how the rest is to be read.
var first = []string{"format", "kind", "convention", "units"}

// readMeta reads a line of metadata.
func (t *table) readMeta(key, value string) error {
	if n := len(t.seen); n < len(first) && key != first[n] {
		return t.fail("metadata begin with %q; want %q: the lines format, kind, convention and units come first", key, first[n])
	}
	t.seen[key]++
	if t.seen[key] > 1 && key != t.keys.group && !(key == t.keys.probe && t.seen[key] <= len(t.set.Probes)) {
		return t.fail("%q stands too often; keep one", key)
	}
	s, k := &t.set, t.keys
	switch key {
	case "format":
		if want := Format + "," + strconv.Itoa(version); value != want {
			return t.fail("format %q; want %q", value, want)
		}
	case "kind":
		kind, err := kindOf(value)
		if err != nil {
			return t.fail("kind %q; want electric or magnetic", value)
		}
		s.Kind, t.units, t.keys = kind, kind.units(), kind.units().csvKeys()
	case "convention":
		if value != t.units.convention {
			return conventionError(value, t.units)
		}
	case "units":
		if value != t.units.csvUnits() {
			return t.fail("units %q; want %q: convert the numbers and the words", value, t.units.csvUnits())
		}
	case k.constant:
		return t.numbers(value, &s.Constant)
	case k.about:
		return t.numbers(value, &s.About.X, &s.About.Y, &s.About.Z)
	case k.total:
		return t.numbers(value, &s.Total)
	case k.magnitudes:
		return t.numbers(value, &s.Magnitudes)
	case k.moment:
		return t.numbers(value, &s.Moment.X, &s.Moment.Y, &s.Moment.Z)
	case k.withinMoment:
		return t.numbers(value, &s.Within.Moment)
	case k.withinPotential:
		return t.numbers(value, &s.Within.Potential)
	case k.withinField:
		return t.numbers(value, &s.Within.Field)
	case k.probe:
		p := &s.Probes[t.seen[key]-1]
		return t.numbers(value, &p.At.X, &p.At.Y, &p.At.Z, &p.Potential, &p.Field.X, &p.Field.Y, &p.Field.Z)
	case k.group:
		return t.readGroup(value)
	default:
		return t.fail("metadata %q are not known; want %s", key, strings.Join(k.list(), ", "))
	}
	return nil
}

// list returns all keys.
func (k csvKeys) list() []string {
	return []string{k.format, k.kind, k.convention, k.units, k.constant, k.about, k.total, k.magnitudes, k.moment, k.withinMoment,
		k.withinPotential, k.withinField, k.probe, k.group}
}

// readGroup reads the line that announces a group.
func (t *table) readGroup(value string) error {
	f := strings.Split(value, ",")
	if len(f) != 6 {
		return t.fail("a group has %d values; want part,place,form,points,dipoles,charge", len(f))
	}
	g := &tableGroup{group: Group{Part: f[0], Place: f[1], Form: Form(f[2])}}
	for i, dst := range []*int{&g.points, &g.dipoles} {
		n, err := strconv.Atoi(f[3+i])
		if err != nil || n < 0 || n > mostRows {
			return t.fail("a group of %q rows; want a number from 0 to %d", f[3+i], mostRows)
		}
		*dst = n
	}
	if err := t.numbers(f[5], &g.group.Charge); err != nil {
		return err
	}
	key := [2]string{f[0], f[1]}
	if t.groups[key] != nil {
		return t.fail("the group %q of part %q stands twice; keep one", f[1], f[0])
	}
	if len(t.order) == mostRows {
		return t.fail("more than %d groups; hand over part by part", mostRows)
	}
	t.groups[key] = g
	t.order = append(t.order, g)
	return nil
}

// readColumns reads the header and demands that the metadata before it were complete.
func (t *table) readColumns(line string) error {
	for _, k := range first {
		if t.seen[k] == 0 {
			return t.fail("metadata %q are missing; want a line \"# %s,...\" before the header", k, k)
		}
	}
	for _, k := range t.keys.list() {
		if t.seen[k] == 0 || k == t.keys.probe && t.seen[k] != len(t.set.Probes) {
			return t.fail("metadata %q are missing or too few before the header", k)
		}
	}
	if err := t.checkLocale(line); err != nil {
		return err
	}
	got := strings.Split(line, ",")
	for _, dipoles := range []bool{false, true} {
		want := t.units.columns(dipoles)
		if slices.Equal(got, want) {
			t.dipoles = dipoles
			return nil
		}
		for i := range min(len(got), len(want)) {
			if name, _, _ := strings.Cut(want[i], "["); got[i] != want[i] && strings.HasPrefix(got[i], name+"[") {
				return t.fail("column %q; want %q: convert the numbers and the unit", got[i], want[i])
			}
		}
	}
	return t.fail("columns %q; want %q", line, strings.Join(t.units.columns(false), ","))
}

// checkLocale refuses columns between semicolons and tabs, as programs write them where the comma is the decimal sign.
func (t *table) checkLocale(line string) error {
	for _, mark := range []string{";", "\t"} {
		if strings.Contains(line, mark) {
			return t.fail("columns are separated by %q, so decimals may have commas: the file was saved for another locale; save it with decimal points and commas between columns", mark)
		}
	}
	return nil
}

// readRows reads the points.
func (t *table) readRows() error {
	want := len(t.units.columns(t.dipoles))
	for rows := 0; ; rows++ {
		line, ok := t.next()
		if !ok {
			return nil
		}
		if rows == mostRows {
			return t.fail("more than %d rows; hand over fewer points, or part by part", mostRows)
		}
		if err := t.checkLocale(line); err != nil {
			return err
		}
		f := strings.Split(line, ",")
		switch {
		case len(f) > want:
			return t.fail("%d columns; want %d: do the decimals have commas? save the file with decimal points", len(f), want)
		case len(f) < want:
			return t.fail("%d columns; want %d: the row is cut off or empty", len(f), want)
		}
		if err := t.readRow(f); err != nil {
			return err
		}
	}
}

// readRow reads one row of the right length.
func (t *table) readRow(f []string) error {
	n := len(f) - 2
	g := t.groups[[2]string{f[n], f[n+1]}]
	if g == nil {
		return t.fail("face %q of part %q has no line \"# group\" before the header", f[n+1], f[n])
	}
	var at, p r3.Vec
	var q float64
	dst := []*float64{&at.X, &at.Y, &at.Z, &q}
	if t.dipoles {
		dst = append(dst, &p.X, &p.Y, &p.Z)
	}
	for i, d := range dst {
		if err := t.number(f[i], d); err != nil {
			return err
		}
	}
	switch {
	case p == (r3.Vec{}):
		g.group.Points = append(g.group.Points, element.Point{At: at, Charge: q})
	case q == 0:
		g.group.Dipoles = append(g.group.Dipoles, element.Dipole{At: at, Moment: p})
	default:
		return t.fail("a charge and a moment in one row; give each a row of its own")
	}
	return nil
}

// numbers reads as many numbers as there are places for.
func (t *table) numbers(value string, dst ...*float64) error {
	f := strings.Split(value, ",")
	if len(f) != len(dst) {
		return t.fail("%d values; want %d, with decimal points and commas between them", len(f), len(dst))
	}
	for i, d := range dst {
		if err := t.number(f[i], d); err != nil {
			return err
		}
	}
	return nil
}

// number reads a finite decimal number.
func (t *table) number(word string, dst *float64) error {
	x, err := strconv.ParseFloat(word, 64)
	plain := strings.IndexFunc(word, func(r rune) bool { return !strings.ContainsRune("0123456789+-.eE", r) }) < 0
	if err != nil || !plain || math.IsInf(x, 0) {
		return t.fail("%q is no finite decimal number", word)
	}
	*dst = x
	return nil
}

// complete compares the rows with what the groups announce.
func (t *table) complete() error {
	for _, g := range t.order {
		if len(g.group.Points) != g.points || len(g.group.Dipoles) != g.dipoles {
			return fmt.Errorf("handover: %s %q of part %q has %d points and %d dipoles, and %d and %d are announced; rows are lost or repeated",
				g.group.Form, g.group.Place, g.group.Part, len(g.group.Points), len(g.group.Dipoles), g.points, g.dipoles)
		}
		t.set.Groups = append(t.set.Groups, g.group)
	}
	return nil
}
