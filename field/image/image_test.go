package image_test

import (
	"math"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/element"
	"example.com/boundpole/field/image"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"example.com/boundpole/verify/law"
	"gonum.org/v1/gonum/spatial/r3"
)

func charge(t *testing.T) *bound.Charge {
	t.Helper()
	turn, err := geom.Turn(r3.Vec{X: 1, Y: 1, Z: 3}, 50)
	if err != nil {
		t.Fatal(err)
	}
	c, err := bound.Of(geom.At(geom.Box{Size: r3.Vec{X: 1, Y: 0.5, Z: 0.75}}, turn.Then(geom.Translate(r3.Vec{X: 0.25, Z: 2}))), field.Uniform{P: r3.Vec{X: 0.3, Y: -0.4, Z: 1}})
	if err != nil {
		t.Fatal(err)
	}
	return c
}

// TestImage checks the conditions on the plane, the two sides of which the laws of images are made for: on a conductor the field is
// normal and the potential zero; before a dielectric the tangential field of source and image is 2/(e+1) of the source's.
func TestImage(t *testing.T) {
	c := charge(t)
	for _, ratio := range []float64{math.Inf(1), 4, 1, 0.25, 0} {
		plane := image.Plane{Point: r3.Vec{X: 3, Y: -1, Z: 0.5}, Normal: r3.Vec{X: -0.3, Y: 0.1, Z: 2}, Ratio: ratio}
		if err := plane.Check(); err != nil {
			t.Fatal(err)
		}
		img := image.Image{Source: c, Plane: plane}
		n := r3.Unit(plane.Normal)
		k := plane.Factor()
		for _, d := range []r3.Vec{{}, {X: 1, Y: 2}, {X: -3, Y: 0.5}} {
			x := r3.Add(plane.Point, r3.Sub(d, r3.Scale(r3.Dot(d, n), n)))
			want := field.WantPhi | field.WantG | field.WantGrad | field.WantErr
			a, b := field.At(c, x, field.Mean, want), field.At(img, x, field.Mean, want)
			const tol = 1e-13 // accuracy of the closed form, and the rounding of a place on the plane
			size := r3.Norm(a.G)
			if d := math.Abs(b.Phi - k*a.Phi); d > tol*size {
				t.Errorf("ratio %v: potential of the image %v, want %v", ratio, b.Phi, k*a.Phi)
			}
			if d := r3.Norm(r3.Sub(b.G, r3.Scale(k, plane.Mirror(a.G)))); d > tol*size || d > a.ErrG+b.ErrG+1e-14*size {
				t.Errorf("ratio %v: field of the image off by %v", ratio, d)
			}
			// jump of the normal displacement: (1+k') side by side with the transmitted field 2/(1+e) of the source
			if !math.IsInf(ratio, 1) {
				normal := r3.Dot(r3.Add(a.G, b.G), n)
				if d := math.Abs(normal - ratio*2/(1+ratio)*r3.Dot(a.G, n)); d > tol*size {
					t.Errorf("ratio %v: displacement jumps by %v", ratio, d)
				}
			}
		}
	}
}

// TestLaws hands the image to the conformance kit: it is a source like any other.
func TestLaws(t *testing.T) {
	c := charge(t)
	plane := image.Conductor(r3.Vec{Z: 0.5}, r3.Vec{X: 0.1, Z: 1})
	centre := plane.Reflect(pair.VecOf(c.Body().Centroid())).Value() // the half diagonal of the box is 0.673
	if err := law.Source(image.Image{Source: c, Plane: plane}, law.Claims{Clear: func(x r3.Vec) float64 { return max(0, r3.Norm(r3.Sub(x, centre))-0.7) }, Total: &law.Total{}}); err != nil {
		t.Error(err)
	}
}

// TestPoint compares with the field of a mirrored charge and dipole.
func TestPoint(t *testing.T) {
	plane := image.Plane{Normal: r3.Vec{Z: 2}, Ratio: 3}
	q := element.Point{At: r3.Vec{X: 1, Y: 2, Z: 3}, Charge: 2}
	x := r3.Vec{X: 0.5, Y: -1, Z: 2}
	got, want := field.At(image.Image{Source: q, Plane: plane}, x, field.Mean, field.WantPhi|field.WantG|field.WantGrad),
		field.At(element.Point{At: r3.Vec{X: 1, Y: 2, Z: -3}, Charge: -1}, x, field.Mean, field.WantPhi|field.WantG|field.WantGrad)
	if r3.Norm(r3.Sub(got.G, want.G)) > 1e-15*r3.Norm(want.G) || math.Abs(got.Phi-want.Phi) > 1e-15*math.Abs(want.Phi) { // a few roundings
		t.Errorf("got %+v, want %+v", got, want)
	}
	for i := range got.Grad {
		if math.Abs(got.Grad[i]-want.Grad[i]) > 1e-15*r3.Norm(want.G) { // a few roundings
			t.Errorf("gradient %d: %v, want %v", i, got.Grad[i], want.Grad[i])
		}
	}
}

func TestRefusals(t *testing.T) {
	for _, p := range []image.Plane{{}, {Normal: r3.Vec{Z: math.NaN()}}, {Normal: r3.Vec{Z: 1}, Ratio: -1}, {Normal: r3.Vec{Z: 1}, Ratio: math.NaN()}} {
		if p.Check() == nil {
			t.Errorf("%+v was not refused", p)
		}
	}
}

// TestAllocations demands that evaluation allocates nothing.
func TestAllocations(t *testing.T) {
	img := image.Image{Source: charge(t), Plane: image.Iron(r3.Vec{}, r3.Vec{Z: 1})}
	at := field.PointsOf(r3.Vec{X: 1, Z: 1}, r3.Vec{X: 2, Z: 1})
	v := field.NewValues(2, field.WantPhi|field.WantG|field.WantErr)
	if n := testing.AllocsPerRun(50, func() { img.Evaluate(v, at, field.Mean) }); n > 0 {
		t.Errorf("%v allocations, want none", n)
	}
}
