// Package current is the Amperian picture of magnetized bodies, and the field of free currents: vector potential a and
// field b, in natural units
//
//	a(x) = (1/4pi) int j/|x-r| dV,   b = curl a,
//
// without mu0: A = mu0 a, B = mu0 b, and b = h + m for a body with magnetization m whose field by poles is h. The gauge is
// Coulomb's, div a = 0, and a falls off at infinity.
//
// A magnetized body carries the surface current m x n and the volume current curl m. Since (m x n)_i = (e_i x m).n and
// (curl m)_i = -div(e_i x m), every Cartesian component of a is the scalar potential of a bound charge,
//
//	a_i = phi[e_i x m],   b = sum e_i x g[e_i x m],
//
// so the evaluators of bound charge (package bound) serve for the currents, with their accuracy close to faces. That the
// two pictures agree, b = h + m, is a check on both that needs no reference: they have no charge in common.
//
// Free currents (Loop, Wire, Solenoid) are sources for package field as well: their g is b, which outside magnetized matter
// is h. A Guide is the same picture one storey up, for the vector potential of flux that circulates in a wall.
//
// Units: m and j dl in the unit of b; currents in that times length, a likewise. Frames are right-handed, normals point
// outward. On a current sheet b jumps across the normal: the mean of both sides or the side asked for; a is continuous.
// Sources are immutable once built and safe for concurrent use, and give the same bits in a batch as point by point.
//
// Everything is static. The package does not solve for currents: no eddy currents, no iron, no skin effect.
package current

