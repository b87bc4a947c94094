package solve

import (
	"math"

	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// meetsOrigin reports whether a body contains or touches the origin of its frame.
func meetsOrigin(body geom.Body) bool { return body.Locate(pair.Vec{}, 0).Region != geom.Outside }

// meetsAxis reports whether a body contains or touches the z axis of its frame.
func meetsAxis(body geom.Body) bool {
	switch b := body.(type) {
	case geom.Tube, geom.Torus:
		return false
	case geom.Arc:
		return b.Inner == 0
	case geom.Flat:
		return facesMeetAxis(b.Polyhedron())
	}
	return true // round about the axis, or about the origin
}

// facesMeetAxis reports whether a face of a polyhedron meets the z axis: the axis is not bounded, so it cannot lie inside
// without leaving through one.
func facesMeetAxis(h geom.Polyhedron) bool {
	size := 0.0
	for _, v := range h.Vertices {
		size = max(size, math.Abs(v.X), math.Abs(v.Y))
	}
	const rounding = 8 * 0x1p-53
	for _, loop := range h.Loops {
		turns := 0.0
		for k, i := range loop {
			a, b := h.Vertices[i], h.Vertices[loop[(k+1)%len(loop)]]
			if fromAxis(a, b) <= rounding*size {
				return true
			}
			turns += math.Atan2(a.X*b.Y-a.Y*b.X, a.X*b.X+a.Y*b.Y)
		}
		if math.Abs(turns) > math.Pi { // a whole turn or none
			return true
		}
	}
	return false
}

// fromAxis returns the distance of the segment from a to b from the z axis, seen along it.
func fromAxis(a, b r3.Vec) float64 {
	dx, dy := b.X-a.X, b.Y-a.Y
	if l := dx*dx + dy*dy; l > 0 {
		t := min(max(-(a.X*dx+a.Y*dy)/l, 0), 1)
		return math.Hypot(a.X+t*dx, a.Y+t*dy)
	}
	return math.Hypot(a.X, a.Y)
}
