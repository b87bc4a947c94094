package geom

import (
	"math"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// loop is a closed run of vertices held in pairs: a polygon, or a face of a polyhedron.
type loop struct {
	vertices, low []r3.Vec
	index         []int // of the vertices, in order; nil for all of them
}

func (l loop) len() int {
	if l.index == nil {
		return len(l.vertices)
	}
	return len(l.index)
}

// label returns the number of the k-th vertex in the caller's list; k may run one turn too far.
func (l loop) label(k int) int {
	if n := l.len(); k >= n {
		k -= n
	}
	if l.index == nil {
		return k
	}
	return l.index[k]
}

// value returns the k-th vertex rounded; k may run one turn too far.
func (l loop) value(k int) r3.Vec { return l.vertices[l.label(k)] }

// at returns the k-th vertex; k may run one turn too far.
func (l loop) at(k int) pair.Vec {
	i := l.label(k)
	if len(l.low) == 0 {
		return pair.VecOf(l.vertices[i])
	}
	return pair.WithLow(l.vertices[i], l.low[i])
}

// area returns the vector area: the unit normal by the right-hand rule times the area.
func (l loop) area() pair.Vec {
	var sum pair.Vec
	if l.len() < 3 {
		return sum
	}
	v0 := l.at(0)
	a := l.at(1).Sub(v0)
	for k := 2; k < l.len(); k++ {
		b := l.at(k).Sub(v0)
		sum = sum.Add(a.Cross(b))
		a = b
	}
	return sum.Scale(pair.Of(0.5))
}

// mean returns the mean of the vertices.
func (l loop) mean() pair.Vec {
	var sum pair.Vec
	for k := range l.len() {
		sum = sum.Add(l.at(k))
	}
	return sum.Scale(pair.Of(1).Div(pair.Of(float64(l.len()))))
}

// bounds returns the smallest box along the axes that contains the vertices.
func (l loop) bounds() r3.Box {
	b := l.plainBounds()
	if len(l.low) == 0 {
		return b
	}
	for k := range l.len() {
		i := l.label(k)
		b = include(b, rounded(l.vertices[i], l.low[i]))
	}
	return b
}

// plainBounds returns the bounds of the vertices without their low parts. It is written out because Locate asks it of
// every face.
func (l loop) plainBounds() r3.Box {
	b := nothing()
	x1, y1, z1, x2, y2, z2 := b.Min.X, b.Min.Y, b.Min.Z, b.Max.X, b.Max.Y, b.Max.Z
	for k := range l.len() {
		v := &l.vertices[l.label(k)]
		x1, y1, z1 = min(x1, v.X), min(y1, v.Y), min(z1, v.Z)
		x2, y2, z2 = max(x2, v.X), max(y2, v.Y), max(z2, v.Z)
	}
	return r3.Box{Min: r3.Vec{X: x1, Y: y1, Z: z1}, Max: r3.Vec{X: x2, Y: y2, Z: z2}}
}

// nothing returns the bounds of no point.
func nothing() r3.Box {
	inf := math.Inf(1)
	return r3.Box{Min: r3.Vec{X: inf, Y: inf, Z: inf}, Max: r3.Vec{X: -inf, Y: -inf, Z: -inf}}
}

// include returns the smallest box that contains b and v.
func include(b r3.Box, v r3.Vec) r3.Box {
	return r3.Box{
		Min: r3.Vec{X: min(b.Min.X, v.X), Y: min(b.Min.Y, v.Y), Z: min(b.Min.Z, v.Z)},
		Max: r3.Vec{X: max(b.Max.X, v.X), Y: max(b.Max.Y, v.Y), Z: max(b.Max.Z, v.Z)},
	}
}

// rounded returns the number beyond v on the side of its low part, component by component.
func rounded(v, low r3.Vec) r3.Vec {
	return r3.Vec{X: away(v.X, low.X), Y: away(v.Y, low.Y), Z: away(v.Z, low.Z)}
}

// away returns the next float64 from v in the direction of low, v itself if low is zero.
func away(v, low float64) float64 {
	if low == 0 {
		return v
	}
	return math.Nextafter(v, math.Copysign(math.Inf(1), low))
}

// flat is a point of a plane.
type flat struct{ u, v pair.Float }

// drop returns the two coordinates of x that remain without the axis, in cyclic order.
func drop(x pair.Vec, axis int) flat {
	switch axis {
	case 0:
		return flat{x.Y, x.Z}
	case 1:
		return flat{x.Z, x.X}
	}
	return flat{x.X, x.Y}
}

// steepest returns the axis with the greatest component of n.
func steepest(n r3.Vec) int {
	x, y, z := math.Abs(n.X), math.Abs(n.Y), math.Abs(n.Z)
	switch {
	case x >= y && x >= z:
		return 0
	case y >= z:
		return 1
	}
	return 2
}

// turn returns +1 if a, b, c run counter-clockwise, -1 if clockwise, 0 if they are on one line.
func turn(a, b, c flat) int {
	return b.u.Sub(a.u).Mul(c.v.Sub(a.v)).Sub(b.v.Sub(a.v).Mul(c.u.Sub(a.u))).Sign()
}
