package element

import (
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// Wall is the field of a round wall, the side of a cylinder, with charge density Density + Cos cos(phi) + Sin sin(phi).
//
// Units: natural; g in the unit of the density, phi in that times the unit of length.
// Frame: that of the shape, about the z axis; phi is counted from x to y, the normal points outward.
// Domain: all finite x; lengths of the shape within 1e-70 and 1e70. NaN in, NaN out. Built by NewWall; immutable.
// Singular: |g| grows as log(1/d) at distance d from a rim; on it G is NaN, Phi finite, field.OnEdge. On the wall the
// mean of both sides, or the side asked for; Outside is away from the axis.
// Accuracy: |error| <= 1e-13 max(|g|, 1e-3 g0) for g, g0 = max|sigma| min(1, (a/R)^2) with a the bounding radius, and for phi
// likewise (TestRoundReference).
// Source: cos(phi) part as in Tube; constant part E_z = U_2 - U_1 and E_rho from z U + a Omega (own derivation, checked by
// quadrature), its potential by product integration of the ring potential along the wall; multipoles beyond 2.5 bounding
// radii.
type Wall struct {
	shape   geom.Wall
	density float64
	t       r3.Vec // cos and sin amplitudes
	centre  float64
	bound   float64
	far     roundMultipoles
}

// NewWall returns the wall with the charge density constant + cos cos(phi) + sin sin(phi).
func NewWall(shape geom.Wall, constant, cos, sin float64) (*Wall, error) {
	if !(shape.Radius > 0) || !(shape.Z1 < shape.Z2) || math.IsInf(shape.Radius+shape.Z2-shape.Z1, 0) {
		return nil, fmt.Errorf("element: wall %+v is no wall; give a positive radius and Z1 < Z2, all finite", shape)
	}
	if s := constant + cos + sin; s-s != 0 {
		return nil, fmt.Errorf("element: charge densities %v, %v, %v of a wall are not all finite; give finite numbers",
			constant, cos, sin)
	}
	half := 0.5 * (shape.Z2 - shape.Z1)
	w := &Wall{shape: shape, density: constant, t: r3.Vec{X: cos, Y: sin}, centre: 0.5 * (shape.Z1 + shape.Z2)}
	w.bound = math.Hypot(shape.Radius, half)
	w.far = roundMultipoles{centre: w.centre, bound: w.bound}
	acrossRing(-half, half, func(z, wz float64) { w.far.addRing(shape.Radius, z, 2*math.Pi*shape.Radius*wz) })
	w.far.a[0] = 4 * math.Pi * shape.Radius * half
	for l := range w.far.a {
		w.far.a[l] *= constant
	}
	return w, nil
}

// Field returns g at x.
func (w *Wall) Field(x r3.Vec) r3.Vec {
	return single(x, func(p field.Point, side field.Side) field.Value { return w.value(p, side, field.WantG) })
}

// Evaluate computes the arrays of dst; see field.Evaluator.
func (w *Wall) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	field.Fill(dst, at, func(p field.Point, want field.Want) field.Value { return w.value(p, side, want) })
}

// Bounds returns the box of the wall.
func (w *Wall) Bounds() r3.Box { return w.shape.Bounds() }

func (w *Wall) value(x field.Point, side field.Side, want field.Want) field.Value {
	p := newRoundPoint(x, w.centre, w.bound)
	if w.far.far(&p) {
		c, k := w.far.sum(&p, want)
		return p.value(&c, &k, w.t, want)
	}
	charged := w.density != 0 || w.t.X != 0 || w.t.Y != 0
	z1, z2, d := p.height(w.shape.Z1), p.height(w.shape.Z2), p.inward(w.shape.Radius)
	within := 0.5 + 0.5*sign(d)
	on := false
	if beyond := max(-z1, z2); math.Hypot(d, max(0, beyond)) <= p.tol {
		if beyond >= -p.tol && charged {
			return onEdge(w.near(&p, within, field.WantPhi|want&field.WantErr))
		}
		on, within = charged, 0.5-0.5*sideSign(side)
	}
	v := w.near(&p, within, want)
	if on {
		v.Status, v.ErrGrad = field.OnFace, math.Inf(1)
	}
	return v
}

// near evaluates by rings if the wall is short and the point clear of it, else in closed form.
func (w *Wall) near(p *roundPoint, within float64, want field.Want) field.Value {
	var c constant
	var k cosine
	a := w.shape.Radius
	d := p.inward(a)
	r1, r2 := rimAt(a, p.rho, d, p.height(w.shape.Z1)), rimAt(a, p.rho, d, p.height(w.shape.Z2))
	height := w.shape.Z2 - w.shape.Z1
	clear := height < thin*a && math.Hypot(d, max(0, -r1.z, r2.z)) > clearBy*height
	transverse := w.t.X != 0 || w.t.Y != 0
	if !clear || want&field.WantGrad != 0 {
		what := needShell | needSolid | needRadial
		if want&field.WantGrad != 0 {
			what |= needLoop
		}
		v1, v2 := r1.values(what), r2.values(what)
		if w.density != 0 {
			c.addUniformWall(&r1, &r2, &v1, &v2, within)
		}
		if transverse {
			k.addCosine(&r1, &r2, &v1, &v2, within, 1)
		}
	}
	if clear {
		w.addRings(&r1, &c, &k)
	} else if want&field.WantPhi != 0 && w.density != 0 {
		line := band{a: a, rho: p.rho, near: d, axial: true}
		c.u = line.integral(r2.z, r1.z)
		c.sizeU = c.u
	}
	c.scale(w.density)
	return p.value(&c, &k, w.t, want)
}

// addRings replaces potential and field by those of rings spread over the wall.
func (w *Wall) addRings(r1 *rim, c *constant, k *cosine) {
	c.u, c.rho, c.z, c.sizeU, c.sizeG = 0, 0, 0, 0, 0
	k.s, k.tau, k.z, k.sizeS, k.sizeG = 0, 0, 0, 0, 0
	a, half := r1.a, 0.5*(w.shape.Z2-w.shape.Z1)
	for _, g := range gauss8 {
		for _, t := range [2]float64{1 - g.x, 1 + g.x} {
			r := rimAt(a, r1.rho, r1.d, r1.z-half*t)
			dz := half * g.w
			v := r.values(needLoop)
			c.u += dz * v.u
			c.rho -= dz * (a*v.d3a - r.d*v.s3a)
			c.z -= dz * r.z * v.s3a
			c.sizeG += dz * (a*v.d3a + (math.Abs(r.d)+math.Abs(r.z))*v.s3a)
			k.s += dz * v.t1r
			k.tau += dz * (v.bz - 2*v.t1r)
			k.z -= dz * v.br
			k.sizeS += dz * v.t1r
			k.sizeG += dz * (2*v.t1r + math.Abs(v.bz) + math.Abs(v.br))
		}
	}
	c.sizeU = c.u
}
