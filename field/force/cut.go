package force

import (
	"math"
	"slices"

	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// nearby is the distance of an edge from a plane face, in the size of the face, below which the face is cut along it: measured, at
// larger distances halving panels is cheaper.
const nearby = 0.03

// cutAlong cuts the plane faces of the part along the edges of the other that are close to them, so that the field is singular, or
// nearly so, only at sides of panels.
func (p *part) cutAlong(edges []curve) {
	for i := range p.faces {
		f := &p.faces[i]
		flat, ok := sheetOf(f.surface)
		if !ok {
			continue
		}
		if lines := flat.close(edges); len(lines) > 0 {
			if cut := flat.pieces(lines); len(cut) > 0 {
				f.charts = cut
			}
		}
	}
}

// liveEdges returns the edges of faces of the source that carry charge; ok is false if there may be others.
func (o *other) liveEdges() (all []curve, ok bool) {
	if o.charge == nil {
		return nil, false
	}
	for i := range o.charge.Layers {
		l := &o.charge.Layers[i]
		if l.Min == 0 && l.Max == 0 {
			continue
		}
		if !known(l.Face.Surface) {
			return nil, false
		}
		for _, c := range edgesOfFace(l.Face) {
			if o.plane != nil {
				c = c.mirrored(o)
			}
			if !slices.Contains(all, c) {
				all = append(all, c)
			}
		}
	}
	return all, true
}

func (c curve) mirrored(o *other) curve {
	at := func(x r3.Vec) r3.Vec { return o.plane.Reflect(pair.VecOf(x)).Value() }
	c.a, c.b, c.centre = at(c.a), at(c.b), at(c.centre)
	c.e1, c.e2 = o.plane.Mirror(c.e1), o.plane.Mirror(c.e2)
	return c
}

// sheet is a plane face with coordinates s, t in it.
type sheet struct {
	o, e1, e2, n r3.Vec
	size         float64
	outline      []line
	covers       func(s, t float64) bool
}

// line is an edge or a circle in the coordinates of a sheet.
type line struct {
	s1, t1, s2, t2 float64 // ends, or
	round          bool
	s, t, radius   float64 // centre and radius
}

// sheetOf returns the sheet of a polygon, disc, annulus or sector, perhaps placed.
func sheetOf(surface geom.Surface) (f sheet, ok bool) {
	var pose geom.Pose
	switch p := surface.(type) {
	case geom.PlacedSurface:
		surface, pose = p.Surface, p.Pose
	case geom.PlacedSheet:
		surface, pose = p.Sheet, p.Pose
	}
	outer := func(x r3.Vec) r3.Vec { return pose.ToOuter(pair.VecOf(x)).Value() }
	f.e1, f.e2, f.n = pose.VectorToOuter(r3.Vec{X: 1}), pose.VectorToOuter(r3.Vec{Y: 1}), pose.VectorToOuter(r3.Vec{Z: 1})
	ring := func(inner, radius, z float64, in func(s, t float64) bool) {
		f.o = outer(r3.Vec{Z: z})
		f.size = 2 * radius
		f.covers = func(s, t float64) bool {
			q := s*s + t*t
			return q <= radius*radius && q >= inner*inner && (in == nil || in(s, t))
		}
		f.outline = append(f.outline, line{round: true, radius: radius})
		if inner > 0 {
			f.outline = append(f.outline, line{round: true, radius: inner})
		}
	}
	switch g := surface.(type) {
	case geom.Disc:
		ring(0, g.Radius, g.Z, nil)
	case geom.Annulus:
		ring(g.Inner, g.Outer, g.Z, nil)
	case geom.Sector:
		from, to := g.Ends()
		ring(g.Inner, g.Outer, g.Z, sectorTest(from.Value(), g.Angle()))
		for _, e := range [2]r3.Vec{from.Value(), to.Value()} {
			f.outline = append(f.outline, line{s1: g.Inner * e.X, t1: g.Inner * e.Y, s2: g.Outer * e.X, t2: g.Outer * e.Y})
		}
	case geom.Polygon:
		v := g.Vertices
		f.n = pose.VectorToOuter(g.Normal().Value())
		f.e1 = pose.VectorToOuter(r3.Unit(r3.Sub(v[1], v[0])))
		f.e2 = r3.Unit(r3.Cross(f.n, f.e1))
		f.o = outer(v[0])
		for k := range v {
			f.outline = append(f.outline, f.project(curve{a: outer(v[k]), b: outer(v[(k+1)%len(v)])}))
		}
		f.size = 2 * extent(v)
		f.covers = inOutline(f.outline)
	default:
		return f, false
	}
	return f, true
}

// extent returns the greatest distance of a vertex from their mean.
func extent(v []r3.Vec) float64 {
	var mean r3.Vec
	for _, x := range v {
		mean = r3.Add(mean, r3.Scale(1/float64(len(v)), x))
	}
	size := 0.0
	for _, x := range v {
		size = max(size, r3.Norm(r3.Sub(x, mean)))
	}
	return size
}

// sectorTest returns whether a direction is within an angle counter-clockwise from another.
func sectorTest(from r3.Vec, angle float64) func(s, t float64) bool {
	return func(s, t float64) bool {
		turn := math.Atan2(from.X*t-from.Y*s, from.X*s+from.Y*t)
		if turn < 0 {
			turn += 2 * math.Pi
		}
		return turn <= angle
	}
}

// inOutline returns the test by the number of edges that a ray crosses.
func inOutline(edges []line) func(s, t float64) bool {
	return func(s, t float64) bool {
		in := false
		for i := range edges {
			e := &edges[i]
			if (e.t1 > t) != (e.t2 > t) && s < e.s1+(t-e.t1)/(e.t2-e.t1)*(e.s2-e.s1) {
				in = !in
			}
		}
		return in
	}
}

func (f *sheet) coordinates(x r3.Vec) (s, t, h float64) {
	d := r3.Sub(x, f.o)
	return r3.Dot(d, f.e1), r3.Dot(d, f.e2), r3.Dot(d, f.n)
}

// project returns a straight curve in the coordinates of the sheet.
func (f *sheet) project(c curve) (l line) {
	l.s1, l.t1, _ = f.coordinates(c.a)
	l.s2, l.t2, _ = f.coordinates(c.b)
	return l
}

// close returns the parts of edges that are near the sheet, projected into it; circles only if they are parallel to it.
func (f *sheet) close(edges []curve) []line {
	var lines []line
	reach := nearby * f.size
	for _, c := range edges {
		if c.round {
			s, t, h := f.coordinates(c.centre)
			r := r3.Norm(c.e1)
			if r == 0 {
				continue
			}
			tilt := math.Hypot(r3.Dot(c.e1, f.n), r3.Dot(c.e2, f.n))
			if math.Abs(h)+tilt < reach && tilt < 1e-3*reach && f.meets(s-r, s+r, t-r, t+r) {
				lines = append(lines, line{round: true, s: s, t: t, radius: r})
			}
			continue
		}
		_, _, h1 := f.coordinates(c.a)
		_, _, h2 := f.coordinates(c.b)
		if min(math.Abs(h1), math.Abs(h2)) > reach && h1*h2 > 0 {
			continue
		}
		l := f.project(c.clipped(h1, h2, 10*reach))
		if math.Hypot(l.s2-l.s1, l.t2-l.t1) > 1e-9*f.size && f.meets(min(l.s1, l.s2), max(l.s1, l.s2), min(l.t1, l.t2), max(l.t1, l.t2)) {
			lines = append(lines, l)
		}
	}
	return lines
}

// meets reports whether a box of coordinates comes near the outline's.
func (f *sheet) meets(s1, s2, t1, t2 float64) bool {
	lo, hi := [2]float64{math.Inf(1), math.Inf(1)}, [2]float64{math.Inf(-1), math.Inf(-1)}
	for i := range f.outline {
		a, b, c, d := f.outline[i].bounds()
		lo[0], hi[0], lo[1], hi[1] = min(lo[0], a), max(hi[0], b), min(lo[1], c), max(hi[1], d)
	}
	m := nearby * f.size
	return s2 > lo[0]-m && s1 < hi[0]+m && t2 > lo[1]-m && t1 < hi[1]+m
}

func (l *line) bounds() (s1, s2, t1, t2 float64) {
	if l.round {
		return l.s - l.radius, l.s + l.radius, l.t - l.radius, l.t + l.radius
	}
	return min(l.s1, l.s2), max(l.s1, l.s2), min(l.t1, l.t2), max(l.t1, l.t2)
}

// clipped returns the part of a straight curve whose ends have the heights h1 and h2 that is within the height reach.
func (c curve) clipped(h1, h2, reach float64) curve {
	if h1 == h2 {
		return c
	}
	cut := func(h float64) float64 { return min(max((h-h1)/(h2-h1), 0), 1) }
	lo, hi := cut(-reach), cut(reach)
	if lo > hi {
		lo, hi = hi, lo
	}
	return curve{a: c.at(lo), b: c.at(hi)}
}

// pieces cuts the sheet by strips of t between all ends, crossings and turning points, and the strips by the lines.
func (f *sheet) pieces(lines []line) []geom.Chart {
	all := append(slices.Clone(f.outline), lines...)
	_, _, lo, hi := all[0].bounds()
	for i := range f.outline {
		_, _, a, b := all[i].bounds()
		lo, hi = min(lo, a), max(hi, b)
	}
	cuts := []float64{lo, hi}
	for i := range all {
		_, _, a, b := all[i].bounds()
		cuts = append(cuts, a, b)
		for j := range i {
			cuts = append(cuts, crossings(&all[i], &all[j])...)
		}
	}
	slices.Sort(cuts)
	var pieces []geom.Chart
	last := lo
	for _, t := range cuts {
		if t > hi {
			break
		}
		if t-last <= 1e-12*f.size {
			continue
		}
		pieces = f.strip(pieces, all, last, t)
		last = t
	}
	return pieces
}

// strip adds the pieces between two values of t.
func (f *sheet) strip(pieces []geom.Chart, all []line, t1, t2 float64) []geom.Chart {
	mid := 0.5 * (t1 + t2)
	var sides []side
	for i := range all {
		l := &all[i]
		_, _, a, b := l.bounds()
		if a > mid || b < mid {
			continue
		}
		if l.round {
			sides = append(sides, side{*l, -1}, side{*l, 1})
		} else {
			sides = append(sides, side{*l, 0})
		}
	}
	slices.SortStableFunc(sides, func(a, b side) int {
		switch x, y := a.at(mid), b.at(mid); {
		case x < y:
			return -1
		case x > y:
			return 1
		}
		return 0
	})
	for k := 0; k+1 < len(sides); k++ {
		a, b := sides[k].at(mid), sides[k+1].at(mid)
		if b-a > 1e-12*f.size && f.covers(0.5*(a+b), mid) {
			pieces = append(pieces, piece{f, t1, t2, sides[k], sides[k+1]})
		}
	}
	return pieces
}

// crossings returns the values of t where two lines cross.
func crossings(a, b *line) []float64 {
	switch {
	case a.round && b.round:
		ds, dt := b.s-a.s, b.t-a.t
		d := math.Hypot(ds, dt)
		if d == 0 || d > a.radius+b.radius || d < math.Abs(a.radius-b.radius) {
			return nil
		}
		along := (d*d + (a.radius-b.radius)*(a.radius+b.radius)) / (2 * d)
		across := math.Sqrt(max(0, (a.radius-along)*(a.radius+along)))
		return []float64{a.t + (along*dt+across*ds)/d, a.t + (along*dt-across*ds)/d}
	case a.round:
		a, b = b, a
		fallthrough
	case b.round:
		ds, dt := a.s2-a.s1, a.t2-a.t1
		l := math.Hypot(ds, dt)
		if l == 0 {
			return nil
		}
		off := ((b.s-a.s1)*dt - (b.t-a.t1)*ds) / l
		if math.Abs(off) > b.radius {
			return nil
		}
		foot := ((b.s-a.s1)*ds + (b.t-a.t1)*dt) / l
		half := math.Sqrt((b.radius - off) * (b.radius + off))
		return []float64{a.t1 + (foot-half)*dt/l, a.t1 + (foot+half)*dt/l}
	}
	as, at, bs, bt := a.s2-a.s1, a.t2-a.t1, b.s2-b.s1, b.t2-b.t1
	det := as*bt - at*bs
	if math.Abs(det) <= 1e-12*math.Hypot(as, at)*math.Hypot(bs, bt) {
		return nil
	}
	k := ((b.s1-a.s1)*bt - (b.t1-a.t1)*bs) / det
	return []float64{a.t1 + k*at}
}

// side is a line that bounds pieces: a straight one, or the left (-1) or right (1) half of a circle.
type side struct {
	line
	half float64
}

// at returns s on the side at t.
func (l *side) at(t float64) float64 {
	if l.half != 0 {
		d := t - l.t
		return l.s + l.half*math.Sqrt(max(0, (l.radius-d)*(l.radius+d)))
	}
	return l.s1 + (t-l.t1)/(l.t2-l.t1)*(l.s2-l.s1)
}

// piece is a chart between two values of t and two sides, drawn together towards all four so that logarithms and roots there are
// smooth. Its second derivative is given without the part along the first, which no area depends on.
type piece struct {
	sheet       *sheet
	t1, t2      float64
	left, right side
}

// At returns the point and its derivatives.
func (p piece) At(u, v float64) (x, xu, xv r3.Vec) {
	fu, du := drawn(u)
	fv, dv := drawn(v)
	t := p.t1 + fv*(p.t2-p.t1)
	if v > 0.5 {
		back, _ := drawn(1 - v)
		t = p.t2 - back*(p.t2-p.t1)
	}
	a, b := p.left.at(t), p.right.at(t)
	s := a + fu*(b-a)
	if u > 0.5 {
		back, _ := drawn(1 - u)
		s = b - back*(b-a)
	}
	f := p.sheet
	x = r3.Add(f.o, r3.Add(r3.Scale(s, f.e1), r3.Scale(t, f.e2)))
	return x, r3.Scale(max(b-a, 0)*du, f.e1), r3.Scale((p.t2-p.t1)*dv, f.e2)
}

// drawn maps the unit interval onto itself with four derivatives zero at both ends, and returns the derivative.
func drawn(x float64) (f, d float64) {
	y := 1 - x
	return x * x * x * x * (35 - x*(84-x*(70-20*x))), 140 * x * x * x * y * y * y
}
