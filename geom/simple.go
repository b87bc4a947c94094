package geom

import (
	"fmt"
	"math"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// signedArea returns the area of a plane polygon, positive if it runs counter-clockwise.
func signedArea(points []flat) pair.Float {
	var sum pair.Float
	if len(points) < 3 {
		return sum
	}
	o := points[0]
	for k := 1; k+1 < len(points); k++ {
		a, b := points[k], points[k+1]
		sum = sum.Add(a.u.Sub(o.u).Mul(b.v.Sub(o.v)).Sub(a.v.Sub(o.v).Mul(b.u.Sub(o.u))))
	}
	return sum.Scale(0.5)
}

// check refuses a loop that is not the outline of a plane simple polygon. what names it in messages.
func (l loop) check(what string) error {
	b := l.bounds()
	size := r3.Norm(r3.Sub(b.Max, b.Min))
	if size < shortest {
		return fmt.Errorf("geom: %s is only %v across; choose another unit of length", what, size)
	}
	reach := 0.0 // the greatest coordinate
	for k := range l.len() {
		v := l.value(k)
		reach = max(reach, math.Abs(v.X), math.Abs(v.Y), math.Abs(v.Z))
	}
	tol := grain * reach
	if err := l.checkCorners(what, tol); err != nil {
		return err
	}
	area := l.area()
	if !(area.Norm().Value() > tol*size) {
		return fmt.Errorf("geom: %s encloses no area: its vertices are on one line or its edges cross; give the outline of a simple polygon", what)
	}
	if err := l.checkPlane(what, area.Unit(), planarity*size+roundoff*reach); err != nil {
		return err
	}
	return l.checkCrossings(what, steepest(area.Value()), tol)
}

// checkCorners refuses vertices that coincide and edges that run back over the one before.
func (l loop) checkCorners(what string, tol float64) error {
	n := l.len()
	for k := range n {
		if d := l.at(k + 1).Sub(l.at(k)).Norm().Value(); d <= tol {
			return fmt.Errorf("geom: %s vertices %d and %d coincide (%v apart); give each vertex once", what, l.label(k), l.label(k+1), d)
		}
	}
	for k := range n {
		a, b, c := l.at(k), l.at(k+1), l.at((k+2)%n)
		if apartFrom(a, b, c) <= tol || apartFrom(b, c, a) <= tol {
			return fmt.Errorf("geom: %s turns back on itself at vertex %d; remove the vertex or move it off the line of its neighbours", what, l.label(k+1))
		}
	}
	return nil
}

// A vertex may be off its plane by planarity times the size of the polygon, the distance at which the library tells
// sides apart, plus roundoff times the greatest coordinate: decimals rounded to float64 put a vertex up to sqrt(3) u of
// that off the plane, and the fitted plane as much again.
const (
	planarity = 1e-12
	roundoff  = 4 * 0x1p-53
)

// checkPlane refuses vertices farther than tol from the plane through their mean.
func (l loop) checkPlane(what string, normal pair.Vec, tol float64) error {
	mean := l.mean()
	worst, at := 0.0, 0
	for k := range l.len() {
		if h := math.Abs(normal.Dot(l.at(k).Sub(mean)).Value()); h > worst {
			worst, at = h, l.label(k)
		}
	}
	if worst > tol {
		return fmt.Errorf("geom: %s is not plane: vertex %d is %.3g off the mean plane, more than %.3g; correct it or cut the face into triangles", what, at, worst, tol)
	}
	return nil
}

// checkCrossings refuses edges that are not neighbours and cross or touch, seen along the axis.
func (l loop) checkCrossings(what string, axis int, tol float64) error {
	n := l.len()
	points, boxes := make([]flat, n), make([]r3.Box, n)
	for k := range points {
		points[k] = drop(l.at(k), axis)
		boxes[k] = l.edgeBounds(k)
	}
	for i := range n {
		for j := i + 2; j < n; j++ {
			if i == 0 && j == n-1 || separate(boxes[i], boxes[j], tol) {
				continue
			}
			a, b, c, d := points[i], points[i+1], points[j], points[(j+1)%n]
			cross := turn(a, b, c)*turn(a, b, d) < 0 && turn(c, d, a)*turn(c, d, b) < 0
			if cross || l.edgesTouch(i, j, tol) {
				return fmt.Errorf("geom: %s edges %d-%d and %d-%d cross or touch; give the outline of a simple polygon",
					what, l.label(i), l.label(i+1), l.label(j), l.label(j+1))
			}
		}
	}
	return nil
}

// edgeBounds returns the bounds of the edge from the k-th vertex.
func (l loop) edgeBounds(k int) r3.Box { return include(include(nothing(), l.value(k)), l.value(k+1)) }

// edgesTouch reports whether an end of edge i or j lies on the other.
func (l loop) edgesTouch(i, j int, tol float64) bool {
	a, b, c, d := l.at(i), l.at(i+1), l.at(j), l.at(j+1)
	return apartFrom(a, b, c) <= tol || apartFrom(a, b, d) <= tol || apartFrom(c, d, a) <= tol || apartFrom(c, d, b) <= tol
}

// separate reports whether two boxes are farther apart than tol along an axis.
func separate(a, b r3.Box, tol float64) bool {
	return a.Min.X > b.Max.X+tol || b.Min.X > a.Max.X+tol ||
		a.Min.Y > b.Max.Y+tol || b.Min.Y > a.Max.Y+tol ||
		a.Min.Z > b.Max.Z+tol || b.Min.Z > a.Max.Z+tol
}
