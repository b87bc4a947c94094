package bound

import (
	"fmt"

	"example.com/boundpole/field"
	"example.com/boundpole/field/element"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// evaluator chooses how the field of the body in its own frame is computed, and the one place where that is decided: a closed
// form or a single quadrature of the whole body where there is one, else integration over faces and cells.
func (c *Charge) evaluator() (field.Source, error) {
	src, err := wholeBody(c.local, c.p)
	if src != nil || err != nil {
		return src, err
	}
	return c.integrated()
}

// law is a polarization taken apart for the choice.
type law struct {
	affine  field.Affine
	is      bool    // p is affine
	uniform bool    // p is uniform
	axial   bool    // p is uniform but for an axial component that grows along the axis
	radial  float64 // coefficient of the unit vector away from the axis; p is that alone if not affine
}

func lawOf(p field.Polarization) law {
	var l law
	l.affine, l.is = p.(field.Affine)
	along := l.affine.Gradient
	l.uniform = l.is && along == [3][3]float64{}
	along[2][2] = 0
	l.axial = l.is && along == [3][3]float64{}
	if r, ok := p.(field.RadialPower); ok && r.Power == 0 {
		l.radial = r.Coefficient
	}
	return l
}

// wholeBody returns the evaluator that is made for a body and a polarization, nil if there is none.
func wholeBody(body geom.Body, p field.Polarization) (field.Source, error) {
	l := lawOf(p)
	switch b := body.(type) {
	case geom.Flat:
		if l.is {
			return element.NewPolyhedron(b.Polyhedron(), l.affine), nil
		}
	case geom.Cylinder:
		return roundForm(geom.Tube{Outer: b.Radius, Height: b.Height}, p, l)
	case geom.Tube:
		return roundForm(b, p, l)
	case geom.Arc:
		if l.is || l.radial != 0 {
			return element.NewArc(b, l.affine, l.radial)
		}
	case geom.Cone:
		if l.uniform {
			return element.NewCone(b, l.affine.Value)
		}
		if l.axial && l.affine.At(r3.Vec{}) == (r3.Vec{}) { // in plates it is the better one
			return element.NewAxialPowerCone(b, l.affine.Gradient[2][2], 1)
		}
		if l.is {
			return element.NewAffineCone(b, l.affine)
		}
		if q, ok := p.(field.AxialPower); ok && q.Power <= 40 { // what its rules resolve
			return element.NewAxialPowerCone(b, q.Coefficient, q.Power)
		}
	case geom.Torus:
		if l.uniform {
			return element.NewTorus(b, l.affine.Value)
		}
	case geom.Sphere:
		if l.uniform {
			return element.Sphere{Shape: b, P: l.affine.Value}, nil
		}
		return sphereForm(0, b.Radius, p)
	case geom.HollowSphere:
		if l.uniform {
			return element.HollowSphere{Shape: b, P: l.affine.Value}, nil
		}
		return sphereForm(b.Inner, b.Outer, p)
	case geom.Ellipsoid:
		if l.is {
			return element.NewAffineEllipsoid(b, l.affine)
		}
		if q, ok := lowPolynomial(p); ok {
			return element.NewPolynomialEllipsoid(b, q)
		}
	}
	return nil, nil
}

// lowPolynomial returns a polarization as a polynomial that the closed forms of round bodies take; ok is false if it is none.
func lowPolynomial(p field.Polarization) (q field.Polynomial, ok bool) {
	q, ok = polynomialOf(p)
	return q, ok && q.Degree() <= element.PolynomialDegree
}

// roundForm returns the evaluator of a cylinder (inner radius 0) or tube, nil if there is none.
func roundForm(b geom.Tube, p field.Polarization, l law) (field.Source, error) {
	full := b.Inner == 0
	cylinder := geom.Cylinder{Radius: b.Outer, Height: b.Height}
	switch {
	case l.axial && full:
		return element.NewCylinder(cylinder, l.affine.At(r3.Vec{}), l.affine.Gradient[2][2])
	case l.axial:
		return element.NewTube(b, l.affine.At(r3.Vec{}), l.affine.Gradient[2][2])
	case (l.is || l.radial != 0) && full:
		return element.NewAffineCylinder(cylinder, l.affine, l.radial)
	case l.is || l.radial != 0:
		return element.NewAffineTube(b, l.affine, l.radial)
	}
	switch q := p.(type) {
	case field.AxialPower:
		return element.NewAxialPower(b, q.Coefficient, q.Power)
	case field.RadialPower:
		return element.NewRadialPower(b, q.Coefficient, q.Power)
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
	if q, ok := lowPolynomial(p); ok {
		return element.NewPolynomialSphere(inner, outer, q)
	}
	return nil, nil
}

// unsupported is the error for a body that cannot be integrated over.
func (c *Charge) unsupported(what string) error {
	return fmt.Errorf("bound: %w: %s", ErrUnsupported, what)
}
