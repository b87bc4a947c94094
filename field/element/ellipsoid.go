package element

import (
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/internal/elliptic"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Ellipsoid is the field of an ellipsoid about the origin with uniform or affine polarization; NewEllipsoid and
// NewAffineEllipsoid make it.
//
// Units: g has the unit of the polarization, phi that unit times length.
// Frame: the ellipsoid's own, axes along x, y, z.
// Domain: all finite x. NaN in, NaN out.
// Singular: nowhere. On the surface (geom.OnTolerance) g jumps by (p.n) n; the gradient has no claim there.
// Accuracy: |error of g| <= 5e-15 max(|g|, 1e-3 g0), |error of phi| <= 5e-14 max(|phi|, 1e-3 phi0), with a the longest
// semi-axis, q = min(1, a/|x|), g0 = p q^3, phi0 = p a q^2, for axis ratios to 1e6 (worst 1e-15 and 1.5e-14 of 3600
// points, TestSimpleReference); with affine p, of magnitude p at most, 1e-13 of both for ratios to 1e3 (worst 8.9e-14 where g
// cancels to 1e-3 p, else 2e-15, TestAffineEllipsoid); of grad g as its estimate says.
// Source: [Maxwell1873] art. 437; with Carlson's integral R_D in place of
// Legendre's, [DLMF] 19.33 (https://dlmf.nist.gov/19.33#ii); the linear part of p see ellipsoidSlope.
type Ellipsoid struct {
	shape   geom.Ellipsoid
	p       r3.Vec
	unit    float64       // the power of two by which lengths are divided: the largest semi-axis becomes 0.5 to 1
	axes    [3]float64    // semi-axes in units
	squares [3]pair.Float // and their squares
	least   int           // the shortest axis
	factors [3]float64    // depolarizing factors
	slope   *ellipsoidSlope
}

// NewEllipsoid returns the ellipsoid with the uniform polarization p. It returns the error of shape.Check, or one that
// says that p is not finite.
func NewEllipsoid(shape geom.Ellipsoid, p r3.Vec) (*Ellipsoid, error) {
	if err := shape.Check(); err != nil {
		return nil, err
	}
	if p.X-p.X+(p.Y-p.Y)+(p.Z-p.Z) != 0 {
		return nil, fmt.Errorf("element: polarization %v of the ellipsoid is not finite; give finite components", p)
	}
	a := [3]float64{shape.SemiAxes.X, shape.SemiAxes.Y, shape.SemiAxes.Z}
	exponent := math.Ilogb(max(a[0], a[1], a[2])) + 1
	e := &Ellipsoid{shape: shape, p: p, unit: math.Ldexp(1, exponent)}
	var squares [3]float64
	for i := range a {
		e.axes[i] = math.Ldexp(a[i], -exponent)
		e.squares[i] = pair.Product(e.axes[i], e.axes[i])
		squares[i] = e.squares[i].Hi
		if e.axes[i] < e.axes[e.least] {
			e.least = i
		}
	}
	e.factors = e.integrals(&squares, 1)
	return e, nil
}

// Factors returns the depolarizing (demagnetizing) factors along the axes: inside, g = -(N_x p_x, N_y p_y, N_z p_z).
// Their sum is 1.
func (e *Ellipsoid) Factors() r3.Vec {
	return r3.Vec{X: e.factors[0], Y: e.factors[1], Z: e.factors[2]}
}

// Field returns g at x.
func (e *Ellipsoid) Field(x r3.Vec) r3.Vec {
	return single(x, func(p field.Point, side field.Side) field.Value { return e.value(p, field.WantG, side) })
}

// Evaluate computes the arrays of dst; see field.Evaluator.
func (e *Ellipsoid) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	field.Fill(dst, at, func(p field.Point, want field.Want) field.Value { return e.value(p, want, side) })
}

