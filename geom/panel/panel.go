// Package panel cuts the boundary of a body into four-sided panels for boundary integral equations.
//
// A panel is a rectangle of one of the body's own charts (geom.Charted), so that panels lie exactly on the boundary, leave
// no gaps, and carry no error of shape. Towards edges, tips and rims of the body, where the charge of a responding body
// grows without bound, the parameters are graded: the distance from the edge is the cube of the parameter, so that what
// goes like the distance to the power 2/3 (the potential at the edge of a cube of metal) is a polynomial in the parameter.
//
// Units: those of the body's lengths. Frame: that of the body. Normals point out of the body. Panels are immutable and
// safe for concurrent use.
//
// The package knows no charge. It does not cut surfaces without charts, and does not look for corners that no side of a
// chart ends in.
package panel

import (
	"errors"
	"fmt"
	"math"

	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Panel is a piece of the boundary over the unit square of the parameters s and t.
type Panel struct {
	Face  int  // index into Faces of the body
	Plane bool // the face is plane, and so is every other panel of the face, in the same plane
	Part  int  // which connected part of the boundary: the outer one or the wall of a cavity
	chart geom.Chart
	sign  float64
	axes  [2]axis
}

// At returns the point of the parameters 0 <= s, t <= 1 and its derivatives by them. The outward normal has the direction
// of xs x xt.
func (p *Panel) At(s, t float64) (x, xs, xt r3.Vec) {
	u, us := p.axes[0].at(s)
	v, vt := p.axes[1].at(t)
	x, xu, xv := p.chart.At(u, v)
	return x, r3.Scale(us, xu), r3.Scale(p.sign*vt, xv)
}

// Point returns the point alone.
func (p *Panel) Point(s, t float64) r3.Vec {
	u, _ := p.axes[0].at(s)
	v, _ := p.axes[1].at(t)
	x, _, _ := p.chart.At(u, v)
	return x
}

// Edged reports whether the panel is graded towards an edge, whether or not it reaches the edge.
func (p *Panel) Edged() bool { return p.axes[0].graded != 0 || p.axes[1].graded != 0 }

// Halves cuts the panel in the middle of a parameter: 0 for s, 1 for t.
func (p *Panel) Halves(along int) [2]*Panel {
	low, high := *p, *p
	a := p.axes[along]
	middle := (a.low + a.high) / 2
	low.axes[along].high, high.axes[along].low = middle, middle
	return [2]*Panel{&low, &high}
}

// Lengths returns the lengths of the middle lines along s and t, as broken lines of four pieces.
func (p *Panel) Lengths() [2]float64 {
	var sum [2]float64
	for along := range sum {
		last := p.on(along, 0)
		for k := 1; k <= 4; k++ {
			x := p.on(along, float64(k)/4)
			sum[along] += r3.Norm(r3.Sub(x, last))
			last = x
		}
	}
	return sum
}

// on returns a point of a middle line.
func (p *Panel) on(along int, s float64) r3.Vec {
	if along == 0 {
		return p.Point(s, 0.5)
	}
	return p.Point(0.5, s)
}

// turning returns the angle between the tangents near the two ends of a middle line.
func (p *Panel) turning(along int) float64 {
	var ends [2]r3.Vec
	for k, s := range [2]float64{1e-3, 1 - 1e-3} {
		if along == 0 {
			_, ends[k], _ = p.At(s, 0.5)
		} else {
			_, _, ends[k] = p.At(0.5, s)
		}
	}
	return math.Atan2(r3.Norm(r3.Cross(ends[0], ends[1])), r3.Dot(ends[0], ends[1]))
}

// axis maps a parameter to one of the chart.
type axis struct {
	from, to  float64 // ends in the chart, of the whole graded stretch
	low, high float64 // the part of the stretch that the panel covers, before grading
	graded    int     // -1: towards from, +1: towards to, 0: not graded
}

// at returns the chart's parameter and its derivative.
func (a axis) at(s float64) (u, du float64) {
	wide := a.high - a.low
	s = a.low + s*wide
	length := a.to - a.from
	switch a.graded {
	case -1:
		return a.from + length*s*s*s, 3 * length * s * s * wide
	case 1:
		s = 1 - s
		return a.to - length*s*s*s, 3 * length * s * s * wide
	}
	return a.from + length*s, length * wide
}

// Settings says how finely to cut.
type Settings struct {
	Turn   float64 // largest angle that a panel may turn through, in radians; 0: 0.9
	Aspect float64 // largest ratio of the lengths of a panel longer than half the size of the body; 0: 6. Others: five times that
	Plain  bool    // not graded towards edges
	Halve  int     // how many times to halve every panel in both directions beside; 0: not
}

// ErrCharts is wrapped by the error for a face that has no charts.
var ErrCharts = errors.New("surface without charts")

// Of returns the panels of a body, in the order of its faces.
//
// It fails where the body's Check fails and, with ErrCharts, where a face has no charts.
func Of(body geom.Body, set Settings) ([]*Panel, error) {
	if err := body.Check(); err != nil {
		return nil, fmt.Errorf("panel: %w", err)
	}
	if set.Turn <= 0 {
		set.Turn = 0.9
	}
	if set.Aspect <= 0 {
		set.Aspect = 6
	}
	var whole []*Panel
	for k, f := range body.Faces() {
		s, ok := f.Surface.(geom.Charted)
		if !ok || len(s.Charts()) == 0 {
			return nil, fmt.Errorf("panel: face %d (%s) is a %T: %w; give a surface with Charts, for example a Patch", k, f.Name, f.Surface, ErrCharts)
		}
		for _, c := range s.Charts() {
			unit := axis{from: 0, to: 1, low: 0, high: 1}
			p := &Panel{Face: k, chart: c, sign: 1, axes: [2]axis{unit, unit}}
			if f.Inward {
				p.sign = -1
			}
			whole = append(whole, p)
		}
	}
	b := body.Bounds()
	size := r3.Norm(r3.Sub(b.Max, b.Min)) / 2
	markPlanes(whole, size)
	join(whole, size)
	var cut []*Panel
	for _, p := range whole {
		parts := []*Panel{p}
		if !set.Plain {
			parts = p.grade(body, size)
		}
		for _, q := range parts {
			cut = q.refine(cut, set, size, set.Halve)
		}
	}
	return cut, nil
}

// grade cuts a whole chart so that every panel is graded at one end of a parameter at most: where a side is an edge.
func (p *Panel) grade(body geom.Body, size float64) []*Panel {
	parts := []*Panel{p}
	for along := range p.axes {
		var edge [2]bool
		for k := range edge {
			x := p.on(along, float64(k))
			edge[k] = body.Locate(pair.VecOf(x), 1e-9*size).Edge
		}
		var next []*Panel
		for _, q := range parts {
			next = append(next, q.graded(along, edge)...)
		}
		parts = next
	}
	return parts
}

// graded grades one parameter towards the ends that are edges.
func (p *Panel) graded(along int, edge [2]bool) []*Panel {
	with := func(from, to float64, graded int) *Panel {
		q := *p
		q.axes[along] = axis{from: from, to: to, low: 0, high: 1, graded: graded}
		return &q
	}
	switch {
	case edge[0] && edge[1]:
		return []*Panel{with(0, 0.5, -1), with(0.5, 1, 1)}
	case edge[0]:
		return []*Panel{with(0, 1, -1)}
	case edge[1]:
		return []*Panel{with(0, 1, 1)}
	}
	return []*Panel{p}
}

// refine appends the panel, cut until it is as the settings want it.
func (p *Panel) refine(list []*Panel, set Settings, size float64, halve int) []*Panel {
	l := p.Lengths()
	aspect := set.Aspect
	if max(l[0], l[1]) < size/2 {
		aspect *= 5
	}
	along := -1
	switch {
	case p.turning(0) > set.Turn:
		along = 0
	case p.turning(1) > set.Turn:
		along = 1
	case l[0] > aspect*l[1]:
		along = 0
	case l[1] > aspect*l[0]:
		along = 1
	}
	if along >= 0 {
		for _, q := range p.Halves(along) {
			list = q.refine(list, set, size, halve)
		}
		return list
	}
	if halve == 0 {
		return append(list, p)
	}
	for _, q := range p.Halves(0) {
		for _, r := range q.Halves(1) {
			list = r.refine(list, set, size, halve-1)
		}
	}
	return list
}
