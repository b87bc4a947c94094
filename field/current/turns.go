package current

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/cubature"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// turns is the surface current of a round body whose magnetization is along the radius or along the axis: it runs in circles
// about the z axis, on flat rings or on walls, with a density that is a power of the place. a is azimuthal.
//
// The integral over the circle is closed (elliptic.Ring); that along the sheet is taken by Gauss-Legendre on panels that
// grow from the place next to the point, those of both sides together, so that what is odd there cancels term by term.
type turns struct {
	unit   float64 // power of two near the size; everything below is in this unit
	sheets []sheet
	size   float64 // bounding radius
	peak   float64 // largest density
}

// sheet is a flat ring at the height level, from the radius lo to hi, or the wall of radius level, from the height lo to hi.
type sheet struct {
	wall          bool
	inward        bool // the outward normal of the body there points down, or to the axis
	level, lo, hi float64
	density       float64 // K = density s^power, s the coordinate along the sheet
	power         float64
}

// roundTurns returns the currents of a cylinder or tube with one of the two laws, nil for others.
func roundTurns(body geom.Body, m field.Polarization) *turns {
	if at, ok := body.(geom.Placed); ok {
		body = at.Body
	}
	factor := 1.0
	for {
		k, ok := m.(field.Times)
		if !ok {
			break
		}
		m, factor = k.Polarization, factor*k.Factor
	}
	var shape geom.Tube
	switch b := body.(type) {
	case geom.Cylinder:
		shape = geom.Tube{Outer: b.Radius, Height: b.Height}
	case geom.Tube:
		shape = b
	default:
		return nil
	}
	half := shape.Height / 2
	size := math.Hypot(shape.Outer, half)
	t := &turns{unit: math.Ldexp(1, math.Ilogb(size))}
	k := 1 / t.unit
	t.size = k * size
	inner, outer := k*shape.Inner, k*shape.Outer
	half *= k
	add := func(s sheet) {
		t.sheets = append(t.sheets, s)
		t.peak = max(t.peak, math.Abs(s.at(s.lo)), math.Abs(s.at(s.hi)))
	}
	switch q := m.(type) {
	case field.RadialPower: // m x n = c s^n s x (+-z): against phi on top, along it below
		c := factor * q.Coefficient * math.Pow(t.unit, q.Power)
		if !usable(c, q.Power) || q.Power < 0 && inner == 0 {
			return nil
		}
		add(sheet{inward: true, level: -half, lo: inner, hi: outer, density: c, power: q.Power})
		add(sheet{level: half, lo: inner, hi: outer, density: -c, power: q.Power})
	case field.AxialPower: // z^n z x (+-s): along phi outside
		c := factor * q.Coefficient * math.Pow(t.unit, float64(q.Power))
		if !usable(c, float64(q.Power)) || q.Power < 1 { // 0 has closed forms
			return nil
		}
		add(sheet{wall: true, level: outer, lo: -half, hi: half, density: c, power: float64(q.Power)})
		if inner > 0 {
			add(sheet{wall: true, inward: true, level: inner, lo: -half, hi: half, density: -c, power: float64(q.Power)})
		}
	default:
		return nil
	}
	return t
}

// usable reports whether a density is finite and a power one that the rules resolve.
func usable(c, power float64) bool { return c-c == 0 && math.Abs(power) <= 40 }

// at returns the density at the coordinate s.
func (h *sheet) at(s float64) float64 {
	switch h.power {
	case 0:
		return h.density
	case 1:
		return h.density * s
	case 2:
		return h.density * s * s
	}
	return h.density * math.Pow(s, h.power)
}

// azimuthal is a field point in the half plane of the axis, in the unit of the currents.
type azimuthal struct {
	rho2    pair.Float
	rho     float64
	z       pair.Float
	tol     float64
	side    field.Side
	status  field.Status
	a, r, b float64 // sums: a_phi, b_rho, b_z
	sizeA   float64
	sizeB   float64
	missA   float64
	missB   float64
}

// Induction computes the arrays of dst; see Source.
func (t *turns) Induction(dst *Values, at *field.Points, side field.Side) { induce(t, dst, at, side) }

func (t *turns) value(p field.Point, side field.Side, _ want) Value {
	k := 1 / t.unit
	x, y := p.X.X.Scale(k), p.X.Y.Scale(k)
	z := p.X.Z.Scale(k)
	reach := math.Hypot(math.Hypot(x.Value(), y.Value()), z.Value())
	if reach > 1e60 {
		return Value{ErrA: 1e-60 * t.unit * t.peak, ErrB: 1e-120 * t.peak} // it falls like 1/R^2 and 1/R^3 at least
	}
	q := azimuthal{rho2: x.Mul(x).Add(y.Mul(y)), z: z, tol: k*p.Slack + 4*u*(reach+t.size), side: side}
	q.rho = q.rho2.Sqrt().Value()
	if q.rho < 1e-60 { // squares of less underflow; a and b_rho are of the order of rho
		q.missA, q.missB = t.peak*q.rho, t.peak*q.rho
		q.rho, q.rho2 = 0, pair.Float{}
	}
	var out r3.Vec
	if q.rho > 0 {
		out = r3.Vec{X: x.Value() / q.rho, Y: y.Value() / q.rho}
	}
	for i := range t.sheets {
		q.add(&t.sheets[i])
	}
	v := Value{A: r3.Vec{X: -out.Y * q.a, Y: out.X * q.a}, B: r3.Vec{X: out.X * q.r, Y: out.Y * q.r, Z: q.b}, Status: q.status}
	v.A = r3.Scale(over4P*t.unit, v.A)
	v.B = r3.Scale(over4P, v.B)
	v.ErrA = t.unit * over4P * (10*q.missA + 16*u*q.sizeA)
	v.ErrB = over4P * (10*q.missB + 16*u*q.sizeB)
	if v.Status == field.OnEdge {
		n := nowhere(field.OnEdge)
		v.B, v.ErrB = n.B, n.ErrB
	} else if v.ErrB > 1e-10*t.peak {
		v.Status = max(v.Status, field.NotConverged)
	}
	return v
}

