package force

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/cubature"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// panel is a box of parameters of a face (two) or a block (three) with its integral by the last two rules.
type panel struct {
	lo, hi [3]float64
	dim    int
	face   *face
	chart  geom.Chart
	solid  geom.Block
	dense  func(x r3.Vec) float64 // of a block

	level int
	near  bool // the field may be singular closer to it than its own size
	value sums
	step  quad // difference of the last two rules
	older quad // of the two before
	miss  quad // bound on the error
	axis  int  // along which the integrand is least resolved
}

// ladder holds the numbers of points a direction; each rule is held against the one before. Free: more points cost more and need
// fewer cuts.
var ladder = [...]int{2, 4, 6, 8, 11, 14}

// solidLadder is that of blocks.
var solidLadder = [...]int{2, 3, 4, 6, 8, 10}

// points returns how many points a direction the panel has at a level.
func (p *panel) points(level int) int {
	if p.dim == 3 {
		return solidLadder[level]
	}
	return ladder[level]
}

// mostNodes is the size of the largest rule.
const mostNodes = 1000

// work is the memory of one integration.
type work struct {
	x, y, z, slack [mostNodes]float64
	q, rho         [mostNodes]float64 // charge, and uniform volume charge times area
	n              [mostNodes]r3.Vec
	values         *field.Values
	points         field.Points
	src            field.Source
	about, centre  r3.Vec
	slackOf        float64
	push           float64 // distance by which points are moved into the part
	stiff          bool
	reach          float64
	nodes          int
	edges          []curve // of the other part
	known          bool    // there are no others
	shift          float64 // by which coordinates are rounded
	steep          float64 // rate at which the field changes over its own size, 1/length

	own       field.Source // the part's own field, where the stress is integrated instead of what acts on charge
	ownValues *field.Values
}

func newWork(src field.Source, about r3.Vec, p *part, stiff bool) *work {
	want := field.WantPhi | field.WantG | field.WantErr
	if stiff {
		want |= field.WantGrad
	}
	return &work{src: src, about: about, centre: p.centre, reach: p.reach, stiff: stiff, values: field.NewValues(mostNodes, want)}
}

// measure integrates over a new panel by the rule of its level, at least the third, and the two before.
func (w *work) measure(p *panel, rho float64) {
	p.level = max(p.level, 2) - 2
	p.step, p.older = quad{}, quad{}
	p.value = sums{}
	w.rule(p, p.points(p.level), rho, &p.value)
	w.climb(p, rho)
	p.near = w.close(w.points.Len())
	w.climb(p, rho)
}

// climb integrates by the next rule and bounds its error.
func (w *work) climb(p *panel, rho float64) {
	coarse, last, older := p.value, p.step, p.older
	p.level++
	n := p.points(p.level)
	p.value = sums{}
	w.rule(p, n, rho, &p.value)
	p.axis = w.roughest(p, n)
	p.step, p.older = p.value.distance(&coarse, w.reach, w.stiff), last
	size := p.value.size.quad()
	for k, d := range p.step {
		if older[k] == 0 {
			older[k] = size[k]
		}
		p.miss[k] = remains(d, last[k], older[k], p.near)
	}
}

// remains returns a bound on the error of the last rule from the differences d, last, older of four, d the latest.
//
// Away from edges of the other part the differences fall like a power of the number of points, so that the next one is smaller by their
// ratio; twice the root of it is taken. Two rules may agree by chance: then what the fall before lets expect counts. Near edges nothing
// is expected, and a part of the difference before counts too.
func remains(d, last, older float64, near bool) float64 {
	switch {
	case last == 0: // the first two rules
		return d
	case near:
		return max(2*d, 0.2*last)
	case last < older:
		d = max(d, last*(last/older))
	}
	if fall := d / last; fall < 0.1 {
		return d * max(2*math.Sqrt(fall), 0.05)
	}
	return d
}

