package verify_test

import (
	"context"
	"errors"
	"fmt"
	"math"
	"runtime"
	"strings"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/verify"
	"gonum.org/v1/gonum/spatial/r3"
)

// TestSuite runs everything and demands that all cases pass, and that they are enough and documented.
func TestSuite(t *testing.T) {
	cases, err := verify.Run(context.Background(), nil)
	if err != nil {
		t.Fatal(err)
	}
	const least, leastPublished = 500, 200 // the report prints more; fewer means that a family was lost
	published, claims := 0, 0
	seen := map[string]bool{}
	families := map[string]int{}
	kinds := map[verify.Kind]int{}
	for _, c := range cases {
		if !c.OK {
			t.Errorf("%s: got %v, want %v, error %.3g > %.3g (%s) %s", c.ID, c.Got, c.Expected, c.Error, c.Tolerance, c.Reason, c.Failure)
		}
		if seen[c.ID] || strings.ContainsAny(c.ID, " ,") {
			t.Errorf("ID %q is used twice or has blanks or commas", c.ID)
		}
		seen[c.ID] = true
		enoughTriples(t, &c)
		if c.Source.String() == "" || c.Reason == "" || c.Inputs == "" || c.Kind == "" || c.Name == "" {
			t.Errorf("%s: source %q, reason %q, inputs %q, kind %q: one is missing", c.ID, c.Source, c.Reason, c.Inputs, c.Kind)
		}
		if c.Source.Key != "" && len(c.Source.Reference()) < 20 {
			t.Errorf("%s: key %s is not in references.md", c.ID, c.Source.Key)
		}
		if c.Published() {
			published++
		}
		if !math.IsNaN(c.Estimate) {
			claims++
			if c.Error > c.Estimate+c.Tolerance/100 { // a hundredth of the tolerance for rounding of the expected side
				t.Errorf("%s: error %.3g above the library's own bound %.3g", c.ID, c.Error, c.Estimate)
			}
		}
		families[c.Family]++
		kinds[c.Kind]++
	}
	for _, f := range verify.Families() {
		if families[f.Name] == 0 || f.About == "" {
			t.Errorf("family %q: %d cases, about %q", f.Name, families[f.Name], f.About)
		}
	}
	for _, k := range verify.Kinds() {
		if kinds[k] == 0 {
			t.Errorf("no case of the kind %q", k)
		}
	}
	if len(cases) < least || published < leastPublished || claims < 100 {
		t.Errorf("%d cases, %d with a published source, %d with an estimate; want at least %d, %d, 100", len(cases), published, claims, least, leastPublished)
	}
	t.Logf("%d cases, %d with a published source, %d with an estimate; by kind %v", len(cases), published, claims, kinds)
}

// TestSameReport demands the same bits for any number of workers and processors, over the families that are quick.
func TestSameReport(t *testing.T) {
	defer runtime.GOMAXPROCS(runtime.GOMAXPROCS(0))
	for _, family := range []string{"thin rod", "iron rod", "boxes", "cylinder factors", "worked examples", "forces"} {
		var first []verify.Case
		for _, n := range []int{1, 2, 7} {
			runtime.GOMAXPROCS(n)
			cases, err := verify.Run(context.Background(), &verify.Options{Family: family, Workers: n})
			if err != nil {
				t.Fatal(err)
			}
			if first == nil {
				first = cases
			}
			for i, c := range cases {
				if c.ID != first[i].ID || math.Float64bits(c.Got) != math.Float64bits(first[i].Got) || c.OK != first[i].OK {
					t.Errorf("%d workers: %s got %v, with one worker %s %v", n, c.ID, c.Got, first[i].ID, first[i].Got)
				}
			}
		}
	}
}

func TestRunRefuses(t *testing.T) {
	if _, err := verify.Run(context.Background(), &verify.Options{Family: "nonsense"}); err == nil || !strings.Contains(err.Error(), "nonsense") {
		t.Errorf("unknown family: %v", err)
	}
	ctx, stop := context.WithCancel(context.Background())
	stop()
	if _, err := verify.Run(ctx, nil); !errors.Is(err, context.Canceled) {
		t.Errorf("cancelled: %v", err)
	}
}

// wrong is a source with an error.
type wrong struct {
	field.Source
	change func(v *field.Values, at *field.Points)
}

func (w wrong) Bounds() r3.Box {
	b, _ := field.BoundsOf(w.Source)
	return b
}

func (w wrong) Field(x r3.Vec) r3.Vec { return field.At(w, x, field.Mean, field.WantG).G }

func (w wrong) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	field.Evaluate(w.Source, dst, at, side)
	w.change(dst, at)
}

// spoiled runs one family, or all, with every source replaced.
func spoiled(t *testing.T, family string, alter func(field.Source) field.Source) []verify.Case {
	t.Helper()
	cases, err := verify.Run(context.Background(), &verify.Options{Family: family, Alter: alter})
	if err != nil {
		t.Fatal(err)
	}
	return cases
}

func scaledBy(factor float64) func(field.Source) field.Source {
	return func(src field.Source) field.Source { return field.Scaled{Source: src, Factor: factor} }
}

