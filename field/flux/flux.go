// Package flux integrates what sources make over surfaces: the flux through an area, the mean that a sensor reads, the
// charge within a closed surface.
//
// Natural units: g in the units of a polarization, lengths free, so a flux has the unit of g times an area. Frames are
// right-handed; a flux counts along the surface's own normal. Values come with an estimate of their error, which counts the
// integration and the estimates of the source. Functions are safe for concurrent use, and the same bits result on every run.
//
// It does not follow time: what moves through a loop induces by differences of flux.
package flux

import (
	"container/heap"
	"context"
	"errors"
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/cubature"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// ErrNotConverged is returned with the best value where the accuracy was not reached within the cap on work.
var ErrNotConverged = errors.New("flux: not converged; ask for less accuracy, or move the area off edges of bodies")

// Integrand computes a value and a bound on its error at each point x[i] with the surface's unit normal n[i]; len(value) ==
// len(err) == len(x) == len(n).
type Integrand func(x, n []r3.Vec, value, err []float64)

// Settings says how well and how long to integrate; the zero value is the default.
type Settings struct {
	Accuracy float64 // of the integral of |f|, relative; default 1e-10
	Panels   int     // most panels; default 4000
	Edges    bool    // f is singular at the edges of the surface: draw the nodes towards those of its charts
}

func (s Settings) accuracy() float64 {
	if s.Accuracy > 0 {
		return s.Accuracy
	}
	return 1e-10
}

func (s Settings) panels() int {
	if s.Panels > 0 {
		return s.Panels
	}
	return 4000
}

// Result is an integral with an estimate of its error.
type Result struct {
	Value    float64
	Estimate float64 // of the error of Value, absolute
	Size     float64 // integral of |f|
	Panels   int
}

// Through returns the flux of g through a surface along its normal.
func Through(ctx context.Context, src field.Source, s geom.Charted, side field.Side, set Settings) (Result, error) {
	return Over(ctx, s, Normal(src, side), set)
}

// Mean returns the mean over a surface of the component of g along its normal: what a sensor of that area reads.
func Mean(ctx context.Context, src field.Source, s geom.Charted, side field.Side, set Settings) (Result, error) {
	r, err := Through(ctx, src, s, side, set)
	area := s.Area()
	r.Value, r.Estimate, r.Size = r.Value/area, r.Estimate/area, r.Size/area
	return r, err
}

// Normal returns the integrand g.n of a source.
func Normal(src field.Source, side field.Side) Integrand {
	return func(x, n []r3.Vec, value, err []float64) {
		at := field.PointsOf(x...)
		v := field.NewValues(len(x), field.WantG|field.WantErr)
		field.Evaluate(src, v, at, side)
		for i := range x {
			g := v.At(i)
			value[i], err[i] = r3.Dot(g.G, n[i]), g.ErrG
		}
	}
}

// Over integrates f over a surface, adaptively: the panel with the greatest difference between two Gauss rules is cut
// across the direction in which it is rougher, until the sum of the differences is within the accuracy.
//
// Units: those of f times length^2.
// Frame: that of the surface.
// Domain: integrands that are finite almost everywhere; else an error says where f is not.
// Singular: integrable singularities cost panels; a panel with a node at which f is not finite is cut, so that points and
// lines without a value do no harm.
// Accuracy: Estimate is the sum of the differences between rules of 8 and 11 points a direction, whose larger one is far
// better than that, and of the integral of the errors of f.
// Source: globally adaptive product rules, a standard method, [Own].
func Over(ctx context.Context, s geom.Charted, f Integrand, set Settings) (Result, error) {
	w := &work{f: f}
	charts := s.Charts()
	if len(charts) == 0 {
		return Result{}, fmt.Errorf("flux: a %T has no charts; use a surface that is Charted", s)
	}
	for _, c := range charts {
		if set.Edges {
			c = drawn{c}
		}
		if err := w.add(panel{chart: c, u1: 1, v1: 1}); err != nil {
			return w.result(), err
		}
	}
	for next := 0; ; {
		if len(w.panels) < next {
			if err := w.split(); err != nil {
				return w.result(), err
			}
			continue
		}
		next = min(len(w.panels)+len(w.panels)/16+1, set.panels()) // sums cost as much as there are panels
		r := w.result()
		if r.Estimate-w.noise() <= set.accuracy()*r.Size || w.panels[0].difference == 0 {
			return r, nil
		}
		if len(w.panels) >= set.panels() {
			return r, ErrNotConverged
		}
		if err := ctx.Err(); err != nil {
			return r, fmt.Errorf("flux: stopped after %d panels: %w", len(w.panels), err)
		}
	}
}

// drawn is a chart whose parameters are drawn towards the edges of the square, u = t^3 (10 - 15 t + 6 t^2) and v alike: a
// singularity d log d there becomes one of t^8 log t under the integral.
type drawn struct{ chart geom.Chart }

// At returns the point of the parameters and its derivatives by them.
func (d drawn) At(u, v float64) (x, xu, xv r3.Vec) {
	u, du := draw(u)
	v, dv := draw(v)
	x, xu, xv = d.chart.At(u, v)
	return x, r3.Scale(du, xu), r3.Scale(dv, xv)
}

// draw returns u and du/dt.
func draw(t float64) (u, du float64) {
	return t * t * t * (10 + t*(6*t-15)), 30 * t * t * (1 - t) * (1 - t)
}

// panel is a rectangle of the unit square of a chart, with its integrals.
type panel struct {
	chart          geom.Chart
	u0, v0, u1, v1 float64
	value, size    float64
	difference     float64 // between the two rules
	noise          float64 // integral of the errors of f
	acrossU        bool    // the rougher direction is u
}

// halves cuts the panel.
func (p panel) halves() (a, b panel) {
	a = panel{chart: p.chart, u0: p.u0, v0: p.v0, u1: p.u1, v1: p.v1}
	b = a
	if p.acrossU {
		a.u1 = p.u0 + (p.u1-p.u0)/2
		b.u0 = a.u1
	} else {
		a.v1 = p.v0 + (p.v1-p.v0)/2
		b.v0 = a.v1
	}
	return a, b
}

// queue is a heap of panels, the worst first.
type queue []panel

func (q queue) Len() int           { return len(q) }
func (q queue) Less(i, j int) bool { return q[i].difference > q[j].difference }
func (q queue) Swap(i, j int)      { q[i], q[j] = q[j], q[i] }
func (q *queue) Push(p any)        { *q = append(*q, p.(panel)) }
func (q *queue) Pop() any {
	old := *q
	p := old[len(old)-1]
	*q = old[:len(old)-1]
	return p
}

const coarse, fine = 8, 11 // points a direction; no node in common

// work is an integration that goes on.
type work struct {
	f          Integrand
	panels     queue
	x, n       []r3.Vec
	scale      []float64 // area of a node
	value, err []float64
}

// result sums over the panels in the order of the heap, which is the same on every run.
func (w *work) result() Result {
	r := Result{Panels: len(w.panels)}
	for _, p := range w.panels {
		r.Value += p.value
		r.Size += p.size
		r.Estimate += p.difference
	}
	const u = 0x1p-53
	r.Estimate += w.noise() + 8*u*r.Size // sums of a hundred terms of one sign a panel
	return r
}

// noise returns the integral of the errors of f.
func (w *work) noise() float64 {
	var sum float64
	for _, p := range w.panels {
		sum += p.noise
	}
	return sum
}

// add integrates a panel by both rules and puts it in the queue.
func (w *work) add(p panel) error {
	high, low := cubature.Legendre(fine), cubature.Legendre(coarse)
	if w.sample(p, high) >= 0 {
		return w.cut(p)
	}
	var bendU, bendV float64
	at := func(i, j int) float64 { return w.value[i*fine+j] * w.scale[i*fine+j] / (high.W[i] * high.W[j]) }
	for i := range fine {
		for j := range fine {
			k := i*fine + j
			p.value += w.value[k] * w.scale[k]
			p.size += math.Abs(w.value[k]) * w.scale[k]
			p.noise += w.err[k] * w.scale[k]
			if i > 0 && i < fine-1 {
				bendU += math.Abs(at(i-1, j) - 2*at(i, j) + at(i+1, j))
			}
			if j > 0 && j < fine-1 {
				bendV += math.Abs(at(i, j-1) - 2*at(i, j) + at(i, j+1))
			}
		}
	}
	p.acrossU = bendU >= bendV
	if w.sample(p, low) >= 0 {
		return w.cut(p)
	}
	var other float64
	for k := range w.value {
		other += w.value[k] * w.scale[k]
	}
	p.difference = math.Abs(p.value - other)
	heap.Push(&w.panels, p)
	return nil
}

// split cuts the worst panel in two.
func (w *work) split() error {
	a, b := heap.Pop(&w.panels).(panel).halves()
	if err := w.add(a); err != nil {
		return err
	}
	return w.add(b)
}

// cut adds the quarters of a panel that has a node without a value, or returns an error where the panel is small already.
func (w *work) cut(p panel) error {
	const smallest = 1.0 / 256
	if p.u1-p.u0 < smallest {
		k := w.sample(p, cubature.Legendre(fine))
		if k < 0 {
			k = w.sample(p, cubature.Legendre(coarse))
		}
		return fmt.Errorf("flux: the integrand is %v at %v and around; move the area off edges and point sources", w.value[k], w.x[k])
	}
	p.acrossU = true
	a, b := p.halves()
	for _, half := range []panel{a, b} {
		half.acrossU = false
		c, d := half.halves()
		if err := w.add(c); err != nil {
			return err
		}
		if err := w.add(d); err != nil {
			return err
		}
	}
	return nil
}

// sample computes f and areas at the nodes of a product rule, u slowest. It returns the first node at which f is not
// finite, else -1.
func (w *work) sample(p panel, rule cubature.Rule) int {
	w.x, w.n, w.scale = w.x[:0], w.n[:0], w.scale[:0]
	du, dv := (p.u1-p.u0)/2, (p.v1-p.v0)/2
	for i, s := range rule.X {
		for j, t := range rule.X {
			x, xu, xv := p.chart.At(p.u0+du*(1+s), p.v0+dv*(1+t))
			area := r3.Cross(xu, xv)
			size := r3.Norm(area)
			w.x, w.n = append(w.x, x), append(w.n, r3.Scale(1/size, area))
			w.scale = append(w.scale, size*du*dv*rule.W[i]*rule.W[j])
		}
	}
	w.value, w.err = resized(w.value, len(w.x)), resized(w.err, len(w.x))
	w.f(w.x, w.n, w.value, w.err)
	for k, v := range w.value {
		if math.IsNaN(v) || math.IsInf(v, 0) {
			return k
		}
	}
	return -1
}

// resized returns a slice of n elements, a if it is long enough.
func resized(a []float64, n int) []float64 {
	if cap(a) < n {
		return make([]float64, n)
	}
	return a[:n]
}
