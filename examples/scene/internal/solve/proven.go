package solve

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
)

// What the suite holds the sources of the library to, relative to max(size, floor) and against independent references, at
// every point: closed forms, and what has one integral left.
const (
	closed     = 1e-12
	quadrature = 3e-12
)

// proven returns the accuracy that a body with a law keeps by proof, so that its estimate, which overestimates, need not be
// asked; +Inf for what is integrated over faces and cells. A pair that is missing here is held to its estimate.
func proven(body geom.Body, law field.Polarization) float64 {
	degree, polynomial := degreeOf(law)
	uniform, linear := polynomial && degree == 0, polynomial && degree <= 1
	_, axial := law.(field.AxialPower)
	radial, isRadial := law.(field.RadialPower)
	_, central := law.(field.CentralPower)
	switch body.(type) {
	case geom.Flat:
		if linear {
			return closed
		}
	case geom.Cylinder, geom.Tube:
		switch {
		case uniform:
			return closed
		case linear, axial, isRadial:
			return quadrature
		}
	case geom.Arc:
		if linear || isRadial && radial.Power == 0 {
			return quadrature
		}
	case geom.Cone:
		if linear || axial {
			return quadrature
		}
	case geom.Torus:
		if uniform {
			return quadrature
		}
	case geom.Sphere, geom.HollowSphere:
		switch {
		case linear, central:
			return closed
		case polynomial && degree <= 12:
			return quadrature
		}
	case geom.Ellipsoid:
		switch {
		case linear:
			return closed
		case polynomial && degree <= 12:
			return quadrature
		}
	}
	return math.Inf(1)
}

// integrated reports whether the field of a part is integrated over faces and cells, which takes a thousand times as long as
// what is proven.
func (p *Part) integrated() bool { return math.IsInf(p.proven, 1) }

// degreeOf returns the degree of a law that is a polynomial.
func degreeOf(law field.Polarization) (degree int, ok bool) {
	switch p := law.(type) {
	case field.Uniform:
		return 0, true
	case field.Affine:
		if p.Gradient == [3][3]float64{} {
			return 0, true
		}
		return 1, true
	case field.Polynomial:
		return p.Degree(), true
	case field.AxialPower:
		return p.Power, true
	case field.RadialPower:
		return 1, p.Power == 1
	case field.CentralPower:
		return 1, p.Power == 1
	}
	return 0, false
}
