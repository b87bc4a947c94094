package response

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// trend is how the three meshes converge: errors go like order^-k, with k told by the ratio of the differences of successive
// meshes. On smooth bodies they fall faster than any power, and what is told is then on the safe side; beside edges the
// powers of the singularity rule.
type trend struct {
	ratio    []float64 // of (second mesh to third)/(first to second), falling with k
	rest     []float64 // what the third leaves, in units of second to third
	observed float64   // the ratio of field and density together
	least    float64   // the least that rest is taken for
}

// rounding is the relative error of the rules on the pieces of panels (TestSphere: 4e-12).
const rounding = 2e-11

// safety is what estimates are multiplied with: powers do not describe three meshes exactly.
const safety = 3

// rough is the least that the third mesh is taken to leave where there are edges or small gaps: what the power 5 leaves of the
// orders 6 and 8. The density near an edge goes like a power between -1/3 and 0 of the distance, and smooth parts that converge
// faster can hide that on three meshes, as a gap that the first mesh does not resolve hides how the second does.
const rough = 0.3

func newTrend(order int) trend {
	var t trend
	for k := 0.5; k < 40; k *= 1.05 {
		n := orders(order)
		e := func(level int) float64 { return math.Pow(float64(n[level])/float64(order), -k) }
		first, second := e(0)-e(1), e(1)-1
		t.ratio = append(t.ratio, second/first)
		t.rest = append(t.rest, 1/second)
	}
	return t
}

// share returns the error of the third mesh in units of what it differs by from the second.
func (t *trend) share(ratio float64) float64 {
	for k, r := range t.ratio {
		if ratio >= r {
			return max(t.rest[k], t.least)
		}
	}
	return t.least
}

// left returns an estimate of the error that the third mesh leaves, of what the second differs by from the first and the
// third from the second. A small difference by chance is held against the ratio observed elsewhere.
func (t *trend) left(first, second float64) float64 {
	if first == 0 && second == 0 {
		return 0
	}
	return safety * max(second, t.observed*first) * t.share(max(second/first, t.observed))
}

// limit returns the value to which three meshes tend and an estimate: the value of the third moved by what the power law
// leaves out where the differences follow one, with the size of that as estimate.
func (t *trend) limit(v [3]float64) Value {
	first, second := v[1]-v[0], v[2]-v[1]
	estimate := t.left(math.Abs(first), math.Abs(second)) + rounding*math.Abs(v[2])
	if ratio := second / first; ratio > 0 && ratio < 0.6 {
		v[2] += second * t.share(ratio)
	}
	return Value{v[2], estimate}
}

// follow observes how the field converges at points around and inside the bodies, and the density on them, which does so more
// slowly beside edges and gaps. The mean of the two on a logarithmic scale is what is taken of both.
func (r *Response) follow() {
	s := r.system
	r.trend = newTrend(s.set.Order)
	if s.rough {
		r.trend.least = rough
	}
	l := &s.levels[2]
	var all, area float64
	for i, q := range r.layers[2].charge {
		all += math.Abs(q)
		area += l.area[i]
	}
	r.density, r.size = all/area, math.Sqrt(area)
	w := probes.Get().(*probe)
	defer w.release()
	var first, second float64
	for k := range s.bodies {
		centre := r3.Scale(0.5, r3.Add(s.bounds[k].Min, s.bounds[k].Max))
		half := r3.Sub(s.bounds[k].Max, centre)
		for i := range 26 {
			d := [3]float64{float64(i%3) - 0.983, float64(i/3%3) - 1.019, float64(i/9) - 0.971} // off planes of symmetry
			for _, f := range [2]float64{0.37, 1.3} {
				x := r3.Add(centre, r3.Vec{X: f * d[0] * half.X, Y: f * d[1] * half.Y, Z: f * d[2] * half.Z})
				w.at(r, x, -1, 0, false)
				a, b := r3.Norm(r3.Sub(w.sums[1].g, w.sums[0].g)), r3.Norm(r3.Sub(w.sums[2].g, w.sums[1].g))
				if sum := a + b; sum-sum == 0 { // else on a node or an edge
					first, second = math.Hypot(first, a), math.Hypot(second, b)
				}
			}
		}
	}
	coarse, fine := r.differ(1), r.differ(2)
	if first > 0 && coarse > 0 {
		r.trend.observed = min(math.Sqrt(second/first*fine/coarse), 1)
	}
}

// differ returns the integral of |difference| of the densities of mesh k and mesh k - 1 over all bodies. It is taken of the
// charge per parameter, which exists everywhere, at the nodes of mesh k.
func (r *Response) differ(k int) float64 {
	s := r.system
	coarse, fine := &s.levels[k-1], &s.levels[k]
	n, m := coarse.order, fine.order
	at := make([]float64, m*n)
	for a, x := range fine.tables.rule.x {
		coarse.tables.rule.basis(at[a*n:a*n+n], x)
	}
	sum := 0.0
	for t := range s.tiles {
		for b := range m {
			for a := range m {
				f := 0.0
				for j := range n {
					for i := range n {
						c := t*n*n + j*n + i
						f += at[b*n+j] * at[a*n+i] * (r.layers[k-1].charge[c] / coarse.weight[c])
					}
				}
				c := t*m*m + b*m + a
				sum += math.Abs(f*fine.weight[c] - r.layers[k].charge[c])
			}
		}
	}
	return sum
}
