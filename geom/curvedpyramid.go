package geom

import "gonum.org/v1/gonum/spatial/r3"

// CurvedPyramid is the cell between a point and a face. It counts as negative where the normal of the face points to the
// apex, so that those from one point to all faces of a body fill the body.
type CurvedPyramid struct {
	Apex r3.Vec
	Base Face
}

// Volume returns the signed volume, by quadrature.
func (p CurvedPyramid) Volume() float64 {
	v := 0.0
	p.Nodes(12, func(_ r3.Vec, weight float64) { v += weight })
	return v
}

// Nodes visits the points of the rule of the face drawn to the apex. The Jacobian takes two degrees, hence one point more
// in that direction; the height over the apex takes one on the face, hence one point more there.
func (p CurvedPyramid) Nodes(n int, visit func(x r3.Vec, weight float64)) {
	n = max(n, 1) + 1
	rule := legendre(n, 0, 1)
	p.Base.Surface.Nodes(n, func(b, normal r3.Vec, weight float64) {
		ray := r3.Sub(b, p.Apex)
		h := r3.Dot(ray, normal) * p.Base.Sign()
		for _, s := range rule {
			visit(r3.Add(p.Apex, r3.Scale(s.x, ray)), h*weight*s.x*s.x*s.w)
		}
	})
}

// Blocks returns the parts over the charts of the face, nil if it has none. Where the cell is negative they are left-handed, so
// that the determinant of the derivatives counts them as negative.
func (p CurvedPyramid) Blocks() []Block {
	base, ok := p.Base.Surface.(Charted)
	if !ok {
		return nil
	}
	charts := base.Charts()
	blocks := make([]Block, len(charts))
	for k, c := range charts {
		if p.Base.Inward {
			c = reversed{c}
		}
		blocks[k] = coneBlock{p.Apex, c}
	}
	return blocks
}
