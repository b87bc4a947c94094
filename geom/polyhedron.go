package geom

import (
	"strconv"

	"gonum.org/v1/gonum/spatial/r3"
)

// Polyhedron is a body with plane faces, convex or not, with or without cavities. Faces: 0 1 2 ...
type Polyhedron struct {
	Vertices []r3.Vec
	Low      []r3.Vec // what rounding left out of the vertices, for polyhedra made by a computation; nil for none
	Loops    [][]int  // the vertex numbers from 0, counter-clockwise seen from outside; plane, without holes
}

// face returns the loop of face f.
func (p Polyhedron) face(f int) loop { return loop{p.Vertices, p.Low, p.Loops[f]} }

// Bounds returns the smallest box along the axes.
func (p Polyhedron) Bounds() r3.Box { return loop{vertices: p.Vertices, low: p.Low}.bounds() }

// Polyhedron returns p.
func (p Polyhedron) Polyhedron() Polyhedron { return p }

// Faces returns the faces as polygons.
func (p Polyhedron) Faces() []Face {
	faces := make([]Face, len(p.Loops))
	for f := range faces {
		faces[f] = Face{Name: strconv.Itoa(f), Surface: p.polygon(f)}
	}
	return faces
}

// polygon returns face f as a polygon of its own.
func (p Polyhedron) polygon(f int) Polygon {
	q := Polygon{Vertices: make([]r3.Vec, len(p.Loops[f]))}
	for k, i := range p.Loops[f] {
		q.Vertices[k] = p.Vertices[i]
	}
	for _, i := range p.Loops[f] {
		if len(p.Low) == 0 || p.Low[i] == (r3.Vec{}) {
			continue
		}
		q.Low = make([]r3.Vec, len(p.Loops[f]))
		for k, j := range p.Loops[f] {
			q.Low[k] = p.Low[j]
		}
		break
	}
	return q
}

// Cells returns the pyramids from the centroid to the faces.
func (p Polyhedron) Cells() []Cell {
	apex := p.Centroid()
	cells := make([]Cell, len(p.Loops))
	for f := range cells {
		cells[f] = Pyramid{Apex: apex, Base: p.polygon(f)}
	}
	return cells
}
