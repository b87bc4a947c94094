package response

import (
	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

// Response is what responding bodies carry, as a source: their whole charge, fixed and induced, without the applied field.
//
// Units: natural; g in the unit of the applied field.
// Frame: that in which the bodies were given.
// Domain: all finite x. NaN in, NaN out.
// Singular: on edges of the bodies. On faces the side asked for, the mean by default.
// Accuracy: see the package comment; the estimate is what three meshes let expect, safe by a factor of 3.
// Source: [Kress2014] chapter 6, [Bremer2012]; images, spheres and shells in the tests.
type Response struct {
	system    *System
	materials []Material
	applied   field.Source
	rigid     []rigid
	whole     field.Sum // the induced and the fixed charge
	layers    []layer
	passed    []bool      // which parts the applied field has a flux through
	doubt     []float64   // what the charge of each held conductor may be off by
	loads     [][]float64 // for each level the charges at the points of the kept pieces
	remote    [3]*field.Moments
	centre    r3.Vec // of all bodies, with the radius reach
	reach     float64
	charge    float64 // of all conductors
	trend     trend
	density   float64 // mean of |sigma| of the induced charge
	size      float64 // root of the area of all bodies
	Report    Report
}

// induced is the source of the induced charge alone.
type induced struct{ r *Response }

// Field returns g at x.
func (s induced) Field(x r3.Vec) r3.Vec { return field.At(s, x, field.Mean, field.WantG).G }

// Evaluate computes the arrays of dst; see field.Evaluator.
func (s induced) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	field.Fill(dst, at, func(p field.Point, want field.Want) field.Value { return s.r.induced(p, side, want) })
}

// Value is a number and an estimate of its error.
type Value struct{ Value, Estimate float64 }

// Vector is a vector and an estimate of the length of its error.
type Vector struct {
	Value    r3.Vec
	Estimate float64
}

// Field returns g of the bodies at x, the mean of both sides on a face.
func (r *Response) Field(x r3.Vec) r3.Vec { return field.At(r, x, field.Mean, field.WantG).G }

// Evaluate computes the arrays of dst; see field.Evaluator.
func (r *Response) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	if len(r.rigid) == 0 {
		induced{r}.Evaluate(dst, at, side)
		return
	}
	r.whole.Evaluate(dst, at, side)
}

// Bounds returns a box that holds all charge.
func (r *Response) Bounds() r3.Box {
	b := r.system.bounds[0]
	for _, c := range r.system.bounds[1:] {
		b.Min = r3.Vec{X: min(b.Min.X, c.Min.X), Y: min(b.Min.Y, c.Min.Y), Z: min(b.Min.Z, c.Min.Z)}
		b.Max = r3.Vec{X: max(b.Max.X, c.Max.X), Y: max(b.Max.Y, c.Max.Y), Z: max(b.Max.Z, c.Max.Z)}
	}
	return b
}

// Node is a point of the finest mesh.
type Node struct {
	X, Normal r3.Vec  // Normal points out of the body
	Area      float64 // weight of the rule: sums to the area of the faces
	Charge    float64 // induced: density times Area
}

// Layer returns the induced charge on a body as the nodes of the finest mesh: what other programs import. A rule of order n on
// each panel, it is good for the field at distances of more than a panel.
func (r *Response) Layer(body int) []Node {
	var nodes []Node
	l := &r.system.levels[2]
	for c, p := range r.system.parts {
		if p.body == body {
			r.system.nodesOf(l, c, func(i int) {
				nodes = append(nodes, Node{l.x[i], l.n[i], l.area[i], r.layers[2].charge[i]})
			})
		}
	}
	return nodes
}

// Moment returns the dipole moment of a body: the integral of p over it (about the origin, where it is charged). Charge on a
// part that two bodies share counts for the one that was given first; Total is free of that.
func (r *Response) Moment(body int) Vector {
	m := r.moment(func(p part) bool { return p.body == body })
	for _, c := range r.rigid {
		if c.body == body {
			m.Value = r3.Add(m.Value, r3.Scale(c.factor, c.Moment))
		}
	}
	return m
}

// Total returns the dipole moment of all bodies.
func (r *Response) Total() Vector {
	m := r.moment(func(part) bool { return true })
	for _, c := range r.rigid {
		m.Value = r3.Add(m.Value, r3.Scale(c.factor, c.Moment))
	}
	return m
}

// moment returns that of the induced charge of some parts.
func (r *Response) moment(of func(p part) bool) Vector {
	var m [3][3]float64
	for k := range m {
		l := &r.system.levels[k]
		for c, p := range r.system.parts {
			if of(p) {
				r.system.nodesOf(l, c, func(i int) {
					for axis, x := range components(l.x[i]) {
						m[k][axis] += r.layers[k].charge[i] * x
					}
				})
			}
		}
	}
	return r.vector(m)
}

// Charge returns the total charge of a body.
func (r *Response) Charge(body int) Value {
	var v [3]float64
	for k := range v {
		for c, p := range r.system.parts {
			if p.body == body {
				r.system.nodesOf(&r.system.levels[k], c, func(i int) { v[k] += r.layers[k].charge[i] })
			}
		}
	}
	q := r.trend.limit(v)
	if r.doubt != nil {
		q.Estimate += r.doubt[body]
	}
	return q
}
