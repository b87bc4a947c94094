package geom

import (
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Box is a cuboid centred at the origin with edges along the axes. Faces: -x +x -y +y -z +z.
type Box struct {
	Size r3.Vec // lengths of the edges
}

// Check refuses edges that are not positive lengths.
func (b Box) Check() error {
	return first(
		checkLength("box size x", b.Size.X),
		checkLength("box size y", b.Size.Y),
		checkLength("box size z", b.Size.Z),
	)
}

// Bounds returns the box itself.
func (b Box) Bounds() r3.Box {
	half := r3.Scale(0.5, b.Size)
	return r3.Box{Min: r3.Scale(-1, half), Max: half}
}

// Volume returns the product of the edges.
func (b Box) Volume() float64 { return b.Size.X * b.Size.Y * b.Size.Z }

// Centroid returns the origin.
func (b Box) Centroid() r3.Vec { return r3.Vec{} }

// SecondMoment returns V/12 times the squares of the edges on the diagonal.
func (b Box) SecondMoment() [3][3]float64 {
	return diagonal(b.Volume()/12, b.Size)
}

// diagonal returns the matrix with the diagonal f v v.
func diagonal(f float64, v r3.Vec) (m [3][3]float64) {
	m[0][0], m[1][1], m[2][2] = f*v.X*v.X, f*v.Y*v.Y, f*v.Z*v.Z
	return m
}

// Locate tells where x lies.
func (b Box) Locate(x pair.Vec, slack float64) Place {
	bounds, v := b.Bounds(), x.Value()
	tol := OnTolerance(bounds, v, slack)
	if beyond(bounds, v, tol) {
		return outside()
	}
	half := bounds.Max
	region, axis := meet([3]float64{above(x.X, half.X), above(x.Y, half.Y), above(x.Z, half.Z)}, tol)
	switch {
	case region == Outside:
		return outside()
	case region == Inside:
		return inside()
	case axis < 0:
		return onEdge()
	}
	component := [3]float64{v.X, v.Y, v.Z}[axis]
	var n [3]float64
	face := 2 * axis
	n[axis] = -1
	if component > 0 {
		face++
		n[axis] = 1
	}
	return Place{Region: On, Face: face, Normal: r3.Vec{X: n[0], Y: n[1], Z: n[2]}}
}

// boxFaces lists the corners of each face, counter-clockwise seen from outside; bit 0 of a corner is +x, bit 1 +y,
// bit 2 +z.
var boxFaces = [6]struct {
	name    string
	corners [4]int
}{
	{"-x", [4]int{0, 4, 6, 2}}, {"+x", [4]int{1, 3, 7, 5}},
	{"-y", [4]int{0, 1, 5, 4}}, {"+y", [4]int{2, 6, 7, 3}},
	{"-z", [4]int{0, 2, 3, 1}}, {"+z", [4]int{4, 5, 7, 6}},
}

// Polyhedron returns the box as a polyhedron; its half edges are exact.
func (b Box) Polyhedron() Polyhedron {
	half := r3.Scale(0.5, b.Size)
	p := Polyhedron{Vertices: make([]r3.Vec, 8), Loops: make([][]int, 6)}
	for i := range p.Vertices {
		v := r3.Scale(-1, half)
		if i&1 != 0 {
			v.X = half.X
		}
		if i&2 != 0 {
			v.Y = half.Y
		}
		if i&4 != 0 {
			v.Z = half.Z
		}
		p.Vertices[i] = v
	}
	for f, face := range boxFaces {
		p.Loops[f] = append([]int(nil), face.corners[:]...)
	}
	return p
}

// Faces returns the six rectangles.
func (b Box) Faces() []Face {
	faces := b.Polyhedron().Faces()
	for f := range faces {
		faces[f].Name = boxFaces[f].name
	}
	return faces
}

// Cells returns the box itself.
func (b Box) Cells() []Cell { return []Cell{b} }

// Nodes visits the points of the product Gauss rule, exact for degree 2n-1 in each coordinate.
func (b Box) Nodes(n int, visit func(x r3.Vec, weight float64)) {
	half := r3.Scale(0.5, b.Size)
	xs, ys, zs := legendre(n, -half.X, half.X), legendre(n, -half.Y, half.Y), legendre(n, -half.Z, half.Z)
	for _, x := range xs {
		for _, y := range ys {
			for _, z := range zs {
				visit(r3.Vec{X: x.x, Y: y.x, Z: z.x}, x.w*y.w*z.w)
			}
		}
	}
}
