package geom

import (
	"math"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// contact is how a point touches a loop.
type contact int

const (
	apart contact = iota
	within
	atRim
)

// plane is that of a loop: the unit normal and the mean of the vertices.
type plane struct{ normal, mean pair.Vec }

// plane returns the plane of the loop.
func (l loop) plane() plane { return plane{l.area().Unit(), l.mean()} }

// touch tells whether x is within tol of the flat face that the loop bounds, and whether of its rim. It also returns
// the unit normal. tol is at least 4 u (|x| + |vertex|) for every vertex.
func (l loop) touch(x pair.Vec, tol float64) (c contact, normal pair.Vec) {
	p := l.plane()
	return l.touchIn(p, x, tol), p.normal
}

// touchIn is touch for a loop whose plane is known.
func (l loop) touchIn(p plane, x pair.Vec, tol float64) contact {
	v := x.Value()
	for k := range l.len() {
		near, sure := l.nearEdge(k, v, tol)
		if near || !sure && apartFrom(l.at(k), l.at(k+1), x) <= tol {
			return atRim
		}
	}
	height := p.normal.Dot(x.Sub(p.mean))
	if math.Abs(height.Hi) > tol {
		return apart
	}
	normal := p.normal.Value()
	axis := steepest(normal)
	in, sure := l.coversPlain(r3.Sub(v, r3.Scale(height.Hi, normal)), axis, 3*tol)
	if !sure {
		in = l.covers(drop(x.Sub(p.normal.Scale(height)), axis), axis)
	}
	if in {
		return within
	}
	return apart
}

// nearEdge reports whether v is within tol of the k-th edge, in plain arithmetic; sure is false where rounding could
// decide. It is sure outside the bounds of the edge; within tol/4 of an end, where low parts and the difference cost less
// than 2 u (|x| + |vertex|) <= tol/2; and far from the line, where low parts, differences and products cost less than
// 9 u (|x| + |vertex|) < 3 tol.
func (l loop) nearEdge(k int, v r3.Vec, tol float64) (near, sure bool) {
	if beyond(l.edgeBounds(k), v, 2*tol) { // 2 tol: the bounds know no low parts
		return false, true
	}
	a, b := l.value(k), l.value(k+1)
	d, e, g := r3.Sub(v, a), r3.Sub(b, a), r3.Sub(v, b)
	if min(r3.Dot(d, d), r3.Dot(g, g)) < tol*tol/16 {
		return true, true
	}
	c := r3.Cross(e, d)
	return false, r3.Dot(c, c) > 16*tol*tol*r3.Dot(e, e)
}

// covers reports whether the projection of the loop along the axis has p inside; on its boundary either.
func (l loop) covers(p flat, axis int) bool {
	in := false
	a := drop(l.at(l.len()-1), axis)
	for k := range l.len() {
		b := drop(l.at(k), axis)
		if up := p.v.Less(b.v); up != p.v.Less(a.v) && (turn(a, b, p) > 0) == up {
			in = !in
		}
		a = b
	}
	return in
}

// coversPlain is covers in plain arithmetic; sure is false where rounding could decide. The margin is at least
// 12 u (|x| + |vertex|) for every vertex: low parts, the foot and the difference cost less than 3 u (|x| + |vertex|).
func (l loop) coversPlain(x r3.Vec, axis int, margin float64) (in, sure bool) {
	d := r3.Sub(l.value(l.len()-1), x)
	ax, ay := dropPlain(d, axis)
	for k := range l.len() {
		bx, by := dropPlain(r3.Sub(l.value(k), x), axis)
		c, sure := crosses(ax, ay, bx, by, margin)
		if !sure {
			return false, false
		}
		in = in != c
		ax, ay = bx, by
	}
	return in, true
}

// crosses reports whether the edge from a to b crosses the line from the origin along +x, in plain arithmetic; sure is
// false where rounding could decide.
//
// Let each coordinate err by less than 0.3 margin and be at most margin/(8 u). The cross product a.X b.Y - a.Y b.X then
// errs by 0.3 margin (|a|_1 + |b|_1) + 0.09 margin^2, and its own rounding adds 2 u (|a.X b.Y| + |a.Y b.X|), at most
// 0.25 margin (|a.Y| + |b.Y|). With |a.Y|, |b.Y| > margin the sum is below 0.6 margin (|a|_1 + |b|_1).
func crosses(ax, ay, bx, by, margin float64) (yes, sure bool) {
	if math.Abs(ay) <= margin || math.Abs(by) <= margin {
		return false, false
	}
	up := by > 0
	if up == (ay > 0) {
		return false, true
	}
	cross := ax*by - ay*bx
	if math.Abs(cross) <= margin*(math.Abs(ax)+math.Abs(ay)+math.Abs(bx)+math.Abs(by)) {
		return false, false
	}
	return (cross > 0) == up, true
}

// dropPlain is drop in plain arithmetic.
func dropPlain(x r3.Vec, axis int) (u, v float64) {
	switch axis {
	case 0:
		return x.Y, x.Z
	case 1:
		return x.Z, x.X
	}
	return x.X, x.Y
}

// apartFrom returns the distance of x from the segment ab.
func apartFrom(a, b, x pair.Vec) float64 {
	e, d := b.Sub(a), x.Sub(a)
	t := e.Dot(d).Div(e.Dot(e))
	switch {
	case !(t.Hi > 0): // also a segment without length
		return d.Norm().Value()
	case t.Hi >= 1:
		return x.Sub(b).Norm().Value()
	}
	return d.Sub(e.Scale(t)).Norm().Value()
}
