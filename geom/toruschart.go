package geom

import "gonum.org/v1/gonum/spatial/r3"

// torusChart is a piece of a torus: u runs along the azimuth, v along the angle of the cross-section from the outside
// upwards.
type torusChart struct {
	major, minor  float64
	ring, section piece
}

// At returns the point and its derivatives.
func (c torusChart) At(u, v float64) (x, xu, xv r3.Vec) {
	e, f := c.ring.at(u), c.section.at(v)
	s := c.major + c.minor*f.cos
	w, t := s*c.ring.angle, c.minor*c.section.angle
	return r3.Vec{X: s * e.cos, Y: s * e.sin, Z: c.minor * f.sin},
		r3.Vec{X: -w * e.sin, Y: w * e.cos},
		r3.Vec{X: -t * f.sin * e.cos, Y: -t * f.sin * e.sin, Z: t * f.cos}
}

// Charts returns the sixteen quarters in both angles.
func (t TorusSurface) Charts() []Chart {
	charts := make([]Chart, 0, 16)
	for _, ring := range quarters() {
		for _, section := range quarters() {
			charts = append(charts, torusChart{t.Major, t.Minor, ring, section})
		}
	}
	return charts
}

// torusBlock is the part of a torus under a chart: u and v are those of the chart, w runs outwards from the centre of the
// cross-section.
type torusBlock struct{ chart torusChart }

// At returns the point and its derivatives.
func (b torusBlock) At(u, v, w float64) (x, xu, xv, xw r3.Vec) {
	c := b.chart
	e, f := c.ring.at(u), c.section.at(v)
	c.minor *= w
	x, xu, xv = c.At(u, v)
	a := b.chart.minor
	return x, xu, xv, r3.Vec{X: a * f.cos * e.cos, Y: a * f.cos * e.sin, Z: a * f.sin}
}

// Blocks returns the parts under the charts of the surface.
func (t Torus) Blocks() []Block {
	charts := TorusSurface(t).Charts()
	blocks := make([]Block, len(charts))
	for k, c := range charts {
		blocks[k] = torusBlock{c.(torusChart)}
	}
	return blocks
}
