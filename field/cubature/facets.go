package cubature

import (
	"fmt"
	"math"
	"sync"

	"example.com/boundpole/field"
	"example.com/boundpole/field/element"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Facets is the bound charge of a body with plane faces and a polynomial polarization: sigma = p.n on each face, rho = -div p
// inside. No integral of it is numeric.
//
// Units: natural; g in the unit of p, phi in that times the length unit.
// Frame: that of the vertices.
// Domain: all finite x. Built by NewFacets; immutable.
// Singular: |g| grows as log(1/d) at distance d from an edge with charge at it; on it G is NaN with status OnEdge and Phi finite.
// On a charged face: the mean of both sides, or the side asked for.
// Accuracy: |error| <= 1e-12 of the natural scale within 2 bounding radii for degrees up to 4, from 1e-12 sizes off an edge;
// a digit less for each degree more (TestFacets).
// Source: the affine part of p at x is that of element.Polyhedron; the rest by the identities of [Graglia1993] on each face,
// the volume charge through the faces.
//
// What is left of p at x once its affine part is taken out vanishes at x with its slope. So it has no singularity there, and
// plain float64 geometry serves for it however close an edge is: only the affine part needs more.
type Facets struct {
	p      field.Polynomial
	slope  [3][3]field.Polynomial // of p, as component 0
	basis  [4][3]*element.Polyhedron
	centre r3.Vec
	unit   float64
	bounds r3.Box
	faces  []powerFace
	degree int
	rooms  sync.Pool
}

// powerFace is a face with the charge densities in its own frame: x and y in the plane, z along the normal, about the centre of the
// body in its unit.
type powerFace struct {
	axes    [3]r3.Vec
	level   float64 // z of the plane
	corners [][2]float64
	sigma   cube // p.n
	rho     cube // -div p times the unit
}

// MostDegree is the highest degree of a polynomial that NewFacets takes.
const MostDegree = 12

// NewFacets returns the bound charge; the body has passed its Check.
func NewFacets(body geom.Polyhedron, p field.Polynomial) (*Facets, error) {
	if err := p.Check(); err != nil {
		return nil, err
	}
	degree := max(p.Degree(), 1)
	if degree > MostDegree {
		return nil, fmt.Errorf("cubature: polynomial of degree %d over plane faces; at most %d, or integrate it as a density", degree, MostDegree)
	}
	f := &Facets{p: p, bounds: body.Bounds(), degree: degree}
	f.centre = r3.Scale(0.5, r3.Add(f.bounds.Min, f.bounds.Max))
	f.unit = math.Ldexp(1, math.Ilogb(r3.Norm(r3.Sub(f.bounds.Max, f.centre))))
	for i := range 3 {
		var a field.Affine
		*[3]*float64{&a.Value.X, &a.Value.Y, &a.Value.Z}[i] = 1
		f.basis[3][i] = element.NewPolyhedron(body, a)
		for j := range 3 {
			a := field.Affine{About: f.centre}
			a.Gradient[i][j] = 1 / f.unit
			f.basis[j][i] = element.NewPolyhedron(body, a)
			f.slope[i][j] = derivative(p, i, j)
		}
	}
	rho := minusDivergence(p)
	for k := range body.Loops {
		f.faces = append(f.faces, f.face(body, k, rho))
	}
	f.rooms.New = func() any { return f.room() }
	return f, nil
}

// derivative returns the derivative of component i of p by x_j, as component 0.
func derivative(p field.Polynomial, i, j int) (d field.Polynomial) {
	for _, t := range p {
		if n := t.Powers[j]; t.Component == i && n > 0 {
			t.Component, t.Coefficient = 0, t.Coefficient*float64(n)
			t.Powers[j]--
			d = append(d, t)
		}
	}
	return d
}

// face prepares one face.
func (f *Facets) face(body geom.Polyhedron, k int, rho []scalarTerm) powerFace {
	loop := body.Loops[k]
	place := func(i int) pair.Vec {
		v := pair.VecOf(body.Vertices[i])
		if len(body.Low) > 0 {
			v = pair.WithLow(body.Vertices[i], body.Low[i])
		}
		return v
	}
	v0 := place(loop[0])
	var newell pair.Vec
	for k := 1; k+1 < len(loop); k++ {
		newell = newell.Add(place(loop[k]).Sub(v0).Cross(place(loop[k+1]).Sub(v0)))
	}
	n := newell.Unit().Value()
	e := r3.Unit(r3.Sub(body.Vertices[loop[1]], body.Vertices[loop[0]]))
	q := powerFace{axes: [3]r3.Vec{e, r3.Cross(n, e), n}}
	c := pair.VecOf(f.centre)
	for _, i := range loop {
		d := r3.Scale(1/f.unit, place(i).Sub(c).Value())
		q.corners = append(q.corners, [2]float64{r3.Dot(e, d), r3.Dot(q.axes[1], d)})
		q.level += r3.Dot(n, d) / float64(len(loop))
	}
	q.sigma = turned(alongNormal(f.p, n), f.degree, f.centre, f.unit, q.axes)
	q.rho = turned(rho, f.degree, f.centre, f.unit, q.axes)
	for i := range q.rho.c {
		q.rho.c[i] *= f.unit
	}
	return q
}

// Field returns g at x.
func (f *Facets) Field(x r3.Vec) r3.Vec {
	return f.value(field.Point{X: pair.VecOf(x)}, field.Mean, field.WantG).G
}

// Evaluate computes the arrays of dst; see field.Evaluator.
func (f *Facets) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	field.Fill(dst, at, func(p field.Point, want field.Want) field.Value { return f.value(p, side, want) })
}

