package handover

import (
	"bufio"
	"fmt"
	"io"
	"strconv"
	"strings"
)

// csvKeys are the keys of the metadata of a kind, in the order of a file.
type csvKeys struct {
	format, kind, convention, units, constant, about, total, magnitudes, moment string
	withinMoment, withinPotential, withinField, probe, group                    string
}

func (u units) csvKeys() csvKeys {
	return csvKeys{
		format: "format", kind: "kind", convention: "convention", units: "units",
		constant: u.constant + "[" + u.constantUnit + "]", about: "about[m]",
		total: "total[" + u.charge + "]", magnitudes: "magnitudes[" + u.charge + "]", moment: "moment[" + u.moment + "]",
		withinMoment: "within moment[" + u.moment + "]", withinPotential: "within potential[" + u.potential + "]",
		withinField: "within field[" + u.field + "]", probe: "probe[m;" + u.potential + ";" + u.field + "]", group: "group",
	}
}

// csvUnits is the line of units.
func (u units) csvUnits() string {
	return strings.Join([]string{"length m", "charge " + u.charge, "moment " + u.moment, "potential " + u.potential, "field " + u.field}, ",")
}

// columns returns the header of the rows.
func (u units) columns(dipoles bool) []string {
	c := []string{"x[m]", "y[m]", "z[m]", "charge[" + u.charge + "]"}
	if dipoles {
		for _, axis := range []string{"px", "py", "pz"} {
			c = append(c, axis+"["+u.moment+"]")
		}
	}
	return append(c, "part", "face")
}

// WriteCSV writes the points and dipoles of the set, with its totals and probes, as ReadCSV reads them, after Check. Facets and
// cells have no place there.
func (s *Set) WriteCSV(w io.Writer) error {
	if err := s.Check(); err != nil {
		return err
	}
	p := &printer{w: bufio.NewWriter(w)}
	u := s.Kind.units()
	k := u.csvKeys()
	meta := func(key string, values ...string) { p.line("# %s,%s", key, strings.Join(values, ",")) }
	meta(k.format, Format, strconv.Itoa(version))
	meta(k.kind, u.kind)
	meta(k.convention, u.convention)
	meta(k.units, u.csvUnits())
	meta(k.constant, decimal(s.Constant))
	meta(k.about, decimals(components(s.About)...))
	meta(k.total, decimal(s.Total))
	meta(k.magnitudes, decimal(s.Magnitudes))
	meta(k.moment, decimals(components(s.Moment)...))
	meta(k.withinMoment, decimal(s.Within.Moment))
	meta(k.withinPotential, decimal(s.Within.Potential))
	meta(k.withinField, decimal(s.Within.Field))
	for _, q := range s.Probes {
		meta(k.probe, decimals(components(q.At)...), decimal(q.Potential), decimals(components(q.Field)...))
	}
	dipoles := false
	for i := range s.Groups {
		g := &s.Groups[i]
		meta(k.group, g.Part, g.Place, string(g.Form), strconv.Itoa(len(g.Points)), strconv.Itoa(len(g.Dipoles)), decimal(g.Charge))
		dipoles = dipoles || len(g.Dipoles) > 0
	}
	p.line("%s", strings.Join(u.columns(dipoles), ","))
	for i := range s.Groups {
		g := &s.Groups[i]
		for _, q := range g.Points {
			row := append(components(q.At), q.Charge)
			if dipoles {
				row = append(row, 0, 0, 0)
			}
			p.line("%s,%s,%s", decimals(row...), g.Part, g.Place)
		}
		for _, d := range g.Dipoles {
			row := append(components(d.At), 0)
			p.line("%s,%s,%s", decimals(append(row, components(d.Moment)...)...), g.Part, g.Place)
		}
	}
	return p.end()
}

// decimal returns the shortest decimal that reads back as x; zero has no sign.
func decimal(x float64) string { return strconv.FormatFloat(x+0, 'g', -1, 64) }

// decimals returns decimals with commas between.
func decimals(x ...float64) string {
	var b strings.Builder
	for i, v := range x {
		if i > 0 {
			b.WriteByte(',')
		}
		fmt.Fprint(&b, decimal(v))
	}
	return b.String()
}
