// Package image gives the field of the image charge behind a plane: a flat wall of ideal iron, of a conductor, or of a
// dielectric acts on the side of its normal like the mirrored source times a factor.
//
// Units and frames are those of the source (package field). Sources are immutable and safe for concurrent use.
//
// The field of the source and of its image together is that before the wall, on the side of the normal and on the plane; behind
// the plane the image source gives a value all the same, which means nothing. The package does not know what happens inside the
// wall, and no wall but one plane.
//
// A part is pulled by its own image with the full force between the pair at twice the distance; its energy in the field of the
// wall is half of that of the pair, because the image follows the part.
package image

import (
	"fmt"
	"math"
	"sync"

	"example.com/boundpole/field"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Plane is the surface of a half space with permittivity (or permeability) Ratio relative to what is before it.
type Plane struct {
	Point  r3.Vec  // any point of the plane
	Normal r3.Vec  // out of the half space, of any length
	Ratio  float64 // from 0 on; +Inf for a conductor and for ideal iron
}

// Conductor returns the plane of an ideal conductor; Iron that of iron whose permeability has no bound. They act alike on charge.
func Conductor(point, normal r3.Vec) Plane { return Plane{point, normal, math.Inf(1)} }

// Iron returns the plane of iron whose permeability has no bound.
func Iron(point, normal r3.Vec) Plane { return Plane{point, normal, math.Inf(1)} }

// Check refuses a normal without direction, a point that is not finite and a ratio below zero.
func (p Plane) Check() error {
	for _, v := range [2]r3.Vec{p.Point, p.Normal} {
		if v.X-v.X+(v.Y-v.Y)+(v.Z-v.Z) != 0 {
			return fmt.Errorf("image: plane at %v with normal %v; give finite vectors", p.Point, p.Normal)
		}
	}
	if p.Normal == (r3.Vec{}) {
		return fmt.Errorf("image: plane at %v has the normal zero; give a direction", p.Point)
	}
	if !(p.Ratio >= 0) {
		return fmt.Errorf("image: relative permittivity %v of a plane; give a number from 0 on, or +Inf", p.Ratio)
	}
	return nil
}

// Factor returns what a mirrored charge is multiplied with: (1-e)/(1+e), -1 for a conductor.
//
// Source: [Jackson1999] eq. (4.45).
func (p Plane) Factor() float64 {
	if math.IsInf(p.Ratio, 1) {
		return -1
	}
	return (1 - p.Ratio) / (1 + p.Ratio)
}

// Height returns the distance of x from the plane, positive on the side of the normal.
func (p Plane) Height(x r3.Vec) float64 {
	m := p.mirror()
	return m.n.Dot(pair.VecOf(x).Sub(m.point)).Value()
}

// Mirror returns the mirror image of a vector.
func (p Plane) Mirror(v r3.Vec) r3.Vec {
	n, w := pair.VecOf(p.Normal).Unit(), pair.VecOf(v)
	return w.Sub(n.Scale(n.Dot(w).Scale(2))).Value()
}

// Reflect returns the mirror image of a point.
func (p Plane) Reflect(x pair.Vec) pair.Vec {
	m := p.mirror()
	return m.reflect(x)
}

// Image is the mirrored source times the factor of the plane.
//
// Units: those of the source.
// Frame: that of the source and the plane.
// Domain: all finite x on the side of the normal and on the plane; elsewhere the value means nothing.
// Singular: where the mirror image of x is a singular point of the source.
// Accuracy: that of the source at the mirrored point, and 16 u of |g|; estimates include it (TestImage).
// Source: [Jackson1999] section 4.4, eq. (4.45).
type Image struct {
	Source field.Source
	Plane  Plane
}

// Field returns g of the image at x, the mean of the two sides on a face.
func (s Image) Field(x r3.Vec) r3.Vec { return field.At(s, x, field.Mean, field.WantG).G }

// chunk is how many points are mirrored at a time; a batch of more allocates a header for each.
const chunk = 256

// scratch is working memory, reused between calls so that evaluation allocates nothing.
type scratch struct {
	room   [7][chunk]float64
	points field.Points
}

var scratches = sync.Pool{New: func() any { return new(scratch) }}

// Evaluate computes the arrays of dst; see field.Evaluator. Sides are those of the source's own faces, mirrored.
func (s Image) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	work := scratches.Get().(*scratch)
	defer scratches.Put(work)
	m := s.Plane.mirror()
	k := s.Plane.Factor()
	origin := r3.Norm(s.Plane.Point)
	for lo := 0; lo < at.Len(); lo += chunk {
		n := min(chunk, at.Len()-lo)
		p := &work.points
		*p = field.Points{X: work.room[0][:n], Y: work.room[1][:n], Z: work.room[2][:n],
			XLo: work.room[3][:n], YLo: work.room[4][:n], ZLo: work.room[5][:n], Slack: work.room[6][:n]}
		for i := range n {
			q := at.At(lo + i)
			x := m.reflect(q.X)
			p.X[i], p.XLo[i] = x.X.Hi, x.X.Lo
			p.Y[i], p.YLo[i] = x.Y.Hi, x.Y.Lo
			p.Z[i], p.ZLo[i] = x.Z.Hi, x.Z.Lo
			p.Slack[i] = q.Slack + 4*0x1p-53*(r3.Norm(q.X.Value())+origin)
		}
		out := dst
		if n < at.Len() {
			out = dst.Slice(lo, lo+n)
		}
		field.Evaluate(s.Source, out, p, side)
		m.turn(out, k)
	}
}

