package geom

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// torusPoint returns the k-th of some points of the surface in the direction e, and the outward normal there.
func torusPoint(t Torus, k int, e pair.Vec) (x, normal pair.Vec) {
	sin, cos := pair.SinCosDegrees(float64(50*k) + 11)
	normal = e.Scale(cos)
	normal.Z = sin
	return e.Scale(pair.Of(t.Major)).Add(normal.Scale(pair.Of(t.Minor))), normal
}

// Random points are where the plain formula puts them; those in the hole and on the axis are outside.
func TestLocateTorus(t *testing.T) {
	rng := rand.New(rand.NewPCG(47, 48))
	for _, body := range []Torus{{Major: 1, Minor: 0.5}, {Major: 1, Minor: 0.999}, {Major: 1, Minor: 1e-3}} {
		for _, z := range []float64{0, 0.1 * body.Minor} {
			if got := body.Locate(pair.VecOf(r3.Vec{Z: z}), 0); got != outside() {
				t.Errorf("%+v: on the axis at %v: got %+v", body, z, got)
			}
		}
		for range 300 {
			a, d, b := 2*math.Pi*rng.Float64(), 2*body.Minor*rng.Float64(), 2*math.Pi*rng.Float64()
			s := body.Major + d*math.Cos(b)
			if s < 0 {
				continue
			}
			x := r3.Vec{X: s * math.Cos(a), Y: s * math.Sin(a), Z: d * math.Sin(b)}
			if got := body.Locate(pair.VecOf(x), 0); got.Region == Inside != (d < body.Minor) || got.Region == On {
				t.Errorf("%+v: %v: got %+v at %v from the ring", body, x, got, d)
			}
		}
	}
}
