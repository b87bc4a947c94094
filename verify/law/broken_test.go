package law_test

import (
	"errors"
	"math"
	"slices"
	"strings"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/verify/law"
	"gonum.org/v1/gonum/spatial/r3"
)

// changed is a good source whose values f spoils.
func changed(src field.Evaluator, f func(x r3.Vec, side field.Side, v *field.Value)) formula {
	return func(q field.Point, w field.Want, s field.Side) field.Value {
		v := valueOf(src, q, w, s)
		f(q.X.Value(), s, &v)
		return v
	}
}

// counting answers its 40th and later calls of Evaluate a little larger.
type counting struct {
	formula
	calls *int
}

func (c counting) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	c.formula.Evaluate(dst, at, side)
	if *c.calls++; *c.calls > 40 {
		for i := range dst.GX {
			dst.GX[i] *= 1 + 0x1p-52
		}
	}
}

// batched has another last bit in batches of more than one point.
type batched struct{ formula }

func (b batched) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	b.formula.Evaluate(dst, at, side)
	if at.Len() > 1 {
		for i := range dst.GX {
			dst.GX[i] = math.Nextafter(dst.GX[i], math.Inf(1))
		}
	}
}

// grabby writes into its inputs.
type grabby struct{ formula }

func (g grabby) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	g.formula.Evaluate(dst, at, side)
	for i := range at.X {
		at.X[i] += 1
	}
}

// skimpy computes g another way if nobody asks for phi.
type skimpy struct{ formula }

func (s skimpy) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	s.formula.Evaluate(dst, at, side)
	if dst.Phi == nil {
		for i := range dst.GX {
			dst.GX[i] = dst.GX[i] * 3 * (1.0 / 3)
		}
	}
}

// twofold has an Evaluate that disagrees with its Field.
type twofold struct{ formula }

func (t twofold) Field(x r3.Vec) r3.Vec { return r3.Scale(1+1e-9, t.formula.Field(x)) }

func scaled(f float64) func(r3.Vec, field.Side, *field.Value) {
	return func(_ r3.Vec, _ field.Side, v *field.Value) { v.G = r3.Scale(f, v.G) }
}

