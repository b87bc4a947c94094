package handover

import (
	"bufio"
	"encoding/json"
	"fmt"
	"io"
	"slices"

	"example.com/boundpole/field/element"
	"gonum.org/v1/gonum/spatial/r3"
)

const (
	// Format names the file format.
	Format  = "boundpole equivalent charge"
	version = 1
)

// WriteJSON writes the set as ReadJSON reads it, one facet, cell or point a line, after Check.
func (s *Set) WriteJSON(w io.Writer) error {
	if err := s.Check(); err != nil {
		return err
	}
	p := &printer{w: bufio.NewWriter(w)}
	u := s.Kind.units()
	p.line("{")
	p.line(`  "format": %s,`, text(Format))
	p.line(`  "version": %d,`, version)
	p.line(`  "kind": %s,`, text(u.kind))
	p.line(`  "convention": %s,`, text(u.convention))
	p.line(`  "units": {"length": "m", "charge": %s, "sigma": %s, "rho": %s, "moment": %s, "potential": %s, "field": %s},`,
		text(u.charge), text(u.sigma), text(u.rho), text(u.moment), text(u.potential), text(u.field))
	p.line(`  "constant": {"name": %s, "unit": %s, "value": %s},`, text(u.constant), text(u.constantUnit), number(s.Constant))
	p.line(`  "about": %s,`, vector(s.About))
	p.line(`  "total": %s,`, number(s.Total))
	p.line(`  "magnitudes": %s,`, number(s.Magnitudes))
	p.line(`  "moment": %s,`, vector(s.Moment))
	p.line(`  "within": {"moment": %s, "potential": %s, "field": %s},`, number(s.Within.Moment), number(s.Within.Potential), number(s.Within.Field))
	p.line(`  "probes": [`)
	for i, q := range s.Probes {
		p.line(`    {"at": %s, "potential": %s, "field": %s}%s`, vector(q.At), number(q.Potential), vector(q.Field), comma(i, len(s.Probes)))
	}
	p.line(`  ],`)
	p.line(`  "groups": [`)
	for i := range s.Groups {
		p.group(&s.Groups[i], comma(i, len(s.Groups)))
	}
	p.line(`  ]`)
	p.line("}")
	return p.end()
}

// printer writes lines and keeps the first error.
type printer struct {
	w   *bufio.Writer
	err error
}

func (p *printer) line(format string, a ...any) {
	if p.err == nil {
		_, p.err = fmt.Fprintf(p.w, format+"\n", a...)
	}
}

// end writes what is still held back.
func (p *printer) end() error {
	if p.err == nil {
		p.err = p.w.Flush()
	}
	if p.err != nil {
		return fmt.Errorf("handover: %w", p.err)
	}
	return nil
}

// section is a list of a group, one element a line.
type section struct {
	key  string
	rows []string
}

func (p *printer) group(g *Group, after string) {
	all := []section{
		sectionOf("facets", g.Facets, func(f Facet) string {
			return fmt.Sprintf(`{"vertices": %s, "normal": %s, "sigma": %s, "charge": %s}`, vectors(f.Vertices), vector(f.Normal), number(f.Sigma), number(f.Charge))
		}),
		sectionOf("cells", g.Cells, func(c Cell) string {
			return fmt.Sprintf(`{"corners": %s, "rho": %s, "charge": %s}`, vectors(c.Corners[:]), number(c.Rho), number(c.Charge))
		}),
		sectionOf("points", g.Points, func(q element.Point) string { return numbers([]float64{q.At.X, q.At.Y, q.At.Z, q.Charge}) }),
		sectionOf("dipoles", g.Dipoles, func(d element.Dipole) string { return numbers(components(d.At, d.Moment)) }),
	}
	all = slices.DeleteFunc(all, func(s section) bool { return len(s.rows) == 0 })
	p.line(`    {"part": %s, "place": %s, "form": %s, "charge": %s,`, text(g.Part), text(g.Place), text(string(g.Form)), number(g.Charge))
	for k, s := range all {
		p.line(`      "%s": [`, s.key)
		for i, row := range s.rows {
			p.line(`        %s%s`, row, comma(i, len(s.rows)))
		}
		p.line(`      ]%s`, comma(k, len(all)))
	}
	p.line(`    }%s`, after)
}

func sectionOf[T any](key string, all []T, one func(T) string) section {
	s := section{key: key}
	for _, x := range all {
		s.rows = append(s.rows, one(x))
	}
	return s
}

// comma returns what follows element i of n.
func comma(i, n int) string {
	if i < n-1 {
		return ","
	}
	return ""
}

// number returns the shortest decimal that reads back as x; zero has no sign.
func number(x float64) string { return encoded(x + 0) }

func numbers(x []float64) string {
	clean := make([]float64, len(x))
	for i := range x {
		clean[i] = x[i] + 0
	}
	return encoded(clean)
}

func vector(v r3.Vec) string { return numbers(components(v)) }

func vectors(v []r3.Vec) string {
	all := make([][3]float64, len(v))
	for i, x := range v {
		all[i] = [3]float64{x.X + 0, x.Y + 0, x.Z + 0}
	}
	return encoded(all)
}

func text(s string) string { return encoded(s) }

// encoded returns the JSON of numbers and texts that Check has found good.
func encoded(v any) string {
	b, err := json.Marshal(v)
	if err != nil {
		return "null" // cannot be: all numbers are finite
	}
	return string(b)
}
