package geom

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// piece is a part of a range of azimuth.
type piece struct {
	start direction
	angle float64 // in radians
}

// at returns the direction at the share t of the piece.
func (p piece) at(t float64) direction { return p.start.turned(t * p.angle) }

// quarters returns the four quarter turns, which start exactly on the axes.
func quarters() []piece {
	pieces := make([]piece, 4)
	for k := range pieces {
		pieces[k] = piece{direction{cos: 1}.quarterTurns(k), math.Pi / 2}
	}
	return pieces
}

// pieces returns equal parts of s of at most a quarter turn.
func (s span) pieces() []piece {
	if s.full() {
		start := s.plainHeading(s.from)
		pieces := quarters()
		for k := range pieces {
			pieces[k].start = start.quarterTurns(k)
		}
		return pieces
	}
	angle := s.angle()
	n := max(1, int(math.Ceil(angle/(math.Pi/2)-0x1p-40))) // a quarter turn with a rounded end stays one piece
	pieces := make([]piece, n)
	first, _ := s.plain()
	for k := range pieces {
		pieces[k] = piece{first.turned(angle * float64(k) / float64(n)), angle / float64(n)}
	}
	return pieces
}

// sweptChart is what a straight line in a half plane through the z axis sweeps over a piece of azimuth: u runs along the
// azimuth and v along the line from (s1, z1) to (s2, z2). The normal is that of a wall about the axis if z1 < z2, and up
// if the line runs inwards.
type sweptChart struct {
	s1, z1, s2, z2 float64
	piece          piece
}

// At returns the point and its derivatives.
func (c sweptChart) At(u, v float64) (x, xu, xv r3.Vec) {
	e := c.piece.at(u)
	ds, dz := c.s2-c.s1, c.z2-c.z1
	s, z := between(c.s1, c.s2, v), between(c.z1, c.z2, v)
	w := s * c.piece.angle
	return r3.Vec{X: s * e.cos, Y: s * e.sin, Z: z}, r3.Vec{X: -w * e.sin, Y: w * e.cos}, r3.Vec{X: ds * e.cos, Y: ds * e.sin, Z: dz}
}

// between returns the point at the share t of the way from a to b, exact at both ends.
func between(a, b, t float64) float64 {
	if t < 0.5 {
		return a + t*(b-a)
	}
	return b - (1-t)*(b-a)
}

// sweep returns the charts of a line swept over pieces of azimuth.
func sweep(s1, z1, s2, z2 float64, pieces []piece) []Chart {
	charts := make([]Chart, len(pieces))
	for k, p := range pieces {
		charts[k] = sweptChart{s1, z1, s2, z2, p}
	}
	return charts
}

// Charts returns the quarters, with v from the rim to the centre.
func (d Disc) Charts() []Chart { return sweep(d.Radius, d.Z, 0, d.Z, quarters()) }

// Charts returns the quarters, with v from the outer rim to the inner one.
func (a Annulus) Charts() []Chart { return sweep(a.Outer, a.Z, a.Inner, a.Z, quarters()) }

// Charts returns equal parts of at most a quarter turn, with v from the outer rim to the inner one.
func (s Sector) Charts() []Chart { return sweep(s.Outer, s.Z, s.Inner, s.Z, s.span().pieces()) }

// Charts returns the quarters, with v along the axis.
func (w Wall) Charts() []Chart { return sweep(w.Radius, w.Z1, w.Radius, w.Z2, quarters()) }

// Charts returns equal parts of at most a quarter turn, with v along the axis.
func (w WallSector) Charts() []Chart {
	return sweep(w.Radius, w.Z1, w.Radius, w.Z2, w.span().pieces())
}

// Charts returns the quarters, with v along the slant.
func (w ConeWall) Charts() []Chart { return sweep(w.R1, w.Z1, w.R2, w.Z2, quarters()) }

// sweptBlock is what a trapezoid in a half plane through the z axis sweeps over a piece of azimuth: u runs away from the
// axis, v along the azimuth and w along the axis. The ends are at the heights z1 and z2.
type sweptBlock struct {
	inner1, outer1, z1 float64
	inner2, outer2, z2 float64
	piece              piece
}

// At returns the point and its derivatives.
func (b sweptBlock) At(u, v, w float64) (x, xu, xv, xw r3.Vec) {
	e := b.piece.at(v)
	inner, outer := between(b.inner1, b.inner2, w), between(b.outer1, b.outer2, w)
	s, width := between(inner, outer, u), outer-inner
	lean := between(b.inner2-b.inner1, b.outer2-b.outer1, u)
	t := s * b.piece.angle
	return r3.Vec{X: s * e.cos, Y: s * e.sin, Z: between(b.z1, b.z2, w)},
		r3.Vec{X: width * e.cos, Y: width * e.sin},
		r3.Vec{X: -t * e.sin, Y: t * e.cos},
		r3.Vec{X: lean * e.cos, Y: lean * e.sin, Z: b.z2 - b.z1}
}

// sweepBlocks returns the blocks of a trapezoid swept over pieces of azimuth.
func sweepBlocks(b sweptBlock, pieces []piece) []Block {
	blocks := make([]Block, len(pieces))
	for k, p := range pieces {
		b.piece = p
		blocks[k] = b
	}
	return blocks
}

// ringBlock returns a block between two radii, still without its piece.
func ringBlock(inner, outer, height float64) sweptBlock {
	return sweptBlock{inner1: inner, outer1: outer, z1: -height / 2, inner2: inner, outer2: outer, z2: height / 2}
}

// Blocks returns the quarters.
func (c Cylinder) Blocks() []Block { return sweepBlocks(ringBlock(0, c.Radius, c.Height), quarters()) }

// Blocks returns the quarters.
func (t Tube) Blocks() []Block { return sweepBlocks(ringBlock(t.Inner, t.Outer, t.Height), quarters()) }

// Blocks returns equal parts of at most a quarter turn.
func (a Arc) Blocks() []Block {
	return sweepBlocks(ringBlock(a.Inner, a.Outer, a.Height), a.span().pieces())
}

// Blocks returns the quarters.
func (c Cone) Blocks() []Block {
	b := ringBlock(0, c.Bottom, c.Height)
	b.outer2 = c.Top
	return sweepBlocks(b, quarters())
}
