package geom

import "gonum.org/v1/gonum/spatial/r3"

// Cells returns the triangular prisms over the triangles of the base.
func (p Prism) Cells() []Cell {
	cuts := p.triangles()
	cells := make([]Cell, len(cuts))
	for i, t := range cuts {
		q := p
		q.Base = [][2]float64{p.Base[t[0]], p.Base[t[1]], p.Base[t[2]]}
		cells[i] = q
	}
	return cells
}

// triangles cuts the base into triangles.
func (p Prism) triangles() [][3]int {
	base := make([]r3.Vec, len(p.Base))
	for k, b := range p.Base {
		base[k] = r3.Vec{X: b[0], Y: b[1]}
	}
	return triangles(loop{vertices: base})
}

// Nodes visits the points of collapsed Gauss rules over the triangles of the base, with Gauss points from end to end.
// All weights are positive.
//
// The height of the prism over a point of the base is linear and takes one degree.
func (p Prism) Nodes(n int, visit func(x r3.Vec, weight float64)) {
	n = max(n, 1)
	upright := legendre(n, 0, 1)
	for _, t := range p.triangles() {
		a, b, c := p.Base[t[0]], p.Base[t[1]], p.Base[t[2]]
		double := (b[0]-a[0])*(c[1]-a[1]) - (b[1]-a[1])*(c[0]-a[0])
		if double < 0 {
			double = -double
		}
		visitTriangle(n+1, flatVec(a), flatVec(b), flatVec(c), func(x r3.Vec, weight float64) {
			at := [2]float64{x.X, x.Y}
			bottom := p.end(-1, p.BottomSlope, at)
			height := p.end(1, p.TopSlope, at).Sub(bottom).Value()
			for _, z := range upright {
				visit(r3.Vec{X: x.X, Y: x.Y, Z: bottom.Value() + z.x*height}, double*weight*height*z.w)
			}
		})
	}
}

func flatVec(b [2]float64) r3.Vec { return r3.Vec{X: b[0], Y: b[1]} }
