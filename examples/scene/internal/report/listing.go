package report

import (
	"fmt"
	"io"
	"math"
	"slices"
	"strings"

	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/examples/scene/internal/solve"
	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

// mostRows is how many points of a request are printed; of more, the extremes are.
const mostRows = 60

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

// Points begins the part of a point request and returns what takes its records and what ends it.
func (r *Report) Points(q *scenefile.Request) (see func(i int, rec *solve.Record), end func()) {
	l := &listing{report: r, q: q, n: q.Count()}
	return l.see, l.end
}

func (l *listing) see(i int, rec *solve.Record) {
	if len(rec.Missed) > 0 {
		l.report.miss(fmt.Sprintf("%s, point %d: %s.", titleOf(l.q), i, strings.Join(rec.Missed, ", ")))
	}
	if l.n <= mostRows {
		l.records = append(l.records, *rec)
		return
	}
	if rec.Status >= field.OnEdge && rec.Status != field.NotConverged {
		l.none++
	}
	for k, size := range [2]func(*solve.Record) float64{sizeE, sizeB} {
		v := size(rec)
		if solve.Missing(v) {
			continue
		}
		e := &l.extreme[k]
		if !l.seen[k] || v < size(&e.low) {
			e.low = *rec
		}
		if !l.seen[k] || v > size(&e.high) {
			e.high = *rec
		}
		l.seen[k] = true
	}
}

func sizeE(r *solve.Record) float64 { return r3.Norm(r.Electric.E) }
func sizeB(r *solve.Record) float64 { return r3.Norm(r.Magnetic.B) }

func (l *listing) end() {
	w := &l.report.fields
	if w.Len() > 0 {
		fmt.Fprintln(w)
	}
	side := ""
	if l.q.Side == "inside" || l.q.Side == "outside" {
		side = ", " + string(l.q.Side) + " of the face"
	}
	fmt.Fprintf(w, "  %s%s\n", titleOf(l.q), side)
	s := l.report.setup
	switch {
	case !s.Magnetic && !s.Electric && !s.Guiding:
		fmt.Fprintln(w, "  no part carries polarization, magnetization, charge or flux")
	case l.n > mostRows:
		l.summary(w)
	default:
		l.rows(w)
	}
	switch {
	case l.q.CSV != "" && l.report.files:
		fmt.Fprintf(w, "  all %d points: %s\n", l.n, l.q.CSV)
	case l.q.CSV != "":
		fmt.Fprintf(w, "  all %d points: -out DIR writes them to %s\n", l.n, l.q.CSV)
	case l.n > mostRows && l.report.files:
		fmt.Fprintf(w, "  all %d points: results.json\n", l.n)
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
			t.add(append(l.at(rec), bx, by, bz, bn, bu, hx, hy, hz, hu, value("Vm", rec.Magnetic.Vm), l.where(rec, rec.Magnetic.Status, "an electric part", "Vm", "H"))...)
		}
		t.print(w)
	}
	if s.Electric {
		t := newTable(l.heads("Ex", "Ey", "Ez", "|E|", "<", "Dx", "Dy", "Dz", "<", "V", "<where")...)
		for i := range l.records {
			rec := &l.records[i]
			ex, ey, ez, en, eu := vector("E", rec.Electric.E)
			dx, dy, dz, _, du := vector("D", rec.Electric.D)
			t.add(append(l.at(rec), ex, ey, ez, en, eu, dx, dy, dz, du, value("V", rec.Electric.V), l.where(rec, rec.Electric.Status, "a magnet", "V", "E"))...)
		}
		t.print(w)
	}
	if s.Guiding {
		t := newTable(l.heads("Ax", "Ay", "Az", "|A|", "<", "<where")...)
		for i := range l.records {
			rec := &l.records[i]
			ax, ay, az, an, au := vector("A", rec.Guide.A)
			t.add(append(l.at(rec), ax, ay, az, an, au, l.where(rec, rec.Guide.Status, "a part", "A"))...)
		}
		t.print(w)
	}
	if l.q.Gradient {
		l.gradients(w)
	}
	if l.q.ByPart {
		l.parts(w)
	}
}

