package cubature

import (
	"math"
	"sync"

	"gonum.org/v1/gonum/spatial/r3"
)

// fan is a rectangle of parameters seen from an apex in it: four triangles whose rays from the apex give area |h| s ds dtau,
// which cancels 1/R. Along the outer side of a triangle tau runs through a sinh map about the foot of the apex in the metric of
// the apex, so that rays stand densely where they are short.
type fan struct {
	lo, hi        [2]float64 // sides minus apex
	guu, guv, gvv float64    // metric at the apex
	area          float64    // sqrt(guu gvv - guv^2), taken without cancellation
	reach         float64    // distance of the target from the apex
}

// level is a pair of densities of points: points a piece, and length of a piece in tenths.
type level struct {
	n      int
	tenths int
	more   int // pieces added where there are several
}

// levels are tried in turn: each is two rules that share no point and, in more than one piece, no split.
var levels = [...][2]level{
	{{10, 18, 0}, {13, 16, 1}},
	{{15, 18, 0}, {19, 16, 1}},
	{{20, 16, 0}, {24, 14, 1}},
	{{27, 14, 0}, {31, 12, 1}},
	{{36, 12, 0}, {40, 11, 1}},
}

// rays visits rays with their direction in parameters, weight and metric length.
func (f *fan) rays(l level, visit func(eu, ev, weight, length float64)) {
	g := legendre(l.n)
	for _, h := range [2]float64{f.lo[0], f.hi[0]} {
		if h != 0 {
			f.side(g, l, h, f.lo[1], f.hi[1], f.guu, f.guv, f.gvv, func(tau, w, length float64) { visit(h, tau, w, length) })
		}
	}
	for _, h := range [2]float64{f.lo[1], f.hi[1]} {
		if h != 0 {
			f.side(g, l, h, f.lo[0], f.hi[0], f.gvv, f.guv, f.guu, func(tau, w, length float64) { visit(tau, h, w, length) })
		}
	}
}

// side visits the rays to the side at parameter distance h, with tau from t0 to t1.
func (f *fan) side(g *gauss, l level, h, t0, t1, ghh, ght, gtt float64, visit func(tau, w, length float64)) {
	if !(t1 > t0) {
		return
	}
	gt := math.Sqrt(gtt)
	height, middle := math.Sqrt(ghh)*math.Abs(h), 0.0
	if gt > 0 {
		height, middle = f.area/gt*math.Abs(h), -ght/gtt*h
	}
	near := math.Hypot(height, f.reach)
	if gt*(t1-t0) < 0.05*near || near == 0 {
		for i, x := range g.X {
			tau := t0 + (t1-t0)*(0.5*(1+x))
			visit(tau, math.Abs(h)*g.W[i]*(t1-t0)/2, math.Hypot(height, gt*(tau-middle)))
		}
		return
	}
	m0, m1 := math.Asinh(gt*(t0-middle)/near), math.Asinh(gt*(t1-middle)/near)
	pieces := int(math.Ceil((m1 - m0) * 10 / float64(l.tenths)))
	if pieces > 1 {
		pieces += l.more
	}
	half := (m1 - m0) / float64(2*pieces)
	for k := range pieces {
		for i, x := range g.X {
			s, c := sinhCosh(m0 + half*(float64(2*k+1)+x))
			s, c = near*s, near*c
			visit(middle+s/gt, math.Abs(h)*g.W[i]*half*c/gt, math.Hypot(height, s))
		}
	}
}

// sinhCosh returns both with small relative errors.
func sinhCosh(x float64) (s, c float64) {
	if math.Abs(x) < 0.5 {
		s = math.Sinh(x)
		return s, math.Sqrt(1 + s*s)
	}
	e := math.Exp(x)
	return (e - 1/e) / 2, (e + 1/e) / 2
}

// work is the working memory of one evaluation.
type work struct {
	caches [2 * len(levels)]pieceCache
	solid  [2 * len(solidLevels)]solidCaches
	feet   []placedFoot
	rims   []rim
	inner  []innerFoot
	v      [3 * MostPoints]float64 // rates of the ray at the points of a piece
	q      [MostPoints]float64     // and charges
	areas  [MostPoints]r3.Vec
	nodes  int // evaluations so far
}

// pieces returns the cache of the tables of a level.
func (w *work) pieces(k, which int) *pieceCache { return &w.caches[2*k+which] }

var works = sync.Pool{New: func() any {
	w := new(work)
	for k := range levels {
		for i, l := range levels[k] {
			w.caches[2*k+i].n, w.caches[2*k+i].tenths = l.n, l.tenths
		}
	}
	for k := range solidLevels {
		for i, l := range solidLevels[k] {
			w.solid[2*k+i].set(l)
		}
	}
	return w
}}
