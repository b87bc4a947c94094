package cubature

import (
	"math"
	"sync"

	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// cell is a rectangular part of a block on which place and density are smooth.
type cell struct {
	block   geom.Block
	density func(x r3.Vec) float64
	index   int // of the block
	lo, hi  [3]float64
	ball
	charge float64 // integral of |rho|
	peak   float64 // greatest |rho|, or eight times the mean if that is less: it may be infinite at an edge
	loose  float64 // charge that is not resolved
	least  int     // place in solidLadder of the smallest rule that integrates charge and moments
	faces  [6]panel

	once [len(solidLadder)]sync.Once
	sets [len(solidLadder)]*nodeSet
}

// solidLadder holds the numbers of points a direction of the rules for far points.
var solidLadder = [...]int{4, 6, 8, 10, 12, 14, 16, 20, 24, 28, 32}

// solidMeasured is the place in solidLadder of the rule that measures a cell.
const solidMeasured = 5

// rule visits the points of the product rule with n points a direction, with their pieces of volume.
func (c *cell) rule(n int, visit func(i int, x r3.Vec, volume float64)) {
	g := legendre(n)
	part := (c.hi[0] - c.lo[0]) * (c.hi[1] - c.lo[1]) * (c.hi[2] - c.lo[2]) / 8
	for i := range g.X {
		for j := range g.X {
			for l := range g.X {
				x, xu, xv, xw := c.block.At(between(c.lo[0], c.hi[0], g.X[i]), between(c.lo[1], c.hi[1], g.X[j]), between(c.lo[2], c.hi[2], g.X[l]))
				visit((i*n+j)*n+l, x, r3.Dot(r3.Cross(xu, xv), xw)*g.W[i]*g.W[j]*g.W[l]*part)
			}
		}
	}
}

// nodes returns the charges of the rule solidLadder[k].
func (c *cell) nodes(k int) *nodeSet {
	c.once[k].Do(func() {
		n := solidLadder[k]
		set := newNodeSet(n * n * n)
		c.rule(n, func(i int, x r3.Vec, volume float64) {
			q := 0.0
			if volume != 0 {
				q = c.density(x) * volume
			}
			set.put(i, x, q)
		})
		c.sets[k] = set
	})
	return c.sets[k]
}

// volume returns the size of the cell, roughly.
func (c *cell) volume() (v float64) {
	c.rule(4, func(_ int, _ r3.Vec, volume float64) { v += math.Abs(volume) })
	return v
}

// measure finds centre, radius, magnitudes, the smallest rule and the faces.
func (c *cell) measure() {
	const top = solidMeasured
	fine := c.nodes(top)
	n := float64(len(fine.x))
	c.centre = r3.Vec{}
	for i := range fine.x {
		c.centre = r3.Add(c.centre, r3.Scale(1/n, r3.Vec{X: fine.x[i], Y: fine.y[i], Z: fine.z[i]}))
	}
	c.radius, c.charge, c.scale = 0, 0, 0
	for i := range fine.x {
		c.include(r3.Vec{X: fine.x[i], Y: fine.y[i], Z: fine.z[i]})
		c.charge += math.Abs(fine.q[i])
	}
	ends := [5]float64{-1, -0.5, 0, 0.5, 1}
	for axis := range 3 {
		for _, a := range ends {
			for _, b := range ends {
				for _, e := range [2]float64{-1, 1} {
					var p [3]float64
					p[axis], p[(axis+1)%3], p[(axis+2)%3] = e, a, b
					for k := range p {
						p[k] = between(c.lo[k], c.hi[k], p[k])
					}
					x, _, _, _ := c.block.At(p[0], p[1], p[2])
					c.include(x)
				}
			}
		}
	}
	c.radius *= 1.02
	c.least = c.smallest(top, c.nodes, fine, c.charge)
}

// cellFace is a side of a cell as a chart with the normal outward.
type cellFace struct {
	block geom.Block
	axis  int
	at    float64
	upper bool
	lo    [2]float64 // of the two other parameters of the block
	span  [2]float64
}

// SideOf returns a side of a block as a chart with the normal outward: that on which the parameter axis (0, 1 or 2) is 1, or 0 if not
// upper.
func SideOf(block geom.Block, axis int, upper bool) geom.Chart {
	f := cellFace{block: block, axis: axis, upper: upper, span: [2]float64{1, 1}}
	if upper {
		f.at = 1
	}
	return f
}

// At returns the point of the face.
func (f cellFace) At(u, v float64) (x, xu, xv r3.Vec) {
	var p [3]float64
	i, j := (f.axis+1)%3, (f.axis+2)%3
	if !f.upper {
		i, j = j, i
	}
	p[f.axis], p[i], p[j] = f.at, f.lo[0]+u*f.span[0], f.lo[1]+v*f.span[1]
	x, a, b, c := f.block.At(p[0], p[1], p[2])
	d := [3]r3.Vec{a, b, c}
	return x, r3.Scale(f.span[0], d[i]), r3.Scale(f.span[1], d[j])
}

// makeFaces makes the panels of the sides of the cell, number n, for the gradient of uniform charge.
func (c *cell) makeFaces(n int) {
	for axis := range 3 {
		for side := range 2 {
			i, j := (axis+1)%3, (axis+2)%3
			at := c.hi[axis]
			if side == 0 {
				i, j = j, i
				at = c.lo[axis]
			}
			f := &c.faces[2*axis+side]
			f.chart = cellFace{block: c.block, axis: axis, at: at, upper: side == 1, lo: [2]float64{c.lo[i], c.lo[j]},
				span: [2]float64{c.hi[i] - c.lo[i], c.hi[j] - c.lo[j]}}
			f.index = 6*n + 2*axis + side
			f.hi = [2]float64{1, 1}
			f.measure()
		}
	}
}
