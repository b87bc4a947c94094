package cubature

import (
	"errors"
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Volume is the field of volume charge in blocks.
//
// Units: natural; g in the unit of the density times length, phi in that times length.
// Frame: that of the blocks.
// Domain: all finite x; sizes within 1e-60 and 1e60. NaN in, NaN out. Built by NewVolume; immutable.
// Singular: nowhere; only the gradient jumps where the density does, and has no claim on the boundary.
// Accuracy: |error| <= 1e-12 of the natural scale, rho_max a^2 min(1, a/R) for phi and rho_max a min(1, (a/R)^2) for g, inside,
// outside and on the boundary (TestVolumeForms). Estimates hold in 99.9 % of points (TestEstimates).
// Source: pyramids about the target as in [Duffy1982]; the maps are those of [Johnston2005].
type Volume struct {
	cells []*cell
	cloud
}

// NewVolume returns the field of a volume density in blocks that meet at most in faces. The density is asked inside the blocks
// only, and must be smooth there.
//
// A density or block that could not be resolved with Settings.MaxPanels cells is no error: every estimate then includes what is
// not known (see Unresolved).
func NewVolume(blocks []geom.Block, density func(x r3.Vec) float64, s *Settings) (*Volume, error) {
	set, err := s.checked()
	if err != nil {
		return nil, err
	}
	if len(blocks) == 0 || density == nil {
		return nil, errors.New("cubature: a volume needs at least one block and a density")
	}
	cells, err := splitBlocks(blocks, density, set.MaxPanels)
	if err != nil {
		return nil, err
	}
	v := &Volume{cells: cells, cloud: cloud{settings: set}}
	for _, c := range cells {
		v.include(c.centre, c.radius, c.scale, c.peak, c.charge, c.loose)
		v.slip = max(v.slip, c.slip())
	}
	if !(v.scale < 1e60) {
		return nil, fmt.Errorf("cubature: blocks at coordinates up to %v; scale to within 1e60", v.scale)
	}
	v.finish(func(visit func(x r3.Vec, radius float64)) {
		for _, c := range cells {
			visit(c.centre, c.radius)
		}
	})
	if !(v.radius > 1e-60) {
		return nil, fmt.Errorf("cubature: blocks of size %v; scale to above 1e-60", v.radius)
	}
	v.gather = func(expand func(*nodeSet)) {
		for _, c := range cells {
			expand(c.nodes(solidMeasured))
		}
	}
	return v, nil
}

// Charge returns the total charge and the bound on its error.
func (v *Volume) Charge() (charge, estimate float64) { return v.total() }

// Rule visits the points of a rule that is good to 1e-13 for what is as smooth as the charge, with the piece of volume of each.
func (v *Volume) Rule(visit func(x r3.Vec, volume float64)) {
	const points = 11 // against 14 that know the charge to 1e-9
	for _, c := range v.cells {
		c.rule(points, func(_ int, x r3.Vec, volume float64) { visit(x, volume) })
	}
}

// Unresolved returns the charge that the cells do not resolve: zero for a smooth density.
func (v *Volume) Unresolved() float64 { return v.loose }

// Bounds returns a box that contains the charge.
func (v *Volume) Bounds() r3.Box { return v.bounds }

// Field returns g at x.
func (v *Volume) Field(x r3.Vec) r3.Vec {
	if x.X-x.X+(x.Y-x.Y)+(x.Z-x.Z) != 0 {
		return field.Nowhere(field.BadInput).G
	}
	return v.value(field.Point{X: pair.VecOf(x)}, field.WantG).G
}

// Evaluate computes the arrays of dst; see field.Evaluator. The side does not matter.
func (v *Volume) Evaluate(dst *field.Values, at *field.Points, _ field.Side) {
	field.Fill(dst, at, v.value)
}

// value evaluates at one point.
func (v *Volume) value(p field.Point, want field.Want) field.Value {
	x, low := p.X.Value(), p.X.Low()
	if v.isFar(x) {
		return v.farValue(p, want)
	}
	w := works.Get().(*work)
	defer works.Put(w)
	w.nodes = 0
	grad := want&field.WantGrad != 0
	var total sums
	var errs gap
	scale := v.natural(x)
	scale = gap{scale.phi * v.radius, scale.g * v.radius, scale.t * v.radius}
	w.inner = w.inner[:0]
	for _, c := range v.cells {
		d := r3.Norm(r3.Sub(x, c.centre))
		if a, b, ok := rungs(d/c.radius, c.least, solidLadder[:]); ok {
			coarse, fine := c.nodes(a).sum(x, low, grad), c.nodes(b).sum(x, low, grad)
			e := apart(&coarse, &fine)
			if v.enough(&fine, &e, &scale, want) {
				total.add(&fine, 1)
				errs.add(e)
				errs.add(looseGap(c.loose, max(d-c.radius, 0.1*c.radius)))
				continue
			}
		}
		w.inner = append(w.inner, c.foot(x, low))
	}
	for i := range w.inner {
		f := &w.inner[i]
		s, e := v.nearCell(w, f, want, &scale)
		total.add(&s, 1)
		errs.add(e)
		errs.add(looseGap(f.cell.loose, max(f.distance, 0.1*f.cell.radius)))
	}
	var more float64
	if grad {
		more = v.uniform(w, x, low, v.tolerance(x, p.Slack), &scale, &total, &errs)
	}
	r := total.value(errs, want)
	shift := 2 * u * (v.scale + scaleOf(x))
	r.ErrPhi += shift * r3.Norm(r.G)
	r.ErrG += shift * v.peak
	e := v.slipped(&scale, v.radius)
	r.ErrPhi, r.ErrG, r.ErrGrad = r.ErrPhi+e.phi, r.ErrG+e.g, r.ErrGrad+e.t+more
	v.judge(&r, &scale, want)
	return r
}

// nearCell raises the level until the two rules agree.
func (v *Volume) nearCell(w *work, f *innerFoot, want field.Want, scale *gap) (s sums, e gap) {
	grad := want&field.WantGrad != 0
	last := gap{math.Inf(1), math.Inf(1), math.Inf(1)}
	for k := v.firstLevel(); k < len(solidLevels); k++ {
		before := w.nodes
		a, b := w.pyramids(f, k, 0, grad), w.pyramids(f, k, 1, grad)
		d := apart(&a, &b)
		if d.g > 0.1*last.g && d.phi > 0.1*last.phi {
			if d.g < last.g {
				s, e = b, d
			}
			return s, e
		}
		s, e, last = b, d, d
		if v.enough(&b, &d, scale, want) || w.nodes+4*(w.nodes-before) > v.settings.MaxNodes {
			break
		}
	}
	return s, e
}
