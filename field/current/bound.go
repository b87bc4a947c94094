package current

import (
	"errors"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Bound is the bound current of a magnetized body: m x n on its faces, curl m inside.
//
// Units: natural; m and b in one unit, a in that times length.
// Frame: that in which the body is given; the magnetization is in the body's own frame.
// Domain: as the bound charge of the body, see bound.Of. NaN in, NaN out. Built by Of; immutable.
// Singular: |b| grows as log(1/d) at distance d from an edge where the surface current jumps; on it B is NaN, A finite,
// field.OnEdge. On a face with a current the mean of both sides of b, or the side asked for.
// Accuracy: that of the bound charge of e x m, with e a unit vector: 1e-12 of |b| and |a| or of 1e-3 of their scales where
// package bound has a closed form, else 1e-10. Against h + m of the poles: 5e-14 of max(|b|, max|m|/100), of which the worst is the
// loss of h + m in a flat box (TestAgainstPoles).
// Source: a_i = phi[e_i x m], from a = (1/4pi) int m x (x-r)/|x-r|^3 dV, [Jackson1999] sec. 5.8.
type Bound struct {
	Layers     []Layer          // one a face, in the order of the body's faces
	Volumes    []Volume         // one a cell
	Moment     r3.Vec           // integral of m over the volume
	Identities []bound.Identity // what must vanish, and how far it does

	body geom.Body
	pose geom.Pose
	m    field.Polarization
	axes []axis
	part []member
	own  *turns // in the body's own frame, in place of the parts
}

// member is one component of a: the bound charge e x m and the unit vector e in the outer frame.
type member struct {
	e      r3.Vec
	charge *bound.Charge
}

// Of returns the bound current of a body with magnetization m.
//
// It fails as bound.Of does, for the body and for e x m.
func Of(body geom.Body, m field.Polarization) (*Bound, error) {
	if body == nil || m == nil {
		return nil, errors.New("current: body or magnetization is nil; give both")
	}
	if err := body.Check(); err != nil {
		return nil, err
	}
	axes, err := axesOf(body, m)
	if err != nil {
		return nil, err
	}
	b := &Bound{body: body, m: m, axes: axes}
	if at, ok := body.(geom.Placed); ok {
		b.pose = at.Pose
	}
	if b.own = roundTurns(body, m); b.own != nil {
		return b, b.fill()
	}
	for _, a := range axes {
		c, err := bound.Of(body, a.p)
		if err != nil {
			return nil, err
		}
		b.part = append(b.part, member{b.pose.VectorToOuter(a.e), c})
	}
	return b, b.fill()
}

// Body returns the body as it was given.
func (b *Bound) Body() geom.Body { return b.body }

// Magnetization returns m at a point of the outer frame, continued outside the body.
func (b *Bound) Magnetization(x r3.Vec) r3.Vec {
	return b.pose.VectorToOuter(b.m.At(b.pose.ToLocal(pair.VecOf(x)).Value()))
}

// Surface returns the surface current density m x n at a point of a face with the outward normal n.
func (b *Bound) Surface(x, n r3.Vec) r3.Vec { return r3.Cross(b.Magnetization(x), n) }

// Volume returns the volume current density curl m at a point inside.
func (b *Bound) Volume(x r3.Vec) r3.Vec {
	return b.pose.VectorToOuter(curl(b.axes, b.pose.ToLocal(pair.VecOf(x)).Value()))
}

// Bounds returns the box of the body.
func (b *Bound) Bounds() r3.Box { return b.body.Bounds() }

// Induction computes the arrays of dst; see Source.
func (b *Bound) Induction(dst *Values, at *field.Points, side field.Side) {
	if b.own != nil {
		inducePosed(b.own, b.pose, dst, at, side)
		return
	}
	w := scratches.Get().(*scratch)
	defer scratches.Put(w)
	want := dst.want()
	for lo := 0; lo < at.Len(); lo += chunk {
		hi := min(lo+chunk, at.Len())
		w.cut(at, lo, hi)
		b.evaluate(w, &w.points, side, want)
		for i := range hi - lo {
			dst.Set(lo+i, b.value(w, &w.points, i))
		}
	}
}

// evaluate evaluates the parts at up to a chunk of points.
func (b *Bound) evaluate(w *scratch, at *field.Points, side field.Side, want want) {
	for k := range b.part {
		field.Evaluate(b.part[k].charge, w.part[k].like(at.Len(), want), at, side)
	}
}

// value puts the components at a point together.
func (b *Bound) value(w *scratch, at *field.Points, i int) Value {
	if !isFinite(at.Vec(i)) {
		return nowhere(field.BadInput)
	}
	var v Value
	for k := range b.part {
		v.join(b.part[k].e, w.part[k].values.At(i))
	}
	v.finish()
	return v
}

// join adds the component of a along e, which is the potential of p: a gains Phi e, b gains e x G.
func (v *Value) join(e r3.Vec, p field.Value) {
	v.A = r3.Add(v.A, r3.Scale(p.Phi, e))
	v.B = r3.Add(v.B, r3.Cross(e, p.G))
	v.ErrA = math.Hypot(v.ErrA, p.ErrPhi+4*u*math.Abs(p.Phi))
	v.ErrB = math.Hypot(v.ErrB, p.ErrG+4*u*r3.Norm(p.G))
	v.Status = max(v.Status, p.Status)
	addCross(&v.grad, e, &p.Grad)
	v.errGrad += p.ErrGrad
}

// finish ends a sum of components. In join the 4 u of the magnitudes cover the unit vectors, rounded by at most 2 u each, and the
// products. Each component of b is the difference of two errors that have nothing in common, of which the bounds are dozens of times too
// large each: the root of the squares stands for both, and of each error the two of three parts that e x g takes.
func (v *Value) finish() {
	v.ErrB *= math.Sqrt(2.0 / 3)
	v.errGrad += 16 * u * norm(v.grad[:]...)
	if v.Status == field.OnEdge {
		n := nowhere(field.OnEdge)
		v.B, v.ErrB, v.grad, v.errGrad = n.B, n.ErrB, n.grad, n.errGrad
	}
}

// addCross adds the symmetric part of e x t, column by column, to g.
func addCross(g *[6]float64, e r3.Vec, t *[6]float64) {
	x := r3.Cross(e, r3.Vec{X: t[0], Y: t[3], Z: t[4]})
	y := r3.Cross(e, r3.Vec{X: t[3], Y: t[1], Z: t[5]})
	z := r3.Cross(e, r3.Vec{X: t[4], Y: t[5], Z: t[2]})
	for k, v := range [6]float64{x.X, y.Y, z.Z, 0.5 * (y.X + x.Y), 0.5 * (z.X + x.Z), 0.5 * (z.Y + y.Z)} {
		g[k] += v
	}
}

// cut points the scratch at the points lo <= i < hi.
func (w *scratch) cut(at *field.Points, lo, hi int) {
	cut := func(a []float64) []float64 {
		if a == nil {
			return nil
		}
		return a[lo:hi]
	}
	w.points = field.Points{X: at.X[lo:hi], Y: at.Y[lo:hi], Z: at.Z[lo:hi],
		XLo: cut(at.XLo), YLo: cut(at.YLo), ZLo: cut(at.ZLo), Slack: cut(at.Slack)}
}

// component is what one component gives for a chunk of points.
type component struct {
	values field.Values
	room   [13][chunk]float64
	status [chunk]field.Status
}

// like shapes the values after what is wanted, for n points.
func (c *component) like(n int, want want) *field.Values {
	r := &c.room
	v := field.Values{Status: c.status[:n]}
	if want&wantA != 0 {
		v.Phi = r[0][:n]
	}
	if want&(wantB|wantGrad) != 0 {
		v.GX, v.GY, v.GZ = r[1][:n], r[2][:n], r[3][:n]
	}
	if want&wantErr != 0 {
		v.ErrPhi, v.ErrG, v.ErrGrad = r[4][:n], r[5][:n], r[6][:n]
	}
	if want&wantGrad != 0 {
		for k := range v.Grad {
			v.Grad[k] = r[7+k][:n]
		}
	}
	c.values = v
	return &c.values
}
