package solve

import (
	"fmt"
	"sort"

	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// mostPairs bounds how many pairs of parts are looked at for overlap.
const mostPairs = 200_000

// warnOverlaps warns of bodies that stand in each other. Faces that touch, and a body in another's cavity, are no overlap.
func (s *Setup) warnOverlaps() {
	type entry struct {
		part int
		box  r3.Box
	}
	var bodies []entry
	for i := range s.Parts {
		if b := s.Parts[i].Body; b != nil {
			bodies = append(bodies, entry{i, b.Bounds()})
		}
	}
	sort.SliceStable(bodies, func(i, j int) bool { return bodies[i].box.Min.X < bodies[j].box.Min.X })
	looked := 0
	var found [][2]int
	for i, a := range bodies {
		for _, b := range bodies[i+1:] {
			if b.box.Min.X >= a.box.Max.X || looked > mostPairs {
				break
			}
			if b.box.Min.Y >= a.box.Max.Y || a.box.Min.Y >= b.box.Max.Y || b.box.Min.Z >= a.box.Max.Z || a.box.Min.Z >= b.box.Max.Z {
				continue
			}
			looked++
			if overlap(s.Parts[a.part].Body, s.Parts[b.part].Body) {
				found = append(found, [2]int{min(a.part, b.part), max(a.part, b.part)})
			}
		}
	}
	sort.Slice(found, func(i, j int) bool {
		return found[i][0] < found[j][0] || found[i][0] == found[j][0] && found[i][1] < found[j][1]
	})
	for _, f := range found {
		s.Warnings = append(s.Warnings, fmt.Sprintf("%s and %s overlap; rigid parts are superposed, so both count where they overlap",
			s.Parts[f[0]].Name, s.Parts[f[1]].Name))
	}
	if looked > mostPairs {
		s.Warnings = append(s.Warnings, fmt.Sprintf("more than %d pairs of parts are close together; the rest was not checked for overlap", mostPairs))
	}
}

// overlap reports whether points of one body lie inside the other: nodes over its faces and through its volume.
func overlap(a, b geom.Body) bool { return reaches(a, b) || reaches(b, a) }

// reaches reports whether a sample of a lies strictly inside b. Face nodes are drawn in by a millionth of the size, so that
// equal faces that coincide count and faces that touch do not.
func reaches(a, b geom.Body) bool {
	box := a.Bounds()
	in := 1e-6 * r3.Norm(r3.Sub(box.Max, box.Min))
	found := false
	test := func(x r3.Vec) {
		p := pair.VecOf(x)
		if !found && a.Locate(p, 0).Region == geom.Inside && b.Locate(p, 0).Region == geom.Inside {
			found = true
		}
	}
	for _, f := range a.Faces() {
		f.Surface.Nodes(5, func(x, n r3.Vec, _ float64) { test(r3.Sub(x, r3.Scale(in*f.Sign(), n))) })
	}
	for _, c := range a.Cells() {
		c.Nodes(4, func(x r3.Vec, _ float64) { test(x) })
	}
	return found
}
