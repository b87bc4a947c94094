package current

import (
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/element"
	"example.com/boundpole/field/internal/elliptic"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Loop is a circular loop of current, the rim of a disc; the current runs right-handed about +z.
//
// Units: natural; b in current by length, a in current.
// Frame: that of the disc, about the z axis; Posed places it.
// Domain: all finite x; radius within 1e-60 and 1e60. NaN in, NaN out. Built by NewLoop; immutable.
// Singular: |b| grows as 1/d and |a| as log(1/d) at distance d from the wire; on it NaN, field.AtPoint. Seen as a field.Source
// it has no potential: field.NoPotential where one is asked for.
// Accuracy: |error| <= 5e-15 of |b| and 3e-15 of |a| (TestLoopReference), 1e-14 of the gradient of b.
// Source: [Jackson1999] sec. 5.5, with elliptic.Ring for the integrals: a_phi = T1, b_rho = a z C3, b_z = a (a S3 - rho C3), each
// by 4 pi; a magnetic dipole beyond 1e8 radii.
type Loop struct {
	shape   geom.Disc
	current float64
}

// NewLoop returns the loop round a disc.
func NewLoop(shape geom.Disc, current float64) (*Loop, error) {
	if err := shape.Check(); err != nil {
		return nil, err
	}
	if current-current != 0 {
		return nil, fmt.Errorf("current: current %v of a loop is not finite; give a finite number", current)
	}
	return &Loop{shape, current}, nil
}

// Moment returns the dipole moment, current times area.
func (l *Loop) Moment() r3.Vec { return r3.Vec{Z: l.current * l.shape.Area()} }

// Field returns b at x.
func (l *Loop) Field(x r3.Vec) r3.Vec { return fieldAt(l, x) }

// Evaluate computes the arrays of dst with b for the field; see field.Evaluator.
func (l *Loop) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	evaluate(l, dst, at, side)
}

// Induction computes the arrays of dst; see Source.
func (l *Loop) Induction(dst *Values, at *field.Points, side field.Side) { induce(l, dst, at, side) }

// Bounds returns the box of the loop.
func (l *Loop) Bounds() r3.Box { return l.shape.Bounds() }

// dipoleReach is the distance in sizes beyond which a closed current is a dipole: (1e-8)^2 is left out.
const dipoleReach = 1e8

func (l *Loop) value(p field.Point, _ field.Side, want want) Value {
	a := l.shape.Radius
	x, y := p.X.X, p.X.Y
	height := p.X.Z.AddFloat(-l.shape.Z)
	v := p.X.Value()
	if away := max(math.Abs(v.X), math.Abs(v.Y), math.Abs(height.Value())); away > dipoleReach*a {
		return dipoleValue(p, r3.Vec{Z: l.shape.Z}, l.Moment())
	}
	rho2 := x.Mul(x).Add(y.Mul(y))
	rho := rho2.Sqrt().Value()
	z := height.Value()
	gap := pair.Product(a, a).Sub(rho2).Value() / (a + rho)
	if math.Hypot(gap, z) <= p.Slack+4*u*(r3.Norm(v)+math.Abs(l.shape.Z)+a) {
		return nowhere(field.AtPoint)
	}
	var out r3.Vec
	if rho > 0 {
		out = r3.Vec{X: v.X / rho, Y: v.Y / rho}
	}
	r := loopAt(a, rho, z, gap)
	k := over4P * l.current
	w := Value{
		A:    r3.Scale(k*r.a, r3.Vec{X: -out.Y, Y: out.X}),
		B:    r3.Vec{X: k * r.r * out.X, Y: k * r.r * out.Y, Z: k * r.b},
		ErrA: 12 * u * math.Abs(k*r.a), ErrB: 12 * u * math.Abs(k) * r.size,
	}
	if want&wantGrad != 0 {
		g := loopGradient(a, rho, z, gap)
		w.grad, w.errGrad = g.tensor(k, out), 24*u*math.Abs(k)*g.size
	}
	return w
}

