package field

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// Term is Coefficient x^i y^j z^k in one component of a polynomial, 0 for x, 1 for y, 2 for z; Powers are i, j, k >= 0.
type Term struct {
	Component   int
	Coefficient float64
	Powers      [3]int
}

// Polynomial is the sum of terms.
type Polynomial []Term

// At returns p at x.
func (p Polynomial) At(x r3.Vec) r3.Vec {
	var v [3]float64
	for _, t := range p {
		v[t.Component] += t.Coefficient * power(x.X, t.Powers[0]) * power(x.Y, t.Powers[1]) * power(x.Z, t.Powers[2])
	}
	return r3.Vec{X: v[0], Y: v[1], Z: v[2]}
}

// Divergence returns div p at x.
func (p Polynomial) Divergence(x r3.Vec) float64 {
	at := [3]float64{x.X, x.Y, x.Z}
	var d float64
	for _, t := range p {
		n := t.Powers[t.Component]
		if n == 0 {
			continue
		}
		v := t.Coefficient * float64(n)
		for k, m := range t.Powers {
			if k == t.Component {
				m--
			}
			v *= power(at[k], m)
		}
		d += v
	}
	return d
}

// Degree returns the highest total power.
func (p Polynomial) Degree() int {
	n := 0
	for _, t := range p {
		n = max(n, t.Powers[0]+t.Powers[1]+t.Powers[2])
	}
	return n
}

// Check returns an error for a component other than 0, 1, 2, a negative power or a coefficient that is not finite.
func (p Polynomial) Check() error {
	for i, t := range p {
		switch {
		case t.Component < 0 || t.Component > 2:
			return fmt.Errorf("field: polynomial term %d: component %d; give 0 for x, 1 for y or 2 for z", i, t.Component)
		case min(t.Powers[0], t.Powers[1], t.Powers[2]) < 0:
			return fmt.Errorf("field: polynomial term %d: powers %v; give powers >= 0", i, t.Powers)
		case math.IsNaN(t.Coefficient - t.Coefficient):
			return fmt.Errorf("field: polynomial term %d: coefficient %v is not finite", i, t.Coefficient)
		}
	}
	return nil
}

// power returns x^n for n >= 0 by repeated squaring.
func power(x float64, n int) float64 {
	v := 1.0
	for ; n > 0; n /= 2 {
		if n%2 == 1 {
			v *= x
		}
		x *= x
	}
	return v
}

// AxialPower is p = Coefficient z^Power k, Power >= 0.
type AxialPower struct {
	Coefficient float64
	Power       int
}

// At returns p at x.
func (a AxialPower) At(x r3.Vec) r3.Vec { return r3.Vec{Z: a.Coefficient * power(x.Z, a.Power)} }

// Divergence returns div p at x.
func (a AxialPower) Divergence(x r3.Vec) float64 {
	if a.Power == 0 {
		return 0
	}
	return a.Coefficient * float64(a.Power) * power(x.Z, a.Power-1)
}

// RadialPower is p = Coefficient s^Power away from the z axis, s the distance from it. On the axis p is zero for Power > 0 and
// has no direction for 0; a negative power is infinite there, so the body must keep off it.
type RadialPower struct{ Coefficient, Power float64 }

// At returns p at x; NaN components on the axis if Power <= 0.
func (r RadialPower) At(x r3.Vec) r3.Vec {
	s := math.Hypot(x.X, x.Y)
	if s == 0 && r.Power > 0 {
		return r3.Vec{}
	}
	k := r.Coefficient * math.Pow(s, r.Power) / s
	return r3.Vec{X: k * x.X, Y: k * x.Y}
}

// Divergence returns Coefficient (Power + 1) s^(Power-1).
func (r RadialPower) Divergence(x r3.Vec) float64 {
	return r.Coefficient * (r.Power + 1) * math.Pow(math.Hypot(x.X, x.Y), r.Power-1)
}

// CentralPower is p = Coefficient r^Power away from the origin, r the distance from it. At the origin p is zero for Power > 0
// and has no direction for 0; a negative power is infinite there, so the body must keep off it.
type CentralPower struct{ Coefficient, Power float64 }

// At returns p at x; NaN components at the origin if Power <= 0.
func (c CentralPower) At(x r3.Vec) r3.Vec {
	r := r3.Norm(x)
	if r == 0 && c.Power > 0 {
		return r3.Vec{}
	}
	return r3.Scale(c.Coefficient*math.Pow(r, c.Power)/r, x)
}

// Divergence returns Coefficient (Power + 2) r^(Power-1).
func (c CentralPower) Divergence(x r3.Vec) float64 {
	return c.Coefficient * (c.Power + 2) * math.Pow(r3.Norm(x), c.Power-1)
}
