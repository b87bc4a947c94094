package cubature

import (
	"errors"
	"fmt"
	"math"
	"sync"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Layer is the field of surface charge on charts.
//
// Units: natural; g in the unit of the density, phi in that times the unit of length.
// Frame: that of the charts.
// Domain: all finite x; sizes within 1e-60 and 1e60. NaN in, NaN out. Built by NewLayer; immutable.
// Singular: |g| grows as log(1/d) at distance d from a free edge and from an edge where the density or the tangent plane
// jumps; on it G is NaN, Phi finite, field.OnEdge. Charts that meet smoothly have no edge between them. On the face the mean
// of both sides, or the side asked for; Outside is where xu x xv points.
// Accuracy: |error| <= 1e-12 of the natural scale, sigma_max a min(1, a/R) for phi and sigma_max min(1, (a/R)^2) for g, a the
// bounding radius and R the distance from its centre, at every distance off the faces (TestSphereDistances); beside an edge at
// distance d add what the rounding of the chart does, u |x| sigma/d, unless a body's uniform part is taken out (Less). Estimates hold in 99.9 % of points (TestEstimates).
// Source: polar coordinates about the nearest point cancel 1/R ([Duffy1982]); the maps are those of [Johnston2005].
type Layer struct {
	panels []*panel
	cloud
}

// cloud is what layers and volumes have in common: bounds, far field, scale.
type cloud struct {
	settings Settings
	centre   r3.Vec
	radius   float64
	bounds   r3.Box
	scale    float64 // greatest coordinate
	peak     float64
	charge   float64 // integral of |density|
	loose    float64 // charge that is not resolved
	slip     float64 // relative error of the derivatives
	sum      pair.Float

	once   sync.Once
	far    *field.Moments // see expansion
	gather func(expand func(*nodeSet))
}

// NewLayer returns the field of a surface density on charts that meet at most in edges. The density is given the place and the
// chart's own unit normal there; it must be smooth except at edges of the charts, where it may be singular and integrable.
//
// A density or chart that could not be resolved with Settings.MaxPanels panels is no error: every estimate then includes what
// is not known (see Unresolved).
func NewLayer(charts []geom.Chart, density func(x, n r3.Vec) float64, s *Settings) (*Layer, error) {
	set, err := s.checked()
	if err != nil {
		return nil, err
	}
	if len(charts) == 0 || density == nil {
		return nil, errors.New("cubature: a layer needs at least one chart and a density")
	}
	panels, err := splitCharts(charts, density, set.MaxPanels)
	if err != nil {
		return nil, err
	}
	l := &Layer{panels: panels, cloud: cloud{settings: set}}
	for _, p := range panels {
		l.include(p.centre, p.radius, p.scale, p.peak, p.charge, p.loose)
		l.slip = max(l.slip, p.slip())
	}
	if !(l.radius > 1e-60 && l.scale < 1e60) {
		return nil, fmt.Errorf("cubature: charts of size %v at coordinates up to %v; scale to within 1e-60 and 1e60", l.radius, l.scale)
	}
	l.finish(func(visit func(x r3.Vec, radius float64)) {
		for _, p := range panels {
			visit(p.centre, p.radius)
		}
	})
	l.gather = func(expand func(*nodeSet)) {
		for _, p := range panels {
			expand(p.nodes(measured))
		}
	}
	return l, nil
}

// Charge returns the total charge and the bound on its error.
func (l *Layer) Charge() (charge, estimate float64) { return l.total() }

// Rule visits the points of the rule that measures the charge, with the unit normal and the piece of area of each.
func (l *Layer) Rule(visit func(x, n r3.Vec, area float64)) {
	for _, p := range l.panels {
		set := p.nodes(measured)
		for i, a := range set.area {
			if size := r3.Norm(a); size > 0 {
				visit(r3.Vec{X: set.x[i], Y: set.y[i], Z: set.z[i]}, r3.Scale(1/size, a), size)
			}
		}
	}
}

// Unresolved returns the charge that the panels do not resolve: zero for a smooth density.
func (l *Layer) Unresolved() float64 { return l.loose }

// Field returns g at x.
func (l *Layer) Field(x r3.Vec) r3.Vec {
	if x.X-x.X+(x.Y-x.Y)+(x.Z-x.Z) != 0 {
		return field.Nowhere(field.BadInput).G
	}
	return l.value(field.Point{X: pair.VecOf(x)}, field.Mean, field.WantG).G
}

// Evaluate computes the arrays of dst; see field.Evaluator.
func (l *Layer) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	field.Fill(dst, at, func(p field.Point, want field.Want) field.Value { return l.value(p, side, want) })
}

// Bounds returns a box that contains the charge.
func (l *Layer) Bounds() r3.Box { return l.bounds }

// Less evaluates at one point the density less that of a uniform polarization, less.n: to be added to the field of a body with that
// polarization which is known otherwise. Where p is that of the body at its point nearest to x, what is left vanishes there,
// and so does what the rounding of the charts would do beside an edge.
// The status is never NotConverged: what accuracy is enough, the whole tells.
func (l *Layer) Less(less r3.Vec, p field.Point, side field.Side, want field.Want) field.Value {
	return l.near(less, true, p, side, want)
}

// Nearest returns the point of the layer nearest to x, and its distance.
func (l *Layer) Nearest(x r3.Vec) (foot r3.Vec, distance float64) {
	distance = math.Inf(1)
	for _, p := range l.panels {
		if r3.Norm(r3.Sub(x, p.centre))-p.radius < distance {
			if f := p.foot(x); f.distance < distance {
				foot, distance = f.x, f.distance
			}
		}
	}
	return foot, distance
}

