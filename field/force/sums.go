package force

import (
	"math"

	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

// Places of the sums: with charge q at r from the point About,
const (
	atForce  = 0  // q g
	atTorque = 3  // q r x g
	atEnergy = 6  // q phi
	atGrad   = 7  // q dg_i/dx_j, six: xx, yy, zz, xy, xz, yz
	atMixed  = 13 // q (r x d)_i g_j, nine by rows
	atOuter  = 22 // q r_i g_j
	atTurn   = 31 // q (r x d)_i (r x g)_j with d acting on g only
	plainLen = 7
	allLen   = 40
)

// sums holds the integrals over charge that force, torque, energy and stiffness are made of.
type sums struct {
	v    [allLen]float64
	size Bounds // of the magnitudes
	err  Bounds // from the estimates of the field
	mute bool   // a source made no claim on its error
	dark bool   // a source has no potential
}

// quad is four numbers: force, torque, energy, stiffness.
type quad [4]float64

func (b *Bounds) quad() quad { return quad{b.Force, b.Torque, b.Energy, b.Stiffness} }

func (b *Bounds) add(c Bounds, f float64) {
	b.Force += f * c.Force
	b.Torque += f * c.Torque
	b.Energy += f * c.Energy
	b.Stiffness += f * c.Stiffness
}

// add adds f times t; magnitudes and errors by |f|.
func (s *sums) add(t *sums, f float64) {
	for i := range s.v {
		s.v[i] += f * t.v[i]
	}
	s.size.add(t.size, math.Abs(f))
	s.err.add(t.err, math.Abs(f))
	s.mute, s.dark = s.mute || t.mute, s.dark || t.dark
}

// charge adds the charge q at r in a field.
func (s *sums) charge(q float64, r r3.Vec, v *field.Value, stiff bool) {
	g := v.G
	t := r3.Cross(r, g)
	s.v[0] += q * g.X
	s.v[1] += q * g.Y
	s.v[2] += q * g.Z
	s.v[3] += q * t.X
	s.v[4] += q * t.Y
	s.v[5] += q * t.Z
	s.v[6] += q * v.Phi
	a, far := math.Abs(q), math.Sqrt(r3.Norm2(r))
	gs := math.Sqrt(r3.Norm2(g))
	s.size.Force += a * gs
	s.size.Torque += a * gs * far
	s.size.Energy += a * math.Abs(v.Phi)
	s.err.Force += a * v.ErrG
	s.err.Torque += a * v.ErrG * far
	s.err.Energy += a * v.ErrPhi
	if stiff {
		s.gradient(q, r, g, &v.Grad)
		h := 0.0
		for k, x := range v.Grad {
			h += x * x
			if k > 2 {
				h += x * x
			}
		}
		s.size.Stiffness += a * math.Sqrt(h)
		s.err.Stiffness += a * v.ErrGrad
	}
}

// gradient adds what the stiffness needs of a charge.
func (s *sums) gradient(q float64, r, g r3.Vec, h *[6]float64) {
	for i, x := range h {
		s.v[atGrad+i] += q * x
	}
	col := [3]r3.Vec{{X: h[0], Y: h[3], Z: h[4]}, {X: h[3], Y: h[1], Z: h[5]}, {X: h[4], Y: h[5], Z: h[2]}}
	var m [3]r3.Vec // m[j] = r x (column j)
	for j := range col {
		m[j] = r3.Cross(r, col[j])
	}
	s.matrix(atMixed, q, [3]r3.Vec{{X: m[0].X, Y: m[1].X, Z: m[2].X}, {X: m[0].Y, Y: m[1].Y, Z: m[2].Y}, {X: m[0].Z, Y: m[1].Z, Z: m[2].Z}})
	s.outer(atOuter, q, r, g)
	// row i of the mixed matrix as a vector over j, crossed by r from the left
	rows := [3]r3.Vec{{X: m[0].X, Y: m[1].X, Z: m[2].X}, {X: m[0].Y, Y: m[1].Y, Z: m[2].Y}, {X: m[0].Z, Y: m[1].Z, Z: m[2].Z}}
	s.matrix(atTurn, q, [3]r3.Vec{r3.Cross(r, rows[0]), r3.Cross(r, rows[1]), r3.Cross(r, rows[2])})
}

func (s *sums) matrix(at int, q float64, rows [3]r3.Vec) {
	for i, w := range rows {
		s.v[at+3*i] += q * w.X
		s.v[at+3*i+1] += q * w.Y
		s.v[at+3*i+2] += q * w.Z
	}
}

func (s *sums) outer(at int, q float64, a, b r3.Vec) {
	s.matrix(at, q, [3]r3.Vec{r3.Scale(a.X, b), r3.Scale(a.Y, b), r3.Scale(a.Z, b)})
}

// uniform adds the share of a piece of surface with the area w and outward normal n in what the field does to uniform volume charge
// rho inside; r is from About, c from the point that the potential's part is taken about.
//
//	int g = -oint phi n,   int r x g = oint phi n x r,   int phi = oint (phi c.n/3 + c^2 g.n/6),
//	int dg_j/dx_i = oint n_i g_j,   int (r x d)_i g_j = oint (r x n)_i g_j,
//	int r g^T - 1 int r.g + int (r x d)_i (r x g)_j = oint (r x g)_i (r x n)_j
//
// Source: Gauss's theorem; the third because phi is harmonic inside and the Laplacian of c^2/6 is 1.
func (s *sums) uniform(rho, w float64, n, r, c r3.Vec, v *field.Value, stiff bool) {
	q := rho * w
	g := v.G
	t := r3.Cross(n, r)
	s.v[0] -= q * v.Phi * n.X
	s.v[1] -= q * v.Phi * n.Y
	s.v[2] -= q * v.Phi * n.Z
	s.v[3] += q * v.Phi * t.X
	s.v[4] += q * v.Phi * t.Y
	s.v[5] += q * v.Phi * t.Z
	a, cc, cn := math.Abs(q), r3.Norm2(c), r3.Dot(c, n)
	s.v[6] += q * (v.Phi*cn/3 + cc*r3.Dot(g, n)/6)
	gs, far := r3.Norm(g), r3.Norm(r)
	s.size.Force += a * math.Abs(v.Phi)
	s.size.Torque += a * math.Abs(v.Phi) * far
	s.size.Energy += a * (math.Abs(v.Phi*cn)/3 + cc*gs/6)
	s.err.Force += a * v.ErrPhi
	s.err.Torque += a * v.ErrPhi * far
	s.err.Energy += a * (v.ErrPhi*math.Abs(cn)/3 + cc*v.ErrG/6)
	if stiff {
		s.v[atGrad] += q * n.X * g.X
		s.v[atGrad+1] += q * n.Y * g.Y
		s.v[atGrad+2] += q * n.Z * g.Z
		s.v[atGrad+3] += q * (n.X*g.Y + n.Y*g.X) / 2
		s.v[atGrad+4] += q * (n.X*g.Z + n.Z*g.X) / 2
		s.v[atGrad+5] += q * (n.Y*g.Z + n.Z*g.Y) / 2
		turn := r3.Cross(r, n)
		s.outer(atMixed, q, turn, g)
		s.outer(atTurn, q, r3.Cross(r, g), turn)
		s.size.Stiffness += a * gs
		s.err.Stiffness += a * v.ErrG
	}
}

// distance returns the norms of the differences of force, torque, energy and stiffness; reach is the size of the part.
func (s *sums) distance(t *sums, reach float64, stiff bool) quad {
	norm := func(lo, hi int) float64 {
		d := 0.0
		for i := lo; i < hi; i++ {
			x := s.v[i] - t.v[i]
			d += x * x
		}
		return math.Sqrt(d)
	}
	d := quad{norm(atForce, atTorque), norm(atTorque, atEnergy), math.Abs(s.v[atEnergy] - t.v[atEnergy]), 0}
	if stiff {
		d[3] = max(1.5*norm(atGrad, atMixed), norm(atMixed, atOuter)/reach, norm(atOuter, atTurn)/(reach*reach), norm(atTurn, allLen)/(reach*reach))
	}
	return d
}

func (s *sums) force() r3.Vec  { return r3.Vec{X: s.v[0], Y: s.v[1], Z: s.v[2]} }
func (s *sums) torque() r3.Vec { return r3.Vec{X: s.v[3], Y: s.v[4], Z: s.v[5]} }

// values returns the sizes of the quantities themselves.
func (s *sums) values(reach float64, stiff bool) quad {
	var zero sums
	return s.distance(&zero, reach, stiff)
}

// stiffness puts the blocks together; see Result.Stiffness.
func (s *sums) stiffness() (k [6][6]float64) {
	h := s.v[atGrad:]
	grad := [3][3]float64{{h[0], h[3], h[4]}, {h[3], h[1], h[5]}, {h[4], h[5], h[2]}}
	c := s.v[atOuter:]
	trace := c[0] + c[4] + c[8]
	for i := range 3 {
		for j := range 3 {
			k[i][j] = -grad[i][j] + 0
			k[3+i][j] = -s.v[atMixed+3*i+j] + 0
			k[i][3+j] = -s.v[atMixed+3*j+i] + 0
			t := c[3*i+j] + s.v[atTurn+3*i+j]
			if i == j {
				t -= trace
			}
			k[3+i][3+j] = -t + 0
		}
	}
	return k
}