// parts prints the contributions, where they were asked for.
func (l *listing) parts(w io.Writer) {
	for i := range l.records {
		rec := &l.records[i]
		magnetic := newTable("<    of which", "Bx", "By", "Bz", "|B|", "<", "Hx", "Hy", "Hz", "<", "Vm")
		electric := newTable("<    of which", "Ex", "Ey", "Ez", "|E|", "<", "Dx", "Dy", "Dz", "<", "V")
		for k, c := range rec.ByPart {
			if k == mostParts {
				break
			}
			name := "    " + l.report.name(c.Part)
			switch l.report.setup.Parts[c.Part].Kind {
			case solve.Magnetized:
				bx, by, bz, bn, bu := vector("B", c.B)
				hx, hy, hz, _, hu := vector("H", c.H)
				magnetic.add(name, bx, by, bz, bn, bu, hx, hy, hz, hu, value("Vm", c.Vm))
			case solve.Polarized, solve.Charged:
				ex, ey, ez, en, eu := vector("E", c.E)
				dx, dy, dz, _, du := vector("D", c.D)
				electric.add(name, ex, ey, ez, en, eu, dx, dy, dz, du, value("V", c.V))
			}
		}
		if len(l.records) > 1 {
			fmt.Fprintf(w, "    point %d\n", i)
		}
		for _, t := range []*table{magnetic, electric} {
			if len(t.rows) > 0 {
				t.print(w)
			}
		}
		if more := len(rec.ByPart) - mostParts; more > 0 {
			fmt.Fprintf(w, "      and %d more parts\n", more)
		}
	}
}

func (l *listing) heads(rest ...string) []string {
	return append([]string{"x", "y", "z", "<" + string(l.report.setup.Scene.Length)}, rest...)
}

func (l *listing) at(rec *solve.Record) []string {
	return []string{l.coordinate(rec.X.X), l.coordinate(rec.X.Y), l.coordinate(rec.X.Z), ""}
}

// coordinate prints a coordinate in the unit of the file; what only the rounding of the points of a line has left of zero
// is 0.
func (l *listing) coordinate(metres float64) string {
	v := metres / l.report.setup.Unit
	if l.q.Line != nil {
		span := r3.Norm(r3.Sub(l.q.Line.To, l.q.Line.From))
		if math.Abs(v) <= 1e-14*span {
			v = 0
		}
	}
	return plain(v)
}

// where says where a point lies, as far as it matters for fields of the status given; other names what carries the field
// of the other kind, values are those that may have missed the accuracy.
func (l *listing) where(rec *solve.Record, status field.Status, other string, values ...string) string {
	for _, name := range rec.Missed {
		if converged := status <= field.OnFace || status == field.NotConverged; converged && slices.Contains(values, name) {
			return name + " not reached"
		}
	}
	switch {
	case rec.Note != "":
		return rec.Note
	case status > field.OnFace && status != field.NotConverged: // what has not converged further may be as good as wanted
		return status.String()
	case rec.Inside >= 0:
		return "in " + l.report.name(rec.Inside)
	case rec.Status == field.OnFace:
		return "on a face"
	case rec.Status == field.OnEdge:
		return "on an edge of " + other
	}
	return "outside"
}

// summary prints the extremes of a large request.
func (l *listing) summary(w io.Writer) {
	u := string(l.report.setup.Scene.Length)
	at := func(r *solve.Record) string {
		return fmt.Sprintf("at (%s, %s, %s) %s, %s", l.coordinate(r.X.X), l.coordinate(r.X.Y), l.coordinate(r.X.Z), u, l.where(r, field.Regular, "a part"))
	}
	t := newTable("<", "<", "", "<")
	for k, f := range []struct {
		on   bool
		name string
		size func(*solve.Record) float64
	}{{l.report.setup.Magnetic, "B", sizeB}, {l.report.setup.Electric, "E", sizeE}} {
		k = 1 - k
		if !f.on || !l.seen[k] {
			continue
		}
		e := &l.extreme[k]
		t.add("|"+f.name+"|", "from", value(f.name, f.size(&e.low)), at(&e.low))
		t.add("", "to", value(f.name, f.size(&e.high)), at(&e.high))
	}
	if len(t.rows) > 0 {
		t.print(w)
	}
	if l.none > 0 {
		fmt.Fprintf(w, "  points on edges or at point sources, where there is no field: %d\n", l.none)
	}
}
