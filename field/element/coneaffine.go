package element

import (
	"math"
	"sync"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// AffineCone is the bound charge of a cone or truncated cone with affine polarization p = P + G x. Cone is faster for
// uniform ones.
//
// Units: natural; p and g in the unit of the polarization, phi in that times length.
// Frame: that of the shape, about the z axis.
// Domain: all finite x; lengths of the shape within 1e-50 and 1e50. NaN in, NaN out. Built by NewAffineCone; immutable.
// Singular: |g| grows as log(1/d) at distance d from a rim or tip next to a charged face; there G is NaN, Phi finite,
// field.OnEdge. On a charged face the mean of both sides, or the side asked for, and no gradient.
// Accuracy: |error| <= 3e-12 max(|g|, 1e-3 g0) for g, g0 = max|p| min(1, (a/R)^3) with a the bounding radius, and for phi
// likewise (worst 1.1e-12 and 6e-13, both on a tip 1e-3 radii high, else 5e-14 and 7e-14, TestAffineConeReference; any affine p
// TestAffineCone). A plate whose p is along the axis and mostly slope loses radius/height of that: AxialPowerCone does not. The
// gradient: u/d of the density at the distance d from the wall.
// Source: own derivation: the wall with its generators in closed form and the azimuth by Gauss-Legendre, sinh map after
// [Johnston2005] (see coneSum); ends as LinearDisc; the volume charge from the surface by Gauss's theorem. Expansion of the
// whole beyond 3 bounding radii. The estimates come from a second rule.
type AffineCone struct {
	frustum
	p       field.Affine
	value0  r3.Vec        // p at the origin
	grad    [3][3]float64 // and its gradient
	rho     float64       // -trace
	charged [3]bool       // bottom, top, wall
	ends    [2]*LinearDisc
	discs   [2]*Disc // of unit density, for the volume charge
	once    sync.Once
	moments *field.Moments
}

// NewAffineCone returns the cone polarized with p.
func NewAffineCone(shape geom.Cone, p field.Affine) (*AffineCone, error) {
	f, err := newFrustum(shape)
	if err != nil {
		return nil, err
	}
	b := &AffineCone{frustum: f, p: p, value0: p.At(r3.Vec{}), grad: p.Gradient}
	sum := b.value0.X + b.value0.Y + b.value0.Z
	for _, row := range b.grad {
		sum += row[0] + row[1] + row[2]
	}
	if err := finitePolarization(r3.Vec{X: sum}); err != nil {
		return nil, err
	}
	b.rho = -(b.grad[0][0] + b.grad[1][1] + b.grad[2][2])
	b.charged[wallFace] = b.wallCharged()
	for k, a := range [2]float64{shape.Bottom, shape.Top} {
		if a == 0 {
			continue
		}
		out := float64(2*k - 1)
		disc := geom.Disc{Radius: a, Z: out * b.half}
		density := out * p.At(r3.Vec{Z: disc.Z}).Z
		slope := r3.Vec{X: out * b.grad[2][0], Y: out * b.grad[2][1]}
		if density != 0 || slope != (r3.Vec{}) {
			b.charged[k] = true
			if b.ends[k], err = NewLinearDisc(disc, density, slope); err != nil {
				return nil, err
			}
		}
		if b.rho != 0 {
			if b.discs[k], err = NewDisc(disc, 1); err != nil {
				return nil, err
			}
		}
	}
	return b, nil
}

// wallCharged reports whether p.n differs from zero anywhere on the wall, up to rounding: it is of degree 2 in the azimuth and
// of degree 1 along a generator.
func (b *AffineCone) wallCharged() bool {
	nr, nz := b.wall.nr.Value(), b.wall.nz.Value()
	for k := range 8 {
		sin, cos := math.Sincos(float64(k))
		n := r3.Vec{X: nr * cos, Y: nr * sin, Z: nz}
		for _, end := range [2]r3.Vec{{X: b.shape.Bottom, Z: -b.half}, {X: b.shape.Top, Z: b.half}} {
			x := r3.Vec{X: end.X * cos, Y: end.X * sin, Z: end.Z}
			if math.Abs(r3.Dot(b.p.At(x), n)) > 8*u*b.largest() {
				return true
			}
		}
	}
	return false
}

// largest returns a bound for |p|.
func (b *AffineCone) largest() float64 {
	return r3.Norm(b.value0) + tensorNorm(&b.grad)*b.bound
}

// Field returns g at x.
func (b *AffineCone) Field(x r3.Vec) r3.Vec {
	return single(x, func(p field.Point, side field.Side) field.Value { return b.value(p, side, field.WantG) })
}

// Evaluate computes the arrays of dst; see field.Evaluator.
func (b *AffineCone) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	field.Fill(dst, at, func(p field.Point, want field.Want) field.Value { return b.value(p, side, want) })
}

// Moments returns the expansion of the charge about the origin.
func (b *AffineCone) Moments() *field.Moments {
	b.once.Do(b.expand)
	return b.moments
}

