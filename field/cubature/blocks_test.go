package cubature_test

import (
	"math"

	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// brick is a box about the origin.
type brick struct{ half r3.Vec }

func (b brick) At(u, v, w float64) (x, xu, xv, xw r3.Vec) {
	h := b.half
	return r3.Vec{X: (2*u - 1) * h.X, Y: (2*v - 1) * h.Y, Z: (2*w - 1) * h.Z}, r3.Vec{X: 2 * h.X}, r3.Vec{Y: 2 * h.Y}, r3.Vec{Z: 2 * h.Z}
}

// wedge is a part of a cylinder about z with radius 1 and height 2 h: tip edge on the axis.
type wedge struct{ h, from, to float64 }

func (b wedge) At(u, v, w float64) (x, xu, xv, xw r3.Vec) {
	k := 2 * math.Pi * (b.to - b.from)
	s, c := math.Sincos(2 * math.Pi * (b.from + (b.to-b.from)*v))
	return r3.Vec{X: u * c, Y: u * s, Z: (2*w - 1) * b.h}, r3.Vec{X: c, Y: s}, r3.Vec{X: -k * u * s, Y: k * u * c}, r3.Vec{Z: 2 * b.h}
}

func cylinderBlocks(h float64) []geom.Block {
	var b []geom.Block
	for k := range 4 {
		b = append(b, wedge{h, float64(k) / 4, float64(k+1) / 4})
	}
	return b
}

// ballPart is the cone over a chart of the unit sphere: tip at the centre.
type ballPart struct{ c geom.Chart }

func (b ballPart) At(u, v, w float64) (x, xu, xv, xw r3.Vec) {
	x, xu, xv = b.c.At(u, v)
	return r3.Scale(w, x), r3.Scale(w, xu), r3.Scale(w, xv), x
}

func ballBlocks() []geom.Block {
	var b []geom.Block
	for _, c := range ellipsoid(r3.Vec{X: 1, Y: 1, Z: 1}) {
		b = append(b, ballPart{c})
	}
	return b
}
