package element

import (
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// powerBody is what AxialPower and RadialPower share: a cylinder or tube with volume charge. faces has the same shape, and
// charge on the same faces.
type powerBody struct {
	faces Tube
	c, n  float64
	peak  float64 // largest polarization
}

// newPowerBody checks shape and numbers.
func newPowerBody(shape geom.Tube, c, n float64) (b powerBody, err error) {
	if shape.Inner == 0 {
		err = geom.Cylinder{Radius: shape.Outer, Height: shape.Height}.Check()
	} else {
		err = shape.Check()
	}
	if err == nil && c-c != 0 {
		err = fmt.Errorf("element: factor %v of a power is not finite; give a finite number", c)
	}
	if err == nil && !(math.Abs(n) <= maxPower) {
		err = fmt.Errorf("element: power %v is not between -%d and %d; give a lower one", n, maxPower, maxPower)
	}
	half := shape.Height / 2
	b = powerBody{c: c, n: n}
	b.faces = Tube{inner: shape.Inner, outer: shape.Outer, half: half, bound: math.Hypot(shape.Outer, half)}
	b.faces.far = roundMultipoles{bound: b.faces.bound}
	return b, err
}

// maxPower is the highest power that the rules resolve.
const maxPower = 40

// powerPanels visits the nodes of a Gauss-Legendre rule over lo..hi that is exact for moments of a power n.
func powerPanels(lo, hi, n float64, visit func(s, w float64)) {
	panels := 2 + int(math.Abs(n)/8)
	step := (hi - lo) / float64(panels)
	for i := range panels {
		h := 0.5 * step
		c := lo + float64(2*i+1)*h
		for _, g := range gauss16 {
			visit(c-h*g.x, h*g.w)
			visit(c+h*g.x, h*g.w)
		}
	}
}

// away returns the value far off.
func (b *powerBody) away(p *roundPoint, want field.Want) field.Value {
	c, k := b.faces.far.sum(p, want)
	c.widen()
	return p.value(&c, &k, b.faces.across(), want)
}

// widen triples the sizes that the estimates are made of: moments and densities of powers carry roundings of their own.
func (c *constant) widen() {
	c.sizeU *= 3
	c.sizeG *= 3
	c.sizeH *= 3
}

// finish makes the value of the sums at a point that is where status says, with what the rules may have left out.
func (b *powerBody) finish(p *roundPoint, c *constant, left float64, status field.Status, want field.Want) field.Value {
	return finishPower(p, c, left, b.faces.bound, b.peak, status, want)
}

// finishPower makes the value of a body with the bounding radius bound and the largest polarization peak.
func finishPower(p *roundPoint, c *constant, left, bound, peak float64, status field.Status, want field.Want) field.Value {
	c.widen()
	c.sizeG += left / (rounding * u)
	c.sizeU += left * bound / (rounding * u)
	var k cosine
	v := p.value(c, &k, r3.Vec{}, want)
	switch {
	case status == field.OnEdge:
		return onEdge(v)
	case status == field.OnFace:
		v.Status, v.ErrGrad = field.OnFace, math.Inf(1)
	case left > 1e-10*peak:
		v.Status = field.NotConverged
	}
	return v
}
