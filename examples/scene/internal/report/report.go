// Package report writes what a scene gave for people, in the units of the trade and with the digits that inputs deserve.
package report

import (
	"bytes"
	"fmt"
	"io"
	"math"
	"strings"

	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/examples/scene/internal/solve"
	"example.com/boundpole/field"
	"example.com/boundpole/magnet"
	"gonum.org/v1/gonum/spatial/r3"
)

// mostRows is how many points of a request are printed; of more, the extremes are.
const mostRows = 60

// Report gathers the sections while the answers come in, and prints them in the reader's order.
type Report struct {
	setup   *solve.Setup
	charges bytes.Buffer
	sums    bytes.Buffer
	fields  bytes.Buffer
	checks  []solve.Check
	names   []string // of the requests of the checks
	skipped []string
}

// New returns an empty report.
func New(setup *solve.Setup) *Report { return &Report{setup: setup} }

// Charges adds what the parts carry.
func (r *Report) Charges(all []solve.PartCharge) {
	r.charges.Reset()
	r.sums.Reset()
	unit := string(r.setup.Scene.Length)
	faces := newTable("<part", "<face", "area or volume", "density", "charge", "")
	sums := newTable("<part", "sum of all charges", "of magnitudes", "moment x", "y", "z", "<")
	for i := range all {
		c := &all[i]
		p := &r.setup.Parts[c.Part]
		dense, inner, q, moment := "P", "dP", "q", "p"
		if p.Kind == solve.Magnetized {
			dense, inner, q, moment = "M", "dM", "g", "m"
		}
		for _, f := range c.Faces {
			note := ""
			if p.Kind == solve.Magnetized && f.Charge != 0 {
				note = fmt.Sprintf("= %s µWb", fixed(magnet.PoleFlux(f.Charge)*1e6, math.Abs(magnet.PoleFlux(f.Charge)*1e6)))
			}
			faces.add(p.Name, f.Face, area(f.Area, unit), span(dense, f.Min, f.Max), value(q, f.Charge), note)
		}
		if c.Solid {
			faces.add(p.Name, "(inside)", volume(c.Volume, unit), span(inner, c.Min, c.Max), value(q, c.Inside), "")
		}
		x, y, z, _, u := vector(moment, c.Moment)
		sums.add(p.Name, value(q, c.Total), value(q, c.Scale), x, y, z, u)
	}
	faces.print(&r.charges)
	sums.print(&r.sums)
	r.identities(all)
}

// identities says how well the laws of bound charge hold.
func (r *Report) identities(all []solve.PartCharge) {
	worst, which, law := 0.0, "", ""
	for i := range all {
		for _, id := range all[i].Checked {
			if id.Scale > 0 && id.Miss/id.Scale >= worst {
				worst, which, law = id.Miss/id.Scale, r.setup.Parts[all[i].Part].Name, id.Law
			}
		}
	}
	if which == "" {
		return
	}
	if worst == 0 {
		wrapped(&r.sums, "", "Total charge, dipole moment against ∫p dV and second moment: all agree to rounding.")
		return
	}
	wrapped(&r.sums, "", fmt.Sprintf("Total charge, dipole moment against ∫p dV and second moment: the worst miss is %.1e of what cancels "+
		"(%s: %s).", worst, which, law))
}

// area prints an area in the square of the file's unit.
func area(m2 float64, unit string) string {
	l := scenefile.Unit(unit).Metres()
	return fixed(m2/(l*l), m2/(l*l)) + " " + unit + "²"
}

func volume(m3 float64, unit string) string {
	l := scenefile.Unit(unit).Metres()
	return fixed(m3/(l*l*l), m3/(l*l*l)) + " " + unit + "³"
}

// span prints the range of a density.
func span(quantity string, lo, hi float64) string {
	size := max(math.Abs(lo), math.Abs(hi))
	if size == 0 {
		return "0"
	}
	s := pick(quantity, size)
	if lo == hi || math.Abs(hi-lo) <= 1e-12*size {
		return fixed(hi/s.factor, size/s.factor) + " " + s.unit
	}
	return fixed(lo/s.factor, size/s.factor) + " … " + fixed(hi/s.factor, size/s.factor) + " " + s.unit
}

// Points begins the part of a point request and returns what takes its records and what ends it.
func (r *Report) Points(q *scenefile.Request) (see func(i int, rec *solve.Record), end func()) {
	n := q.Count()
	l := &listing{report: r, q: q, n: n}
	return l.see, l.end
}

// listing prints the records of one request.
type listing struct {
	report  *Report
	q       *scenefile.Request
	n       int
	records []solve.Record
	extreme [2]struct{ low, high solve.Record }
	seen    [2]bool
	none    int
}

