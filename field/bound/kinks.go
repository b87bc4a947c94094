package bound

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/cubature"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
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

// sweep returns blocks that fill the body from the kink to its faces, on which the charge is smooth, and what has to be taken out again:
// the blocks of faces that look towards the kink, over which the law goes on. ok is false where the kink is not in the body, or where a
// face looks both ways.
func (c *Charge) sweep(k kink) (blocks, hollow []geom.Block, ok bool) {
	if !c.touches(k) {
		return nil, nil, false
	}
	size := c.reachOfKink(k)
	volume := 0.0
	for _, f := range c.local.Faces() {
		charted, ok := f.Surface.(geom.Charted)
		if !ok {
			return nil, nil, false
		}
		least, most := math.Inf(1), math.Inf(-1)
		f.Surface.Nodes(12, func(x, n r3.Vec, w float64) {
			h := f.Sign() * r3.Dot(k.away(x), n)
			least, most = min(least, h), max(most, h)
			volume += w * h
		})
		switch small := 1e-12 * size; {
		case least >= -small && most <= small: // the face runs through the kink
		case least >= -small:
			for _, chart := range c.smoothCharts(k, f, charted) {
				blocks = append(blocks, swept{chart, k, k.grade()})
			}
		case most <= small:
			for _, chart := range c.smoothCharts(k, f, charted) {
				hollow = append(hollow, swept{cubature.Reversed{Chart: chart}, k, k.grade()})
			}
		default:
			return nil, nil, false
		}
	}
	directions := 3.0
	if k.axis {
		directions = 2
	}
	return blocks, hollow, math.Abs(volume/directions-c.local.Volume()) <= 1e-6*c.local.Volume() // rules of faces are not exact
}

// touches reports whether the kink runs through the body or along its surface.
func (c *Charge) touches(k kink) bool {
	at := func(x r3.Vec) bool { return c.inner.Locate(pair.VecOf(x), 0).Region != geom.Outside }
	if !k.axis {
		return at(r3.Vec{})
	}
	const samples = 257
	box := c.local.Bounds()
	for i := range samples {
		if at(r3.Vec{Z: box.Min.Z + (box.Max.Z-box.Min.Z)*float64(i)/(samples-1)}) {
			return true
		}
	}
	return false
}

// reachOfKink returns the greatest distance of the bounds from the kink.
func (c *Charge) reachOfKink(k kink) float64 {
	box := c.local.Bounds()
	return r3.Norm(r3.Vec{X: max(-box.Min.X, box.Max.X), Y: max(-box.Min.Y, box.Max.Y), Z: max(-box.Min.Z, box.Max.Z)})
}

// smoothCharts returns charts of a face, with the outward normal of the body, that are smooth as seen from an axis: those of a sphere or
// ellipsoid have the axis in their midst unless they are drawn from the poles.
func (c *Charge) smoothCharts(k kink, f geom.Face, surface geom.Charted) []geom.Chart {
	semi, round := r3.Vec{}, false
	switch s := f.Surface.(type) {
	case geom.SphereSurface:
		semi, round = r3.Vec{X: s.Radius, Y: s.Radius, Z: s.Radius}, true
	case geom.EllipsoidSurface:
		semi, round = s.SemiAxes, true
	}
	if !round || !k.axis {
		return outward(f, surface.Charts())
	}
	var charts []geom.Chart
	for quarter := range 4 {
		charts = append(charts, polar{semi, quarter, 1, k.grade()}, polar{semi, quarter, -1, k.grade()})
	}
	return outward(f, charts)
}

// polar is an eighth of an ellipsoid: u runs from a pole to the equator, v along the azimuth.
type polar struct {
	semi    r3.Vec
	quarter int
	pole    float64 // +1 or -1
	grade   float64
}

// At returns the point and its derivatives.
func (p polar) At(u, v float64) (x, xu, xv r3.Vec) {
	if p.pole < 0 { // the other sense, so that the normal is outward
		v = 1 - v
	}
	st, ct := math.Sincos(math.Pi / 2 * math.Pow(u, p.grade))
	dt := math.Pi / 2 * p.grade * math.Pow(u, p.grade-1)
	sp, cp := math.Sincos(math.Pi / 2 * v)
	for range p.quarter {
		sp, cp = cp, -sp
	}
	w := math.Pi / 2 * p.pole
	x = r3.Vec{X: p.semi.X * st * cp, Y: p.semi.Y * st * sp, Z: p.pole * p.semi.Z * ct}
	xu = r3.Vec{X: p.semi.X * ct * dt * cp, Y: p.semi.Y * ct * dt * sp, Z: -p.pole * p.semi.Z * st * dt}
	xv = r3.Vec{X: -w * p.semi.X * st * sp, Y: w * p.semi.Y * st * cp}
	return x, xu, xv
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
		return c.smoothCharts(k, f, surface)
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
			return c.smoothCharts(k, f, surface)
		case h > 1e-12*size*size:
			charts = append(charts, fanned{pole, a, r3.Sub(b, a), k.grade()})
		}
	}
	return charts
}

// blockCharge returns the charge of a power law in a block: rho is homogeneous about the kink, so that by Euler's theorem the integral of
// it is that of rho times the distance of the tangent plane from the kink over the sides, divided by the degree of rho dV.
func (c *Charge) blockCharge(k kink, b geom.Block) (q float64, err error) {
	degree := k.power + 2
	if k.axis {
		degree = k.power + 1
	}
	density := func(x, n r3.Vec) float64 {
		h := r3.Dot(k.away(x), n)
		if h == 0 {
			return 0
		}
		return c.rho(x) * h
	}
	for axis := range 3 {
		for _, upper := range [2]bool{false, true} {
			l, err := cubature.NewLayer([]geom.Chart{cubature.SideOf(b, axis, upper)}, density, &cubature.Settings{MaxPanels: 256})
			if err != nil {
				return 0, err
			}
			part, _ := l.Charge()
			q += part / degree
		}
	}
	return q, nil
}

// cellCharge returns the charge of a cell that is one of several which a resolved rule serves together, and its magnitude, or what is given
// where it has no blocks.
func (c *Charge) cellCharge(cell geom.Cell, q, size float64) (float64, float64) {
	k, _ := kinkOf(c.p)
	blocked, ok := cell.(geom.Blocked)
	if !ok {
		return q, size
	}
	sum := 0.0
	for _, b := range blocked.Blocks() {
		part, err := c.blockCharge(k, b)
		if err != nil {
			return q, size
		}
		sum += part
	}
	return sum, math.Abs(sum)
}
