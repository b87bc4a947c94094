package force

import (
	"context"
	"errors"
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/element"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// On returns what the field of others does to bound charge. The charge itself is left out if it is among the others; its image in
// a plane (package image) is not.
//
// Domain: any body with charts and blocks; others may be a bound.Charge, bound.Assembly, field.Sum, field.Scaled, field.Constant,
// point or dipole, image.Image or any other source. A source that is no field.Evaluator has no estimate, and neither has the result: +Inf.
// Singular: the force between bodies is finite also in contact; the stiffness is not where edges touch.
// Accuracy: Result.Error bounds the error; it is at most Settings.Accuracy of the value, see there, or ErrNotConverged is returned
// with the best result. Bodies that stand in each other: an error that wraps ErrOverlap.
func On(ctx context.Context, c *bound.Charge, others field.Source, s *Settings) (Result, error) {
	set, err := s.checked()
	if err != nil {
		return Result{}, err
	}
	if c == nil || others == nil {
		return Result{}, errors.New("force: charge or others is nil; give both")
	}
	p, ok := partOf(c)
	all := apart(others, c)
	if !set.Overlaps {
		if err := overlaps(c, all); err != nil {
			return Result{}, err
		}
	}
	if !ok && !simple(all) {
		return Result{}, fmt.Errorf("force: %T has a face or cell without charts or blocks; give its surface the method Charts", c.Body())
	}
	return act(ctx, &p, all, set)
}

// OnSheet returns what the field of others does to a charged sheet; density is the charge per area at a point of it, in the frame of
// the sheet and the others.
func OnSheet(ctx context.Context, sheet geom.Sheet, density func(x r3.Vec) float64, others field.Source, s *Settings) (Result, error) {
	set, err := s.checked()
	if err != nil {
		return Result{}, err
	}
	if sheet == nil || density == nil || others == nil {
		return Result{}, errors.New("force: sheet, density or others is nil; give all")
	}
	if err := sheet.Check(); err != nil {
		return Result{}, err
	}
	charted, ok := sheet.(geom.Charted)
	if !ok || len(charted.Charts()) == 0 {
		return Result{}, fmt.Errorf("force: sheet %T has no charts; give it the method Charts", sheet)
	}
	p := part{faces: []face{{surface: sheet, charts: charted.Charts(), sign: 1, density: func(x, _ r3.Vec) float64 { return density(x) }}}}
	p.centre, p.reach = ballOf(sheet.Bounds())
	return act(ctx, &p, apart(others, nil), set)
}

// OnPoint returns what the field of others does to a point charge.
func OnPoint(q element.Point, others field.Source, s *Settings) (Result, error) {
	return onPoint(q.At, others, s, func(v *field.Value, r r3.Vec, stiff bool) (t sums) {
		t.charge(q.Charge, r, v, stiff)
		return t
	})
}

// OnDipole returns what the field of others does to a point dipole. It has no stiffness: that needs the second derivatives of g,
// which sources do not give.
func OnDipole(d element.Dipole, others field.Source, s *Settings) (Result, error) {
	return onPoint(d.At, others, s, func(v *field.Value, r r3.Vec, _ bool) (t sums) {
		t.dipole(d.Moment, r, v)
		return t
	})
}

func onPoint(x r3.Vec, others field.Source, s *Settings, add func(v *field.Value, r r3.Vec, stiff bool) sums) (Result, error) {
	set, err := s.checked()
	if err != nil {
		return Result{}, err
	}
	if others == nil {
		return Result{}, errors.New("force: others is nil; give a source")
	}
	want := field.WantPhi | field.WantG | field.WantErr | field.WantGrad
	v := field.At(others, x, field.Mean, want)
	switch v.Status {
	case field.OnEdge, field.AtPoint, field.BadInput:
		return Result{}, fmt.Errorf("force: the point %v is %v of the others; move it", x, v.Status)
	}
	var lacks sums
	lacks.note(&v)
	t := add(&v, r3.Sub(x, set.About), set.Stiffness)
	t.mute, t.dark = lacks.mute, lacks.dark
	o := outcome{total: t, error: least(&t), nodes: 1, met: true}
	return o.result(set.Stiffness), nil
}

// result dresses an outcome.
func (o *outcome) result(stiff bool) Result {
	r := Result{Force: r3.Add(o.total.force(), r3.Vec{}), Torque: r3.Add(o.total.torque(), r3.Vec{}), Energy: o.total.v[atEnergy] + 0, Nodes: o.nodes,
		Size: o.total.size, Error: Bounds{o.error[0], o.error[1], o.error[2], o.error[3]}}
	if stiff {
		r.Stiffness = o.total.stiffness()
	}
	if o.total.mute {
		inf := math.Inf(1)
		r.Error = Bounds{inf, inf, inf, inf}
	}
	if o.total.dark {
		r.Energy, r.Error.Energy = math.NaN(), math.Inf(1)
	}
	return r
}

// act adds what all others do. Where their shares cancel, each is asked for once more, more closely.
func act(ctx context.Context, p *part, all []other, set Settings) (Result, error) {
	g := goal{accuracy: set.Accuracy, stiff: set.Stiffness, reach: p.reach}
	each := g
	var sum outcome
	for range 2 {
		sum = outcome{met: true}
		for i := range all {
			o, err := share(ctx, p, &all[i], each, set)
			if err != nil {
				return Result{}, err
			}
			sum.total.add(&o.total, all[i].factor)
			sum.met = sum.met && (o.met || len(all) > 1)
			for k, e := range o.error {
				sum.error[k] += math.Abs(all[i].factor) * e
			}
			sum.nodes += o.nodes
		}
		tol := g.allowed(&sum.total)
		worst := 1.0
		for k, e := range sum.error {
			worst = min(worst, tol[k]/e)
		}
		sum.met = sum.met && g.met(&sum.total, sum.error, least(&sum.total))
		if sum.met || len(all) < 2 || worst < 1e-6 {
			break
		}
		each.accuracy = max(0.5*worst*set.Accuracy, 1e-15)
	}
	r := sum.result(set.Stiffness)
	if !sum.met {
		return r, fmt.Errorf("force: %w", ErrNotConverged)
	}
	return r, nil
}