// close reports whether edges of the other part are, or may be, closer than a sixth of its radius to the first m points.
func (w *work) close(m int) bool {
	if !w.known {
		return true
	}
	if len(w.edges) == 0 {
		return false
	}
	lo, hi := r3.Vec{X: w.x[0], Y: w.y[0], Z: w.z[0]}, r3.Vec{X: w.x[0], Y: w.y[0], Z: w.z[0]}
	for i := range m {
		lo = r3.Vec{X: min(lo.X, w.x[i]), Y: min(lo.Y, w.y[i]), Z: min(lo.Z, w.z[i])}
		hi = r3.Vec{X: max(hi.X, w.x[i]), Y: max(hi.Y, w.y[i]), Z: max(hi.Z, w.z[i])}
	}
	centre, radius := ballOf(r3.Box{Min: lo, Max: hi})
	for i := range w.edges {
		if w.edges[i].apart(centre) < 1.3*radius { // the outermost points are a seventh inside
			return true
		}
	}
	return false
}

// rule sets s to the integral with n points a direction.
func (w *work) rule(p *panel, n int, rho float64, s *sums) {
	g := cubature.Legendre(n)
	var m int
	if p.dim == 2 {
		m = w.placeFace(p, g, rho)
	} else {
		m = w.placeBlock(p, g)
	}
	w.points = field.Points{X: w.x[:m], Y: w.y[:m], Z: w.z[:m]}
	if w.slackOf > 0 {
		for i := range m {
			w.slack[i] = w.slackOf
		}
		w.points.Slack = w.slack[:m]
	}
	v := w.values.Slice(0, m)
	field.Evaluate(w.src, v, &w.points, field.Outside)
	w.nodes += m
	if w.own != nil {
		w.stress(s, v)
		return
	}
	for i := range m {
		val := v.At(i)
		s.note(&val)
		if !finite(val.G) {
			w.edge(s, i, &val)
			continue
		}
		x := r3.Vec{X: w.x[i], Y: w.y[i], Z: w.z[i]}
		r := r3.Sub(x, w.about)
		if w.q[i] != 0 {
			s.charge(w.q[i], r, &val, w.stiff)
		}
		if w.rho[i] != 0 {
			s.uniform(1, w.rho[i], w.n[i], r, r3.Sub(x, w.centre), &val, w.stiff)
		}
	}
	w.rounded(s)
}

// rounded adds what the rounding of the places of charge does.
func (w *work) rounded(s *sums) {
	s.err.Energy += w.shift * s.size.Force
	s.err.Force += w.shift * w.steep * s.size.Force
	s.err.Torque += w.shift * (s.size.Force + w.steep*s.size.Torque)
	s.err.Stiffness += w.shift * w.steep * s.size.Stiffness
}

// note takes down what a value lacks, and gives it zero instead.
func (s *sums) note(v *field.Value) {
	if math.IsInf(v.ErrG, 1) && finite(v.G) {
		s.mute = true
		v.ErrPhi, v.ErrG, v.ErrGrad = 0, 0, 0
	}
	if v.Phi != v.Phi {
		s.dark = true
		v.Phi, v.ErrPhi = 0, 0
	}
}

// edge leaves out the field at a point on an edge of the other part, and allows for it: the logarithm grows by less than 40 over all
// distances that float64 tells apart.
func (w *work) edge(s *sums, i int, v *field.Value) {
	r := r3.Vec{X: w.x[i], Y: w.y[i], Z: w.z[i]}
	q := math.Abs(w.q[i]) + math.Abs(w.rho[i])*w.reach
	g := 40.0
	if i > 0 {
		g *= r3.Norm(r3.Vec{X: w.values.GX[i-1], Y: w.values.GY[i-1], Z: w.values.GZ[i-1]})
	}
	if !(g < math.Inf(1)) {
		g = 40
	}
	s.err.Force += q * g
	s.err.Torque += q * g * r3.Norm(r3.Sub(r, w.about))
	s.err.Energy += q * math.Abs(v.Phi)
	if w.stiff {
		s.err.Stiffness = math.Inf(1)
	}
}

