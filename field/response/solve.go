package response

import (
	"context"
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"gonum.org/v1/gonum/spatial/r3"
)

// Material says how a body responds: p = p0 + chi g, with g the whole field inside.
type Material struct {
	// Chi is the susceptibility, from -1 (no field of g + p enters) to +Inf (conductor; iron without limit). Default 0: rigid.
	Chi float64
	// Axis, if not zero, makes the body anisotropic: Along is its susceptibility along Axis, in the frame of the body, and Chi
	// that across. What Along adds is taken as an affine polarization along the axis, the one nearest to (Along - Chi) g.Axis in
	// the mean over the body: exact for ellipsoids in affine fields whatever Along, and for the moment of every body to
	// first order in Along - Chi, as for the recoil of a magnet. Both are finite and above -1.
	Axis  r3.Vec
	Along float64
	// Fixed is p0 in the frame of the body, nil for none. It needs Chi above -1; in a conductor it has no effect.
	Fixed field.Polarization
	// Charge is the total charge of a conductor (Chi = +Inf) that is not connected. It is zero for every other body.
	Charge float64
}

func (m Material) check(body int) error {
	switch {
	case !(m.Chi >= -1):
		return fmt.Errorf("response: %w: body %d has the susceptibility %v; give -1 or more, +Inf for a conductor", ErrMaterial, body, m.Chi)
	case m.Chi == -1 && m.Fixed != nil:
		return fmt.Errorf("response: %w: body %d has the susceptibility -1 and a fixed part, which no finite charge can screen; leave Fixed nil or Chi above -1", ErrMaterial, body)
	case math.IsNaN(m.Charge) || math.IsInf(m.Charge, 0):
		return fmt.Errorf("response: %w: body %d has the charge %v; give a finite one", ErrMaterial, body, m.Charge)
	case m.Axis != r3.Vec{} && !(m.Along > -1 && m.Chi > -1 && !math.IsInf(m.Along, 1) && !math.IsInf(m.Chi, 1)):
		return fmt.Errorf("response: %w: body %d has the susceptibilities %v along its axis and %v across; give finite ones above -1, or no axis",
			ErrMaterial, body, m.Along, m.Chi)
	case m.Charge != 0 && !math.IsInf(m.Chi, 1):
		return fmt.Errorf("response: %w: body %d has the charge %v and the susceptibility %v; only conductors (+Inf) carry charge, add that of an insulator to the applied field",
			ErrMaterial, body, m.Charge, m.Chi)
	}
	return nil
}

// factors returns alpha and beta of the equation of a part of the boundary,
//
//	alpha sigma - beta K' sigma = beta n.g,   alpha : beta = (e + f)/2 : (e - f),   e = 1 + chi inside, f = 1 + chi beyond,
//
// which says that (1 + chi) g.n is the same on both sides. Scaled so that both stay finite.
func factors(inside, beyond float64) (alpha, beta float64) {
	switch {
	case inside == beyond:
		return 1, 0
	case math.IsInf(inside, 1):
		return 0.5, 1
	case math.IsInf(beyond, 1):
		return 0.5, -1
	}
	alpha, beta = 1+(inside+beyond)/2, inside-beyond
	if scale := max(math.Abs(alpha), math.Abs(beta)); scale > 1 || alpha < 0.25 {
		alpha, beta = alpha/scale, beta/scale
	}
	return alpha, beta
}

// factors returns alpha and beta of a part.
func (r *Response) factors(c int) (alpha, beta float64) {
	p := r.system.parts[c]
	beyond := 0.0
	if p.beyond >= 0 {
		beyond = r.materials[p.beyond].Chi
	}
	return factors(r.materials[p.body].Chi, beyond)
}

// rigid is a part of a body's charge that does not depend on the others: that of p0/(1 + chi), whose volume charge is the
// whole volume charge of the body, since div p = div p0 + chi div g = div p0 - chi div p.
type rigid struct {
	*bound.Charge
	factor float64
	body   int
}

// fix returns the charge of a fixed part of a body.
func (s *System) fix(body int, chi float64, p field.Polarization) (rigid, error) {
	c, err := bound.Of(s.bodies[body], p)
	if err != nil {
		return rigid{}, fmt.Errorf("response: body %d: %w", body, err)
	}
	return rigid{c, 1 / (1 + chi), body}, nil
}

