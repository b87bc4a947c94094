package cubature

import (
	"math"

	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

// sums gathers 4 pi times potential, field and gradient, and the magnitudes of the terms behind them.
type sums struct {
	phi, phiSize float64
	g            r3.Vec
	gSize        float64
	t            [6]float64
	tSize        float64
}

// charge adds a charge q at distance d = x - r.
func (s *sums) charge(q, dx, dy, dz float64, grad bool) {
	inv := 1 / math.Sqrt(dx*dx+dy*dy+dz*dz)
	p := q * inv
	k := p * inv * inv
	s.phi += p
	s.g.X += k * dx
	s.g.Y += k * dy
	s.g.Z += k * dz
	m := math.Abs(p)
	s.phiSize += m
	s.gSize += m * inv
	if !grad {
		return
	}
	k3 := 3 * k * inv * inv
	s.t[0] += k - k3*dx*dx
	s.t[1] += k - k3*dy*dy
	s.t[2] += k - k3*dz*dz
	s.t[3] -= k3 * dx * dy
	s.t[4] -= k3 * dx * dz
	s.t[5] -= k3 * dy * dz
	s.tSize += 2 * m * inv * inv
}

// tensor adds the gradient of the field of a charge q at distance d = x - r.
func (s *sums) tensor(q, dx, dy, dz float64) {
	inv := 1 / math.Sqrt(dx*dx+dy*dy+dz*dz)
	k := q * inv * inv * inv
	k3 := 3 * k * inv * inv
	s.t[0] += k - k3*dx*dx
	s.t[1] += k - k3*dy*dy
	s.t[2] += k - k3*dz*dz
	s.t[3] -= k3 * dx * dy
	s.t[4] -= k3 * dx * dz
	s.t[5] -= k3 * dy * dz
	s.tSize += 2 * math.Abs(k)
}

// boundary adds the part of an area vector a at distance d = x - r to the gradient of the field of uniform charge inside it:
// -a_j d_i/R^3, of which the symmetric part is kept since the rest vanishes over a closed surface.
func (s *sums) boundary(a r3.Vec, dx, dy, dz float64) {
	inv := 1 / math.Sqrt(dx*dx+dy*dy+dz*dz)
	k := inv * inv * inv
	s.t[0] -= k * a.X * dx
	s.t[1] -= k * a.Y * dy
	s.t[2] -= k * a.Z * dz
	s.t[3] -= 0.5 * k * (a.X*dy + a.Y*dx)
	s.t[4] -= 0.5 * k * (a.X*dz + a.Z*dx)
	s.t[5] -= 0.5 * k * (a.Y*dz + a.Z*dy)
	s.tSize += inv * inv * (math.Abs(a.X) + math.Abs(a.Y) + math.Abs(a.Z))
}

// add adds k times the sums of a part.
func (s *sums) add(p *sums, k float64) {
	s.phi += k * p.phi
	s.g = r3.Vec{X: s.g.X + k*p.g.X, Y: s.g.Y + k*p.g.Y, Z: s.g.Z + k*p.g.Z}
	k1 := math.Abs(k)
	s.phiSize += k1 * p.phiSize
	s.gSize += k1 * p.gSize
	for i := range s.t {
		s.t[i] += k * p.t[i]
	}
	s.tSize += k1 * p.tSize
}

// gap is how far two rules are apart.
type gap struct{ phi, g, t float64 }

// apart returns the norms of the differences of a and b.
func apart(a, b *sums) gap {
	var t [6]float64
	for i := range t {
		t[i] = a.t[i] - b.t[i]
	}
	return gap{math.Abs(a.phi - b.phi), r3.Norm(r3.Sub(a.g, b.g)), frobenius(&t)}
}

func (e *gap) add(o gap) {
	e.phi += o.phi
	e.g += o.g
	e.t += o.t
}

// value returns the value and estimates: ten times the gaps, and rounding as a multiple of u times the sizes;
// the maps of [0, 1] are good to 30 u where they span 16 powers of ten, which the gradient feels.
func (s *sums) value(e gap, want field.Want) field.Value {
	v := field.Value{Phi: over4Pi * s.phi, G: r3.Scale(over4Pi, s.g)}
	if want&field.WantGrad != 0 {
		for i := range v.Grad {
			v.Grad[i] = over4Pi * s.t[i]
		}
		v.ErrGrad = over4Pi * (10*e.t + 64*u*s.tSize)
	}
	v.ErrPhi = over4Pi * (10*e.phi + 2*u*s.phiSize)
	v.ErrG = over4Pi * (10*e.g + 3*u*s.gSize)
	return v
}

func frobenius(t *[6]float64) float64 {
	return math.Sqrt(t[0]*t[0] + t[1]*t[1] + t[2]*t[2] + 2*(t[3]*t[3]+t[4]*t[4]+t[5]*t[5]))
}

// nodeSet is charges at points, as a structure of arrays, with their pieces of area where they lie on a surface.
type nodeSet struct {
	x, y, z, q []float64
	area       []r3.Vec
}

func (c *nodeSet) put(i int, x r3.Vec, q float64) { c.x[i], c.y[i], c.z[i], c.q[i] = x.X, x.Y, x.Z, q }

func newNodeSet(n int) *nodeSet {
	room := make([]float64, 4*n)
	return &nodeSet{x: room[:n:n], y: room[n : 2*n : 2*n], z: room[2*n : 3*n : 3*n], q: room[3*n:]}
}

// sumLess returns the sums over all charges less those of a uniform polarization.
func (c *nodeSet) sumLess(x, low, less r3.Vec, grad bool) (s sums) {
	if less == (r3.Vec{}) {
		return c.sum(x, low, grad)
	}
	for i, a := range c.area {
		s.charge(c.q[i]-r3.Dot(less, a), (x.X-c.x[i])+low.X, (x.Y-c.y[i])+low.Y, (x.Z-c.z[i])+low.Z, grad)
	}
	return s
}

// sum returns the sums over all charges.
func (c *nodeSet) sum(x, low r3.Vec, grad bool) (s sums) {
	ys, zs, qs := c.y[:len(c.x)], c.z[:len(c.x)], c.q[:len(c.x)]
	for i, px := range c.x {
		s.charge(qs[i], (x.X-px)+low.X, (x.Y-ys[i])+low.Y, (x.Z-zs[i])+low.Z, grad)
	}
	return s
}
