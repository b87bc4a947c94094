package cubature

import (
	"math"

	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// foot is the point of a panel that is nearest to the target, with the frame of the chart there.
type foot struct {
	c         [2]float64 // parameters
	x, xu, xv r3.Vec
	distance  float64
}

// foot finds the point of the panel nearest to x, from the nearest of its nodes.
func (p *panel) foot(x r3.Vec) foot {
	set := p.nodes(2)
	n := ladder[2]
	best, least := 0, math.Inf(1)
	for i := range set.x {
		dx, dy, dz := x.X-set.x[i], x.Y-set.y[i], x.Z-set.z[i]
		if d := dx*dx + dy*dy + dz*dz; d < least {
			best, least = i, d
		}
	}
	g := legendre(n)
	c := [2]float64{between(p.lo[0], p.hi[0], g.X[best/n]), between(p.lo[1], p.hi[1], g.X[best%n])}
	return descend(p.chart, x, c, p.lo, p.hi)
}

// descend improves the parameters c of a point near x within the rectangle, by Gauss-Newton steps with the sides as active
// constraints, halved until the distance falls.
func descend(chart geom.Chart, x r3.Vec, c, lo, hi [2]float64) foot {
	f := footAt(chart, x, c)
	for range 60 {
		step, ok := f.step(x, lo, hi)
		if !ok {
			break
		}
		moved := false
		for range 12 {
			next := [2]float64{clamp(f.c[0]+step[0], lo[0], hi[0]), clamp(f.c[1]+step[1], lo[1], hi[1])}
			if next == f.c {
				break
			}
			if t := footAt(chart, x, next); t.distance < f.distance {
				moved = true
				f = t
				break
			}
			step[0], step[1] = step[0]/2, step[1]/2
		}
		if !moved {
			break
		}
	}
	return f
}

func footAt(chart geom.Chart, x r3.Vec, c [2]float64) foot {
	f := foot{c: c}
	f.x, f.xu, f.xv = chart.At(c[0], c[1])
	f.distance = r3.Norm(r3.Sub(x, f.x))
	return f
}

// step returns the Gauss-Newton step with sides that would be crossed held fast; ok is false where no direction is left.
func (f *foot) step(x r3.Vec, lo, hi [2]float64) (s [2]float64, ok bool) {
	r := r3.Sub(x, f.x)
	g := [2]float64{r3.Dot(f.xu, r), r3.Dot(f.xv, r)}
	m := [2]float64{r3.Norm2(f.xu), r3.Norm2(f.xv)}
	var free [2]bool
	for k := range 2 {
		free[k] = m[k] > 0 && !(f.c[k] <= lo[k] && g[k] <= 0 || f.c[k] >= hi[k] && g[k] >= 0)
	}
	off := r3.Dot(f.xu, f.xv)
	if det := m[0]*m[1] - off*off; free[0] && free[1] && det > 1e-12*m[0]*m[1] {
		s = [2]float64{(m[1]*g[0] - off*g[1]) / det, (m[0]*g[1] - off*g[0]) / det}
		out := [2]bool{outside(f.c[0], s[0], lo[0], hi[0]), outside(f.c[1], s[1], lo[1], hi[1])}
		switch {
		case out[0] && !out[1]: // go to the side and do there what is best
			s[0] = clamp(f.c[0]+s[0], lo[0], hi[0]) - f.c[0]
			s[1] = (g[1] - off*s[0]) / m[1]
		case out[1] && !out[0]:
			s[1] = clamp(f.c[1]+s[1], lo[1], hi[1]) - f.c[1]
			s[0] = (g[0] - off*s[1]) / m[0]
		}
		return s, true
	}
	for k := range 2 {
		if free[k] {
			s[k] = g[k] / m[k]
			ok = true
		}
	}
	return s, ok
}

func outside(c, step, lo, hi float64) bool { return c+step < lo || c+step > hi }

func clamp(c, lo, hi float64) float64 { return min(max(c, lo), hi) }