// Solve returns the response to the applied field, which may be nil for none: what the bodies carry, each of its material,
// in that field and in each other's.
//
// Domain: all sources of the applied field lie outside the bodies, and not nearer to them than the size of a panel over 20
// (see Settings.Near).
// It fails with ErrMaterial for a material that cannot be, with ErrSourceInside where the applied field carries a charge inside
// a body, with ErrNotConverged, and with the context's error.
func (s *System) Solve(ctx context.Context, materials []Material, applied field.Source) (*Response, error) {
	if len(materials) != len(s.bodies) {
		return nil, fmt.Errorf("response: %w: %d materials for %d bodies; give one for each", ErrMaterial, len(materials), len(s.bodies))
	}
	var fixed []rigid
	for k, m := range materials {
		if err := m.check(k); err != nil {
			return nil, err
		}
		if m.Fixed == nil || math.IsInf(m.Chi, 1) {
			continue
		}
		c, err := s.fix(k, m.Chi, m.Fixed)
		if err != nil {
			return nil, err
		}
		fixed = append(fixed, c)
	}
	return s.settle(ctx, materials, applied, fixed)
}

// once solves with given fixed charge.
func (s *System) once(ctx context.Context, materials []Material, applied field.Source, fixed []rigid) (*Response, error) {
	r := &Response{system: s, materials: append([]Material(nil), materials...), applied: applied, rigid: fixed,
		layers: make([]layer, len(s.levels))}
	for k := len(s.levels) - 1; k >= 0; k-- { // the finest mesh decides which flux of the applied field is real
		var err error
		if r.layers[k], err = r.solve(ctx, &s.levels[k]); err != nil {
			return nil, err
		}
		if s.set.Progress != nil {
			s.set.Progress("solution", 1-float64(k)/float64(len(s.levels)))
		}
	}
	r.load()
	r.expand()
	r.whole = field.Sum{induced{r}}
	for _, c := range fixed {
		r.whole = append(r.whole, field.Scaled{Source: c.Charge, Factor: c.factor})
	}
	r.follow()
	r.report()
	return r, nil
}

// layer is the solved charge of one mesh.
type layer struct {
	charge   []float64 // of the nodes
	applied  []float64 // n.g at the nodes, of all that is not induced
	residual float64
	steps    int
}

// tight is the relative residual to which the equations are solved: a little above what rounding allows.
const tight = 1e-13

// solve solves on one mesh.
func (r *Response) solve(ctx context.Context, l *level) (layer, error) {
	s := r.system
	n := len(l.x)
	out := layer{applied: r.normals(l)}
	if err := r.balance(l, out.applied); err != nil {
		return out, err
	}
	alpha, beta := make([]float64, n), make([]float64, n)
	b := make([]float64, n)
	free := r.free(l)
	for c := range s.parts {
		al, be := r.factors(c)
		extra := 0.0
		if free[c] {
			extra = r.freeCharge(l, c, out.applied) / l.areas[c]
		}
		s.nodesOf(l, c, func(i int) {
			alpha[i], beta[i] = al, be
			b[i] = l.root[i] * (be*out.applied[i] + extra)
		})
	}
	apply := func(dst, v []float64) {
		multiply(dst, l.a, v)
		for i := range dst {
			dst[i] = alpha[i]*v[i] - beta[i]*dst[i]
		}
		for c := range s.parts {
			if !free[c] {
				continue
			}
			q := 0.0
			s.nodesOf(l, c, func(i int) { q += l.root[i] * v[i] })
			q /= l.areas[c]
			s.nodesOf(l, c, func(i int) { dst[i] += q * l.root[i] })
		}
	}
	v, residual, steps, err := gmres(ctx, apply, b, tight, 400)
	if err != nil {
		return out, fmt.Errorf("response: solution not done: %w", err)
	}
	if !(residual <= 1e-9) {
		return out, fmt.Errorf("response: %w: residual %.1e after %d steps on %d unknowns; refine the gaps (Settings.Gap), or look for bodies that nearly touch",
			ErrNotConverged, residual, steps, n)
	}
	out.residual, out.steps = residual, steps
	out.charge = make([]float64, n)
	for i := range v {
		out.charge[i] = l.root[i] * v[i]
	}
	return out, nil
}

