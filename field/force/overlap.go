package force

import (
	"errors"
	"fmt"
	"math"
	"strings"

	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/image"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// ErrOverlap is wrapped by the error for bodies that stand in each other. Move them apart.
var ErrOverlap = errors.New("bodies overlap")

// touching is the depth, in the size of the smaller body, to which bodies may stand in each other and count as touching.
const touching = 1e-9

// overlaps refuses bodies that stand in each other, and a body that stands in the plane of an image.
func overlaps(c *bound.Charge, all []other) error {
	for i := range all {
		o := &all[i]
		if o.plane != nil {
			if err := before(c, o.plane); err != nil {
				return err
			}
			continue
		}
		if o.charge == nil {
			continue
		}
		if at, deep := Overlap(c.Body(), o.charge.Body()); deep {
			return fmt.Errorf("force: %w: %s and %s at %v; move them apart", ErrOverlap, name(c.Body()), name(o.charge.Body()), at)
		}
	}
	return nil
}

// before refuses a body that is not on the side of the normal of a plane: no corner of its box is looked at, but points of its faces
// and edges.
func before(c *bound.Charge, plane *image.Plane) error {
	body := c.Body()
	depth := touching * r3.Norm(sizeOf(body.Bounds()))
	f := frameOf(body)
	n := r3.Unit(plane.Normal)
	reach := 0.0
	for k := range 3 {
		reach += f.half[k] * math.Abs(r3.Dot(n, f.axis[k]))
	}
	if plane.Height(f.centre) >= reach-depth {
		return nil
	}
	if at, deep := samples(body, depth, func(x r3.Vec) bool { return plane.Height(x) < -depth/2 }); deep {
		return fmt.Errorf("force: %w: %s and the plane at %v with normal %v, at %v; move it to the side of the normal", ErrOverlap, name(body),
			plane.Point, plane.Normal, at)
	}
	return nil
}

// name says in words what a body is and where.
func name(b geom.Body) string {
	c := b.Centroid()
	if p, ok := b.(geom.Placed); ok {
		b = p.Body
	}
	kind := strings.ToLower(strings.TrimPrefix(strings.TrimLeft(fmt.Sprintf("%T", b), "*"), "geom."))
	return fmt.Sprintf("the %s about (%.6g, %.6g, %.6g)", kind, c.X, c.Y, c.Z)
}

// Overlap looks for a point that lies inside both bodies, deeper than 1e-9 of the smaller. Boxes are told apart exactly; other
// bodies by points on their faces and edges and inside, so that a shallow cut may be missed.
func Overlap(a, b geom.Body) (at r3.Vec, deep bool) {
	depth := touching * min(r3.Norm(sizeOf(a.Bounds())), r3.Norm(sizeOf(b.Bounds())))
	if separate(frameOf(a), frameOf(b), depth) {
		return at, false
	}
	la, lb := geom.LocatorOf(a), geom.LocatorOf(b)
	in := func(x r3.Vec) bool {
		p := pair.VecOf(x)
		return la.Locate(p, depth/2).Region == geom.Inside && lb.Locate(p, depth/2).Region == geom.Inside
	}
	for _, body := range [2]geom.Body{a, b} {
		if x, found := samples(body, depth, in); found {
			return x, true
		}
	}
	return at, false
}

// samples tries points of the faces of a body, drawn in by more than the depth, of its inside, and of its edges.
func samples(b geom.Body, depth float64, in func(x r3.Vec) bool) (at r3.Vec, found bool) {
	try := func(x r3.Vec) {
		if !found && in(x) {
			at, found = x, true
		}
	}
	centre := b.Centroid()
	for _, f := range b.Faces() {
		f.Surface.Nodes(12, func(x, n r3.Vec, _ float64) { try(r3.Sub(x, r3.Scale(2*depth*f.Sign(), n))) })
	}
	for _, c := range b.Cells() {
		c.Nodes(6, func(x r3.Vec, _ float64) { try(x) })
	}
	for _, e := range edgesOf(b) {
		for k := range 33 {
			x := e.at(float64(k) / 32)
			try(r3.Add(x, r3.Scale(4*depth/(r3.Norm(r3.Sub(centre, x))+depth), r3.Sub(centre, x))))
		}
	}
	return at, found
}

func sizeOf(b r3.Box) r3.Vec { return r3.Sub(b.Max, b.Min) }

// frame is a box with its own directions.
type frame struct {
	centre r3.Vec
	axis   [3]r3.Vec
	half   [3]float64
}

// frameOf returns the bounds of a body in its own frame, placed.
func frameOf(b geom.Body) frame {
	var pose geom.Pose
	if p, ok := b.(geom.Placed); ok {
		b, pose = p.Body, p.Pose
	}
	box := b.Bounds()
	c, _ := ballOf(box)
	h := r3.Scale(0.5, sizeOf(box))
	return frame{pose.ToOuter(pair.VecOf(c)).Value(),
		[3]r3.Vec{pose.VectorToOuter(r3.Vec{X: 1}), pose.VectorToOuter(r3.Vec{Y: 1}), pose.VectorToOuter(r3.Vec{Z: 1})},
		[3]float64{h.X, h.Y, h.Z}}
}

// separate reports whether a plane parallel to faces or edges parts two boxes, but for the depth.
func separate(a, b frame, depth float64) bool {
	d := r3.Sub(b.centre, a.centre)
	parts := func(n r3.Vec) bool {
		size := r3.Norm(n)
		if size < 1e-6 {
			return false
		}
		reach := 0.0
		for k := range 3 {
			reach += a.half[k]*math.Abs(r3.Dot(n, a.axis[k])) + b.half[k]*math.Abs(r3.Dot(n, b.axis[k]))
		}
		return math.Abs(r3.Dot(n, d)) >= reach-depth*size
	}
	for i := range 3 {
		if parts(a.axis[i]) || parts(b.axis[i]) {
			return true
		}
	}
	for i := range 3 {
		for j := range 3 {
			if parts(r3.Cross(a.axis[i], b.axis[j])) {
				return true
			}
		}
	}
	return false
}
