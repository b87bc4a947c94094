package geom

import (
	"math"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r2"
	"gonum.org/v1/gonum/spatial/r3"
)

// Nearest returns the point of the boundary of a body that is nearest to x, and its distance, which is positive inside and
// outside alike.
//
// Units: length.
// Frame: x and the result in the frame of the body; a placed body's is the outer one.
// Domain: any finite x, and bodies whose surfaces this package makes or that are Charted; NaN otherwise.
// Singular: where several points are equally near, one of them is returned.
// Accuracy: distance to 1e-12 of the larger of distance and size (TestNearest); faces of parametric bodies to 1e-6 of the
// distance.
// Source: elementary; on ellipsoids the foot of the normal by its Lagrange multiplier, [Own].
func Nearest(body Body, x r3.Vec) (at r3.Vec, distance float64) {
	distance = math.Inf(1)
	for _, f := range body.Faces() {
		p := nearestOn(f.Surface, x)
		if d := r3.Norm(r3.Sub(x, p)); !(d >= distance) {
			at, distance = p, d
		}
	}
	return at, distance
}

// nearestOn returns the point of a surface that is nearest to x; NaN components for a surface that is not known.
func nearestOn(s Surface, x r3.Vec) r3.Vec {
	switch s := s.(type) {
	case PlacedSurface:
		local := nearestOn(s.Surface, s.Pose.ToLocal(pair.VecOf(x)).Value())
		return s.Pose.ToOuter(pair.VecOf(local)).Value()
	case Polygon:
		return s.loop().nearest(x)
	case Disc:
		return nearestSwept(x, segment{0, s.Z, s.Radius, s.Z}, nil)
	case Annulus:
		return nearestSwept(x, segment{s.Inner, s.Z, s.Outer, s.Z}, nil)
	case Wall:
		return nearestSwept(x, segment{s.Radius, s.Z1, s.Radius, s.Z2}, nil)
	case ConeWall:
		return nearestSwept(x, segment{s.R1, s.Z1, s.R2, s.Z2}, nil)
	case Sector:
		span := s.span()
		return nearestSwept(x, segment{s.Inner, s.Z, s.Outer, s.Z}, &span)
	case WallSector:
		span := s.span()
		return nearestSwept(x, segment{s.Radius, s.Z1, s.Radius, s.Z2}, &span)
	case TorusSurface:
		return nearestSwept(x, round{s.Major, s.Minor}, nil)
	case SphereSurface:
		return nearestSwept(x, round{0, s.Radius}, nil)
	case EllipsoidSurface:
		return s.nearest(x)
	case Charted:
		return nearestCharted(s, x)
	}
	return r3.Vec{X: math.NaN(), Y: math.NaN(), Z: math.NaN()}
}

// profile is a curve in a half-plane through the z axis; s is the distance from the axis.
type profile interface {
	nearest(s, z float64) (ns, nz float64)
}

// segment is a straight profile from (s1, z1) to (s2, z2).
type segment struct{ s1, z1, s2, z2 float64 }

func (p segment) nearest(s, z float64) (ns, nz float64) {
	ds, dz := p.s2-p.s1, p.z2-p.z1
	t := clamp(((s-p.s1)*ds + (z-p.z1)*dz) / (ds*ds + dz*dz))
	return p.s1 + t*ds, p.z1 + t*dz
}

// round is a circular profile about (major, 0).
type round struct{ major, minor float64 }

func (p round) nearest(s, z float64) (ns, nz float64) {
	d := math.Hypot(s-p.major, z)
	if d == 0 {
		return p.major + p.minor, 0
	}
	return p.major + p.minor*(s-p.major)/d, p.minor * z / d
}

// nearestSwept returns the nearest point of a profile swept about the z axis, over the azimuths of a span or a full turn. At
// the azimuth d away from that of x, the square of the distance from (s', z') is (s' - s cos d)^2 + (z' - z)^2 +
// (s sin d)^2, least for the smallest |d| whatever the profile.
func nearestSwept(x r3.Vec, p profile, over *span) r3.Vec {
	s := math.Hypot(x.X, x.Y)
	way := direction{1, 0}
	if s > 0 {
		way = direction{x.X / s, x.Y / s}
	}
	if over != nil && !over.full() && !over.holds(way) {
		from, to := over.plain()
		df, dt := from.cos*x.X+from.sin*x.Y, to.cos*x.X+to.sin*x.Y
		way, s = from, df
		if dt > df {
			way, s = to, dt
		}
	}
	ns, nz := p.nearest(s, x.Z)
	return r3.Vec{X: ns * way.cos, Y: ns * way.sin, Z: nz}
}

