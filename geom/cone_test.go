package geom

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// coneEdges returns points of the rims and the tip of a cone.
func coneEdges(c Cone) (points []pair.Vec) {
	for k := range 12 {
		sin, cos := pair.SinCosDegrees(float64(30*k) + 7)
		points = append(points,
			pair.Vec{X: cos.Scale(c.Bottom), Y: sin.Scale(c.Bottom), Z: pair.Of(-c.Height / 2)},
			pair.Vec{X: cos.Scale(c.Top), Y: sin.Scale(c.Top), Z: pair.Of(c.Height / 2)})
	}
	return points
}

// conePoint returns the k-th of some points of the faces of a cone in the direction e, and the outward normal there.
func conePoint(c Cone, k int, e pair.Vec) (x, normal pair.Vec) {
	half := pair.Of(c.Height / 2)
	switch {
	case k == 0 && c.Bottom > 0:
		x = e.Scale(pair.Of(0.4 * c.Bottom))
		x.Z = half.Neg()
		return x, pair.Vec{Z: pair.Of(-1)}
	case k == 1 && c.Top > 0:
		x = e.Scale(pair.Of(0.4 * c.Top))
		x.Z = half
		return x, pair.Vec{Z: pair.Of(1)}
	}
	t := 0.1 * float64(k+1)
	rise := pair.Sum(c.Top, -c.Bottom)
	x = e.Scale(rise.Scale(t).AddFloat(c.Bottom))
	x.Z = pair.Product(c.Height, t).Sub(half)
	normal = e.Scale(pair.Of(c.Height))
	normal.Z = rise.Neg()
	return x, normal.Unit()
}

// Random points are where the plain formula puts them.
func TestLocateCone(t *testing.T) {
	rng := rand.New(rand.NewPCG(45, 46))
	for range 300 {
		c := Cone{Bottom: rng.Float64(), Top: rng.Float64(), Height: 2 * rng.Float64()}
		switch rng.IntN(4) {
		case 0:
			c.Bottom = 0
		case 1:
			c.Top = 0
		}
		for range 30 {
			x := r3.Vec{X: 2.2 * (rng.Float64() - 0.5), Y: 2.2 * (rng.Float64() - 0.5), Z: 1.1 * c.Height * (rng.Float64() - 0.5)}
			in := math.Abs(x.Z) < c.Height/2 && math.Hypot(x.X, x.Y) < c.Bottom+(c.Top-c.Bottom)*(x.Z/c.Height+0.5)
			if got := c.Locate(pair.VecOf(x), 0); got.Region == Inside != in || got.Region == On {
				t.Errorf("%+v: %v: got %+v, inside by formula %v", c, x, got, in)
			}
		}
	}
}

// Around a tip and beside a rim every distance counts, whatever the angle of the wall.
func TestLocateConeSharp(t *testing.T) {
	needle, lid := Cone{Bottom: 1e-3, Height: 1}, Cone{Bottom: 1, Height: 1e-3}
	cases := []struct {
		name string
		body Cone
		x    r3.Vec
		want Place
	}{
		{"tip", needle, r3.Vec{Z: 0.5}, onEdge()},
		{"above the tip", needle, r3.Vec{Z: 0.5 + 1e-12}, outside()},
		{"below the tip", needle, r3.Vec{Z: 0.5 - 1e-12}, inside()},
		{"beside the tip", needle, r3.Vec{X: 1e-12, Z: 0.5}, outside()},
		{"within tolerance of both sides below the tip", needle, r3.Vec{Z: 0.5 - 1e-14}, onEdge()},
		{"mirror cone", needle, r3.Vec{Z: 0.6}, outside()},
		{"tip of a lid", lid, r3.Vec{Z: 0.5e-3}, onEdge()},
		{"above the lid", lid, r3.Vec{Z: 0.5e-3 + 1e-12}, outside()},
		{"below the lid", lid, r3.Vec{Z: 0.5e-3 - 1e-12}, inside()},
		{"rim of the lid", lid, r3.Vec{X: 0.6, Y: -0.8, Z: -0.5e-3}, onEdge()},
		{"within the rim of the lid", lid, r3.Vec{X: 1 - 1e-9, Z: -0.5e-3 + 0.5e-12}, inside()},
		{"beyond the rim of the lid", lid, r3.Vec{X: 1 + 1e-12, Z: -0.5e-3}, outside()},
		{"beyond the rim along the wall", lid, r3.Vec{X: 1 + 1e-12, Z: -0.5e-3 - 1e-15}, outside()},
		{"beside an end", Cone{Bottom: 1, Top: 0.5, Height: 1}, r3.Vec{X: 0.75, Z: 0.5}, outside()},
		{"line of the wall beyond an end", Cone{Bottom: 1, Top: 0.5, Height: 1e-3}, r3.Vec{X: 0.5 - 1e-13, Z: 0.5e-3 + 2e-16}, Place{Region: On, Face: 1, Normal: r3.Vec{Z: 1}}},
		{"far along the wall", lid, r3.Vec{X: 0.999999999999, Z: 0}, outside()},
	}
	for _, c := range cases {
		if got := c.body.Locate(pair.VecOf(c.x), 0); got != c.want {
			t.Errorf("%s: got %+v, want %+v", c.name, got, c.want)
		}
	}
}

// A truncated cone of equal radii is the cylinder.
func TestConeOfEqualRadii(t *testing.T) {
	c, want := Cone{Bottom: 0.7, Top: 0.7, Height: 1.3}, Cylinder{Radius: 0.7, Height: 1.3}
	if v := c.Volume(); !near(v, want.Volume(), 4*u*v) { // roundings of products
		t.Errorf("volume %v, want %v", v, want.Volume())
	}
	m, n := c.SecondMoment(), want.SecondMoment()
	for i := range m {
		if !near(m[i][i], n[i][i], 8*u*n[i][i]) { // as above
			t.Errorf("second moment %v, want %v", m, n)
		}
	}
	for k := range 9 {
		sin, cos := pair.SinCosDegrees(float64(40 * k))
		x := pair.Vec{X: cos.Scale(0.7), Y: sin.Scale(0.7), Z: pair.Of(0.1)}
		got, want := c.Locate(x, 0), want.Locate(x, 0)
		if got != want {
			t.Errorf("%v: got %+v, want %+v", x.Value(), got, want)
		}
	}
}
