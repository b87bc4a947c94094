package cubature

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// innerFoot is a cell that the target is in or near, and its point nearest to it.
type innerFoot struct {
	cell     *cell
	c        [3]float64 // parameters
	x        r3.Vec
	d        [3]r3.Vec // derivatives
	distance float64
	w        r3.Vec // target - x
	lo, hi   [3]float64
	to, low  r3.Vec // the target
}

// apex returns the density to be taken out of the gradient: that at the foot. Far from the target nothing need be, nor is anything where
// the density is infinite.
func (f *innerFoot) apex() float64 {
	if f.distance > 0.1*f.cell.radius {
		return 0
	}
	rho := f.cell.density(f.x)
	if rho-rho != 0 {
		return 0
	}
	return rho
}

// foot finds the point of the cell nearest to x, from the nearest of its nodes, by projected Gauss-Newton steps.
func (c *cell) foot(x, low r3.Vec) innerFoot {
	set := c.nodes(1)
	n := solidLadder[1]
	best, least := 0, math.Inf(1)
	for i := range set.x {
		dx, dy, dz := x.X-set.x[i], x.Y-set.y[i], x.Z-set.z[i]
		if d := dx*dx + dy*dy + dz*dz; d < least {
			best, least = i, d
		}
	}
	g := legendre(n)
	at := [3]int{best / (n * n), best / n % n, best % n}
	var p [3]float64
	for k := range p {
		p[k] = between(c.lo[k], c.hi[k], g.X[at[k]])
	}
	f := innerFoot{cell: c, lo: c.lo, hi: c.hi, to: x, low: low}
	f.descend(p)
	return f
}

// descend finds the foot in the range from the parameters p.
func (f *innerFoot) descend(p [3]float64) {
	for k := range p {
		p[k] = clamp(p[k], f.lo[k], f.hi[k])
	}
	f.move(p)
	for range 80 {
		step, ok := f.step()
		if !ok || !f.search(step) {
			break
		}
	}
	f.w = r3.Add(r3.Sub(f.to, f.x), f.low)
}

func (f *innerFoot) move(p [3]float64) {
	f.c = p
	f.x, f.d[0], f.d[1], f.d[2] = f.cell.block.At(p[0], p[1], p[2])
	f.distance = r3.Norm(r3.Sub(f.to, f.x))
}

// search halves the step until the distance falls.
func (f *innerFoot) search(step [3]float64) bool {
	for range 12 {
		p := f.c
		for k := range p {
			p[k] = clamp(p[k]+step[k], f.lo[k], f.hi[k])
		}
		if p == f.c {
			return false
		}
		t := *f
		t.move(p)
		if t.distance < f.distance {
			*f = t
			return true
		}
		for k := range step {
			step[k] /= 2
		}
	}
	return false
}

// step returns the Gauss-Newton step with sides that would be crossed held fast.
func (f *innerFoot) step() (s [3]float64, ok bool) {
	r := r3.Sub(f.to, f.x)
	var free []int
	var room [3]int
	free = room[:0]
	for k := range 3 {
		g := r3.Dot(f.d[k], r)
		if r3.Norm2(f.d[k]) > 0 && !(f.c[k] <= f.lo[k] && g <= 0 || f.c[k] >= f.hi[k] && g >= 0) {
			free = append(free, k)
		}
	}
	// orthogonalize the free derivatives one by one; a direction that depends on those before it is left out
	var q [3]r3.Vec
	var m [3][3]float64
	used := 0
	var order [3]int
	for _, k := range free {
		v := f.d[k]
		for j := range used {
			m[j][used] = r3.Dot(q[j], v)
			v = r3.Sub(v, r3.Scale(m[j][used], q[j]))
		}
		n := r3.Norm(v)
		if n <= 1e-7*r3.Norm(f.d[k]) {
			continue
		}
		m[used][used] = n
		q[used], order[used] = r3.Scale(1/n, v), k
		used++
	}
	var y [3]float64
	for j := used - 1; j >= 0; j-- {
		t := r3.Dot(q[j], r)
		for l := j + 1; l < used; l++ {
			t -= m[j][l] * y[l]
		}
		y[j] = t / m[j][j]
		s[order[j]] = y[j]
	}
	return s, used > 0
}

// collapse tells whether the frame at the foot is much shorter than at a far side of the range, as it is near a tip, and where
// to cut so that the part with the foot is of one size. Nothing smaller than the distance of the target needs to be cut.
func (f *innerFoot) collapse() (axis int, at float64, ok bool) {
	for m := range 3 {
		far := f.hi[m]
		if f.c[m]-f.lo[m] > far-f.c[m] {
			far = f.lo[m]
		}
		least := max(1e-15*f.cell.radius, r3.Norm(f.w)) / (r3.Norm(f.d[m]) * math.Abs(far-f.c[m]))
		if !(least < 0.25) {
			continue
		}
		p := f.c
		p[m] = far
		var d [3]r3.Vec
		_, d[0], d[1], d[2] = f.cell.block.At(p[0], p[1], p[2])
		here, there := 0.0, math.Inf(1)
		for k := range d {
			if k != m { // both shrink at a point; along an edge that shrinks to a line, cuts would be long and thin
				here, there = max(here, r3.Norm(f.d[k])), min(there, r3.Norm(d[k]))
			}
		}
		if there > 8*here {
			return m, f.c[m] + (far-f.c[m])*max(3*here/(there-here), least), true
		}
	}
	return 0, 0, false
}
