package element

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// The round sources (disc, annulus, wall, tube) share this: a point in cylinder coordinates, and the way from the two
// harmonics of a potential, constant and cos(phi) in the azimuth, to a field.Value. Geometry comes in pairs, so that the
// distances from faces and rims keep their digits; all else is float64. Sums carry no factor 1/4pi until
// roundPoint.value.

// roundPoint is a field point seen from the axis of a round source.
type roundPoint struct {
	rho2  pair.Float // x^2 + y^2
	rho   float64
	e     r3.Vec // unit vector from the axis; zero on the axis
	z     pair.Float
	tol   float64 // distance within which the point counts as on a face
	reach float64 // distance from the centre of the source
}

// newRoundPoint returns p seen from the axis of a source with the given centre height and bounding radius.
func newRoundPoint(p field.Point, centre, bound float64) roundPoint {
	x, y := p.X.X, p.X.Y
	q := roundPoint{rho2: x.Mul(x).Add(y.Mul(y)), z: p.X.Z}
	q.rho = math.Sqrt(q.rho2.Hi)
	if !(q.rho2.Hi < 1e300) || q.rho2.Hi < 1e-280 { // the squares leave the range
		q.rho = math.Hypot(x.Hi, y.Hi)
		if q.rho2.Hi < 1e-280 {
			q.rho2 = pair.Float{}
		}
	}
	if q.rho > 0 {
		q.e = r3.Vec{X: x.Hi / q.rho, Y: y.Hi / q.rho}
	}
	h, z := q.height(centre), p.X.Z.Hi
	q.reach = math.Sqrt(q.rho*q.rho + h*h)
	away := math.Sqrt(q.rho*q.rho + z*z)
	if !(q.reach < 1e150 && away < 1e150) {
		q.reach, away = math.Hypot(q.rho, h), math.Hypot(q.rho, z)
	}
	q.tol = p.Slack + 4*u*(away+math.Abs(centre)+bound)
	return q
}

// height returns z - end.
func (p *roundPoint) height(end float64) float64 { return p.z.AddFloat(-end).Value() }

// inward returns a - rho without cancellation: (a^2 - rho^2)/(a + rho) in pairs.
func (p *roundPoint) inward(a float64) float64 {
	return pair.Product(a, a).Sub(p.rho2).Value() / (a + p.rho)
}

// constant is a potential u(rho, z) with what its derivatives give, and sums of the sizes of the terms.
type constant struct {
	u, rho, z           float64 // u, du/drho, du/dz
	byRho, zz, rhoZ     float64 // (du/drho)/rho, second derivatives
	lap                 float64 // Laplacian of u: -4 pi times the volume charge
	sizeU, sizeG, sizeH float64
}

// cosine is a potential f(rho, z) cos(phi) with s = f/rho and tau = df/drho - f/rho, both regular on the axis.
type cosine struct {
	s, tau, z                 float64 // s, tau, df/dz
	tauByRho, zByRho, zz, rho float64 // tau/rho, (df/dz)/rho, d2f/dz2, d2f/drho dz
	sizeS, sizeG, sizeH       float64
}

// rounding is the number of units of rounding that a sum of terms is allowed, of the sum of the sizes of the terms.
// Free; TestRoundReference holds the bounds against reference values.
const rounding = 12

// value puts the two harmonics together; the cosine one stands along the transverse vector t.
func (p *roundPoint) value(c *constant, k *cosine, t r3.Vec, want field.Want) field.Value {
	var v field.Value
	te := t.X*p.e.X + t.Y*p.e.Y
	v.Phi = over4P * (c.u + te*p.rho*k.s)
	ge := c.rho + te*k.tau
	v.G.X = -over4P * (ge*p.e.X + k.s*t.X)
	v.G.Y = -over4P * (ge*p.e.Y + k.s*t.Y)
	v.G.Z = -over4P * (c.z + te*k.z)
	if want&field.WantGrad != 0 {
		p.gradient(&v, c, k, t, te)
	}
	if want&field.WantErr != 0 {
		tn := math.Hypot(t.X, t.Y)
		size := r3.Norm(v.G)
		v.ErrPhi = over4P*u*(rounding*(c.sizeU+math.Abs(te)*p.rho*k.sizeS)+3*tn*p.rho*k.sizeS) +
			3*u*math.Abs(v.Phi) + 8*u*u*p.reach*size // the last for the rounding of a pair
		v.ErrG = over4P*rounding*u*(c.sizeG+tn*k.sizeG) + 4*u*size
		v.ErrGrad = over4P * 4 * rounding * u * (c.sizeH + tn*k.sizeH)
	}
	return v
}

// gradient sets the gradient of g, minus the Hessian of the potential.
func (p *roundPoint) gradient(v *field.Value, c *constant, k *cosine, t r3.Vec, te float64) {
	ex, ey := p.e.X, p.e.Y
	// constant: u_rho/rho I + (u_rhorho - u_rho/rho) ee + u_rhoz (ek + ke) + u_zz kk
	across := c.byRho + te*k.tauByRho
	ee := c.lap - 2*c.byRho - c.zz - te*(4*k.tauByRho+k.zz)
	ez := c.rhoZ + te*(k.rho-k.zByRho)
	zz := c.zz + te*k.zz
	tt := k.tauByRho
	v.Grad = [6]float64{
		-over4P * (across + ee*ex*ex + 2*tt*t.X*ex),
		-over4P * (across + ee*ey*ey + 2*tt*t.Y*ey),
		-over4P * zz,
		-over4P * (ee*ex*ey + tt*(t.X*ey+t.Y*ex)),
		-over4P * (ez*ex + k.zByRho*t.X),
		-over4P * (ez*ey + k.zByRho*t.Y),
	}
}

// onEdge makes v a value on a rim, where the field is infinite and the potential is not.
func onEdge(v field.Value) field.Value {
	w := field.Nowhere(field.OnEdge)
	w.Phi, w.ErrPhi = v.Phi, v.ErrPhi
	return w
}