import (
	"math"

	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

// Source is a static current, seen through its vector potential and field.
type Source interface {
	// Induction computes at all points every array of dst that is not nil.
	Induction(dst *Values, at *field.Points, side field.Side)
}

// Free is a current in vacuum: its b is a field.Source of its own.
type Free interface {
	Source
	field.Source
	field.Evaluator
}

// Values receives results as a structure of arrays, each nil (not computed) or as long as the batch.
//
//	AX, AY, AZ  vector potential in Coulomb gauge (all three or none)
//	BX, BY, BZ  field b = curl a (all three or none)
//	ErrA, ErrB  bounds on the Euclidean norm of the numerical error; +Inf where no claim is made
//	Status      what each value is worth
//
// A value that does not exist is NaN.
type Values struct {
	AX, AY, AZ []float64
	BX, BY, BZ []float64
	ErrA, ErrB []float64
	Status     []field.Status
}

// NewValues returns all arrays for n points.
func NewValues(n int) *Values {
	room := make([]float64, 8*n)
	next := func() []float64 {
		a := room[:n:n]
		room = room[n:]
		return a
	}
	return &Values{AX: next(), AY: next(), AZ: next(), BX: next(), BY: next(), BZ: next(), ErrA: next(), ErrB: next(),
		Status: make([]field.Status, n)}
}

// Value is what a source gives at one point; fields as in Values.
type Value struct {
	A, B       r3.Vec
	ErrA, ErrB float64
	Status     field.Status

	grad    [6]float64 // symmetric part of the gradient of b: xx, yy, zz, xy, xz, yz
	errGrad float64
}

// At returns value i; what was not computed is zero.
func (v *Values) At(i int) Value {
	var r Value
	if v.AX != nil {
		r.A = r3.Vec{X: v.AX[i], Y: v.AY[i], Z: v.AZ[i]}
	}
	if v.BX != nil {
		r.B = r3.Vec{X: v.BX[i], Y: v.BY[i], Z: v.BZ[i]}
	}
	if v.ErrA != nil {
		r.ErrA = v.ErrA[i]
	}
	if v.ErrB != nil {
		r.ErrB = v.ErrB[i]
	}
	if v.Status != nil {
		r.Status = v.Status[i]
	}
	return r
}

// Set stores value i in the arrays that are there.
func (v *Values) Set(i int, r Value) {
	if v.AX != nil {
		v.AX[i], v.AY[i], v.AZ[i] = r.A.X, r.A.Y, r.A.Z
	}
	if v.BX != nil {
		v.BX[i], v.BY[i], v.BZ[i] = r.B.X, r.B.Y, r.B.Z
	}
	if v.ErrA != nil {
		v.ErrA[i] = r.ErrA
	}
	if v.ErrB != nil {
		v.ErrB[i] = r.ErrB
	}
	if v.Status != nil {
		v.Status[i] = r.Status
	}
}

// slice returns the arrays cut to lo <= i < hi; they share memory with v.
func (v *Values) slice(lo, hi int) Values {
	cut := func(a []float64) []float64 {
		if a == nil {
			return nil
		}
		return a[lo:hi]
	}
	r := Values{AX: cut(v.AX), AY: cut(v.AY), AZ: cut(v.AZ), BX: cut(v.BX), BY: cut(v.BY), BZ: cut(v.BZ),
		ErrA: cut(v.ErrA), ErrB: cut(v.ErrB)}
	if v.Status != nil {
		r.Status = v.Status[lo:hi]
	}
	return r
}

// want returns what the arrays ask for.
func (v *Values) want() want {
	var w want
	if v.AX != nil {
		w |= wantA
	}
	if v.BX != nil {
		w |= wantB
	}
	if v.ErrA != nil || v.ErrB != nil {
		w |= wantErr
	}
	return w
}

// want is a set of quantities to compute at a point.
type want uint8

const (
	wantA want = 1 << iota
	wantB
	wantGrad
	wantErr
)

// At returns the value of src at the point x.
func At(src Source, x r3.Vec, side field.Side) Value {
	v := NewValues(1)
	src.Induction(v, field.PointsOf(x), side)
	return v.At(0)
}

// Fill evaluates a source that is written for one point at a time: it is what the Induction method of such a source calls.
// Points that are not finite get BadInput without a call.
func Fill(dst *Values, at *field.Points, one func(p field.Point) Value) {
	for i := range at.Len() {
		if !isFinite(at.Vec(i)) {
			dst.Set(i, nowhere(field.BadInput))
			continue
		}
		dst.Set(i, one(at.At(i)))
	}
}

// isFinite reports whether all components of x are finite.
func isFinite(x r3.Vec) bool { return x.X-x.X+(x.Y-x.Y)+(x.Z-x.Z) == 0 }

// nowhere returns the value where nothing exists.
func nowhere(s field.Status) Value {
	n := field.Nowhere(s)
	return Value{A: n.G, B: n.G, ErrA: n.ErrG, ErrB: n.ErrG, Status: s, grad: n.Grad, errGrad: n.ErrGrad}
}

// pointwise is a free current that is written for one point at a time.
type pointwise interface {
	value(p field.Point, side field.Side, want want) Value
}

// induce is the Induction of a pointwise source.
func induce(s pointwise, dst *Values, at *field.Points, side field.Side) {
	w := dst.want()
	Fill(dst, at, func(p field.Point) Value { return s.value(p, side, w) })
}

// evaluate is the Evaluate of a pointwise source, with b for the field. A current has no potential of one value.
func evaluate(s pointwise, dst *field.Values, at *field.Points, side field.Side) {
	field.Fill(dst, at, func(p field.Point, want field.Want) field.Value {
		return toField(s.value(p, side, fromField(want)), want)
	})
}

// fromField returns what to compute for a field.Source whose g is b.
func fromField(asked field.Want) want {
	w := wantB
	if asked&field.WantGrad != 0 {
		w |= wantGrad
	}
	if asked&field.WantErr != 0 {
		w |= wantErr
	}
	return w
}

// toField returns a value as one of a field.Source whose g is b. A current has no potential of one value.
func toField(v Value, asked field.Want) field.Value {
	r := field.Value{Phi: math.NaN(), G: v.B, Grad: v.grad, ErrPhi: math.Inf(1), ErrG: v.ErrB, ErrGrad: v.errGrad, Status: v.Status}
	if asked&field.WantPhi != 0 {
		r.Status = max(r.Status, field.NoPotential)
	}
	return r
}

// fieldAt is the Field of a pointwise source.
func fieldAt(s pointwise, x r3.Vec) r3.Vec {
	if !isFinite(x) {
		return field.Nowhere(field.BadInput).G
	}
	return s.value(pointOf(x), field.Mean, wantB).B
}

const (
	u      = 0x1p-53           // rounding unit of float64
	over4P = 1 / (4 * math.Pi) // 1/(4 pi)
)
