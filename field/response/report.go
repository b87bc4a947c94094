package response

import (
	"context"
	"errors"
	"math"

	"example.com/boundpole/field"
)

// Report says how the solution went.
type Report struct {
	Unknowns [3]int     // of the three meshes
	Steps    [3]int     // of the iteration
	Residual [3]float64 // relative
	Trend    float64    // how much less the finest two meshes differ than the coarser two, in field and density together
	Density  float64    // what the densities of the finest two differ by: the integral of |difference| over that of |sigma|
	Leak     float64    // largest |charge - the charge it is to have| of a body over the integral of |sigma| over it
}

func (r *Response) report() {
	for k := range r.layers {
		r.Report.Unknowns[k] = len(r.system.levels[k].x)
		r.Report.Steps[k], r.Report.Residual[k] = r.layers[k].steps, r.layers[k].residual
	}
	r.Report.Trend = r.trend.observed
	if r.density > 0 {
		r.Report.Density = r.differ(2) / (r.density * r.size * r.size)
	}
	for body, m := range r.materials {
		net, all := -m.Charge, 0.0
		for c, p := range r.system.parts {
			if p.body == body {
				r.system.nodesOf(&r.system.levels[2], c, func(i int) {
					net += r.layers[2].charge[i]
					all += math.Abs(r.layers[2].charge[i])
				})
			}
		}
		if all > 0 {
			r.Report.Leak = max(r.Report.Leak, math.Abs(net)/all)
		}
	}
}

// Reciprocity returns two integrals that are equal for every response: of the charge that the field a induces times the
// potential of b, and of that which b induces times the potential of a. They share no right side, so that what they differ by
// tells of the meshes.
//
// Units: charge times potential.
// Domain: materials without fixed parts, charges and axes; fields with a potential.
func (s *System) Reciprocity(ctx context.Context, materials []Material, a, b field.Source) (ab, ba Value, err error) {
	for _, m := range materials {
		if m.Fixed != nil || m.Charge != 0 || (m.Axis != Material{}.Axis) {
			return ab, ba, errors.New("response: reciprocity is of what fields induce; leave Fixed, Charge and Axis zero")
		}
	}
	first, err := s.Solve(ctx, materials, a)
	if err != nil {
		return ab, ba, err
	}
	second, err := s.Solve(ctx, materials, b)
	if err != nil {
		return ab, ba, err
	}
	return first.times(b), second.times(a), nil
}

// times returns the integral of the induced charge times the potential of a source.
func (r *Response) times(src field.Source) Value {
	var w [3]float64
	for k := range w {
		l := &r.system.levels[k]
		v := field.NewValues(len(l.x), field.WantPhi)
		field.Evaluate(src, v, field.PointsOf(l.x...), field.Outside)
		for i, q := range r.layers[k].charge {
			w[k] += q * v.Phi[i]
		}
	}
	if math.IsNaN(w[2]) {
		return Value{math.NaN(), math.Inf(1)}
	}
	return r.trend.limit(w)
}
