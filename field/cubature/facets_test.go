package cubature_test

import (
	"math"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/cubature"
	"example.com/boundpole/field/element"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// notched is a prism with a reflex corner and a sloping end.
var notched = geom.Prism{Base: [][2]float64{{0, 0}, {1, 0}, {1, 0.5}, {0.4, 0.6}, {0.3, 1.1}, {0, 1}}, Height: 0.8, TopSlope: [2]float64{0.2, -0.1}}

// cubicP is a polynomial of degree 3 with every kind of term.
var cubicP = field.Polynomial{
	{Component: 0, Coefficient: 1.3, Powers: [3]int{2, 0, 1}}, {Component: 0, Coefficient: 0.4, Powers: [3]int{0, 1, 0}},
	{Component: 1, Coefficient: -0.7, Powers: [3]int{1, 1, 0}}, {Component: 1, Coefficient: 0.3, Powers: [3]int{1, 0, 2}},
	{Component: 2, Coefficient: 0.9, Powers: [3]int{0, 1, 2}}, {Component: 2, Coefficient: 0.5},
}

const everything = field.WantPhi | field.WantG | field.WantGrad | field.WantErr

// TestFacets holds the exact form against integration over faces and cells, which shares nothing with it but the charts.
func TestFacets(t *testing.T) {
	exact, err := cubature.NewFacets(notched.Polyhedron(), cubicP)
	if err != nil {
		t.Fatal(err)
	}
	var sum field.Sum
	for _, f := range notched.Faces() {
		sign := f.Sign()
		l, err := cubature.NewLayer(f.Surface.(geom.Charted).Charts(), func(x, n r3.Vec) float64 { return sign * r3.Dot(cubicP.At(x), n) }, nil)
		if err != nil {
			t.Fatal(err)
		}
		sum = append(sum, l)
	}
	for _, c := range notched.Cells() {
		v, err := cubature.NewVolume(c.(geom.Blocked).Blocks(), func(x r3.Vec) float64 { return -cubicP.Divergence(x) }, nil)
		if err != nil {
			t.Fatal(err)
		}
		sum = append(sum, v)
	}
	for _, x := range []r3.Vec{{X: 0.5, Y: 0.3, Z: 0.1}, {X: 0.2, Y: 0.7, Z: -0.2}, {X: 1.1, Y: 0.9, Z: 0.3}, {X: -0.4, Y: 0.2, Z: 0.9}, {X: 0.4, Y: 0.59, Z: 0.41}} {
		got, want := field.At(exact, x, field.Mean, everything), field.At(sum, x, field.Mean, everything)
		if got.Status != field.Regular || want.Status != field.Regular {
			t.Errorf("at %v: %v and %v, want regular", x, got.Status, want.Status)
		}
		var d [6]float64
		for i := range d {
			d[i] = got.Grad[i] - want.Grad[i]
		}
		// the two claims together; the exact one is a few hundred u
		if e, tol := math.Abs(got.Phi-want.Phi), got.ErrPhi+want.ErrPhi; !(e <= tol) || got.ErrPhi > 1e-13 {
			t.Errorf("at %v: phi %v and %v, apart %.3g of %.3g", x, got.Phi, want.Phi, e, tol)
		}
		if e, tol := r3.Norm(r3.Sub(got.G, want.G)), got.ErrG+want.ErrG; !(e <= tol) || got.ErrG > 1e-13 {
			t.Errorf("at %v: g %v and %v, apart %.3g of %.3g", x, got.G, want.G, e, tol)
		}
		if e, tol := frobenius(d), got.ErrGrad+want.ErrGrad; !(e <= tol) || got.ErrGrad > 1e-12 {
			t.Errorf("at %v: gradient %v and %v, apart %.3g of %.3g", x, got.Grad, want.Grad, e, tol)
		}
	}
}

// TestFacetsAffine holds polynomials of degree 1 written as such against the closed form, beside an edge, a vertex and a face.
func TestFacetsAffine(t *testing.T) {
	p := field.Polynomial{{Component: 0, Coefficient: 0.3}, {Component: 1, Coefficient: 1.1, Powers: [3]int{1, 0, 0}}, {Component: 2, Coefficient: -0.4, Powers: [3]int{0, 0, 1}}}
	a := field.Affine{Value: r3.Vec{X: 0.3}, Gradient: [3][3]float64{{}, {1.1, 0, 0}, {0, 0, -0.4}}}
	exact, err := cubature.NewFacets(notched.Polyhedron(), p)
	if err != nil {
		t.Fatal(err)
	}
	form := element.NewPolyhedron(notched.Polyhedron(), a)
	for _, x := range []r3.Vec{{X: 0x1p-40, Y: 0.3, Z: 0.4}, {X: 0x1p-38, Y: -0x1p-37, Z: -0.4}, {X: 0.5, Y: 0.2, Z: -0.4}, {X: 0.5, Y: 0.2, Z: -0.4 + 0x1p-40}} {
		for _, side := range []field.Side{field.Mean, field.Inside, field.Outside} {
			got, want := field.At(exact, x, side, everything), field.At(form, x, side, everything)
			// one linear combination against another: 64 roundings of the largest term
			if e := r3.Norm(r3.Sub(got.G, want.G)); !(e <= 64*0x1p-53*(1+r3.Norm(want.G))) || got.Status != want.Status {
				t.Errorf("at %v: %v %v, want %v %v, error %.3g", x, got.G, got.Status, want.G, want.Status, e)
			}
		}
	}
}

// TestFacetsAllocate holds evaluation to no allocation.
func TestFacetsAllocate(t *testing.T) {
	exact, err := cubature.NewFacets(notched.Polyhedron(), cubicP)
	if err != nil {
		t.Fatal(err)
	}
	at, dst := field.PointsOf(r3.Vec{X: 0.5, Y: 0.3, Z: 0.1}), field.NewValues(1, everything)
	exact.Evaluate(dst, at, field.Mean)
	if n := testing.AllocsPerRun(20, func() { exact.Evaluate(dst, at, field.Mean) }); n > 0 {
		t.Errorf("%v allocations a point, want none", n)
	}
}

// TestFacetsRefuses names what is wrong with a polynomial.
func TestFacetsRefuses(t *testing.T) {
	for _, p := range []field.Polynomial{{{Component: 4}}, {{Powers: [3]int{13, 0, 0}}}} {
		if _, err := cubature.NewFacets(notched.Polyhedron(), p); err == nil {
			t.Errorf("%v is taken, want an error", p)
		}
	}
}

func BenchmarkFacets(b *testing.B) {
	exact, err := cubature.NewFacets(geom.Box{Size: r3.Vec{X: 1, Y: 1.4, Z: 0.7}}.Polyhedron(), cubicP)
	if err != nil {
		b.Fatal(err)
	}
	at, dst := field.PointsOf(r3.Vec{X: 0.6, Y: 0.3, Z: 0.1}), field.NewValues(1, everything)
	b.ReportAllocs()
	for b.Loop() {
		exact.Evaluate(dst, at, field.Mean)
	}
}
