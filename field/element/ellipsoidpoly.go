package element

import (
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// PolynomialEllipsoid is the field of an ellipsoid about the origin with polynomial polarization; NewPolynomialEllipsoid makes it.
//
// Units: g has the unit of the polarization, phi that unit times length.
// Frame: the ellipsoid's own, axes along x, y, z.
// Domain: all finite x. NaN in, NaN out. Built by NewPolynomialEllipsoid; immutable.
// Singular: nowhere. On the surface (geom.OnTolerance) g jumps by (p.n) n; the gradient has no claim there.
// Accuracy: |error of g| <= 1e-12 max(|g|, 1e-3 g0), |error of phi| <= 1e-12 max(|phi|, 1e-3 phi0), with a the longest
// semi-axis, q = min(1, a/|x|), p the largest polarization, g0 = p q^3, phi0 = p a q^2, for axis ratios to 100 and as long as the
// terms of p are not much larger than their sum (worst 3.3e-15 and 1.5e-15 of 43 points, TestPolynomialEllipsoid); else as its
// estimates say, with status NotConverged where they are above 1e-10 of g0 and phi0.
// Source: [Dyson1891]. With a_i the semi-axes, A_i = a_i^2 + s, al_i = a_i^2/A_i, D = sqrt(A_1 A_2 A_3), U = 1 - sum x_i^2/A_i and
// lambda the s with U = 0 (0 inside), density f has
//
//	V[f](x) = (a b c/4) int_lambda^inf ds/D sum_k U^(k+1)/(4^k k! (k+1)!) (L^k f)(al_i x_i),   L = sum s al_i d_i^2,
//
// and phi = -sum d_i V[p_i]. The formula is recalled; testdata/ellipsoidpoly.py holds it against integration over the volume.
type PolynomialEllipsoid struct {
	base     *Ellipsoid // the shape, without polarization
	excess   [3]float64 // a_i^2 less the square of the shortest semi-axis, in units
	outer    polyTable  // the integrand of phi
	inner    polyTable  // phi inside, in x_i/a_i
	round    polyTable  // phi outside if this is a sphere
	dipole   r3.Vec     // the mean polarization
	rounding float64    // bound on the relative error of a term
	scale    polyScale
	nodes    []float64 // of the rule of one panel, on 0..1
	weights  []float64
}

// PolynomialDegree is the highest degree that PolynomialEllipsoid and PolynomialSphere take. It sets the size of tables; free.
const PolynomialDegree = 20

// NewPolynomialEllipsoid returns the ellipsoid with the polarization p of degree 20 at most. It returns the errors of shape.Check
// and p.Check, or one that says that p is too high or not finite.
func NewPolynomialEllipsoid(shape geom.Ellipsoid, p field.Polynomial) (*PolynomialEllipsoid, error) {
	base, err := NewEllipsoid(shape, r3.Vec{})
	if err != nil {
		return nil, err
	}
	if err := p.Check(); err != nil {
		return nil, err
	}
	if d := p.Degree(); d > PolynomialDegree {
		return nil, fmt.Errorf("element: polarization of degree %d of the ellipsoid; give degree %d at most", d, PolynomialDegree)
	}
	e := &PolynomialEllipsoid{base: base}
	least := base.axes[base.least]
	for i, a := range base.axes {
		e.excess[i] = (a - least) * (a + least)
	}
	e.nodes, e.weights = polyRule(p.Degree())
	scaled := e.scaled(p)
	e.rounding = polyRounding(p.Degree()) * u
	e.outer = integrandOf(scaled, &base.axes)
	e.dipole = meanOf(scaled)
	e.inner = e.interior()
	if e.excess == [3]float64{} {
		e.round = e.series()
	}
	if s := e.outer.total() + e.inner.total() + e.round.total(); s-s != 0 {
		return nil, fmt.Errorf("element: polarization of the ellipsoid overflows; give coefficients that times powers of the semi-axes %v "+
			"are finite", shape.SemiAxes)
	}
	e.scale = e.scaleOf(scaled)
	return e, nil
}

// scaled returns p in the coordinates x_i/a_i.
func (e *PolynomialEllipsoid) scaled(p field.Polynomial) field.Polynomial {
	q := make(field.Polynomial, len(p))
	for k, t := range p {
		for i, n := range t.Powers {
			for range n {
				t.Coefficient *= e.base.axes[i] * e.base.unit
			}
		}
		q[k] = t
	}
	return q
}

// meanOf returns the mean of p over the unit ball: that of x^i y^j z^k, n = i+j+k, is 3 (i-1)!! (j-1)!! (k-1)!!/((n+3) (n+1)!!) for
// even powers.
func meanOf(p field.Polynomial) r3.Vec {
	var m [3]float64
	for _, t := range p {
		if t.Powers[0]%2+t.Powers[1]%2+t.Powers[2]%2 > 0 {
			continue
		}
		c, n := t.Coefficient, 0
		for _, k := range t.Powers {
			for l := 1; l < k; l += 2 {
				n += 2
				c *= float64(l) / float64(n+1)
			}
		}
		m[t.Component] += 3 * c / float64(n+3)
	}
	return r3.Vec{X: m[0], Y: m[1], Z: m[2]}
}

// Field returns g at x.
func (e *PolynomialEllipsoid) Field(x r3.Vec) r3.Vec {
	return single(x, func(p field.Point, side field.Side) field.Value { return e.value(p, field.WantG, side) })
}

// Evaluate computes the arrays of dst; see field.Evaluator.
func (e *PolynomialEllipsoid) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	field.Fill(dst, at, func(p field.Point, want field.Want) field.Value { return e.value(p, want, side) })
}