// value evaluates at one point.
func (l *Layer) value(p field.Point, side field.Side, want field.Want) field.Value {
	if l.isFar(p.X.Value()) {
		return l.farValue(p, want)
	}
	return l.near(r3.Vec{}, false, p, side, want)
}

// near evaluates at one point, without the expansion.
func (l *Layer) near(less r3.Vec, part bool, p field.Point, side field.Side, want field.Want) field.Value {
	x, low := p.X.Value(), p.X.Low()
	w := works.Get().(*work)
	defer works.Put(w)
	w.nodes = 0
	t := target{x: x, low: low, less: less, tol: l.tolerance(x, p.Slack), side: side, want: want}
	t.part = part
	v := l.close(w, &t)
	if t.hugs {
		l.gradient(w, &t, &v)
	}
	return v
}

// target is the point of one evaluation and what was found about it.
type target struct {
	x, low r3.Vec
	less   r3.Vec // uniform polarization whose charge is left out
	part   bool   // the whole judges the accuracy
	tol    float64
	side   field.Side
	want   field.Want
	status field.Status
	offset float64 // distance of the nearest panel, +Inf if none is near
	rim    float64 // distance of the nearest live edge, +Inf if none is near
	ends   float64 // greatest density that ends at a live edge near by
	away   r3.Vec  // unit vector from the nearest panel to x
	hugs   bool    // so near that the gradient is extrapolated
	plain  bool    // but must not be
	steep  float64 // distance below which that is done
}

// close sums the panels at a point that is not far from the whole.
func (l *Layer) close(w *work, t *target) field.Value {
	grad := t.want&field.WantGrad != 0
	var total sums
	var errs gap
	scale := l.natural(t.x)
	w.feet = w.feet[:0]
	for _, p := range l.panels {
		d := r3.Norm(r3.Sub(t.x, p.centre))
		if a, b, ok := rungs(d/p.radius, p.least, ladder[:]); ok {
			coarse, fine := p.nodes(a).sumLess(t.x, t.low, t.less, grad), p.nodes(b).sumLess(t.x, t.low, t.less, grad)
			e := apart(&coarse, &fine)
			if l.enough(&fine, &e, &scale, t.want) {
				total.add(&fine, 1)
				errs.add(e)
				errs.add(looseGap(p.loose, max(d-p.radius, 0.1*p.radius)))
				continue
			}
		}
		w.feet = append(w.feet, placedFoot{panel: p, foot: p.foot(t.x)})
	}
	l.place(w, t)
	want := t.want
	if want&field.WantGrad != 0 && t.status == field.Regular && !t.plain && t.offset < 1e-3*l.radius {
		t.steep = l.steep(w, t)
		t.hugs = t.offset < t.steep
	}
	if t.hugs || t.status != field.Regular {
		want &^= field.WantGrad
	}
	for i := range w.feet {
		f := &w.feet[i]
		s, e := l.nearPanel(w, f, t.less, want, &scale)
		total.add(&s, 1)
		errs.add(e)
		errs.add(looseGap(f.panel.loose, max(f.distance, 1e-3*f.panel.radius)))
	}
	v := total.value(errs, t.want)
	e := l.slipped(&scale, t.offset)
	v.ErrPhi, v.ErrG, v.ErrGrad = v.ErrPhi+e.phi, v.ErrG+e.g, v.ErrGrad+e.t
	l.onFace(w, t, &v)
	l.rounding(w, t, &v)
	if !t.part {
		l.judge(&v, &scale, t.want)
	}
	return v
}

// nearPanel raises the level until the two rules agree.
func (l *Layer) nearPanel(w *work, f *placedFoot, less r3.Vec, want field.Want, scale *gap) (s sums, e gap) {
	grad := want&field.WantGrad != 0
	last := gap{math.Inf(1), math.Inf(1), math.Inf(1)}
	for k := l.firstLevel(); k < len(levels); k++ {
		before := w.nodes
		a, b := w.near(f, less, k, 0, grad), w.near(f, less, k, 1, grad)
		d := apart(&a, &b)
		if d.g > 0.1*last.g && d.phi > 0.1*last.phi { // rounding, not convergence, is what is left
			if d.g < last.g {
				s, e = b, d
			}
			return s, e
		}
		s, e, last = b, d, d
		if l.enough(&b, &d, scale, want) || w.nodes+3*(w.nodes-before) > l.settings.MaxNodes {
			break
		}
	}
	return s, e
}

// firstLevel is where to begin.
func (c *cloud) firstLevel() int {
	if c.settings.Accuracy >= 1e-7 {
		return 0
	}
	return 1
}

// enough reports whether a gap is below a tenth of the accuracy asked for, or is rounding.
func (c *cloud) enough(s *sums, d, scale *gap, want field.Want) bool {
	tol := 4 * math.Pi * 0.002 * c.settings.Accuracy
	if c.firstLevel() == 0 {
		tol *= 10
	}
	ok := d.phi <= max(tol*scale.phi, 16*u*s.phiSize)
	if want&(field.WantG|field.WantGrad) != 0 {
		ok = ok && d.g <= max(tol*scale.g, 16*u*s.gSize)
	}
	if want&field.WantGrad != 0 {
		ok = ok && d.t <= max(tol*scale.t, 16*u*s.tSize)
	}
	return ok
}

// looseGap returns what an unknown charge may do at distance d, as a gap (of which ten times is taken).
func looseGap(charge, d float64) gap {
	if charge == 0 {
		return gap{}
	}
	return gap{0.1 * charge / d, 0.1 * charge / (d * d), 0.2 * charge / (d * d * d)}
}