func (l *listing) see(_ int, rec *solve.Record) {
	if l.n <= mostRows {
		l.records = append(l.records, *rec)
		return
	}
	if rec.Status >= field.OnEdge {
		l.none++
		return
	}
	for k, size := range [2]func(*solve.Record) float64{sizeE, sizeB} {
		e := &l.extreme[k]
		if !l.seen[k] || size(rec) < size(&e.low) {
			e.low = *rec
		}
		if !l.seen[k] || size(rec) > size(&e.high) {
			e.high = *rec
		}
		l.seen[k] = true
	}
}

func sizeE(r *solve.Record) float64 { return r3.Norm(r.Electric.E) }
func sizeB(r *solve.Record) float64 { return r3.Norm(r.Magnetic.B) }

func (l *listing) end() {
	w := &l.report.fields
	title := l.q.Name
	if title == "" {
		title = strings.ReplaceAll(l.q.Kind, "_", " ")
	}
	side := ""
	if l.q.Side != "mean" && l.q.Side != "" {
		side = ", " + string(l.q.Side) + " of the face"
	}
	fmt.Fprintf(w, "\n  %s%s\n", scenefile.OneLine(title), side)
	switch {
	case l.n > mostRows:
		l.summary(w)
	default:
		l.rows(w)
	}
	if l.q.CSV != "" {
		fmt.Fprintf(w, "  All %d points: %s\n", l.n, l.q.CSV)
	}
}

// rows prints every record: one table for each kind of field.
func (l *listing) rows(w io.Writer) {
	s := l.report.setup
	if s.Magnetic {
		t := newTable(l.heads("Bx", "By", "Bz", "|B|", "<", "Hx", "Hy", "Hz", "<", "Vm", "<where")...)
		for i := range l.records {
			rec := &l.records[i]
			bx, by, bz, bn, bu := vector("B", rec.Magnetic.B)
			hx, hy, hz, _, hu := vector("H", rec.Magnetic.H)
			t.add(append(l.at(rec), bx, by, bz, bn, bu, hx, hy, hz, hu, value("Vm", rec.Magnetic.Vm), l.where(rec))...)
		}
		t.print(w)
	}
	if s.Electric {
		t := newTable(l.heads("Ex", "Ey", "Ez", "|E|", "<", "Dx", "Dy", "Dz", "<", "V", "<where")...)
		for i := range l.records {
			rec := &l.records[i]
			ex, ey, ez, en, eu := vector("E", rec.Electric.E)
			dx, dy, dz, _, du := vector("D", rec.Electric.D)
			t.add(append(l.at(rec), ex, ey, ez, en, eu, dx, dy, dz, du, value("V", rec.Electric.V), l.where(rec))...)
		}
		t.print(w)
	}
	if !s.Magnetic && !s.Electric {
		fmt.Fprintln(w, "  no part carries polarization, magnetization or charge")
	}
	l.parts(w)
}

// parts prints the contributions, where they were asked for.
func (l *listing) parts(w io.Writer) {
	if !l.q.ByPart {
		return
	}
	s := l.report.setup
	for i := range l.records {
		rec := &l.records[i]
		t := newTable("<    of which", "Hx", "Hy", "Hz", "<", "Ex", "Ey", "Ez", "<")
		for _, c := range rec.ByPart {
			hx, hy, hz, _, hu := vector("H", c.H)
			ex, ey, ez, _, eu := vector("E", c.E)
			switch s.Parts[c.Part].Kind {
			case solve.Magnetized:
				t.add("    "+s.Parts[c.Part].Name, hx, hy, hz, hu, "", "", "", "")
			case solve.Polarized, solve.Charged:
				t.add("    "+s.Parts[c.Part].Name, "", "", "", "", ex, ey, ez, eu)
			}
		}
		if len(l.records) > 1 {
			fmt.Fprintf(w, "    at point %d\n", i)
		}
		t.print(w)
	}
}

func (l *listing) heads(rest ...string) []string {
	u := string(l.report.setup.Scene.Length)
	return append([]string{"x", "y", "z", "<" + u}, rest...)
}

func (l *listing) at(rec *solve.Record) []string {
	x := r3.Scale(1/l.report.setup.Unit, rec.X)
	return []string{l.coordinate(x.X), l.coordinate(x.Y), l.coordinate(x.Z), ""}
}

// coordinate prints a coordinate; what only the rounding of the points of a line has left of zero is 0.
func (l *listing) coordinate(v float64) string {
	if l.q.Line != nil {
		span := r3.Norm(r3.Sub(l.q.Line.To, l.q.Line.From))
		if math.Abs(v) <= 1e-14*span {
			v = 0
		}
	}
	return plain(v)
}

func (l *listing) where(rec *solve.Record) string {
	text := "outside"
	if rec.Inside >= 0 {
		text = "in " + l.report.setup.Parts[rec.Inside].Name
	}
	if rec.Status == field.OnFace && rec.Inside < 0 {
		text = "on a face"
	} else if rec.Status != field.Regular && rec.Status != field.OnFace {
		text = rec.Status.String()
	}
	return text
}

