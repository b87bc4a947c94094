package verify

import (
	"embed"
	"errors"
	"fmt"
	"math"
	"slices"
	"strings"
	"sync"

	"example.com/boundpole/field"
	"example.com/boundpole/geom/pair"
	"example.com/boundpole/verify/refcase"
	"example.com/boundpole/verify/refsource"
	"gonum.org/v1/gonum/spatial/r3"
)

// tripleFiles holds random triples of body, polarization and point with weight on the hard places, a file a family, and
// phi, g and (closed forms) grad g to 20 digits.
//
//go:embed testdata/triples/*.json.gz
var tripleFiles embed.FS

// tripleFamily is one file of triples.
type tripleFamily struct {
	name     string
	accuracy float64 // of the contract: 1e-12 for closed forms, 1e-10 for what is integrated
	step     int     // every step-th body is taken, unless all are asked for
}

// tripleFamilies lists the files: closed forms, then what is integrated. What a body costs before its first value, such as the
// expansion for far points, or each of its values, decides on the steps: no family takes more than two seconds.
var tripleFamilies = []tripleFamily{
	{"box", 1e-12, 5}, {"prism", 1e-12, 8}, {"polyhedron", 1e-12, 7}, {"polygon", 1e-12, 3},
	{"disc", 1e-12, 1}, {"annulus", 1e-12, 1}, {"cylinder", 1e-12, 1}, {"tube", 1e-12, 1},
	{"sphere", 1e-12, 1}, {"hollow-sphere", 1e-12, 1}, {"ellipsoid", 1e-12, 1},
	{"point", 1e-12, 1}, {"dipole", 1e-12, 1},
	{"disc-linear", 1e-10, 1}, {"cylinder-affine", 1e-10, 4}, {"cylinder-axial", 1e-10, 4}, {"cylinder-radial", 1e-10, 4},
	{"arc", 1e-10, 4}, {"arc-affine", 1e-10, 4}, {"arc-radial", 1e-10, 16}, {"cone", 1e-10, 1}, {"torus", 1e-10, 1},
	{"ellipsoid-affine", 1e-12, 1}, {"box-polynomial", 1e-10, 4},
}

const estimateFamily = "estimates"

// Cell returns row and column of the case where those of its family are best read side by side in a table: error estimates,
// with a row for each kind of body. ok is false for all other cases.
func (c *Case) Cell() (row, column string, ok bool) {
	if c.Family != estimateFamily {
		return "", "", false
	}
	return strings.Cut(c.Name, ": ")
}

// quantities are what triples are compared in.
var quantities = [...]string{"phi", "g", "grad"}

// leastForMedian is how many triples a median is taken of: that of fewer says little about all.
const leastForMedian = 100

// estimates holds the error estimates against the triples: how many bound the true error, by how much they overestimate it
// in the median, and the worst error over what the contract allows.
//
// The first case of a family evaluates its triples. These cases come before all others, so that workers do not wait for
// each other.
func estimates(o *Options) []trial {
	var first, rest []trial
	for _, f := range tripleFamilies {
		own := f.trials(o)
		first, rest = append(first, own[0]), append(rest, own[1:]...)
	}
	return append(first, rest...)
}

// trials returns the cases of a family of triples.
func (f tripleFamily) trials(o *Options) []trial {
	switch {
	case o.All:
		f.step = 1
	case o.Alter != nil && f.accuracy > 1e-12: // whether a wrong source is noticed shows in a few
		f.step *= 4
	}
	cases, err := f.cases()
	run := sync.OnceValue(func() *tripleTally { return f.evaluate(cases, o.Alter, err) })
	some, stored := f.count(cases)
	source := plain(fmt.Sprintf("%d of %d triples", some, stored))
	var all []trial
	add := func(column string, limit limit, outcome func(t *tripleTally) result) {
		all = append(all, trial{
			f.name + ": " + column, Reference, source,
			"random bodies, polarizations and points with weight on the hard places; mpmath, at least 20 digits", limit,
			func(l *lab) result {
				t := run()
				l.note(t.err)
				return outcome(t)
			},
		})
	}
	for k, quantity := range quantities {
		if quantity == "grad" && !slices.ContainsFunc(cases, func(c refcase.Case) bool { return c.Grad != nil }) {
			continue
		}
		add(quantity+" true", within(1e-3, "99.9 % of the estimates are true"),
			func(t *tripleTally) result { return number(1, t.share(k)) })
		if some >= leastForMedian {
			add(quantity+" over", within(100, "the median overestimate is at most 100"),
				func(t *tripleTally) result { return atMost(t.median(k)) })
		}
	}
	add("worst", within(1, fmt.Sprintf("accuracy contract: %.0e", f.accuracy)),
		func(t *tripleTally) result { return atMost(t.worst) })
	return all
}

