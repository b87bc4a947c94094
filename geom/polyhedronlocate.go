package geom

import (
	"math"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Locate tells where x lies. The time is that of all planes; who asks often asks LocatorOf(p).
//
// A point within tolerance of a face or its rim is on it. Any other point is told by a ray that counts the faces it
// meets. The ray runs along a fixed direction that is no direction of a drawing, and which edge it passes on which side
// is decided once an edge, so that neighbouring faces never both count it or both miss it.
func (p Polyhedron) Locate(x pair.Vec, slack float64) Place {
	bounds, v := p.Bounds(), x.Value()
	tol := OnTolerance(bounds, v, slack)
	if beyond(bounds, v, tol) {
		return outside()
	}
	if place := p.locateOn(x, tol); place.Region == On {
		return place
	}
	if p.encloses(x) {
		return inside()
	}
	return outside()
}

// alike is the difference of unit normals below which faces that meet count as one plane: the edge between them is a
// seam of the drawing, not of the body. It is the planarity that Check asks of a face.
const alike = planarity

// locateOn returns the place of a point on the surface, outside if it is on no face.
func (p Polyhedron) locateOn(x pair.Vec, tol float64) Place {
	place := outside()
	v := x.Value()
	for f := range p.Loops {
		l := p.face(f)
		if l.clear(v, tol) {
			continue
		}
		c, n := l.touch(x, tol)
		if c == apart {
			continue
		}
		normal := n.Value()
		switch {
		case place.Region != On:
			place = Place{Region: On, Face: f, Normal: normal}
		case r3.Norm(r3.Sub(normal, place.Normal)) > alike:
			return onEdge()
		case c == within:
			place.Face = f
		}
	}
	return place
}

// clear reports whether v is beyond doubt farther than tol from the face: outside its bounds, or far from its plane in
// plain arithmetic.
func (l loop) clear(v r3.Vec, tol float64) bool {
	b := l.plainBounds()
	if beyond(b, v, 2*tol) { // 2 tol: low parts are below one
		return true
	}
	size := r3.Norm(r3.Sub(b.Max, b.Min))
	v0 := l.value(0)
	var area r3.Vec
	a := r3.Sub(l.value(1), v0)
	for k := 2; k < l.len(); k++ {
		c := r3.Sub(l.value(k), v0)
		area = r3.Add(area, r3.Cross(a, c))
		a = c
	}
	h := r3.Dot(area, r3.Sub(v, v0))
	// The vertices are off the plane by at most planarity size, and rounding of area, h and v is far below that.
	return math.Abs(h) > r3.Norm(area)*(2*tol)+4*planarity*size*size*size
}

// The ray runs along (-slantX, -slantY, 1), so that x + slantX z and y + slantY z are constant on it.
const (
	slantX = 0.3819660112501051
	slantY = 0.2763932022500210
)

// shadow returns the point where the ray through x meets the plane z = 0.
func shadow(x pair.Vec) flat {
	return flat{x.X.Add(x.Z.Scale(slantX)), x.Y.Add(x.Z.Scale(slantY))}
}

// encloses reports whether a point that is on no face is inside.
func (p Polyhedron) encloses(x pair.Vec) bool {
	in := false
	at, v := shadow(x), x.Value()
	margin := grain * (largest(p.Vertices) + r3.Norm(v)) // far above the rounding of a plain shadow
	for f := range p.Loops {
		l := p.face(f)
		if !l.missed(v, margin) && l.hides(x, at, v) {
			in = !in
		}
	}
	return in
}

// missed reports whether the ray from v passes the face beyond doubt, by shadows in plain arithmetic.
func (l loop) missed(v r3.Vec, margin float64) bool {
	left, right, front, back, below := true, true, true, true, true
	for k := range l.len() {
		w := &l.vertices[l.label(k)]
		rise := w.Z - v.Z
		x, y := w.X-v.X+slantX*rise, w.Y-v.Y+slantY*rise
		left, right = left && x < -margin, right && x > margin
		front, back = front && y < -margin, back && y > margin
		below = below && rise < -margin
	}
	return left || right || front || back || below
}

// hides reports whether the ray from x, whose shadow is at, meets the face.
func (l loop) hides(x pair.Vec, at flat, v r3.Vec) bool {
	low, high := math.Inf(1), math.Inf(-1)
	in := false
	last := l.len() - 1
	a := shadow(l.at(last))
	for k := range l.len() {
		b := shadow(l.at(k))
		z := l.value(k).Z
		low, high = min(low, z), max(high, z)
		if up := at.v.Less(b.v); up != at.v.Less(a.v) && passesLeft(a, b, at, up, l.label(last) < l.label(k)) {
			in = !in
		}
		a, last = b, k
	}
	switch {
	case !in || v.Z > high: // a face met within the rounding of z has the point on it, see locateOn
		return false
	case v.Z < low:
		return true
	}
	n := l.area()
	height := n.Dot(x.Sub(l.mean()))
	return height.Sign() == -rise(n).Sign()
}

// rise returns the component of n along the ray.
func rise(n pair.Vec) pair.Float { return n.Z.Sub(n.X.Scale(slantX)).Sub(n.Y.Scale(slantY)) }

// passesLeft reports whether p is left of the edge from a to b taken upwards. It is computed in the direction of rising
// vertex numbers, so that both faces of the edge get the same answer, also for a point exactly on it.
func passesLeft(a, b, p flat, up, rising bool) bool {
	if !rising {
		a, b, up = b, a, !up
	}
	return (turn(a, b, p) > 0) == up
}