// placeFace puts the points of a product rule on a face.
func (w *work) placeFace(p *panel, g cubature.Rule, rho float64) int {
	m := 0
	hu, hv := (p.hi[0]-p.lo[0])/2, (p.hi[1]-p.lo[1])/2
	for i, a := range g.X {
		u := p.lo[0] + hu*(1+a)
		if a > 0 {
			u = p.hi[0] - hu*(1-a)
		}
		for j, b := range g.X {
			v := p.lo[1] + hv*(1+b)
			if b > 0 {
				v = p.hi[1] - hv*(1-b)
			}
			x, xu, xv := p.chart.At(u, v)
			area := r3.Cross(xu, xv)
			size := math.Sqrt(r3.Norm2(area))
			var n r3.Vec
			if size > 0 {
				n = r3.Scale(p.face.sign/size, area)
			}
			weight := size * hu * hv * g.W[i] * g.W[j]
			sigma := p.face.sigma
			if p.face.density != nil {
				sigma = p.face.density(x, n)
			}
			if w.push > 0 {
				x = r3.Sub(x, r3.Scale(w.push, n))
			}
			w.x[m], w.y[m], w.z[m], w.n[m] = x.X, x.Y, x.Z, n
			w.q[m], w.rho[m] = sigma*weight, rho*weight
			m++
		}
	}
	return m
}

// placeBlock puts the points of a product rule in a block.
func (w *work) placeBlock(p *panel, g cubature.Rule) int {
	m := 0
	var h [3]float64
	for k := range h {
		h[k] = (p.hi[k] - p.lo[k]) / 2
	}
	at := func(k int, t float64) float64 { return p.lo[k] + h[k]*(1+t) }
	for i, a := range g.X {
		for j, b := range g.X {
			for l, c := range g.X {
				x, xu, xv, xw := p.solid.At(at(0, a), at(1, b), at(2, c))
				det := r3.Dot(r3.Cross(xu, xv), xw)
				w.x[m], w.y[m], w.z[m] = x.X, x.Y, x.Z
				w.q[m], w.rho[m] = 0, 0
				if det != 0 {
					w.q[m] = p.dense(x) * det * h[0] * h[1] * h[2] * g.W[i] * g.W[j] * g.W[l]
				}
				m++
			}
		}
	}
	return m
}

// roughest returns the direction in which the highest Legendre coefficients of the integrand are largest, from the points of the
// last rule.
func (w *work) roughest(p *panel, n int) int {
	g := cubature.Legendre(n)
	top, next := legendreTop(g)
	stride := [3]int{n, 1, 0}
	if p.dim == 3 {
		stride = [3]int{n * n, n, 1}
	}
	total := n * n
	if p.dim == 3 {
		total *= n
	}
	best, most := 0, -1.0
	for k := range p.dim {
		sum := 0.0
		for at := range total {
			if at/stride[k]%n != 0 {
				continue
			}
			var a, b [3]float64
			for i := range n {
				j := at + i*stride[k]
				f := w.scalar(j)
				wt := g.W[i]
				for c, x := range f {
					a[c] += wt * top[i] * x
					b[c] += wt * next[i] * x
				}
			}
			for c := range a {
				sum += math.Abs(a[c]) + math.Abs(b[c])
			}
		}
		if sum > most {
			best, most = k, sum
		}
	}
	return best
}

// scalar returns what the roughness is judged by at node j: the field, without weights.
func (w *work) scalar(j int) [3]float64 {
	v := w.values
	if w.stiff {
		return [3]float64{nanZero(v.Grad[0][j]), nanZero(v.Grad[1][j]), nanZero(v.Grad[3][j])}
	}
	return [3]float64{nanZero(v.GX[j]), nanZero(v.GY[j]), nanZero(v.GZ[j])}
}

func nanZero(x float64) float64 {
	if x != x {
		return 0
	}
	return x
}

// legendreTop returns the values of the two highest Legendre polynomials that an n-point rule tells from lower ones.
func legendreTop(g cubature.Rule) (top, next [mostRule]float64) {
	for i, x := range g.X {
		p, q := 1.0, x
		for k := 2; k < len(g.X); k++ {
			p, q = q, (float64(2*k-1)*x*q-float64(k-1)*p)/float64(k)
		}
		top[i], next[i] = q, p
	}
	return top, next
}

// mostRule is the greatest number of points a direction.
const mostRule = 14
