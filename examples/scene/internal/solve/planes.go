package solve

import (
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/image"
	"gonum.org/v1/gonum/spatial/r3"
)

// mirrors reports whether a plane of the scene acts on parts of a kind: iron on magnets, conductors and dielectrics on charge.
func mirrors(kind string, of Kind) bool {
	return (kind == "iron") == (of == Magnetized) && of != Circulating
}

// addPlanes makes the walls of the scene. Several of one kind of parts stand at right angles, so that the images of images
// come to an end.
func (s *Setup) addPlanes() error {
	for i, p := range s.Scene.Planes {
		w := image.Plane{Point: p.Point, Normal: direction(p.Normal), Ratio: math.Inf(1)}
		if p.Permittivity != nil {
			w.Ratio = *p.Permittivity
		}
		if err := w.Check(); err != nil {
			return s.Scene.ErrorAt(fmt.Sprintf("/planes/%d", i), plainWords(err), "")
		}
		for k, other := range s.walls {
			if (s.Scene.Planes[k].Kind == "iron") != (p.Kind == "iron") {
				continue
			}
			if c := r3.Dot(r3.Unit(w.Normal), r3.Unit(other.Normal)); math.Abs(c) > 1e-12 {
				return s.Scene.ErrorAt(fmt.Sprintf("/planes/%d/normal", i), fmt.Sprintf("the plane is not at right angles to plane %d", k),
					"planes that act on the same parts stand at right angles to each other")
			}
		}
		s.walls = append(s.walls, w)
	}
	return nil
}

// mirrored returns parts of a kind with one more that is all their images.
func (s *Setup) mirrored(parts bound.Assembly, of Kind) bound.Assembly {
	if len(parts) == 0 {
		return parts
	}
	if images := s.images(parts, of); images != nil {
		return append(parts[:len(parts):len(parts)], bound.Member{Source: images})
	}
	return parts
}

// images returns the images of a source in the planes that act on its kind, nil for none: each plane mirrors what the ones
// before it have made.
func (s *Setup) images(src field.Source, of Kind) field.Source {
	all := field.Sum{src}
	for i, w := range s.walls {
		if !mirrors(s.Scene.Planes[i].Kind, of) {
			continue
		}
		for _, one := range all[:len(all):len(all)] {
			all = append(all, image.Image{Source: one, Plane: w})
		}
	}
	if len(all) == 1 {
		return nil
	}
	return all[1:]
}

// checkSides refuses parts that reach behind a plane.
func (s *Setup) checkSides() error {
	for i := range s.Parts {
		p := &s.Parts[i]
		for k, w := range s.walls {
			if !mirrors(s.Scene.Planes[k].Kind, p.Kind) {
				continue
			}
			if depth, size := p.behind(w); depth > 1e-9*size {
				return s.Scene.ErrorAt(fmt.Sprintf("/parts/%d", p.Of), fmt.Sprintf("%s reaches %.3g %s behind plane %d", p.Name, depth, s.Scene.Length, k),
					"move it to the side of the plane's normal")
			}
		}
	}
	return nil
}

// behind returns how far a part reaches behind a plane, over points of its faces, and its size.
func (p *Part) behind(w image.Plane) (depth, size float64) {
	size = r3.Norm(r3.Sub(p.Local.Max, p.Local.Min))
	see := func(x, _ r3.Vec, _ float64) { depth = max(depth, -w.Height(x)) }
	switch {
	case p.Body != nil:
		for _, f := range p.Body.Faces() {
			f.Surface.Nodes(8, see)
		}
	case p.Sheet != nil:
		p.Sheet.Nodes(8, see)
	default:
		see(p.Centre, r3.Vec{}, 0)
	}
	return depth, size
}

// hidden reports whether a point lies behind a plane that acts on parts of a kind.
func (s *Setup) hidden(x r3.Vec, of Kind) bool {
	for k, w := range s.walls {
		if mirrors(s.Scene.Planes[k].Kind, of) && w.Height(x) < -1e-12*(r3.Norm(x)+r3.Norm(w.Point)) {
			return true
		}
	}
	return false
}

// warnOperating warns of magnets with a grade that are past the limit of their material.
func (s *Setup) warnOperating() {
	const points = 4 // a direction in each cell and on each face
	k := -1          // index among the magnets of the model
	for i := range s.Parts {
		p := &s.Parts[i]
		if p.Kind != Magnetized || p.chi != nil {
			continue
		}
		k++
		limit, name := p.material.Limit()
		if p.Charge == nil || name == "" || i > 0 && p.Of == s.Parts[i-1].Of {
			continue
		}
		m, err := s.magnetic.Operating(k, p.material, points)
		if err != nil || !m.Passed {
			continue
		}
		worst := m.Points[m.Worst]
		s.Warnings = append(s.Warnings, fmt.Sprintf("%s: at %g °C the field against its magnetization reaches %.4g kA/m, past its %s of %.4g kA/m: expect a lasting loss.",
			p.Name, p.material.Temperature, -worst.H/1e3, name, limit/1e3))
	}
}
