package field

import (
	"math"
	"sync"

	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// Evaluate computes at all points every array of dst that is not nil, from any source.
//
// An Evaluator answers itself. Of a plain Source the field is taken as it is, the gradient by central differences, the
// potential is NaN with status NoPotential where it was asked for, and no claim is made on the error (+Inf); such a
// source has one value on a face, whatever the side.
func Evaluate(src Source, dst *Values, at *Points, side Side) {
	if e, ok := src.(Evaluator); ok {
		at.check()
		dst.check(at.Len())
		e.Evaluate(dst, at, side)
		return
	}
	Fill(dst, at, func(p Point, want Want) Value { return plain(src, p, want) })
}

// At returns the value of src at the point x.
func At(src Source, x r3.Vec, side Side, want Want) Value {
	p := Points{X: []float64{x.X}, Y: []float64{x.Y}, Z: []float64{x.Z}}
	v := NewValues(1, want)
	Evaluate(src, v, &p, side)
	return v.At(0)
}

// plain is the value of a source that offers nothing but Field.
func plain(src Source, p Point, want Want) Value {
	inf := math.Inf(1)
	x := p.X.Value()
	r := Value{Phi: math.NaN(), G: src.Field(x), ErrPhi: inf, ErrG: inf, ErrGrad: inf}
	if want&WantPhi != 0 {
		r.Status = NoPotential
	}
	if want&WantGrad != 0 {
		r.Grad = differences(src, x, r3.Norm(x))
	}
	return r
}

// differences returns the gradient of g by central differences with steps chosen for a field that varies over the
// distance size: the best that can be done without knowing the source. Accuracy: about 1e-9 of |g|/size.
func differences(src Source, x r3.Vec, size float64) [6]float64 {
	if size == 0 {
		size = 1
	}
	h := math.Ldexp(1, math.Ilogb(size)-13) // error h^4 + u/h with one Richardson step
	var d [3]r3.Vec
	for k, e := range [3]r3.Vec{{X: 1}, {Y: 1}, {Z: 1}} {
		one := slope(src, x, e, h)
		two := slope(src, x, e, 2*h)
		d[k] = r3.Scale(1.0/3, r3.Sub(r3.Scale(4, one), two))
	}
	return [6]float64{d[0].X, d[1].Y, d[2].Z, (d[0].Y + d[1].X) / 2, (d[0].Z + d[2].X) / 2, (d[1].Z + d[2].Y) / 2}
}

func slope(src Source, x, e r3.Vec, h float64) r3.Vec {
	a, b := src.Field(r3.Add(x, r3.Scale(h, e))), src.Field(r3.Sub(x, r3.Scale(h, e)))
	return r3.Scale(0.5/h, r3.Sub(a, b))
}

// Bounded is the upgrade of a source that knows where its charge is.
type Bounded interface {
	// Bounds returns a box outside which there is no charge.
	Bounds() r3.Box
}

// BoundsOf returns the box outside which src has no charge; ok is false if it does not say.
func BoundsOf(src Source) (box r3.Box, ok bool) {
	b, ok := src.(Bounded)
	if !ok {
		return r3.Box{}, false
	}
	return b.Bounds(), true
}

// chunk is how many points go through a scratch at a time.
const chunk = 64

// scratch is working memory of Posed and Sum, reused between calls so that evaluation allocates nothing.
type scratch struct {
	points Points
	values Values
	room   [25][chunk]float64
	status [chunk]Status
}

var scratches = sync.Pool{New: func() any { return new(scratch) }}

// like shapes the scratch values after the arrays of dst that are there, for n points.
func (s *scratch) like(dst *Values, n int) *Values {
	next := 0
	take := func(a []float64) []float64 {
		next++
		if a == nil {
			return nil
		}
		return s.room[next-1][:n]
	}
	s.values = Values{Phi: take(dst.Phi), GX: take(dst.GX), GY: take(dst.GY), GZ: take(dst.GZ),
		ErrPhi: take(dst.ErrPhi), ErrG: take(dst.ErrG), ErrGrad: take(dst.ErrGrad)}
	for k := range dst.Grad {
		s.values.Grad[k] = take(dst.Grad[k])
	}
	if dst.Status != nil {
		s.values.Status = s.status[:n]
	}
	return &s.values
}

// Posed is a source seen in an outer frame: Pose takes the source's frame to the outer one.
type Posed struct {
	Source Source
	Pose   geom.Pose
}

// Field returns g at x, in the outer frame.
func (s Posed) Field(x r3.Vec) r3.Vec {
	work := singles.Get().(*one)
	defer singles.Put(work)
	work.x[0], work.y[0], work.z[0] = x.X, x.Y, x.Z
	s.Evaluate(&work.values, &work.points, Mean)
	return r3.Vec{X: work.gx[0], Y: work.gy[0], Z: work.gz[0]}
}

// Evaluate computes the arrays of dst at points of the outer frame; see Evaluator.
func (s Posed) Evaluate(dst *Values, at *Points, side Side) {
	work := scratches.Get().(*scratch)
	defer scratches.Put(work)
	m := s.Pose.Matrix()
	shift := r3.Norm(s.Pose.Origin().Value())
	for lo := 0; lo < at.Len(); lo += chunk {
		hi := min(lo+chunk, at.Len())
		local := work.local(s.Pose, shift, at, lo, hi)
		out := dst.slice(lo, hi)
		Evaluate(s.Source, work.like(&out, hi-lo), local, side)
		turnInto(&out, &work.values, &m, s.Pose.Turned())
	}
}

// Bounds returns the box of the source turned into the outer frame, if the source has one; else all of space.
func (s Posed) Bounds() r3.Box {
	b, ok := BoundsOf(s.Source)
	if !ok {
		return everywhere()
	}
	return geom.PosedBox(b, s.Pose)
}

// local turns the points lo <= i < hi into the frame of the pose.
func (w *scratch) local(pose geom.Pose, shift float64, at *Points, lo, hi int) *Points {
	const first = 13 // the slots before it belong to the values
	n := hi - lo
	w.points = Points{
		X: w.room[first][:n], Y: w.room[first+1][:n], Z: w.room[first+2][:n],
		XLo: w.room[first+3][:n], YLo: w.room[first+4][:n], ZLo: w.room[first+5][:n],
		Slack: w.room[first+6][:n],
	}
	for i := range n {
		p := at.At(lo + i)
		x := pose.ToLocal(p.X)
		w.points.X[i], w.points.XLo[i] = x.X.Hi, x.X.Lo
		w.points.Y[i], w.points.YLo[i] = x.Y.Hi, x.Y.Lo
		w.points.Z[i], w.points.ZLo[i] = x.Z.Hi, x.Z.Lo
		w.points.Slack[i] = p.Slack + 4*0x1p-53*(r3.Norm(p.X.Value())+shift)
	}
	return &w.points
}

// turnError bounds what turning a vector by a rounded matrix adds to its relative error: half a rounding of each entry and
// three of each sum.
const turnError = 4 * 0x1p-53

// turnInto copies v into dst with vectors and tensors turned by m.
func turnInto(dst, v *Values, m *[3][3]float64, turned bool) {
	copy(dst.Phi, v.Phi)
	copy(dst.ErrPhi, v.ErrPhi)
	copy(dst.ErrG, v.ErrG)
	copy(dst.ErrGrad, v.ErrGrad)
	copy(dst.Status, v.Status)
	if !turned {
		copy(dst.GX, v.GX)
		copy(dst.GY, v.GY)
		copy(dst.GZ, v.GZ)
		for k := range dst.Grad {
			copy(dst.Grad[k], v.Grad[k])
		}
		return
	}
	for i := range dst.GX {
		g := turnVec(m, r3.Vec{X: v.GX[i], Y: v.GY[i], Z: v.GZ[i]})
		dst.GX[i], dst.GY[i], dst.GZ[i] = g.X, g.Y, g.Z
		if dst.ErrG != nil {
			dst.ErrG[i] += turnError * r3.Norm(g)
		}
	}
	for i := range dst.Grad[0] {
		var t [6]float64
		for k := range t {
			t[k] = v.Grad[k][i]
		}
		t = turnTensor(m, t)
		for k := range t {
			dst.Grad[k][i] = t[k]
		}
	}
}

func turnVec(m *[3][3]float64, v r3.Vec) r3.Vec {
	row := func(r *[3]float64) float64 { return math.FMA(r[0], v.X, math.FMA(r[1], v.Y, float64(r[2]*v.Z))) }
	return r3.Vec{X: row(&m[0]), Y: row(&m[1]), Z: row(&m[2])}
}

// turnTensor returns m t m^T for the symmetric tensor t.
func turnTensor(m *[3][3]float64, t [6]float64) [6]float64 {
	cols := [3]r3.Vec{{X: t[0], Y: t[3], Z: t[4]}, {X: t[3], Y: t[1], Z: t[5]}, {X: t[4], Y: t[5], Z: t[2]}}
	var half [3]r3.Vec // columns of m t
	for k := range cols {
		half[k] = turnVec(m, cols[k])
	}
	r0 := turnVec(m, r3.Vec{X: half[0].X, Y: half[1].X, Z: half[2].X})
	r1 := turnVec(m, r3.Vec{X: half[0].Y, Y: half[1].Y, Z: half[2].Y})
	r2 := turnVec(m, r3.Vec{X: half[0].Z, Y: half[1].Z, Z: half[2].Z})
	return [6]float64{r0.X, r1.Y, r2.Z, r0.Y, r0.Z, r1.Z}
}

func everywhere() r3.Box {
	inf := math.Inf(1)
	return r3.Box{Min: r3.Vec{X: -inf, Y: -inf, Z: -inf}, Max: r3.Vec{X: inf, Y: inf, Z: inf}}
}

// one is a batch of one point and its field, reused between calls.
type one struct {
	x, y, z, gx, gy, gz [1]float64
	points              Points
	values              Values
}

var singles = sync.Pool{New: func() any {
	w := new(one)
	w.points = Points{X: w.x[:], Y: w.y[:], Z: w.z[:]}
	w.values = Values{GX: w.gx[:], GY: w.gy[:], GZ: w.gz[:]}
	return w
}}
