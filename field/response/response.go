package response

import (
	"math"

	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

// Response is what responding bodies carry, as a source: their whole charge, fixed and induced, without the applied field.
//
// Units: natural; g in the unit of the applied field.
// Frame: that in which the bodies were given.
// Domain: all finite x. NaN in, NaN out.
// Singular: on edges of the bodies. On faces the side asked for, the mean by default.
// Accuracy: see the package comment; the estimate is what the finest two of three meshes differ by.
// Source: [Kress2014] chapter 6, [Bremer2012]; images, spheres and shells in the tests.
type Response struct {
	system    *System
	materials []Material
	applied   field.Source
	rigid     []rigid
	layers    []layer
	loads     [][]float64 // for each level the charges at the points of the kept pieces
	Report    Report
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
	field.Fill(dst, at, func(p field.Point, want field.Want) field.Value {
		return r.induced(p, side, want, -1)
	})
	for _, c := range r.rigid {
		if c.Charge != nil {
			v := field.NewValues(at.Len(), dst.Want())
			field.Evaluate(field.Scaled{Source: c.Charge, Factor: c.factor}, v, at, side)
			dst.Add(v)
		}
	}
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

// onLevels returns the three values of a sum over the nodes of a body and its estimate.
func (r *Response) onLevels(body int, f func(l *level, i int) float64) Value {
	var v [3]float64
	for k := range v {
		l := &r.system.levels[k]
		for c, p := range r.system.parts {
			if p.body != body {
				continue
			}
			r.system.nodesOf(l, c, func(i int) { v[k] += r.layers[k].charge[i] * f(l, i) })
		}
	}
	return Value{v[2], left(math.Abs(v[1]-v[0]), math.Abs(v[2]-v[1])) + rounding*math.Abs(v[2])}
}

// Moment returns the dipole moment of a body: the integral of p over it (about the origin, where it is charged).
func (r *Response) Moment(body int) Vector {
	x := r.onLevels(body, func(l *level, i int) float64 { return l.x[i].X })
	y := r.onLevels(body, func(l *level, i int) float64 { return l.x[i].Y })
	z := r.onLevels(body, func(l *level, i int) float64 { return l.x[i].Z })
	m := Vector{r3.Vec{X: x.Value, Y: y.Value, Z: z.Value}, math.Sqrt(x.Estimate*x.Estimate + y.Estimate*y.Estimate + z.Estimate*z.Estimate)}
	if c := r.rigid[body]; c.Charge != nil {
		m.Value = r3.Add(m.Value, r3.Scale(c.factor, c.Charge.Moment))
	}
	return m
}

// Charge returns the total charge of a body.
func (r *Response) Charge(body int) Value {
	return r.onLevels(body, func(*level, int) float64 { return 1 })
}
