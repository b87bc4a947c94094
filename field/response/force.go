package response

import (
	"fmt"
	"math"

	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

// shares reports whether a part of the boundary of a body is that of another too.
func (s *System) shares(body int) bool {
	for _, p := range s.parts {
		if p.beyond >= 0 && (p.body == body || p.beyond == body) {
			return true
		}
	}
	return false
}

// Force returns the force on a body and the torque about a point, from the applied field and the other bodies acting on all
// its charge; its own charge adds nothing.
//
// Units: natural, charge times g: multiply by mu0 for magnetization in A/m, by 1/eps0 for polarization in C/m^2.
// Domain: bodies that share no part of their boundary with another; for others the error says so.
// Accuracy: the estimate is that of the meshes, TestForce; it leaves out what the rule on the nodes does to sources nearer than
// a panel over 20.
func (r *Response) Force(body int, about r3.Vec) (force, torque Vector, err error) {
	s := r.system
	if s.shares(body) {
		return force, torque, fmt.Errorf("response: body %d shares a part of its boundary with another: the force between the two has no meaning in charge alone; give a gap", body)
	}
	var f, t [3][3]float64
	for k := range s.levels {
		l := &s.levels[k]
		add := func(x r3.Vec, q float64, g r3.Vec) {
			for i, v := range components(g) {
				f[k][i] += q * v
			}
			for i, v := range components(r3.Cross(r3.Sub(x, about), g)) {
				t[k][i] += q * v
			}
		}
		var at []r3.Vec
		var charge []float64
		for c, p := range s.parts {
			if p.body == body {
				s.nodesOf(l, c, func(i int) {
					at = append(at, l.x[i])
					charge = append(charge, r.layers[k].charge[i]+r.fixedOn(body, l.x[i], l.n[i])*l.area[i])
				})
			}
		}
		for _, c := range r.rigid {
			if c.body != body {
				continue
			}
			for _, v := range c.Volumes {
				v.Cell.Nodes(l.order, func(x r3.Vec, w float64) {
					if rho := c.VolumeDensity(x); rho != 0 {
						at = append(at, x)
						charge = append(charge, c.factor*rho*w)
					}
				})
			}
		}
		for i, g := range r.outer(at, body, k) {
			add(at[i], charge[i], g)
		}
	}
	return r.vector(f), r.vector(t), nil
}

// fixedOn returns the density of the fixed charge on a face.
func (r *Response) fixedOn(body int, x, n r3.Vec) float64 {
	sigma := 0.0
	for _, c := range r.rigid {
		if c.body == body {
			sigma += c.factor * c.Density(x, n)
		}
	}
	return sigma
}

// outer returns g at points of a body on one mesh, of all but the body itself.
func (r *Response) outer(at []r3.Vec, body, k int) []r3.Vec {
	g := make([]r3.Vec, len(at))
	points := field.PointsOf(at...)
	v := field.NewValues(len(at), field.WantG)
	add := func(src field.Source, factor float64) {
		field.Evaluate(src, v, points, field.Outside)
		for i := range g {
			g[i] = r3.Add(g[i], r3.Scale(factor, r3.Vec{X: v.GX[i], Y: v.GY[i], Z: v.GZ[i]}))
		}
	}
	if r.applied != nil {
		add(r.applied, 1)
	}
	for _, c := range r.rigid {
		if c.body != body {
			add(c.Charge, c.factor)
		}
	}
	w := probes.Get().(*probe)
	defer w.release()
	for b := range r.system.bodies {
		if b == body {
			continue
		}
		for i, x := range at {
			w.at(r, x, b, k, false)
			g[i] = r3.Add(g[i], r3.Scale(over4Pi, w.sums[k].g))
		}
	}
	return g
}

func components(v r3.Vec) [3]float64 { return [3]float64{v.X, v.Y, v.Z} }

// vector returns the limit of three vectors.
func (r *Response) vector(v [3][3]float64) Vector {
	var c [3]Value
	size := 0.0
	for i := range c {
		c[i] = r.trend.limit([3]float64{v[0][i], v[1][i], v[2][i]})
		size = math.Hypot(size, c[i].Estimate)
	}
	return Vector{r3.Vec{X: c[0].Value, Y: c[1].Value, Z: c[2].Value}, size}
}

// Energy returns the energy of the bodies in the applied field: (1/2) int sigma phi_applied dA, half of what rigid bodies with
// the same charge would have, since the charge grew with the field. It is -(1/2) int p.g_applied dV.
//
// Units: natural, charge times potential.
// Domain: bodies without a fixed part and without charge of their own, in an applied field with a potential; NaN otherwise.
func (r *Response) Energy() Value {
	nan := Value{math.NaN(), math.Inf(1)}
	for _, m := range r.materials {
		if m.Charge != 0 || m.Fixed != nil {
			return nan
		}
	}
	if r.applied == nil {
		return Value{}
	}
	var w [3]float64
	for k := range w {
		l := &r.system.levels[k]
		v := field.NewValues(len(l.x), field.WantPhi)
		field.Evaluate(r.applied, v, field.PointsOf(l.x...), field.Outside)
		for i, q := range r.layers[k].charge {
			w[k] += 0.5 * q * v.Phi[i]
		}
		for _, c := range r.rigid { // of what is anisotropic
			w[k] += r.fixedEnergy(c, k)
		}
	}
	if math.IsNaN(w[2]) {
		return nan
	}
	return r.trend.limit(w)
}

// fixedEnergy returns (1/2) int sigma phi_applied dA + (1/2) int rho phi_applied dV of fixed charge, on the nodes of a mesh.
func (r *Response) fixedEnergy(c rigid, k int) float64 {
	l := &r.system.levels[k]
	sum := 0.0
	phi := func(x r3.Vec) float64 { return field.At(r.applied, x, field.Mean, field.WantPhi).Phi }
	for p, part := range r.system.parts {
		if part.body == c.body {
			r.system.nodesOf(l, p, func(i int) { sum += l.area[i] * c.Density(l.x[i], l.n[i]) * phi(l.x[i]) })
		}
	}
	for _, v := range c.Volumes {
		v.Cell.Nodes(l.order, func(x r3.Vec, w float64) {
			if rho := c.VolumeDensity(x); rho != 0 {
				sum += w * rho * phi(x)
			}
		})
	}
	return 0.5 * c.factor * sum
}
