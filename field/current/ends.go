package current

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/cubature"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// arcEnds is the charge c/s of one sign or the other on the two end faces of an arc, rectangles in half planes through the axis,
// s the distance from it. The integral along z is closed, that along s is taken as in turns; far away the multipoles of the dipole
// density (c/s) phi in the arc serve, for the two ends cancel.
type arcEnds struct {
	unit    float64 // power of two near the size; lengths below are in it
	lo, hi  float64 // radii
	half    float64 // half the height
	density float64 // c: charge by area times length
	end     [2]pair.Vec
	size    float64 // greatest distance from the origin
	box     r3.Box
	far     *field.Moments
	layers  field.Sum // gives the gradient
}

// The expansion serves from farReach bounding radii on: (1/4)^29 = 3e-18.
const (
	farReach = 4
	farOrder = 28
)

// newArcEnds returns the ends of an arc that is no full turn.
func newArcEnds(arc geom.Arc, c float64) (*arcEnds, error) {
	size := math.Hypot(arc.Outer, arc.Height/2)
	b := &arcEnds{unit: math.Ldexp(1, math.Ilogb(size)), box: arc.Bounds()}
	k := 1 / b.unit
	b.lo, b.hi, b.half, b.density, b.size = k*arc.Inner, k*arc.Outer, k*arc.Height/2, c*k, k*size
	b.end[0], b.end[1] = arc.Ends()
	b.far = field.NewMoments(r3.Vec{}, size, farOrder)
	m := vortex(c)
	arc.Nodes(farOrder/2+6, func(x r3.Vec, w float64) { b.far.AddDipole(x, r3.Scale(w, m.At(x))) })
	faces := arc.Faces()
	for i, sign := range [2]float64{-1, 1} {
		face := faces[len(faces)-2+i].Surface.(geom.Charted)
		l, err := cubature.NewLayer(face.Charts(), func(x, _ r3.Vec) float64 { return sign * c / math.Hypot(x.X, x.Y) }, nil)
		if err != nil {
			return nil, err
		}
		b.layers = append(b.layers, l)
	}
	return b, nil
}

// Field returns g at x.
func (b *arcEnds) Field(x r3.Vec) r3.Vec {
	if !isFinite(x) {
		return field.Nowhere(field.BadInput).G
	}
	v := b.value(pointOf(x), field.Mean)
	return v.G
}

// Bounds returns the box of the arc.
func (b *arcEnds) Bounds() r3.Box { return b.box }

// Evaluate computes the arrays of dst; see field.Evaluator.
func (b *arcEnds) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	if dst.Grad[0] != nil {
		b.layers.Evaluate(dst, at, side)
		return
	}
	field.Fill(dst, at, func(p field.Point, _ field.Want) field.Value { return b.value(p, side) })
}

func (b *arcEnds) value(p field.Point, side field.Side) field.Value {
	k := 1 / b.unit
	x := scaled(p.X, k)
	v := x.Value()
	reach := math.Hypot(math.Hypot(v.X, v.Y), v.Z)
	if reach > farReach*b.size {
		w := scratches.Get().(*scratch)
		defer scratches.Put(w)
		dst := w.part[0].like(1, wantA|wantB|wantErr)
		b.far.Evaluate(dst, w.only(p.X.Value()), field.Mean)
		return dst.At(0)
	}
	q := endView{tol: k*p.Slack + 4*u*(reach+b.size), side: side}
	q.up, q.down = x.Z.AddFloat(-b.half).Neg().Value(), x.Z.AddFloat(b.half).Neg().Value()
	var sum plate
	for i := range b.end {
		q.look(x, b.end[i], 2*float64(i)-1)
		sum.join(q.add(b))
	}
	if q.status == field.OnEdge {
		n := field.Nowhere(field.OnEdge)
		n.Phi, n.ErrPhi = over4P*b.density*b.unit*sum.phi, q.claim(b.density*b.unit, q.missPhi, sum.sizePhi)
		return n
	}
	r := field.Value{Phi: over4P * b.density * b.unit * sum.phi, G: r3.Scale(over4P*b.density, sum.g), Status: q.status}
	r.ErrPhi, r.ErrG = q.claim(b.density*b.unit, q.missPhi, sum.sizePhi), q.claim(b.density, q.missG, sum.sizeG)
	if peak := math.Abs(b.density) / b.lo; r.ErrG > 1e-10*peak {
		r.Status = max(r.Status, field.NotConverged)
	}
	return r
}

// endView is a field point seen from an end: foot along the unit vector e away from the axis, off along the azimuth, and the ends
// of the rectangle along z.
type endView struct {
	e, around      r3.Vec
	foot, off      float64
	lo, hi         pair.Float // radius less foot is taken in pairs
	up, down       float64
	sign, tol      float64
	side           field.Side
	status         field.Status
	missPhi, missG float64
}

