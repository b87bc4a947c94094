package report

import (
	"fmt"
	"io"
	"math"
	"strings"

	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/examples/scene/internal/solve"
)

// Checks adds hand checks of a request.
func (r *Report) Checks(q *scenefile.Request, checks []solve.Check) {
	for _, c := range checks {
		what := clipped(titleOf(q))
		if q.Count() > 1 {
			what += fmt.Sprintf(" [%d]", c.At)
		}
		r.checks = append(r.checks, check{c, what})
	}
}

// printChecks writes hand values beside what came out.
func (r *Report) printChecks(w io.Writer) {
	if len(r.checks) == 0 {
		return
	}
	t := newTable("<what", "<quantity", "by hand", "computed", "<", "difference", "within", "<", "<formula")
	missed := 0
	for i := range r.checks {
		c := &r.checks[i]
		mark := "ok"
		if !c.OK {
			mark = "MISSED"
			missed++
		}
		hand, got, unit, diff := r.shown(c)
		t.add(c.what, cutQuantity(c.Quantity), hand, got, unit, diff, percent(c.Within), mark, scenefile.OneLine(c.Formula))
	}
	fmt.Fprintln(w, "By hand")
	t.print(w)
	switch missed {
	case 0:
		fmt.Fprintf(w, "  All hand checks hold (%d).\n\n", len(r.checks))
	default:
		fmt.Fprintf(w, "  Hand checks missed: %d of %d.\n\n", missed, len(r.checks))
	}
}

// cutQuantity shortens a quantity from the front: its end says what it is.
func cutQuantity(text string) string {
	const most = 36
	runes := []rune(scenefile.OneLine(text))
	if len(runes) <= most {
		return string(runes)
	}
	return "…" + string(runes[len(runes)-most+1:])
}

func percent(within float64) string { return plain(within*100) + " %" }

// shown prints the values of a check in one unit of the trade, and the relative difference.
func (r *Report) shown(c *check) (hand, got, unit, diff string) {
	size, largest := 0.0, 0.0
	for _, x := range c.Hand {
		size = math.Hypot(size, x)
	}
	for _, x := range c.Value {
		largest = math.Hypot(largest, x)
	}
	if size > 0 {
		largest = size
	}
	u := r.unitOf(c, largest)
	text := func(v []float64) string {
		var all []string
		for _, x := range v {
			all = append(all, fixed(x/u.factor, largest/u.factor))
		}
		return strings.Join(all, ", ")
	}
	switch {
	case math.IsNaN(c.Difference):
		diff = "none"
	case c.Difference == 0:
		diff = "0"
	case size > 0:
		diff = relative(c.Difference/size, c.Within)
	default:
		diff = solve.Digits(c.Difference/u.factor, 2) + " " + u.unit
	}
	if largest == 0 {
		u.unit = ""
	}
	return text(c.Hand), text(c.Value), u.unit, diff
}

// relative prints a relative difference in percent, as finely as two digits of what is allowed.
func relative(rel, within float64) string {
	size := 100 * max(math.Abs(rel), within)
	decimals := places(size, 2)
	if math.Abs(rel) > within {
		decimals = places(100*math.Abs(rel), 2)
	}
	text := fmt.Sprintf("%+.*f %%", decimals, 100*rel)
	if strings.Trim(text, "+-0. %") == "" {
		return "0 %"
	}
	return text
}

// unitOf returns the unit in which a quantity of a hand check is shown.
func (r *Report) unitOf(c *check, size float64) scale {
	q := quantitiesOf(c.Kind)
	l := r.setup.Unit
	unit := string(r.setup.Scene.Length)
	switch {
	case c.Ladder == "L":
		return scale{unit, l}
	case c.Ladder != "":
		return pick(c.Ladder, size)
	}
	switch c.Name {
	case "area":
		return scale{unit + "²", l * l}
	case "volume":
		return scale{unit + "³", l * l * l}
	case "charge", "volume_charge", "total_charge":
		return pick(q.charge, size)
	case "density":
		return pick(q.density, size)
	case "volume_density":
		return pick(q.inner, size)
	case "moment":
		return pick(q.moment, size)
	}
	return pick(c.Name, size)
}
