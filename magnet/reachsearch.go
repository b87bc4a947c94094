package magnet

import (
	"cmp"
	"math"
	"slices"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

const (
	reachWays    = 500    // directions of the search, free
	reachSteps   = 64     // steps a radius within the sphere that holds all parts, free
	reachOutward = 1.0625 // ratio of steps beyond it, free
	reachStarts  = 6      // of the best samples from which the search goes on, free
)

// ways returns directions spread evenly over the sphere on a spiral of constant density, and those of the axes.
func ways() []r3.Vec {
	w := []r3.Vec{{X: 1}, {X: -1}, {Y: 1}, {Y: -1}, {Z: 1}, {Z: -1}}
	golden := math.Pi * (3 - math.Sqrt(5))
	for i := range reachWays {
		z := 1 - (2*float64(i)+1)/reachWays
		sin, cos := math.Sincos(golden * float64(i))
		r := math.Sqrt(1 - z*z)
		w = append(w, r3.Vec{X: r * cos, Y: r * sin, Z: z})
	}
	return w
}

// outermost returns the radius of a sphere about the centre beyond which the field is not reached: outside a sphere that
// holds all charge the greatest field is on the sphere.
func (s *contour) outermost(w []r3.Vec) float64 {
	const between = 1.2 // how much the field may rise between two of the directions, generous for low orders
	r := s.radius
	for ; !math.IsInf(r, 1); r *= reachOutward {
		at := make([]r3.Vec, len(w))
		for i := range w {
			at[i] = r3.Add(s.centre, r3.Scale(r, w[i]))
		}
		if slices.Max(s.sizes(at)) < s.least/between {
			break
		}
	}
	return r
}

// sizes returns |H| at points; +Inf where there is no field, on edges and dipoles.
func (s *contour) sizes(at []r3.Vec) []float64 {
	v := field.NewValues(len(at), field.WantG)
	field.Evaluate(s.source, v, field.PointsOf(at...), field.Mean)
	out := make([]float64, len(at))
	for i := range out {
		out[i] = r3.Norm(v.At(i).G)
		if math.IsNaN(out[i]) {
			out[i] = math.Inf(1)
		}
	}
	return out
}

// outside reports whether a point is in no body.
func (s *contour) outside(x r3.Vec) bool {
	p := pair.VecOf(x)
	for _, b := range s.bodies {
		if b.Locate(p, 0).Region == geom.Inside {
			return false
		}
	}
	return true
}

// holds reports whether the field is reached at x, outside all bodies.
func (s *contour) holds(x r3.Vec) bool { return s.outside(x) && s.sizes([]r3.Vec{x})[0] >= s.least }

// reached returns samples at which the field is reached.
func (s *contour) reached() []r3.Vec {
	w := ways()
	end := s.outermost(w)
	var radii []float64
	for k := range reachSteps {
		radii = append(radii, s.radius*float64(k)/reachSteps)
	}
	for r := s.radius; r < end; r *= reachOutward {
		radii = append(radii, r)
	}
	var found []r3.Vec
	keep := func(at []r3.Vec) {
		for i, size := range s.sizes(at) {
			if size >= s.least && s.outside(at[i]) {
				found = append(found, at[i])
			}
		}
	}
	at := make([]r3.Vec, len(radii))
	for _, way := range w {
		for i, r := range radii {
			at[i] = r3.Add(s.centre, r3.Scale(r, way))
		}
		keep(at)
	}
	keep(s.offFaces())
	return found
}

// offFaces returns points in front of the faces of the magnets and about dipoles and poles, from near to as far as the size of
// the model.
func (s *contour) offFaces() []r3.Vec {
	var at []r3.Vec
	for _, b := range s.magnets {
		for _, f := range b.Faces() {
			f.Surface.Nodes(4, func(x, n r3.Vec, _ float64) {
				for d := s.radius; d > 1e-3*s.radius; d /= 2 {
					at = append(at, r3.Add(x, r3.Scale(f.Sign()*d, n)))
				}
			})
		}
	}
	for _, p := range s.places {
		for _, way := range compass {
			for d := s.radius; d > 1e-3*s.radius; d /= 2 {
				at = append(at, r3.Add(p, r3.Scale(d, way)))
			}
		}
	}
	return at
}

// farthest returns the point outside all bodies at which the field is reached and the measure is greatest, searching from the
// best of the starts, and by how much the measure may be off.
func (s *contour) farthest(starts []r3.Vec, measure func(r3.Vec) float64) (best r3.Vec, off float64) {
	type start struct {
		x     r3.Vec
		value float64
	}
	all := make([]start, len(starts))
	for i, x := range starts {
		all[i] = start{x, measure(x)}
	}
	slices.SortStableFunc(all, func(a, b start) int { return cmp.Compare(b.value, a.value) })
	greatest, tried := math.Inf(-1), 0
	for i, a := range all {
		if tried == reachStarts {
			break
		}
		step := s.radius / reachSteps
		if r := r3.Norm(r3.Sub(a.x, s.centre)); r > s.radius {
			step = (reachOutward - 1) * r
		}
		if slices.ContainsFunc(all[:i], func(b start) bool { return r3.Norm(r3.Sub(a.x, b.x)) < 3*step }) {
			continue // beside a better one
		}
		tried++
		x := s.climb(a.x, step, measure)
		x, e := s.slide(x, step, measure)
		if v := measure(x); v > greatest {
			best, greatest, off = x, v, e
		}
	}
	return best, off
}

// compass is the 26 directions of a cube's faces, edges and corners.
var compass = func() (w []r3.Vec) {
	for i := range 27 {
		if v := (r3.Vec{X: float64(i%3 - 1), Y: float64(i/3%3 - 1), Z: float64(i/9 - 1)}); v != (r3.Vec{}) {
			w = append(w, r3.Unit(v))
		}
	}
	return w
}()

// climb walks within the region to a greater measure, until steps are below 1e-9 of the first.
func (s *contour) climb(x r3.Vec, step float64, measure func(r3.Vec) float64) r3.Vec {
	value := measure(x)
	for h := step; h > 1e-9*step; {
		moved := false
		for _, way := range compass {
			y := r3.Add(x, r3.Scale(h, way))
			if v := measure(y); v > value*(1+0x1p-50) && s.holds(y) {
				x, value, moved = y, v, true
				break
			}
		}
		if !moved {
			h /= 2
		}
	}
	return x
}

// slide walks on the contour |H| = least to a greater measure, where x is on it or comes to it by a small step; otherwise x
// is the greatest of all places around and stays. It returns by how much the measure may be off: by the estimate of the field over its
// slope, and the last step.
func (s *contour) slide(x r3.Vec, step float64, measure func(r3.Vec) float64) (r3.Vec, float64) {
	x, n, off, ok := s.onto(x)
	if !ok {
		return x, 1e-9 * step
	}
	value := measure(x)
	h := step
	for range 400 {
		if h < 1e-8*step {
			break
		}
		p := r3.Unit(r3.Cross(n, leastOf(n)))
		q := r3.Cross(n, p)
		moved := false
		for k := range 8 {
			sin, cos := math.Sincos(float64(k) * math.Pi / 4)
			y, m, e, ok := s.onto(r3.Add(x, r3.Add(r3.Scale(h*cos, p), r3.Scale(h*sin, q))))
			if !ok || !s.outside(y) {
				continue
			}
			if v := measure(y); v > value*(1+0x1p-50) {
				x, n, off, value, moved = y, m, e, v, true
				break
			}
		}
		if !moved {
			h /= 2
		}
	}
	return x, off + 0x1p-52*(r3.Norm(x)+s.radius) + h*h/max(value, h)
}

// onto returns the point of the contour near x, the direction in which the field falls, and how far the point may be off; not
// ok where Newton's method does not find it beside x.
func (s *contour) onto(x r3.Vec) (at, falls r3.Vec, off float64, ok bool) {
	v := field.NewValues(1, field.WantG|field.WantGrad|field.WantErr)
	at = x
	reach := 0.1 * (s.fromSurface(x) + s.radius/reachSteps)
	for range 50 {
		field.Evaluate(s.source, v, field.PointsOf(at), field.Mean)
		g := v.At(0)
		size := r3.Norm(g.G)
		rise := r3.Scale(1/size, times(g.Grad, g.G)) // gradient of |H|
		slope := r3.Norm(rise)
		falls = r3.Scale(-1/slope, rise)
		move := (size - s.least) / slope
		at = r3.Add(at, r3.Scale(move, falls))
		if !(math.Abs(move) < reach) {
			return x, falls, 0, false
		}
		if math.Abs(move) <= 0x1p-50*(r3.Norm(at)+s.radius) {
			return at, falls, (g.ErrG+0x1p-50*size)/slope + math.Abs(move), true
		}
	}
	return x, falls, 0, false
}

// leastOf returns the axis that is least aligned with n.
func leastOf(n r3.Vec) r3.Vec {
	x, y, z := math.Abs(n.X), math.Abs(n.Y), math.Abs(n.Z)
	switch {
	case x <= y && x <= z:
		return r3.Vec{X: 1}
	case y <= z:
		return r3.Vec{Y: 1}
	}
	return r3.Vec{Z: 1}
}

// times returns the symmetric matrix xx, yy, zz, xy, xz, yz times v.
func times(m [6]float64, v r3.Vec) r3.Vec {
	return r3.Vec{
		X: m[0]*v.X + m[3]*v.Y + m[4]*v.Z,
		Y: m[3]*v.X + m[1]*v.Y + m[5]*v.Z,
		Z: m[4]*v.X + m[5]*v.Y + m[2]*v.Z,
	}
}
