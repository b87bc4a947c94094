package solve

import (
	"fmt"
	"math"

	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"example.com/boundpole/magnet"
	"gonum.org/v1/gonum/spatial/r3"
)

// polarizationOf returns the law of a polarization in C/m^2 or a magnetization in A/m, lengths in the unit of the file.
func polarizationOf(p *scenefile.Polarization) field.Polarization {
	switch {
	case p.Remanence != nil:
		return field.Uniform{P: magnet.Remanence(*p.Remanence)}
	case p.Affine != nil:
		a := field.Affine{Value: p.Affine.Value, About: p.Affine.About}
		for i, row := range p.Affine.Gradient {
			a.Gradient[i] = [3]float64{row.X, row.Y, row.Z}
		}
		return a
	case p.Polynomial != nil:
		terms := make(field.Polynomial, len(p.Polynomial))
		for i, t := range p.Polynomial {
			component := map[string]int{"x": 0, "y": 1, "z": 2}[t.Component]
			terms[i] = field.Term{Component: component, Coefficient: t.Coefficient, Powers: t.Powers}
		}
		return terms
	case p.AxialPower != nil:
		return field.AxialPower{Coefficient: p.AxialPower.Coefficient, Power: p.AxialPower.Power}
	case p.RadialPower != nil:
		return field.RadialPower{Coefficient: p.RadialPower.Coefficient, Power: p.RadialPower.Power}
	case p.CentralPower != nil:
		return field.CentralPower{Coefficient: p.CentralPower.Coefficient, Power: p.CentralPower.Power}
	}
	return field.Uniform{P: *p.Uniform}
}

// gradientOf returns the gradient of a law at a point, row i that of component i; NaN components where it is infinite.
func gradientOf(law field.Polarization, x r3.Vec) [3][3]float64 {
	switch p := law.(type) {
	case field.Affine:
		return p.Gradient
	case field.Polynomial:
		return polynomialGradient(p, x)
	case field.AxialPower:
		return [3][3]float64{2: {2: p.Divergence(x)}}
	case field.RadialPower:
		return powerGradient(p.Coefficient, p.Power, r3.Vec{X: x.X, Y: x.Y}, 2)
	case field.CentralPower:
		return powerGradient(p.Coefficient, p.Power, x, 3)
	}
	return [3][3]float64{} // uniform
}

// polynomialGradient is gradientOf for a polynomial: each of its terms in turn as the only component, whose divergence is
// then a derivative.
func polynomialGradient(p field.Polynomial, x r3.Vec) (g [3][3]float64) {
	for _, t := range p {
		for k := range 3 {
			along := t
			along.Component = k
			g[t.Component][k] += field.Polynomial{along}.Divergence(x)
		}
	}
	return g
}

// powerGradient returns the gradient c r^(n-1) (I + (n-1) e e^T) of c r^n e, with e = x/r, in the first dim dimensions.
func powerGradient(c, n float64, x r3.Vec, dim int) (g [3][3]float64) {
	r := r3.Norm(x)
	e := [3]float64{x.X, x.Y, x.Z}
	for i := range dim {
		for k := range dim {
			switch {
			case i == k && n == 1:
				g[i][k] = c
			case n == 1 || r == 0 && n > 1:
			case r == 0:
				g[i][k] = math.NaN()
			default:
				g[i][k] = c * math.Pow(r, n-1) * (n - 1) * (e[i] / r) * (e[k] / r)
				if i == k {
					g[i][k] += c * math.Pow(r, n-1)
				}
			}
		}
	}
	return g
}

// singular says where a law of powers is infinite, or its divergence.
type singular struct {
	key   string // of the law in the scene
	place string // "axis" or "centre"
	power float64

	coefficient float64
	met         bool // the body contains or touches the place, and div p is infinite there
}

// fault is the refusal of a negative power on a body that meets the place.
func (s *singular) fault() error {
	return &fault{"/" + s.key + "/power",
		fmt.Sprintf("the power is negative and the body reaches the %s, where the law is infinite (got %v)", s.place, s.power),
		"give a power of at least 0, or a body that keeps off the " + s.place}
}

// singularOf returns what is singular about a law on a body; the zero value for nothing.
func singularOf(body geom.Body, law field.Polarization) singular {
	switch p := law.(type) {
	case field.RadialPower:
		return singular{"radial_power", "axis", p.Power, p.Coefficient, p.Power < 1 && meetsAxis(body)}
	case field.CentralPower:
		return singular{"central_power", "centre", p.Power, p.Coefficient, p.Power < 1 && meetsOrigin(body)}
	}
	return singular{}
}

// largest returns the largest |p| over a body: exactly for what is linear on a body with plane faces, of the rest over a
// sample of faces and inside.
func largest(body geom.Body, law field.Polarization) float64 {
	if u, ok := law.(field.Uniform); ok {
		return r3.Norm(u.P)
	}
	size := 0.0
	see := func(x r3.Vec) { size = math.Max(size, sizeAt(law, x)) } // NaN stays
	flat, isFlat := body.(geom.Flat)
	if isFlat {
		for _, x := range flat.Polyhedron().Vertices {
			see(x)
		}
	}
	if _, linear := law.(field.Affine); linear && isFlat {
		return size
	}
	const nodes = 6
	for _, f := range body.Faces() {
		f.Surface.Nodes(nodes, func(x, _ r3.Vec, _ float64) { see(x) })
	}
	for _, c := range body.Cells() {
		c.Nodes(nodes, func(x r3.Vec, _ float64) { see(x) })
	}
	return size
}

// sizeAt returns |p| at a point, also where p has a size but no direction.
func sizeAt(law field.Polarization, x r3.Vec) float64 {
	switch p := law.(type) {
	case field.RadialPower:
		return math.Abs(p.Coefficient) * math.Pow(math.Hypot(x.X, x.Y), p.Power)
	case field.CentralPower:
		return math.Abs(p.Coefficient) * math.Pow(r3.Norm(x), p.Power)
	}
	return r3.Norm(law.At(x))
}
