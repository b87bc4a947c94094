package response

import (
	"math"

	"example.com/boundpole/geom/panel"
	"gonum.org/v1/gonum/spatial/r3"
)

// rows computes rows of the operator K' of a mesh.
//
// Row i holds the weights by which the charge per unit of s and t at the nodes gives the normal component at node i,
//
//	(K' sigma)(x) = PV int sigma(y) n(x).(x - y)/(4 pi |x - y|^3) dA(y),
//
// the density on every tile being the polynomial through its nodes: [Kress2014] chapter 6 for the operator, [Bremer2012] for
// the charge per parameter as unknown, which stays smooth where the density itself grows without bound.
type rows struct {
	walker
	tiles  []*tile
	mesh   *mesh
	x, n   r3.Vec
	dst    []float64 // the part of the row that belongs to the tile at hand
	kernel [points * points]float64
	half   [points * maxOrder]float64
	room   [2]table
	base   [3][maxOrder]float64
}

func newRows(tiles []*tile, m *mesh, inner *rule) *rows {
	w := &rows{tiles: tiles, mesh: m}
	w.walker.inner = inner
	w.walker.visit = w.take
	for k := range w.room {
		w.room[k] = make(table, points*maxOrder)
	}
	return w
}

// row fills dst with row i.
func (w *rows) row(dst []float64, i int) {
	m := w.mesh
	w.x, w.n = m.x[i], m.n[i]
	own := m.tileOf(i)
	nodes := m.order * m.order
	reach := far(m.order)
	home := w.tiles[own]
	clear(dst)
	for k, t := range w.tiles {
		if home.Plane && t.body == home.body && t.Face == home.Face {
			continue // n.(x - y) is zero
		}
		w.dst = dst[k*nodes : (k+1)*nodes]
		switch {
		case k == own:
			w.own(t, i-own*nodes)
		case distance(w.x, t.centre) > reach*t.radius:
			for j := range w.dst {
				w.dst[j] = m.weight[k*nodes+j] * w.normal(m.x[k*nodes+j])
			}
		default:
			w.walk(t.Panel, &t.whole, w.x, 0)
		}
	}
}

// normal returns n.(x - y)/(4 pi |x - y|^3).
func (w *rows) normal(y r3.Vec) float64 {
	dx, dy, dz := w.x.X-y.X, w.x.Y-y.Y, w.x.Z-y.Z
	r2 := dx*dx + dy*dy + dz*dz
	return over4Pi * (w.n.X*dx + w.n.Y*dy + w.n.Z*dz) / (r2 * math.Sqrt(r2))
}

const over4Pi = 0.25 / math.Pi

// take adds what a piece does: sum over its points a, b of weight x kernel x polynomials.
func (w *rows) take(q *piece, x []r3.Vec) {
	n := w.mesh.order
	size := (q.s.to - q.s.from) * (q.t.to - q.t.from)
	g := w.inner.w
	for b := range points {
		for a := range points {
			w.kernel[b*points+a] = size * g[a] * g[b] * w.normal(x[b*points+a])
		}
	}
	ts := w.mesh.tables.on(q.s, w.room[0])
	tt := w.mesh.tables.on(q.t, w.room[1])
	for b := range points {
		row := w.half[b*n : b*n+n]
		clear(row)
		for a := range points {
			add(row, w.kernel[b*points+a], ts[a*n:a*n+n])
		}
	}
	for b := range points {
		row := w.half[b*n : b*n+n]
		for j, v := range tt[b*n : b*n+n] {
			add(w.dst[j*n:j*n+n], v, row)
		}
	}
}

// own adds what a curved tile does to its own node: four rectangles with a corner at the node, each cut so that what touches
// the node is about square, and that square integrated by [Duffy1982], which removes the 1/R of the kernel.
func (w *rows) own(t *tile, node int) {
	m := w.mesh
	r := m.tables.rule.x
	s0, t0 := r[node%m.order], r[node/m.order]
	_, xs, xt := t.At(s0, t0)
	ls, lt := r3.Norm(xs), r3.Norm(xt)
	for corner := range 4 {
		ds, dt := 1-s0, 1-t0
		if corner%2 != 0 {
			ds = -s0
		}
		if corner/2 != 0 {
			dt = -t0
		}
		side := min(math.Abs(ds)*ls, math.Abs(dt)*lt)
		hs, ht := math.Copysign(side/ls, ds), math.Copysign(side/lt, dt)
		w.corner(t.Panel, s0, t0, hs, ht)
		if rest := ds - hs; math.Abs(rest) > 1e-12 {
			w.rectangle(t.Panel, s0+hs, s0+ds, t0, t0+dt)
		}
		if rest := dt - ht; math.Abs(rest) > 1e-12 {
			w.rectangle(t.Panel, s0, s0+ds, t0+ht, t0+dt)
		}
	}
}

// rectangle adds a rectangle that does not touch the node.
func (w *rows) rectangle(p *panel.Panel, s1, s2, t1, t2 float64) {
	var q piece
	q.shape(p, span{level: -1, from: min(s1, s2), to: max(s1, s2)}, span{level: -1, from: min(t1, t2), to: max(t1, t2)})
	w.walk(p, &q, w.x, 0)
}

// corner adds the rectangle from (s, t) to (s + hs, t + ht), as two triangles with their tip at the node: on the first t runs
// from 0 to the share of s, on the second s to that of t.
func (w *rows) corner(p *panel.Panel, s, t, hs, ht float64) {
	n := w.mesh.order
	g, r := w.inner, w.mesh.tables.rule
	area := math.Abs(hs * ht)
	one, two, sum := w.base[0][:n], w.base[1][:n], w.base[2][:n]
	for a, rho := range g.x {
		f := area * rho * g.w[a]
		r.basis(one, s+rho*hs)
		clear(sum)
		for b, tau := range g.x {
			at := t + rho*tau*ht
			r.basis(two, at)
			add(sum, f*g.w[b]*w.normal(p.Point(s+rho*hs, at)), two)
		}
		for j, v := range sum {
			add(w.dst[j*n:j*n+n], v, one)
		}
		r.basis(one, t+rho*ht)
		clear(sum)
		for b, tau := range g.x {
			at := s + rho*tau*hs
			r.basis(two, at)
			add(sum, f*g.w[b]*w.normal(p.Point(at, t+rho*ht)), two)
		}
		for j, v := range one {
			add(w.dst[j*n:j*n+n], v, sum)
		}
	}
}

// add adds f b to a.
func add(a []float64, f float64, b []float64) {
	for i, v := range b {
		a[i] += f * v
	}
}
