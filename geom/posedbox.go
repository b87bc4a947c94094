package geom

import (
	"math"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// PosedBox returns the smallest box along the axes of the outer frame that contains the box b of the frame, rounded
// outward.
//
// Special cases are:
//
//	PosedBox(a box that is empty: Min above Max along an axis, or NaN) = that box
//	PosedBox(a box with infinite sides) = a box infinite wherever these sides lead
func PosedBox(b r3.Box, p Pose) r3.Box {
	if !(b.Min.X <= b.Max.X && b.Min.Y <= b.Max.Y && b.Min.Z <= b.Max.Z) {
		return b
	}
	rows := p.turn
	if !p.turned {
		one := pair.Of(1)
		rows = [3]pair.Vec{{X: one}, {Y: one}, {Z: one}}
	}
	x1, x2 := reach(rows[0], p.shift.X, b)
	y1, y2 := reach(rows[1], p.shift.Y, b)
	z1, z2 := reach(rows[2], p.shift.Z, b)
	return r3.Box{Min: r3.Vec{X: x1, Y: y1, Z: z1}, Max: r3.Vec{X: x2, Y: y2, Z: z2}}
}

// reach returns the least and the greatest value of row.x + shift for x in the box, rounded outward.
func reach(row pair.Vec, shift pair.Float, b r3.Box) (least, greatest float64) {
	low, high := shift, shift
	for _, side := range [3]struct {
		factor   pair.Float
		min, max float64
	}{{row.X, b.Min.X, b.Max.X}, {row.Y, b.Min.Y, b.Max.Y}, {row.Z, b.Min.Z, b.Max.Z}} {
		switch side.factor.Sign() {
		case 1:
			low, high = plus(low, side.factor, side.min), plus(high, side.factor, side.max)
		case -1:
			low, high = plus(low, side.factor, side.max), plus(high, side.factor, side.min)
		}
	}
	return min(low.Hi, away(low.Hi, low.Lo)), max(high.Hi, away(high.Hi, high.Lo))
}

// plus returns sum + factor x, infinite if x or the sum is; the factor is not zero.
func plus(sum, factor pair.Float, x float64) pair.Float {
	switch {
	case math.IsInf(sum.Hi, 0):
		return sum
	case math.IsInf(x, 0):
		return pair.Of(math.Copysign(x, factor.Hi*x))
	}
	return sum.Add(factor.Scale(x))
}
