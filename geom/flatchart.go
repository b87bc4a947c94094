package geom

import (
	"gonum.org/v1/gonum/spatial/r3"
)

// parallelogram is a chart with the corner a and the edges b along u and c along v.
type parallelogram struct{ a, b, c r3.Vec }

// At returns the point and its derivatives.
func (p parallelogram) At(u, v float64) (x, xu, xv r3.Vec) {
	return r3.Add(p.a, r3.Add(r3.Scale(u, p.b), r3.Scale(v, p.c))), p.b, p.c
}

// triangle is a chart of the triangle a, a + b, a + b + c: u runs from the corner a to the opposite edge, v along that
// edge. The side u = 0 of the square is the corner.
type triangle struct{ a, b, c r3.Vec }

// At returns the point and its derivatives.
func (t triangle) At(u, v float64) (x, xu, xv r3.Vec) {
	ray := r3.Add(t.b, r3.Scale(v, t.c))
	return r3.Add(t.a, r3.Scale(u, ray)), ray, r3.Scale(u, t.c)
}

// Charts returns a parallelogram as one chart, any other polygon as triangles, each with its side u = 0 drawn together
// into a vertex.
func (p Polygon) Charts() []Chart {
	v := p.Vertices
	if p.parallelogram() {
		return []Chart{parallelogram{v[0], r3.Sub(v[1], v[0]), r3.Sub(v[3], v[0])}}
	}
	cuts := triangles(p.loop())
	charts := make([]Chart, len(cuts))
	for k, t := range cuts {
		a, b, c := v[t[0]], v[t[1]], v[t[2]]
		charts[k] = triangle{a, r3.Sub(b, a), r3.Sub(c, b)}
	}
	return charts
}

// boxBlock is the whole box.
type boxBlock struct{ size r3.Vec }

// At returns the point and its derivatives.
func (b boxBlock) At(u, v, w float64) (x, xu, xv, xw r3.Vec) {
	x = stretched(b.size, r3.Vec{X: u - 0.5, Y: v - 0.5, Z: w - 0.5})
	return x, r3.Vec{X: b.size.X}, r3.Vec{Y: b.size.Y}, r3.Vec{Z: b.size.Z}
}

// Blocks returns the box as one block.
func (b Box) Blocks() []Block { return []Block{boxBlock{b.Size}} }

// prismBlock is a triangular prism with sloping ends: u and v are those of the triangle, w runs upwards.
type prismBlock struct {
	base  triangle
	prism Prism
}

// At returns the point and its derivatives.
func (b prismBlock) At(u, v, w float64) (x, xu, xv, xw r3.Vec) {
	x, xu, xv = b.base.At(u, v)
	at := [2]float64{x.X, x.Y}
	bottom := b.prism.end(-1, b.prism.BottomSlope, at)
	height := b.prism.end(1, b.prism.TopSlope, at).Sub(bottom).Value()
	x.Z = bottom.Value() + w*height
	xu.Z, xv.Z = b.rise(xu, w), b.rise(xv, w)
	return x, xu, xv, r3.Vec{Z: height}
}

// rise returns the derivative of the height at the share w along a vector of the base.
func (b prismBlock) rise(d r3.Vec, w float64) float64 {
	low, high := b.prism.BottomSlope, b.prism.TopSlope
	return (1-w)*(low[0]*d.X+low[1]*d.Y) + w*(high[0]*d.X+high[1]*d.Y)
}

// Blocks returns the triangular prisms over the triangles of the base.
func (p Prism) Blocks() []Block {
	cuts := p.triangles()
	blocks := make([]Block, len(cuts))
	for k, t := range cuts {
		if p.clockwise() {
			t[1], t[2] = t[2], t[1]
		}
		a, b, c := flatVec(p.Base[t[0]]), flatVec(p.Base[t[1]]), flatVec(p.Base[t[2]])
		blocks[k] = prismBlock{triangle{a, r3.Sub(b, a), r3.Sub(c, b)}, p}
	}
	return blocks
}

// coneBlock is the space between a point and a chart: u and v are those of the chart, w runs from the point to it.
type coneBlock struct {
	apex  r3.Vec
	chart Chart
}

// At returns the point and its derivatives.
func (b coneBlock) At(u, v, w float64) (x, xu, xv, xw r3.Vec) {
	x, xu, xv = b.chart.At(u, v)
	ray := r3.Sub(x, b.apex)
	return r3.Add(b.apex, r3.Scale(w, ray)), r3.Scale(w, xu), r3.Scale(w, xv), ray
}

// reversed is a chart with u and v exchanged, so that its normal is turned.
type reversed struct{ chart Chart }

// At returns the point and its derivatives.
func (r reversed) At(u, v float64) (x, xu, xv r3.Vec) {
	x, xv, xu = r.chart.At(v, u)
	return x, xu, xv
}

// Blocks returns the pyramids over the charts of the base. Those of a negative pyramid are left-handed, so that the
// determinant of the derivatives counts them as negative.
func (p Pyramid) Blocks() []Block {
	charts := p.Base.Charts()
	blocks := make([]Block, len(charts))
	for k, c := range charts {
		blocks[k] = coneBlock{p.Apex, c}
	}
	return blocks
}

// placedChart is a chart in an outer frame.
type placedChart struct {
	chart Chart
	turn  [3][3]float64
	shift r3.Vec
}

// At returns the point and its derivatives.
func (c placedChart) At(u, v float64) (x, xu, xv r3.Vec) {
	x, xu, xv = c.chart.At(u, v)
	return r3.Add(times(c.turn, x), c.shift), times(c.turn, xu), times(c.turn, xv)
}

// placeCharts returns the charts of a surface in an outer frame, nil if it has none.
func placeCharts(s Surface, pose Pose) []Chart {
	c, ok := s.(Charted)
	if !ok {
		return nil
	}
	charts := c.Charts()
	placed := make([]Chart, len(charts))
	for k, chart := range charts {
		placed[k] = placedChart{chart, pose.Matrix(), pose.Origin().Value()}
	}
	return placed
}

// Charts returns the charts of the surface in the outer frame, nil if it has none.
func (p PlacedSurface) Charts() []Chart { return placeCharts(p.Surface, p.Pose) }

// Charts returns the charts of the sheet in the outer frame, nil if it has none.
func (p PlacedSheet) Charts() []Chart { return placeCharts(p.Sheet, p.Pose) }

// placedBlock is a block in an outer frame.
type placedBlock struct {
	block Block
	turn  [3][3]float64
	shift r3.Vec
}

// At returns the point and its derivatives.
func (b placedBlock) At(u, v, w float64) (x, xu, xv, xw r3.Vec) {
	x, xu, xv, xw = b.block.At(u, v, w)
	return r3.Add(times(b.turn, x), b.shift), times(b.turn, xu), times(b.turn, xv), times(b.turn, xw)
}

// Blocks returns the blocks of the cell in the outer frame, nil if it has none.
func (p PlacedCell) Blocks() []Block {
	c, ok := p.Cell.(Blocked)
	if !ok {
		return nil
	}
	blocks := c.Blocks()
	placed := make([]Block, len(blocks))
	for k, b := range blocks {
		placed[k] = placedBlock{b, p.Pose.Matrix(), p.Pose.Origin().Value()}
	}
	return placed
}