// TestBrokenSources holds sources with one fault each against the laws that must name it.
func TestBrokenSources(t *testing.T) {
	same := func(r3.Vec, field.Side, *field.Value) {}
	good := changed(sphere, same)
	bareCharge := chargeClaims()
	bareCharge.Potential = false
	named := map[law.Law]bool{}
	defer func() {
		for _, l := range []law.Law{law.Finite, law.BadPoint, law.Curl, law.Divergence, law.Harmonic, law.Charge, law.Moment,
			law.Gradient, law.Potential, law.Vanishes, law.Offered, law.Decay, law.JumpNormal, law.JumpAlong, law.JumpPhi,
			law.MeanSides, law.OneSide, law.Batch, law.NilArrays, law.Agree, law.Untouched, law.Repeatable, law.Estimate} {
			if !named[l] {
				t.Errorf("no broken source stands for the law %q", l)
			}
		}
	}()
	for _, c := range []struct {
		name   string
		src    field.Source
		claims law.Claims
		laws   []law.Law // each must be among the laws broken
	}{
		{"field of the wrong sign", changed(charge, scaled(-1)), chargeClaims(), []law.Law{law.Charge, law.Potential, law.Gradient}},
		{"polarized sphere of the wrong sign", changed(sphere, func(_ r3.Vec, _ field.Side, v *field.Value) {
			v.G, v.Phi = r3.Scale(-1, v.G), -v.Phi
		}), sphereClaims(), []law.Law{law.Moment, law.JumpNormal}},
		{"factor one half", bare(func(x r3.Vec) r3.Vec { return r3.Scale(0.5, charge.Field(x)) }), bareCharge, []law.Law{law.Charge}},
		{"power 2.1", bare(func(x r3.Vec) r3.Vec {
			return r3.Scale(math.Pow(r3.Norm(r3.Sub(x, charge.At)), -0.1), charge.Field(x))
		}), bareCharge, []law.Law{law.Decay, law.Divergence, law.Charge, law.Harmonic}},
		{"axes swapped", changed(sphere, func(_ r3.Vec, _ field.Side, v *field.Value) {
			v.G.X, v.G.Y = v.G.Y, v.G.X
		}), sphereClaims(), []law.Law{law.Curl, law.Divergence, law.Potential, law.Moment}},
		{"no jump", changed(sphere, func(x r3.Vec, s field.Side, v *field.Value) {
			if n := r3.Norm(x); n <= 1 { // the limit from outside, carried inward
				v.G = r3.Sub(r3.Scale(r3.Dot(p, x)/n/n, x), r3.Scale(1.0/3, p))
			}
		}), sphereClaims(), []law.Law{law.JumpNormal, law.OneSide, law.Harmonic}},
		{"one side on the face", changed(sphere, func(x r3.Vec, s field.Side, v *field.Value) {
			if s == field.Mean && v.Status == field.OnFace {
				v.G = sphere.Field(r3.Scale(0.5, x))
			}
		}), sphereClaims(), []law.Law{law.MeanSides}},
		{"sides exchanged", formula(func(q field.Point, w field.Want, s field.Side) field.Value {
			return valueOf(sphere, q, w, [...]field.Side{field.Mean, field.Outside, field.Inside}[s])
		}), sphereClaims(), []law.Law{law.OneSide}},
		{"face not noticed", changed(sphere, func(_ r3.Vec, _ field.Side, v *field.Value) {
			v.Status = field.Regular
		}), sphereClaims(), []law.Law{law.OneSide}},
		{"potential with a step", changed(sphere, func(x r3.Vec, _ field.Side, v *field.Value) {
			if r3.Norm(x) < 1 {
				v.Phi += 1e-6
			}
		}), sphereClaims(), []law.Law{law.JumpPhi}},
		{"sheet along which g slips", changed(sphere, func(x r3.Vec, _ field.Side, v *field.Value) {
			if r3.Norm(x) < 1 {
				v.G = r3.Add(v.G, r3.Vec{X: 1e-6})
			}
		}), sphereClaims(), []law.Law{law.JumpAlong}},
		{"rounded to float32", bare(func(x r3.Vec) r3.Vec {
			g := charge.Field(x)
			return r3.Vec{X: float64(float32(g.X)), Y: float64(float32(g.Y)), Z: float64(float32(g.Z))}
		}), bareCharge, []law.Law{law.Harmonic}},
		{"NaN in a plane", changed(charge, func(x r3.Vec, _ field.Side, v *field.Value) {
			if math.Abs(x.Z) < 0.5 {
				v.G.Z = math.NaN()
			}
		}), chargeClaims(), []law.Law{law.Finite}},
		{"NaN swallowed", bare(func(x r3.Vec) r3.Vec {
			if x.X-x.X+(x.Y-x.Y)+(x.Z-x.Z) != 0 {
				return r3.Vec{}
			}
			return charge.Field(x)
		}), bareCharge, []law.Law{law.BadPoint}},
		{"potential of the wrong sign", changed(dipole, func(_ r3.Vec, _ field.Side, v *field.Value) { v.Phi = -v.Phi }),
			dipoleClaims(), []law.Law{law.Potential, law.Vanishes}},
		{"potential with a constant", changed(dipole, func(_ r3.Vec, _ field.Side, v *field.Value) { v.Phi++ }),
			dipoleClaims(), []law.Law{law.Vanishes}},
		{"no potential", bare(charge.Field), chargeClaims(), []law.Law{law.Offered}},
		{"half the charge", changed(charge, func(_ r3.Vec, _ field.Side, v *field.Value) {
			v.G, v.Phi = r3.Scale(0.5, v.G), v.Phi/2
			for k := range v.Grad {
				v.Grad[k] /= 2
			}
		}), chargeClaims(), []law.Law{law.Charge}},
		{"charge moved", bare(func(x r3.Vec) r3.Vec { return charge.Field(r3.Add(x, r3.Vec{Y: 1e-9})) }), bareCharge, []law.Law{law.Moment}},
		{"charge in empty space", bare(func(x r3.Vec) r3.Vec {
			return r3.Add(charge.Field(x), r3.Scale(1e-8, r3.Sub(x, charge.At)))
		}), bareCharge, []law.Law{law.Divergence}},
		{"field of a current along z", changed(sphere, func(x r3.Vec, _ field.Side, v *field.Value) {
			v.G = r3.Add(v.G, r3.Scale(1e-9/(x.X*x.X+x.Y*x.Y), r3.Vec{X: -x.Y, Y: x.X}))
		}), sphereClaims(), []law.Law{law.Curl, law.Potential}},
		{"gradient transposed in its places", changed(dipole, func(_ r3.Vec, _ field.Side, v *field.Value) {
			v.Grad[4], v.Grad[5] = v.Grad[5], v.Grad[4]
		}), dipoleClaims(), []law.Law{law.Gradient}},
		{"gradient with a trace", changed(charge, func(_ r3.Vec, _ field.Side, v *field.Value) { v.Grad[0] *= 1 + 1e-6 }),
			chargeClaims(), []law.Law{law.Gradient}},
		{"estimate negative", changed(charge, func(_ r3.Vec, _ field.Side, v *field.Value) { v.ErrG = -v.ErrG }),
			chargeClaims(), []law.Law{law.Estimate}},
		{"state that moves on", counting{good, new(int)}, sphereClaims(), []law.Law{law.Repeatable}},
		{"last bit of batches", batched{good}, sphereClaims(), []law.Law{law.Batch}},
		{"inputs written to", grabby{good}, sphereClaims(), []law.Law{law.Untouched}},
		{"g depends on phi being asked for", skimpy{good}, sphereClaims(), []law.Law{law.NilArrays}},
		{"Evaluate and Field apart", twofold{good}, sphereClaims(), []law.Law{law.Agree}},
	} {
		t.Run(c.name, func(t *testing.T) {
			err := law.Source(c.src, c.claims)
			var broken []law.Law
			for _, v := range law.Violations(err) {
				if !slices.Contains(broken, v.Law) {
					broken = append(broken, v.Law)
				}
			}
			for _, want := range c.laws {
				named[want] = true
				if !slices.Contains(broken, want) {
					t.Errorf("law not named: %q\nbroken: %q", want, broken)
				}
			}
			t.Logf("%d laws broken: %q", len(broken), broken)
		})
	}
}

