package cubature

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// placedFoot is a panel that the target is near, its foot, and the target as seen from the foot.
type placedFoot struct {
	panel *panel
	foot
	w       r3.Vec // x - foot
	aligned bool   // w is consistent with that of the nearest foot
}

// ray is one ray of a fan over a panel.
type ray struct {
	p          *panel
	f          *placedFoot
	less       r3.Vec
	eu, ev     float64
	weight     float64
	length     float64 // metric length
	fine, grad bool    // fine: places are integrated from the foot
}

// near returns the sums of a panel by one rule.
//
// Near the surface the vector from the target to a node must be right relative to itself, which a difference of two rounded
// places is not. It is the integral of the chart's derivatives along the ray, taken with the integration matrix of the Gauss
// points of each piece: its error is a few u of its length.
func (w *work) near(f *placedFoot, less r3.Vec, k, which int, grad bool) (s sums) {
	p := f.panel
	l := levels[k][which]
	reach := max(r3.Norm(f.w), 1e-16*p.scale)
	metric := fan{
		lo:  [2]float64{p.lo[0] - f.c[0], p.lo[1] - f.c[1]},
		hi:  [2]float64{p.hi[0] - f.c[0], p.hi[1] - f.c[1]},
		guu: r3.Norm2(f.xu), guv: r3.Dot(f.xu, f.xv), gvv: r3.Norm2(f.xv),
		area: r3.Norm(r3.Cross(f.xu, f.xv)), reach: reach,
	}
	fine := reach < 0x1p-5*p.scale
	cache := w.pieces(k, which)
	metric.rays(l, func(eu, ev, weight, length float64) {
		r := ray{p: p, f: f, less: less, eu: eu, ev: ev, weight: weight, length: length, fine: fine, grad: grad}
		rule := cache.get(reach / length)
		part := r.sum(w, rule)
		w.nodes += len(rule.X)
		s.add(&part, 1)
	})
	return s
}

// sum returns the sums along a ray.
func (r *ray) sum(w *work, rule *Pieces) (s sums) {
	n := len(rule.base.X)
	var start r3.Vec // from the foot to where the piece begins
	for k := range rule.count {
		at := rule.X[k*n : (k+1)*n]
		weight := rule.W[k*n : (k+1)*n]
		if r.fine && r3.Norm(start) < 0x1p-4*r.p.scale {
			slope := rule.slope[k*n : (k+1)*n]
			start = r.fineSum(w, rule.base, start, at, slope, weight, &s)
			continue
		}
		for i, t := range at {
			x, area, q := r.p.at(r.f.c[0]+t*r.eu, r.f.c[1]+t*r.ev)
			k := t * weight[i] * r.weight
			r.put(&s, k, q, area, r.f.w.X-(x.X-r.f.x.X), r.f.w.Y-(x.Y-r.f.x.Y), r.f.w.Z-(x.Z-r.f.x.Z))
		}
	}
	return s
}

// put adds a node: charge, or a piece of the boundary of a cell.
func (r *ray) put(s *sums, k, q float64, area r3.Vec, dx, dy, dz float64) {
	if r.p.density == nil {
		s.boundary(r3.Scale(k, area), dx, dy, dz)
		return
	}
	s.charge(k*(q-r3.Dot(r.less, area)), dx, dy, dz, r.grad)
}

// fineSum adds a piece with places integrated from its start, and returns its end.
func (r *ray) fineSum(w *work, g *gauss, start r3.Vec, at, slope, weight []float64, s *sums) r3.Vec {
	n := len(at)
	vx, vy, vz := w.v[:n], w.v[n:2*n], w.v[2*n:3*n]
	charge, areas := w.q[:n], w.areas[:n]
	end := start
	for i, t := range at {
		x, xu, xv := r.p.chart.At(r.f.c[0]+t*r.eu, r.f.c[1]+t*r.ev)
		areas[i] = r3.Cross(xu, xv)
		charge[i] = r.p.charged(x, areas[i])
		vx[i] = slope[i] * (r.eu*xu.X + r.ev*xv.X)
		vy[i] = slope[i] * (r.eu*xu.Y + r.ev*xv.Y)
		vz[i] = slope[i] * (r.eu*xu.Z + r.ev*xv.Z)
		c := g.W[i]
		end = r3.Vec{X: end.X + c*vx[i], Y: end.Y + c*vy[i], Z: end.Z + c*vz[i]}
	}
	o := r3.Sub(r.f.w, start)
	for i, t := range at {
		row := g.upTo[i*n : i*n+n]
		var dx, dy, dz float64
		for j, b := range row {
			dx += b * vx[j]
			dy += b * vy[j]
			dz += b * vz[j]
		}
		r.put(s, t*weight[i]*r.weight, charge[i], areas[i], o.X-dx, o.Y-dy, o.Z-dz)
	}
	return end
}

// along returns the vector between two points of a chart by the integral of its derivatives along the straight line of parameters.
func (p *panel) along(from, to [2]float64) (d r3.Vec) {
	g := legendre(20)
	du, dv := to[0]-from[0], to[1]-from[1]
	for i, t := range g.X {
		_, xu, xv := p.chart.At(between(from[0], to[0], t), between(from[1], to[1], t))
		d = r3.Add(d, r3.Scale(g.W[i]/2, r3.Add(r3.Scale(du, xu), r3.Scale(dv, xv))))
	}
	return d
}

// scaleOf returns the largest coordinate of a vector.
func scaleOf(x r3.Vec) float64 { return max(math.Abs(x.X), math.Abs(x.Y), math.Abs(x.Z)) }