// count returns how many triples are taken of how many.
func (f *tripleFamily) count(cases []refcase.Case) (some, all int) {
	for i := range cases {
		all += len(cases[i].Points)
		if i%f.step == 0 {
			some += len(cases[i].Points)
		}
	}
	return some, all
}

// cases reads the file of the family.
func (f *tripleFamily) cases() ([]refcase.Case, error) {
	name := f.name + ".json.gz"
	content, err := tripleFiles.ReadFile("testdata/triples/" + name)
	if err != nil {
		return nil, err
	}
	return refcase.Parse(name, content)
}

// evaluate compares every step-th case at all its points.
func (f *tripleFamily) evaluate(cases []refcase.Case, alter func(field.Source) field.Source, err error) *tripleTally {
	t := &tripleTally{err: err}
	for i := 0; i < len(cases); i += f.step {
		c := &cases[i]
		src, err := refsource.Of(c)
		if err != nil {
			t.err = errors.Join(t.err, err)
			continue
		}
		if alter != nil {
			src = alter(src)
		}
		for k := range c.Points {
			t.err = errors.Join(t.err, t.compare(c, k, src, f.accuracy))
		}
	}
	for k := range t.over {
		slices.Sort(t.over[k])
	}
	return t
}

// tripleTally gathers what came out of a family.
type tripleTally struct {
	over  [len(quantities)][]float64 // estimate over the larger of the error and u |value|
	held  [len(quantities)]int       // estimates that bound the error
	worst float64                    // error over what the contract allows
	err   error
}

// compare evaluates one triple.
//
// A point nearer to a face than its tolerance counts as on it and is skipped: the reference is of one of the sides. So is a
// point on the axis of a unit radial polarization, which has no direction there. Where there is no reference of the gradient, which may take long, the contract is held without what it adds for turned bodies.
func (t *tripleTally) compare(c *refcase.Case, k int, src field.Source, accuracy float64) error {
	want, slope := field.WantPhi|field.WantG|field.WantErr, 0.0
	if c.Grad != nil {
		want |= field.WantGrad
	}
	v := field.At(src, refcase.Vec(c.Points[k]), field.Mean, want)
	if v.Status == field.OnFace || undirected(c, k) {
		return nil
	}
	if c.Grad != nil {
		slope = frobenius(v.Grad)
	}
	m, err := c.Compare(k, v.Phi, v.G, accuracy, slope)
	if err != nil {
		return err
	}
	t.see(0, m.Phi, v.ErrPhi, math.Abs(v.Phi))
	if v.Status == field.OnEdge {
		return nil // nearer to an edge than the tolerance: there is no field
	}
	t.see(1, m.G, v.ErrG, r3.Norm(v.G))
	if c.Grad != nil {
		var d [6]float64
		for i := range d {
			d[i] = refcase.Difference(v.Grad[i], c.Grad[k][i])
		}
		t.see(2, frobenius(d), v.ErrGrad, frobenius(v.Grad))
	}
	if v.Status == field.NotConverged {
		return nil // a claim on the error, none on the accuracy
	}
	if r := m.Ratio(); !(r <= t.worst) {
		t.worst = r
	}
	return nil
}

// undirected reports whether point k lies on the axis, to rounding, of a polarization that is a unit vector away from it.
func undirected(c *refcase.Case, k int) bool {
	q := &c.Polarization
	pose, err := c.Pose()
	if err != nil || q.Kind != "radial_unit" && (q.Kind != "radial_power" || q.N != 0) {
		return false
	}
	x := pose.ToLocal(pair.VecOf(refcase.Vec(c.Points[k]))).Value()
	return math.Hypot(x.X, x.Y) <= 4*0x1p-53*(r3.Norm(refcase.Vec(c.Points[k]))+r3.Norm(refcase.Vec(c.Body.Centre)))
}

// see counts one estimate of quantity k.
func (t *tripleTally) see(k int, miss, estimate, size float64) {
	if miss <= estimate {
		t.held[k]++
	}
	t.over[k] = append(t.over[k], estimate/max(miss, 0x1p-53*size, math.SmallestNonzeroFloat64))
}

// share returns how many of the estimates of quantity k are true, as a fraction.
func (t *tripleTally) share(k int) float64 { return float64(t.held[k]) / float64(len(t.over[k])) }

// median returns the median overestimate of quantity k.
func (t *tripleTally) median(k int) float64 {
	if len(t.over[k]) == 0 {
		return math.NaN()
	}
	return t.over[k][len(t.over[k])/2]
}
