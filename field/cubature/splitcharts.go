package cubature

import (
	"fmt"
	"math"

	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// resolved is the relative error of interpolation below which a panel is left whole: a Gauss rule with as many points squares
// it.
const resolved = 1e-9

// deepest is how often a parameter interval is halved towards a singularity.
const deepest = 60

// splitCharts cuts charts until place and density are smooth on every panel, or there are most panels.
func splitCharts(charts []geom.Chart, density func(x, n r3.Vec) float64, most int) ([]*panel, error) {
	line := newLineRule()
	var done []*panel
	var open []*panel
	for i, c := range charts {
		if c == nil {
			return nil, fmt.Errorf("cubature: chart %d is nil; give a geom.Chart", i)
		}
		open = append(open, &panel{chart: c, density: density, index: i, hi: [2]float64{1, 1}})
	}
	peak := 0.0
	for len(open) > 0 {
		p := open[0]
		open = open[1:]
		p.measure()
		axis, defect, err := p.rough(line, &peak)
		if err != nil {
			return nil, err
		}
		if axis >= 0 && len(done)+len(open)+2 <= most && p.hi[axis]-p.lo[axis] > math.Ldexp(1, -deepest) {
			a, b := p.halves(axis)
			open = append(open, a, b)
			continue
		}
		p.loose = defect
		done = append(done, p)
	}
	return done, nil
}

func (p *panel) halves(axis int) (a, b *panel) {
	middle := p.lo[axis] + (p.hi[axis]-p.lo[axis])/2
	a = &panel{chart: p.chart, density: p.density, index: p.index, lo: p.lo, hi: p.hi}
	b = &panel{chart: p.chart, density: p.density, index: p.index, lo: p.lo, hi: p.hi}
	a.hi[axis], b.lo[axis] = middle, middle
	return a, b
}

// rough returns the direction in which the panel has to be cut, -1 if it need not be, and the charge that is not resolved. peak
// is the greatest density so far.
func (p *panel) rough(line *lineRule, peak *float64) (axis int, loose float64, err error) {
	var worst [2]float64
	var turned [2]float64
	var bad error
	for axis := range 2 {
		for _, other := range [3]float64{-0.83, 0.07, 0.91} {
			var defect, size [7]float64
			var first, last r3.Vec
			begun := false
			line.defect(func(t float64, dst []float64) {
				var c [2]float64
				c[axis] = between(p.lo[axis], p.hi[axis], t)
				c[1-axis] = between(p.lo[1-axis], p.hi[1-axis], other)
				x, n, q := p.at(c[0], c[1])
				if a := r3.Norm(n); a > 0 {
					p.peak = max(p.peak, math.Abs(q)/a)
				}
				if bad == nil && (q-q != 0 || n.X-n.X+n.Y-n.Y+n.Z-n.Z != 0 || x.X-x.X+x.Y-x.Y+x.Z-x.Z != 0) {
					bad = fmt.Errorf("cubature: chart %d at (%v, %v): place %v, area %v, density times area %v; all must be finite",
						p.index, c[0], c[1], x, n, q)
				}
				if !begun {
					first, begun = n, true
				}
				last = n
				d := r3.Scale(1/p.radius, r3.Sub(x, p.centre))
				copy(dst, []float64{d.X, d.Y, d.Z, n.X, n.Y, n.Z, q})
			}, defect[:], size[:])
			a := max(size[3], size[4], size[5])
			place := max(defect[0], defect[1], defect[2])
			worst[axis] = max(worst[axis], place-4*u*p.scale/p.radius)
			*peak = max(*peak, p.peak)
			if a > 0 {
				worst[axis] = max(worst[axis], max(defect[3], defect[4], defect[5])/a)
			}
			if size[6] > 0 {
				worst[axis] = max(worst[axis], defect[6]/max(size[6], 1e-3*a**peak))
			}
			turned[axis] = max(turned[axis], 1-r3.Cos(first, last))
		}
	}
	if bad != nil {
		return -1, 0, bad
	}
	axis = 0
	if worst[1] > worst[0] {
		axis = 1
	}
	if worst[axis] > resolved {
		return axis, worst[axis] * p.charge, nil
	}
	if turned[1] > turned[0] {
		axis = 1
	} else {
		axis = 0
	}
	if turned[axis] > 1.3 { // more than 107 degrees from end to end
		return axis, 0, nil
	}
	return -1, 0, nil
}