func (b *AffineCone) value(x field.Point, side field.Side, want field.Want) field.Value {
	p := newRoundPoint(x, 0, b.bound)
	if p.reach > sectorReach*b.bound {
		v := b.Moments().Value(x, want)
		v.ErrPhi, v.ErrG = 4*v.ErrPhi, 2*v.ErrG // as sector.afar
		return v
	}
	view := b.wall.view(&p)
	status, face := b.place(&p, &view, b.charged)
	if status == field.OnEdge {
		want = field.WantPhi | want&field.WantErr
	}
	c := b.at(&p, &view)
	v := c.near(want)
	if face == wallFace && status == field.OnFace {
		n := r3.Vec{X: view.nr * p.e.X, Y: view.nr * p.e.Y, Z: view.nz}
		step := r3.Dot(b.p.At(x.X.Value()), n)
		v.G = r3.Add(v.G, r3.Scale(0.5*step*(sideSign(side)-sign(c.d)), n))
	}
	b.addEnds(&v, x, &c, side, want)
	switch {
	case status == field.OnEdge:
		return onEdge(v)
	case status == field.OnFace:
		w := field.Nowhere(status)
		v.Grad, v.ErrGrad = w.Grad, w.ErrGrad
	case face != noFace:
		v.ErrGrad = math.Inf(1)
	}
	v.Status = status
	if want&field.WantErr != 0 && status == field.Regular && v.ErrG > 1e-10*b.largest() && v.ErrG > 1e-10*r3.Norm(v.G) {
		v.Status = field.NotConverged
	}
	return v
}

// near returns what the wall gives.
func (c *conePoint) near(want field.Want) field.Value {
	s := c.sweep(&sectorMain, want&^field.WantErr)
	v := field.Value{Phi: over4P * s.phi, G: c.turned(s.g)}
	if want&field.WantGrad != 0 {
		t := s.t.turned(c.e)
		v.Grad = t.symmetric(over4P)
	}
	if want&field.WantErr == 0 {
		return v
	}
	o := c.sweep(&sectorCheck, want)
	v.ErrPhi = over4P * (10*math.Abs(o.phi-s.phi) + 16*u*o.sizePhi)
	v.ErrG = over4P * (10*r3.Norm(r3.Sub(o.g, s.g)) + 12*u*o.sizeG)
	if want&field.WantGrad != 0 {
		off := o.t
		for i := range off {
			for j := range off {
				off[i][j] -= s.t[i][j]
			}
		}
		v.ErrGrad = over4P * (10*tensorNorm((*[3][3]float64)(&off)) + 16*u*o.sizeT)
	}
	return v
}

// addEnds adds the ends, with their share of the volume charge; see coneSum.
func (b *AffineCone) addEnds(v *field.Value, x field.Point, c *conePoint, side field.Side, want field.Want) {
	for k := range b.ends {
		out, own := float64(2*k-1), side
		if k == bottomFace && side != field.Mean { // outside is below
			own = field.Inside + field.Outside - side
		}
		if end := b.ends[k]; end != nil {
			w := end.sector.value(x, own, want)
			addTimes(v, w, 1)
			addGradient(v, w.Grad, w.ErrGrad)
		}
		if b.discs[k] == nil {
			continue
		}
		w := b.discs[k].flat.value(x, field.Mean, want|field.WantPhi)
		f := out * b.rho
		v.Phi += 0.5 * f * c.zeta[k] * w.Phi
		v.ErrPhi += 0.5 * math.Abs(f*c.zeta[k]) * (w.ErrPhi + 4*u*math.Abs(w.Phi))
		v.G.Z += f * w.Phi
		v.ErrG += math.Abs(f) * w.ErrPhi
		addGradient(v, [6]float64{2: -f * w.G.Z, 4: -0.5 * f * w.G.X, 5: -0.5 * f * w.G.Y}, math.Abs(f)*w.ErrG)
	}
}

func addGradient(v *field.Value, g [6]float64, claim float64) {
	for i := range g {
		v.Grad[i] += g[i]
	}
	v.ErrGrad += claim
}

// expand fills the body with dipoles on a rule whose error is below that of the order.
func (b *AffineCone) expand() {
	m := field.NewMoments(r3.Vec{}, b.bound, sectorOrder)
	around := stations(0, 1, 1) // exact to degree 31: the terms above are below 3^-31
	const n = sectorOrder + 6   // azimuths; exact for all harmonics of the order, with those of p
	for k := range n {
		sin, cos := math.Sincos(2 * math.Pi * float64(k) / n)
		for _, h := range around {
			a := b.shape.Bottom*(1-h.at) + b.shape.Top*h.at
			for _, s := range around {
				y := r3.Vec{X: a * s.at * cos, Y: a * s.at * sin, Z: b.half * (2*h.at - 1)}
				m.AddDipole(y, r3.Scale(2*math.Pi/n*b.shape.Height*a*a*h.w*s.w*s.at, b.p.At(y)))
			}
		}
	}
	moment := r3.Scale(b.shape.Volume(), b.p.At(b.shape.Centroid()))
	m.AddDipole(r3.Vec{}, r3.Sub(moment, m.Dipole())) // exactly
	b.moments = m
}