// Bounds returns the box of the ellipsoid.
func (e *Ellipsoid) Bounds() r3.Box {
	return e.shape.Bounds()
}

// ellipsoidFar is the distance, in units, beyond which the ellipsoid is a dipole: the next term is less than
// 2 (1/ellipsoidFar)^2 = u/64 of it.
const ellipsoidFar = 0x1p30

func (e *Ellipsoid) value(p field.Point, want field.Want, side field.Side) field.Value {
	x := p.X.Scale(pair.Of(1 / e.unit))
	var v field.Value
	if n, r := direction(x.Value()); r > ellipsoidFar {
		v = dipolar(e.p, along(e.p, x, r), e.axes[0]*e.axes[1]*e.axes[2]/3/r/r, n, r)
		if e.slope != nil {
			addQuadrupole(&v, &e.slope.far, 2, n, r)
		}
	} else {
		switch e.locate(x, p) {
		case geom.Inside:
			v = e.inside(x, want)
		case geom.Outside:
			v = e.outside(x, e.root(x), want)
		default:
			v = onFace(e.inside(x, want), e.outside(x, 0, want), side)
		}
	}
	v.Phi *= e.unit
	v.ErrPhi *= e.unit
	for k := range v.Grad {
		v.Grad[k] /= e.unit
	}
	v.ErrGrad /= e.unit
	return v
}

// excess returns sum x_i^2/(a_i^2 + lambda) - 1, to u of itself as long as it is above 1e-30.
func (e *Ellipsoid) excess(x pair.Vec, lambda float64) float64 {
	sum := pair.Of(-1)
	for i, c := range [3]pair.Float{x.X, x.Y, x.Z} {
		sum = sum.Add(c.Mul(c).Div(e.squares[i].AddFloat(lambda)))
	}
	return sum.Value()
}

// locate tells where x lies. The distance from the surface is (f-1)/(|grad f|/2 (1 + sqrt f)), f = sum x_i^2/a_i^2, to
// first order in itself.
func (e *Ellipsoid) locate(x pair.Vec, p field.Point) geom.Region {
	f, slope := 0.0, 0.0
	for i, c := range [3]float64{x.X.Hi, x.Y.Hi, x.Z.Hi} {
		q := c / e.axes[i]
		f += q * q
		slope += (q / e.axes[i]) * (q / e.axes[i])
	}
	over := f - 1
	if math.Abs(over) < 0x1p-20 { // plain rounding is 2^-50 of f
		over = e.excess(x, 0)
	}
	h := over / (math.Sqrt(slope) * (1 + math.Sqrt(f))) * e.unit
	if math.Abs(h) <= geom.OnTolerance(e.Bounds(), p.X.Value(), p.Slack) {
		return geom.On
	}
	return sideOf(h)
}

// root returns the largest lambda with sum x_i^2/(a_i^2 + lambda) = 1 for a point outside, so exactly that every
// a_i^2 + lambda is good to 2 u.
//
// 1/f is concave and rises, so that Newton's iteration on 1/f = 1 climbs to the root from the left (own derivation); it
// stops where rounding of f - 1 ends the climb, with an error up to 4 u of the longest a_i^2 + lambda. If the axes
// differ much that spoils the shortest, and steps with f - 1 from pairs follow.
func (e *Ellipsoid) root(x pair.Vec) float64 {
	c := [3]float64{x.X.Value(), x.Y.Value(), x.Z.Value()}
	lambda, longest := 0.0, 0.0
	for i := range c {
		lambda = max(lambda, (math.Abs(c[i])-e.axes[i])*(math.Abs(c[i])+e.axes[i]))
		longest = max(longest, e.squares[i].Hi)
	}
	const limit = 64 // 12 were needed at worst of 4000 points with axis ratios to 1000
	for range limit {
		f, f2 := e.sums(&c, lambda)
		step := f * (f - 1) / f2
		if !(step > 0) || lambda+step == lambda {
			break
		}
		lambda += step
	}
	shortest := e.squares[e.least].Hi
	for range 4 { // one was enough for axis ratios to 1e6
		if longest+lambda < 4*(shortest+lambda) {
			break
		}
		f, f2 := e.sums(&c, lambda)
		step := e.excess(x, lambda) * f / f2
		lambda = max(0, lambda+step)
		if math.Abs(step) <= u*(shortest+lambda) {
			break
		}
	}
	return lambda
}

