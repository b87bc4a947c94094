package bound

import (
	"fmt"
	"math"

	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

// simplest returns p in its simplest form: factors multiplied in, polynomials of degree 1 as field.Affine, powers that are
// affine too. It fails for numbers that are not finite.
func simplest(p field.Polarization) (field.Polarization, error) {
	switch q := p.(type) {
	case field.Times:
		inner, err := simplest(q.Polarization)
		if err != nil {
			return nil, err
		}
		return times(inner, q.Factor)
	case field.Uniform:
		return simplest(field.Affine{Value: q.P})
	case field.Affine:
		sum := q.Value.X + q.Value.Y + q.Value.Z + q.About.X + q.About.Y + q.About.Z
		for _, row := range q.Gradient {
			sum += row[0] + row[1] + row[2]
		}
		return q, finite(sum, p)
	case field.Polynomial:
		if err := q.Check(); err != nil {
			return nil, err
		}
		if q.Degree() <= 1 {
			return affineOf(q), nil
		}
	case field.AxialPower:
		if q.Power < 0 {
			return nil, fmt.Errorf("bound: axial power %d; give an integer >= 0", q.Power)
		}
		if q.Power <= 1 {
			return affineOf(q), finite(q.Coefficient, p)
		}
		return q, finite(q.Coefficient, p)
	case field.RadialPower:
		if q.Power == 1 {
			return affineOf(q), finite(q.Coefficient, p)
		}
		return q, finite(q.Coefficient+q.Power, p)
	case field.CentralPower:
		if q.Power == 1 {
			return affineOf(q), finite(q.Coefficient, p)
		}
		return q, finite(q.Coefficient+q.Power, p)
	case field.Func:
		if q.P == nil {
			return nil, fmt.Errorf("bound: polarization of type field.Func without P; give the function")
		}
	}
	return p, nil
}

// finite returns an error if the sum of the numbers of p is not finite.
func finite(sum float64, p field.Polarization) error {
	if math.IsNaN(sum - sum) {
		return fmt.Errorf("bound: polarization %+v is not finite; give finite components", p)
	}
	return nil
}

// affineOf returns a polarization that is known to be affine as value and gradient.
func affineOf(p field.Polarization) field.Affine {
	var a field.Affine
	if r, ok := p.(field.RadialPower); ok {
		a.Gradient[0][0], a.Gradient[1][1] = r.Coefficient, r.Coefficient
		return a
	}
	a.Value = p.At(r3.Vec{})
	for k, e := range [3]r3.Vec{{X: 1}, {Y: 1}, {Z: 1}} {
		d := r3.Sub(p.At(e), a.Value)
		a.Gradient[0][k], a.Gradient[1][k], a.Gradient[2][k] = d.X, d.Y, d.Z
	}
	return a
}

// times multiplies a simplest form by a factor.
func times(p field.Polarization, k float64) (field.Polarization, error) {
	if err := finite(k, field.Times{Polarization: p, Factor: k}); err != nil {
		return nil, err
	}
	switch q := p.(type) {
	case field.Affine:
		q.Value = r3.Scale(k, q.Value)
		for i := range q.Gradient {
			for j := range q.Gradient[i] {
				q.Gradient[i][j] *= k
			}
		}
		return simplest(q)
	case field.Polynomial:
		scaled := make(field.Polynomial, len(q))
		for i, t := range q {
			t.Coefficient *= k
			scaled[i] = t
		}
		return simplest(scaled)
	case field.AxialPower:
		q.Coefficient *= k
		return simplest(q)
	case field.RadialPower:
		q.Coefficient *= k
		return simplest(q)
	case field.CentralPower:
		q.Coefficient *= k
		return simplest(q)
	}
	return field.Times{Polarization: p, Factor: k}, nil
}

// degree returns the degree of a polynomial polarization; ok is false for others.
func degree(p field.Polarization) (n int, ok bool) {
	switch q := p.(type) {
	case field.Affine:
		return 1, true
	case field.Polynomial:
		return q.Degree(), true
	case field.AxialPower:
		return q.Power, true
	}
	return 0, false
}

// polynomialOf returns a polarization as a polynomial; ok is false if it is none.
func polynomialOf(p field.Polarization) (q field.Polynomial, ok bool) {
	switch p := p.(type) {
	case field.Polynomial:
		return p, true
	case field.AxialPower:
		return field.Polynomial{{Component: 2, Coefficient: p.Coefficient, Powers: [3]int{0, 0, p.Power}}}, true
	case field.RadialPower:
		return oddPower(p.Coefficient, p.Power, 2)
	case field.CentralPower:
		return oddPower(p.Coefficient, p.Power, 3)
	}
	return nil, false
}

// oddPower returns c r^n times the unit vector along r, r the distance in the first axes coordinates: a polynomial for odd n.
func oddPower(c, n float64, axes int) (q field.Polynomial, ok bool) {
	const most = 33
	if !(n >= 1 && n <= most) || math.Mod(n, 2) != 1 {
		return nil, false
	}
	half := int(n) / 2
	for i := range half + 1 {
		for j := range half + 1 - i {
			k := half - i - j
			if axes == 2 && k > 0 {
				continue
			}
			ways := c
			for m := range j { // half!/(i! j! k!) = C(half, i) C(half - i, j)
				ways = ways * float64(half-i-m) / float64(m+1)
			}
			for m := range i {
				ways = ways * float64(half-m) / float64(m+1)
			}
			for a := range axes {
				powers := [3]int{2 * i, 2 * j, 2 * k}
				powers[a]++
				q = append(q, field.Term{Component: a, Coefficient: ways, Powers: powers})
			}
		}
	}
	return q, true
}
