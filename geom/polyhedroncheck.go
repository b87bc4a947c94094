package geom

import (
	"fmt"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Check refuses what does not bound a body: vertex numbers out of range, faces that are not plane and simple, edges
// that do not join exactly two faces of one orientation, faces that cross or touch beyond their common edges and
// vertices, and surfaces listed clockwise seen from outside. The message names the faces, edges or vertices.
//
// Several closed surfaces may form one polyhedron, side by side or as cavities. The time is that of comparing the faces
// whose bounds meet.
func (p Polyhedron) Check() error {
	if len(p.Loops) < 4 {
		return fmt.Errorf("geom: polyhedron has %d faces; a body has at least 4", len(p.Loops))
	}
	if err := checkPoints("polyhedron", p.Vertices, p.Low); err != nil {
		return err
	}
	for _, check := range []func() error{p.checkNumbers, p.checkVertices, p.checkEdges, p.checkFaces, p.checkContacts, p.checkOrientation} {
		if err := check(); err != nil {
			return err
		}
	}
	return nil
}

// checkNumbers refuses faces with too few vertices, with numbers out of range or with a number twice.
func (p Polyhedron) checkNumbers() error {
	last := make([]int, len(p.Vertices)) // 1 + the face that used the vertex last
	for f, face := range p.Loops {
		if len(face) < 3 {
			return fmt.Errorf("geom: polyhedron face %d has %d vertices; give at least 3", f, len(face))
		}
		for _, i := range face {
			if i < 0 || i >= len(p.Vertices) {
				return fmt.Errorf("geom: polyhedron face %d names vertex %d; vertices are numbered 0 to %d", f, i, len(p.Vertices)-1)
			}
			if last[i] == f+1 {
				return fmt.Errorf("geom: polyhedron face %d visits vertex %d twice; a face with a hole or a bridge must be cut into faces without", f, i)
			}
			last[i] = f + 1
		}
	}
	for i, f := range last {
		if f == 0 {
			return fmt.Errorf("geom: polyhedron vertex %d belongs to no face; remove it", i)
		}
	}
	return nil
}

// checkVertices refuses vertices that coincide.
func (p Polyhedron) checkVertices() error {
	seen := make(map[pair.Vec]int, len(p.Vertices))
	all := loop{vertices: p.Vertices, low: p.Low}
	for i := range p.Vertices {
		v := all.at(i)
		if j, ok := seen[v]; ok {
			return fmt.Errorf("geom: polyhedron vertices %d and %d coincide; give the vertex once and use its number in all faces", j, i)
		}
		seen[v] = i
	}
	return nil
}

// edge is a pair of vertex numbers, the lower first.
type edge [2]int

// edgeOf returns the edge between two vertices, and whether it was given from the lower to the higher number.
func edgeOf(i, j int) (e edge, rising bool) {
	if i < j {
		return edge{i, j}, true
	}
	return edge{j, i}, false
}

// edgeFaces are the faces at an edge: how many, and of the first two which and in which direction they run along it.
type edgeFaces struct {
	count  int
	face   [2]int
	rising [2]bool
}

// edges returns the faces at every edge.
func (p Polyhedron) edges() map[edge]edgeFaces {
	edges := make(map[edge]edgeFaces, 2*len(p.Loops))
	for f, face := range p.Loops {
		for k, i := range face {
			e, rising := edgeOf(i, face[(k+1)%len(face)])
			use := edges[e]
			if use.count < 2 {
				use.face[use.count], use.rising[use.count] = f, rising
			}
			use.count++
			edges[e] = use
		}
	}
	return edges
}

// checkEdges refuses edges that do not join two faces running along it in opposite directions.
func (p Polyhedron) checkEdges() error {
	edges := p.edges()
	for f, face := range p.Loops {
		for k, i := range face {
			j := face[(k+1)%len(face)]
			e, _ := edgeOf(i, j)
			switch use := edges[e]; {
			case use.count == 1:
				return fmt.Errorf("geom: polyhedron edge %d-%d belongs to face %d only, so the surface is open; add the face on its other side", i, j, f)
			case use.count > 2:
				return fmt.Errorf("geom: polyhedron edge %d-%d belongs to %d faces, first to %d and %d; an edge joins exactly two, so give bodies that touch there as parts of their own", i, j, use.count, use.face[0], use.face[1])
			case use.rising[0] == use.rising[1]:
				return fmt.Errorf("geom: polyhedron faces %d and %d both run from vertex %d to %d; reverse one of them", use.face[0], use.face[1], i, j)
			}
		}
	}
	return nil
}

// checkFaces refuses faces that are not plane simple polygons.
func (p Polyhedron) checkFaces() error {
	for f := range p.Loops {
		if err := p.face(f).check(fmt.Sprintf("polyhedron face %d", f)); err != nil {
			return err
		}
	}
	return nil
}

// checkOrientation refuses closed surfaces that enclose nothing or are listed in the wrong sense: one inside an odd
// number of others is a cavity and must face into itself.
func (p Polyhedron) checkOrientation() error {
	shells := p.shells()
	for s, shell := range shells {
		depth := 0
		for t, other := range shells {
			if t != s && p.holds(other, shell) {
				depth++
			}
		}
		b := shell.Bounds()
		size := r3.Norm(r3.Sub(b.Max, b.Min))
		volume := shell.Volume()
		face := fmt.Sprintf("the closed surface of %d faces", len(shell.Loops))
		if len(shells) == 1 {
			face = "the surface"
		}
		switch f := p.firstFace(shell); {
		case !(volume > grain*size*size*size) && !(volume < -grain*size*size*size):
			return fmt.Errorf("geom: polyhedron encloses no volume (%v) with %s that begins with face %d; give it thickness", volume, face, f)
		case volume < 0 && depth%2 == 0:
			return fmt.Errorf("geom: polyhedron faces are listed clockwise seen from outside (volume %v) in %s that begins with face %d; reverse them", volume, face, f)
		case volume > 0 && depth%2 == 1:
			return fmt.Errorf("geom: polyhedron cavity bounded by %s that begins with face %d is listed like an outer surface; reverse its faces", face, f)
		}
	}
	return nil
}

// firstFace returns the number in p of the first face of a shell.
func (p Polyhedron) firstFace(shell Polyhedron) int {
	for f, face := range p.Loops {
		if &face[0] == &shell.Loops[0][0] {
			return f
		}
	}
	return -1
}

// holds reports whether the shell a has the shell b inside.
func (p Polyhedron) holds(a, b Polyhedron) bool {
	of := make(map[int]bool)
	for _, face := range a.Loops {
		for _, i := range face {
			of[i] = true
		}
	}
	for _, face := range b.Loops {
		for _, i := range face {
			if !of[i] {
				return a.encloses(loop{vertices: p.Vertices, low: p.Low}.at(i))
			}
		}
	}
	return false
}

// shells returns the closed surfaces, faces joined by edges, in the order of their first faces.
func (p Polyhedron) shells() []Polyhedron {
	root := make([]int, len(p.Loops))
	for f := range root {
		root[f] = f
	}
	find := func(f int) int {
		for root[f] != f {
			root[f] = root[root[f]]
			f = root[f]
		}
		return f
	}
	for _, use := range p.edges() {
		a, b := find(use.face[0]), find(use.face[1])
		root[max(a, b)] = min(a, b)
	}
	var shells []Polyhedron
	at := make(map[int]int)
	for f, face := range p.Loops {
		r := find(f)
		s, ok := at[r]
		if !ok {
			s = len(shells)
			at[r] = s
			shells = append(shells, Polyhedron{Vertices: p.Vertices, Low: p.Low})
		}
		shells[s].Loops = append(shells[s].Loops, face)
	}
	return shells
}
