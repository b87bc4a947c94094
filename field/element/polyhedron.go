package element

import (
	"math"
	"sync"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Polyhedron is the bound charge of a body with plane faces and uniform or affine polarization: sigma = p.n on each
// face, rho = -div p inside.
//
// Units: natural; g in the unit of p, phi in that times the length unit.
// Frame: that of the vertices.
// Domain: all finite x. Built by NewPolyhedron; immutable.
// Singular: |g| grows as log(1/d) at a distance d from an edge with charge at it; on it G is NaN with status OnEdge and
// Phi finite. On a charged face: the mean of both sides, or the side asked for.
// Accuracy: |g error| <= 1e-12 max(|g|, 1e-3 g0), g0 = max|p| min(1, (a/R)^3), a the bounding radius, R the distance from
// its centre, from 1e-12 of the size off an edge to 1e6 sizes away (TestFlatReference).
// Source: [Wilton1984], [VanOosterom1983], shared edges as in [Werner1997]; linear charge by the divergence identities of
// [Wilton1984] sec. III; far field by solid harmonics (field.Moments).
type Polyhedron struct {
	flat *facets
	far  farField
}

// NewPolyhedron returns the bound charge of a body with plane faces. The polarization is field.Uniform or field.Affine
// in the frame of the body; the body has passed its Check.
func NewPolyhedron(body geom.Polyhedron, p field.Affine) *Polyhedron {
	verts := pairVertices(body.Vertices, body.Low)
	var specs []facetSpec
	g := &p.Gradient
	for _, loop := range body.Loops {
		n := newell(verts, loop).Value()
		specs = append(specs, facetSpec{
			loop:    loop,
			density: func(x r3.Vec) float64 { return r3.Dot(affineAt(&p, x), n) },
			gamma: r3.Vec{
				X: g[0][0]*n.X + g[1][0]*n.Y + g[2][0]*n.Z,
				Y: g[0][1]*n.X + g[1][1]*n.Y + g[2][1]*n.Z,
				Z: g[0][2]*n.X + g[1][2]*n.Y + g[2][2]*n.Z,
			},
		})
	}
	s := &Polyhedron{flat: newFacets(verts, specs, -p.Divergence(r3.Vec{}))}
	h := r3.Scale(0.5, r3.Sub(s.flat.bounds.Max, s.flat.bounds.Min))
	a := r3.Norm(h)
	s.far = farField{flat: s.flat, neutral: true, reach: 5, order: 26}
	switch { // measured: from here on the closed form would lose more than the expansion
	case s.flat.linear:
		s.far.reach, s.far.order = 2.5, 40
	case body.Volume() < 0.1*a*a*a: // thin: what is left of opposite faces is small, so every term needs all its digits
		s.far.reach, s.far.order = 2.6, 40
		s.flat.bundled = bundles{}
	}
	return s
}

// Field returns g at x.
func (s *Polyhedron) Field(x r3.Vec) r3.Vec {
	if !s.far.beyond(x.X, x.Y, x.Z) {
		if g, ok := s.flat.quick(x); ok {
			return g
		}
	}
	return s.full(x)
}

// full is Field without the short way.
func (s *Polyhedron) full(x r3.Vec) r3.Vec {
	return s.point(field.Point{X: pair.VecOf(x)}, field.Mean, field.WantG).G
}

// Evaluate computes the arrays of dst; see field.Evaluator.
func (s *Polyhedron) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	field.Fill(dst, at, func(p field.Point, want field.Want) field.Value { return s.point(p, side, want) })
}

// Bounds returns the box of the body.
func (s *Polyhedron) Bounds() r3.Box { return s.flat.bounds }

// Moments returns the expansion of the charge about the centre of the bounds.
func (s *Polyhedron) Moments() *field.Moments { return s.far.moments() }

func (s *Polyhedron) point(p field.Point, side field.Side, want field.Want) field.Value {
	if s.far.covers(p) {
		return s.far.moments().Value(p, want)
	}
	return s.flat.value(p, side, want)
}

// Polygon is a plane sheet with the charge density Density + Gradient.x.
//
// Units: natural; g in the unit of the density, phi in that times the length unit.
// Frame: that of the vertices; the normal follows the right-hand rule.
// Domain: all finite x. Built by NewPolygon; immutable.
// Singular: |g| grows as log(1/d) at a distance d from an edge; on it G is NaN with status OnEdge and Phi finite. On the
// sheet: the mean of both sides, or the side asked for; Outside is where the normal points.
// Accuracy: |g error| <= 1e-12 max(|g|, 1e-3 g0), g0 = max|sigma| min(1, (a/R)^2) (TestFlatReference).
// Source: [Wilton1984], [VanOosterom1983].
type Polygon struct {
	flat *facets
	far  farField
}

