package response

import (
	"fmt"

	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"example.com/boundpole/geom/panel"
	"gonum.org/v1/gonum/spatial/r3"
)

// sheet is a connected part of the boundary of a body before its panels are refined.
type sheet struct {
	body, beyond int
	panels       []*panel.Panel
}

// sheets returns the parts of all boundaries. A part that two bodies share, a core and its coat, comes once.
func (s *System) sheets() ([]sheet, error) {
	var all []sheet
	for k, b := range s.bodies {
		panels, err := panel.Of(b, panel.Settings{Halve: s.set.Halve, Plain: s.set.Plain})
		if err != nil {
			return nil, fmt.Errorf("response: body %d: %w", k, err)
		}
		var own []sheet
		for _, p := range panels {
			for len(own) <= p.Part {
				own = append(own, sheet{body: k, beyond: -1})
			}
			own[p.Part].panels = append(own[p.Part].panels, p)
		}
		for _, sh := range own {
			if other := s.twin(all, sh); other != nil {
				other.beyond = k
				s.joined[[2]int{min(k, other.body), max(k, other.body)}] = true
				continue
			}
			all = append(all, sh)
		}
	}
	return all, nil
}

// twin returns the sheet of another body that coincides with sh, panel by panel, or nil.
func (s *System) twin(all []sheet, sh sheet) *sheet {
	meet := 1e-9 * halfDiagonal(s.bounds[sh.body])
	for k := range all {
		other := &all[k]
		if other.body == sh.body || other.beyond >= 0 || len(other.panels) != len(sh.panels) {
			continue
		}
		same := 0
		for _, p := range sh.panels {
			for _, q := range other.panels {
				if coincide(p, q, meet) {
					same++
					break
				}
			}
		}
		if same == len(sh.panels) {
			return other
		}
	}
	return nil
}

// coincide reports whether every point of a grid of 3 x 3 of p is one of q.
func coincide(p, q *panel.Panel, meet float64) bool {
	if distance(p.Point(0.5, 0.5), q.Point(0.5, 0.5)) > meet {
		return false
	}
	for i := range 9 {
		x, found := p.Point(float64(i%3)/2, float64(i/3)/2), false
		for j := range 9 {
			found = found || distance(x, q.Point(float64(j%3)/2, float64(j/3)/2)) <= meet
		}
		if !found {
			return false
		}
	}
	return true
}

// refine halves the panels of a sheet that are large beside their distance from another body.
func (s *System) refine(sh sheet, limit int) []*panel.Panel {
	var done []*panel.Panel
	panels := append([]*panel.Panel(nil), sh.panels...)
	for len(panels) > 0 {
		p := panels[len(panels)-1]
		panels = panels[:len(panels)-1]
		l := p.Lengths()
		along := 0
		if l[1] > l[0] {
			along = 1
		}
		if len(done)+len(panels) > limit || !s.near(sh, p, l[along]) && !s.pointed(p, l[along]) {
			done = append(done, p)
			continue
		}
		h := p.Halves(along)
		panels = append(panels, h[0], h[1])
	}
	return done
}

// pointed reports whether a panel is longer than its distance from one of the points of the settings.
func (s *System) pointed(p *panel.Panel, length float64) bool {
	for _, x := range s.set.Near {
		for i := range 25 {
			if distance(x, p.Point(float64(i%5)/4, float64(i/5)/4)) < length {
				return true
			}
		}
	}
	return false
}

// near reports whether a panel is too large for its distance from some other body.
func (s *System) near(sh sheet, p *panel.Panel, length float64) bool {
	body := sh.body
	for k, b := range s.bodies {
		if k == body || s.joined[[2]int{min(k, body), max(k, body)}] {
			continue
		}
		size := min(halfDiagonal(s.bounds[k]), halfDiagonal(s.bounds[body]))
		limit := length / s.set.Gap
		limit *= limit / size // the distance below which the panel is too large
		if boxDistance(s.bounds[k], p.Point(0.5, 0.5)) > limit+length {
			continue
		}
		for i := range 9 {
			if _, d := geom.Nearest(b, p.Point(float64(i%3)/2, float64(i/3)/2)); d < limit {
				return true
			}
		}
	}
	return false
}

func halfDiagonal(b r3.Box) float64 { return r3.Norm(r3.Sub(b.Max, b.Min)) / 2 }

// boxDistance returns the distance of x from a box, 0 inside.
func boxDistance(b r3.Box, x r3.Vec) float64 {
	return r3.Norm(r3.Vec{
		X: max(b.Min.X-x.X, 0, x.X-b.Max.X),
		Y: max(b.Min.Y-x.Y, 0, x.Y-b.Max.Y),
		Z: max(b.Min.Z-x.Z, 0, x.Z-b.Max.Z),
	})
}

// apart refuses bodies that touch or overlap, judged at the points of a grid of 9 x 9 on every panel.
func (s *System) apart(sh sheet) error {
	for k := range s.bodies {
		if k == sh.body || k == sh.beyond {
			continue
		}
		slack := 1e-9 * halfDiagonal(s.bounds[k])
		for _, p := range sh.panels {
			for i := range 81 {
				x := p.Point(float64(i%9)/8, float64(i/9)/8)
				if boxDistance(s.bounds[k], x) <= slack && s.locators[k].Locate(pair.VecOf(x), slack).Region != geom.Outside {
					return fmt.Errorf("response: %w: body %d has the point (%v, %v, %v) in or on body %d; leave a gap, or give parts of one material as one body",
						ErrOverlap, sh.body, x.X, x.Y, x.Z, k)
				}
			}
		}
	}
	return nil
}
