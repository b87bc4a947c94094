package cubature

import (
	"fmt"
	"math"

	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// splitBlocks cuts blocks until place and density are smooth on every cell, or there are most cells.
func splitBlocks(blocks []geom.Block, density func(x r3.Vec) float64, most int) ([]*cell, error) {
	line := newLineRule()
	var done, open []*cell
	for i, b := range blocks {
		if b == nil {
			return nil, fmt.Errorf("cubature: block %d is nil; give a geom.Block", i)
		}
		open = append(open, &cell{block: b, density: density, index: i, hi: [3]float64{1, 1, 1}})
	}
	peak := 0.0
	for len(open) > 0 {
		c := open[0]
		open = open[1:]
		c.measure()
		axis, loose, err := c.rough(line, &peak)
		if err != nil {
			return nil, err
		}
		if axis >= 0 && len(done)+len(open)+2 <= most && c.hi[axis]-c.lo[axis] > math.Ldexp(1, -deepest) {
			middle := c.lo[axis] + (c.hi[axis]-c.lo[axis])/2
			a := &cell{block: c.block, density: density, index: c.index, lo: c.lo, hi: c.hi}
			b := &cell{block: c.block, density: density, index: c.index, lo: c.lo, hi: c.hi}
			a.hi[axis], b.lo[axis] = middle, middle
			open = append(open, a, b)
			continue
		}
		c.loose = loose
		c.makeFaces(len(done))
		done = append(done, c)
	}
	return done, nil
}

// rough returns the direction in which the cell has to be cut, -1 if it need not be, and the charge that is not resolved.
func (c *cell) rough(line *lineRule, peak *float64) (axis int, loose float64, err error) {
	var worst, turned [3]float64
	most := 8 * c.charge / c.volume()
	for axis := range 3 {
		for _, other := range [4][2]float64{{-0.83, 0.07}, {0.07, 0.91}, {0.91, -0.83}, {-0.4, 0.5}} {
			var defect, size [5]float64
			var first, last r3.Vec
			begun := false
			line.defect(func(t float64, dst []float64) {
				var p [3]float64
				p[axis], p[(axis+1)%3], p[(axis+2)%3] = t, other[0], other[1]
				for k := range p {
					p[k] = between(c.lo[k], c.hi[k], p[k])
				}
				x, xu, xv, xw := c.block.At(p[0], p[1], p[2])
				det := r3.Dot(r3.Cross(xu, xv), xw)
				rho := c.density(x)
				if err == nil && (rho-rho != 0 || det-det != 0 || x.X-x.X+x.Y-x.Y+x.Z-x.Z != 0) {
					err = fmt.Errorf("cubature: block %d at (%v, %v, %v): place %v, volume %v, density %v; all must be finite",
						c.index, p[0], p[1], p[2], x, det, rho)
				}
				if err == nil && det < 0 {
					err = fmt.Errorf("cubature: block %d is left-handed at (%v, %v, %v); exchange two of its parameters", c.index, p[0], p[1], p[2])
				}
				c.peak = max(c.peak, min(math.Abs(rho), most))
				last = [3]r3.Vec{xu, xv, xw}[axis]
				if !begun {
					first, begun = last, true
				}
				d := r3.Scale(1/c.radius, r3.Sub(x, c.centre))
				copy(dst, []float64{d.X, d.Y, d.Z, det, rho * det})
			}, defect[:], size[:])
			*peak = max(*peak, c.peak)
			worst[axis] = max(worst[axis], max(defect[0], defect[1], defect[2])-4*u*c.scale/c.radius)
			if size[3] > 0 {
				worst[axis] = max(worst[axis], defect[3]/size[3])
			}
			if size[4] > 0 {
				worst[axis] = max(worst[axis], defect[4]/max(size[4], 1e-3*size[3]**peak))
			}
			if first != (r3.Vec{}) && last != (r3.Vec{}) {
				turned[axis] = max(turned[axis], 1-r3.Cos(first, last))
			}
		}
	}
	if err != nil {
		return -1, 0, err
	}
	axis = 0
	for k := range worst {
		if worst[k] > worst[axis] {
			axis = k
		}
	}
	if worst[axis] > resolved {
		return axis, worst[axis] * c.charge, nil
	}
	for k := range turned {
		if turned[k] > 1.3 { // more than 107 degrees from end to end
			return k, 0, nil
		}
	}
	return -1, 0, nil
}