// free tells for each part whether the equation leaves its charge open: alpha equals beta times the flux of its own charge out
// of it. That is so for the outer part of a conductor and for the cavities of a body with chi = -1.
func (r *Response) free(l *level) []bool {
	free := make([]bool, len(r.system.parts))
	for c := range free {
		al, be := r.factors(c)
		free[c] = al == be*l.enters[c][c]
	}
	return free
}

// freeCharge returns what the equation of a free part is to sum to so that the body has its charge. On the outer part of a
// conductor that is its own charge and what its cavities hold, which they screen: the flux of the applied field out of the part
// and the charges of the bodies that it encloses.
func (r *Response) freeCharge(l *level, c int, normal []float64) float64 {
	body := r.system.parts[c].body
	if !math.IsInf(r.materials[body].Chi, 1) {
		return 0
	}
	sum, seen := r.materials[body].Charge, map[int]bool{body: true}
	r.system.nodesOf(l, c, func(i int) { sum += l.area[i] * normal[i] })
	for d, p := range r.system.parts {
		if !seen[p.body] && l.enters[c][d] == 1 {
			seen[p.body] = true
			sum += r.materials[p.body].Charge
		}
	}
	return sum
}

// normals returns n.g of all that is not induced at the nodes, just outside the bodies.
func (r *Response) normals(l *level) []float64 {
	normal := make([]float64, len(l.x))
	v := field.NewValues(len(l.x), field.WantG)
	at := field.PointsOf(l.x...)
	at.Slack = make([]float64, len(l.x))
	add := func(src field.Source, factor float64) {
		field.Evaluate(src, v, at, field.Outside)
		for i, n := range l.n {
			normal[i] += factor * r3.Dot(n, r3.Vec{X: v.GX[i], Y: v.GY[i], Z: v.GZ[i]})
		}
	}
	if r.applied != nil {
		add(r.applied, 1)
	}
	for _, c := range r.rigid {
		for i := range at.Slack {
			at.Slack[i] = 1e-13 * halfDiagonal(r.system.bounds[c.body])
		}
		add(c.Charge, c.factor)
		clear(at.Slack)
	}
	return normal
}

// through is the share of the flux of the applied field out of a part below which it counts as an error of the mesh.
const through = 0.02

// balance takes off the applied field what the mesh makes of its flux out of the parts, which is zero where no source lies
// inside, and refuses sources in the bodies.
func (r *Response) balance(l *level, normal []float64) error {
	s := r.system
	fluxes, sizes := make([]float64, len(s.parts)), make([]float64, len(s.parts))
	for c, p := range s.parts {
		s.nodesOf(l, c, func(i int) {
			fluxes[c] += l.area[i] * normal[i]
			sizes[c] += l.area[i] * math.Abs(normal[i])
		})
		if math.IsNaN(fluxes[c]) || math.IsInf(fluxes[c], 0) {
			return fmt.Errorf("response: %w: the applied field does not exist on body %d; move the source off it", ErrSourceInside, p.body)
		}
	}
	if r.passed == nil {
		if err := r.judge(fluxes, sizes); err != nil {
			return err
		}
	}
	for c := range s.parts {
		if !r.passed[c] {
			s.nodesOf(l, c, func(i int) { normal[i] -= fluxes[c] / l.areas[c] })
		}
	}
	return nil
}

// judge decides for each part whether the applied field passes through it, from sources in a cavity, and refuses sources in the
// bodies.
func (r *Response) judge(fluxes, sizes []float64) error {
	s := r.system
	r.passed = make([]bool, len(s.parts))
	net, all := make([]float64, len(s.bodies)), make([]float64, len(s.bodies))
	for c, p := range s.parts {
		if math.Abs(fluxes[c]) <= through*sizes[c] {
			continue
		}
		r.passed[c] = true
		net[p.body] += fluxes[c]
		all[p.body] += sizes[c]
		if p.beyond >= 0 {
			net[p.beyond] -= fluxes[c]
			all[p.beyond] += sizes[c]
		}
	}
	for k := range net {
		if math.Abs(net[k]) > through*all[k] {
			return fmt.Errorf("response: %w: the applied field has the flux %.3g out of body %d, of %.3g in all; put its charges outside the body, or if they are, farther off or among Settings.Near",
				ErrSourceInside, net[k], k, all[k])
		}
	}
	return nil
}
