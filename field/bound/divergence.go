package bound

import (
	"fmt"
	"math"
	"math/cmplx"
	"math/rand/v2"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// checkDivergence holds the divergence of a polarization that is not affine against p: at random inner points against
// differences, and through the identity
//
//	int sigma f dA + int rho f dV = int p.grad f dV
//
// for solid harmonics f up to degree 6. The first finds any wrong formula, the second what a point can miss: a face whose charge
// is not that of p, or a density that p does not have inside.
func (c *Charge) checkDivergence() error {
	if _, ok := c.p.(field.Affine); ok {
		return nil
	}
	if err := c.checkPoints(); err != nil {
		return err
	}
	return c.checkHarmonics()
}

// innerPoints is how many random points are looked at.
const innerPoints = 40

// checkPoints compares the divergence with differences of p at random inner points.
func (c *Charge) checkPoints() error {
	box := c.local.Bounds()
	half := r3.Scale(0.5, r3.Sub(box.Max, box.Min))
	size := r3.Norm(half)
	rng := rand.New(rand.NewPCG(2026, 6))
	type sample struct {
		x          r3.Vec
		given, got float64
		err        float64
	}
	var all []sample
	scale := 0.0
	for tries := 0; len(all) < innerPoints && tries < 200*innerPoints; tries++ {
		x := r3.Vec{
			X: box.Min.X + 2*half.X*rng.Float64(),
			Y: box.Min.Y + 2*half.Y*rng.Float64(),
			Z: box.Min.Z + 2*half.Z*rng.Float64(),
		}
		step := c.room(x, size)
		if step == 0 {
			continue
		}
		given := c.p.Divergence(x)
		got, err := field.DifferenceDivergence(c.p, x, step)
		p := r3.Norm(c.p.At(x))
		if math.IsNaN(p) || math.IsInf(p, 0) || math.IsNaN(given) {
			return fmt.Errorf("bound: polarization at (%.6g, %.6g, %.6g) inside the body is %v with divergence %v; it must be finite there",
				x.X, x.Y, x.Z, c.p.At(x), given)
		}
		scale = max(scale, p/size, math.Abs(got))
		all = append(all, sample{x, given, got, err})
	}
	for _, s := range all {
		if math.Abs(s.given-s.got) > 10*s.err+1e-7*scale {
			return fmt.Errorf("bound: the divergence given is not that of p: at (%.6g, %.6g, %.6g) %.9g is given, differences of p say %.9g; "+
				"correct it, or leave it out to have it derived", s.x.X, s.x.Y, s.x.Z, s.given, s.got)
		}
	}
	return nil
}

// room returns a length over which the polarization may be asked for around x without leaving the body, 0 for none.
func (c *Charge) room(x r3.Vec, size float64) float64 {
	inside := func(y r3.Vec) bool { return c.inner.Locate(pair.VecOf(y), 0).Region == geom.Inside }
	if !inside(x) {
		return 0
	}
	for _, step := range [3]float64{size, size / 16, size / 256} {
		ok := true
		for _, e := range [6]r3.Vec{{X: 1}, {X: -1}, {Y: 1}, {Y: -1}, {Z: 1}, {Z: -1}} {
			ok = ok && inside(r3.Add(x, r3.Scale(step/64, e)))
		}
		if ok {
			return step
		}
	}
	return 0
}

// highest is the degree up to which harmonics are tried.
const highest = 6

// nullVectors returns vectors b with b.b = 0, so that (b.x)^n is harmonic: n + 1 of them span degree n.
func nullVectors(n int) [][3]complex128 {
	v := make([][3]complex128, n+1)
	for k := range v {
		sin, cos := math.Sincos(math.Pi * float64(k) / float64(n+1))
		v[k] = [3]complex128{complex(cos, 0), complex(sin, 0), 1i}
	}
	return v
}

// harmonicSums is the two sides of the identity for every harmonic.
type harmonicSums struct {
	vectors [highest + 1][][3]complex128
	charge  [highest + 1][]complex128 // int sigma f + int rho f
	moment  [highest + 1][]complex128 // int p.grad f
	size    [highest + 1]float64
}

func newHarmonicSums() *harmonicSums {
	s := new(harmonicSums)
	for n := 1; n <= highest; n++ {
		s.vectors[n] = nullVectors(n)
		s.charge[n], s.moment[n] = make([]complex128, n+1), make([]complex128, n+1)
	}
	return s
}

// add adds a node at y (scaled to about 1) with charge q and dipole p.
func (s *harmonicSums) add(y r3.Vec, q float64, p r3.Vec) {
	for n := 1; n <= highest; n++ {
		for k, b := range s.vectors[n] {
			bx := b[0]*complex(y.X, 0) + b[1]*complex(y.Y, 0) + b[2]*complex(y.Z, 0)
			bp := b[0]*complex(p.X, 0) + b[1]*complex(p.Y, 0) + b[2]*complex(p.Z, 0)
			low := complex(1, 0)
			for range n - 1 {
				low *= bx
			}
			s.charge[n][k] += complex(q, 0) * low * bx
			s.moment[n][k] += complex(float64(n), 0) * low * bp
		}
		s.size[n] += math.Abs(q) + float64(n)*r3.Norm(p)
	}
}

// checkHarmonics compares the two sides with two quadrature rules, whose difference is the tolerance. For a polynomial both are
// exact, but on surfaces whose own form a rule has to approximate.
func (c *Charge) checkHarmonics() error {
	if c.resolved != nil { // a law of our own, on parts whose moments agree
		return nil
	}
	few, many := 14, 20
	if n, ok := degree(c.p); ok {
		few = (n+highest)/2 + 3
		many = few + 4
	}
	coarse, fine := c.harmonics(few), c.harmonics(many)
	for n := 1; n <= highest; n++ {
		for k := range fine.charge[n] {
			miss := cmplx.Abs(fine.charge[n][k] - fine.moment[n][k])
			err := cmplx.Abs(fine.charge[n][k]-coarse.charge[n][k]) + cmplx.Abs(fine.moment[n][k]-coarse.moment[n][k])
			if miss > 10*err+1e-10*fine.size[n] {
				return fmt.Errorf("bound: charge and polarization disagree: against a solid harmonic of degree %d the charges give %.9g, "+
					"the integral of p.grad f %.9g; the density of a face or the divergence is not that of p", n,
					cmplx.Abs(fine.charge[n][k]), cmplx.Abs(fine.moment[n][k]))
			}
		}
	}
	return nil
}

// harmonics gathers both sides with n points a direction.
func (c *Charge) harmonics(n int) *harmonicSums {
	box := c.local.Bounds()
	centre := r3.Scale(0.5, r3.Add(box.Min, box.Max))
	scale := 2 / r3.Norm(r3.Sub(box.Max, box.Min))
	s := newHarmonicSums()
	at := func(x r3.Vec) r3.Vec { return r3.Scale(scale, r3.Sub(x, centre)) }
	for i, f := range c.local.Faces() {
		c.faceNodes(i, f, n, func(x, normal r3.Vec, w float64) { s.add(at(x), w*c.sigma(x, normal), r3.Vec{}) })
	}
	for i, cell := range c.local.Cells() {
		c.cellNodes(i, cell, n, func(x r3.Vec, w float64) { s.add(at(x), w*c.rho(x), r3.Scale(w*scale, c.p.At(x))) })
	}
	return s
}
