package verify

import (
	"context"
	"fmt"
	"math"
	"runtime"
	"strings"
	"sync"
	"sync/atomic"

	"example.com/boundpole/field"
)

// Options selects what Run does. The zero value runs everything.
type Options struct {
	Family  string // only this family; empty: all
	Workers int    // cases evaluated at a time; 0: GOMAXPROCS. The result does not depend on it
	All     bool   // every stored triple of the estimates, a minute of work; false: a fixed sample of the slow ones
	// Alter replaces every source before it is evaluated, to see which cases notice an error. nil: none. Densities and
	// charges that are read off a body without evaluating its field, and B and D in a body, are not altered.
	Alter func(field.Source) field.Source
}

// Family is a group of cases about one subject.
type Family struct {
	Name  string
	About string // what is compared, in a sentence or two, each on a line

	trials func() []trial
}

// trial is a case to be evaluated. Fields as in Case.
type trial struct {
	name   string
	kind   Kind
	source Source
	inputs string
	limit  limit
	run    func(l *lab) result
}

// Families returns the families in the order of Run.
func Families() []Family { return families(&Options{}) }

func families(o *Options) []Family {
	return []Family{
		{"thin rod", "A rod polarized along its axis acts like its two charged end discs, from afar like two poles.", thinRod},
		{"slanted bar", "The charge density of a slanted end is M cos(tilt); the pole strength M A does not depend on the tilt.", slantedBar},
		{"uniform cylinder", "Polarized along the axis: ends +p and -p, nothing on the wall, nothing inside.", uniformCylinder},
		{"uniform sphere", "sigma = p cos(theta); inside the field is -p/3, outside that of a dipole.", uniformSphere},
		{"iron rod", "A magnetized iron rod, 10 mm by 200 mm, as poles of strength M A: B on its axis.", ironRod},
		{"points and dipoles", "Coulomb's law and the dipole law, with gradients and forces.", pointsAndDipoles},
		{"charged sheets", "Discs, annuli and rectangles on their axes, at their rims and centres.", chargedSheets},
		{"round bodies", "Cylinders and tubes on their axes, with uniform and with linear polarization.", roundBodies},
		{"spheres and shells", "Hollow spheres and charged balls and shells.", spheres},
		{"boxes", "Boxes on their axes, at the centre, and the cube filled with charge.", boxes},
		{"limits", "Long rods and thin plates approach the endless ones, with the power that theory says.", limits},
		{"ellipsoid factors", "Demagnetizing factors -g/p at the centre of ellipsoids, against closed forms and tables.", ellipsoidFactors},
		{"prism factors", "Magnetometric factors of rectangular prisms, integrated from the library's potential.", prismFactors},
		{"cylinder factors", "Magnetometric and fluxmetric factors of cylinders, integrated from the library's values.", cylinderFactors},
		{"energies", "Self energies and pair energies, integrated from the library's potential.", energies},
		{"forces", "Forces between magnets, integrated from the library's field over the charge of the second.", forces},
		{"flux tubes", "A straight tube of circulating flux is a polarized cylinder: A = g, plus p inside.", fluxTubes},
		{"currents", "The Amperian picture against the poles, free currents on their axes, and what loops link: B and A.", currents},
		{"worked examples", "Jobs of the trade in SI units.", workedExamples},
		{"reference values", "Worst point of each reference body, in units of the contract 1e-12.", referenceValues},
		{estimateFamily, "The library's own bounds on its error, against random triples of body, polarization and point in hard places.\n" +
			"true: how many bound the error; over: median of estimate/max(|error|, u |value|); worst: error over what the contract allows.",
			func() []trial { return estimates(o) }},
		{"independent methods", "The same field computed in another way.", independentMethods},
		{"integrators", "Integration over faces and cells against textbook forms and elements; orders of convergence against theory.", integrators},
		{"identities", "What every bound charge obeys, of every kind of body.", identities},
		{"laws", "Laws of the field, checked on one source of each kind; the value is the number of violations.", laws},
		{"same bits", "Results that must agree in every bit; the value is the number of values that do not.", sameBits},
	}
}

// Run evaluates the suite and returns its cases in a fixed order, the same bits for any number of workers.
//
// The error is that of ctx, or says that no family has the wanted name; a case that fails is no error. A nil
// Options is the zero value.
func Run(ctx context.Context, o *Options) ([]Case, error) {
	if o == nil {
		o = &Options{}
	}
	var cases []Case
	var trials []trial
	for _, f := range families(o) {
		if o.Family != "" && o.Family != f.Name {
			continue
		}
		for _, t := range f.trials() {
			trials = append(trials, t)
			cases = append(cases, Case{
				ID: hyphens.Replace(f.Name + "/" + t.name), Family: f.Name, Name: t.name,
				Kind: t.kind, Source: t.source, Inputs: t.inputs, Reason: t.limit.reason,
			})
		}
	}
	if len(cases) == 0 {
		return nil, fmt.Errorf("verify: no family is named %q; Families lists the names", o.Family)
	}
	workers := o.Workers
	if workers <= 0 {
		workers = runtime.GOMAXPROCS(0)
	}
	var next atomic.Int64
	var all sync.WaitGroup
	for range min(workers, len(cases)) {
		all.Go(func() {
			for ctx.Err() == nil {
				i := int(next.Add(1)) - 1
				if i >= len(cases) {
					return
				}
				trials[i].evaluate(&cases[i], o)
			}
		})
	}
	all.Wait()
	if err := ctx.Err(); err != nil {
		return nil, fmt.Errorf("verify: stopped before the last of %d cases: %w", len(cases), err)
	}
	return cases, nil
}

// hyphens makes an ID of names.
var hyphens = strings.NewReplacer(" = ", "=", ", ", "-", ": ", "-", " ", "-")

// evaluate fills in what came out.
func (t *trial) evaluate(c *Case, o *Options) {
	l := &lab{alter: o.Alter}
	r := t.run(l)
	if l.err != nil {
		nan := math.NaN()
		r = result{expected: nan, got: nan, miss: nan, estimate: nan}
		c.Failure = l.err.Error()
	}
	c.Expected, c.Got, c.Error, c.Estimate = r.expected, r.got, r.miss, r.estimate
	c.Tolerance = t.limit.of(r.expected)
	c.OK = c.Error <= c.Tolerance
}