// look sets the view of an end with the charge sign c/s.
func (q *endView) look(x, e pair.Vec, sign float64) {
	foot := x.X.Mul(e.X).Add(x.Y.Mul(e.Y))
	q.lo, q.hi = foot.Neg(), foot.Neg()
	q.foot, q.off = foot.Value(), x.Y.Mul(e.X).Sub(x.X.Mul(e.Y)).Value()
	q.e = e.Value()
	q.around = r3.Vec{X: -q.e.Y, Y: q.e.X}
	q.sign = sign
}

// claim returns the estimate from what two rules differ by and the size of the terms.
func (q *endView) claim(k, miss, size float64) float64 {
	return over4P * math.Abs(k) * (10*miss + 16*u*size)
}

// plate is potential and field of a rectangle by one rule, times 4 pi by density, and the sizes of the terms.
type plate struct {
	phi            float64
	g              r3.Vec
	sizePhi, sizeG float64
}

func (s *plate) join(t plate) {
	s.phi, s.g = s.phi+t.phi, r3.Add(s.g, t.g)
	s.sizePhi, s.sizeG = s.sizePhi+t.sizePhi, s.sizeG+t.sizeG
}

// add returns the contribution of the end that is looked at, and notes where the point is.
func (q *endView) add(b *arcEnds) plate {
	lo, hi := q.lo.AddFloat(b.lo).Value(), q.hi.AddFloat(b.hi).Value()
	beyond := max(lo, -hi, -q.up, q.down) // how far out of the rectangle, negative inside
	off, on := q.off, false
	if out := math.Hypot(max(lo, -hi, 0), max(-q.up, q.down, 0)); math.Hypot(off, out) <= q.tol {
		if beyond >= -q.tol {
			q.status = field.OnEdge
		} else {
			q.status, on, off = max(q.status, field.OnFace), true, 0
		}
	}
	f, c := q.integrate(b, lo, hi, off, ruleFine), q.integrate(b, lo, hi, off, ruleCoarse)
	q.missPhi += math.Abs(f.phi - c.phi)
	q.missG += r3.Norm(r3.Sub(f.g, c.g))
	if on && q.side != field.Mean { // g outside less g inside is the charge times the outward normal, (c/s) phi at both ends
		half := 2 * math.Pi / q.foot
		if q.side == field.Inside {
			half = -half
		}
		f.g = r3.Add(f.g, r3.Scale(half, q.around))
	}
	return f
}

// integrate takes the integral along s with one rule. Panels end before they come too close to the axis, where the density has
// its pole.
func (q *endView) integrate(b *arcEnds, lo, hi, off float64, rule panels) (s plate) {
	start := min(max(q.foot, b.lo), b.hi)
	g := cubature.Legendre(rule.points)
	march(lo, hi, b.hi-b.lo, off, rule, func(from, to float64) float64 {
		to = min(to, 3*from+2*start)
		if hi < 0 || from < -lo {
			to = min(to, from+0.7*(start-from))
		}
		return to
	}, func(origin, from, to float64, up, down bool) {
		c, half := 0.5*(from+to), 0.5*(to-from)
		for i, x := range g.X {
			d, w := c+half*x, half*g.W[i]
			switch {
			case up && down:
				t := q.strip(d, off, w)
				t.join(q.strip(-d, off, w))
				s.join(t)
			case up:
				s.join(q.strip(origin+d, off, w))
			default:
				s.join(q.strip(origin-d, off, w))
			}
		}
	})
	return s
}

// strip returns the line of charge at s = foot + t, with p^2 = t^2 + off^2 and the distances R of its ends at the heights up and
// down over the point:
//
//	phi = asinh(up/p) - asinh(down/p),   g = -(t e - off phi) (up/R1 - down/R2)/p^2 + z (1/R1 - 1/R2)
//
// with the differences of like signs taken together, so that they do not cancel.
func (q *endView) strip(t, off, w float64) plate {
	w *= q.sign / (q.foot + t)
	p2 := t*t + off*off
	up, down := q.up, q.down
	r1, r2 := math.Sqrt(p2+up*up), math.Sqrt(p2+down*down)
	var phi, across float64
	switch high := up - down; {
	case down > 0:
		phi = math.Log((up + r1) / (down + r2))
		across = high * (up + down) / (r1 * r2 * (up*r2 + down*r1))
	case up < 0:
		phi = math.Log((r2 - down) / (r1 - up))
		across = high * (up + down) / (r1 * r2 * (up*r2 + down*r1))
	default:
		p := math.Sqrt(p2)
		phi = math.Asinh(up/p) + math.Asinh(-down/p)
		across = (up/r1 - down/r2) / p2
	}
	along := -(up - down) * (up + down) / (r1 * r2 * (r1 + r2))
	g := r3.Add(r3.Scale(-t*across, q.e), r3.Scale(off*across, q.around))
	g.Z = along
	aw := math.Abs(w)
	return plate{w * phi, r3.Scale(w, g), aw * phi, aw * ((math.Abs(t)+math.Abs(off))*across + math.Abs(along))}
}