// TestScaledFieldFails multiplies all fields by 1 + 1e-10: every case of the value of a field must notice, and those of
// densities, totals and bits must not.
func TestScaledFieldFails(t *testing.T) {
	const wrongBy = 1e-10
	noticed := 0
	for _, family := range []string{"points and dipoles", "charged sheets", "round bodies", "spheres and shells", "boxes",
		"ellipsoid factors", "prism factors", "cylinder factors", "energies", "forces", "reference values"} {
		for _, c := range spoiled(t, family, scaledBy(1+wrongBy)) {
			// A tolerance above half the error cannot notice: limits of theory, printed digits. Zero has no scale.
			blind := c.Kind != verify.Reference && !(c.Tolerance < 0.5*wrongBy*math.Abs(c.Expected))
			if !blind {
				noticed++
				if c.OK {
					t.Errorf("%s did not notice: got %.15g, want %.15g, error %.3g of %.3g", c.ID, c.Got, c.Expected, c.Error, c.Tolerance)
				}
			}
		}
	}
	t.Logf("%d cases notice", noticed)
	if noticed < 200 { // 213 at the time of writing
		t.Errorf("%d cases notice a field that is off by %g, want at least 200", noticed, wrongBy)
	}
	for _, c := range spoiled(t, "slanted bar", scaledBy(1+wrongBy)) {
		if !c.OK && c.Kind != verify.Law {
			t.Errorf("%s is of densities and must not notice the field: %s", c.ID, c.Reason)
		}
	}
}

// TestWrongLawsFail gives all fields a curl, and a charge of their own.
func TestWrongLawsFail(t *testing.T) {
	curl := func(v *field.Values, at *field.Points) {
		for i := range v.GX {
			v.GX[i] -= 1e-6 * at.Y[i]
			v.GY[i] += 1e-6 * at.X[i]
		}
	}
	for _, c := range spoiled(t, "laws", func(src field.Source) field.Source { return wrong{src, curl} }) {
		if c.OK {
			t.Errorf("%s did not notice a curl of 2e-6", c.ID)
		}
	}
	flux := 0
	for _, c := range spoiled(t, "identities", func(src field.Source) field.Source {
		return wrong{src, func(v *field.Values, at *field.Points) {
			for i := range v.GX {
				v.GX[i] += 1e-6 * at.X[i]
			}
		}}
	}) {
		if strings.Contains(c.ID, "closed-flux") {
			flux++
			if c.OK {
				t.Errorf("%s did not notice a charge density of 1e-6", c.ID)
			}
		}
	}
	if flux < 8 {
		t.Errorf("%d cases of closed flux, want at least 8", flux)
	}
}

// TestWrongEstimatesFail shifts the potential by far more than its estimate, and makes the estimate of the field too careful:
// of every family of triples the estimates of phi are then false, those of g useless, and the error breaks the contract.
func TestWrongEstimatesFail(t *testing.T) {
	if testing.Short() {
		t.Skip("takes seconds; run without -short")
	}
	found := map[string]int{}
	for _, c := range spoiled(t, "estimates", func(src field.Source) field.Source {
		return wrong{src, func(v *field.Values, at *field.Points) {
			for i := range v.Phi {
				v.Phi[i] *= 1 + 1e-8
				v.ErrG[i] *= 1e4
			}
		}}
	}) {
		_, column, _ := c.Cell()
		if column == "phi true" || column == "g over" || column == "worst" {
			found[column]++
			if c.OK {
				t.Errorf("%s did not notice: got %v", c.ID, c.Got)
			}
		}
	}
	for column, least := range map[string]int{"phi true": 24, "g over": 14, "worst": 24} { // the samples of what is integrated are too small for a median
		if found[column] < least {
			t.Errorf("%d cases named %s, want at least %d", found[column], column, least)
		}
	}
}

// enoughTriples demands the triples that the claims on estimates rest on: 1500 of each closed form, 300 of each integral.
func enoughTriples(t *testing.T, c *verify.Case) {
	t.Helper()
	row, column, ok := c.Cell()
	if !ok || column != "worst" {
		return
	}
	least := 1500
	if strings.HasSuffix(c.Reason, "1e-10") {
		least = 300
	}
	var some, all int
	if _, err := fmt.Sscanf(c.Source.String(), "%d of %d triples", &some, &all); err != nil || all < least {
		t.Errorf("%s: %q, want at least %d triples", row, c.Source, least)
	}
}

// TestWrongBitsFail lets batches differ from single points, and results depend on the unit of length, in one unit of
// rounding.
func TestWrongBitsFail(t *testing.T) {
	next := func(v []float64) {
		for i := range v {
			v[i] = math.Nextafter(v[i], math.Inf(1))
		}
	}
	batch := func(v *field.Values, at *field.Points) {
		if at.Len() > 1 {
			next(v.GX)
		}
	}
	third := func(v *field.Values, at *field.Points) { // what a split into pieces of 73 and 74 points changes
		if at.Len() < 100 {
			next(v.GX)
		}
	}
	unit := func(v *field.Values, at *field.Points) {
		if at.Len() > 0 && math.Abs(at.X[0]) > 1e4 {
			next(v.GX)
		}
	}
	for name, change := range map[string]func(*field.Values, *field.Points){"batch=": batch, "1-2-7-workers": third, "scale-": unit} {
		found := 0
		for _, c := range spoiled(t, "same bits", func(src field.Source) field.Source { return wrong{src, change} }) {
			if strings.Contains(c.ID, "/"+name) {
				found++
				if c.OK {
					t.Errorf("%s did not notice", c.ID)
				}
			}
		}
		if found < 8 {
			t.Errorf("%d cases named %s, want at least 8", found, name)
		}
	}
}
