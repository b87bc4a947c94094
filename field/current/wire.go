package current

import (
	"fmt"
	"math"
	"sync"

	"example.com/boundpole/field"
	"example.com/boundpole/field/internal/logatan"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Wire is a thin current along straight segments from point to point.
//
// A closed wire is a circuit. An open one is a part of a circuit: its values are the integral of Biot and Savart over that
// part alone and mean nothing by themselves, for charge would pile up at its ends; the sum over a closed circuit does not
// depend on how it was cut. The gradient of b of an open wire is the symmetric part of it.
//
// Units: natural; b in current by length, a in current.
// Frame: that of the points.
// Domain: all finite x; coordinates within 1e60. NaN in, NaN out. Built by NewWire; immutable.
// Singular: |b| grows as 1/d and |a| as log(1/d) at distance d from the wire; on it NaN, field.AtPoint. Seen as a field.Source
// it has no potential: field.NoPotential where one is asked for.
// Accuracy: |error| <= 1e-14 of the sum of the magnitudes over the segments, of a, of b and of its gradient; closed wires beyond
// 6 bounding radii 1e-13 of |b| and |a| (TestWireReference).
// Source: int dl/R = log1p(l (S + l)/D) and int dl x (x-r)/R^3 = (a x b) S/(R1 R2 D) with a, b from the point to the ends of a
// segment, S = R1 + R2, D = R1 R2 + a.b [own derivation]; closed wires far off: multipoles of a magnetized sheet
// that they border.
type Wire struct {
	points  []r3.Vec
	closed  bool
	current float64
	size    float64 // greatest distance of a point from the centre
	unit    float64 // power of two near it, in which segments are evaluated
	centre  r3.Vec
	far     func() [3]*field.Moments // a_i is the potential of charge i; nil for open wires
}

// NewWire returns the wire through the points; a closed one goes back to the first, which is not repeated.
//
// It refuses fewer than two points (three if closed), neighbours that coincide and numbers that are not finite. It does not
// ask whether the wire crosses itself.
func NewWire(points []r3.Vec, closed bool, current float64) (*Wire, error) {
	least := 2
	if closed {
		least = 3
	}
	if len(points) < least {
		return nil, fmt.Errorf("current: wire of %d points; give at least %d", len(points), least)
	}
	if current-current != 0 {
		return nil, fmt.Errorf("current: current %v of a wire is not finite; give a finite number", current)
	}
	w := &Wire{points: append([]r3.Vec(nil), points...), closed: closed, current: current}
	lo, hi := points[0], points[0]
	for i, p := range points {
		if !isFinite(p) || r3.Norm(p) > 1e60 {
			return nil, fmt.Errorf("current: point %d of a wire is %v; give finite coordinates below 1e60", i, p)
		}
		if i > 0 && p == points[i-1] || closed && i == len(points)-1 && p == points[0] {
			return nil, fmt.Errorf("current: point %d of a wire is %v, as its neighbour; leave it out", i, p)
		}
		lo = r3.Vec{X: min(lo.X, p.X), Y: min(lo.Y, p.Y), Z: min(lo.Z, p.Z)}
		hi = r3.Vec{X: max(hi.X, p.X), Y: max(hi.Y, p.Y), Z: max(hi.Z, p.Z)}
	}
	w.centre = r3.Scale(0.5, r3.Add(lo, hi))
	for _, p := range points {
		w.size = max(w.size, r3.Norm(r3.Sub(p, w.centre)))
	}
	w.unit = math.Ldexp(1, math.Ilogb(w.size))
	if closed {
		w.far = sync.OnceValue(w.expand)
	}
	return w, nil
}

// NewSegment returns the straight wire from one point to another.
func NewSegment(from, to r3.Vec, current float64) (*Wire, error) {
	return NewWire([]r3.Vec{from, to}, false, current)
}

// Points returns the corners of the wire.
func (w *Wire) Points() []r3.Vec { return append([]r3.Vec(nil), w.points...) }

// Closed reports whether the wire is a circuit.
func (w *Wire) Closed() bool { return w.closed }

// Moment returns the dipole moment of a closed wire, half the current times the integral of r x dl; of an open one, that of
// it about its centre.
func (w *Wire) Moment() r3.Vec {
	var m r3.Vec
	w.each(func(p, q r3.Vec) { m = r3.Add(m, r3.Cross(r3.Sub(p, w.centre), r3.Sub(q, w.centre))) })
	return r3.Scale(0.5*w.current, m)
}

// each visits the segments.
func (w *Wire) each(visit func(p, q r3.Vec)) {
	for i := 1; i < len(w.points); i++ {
		visit(w.points[i-1], w.points[i])
	}
	if w.closed {
		visit(w.points[len(w.points)-1], w.points[0])
	}
}

// Field returns b at x.
func (w *Wire) Field(x r3.Vec) r3.Vec { return fieldAt(w, x) }

// Evaluate computes the arrays of dst with b for the field; see field.Evaluator.
func (w *Wire) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	evaluate(w, dst, at, side)
}

