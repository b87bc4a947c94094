package current_test

import (
	"math"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/current"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// TestTurnsHardPlaces holds the currents in circles against the poles at rims, on and next to the axis, on faces and far away.
func TestTurnsHardPlaces(t *testing.T) {
	cylinder, tube := geom.Cylinder{Radius: 1, Height: 1.5}, geom.Tube{Inner: 0.5, Outer: 1, Height: 1.5}
	var points []r3.Vec
	for _, d := range []float64{1e-3, 1e-6, 1e-9, 1e-12} {
		points = append(points, r3.Vec{X: 1 + d, Z: 0.75 - d}, r3.Vec{X: 0.6 * (1 - d), Y: 0.8 * (1 - d), Z: 0.75 + d}, r3.Vec{Y: 0.5 - d, Z: -0.75 + d},
			r3.Vec{X: d, Z: 0.7}, r3.Vec{X: d, Y: -d, Z: 0.75 + 1e-6}, r3.Vec{X: 0.7, Z: 0.75 + d})
	}
	for _, s := range []float64{3, 30, 1e3, 1e6} {
		points = append(points, r3.Vec{X: 0.6 * s, Y: -0.5 * s, Z: 0.7 * s}, r3.Vec{Z: s}, r3.Vec{X: s})
	}
	points = append(points, r3.Vec{Z: 0.25}, r3.Vec{X: 0.7, Z: 0.75}, r3.Vec{X: 0.6, Y: 0.8, Z: 0.3}, r3.Vec{X: -0.5, Z: 0.2})
	for _, c := range []magnetized{
		{name: "radial 0", body: cylinder, m: field.RadialPower{Coefficient: 1}},
		{name: "radial 0.5", body: cylinder, m: field.RadialPower{Coefficient: 1, Power: 0.5}},
		{name: "radial 3", body: cylinder, m: field.Times{Polarization: field.RadialPower{Coefficient: 1, Power: 3}, Factor: -2}},
		{name: "radial -1", body: tube, m: field.RadialPower{Coefficient: 1, Power: -1}},
		{name: "axial 1", body: tube, m: field.AxialPower{Coefficient: 1, Power: 1}},
		{name: "axial 5", body: cylinder, m: field.AxialPower{Coefficient: 1, Power: 5}},
	} {
		poles, err := bound.Of(c.body, c.m)
		if err != nil {
			t.Fatal(err)
		}
		amp, err := current.Of(c.body, c.m)
		if err != nil {
			t.Fatal(err)
		}
		peak, worst := largest(c), 0.0
		reach := math.Hypot(1, 0.75)
		for _, x := range points {
			for _, side := range []field.Side{field.Mean, field.Inside, field.Outside} {
				p := field.At(poles, x, side, field.WantG|field.WantErr)
				v := current.At(amp, x, side)
				if math.IsNaN(p.G.X) || v.Status == field.OnEdge {
					continue
				}
				want := p.G
				switch place := poles.Locate(pointOf(x), 0); {
				case place.Region == geom.Inside && !math.IsNaN(c.m.At(x).X), place.Region == geom.On && side == field.Inside:
					want = r3.Add(want, c.m.At(x))
				case place.Region == geom.On && side == field.Mean:
					want = r3.Add(want, r3.Scale(0.5, c.m.At(x)))
				}
				miss := r3.Norm(r3.Sub(v.B, want))
				far := min(1, math.Pow(reach/r3.Norm(x), 3))
				worst = max(worst, miss/max(r3.Norm(want), 1e-3*peak*far))
				if v.Status == field.NotConverged || !(miss <= 1e-10*max(r3.Norm(want), 1e-3*peak*far)) || !(miss <= v.ErrB+p.ErrG+4*u*r3.Norm(want)) {
					t.Errorf("%s at %v side %d: b %v, h + m %v, off by %.3g, estimates %.3g, %.3g; %v", c.name, x, side, v.B, want, miss, v.ErrB, p.ErrG, v.Status)
				}
			}
		}
		t.Logf("%s: worst %.2g", c.name, worst)
	}
}

// TestThinTube: far from a thin tube the length of its sheets keeps its digits.
func TestThinTube(t *testing.T) {
	const thin = 0x1p-20
	amp, err := current.Of(geom.Tube{Inner: 1 - thin, Outer: 1, Height: 1}, field.RadialPower{Coefficient: 1})
	if err != nil {
		t.Fatal(err)
	}
	x := r3.Vec{X: 3, Y: 1, Z: 0.25}
	var want r3.Vec
	for _, s := range []float64{-1, 1} {
		l, err := current.NewLoop(geom.Disc{Radius: 1 - thin/2, Z: s / 2}, -s*thin)
		if err != nil {
			t.Fatal(err)
		}
		want = r3.Add(want, l.Field(x))
	}
	if d := r3.Norm(r3.Sub(current.At(amp, x, field.Mean).B, want)); d > 1e-12*r3.Norm(want) { // thin^2/24
		t.Errorf("off by %.3g of %.3g", d, r3.Norm(want))
	}
}
