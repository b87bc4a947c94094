package force

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// dipoles is the dipole density of a body at the points of a Gauss rule: moments at places. Uniform and smooth densities do not
// cancel in it, so that it keeps all digits at any distance.
type dipoles struct{ x, p []r3.Vec }

// mostDipoles is the size of the largest rule, mostPairs that of the largest product of two: about 10 ms.
const (
	mostDipoles = 4096
	mostPairs   = 400_000
)

// dipoles returns the dipole density by the rule with n points a direction; nil if there is none or it has too many points.
func (p *part) dipoles(n int) *dipoles {
	if p.charge == nil {
		return nil
	}
	d := new(dipoles)
	for _, c := range p.cells {
		c.Nodes(n, func(x r3.Vec, w float64) {
			if len(d.x) <= mostDipoles {
				d.x = append(d.x, x)
				d.p = append(d.p, r3.Scale(w, p.charge.Polarization(pair.VecOf(x))))
			}
		})
	}
	if len(d.x) == 0 || len(d.x) > mostDipoles {
		return nil
	}
	return d
}

// mirrored returns the images of the dipoles.
func (o *other) mirrored(d *dipoles) *dipoles {
	if o.plane == nil || d == nil {
		return d
	}
	k := o.plane.Factor()
	for i := range d.x {
		d.x[i] = o.plane.Reflect(pair.VecOf(d.x[i])).Value()
		d.p[i] = r3.Scale(k, o.plane.Mirror(d.p[i]))
	}
	return d
}

// dipole adds the dipole p at r in a field, without stiffness.
func (s *sums) dipole(p, r r3.Vec, v *field.Value) {
	h := &v.Grad
	f := r3.Vec{X: h[0]*p.X + h[3]*p.Y + h[4]*p.Z, Y: h[3]*p.X + h[1]*p.Y + h[5]*p.Z, Z: h[4]*p.X + h[5]*p.Y + h[2]*p.Z}
	s.push(f, r3.Add(r3.Cross(p, v.G), r3.Cross(r, f)), -r3.Dot(p, v.G))
	size, far := r3.Norm(p), r3.Norm(r)
	fs := r3.Norm(f)
	s.size.add(Bounds{Force: fs, Torque: far*fs + size*r3.Norm(v.G), Energy: math.Abs(r3.Dot(p, v.G))}, 1)
	s.err.add(Bounds{Force: size * v.ErrGrad, Torque: size * (v.ErrG + far*v.ErrGrad), Energy: size * v.ErrG}, 1)
}

// push adds force, torque and energy.
func (s *sums) push(f, t r3.Vec, w float64) {
	s.v[0] += f.X
	s.v[1] += f.Y
	s.v[2] += f.Z
	s.v[3] += t.X
	s.v[4] += t.Y
	s.v[5] += t.Z
	s.v[6] += w
}

// between returns what the dipoles from do to the dipoles on.
//
// With w = p.q/r^3 - 3 (p.d)(q.d)/r^5 the energy of a pair is w/4pi, the force its negative gradient.
// Source: [Jackson1999] section 4.2; derivatives by hand, against differences in TestDipolePair.
func between(on, from *dipoles, about r3.Vec, stiff bool) (s sums) {
	const k = 1 / (4 * math.Pi)
	for i, x := range on.x {
		p := on.p[i]
		var g, f r3.Vec
		var h, q [6]float64
		for j, y := range from.x {
			m := from.p[j]
			d := r3.Vec{X: x.X - y.X, Y: x.Y - y.Y, Z: x.Z - y.Z}
			r2 := 1 / (d.X*d.X + d.Y*d.Y + d.Z*d.Z)
			r3i := k * r2 * math.Sqrt(r2)
			r5 := r3i * r2
			a := m.X*d.X + m.Y*d.Y + m.Z*d.Z
			b := p.X*d.X + p.Y*d.Y + p.Z*d.Z
			c := m.X*p.X + m.Y*p.Y + m.Z*p.Z
			ga := 3 * a * r5
			g.X += ga*d.X - r3i*m.X
			g.Y += ga*d.Y - r3i*m.Y
			g.Z += ga*d.Z - r3i*m.Z
			fd := r5 * (3*c - 15*a*b*r2)
			fm, fp := 3*b*r5, 3*a*r5
			f.X += fd*d.X + fm*m.X + fp*p.X
			f.Y += fd*d.Y + fm*m.Y + fp*p.Y
			f.Z += fd*d.Z + fm*m.Z + fp*p.Z
			if stiff {
				second(&h, &q, d, m, p, a, b, c, r2, r5)
			}
		}
		r := r3.Sub(x, about)
		t := r3.Add(r3.Cross(p, g), r3.Cross(r, f))
		w := -r3.Dot(p, g)
		s.push(f, t, w)
		fs, ps := r3.Norm(f), r3.Norm(p)
		s.size.add(Bounds{Force: fs, Torque: fs*r3.Norm(r) + ps*r3.Norm(g), Energy: math.Abs(w)}, 1)
		if stiff {
			s.moved(p, r, g, f, &h, &q)
		}
	}
	return s
}

