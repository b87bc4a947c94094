package response

import (
	"math"
	"sync"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// load computes the charges at the points of the kept pieces.
func (r *Response) load() {
	s := r.system
	r.loads = make([][]float64, len(s.levels))
	const n = points * points
	var room [2]table
	for k := range room {
		room[k] = make(table, points*maxOrder)
	}
	for k := range s.levels {
		r.loads[k] = make([]float64, s.pieces*n)
		var fill func(t int, q *piece)
		fill = func(t int, q *piece) {
			r.chargeOn(r.loads[k][q.number*n:(q.number+1)*n], k, t, q, &room)
			if q.halves != nil {
				fill(t, &q.halves[0])
				fill(t, &q.halves[1])
			}
		}
		for t := range s.tiles {
			fill(t, &s.tiles[t].whole)
		}
	}
}

// chargeOn fills dst with the charges of level k at the points of a piece of tile t.
func (r *Response) chargeOn(dst []float64, k, t int, q *piece, room *[2]table) {
	l := &r.system.levels[k]
	n := l.order
	charge := r.layers[k].charge[t*n*n : (t+1)*n*n]
	weight := l.weight[t*n*n : (t+1)*n*n]
	g := r.system.inner.w
	size := (q.s.to - q.s.from) * (q.t.to - q.t.from)
	ts, tt := l.tables.on(q.s, room[0]), l.tables.on(q.t, room[1])
	var half [points * maxOrder]float64 // at point a along s, for node j along t
	for j := range n {
		for a := range points {
			sum := 0.0
			for i, v := range ts[a*n : a*n+n] {
				sum += v * (charge[j*n+i] / weight[j*n+i])
			}
			half[a*n+j] = sum
		}
	}
	for b := range points {
		for a := range points {
			sum := 0.0
			for j, v := range tt[b*n : b*n+n] {
				sum += v * half[a*n+j]
			}
			dst[b*points+a] = size * g[a] * g[b] * sum
		}
	}
}

// probe evaluates the induced charge at one point.
type probe struct {
	walker
	r     *Response
	x     r3.Vec
	tile  int
	grad  bool
	first int // the lowest level wanted
	sums  [3]sum
	room  [2]table
	local [points * points]float64
}

// sum is the field of one level without the factor 1/(4 pi).
type sum struct {
	phi  float64
	g    r3.Vec
	grad [6]float64
}

var probes = sync.Pool{New: func() any {
	w := new(probe)
	w.walker.visit = w.take
	for k := range w.room {
		w.room[k] = make(table, points*maxOrder)
	}
	return w
}}

// at evaluates the layers of one body, or of all for -1, from a level on at x.
func (w *probe) at(r *Response, x r3.Vec, body, first int, grad bool) {
	w.r, w.x, w.first, w.grad, w.inner = r, x, first, grad, r.system.inner
	w.sums = [3]sum{}
	for t, tile := range r.system.tiles {
		if body >= 0 && tile.body != body {
			continue
		}
		w.tile = t
		d := distance(x, tile.centre)
		near := false
		for k := first; k < len(w.sums); k++ {
			l := &r.system.levels[k]
			n := l.order * l.order
			if d > far(l.order)*tile.radius {
				w.add(&w.sums[k], l.x[t*n:(t+1)*n], r.layers[k].charge[t*n:(t+1)*n])
			} else {
				near = true
			}
		}
		if near {
			w.walk(tile.Panel, &tile.whole, x, 0)
		}
	}
}

// take adds the charges of a piece, to the levels that are near.
func (w *probe) take(q *piece, x []r3.Vec) {
	const n = points * points
	tile := w.r.system.tiles[w.tile]
	d := distance(w.x, tile.centre)
	for k := w.first; k < len(w.sums); k++ {
		if d > far(w.r.system.levels[k].order)*tile.radius {
			continue
		}
		charge := w.local[:]
		if q.number >= 0 {
			charge = w.r.loads[k][q.number*n : (q.number+1)*n]
		} else {
			w.r.chargeOn(charge, k, w.tile, q, &w.room)
		}
		w.add(&w.sums[k], x, charge)
	}
}

// add adds point charges.
func (w *probe) add(s *sum, y []r3.Vec, charge []float64) {
	var phi, gx, gy, gz float64
	for i := range y {
		dx, dy, dz := w.x.X-y[i].X, w.x.Y-y[i].Y, w.x.Z-y[i].Z
		inv2 := 1 / (dx*dx + dy*dy + dz*dz)
		p := charge[i] * math.Sqrt(inv2)
		c := p * inv2
		phi += p
		gx += c * dx
		gy += c * dy
		gz += c * dz
		if w.grad {
			e := 3 * c * inv2
			s.grad[0] += c - e*dx*dx
			s.grad[1] += c - e*dy*dy
			s.grad[2] += c - e*dz*dz
			s.grad[3] -= e * dx * dy
			s.grad[4] -= e * dx * dz
			s.grad[5] -= e * dy * dz
		}
	}
	s.phi += phi
	s.g = r3.Add(s.g, r3.Vec{X: gx, Y: gy, Z: gz})
}

// induced returns the value of the induced charge at a point.
func (r *Response) induced(p field.Point, side field.Side, want field.Want) field.Value {
	x := p.X.Value()
	for k := range r.system.bodies {
		size := halfDiagonal(r.system.bounds[k])
		close := 1e-6 * size
		if boxDistance(r.system.bounds[k], x) > close {
			continue
		}
		at := r.system.locators[k].Locate(pair.VecOf(x), close)
		if at.Region == geom.On && !(at.Edge && r.system.locators[k].Locate(p.X, p.Slack).Region != geom.On) {
			return r.hugging(k, p, side, want, at, close)
		}
	}
	return r.plain(x, want)
}

// plain returns the value off all faces.
func (r *Response) plain(x r3.Vec, want field.Want) field.Value {
	w := probes.Get().(*probe)
	defer w.release()
	first := 2
	if want&field.WantErr != 0 {
		first = 0
	}
	if distance(x, r.centre) > remote*r.reach {
		w.remote(r, x, first, want)
	} else {
		w.at(r, x, -1, first, want&field.WantGrad != 0)
	}
	return w.value(want)
}

// release puts the working memory back.
func (w *probe) release() {
	w.r = nil
	probes.Put(w)
}

// remote is the distance, in units of the radius of all bodies, from which they are expanded as a whole, to the order distant:
// (1/3)^31 = 2e-15 is left out.
const (
	remote  = 3
	distant = 30
)

// expand makes the expansions of the three meshes. A charge in the centre makes up for what rounding leaves of the sum.
func (r *Response) expand() {
	b := r.Bounds()
	r.centre = r3.Scale(0.5, r3.Add(b.Min, b.Max))
	r.reach = halfDiagonal(b)
	r.charge = 0
	for _, m := range r.materials {
		r.charge += m.Charge
	}
	for k := range r.layers {
		e := field.NewMoments(r.centre, r.reach, distant)
		net := -r.charge
		for i, q := range r.layers[k].charge {
			e.AddCharge(r.system.levels[k].x[i], q)
			net += q
		}
		e.AddCharge(r.centre, -net)
		if r.charge == 0 {
			e.Neutral()
		}
		r.remote[k] = e
	}
}

// remote evaluates the expansions.
func (w *probe) remote(r *Response, x r3.Vec, first int, want field.Want) {
	w.r, w.x = r, x
	for k := first; k < len(w.sums); k++ {
		v := r.remote[k].Value(field.Point{X: pair.VecOf(x)}, want&^field.WantErr)
		s := &w.sums[k]
		s.phi, s.g = 4*math.Pi*v.Phi, r3.Scale(4*math.Pi, v.G)
		for i, t := range v.Grad {
			s.grad[i] = 4 * math.Pi * t
		}
	}
}

// value makes a value of the sums, with what the meshes differ by as estimate.
func (w *probe) value(want field.Want) field.Value {
	a, b, c := &w.sums[0], &w.sums[1], &w.sums[2]
	v := field.Value{Phi: over4Pi * c.phi, G: r3.Scale(over4Pi, c.g)}
	for k := range v.Grad {
		v.Grad[k] = over4Pi * c.grad[k]
	}
	if want&field.WantErr != 0 {
		trend := &w.r.trend
		v.ErrPhi = over4Pi * trend.left(math.Abs(b.phi-a.phi), math.Abs(c.phi-b.phi))
		v.ErrG = over4Pi * trend.left(r3.Norm(r3.Sub(b.g, a.g)), r3.Norm(r3.Sub(c.g, b.g)))
		v.ErrGrad = over4Pi * trend.left(apartBy(&a.grad, &b.grad), apartBy(&b.grad, &c.grad))
		floor := rounding * w.r.density
		if d := distance(w.x, w.r.centre); d > w.r.reach {
			fall := w.r.reach / d
			if w.r.charge == 0 {
				fall *= fall
			}
			floor *= fall * w.r.reach / d
		}
		v.ErrPhi += rounding*math.Abs(v.Phi) + floor*w.r.size
		v.ErrG += rounding*r3.Norm(v.G) + floor
		v.ErrGrad += rounding*tensorNorm(&v.Grad) + floor/w.r.size
	}
	return v
}

func apartBy(a, b *[6]float64) float64 {
	var d [6]float64
	for k := range d {
		d[k] = b[k] - a[k]
	}
	return tensorNorm(&d)
}

// tensorNorm returns the Frobenius norm of a symmetric tensor.
func tensorNorm(t *[6]float64) float64 {
	return math.Sqrt(t[0]*t[0] + t[1]*t[1] + t[2]*t[2] + 2*(t[3]*t[3]+t[4]*t[4]+t[5]*t[5]))
}

// hugging returns the value at a point within close of a face, or on an edge: that of the same side on the line through the
// point along the normal, from the values at close and twice close.
func (r *Response) hugging(body int, p field.Point, side field.Side, want field.Want, at geom.Place, close float64) field.Value {
	exact := r.system.locators[body].Locate(p.X, p.Slack)
	if exact.Region == geom.On && exact.Edge {
		v := r.plain(r3.Add(p.X.Value(), r3.Scale(close, outwards(r.system.bodies[body], p.X.Value()))), want)
		nowhere := field.Nowhere(field.OnEdge)
		nowhere.Phi, nowhere.ErrPhi = v.Phi, v.ErrPhi+close*r3.Norm(v.G)
		return nowhere
	}
	if at.Edge { // on the face, within close of its edge
		at, close = exact, 1e-3*close
	}
	x := p.X.Value()
	_, depth := geom.Nearest(r.system.bodies[body], x)
	one := func(sign, depth float64) field.Value {
		foot := r3.Sub(x, r3.Scale(sign*depth, at.Normal))
		near := r.plain(r3.Add(foot, r3.Scale(sign*close, at.Normal)), want)
		next := r.plain(r3.Add(foot, r3.Scale(2*sign*close, at.Normal)), want)
		return towards(near, next, (close-depth)/close)
	}
	switch {
	case exact.Region == geom.Outside:
		return one(1, depth)
	case exact.Region == geom.Inside:
		return one(-1, depth)
	case side == field.Outside:
		v := one(1, 0)
		v.Status = field.OnFace
		return v
	case side == field.Inside:
		v := one(-1, 0)
		v.Status = field.OnFace
		return v
	}
	a, b := one(1, 0), one(-1, 0)
	v := towards(a, b, -0.5)
	v.ErrPhi, v.ErrG, v.ErrGrad = (a.ErrPhi+b.ErrPhi)/2, (a.ErrG+b.ErrG)/2, (a.ErrGrad+b.ErrGrad)/2
	v.Status = field.OnFace
	return v
}

// outwards returns a direction away from the middle of a body.
func outwards(body geom.Body, x r3.Vec) r3.Vec {
	b := body.Bounds()
	d := r3.Sub(x, r3.Scale(0.5, r3.Add(b.Min, b.Max)))
	if n := r3.Norm(d); n > 0 {
		return r3.Scale(1/n, d)
	}
	return r3.Vec{X: 1}
}

// towards returns a + t (a - b) with an estimate of what a straight line leaves out.
func towards(a, b field.Value, t float64) field.Value {
	v := field.Value{Phi: a.Phi + t*(a.Phi-b.Phi), G: r3.Add(a.G, r3.Scale(t, r3.Sub(a.G, b.G)))}
	for k := range v.Grad {
		v.Grad[k] = a.Grad[k] + t*(a.Grad[k]-b.Grad[k])
	}
	const curved = 1e-3 // of what the two differ by, 1e-6 of the size apart
	v.ErrPhi = max(a.ErrPhi, b.ErrPhi) + curved*math.Abs(a.Phi-b.Phi)
	v.ErrG = max(a.ErrG, b.ErrG) + curved*r3.Norm(r3.Sub(a.G, b.G))
	v.ErrGrad = max(a.ErrGrad, b.ErrGrad) + apartBy(&a.Grad, &b.Grad)
	return v
}
