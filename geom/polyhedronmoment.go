package geom

import (
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// moments are the integrals of 1, r, and r r^T (xx yy zz xy xz yz) over a polyhedron.
type moments struct {
	volume pair.Float
	first  pair.Vec
	second [6]pair.Float
}

// momentsAbout sums the signed tetrahedra from the point c to the triangles of all faces, with r counted from c. With
// the vertices a, b, d from c, a tetrahedron has six times the volume w = a.(b x d) and
//
//	int r = w/24 s,  int r r^T = w/120 (a a^T + b b^T + d d^T + s s^T),  s = a + b + d.
//
// In pairs the signed sum loses nothing that shows in float64.
func (p Polyhedron) momentsAbout(c pair.Vec) (m moments) {
	for f := range p.Loops {
		l := p.face(f)
		if l.len() < 3 {
			continue
		}
		a, b := l.at(0).Sub(c), l.at(1).Sub(c)
		for k := 2; k < l.len(); k++ {
			d := l.at(k).Sub(c)
			m.add(a, b, d)
			b = d
		}
	}
	m.volume = m.volume.Div(pair.Of(6))
	m.first = m.first.Scale(pair.Of(1).Div(pair.Of(24)))
	for i := range m.second {
		m.second[i] = m.second[i].Div(pair.Of(120))
	}
	return m
}

func (m *moments) add(a, b, d pair.Vec) {
	w := a.Dot(b.Cross(d))
	s := a.Add(b).Add(d)
	m.volume = m.volume.Add(w)
	m.first = m.first.Add(s.Scale(w))
	for _, v := range [4]pair.Vec{a, b, d, s} {
		for i, p := range [6]pair.Float{v.X.Mul(v.X), v.Y.Mul(v.Y), v.Z.Mul(v.Z), v.X.Mul(v.Y), v.X.Mul(v.Z), v.Y.Mul(v.Z)} {
			m.second[i] = m.second[i].Add(w.Mul(p))
		}
	}
}

// middle returns a vertex mean as the local origin.
func (p Polyhedron) middle() pair.Vec {
	if len(p.Vertices) == 0 {
		return pair.Vec{}
	}
	return pair.VecOf(loop{vertices: p.Vertices}.mean().Value())
}

// Volume returns the volume.
func (p Polyhedron) Volume() float64 { return p.momentsAbout(p.middle()).volume.Value() }

// Centroid returns the centre of volume.
func (p Polyhedron) Centroid() r3.Vec { return p.centroid().Value() }

func (p Polyhedron) centroid() pair.Vec {
	c := p.middle()
	m := p.momentsAbout(c)
	return c.Add(m.first.Scale(pair.Of(1).Div(m.volume)))
}

// SecondMoment returns the second moment about the centroid.
func (p Polyhedron) SecondMoment() [3][3]float64 {
	s := p.momentsAbout(p.centroid()).second
	xx, yy, zz := s[0].Value(), s[1].Value(), s[2].Value()
	xy, xz, yz := s[3].Value(), s[4].Value(), s[5].Value()
	return [3][3]float64{{xx, xy, xz}, {xy, yy, yz}, {xz, yz, zz}}
}
