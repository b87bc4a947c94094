package element

import (
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// AxialPower is the field of a cylinder or tube polarized with p = c z^n k, z from mid-height and k along the axis.
//
// Units: natural; c z^n and g in the unit of the polarization, phi in that times length.
// Frame: that of the shape, about the z axis.
// Domain: all finite x; lengths of the shape within 1e-60 and 1e60, 0 <= n <= 40. NaN in, NaN out. Built by NewAxialPower;
// immutable.
// Singular: |g| grows as log(1/d) at distance d from a rim; there G is NaN, Phi finite, field.OnEdge. On an end the mean of
// both sides, or the side asked for. The walls carry no charge.
// Accuracy: |error| <= 3e-12 (plates lower than 0.01 radii: 1e-10) of max(|g|, 1e-3 g0) and of max(|phi|, 1e-3 phi0), with g0 = max|p| min(1, (a/R)^3),
// phi0 = max|p| a min(1, (a/R)^2), a the bounding radius (worst 7.8e-13 and 1.8e-12, both on bodies 1e-3 radii thick; else
// 7.2e-14 and 1.9e-13, TestRingReference).
// Source: the charge c h^n, -c (-h)^n of the ends as discs (see Disc), the charge -c n z^(n-1) of the volume as discs stacked
// by Gauss-Legendre in panels graded towards the point (see march); multipoles beyond 2.5 bounding radii.
type AxialPower struct {
	powerBody
}

// NewAxialPower returns the tube, or with Inner 0 the cylinder, polarized with c z^n k.
func NewAxialPower(shape geom.Tube, c float64, n int) (*AxialPower, error) {
	if n < 0 {
		return nil, fmt.Errorf("element: axial power %d is infinite at mid-height; give a power of at least 0", n)
	}
	body, err := newPowerBody(shape, c, float64(n))
	if err != nil {
		return nil, err
	}
	b := &AxialPower{body}
	f := &b.faces
	b.peak = math.Abs(b.power(f.half))
	if n%2 == 0 {
		f.p.Z = b.power(f.half)
	} else {
		f.slope = b.power(f.half) / f.half
	}
	powerPanels(-f.half, f.half, b.n, func(z, wz float64) {
		acrossRing(f.inner, f.outer, func(s, ws float64) {
			f.far.addUniform(s, z, 2*math.Pi*s*ws*wz, b.power(z))
		})
	})
	area := math.Pi * (f.outer - f.inner) * (f.outer + f.inner)
	if n%2 == 0 { // the first moments exactly
		f.far.a[1] = 2 * area * f.half * b.power(f.half) / (b.n + 1) / f.bound
	} else {
		f.far.a[2] = 4 * area * f.half * f.half * b.power(f.half) / (b.n + 2) / (f.bound * f.bound)
	}
	for l := range f.far.b {
		f.far.b[l] = 0
		if l%2 == n%2 { // z^n (r^l P_l)_z is odd in z
			f.far.a[l] = 0
		}
	}
	return b, nil
}

// power returns p at the height z.
func (b *AxialPower) power(z float64) float64 { return b.c * powInt(z, int(b.n)) }

// charge returns the volume charge -dp/dz at the height z.
func (b *AxialPower) charge(z float64) float64 {
	if b.n == 0 {
		return 0
	}
	return -b.c * b.n * powInt(z, int(b.n)-1)
}

// powInt returns x^n for n >= 0.
func powInt(x float64, n int) float64 {
	y := 1.0
	for ; n > 0; n >>= 1 {
		if n&1 == 1 {
			y *= x
		}
		x *= x
	}
	return y
}

// Field returns g at x.
func (b *AxialPower) Field(x r3.Vec) r3.Vec {
	return single(x, func(p field.Point, side field.Side) field.Value { return b.value(p, side, field.WantG) })
}

// Evaluate computes the arrays of dst; see field.Evaluator.
func (b *AxialPower) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	field.Fill(dst, at, func(p field.Point, want field.Want) field.Value { return b.value(p, side, want) })
}

// Bounds returns the box of the body.
func (b *AxialPower) Bounds() r3.Box { return b.faces.Bounds() }

func (b *AxialPower) value(x field.Point, side field.Side, want field.Want) field.Value {
	f := &b.faces
	p := newRoundPoint(x, 0, f.bound)
	if f.far.far(&p) {
		return b.away(&p, want)
	}
	n := newTubePoint(f, p)
	status := n.settle(side)
	if status == field.OnEdge {
		want = field.WantPhi | want&field.WantErr
	}
	var c constant
	left := 0.0
	for i := range n.count {
		left += b.add(&n, &n.walls[i], &c, needsOf(want))
	}
	in := 4 * math.Pi * b.charge(p.z.Hi) * n.inside()
	c.lap -= in
	c.zz -= in // the step of the solid angle through the disc at the point
	c.sizeH += math.Abs(in)
	c.sizeU *= 0.5 // measured: of 400 triples the least estimate of phi is 1.3 times the error, the median one 70 times
	v := b.finish(&p, &c, left, status, want)
	plate(&v, f.half, f.outer)
	return v
}

// plate raises the estimates of a body of low height: there the rounding of the rule's weights adds up instead of averaging
// out (measured).
func plate(v *field.Value, half, radius float64) {
	if half < 0.05*radius {
		v.ErrPhi, v.ErrG = 4*v.ErrPhi, 4*v.ErrG
	}
}

// add adds the ends and the volume within a wall, the volume as stacked discs. It returns what the rules may have left out.
func (b *AxialPower) add(n *tubePoint, w *tubeWall, c *constant, what need) float64 {
	bottom, top := n.ends(w)
	sb, st := bottom.disc(what), top.disc(what)
	h := b.faces.half
	c.add(&sb, -w.sign*b.power(-h))
	c.add(&st, w.sign*b.power(h))
	if b.n == 0 {
		return 0
	}
	d := w.d
	if least := ringLeast * w.radius; math.Abs(d) < least {
		d = math.Copysign(least, d)
	}
	m := march{lo: -n.zb, hi: -n.zt, longest: 2 * h / (1 + b.n/4), degree: b.n}
	m.scale = 2 * h / (m.hi - m.lo)
	m.put(0, d)
	m.put(0, w.radius+n.rho)
	z := n.z.Hi
	m.each(true, func(s, ws float64) (p, q float64) {
		r := rimAt(w.radius, n.rho, d, -s)
		v := r.values(what)
		var disc sheet
		disc.addDisc(&r, &v, 1)
		f := w.sign * b.charge(z+s)
		c.add(&disc, f*ws)
		return f * disc.rho, f * disc.z
	})
	return m.left
}