// holds reports whether a direction lies within the span.
func (s span) holds(way direction) bool {
	from, _ := s.plain()
	d := math.Atan2(from.cos*way.sin-from.sin*way.cos, from.cos*way.cos+from.sin*way.sin)
	if d < 0 {
		d += 2 * math.Pi
	}
	return d <= s.angle()
}

// nearest returns the point of the plane area within the loop that is nearest to x.
func (l loop) nearest(x r3.Vec) r3.Vec {
	n := l.area().Unit().Value()
	foot := r3.Sub(x, r3.Scale(r3.Dot(r3.Sub(x, l.value(0)), n), n))
	if l.encloses(foot, steepest(n)) {
		return foot
	}
	var best r3.Vec
	least := math.Inf(1)
	for k := range l.len() {
		a, b := l.value(k), l.value((k+1)%l.len())
		along := r3.Sub(b, a)
		p := r3.Add(a, r3.Scale(clamp(r3.Dot(r3.Sub(x, a), along)/r3.Norm2(along)), along))
		if d := r3.Norm2(r3.Sub(x, p)); d < least {
			best, least = p, d
		}
	}
	return best
}

// encloses reports whether a point of the plane lies within the loop, by the parity of crossings in the projection along an
// axis.
func (l loop) encloses(x r3.Vec, axis int) bool {
	flatten := func(v r3.Vec) r2.Vec {
		switch axis {
		case 0:
			return r2.Vec{X: v.Y, Y: v.Z}
		case 1:
			return r2.Vec{X: v.Z, Y: v.X}
		}
		return r2.Vec{X: v.X, Y: v.Y}
	}
	p, in := flatten(x), false
	for k := range l.len() {
		a, b := flatten(l.value(k)), flatten(l.value((k+1)%l.len()))
		if (a.Y > p.Y) != (b.Y > p.Y) && p.X < a.X+(p.Y-a.Y)/(b.Y-a.Y)*(b.X-a.X) {
			in = !in
		}
	}
	return in
}

// nearest returns the foot of the normal through x: y_i = a_i^2 x_i/(a_i^2 + t) with sum (y_i/a_i)^2 = 1. The sum falls as t
// grows from -min a_i^2; there it may still be below 1 (x near the middle plane inside), and then the foot leaves that
// plane.
func (e EllipsoidSurface) nearest(x r3.Vec) r3.Vec {
	a := [3]float64{e.SemiAxes.X, e.SemiAxes.Y, e.SemiAxes.Z}
	v := [3]float64{x.X, x.Y, x.Z}
	short := 0
	for i := range a {
		if a[i] < a[short] {
			short = i
		}
	}
	low := a[short] * a[short]
	at := func(t float64) (y [3]float64, excess float64) { // t counts from -low
		excess = -1
		for i := range a {
			d := a[i]*a[i] - low + t
			if v[i] != 0 {
				y[i] = a[i] * a[i] * v[i] / d
			}
			excess += y[i] / a[i] * (y[i] / a[i])
		}
		return y, excess
	}
	lo, hi := 0.0, 0.0
	for i := range a {
		hi = math.Hypot(hi, a[i]*v[i])
	}
	if v[short] == 0 {
		y, excess := at(math.SmallestNonzeroFloat64)
		if excess <= 0 {
			y[short] = a[short] * math.Sqrt(-excess)
			return r3.Vec{X: y[0], Y: y[1], Z: y[2]}
		}
	}
	for range 2000 { // halving the exponent first, then the mantissa
		mid := lo + (hi-lo)/2
		if lo < hi/4 {
			mid = math.Sqrt(max(lo, hi*0x1p-200)) * math.Sqrt(hi)
		}
		if mid <= lo || mid >= hi {
			break
		}
		if _, excess := at(mid); excess > 0 {
			lo = mid
		} else {
			hi = mid
		}
	}
	y, _ := at(hi)
	return r3.Vec{X: y[0], Y: y[1], Z: y[2]}
}

// nearestCharted returns the nearest point of all charts of a surface.
func nearestCharted(s Charted, x r3.Vec) r3.Vec {
	var at r3.Vec
	least := math.Inf(1)
	p := pair.VecOf(x)
	for _, c := range s.Charts() {
		sampled := sampleChart(c)
		f := sampled.near(p)
		for again := sampled.descend(p, f.u, f.v); again.distance < (1-1e-9)*f.distance; again = sampled.descend(p, f.u, f.v) {
			f = again
		}
		if f.distance < least {
			at, least = r3.Sub(x, f.from), f.distance
		}
	}
	return at
}
