package geom

import (
	"fmt"
	"math"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// span is a range of azimuth about the z axis, counted from +x towards +y.
type span struct {
	from, to float64
	degrees  bool // from and to are in degrees, else in radians
}

// turn returns one turn in the unit of s.
func (s span) turn() float64 {
	if s.degrees {
		return 360
	}
	return 2 * math.Pi
}

// angle returns to - from in radians.
func (s span) angle() float64 {
	if s.degrees {
		return (s.to - s.from) * (math.Pi / 180)
	}
	return s.to - s.from
}

// full reports whether s is one turn, up to the rounding of its ends.
func (s span) full() bool { return math.Abs(s.to-s.from-s.turn()) <= s.rounding() }

// rounding returns what the ends and their difference may be off by rounding, four times over.
func (s span) rounding() float64 { return 8 * 0x1p-53 * (math.Abs(s.from) + math.Abs(s.to)) }

// turns is how many turns from zero an end may lie; there the pairs of 2 pi still hold 1e-29.
const turns = 100

// check refuses ends that are not finite or in order, and more than one turn.
func (s span) check(what string) error {
	unit := "radians"
	if s.degrees {
		unit = "degrees"
	}
	for _, end := range [2]struct {
		name  string
		angle float64
	}{{"from", s.from}, {"to", s.to}} {
		if math.IsNaN(end.angle) || math.IsInf(end.angle, 0) {
			return fmt.Errorf("geom: %s %s angle is %v; give a finite number of %s", what, end.name, end.angle, unit)
		}
		if limit := turns * s.turn(); math.Abs(end.angle) > limit {
			return fmt.Errorf("geom: %s %s angle %v is beyond %.6g %s; leave out whole turns", what, end.name, end.angle, limit, unit)
		}
	}
	switch {
	case s.to <= s.from:
		return fmt.Errorf("geom: %s from angle %v is not below the to angle %v; exchange them or add a turn to the to angle", what, s.from, s.to)
	case s.angle() < grain:
		return fmt.Errorf("geom: %s from %v to %v %s is thinner than the rounding of its ends; make it wider", what, s.from, s.to, unit)
	case s.to-s.from > s.turn() && !s.full():
		return fmt.Errorf("geom: %s from %v to %v %s is more than one turn; lessen it by whole turns", what, s.from, s.to, unit)
	}
	return nil
}

// 2 pi to 107 bits.
var turnPair = pair.Float{Hi: 6.283185307179586, Lo: 2.4492935982947064e-16}

// ends returns the unit vectors from the axis at both ends.
func (s span) ends() (from, to pair.Vec) { return s.heading(s.from), s.heading(s.to) }

// heading returns the unit vector from the axis at an azimuth in the unit of s.
func (s span) heading(azimuth float64) pair.Vec {
	var sin, cos pair.Float
	if s.degrees {
		sin, cos = pair.SinCosDegrees(azimuth)
	} else {
		n := math.RoundToEven(azimuth / (2 * math.Pi))
		sin, cos = pair.SinCos(pair.Of(azimuth).Sub(turnPair.Scale(n)))
	}
	return pair.Vec{X: cos, Y: sin}
}

// plain returns the unit vectors at both ends to 3 u a component.
func (s span) plain() (from, to direction) { return s.plainHeading(s.from), s.plainHeading(s.to) }

func (s span) plainHeading(azimuth float64) direction {
	if !s.degrees {
		sin, cos := math.Sincos(azimuth)
		return direction{cos, sin}
	}
	r := math.Remainder(azimuth, 360)
	quarter := math.RoundToEven(r / 90)
	sin, cos := math.Sincos((r - 90*quarter) * (math.Pi / 180))
	return direction{cos, sin}.quarterTurns(int(quarter))
}

// quarterTurns returns d turned by k quarters, exactly.
func (d direction) quarterTurns(k int) direction {
	switch k & 3 {
	case 1:
		return direction{-d.sin, d.cos}
	case 2:
		return direction{-d.cos, -d.sin}
	case 3:
		return direction{d.sin, -d.cos}
	}
	return d
}

// turned returns d turned by an angle in radians.
func (d direction) turned(angle float64) direction {
	s, c := math.Sincos(angle)
	return direction{d.cos*c - d.sin*s, d.sin*c + d.cos*s}
}

// middle returns the unit vector in the middle of s.
func (s span) middle() direction { return s.plainHeading(s.from).turned(s.angle() / 2) }

// distance returns the signed distance of x from the wedge between the half planes at the ends, negative inside, the
// end that is nearer (0 from, 1 to), and whether both are within tol.
//
// Plain arithmetic answers where it is beyond doubt: it is off by at most 8 u times the distance from the axis.
func (s span) distance(x pair.Vec, tol float64) (d float64, end int, both bool) {
	v := x.Value()
	from, to := s.plain()
	w := s.beside(from, to, v.X, v.Y)
	if doubt := tol + 16*0x1p-53*w.axis; w.near(0) <= doubt || w.near(1) <= doubt {
		f, t := s.ends()
		w.across[0] = x.X.Mul(f.Y).Sub(x.Y.Mul(f.X)).Value()
		w.across[1] = x.Y.Mul(t.X).Sub(x.X.Mul(t.Y)).Value()
	}
	if w.near(1) < w.near(0) {
		end = 1
	}
	d = w.near(end)
	if w.inside() {
		d = -d
	}
	return d, end, w.near(1-end) <= tol
}

// beside returns where a point stands in plain arithmetic, given what plain returns.
func (s span) beside(from, to direction, x, y float64) wedge {
	return wedge{
		across: [2]float64{x*from.sin - y*from.cos, y*to.cos - x*to.sin},
		along:  [2]float64{x*from.cos + y*from.sin, x*to.cos + y*to.sin},
		axis:   math.Hypot(x, y),
		wide:   s.angle() > math.Pi,
	}
}

// wedge holds a point beside the two half planes at the ends of a span.
type wedge struct {
	across, along [2]float64 // coordinates along the outward normal of each half plane, and along it from the axis
	axis          float64    // distance from the axis
	wide          bool       // the span is more than half a turn
}

// inside reports whether the point is between the half planes.
func (w wedge) inside() bool {
	if w.wide {
		return w.across[0] < 0 || w.across[1] < 0
	}
	return w.across[0] < 0 && w.across[1] < 0
}

// near returns the distance from a half plane.
func (w wedge) near(end int) float64 {
	if w.along[end] > 0 {
		return math.Abs(w.across[end])
	}
	return w.axis
}

// outward returns the unit normal out of the wedge at an end.
func (s span) outward(end int) r3.Vec {
	from, to := s.plain()
	if end == 0 {
		return r3.Vec{X: from.sin, Y: -from.cos}
	}
	return r3.Vec{X: -to.sin, Y: to.cos}
}

// bounds returns the smallest box along the axes that contains the sector of an annulus, up to 4 u of the outer radius,
// at the heights z1 to z2. It contains the sector beyond doubt.
func (s span) bounds(inner, outer, z1, z2 float64) r3.Box {
	box := nothing()
	add := func(x, y, margin float64) {
		box = include(box, r3.Vec{X: x - margin, Y: y - margin})
		box = include(box, r3.Vec{X: x + margin, Y: y + margin})
	}
	from, to := s.plain()
	for _, a := range [2]float64{inner, outer} {
		for _, e := range [2]direction{from, to} {
			margin := 4 * 0x1p-53 * a
			if e.cos == 0 || e.sin == 0 {
				margin = 0 // exact
			}
			add(a*e.cos, a*e.sin, margin)
		}
	}
	for k := range 4 {
		e := direction{cos: 1}.quarterTurns(k)
		if s.beside(from, to, e.cos, e.sin).inside() { // in doubt it is an end, within the margin
			add(outer*e.cos, outer*e.sin, 0)
		}
	}
	box.Min.Z, box.Max.Z = z1, z2
	return box
}

// arcNode is a point of a rule on an arc of the unit circle, with its weight in radians.
type arcNode struct {
	direction
	w float64
}

// rule returns a Gauss rule in azimuth that integrates trigonometric polynomials up to the degree over s, up to rounding.
//
// With k points the error for cos and sin of degree times the azimuth, over half the length of s, is at most
//
//	2^(2k+1) k!^4 / ((2k+1) (2k)!^3) z^(2k),  z = degree times half the length
//
// (DLMF 3.5.19 with the derivative bounded by z^(2k)), of which the least k below u/4 is taken.
func (s span) rule(degree int) []arcNode {
	z := float64(degree) * s.angle() / 2
	n, bound := 0, 2.0
	for bound > 0x1p-55 {
		n++
		k := float64(n)
		even := 2 * k * (2*k - 1)
		bound *= 4 * k * k * k * k * (2*k - 1) / (2*k + 1) / (even * even * even) * z * z
	}
	half := s.angle() / 2
	middle := s.middle()
	rule := make([]arcNode, n)
	for i, p := range legendre(n, -half, half) {
		rule[i] = arcNode{middle.turned(p.x), p.w}
	}
	return rule
}
