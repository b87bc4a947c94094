package element

import (
	"errors"
	"fmt"
	"math"

	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

// CentralPower is the bound charge of a sphere, hollow or not, polarized along the radius: p = Coefficient r^Power n, so that
// the outside is free of field and inside g = -p.
//
// Units: natural; g in the unit of p, phi in that times the length unit.
// Frame: the sphere's own.
// Domain: all finite x. NaN in, NaN out. Built by NewCentralPower; immutable.
// Singular: at the centre of a full sphere p has no limit for a power of 0; there G is NaN with status AtPoint. On the
// surfaces g jumps by p.
// Accuracy: |g error| <= 1e-14 |p|, |phi error| <= 1e-14 of the largest p times the radius (TestCentralPower).
// Source: Gauss's law with sigma = p.n and rho = -c (n + 2) r^(n-1), as in [Griffiths2013] sec. 4.2.
type CentralPower struct {
	inner, outer float64 // inner 0: full
	c, n         float64
}

// NewCentralPower returns the charge between the radii inner (0 for a full sphere) and outer. A negative power needs an inner
// radius.
func NewCentralPower(inner, outer, coefficient, power float64) (*CentralPower, error) {
	switch {
	case !(inner >= 0 && inner < outer && outer < math.Inf(1)):
		return nil, fmt.Errorf("element: radii %v and %v of a sphere; give 0 <= inner < outer", inner, outer)
	case math.IsNaN(coefficient-coefficient) || math.IsNaN(power-power):
		return nil, errors.New("element: coefficient and power of a central polarization must be finite")
	case power < 0 && inner == 0:
		return nil, fmt.Errorf("element: power %v of a central polarization is infinite at the centre; give a power >= 0 or an "+
			"inner radius", power)
	}
	return &CentralPower{inner: inner, outer: outer, c: coefficient, n: power}, nil
}

// Field returns g at x.
func (s *CentralPower) Field(x r3.Vec) r3.Vec { return single(x, s.value) }

// Evaluate computes the arrays of dst; see field.Evaluator.
func (s *CentralPower) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	field.Fill(dst, at, func(p field.Point, _ field.Want) field.Value { return s.value(p, side) })
}

// Bounds returns the box of the sphere.
func (s *CentralPower) Bounds() r3.Box { return cube(s.outer) }

func (s *CentralPower) value(p field.Point, side field.Side) field.Value {
	return between(s, s.inner, s.outer, p, side)
}

// integral returns int_r^outer c t^n dt and a bound on its error: phi is minus that.
func (s *CentralPower) integral(r float64) (v, err float64) {
	q := math.Log(s.outer / r) // int = outer^(n+1) (1 - e^(-(n+1) q))/(n+1)
	k := s.n + 1
	top := s.c * math.Pow(s.outer, k)
	switch {
	case r == 0:
		v = top / k
	case k == 0:
		v = s.c * q
	default:
		v = -top * math.Expm1(-k*q) / k
	}
	return v, 8 * u * (math.Abs(top) + math.Abs(v))
}

func (s *CentralPower) cavity(r3.Vec, float64) field.Value {
	v, err := s.integral(s.inner)
	return field.Value{Phi: -v, ErrPhi: err}
}

func (s *CentralPower) wall(_, n r3.Vec, r, _, _ float64) field.Value {
	v, err := s.integral(r)
	out := field.Value{Phi: -v, ErrPhi: err}
	if r == 0 {
		if s.n == 0 {
			none := field.Nowhere(field.AtPoint)
			none.Phi, none.ErrPhi = out.Phi, out.ErrPhi
			return none
		}
		if s.n == 1 {
			out.Grad = [6]float64{-s.c, -s.c, -s.c}
		} else if s.n < 1 {
			out.Grad, out.ErrGrad = field.Nowhere(field.AtPoint).Grad, math.Inf(1)
		}
		return out
	}
	p := s.c * math.Pow(r, s.n)
	out.G = r3.Scale(-p, n)
	out.ErrG = 8 * u * math.Abs(p)
	t, m := -p/r, s.n-1
	out.Grad = [6]float64{
		t * (1 + m*n.X*n.X), t * (1 + m*n.Y*n.Y), t * (1 + m*n.Z*n.Z),
		t * m * n.X * n.Y, t * m * n.X * n.Z, t * m * n.Y * n.Z,
	}
	out.ErrGrad = 24 * u * math.Abs(t) * (2 + math.Abs(m))
	return out
}

func (s *CentralPower) outside(r3.Vec, r3.Vec, float64) field.Value { return field.Value{} }
