package law

import (
	"math"

	rules "example.com/boundpole/geom/gauss"
	"gonum.org/v1/gonum/spatial/r3"
)

// Every integral is taken by two rules. The tolerance for quadrature is the difference of the two, but never more than
// the bound of the coarse rule for a field whose charge is at least four radii away: so a rough field cannot excuse
// itself. Within such a ball the term of degree l of the field is at most (l+1) 4^-l of its size.
const (
	coarse, fine = 12, 16           // points of Gauss a direction; the sphere rules are exact to degree 2n-1
	ballRatio    = 4                // distance of charge over radius
	ballBound    = 25 * 0x1p-48     // (2n+1) 4^(-2n) for n = coarse
	loopBound    = 2 * 49 * 0x1p-48 // the same for the coarse rule on a loop of 2n points, and its two aliases
	u            = 0x1p-53          // rounding unit of float64
)

// node is a point of a rule; the weights of a rule add up to 1.
type node struct {
	n r3.Vec
	w float64
}

// sphere returns the rule for the mean over a unit sphere, Gauss in the height and trapezoid round, turned by axes.
func sphere(n int, axes [3]r3.Vec) []node {
	z, w := gauss(n, -1, 1)
	var rule []node
	for i := range z {
		s := math.Sqrt((1 - z[i]) * (1 + z[i]))
		for j := range 2 * n {
			sin, cos := math.Sincos(math.Pi * (float64(j) + 0.5) / float64(n))
			rule = append(rule, node{turn(axes, s*cos, s*sin, z[i]), w[i] / float64(4*n)})
		}
	}
	return rule
}

// circle returns the trapezoid rule for the mean over a unit circle, turned by axes; the tangent is axes[2] x n.
func circle(n int, axes [3]r3.Vec) []node {
	rule := make([]node, n)
	for j := range rule {
		sin, cos := math.Sincos(2 * math.Pi * float64(j) / float64(n))
		rule[j] = node{turn(axes, cos, sin, 0), 1 / float64(n)}
	}
	return rule
}

// gauss returns points and weights of Gauss-Legendre on an interval.
func gauss(n int, lo, hi float64) (x, w []float64) {
	return rules.On(n, lo, hi)
}

// toEnd returns points on (0, length] and the weights that extrapolate a function on them to 0.
func toEnd(n int, length float64) (h, w []float64) {
	h, _ = gauss(n, 0, length)
	w = make([]float64, n)
	for i := range w {
		w[i] = 1
		for j := range h {
			if j != i {
				w[i] *= h[j] / (h[j] - h[i])
			}
		}
	}
	return h, w
}

func turn(axes [3]r3.Vec, x, y, z float64) r3.Vec {
	return r3.Add(r3.Scale(x, axes[0]), r3.Add(r3.Scale(y, axes[1]), r3.Scale(z, axes[2])))
}

// axes returns a random right-handed frame.
func (k *kit) axes() [3]r3.Vec {
	e := k.direction()
	f := r3.Unit(r3.Cross(e, k.direction()))
	return [3]r3.Vec{f, r3.Cross(e, f), e}
}

// direction returns a random unit vector.
func (k *kit) direction() r3.Vec {
	return r3.Unit(r3.Vec{X: k.rng.NormFloat64(), Y: k.rng.NormFloat64(), Z: k.rng.NormFloat64()})
}

// around returns a random point on the sphere of q bounding radii.
func (k *kit) around(q float64) r3.Vec { return r3.Add(k.centre, r3.Scale(q*k.size, k.direction())) }

// ball is a ball about x with no charge within ballRatio radii.
type ball struct {
	x      r3.Vec
	radius float64
}

// balls returns the empty balls to check: in the region, from near to far, and by the faces.
func (k *kit) balls() []ball {
	var all []ball
	take := func(x r3.Vec) {
		// below 1e-9 of |x| the points of the rule themselves are rounded too much
		if r := k.clear(x) / ballRatio; r > 1e-9*(r3.Norm(x)+k.size) && !math.IsInf(r, 0) {
			all = append(all, ball{x, r})
		}
	}
	d := r3.Sub(k.Region.Max, k.Region.Min)
	for range 20 * k.Samples {
		if len(all) >= k.Samples {
			break
		}
		take(r3.Add(k.Region.Min, r3.Vec{X: d.X * k.rng.Float64(), Y: d.Y * k.rng.Float64(), Z: d.Z * k.rng.Float64()}))
	}
	for i := range 8 {
		take(k.around(1.5 * math.Exp2(float64(i))))
	}
	for i, f := range k.Faces {
		if i >= k.Samples {
			break
		}
		h := k.reach(f) * math.Pow(10, -1-float64(i%6))
		take(r3.Add(f.X, r3.Scale(h, f.Normal)))
		take(r3.Sub(f.X, r3.Scale(h, f.Normal)))
	}
	return all
}
