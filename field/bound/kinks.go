package bound

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/cubature"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// kink is where the charge of a power law is not smooth, or infinite: the z axis or the origin, and how much.
type kink struct {
	axis  bool
	power float64 // of p
}

// kinkOf returns the kink of a polarization; ok is false where it has none.
func kinkOf(p field.Polarization) (k kink, ok bool) {
	switch q := p.(type) {
	case field.Times:
		return kinkOf(q.Polarization)
	case field.RadialPower:
		k = kink{axis: true, power: q.Power}
	case field.CentralPower:
		k = kink{power: q.Power}
	default:
		return k, false
	}
	_, smooth := polynomialOf(p)
	return k, !smooth
}

// grade returns the power m of the substitution t = w^m that makes the charge along a ray smooth at the kink: there it is t^(power+1)
// dt/t round an axis, t^(power+2) dt/t round a point. Where no small m makes an integer of the exponent, m makes it large.
func (k kink) grade() float64 {
	e := k.power + 2
	if k.axis {
		e = k.power + 1
	}
	for m := 1.0; m <= 4; m++ {
		if r := m * e; math.Abs(r-math.Round(r)) < 1e-9 {
			return m
		}
	}
	return max(4, math.Ceil(6/e))
}

// swept is the space between the kink and a chart: w runs from the kink, along straight lines (level ones from an axis).
type swept struct {
	chart geom.Chart
	kink  kink
	grade float64
}

// At returns the point and its derivatives.
func (s swept) At(u, v, w float64) (x, xu, xv, xw r3.Vec) {
	x, xu, xv = s.chart.At(u, v)
	t, dt := math.Pow(w, s.grade), s.grade*math.Pow(w, s.grade-1)
	xw = r3.Scale(dt, x)
	draw := func(v r3.Vec) r3.Vec { return r3.Scale(t, v) }
	if s.kink.axis {
		xw.Z = 0
		draw = func(v r3.Vec) r3.Vec { return r3.Vec{X: t * v.X, Y: t * v.Y, Z: v.Z} }
	}
	return draw(x), draw(xu), draw(xv), xw
}

// away returns the vector from the kink to x.
func (k kink) away(x r3.Vec) r3.Vec {
	if k.axis {
		x.Z = 0
	}
	return x
}

// sweep returns blocks that fill the body from the kink to its faces, on which the charge is smooth. ok is false where the kink lies
// outside, or where the body is not star-shaped about it.
func (c *Charge) sweep(k kink) (blocks []geom.Block, ok bool) {
	size := c.reachOfKink(k)
	volume := 0.0
	for _, f := range c.local.Faces() {
		charted, ok := f.Surface.(geom.Charted)
		if !ok {
			return nil, false
		}
		least, most := math.Inf(1), 0.0
		f.Surface.Nodes(12, func(x, n r3.Vec, w float64) {
			h := f.Sign() * r3.Dot(k.away(x), n)
			least, most = min(least, h), max(most, h)
			volume += w * h
		})
		if least < -1e-12*size {
			return nil, false
		}
		if most <= 1e-12*size { // the face runs through the kink
			continue
		}
		for _, chart := range outward(f, charted) {
			blocks = append(blocks, swept{chart, k, k.grade()})
		}
	}
	directions := 3.0
	if k.axis {
		directions = 2
	}
	return blocks, math.Abs(volume/directions-c.local.Volume()) <= 1e-6*c.local.Volume() // rules of faces are not exact
}

// reachOfKink returns the greatest distance of the bounds from the kink.
func (c *Charge) reachOfKink(k kink) float64 {
	box := c.local.Bounds()
	return r3.Norm(r3.Vec{X: max(-box.Min.X, box.Max.X), Y: max(-box.Min.Y, box.Max.Y), Z: max(-box.Min.Z, box.Max.Z)})
}

// outward returns the charts of a face with the outward normal of the body.
func outward(f geom.Face, surface geom.Charted) []geom.Chart {
	charts := surface.Charts()
	if f.Inward {
		for i := range charts {
			charts[i] = cubature.Reversed{Chart: charts[i]}
		}
	}
	return charts
}

// fanned is a triangle a, a + b, a + b + c: u runs from the corner a, where the charge has its kink, to the opposite edge.
type fanned struct {
	a, b, c r3.Vec
	grade   float64
}

// At returns the point and its derivatives.
func (f fanned) At(u, v float64) (x, xu, xv r3.Vec) {
	t := math.Pow(u, f.grade)
	ray := r3.Add(f.b, r3.Scale(v, f.c))
	return r3.Add(f.a, r3.Scale(t, ray)), r3.Scale(f.grade*math.Pow(u, f.grade-1), ray), r3.Scale(t, f.c)
}

// chartsAbout returns charts of a face on which the charge is smooth: where an axis pierces a polygon that carries charge there, the
// triangles from that point to its edges.
func (c *Charge) chartsAbout(k kink, f geom.Face, surface geom.Charted) []geom.Chart {
	polygon, ok := f.Surface.(geom.Polygon)
	n, plane := planeNormal(f)
	if !ok || !plane || !k.axis || math.Abs(n.Z) < 1e-12 || math.Hypot(n.X, n.Y) == 0 {
		return outward(f, surface)
	}
	v := polygon.Vertices
	pole := r3.Vec{Z: r3.Dot(n, v[0]) / n.Z}
	size := c.reachOfKink(k)
	var charts []geom.Chart
	for i := range v {
		a, b := r3.Sub(v[i], pole), r3.Sub(v[(i+1)%len(v)], pole)
		if f.Inward {
			a, b = b, a
		}
		switch h := r3.Dot(r3.Cross(a, b), n); {
		case h < -1e-12*size*size:
			return outward(f, surface)
		case h > 1e-12*size*size:
			charts = append(charts, fanned{pole, a, r3.Sub(b, a), k.grade()})
		}
	}
	return charts
}
