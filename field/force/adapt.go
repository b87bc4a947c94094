package force

import (
	"context"
	"math"
	"slices"
)

// rounding is what rounding adds to the errors, relative to the magnitudes.
const rounding = 16 * 0x1p-53

// goal says when a set of sums is good enough.
type goal struct {
	accuracy float64
	stiff    bool
	reach    float64
	only     [4]bool // which of force, torque, energy and stiffness count, if any is set
}

// floorOf is the part of the magnitudes below which a value is not asked for to its own accuracy.
const floorOf = 1e-6

// allowed returns the errors that are allowed for total.
func (g goal) allowed(total *sums) quad {
	v, size := total.values(g.reach, g.stiff), total.size.quad()
	var tol quad
	for k := range tol {
		tol[k] = g.accuracy * max(v[k], floorOf*size[k])
	}
	if !g.stiff {
		tol[3] = math.Inf(1)
	}
	if g.only != [4]bool{} {
		for k, on := range g.only {
			if !on {
				tol[k] = math.Inf(1)
			}
		}
	}
	return tol
}

// What is not within the accuracy asked for is accepted if the field claims no better and that is little, or if the value is zero
// within a small error, as it is by symmetry.
const (
	claimFloor = 1e-12 // of the magnitudes
	zeroFloor  = 1e-10
)

// met reports whether errors, of which low is what the field claims and rounding, are good enough for total.
func (g goal) met(total *sums, errors, low quad) bool {
	tol, v, size := g.allowed(total), total.values(g.reach, g.stiff), total.size.quad()
	for k, e := range errors {
		switch {
		case e <= tol[k]:
		case low[k] <= claimFloor*size[k] && e <= 3*low[k]:
		case v[k] <= 2*e && e <= zeroFloor*size[k]:
		default:
			return false
		}
	}
	return true
}

// least returns the errors below which only rounding is left: what the field claims, and the roundings of the sum.
func least(total *sums) quad {
	e, size := total.err.quad(), total.size.quad()
	for k := range e {
		e[k] += rounding * size[k]
	}
	return e
}

// outcome is an integral with its error.
type outcome struct {
	total sums
	error quad
	nodes int
	met   bool
}

// integrate integrates over a part in the field of src.
func integrate(ctx context.Context, p *part, w *work, g goal, most int) (outcome, error) {
	panels := p.panels()
	for i := range panels {
		w.measure(&panels[i], p.rho)
	}
	for {
		var o outcome
		var miss quad
		for i := range panels {
			o.total.add(&panels[i].value, 1)
			for k, e := range panels[i].miss {
				miss[k] += e
			}
		}
		tol, low := g.allowed(&o.total), least(&o.total)
		o.nodes = w.nodes
		bottom := true
		for k := range tol {
			o.error[k] = miss[k] + low[k]
			bottom = bottom && (o.error[k] <= tol[k] || miss[k] <= 2*low[k])
			tol[k] = max(tol[k]-low[k], 0.5*low[k], 1e-3*tol[k])
		}
		o.met = g.met(&o.total, o.error, low)
		if o.met || bottom || w.nodes >= most {
			return o, nil
		}
		if err := ctx.Err(); err != nil {
			return o, err
		}
		before := len(panels)
		panels = w.refine(panels, tol, p.rho, most)
		if len(panels) == before && w.nodes == o.nodes {
			return o, nil
		}
	}
}

// refine improves the panels that miss most, until what the others miss is half of what is allowed.
func (w *work) refine(panels []panel, tol quad, rho float64, most int) []panel {
	chosen := make([]bool, len(panels))
	order := make([]int, len(panels))
	for k := range tol {
		if math.IsInf(tol[k], 1) {
			continue
		}
		for i := range order {
			order[i] = i
		}
		slices.SortStableFunc(order, func(a, b int) int {
			switch x, y := panels[a].miss[k], panels[b].miss[k]; {
			case x < y:
				return -1
			case x > y:
				return 1
			}
			return 0
		})
		sum := 0.0
		for _, i := range order {
			sum += panels[i].miss[k]
			if !(sum <= 0.5*tol[k]) {
				chosen[i] = true
			}
		}
	}
	many := 0
	for _, c := range chosen {
		if c {
			many++
		}
	}
	var next []panel
	for i := range panels {
		p := &panels[i]
		switch {
		case !chosen[i] || w.nodes >= most:
			next = append(next, *p)
		case p.hopeful(tol, many):
			w.climb(p, rho)
			next = append(next, *p)
		default:
			a, b := p.halves()
			w.measure(&a, rho)
			w.measure(&b, rho)
			next = append(next, a, b)
		}
	}
	return next
}

// hopeful reports whether higher rules on the whole panel are likely to do, for a panel that is one of many: the relative miss of n
// points falls like a constant to the power n.
func (p *panel) hopeful(tol quad, many int) bool {
	if p.level+1 >= len(ladder) {
		return false
	}
	v := p.value.size.quad()
	top, n := float64(p.points(len(ladder)-1)), float64(p.points(p.level-1))
	for k := range p.miss {
		if math.IsInf(tol[k], 1) || v[k] == 0 || p.miss[k] <= tol[k]/float64(many) {
			continue
		}
		rel := p.miss[k] / v[k]
		if !(rel < 0.1) || n*math.Log(0.5*tol[k]/(float64(many)*v[k])) < top*math.Log(rel) {
			return false
		}
	}
	return true
}

// halves cuts the panel across its roughest direction.
func (p *panel) halves() (a, b panel) {
	a, b = *p, *p
	k := p.axis
	m := (p.lo[k] + p.hi[k]) / 2
	a.hi[k], b.lo[k] = m, m
	a.level, b.level = p.level-1, p.level-1
	return a, b
}

// panels returns the charts and blocks of the part, each as one panel.
func (p *part) panels() []panel {
	var all []panel
	for i := range p.faces {
		f := &p.faces[i]
		for _, c := range f.charts {
			all = append(all, panel{hi: [3]float64{1, 1, 1}, dim: 2, face: f, chart: c})
		}
	}
	for _, b := range p.blocks {
		for _, c := range b.blocks {
			all = append(all, panel{hi: [3]float64{1, 1, 1}, dim: 3, solid: c, dense: b.density})
		}
	}
	return all
}