// summary prints the extremes of a large request.
func (l *listing) summary(w io.Writer) {
	unit := l.report.setup.Unit
	u := string(l.report.setup.Scene.Length)
	at := func(r *solve.Record) string {
		return fmt.Sprintf("(%s, %s, %s) %s", plain(r.X.X/unit), plain(r.X.Y/unit), plain(r.X.Z/unit), u)
	}
	for k, f := range []struct {
		on   bool
		name string
		size func(*solve.Record) float64
	}{{l.report.setup.Electric, "E", sizeE}, {l.report.setup.Magnetic, "B", sizeB}} {
		if !f.on || !l.seen[k] {
			continue
		}
		e := &l.extreme[k]
		fmt.Fprintf(w, "  |%s| from %s at %s\n      to %s at %s\n", f.name, value(f.name, f.size(&e.low)), at(&e.low),
			value(f.name, f.size(&e.high)), at(&e.high))
	}
	if l.none > 0 {
		fmt.Fprintf(w, "  %d points on edges or point sources have no field\n", l.none)
	}
}

// Checks adds hand checks of a request.
func (r *Report) Checks(q *scenefile.Request, checks []solve.Check) {
	name := q.Name
	if name == "" {
		name = strings.ReplaceAll(q.Kind, "_", " ")
	}
	for range checks {
		r.names = append(r.names, scenefile.OneLine(name))
	}
	r.checks = append(r.checks, checks...)
}

// Skip names an output that this release does not write.
func (r *Report) Skip(s scenefile.SkippedKey) {
	r.skipped = append(r.skipped, fmt.Sprintf("%s (%s asked for at %s): this release does not write it.", s.File, s.Key, s.Pointer))
}

// Print writes the report.
func (r *Report) Print(w io.Writer, cautions []string) {
	s := r.setup
	if t := s.Scene.Title; t != "" {
		fmt.Fprintf(w, "%s\n\n", scenefile.OneLine(t))
	}
	section := func(name string, body *bytes.Buffer) {
		if body.Len() > 0 {
			fmt.Fprintf(w, "%s\n%s\n", name, body.String())
		}
	}
	section("What each face carries", &r.charges)
	section("Sums that must vanish", &r.sums)
	if r.fields.Len() > 0 {
		fmt.Fprintf(w, "Field where asked%s\n\n", r.fields.String())
	}
	r.printChecks(w)
	list := func(name string, lines []string) {
		if len(lines) == 0 {
			return
		}
		fmt.Fprintln(w, name)
		for _, l := range lines {
			wrapped(w, "- ", l)
		}
		fmt.Fprintln(w)
	}
	list("Not written", r.skipped)
	list("Warnings", s.Warnings)
	list("Not included", s.LeftOut())
	list("Cautions", cautions)
}

// printChecks writes hand values beside what came out.
func (r *Report) printChecks(w io.Writer) {
	if len(r.checks) == 0 {
		return
	}
	t := newTable("<what", "<quantity", "by hand", "computed", "difference", "within", "<", "<formula")
	for i := range r.checks {
		c := &r.checks[i]
		mark := "ok"
		if !c.OK {
			mark = "MISSED"
		}
		hand, got, diff := r.shown(c)
		t.add(r.names[i], c.Quantity, hand, got, diff, plain(c.Within*100)+" %", mark, scenefile.OneLine(c.Formula))
	}
	fmt.Fprintln(w, "By hand")
	t.print(w)
	fmt.Fprintln(w)
}

// shown prints the values of a check in one unit of the trade, and the relative difference.
func (r *Report) shown(c *solve.Check) (hand, got, diff string) {
	size := 0.0
	for _, x := range c.Hand {
		size = math.Hypot(size, x)
	}
	u := r.unitOf(c, size)
	text := func(v []float64) string {
		var all []string
		for _, x := range v {
			all = append(all, fixed(x/u.factor, size/u.factor))
		}
		return strings.Join(all, ", ") + " " + u.unit
	}
	switch {
	case math.IsNaN(c.Difference):
		diff = "none"
	case size > 0:
		diff = fmt.Sprintf("%+.1g %%", 100*c.Difference/size)
	default:
		diff = solve.Digits(c.Difference, 2)
	}
	return text(c.Hand), text(c.Value), diff
}

// unitOf returns the unit in which a quantity of a hand check is shown.
func (r *Report) unitOf(c *solve.Check, size float64) scale {
	magnetic := c.Kind == solve.Magnetized
	ladder := map[bool]map[string]string{
		true:  {"charge": "g", "volume_charge": "g", "total_charge": "g", "density": "M", "volume_density": "dM", "moment": "m"},
		false: {"charge": "q", "volume_charge": "q", "total_charge": "q", "density": "P", "volume_density": "dP", "moment": "p"},
	}[magnetic]
	l := r.setup.Unit
	unit := string(r.setup.Scene.Length)
	switch name := c.Name; {
	case name == "area":
		return scale{unit + "²", l * l}
	case name == "volume":
		return scale{unit + "³", l * l * l}
	case ladder[name] != "":
		return pick(ladder[name], size)
	default:
		return pick(name, size)
	}
}
