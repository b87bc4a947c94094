package response_test

import (
	"fmt"
	"math/rand/v2"
	"slices"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/response"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

func TestTry(t *testing.T) {
	for k, b := range []geom.Body{geom.Sphere{Radius: 1}, geom.Ellipsoid{SemiAxes: r3.Vec{X: 1, Y: 1.3, Z: .8}}, geom.Box{Size: r3.Vec{X: 1, Y: 1, Z: 1}}, geom.Cylinder{Radius: 1, Height: 1}, geom.Cone{Bottom: 1, Top: 0.3, Height: 1}} {
		fine := prepare(t, &response.Settings{Order: 11, MaxUnknowns: 9000}, b)
		for _, o := range []int{6, 8} {
			s := prepare(t, &response.Settings{Order: o}, b)
			for _, chi := range []float64{-1, 10, inf} {
				app := response.Uniform{G: r3.Vec{Z: 1, X: .5}}
				m := response.Material{Chi: chi}
				ref, r := solve(t, fine, app, m), solve(t, s, app, m)
				rng := rand.New(rand.NewPCG(1, 2))
				var over []float64
				bad := 0
				worst := 0.0
				for range 400 {
					x := r3.Vec{X: 3*rng.Float64() - 1.5, Y: 3*rng.Float64() - 1.5, Z: 3*rng.Float64() - 1.5}
					v, w := field.At(r, x, 0, field.WantG|field.WantErr), ref.Field(x)
					miss := r3.Norm(r3.Sub(v.G, w))
					over = append(over, v.ErrG/miss)
					if miss > v.ErrG {
						bad++
						worst = max(worst, miss/v.ErrG)
					}
				}
				slices.Sort(over)
				fmt.Println(k, o, chi, "bad", bad, worst, "median", over[200], "p5", over[20])
			}
		}
	}
}
