package field

import (
	"math"

	"gonum.org/v1/gonum/num/dual"
	"gonum.org/v1/gonum/spatial/r3"
)

// Components says in which unit vectors a caller's polarization is written.
type Components int

// The systems, all about the origin and the z axis of the body's frame.
const (
	Cartesian   Components = iota // x, y, z
	Cylindrical                   // s (away from the z axis), phi, z
	Spherical                     // r (away from the origin), theta (from the z axis), phi
)

// Func is a caller's polarization, given at points of the body's frame.
//
// On the axis (Cylindrical, Spherical) and at the origin (Spherical) the unit vectors have no direction; the value there is
// NaN unless the components that need one vanish.
type Func struct {
	P          func(x r3.Vec) [3]float64
	Components Components
	// Div returns div p. If nil, Dual is differentiated; if that is nil too, P is, by differences.
	Div func(x r3.Vec) float64
	// Dual is P written for dual numbers, with the same components: exact derivatives without a formula.
	Dual func(x [3]dual.Number) [3]dual.Number
	// Size is the length over which p varies, for differences. Default: 1.
	Size float64
}

// At returns p at x, in Cartesian components.
func (f Func) At(x r3.Vec) r3.Vec {
	p := f.P(x)
	if f.Components == Cartesian {
		return r3.Vec{X: p[0], Y: p[1], Z: p[2]}
	}
	s := math.Hypot(x.X, x.Y)
	cp, sp := unit(x.X, s), unit(x.Y, s)
	if f.Components == Cylindrical {
		return r3.Vec{X: along2(cp, p[0]) - along2(sp, p[1]), Y: along2(sp, p[0]) + along2(cp, p[1]), Z: p[2]}
	}
	r := r3.Norm(x)
	st, ct := unit(s, r), unit(x.Z, r)
	across := along2(st, p[0]) + along2(ct, p[1])
	return r3.Vec{
		X: along2(cp, across) - along2(sp, p[2]),
		Y: along2(sp, across) + along2(cp, p[2]),
		Z: along2(ct, p[0]) - along2(st, p[1]),
	}
}

// unit returns a/b, NaN for 0/0.
func unit(a, b float64) float64 { return a / b }

// along2 returns k p, 0 for a vanishing component whatever its direction.
func along2(k, p float64) float64 {
	if p == 0 {
		return 0
	}
	return k * p
}

// Divergence returns div p at x.
func (f Func) Divergence(x r3.Vec) float64 {
	switch {
	case f.Div != nil:
		return f.Div(x)
	case f.Dual != nil:
		return f.dual(x)
	}
	size := f.Size
	if size == 0 {
		size = 1
	}
	d, _ := DifferenceDivergence(f, x, size)
	return d
}

// dual differentiates the Cartesian components by dual numbers, one pass a coordinate.
func (f Func) dual(x r3.Vec) float64 {
	at := [3]float64{x.X, x.Y, x.Z}
	var d float64
	for k := range at {
		var v [3]dual.Number
		for j := range v {
			v[j].Real = at[j]
		}
		v[k].Emag = 1
		d += f.cartesian(v)[k].Emag
	}
	return d
}

// cartesian returns the components of Dual turned into Cartesian ones.
func (f Func) cartesian(x [3]dual.Number) [3]dual.Number {
	p := f.Dual(x)
	if f.Components == Cartesian {
		return p
	}
	over := func(a, b dual.Number) dual.Number { return dual.Mul(a, dual.Inv(b)) }
	s2 := dual.Add(dual.Mul(x[0], x[0]), dual.Mul(x[1], x[1]))
	s := dual.Sqrt(s2)
	cp, sp := over(x[0], s), over(x[1], s)
	if f.Components == Cylindrical {
		return [3]dual.Number{
			dual.Sub(dual.Mul(cp, p[0]), dual.Mul(sp, p[1])),
			dual.Add(dual.Mul(sp, p[0]), dual.Mul(cp, p[1])),
			p[2],
		}
	}
	r := dual.Sqrt(dual.Add(s2, dual.Mul(x[2], x[2])))
	st, ct := over(s, r), over(x[2], r)
	across := dual.Add(dual.Mul(st, p[0]), dual.Mul(ct, p[1]))
	return [3]dual.Number{
		dual.Sub(dual.Mul(cp, across), dual.Mul(sp, p[2])),
		dual.Add(dual.Mul(sp, across), dual.Mul(cp, p[2])),
		dual.Sub(dual.Mul(ct, p[0]), dual.Mul(st, p[1])),
	}
}

// DifferenceDivergence returns div p at x by central differences with two Richardson steps, and an estimate of its error, for
// a polarization that varies over the length size.
//
// Accuracy: about 1e-11 of |p|/size for smooth p.
func DifferenceDivergence(p Polarization, x r3.Vec, size float64) (d, err float64) {
	h := math.Ldexp(1, math.Ilogb(size)-7)
	slope := func(h float64) float64 {
		// steps from x are exact where h is a power of two not far below x
		dx := p.At(r3.Add(x, r3.Vec{X: h})).X - p.At(r3.Sub(x, r3.Vec{X: h})).X
		dy := p.At(r3.Add(x, r3.Vec{Y: h})).Y - p.At(r3.Sub(x, r3.Vec{Y: h})).Y
		dz := p.At(r3.Add(x, r3.Vec{Z: h})).Z - p.At(r3.Sub(x, r3.Vec{Z: h})).Z
		return (dx + dy + dz) / (2 * h)
	}
	a, b, c := slope(h), slope(h/2), slope(h/4)
	ab, bc := b+(b-a)/3, c+(c-b)/3
	d = bc + (bc-ab)/15
	return d, 10*math.Abs(d-bc) + 1e-11*r3.Norm(p.At(x))/size
}
