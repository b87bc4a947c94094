package response

import (
	"context"
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/mat"
	"gonum.org/v1/gonum/spatial/r3"
)

// inside returns a point well inside a body: of the nodes of its cells the one farthest from its boundary.
func (s *System) inside(body int) (r3.Vec, error) {
	var best r3.Vec
	depth := 0.0
	for _, c := range s.bodies[body].Cells() {
		c.Nodes(4, func(x r3.Vec, _ float64) {
			if s.locators[body].Locate(pair.VecOf(x), 0).Region != geom.Inside {
				return
			}
			if _, d := geom.Nearest(s.bodies[body], x); d > depth {
				best, depth = x, d
			}
		})
	}
	if depth == 0 {
		return best, fmt.Errorf("response: body %d has no cell with a point inside; give cells that fill it", body)
	}
	return best, nil
}

// Potential returns the potential at a point well inside a body, of everything: of a conductor it is the potential. It is NaN
// where the applied field has none.
//
// Units: natural, those of the applied field times length; zero at infinity if the applied field's is.
func (r *Response) Potential(body int) (Value, error) {
	x, err := r.system.inside(body)
	if err != nil {
		return Value{}, err
	}
	v := r.potentials(x)
	known := r.knownPotential(x)
	for k := range v {
		v[k] += known.Phi
	}
	p := r.trend.limit(v)
	p.Estimate += known.ErrPhi + rounding*r.density*r.size
	return p, nil
}

// potentials returns those of the induced charge on the three meshes.
func (r *Response) potentials(x r3.Vec) (v [3]float64) {
	w := probes.Get().(*probe)
	defer w.release()
	w.at(r, x, -1, 0, false)
	for k := range v {
		v[k] = over4Pi * w.sums[k].phi
	}
	return v
}

// knownPotential returns the value of the applied field and of the fixed charge.
func (r *Response) knownPotential(x r3.Vec) field.Value {
	var sum field.Sum
	if r.applied != nil {
		sum = append(sum, r.applied)
	}
	sum = append(sum, r.whole[1:]...)
	return field.At(sum, x, field.Mean, field.WantPhi|field.WantErr)
}

// Capacitance returns the matrix C of the conductors among the materials (Chi = +Inf), in their order: Q = C V, in the
// presence of the other bodies.
//
// Units: natural, a length: with V = phi/eps0 the capacitance is eps0 C (a lone sphere of radius a has 4 pi a).
func (s *System) Capacitance(ctx context.Context, materials []Material) ([][]Value, error) {
	which := conductors(materials)
	n := len(which)
	if n == 0 {
		return nil, fmt.Errorf("response: %w: no conductor among %d materials; give Chi = +Inf to at least one", ErrMaterial, len(materials))
	}
	var elastance [3]*mat.Dense
	for k := range elastance {
		elastance[k] = mat.NewDense(n, n, nil)
	}
	var t trend
	for j, body := range which {
		charged := uncharged(materials)
		charged[body].Charge = 1
		r, err := s.Solve(ctx, charged, nil)
		if err != nil {
			return nil, err
		}
		if r.trend.observed >= t.observed {
			t = r.trend
		}
		for i, other := range which {
			x, err := s.inside(other)
			if err != nil {
				return nil, err
			}
			for k, v := range r.potentials(x) {
				elastance[k].Set(i, j, v)
			}
		}
	}
	var c [3]mat.Dense
	for k := range c {
		if err := c[k].Inverse(elastance[k]); err != nil {
			return nil, fmt.Errorf("response: %w: potentials of unit charges: %w; look for conductors that nearly touch", ErrNotConverged, err)
		}
	}
	values := make([][]Value, n)
	for i := range values {
		values[i] = make([]Value, n)
		for j := range values[i] {
			values[i][j] = t.limit([3]float64{c[0].At(i, j), c[1].At(i, j), c[2].At(i, j)})
		}
	}
	return values, nil
}

// Hold returns the response with the conductors (Chi = +Inf, in their order) held at potentials, zero at infinity; their
// charges come out.
//
// Units: natural (V = phi/eps0).
func (s *System) Hold(ctx context.Context, materials []Material, potentials []float64, applied field.Source) (*Response, error) {
	which := conductors(materials)
	if len(which) != len(potentials) {
		return nil, fmt.Errorf("response: %w: %d potentials for %d conductors; give one for each material with Chi = +Inf", ErrMaterial, len(potentials), len(which))
	}
	c, err := s.Capacitance(ctx, materials)
	if err != nil {
		return nil, err
	}
	floating := uncharged(materials)
	r, err := s.Solve(ctx, floating, applied)
	if err != nil {
		return nil, err
	}
	rise := make([]Value, len(which))
	for i, body := range which {
		v, err := r.Potential(body)
		if err != nil {
			return nil, err
		}
		if math.IsNaN(v.Value) {
			return nil, fmt.Errorf("response: conductor %d (body %d) cannot be held at a potential: the applied field has none there; use a source with a potential", i, body)
		}
		rise[i] = Value{potentials[i] - v.Value, v.Estimate}
	}
	doubt := make([]float64, len(materials))
	for i, body := range which {
		for j, v := range rise {
			floating[body].Charge += c[i][j].Value * v.Value
			doubt[body] += c[i][j].Estimate*math.Abs(v.Value) + math.Abs(c[i][j].Value)*v.Estimate
		}
	}
	held, err := s.Solve(ctx, floating, applied)
	if err != nil {
		return nil, err
	}
	held.doubt = doubt
	return held, nil
}

// conductors returns the indices of the materials that are conductors.
func conductors(materials []Material) []int {
	var which []int
	for k, m := range materials {
		if math.IsInf(m.Chi, 1) {
			which = append(which, k)
		}
	}
	return which
}

// uncharged returns a copy without charges.
func uncharged(materials []Material) []Material {
	c := append([]Material(nil), materials...)
	for k := range c {
		c[k].Charge = 0
	}
	return c
}
