package solve

import (
	"fmt"
	"math"
	"sort"

	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// mostLooks bounds the search for overlaps: points asked, times faces. It is about a second.
const mostLooks = 20_000_000

// samples is how many points are tried in the box that two bodies share.
const samples = 400

// touching is the depth, over the size of the bodies, below which bodies touch and do not overlap: coordinates that were
// rounded to ten digits still touch.
const touching = 1e-9

// placed is a body with its box.
type placed struct {
	part  int
	body  geom.Body
	box   r3.Box
	faces []geom.Face
}

// warnOverlaps warns of bodies that stand in each other. Faces that touch, and a body in another's cavity, are no overlap.
func (s *Setup) warnOverlaps() {
	var bodies []placed
	for i := range s.Parts {
		if b := s.Parts[i].Body; b != nil {
			bodies = append(bodies, placed{part: i, body: b, box: b.Bounds()})
		}
	}
	sort.SliceStable(bodies, func(i, j int) bool { return bodies[i].box.Min.X < bodies[j].box.Min.X })
	looks := 0
	var found [][2]int
	for i := range bodies {
		a := &bodies[i]
		for j := i + 1; j < len(bodies) && bodies[j].box.Min.X < a.box.Max.X && looks < mostLooks; j++ {
			b := &bodies[j]
			looks++
			shared, deep := share3(a.box, b.box)
			if !deep {
				continue
			}
			hit, cost := overlap(a, b, shared)
			looks += cost
			if hit {
				found = append(found, [2]int{min(a.part, b.part), max(a.part, b.part)})
			}
		}
	}
	sort.Slice(found, func(i, j int) bool {
		return found[i][0] < found[j][0] || found[i][0] == found[j][0] && found[i][1] < found[j][1]
	})
	const most = 20
	s.overlaps = found
	for i, f := range found {
		if i == most {
			s.Warnings = append(s.Warnings, fmt.Sprintf("%d more pairs of parts overlap", len(found)-most))
			break
		}
		s.Warnings = append(s.Warnings, fmt.Sprintf("%s and %s overlap; rigid parts are superposed, so both count where they overlap",
			s.Parts[f[0]].Name, s.Parts[f[1]].Name))
	}
	if looks >= mostLooks {
		s.Warnings = append(s.Warnings, "so many parts are close together that not all pairs were checked for overlap")
	}
}

// share3 returns the box that two boxes share, and whether it is deeper than what touches.
func share3(a, b r3.Box) (r3.Box, bool) {
	c := r3.Box{
		Min: r3.Vec{X: max(a.Min.X, b.Min.X), Y: max(a.Min.Y, b.Min.Y), Z: max(a.Min.Z, b.Min.Z)},
		Max: r3.Vec{X: min(a.Max.X, b.Max.X), Y: min(a.Max.Y, b.Max.Y), Z: min(a.Max.Z, b.Max.Z)},
	}
	d, p, q := r3.Sub(c.Max, c.Min), r3.Sub(a.Max, a.Min), r3.Sub(b.Max, b.Min)
	deep := func(d, p, q float64) bool { return d > touching*min(p, q) }
	return c, deep(d.X, p.X, q.X) && deep(d.Y, p.Y, q.Y) && deep(d.Z, p.Z, q.Z)
}

// overlap reports whether a point of the shared box lies strictly inside both bodies: a sequence of points that fills the
// box evenly, and nodes of the faces of each, drawn in a little, so that equal bodies that coincide are found and faces
// that touch are not. It also returns what the search has cost.
func overlap(a, b *placed, shared r3.Box) (found bool, cost int) {
	for _, p := range []*placed{a, b} {
		if p.faces == nil {
			p.faces = p.body.Faces()
		}
	}
	each := len(a.faces) + len(b.faces)
	test := func(x r3.Vec) {
		if found || !within(shared, x) {
			return
		}
		cost += each
		p := pair.VecOf(x)
		found = a.body.Locate(p, 0).Region == geom.Inside && b.body.Locate(p, 0).Region == geom.Inside
	}
	size := r3.Sub(shared.Max, shared.Min)
	for k := 0; k < samples && !found; k++ {
		u := sequence(k)
		test(r3.Vec{X: shared.Min.X + u.X*size.X, Y: shared.Min.Y + u.Y*size.Y, Z: shared.Min.Z + u.Z*size.Z})
	}
	for _, p := range []*placed{a, b} {
		const drawn = 1e-6
		in := drawn * r3.Norm(r3.Sub(p.box.Max, p.box.Min))
		for i := 0; i < len(p.faces) && !found; i++ {
			f := &p.faces[i]
			f.Surface.Nodes(4, func(x, n r3.Vec, _ float64) { test(r3.Sub(x, r3.Scale(in*f.Sign(), n))) })
		}
	}
	return found, cost
}

func within(b r3.Box, x r3.Vec) bool {
	return b.Min.X <= x.X && x.X <= b.Max.X && b.Min.Y <= x.Y && x.Y <= b.Max.Y && b.Min.Z <= x.Z && x.Z <= b.Max.Z
}

// sequence returns point k of the additive recurrence in the unit cube with the powers of 1/g, g^4 = g + 1, which leaves no
// large gaps for any number of points; point 0 is the centre.
func sequence(k int) r3.Vec {
	const g = 1.2207440846057596
	f := func(step float64) float64 { return math.Mod(0.5+float64(k)*step, 1) }
	return r3.Vec{X: f(1 / g), Y: f(1 / (g * g)), Z: f(1 / (g * g * g))}
}
