// Package geom says where a part is: solid bodies, thin sheets, their oriented faces, their inner cells, and poses.
//
// Units: lengths are in one unit of the caller's choice. Frames are right-handed; a body stands in its own frame and At
// places it. Normals of a body point outward. Bodies are plain structs without constructors; Check says whether the
// numbers describe a body, and bound.Of calls it; the other methods expect a body that passes. Values are immutable
// once in use and safe for concurrent use. Lengths are between 1e-60 and 1e60 units.
//
// Positions are taken as pairs of float64 (package pair), so that a point is told inside from outside exactly.
//
// The package knows no charge, no field and no files.
package geom

import (
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Region tells where a point lies with respect to a body.
type Region int

// The regions.
const (
	Outside Region = iota
	On
	Inside
)

// Place is where a point lies: the region and, for a point on the surface, which face it is on.
type Place struct {
	Region Region
	Face   int    // index into Faces of the face the point is on, -1 if on none or on an edge
	Normal r3.Vec // outward unit normal of that face at the point
	Edge   bool   // the point is on an edge, rim, vertex or tip: several normals, and Normal is zero
}

// OnTolerance returns the distance below which x counts as lying on a face: slack + 4 u (|x| + |c| + size), u = 2^-53,
// with c the centre and size the half diagonal of the bounds. The slack is what the rounding of the coordinates
// outside the frame amounts to (see field.Points); it is zero for a point given in the frame itself.
func OnTolerance(bounds r3.Box, x r3.Vec, slack float64) float64 {
	e := extentOf(bounds)
	return e.tolerance(x, slack)
}

// Body is a solid part in its own frame.
type Body interface {
	// Check returns an error that names what is wrong with the numbers, the value and the remedy.
	Check() error
	// Bounds returns a box that contains the body.
	Bounds() r3.Box
	// Volume returns the volume. Units: length^3.
	Volume() float64
	// Centroid returns the centre of volume.
	Centroid() r3.Vec
	// SecondMoment returns the integral of (r - c)(r - c)^T over the volume, c the centroid. Units: length^5.
	SecondMoment() [3][3]float64
	// Locate tells where x lies; slack widens what counts as on the surface, see OnTolerance.
	Locate(x pair.Vec, slack float64) Place
	// Faces returns the oriented faces that bound the body, in the order that the documentation of the type names.
	Faces() []Face
	// Cells returns inner cells that fill the body.
	Cells() []Cell
}

// Face is a named, oriented piece of a boundary, or a whole sheet.
type Face struct {
	Name    string
	Surface Surface
	Inward  bool // the outward normal of the body is the reverse of Surface's own normal
}

// Sign returns +1 where the surface's own normal is the outward one, else -1.
func (f Face) Sign() float64 {
	if f.Inward {
		return -1
	}
	return 1
}

// Surface is a piece of surface with a normal of its own: Polygon, Disc, Annulus, Sector, Wall, WallSector, ConeWall,
// SphereSurface, EllipsoidSurface, TorusSurface, Patch, or a caller's.
type Surface interface {
	// Area returns the area. Units: length^2.
	Area() float64
	// Bounds returns a box that contains the surface.
	Bounds() r3.Box
	// Nodes visits the points of a quadrature rule with the surface's own unit normal and the weight (area). With n
	// points a direction it integrates polynomials of degree 2n-2 in x, and one factor n of the normal beside them,
	// exactly up to rounding on flat and cylindrical surfaces and on spheres.
	Nodes(n int, visit func(x, normal r3.Vec, weight float64))
}

// Cell is a piece of volume.
type Cell interface {
	// Volume returns the volume. Units: length^3.
	Volume() float64
	// Nodes visits the points of a quadrature rule exact for polynomials of degree 2n-2. Weights are volumes and may be
	// negative in cells that are not convex; points may then lie outside the cell.
	Nodes(n int, visit func(x r3.Vec, weight float64))
}

// Sheet is a thin charged part in its own frame: Polygon, Disc, Annulus.
type Sheet interface {
	Surface
	Check() error
	Centroid() r3.Vec
	// Locate tells whether x lies on the sheet (On, with Edge on its rim) or off it (Outside).
	Locate(x pair.Vec, slack float64) Place
}

// Flat is a body all of whose faces are plane.
type Flat interface {
	Body
	// Polyhedron returns the body as a polyhedron whose faces have the order of Faces.
	Polyhedron() Polyhedron
}
