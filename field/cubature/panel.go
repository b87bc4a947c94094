package cubature

import (
	"math"
	"sync"

	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// panel is a rectangle of a chart on which place and density are smooth.
type panel struct {
	chart   geom.Chart
	density func(x, n r3.Vec) float64 // nil on the boundary of a cell
	index   int                       // of the chart
	lo, hi  [2]float64
	ball
	charge float64 // integral of |sigma|
	peak   float64 // greatest |sigma|
	loose  float64 // charge that is not resolved
	least  int     // place in ladder of the smallest rule that integrates charge and moments

	once [len(ladder)]sync.Once
	sets [len(ladder)]*nodeSet
}

// ladder holds the numbers of points a direction of the rules for far points.
var ladder = [...]int{4, 6, 8, 10, 12, 14, 16, 20, 24, 32, 40}

// measured is the place in ladder of the rule that measures a panel.
const measured = 7

// at returns place, area vector and charge per area of the parameter square.
func (p *panel) at(u, v float64) (x, area r3.Vec, q float64) {
	x, xu, xv := p.chart.At(u, v)
	area = r3.Cross(xu, xv)
	return x, area, p.charged(x, area)
}

// left is the density at x with unit normal n less that of a uniform polarization.
func (p *panel) left(x, n, less r3.Vec) float64 { return p.density(x, n) - r3.Dot(less, n) }

// charged returns the charge per area of the parameter square.
func (p *panel) charged(x, area r3.Vec) float64 {
	if p.density == nil {
		return 0
	}
	a := math.Sqrt(area.X*area.X + area.Y*area.Y + area.Z*area.Z)
	if a < 1e-120 { // a tip, or too small to square
		if a = r3.Norm(area); a == 0 {
			return 0
		}
	}
	return p.density(x, r3.Scale(1/a, area)) * a
}

// nodes returns the charges of the rule ladder[k].
func (p *panel) nodes(k int) *nodeSet {
	p.once[k].Do(func() {
		n := ladder[k]
		g := legendre(n)
		set := newNodeSet(n * n)
		set.area = make([]r3.Vec, n*n)
		du, dv := (p.hi[0]-p.lo[0])/2, (p.hi[1]-p.lo[1])/2
		for i, a := range g.X {
			for j, b := range g.X {
				x, area, q := p.at(between(p.lo[0], p.hi[0], a), between(p.lo[1], p.hi[1], b))
				set.put(i*n+j, x, q*g.W[i]*g.W[j]*du*dv)
				set.area[i*n+j] = r3.Scale(g.W[i]*g.W[j]*du*dv, area)
			}
		}
		p.sets[k] = set
	})
	return p.sets[k]
}

// between returns the point of [lo, hi] that stands at t of [-1, 1].
func between(lo, hi, t float64) float64 { return lo + (hi-lo)*(0.5*(1+t)) }

// measure finds centre, radius, magnitudes and the smallest rule.
func (p *panel) measure() {
	const top = measured
	fine := p.nodes(top)
	n := float64(len(fine.x))
	p.centre = r3.Vec{}
	for i := range fine.x {
		p.centre = r3.Add(p.centre, r3.Scale(1/n, r3.Vec{X: fine.x[i], Y: fine.y[i], Z: fine.z[i]}))
	}
	p.radius, p.charge, p.scale = 0, 0, 0
	for i := range fine.x {
		p.include(r3.Vec{X: fine.x[i], Y: fine.y[i], Z: fine.z[i]})
		p.charge += math.Abs(fine.q[i])
	}
	for _, a := range [5]float64{-1, -0.5, 0, 0.5, 1} { // the rim, where nodes do not reach
		for _, c := range [4][2]float64{{a, -1}, {a, 1}, {-1, a}, {1, a}} {
			x, _, _ := p.chart.At(between(p.lo[0], p.hi[0], c[0]), between(p.lo[1], p.hi[1], c[1]))
			p.include(x)
		}
	}
	p.radius *= 1.02
	p.least = p.smallest(top, p.nodes, fine, p.charge)
}

// ball is where a piece of charge lies.
type ball struct {
	centre r3.Vec
	radius float64
	scale  float64 // greatest coordinate
}

func (b *ball) include(x r3.Vec) {
	b.radius = max(b.radius, r3.Norm(r3.Sub(x, b.centre)))
	b.scale = max(b.scale, scaleOf(x))
}

// smallest returns the place of the first rule below top whose charge and moments are those of the fine one to rounding, or top - 1.
func (b *ball) smallest(top int, nodes func(k int) *nodeSet, fine *nodeSet, charge float64) int {
	want := fine.moments(b.centre, b.radius)
	for k := range top {
		if closeTo(nodes(k).moments(b.centre, b.radius), want, 16*u*charge) {
			return k
		}
	}
	return top - 1
}

// moments returns charge, dipole and second moments in units of the radius.
func (c *nodeSet) moments(centre r3.Vec, radius float64) (m [10]float64) {
	for i, q := range c.q {
		x, y, z := (c.x[i]-centre.X)/radius, (c.y[i]-centre.Y)/radius, (c.z[i]-centre.Z)/radius
		for k, f := range [10]float64{1, x, y, z, x * x, y * y, z * z, x * y, x * z, y * z} {
			m[k] += q * f
		}
	}
	return m
}

func closeTo(a, b [10]float64, tol float64) bool {
	for k := range a {
		if !(math.Abs(a[k]-b[k]) <= tol) {
			return false
		}
	}
	return true
}

// rungs returns the two rules for a point at distance r from the centre, in places of the ladder; ok is false if none will do.
//
// The error of n points falls as rb^-2n, rb = t + sqrt(t^2 - 1), t = r/radius, at worst: the first has n >= 7.5/log10(rb) + 1 if
// there is one, else the last pair is tried.
func rungs(t float64, least int, points []int) (a, b int, ok bool) {
	if !(t > 1.15) {
		return 0, 0, false
	}
	n := int(math.Ceil(7.5/math.Log10(t+math.Sqrt(t*t-1)))) + 1
	for k := least; k+2 < len(points); k++ {
		if points[k] >= n {
			return k, k + 2, true
		}
	}
	return len(points) - 3, len(points) - 1, true
}
