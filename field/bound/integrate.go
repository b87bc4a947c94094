package bound

import (
	"fmt"
	"math"
	"sync"

	"example.com/boundpole/field"
	"example.com/boundpole/field/cubature"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// integrated is the field of a body by integration over its faces and cells; far away, where the charges of a neutral body
// cancel, by the expansion of its dipole density; close to the surface with what a closed form knows taken out (see hugging). The
// integrators are prepared when a field is first asked for.
type integrated struct {
	charge *Charge
	builds []func() (field.Evaluator, error)
	once   sync.Once
	err    error // why preparation failed: values are then NaN with field.NotConverged

	near    field.Sum
	layers  []*cubature.Layer
	volumes field.Sum
	base    []field.Source // the body with uniform unit polarizations; nil if there is no closed form
	far     *field.Moments
	centre  r3.Vec
	radius  float64 // bounding radius
	peak    float64 // greatest |p|
	order   int
	limit   float64 // distance from the centre beyond which the expansion serves; infinite if it does not
	missed  float64 // bound on the error of g that the expansion has at the limit because the dipole density is not smooth
}

// expansion orders and reaches in bounding radii: 4^-28 = 1e-17, 2.45^-38 = 2e-15.
const (
	farOrder, farReach   = 28, 4
	flatOrder, flatReach = 38, 2.45
)

// integrated lists the integrators of all faces and cells that carry charge.
func (c *Charge) integrated() (field.Source, error) {
	s := &integrated{charge: c}
	box := c.local.Bounds()
	s.centre = r3.Scale(0.5, r3.Add(box.Min, box.Max))
	s.radius = reach(box, s.centre)
	s.limit, s.order = farReach*s.radius, farOrder
	if build := c.facets(); build != nil {
		s.limit, s.order = flatReach*s.radius, flatOrder
		s.builds = append(s.builds, build)
		return s, nil
	}
	if r := c.resolved; r != nil {
		for _, l := range r.layers {
			if l != nil {
				s.builds = append(s.builds, func() (field.Evaluator, error) { return l, nil })
			}
		}
		s.builds = append(s.builds, func() (field.Evaluator, error) {
			sum, err := c.aroundOrigin()
			if sum == nil && err == nil {
				for _, v := range r.volumes {
					sum = append(sum, v)
				}
			}
			return sum, err
		})
		return s, nil
	}
	for _, f := range c.local.Faces() {
		charted, ok := f.Surface.(geom.Charted)
		if !ok {
			return nil, c.unsupported(fmt.Sprintf("face %q has no charts; give its surface the method Charts", f.Name))
		}
		if !c.carries(f) {
			continue
		}
		s.builds = append(s.builds, func() (field.Evaluator, error) { return cubature.NewLayer(outward(f, charted.Charts()), c.sigma, nil) })
	}
	for _, cell := range c.local.Cells() {
		blocked, ok := cell.(geom.Blocked)
		if !ok {
			return nil, c.unsupported(fmt.Sprintf("a cell of type %T has no blocks; give it the method Blocks", cell))
		}
		if c.free(cell) {
			continue
		}
		s.builds = append(s.builds, func() (field.Evaluator, error) { return cubature.NewVolume(blocked.Blocks(), c.rho, nil) })
	}
	return s, nil
}

// facets returns what builds the charge of a body with plane faces and polynomial p, nil for others.
func (c *Charge) facets() func() (field.Evaluator, error) {
	flat, ok := c.local.(geom.Flat)
	if !ok {
		return nil
	}
	p, ok := polynomialOf(c.p)
	if !ok || p.Degree() > cubature.MostDegree {
		return nil
	}
	return func() (field.Evaluator, error) { return cubature.NewFacets(flat.Polyhedron(), p) }
}

// prepare builds the integrators and the expansion.
func (s *integrated) prepare() {
	for _, build := range s.builds {
		src, err := build()
		if err != nil {
			s.err = err
			return
		}
		s.near = append(s.near, src.(field.Source))
		switch src := src.(type) {
		case *cubature.Layer:
			s.layers = append(s.layers, src)
		case *cubature.Volume:
			s.volumes = append(s.volumes, src)
		case field.Sum:
			s.volumes = append(s.volumes, src...)
		}
	}
	if len(s.layers) > 0 {
		s.base = unitForms(s.charge.local)
	}
	s.peak = s.charge.peak()
	s.expand(s.charge)
}

// expand integrates the moments with two rules, or with one that is exact for a polynomial. Where the two differ by more than the
// far field is worth, because p has a kink or a singularity inside, the expansion is not used.
func (s *integrated) expand(c *Charge) {
	weight := 0.0 // int |p|
	rule := func(n int) *field.Moments {
		m := field.NewMoments(s.centre, s.radius, s.order)
		weight = 0
		for i, cell := range c.local.Cells() {
			c.cellNodes(i, cell, n, func(x r3.Vec, w float64) {
				p := r3.Scale(w, c.p.At(x))
				weight += r3.Norm(p)
				m.AddDipole(x, p)
			})
		}
		return m
	}
	p, exact := polynomialOf(c.p)
	if exact || c.resolved != nil {
		s.far = rule(s.points() + p.Degree()/2)
		weight *= 0x1p-51 // the rounding of its dipole
		if c.resolved != nil {
			for _, v := range c.resolved.volumes {
				weight += v.Unresolved() * s.radius
			}
		}
		s.missed = weight / (2 * math.Pi * s.limit * s.limit * s.limit)
		return
	}
	s.far = rule(s.points() + 8)
	coarse := rule(s.points() + 3)
	size := 0.0
	for _, d := range [6]r3.Vec{{X: 1}, {Y: 1}, {Z: 1}, {X: 0.6, Y: 0.8}, {Y: 0.6, Z: -0.8}, {X: -0.8, Z: 0.6}} {
		x := r3.Add(s.centre, r3.Scale(1.001*s.limit, d))
		g := s.far.Field(x)
		s.missed = max(s.missed, 10*r3.Norm(r3.Sub(g, coarse.Field(x))))
		size = max(size, r3.Norm(g))
	}
	if s.missed > 1e-12*size {
		s.limit = math.Inf(1)
	}
}

// points returns how many Gauss points a direction serve for points beyond the limit: their error falls as b^-2n, b = t + sqrt(t^2 - 1)
// at a distance of t radii ([Trefethen2013]). What they miss of higher moments is as small there as what the order leaves out.
func (s *integrated) points() int {
	t := s.limit / s.radius
	return int(math.Ceil(8/math.Log10(t+math.Sqrt(t*t-1)))) + 1
}

// carries reports whether a face has any charge: more than what the rounding of its normals makes of p along it.
func (c *Charge) carries(f geom.Face) bool {
	lo, hi := c.extremes(f)
	most := 0.0
	f.Surface.Nodes(4, func(x, _ r3.Vec, _ float64) {
		if p := r3.Norm(c.p.At(x)); p > most {
			most = p
		}
	})
	return max(math.Abs(lo), math.Abs(hi)) > 8*0x1p-53*most
}

// free reports whether a cell has no charge.
func (c *Charge) free(cell geom.Cell) bool {
	lo, hi := c.extremesInside(cell)
	return lo == 0 && hi == 0
}

// Field returns g at x.
func (s *integrated) Field(x r3.Vec) r3.Vec {
	s.once.Do(s.prepare)
	if s.err != nil {
		return field.Nowhere(field.NotConverged).G
	}
	p := field.Point{X: pair.VecOf(x)}
	switch s.zone(p) {
	case away:
		return s.far.Field(x)
	case close:
		return s.hugging(p, field.Mean, field.WantG).G
	}
	return s.near.Field(x)
}

// zone is where a point stands to the body: it says how its field is computed.
type zone int

const (
	amid  zone = iota // in or about the body
	close             // within hugs radii of the surface
	away              // beyond the limit
)

// hugs is the distance from the surface, in bounding radii, within which the uniform part of p is taken out.
const hugs = 1e-3

func (s *integrated) zone(p field.Point) zone {
	x := p.X.Value()
	switch {
	case math.Sqrt(r3.Norm2(r3.Sub(x, s.centre))) > s.limit:
		return away
	case s.base != nil && s.charge.inner.Locate(p.X, hugs*s.radius).Region == geom.On:
		return close
	}
	return amid
}

// Evaluate computes the arrays of dst; see field.Evaluator.
func (s *integrated) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	s.once.Do(s.prepare)
	if s.err != nil {
		field.Fill(dst, at, func(field.Point, field.Want) field.Value { return field.Nowhere(field.NotConverged) })
		return
	}
	for lo := 0; lo < at.Len(); {
		zone := s.zone(at.At(lo))
		hi := lo + 1
		for hi < at.Len() && s.zone(at.At(hi)) == zone {
			hi++
		}
		part, points := dst.Slice(lo, hi), at.Slice(lo, hi)
		switch zone {
		case away:
			s.far.Evaluate(part, points, side)
			s.allow(part, at, lo)
		case close:
			field.Fill(part, points, func(p field.Point, want field.Want) field.Value { return s.hugging(p, side, want) })
		default:
			s.near.Evaluate(part, points, side)
			s.judgeAll(part, points)
		}
		lo = hi
	}
}

// allow adds to the estimates of far points what the moments themselves may be wrong by: a dipole's worth, which falls like one.
func (s *integrated) allow(dst *field.Values, at *field.Points, lo int) {
	if s.missed == 0 {
		return
	}
	add := func(a []float64, i int, v float64) {
		if a != nil {
			a[i] += v
		}
	}
	for i := range max(len(dst.ErrPhi), len(dst.ErrG), len(dst.ErrGrad)) {
		r := r3.Norm(r3.Sub(at.Vec(lo+i), s.centre))
		e := s.missed * math.Pow(s.limit/r, 3)
		add(dst.ErrPhi, i, e*r)
		add(dst.ErrG, i, e)
		add(dst.ErrGrad, i, 4*e/r)
	}
}
