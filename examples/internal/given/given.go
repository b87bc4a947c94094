// Package given reads the inputs of the example programs: flags that take a number with its unit, and prints the checks by
// hand beside what was computed.
package given

import (
	"flag"
	"fmt"
	"io"
	"math"
	"strconv"
	"strings"
)

// Unit is a unit of a quantity and its size in SI.
type Unit struct {
	Name string
	Size float64
}

// The quantities that examples ask for.
var (
	Length  = []Unit{{"m", 1}, {"cm", 1e-2}, {"mm", 1e-3}, {"um", 1e-6}, {"µm", 1e-6}}
	Flux    = []Unit{{"T", 1}, {"mT", 1e-3}, {"uT", 1e-6}, {"µT", 1e-6}}
	Density = []Unit{{"C/m2", 1}, {"mC/m2", 1e-3}, {"uC/m2", 1e-6}, {"µC/m2", 1e-6}}
	Celsius = []Unit{{"C", 1}, {"°C", 1}}
	Share   = []Unit{{"%", 1e-2}}
)

// Parse reads a number followed by one of the units, as in "2.5mm" or "2.5 mm".
func Parse(text string, units []Unit) (float64, error) {
	text = strings.TrimSpace(text)
	number, unit := text, Unit{Size: math.NaN()}
	for _, u := range units {
		if rest, ok := strings.CutSuffix(text, u.Name); ok && len(rest) < len(number) {
			number, unit = strings.TrimSpace(rest), u
		}
	}
	v, err := strconv.ParseFloat(number, 64)
	switch {
	case err == nil && unit.Name != "" && !math.IsInf(v, 0) && !math.IsNaN(v):
		return v * unit.Size, nil
	case err == nil && unit.Name == "":
		return 0, fmt.Errorf("%q has no unit; write one of %s behind the number", text, names(units))
	}
	return 0, fmt.Errorf("%q is no number with one of the units %s; write for example 2.5%s", text, names(units), units[0].Name)
}

func names(units []Unit) string {
	var all []string
	for _, u := range units {
		all = append(all, u.Name)
	}
	return strings.Join(all, ", ")
}

// Flag adds a flag for a quantity to a set; preset is its value where it is not given.
func Flag(set *flag.FlagSet, name string, units []Unit, preset, usage string) *float64 {
	q := &quantity{units: units}
	if err := q.Set(preset); err != nil {
		panic("given: preset of a flag is no quantity")
	}
	set.Var(q, name, usage)
	return &q.value
}

// quantity is a flag.Value.
type quantity struct {
	units []Unit
	text  string
	value float64
}

func (q *quantity) String() string { return q.text }

func (q *quantity) Set(text string) error {
	v, err := Parse(text, q.units)
	if err == nil {
		q.text, q.value = text, v
	}
	return err
}

// Positive returns an error for the first of some named flags whose value is not above 0.
func Positive(set *flag.FlagSet, names ...string) error {
	for _, name := range names {
		if q, ok := set.Lookup(name).Value.(*quantity); ok && !(q.value > 0) {
			return fmt.Errorf("-%s is %s; want more than 0", name, q.text)
		}
	}
	return nil
}

// Checks is a list of values by hand and as computed.
type Checks struct{ rows []row }

type row struct {
	what, unit     string
	hand, computed float64
	within         float64 // relative
}

// Add adds a value by hand, the computed one, and how far they may be apart, relative.
func (c *Checks) Add(what string, hand, computed float64, unit string, within float64) {
	c.rows = append(c.rows, row{what, unit, hand, computed, within})
}

// Print writes the table and reports whether all checks hold.
func (c *Checks) Print(w io.Writer) (hold bool) {
	fmt.Fprintf(w, "\nBy hand\n  %-44s %12s %12s %-6s %9s\n", "", "by hand", "computed", "", "apart")
	hold = true
	for _, r := range c.rows {
		apart := (r.computed - r.hand) / math.Abs(r.hand)
		mark := ""
		if !(math.Abs(apart) <= r.within) {
			mark, hold = "  MISSED", false
		}
		fmt.Fprintf(w, "  %-44s %12.5g %12.5g %-6s %8.2g%%%s\n", r.what, r.hand, r.computed, r.unit, 100*apart, mark)
	}
	return hold
}
