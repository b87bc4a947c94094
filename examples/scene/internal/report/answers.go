package report

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/examples/scene/internal/solve"
	"example.com/boundpole/field/handover"
	"gonum.org/v1/gonum/spatial/r3"
)

// Answer adds the answer to a request that is not for points.
func (r *Report) Answer(q *scenefile.Request, a *solve.Answer) {
	w := &r.readings
	if q.Kind == "force" || q.Kind == "energy" {
		w = &r.forces
	}
	if w.Len() > 0 {
		fmt.Fprintln(w)
	}
	fmt.Fprintf(w, "  %s\n", asked(q))
	vectors := slices.ContainsFunc(a.Quantities, func(q solve.Quantity) bool { return len(q.Value) == 3 })
	heads := []string{"<", "x", "y", "z", "size", "<", "error at most", "<"}
	if !vectors {
		heads = []string{"<", "value", "<", "error at most", "<"}
	}
	t := newTable(heads...)
	for i := range a.Quantities {
		if v := &a.Quantities[i]; len(v.Value) > 0 { // a name stands in the line above
			row := r.row(v)
			if !vectors {
				row = append(row[:1], row[4:]...)
			}
			t.add(row...)
		}
	}
	t.print(w)
	if a.Status != "" {
		wrapped(w, "", a.Status+".")
	}
	if a.Missed {
		r.miss(titleOf(q) + ".")
	}
}

// asked says what was asked, in words.
func asked(q *scenefile.Request) string {
	what := ""
	switch q.Kind {
	case "force":
		what = "on " + scenefile.OneLine(q.Force.On)
	case "energy":
		what = "of " + scenefile.OneLine(q.Energy[0]) + " and " + scenefile.OneLine(q.Energy[1])
	}
	if q.Name != "" && what != "" {
		return titleOf(q) + " (" + strings.TrimSpace(titleOf(&scenefile.Request{Kind: q.Kind})+" "+what) + ")"
	}
	return strings.TrimSpace(titleOf(q) + " " + what)
}

// row prints a quantity: components, value or size, unit, and the bound on its error.
func (r *Report) row(q *solve.Quantity) []string {
	size := 0.0
	for _, v := range q.Value {
		size = math.Hypot(size, v)
	}
	u := r.unit(q.Ladder, size)
	text := func(v float64) string { return fixed(v/u.factor, size/u.factor) }
	cells := []string{strings.ReplaceAll(q.Name, "_", " "), "", "", "", text(q.Value[0]), u.unit, "", ""}
	if len(q.Value) == 3 {
		cells[1], cells[2], cells[3], cells[4] = text(q.Value[0]), text(q.Value[1]), text(q.Value[2]), text(size)
		if q.Ladder == "L" {
			cells[4] = "" // a place has no size
		}
	}
	if solve.Missing(size) {
		cells[4], cells[5] = "none", ""
		return cells
	}
	if size == 0 {
		cells[5] = ""
	}
	if q.Estimate != nil && !solve.Missing(*q.Estimate) {
		e := r.unit(q.Ladder, *q.Estimate)
		cells[6], cells[7] = solve.Digits(*q.Estimate/e.factor, 2), e.unit
		if *q.Estimate == 0 {
			cells[6], cells[7] = "0", ""
		}
	}
	return cells
}

// unit returns the unit in which a quantity of a ladder is shown; lengths are in that of the scene.
func (r *Report) unit(ladder string, size float64) scale {
	if ladder == "L" {
		return scale{string(r.setup.Scene.Length), r.setup.Unit}
	}
	return pick(ladder, size)
}

// Travel begins the table of a travel and returns what takes the answers of a position and what ends it. A request at points
// shows its first point.
func (r *Report) Travel(q *scenefile.Request) (see func(at *solve.Position, what []solve.Moved), end func()) {
	t := &way{report: r, q: q}
	return t.see, t.end
}

// way is the table of a travel.
type way struct {
	report *Report
	q      *scenefile.Request
	places []float64
	groups []group
}

// group is the columns of one quantity: a number or three components.
type group struct {
	name, ladder string
	rows         [][]float64
}

func (t *way) see(at *solve.Position, what []solve.Moved) {
	k := 0
	put := func(name, ladder string, v ...float64) {
		if len(t.places) == 0 {
			t.groups = append(t.groups, group{name: name, ladder: ladder})
		}
		t.groups[k].rows = append(t.groups[k].rows, v)
		k++
	}
	for i := range what {
		what[i].Columns(at.Setup, put)
	}
	place := at.Degrees
	if t.q.Travel.Rotation == nil {
		place = r3.Norm(at.Shift) / t.report.setup.Unit
	}
	t.places = append(t.places, place)
}

