package geom

import (
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Placed is a body in an outer frame.
type Placed struct {
	Body Body
	Pose Pose
}

// At places a body. Placing a placed body joins the poses.
func At(body Body, pose Pose) Placed {
	if p, ok := body.(Placed); ok {
		return Placed{p.Body, p.Pose.Then(pose)}
	}
	return Placed{body, pose}
}

// Check checks the body.
func (p Placed) Check() error { return p.Body.Check() }

// Bounds returns a box along the outer axes.
func (p Placed) Bounds() r3.Box { return PosedBox(p.Body.Bounds(), p.Pose) }

// Volume returns the volume of the body.
func (p Placed) Volume() float64 { return p.Body.Volume() }

// Centroid returns the centre of volume in the outer frame.
func (p Placed) Centroid() r3.Vec { return p.Pose.point(p.Body.Centroid()) }

// SecondMoment returns R M R^T, with M that of the body and R the rotation.
func (p Placed) SecondMoment() [3][3]float64 {
	m := p.Body.SecondMoment()
	if !p.Pose.turned {
		return m
	}
	r := p.Pose.Matrix()
	var t [3][3]float64
	for i := range t {
		for j := range t {
			for k := range m {
				for l := range m {
					t[i][j] += r[i][k] * m[k][l] * r[j][l]
				}
			}
		}
	}
	return t
}

// Locate tells where a point of the outer frame lies. The tolerance grows by the rounding of its coordinates.
func (p Placed) Locate(x pair.Vec, slack float64) Place {
	return p.Pose.turnNormal(p.Body.Locate(p.Pose.ToLocal(x), slack+p.Pose.slack(x)))
}

// Faces returns the faces in the outer frame.
func (p Placed) Faces() []Face {
	faces := p.Body.Faces()
	moved := make([]Face, len(faces))
	for i, f := range faces {
		moved[i] = Face{Name: f.Name, Surface: PlacedSurface{f.Surface, p.Pose}, Inward: f.Inward}
	}
	return moved
}

// Cells returns the cells in the outer frame.
func (p Placed) Cells() []Cell {
	cells := p.Body.Cells()
	moved := make([]Cell, len(cells))
	for i, c := range cells {
		moved[i] = PlacedCell{c, p.Pose}
	}
	return moved
}

// PlacedSheet is a sheet in an outer frame.
type PlacedSheet struct {
	Sheet Sheet
	Pose  Pose
}

// SheetAt places a sheet. Placing a placed sheet joins the poses.
func SheetAt(sheet Sheet, pose Pose) PlacedSheet {
	if p, ok := sheet.(PlacedSheet); ok {
		return PlacedSheet{p.Sheet, p.Pose.Then(pose)}
	}
	return PlacedSheet{sheet, pose}
}

// Check checks the sheet.
func (p PlacedSheet) Check() error { return p.Sheet.Check() }

// Area returns the area of the sheet.
func (p PlacedSheet) Area() float64 { return p.Sheet.Area() }

// Bounds returns a box along the outer axes.
func (p PlacedSheet) Bounds() r3.Box { return PosedBox(p.Sheet.Bounds(), p.Pose) }

// Centroid returns the centre of area in the outer frame.
func (p PlacedSheet) Centroid() r3.Vec { return p.Pose.point(p.Sheet.Centroid()) }

// Locate tells whether a point of the outer frame lies on the sheet. The tolerance grows by the rounding of its
// coordinates.
func (p PlacedSheet) Locate(x pair.Vec, slack float64) Place {
	return p.Pose.turnNormal(p.Sheet.Locate(p.Pose.ToLocal(x), slack+p.Pose.slack(x)))
}

// Nodes visits the nodes of the sheet in the outer frame.
func (p PlacedSheet) Nodes(n int, visit func(x, normal r3.Vec, weight float64)) {
	PlacedSurface{p.Sheet, p.Pose}.Nodes(n, visit)
}

// PlacedSurface is a surface in an outer frame.
type PlacedSurface struct {
	Surface Surface
	Pose    Pose
}

// Area returns the area of the surface.
func (p PlacedSurface) Area() float64 { return p.Surface.Area() }

// Bounds returns a box along the outer axes.
func (p PlacedSurface) Bounds() r3.Box { return PosedBox(p.Surface.Bounds(), p.Pose) }

// Nodes visits the nodes of the surface in the outer frame.
func (p PlacedSurface) Nodes(n int, visit func(x, normal r3.Vec, weight float64)) {
	m, d := p.Pose.Matrix(), p.Pose.shift.Value()
	p.Surface.Nodes(n, func(x, normal r3.Vec, weight float64) {
		visit(r3.Add(times(m, x), d), times(m, normal), weight)
	})
}

// PlacedCell is a cell in an outer frame.
type PlacedCell struct {
	Cell Cell
	Pose Pose
}

// Volume returns the volume of the cell.
func (p PlacedCell) Volume() float64 { return p.Cell.Volume() }

// Nodes visits the nodes of the cell in the outer frame.
func (p PlacedCell) Nodes(n int, visit func(x r3.Vec, weight float64)) {
	m, d := p.Pose.Matrix(), p.Pose.shift.Value()
	p.Cell.Nodes(n, func(x r3.Vec, weight float64) { visit(r3.Add(times(m, x), d), weight) })
}

// times returns m v.
func times(m [3][3]float64, v r3.Vec) r3.Vec {
	return r3.Vec{
		X: m[0][0]*v.X + m[0][1]*v.Y + m[0][2]*v.Z,
		Y: m[1][0]*v.X + m[1][1]*v.Y + m[1][2]*v.Z,
		Z: m[2][0]*v.X + m[2][1]*v.Y + m[2][2]*v.Z,
	}
}

// point returns a point of the frame in the outer frame.
func (p Pose) point(x r3.Vec) r3.Vec { return p.ToOuter(pair.VecOf(x)).Value() }

// slack returns what rounding the outer coordinates of x amounts to.
func (p Pose) slack(x pair.Vec) float64 {
	return 4 * 0x1p-53 * (r3.Norm(x.Value()) + r3.Norm(p.shift.Value()))
}

// turnNormal returns the place with its normal in the outer frame.
func (p Pose) turnNormal(at Place) Place {
	at.Normal = p.VectorToOuter(at.Normal)
	return at
}
