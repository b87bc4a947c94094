package handover

import (
	"fmt"

	"example.com/boundpole/field/cubature"
	"example.com/boundpole/field/element"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// skin is a charged surface in the frame and unit of the assembly.
type skin struct {
	surface geom.Surface
	sign    float64 // of the outward normal against the surface's own
	uniform bool
	charge  float64
	density func(x, n r3.Vec) float64 // n outward
}

// addSkin adds the group of a charged surface: its points and its facets.
func (b *builder) addSkin(g Group, s skin) error {
	g.Charge = b.charge(s.charge)
	var l lumps
	s.surface.Nodes(b.points, func(x, n r3.Vec, w float64) { l.add(x, w, w*s.density(x, r3.Scale(s.sign, n))) })
	l.settle(s.charge)
	g.Points = b.lumped(&l)
	charted, ok := s.surface.(geom.Charted)
	if !ok || len(charted.Charts()) == 0 {
		return fmt.Errorf("handover: %s %s of %s has no charts; use a surface that is Charted", g.Form, g.Place, g.Part)
	}
	var pieces lumps
	for _, c := range charted.Charts() {
		m := b.pieces
		if s.uniform && straight(c) {
			m = 1
		}
		for i := range m {
			for j := range m {
				s.cut(c, grid(i, j, m), &g, &pieces)
			}
		}
	}
	pieces.settle(s.charge)
	for k := range g.Facets {
		b.finish(&g.Facets[k], pieces.q[k])
	}
	b.set.Groups = append(b.set.Groups, g)
	return nil
}

// finish gives a facet its metres, its charge and what follows from both.
func (b *builder) finish(f *Facet, q float64) {
	for i, v := range f.Vertices {
		f.Vertices[i] = b.length(v)
	}
	n := area(f.Vertices)
	size := r3.Norm(n)
	f.Normal = r3.Add(r3.Scale(1/size, n), r3.Vec{})
	f.Charge = b.charge(q)
	f.Sigma = f.Charge / size
}

// lumps is charge at places, with the measure that each stands for.
type lumps struct {
	at   []r3.Vec
	w, q []float64
}

func (l *lumps) add(x r3.Vec, w, q float64) {
	l.at, l.w, l.q = append(l.at, x), append(l.w, w), append(l.q, q)
}

// settle adds a uniform density that makes the charges sum to the given one: it does away with what the rule misses.
func (l *lumps) settle(charge float64) {
	var q, w pair.Float
	for i := range l.q {
		q = q.AddFloat(l.q[i])
		w = w.AddFloat(l.w[i])
	}
	missing := (charge - q.Value()) / w.Value()
	for i := range l.q {
		l.q[i] += missing * l.w[i]
	}
}

// lumped returns the charges in SI units.
func (b *builder) lumped(l *lumps) []element.Point {
	points := make([]element.Point, len(l.at))
	for i, x := range l.at {
		points[i] = element.Point{At: b.length(x), Charge: b.charge(l.q[i])}
	}
	return points
}

// square is a piece of the parameters of a chart: corners in the order of the normal.
type square [4][2]float64

// grid returns the piece i, j of m times m.
func grid(i, j, m int) square {
	u0, u1 := float64(i)/float64(m), float64(i+1)/float64(m)
	v0, v1 := float64(j)/float64(m), float64(j+1)/float64(m)
	return square{{u0, v0}, {u1, v0}, {u1, v1}, {u0, v1}}
}

// flatness is how far, relative to its size, a facet's vertices may be off a plane, and a vertex from one it coincides with.
const flatness = 1e-12

// cut adds the facets of a piece: one if its corners are in one plane, else two triangles.
func (s *skin) cut(c geom.Chart, p square, g *Group, pieces *lumps) {
	var x [4]r3.Vec
	for k, at := range p {
		x[k], _, _ = c.At(at[0], at[1])
	}
	if plane(x[:]) {
		s.facet(x[:], c, p, g, pieces)
		return
	}
	s.facet([]r3.Vec{x[0], x[1], x[2]}, c, square{p[0], p[1], p[2], p[2]}, g, pieces)
	s.facet([]r3.Vec{x[0], x[2], x[3]}, c, square{p[0], p[2], p[3], p[3]}, g, pieces)
}

// plane reports whether four points are in one plane.
func plane(x []r3.Vec) bool {
	n := area(x)
	size := max(r3.Norm(r3.Sub(x[2], x[0])), r3.Norm(r3.Sub(x[3], x[1])))
	volume := r3.Dot(n, r3.Sub(x[1], x[0]))
	return volume <= flatness*size*size*size && volume >= -flatness*size*size*size
}

// facet adds one facet over a piece of parameters.
func (s *skin) facet(x []r3.Vec, c geom.Chart, p square, g *Group, pieces *lumps) {
	x = distinct(x)
	if len(x) < 3 {
		return
	}
	if s.sign < 0 {
		for i, j := 1, len(x)-1; i < j; i, j = i+1, j-1 {
			x[i], x[j] = x[j], x[i]
		}
	}
	var q, w pair.Float
	visitSquare(p, func(u, v, weight float64) {
		at, xu, xv := c.At(u, v)
		n := r3.Cross(xu, xv)
		size := r3.Norm(n)
		w = w.AddFloat(weight * size)
		if size > 0 {
			q = q.AddFloat(weight * size * s.density(at, r3.Scale(s.sign/size, n)))
		}
	})
	g.Facets = append(g.Facets, Facet{Vertices: x})
	pieces.add(x[0], w.Value(), q.Value())
}

// distinct returns the points without those that coincide with the one before.
func distinct(x []r3.Vec) []r3.Vec {
	size := 0.0
	for _, p := range x {
		size = larger(size, r3.Norm(r3.Sub(p, x[0])))
	}
	var out []r3.Vec
	for k, p := range x {
		if r3.Norm(r3.Sub(p, x[(k+len(x)-1)%len(x)])) > flatness*size {
			out = append(out, p)
		}
	}
	return out
}

// fine is the number of Gauss points a direction for the charge of a piece.
const fine = 6

// visitSquare visits a product rule on a piece of parameters, drawn bilinearly between its corners.
func visitSquare(p square, visit func(u, v, weight float64)) {
	rule := cubature.Legendre(fine)
	for i, a := range rule.X {
		for j, b := range rule.X {
			s, t := (1+a)/2, (1+b)/2
			var at, ds, dt [2]float64
			for k := range at {
				low, high := p[1][k]-p[0][k], p[2][k]-p[3][k]
				left, right := p[3][k]-p[0][k], p[2][k]-p[1][k]
				at[k] = p[0][k] + s*low + t*left + s*t*(high-low)
				ds[k] = (1-t)*low + t*high
				dt[k] = (1-s)*left + s*right
			}
			visit(at[0], at[1], rule.W[i]*rule.W[j]/4*(ds[0]*dt[1]-ds[1]*dt[0]))
		}
	}
}

// straight reports whether a chart is drawn bilinearly between corners that are in one plane: then it is a facet itself.
func straight(c geom.Chart) bool {
	var x [4]r3.Vec
	for k, at := range grid(0, 0, 1) {
		x[k], _, _ = c.At(at[0], at[1])
	}
	size := r3.Norm(r3.Sub(x[2], x[0])) + r3.Norm(r3.Sub(x[3], x[1]))
	for _, at := range [...][2]float64{{0.5, 0}, {0, 0.5}, {1, 0.5}, {0.5, 1}, {0.5, 0.5}, {0.25, 0.625}} {
		got, _, _ := c.At(at[0], at[1])
		u, v := at[0], at[1]
		want := r3.Add(r3.Add(r3.Scale((1-u)*(1-v), x[0]), r3.Scale(u*(1-v), x[1])), r3.Add(r3.Scale(u*v, x[2]), r3.Scale((1-u)*v, x[3])))
		if r3.Norm(r3.Sub(got, want)) > flatness*size {
			return false
		}
	}
	return plane(x[:])
}
