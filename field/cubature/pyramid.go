package cubature

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// solidLevels are the pairs of rules for cells, as levels are for panels.
var solidLevels = [...][2]level{
	{{8, 20, 0}, {11, 18, 1}},
	{{13, 18, 0}, {16, 17, 1}},
	{{17, 18, 0}, {20, 16, 1}},
	{{24, 16, 0}, {28, 14, 1}},
}

// solidCaches holds the tables of a level for every number of points that thin pyramids may get.
type solidCaches struct {
	base, radial [32]pieceCache
}

func (c *solidCaches) set(l level) {
	for n := range c.base {
		c.base[n] = pieceCache{n: n, tenths: l.tenths}
		c.radial[n] = pieceCache{n: n, tenths: l.tenths, thin: true}
	}
}

// pyramids returns the sums of a cell by one rule.
//
// The cell is six pyramids with their apex at the point nearest to the target, the target itself if it is inside. Along the rays
// from the apex the volume element t^2 cancels 1/R^2 and the gradient kernel on rho less its value at the apex; over the base the
// rays stand in a fan about its point nearest to the apex. What uniform charge gives to the gradient is an integral over the faces.
// Flat pyramids weigh little and get fewer points.
func (w *work) pyramids(f *innerFoot, k, which int, grad bool) (s sums) {
	p := pyramid{grad: grad, caches: &w.solid[2*k+which], level: solidLevels[k][which]}
	if grad {
		p.rho = f.apex()
	}
	p.whole(w, f, &s, 0)
	return s
}

// whole adds the sums of the range of f, cut where it runs into a tip.
func (p *pyramid) whole(w *work, f *innerFoot, s *sums, depth int) {
	if axis, at, ok := f.collapse(); ok && depth < 200 && at > f.lo[axis] && at < f.hi[axis] {
		for _, upper := range [2]bool{false, true} {
			part := *f
			if upper {
				part.lo[axis] = at
			} else {
				part.hi[axis] = at
			}
			part.descend(f.c)
			p.whole(w, &part, s, depth+1)
		}
		return
	}
	reach := r3.Norm(f.w)
	if reach <= 8*u*max(f.cell.scale, scaleOf(f.x)) {
		reach = 0
	}
	p.f, p.reach = f, reach
	for axis := range 3 {
		for _, side := range [2]float64{f.lo[axis], f.hi[axis]} {
			if h := side - f.c[axis]; h != 0 {
				part := p.sum(w, axis, h)
				s.add(&part, 1)
			}
		}
	}
}

// pyramid is what the pyramids of a cell have in common.
type pyramid struct {
	f      *innerFoot
	reach  float64 // distance of the target from the apex, 0 if it is there
	rho    float64
	grad   bool
	caches *solidCaches
	level  level
}

// sum returns the sums of the pyramid whose base is at parameter distance h along the axis.
func (p *pyramid) sum(w *work, axis int, h float64) (s sums) {
	f, c, l := p.f, p.f.cell, p.level
	i, j := (axis+1)%3, (axis+2)%3
	lo := [2]float64{f.lo[i] - f.c[i], f.lo[j] - f.c[j]}
	hi := [2]float64{f.hi[i] - f.c[i], f.hi[j] - f.c[j]}
	up, a, b := r3.Scale(h, f.d[axis]), f.d[i], f.d[j]
	base := fan{guu: r3.Norm2(a), guv: r3.Dot(a, b), gvv: r3.Norm2(b), area: r3.Norm(r3.Cross(a, b))}
	at := base.nearest(r3.Dot(a, up), r3.Dot(b, up), lo, hi)
	base.lo = [2]float64{lo[0] - at[0], lo[1] - at[1]}
	base.hi = [2]float64{hi[0] - at[0], hi[1] - at[1]}
	foot := r3.Add(up, r3.Add(r3.Scale(at[0], a), r3.Scale(at[1], b)))
	base.reach = math.Hypot(r3.Norm(foot), p.reach)
	if base.reach < 8*u*c.radius {
		base.reach = 0
	}
	var middle [3]float64
	middle[axis], middle[i], middle[j] = f.c[axis]+0.5*h, f.c[i]+0.25*(lo[0]+hi[0]), f.c[j]+0.25*(lo[1]+hi[1])
	_, xu, xv, xw := c.block.At(middle[0], middle[1], middle[2])
	size := math.Abs(h*(hi[0]-lo[0])*(hi[1]-lo[1])*r3.Dot(r3.Cross(xu, xv), xw)) / (c.radius * c.radius * c.radius)
	l.n = fewer(l.n, max(base.reach/c.radius, 10*size))
	outer, inner := &p.caches.base[l.n], &p.caches.radial[l.n]
	base.rays(l, func(eu, ev, weight, length float64) {
		across := outer.get(2)
		if base.reach > 0 {
			across = outer.get(base.reach / length)
		}
		for m, t := range across.X {
			e := [3]float64{}
			e[axis], e[i], e[j] = h, at[0]+t*eu, at[1]+t*ev
			y := r3.Add(up, r3.Add(r3.Scale(e[i], a), r3.Scale(e[j], b)))
			rule := inner.get(2)
			if p.reach > 0 {
				rule = inner.get(p.reach / r3.Norm(y))
			}
			p.ray(&s, rule, e, math.Abs(h)*weight*t*across.W[m])
			w.nodes += len(rule.X)
		}
	})
	return s
}

// ray adds the nodes along a ray with direction e in parameters.
func (p *pyramid) ray(s *sums, rule *Pieces, e [3]float64, weight float64) {
	f, c := p.f, p.f.cell
	for i, t := range rule.X {
		x, xu, xv, xw := c.block.At(f.c[0]+t*e[0], f.c[1]+t*e[1], f.c[2]+t*e[2])
		dx, dy, dz := f.w.X-(x.X-f.x.X), f.w.Y-(x.Y-f.x.Y), f.w.Z-(x.Z-f.x.Z)
		if dx == 0 && dy == 0 && dz == 0 {
			continue
		}
		v := r3.Dot(r3.Cross(xu, xv), xw) * t * t * rule.W[i] * weight
		rho := c.density(x)
		s.charge(rho*v, dx, dy, dz, false)
		if p.grad {
			s.tensor((rho-p.rho)*v, dx, dy, dz)
		}
	}
}

// nearest returns the point (a, b) of the rectangle at which |up + a xu + b xv| is least, gu and gv being the products of up with
// xu and xv.
func (f *fan) nearest(gu, gv float64, lo, hi [2]float64) (best [2]float64) {
	norm := func(a, b float64) float64 {
		return f.guu*a*a + 2*f.guv*a*b + f.gvv*b*b + 2*(gu*a+gv*b)
	}
	least := math.Inf(1)
	try := func(a, b float64) {
		a, b = clamp(a, lo[0], hi[0]), clamp(b, lo[1], hi[1])
		if d := norm(a, b); d < least {
			least, best = d, [2]float64{a, b}
		}
	}
	try(0, 0)
	if f.area > 0 {
		d := f.area * f.area
		a, b := (f.guv*gv-f.gvv*gu)/d, (f.guv*gu-f.guu*gv)/d
		if a > lo[0] && a < hi[0] && b > lo[1] && b < hi[1] {
			return [2]float64{a, b}
		}
	}
	for _, a := range [2]float64{lo[0], hi[0]} {
		if f.gvv > 0 {
			try(a, -(gv+f.guv*a)/f.gvv)
		}
	}
	for _, b := range [2]float64{lo[1], hi[1]} {
		if f.guu > 0 {
			try(-(gu+f.guv*b)/f.guu, b)
		}
	}
	return best
}
