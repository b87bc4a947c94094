package field

import (
	"math"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Moments is the multipole expansion of charge about a centre: a source that stands for a body far away from it.
//
// Units: natural; g in the unit of charge per length^2, phi in that times the length unit.
// Frame: that of Centre.
// Domain: points at a distance R > Radius from Centre, where all charge lies within Radius. Points nearer get a value
// without claim and status NotConverged.
// Singular: nowhere in the domain.
// Accuracy: the relative size of what order N leaves out is (Radius/R)^(N+1); orders beyond 1e-18 are not summed.
// Source: solid harmonics and their derivatives as in [Dehnen2014] sec. 2; 1/|x-y| = sum conj(R_n^m(y)) I_n^m(x).
type Moments struct {
	centre r3.Vec
	radius float64
	unit   float64 // power of two near radius; the harmonics are of coordinates divided by it
	order  int
	m      []complex128 // row n holds m = 0..n
	charge float64      // sum of |q|
	dipole float64      // sum of |p|
}

// NewMoments returns the empty expansion about centre for charge within radius, up to and including an order >= 1.
func NewMoments(centre r3.Vec, radius float64, order int) *Moments {
	order = max(order, 1)
	return &Moments{centre: centre, radius: radius, unit: math.Ldexp(1, math.Ilogb(radius)), order: order,
		m: make([]complex128, (order+1)*(order+2)/2)}
}

// Centre returns the centre of the expansion.
func (e *Moments) Centre() r3.Vec { return e.centre }

// Radius returns the distance from the centre within which all charge lies.
func (e *Moments) Radius() float64 { return e.radius }

// AddCharge adds a charge q at y.
func (e *Moments) AddCharge(y r3.Vec, q float64) { e.AddGraded(y, q, 0) }

// AddGraded adds at y a charge that for the terms of order n counts as q + v/(n+3). With v = rho h dA on the faces of a
// body, h the distance of the face's plane from the centre, the sum over faces is the volume charge rho inside: the
// volume integral of a homogeneous polynomial of degree n is 1/(n+3) times that of h times it over the surface.
func (e *Moments) AddGraded(y r3.Vec, q, v float64) {
	e.charge += math.Abs(q) + math.Abs(v)/3
	var row [maxOrder + 2]complex128
	e.each(y, e.order, row[:], func(n int, r []complex128) {
		w := q + v/float64(n+3)
		m := e.m[n*(n+1)/2:]
		for k := range n + 1 {
			m[k] += complex(w*real(r[k]), -w*imag(r[k]))
		}
	})
}

// AddDipole adds a dipole p at y.
func (e *Moments) AddDipole(y, p r3.Vec) {
	e.dipole += r3.Norm(p)
	plus, minus, pz := complex(p.X, -p.Y)/2, complex(p.X, p.Y)/2, complex(p.Z, 0)
	s := complex(1/e.unit, 0)
	var row [maxOrder + 2]complex128
	e.each(y, e.order-1, row[:], func(n int, r []complex128) {
		// d_z R_{n+1}^m = R_n^m, (d_x + i d_y) R_{n+1}^m = R_n^{m+1}, (d_x - i d_y) R_{n+1}^m = -R_n^{m-1}
		m := e.m[(n+1)*(n+2)/2:]
		at := func(k int) complex128 {
			switch {
			case k > n:
				return 0
			case k < 0: // R^-1 = -conj(R^1)
				return -complex(real(r[1]), -imag(r[1]))
			}
			return r[k]
		}
		if n == 0 {
			r = append(r[:1:1], 0)
		}
		for k := range n + 2 {
			d := plus*at(k+1) - minus*at(k-1) + pz*at(k)
			m[k] += s * complex(real(d), -imag(d))
		}
	})
}

// maxOrder is the highest order an expansion may have; lowOrder is what points far away need.
const (
	maxOrder = 60
	lowOrder = 14
)

// each calls f with R_n^m, m = 0..n, of the scaled position of y, for n = 0..order.
func (e *Moments) each(y r3.Vec, order int, row []complex128, f func(n int, r []complex128)) {
	d := r3.Scale(1/e.unit, r3.Sub(y, e.centre))
	rr := r3.Dot(d, d)
	w := complex(d.X, d.Y)
	var two [2][maxOrder + 2]complex128
	before, last := two[0][:], two[1][:]
	for n := 0; n <= order; n++ {
		cur := row
		switch n {
		case 0:
			cur[0] = 1
		default:
			cur[n] = times(-0.5/float64(n), w*last[n-1])
			cur[n-1] = times(d.Z, last[n-1])
			z := float64(2*n-1) * d.Z
			for k := 0; k < n-1; k++ {
				inv := reciprocal[n+k] * reciprocal[n-k]
				a, b := z*inv, rr*inv
				cur[k] = complex(a*real(last[k])-b*real(before[k]), a*imag(last[k])-b*imag(before[k]))
			}
		}
		f(n, cur[:n+1])
		before, last = last, before
		copy(last, cur[:n+1])
	}
}

// reciprocal holds 1/n.
var reciprocal = func() (r [2*maxOrder + 1]float64) {
	for n := 1; n < len(r); n++ {
		r[n] = 1 / float64(n)
	}
	return r
}()

func times(a float64, c complex128) complex128 { return complex(a*real(c), a*imag(c)) }

// Neutral sets the total charge to exactly zero, as it is for a polarized body.
func (e *Moments) Neutral() { e.m[0] = 0 }

// Charge returns the total charge.
func (e *Moments) Charge() float64 { return real(e.m[0]) }

// Dipole returns the dipole moment about the centre.
func (e *Moments) Dipole() r3.Vec {
	return r3.Vec{X: -2 * e.unit * real(e.m[2]), Y: 2 * e.unit * imag(e.m[2]), Z: e.unit * real(e.m[1])}
}

// Field returns g at x.
func (e *Moments) Field(x r3.Vec) r3.Vec { return e.Value(Point{X: pair.VecOf(x)}, WantG).G }

// Evaluate computes the arrays of dst; see Evaluator.
func (e *Moments) Evaluate(dst *Values, at *Points, _ Side) { Fill(dst, at, e.Value) }

// Value returns the value at one point.
func (e *Moments) Value(p Point, want Want) Value {
	c := e.centre
	d := p.X.Sub(pair.VecOf(c)).Value()
	s := 1 / e.unit
	x := r3.Scale(s, d)
	r := r3.Norm(x)
	if r <= e.radius*s {
		return Nowhere(NotConverged)
	}
	order := e.order
	ratio := e.radius * s / r
	if n := 3 + 42/-math.Log(ratio); n < float64(order) { // e^-42 = 6e-19; 3 for moments that vanish at the lowest orders
		order = int(n)
	}
	v := e.sum(x, order, want&WantGrad != 0)
	k := 0.25 / math.Pi * s // per power of 1/unit
	v.Phi *= k
	v.G = r3.Scale(k*s, v.G)
	for i := range v.Grad {
		v.Grad[i] *= k * s * s
	}
	if want&WantErr != 0 {
		e.estimate(&v, r/s, ratio, order)
	}
	return v
}

// estimate bounds rounding (32 u of the sum of magnitudes) and what the order leaves out.
func (e *Moments) estimate(v *Value, r, ratio float64, order int) {
	const u = 0x1p-53
	left := math.Pow(ratio, float64(order+1)) / (1 - ratio)
	n := float64(order + 2)
	size := 0.25 / math.Pi * (e.charge/r*(32*u+left) + e.dipole/(r*r)*(32*u+n*left/(ratio*(1-ratio))))
	if e.m[0] == 0 && e.charge > 0 { // neutral: the charges have cancelled in the moments, not in the sum
		size = 0.25 / math.Pi * e.charge / r * (64*u*ratio + left)
		size += 0.25 / math.Pi * e.dipole / (r * r) * (32*u + n*left/(ratio*(1-ratio)))
	}
	v.ErrPhi = size
	v.ErrG = 2 * n / r * left / (left + u) * size
	v.ErrG = max(v.ErrG, 6*size/r)
	v.ErrGrad = v.ErrG * 2 * n / r
}

// sum adds the series in units of e.unit.
func (e *Moments) sum(x r3.Vec, order int, grad bool) Value {
	top := order + 1
	if grad {
		top++
	}
	if top <= lowOrder { // a small room is quicker to clear
		var irr [(lowOrder + 1) * (lowOrder + 2) / 2]complex128
		return e.sumIn(irr[:], x, order, top, grad)
	}
	var irr [(maxOrder + 3) * (maxOrder + 4) / 2]complex128
	return e.sumIn(irr[:], x, order, top, grad)
}

// sumIn is sum with room for the irregular harmonics up to top.
func (e *Moments) sumIn(irr []complex128, x r3.Vec, order, top int, grad bool) Value {
	irregular(irr, x, top)
	var phi float64
	var dx, dy, dz float64
	var h [6]float64
	for n := 0; n <= order; n++ {
		m := e.m[n*(n+1)/2:]
		up := irr[(n+1)*(n+2)/2:]
		i0 := irr[n*(n+1)/2:]
		for k := 0; k <= n; k++ {
			c := m[k]
			if c == 0 {
				continue
			}
			w := 2.0
			if k == 0 {
				w = 1
			}
			phi += w * realProduct(c, i0[k])
			lower := lowered(up, k)
			half := 0.5 * w
			dx += half * realProduct(c, up[k+1]-lower)
			dy += half * imagProduct(c, up[k+1]+lower)
			dz -= w * realProduct(c, up[k])
			if grad {
				e.second(&h, c, irr[(n+2)*(n+3)/2:], k, w)
			}
		}
	}
	return Value{Phi: phi, G: r3.Vec{X: -dx, Y: -dy, Z: -dz}, Grad: h}
}

// second adds the second derivatives of the term with coefficient c, negated: the gradient of g.
func (e *Moments) second(h *[6]float64, c complex128, up []complex128, k int, w float64) {
	at := func(m int) complex128 {
		if m >= 0 {
			return up[m]
		}
		v := complex(real(up[-m]), -imag(up[-m]))
		if m%2 != 0 {
			v = -v
		}
		return v
	}
	a, b, z := at(k+2), at(k-2), at(k)
	p, q := at(k+1), at(k-1)
	// d+ d+ = a, d- d- = b, d+ d- = -z (the Laplacian is zero with d_z d_z = z), d_z d+ = -p, d_z d- = q
	h[0] -= w * realProduct(c, (a+b-2*z)/4)
	h[1] -= w * realProduct(c, -(a+b+2*z)/4)
	h[2] -= w * realProduct(c, z)
	h[3] -= w * imagProduct(c, (a-b)/4)
	h[4] -= w * realProduct(c, (q-p)/2)
	h[5] -= w * imagProduct(c, -(p+q)/2)
}

// lowered returns I_{n+1}^{m-1} from the row of n+1.
func lowered(up []complex128, m int) complex128 {
	if m > 0 {
		return up[m-1]
	}
	return -complex(real(up[1]), -imag(up[1]))
}

func realProduct(a, b complex128) float64 { return real(a)*real(b) - imag(a)*imag(b) }
func imagProduct(a, b complex128) float64 { return real(a)*imag(b) + imag(a)*real(b) }

// irregular fills rows 0..order of I_n^m(x), m = 0..n.
func irregular(dst []complex128, x r3.Vec, order int) {
	r := r3.Norm(x)
	inv := 1 / r
	ux, uy, uz := x.X*inv, x.Y*inv, x.Z*inv
	w := complex(ux*inv, uy*inv)
	z, rr := uz*inv, inv*inv
	dst[0] = complex(inv, 0)
	for n := 1; n <= order; n++ {
		cur := dst[n*(n+1)/2:]
		last := dst[n*(n-1)/2:]
		cur[n] = times(-float64(2*n-1), w*last[n-1])
		cur[n-1] = times(float64(2*n-1)*z, last[n-1])
		if n < 2 {
			continue
		}
		before := dst[(n-1)*(n-2)/2:]
		for k := 0; k < n-1; k++ {
			a, b := float64(2*n-1)*z, float64((n-1)*(n-1)-k*k)*rr
			cur[k] = complex(a*real(last[k])-b*real(before[k]), a*imag(last[k])-b*imag(before[k]))
		}
	}
}