// NewPolygon returns the field of a charged sheet; the shape has passed its Check. Only the part of the gradient in the
// plane acts.
func NewPolygon(sheet geom.Polygon, density float64, gradient r3.Vec) *Polygon {
	verts := pairVertices(sheet.Vertices, sheet.Low)
	loop := make([]int, len(verts))
	for i := range loop {
		loop[i] = i
	}
	spec := facetSpec{loop: loop, gamma: gradient, density: func(x r3.Vec) float64 {
		return pair.VecOf(gradient).Dot(pair.VecOf(x)).AddFloat(density).Value()
	}}
	s := &Polygon{flat: newFacets(verts, []facetSpec{spec}, 0)}
	s.far = farField{flat: s.flat, reach: 3.5, order: 32}
	if s.flat.linear {
		s.far.reach, s.far.order = 2.5, 40
	}
	return s
}

// Field returns g at x.
func (s *Polygon) Field(x r3.Vec) r3.Vec {
	return s.point(field.Point{X: pair.VecOf(x)}, field.Mean, field.WantG).G
}

// Evaluate computes the arrays of dst; see field.Evaluator.
func (s *Polygon) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	field.Fill(dst, at, func(p field.Point, want field.Want) field.Value { return s.point(p, side, want) })
}

// Bounds returns the box of the sheet.
func (s *Polygon) Bounds() r3.Box { return s.flat.bounds }

// Moments returns the expansion of the charge about the centre of the bounds.
func (s *Polygon) Moments() *field.Moments { return s.far.moments() }

func (s *Polygon) point(p field.Point, side field.Side, want field.Want) field.Value {
	if s.far.covers(p) {
		v := s.far.moments().Value(p, want)
		if want&field.WantErr != 0 {
			s.far.loosen(&v, p)
		}
		return v
	}
	return s.flat.value(p, side, want)
}

// farField is the expansion of facets, made when first asked for.
type farField struct {
	flat    *facets
	neutral bool
	reach   float64 // in bounding radii
	order   int
	once    sync.Once
	m       *field.Moments
	gross   float64 // sum of the magnitudes of the charge
}

// loosen adds what rounding of the densities may leave of charge where its parts cancel: 6 u of their magnitudes.
func (f *farField) loosen(v *field.Value, p field.Point) {
	r := r3.Norm(r3.Sub(p.X.Value(), f.m.Centre()))
	e := 6 * u * over4P * f.gross / r
	v.ErrPhi += e
	v.ErrG += e / r
	v.ErrGrad += 3 * e / r / r
}

// covers reports whether the expansion is to be used at p.
func (f *farField) covers(p field.Point) bool {
	return f.beyond(p.X.X.Hi, p.X.Y.Hi, p.X.Z.Hi)
}

func (f *farField) beyond(x, y, z float64) bool {
	c, s := &f.flat.centre, f.flat.per
	x, y, z = x*s-c.X, y*s-c.Y, z*s-c.Z
	limit := f.reach * f.flat.size
	return x*x+y*y+z*z > limit*limit
}

func (f *farField) moments() *field.Moments {
	f.once.Do(f.build)
	return f.m
}

// build integrates the harmonics over the faces with a rule that is exact for the degree order + 1; the volume charge
// comes from the faces too (field.Moments.AddGraded).
func (f *farField) build() {
	q := f.flat
	c := r3.Scale(q.unit, q.centre)
	f.m = field.NewMoments(c, q.size*q.unit, f.order)
	nodes := triangleRule(f.order/2 + 2)
	area := q.unit * q.unit
	for i := range q.faces {
		face := &q.faces[i]
		h := r3.Dot(face.n, r3.Sub(q.verts[face.ref].Value(), q.centre))
		for k, t := range face.fan {
			// densities from places relative to a vertex: far from the origin the sum of coordinates is rounded too much
			v0 := q.verts[t[0]]
			e1, e2 := q.verts[t[1]].Sub(v0).Value(), q.verts[t[2]].Sub(v0).Value()
			base := face.sigma + r3.Dot(face.gamma, v0.Sub(q.verts[face.ref]).Value())
			for _, nd := range nodes {
				in := r3.Add(r3.Scale(nd.s, e1), r3.Scale(nd.t, e2))
				y := r3.Add(v0.Value(), in)
				w := nd.w * face.twice[k] * area
				sigma := base + r3.Dot(face.gamma, in)
				f.m.AddGraded(r3.Scale(q.unit, y), w*sigma, w*q.rho*h)
				f.gross += math.Abs(w * sigma)
			}
		}
	}
	if f.neutral {
		f.m.Neutral()
	}
}

// affineAt returns p at x, summed in pairs: far from the origin the terms may cancel.
func affineAt(p *field.Affine, x r3.Vec) r3.Vec {
	at := pair.VecOf(x).Sub(pair.VecOf(p.About))
	row := func(c float64, g *[3]float64) float64 {
		return pair.VecOf(r3.Vec{X: g[0], Y: g[1], Z: g[2]}).Dot(at).AddFloat(c).Value()
	}
	return r3.Vec{X: row(p.Value.X, &p.Gradient[0]), Y: row(p.Value.Y, &p.Gradient[1]), Z: row(p.Value.Z, &p.Gradient[2])}
}

func pairVertices(hi, lo []r3.Vec) []pair.Vec {
	v := make([]pair.Vec, len(hi))
	for i := range hi {
		if lo == nil {
			v[i] = pair.VecOf(hi[i])
		} else {
			v[i] = pair.WithLow(hi[i], lo[i])
		}
	}
	return v
}