func (t *way) end() {
	w := &t.report.travels
	if w.Len() > 0 {
		fmt.Fprintln(w)
	}
	name := "travel of " + scenefile.OneLine(t.q.Travel.Part)
	if t.q.Name != "" {
		name = titleOf(t.q) + " (" + name + ")"
	}
	fmt.Fprintf(w, "  %s\n", name)
	heads := []string{"way", "<" + string(t.report.setup.Scene.Length)}
	if t.q.Travel.Rotation != nil {
		heads[1] = "<°"
	}
	rows := make([][]string, len(t.places))
	for i, x := range t.places {
		rows[i] = []string{plain(x), ""}
	}
	constant := 0
	for g := range t.groups {
		if t.groups[g].constant() {
			constant++
		}
	}
	if constant == len(t.groups) {
		constant = 0 // there is nothing else to show
	}
	for g := range t.groups {
		if constant > 0 && t.groups[g].constant() {
			continue
		}
		heads = t.groups[g].print(t.report, heads, rows)
	}
	table := newTable(heads...)
	for i, row := range rows {
		switch half := mostRows / 2; {
		case len(rows) <= mostRows || i < half || i >= len(rows)-half:
			table.add(row...)
		case i == half:
			table.add(append([]string{"…"}, make([]string, len(heads)-1)...)...)
		}
	}
	table.print(w)
	if constant > 0 {
		wrapped(w, "", fmt.Sprintf("Quantities that do not change are left out (%d).", constant))
	}
}

// constant reports whether a quantity is the same at all of several positions, to the digits that are printed.
func (g *group) constant() bool {
	for _, row := range g.rows[1:] {
		for k, v := range row {
			if !(math.Abs(v-g.rows[0][k]) <= 1e-6*g.size(len(g.rows))) {
				return false
			}
		}
	}
	return len(g.rows) > 1
}

// size returns the largest size of the first n rows.
func (g *group) size(n int) float64 {
	size := 0.0
	for _, row := range g.rows[:n] {
		sum := 0.0
		for _, v := range row {
			sum = math.Hypot(sum, v)
		}
		if !solve.Missing(sum) {
			size = max(size, sum)
		}
	}
	return size
}

// print adds the columns of a quantity: components in one unit, without those that vanish beside the others everywhere.
func (g *group) print(r *Report, heads []string, rows [][]string) []string {
	size := g.size(len(g.rows))
	u := r.unit(g.ladder, size)
	names := []string{""}
	if len(g.rows[0]) == 3 {
		names = []string{" x", " y", " z"}
	}
	for k, name := range names {
		largest := 0.0
		for _, row := range g.rows {
			largest = math.Max(largest, math.Abs(row[k])) // NaN stays
		}
		if len(names) > 1 && largest < 1e-9*size {
			continue
		}
		heads = append(heads, g.name+name, "<"+u.unit)
		for i, row := range g.rows {
			v := row[k] / u.factor
			rows[i] = append(rows[i], fixed(v, max(math.Abs(v), 1e-6*size/u.factor)), "")
		}
	}
	return heads
}

// HandOver says what is handed over, and how well its points stand for the parts.
func (r *Report) HandOver(q *scenefile.Request, set *handover.Set, written bool) {
	w := &r.readings
	if w.Len() > 0 {
		fmt.Fprintln(w)
	}
	fmt.Fprintf(w, "  %s\n", titleOf(q))
	kind, charge := "electric", "q"
	if set.Kind == handover.Magnetic {
		kind, charge = "magnetic", "g"
	}
	points, largest := 0, 0.0
	for i := range set.Groups {
		points += len(set.Groups[i].Points) + len(set.Groups[i].Dipoles)
	}
	for _, p := range set.Probes {
		largest = max(largest, r3.Norm(p.Field))
	}
	where := "-out DIR writes them to " + q.HandOver
	if written {
		where = q.HandOver
	}
	wrapped(w, "", fmt.Sprintf("%d points with %s charge, sum %s, magnitudes %s: %s.", points, kind, value(charge, set.Total),
		value(charge, set.Magnitudes), where))
	if largest > 0 {
		wrapped(w, "", fmt.Sprintf("At the three probes in the file they miss the field by at most %s of the largest.", solve.Digits(set.Within.Field/largest, 1)))
	}
}