// second adds the gradient of g and that of the force.
func second(h, q *[6]float64, d, m, p r3.Vec, a, b, c, r2, r5 float64) {
	t := 3 * r5
	e := r3.Vec{X: m.X*b + p.X*a, Y: m.Y*b + p.Y*a, Z: m.Z*b + p.Z*a}
	one := r5 * (3*c - 15*a*b*r2)
	dd := r5 * r2 * (105*a*b*r2 - 15*c)
	de := -15 * r5 * r2
	at := func(k int, di, dj, mi, mj, pi, pj, ei, ej, id float64) {
		h[k] += t * (mi*dj + di*mj + a*id - 5*a*di*dj*r2)
		q[k] += one*id + dd*di*dj + t*(mi*pj+pi*mj) + de*(di*ej+ei*dj)
	}
	at(0, d.X, d.X, m.X, m.X, p.X, p.X, e.X, e.X, 1)
	at(1, d.Y, d.Y, m.Y, m.Y, p.Y, p.Y, e.Y, e.Y, 1)
	at(2, d.Z, d.Z, m.Z, m.Z, p.Z, p.Z, e.Z, e.Z, 1)
	at(3, d.X, d.Y, m.X, m.Y, p.X, p.Y, e.X, e.Y, 0)
	at(4, d.X, d.Z, m.X, m.Z, p.X, p.Z, e.X, e.Z, 0)
	at(5, d.Y, d.Z, m.Y, m.Z, p.Y, p.Z, e.Y, e.Z, 0)
}

// moved adds the change of force and torque on the dipole p at r for small displacements and rotations.
func (s *sums) moved(p, r, g, f r3.Vec, h, q *[6]float64) {
	size := 0.0
	for k, x := range q {
		s.v[atGrad+k] += x
		size += x * x
	}
	s.size.Stiffness += math.Sqrt(size)
	for m, e := range [3]r3.Vec{{X: 1}, {Y: 1}, {Z: 1}} {
		dr, dp := r3.Cross(e, r), r3.Cross(e, p)
		df := r3.Add(apply(q, dr), apply(h, dp))
		dt := r3.Add(r3.Add(r3.Cross(dp, g), r3.Cross(p, apply(h, dr))), r3.Add(r3.Cross(dr, f), r3.Cross(r, df)))
		s.v[atMixed+3*m] += df.X
		s.v[atMixed+3*m+1] += df.Y
		s.v[atMixed+3*m+2] += df.Z
		s.v[atTurn+m] += dt.X
		s.v[atTurn+3+m] += dt.Y
		s.v[atTurn+6+m] += dt.Z
	}
}

// apply returns the symmetric tensor h times v.
func apply(h *[6]float64, v r3.Vec) r3.Vec {
	return r3.Vec{X: h[0]*v.X + h[3]*v.Y + h[4]*v.Z, Y: h[3]*v.X + h[1]*v.Y + h[5]*v.Z, Z: h[4]*v.X + h[5]*v.Y + h[2]*v.Z}
}

// far returns what happens between the dipole densities of two bodies; ok is false where small rules do not agree.
func far(p, q *part, o *other, g goal, about r3.Vec) (out outcome, ok bool) {
	box, known := o.bounds()
	if !known {
		return out, false
	}
	centre, reach := ballOf(box)
	distance := r3.Norm(r3.Sub(centre, p.centre))
	if !(distance > 2*(p.reach+reach)) {
		return out, false
	}
	start := firstRule((p.reach+reach)/distance, g.accuracy)
	var last sums
	for n := start; n <= start+6; n++ {
		on := p.dipoles(n)
		from := o.mirrored(q.dipoles(n))
		if on == nil || from == nil || len(on.x)*len(from.x) > mostPairs {
			return out, false
		}
		now := between(on, from, about, g.stiff)
		if n > start && out.settle(&now, &last, g) {
			out.nodes = len(on.x)
			return out, true
		}
		last = now
	}
	return out, false
}

// firstRule returns the number of points of the smaller of the two rules that are likely to agree: a rule with n points errs by
// ratio^(2n).
func firstRule(ratio, accuracy float64) int {
	n := int(math.Ceil(math.Log(accuracy)/(2*math.Log(ratio)))) - 1
	return min(max(n, 1), 8)
}

// settle makes the outcome of two rules and reports whether it is good enough.
func (o *outcome) settle(fine, coarse *sums, g goal) bool {
	o.total = *fine
	miss, low := fine.distance(coarse, g.reach, g.stiff), least(fine)
	for k := range miss {
		o.error[k] = miss[k] + low[k]
	}
	o.met = g.met(fine, o.error, low)
	return o.met
}

// small returns what a field does to the dipole density of a body that is small against its distance from the source.
func small(p *part, o *other, g goal, about r3.Vec) (out outcome, ok bool) {
	box, known := o.bounds()
	if !known || p.charge == nil || g.stiff {
		return out, false
	}
	ratio := p.reach / gap(box, r3.Box{Min: p.centre, Max: p.centre})
	if !(ratio < 0.2) {
		return out, false
	}
	start := firstRule(ratio, g.accuracy)
	var last sums
	for n := start; n <= start+4; n++ {
		d := p.dipoles(n)
		if d == nil {
			return out, false
		}
		now := d.inField(o, about)
		out.nodes += len(d.x)
		if n > start && out.settle(&now, &last, g) {
			return out, true
		}
		last = now
	}
	return out, false
}

// inField returns what the field does to the dipoles.
func (d *dipoles) inField(o *other, about r3.Vec) (s sums) {
	const chunk = 64
	v := field.NewValues(chunk, field.WantG|field.WantGrad|field.WantErr)
	for lo := 0; lo < len(d.x); lo += chunk {
		hi := min(lo+chunk, len(d.x))
		out := v.Slice(0, hi-lo)
		field.Evaluate(o.src, out, field.PointsOf(d.x[lo:hi]...), field.Outside)
		for i := range hi - lo {
			val := out.At(i)
			if !(val.ErrGrad < math.Inf(1)) { // not to be trusted: leave it to the faces
				s.err.Force = math.Inf(1)
				return s
			}
			s.dipole(d.p[lo+i], r3.Sub(d.x[lo+i], about), &val)
		}
	}
	return s
}