// Bounds returns the box of the body.
func (f *Facets) Bounds() r3.Box { return f.bounds }

// facetRoom is the working memory of one evaluation.
type facetRoom struct {
	powers     facetPowers
	p          cube
	d, dd      cube
	s, s1, s2  square
	total      powerSums
	point      field.Points
	value      *field.Values
	x, y, z    [1]float64
	lx, ly, lz [1]float64
	slack      [1]float64
}

func (f *Facets) room() *facetRoom {
	w := &facetRoom{p: newCube(f.degree), d: newCube(f.degree), dd: newCube(f.degree), value: field.NewValues(1, field.WantPhi|field.WantG|field.WantGrad|field.WantErr)}
	w.powers.resize(f.degree)
	n := flat(0, f.degree) + 1
	w.s, w.s1, w.s2 = make(square, n), make(square, n), make(square, n)
	w.point = field.Points{X: w.x[:], Y: w.y[:], Z: w.z[:], XLo: w.lx[:], YLo: w.ly[:], ZLo: w.lz[:], Slack: w.slack[:]}
	return w
}

// value evaluates at one point: the affine part of p there, and the rest.
func (f *Facets) value(p field.Point, side field.Side, want field.Want) field.Value {
	w := f.rooms.Get().(*facetRoom)
	defer f.rooms.Put(w)
	x := p.X.Value()
	v := f.affine(w, p, side, want)
	if v.Status == field.BadInput {
		return v
	}
	f.rest(w, x, want)
	w.total.addTo(&v, f.unit, want)
	return v
}

// affine returns the field of the affine part of p at the point.
func (f *Facets) affine(w *facetRoom, p field.Point, side field.Side, want field.Want) (v field.Value) {
	w.x[0], w.y[0], w.z[0] = p.X.X.Hi, p.X.Y.Hi, p.X.Z.Hi
	w.lx[0], w.ly[0], w.lz[0] = p.X.X.Lo, p.X.Y.Lo, p.X.Z.Lo
	w.slack[0] = p.Slack
	x := p.X.Value()
	base := f.p.At(x)
	dst := part(w.value, want)
	for i := range 3 {
		constant := [3]float64{base.X, base.Y, base.Z}[i]
		for j := range 3 {
			k := f.slope[i][j].At(x).X
			constant -= k * [3]float64{x.X - f.centre.X, x.Y - f.centre.Y, x.Z - f.centre.Z}[j]
			f.addBasis(&v, w, &dst, f.basis[j][i], k*f.unit, side)
		}
		f.addBasis(&v, w, &dst, f.basis[3][i], constant, side)
	}
	return v
}

// part returns the arrays of v that are wanted.
func part(v *field.Values, want field.Want) field.Values {
	var d field.Values
	d.Status = v.Status
	if want&field.WantPhi != 0 {
		d.Phi = v.Phi
	}
	if want&field.WantG != 0 {
		d.GX, d.GY, d.GZ = v.GX, v.GY, v.GZ
	}
	if want&field.WantGrad != 0 {
		d.Grad = v.Grad
	}
	if want&field.WantErr != 0 {
		d.ErrPhi, d.ErrG, d.ErrGrad = v.ErrPhi, v.ErrG, v.ErrGrad
	}
	return d
}

// addBasis adds k times the field of one affine polarization.
func (f *Facets) addBasis(v *field.Value, w *facetRoom, dst *field.Values, src *element.Polyhedron, k float64, side field.Side) {
	if k == 0 {
		return
	}
	src.Evaluate(dst, &w.point, side)
	r := dst.At(0)
	v.Phi += k * r.Phi
	v.G = r3.Add(v.G, r3.Scale(k, r.G))
	for i := range v.Grad {
		v.Grad[i] += k * r.Grad[i]
	}
	v.ErrPhi = math.Hypot(v.ErrPhi, k*r.ErrPhi) // roundings of their own
	v.ErrG = math.Hypot(v.ErrG, k*r.ErrG)
	v.ErrGrad = math.Hypot(v.ErrGrad, k*r.ErrGrad)
	v.Status = max(v.Status, r.Status)
}
