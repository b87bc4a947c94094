package geom

import (
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Pyramid is the cell between a point and a polygon. It counts as negative where the polygon's normal points to the
// apex, so that the pyramids from one point to all faces of a body fill the body.
type Pyramid struct {
	Apex r3.Vec
	Base Polygon
}

// height returns the signed height of the pyramid.
func (p Pyramid) height() float64 {
	l := p.Base.loop()
	return l.area().Unit().Dot(l.mean().Sub(pair.VecOf(p.Apex))).Value()
}

// Volume returns the signed volume.
func (p Pyramid) Volume() float64 { return p.height() * p.Base.Area() / 3 }

// Nodes visits the points of the rule of the base drawn to the apex. The Jacobian takes two degrees, hence one point
// more in that direction.
func (p Pyramid) Nodes(n int, visit func(x r3.Vec, weight float64)) {
	h := p.height()
	rule := legendre(max(n, 1)+1, 0, 1)
	p.Base.Nodes(n, func(b, _ r3.Vec, weight float64) {
		ray := r3.Sub(b, p.Apex)
		for _, s := range rule {
			visit(r3.Add(p.Apex, r3.Scale(s.x, ray)), h*weight*s.x*s.x*s.w)
		}
	})
}
