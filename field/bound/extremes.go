package bound

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// span gathers the smallest and largest of what it sees.
type span struct{ lo, hi float64 }

func newSpan() span { return span{math.Inf(1), math.Inf(-1)} }

func (s *span) see(v float64) {
	if math.IsNaN(v) { // on the axis of a law that has no direction there
		return
	}
	v += 0 // no negative zero
	s.lo, s.hi = min(s.lo, v), max(s.hi, v)
}

// extremes returns the smallest and largest sigma over a face of the body in its own frame: exact for affine p on plane faces,
// for uniform p on round ones and for powers on round bodies; of other polarizations, over a dense sample.
func (c *Charge) extremes(f geom.Face) (lo, hi float64) {
	s := newSpan()
	a, affine := c.p.(field.Affine)
	n, plane := planeNormal(f)
	switch {
	case affine && plane:
		planeExtremes(&s, f.Surface, a, n)
	case affine && a.Gradient == [3][3]float64{}:
		roundExtremes(&s, f, a.Value)
	default:
		c.sample(&s, f)
	}
	return s.lo, s.hi
}

// planeExtremes sees the corners of a plane face, or the two ends of the diameter along the gradient.
func planeExtremes(s *span, face geom.Surface, p field.Affine, n r3.Vec) {
	at := func(x r3.Vec) { s.see(r3.Dot(p.At(x), n)) }
	g := &p.Gradient
	gx := g[0][0]*n.X + g[1][0]*n.Y + g[2][0]*n.Z
	gy := g[0][1]*n.X + g[1][1]*n.Y + g[2][1]*n.Z
	round := func(radius, z float64) {
		at(r3.Vec{Z: z})
		if k := math.Hypot(gx, gy); k > 0 {
			at(r3.Vec{X: radius * gx / k, Y: radius * gy / k, Z: z})
			at(r3.Vec{X: -radius * gx / k, Y: -radius * gy / k, Z: z})
		}
	}
	switch f := face.(type) {
	case geom.Polygon:
		for _, v := range f.Vertices {
			at(v)
		}
	case geom.Disc:
		round(f.Radius, f.Z)
	case geom.Annulus:
		round(f.Outer, f.Z)
	}
}

// roundExtremes sees the extremes of p.n for uniform p on a round face, or on a sector of one.
func roundExtremes(s *span, f geom.Face, p r3.Vec) {
	across := math.Hypot(p.X, p.Y)
	switch w := f.Surface.(type) {
	case geom.Wall:
		s.see(-across)
		s.see(across)
	case geom.ConeWall:
		l := w.Slant()
		along, across := f.Sign()*p.Z*(w.R1-w.R2)/l, across*(w.Z2-w.Z1)/l
		s.see(along - across)
		s.see(along + across)
	case geom.WallSector:
		wallSectorExtremes(s, w, r3.Scale(f.Sign(), p))
	case geom.Sector:
		s.see(f.Sign() * p.Z)
	default:
		k := r3.Norm(p)
		s.see(-k)
		s.see(k)
	}
}

// wallSectorExtremes sees p.n at both ends, and where the normal is along or against p if the sector reaches there.
func wallSectorExtremes(s *span, w geom.WallSector, p r3.Vec) {
	from := w.From
	if w.Degrees {
		from *= math.Pi / 180
	}
	for _, at := range [2]float64{0, w.Angle()} {
		sin, cos := math.Sincos(from + at)
		s.see(p.X*cos + p.Y*sin)
	}
	k := math.Hypot(p.X, p.Y)
	for _, way := range [2]float64{1, -1} {
		turn := math.Mod(math.Atan2(way*p.Y, way*p.X)-from, 2*math.Pi)
		if turn < 0 {
			turn += 2 * math.Pi
		}
		if turn <= w.Angle() {
			s.see(way * k)
		}
	}
}

// sample sees sigma at the nodes of two rules; what differs by rounding alone counts as one value.
func (c *Charge) sample(s *span, f geom.Face) {
	for _, n := range [2]int{9, 16} {
		f.Surface.Nodes(n, func(x, normal r3.Vec, _ float64) { s.see(f.Sign() * r3.Dot(c.p.At(x), normal)) })
	}
	s.level()
}

// level makes one value of a span that rounding alone has opened.
func (s *span) level() {
	if size := max(math.Abs(s.lo), math.Abs(s.hi)); !math.IsInf(size, 0) && s.hi-s.lo <= 64*0x1p-53*size {
		mean := 0.5 * (s.lo + s.hi)
		s.lo, s.hi = mean, mean
	}
}

// extremesInside returns the smallest and largest rho over a cell of the body in its own frame; an infinite density at an axis
// or a centre counts.
func (c *Charge) extremesInside(cell geom.Cell) (lo, hi float64) {
	s := newSpan()
	if a, ok := c.p.(field.Affine); ok {
		rho := -a.Divergence(r3.Vec{})
		s.see(rho)
		return s.lo, s.hi
	}
	see := func(x r3.Vec) { s.see(-c.p.Divergence(x)) }
	in, out, round := radii(c.local)
	switch c.p.(type) {
	case field.RadialPower:
		if round {
			see(r3.Vec{X: in})
			see(r3.Vec{X: out})
			s.level()
			return s.lo, s.hi
		}
	case field.CentralPower:
		if _, ok := c.local.(geom.Sphere); ok {
			round = true
		} else if _, ok := c.local.(geom.HollowSphere); !ok {
			round = false
		}
		if round {
			see(r3.Vec{X: in})
			see(r3.Vec{X: out})
			s.level()
			return s.lo, s.hi
		}
	}
	for _, n := range [2]int{6, 9} {
		cell.Nodes(n, func(x r3.Vec, _ float64) { see(x) })
	}
	for _, f := range c.local.Faces() { // the extremes of a harmonic density, and most others, lie there
		f.Surface.Nodes(9, func(x, _ r3.Vec, _ float64) { see(x) })
		if p, ok := f.Surface.(geom.Polygon); ok {
			for _, v := range p.Vertices {
				see(v)
			}
		}
	}
	s.level()
	return s.lo, s.hi
}

// radii returns the inner and outer radius of a body of revolution between two walls or two spheres.
func radii(body geom.Body) (in, out float64, ok bool) {
	switch b := body.(type) {
	case geom.Cylinder:
		return 0, b.Radius, true
	case geom.Tube:
		return b.Inner, b.Outer, true
	case geom.Sphere:
		return 0, b.Radius, true
	case geom.HollowSphere:
		return b.Inner, b.Outer, true
	}
	return 0, 0, false
}
