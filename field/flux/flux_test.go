package flux_test

import (
	"context"
	"errors"
	"math"
	"strings"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/closedform"
	"example.com/boundpole/field/element"
	"example.com/boundpole/field/flux"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

var ctx = context.Background()

// TestPointThroughDisc: the flux of a charge on the axis of a disc is q times the solid angle over 4 pi.
func TestPointThroughDisc(t *testing.T) {
	const q, a = 3.0, 2.0
	for _, z := range []float64{0.01, 0.3, 5, 1e4} {
		src := element.Point{At: r3.Vec{Z: -z}, Charge: q}
		r, err := flux.Through(ctx, src, geom.Disc{Radius: a}, field.Mean, flux.Settings{})
		want := q / 2 * a * a / (math.Hypot(z, a) * (math.Hypot(z, a) + z)) // (1 - cos)/2
		if e := math.Abs(r.Value - want); err != nil || e > r.Estimate || e > 1e-10*want {
			t.Errorf("z = %v: %v ± %v, want %v, %v", z, r.Value, r.Estimate, want, err)
		}
	}
}

// TestGauss: the flux out of a closed surface is the charge within it, 0 for a body and q for a charge.
func TestGauss(t *testing.T) {
	c, err := bound.Of(geom.Box{Size: r3.Vec{X: 1, Y: 1.5, Z: 0.5}}, field.Uniform{P: r3.Vec{X: 0.3, Y: -1, Z: 2}})
	if err != nil {
		t.Fatal(err)
	}
	all := field.Sum{c, element.Point{At: r3.Vec{X: 0.2, Y: 0.1}, Charge: 0.7}, element.Point{At: r3.Vec{X: 4}, Charge: -5}}
	for name, body := range map[string]geom.Body{
		"sphere": geom.Sphere{Radius: 1.3}, "torus about nothing": geom.At(geom.Torus{Major: 1, Minor: 0.4}, geom.Translate(r3.Vec{Z: 3})),
		"cylinder": geom.Cylinder{Radius: 1.2, Height: 2.5},
	} {
		var sum, estimate float64
		for _, f := range body.Faces() {
			r, err := flux.Through(ctx, all, f.Surface.(geom.Charted), field.Mean, flux.Settings{})
			if err != nil {
				t.Fatalf("%s: %v", name, err)
			}
			sum, estimate = sum+f.Sign()*r.Value, estimate+r.Estimate
		}
		want := 0.7
		if name == "torus about nothing" {
			want = 0
		}
		if math.Abs(sum-want) > estimate || estimate > 1e-8 { // 1e-10 of some ten units of |flux|, with what panels add
			t.Errorf("%s: flux %v ± %v, want %v", name, sum, estimate, want)
		}
	}
}

// TestFluxmetric: the mean over the middle plane of a cylinder is its fluxmetric demagnetizing factor.
func TestFluxmetric(t *testing.T) {
	c, err := bound.Of(geom.Cylinder{Radius: 1, Height: 1}, field.Uniform{P: r3.Vec{Z: 1}})
	if err != nil {
		t.Fatal(err)
	}
	r, err := flux.Mean(ctx, c, geom.Disc{Radius: 1}, field.Mean, flux.Settings{Accuracy: 1e-11})
	want := -closedform.CylinderFluxmetricFactor(1, 1)
	if e := math.Abs(r.Value - want); err != nil || e > r.Estimate || e > 1e-11 {
		t.Errorf("mean %v ± %v, want %v, %v", r.Value, r.Estimate, want, err)
	}
}

// TestAcrossEdge: on the end plane of a cylinder, past its rim, the field has a logarithmic rim and the value converges to
// what the estimate says.
func TestAcrossEdge(t *testing.T) {
	c, err := bound.Of(geom.Cylinder{Radius: 1, Height: 1}, field.Uniform{P: r3.Vec{Z: 1}})
	if err != nil {
		t.Fatal(err)
	}
	patch := geom.Polygon{Vertices: []r3.Vec{{X: 0.5, Y: -1, Z: 0.5}, {X: 1.5, Y: -1, Z: 0.5}, {X: 1.5, Y: 1, Z: 0.5}, {X: 0.5, Y: 1, Z: 0.5}}}
	rough, err := flux.Through(ctx, c, patch, field.Outside, flux.Settings{Accuracy: 1e-4})
	if err != nil {
		t.Fatal(err)
	}
	fine, err := flux.Through(ctx, c, patch, field.Outside, flux.Settings{Accuracy: 1e-6})
	if err != nil && !errors.Is(err, flux.ErrNotConverged) {
		t.Fatal(err)
	}
	if d := math.Abs(rough.Value - fine.Value); d > rough.Estimate+fine.Estimate || rough.Estimate > 1e-4*rough.Size*1.01 {
		t.Errorf("%v ± %v and %v ± %v", rough.Value, rough.Estimate, fine.Value, fine.Estimate)
	}
}

func TestRefusals(t *testing.T) {
	wall := func(_, _ []r3.Vec, value, err []float64) {
		for i := range value {
			value[i], err[i] = math.NaN(), 0
		}
	}
	if _, err := flux.Over(ctx, geom.Disc{Radius: 1}, wall, flux.Settings{}); err == nil || !strings.Contains(err.Error(), "NaN at") {
		t.Errorf("an integrand of NaN: %v", err)
	}
	random := func(x, _ []r3.Vec, value, err []float64) {
		for i := range value {
			value[i], err[i] = math.Sin(1e6*x[i].X), 0
		}
	}
	if r, err := flux.Over(ctx, geom.Disc{Radius: 1}, random, flux.Settings{Panels: 50}); !errors.Is(err, flux.ErrNotConverged) || r.Panels != 50 {
		t.Errorf("a rough integrand: %+v, %v", r, err)
	}
	stopped, cancel := context.WithCancel(ctx)
	cancel()
	if _, err := flux.Over(stopped, geom.Disc{Radius: 1}, random, flux.Settings{}); !errors.Is(err, context.Canceled) {
		t.Errorf("a context that is cancelled: %v", err)
	}
}
