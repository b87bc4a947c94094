package report

import (
	"fmt"
	"math"
	"strconv"
	"strings"

	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/examples/scene/internal/solve"
	"example.com/boundpole/magnet"
)

// mostParts and mostFaces bound the tables of parts and faces; results.json holds all.
const (
	mostParts = 24
	mostFaces = 24
)

// quantities are the keys of the ladders of a kind: density, volume density, charge, moment.
type quantities struct{ density, inner, charge, moment string }

func quantitiesOf(k solve.Kind) quantities {
	if k == solve.Magnetized {
		return quantities{"M", "dM", "g", "m"}
	}
	if k == solve.Circulating {
		return quantities{"MA", "dA", "qA", "mA"}
	}
	return quantities{"P", "dP", "q", "p"}
}

// Charges adds what the parts carry; copies carry what the first of them does.
func (r *Report) Charges(all []solve.PartCharge) {
	r.charges.Reset()
	r.sums.Reset()
	faces := newTable("<part", "<face", "area, volume", "density", "charge", "<")
	sums := newTable("<part", "sum of charges", "of magnitudes", "<", "moment x", "y", "z", "<", "<moments against ∫p dV")
	real, shown, more := false, 0, ""
	for i := range all {
		c := &all[i]
		p := &r.setup.Parts[c.Part]
		if i > 0 && p.Of == r.setup.Parts[all[i-1].Part].Of {
			continue
		}
		if shown == mostParts {
			more = fmt.Sprintf("Not shown: all parts from %s on; -out DIR writes them.", r.name(c.Part))
			break
		}
		shown++
		r.faces(faces, c)
		r.copies(faces, p)
		if p.Kind != solve.Inert {
			r.sum(sums, c)
		}
		real = real || p.Kind == solve.Charged
	}
	faces.print(&r.charges)
	if more != "" {
		wrapped(&r.charges, "", more)
	}
	if len(sums.rows) == 0 {
		return
	}
	sums.print(&r.sums)
	if shown < len(all) {
		wrapped(&r.sums, "", r.worst(all))
	}
	if real {
		wrapped(&r.sums, "", "Real charge need not vanish; its moment is about the part's centre.")
	}
}

// sum adds the row of one part.
func (r *Report) sum(t *table, c *solve.PartCharge) {
	p := &r.setup.Parts[c.Part]
	q := quantitiesOf(p.Kind)
	note := ""
	switch {
	case p.Responds():
		x, y, z, _, u := vector(q.moment, c.Moment)
		t.add(r.name(c.Part), value(q.charge, c.Total), "", "induced", x, y, z, u, "")
		return
	case p.Kind == solve.Charged:
		note = "real charge"
	case len(c.Checked) == 0:
		note = "point dipole"
	}
	x, y, z, _, u := vector(q.moment, c.Moment)
	t.add(r.name(c.Part), value(q.charge, c.Total), value(q.charge, c.Scale), note, x, y, z, u, agreement(c))
}

// faces adds the rows of one part.
func (r *Report) faces(t *table, c *solve.PartCharge) {
	unit := r.setup.Scene.Length
	p := &r.setup.Parts[c.Part]
	q := quantitiesOf(p.Kind)
	name := r.name(c.Part)
	if p.Kind == solve.Inert {
		t.add(name, "all", "", "", "0", "")
		return
	}
	if p.Responds() {
		t.add(name, "all", "", "induced", "", "")
		return
	}
	for k, f := range c.Faces {
		if k == mostFaces {
			t.add(name, fmt.Sprintf("… %d more", len(c.Faces)-k), "", "", "", "")
			break
		}
		flux := ""
		if p.Kind == solve.Magnetized && f.Charge != 0 {
			flux = "= " + value("Wb", magnet.PoleFlux(f.Charge))
		}
		t.add(name, f.Face, sized(f.Area, unit, 2), span(q.density, f.Min, f.Max), value(q.charge, f.Charge), flux)
	}
	switch {
	case c.Solid:
		t.add(name, "(inside)", sized(c.Volume, unit, 3), inner(q.inner, c), value(q.charge, c.Inside), "")
	case len(c.Faces) == 0 && p.Kind == solve.Charged:
		t.add(name, "(point)", "", "", value(q.charge, c.Total), "")
	case len(c.Faces) == 0:
		x, y, z, _, u := vector(q.moment, c.Moment)
		t.add(name, "(point)", "", "", "0", fmt.Sprintf("moment %s, %s, %s %s", x, y, z, u))
	}
}

