package current

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// axis is a unit vector e of a body's own frame with the polarization e x m: the charge picture of one component of the
// vector potential.
type axis struct {
	e r3.Vec
	p field.Polarization
}

// axesOf returns the components that a magnetization needs: two for a uniform one, as a has none along it, else three. There
// are none where m has no currents.
func axesOf(body geom.Body, m field.Polarization) ([]axis, error) {
	if k, ok := m.(field.Times); ok {
		axes, err := axesOf(body, k.Polarization)
		for i := range axes {
			axes[i].p = field.Times{Polarization: axes[i].p, Factor: k.Factor}
		}
		return axes, err
	}
	if m, ok := m.(field.Uniform); ok {
		return uniformAxes(m.P)
	}
	if m, ok := m.(field.Affine); ok && m.Gradient == [3][3]float64{} {
		return uniformAxes(m.Value)
	}
	if _, ok := m.(field.CentralPower); ok && aboutOrigin(body) {
		return nil, nil // along the normal, and without curl
	}
	var axes []axis
	for _, e := range [3]r3.Vec{{X: 1}, {Y: 1}, {Z: 1}} {
		axes = append(axes, axis{e, cross(e, m)})
	}
	if _, ok := m.(field.AxialPower); ok {
		axes = axes[:2]
	}
	return axes, nil
}

// uniformAxes returns unit vectors across m.
func uniformAxes(m r3.Vec) ([]axis, error) {
	if !isFinite(m) || m == (r3.Vec{}) {
		return []axis{{r3.Vec{X: 1}, field.Uniform{P: r3.Cross(r3.Vec{X: 1}, m)}}}, nil // bound.Of judges it
	}
	frame, err := geom.Frame(m, r3.Vec{})
	if err != nil {
		return nil, err
	}
	e1, e2 := frame.VectorToOuter(r3.Vec{X: 1}), frame.VectorToOuter(r3.Vec{Y: 1})
	size := r3.Norm(m)
	return []axis{{e1, field.Uniform{P: r3.Scale(-size, e2)}}, {e2, field.Uniform{P: r3.Scale(size, e1)}}}, nil
}

// aboutOrigin reports whether the normal of the surface of a body is everywhere along the radius.
func aboutOrigin(body geom.Body) bool {
	if p, ok := body.(geom.Placed); ok {
		body = p.Body
	}
	switch body.(type) {
	case geom.Sphere, geom.HollowSphere:
		return true
	}
	return false
}

// cross returns e x m for a frame axis e, in the form for which package bound has the best evaluator.
func cross(e r3.Vec, m field.Polarization) field.Polarization {
	switch m := m.(type) {
	case field.Affine:
		return crossAffine(e, m)
	case field.Polynomial:
		return crossPolynomial(e, m)
	case field.AxialPower:
		return crossPolynomial(e, field.Polynomial{{Component: 2, Coefficient: m.Coefficient, Powers: [3]int{2: m.Power}}})
	case field.RadialPower:
		if m.Power == 1 {
			return crossAffine(e, field.Affine{Gradient: [3][3]float64{0: {m.Coefficient}, 1: {1: m.Coefficient}}})
		}
	case field.CentralPower:
		if m.Power == 1 {
			c := m.Coefficient
			return crossAffine(e, field.Affine{Gradient: [3][3]float64{{0: c}, {1: c}, {2: c}}})
		}
	}
	f := field.Func{P: func(x r3.Vec) [3]float64 {
		v := r3.Cross(e, m.At(x))
		return [3]float64{v.X, v.Y, v.Z}
	}}
	switch m := m.(type) {
	case field.RadialPower, field.CentralPower: // no curl
		f.Div = func(r3.Vec) float64 { return 0 }
	case field.Func:
		f.Size = m.Size
	}
	return f
}

func crossAffine(e r3.Vec, m field.Affine) field.Affine {
	g := &m.Gradient
	p := field.Affine{Value: r3.Cross(e, m.Value), About: m.About}
	for k := range 3 {
		v := r3.Cross(e, r3.Vec{X: g[0][k], Y: g[1][k], Z: g[2][k]})
		p.Gradient[0][k], p.Gradient[1][k], p.Gradient[2][k] = v.X, v.Y, v.Z
	}
	return p
}

func crossPolynomial(e r3.Vec, m field.Polynomial) field.Polynomial {
	p := field.Polynomial{}
	for _, t := range m {
		if t.Component < 0 || t.Component > 2 {
			return m // bound.Of refuses it
		}
		var unit [3]float64
		unit[t.Component] = 1
		v := r3.Cross(e, r3.Vec{X: unit[0], Y: unit[1], Z: unit[2]})
		for k, c := range [3]float64{v.X, v.Y, v.Z} {
			if c != 0 {
				p = append(p, field.Term{Component: k, Coefficient: c * t.Coefficient, Powers: t.Powers})
			}
		}
	}
	return p
}

// curl returns curl m at a point of the body's own frame.
func curl(axes []axis, x r3.Vec) r3.Vec {
	var j r3.Vec
	for _, a := range axes {
		j = r3.Add(j, r3.Scale(-a.p.Divergence(x), a.e))
	}
	return j
}

// norm returns the Euclidean norm of a list.
func norm(v ...float64) float64 {
	s := 0.0
	for _, x := range v {
		s = math.Hypot(s, x)
	}
	return s
}
