package geom

import (
	"fmt"
	"math"
	"slices"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// checkContacts refuses faces that cross or touch beyond their common vertices and edges. Faces are taken in the order
// of their lowest x, so that only those whose bounds meet are compared.
func (p Polyhedron) checkContacts() error {
	tol := grain * largest(p.Vertices)
	boxes := make([]r3.Box, len(p.Loops))
	order := make([]int, len(p.Loops))
	for f := range boxes {
		boxes[f] = p.face(f).bounds()
		order[f] = f
	}
	slices.SortStableFunc(order, func(f, g int) int {
		switch {
		case boxes[f].Min.X < boxes[g].Min.X:
			return -1
		case boxes[f].Min.X > boxes[g].Min.X:
			return 1
		}
		return 0
	})
	for i, f := range order {
		for _, g := range order[i+1:] {
			if boxes[g].Min.X > boxes[f].Max.X+tol {
				break
			}
			if separate(boxes[f], boxes[g], tol) {
				continue
			}
			if what := p.contact(min(f, g), max(f, g), tol); what != "" {
				return fmt.Errorf("geom: polyhedron faces %d and %d cross or touch (%s); move them apart, or cut the body into parts that only touch", min(f, g), max(f, g), what)
			}
		}
	}
	return nil
}

// contact says where the faces f and g meet other than in vertices and edges that they share, "" if nowhere.
func (p Polyhedron) contact(f, g int, tol float64) string {
	a, b := p.face(f), p.face(g)
	for i := range a.len() {
		e, _ := edgeOf(a.label(i), a.label(i+1))
		for j := range b.len() {
			h, _ := edgeOf(b.label(j), b.label(j+1))
			if e[0] == h[0] || e[0] == h[1] || e[1] == h[0] || e[1] == h[1] {
				continue
			}
			if !separate(a.edgeBounds(i), b.edgeBounds(j), tol) && segmentsApart(a.at(i), a.at(i+1), b.at(j), b.at(j+1)) <= tol {
				return fmt.Sprintf("edges %d-%d and %d-%d meet", a.label(i), a.label(i+1), b.label(j), b.label(j+1))
			}
		}
	}
	if what := a.onto(b, g, tol); what != "" {
		return what
	}
	return b.onto(a, f, tol)
}

// onto says where a vertex or an edge of l, not shared with the face b, meets it. number is that of b.
func (l loop) onto(b loop, number int, tol float64) string {
	n, box := l.len(), b.bounds()
	shared := make([]int, n) // place in b of the vertex, -1 if it is not one
	for k := range shared {
		shared[k] = slices.Index(b.index, l.label(k))
		if shared[k] >= 0 || b.clear(l.value(k), tol) {
			continue
		}
		if c, _ := b.touch(l.at(k), tol); c != apart {
			return fmt.Sprintf("vertex %d is on face %d", l.label(k), number)
		}
	}
	for k := range n {
		i, j := shared[k], shared[(k+1)%n]
		switch {
		case i < 0 && j < 0 && !separate(l.edgeBounds(k), box, tol) && b.pierced(l.at(k), l.at(k+1)):
			return fmt.Sprintf("edge %d-%d goes through face %d", l.label(k), l.label(k+1), number)
		case i < 0 || j < 0:
			continue
		}
		if d := (j - i + b.len()) % b.len(); d != 1 && d != b.len()-1 {
			middle := l.at(k).Add(l.at(k + 1)).Scale(pair.Of(0.5))
			if c, _ := b.touch(middle, tol); c != apart {
				return fmt.Sprintf("edge %d-%d is on face %d", l.label(k), l.label(k+1), number)
			}
		}
	}
	return ""
}

// pierced reports whether the segment from x to y goes through the face.
func (l loop) pierced(x, y pair.Vec) bool {
	n, mean := l.area(), l.mean()
	hx, hy := n.Dot(x.Sub(mean)), n.Dot(y.Sub(mean))
	if hx.Sign()*hy.Sign() >= 0 {
		return false
	}
	at := x.Add(y.Sub(x).Scale(hx.Div(hx.Sub(hy))))
	axis := steepest(n.Value())
	return l.covers(drop(at, axis), axis)
}

// segmentsApart returns the distance between the lines of the segments ab and cd where both feet are on the segments,
// +Inf elsewhere: there the nearest points include an end, which is measured against the face.
func segmentsApart(a, b, c, d pair.Vec) float64 {
	p, q, w := b.Sub(a), d.Sub(c), a.Sub(c)
	pp, qq, pq := p.Dot(p), q.Dot(q), p.Dot(q)
	pw, qw := p.Dot(w), q.Dot(w)
	det := pp.Mul(qq).Sub(pq.Mul(pq))
	if !(det.Value() > 0x1p-90*pp.Hi*qq.Hi) {
		return math.Inf(1) // parallel
	}
	s := pq.Mul(qw).Sub(qq.Mul(pw)).Div(det)
	t := pp.Mul(qw).Sub(pq.Mul(pw)).Div(det)
	if !(s.Hi >= 0 && s.Hi <= 1 && t.Hi >= 0 && t.Hi <= 1) {
		return math.Inf(1)
	}
	return w.Add(p.Scale(s)).Sub(q.Scale(t)).Norm().Value()
}
