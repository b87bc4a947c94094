package geom

import (
	"math"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Locator tells where points lie. Bodies, sheets and what LocatorOf returns are locators.
type Locator interface {
	// Locate tells where x lies; slack widens what counts as on the surface, see OnTolerance.
	Locate(x pair.Vec, slack float64) Place
}

// LocatorOf returns a locator for a body or a sheet that is asked about many points. It gives the same answers as the
// part, allocates nothing to give them, and is safe for concurrent use.
//
// Polyhedra and prisms get their planes and a tree of bounds beforehand: an answer takes a fraction of a microsecond and
// grows like the logarithm of the number of faces. Polygons get their plane. Placed parts answer points far from them
// in the outer frame. Every other part is returned as it is.
func LocatorOf(part Locator) Locator {
	switch p := part.(type) {
	case Polyhedron:
		return newFacets(p)
	case Prism:
		return newFacets(p.Polyhedron())
	case Polygon:
		l := p.loop()
		return &polygonLocator{l, extentOf(p.Bounds()), l.prepare()}
	case Placed:
		return LocatorAt(LocatorOf(p.Body), p.Body.Bounds(), p.Pose)
	case PlacedSheet:
		return LocatorAt(LocatorOf(p.Sheet), p.Sheet.Bounds(), p.Pose)
	}
	return part
}

// LocatorAt returns a locator for a part in an outer frame, given one for the part in its own frame and the bounds there.
// It prepares nothing anew, so a part may be moved often.
func LocatorAt(part Locator, bounds r3.Box, pose Pose) Locator {
	return &placedLocator{part, pose, r3.Norm(pose.shift.Value()), extentOf(bounds), PosedBox(bounds, pose)}
}

// placedLocator is a locator in an outer frame.
type placedLocator struct {
	part  Locator
	pose  Pose
	shift float64 // distance of the frame's origin from that of the outer frame
	local extent
	outer r3.Box // bounds along the outer axes
}

// Locate tells where a point of the outer frame lies. The tolerance of the part is at most slack + 4 u (the lengths), so
// a point twice that off its bounds is outside.
func (p *placedLocator) Locate(x pair.Vec, slack float64) Place {
	v := x.Value()
	length := r3.Norm(v) + p.shift
	slack += 4 * 0x1p-53 * length // as Pose.slack
	if beyond(p.outer, v, 2*(slack+4*0x1p-53*(length+p.local.centre+p.local.half))) {
		return outside()
	}
	at := p.part.Locate(p.pose.ToLocal(x), slack)
	if at.Region != On || at.Edge {
		return at
	}
	return p.pose.turnNormal(at)
}

// preparedPlane is the plane of a loop with what plain arithmetic needs to keep clear of it.
type preparedPlane struct {
	plane
	out, base r3.Vec  // normal and mean, rounded
	off       float64 // greatest distance of a vertex from the plane
}

func (l loop) prepare() preparedPlane {
	p := preparedPlane{plane: l.plane()}
	p.out, p.base = p.normal.Value(), p.mean.Value()
	for k := range l.len() {
		p.off = max(p.off, math.Abs(p.normal.Dot(l.at(k).Sub(p.mean)).Value()))
	}
	return p
}

// height returns the distance of v from the plane in plain arithmetic. With the tolerance of OnTolerance it errs by less
// than 2 tol: rounding x, the mean, their difference, the normal, and the three products and two sums each cost at most
// u (|x| + |c| + half).
func (p *preparedPlane) height(v r3.Vec) float64 { return r3.Dot(p.out, r3.Sub(v, p.base)) }

// clear reports whether a point at that height is beyond doubt farther than tol from the face and its rim.
func (p *preparedPlane) clear(height, tol float64) bool { return math.Abs(height) > 4*tol+p.off }

// polygonLocator is a polygon with its plane.
type polygonLocator struct {
	loop loop
	extent
	preparedPlane
}

// Locate tells whether x lies on the polygon.
func (p *polygonLocator) Locate(x pair.Vec, slack float64) Place {
	v := x.Value()
	tol := p.tolerance(v, slack)
	if beyond(p.box, v, tol) || p.clear(p.height(v), tol) {
		return outside()
	}
	switch p.loop.touchIn(p.plane, x, tol) {
	case atRim:
		return onEdge()
	case within:
		return Place{Region: On, Normal: p.out}
	}
	return outside()
}
