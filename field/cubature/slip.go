package cubature

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// slip returns how far places along a line and the integral of the derivatives given for them are apart, relative to size and
// beyond rounding: zero for exact derivatives, about 1e-12 for differences. at gives place and derivative for t in [-1, 1].
func slip(at func(t float64) (x, d r3.Vec), size, scale float64) float64 {
	g := legendre(40)
	first, _ := at(-1)
	last, _ := at(1)
	var sum r3.Vec
	for i, t := range g.X {
		_, d := at(t)
		sum = r3.Add(sum, r3.Scale(g.W[i], d))
	}
	off := r3.Norm(r3.Sub(r3.Sub(last, first), sum)) - 64*u*scale
	return max(0, off/size)
}

// slip returns the greatest slip along the middle lines of the panel.
func (p *panel) slip() (s float64) {
	for axis := range 2 {
		s = max(s, slip(func(t float64) (r3.Vec, r3.Vec) {
			var c [2]float64
			c[axis], c[1-axis] = between(p.lo[axis], p.hi[axis], t), between(p.lo[1-axis], p.hi[1-axis], 0.07)
			x, xu, xv := p.chart.At(c[0], c[1])
			return x, r3.Scale((p.hi[axis]-p.lo[axis])/2, [2]r3.Vec{xu, xv}[axis])
		}, p.radius, math.Max(p.scale, p.radius)))
	}
	return s
}

// slip returns the greatest slip along the middle lines of the cell.
func (c *cell) slip() (s float64) {
	for axis := range 3 {
		s = max(s, slip(func(t float64) (r3.Vec, r3.Vec) {
			p := [3]float64{0.07, -0.11, 0.13}
			p[axis] = t
			for k := range p {
				p[k] = between(c.lo[k], c.hi[k], p[k])
			}
			x, xu, xv, xw := c.block.At(p[0], p[1], p[2])
			return x, r3.Scale((c.hi[axis]-c.lo[axis])/2, [3]r3.Vec{xu, xv, xw}[axis])
		}, c.radius, math.Max(c.scale, c.radius)))
	}
	return s
}

// slipped adds what derivatives that are not exact do to a value whose natural scales are given: their error enters areas and, near
// the surface at the given distance, places.
func (c *cloud) slipped(natural *gap, offset float64) gap {
	if c.slip == 0 {
		return gap{}
	}
	near := 1 + c.radius/math.Max(offset, 1e-12*c.radius)
	return gap{c.slip * natural.phi, 4 * c.slip * natural.g, 4 * c.slip * natural.t * near}
}
