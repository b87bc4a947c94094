package element

import (
	"fmt"
	"math"

	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

// AffineSphere is the bound charge of a sphere, hollow or not, with affine polarization p = P + G x.
//
// Units: natural; g in the unit of p, phi in that times the length unit.
// Frame: the sphere's own.
// Domain: all finite x. NaN in, NaN out. Built by NewAffineSphere; immutable.
// Singular: nowhere. On the surfaces g jumps by (p.n) n.
// Accuracy: |g error| <= 1e-14 of the largest p min(1, (a/R)^3), phi likewise times a (TestAffineSphere).
// Source: superposition of a dipole layer ([Maxwell1873] art. 437), the trace part (Gauss's law) and the symmetric traceless
// part S, whose charge sigma = a n.S n is a solid harmonic of degree 2: phi = x.S x/5 inside, (a/r)^5 times that outside. The
// antisymmetric part carries no charge on a sphere.
type AffineSphere struct {
	inner, outer float64
	p            r3.Vec
	trace        float64 // a third of the trace of G
	s            [3][3]float64
}

// NewAffineSphere returns the charge between the radii inner (0 for a full sphere) and outer.
func NewAffineSphere(inner, outer float64, p field.Affine) (*AffineSphere, error) {
	if !(inner >= 0 && inner < outer && outer < math.Inf(1)) {
		return nil, fmt.Errorf("element: radii %v and %v of a sphere; give 0 <= inner < outer", inner, outer)
	}
	s := &AffineSphere{inner: inner, outer: outer, p: p.At(r3.Vec{}), trace: p.Divergence(r3.Vec{}) / 3}
	for i := range s.s {
		for j := range s.s {
			s.s[i][j] = 0.5 * (p.Gradient[i][j] + p.Gradient[j][i])
		}
		s.s[i][i] -= s.trace
	}
	return s, nil
}

// Field returns g at x.
func (s *AffineSphere) Field(x r3.Vec) r3.Vec { return single(x, s.value) }

// Evaluate computes the arrays of dst; see field.Evaluator.
func (s *AffineSphere) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	field.Fill(dst, at, func(p field.Point, _ field.Want) field.Value { return s.value(p, side) })
}

// Bounds returns the box of the sphere.
func (s *AffineSphere) Bounds() r3.Box { return cube(s.outer) }

func (s *AffineSphere) value(p field.Point, side field.Side) field.Value {
	return between(s, s.inner, s.outer, p, side)
}

func (s *AffineSphere) cavity(x r3.Vec, _ float64) field.Value {
	// the dipole and quadrupole layers cancel; the trace part leaves a constant potential
	v := -s.trace / 2 * (s.outer - s.inner) * (s.outer + s.inner)
	return field.Value{Phi: v, ErrPhi: 4 * u * math.Abs(v)}
}

// wall returns the value between the spheres. With q = inner/r, k_n = 1 - q^n taken from the height above the inner sphere,
//
//	phi = k_3 P.x/3 + k_5 x.S x/5 - (t/2)(outer^2 - r^2),
//	g   = -k_3 P/3 - q^3 (P.n) n - 2 k_5 S x/5 - q^5 r (n.S n) n - t x,   t a third of the trace.
func (s *AffineSphere) wall(x, n r3.Vec, r, up, down float64) field.Value {
	q, k3, k5 := 0.0, 1.0, 1.0
	if s.inner > 0 {
		q = s.inner / r
		k3 = up / r * (1 + q + q*q)
		k5 = up / r * (1 + q*(1+q*(1+q*(1+q))))
	}
	q3 := q * q * q
	q5 := q3 * q * q
	sx := tensorTimes(&s.s, x)
	xsx := r3.Dot(x, sx)
	v := field.Value{Phi: k3*r3.Dot(s.p, x)/3 + k5*xsx/5 - s.trace/2*down*(s.outer+r)}
	g := r3.Add(r3.Scale(-k3/3, s.p), r3.Scale(-0.4*k5, sx))
	g = r3.Add(g, r3.Scale(-s.trace, x))
	if s.inner > 0 {
		g = r3.Add(g, r3.Scale(-q3*r3.Dot(s.p, n)-q5*xsx/r, n))
	}
	v.G = g
	for k, ij := range tensorOrder {
		v.Grad[k] = -0.4 * s.s[ij[0]][ij[1]]
	}
	for k := range 3 {
		v.Grad[k] -= s.trace
	}
	p, size := r3.Norm(s.p), tensorNorm(&s.s)*r
	v.ErrPhi = 32 * u * (k3*p*r + math.Abs(s.trace)*down*s.outer + k5*size*r)
	v.ErrG = 32 * u * (p + math.Abs(s.trace)*r + size)
	v.ErrGrad = 8 * u * (math.Abs(s.trace) + tensorNorm(&s.s))
	if s.inner > 0 {
		less := s.layers(x, n, r, s.inner*s.inner*s.inner, s.inner*s.inner*s.inner*s.inner*s.inner)
		for k := range v.Grad {
			v.Grad[k] -= less.Grad[k]
		}
		v.ErrGrad += less.ErrGrad
	}
	return v
}