// dipoleValue returns the value of a closed current of the moment m at c, from far away.
func dipoleValue(p field.Point, c, m r3.Vec) Value {
	w := scratches.Get().(*scratch)
	defer scratches.Put(w)
	x := p.X.Value()
	dst := w.part[0].like(1, wantB|wantGrad|wantErr)
	element.Dipole{At: c, Moment: m}.Evaluate(dst, w.only(x), field.Mean)
	g := dst.At(0)
	n := r3.Sub(x, c)
	r := math.Hypot(math.Hypot(n.X, n.Y), n.Z)
	a := r3.Scale(over4P/r/r, r3.Cross(m, r3.Scale(1/r, n)))
	return Value{A: a, B: g.G, ErrA: 16 * u * over4P * r3.Norm(m) / r / r, ErrB: g.ErrG + 8*u*r3.Norm(g.G),
		grad: g.Grad, errGrad: g.ErrGrad}
}

// loopValues is what a loop of current 4 pi gives: a along phi, b along rho and z, and the size of the terms of b.
type loopValues struct{ a, r, b, size float64 }

// loopAt returns the values of a loop of radius a at the distance rho from its axis and the height z, gap = a - rho.
func loopAt(a, rho, z, gap float64) loopValues {
	q1 := gap*gap + z*z
	pot, t1, s3, c3 := elliptic.Ring(a, rho, z, q1)
	f := 2 * a * rho
	l := loopValues{a: t1, r: a * z * c3}
	if q1 < 0.2*f { // close to the wire R^2 = q1 + 2 a rho (1 - cos phi) gives S3 - C3 without cancellation
		less := (pot - a*q1*s3) / f
		l.b = gap*a*s3 + rho*less
		l.size = math.Abs(gap)*a*s3 + rho*math.Abs(less)
	} else {
		l.b = a * (a*s3 - rho*c3)
		l.size = a * (a*s3 + rho*c3)
	}
	l.size += math.Abs(l.r)
	return l
}

// loopSlopes is the gradient of b of a loop of current 4 pi: b_rho/rho, d b_rho/d rho, d b_z/d rho = d b_rho/d z, d b_z/d z, and
// the size of the terms.
type loopSlopes struct{ around, out, across, along, size float64 }

// loopGradient returns the gradient of b of a loop. With P = a^2 + rho^2 + z^2 and P^2 - 4 a^2 rho^2 = Q q1, from
// R^2 = P - 2 a rho cos phi and by parts,
//
//	S5 = (P S3 + 2 a rho C3/3)/(Q q1),   C5 = (P C3/3 + 2 a rho S3)/(Q q1),
//
// and S5 - C5 = (S3 - q1 S5)/(2 a rho) close to the wire [own derivation]; no term cancels. The rest is div b = 0, curl b = 0.
func loopGradient(a, rho, z, gap float64) (g loopSlopes) {
	q1, sum, zz := gap*gap+z*z, a+rho, z*z
	q := sum*sum + zz
	_, _, s3, c3 := elliptic.Ring(a, rho, z, q1)
	f, p := 2*a*rho, a*a+rho*rho+zz
	s5, c5 := (p*s3+f*c3/3)/(q*q1), (p*c3/3+f*s3)/(q*q1)
	c3r := 3 * math.Pi * a / (q * q * math.Sqrt(q)) // C3/rho on the axis
	if rho > 0 {
		c3r = c3 / rho
	}
	odd, oddSize := a*s5-rho*c5, a*s5+rho*c5
	if q1 < 0.2*f {
		less := (s3 - q1*s5) / (2 * a)
		odd, oddSize = gap*s5+less, math.Abs(gap)*s5+math.Abs(less)
	}
	g.around = a * z * c3r
	g.across = a * (c3 - 3*zz*c5)
	g.along = -3 * a * z * odd
	g.out = -g.around - g.along
	g.size = 2*math.Abs(g.around) + 2*a*(c3+3*zz*c5) + 6*a*math.Abs(z)*oddSize
	return g
}

// tensor returns k times the gradient in Cartesian components, out the unit vector away from the axis.
func (g *loopSlopes) tensor(k float64, out r3.Vec) [6]float64 {
	d := g.out - g.around
	return [6]float64{
		k * (g.around + d*out.X*out.X), k * (g.around + d*out.Y*out.Y), k * g.along,
		k * d * out.X * out.Y, k * g.across * out.X, k * g.across * out.Y,
	}
}