// mirror is the reflection in a plane with its unit normal in pairs.
type mirror struct{ n, point pair.Vec }

func (p Plane) mirror() mirror { return mirror{pair.VecOf(p.Normal).Unit(), pair.VecOf(p.Point)} }

func (m *mirror) reflect(x pair.Vec) pair.Vec {
	return x.Sub(m.n.Scale(m.n.Dot(x.Sub(m.point)).Scale(2)))
}

// vector returns k times the mirror image of v; the normal is rounded once.
func (m *mirror) vector(v r3.Vec, k float64) r3.Vec {
	n := m.n.Value()
	return r3.Scale(k, r3.Sub(v, r3.Scale(2*r3.Dot(n, v), n)))
}

// turn mirrors vectors and tensors and multiplies everything with the factor k.
func (m *mirror) turn(v *field.Values, k float64) {
	scale := func(a []float64, f float64) {
		for i := range a {
			a[i] *= f
		}
	}
	scale(v.Phi, k)
	for _, a := range [3][]float64{v.ErrPhi, v.ErrG, v.ErrGrad} {
		scale(a, math.Abs(k))
	}
	const u = 0x1p-53
	for i := range v.GX {
		g := m.vector(r3.Vec{X: v.GX[i], Y: v.GY[i], Z: v.GZ[i]}, k)
		v.GX[i], v.GY[i], v.GZ[i] = g.X, g.Y, g.Z
		if v.ErrG != nil {
			v.ErrG[i] += 16 * u * r3.Norm(g)
		}
	}
	for i := range v.Grad[0] {
		t := [3]r3.Vec{{X: v.Grad[0][i], Y: v.Grad[3][i], Z: v.Grad[4][i]}, {X: v.Grad[3][i], Y: v.Grad[1][i], Z: v.Grad[5][i]},
			{X: v.Grad[4][i], Y: v.Grad[5][i], Z: v.Grad[2][i]}}
		for j := range t {
			t[j] = m.vector(t[j], k)
		}
		x := m.vector(r3.Vec{X: t[0].X, Y: t[1].X, Z: t[2].X}, 1)
		y := m.vector(r3.Vec{X: t[0].Y, Y: t[1].Y, Z: t[2].Y}, 1)
		z := m.vector(r3.Vec{X: t[0].Z, Y: t[1].Z, Z: t[2].Z}, 1)
		v.Grad[0][i], v.Grad[1][i], v.Grad[2][i] = x.X, y.Y, z.Z
		v.Grad[3][i], v.Grad[4][i], v.Grad[5][i] = x.Y, x.Z, y.Z
		if v.ErrGrad != nil {
			v.ErrGrad[i] += 32 * u * (r3.Norm(x) + r3.Norm(y) + r3.Norm(z))
		}
	}
}

// Bounds returns the box of the mirrored source, if it has one; else all of space.
func (s Image) Bounds() r3.Box {
	b, ok := field.BoundsOf(s.Source)
	if !ok {
		inf := math.Inf(1)
		return r3.Box{Min: r3.Vec{X: -inf, Y: -inf, Z: -inf}, Max: r3.Vec{X: inf, Y: inf, Z: inf}}
	}
	c := s.Plane.Reflect(pair.VecOf(r3.Scale(0.5, r3.Add(b.Min, b.Max)))).Value()
	h := r3.Scale(0.5, r3.Sub(b.Max, b.Min))
	var e r3.Vec
	for _, w := range [3]r3.Vec{{X: h.X}, {Y: h.Y}, {Z: h.Z}} {
		m := s.Plane.Mirror(w)
		e = r3.Add(e, r3.Vec{X: math.Abs(m.X), Y: math.Abs(m.Y), Z: math.Abs(m.Z)})
	}
	e = r3.Scale(1+0x1p-50, e)
	return r3.Box{Min: r3.Sub(c, e), Max: r3.Add(c, e)}
}
