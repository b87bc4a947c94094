package geom

import (
	"math"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// chartGrid is the number of points a direction at which a chart is sampled.
const chartGrid = 9

// sampledChart is a chart with points of it.
type sampledChart struct {
	chart  Chart
	face   int
	sign   float64 // of the face
	points [chartGrid * chartGrid]r3.Vec
	box    r3.Box // contains the chart
}

// sampleChart samples a chart. Between neighbours a curve leaves the box of its points by h^2 |f"|/8 at most; twice the
// largest second difference over 8 is added, in both directions.
func sampleChart(c Chart) sampledChart {
	s := sampledChart{chart: c, sign: 1, box: nothing()}
	for i := range chartGrid {
		for j := range chartGrid {
			x, _, _ := c.At(float64(i)/(chartGrid-1), float64(j)/(chartGrid-1))
			s.points[i*chartGrid+j] = x
			s.box = include(s.box, x)
		}
	}
	var bend [2]r3.Vec
	for i := range chartGrid {
		for j := 1; j < chartGrid-1; j++ {
			bend[0] = greater(bend[0], s.bend(j*chartGrid+i, chartGrid))
			bend[1] = greater(bend[1], s.bend(i*chartGrid+j, 1))
		}
	}
	margin := r3.Scale(0.25, r3.Add(bend[0], bend[1]))
	s.box.Min, s.box.Max = r3.Sub(s.box.Min, margin), r3.Add(s.box.Max, margin)
	return s
}

// bend returns the second difference at a sample.
func (s *sampledChart) bend(at, step int) r3.Vec {
	return r3.Sub(r3.Add(s.points[at-step], s.points[at+step]), r3.Scale(2, s.points[at]))
}

// greater returns the greater magnitudes, component by component.
func greater(a, b r3.Vec) r3.Vec {
	return r3.Vec{X: max(a.X, math.Abs(b.X)), Y: max(a.Y, math.Abs(b.Y)), Z: max(a.Z, math.Abs(b.Z))}
}

// foot is the point of a chart that is nearest to a point x.
type foot struct {
	u, v     float64
	from     r3.Vec // x less the foot
	distance float64
}

// near returns the foot of x, by damped Gauss-Newton steps from the nearest sample and from the nearest one of each quarter.
func (s *sampledChart) near(x pair.Vec) foot {
	best := foot{distance: math.Inf(1)}
	v := x.Value()
	var starts [4]int
	var least [4]float64
	for k := range least {
		least[k] = math.Inf(1)
	}
	for i := range s.points {
		quarter := 0
		if i/chartGrid > chartGrid/2 {
			quarter = 2
		}
		if i%chartGrid > chartGrid/2 {
			quarter++
		}
		if d := r3.Norm2(r3.Sub(s.points[i], v)); d < least[quarter] {
			starts[quarter], least[quarter] = i, d
		}
	}
	for _, i := range starts {
		f := s.descend(x, float64(i/chartGrid)/(chartGrid-1), float64(i%chartGrid)/(chartGrid-1))
		if f.distance < best.distance {
			best = f
		}
	}
	return best
}

// descend walks from a start to the nearest point.
func (s *sampledChart) descend(x pair.Vec, u, v float64) foot {
	at, xu, xv := s.chart.At(u, v)
	r := lessPoint(x, at)
	for range 60 {
		du, dv := gaussNewton(r, xu, xv, u, v)
		moved := false
		for t := 1.0; t > 1e-3; t /= 2 {
			nu, nv := clamp(u+t*du), clamp(v+t*dv)
			next, nxu, nxv := s.chart.At(nu, nv)
			if q := lessPoint(x, next); r3.Norm2(q) < r3.Norm2(r) {
				moved = r3.Norm2(q) < (1-1e-12)*r3.Norm2(r) // what remains along the chart is below 1e-6 of the distance
				u, v, r, xu, xv = nu, nv, q, nxu, nxv
				break
			}
		}
		if !moved {
			break
		}
	}
	return foot{u: u, v: v, from: r, distance: r3.Norm(r)}
}

// lessPoint returns x - at, with the low part of x.
func lessPoint(x pair.Vec, at r3.Vec) r3.Vec {
	return r3.Vec{X: x.X.AddFloat(-at.X).Value(), Y: x.Y.AddFloat(-at.Y).Value(), Z: x.Z.AddFloat(-at.Z).Value()}
}

func clamp(t float64) float64 { return min(max(t, 0), 1) }

// gaussNewton returns the step of the parameters that makes r smallest for a flat chart, along the sides of the square where it
// would leave it.
func gaussNewton(r, xu, xv r3.Vec, u, v float64) (du, dv float64) {
	a, b, c := r3.Norm2(xu), r3.Dot(xu, xv), r3.Norm2(xv)
	gu, gv := r3.Dot(r, xu), r3.Dot(r, xv)
	tiny := 1e-30 + 1e-14*(a+c)
	a, c = a+tiny, c+tiny
	heldU := u == 0 && gu < 0 || u == 1 && gu > 0
	heldV := v == 0 && gv < 0 || v == 1 && gv > 0
	if det := a*c - b*b; !heldU && !heldV {
		return (c*gu - b*gv) / det, (a*gv - b*gu) / det
	}
	if !heldU {
		du = gu / a
	}
	if !heldV {
		dv = gv / c
	}
	return du, dv
}

// normals calls visit with the outward unit normals at a foot. Where the chart is drawn together into a point they are
// those around that point.
func (s *sampledChart) normals(f foot, visit func(n r3.Vec)) {
	_, xu, xv := s.chart.At(f.u, f.v)
	n := r3.Cross(xu, xv)
	if size := r3.Norm2(xu) + r3.Norm2(xv); r3.Norm(n) > 1e-9*size {
		visit(r3.Scale(s.sign, r3.Unit(n)))
		return
	}
	const aside, around = 1e-5, 8
	for k := range around + 1 {
		u, v := min(max(f.u, aside), 1-aside), min(max(f.v, aside), 1-aside)
		if t := aside + (1-2*aside)*float64(k)/around; r3.Norm2(xu) < r3.Norm2(xv) {
			u = t
		} else {
			v = t
		}
		_, xu, xv := s.chart.At(u, v)
		if n := r3.Cross(xu, xv); n != (r3.Vec{}) {
			visit(r3.Scale(s.sign, r3.Unit(n)))
		}
	}
}

// crease is the difference of unit normals above which faces meet in an edge; below, in a seam.
const crease = 1e-4

// Locate tells where x lies, from the nearest point of the faces: on it, or on the side of the normal there. Where faces
// meet, that face tells the side whose normal is closest to the line from the foot to x.
func (p *Parametric) Locate(x pair.Vec, slack float64) Place {
	v := x.Value()
	tol := OnTolerance(p.bounds, v, slack)
	if beyond(p.bounds, v, tol) {
		return outside()
	}
	best := math.Inf(1)
	for i := range p.sampled {
		for _, at := range p.sampled[i].points {
			best = min(best, r3.Norm2(r3.Sub(at, v)))
		}
	}
	best = math.Sqrt(best) * (1 + grain)
	for i := range p.sampled {
		s := &p.sampled[i]
		if toBox(s.box, v) <= best {
			best = min(best, s.near(x).distance)
		}
	}
	place := outside()
	steepest, sign := 0.0, 0.0
	within := max(best, tol) + 1e-12*p.extent
	if best <= tol {
		within = tol
	}
	for i := range p.sampled {
		s := &p.sampled[i]
		if toBox(s.box, v) > within {
			continue
		}
		f := s.near(x)
		if f.distance > within {
			continue
		}
		s.normals(f, func(n r3.Vec) {
			switch h := r3.Dot(f.from, n); {
			case best > tol:
				if math.Abs(h) > steepest {
					steepest, sign = math.Abs(h), h
				}
			case place.Region == Outside:
				place = Place{Region: On, Face: s.face, Normal: n}
			case !place.Edge && r3.Norm(r3.Sub(n, place.Normal)) > crease:
				place = onEdge()
			}
		})
	}
	switch {
	case best <= tol:
		return place
	case sign < 0:
		return inside()
	}
	return outside()
}

// toBox returns the distance of x from a box.
func toBox(b r3.Box, x r3.Vec) float64 {
	gap := func(low, high, v float64) float64 { return max(low-v, v-high, 0) }
	return math.Hypot(math.Hypot(gap(b.Min.X, b.Max.X, x.X), gap(b.Min.Y, b.Max.Y, x.Y)), gap(b.Min.Z, b.Max.Z, x.Z))
}