// sums returns sum x_i^2/(a_i^2 + lambda) and sum x_i^2/(a_i^2 + lambda)^2.
func (e *Ellipsoid) sums(c *[3]float64, lambda float64) (f, f2 float64) {
	for i := range c {
		s := c[i] / (e.squares[i].Hi + lambda)
		f += s * c[i]
		f2 += s * s
	}
	return f, f2
}

// integrals returns N_i = (a1 a2 a3/3) R_D(A_j, A_k, A_i), whose sum is t = a1 a2 a3/sqrt(A1 A2 A3). That of the
// shortest axis is the largest, at least t/3, and follows from the other two without loss.
func (e *Ellipsoid) integrals(squares *[3]float64, t float64) [3]float64 {
	v := e.axes[0] * e.axes[1] * e.axes[2] / 3
	var n [3]float64
	i, j, k := e.least, (e.least+1)%3, (e.least+2)%3
	n[j] = v * elliptic.RD(squares[k], squares[i], squares[j])
	n[k] = v * elliptic.RD(squares[i], squares[j], squares[k])
	n[i] = t - n[j] - n[k]
	return n
}

// inside returns phi = sum N_i p_i x_i, g_i = -N_i p_i, lengths in units.
func (e *Ellipsoid) inside(x pair.Vec, want field.Want) field.Value {
	n := e.Factors()
	g := r3.Vec{X: -n.X * e.p.X, Y: -n.Y * e.p.Y, Z: -n.Z * e.p.Z}
	a, b, c := -g.X*x.X.Hi, -g.Y*x.Y.Hi, -g.Z*x.Z.Hi
	v := field.Value{Phi: a + b + c, G: g,
		ErrPhi: 16 * u * (math.Abs(a) + math.Abs(b) + math.Abs(c)), ErrG: 12 * u * r3.Norm(g)}
	if e.slope != nil {
		e.slope.add(&v, &[3]float64{x.X.Hi, x.Y.Hi, x.Z.Hi}, &e.slope.inside, nil, want)
	}
	return v
}

// outside returns the value on the confocal ellipsoid with A_i = a_i^2 + lambda, lengths in units. With s the unit
// normal, along x_i/A_i, and t = a1 a2 a3/sqrt(A1 A2 A3):
//
//	phi = sum N_i p_i x_i,   g_i = -N_i p_i + t (p.s) s_i.
//
// The factor t s_i^2 - N_i of p_i in g_i is minus the sum of the other two; whichever has the smaller terms is taken.
func (e *Ellipsoid) outside(x pair.Vec, lambda float64, want field.Want) field.Value {
	c := [3]float64{x.X.Value(), x.Y.Value(), x.Z.Value()}
	p := [3]float64{e.p.X, e.p.Y, e.p.Z}
	var squares, w [3]float64
	t := 1.0
	for i := range c {
		squares[i] = e.squares[i].AddFloat(lambda).Value()
		w[i] = 1 / squares[i]
		t *= e.squares[i].Hi / squares[i]
	}
	t = math.Sqrt(t)
	n := e.integrals(&squares, t)
	normal, steep := direction(r3.Vec{X: c[0] * w[0], Y: c[1] * w[1], Z: c[2] * w[2]})
	s := [3]float64{normal.X, normal.Y, normal.Z}

	var v field.Value
	var g [3]float64
	for i := range c {
		j, k := (i+1)%3, (i+2)%3
		v.Phi += n[i] * p[i] * c[i]
		v.ErrPhi += 32 * u * math.Abs(n[i]*p[i]*c[i])
		d, terms := t*s[i]*s[i]-n[i], t*s[i]*s[i]+n[i]
		if terms > t {
			d, terms = n[j]-t*s[j]*s[j]+(n[k]-t*s[k]*s[k]), 2*t-terms
		}
		g[i] = p[i]*d + t*s[i]*(p[j]*s[j]+p[k]*s[k])
		v.ErrG += 32 * u * (math.Abs(p[i])*terms + t*math.Abs(s[i])*(math.Abs(p[j]*s[j])+math.Abs(p[k]*s[k])))
	}
	v.G = r3.Vec{X: g[0], Y: g[1], Z: g[2]}
	if want&field.WantGrad != 0 {
		v.Grad, v.ErrGrad = confocal(&p, &s, &w, t/steep)
	}
	if e.slope != nil {
		o := confocalIntegralsOf(squares)
		tau := 2 * t / (e.axes[0] * e.axes[1] * e.axes[2])
		e.slope.add(&v, &c, &o, &confocalNormal{s: s, w: w, steep: steep, tau: tau}, want)
	}
	return v
}

