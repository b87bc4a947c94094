package current

import (
	"sync"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// pointOf returns x as a field point.
func pointOf(x r3.Vec) field.Point { return field.Point{X: pair.VecOf(x)} }

// Posed is a free current seen in an outer frame: Pose takes its frame to the outer one. Bodies are placed with geom.At.
type Posed struct {
	Source Free
	Pose   geom.Pose
}

// Field returns b at x, in the outer frame.
func (s Posed) Field(x r3.Vec) r3.Vec { return field.Posed{Source: s.Source, Pose: s.Pose}.Field(x) }

// Evaluate computes the arrays of dst with b for the field; see field.Evaluator.
func (s Posed) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	field.Posed{Source: s.Source, Pose: s.Pose}.Evaluate(dst, at, side)
}

// Bounds returns the box of the source in the outer frame.
func (s Posed) Bounds() r3.Box { return field.Posed{Source: s.Source, Pose: s.Pose}.Bounds() }

// Induction computes the arrays of dst; see Source.
func (s Posed) Induction(dst *Values, at *field.Points, side field.Side) {
	inducePosed(s.Source, s.Pose, dst, at, side)
}

// inducePosed is the Induction of src seen in an outer frame.
func inducePosed(src Source, pose geom.Pose, dst *Values, at *field.Points, side field.Side) {
	w := scratches.Get().(*scratch)
	defer scratches.Put(w)
	for lo := 0; lo < at.Len(); lo += chunk {
		hi := min(lo+chunk, at.Len())
		w.out = dst.slice(lo, hi)
		src.Induction(&w.out, w.local(pose, at, lo, hi), side)
	}
	if !pose.Turned() {
		return
	}
	turn(pose, dst.AX, dst.AY, dst.AZ, dst.ErrA)
	turn(pose, dst.BX, dst.BY, dst.BZ, dst.ErrB)
}

// turn takes vectors to the outer frame, and adds the rounding of that to their estimates.
func turn(pose geom.Pose, x, y, z, err []float64) {
	for i := range x {
		v := pose.VectorToOuter(r3.Vec{X: x[i], Y: y[i], Z: z[i]})
		x[i], y[i], z[i] = v.X, v.Y, v.Z
		if err != nil && isFinite(v) {
			err[i] += 4 * u * r3.Norm(v)
		}
	}
}

// chunk is how many points go through a scratch at a time.
const chunk = 64

// scratch is working memory of Posed and Bound, reused between calls so that evaluation allocates nothing.
type scratch struct {
	points field.Points
	out    Values
	room   [7][chunk]float64
	part   [3]component
}

var scratches = sync.Pool{New: func() any { return new(scratch) }}

// local turns the points lo <= i < hi into the frame of the pose.
func (w *scratch) local(pose geom.Pose, at *field.Points, lo, hi int) *field.Points {
	n := hi - lo
	r := &w.room
	w.points = field.Points{X: r[0][:n], Y: r[1][:n], Z: r[2][:n], XLo: r[3][:n], YLo: r[4][:n], ZLo: r[5][:n], Slack: r[6][:n]}
	shift := r3.Norm(pose.Origin().Value())
	for i := range n {
		p := at.At(lo + i)
		x := pose.ToLocal(p.X)
		r[0][i], r[1][i], r[2][i] = x.X.Hi, x.Y.Hi, x.Z.Hi
		r[3][i], r[4][i], r[5][i] = x.X.Lo, x.Y.Lo, x.Z.Lo
		r[6][i] = p.Slack + 4*u*(r3.Norm(p.X.Value())+shift)
	}
	return &w.points
}

// only points the scratch at one point.
func (w *scratch) only(x r3.Vec) *field.Points {
	r := &w.room
	r[0][0], r[1][0], r[2][0] = x.X, x.Y, x.Z
	w.points = field.Points{X: r[0][:1], Y: r[1][:1], Z: r[2][:1]}
	return &w.points
}
