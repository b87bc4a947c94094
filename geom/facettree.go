package geom

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// branch is a node of a tree of boxes that is kept in the order of a walk: what is below it follows it, up to skip.
type branch struct {
	box        r3.Box // holds all faces below
	skip       int    // the next node beside it
	first, end int    // the faces of a leaf; none at a fork
}

// walk is how far a walk over the tree has come.
type walk struct{ at, face, end int }

// next returns the next face that the point may touch or its ray may meet, nil after the last.
func (p *facets) next(w *walk, q *probe) *facet {
	for {
		for w.face < w.end {
			f := &p.faces[w.face]
			w.face++
			if !q.misses(&f.box) {
				return f
			}
		}
		if w.at >= len(p.tree) {
			return nil
		}
		n := &p.tree[w.at]
		if q.misses(&n.box) {
			w.at = n.skip
			continue
		}
		w.at++
		w.face, w.end = n.first, n.end
	}
}

// leafSize is how many faces a leaf holds at most: measured, 4 to 16 make no difference.
const leafSize = 8

// grow appends the tree of the faces lo <= k < hi and puts these in order.
func (p *facets) grow(lo, hi int) {
	n := branch{box: nothing()}
	for k := lo; k < hi; k++ {
		b := &p.faces[k].box
		n.box = include(include(n.box, b.Min), b.Max)
	}
	at := len(p.tree)
	if hi-lo <= leafSize {
		n.first, n.end = lo, hi
		n.skip = at + 1
		p.tree = append(p.tree, n)
		return
	}
	p.tree = append(p.tree, n)
	middle := p.divide(lo, hi)
	p.grow(lo, middle)
	p.grow(middle, hi)
	p.tree[at].skip = len(p.tree)
}

// divide orders the faces lo <= k < hi into those before and after the middle of the range of their centres, across the
// ray in the direction in which they spread most, and returns the place of the first after it. Where that separates
// nothing, it returns the half.
func (p *facets) divide(lo, hi int) int {
	x1, x2, y1, y2 := math.Inf(1), math.Inf(-1), math.Inf(1), math.Inf(-1)
	for k := lo; k < hi; k++ {
		x, y := p.faces[k].centre()
		x1, x2, y1, y2 = min(x1, x), max(x2, x), min(y1, y), max(y2, y)
	}
	alongX := x2-x1 >= y2-y1
	cut := y1 + (y2-y1)/2
	if alongX {
		cut = x1 + (x2-x1)/2
	}
	middle := lo
	for k := lo; k < hi; k++ {
		x, y := p.faces[k].centre()
		if alongX && x < cut || !alongX && y < cut {
			p.faces[k], p.faces[middle] = p.faces[middle], p.faces[k]
			middle++
		}
	}
	if middle == lo || middle == hi {
		return lo + (hi-lo)/2
	}
	return middle
}

// centre returns the middle of the shadow of a face.
func (f *facet) centre() (x, y float64) {
	return f.box.Min.X + (f.box.Max.X-f.box.Min.X)/2, f.box.Min.Y + (f.box.Max.Y-f.box.Min.Y)/2
}
