package bound_test

import (
	"math"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// TestKinkedSums holds the sums of power laws on bodies that contain their axis or origin: the total vanishes and the dipole moment is
// that of p, to 1e-12 of the magnitudes.
func TestKinkedSums(t *testing.T) {
	radial := func(n float64) field.Polarization { return field.RadialPower{Coefficient: 1.5, Power: n} }
	central := func(n float64) field.Polarization { return field.CentralPower{Coefficient: -1, Power: n} }
	cases := []struct {
		name string
		body geom.Body
		laws []field.Polarization
	}{
		{"box", geom.Box{Size: r3.Vec{X: 1, Y: 1.4, Z: 0.8}}, []field.Polarization{radial(0), radial(0.5), central(1.5)}},
		{"prism", geom.Prism{Base: [][2]float64{{-0.5, -0.5}, {0.5, -0.4}, {0.1, 0.6}}, Height: 0.8}, []field.Polarization{radial(0), radial(2)}},
		{"cone", geom.Cone{Bottom: 0.8, Top: 0.3, Height: 1}, []field.Polarization{radial(0.5), central(0)}},
		{"hollow sphere", geom.HollowSphere{Inner: 0.3, Outer: 0.8}, []field.Polarization{radial(0)}},
		{"wedge", geom.ArcDegrees(0, 0.9, 0.6, 10, 130), []field.Polarization{radial(0.5)}},
		{"arc", geom.ArcDegrees(0.4, 0.9, 0.6, 10, 130), []field.Polarization{radial(0.5), central(2)}},
	}
	for _, k := range cases {
		name, body := k.name, k.body
		for _, p := range k.laws {
			c, err := bound.Of(body, p)
			if err != nil {
				t.Errorf("%s %T%v: %v", name, p, p, err)
				continue
			}
			var sum, size float64
			for _, l := range c.Layers {
				sum, size = sum+l.Charge, size+math.Abs(l.Charge)
			}
			for _, v := range c.Volumes {
				sum, size = sum+v.Charge, size+math.Abs(v.Charge)
			}
			if math.Abs(sum) > 1e-12*size { // the contract of a smooth law; panels resolve to 1e-9, squared by the Gauss rule
				t.Errorf("%s %T%v: total %.3g of %.3g", name, p, p, sum, size)
			}
			if d := c.Identities[1]; d.Miss > 1e-12*d.Scale { // as above
				t.Errorf("%s %T%v: dipole off by %.3g of %.3g", name, p, p, d.Miss, d.Scale)
			}
		}
	}
}

// TestRadialSum checks one charge by hand: p = s-hat on a cube of side 1 has the charge 4 asinh(1) inside, minus that on its walls:
// each wall carries int 0.5/sqrt(0.25 + y^2) dy = asinh(1).
func TestRadialSum(t *testing.T) {
	c, err := bound.Of(geom.Box{Size: r3.Vec{X: 1, Y: 1, Z: 1}}, field.RadialPower{Coefficient: 1})
	if err != nil {
		t.Fatal(err)
	}
	if q, want := c.Volumes[0].Charge, -4*math.Asinh(1); math.Abs(q-want) > 1e-12*4 { // the contract
		t.Errorf("charge inside %.17g, want %.17g", q, want)
	}
	if lo, hi := c.Layers[0].Min, c.Layers[0].Max; math.IsNaN(lo) || math.IsNaN(hi) {
		t.Errorf("extremes %v and %v on a face the axis pierces", lo, hi)
	}
}

// TestBesideEdge holds g of a quadratic polarization of a cylinder at 1e-12 sizes from the rim against the leading terms there:
// between two points at distances d and d/16 of the same direction g changes by log 16/(2 pi) times the end densities.
func TestBesideEdge(t *testing.T) {
	p := field.Polynomial{{Component: 0, Coefficient: 1, Powers: [3]int{2, 0, 0}}, {Component: 2, Coefficient: 0.5, Powers: [3]int{1, 0, 1}}, {Component: 2, Coefficient: 0.25}}
	c, err := bound.Of(geom.Cylinder{Radius: 1, Height: 2}, p)
	if err != nil {
		t.Fatal(err)
	}
	at := func(d float64) field.Value {
		return field.At(c, r3.Vec{X: 1 + d, Z: 1 + d}, field.Mean, field.WantG|field.WantErr)
	}
	const d = 0x1p-36
	near, far := at(d/16), at(d)
	got := r3.Sub(near.G, far.G)
	end := p.At(r3.Vec{X: 1, Z: 1})
	// the wall ends upwards with sigma = px, the top outwards with sigma = pz
	want := r3.Scale(math.Log(16)/(2*math.Pi), r3.Vec{X: end.Z, Z: end.X})
	if e := r3.Norm(r3.Sub(got, want)); e > 1e-8 || near.Status != field.Regular { // the next terms: d log d times slopes, 4e-10, and 1e-10
		t.Errorf("g rises by %v, want %v (%.3g), %v", got, want, e, near.Status)
	}
}