// confocal returns the gradient of g outside, and a bound on its error. With w_i = 1/A_i, f = t/|x_i/A_i| and
//
//	P = p.s,   Q = sum p_i s_i w_i,   W = sum s_i^2 w_i,   h = sum w_i
//	grad_ij = f [ p_i s_j w_i + p_j s_i w_j + P delta_ij w_i - s_i s_j ( P (h + 2 w_i + 2 w_j - 4 W) + 2 Q ) ].
//
// Source: own derivation, from d lambda/dx_j = 2 s_j/|x_i/A_i| and dN_i/d lambda = -t w_i/2. A diagonal element is
// minus the sum of the other two; whichever has the smaller terms is taken.
func confocal(p, s, w *[3]float64, f float64) (grad [6]float64, bound float64) {
	var ps, pa, qs, qa, ws, h float64 // sums and sums of magnitudes
	for i := range p {
		ps += p[i] * s[i]
		pa += math.Abs(p[i] * s[i])
		qs += p[i] * s[i] * w[i]
		qa += math.Abs(p[i]*s[i]) * w[i]
		ws += s[i] * s[i] * w[i]
		h += w[i]
	}
	element := func(i, j int) (value, terms float64) {
		a, b := p[i]*s[j]*w[i], p[j]*s[i]*w[j]
		value = a + b - s[i]*s[j]*(ps*(h+2*w[i]+2*w[j]-4*ws)+2*qs)
		terms = math.Abs(a) + math.Abs(b) + math.Abs(s[i]*s[j])*(pa*(h+2*w[i]+2*w[j]+4*ws)+2*qa)
		if i == j {
			value += ps * w[i]
			terms += pa * w[i]
		}
		return value, terms
	}
	var d, m [3]float64
	for i := range d {
		d[i], m[i] = element(i, i)
	}
	bound = traceless(&d, &m)
	for i := range d {
		grad[i] = f * d[i]
	}
	for k, ij := range [3][2]int{{0, 1}, {0, 2}, {1, 2}} {
		value, terms := element(ij[0], ij[1])
		grad[3+k] = f * value
		bound += 1.5 * terms // twice in the Frobenius norm
	}
	return grad, 24 * u * math.Abs(f) * bound
}

// traceless replaces each of three numbers whose sum is zero by minus the sum of the other two where that has the smaller
// terms m, and returns the sum of the terms used.
func traceless(d, m *[3]float64) (bound float64) {
	old := *d
	for i := range d {
		j, k := (i+1)%3, (i+2)%3
		terms := m[i]
		if m[j]+m[k] < terms {
			d[i], terms = -(old[j] + old[k]), m[j]+m[k]
		}
		bound += terms
	}
	return bound
}