// copies says what the copies of a part carry: the same as the first.
func (r *Report) copies(t *table, p *solve.Part) {
	c := r.setup.Scene.Parts[p.Of].Copies
	if c == nil || c.Count == 1 || p.Kind == solve.Inert {
		return
	}
	note := "the same"
	if c.Alternate {
		note += ", even numbers reversed"
	}
	last := strconv.Itoa(c.Count)
	if c.Count > 2 {
		last = "2 … " + last
	}
	t.add(clipped(r.setup.Scene.Parts[p.Of].Name)+" "+last, "all", "", "", "", note)
}

// agreement says how well the moments of the charges are those of the polarization, as a part of what cancels.
func agreement(c *solve.PartCharge) string {
	worst, any := 0.0, false
	for _, id := range c.Checked {
		if id.Scale > 0 {
			worst, any = max(worst, id.Miss/id.Scale), true
		}
	}
	switch {
	case !any:
		return ""
	case worst == 0:
		return "agree to rounding"
	}
	return fmt.Sprintf("within %.0e of what cancels", worst)
}

// worst says how well the laws of bound charge hold over all parts.
func (r *Report) worst(all []solve.PartCharge) string {
	worst, which := 0.0, ""
	for i := range all {
		for _, id := range all[i].Checked {
			if id.Scale > 0 && id.Miss/id.Scale > worst {
				worst, which = id.Miss/id.Scale, fmt.Sprintf(" (%s: %s)", r.name(all[i].Part), id.Law)
			}
		}
	}
	if worst == 0 {
		return fmt.Sprintf("All %d parts: total charge, dipole moment and second moment agree to rounding.", len(all))
	}
	return fmt.Sprintf("All %d parts: the worst miss of total charge, dipole moment and second moment is %.0e of what cancels%s.",
		len(all), worst, which)
}

// name returns the name of a part, cut where it would break a table.
func (r *Report) name(part int) string { return clipped(r.setup.Parts[part].Name) }

func clipped(name string) string {
	const most = 28
	runes := []rune(scenefile.OneLine(name))
	if len(runes) <= most {
		return string(runes)
	}
	return strings.TrimRight(string(runes[:most-1]), " ") + "…"
}

// sized prints an area (n = 2) or a volume (n = 3) in powers of the file's unit.
func sized(si float64, unit scenefile.Unit, n int) string {
	v := si
	for range n {
		v /= unit.Metres()
	}
	return fixed(v, v) + " " + string(unit) + []string{2: "²", 3: "³"}[n]
}

// inner prints the range of the volume density; an infinite end is named by its place.
func inner(quantity string, c *solve.PartCharge) string {
	finite := c.Min
	if solve.Missing(finite) {
		finite = c.Max
	}
	switch {
	case c.Infinite == "":
		return span(quantity, c.Min, c.Max)
	case solve.Missing(finite):
		return "infinite at the " + c.Infinite
	}
	return span(quantity, finite, finite) + " … infinite at the " + c.Infinite
}

// span prints the range of a density.
func span(quantity string, lo, hi float64) string {
	size := max(math.Abs(lo), math.Abs(hi))
	if size == 0 {
		return "0"
	}
	s := pick(quantity, size)
	a, b := fixed(lo/s.factor, size/s.factor), fixed(hi/s.factor, size/s.factor)
	if a == b {
		return b + " " + s.unit
	}
	return a + " … " + b + " " + s.unit
}
