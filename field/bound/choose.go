package bound

import (
	"fmt"

	"example.com/boundpole/field"
	"example.com/boundpole/field/element"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// evaluator chooses how the field of the body in its own frame is computed: the one place where that is decided.
func (c *Charge) evaluator() (field.Source, error) {
	if src, err := closedForm(c.local, c.p); src != nil || err != nil {
		return src, err
	}
	return nil, fmt.Errorf("bound: polarization of type %T on a body of type %T: %w yet", c.p, c.local, ErrUnsupported)
}

// closedForm returns the whole-body closed form, nil if there is none.
func closedForm(body geom.Body, p field.Polarization) (field.Source, error) {
	a, affine := p.(field.Affine)
	uniform := affine && a.Gradient == [3][3]float64{}
	along := a.Gradient // but for the axial slope
	along[2][2] = 0
	axial := affine && along == [3][3]float64{}
	at0 := a.At(r3.Vec{})
	switch b := body.(type) {
	case geom.Flat:
		if affine {
			return element.NewPolyhedron(b.Polyhedron(), a), nil
		}
	case geom.Cylinder:
		if axial {
			return element.NewCylinder(b, at0, a.Gradient[2][2])
		}
	case geom.Tube:
		if axial {
			return element.NewTube(b, at0, a.Gradient[2][2])
		}
	case geom.Sphere:
		if uniform {
			return element.Sphere{Shape: b, P: a.Value}, nil
		}
		return sphereForm(0, b.Radius, p)
	case geom.HollowSphere:
		if uniform {
			return element.HollowSphere{Shape: b, P: a.Value}, nil
		}
		return sphereForm(b.Inner, b.Outer, p)
	case geom.Ellipsoid:
		if uniform {
			return element.NewEllipsoid(b, a.Value)
		}
	}
	return nil, nil
}

// sphereForm returns the closed form of a sphere that is not uniformly polarized, nil if there is none.
func sphereForm(inner, outer float64, p field.Polarization) (field.Source, error) {
	switch q := p.(type) {
	case field.Affine:
		return element.NewAffineSphere(inner, outer, q)
	case field.CentralPower:
		return element.NewCentralPower(inner, outer, q.Coefficient, q.Power)
	}
	return nil, nil
}