// Induction computes the arrays of dst; see Source.
func (w *Wire) Induction(dst *Values, at *field.Points, side field.Side) { induce(w, dst, at, side) }

// Bounds returns the box of the wire.
func (w *Wire) Bounds() r3.Box {
	box := r3.Box{Min: w.points[0], Max: w.points[0]}
	for _, p := range w.points {
		box.Min = r3.Vec{X: min(box.Min.X, p.X), Y: min(box.Min.Y, p.Y), Z: min(box.Min.Z, p.Z)}
		box.Max = r3.Vec{X: max(box.Max.X, p.X), Y: max(box.Max.Y, p.Y), Z: max(box.Max.Z, p.Z)}
	}
	return box
}

// A closed wire is expanded from wireReach sizes on: (1/6)^(wireOrder+1) = 5e-16.
const (
	wireReach = 6
	wireOrder = 19
)

func (w *Wire) value(p field.Point, _ field.Side, want want) Value {
	v := p.X.Value()
	d := r3.Sub(v, w.centre)
	if w.far != nil && max(math.Abs(d.X), math.Abs(d.Y), math.Abs(d.Z)) > wireReach*w.size {
		return w.away(p)
	}
	if max(math.Abs(d.X), math.Abs(d.Y), math.Abs(d.Z)) > elementReach*w.size {
		return w.element(d)
	}
	k := 1 / w.unit
	tol := k * (p.Slack + 4*u*(r3.Norm(v)+r3.Norm(w.centre)+w.size))
	var sum Value
	var size, slopes float64
	last := scaled(pair.VecOf(w.points[0]).Sub(p.X), k)
	n := len(w.points)
	if w.closed {
		n++
	}
	for i := 1; i < n; i++ {
		at := w.points[i%len(w.points)]
		next := scaled(pair.VecOf(at).Sub(p.X), k)
		s := segment{a: last, b: next, t: scaled(pair.VecOf(at).Sub(pair.VecOf(w.points[i-1])), k)}
		if !s.add(&sum, tol, want, &size, &slopes) {
			return nowhere(field.AtPoint)
		}
		last = next
	}
	f := over4P * w.current
	sum.A, sum.B = r3.Scale(f, sum.A), r3.Scale(f*k, sum.B)
	sum.ErrA *= 12 * u * math.Abs(f)
	sum.ErrB = 24 * u * math.Abs(f*k) * size
	for i := range sum.grad {
		sum.grad[i] *= f * k * k
	}
	sum.errGrad = 48 * u * math.Abs(f*k*k) * slopes
	return sum
}

// scaled returns v times a power of two.
func scaled(v pair.Vec, k float64) pair.Vec {
	return pair.Vec{X: v.X.Scale(k), Y: v.Y.Scale(k), Z: v.Z.Scale(k)}
}

// elementReach is the distance in sizes beyond which an open wire is one short element: 1e-17 is left out.
const elementReach = 1e17

// element returns the value of an open wire very far away, at d from its centre.
func (w *Wire) element(d r3.Vec) Value {
	dl := r3.Sub(w.points[len(w.points)-1], w.points[0])
	r := math.Hypot(math.Hypot(d.X, d.Y), d.Z)
	n := r3.Scale(1/r, d)
	f := over4P * w.current / r
	v := Value{A: r3.Scale(f, dl), B: r3.Scale(f/r, r3.Cross(dl, n))}
	g := f / r / r
	e := r3.Cross(dl, n)
	for k, c := range [6]float64{e.X * n.X, e.Y * n.Y, e.Z * n.Z, 0.5 * (e.X*n.Y + e.Y*n.X), 0.5 * (e.X*n.Z + e.Z*n.X), 0.5 * (e.Y*n.Z + e.Z*n.Y)} {
		v.grad[k] = -3 * g * c
	}
	size := math.Abs(f) * r3.Norm(dl)
	v.ErrA, v.ErrB, v.errGrad = 16*u*size, 16*u*size/r, 64*u*size/r/r
	return v
}

// segment is a straight piece seen from the point: a and b go to its ends, t is b - a without their rounding.
type segment struct{ a, b, t pair.Vec }

