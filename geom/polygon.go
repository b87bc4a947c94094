package geom

import (
	"fmt"
	"math"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Polygon is a plane polygon without holes, convex or not, with the normal by the right-hand rule.
type Polygon struct {
	Vertices []r3.Vec
	Low      []r3.Vec // what rounding left out of the vertices, for polygons made by a computation; nil for none
}

func (p Polygon) loop() loop { return loop{vertices: p.Vertices, low: p.Low} }

// Check refuses fewer than three vertices, vertices that are not finite, coincide or are not in one plane, and outlines
// that cross themselves or enclose no area.
func (p Polygon) Check() error {
	if len(p.Vertices) < 3 {
		return fmt.Errorf("geom: polygon has %d vertices; give at least 3", len(p.Vertices))
	}
	if err := checkPoints("polygon", p.Vertices, p.Low); err != nil {
		return err
	}
	return p.loop().check("polygon")
}

// Normal returns the unit normal in pairs.
func (p Polygon) Normal() pair.Vec { return p.loop().area().Unit() }

// Area returns the area.
func (p Polygon) Area() float64 { return p.loop().area().Norm().Value() }

// Bounds returns the smallest box along the axes.
func (p Polygon) Bounds() r3.Box { return p.loop().bounds() }

// Centroid returns the centre of area.
func (p Polygon) Centroid() r3.Vec {
	l := p.loop()
	if l.len() < 3 {
		return r3.Vec{X: math.NaN(), Y: math.NaN(), Z: math.NaN()}
	}
	n := l.area()
	v0 := l.at(0)
	var sum pair.Vec
	var total pair.Float
	a := l.at(1).Sub(v0)
	for k := 2; k < l.len(); k++ {
		b := l.at(k).Sub(v0)
		w := a.Cross(b).Dot(n) // twice the signed area of the triangle, times that of the polygon
		sum = sum.Add(a.Add(b).Scale(w))
		total = total.Add(w)
		a = b
	}
	return v0.Add(sum.Scale(pair.Of(1).Div(total.Scale(3)))).Value()
}

// Locate tells whether x lies on the polygon.
func (p Polygon) Locate(x pair.Vec, slack float64) Place {
	l, v := p.loop(), x.Value()
	bounds := l.bounds()
	tol := OnTolerance(bounds, v, slack)
	if beyond(bounds, v, tol) {
		return outside()
	}
	switch c, n := l.touch(x, tol); c {
	case atRim:
		return onEdge()
	case within:
		return Place{Region: On, Normal: n.Value()}
	}
	return outside()
}

// Nodes visits the points of a product Gauss rule on a parallelogram, else of collapsed Gauss rules on the triangles
// of the polygon. All weights are positive.
//
// Points are rounded to float64, so low parts of vertices show in them only by a last bit. Weights are taken from
// differences in pairs: on a thin strip far from the origin they too are right to a few roundings.
func (p Polygon) Nodes(n int, visit func(x, normal r3.Vec, weight float64)) {
	if len(p.Vertices) < 3 {
		return
	}
	l, normal := p.loop(), p.Normal()
	if p.parallelogram() {
		l.visitQuadrilateral(n, normal, visit)
		return
	}
	out, v := normal.Value(), p.Vertices
	for _, t := range triangles(l) {
		a := l.at(t[0])
		double := l.at(t[1]).Sub(a).Cross(l.at(t[2]).Sub(a)).Norm().Value()
		visitTriangle(n, v[t[0]], v[t[1]], v[t[2]], func(x r3.Vec, weight float64) { visit(x, out, double*weight) })
	}
}

// parallelogram reports whether the polygon is one, up to the rounding of its vertices.
func (p Polygon) parallelogram() bool {
	v := p.Vertices
	if len(v) != 4 {
		return false
	}
	skew := r3.Sub(r3.Sub(v[1], v[0]), r3.Sub(v[2], v[3]))
	return r3.Norm(skew) <= 4*0x1p-53*largest(v)
}

// visitQuadrilateral visits the points of the product rule on the square (s, t), mapped to
//
//	x = v0 + s a + t b + s t d,  dA = n.(a x b + s a x d + t d x b) ds dt,
//
// with d what the vertices lack to a parallelogram: little beside a and b, but not beside the area of a thin strip.
func (l loop) visitQuadrilateral(n int, normal pair.Vec, visit func(x, normal r3.Vec, weight float64)) {
	v0 := l.at(0)
	a, b := l.at(1).Sub(v0), l.at(3).Sub(v0)
	d := l.at(2).Sub(v0).Sub(a).Sub(b)
	area, areaS, areaT := normal.Dot(a.Cross(b)).Value(), normal.Dot(a.Cross(d)).Value(), normal.Dot(d.Cross(b)).Value()
	out, origin, p, q, r := normal.Value(), v0.Value(), a.Value(), b.Value(), d.Value()
	rule := legendre(n, 0, 1)
	for _, s := range rule {
		for _, t := range rule {
			x := r3.Add(r3.Scale(s.x, p), r3.Add(r3.Scale(t.x, q), r3.Scale(s.x*t.x, r)))
			visit(r3.Add(origin, x), out, (area+s.x*areaS+t.x*areaT)*s.w*t.w)
		}
	}
}