// add adds a sheet.
func (q *azimuthal) add(h *sheet) {
	// the ends and the distance from the sheet's plane or wall, seen from the point, with the digits of the pairs
	var lo, hi, off float64
	if h.wall {
		lo, hi = q.z.AddFloat(-h.lo).Neg().Value(), q.z.AddFloat(-h.hi).Neg().Value()
		off = q.beyond(h.level)
	} else {
		lo, hi = -q.beyond(h.lo), -q.beyond(h.hi)
		off = q.z.AddFloat(-h.level).Value()
	}
	on := false
	if math.Hypot(off, max(lo, -hi, 0)) <= q.tol { // on the sheet, or on a rim of it
		rimmed := h.at(h.hi) != 0 && hi <= q.tol || h.at(h.lo) != 0 && lo >= -q.tol && (h.wall || h.lo > 0)
		centre := !h.wall && h.lo == 0 && h.power <= 0 && q.rho <= q.tol
		if rimmed || centre {
			q.status = max(q.status, field.OnEdge)
		} else {
			q.status, on = max(q.status, field.OnFace), true
		}
	}
	if on {
		off = 0
	}
	f, g := q.integrate(h, lo, hi, off, ruleFine), q.integrate(h, lo, hi, off, ruleCoarse)
	q.a, q.r, q.b = q.a+f.a, q.r+f.r, q.b+f.b
	q.sizeA, q.sizeB = q.sizeA+f.sizeA, q.sizeB+f.sizeB
	q.missA += math.Abs(f.a - g.a)
	q.missB += math.Hypot(f.r-g.r, f.b-g.b)
	if on {
		q.jump(h)
	}
}

// beyond returns rho - a without cancellation.
func (q *azimuthal) beyond(a float64) float64 {
	if a == 0 {
		return q.rho
	}
	return q.rho2.Sub(pair.Product(a, a)).Value() / (q.rho + a)
}

// jump adds the side that is wanted: b outside less b inside is K x n, in units of 1/4pi.
func (q *azimuthal) jump(h *sheet) {
	s := 2 * math.Pi
	switch q.side {
	case field.Mean:
		return
	case field.Inside:
		s = -s
	}
	if h.inward {
		s = -s
	}
	if h.wall {
		q.b -= s * h.at(q.z.Value()) // phi x rho = -z
		return
	}
	q.r += s * h.at(q.rho) // phi x z = rho
}

// strip is the contribution of a sheet by one rule.
type strip struct{ a, r, b, sizeA, sizeB float64 }

// integrate takes the integral along the sheet with one rule.
func (q *azimuthal) integrate(h *sheet, lo, hi, off float64, rule panels) (s strip) {
	start := max(lo, -hi, 0)
	g := cubature.Legendre(rule.points)
	march(lo, hi, h.hi-h.lo, off, rule, func(from, to float64) float64 { return h.before(from, to, q.rho, start) },
		func(origin, from, to float64, up, down bool) { q.panel(&s, h, origin, off, from, to, up, down, g) })
	return s
}

// before returns to, or the nearest place after from at which a panel has to end because the density has a branch point on
// the axis, where a power is not an integer. The panels begin at the distance origin from the foot.
func (h *sheet) before(from, to, rho, origin float64) float64 {
	if h.wall || h.lo != 0 || h.power == math.Trunc(h.power) {
		return to
	}
	for s := h.hi / 4; s > 1e-3*h.hi; s /= 4 { // s^2.5 on the rest: 1e-10 of 1e-10
		if d := math.Abs(s-rho) - origin; d > from && d < to {
			to = d
		}
	}
	return to
}

// panel adds the rings between the distances from and to, on either side.
func (q *azimuthal) panel(s *strip, h *sheet, origin, off, from, to float64, up, down bool, g cubature.Rule) {
	c, half := 0.5*(from+to), 0.5*(to-from)
	for i, x := range g.X {
		d := c + half*x
		w := half * g.W[i]
		switch {
		case up && down:
			above, below := q.ring(h, d, off, w), q.ring(h, -d, off, w)
			s.join(above.plus(below))
		case up:
			s.join(q.ring(h, origin+d, off, w))
		default:
			s.join(q.ring(h, origin-d, off, w))
		}
	}
}

// plus adds two contributions before they meet the sum: what is odd about the foot cancels here.
func (s strip) plus(t strip) strip {
	return strip{s.a + t.a, s.r + t.r, s.b + t.b, s.sizeA + t.sizeA, s.sizeB + t.sizeB}
}

func (s *strip) join(t strip) { *s = s.plus(t) }

// ring returns the loop at the place t along the sheet, counted from the foot, with the weight w.
func (q *azimuthal) ring(h *sheet, t, off, w float64) strip {
	var a, gap, z, k float64
	if h.wall {
		a, gap, z = h.level, -off, -t
		k = h.at(q.z.Value() + t)
	} else {
		a, gap, z = q.rho+t, t, off
		k = h.at(a)
	}
	if !(a > 0) || k == 0 {
		return strip{}
	}
	w *= k
	l := loopAt(a, q.rho, z, gap)
	return strip{w * l.a, w * l.r, w * l.b, math.Abs(w) * l.a, math.Abs(w) * l.size}
}