// Bounds returns the box of the ellipsoid.
func (e *PolynomialEllipsoid) Bounds() r3.Box { return e.base.Bounds() }

func (e *PolynomialEllipsoid) value(p field.Point, want field.Want, side field.Side) field.Value {
	if e.scale.weak {
		want |= field.WantErr
	}
	x := p.X.Scale(pair.Of(1 / e.base.unit))
	if _, r := direction(x.Value()); r > ellipsoidFar { // where locate is good no more
		return e.outside(x, false, want)
	}
	switch e.base.locate(x, p) {
	case geom.Inside:
		return e.inside(x, want)
	case geom.Outside:
		return e.outside(x, false, want)
	}
	return onFace(e.inside(x, want), e.outside(x, true, want), side)
}

// inside returns the polynomial that phi is inside, with what follows; x in units, the value not.
func (e *PolynomialEllipsoid) inside(x pair.Vec, want field.Want) field.Value {
	var n polyNode
	for i, c := range [3]float64{x.X.Hi, x.Y.Hi, x.Z.Hi} {
		n.alpha[i], n.eta[i] = 1, c/e.base.axes[i]
	}
	var s polySum
	s.add(&e.inner, &n, &e.base.axes, 1, want)
	return e.finish(&s, r3.Norm(x.Value()), want)
}

// polyFar is the distance, in units, beyond which the ellipsoid is a dipole: the quadrupole is less than u/64 of the natural scale.
const polyFar = 0x1p60

// outside returns the value outside, or from the outside on the surface; x in units, the value not.
func (e *PolynomialEllipsoid) outside(x pair.Vec, surface bool, want field.Want) field.Value {
	b := e.base
	n, r := direction(x.Value())
	if r > polyFar {
		v := dipolar(e.dipole, along(e.dipole, x, r), b.axes[0]*b.axes[1]*b.axes[2]/3/r/r, n, r)
		scaleLength(&v, b.unit)
		return v
	}
	var s polySum
	var place polyNode
	if len(e.round.groups) > 0 && r < seriesReach*b.axes[0] {
		e.seriesNode(&[3]float64{x.X.Value(), x.Y.Value(), x.Z.Value()}, &place)
		s.add(&e.round, &place, &b.axes, 1, want)
		return e.finish(&s, r, want)
	}
	lambda := 0.0
	if !surface {
		lambda = b.root(x)
	}
	o := e.confocalAt(x, lambda)
	e.each(&o, func(t, w float64) {
		o.node(t, &place)
		s.add(&e.outer, &place, &b.axes, w, want)
	})
	e.addSurface(&s, &o, want)
	return e.finish(&s, r, want)
}

// polyRounding is the number of units of rounding allowed a term, of its powers and of the integral, for a polarization of some
// degree. Free; held by TestPolynomialEllipsoid.
func polyRounding(degree int) float64 { return float64(24 + 2*degree) }

// finish returns the value of the sums at distance r, in units.
func (e *PolynomialEllipsoid) finish(s *polySum, r float64, want field.Want) field.Value {
	v := field.Value{Phi: s.phi, G: r3.Vec{X: s.g[0], Y: s.g[1], Z: s.g[2]}, Grad: s.grad}
	if want&field.WantErr != 0 {
		d := s.gSize
		v.ErrPhi = e.rounding * s.phiSize
		v.ErrG = e.rounding * math.Sqrt(d[0]*d[0]+d[1]*d[1]+d[2]*d[2])
		v.ErrGrad = e.rounding * s.gradSize
	}
	scaleLength(&v, e.base.unit)
	e.judge(&v, r)
	return v
}

// scaleLength turns a value with lengths in units into one with the lengths of the unit.
func scaleLength(v *field.Value, unit float64) {
	v.Phi *= unit
	v.ErrPhi *= unit
	for k := range v.Grad {
		v.Grad[k] /= unit
	}
	v.ErrGrad /= unit
}
