package element

import (
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/internal/elliptic"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// Disc is the field of a uniformly charged disc.
//
// Units: natural; g in the unit of the density, phi in that times the unit of length.
// Frame: that of the shape, about the z axis; the normal is +z.
// Domain: all finite x; radius within 1e-70 and 1e70. NaN in, NaN out. Built by NewDisc; immutable.
// Singular: |g| grows as log(1/d) at distance d from the rim; on it G is NaN, Phi finite, field.OnEdge. On the face the
// mean of both sides, or the side asked for; Outside is above.
// Accuracy: |error| <= 2e-14 of phi and 4e-15 of |g| (TestRoundReference).
// Source: phi = (a U - rho T1 - z Omega)/4 pi by Green's theorem, see [Paxton1959]
// for Omega; zonal harmonics beyond 2.5 radii.
type Disc struct {
	flat flatRing
}

// NewDisc returns the disc with a charge density.
func NewDisc(shape geom.Disc, density float64) (*Disc, error) {
	if err := shape.Check(); err != nil {
		return nil, err
	}
	f, err := newFlatRing(0, shape.Radius, shape.Z, density)
	if err != nil {
		return nil, err
	}
	return &Disc{f}, nil
}

// Field returns g at x.
func (d *Disc) Field(x r3.Vec) r3.Vec { return d.flat.field(x) }

// Evaluate computes the arrays of dst; see field.Evaluator.
func (d *Disc) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	d.flat.evaluate(dst, at, side)
}

// Bounds returns the box of the disc.
func (d *Disc) Bounds() r3.Box { return d.flat.bounds() }

// flatRing is a disc or annulus in the plane z = level.
type flatRing struct {
	inner, outer, level, density float64
	far                          roundMultipoles
}

func newFlatRing(inner, outer, level, density float64) (flatRing, error) {
	if math.IsNaN(density) || math.IsInf(density, 0) {
		return flatRing{}, fmt.Errorf("element: charge density %v is not finite; give a finite number", density)
	}
	f := flatRing{inner: inner, outer: outer, level: level, density: density,
		far: roundMultipoles{centre: level, bound: outer}}
	acrossRing(inner, outer, func(s, w float64) { f.far.addRing(s, 0, 2*math.Pi*density*s*w) })
	f.far.a[0] = density * math.Pi * (outer - inner) * (outer + inner)
	return f, nil
}

// acrossRing visits radii of a Gauss-Legendre rule between two radii that is exact for the moments of the far series.
func acrossRing(inner, outer float64, visit func(s, w float64)) {
	const panels = 2 // 16 nodes are exact to degree 31, two panels leave 4^-32 of the rest
	h := (outer - inner) / panels / 2
	for n := range panels {
		c := inner + float64(2*n+1)*h
		for _, g := range gauss16 {
			visit(c-h*g.x, h*g.w)
			visit(c+h*g.x, h*g.w)
		}
	}
}

func (f *flatRing) field(x r3.Vec) r3.Vec {
	return single(x, func(p field.Point, side field.Side) field.Value { return f.value(p, side, field.WantG) })
}

func (f *flatRing) evaluate(dst *field.Values, at *field.Points, side field.Side) {
	field.Fill(dst, at, func(p field.Point, want field.Want) field.Value { return f.value(p, side, want) })
}

func (f *flatRing) bounds() r3.Box {
	a := f.outer
	return r3.Box{Min: r3.Vec{X: -a, Y: -a, Z: f.level}, Max: r3.Vec{X: a, Y: a, Z: f.level}}
}

func (f *flatRing) value(x field.Point, side field.Side, want field.Want) field.Value {
	p := newRoundPoint(x, f.level, f.outer)
	if f.far.far(&p) {
		c, k := f.far.sum(&p, want)
		return p.value(&c, &k, r3.Vec{}, want)
	}
	o, i := p.rim(f.outer, f.level), rim{}
	if f.inner > 0 {
		i = p.rim(f.inner, f.level)
	}
	status := f.place(&p, &o, &i)
	if status == field.OnEdge && f.density != 0 {
		return onEdge(f.near(&p, &o, &i, want&^field.WantG|field.WantPhi))
	}
	if status == field.OnFace {
		o.sign, i.sign = sideSign(side), sideSign(side)
	}
	v := f.near(&p, &o, &i, want)
	if status == field.OnFace && f.density != 0 {
		v.Status, v.ErrGrad = field.OnFace, math.Inf(1)
	}
	return v
}

// place tells whether p is on the sheet or its rim.
func (f *flatRing) place(p *roundPoint, o, i *rim) field.Status {
	out := -o.d // how far beyond the nearer rim
	if f.inner > 0 {
		out = max(out, i.d)
	}
	switch h := math.Abs(o.z); {
	case max(h, out) > p.tol || math.Hypot(h, max(0, out)) > p.tol:
		return field.Regular
	case out >= -p.tol:
		return field.OnEdge
	}
	return field.OnFace
}

// near is the closed form.
func (f *flatRing) near(p *roundPoint, o, i *rim, want field.Want) (v field.Value) {
	if f.inner > 0 {
		s := annulus(o, i, needsOf(want))
		return f.charged(p, &s, want)
	}
	if want == field.WantG {
		_, t1, omega := elliptic.Disc(o.a, o.rho, o.z, o.d, o.d*o.d+o.z*o.z)
		var c constant // summed as in charged, bit for bit
		c.add(&sheet{rho: -t1, z: -onSide(omega, o.z, o.sign, o.d)}, f.density)
		return p.value(&c, &cosine{}, r3.Vec{}, want)
	}
	s := o.disc(needsOf(want))
	return f.charged(p, &s, want)
}

// charged returns the value of the sheet s of unit density with the density of f.
func (f *flatRing) charged(p *roundPoint, s *sheet, want field.Want) field.Value {
	var c constant
	c.add(s, f.density)
	return p.value(&c, &cosine{}, r3.Vec{}, want)
}

// needsOf returns what a flat sheet needs for what is wanted.
func needsOf(want field.Want) need {
	var n need
	if want&field.WantPhi != 0 {
		n |= needDisc
	}
	if want&(field.WantG|field.WantPhi) != 0 {
		n |= needSolid
	}
	if want&field.WantGrad != 0 {
		n |= needLoop
	}
	return n
}

// sign returns -1, 0 or 1.
func sign(x float64) float64 {
	switch {
	case x > 0:
		return 1
	case x < 0:
		return -1
	}
	return 0
}

// sideSign returns +1 for Outside, -1 for Inside, 0 for the mean.
func sideSign(s field.Side) float64 {
	switch s {
	case field.Outside:
		return 1
	case field.Inside:
		return -1
	}
	return 0
}