func (s *AffineSphere) outside(x, n r3.Vec, r float64) field.Value {
	return s.layers(x, n, r, (s.outer-s.inner)*(s.outer*s.outer+s.outer*s.inner+s.inner*s.inner), powerDifference(s.outer, s.inner))
}

// powerDifference returns b^5 - a^5 without cancellation.
func powerDifference(b, a float64) float64 {
	return (b - a) * (b*b*b*b + b*b*b*a + b*b*a*a + b*a*a*a + a*a*a*a)
}

// layers returns the dipole part a3 P.n/(3 r^2) and the quadrupole part a5 n.S n/(5 r^3).
func (s *AffineSphere) layers(x, n r3.Vec, r, a3, a5 float64) field.Value {
	v := dipolar(s.p, r3.Dot(s.p, n), a3/(3*r*r), n, r)
	addQuadrupole(&v, &s.s, a5, n, r)
	return v
}

// addQuadrupole adds the potential a5 n.S n/(5 r^3) of a symmetric S with trace zero at the place r n, with what follows.
func addQuadrupole(v *field.Value, s *[3][3]float64, a5 float64, n r3.Vec, r float64) {
	sn := tensorTimes(s, n)
	q := r3.Dot(n, sn)
	e := a5 / 5 / r / r / r // phi = e q
	f := e / r
	v.Phi += e * q
	v.G = r3.Add(v.G, r3.Sub(r3.Scale(5*f*q, n), r3.Scale(2*f, sn)))
	// grad g: d/dx_j of f (5 q n_i - 2 (S n)_i) with q = n.S n
	t := f / r
	nn, ss := [3]float64{n.X, n.Y, n.Z}, [3]float64{sn.X, sn.Y, sn.Z}
	for k, ij := range tensorOrder {
		i, j := ij[0], ij[1]
		d := -35*q*nn[i]*nn[j] + 10*(nn[i]*ss[j]+nn[j]*ss[i]) - 2*s[i][j]
		if i == j {
			d += 5 * q
		}
		v.Grad[k] += t * d
	}
	size := tensorNorm(s)
	v.ErrPhi += 16 * u * math.Abs(e) * size
	v.ErrG += 64 * u * math.Abs(f) * size
	v.ErrGrad += 400 * u * math.Abs(t) * size
}

// tensorOrder is the order xx, yy, zz, xy, xz, yz.
var tensorOrder = [6][2]int{{0, 0}, {1, 1}, {2, 2}, {0, 1}, {0, 2}, {1, 2}}

// tensorTimes returns M v.
func tensorTimes(m *[3][3]float64, v r3.Vec) r3.Vec {
	return r3.Vec{
		X: m[0][0]*v.X + m[0][1]*v.Y + m[0][2]*v.Z,
		Y: m[1][0]*v.X + m[1][1]*v.Y + m[1][2]*v.Z,
		Z: m[2][0]*v.X + m[2][1]*v.Y + m[2][2]*v.Z,
	}
}

// tensorNorm returns the Frobenius norm.
func tensorNorm(m *[3][3]float64) float64 {
	t := 0.0
	for _, row := range m {
		t += row[0]*row[0] + row[1]*row[1] + row[2]*row[2]
	}
	return math.Sqrt(t)
}
