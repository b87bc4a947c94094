package element

import (
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// AxialPowerCone is the field of a cone or truncated cone polarized with p = c z^n k, z from mid-height and k along the axis.
//
// Units: natural; c z^n and g in the unit of the polarization, phi in that times length.
// Frame: that of the shape, about the z axis.
// Domain: all finite x; lengths of the shape within 1e-60 and 1e60, 0 <= n <= 40. NaN in, NaN out. Built by
// NewAxialPowerCone; immutable.
// Singular: |g| grows as log(1/d) at distance d from a rim or tip; there G is NaN, Phi finite, field.OnEdge. On a charged face
// the mean of both sides, or the side asked for.
// Accuracy: that of AxialPower (TestAxialPowerConeTwins, TestAxialPowerConeCut).
// Source: ends and volume charge -c n z^(n-1) as AxialPower, the wall as Cone with the charge c z^n n.z; multipoles beyond 2.5
// bounding radii.
type AxialPowerCone struct {
	frustum
	c    float64
	n    int
	peak float64 // largest polarization
	far  roundMultipoles
}

// NewAxialPowerCone returns the cone polarized with c z^n k.
func NewAxialPowerCone(shape geom.Cone, c float64, n int) (*AxialPowerCone, error) {
	f, err := newFrustum(shape)
	switch {
	case err != nil:
		return nil, err
	case c-c != 0:
		return nil, fmt.Errorf("element: factor %v of a power is not finite; give a finite number", c)
	case n < 0 || n > maxPower:
		return nil, fmt.Errorf("element: axial power %d of a cone; give 0 to %d", n, maxPower)
	}
	b := &AxialPowerCone{frustum: f, c: c, n: n}
	b.peak = math.Abs(b.power(b.half))
	b.far = roundMultipoles{bound: b.bound}
	powerPanels(-b.half, b.half, float64(n), func(z, wz float64) {
		acrossRing(0, b.radius(z+b.half, b.half-z), func(s, ws float64) {
			b.far.addUniform(s, z, 2*math.Pi*s*ws*wz, b.power(z))
		})
	})
	for l := range b.far.b {
		b.far.b[l] = 0
	}
	return b, nil
}

// power returns p at the height z.
func (b *AxialPowerCone) power(z float64) float64 { return b.c * powInt(z, b.n) }

// charge returns the volume charge -dp/dz at the height z.
func (b *AxialPowerCone) charge(z float64) float64 {
	if b.n == 0 {
		return 0
	}
	return -b.c * float64(b.n) * powInt(z, b.n-1)
}

// radius returns the radius at a height above the bottom and below the top, from the nearer end.
func (f *frustum) radius(above, below float64) float64 {
	slope := (f.shape.Top - f.shape.Bottom) / f.shape.Height
	if above < below {
		return f.shape.Bottom + slope*above
	}
	return f.shape.Top - slope*below
}

// Field returns g at x.
func (b *AxialPowerCone) Field(x r3.Vec) r3.Vec {
	return single(x, func(p field.Point, side field.Side) field.Value { return b.value(p, side, field.WantG) })
}

// Evaluate computes the arrays of dst; see field.Evaluator.
func (b *AxialPowerCone) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	field.Fill(dst, at, func(p field.Point, want field.Want) field.Value { return b.value(p, side, want) })
}

func (b *AxialPowerCone) value(x field.Point, side field.Side, want field.Want) field.Value {
	p := newRoundPoint(x, 0, b.bound)
	var k cosine
	if b.far.far(&p) {
		c, _ := b.far.sum(&p, want)
		c.widen()
		return p.value(&c, &k, r3.Vec{}, want)
	}
	v := b.wall.view(&p)
	low, high := b.power(-b.half), b.power(b.half)
	status, face := b.place(&p, &v, [3]bool{b.c != 0, b.c != 0, b.c != 0 && v.nz != 0})
	bottom, top := p.rim(b.shape.Bottom, -b.half), p.rim(b.shape.Top, b.half)
	within := 0.0
	switch out := sideSign(side); {
	case status != field.OnFace:
		if max(v.d, -bottom.z, top.z) < 0 {
			within = 1
		}
	case face == bottomFace:
		bottom.sign, within = -out, 0.5-0.5*out
	case face == topFace:
		top.sign, within = out, 0.5-0.5*out
	default:
		within = 0.5 - 0.5*out
	}
	if status == field.OnEdge {
		want = field.WantPhi | want&field.WantErr
	}
	var c constant
	for _, end := range [2]struct {
		rim    *rim
		charge float64
	}{{&bottom, -low}, {&top, high}} {
		if end.rim.a > 0 {
			s := end.rim.disc(needsOf(want))
			c.add(&s, end.charge)
		}
	}
	s := newRingSurface(r3.Vec{Z: b.c}, want)
	s.power, s.bottom = b.n, -b.half
	left := b.addVolume(&p, &v, &c, within, needsOf(want))
	s.evaluate(&v, &c, &k, status == field.OnFace && face == wallFace, side)
	left += s.left * b.peak
	r := finishPower(&p, &c, left, b.bound, b.peak, status, want)
	plate(&r, b.half, max(b.shape.Bottom, b.shape.Top))
	return r
}

// addVolume adds the volume as stacked discs. It returns what the rules may have left out.
//
// The rim at s above the point is at the distance e + k s from it in the half plane, with e the one at its height and k the
// slope of the radius. Its squared distance (e + k s)^2 + s^2 is zero at s = e (-k +- i)/(1 + k^2).
func (b *AxialPowerCone) addVolume(p *roundPoint, v *ringView, c *constant, within float64, what need) float64 {
	if b.n == 0 {
		return 0
	}
	e := -v.d / v.nr
	if least := ringLeast * b.bound; math.Abs(e) < least {
		e = math.Copysign(least, e)
	}
	slope := (b.shape.Top - b.shape.Bottom) / b.shape.Height
	zb, zt := p.height(-b.half), p.height(b.half) // of the point over the ends
	m := march{lo: -zb, hi: -zt, longest: b.shape.Height / (1 + float64(b.n)/4), degree: float64(b.n)}
	m.scale = b.shape.Height / (m.hi - m.lo)
	f := 1 / (1 + slope*slope)
	m.put(-slope*e*f, e*f)
	opposite := e + 2*p.rho
	m.put(-slope*opposite*f, opposite*f)
	z := p.z.Value()
	m.each(true, func(s, ws float64) (p1, q1 float64) {
		a := b.radius(s+zb, -zt-s)
		if !(a > 0) { // a tip, to rounding
			return 0, 0
		}
		r := rimAt(a, p.rho, e+slope*s, -s)
		values := r.values(what)
		var disc sheet
		disc.addDisc(&r, &values, 1)
		q := b.charge(z + s)
		c.add(&disc, q*ws)
		return q * disc.rho, q * disc.z
	})
	in := 4 * math.Pi * b.charge(z) * within
	c.lap -= in
	c.zz -= in // the step of the solid angle through the disc at the point
	c.sizeH += math.Abs(in)
	return m.left
}
