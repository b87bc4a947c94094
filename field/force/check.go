package force

import (
	"context"
	"errors"
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// Way is force and torque by one way, with bounds on the norms of their errors; +Inf where the way is not open.
type Way struct {
	Force, Torque           r3.Vec
	ForceError, TorqueError float64
}

// Comparison is the same force and torque by three ways that share no integral.
type Comparison struct {
	Direct Result // integrals over the charge
	Work   Way    // changes of the energy for small displacements and rotations; not open in contact
	Stress Way    // the stress of the joint field over a box in the air about the part; not open where boxes along the axes do not part
	// Spread is the greatest difference between two ways that are open, of the force and of the torque.
	Spread struct{ Force, Torque float64 }
}

// Agrees reports whether all ways agree within the sum of their errors.
func (c *Comparison) Agrees() bool {
	for _, w := range [2]Way{c.Work, c.Stress} {
		if r3.Norm(r3.Sub(w.Force, c.Direct.Force)) > w.ForceError+c.Direct.Error.Force ||
			r3.Norm(r3.Sub(w.Torque, c.Direct.Torque)) > w.TorqueError+c.Direct.Error.Torque {
			return false
		}
	}
	return true
}

// Check computes On and the same again by virtual work and by the stress in the air; it costs some thirty times as much. Others must
// have a potential and bounds.
//
// Source: stress g g - g^2/2, of which only the products of own and other field are integrated, because those of one alone vanish
// ([Jackson1999] section 6.7).
func Check(ctx context.Context, c *bound.Charge, others field.Source, s *Settings) (Comparison, error) {
	var out Comparison
	set, err := s.checked()
	if err != nil {
		return out, err
	}
	set.Stiffness = false
	if out.Direct, err = On(ctx, c, others, &set); err != nil && !errors.Is(err, ErrNotConverged) {
		return out, err
	}
	all := apart(others, c)
	if out.Work, err = virtual(ctx, c, all, set); err != nil {
		return out, err
	}
	if out.Stress, err = stress(ctx, c, all, set); err != nil {
		return out, err
	}
	ways := [3]Way{{out.Direct.Force, out.Direct.Torque, 0, 0}, out.Work, out.Stress}
	for i := range ways {
		for j := range i {
			a, b := &ways[i], &ways[j]
			if a.ForceError < math.Inf(1) && b.ForceError < math.Inf(1) {
				out.Spread.Force = max(out.Spread.Force, r3.Norm(r3.Sub(a.Force, b.Force)))
				out.Spread.Torque = max(out.Spread.Torque, r3.Norm(r3.Sub(a.Torque, b.Torque)))
			}
		}
	}
	return out, nil
}

// closed is a way that is not open.
func closed() Way { return Way{ForceError: math.Inf(1), TorqueError: math.Inf(1)} }

// room returns the distance of the part's box from those of the others.
func room(c *bound.Charge, all []other) float64 {
	least := math.Inf(1)
	for i := range all {
		box, ok := all[i].bounds()
		if _, constant := all[i].src.(field.Constant); constant {
			continue
		}
		if !ok {
			return 0
		}
		least = min(least, gap(c.Bounds(), box))
	}
	return least
}

// virtual differentiates the energy: central differences with three steps, extrapolated twice.
func virtual(ctx context.Context, c *bound.Charge, all []other, set Settings) (Way, error) {
	_, reach := ballOf(c.Bounds())
	free := room(c, all)
	if free == 0 {
		return closed(), nil
	}
	step := min(0.2*free, 0.2*reach)
	set.Accuracy = 1e-12
	energy := func(pose geom.Pose) (w, e float64, err error) {
		moved := c.At(pose)
		p, _ := partOf(moved)
		g := goal{accuracy: set.Accuracy, reach: p.reach, only: [4]bool{2: true}}
		for i := range all {
			o, err := share(ctx, &p, &all[i], g, set)
			if err != nil {
				return w, e, err
			}
			w += all[i].factor * o.total.v[atEnergy]
			e += math.Abs(all[i].factor) * o.error[2]
		}
		return w, e, nil
	}
	arm := reach + r3.Norm(r3.Sub(centreOf(c), set.About))
	var f, t, fe, te [3]float64
	for k, axis := range [3]r3.Vec{{X: 1}, {Y: 1}, {Z: 1}} {
		var err error
		f[k], fe[k], err = slope(step, func(h float64) (float64, float64, error) { return energy(geom.Translate(r3.Scale(h, axis))) })
		if err != nil {
			return closed(), err
		}
		t[k], te[k], err = slope(step/arm, func(h float64) (float64, float64, error) {
			turn, err := geom.Turn(axis, h*180/math.Pi)
			if err != nil {
				return 0, 0, err
			}
			return energy(turn.About(set.About))
		})
		if err != nil {
			return closed(), err
		}
	}
	norm := func(v [3]float64) float64 { return math.Sqrt(v[0]*v[0] + v[1]*v[1] + v[2]*v[2]) }
	return Way{r3.Vec{X: -f[0], Y: -f[1], Z: -f[2]}, r3.Vec{X: -t[0], Y: -t[1], Z: -t[2]}, norm(fe), norm(te)}, nil
}

func centreOf(c *bound.Charge) r3.Vec {
	x, _ := ballOf(c.Bounds())
	return x
}

// slope returns the derivative at 0 of a function that comes with an error, and a bound on its error: a quarter of what the
// smallest of the four steps has changed, and what the errors of the function make of it.
func slope(h float64, f func(h float64) (v, e float64, err error)) (d, e float64, err error) {
	var s [4]float64
	noise := 0.0
	for k := range s {
		a, ea, err := f(h)
		if err != nil {
			return 0, 0, err
		}
		b, eb, err := f(-h)
		if err != nil {
			return 0, 0, err
		}
		s[k] = (a - b) / (2 * h)
		noise = max(noise, (ea+eb)/(2*h))
		h /= 2
	}
	for order := 1; order < len(s); order++ {
		before := s[len(s)-2] // the best that three of four steps give, when order is the last
		f := math.Ldexp(1, 2*order) - 1
		for k := len(s) - 1; k >= order; k-- {
			s[k] += (s[k] - s[k-1]) / f
		}
		e = math.Abs(s[len(s)-1]-before) / 4
	}
	return s[len(s)-1], e + 2*noise, nil
}

// stress integrates the stress over a box about the part.
func stress(ctx context.Context, c *bound.Charge, all []other, set Settings) (Way, error) {
	free := room(c, all)
	if free == 0 {
		return closed(), nil
	}
	box := c.Bounds()
	_, reach := ballOf(box)
	d := min(0.5*free, reach)
	d3 := r3.Vec{X: d, Y: d, Z: d}
	box.Min, box.Max = r3.Sub(box.Min, d3), r3.Add(box.Max, d3)
	centre, _ := ballOf(box)
	shell := geom.At(geom.Box{Size: r3.Sub(box.Max, box.Min)}, geom.Translate(centre))
	var p part
	p.centre, p.reach = ballOf(box)
	p.rho = 1
	for _, f := range shell.Faces() {
		charted, ok := f.Surface.(geom.Charted)
		if !ok {
			return closed(), fmt.Errorf("force: face %q of a box has no charts", f.Name)
		}
		p.faces = append(p.faces, face{surface: f.Surface, charts: charted.Charts(), sign: f.Sign()})
	}
	var sum outcome
	for i := range all {
		w := newWork(all[i].src, set.About, &p, false)
		w.known = true // all edges are off the surface, and the box is cut where needed
		w.own, w.ownValues = c, field.NewValues(mostNodes, field.WantG|field.WantErr)
		g := goal{accuracy: min(set.Accuracy, 1e-9), reach: p.reach, only: [4]bool{true, true}}
		o, err := integrate(ctx, &p, w, g, set.MaxNodes)
		if err != nil {
			return closed(), err
		}
		sum.total.add(&o.total, all[i].factor)
		for k, e := range o.error {
			sum.error[k] += math.Abs(all[i].factor) * e
		}
	}
	return Way{sum.total.force(), sum.total.torque(), sum.error[0], sum.error[1]}, nil
}

// stress adds the products of the part's own field and the other in the stress through the surface.
func (w *work) stress(s *sums, other *field.Values) {
	m := w.points.Len()
	own := w.ownValues.Slice(0, m)
	field.Evaluate(w.own, own, &w.points, field.Outside)
	for i := range m {
		a, b := own.At(i), other.At(i)
		n := w.n[i]
		t := r3.Add(r3.Scale(r3.Dot(b.G, n), a.G), r3.Scale(r3.Dot(a.G, n), b.G))
		t = r3.Scale(w.rho[i], r3.Sub(t, r3.Scale(r3.Dot(a.G, b.G), n)))
		r := r3.Sub(r3.Vec{X: w.x[i], Y: w.y[i], Z: w.z[i]}, w.about)
		s.push(t, r3.Cross(r, t), 0)
		as, bs := r3.Norm(a.G), r3.Norm(b.G)
		size, miss, far := w.rho[i]*as*bs, 3*w.rho[i]*(as*b.ErrG+bs*a.ErrG), r3.Norm(r)
		s.size.add(Bounds{Force: size, Torque: size * far}, 1)
		s.err.add(Bounds{Force: miss, Torque: miss * far}, 1)
	}
}