// TestOneFaultOneLaw holds faults that break one law only against just that.
func TestOneFaultOneLaw(t *testing.T) {
	same := func(r3.Vec, field.Side, *field.Value) {}
	good := changed(sphere, same)
	for name, c := range map[string]struct {
		src    field.Source
		claims law.Claims
		law    law.Law
	}{
		"last bit of batches": {batched{good}, sphereClaims(), law.Batch},
		"sides exchanged": {formula(func(q field.Point, w field.Want, s field.Side) field.Value {
			return valueOf(sphere, q, w, [...]field.Side{field.Mean, field.Outside, field.Inside}[s])
		}), sphereClaims(), law.OneSide},
		"constant in phi": {changed(dipole, func(_ r3.Vec, _ field.Side, v *field.Value) { v.Phi++ }), dipoleClaims(), law.Vanishes},
		"estimate":        {changed(charge, func(_ r3.Vec, _ field.Side, v *field.Value) { v.ErrG = math.NaN() }), chargeClaims(), law.Estimate},
	} {
		for _, v := range law.Violations(law.Source(c.src, c.claims)) {
			if v.Law != c.law {
				t.Errorf("%s: also %v; want only %q", name, v, c.law)
			}
		}
	}
}

func TestMessage(t *testing.T) {
	claims := chargeClaims()
	claims.Total.Charge = 3
	err := law.Source(charge, claims)
	var v *law.Violation
	if !errors.As(err, &v) {
		t.Fatalf("error %v holds no *law.Violation", err)
	}
	for _, part := range []string{string(law.Charge), "(0.25, 0.5, -0.125)", "want 3", "tolerance", "accuracy", "seed 12"} {
		if !strings.Contains(v.Error(), part) {
			t.Errorf("message %q lacks %q", v.Error(), part)
		}
	}
	if again := law.Source(charge, claims); again.Error() != err.Error() {
		t.Errorf("two runs with one seed differ:\n%v\n%v", err, again)
	}
}

func TestClaimsRefused(t *testing.T) {
	inf := math.Inf(1)
	for name, c := range map[string]law.Claims{
		"no length":       {},
		"accuracy":        {Region: box, Accuracy: 1},
		"endless bounds":  {Region: box, Bounds: r3.Box{Min: r3.Vec{X: -inf}, Max: r3.Vec{X: inf}}},
		"normal":          {Region: box, Faces: []law.Face{{Normal: r3.Vec{X: 2}}}},
		"inverted region": {Region: r3.Box{Min: r3.Vec{X: math.NaN()}}},
	} {
		if err := law.Source(charge, c); err == nil || len(law.Violations(err)) > 0 {
			t.Errorf("%s: error %v, want one about the claims", name, err)
		}
	}
}
