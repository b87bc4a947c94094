package geom

import (
	"fmt"
	"math"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Pose places a frame in an outer frame: a rotation about the origin, then a translation. The zero value leaves
// everything where it is.
//
// Both are held in pairs of float64, so a placed body keeps the digits that a point close to its edges needs;
// a pure translation is exact.
type Pose struct {
	turn   [3]pair.Vec // rows of the rotation matrix, if turned
	shift  pair.Vec
	turned bool
}

// Translate returns the pose that moves by d, exactly. Units: length.
func Translate(d r3.Vec) Pose { return Pose{shift: pair.VecOf(d)} }

// Shift returns the pose that moves by d, exactly.
func Shift(d pair.Vec) Pose { return Pose{shift: d} }

// Turn returns the right-handed rotation by an angle in degrees about an axis of any length through the origin.
// Multiples of 90 degrees about a frame axis are exact; other matrices are right to the precision of pairs.
func Turn(axis r3.Vec, degrees float64) (Pose, error) {
	if !finite(axis) || axis == (r3.Vec{}) {
		return Pose{}, fmt.Errorf("geom: rotation axis %v has no direction; give a finite vector other than zero", axis)
	}
	if math.IsNaN(degrees) || math.IsInf(degrees, 0) {
		return Pose{}, fmt.Errorf("geom: rotation angle %v is not a finite number of degrees", degrees)
	}
	s, c := pair.SinCosDegrees(degrees)
	k := pair.VecOf(axis).Unit()
	w := pair.Of(1).Sub(c)
	// Rodrigues: R = c I + s [k]x + (1 - c) k k^T
	kx, ky, kz := k.Scale(w.Mul(k.X)), k.Scale(w.Mul(k.Y)), k.Scale(w.Mul(k.Z))
	sk := k.Scale(s)
	return Pose{turned: true, turn: [3]pair.Vec{
		{X: kx.X.Add(c), Y: kx.Y.Sub(sk.Z), Z: kx.Z.Add(sk.Y)},
		{X: ky.X.Add(sk.Z), Y: ky.Y.Add(c), Z: ky.Z.Sub(sk.X)},
		{X: kz.X.Sub(sk.Y), Y: kz.Y.Add(sk.X), Z: kz.Z.Add(c)},
	}}, nil
}

// Frame returns the rotation that takes the z axis along z (any length), the x axis along the part of x perpendicular
// to z, and y to z cross x. A zero x stands for the outer axis least aligned with z, the first of them in the order
// x, y, z if several tie. The frame is orthonormal to the precision of pairs.
func Frame(z, x r3.Vec) (Pose, error) {
	if !finite(z) || z == (r3.Vec{}) {
		return Pose{}, fmt.Errorf("geom: frame axis z %v has no direction; give a finite vector other than zero", z)
	}
	if !finite(x) {
		return Pose{}, fmt.Errorf("geom: frame axis x %v is not finite", x)
	}
	if x == (r3.Vec{}) {
		x = leastAligned(z)
	}
	near := nearOne(z)
	e3 := pair.VecOf(near).Unit()
	e2 := pair.VecOf(near).Cross(pair.VecOf(nearOne(x))) // every component is right to a few u^2, also for x close to z
	if e2.Norm().Hi < parallel {
		return Pose{}, fmt.Errorf("geom: frame axis x %v is parallel to z %v; give a vector that is not", x, z)
	}
	e2 = e2.Unit()
	e1 := e2.Cross(e3)
	return Pose{turned: true, turn: [3]pair.Vec{
		{X: e1.X, Y: e2.X, Z: e3.X},
		{X: e1.Y, Y: e2.Y, Z: e3.Y},
		{X: e1.Z, Y: e2.Z, Z: e3.Z},
	}}, nil
}

// parallel is the size of a cross product of two vectors of about unit length below which they count as parallel: their
// decimals leave some 1e-16.
const parallel = 1e-14

// leastAligned returns the frame axis with the smallest component in z.
func leastAligned(z r3.Vec) r3.Vec {
	x, y, w := math.Abs(z.X), math.Abs(z.Y), math.Abs(z.Z)
	switch {
	case x <= y && x <= w:
		return r3.Vec{X: 1}
	case y <= w:
		return r3.Vec{Y: 1}
	}
	return r3.Vec{Z: 1}
}

// nearOne returns v times a power of two that brings its largest component close to 1.
func nearOne(v r3.Vec) r3.Vec {
	_, e := math.Frexp(max(math.Abs(v.X), math.Abs(v.Y), math.Abs(v.Z)))
	return r3.Vec{X: math.Ldexp(v.X, -e), Y: math.Ldexp(v.Y, -e), Z: math.Ldexp(v.Z, -e)}
}

// About returns the pose that acts like p about the point c instead of the origin. A translation stays the same.
func (p Pose) About(c r3.Vec) Pose {
	if !p.turned {
		return p
	}
	return Translate(r3.Scale(-1, c)).Then(p).Then(Translate(c))
}

// Then returns the pose that applies p first and q after it.
func (p Pose) Then(q Pose) Pose {
	r := Pose{shift: q.ToOuter(p.shift), turned: p.turned || q.turned}
	switch {
	case !q.turned:
		r.turn = p.turn
	case !p.turned:
		r.turn = q.turn
	default:
		t := transpose(p.turn)
		for i, row := range q.turn {
			r.turn[i] = pair.Vec{X: row.Dot(t[0]), Y: row.Dot(t[1]), Z: row.Dot(t[2])}
		}
	}
	return r
}

// ToOuter returns the outer coordinates of a point given in the frame.
func (p Pose) ToOuter(x pair.Vec) pair.Vec {
	if p.turned {
		x = pair.Vec{X: p.turn[0].Dot(x), Y: p.turn[1].Dot(x), Z: p.turn[2].Dot(x)}
	}
	return x.Add(p.shift)
}

// ToLocal returns the coordinates in the frame of a point given in the outer frame.
func (p Pose) ToLocal(x pair.Vec) pair.Vec {
	x = x.Sub(p.shift)
	if !p.turned {
		return x
	}
	t := p.turn
	return t[0].Scale(x.X).Add(t[1].Scale(x.Y)).Add(t[2].Scale(x.Z))
}

// VectorToOuter turns the components of a vector of the frame into those of the outer frame.
func (p Pose) VectorToOuter(v r3.Vec) r3.Vec {
	if !p.turned {
		return v
	}
	w := pair.VecOf(v)
	return pair.Vec{X: p.turn[0].Dot(w), Y: p.turn[1].Dot(w), Z: p.turn[2].Dot(w)}.Value()
}

// VectorToLocal turns the components of a vector of the outer frame into those of the frame.
func (p Pose) VectorToLocal(v r3.Vec) r3.Vec {
	if !p.turned {
		return v
	}
	t := p.turn
	return t[0].Scale(pair.Of(v.X)).Add(t[1].Scale(pair.Of(v.Y))).Add(t[2].Scale(pair.Of(v.Z))).Value()
}

// Matrix returns the rotation, rounded to float64, by rows: outer = Matrix local + Shift.
func (p Pose) Matrix() [3][3]float64 {
	if !p.turned {
		return [3][3]float64{{1, 0, 0}, {0, 1, 0}, {0, 0, 1}}
	}
	var m [3][3]float64
	for i, row := range p.turn {
		m[i] = [3]float64{row.X.Value(), row.Y.Value(), row.Z.Value()}
	}
	return m
}

// Turned reports whether the pose has a rotation part.
func (p Pose) Turned() bool { return p.turned }

// Origin returns where the frame's origin stands in the outer frame.
func (p Pose) Origin() pair.Vec { return p.shift }

func transpose(m [3]pair.Vec) [3]pair.Vec {
	return [3]pair.Vec{
		{X: m[0].X, Y: m[1].X, Z: m[2].X},
		{X: m[0].Y, Y: m[1].Y, Z: m[2].Y},
		{X: m[0].Z, Y: m[1].Z, Z: m[2].Z},
	}
}

// finite reports whether all components of v are finite.
func finite(v r3.Vec) bool {
	s := v.X - v.X + (v.Y - v.Y) + (v.Z - v.Z)
	return s == 0
}
