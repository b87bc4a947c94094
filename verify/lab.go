package verify

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/element"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// lab builds and evaluates sources for one case. After the first error it answers NaN, and the case fails with that error.
type lab struct {
	alter func(field.Source) field.Source
	err   error
}

// note keeps the first error.
func (l *lab) note(err error) {
	if l.err == nil {
		l.err = err
	}
}

// altered returns the source that is evaluated in place of src.
func (l *lab) altered(src field.Source) field.Source {
	if l.alter == nil {
		return src
	}
	return l.alter(src)
}

// charge returns the bound charge of a body; after an error it is empty.
func (l *lab) charge(body geom.Body, p field.Polarization) *bound.Charge {
	c, err := bound.Of(body, p)
	if err != nil {
		l.note(err)
		return &bound.Charge{}
	}
	return c
}

// uniform returns the bound charge of a uniformly polarized body.
func (l *lab) uniform(body geom.Body, p r3.Vec) *bound.Charge {
	return l.charge(body, field.Uniform{P: p})
}

// disc, annulus and rectangle return charged sheets about the z axis at the height z.
func (l *lab) disc(radius, z, density float64) field.Source {
	d, err := element.NewDisc(geom.Disc{Radius: radius, Z: z}, density)
	l.note(err)
	return d
}

func (l *lab) annulus(inner, outer, z, density float64) field.Source {
	a, err := element.NewAnnulus(geom.Annulus{Inner: inner, Outer: outer, Z: z}, density)
	l.note(err)
	return a
}

func rectangle(a, b, z, density float64) field.Source {
	return polygonSheet(rectangleShape(a, b, z), density)
}

func polygonSheet(shape geom.Polygon, density float64) field.Source {
	return element.NewPolygon(shape, density, r3.Vec{})
}

func rectangleShape(a, b, z float64) geom.Polygon {
	a, b = a/2, b/2
	return geom.Polygon{Vertices: []r3.Vec{{X: -a, Y: -b, Z: z}, {X: a, Y: -b, Z: z}, {X: a, Y: b, Z: z}, {X: -a, Y: b, Z: z}}}
}

// layer returns face i of a charge.
func (l *lab) layer(c *bound.Charge, i int) bound.Layer {
	if l.err != nil {
		nan := math.NaN()
		return bound.Layer{Area: nan, Charge: nan, Min: nan, Max: nan}
	}
	return c.Layers[i]
}

// at evaluates potential, field and estimates at x.
func (l *lab) at(src field.Source, x r3.Vec, side field.Side) field.Value {
	return l.evaluate(src, x, side, field.WantPhi|field.WantG|field.WantErr)
}

func (l *lab) evaluate(src field.Source, x r3.Vec, side field.Side, want field.Want) field.Value {
	if l.err != nil {
		return field.Nowhere(field.BadInput)
	}
	return field.At(l.altered(src), x, side, want)
}

// bare returns the field of a source that is not under test here and stays as it is.
func (l *lab) bare(src field.Source, x r3.Vec) r3.Vec {
	if l.err != nil {
		return field.Nowhere(field.BadInput).G
	}
	return src.Field(x)
}

// g returns the field at x, the mean of the sides on a face.
func (l *lab) g(src field.Source, x r3.Vec) r3.Vec {
	return l.evaluate(src, x, field.Mean, field.WantG).G
}

// phi returns the potential at x.
func (l *lab) phi(src field.Source, x r3.Vec) float64 {
	return l.evaluate(src, x, field.Mean, field.WantPhi).Phi
}

// result is the outcome of a trial, as in Case.
type result struct{ expected, got, miss, estimate float64 }

// number compares two numbers.
func number(expected, got float64) result {
	return result{expected, got, math.Abs(got - expected), math.NaN()}
}

// vector compares two vectors.
func vector(expected, got r3.Vec) result {
	return result{r3.Norm(expected), r3.Norm(got), r3.Norm(r3.Sub(got, expected)), math.NaN()}
}

// atMost reports a number for which there is only a bound.
func atMost(got float64) result { return result{math.NaN(), got, got, math.NaN()} }

// fieldAt compares the field at x with a vector, with the estimate of the library.
func (l *lab) fieldAt(src field.Source, x, expected r3.Vec) result {
	v := l.at(src, x, field.Mean)
	r := vector(expected, v.G)
	r.estimate = claimed(v.ErrG)
	return r
}

// axisAt compares the z component of the field on the axis.
func (l *lab) axisAt(src field.Source, z, expected float64) result {
	v := l.at(src, r3.Vec{Z: z}, field.Mean)
	r := number(expected, v.G.Z)
	r.miss = math.Hypot(r.miss, math.Hypot(v.G.X, v.G.Y)) // a component across the axis is an error too
	r.estimate = claimed(v.ErrG)
	return r
}

// phiAt compares the potential at x.
func (l *lab) phiAt(src field.Source, x r3.Vec, expected float64) result {
	v := l.at(src, x, field.Mean)
	r := number(expected, v.Phi)
	r.estimate = claimed(v.ErrPhi)
	return r
}

// claimed returns an estimate, NaN where it makes no claim.
func claimed(estimate float64) float64 {
	if math.IsInf(estimate, 1) {
		return math.NaN()
	}
	return estimate
}