// add adds a, b and its gradient of the unit current 4 pi. It reports false if the point is on the wire.
//
// With e the unit vector along the segment, u the way from its line to the point, p = |u| and s1, s2 the places of the ends along e
// from the foot, b = f (e x u), f = (s2/R2 - s1/R1)/p^2 = l S/(R1 R2 D), and
//
//	df/de = 1/R1^3 - 1/R2^3,   df/du = -(u/p^2) (s2/R2^3 - s1/R1^3 + 2 f).
func (s *segment) add(sum *Value, tol float64, want want, size, slopes *float64) bool {
	r1, r2 := s.a.Norm().Value(), s.b.Norm().Value()
	l := s.t.Norm().Value()
	dot := s.a.Dot(s.b).Value()
	across := s.a.Cross(s.t).Value() // |a x t| = l p; a x b = a x t
	p := r3.Norm(across) / l
	d := r1*r2 + dot
	if dot < 0 {
		if p <= tol {
			return false
		}
		d = (l * p) * (l * p) / (r1*r2 - dot)
	} else if min(r1, r2) <= tol {
		return false
	}
	ends := r1 + r2
	log := logatan.Log1pRatio(l*(ends+l), d)
	e := r3.Scale(1/l, s.t.Value())
	sum.A = r3.Add(sum.A, r3.Scale(log, e))
	sum.ErrA += math.Abs(log)
	f := ends / (r1 * r2 * d) // times l
	b := r3.Scale(f, across)
	sum.B = r3.Add(sum.B, b)
	*size += r3.Norm(b)
	if want&wantGrad == 0 {
		return true
	}
	return s.slope(sum, e, across, r1, r2, l, f*l, slopes)
}

// slope adds the symmetric part of the gradient.
func (s *segment) slope(sum *Value, e, across r3.Vec, r1, r2, l, f float64, slopes *float64) bool {
	eu := r3.Scale(1/l, across) // e x u, as a = s1 e - u
	w := r3.Cross(eu, e)        // u
	s1, s2 := s.a.Dot(s.t).Value()/l, s.b.Dot(s.t).Value()/l
	p2 := r3.Norm2(w)
	along := l * (s1 + s2) / (r1 + r2) * (r1*r1 + r1*r2 + r2*r2) / (r1 * r2 * (r1 * r2) * (r1 * r2)) // 1/R1^3 - 1/R2^3
	radial := 0.0
	if p2 > 0 {
		bend := l/(r2*r2*r2) - s1*along // s2 i2 - s1 i1, from the nearer end
		if r2 < r1 {
			bend = l/(r1*r1*r1) - s2*along
		}
		radial = -(bend + 2*f) / p2
	}
	h := r3.Add(r3.Scale(along, e), r3.Scale(radial, w))
	// grad b = f (e x) + (e x u) h; the first is antisymmetric
	for k, v := range [6]float64{eu.X * h.X, eu.Y * h.Y, eu.Z * h.Z, 0.5 * (eu.X*h.Y + eu.Y*h.X), 0.5 * (eu.X*h.Z + eu.Z*h.X), 0.5 * (eu.Y*h.Z + eu.Z*h.Y)} {
		sum.grad[k] += v
	}
	*slopes += math.Abs(f)*4 + r3.Norm(eu)*math.Abs(along)
	return true
}

// expand returns the multipoles of the fan of triangles that a closed wire borders, magnetized across: a_i is the potential of
// the dipoles e_i x n I dA.
func (w *Wire) expand() (m [3]*field.Moments) {
	for i := range m {
		m[i] = field.NewMoments(w.centre, w.size, wireOrder)
	}
	w.each(func(p, q r3.Vec) {
		t := geom.Polygon{Vertices: []r3.Vec{w.centre, p, q}}
		area := r3.Scale(0.5*w.current, r3.Cross(r3.Sub(p, w.centre), r3.Sub(q, w.centre)))
		size := r3.Norm(area)
		if size == 0 {
			return
		}
		whole := t.Area()
		t.Nodes(wireOrder/2+2, func(x, _ r3.Vec, weight float64) {
			dm := r3.Scale(weight/whole, area)
			for i, e := range units {
				m[i].AddDipole(x, r3.Cross(e, dm))
			}
		})
	})
	return m
}

// units are the frame axes.
var units = [3]r3.Vec{{X: 1}, {Y: 1}, {Z: 1}}

// away is the value of a closed wire far off.
func (w *Wire) away(p field.Point) Value {
	work := scratches.Get().(*scratch)
	defer scratches.Put(work)
	x := p.X.Value()
	if d := r3.Sub(x, w.centre); max(math.Abs(d.X), math.Abs(d.Y), math.Abs(d.Z)) > dipoleReach*w.size {
		return dipoleValue(p, w.centre, w.Moment())
	}
	at := work.only(x)
	m := w.far()
	var v Value
	for i, e := range units {
		dst := work.part[i].like(1, wantA|wantB|wantGrad|wantErr)
		m[i].Evaluate(dst, at, field.Mean)
		v.join(e, dst.At(0))
	}
	v.finish()
	return v
}
