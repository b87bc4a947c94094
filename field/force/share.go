package force

import (
	"context"
	"math"
	"slices"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/element"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// simple reports whether all others act without integration over faces.
func simple(all []other) bool {
	for i := range all {
		switch all[i].src.(type) {
		case field.Constant, element.Point, element.Dipole:
		default:
			return false
		}
	}
	return true
}

// share returns what one source does to a part; the only place where the way is chosen.
func share(ctx context.Context, p *part, o *other, g goal, set Settings) (outcome, error) {
	if out, ok := exact(p, o, g, set.About); ok {
		return out, nil
	}
	if o.charge != nil {
		if out, ok := boxes(p, o, g, set.About); ok {
			return out, nil
		}
		if out, ok := coaxial(p, o, g, set.About); ok {
			return out, nil
		}
		q, ok := partOf(o.charge)
		if out, ok := far(p, &q, o, g, set.About); ok {
			return out, nil
		}
		if out, ok := small(p, o, g, set.About); ok {
			return out, nil
		}
		if ok && o.plane == nil && p.charge != nil && !g.stiff {
			back := other{src: p.charge, factor: 1, charge: p.charge}
			if out, ok := small(&q, &back, g, set.About); ok {
				return out.reaction(), nil
			}
			if swap(o.charge, p.charge) {
				out, err := faces(ctx, &q, &back, g, set)
				return out.reaction(), err
			}
		}
	} else if out, ok := small(p, o, g, set.About); ok {
		return out, nil
	}
	return faces(ctx, p, o, g, set)
}

// faces integrates over the faces of the part.
func faces(ctx context.Context, p *part, o *other, g goal, set Settings) (outcome, error) {
	w := newWork(o.src, set.About, p, g.stiff)
	if box, ok := o.bounds(); ok {
		pb := r3.Box{Min: r3.Sub(p.centre, r3.Vec{X: p.reach, Y: p.reach, Z: p.reach}), Max: r3.Add(p.centre, r3.Vec{X: p.reach, Y: p.reach, Z: p.reach})}
		if p.charge != nil {
			pb = p.charge.Bounds()
		}
		size := max(p.reach, r3.Norm(p.centre), r3.Norm(box.Min), r3.Norm(box.Max))
		space := gap(pb, box)
		w.shift, w.steep = 2*0x1p-53*(p.reach+r3.Norm(p.centre)), 4/max(space, 0.1*p.reach)
		if space <= touching*size {
			w.slackOf = closeTo * size
			if o.charge != nil && o.plane == nil {
				w.slackOf += 2 * p.sunk(o.charge, touching*size)
			}
			if o.charge == nil && p.charge != nil {
				w.slackOf, w.push = 0, 2*closeTo*size
			}
		}
	}
	g.reach = p.reach
	w.edges, w.known = o.liveEdges()
	cut := *p
	cut.faces = slices.Clone(p.faces)
	cut.cutAlong(w.edges)
	return integrate(ctx, &cut, w, g, set.MaxNodes)
}

// closeTo is the distance, in the size of parts and coordinates, below which a point counts as on a face that touches: poses that
// were rounded still touch.
const closeTo = 1e-14

// sunk returns how far plane faces of the part and of the other that lie on each other are apart, up to a limit: poses of bodies that
// touch may be rounded more coarsely than closeTo.
func (p *part) sunk(c *bound.Charge, limit float64) float64 {
	most := 0.0
	for i := range p.faces {
		a, ok := sheetOf(p.faces[i].surface)
		if !ok {
			continue
		}
		for k := range c.Layers {
			b, ok := sheetOf(c.Layers[k].Face.Surface)
			if !ok || r3.Norm(r3.Cross(a.n, b.n)) > 1e-9 {
				continue
			}
			if h := math.Abs(r3.Dot(a.n, r3.Sub(a.o, b.o))); h <= limit {
				most = max(most, h)
			}
		}
	}
	return most
}

// reaction returns what the first does to the second, given what the second does to the first, about the same point.
func (o outcome) reaction() outcome {
	for i := range atEnergy {
		o.total.v[i] = -o.total.v[i]
	}
	return o
}

// swap reports whether it is better to integrate over a in the field of b than the other way round: where they are close, if the field
// of b has no edges and that of a has; else if the field of a costs more.
func swap(a, b *bound.Charge) bool {
	_, reach := ballOf(b.Bounds())
	if gap(a.Bounds(), b.Bounds()) < nearby*reach {
		if p, q := rounded(a), rounded(b); p != q {
			return q
		}
	}
	return cost(a) > cost(b)
}

// rounded reports whether the field of a body has no edges.
func rounded(c *bound.Charge) bool {
	edges, ok := (&other{charge: c}).liveEdges()
	return ok && len(edges) == 0
}

// cost ranks the fields of bodies: measured, in the order of a microsecond.
func cost(c *bound.Charge) int {
	body := c.Body()
	if at, ok := body.(geom.Placed); ok {
		body = at.Body
	}
	affine := false
	for _, v := range c.Volumes {
		affine = affine || v.Min != 0 || v.Max != 0
	}
	n := 20
	switch b := body.(type) {
	case geom.Sphere, geom.HollowSphere, geom.Ellipsoid:
		n = 1
	case geom.Box:
		n = 2
	case geom.Flat:
		n = 2 + len(b.Polyhedron().Faces())/4
	case geom.Cylinder, geom.Tube:
		n = 4
	}
	if affine {
		n *= 3
	}
	return n
}
