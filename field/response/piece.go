package response

import (
	"math"

	"example.com/boundpole/geom/panel"
	"gonum.org/v1/gonum/spatial/r3"
)

// apart is the largest ratio of the length of a piece to its distance from a point, at which the rule on the piece is used.
const apart = 1 / 0.7

// kept is how many times a panel is halved into pieces whose points are kept.
const kept = 6

// deepest is how many times a panel is halved at most: a point is then 1e-12 of its length away.
const deepest = 80

// piece is a rectangle of parameters of a panel.
type piece struct {
	s, t    span
	samples [9]r3.Vec // points of a grid of 3 x 3
	length  float64   // of the longer middle or outer line
	along   int8      // which parameter to halve: that of the longer line
	x       []r3.Vec  // the points of the rule, nil if not kept
	halves  *[2]piece // nil if not kept
	number  int       // among the kept pieces of all panels
}

// shape fills samples and lengths of the piece over two spans.
func (q *piece) shape(p *panel.Panel, s, t span) {
	q.s, q.t, q.x, q.halves, q.number = s, t, nil, nil, -1
	for j := range 3 {
		for i := range 3 {
			q.samples[3*j+i] = p.Point(s.from+float64(i)/2*(s.to-s.from), t.from+float64(j)/2*(t.to-t.from))
		}
	}
	var l [2]float64
	for k := range 3 {
		a, b := q.samples[3*k:3*k+3], [3]r3.Vec{q.samples[k], q.samples[k+3], q.samples[k+6]}
		l[0] = max(l[0], distance(a[0], a[1])+distance(a[1], a[2]))
		l[1] = max(l[1], distance(b[0], b[1])+distance(b[1], b[2]))
	}
	q.length, q.along = l[0], 0
	if l[1] > l[0] {
		q.length, q.along = l[1], 1
	}
}

// spans returns the spans of the two halves.
func (q *piece) spans() (s, t [2]span) {
	s, t = [2]span{q.s, q.s}, [2]span{q.t, q.t}
	if q.along == 0 {
		s = q.s.halves()
	} else {
		t = q.t.halves()
	}
	return s, t
}

// place fills dst with the points of the rule on the piece, s running fastest.
func (q *piece) place(dst []r3.Vec, p *panel.Panel, inner *rule) {
	for b, t := range inner.x {
		for a, s := range inner.x {
			dst[b*points+a] = p.Point(q.s.from+s*(q.s.to-q.s.from), q.t.from+t*(q.t.to-q.t.from))
		}
	}
}

// keep fills the piece and its halves down to a depth, and numbers them from next on.
func (q *piece) keep(p *panel.Panel, inner *rule, depth int, next *int) {
	q.number = *next
	*next++
	q.x = make([]r3.Vec, points*points)
	q.place(q.x, p, inner)
	if depth == 0 {
		return
	}
	q.halves = new([2]piece)
	s, t := q.spans()
	for k := range q.halves {
		q.halves[k].shape(p, s[k], t[k])
		q.halves[k].keep(p, inner, depth-1, next)
	}
}

// distance returns |a - b|, of lengths that do not over- or underflow.
func distance(a, b r3.Vec) float64 {
	x, y, z := a.X-b.X, a.Y-b.Y, a.Z-b.Z
	return math.Sqrt(x*x + y*y + z*z)
}

// fits reports whether the rule on the piece is good at x.
func (q *piece) fits(x r3.Vec) bool {
	limit := q.length / apart
	limit *= limit
	for k := range q.samples {
		y := &q.samples[k]
		dx, dy, dz := y.X-x.X, y.Y-x.Y, y.Z-x.Z
		if dx*dx+dy*dy+dz*dz < limit {
			return false
		}
	}
	return true
}

// walk visits pieces that fit x and together make up the piece q. The pieces that are not kept live on the stack of w.
func (w *walker) walk(p *panel.Panel, q *piece, x r3.Vec, depth int) {
	if depth >= deepest || q.fits(x) {
		at := q.x
		if at == nil {
			at = w.x[:]
			q.place(at, p, w.inner)
		}
		w.visit(q, at)
		return
	}
	if q.halves != nil {
		w.walk(p, &q.halves[0], x, depth+1)
		w.walk(p, &q.halves[1], x, depth+1)
		return
	}
	s, t := q.spans()
	half := &w.stack[depth]
	for k := range s {
		half.shape(p, s[k], t[k])
		w.walk(p, half, x, depth+1)
	}
}

// walker goes through the pieces of panels near a point.
type walker struct {
	inner *rule
	visit func(q *piece, x []r3.Vec)
	x     [points * points]r3.Vec
	stack [deepest + 1]piece
}
