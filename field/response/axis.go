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

// lean is what Along adds in one body: the component of p along the axis is mean + slope.(x - centroid), in the body's frame.
type lean struct {
	body        int
	mean, scale float64
	slope       r3.Vec
}

// rounds is the largest number of solutions to find what Along adds.
const rounds = 60

// settle solves, again and again where a body is anisotropic, until what Along adds no longer changes.
func (s *System) settle(ctx context.Context, materials []Material, applied field.Source, fixed []rigid) (*Response, error) {
	var leans []lean
	for k, m := range materials {
		if (m.Axis != r3.Vec{}) && m.Along != m.Chi {
			leans = append(leans, lean{body: k})
		}
	}
	for range rounds {
		all := append([]rigid(nil), fixed...)
		for _, n := range leans {
			if n.scale == 0 {
				continue
			}
			c, err := s.fix(n.body, materials[n.body].Chi, n.polarization(s, materials[n.body]))
			if err != nil {
				return nil, err
			}
			all = append(all, c)
		}
		r, err := s.once(ctx, materials, applied, all)
		if err != nil {
			return nil, err
		}
		change := 0.0
		for k := range leans {
			next, err := r.lean(leans[k].body)
			if err != nil {
				return nil, err
			}
			change = max(change, leans[k].blend(next, materials[leans[k].body]))
		}
		if change <= 1e-11 {
			return r, nil
		}
	}
	return nil, fmt.Errorf("response: %w: what Along adds still changes after %d rounds; bring Along nearer to Chi", ErrNotConverged, rounds)
}

// blend moves towards the next value by the share that converges fastest for a ball, and returns the relative change.
func (n *lean) blend(next lean, m Material) float64 {
	inBall := (m.Along - m.Chi) / (3 + m.Chi) // the next mean falls by that for a mean more by one
	w := 1 / (1 + inBall)
	d := r3.Sub(next.slope, n.slope)
	change := math.Abs(next.mean-n.mean) + r3.Norm(d)*next.scale
	size := math.Abs(next.mean) + r3.Norm(next.slope)*next.scale
	n.mean += w * (next.mean - n.mean)
	n.slope = r3.Add(n.slope, r3.Scale(w, d))
	n.scale = next.scale
	if size == 0 {
		return 0
	}
	return change / size
}

// frameOf returns a body in its own frame and where that stands.
func frameOf(b geom.Body) (geom.Body, geom.Pose) {
	if p, ok := b.(geom.Placed); ok {
		return p.Body, p.Pose
	}
	return b, geom.Pose{}
}

// polarization returns what Along adds.
func (n *lean) polarization(s *System, m Material) field.Affine {
	own, _ := frameOf(s.bodies[n.body])
	a := r3.Unit(m.Axis)
	p := field.Affine{Value: r3.Scale(n.mean, a), About: own.Centroid()}
	for i, ai := range components(a) {
		for j, bj := range components(n.slope) {
			p.Gradient[i][j] = ai * bj
		}
	}
	return p
}

// lean returns the affine function nearest to (Along - Chi) g.Axis in the mean over a body, from the nodes of its cells.
func (r *Response) lean(body int) (lean, error) {
	own, pose := frameOf(r.system.bodies[body])
	m := r.materials[body]
	a := r3.Unit(m.Axis)
	centre := own.Centroid()
	var at []r3.Vec
	var weight []float64
	for _, c := range own.Cells() {
		c.Nodes(6, func(x r3.Vec, w float64) {
			at = append(at, x)
			weight = append(weight, w)
		})
	}
	outer := make([]r3.Vec, len(at))
	for i, x := range at {
		outer[i] = pose.ToOuter(pair.VecOf(x)).Value()
	}
	whole := field.Sum{r}
	if r.applied != nil {
		whole = append(whole, r.applied)
	}
	v := field.NewValues(len(at), field.WantG)
	field.Evaluate(whole, v, field.PointsOf(outer...), field.Inside)
	var mean, volume float64
	var first r3.Vec
	for i, x := range at {
		g := r3.Dot(a, pose.VectorToLocal(r3.Vec{X: v.GX[i], Y: v.GY[i], Z: v.GZ[i]})) * (m.Along - m.Chi)
		mean += weight[i] * g
		volume += weight[i]
		first = r3.Add(first, r3.Scale(weight[i]*g, r3.Sub(x, centre)))
	}
	second := own.SecondMoment()
	var inverse mat.Dense
	if err := inverse.Inverse(mat.NewDense(3, 3, append(append(second[0][:], second[1][:]...), second[2][:]...))); err != nil {
		return lean{}, fmt.Errorf("response: body %d: second moment: %w; it is too thin to be anisotropic", body, err)
	}
	f := components(first)
	var slope [3]float64
	for i := range slope {
		for j := range f {
			slope[i] += inverse.At(i, j) * f[j]
		}
	}
	return lean{body: body, mean: mean / volume, scale: halfDiagonal(r.system.bounds[body]),
		slope: r3.Vec{X: slope[0], Y: slope[1], Z: slope[2]}}, nil
}
