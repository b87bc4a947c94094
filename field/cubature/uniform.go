package cubature

import (
	"math"

	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

// uniform adds what the density at the apex gives to the gradient, from the faces of the near cells. It returns what is to be added
// to the estimate: +Inf on the boundary.
func (v *Volume) uniform(w *work, x, low r3.Vec, tol float64, scale *gap, total *sums, errs *gap) float64 {
	w.feet, w.rims = w.feet[:0], w.rims[:0]
	first := 0
	for i := range w.inner {
		c := w.inner[i].cell
		for k := range c.faces {
			f := placedFoot{panel: &c.faces[k], foot: c.faces[k].foot(x)}
			f.w = r3.Add(r3.Sub(x, f.x), low)
			w.feet = append(w.feet, f)
			if f.distance < w.feet[first].distance {
				first = len(w.feet) - 1
			}
		}
	}
	if len(w.feet) == 0 {
		return 0
	}
	f := &w.feet[first]
	f.aligned = true
	if f.distance <= tol { // aside of all faces: which side does not matter in the body, and there is no claim on its boundary
		aside := r3.Add(f.normal(f.panel), r3.Add(r3.Scale(0.37, unit(f.xu)), r3.Scale(0.61, unit(f.xv))))
		f.w = r3.Scale(1e-15*max(f.panel.scale, f.panel.radius), aside)
	}
	var jump r3.Vec
	for i := range w.feet {
		g := &w.feet[i]
		if i != first && f.distance < 0x1p-5*f.panel.scale {
			g.align(f)
		}
		in := &w.inner[i/6]
		rho := in.apex()
		if g.distance <= tol {
			jump = r3.Add(jump, r3.Scale(rho, g.normal(g.panel)))
		}
		if g.distance < edgeReach*g.panel.radius {
			for side := range 4 {
				g.rim(w, r3.Vec{}, side/2, side%2 == 1, rho)
			}
		}
		if rho == 0 {
			continue
		}
		s, e := v.nearFace(w, g, rho, scale)
		total.add(&s, rho)
		errs.add(gap{t: math.Abs(rho) * e.t})
	}
	if r3.Norm(jump) > 1e-9*v.peak {
		return math.Inf(1)
	}
	return 2 * u * (v.scale + scaleOf(x)) * w.edgeSlope(tol)
}

// edgeSlope returns a bound on how fast the gradient changes with the place of the near edges: sum |rho n m|/(pi d) over edges, n m
// summed over the faces that meet there. Inside a body they cancel.
func (w *work) edgeSlope(tol float64) (slope float64) {
	for i := range w.rims {
		a := &w.rims[i]
		if a.done {
			continue
		}
		var sum [6]float64
		lone := 0.0
		for j := i; j < len(w.rims); j++ {
			b := &w.rims[j]
			if j > i && (b.done || !a.with(b, tol)) {
				continue
			}
			b.done = true
			for k, t := range outer(b.n, b.m) {
				sum[k] += t
			}
			if b.own {
				lone += r3.Norm(b.m)
			}
		}
		slope += (frobenius(&sum) + lone) / (math.Pi * max(a.distance, tol))
	}
	return slope
}

// outer returns the symmetric part of a b^T.
func outer(a, b r3.Vec) [6]float64 {
	return [6]float64{a.X * b.X, a.Y * b.Y, a.Z * b.Z, 0.5 * (a.X*b.Y + a.Y*b.X), 0.5 * (a.X*b.Z + a.Z*b.X), 0.5 * (a.Y*b.Z + a.Z*b.Y)}
}

// nearFace integrates the area vector over R^2 over a face.
func (v *Volume) nearFace(w *work, f *placedFoot, rho float64, scale *gap) (s sums, e gap) {
	last := math.Inf(1)
	for k := v.firstLevel(); k < len(levels); k++ {
		before := w.nodes
		a, b := w.near(f, r3.Vec{}, k, 0, true), w.near(f, r3.Vec{}, k, 1, true)
		d := apart(&a, &b)
		if d.t > last {
			return s, e
		}
		s, e, last = b, d, d.t
		part := gap{1, 1, scale.t / max(math.Abs(rho), 1e-300)}
		if v.enough(&b, &d, &part, field.WantGrad) || w.nodes+3*(w.nodes-before) > v.settings.MaxNodes {
			break
		}
	}
	return s, e
}
