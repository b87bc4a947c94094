package response_test

import (
	"context"
	"math/rand/v2"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/response"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// BenchmarkSolve is a job of 3200 unknowns: 50 panels of 8 x 8 nodes and the two coarser meshes.
func BenchmarkSolve(b *testing.B) {
	for b.Loop() {
		s, err := response.Prepare(context.Background(), []geom.Body{geom.Cylinder{Radius: 1, Height: 2}}, &response.Settings{Order: 10})
		if err != nil {
			b.Fatal(err)
		}
		if _, err := s.Solve(context.Background(), []response.Material{{Chi: 1000}}, up); err != nil {
			b.Fatal(err)
		}
	}
}

// BenchmarkField evaluates the result at 10000 points in a box twice the size of the body, with and without estimates.
func BenchmarkField(b *testing.B) {
	s, err := response.Prepare(context.Background(), []geom.Body{geom.Cylinder{Radius: 1, Height: 2}}, nil)
	if err != nil {
		b.Fatal(err)
	}
	r, err := s.Solve(context.Background(), []response.Material{{Chi: 1000}}, up)
	if err != nil {
		b.Fatal(err)
	}
	rng := rand.New(rand.NewPCG(1, 2))
	at := make([]r3.Vec, 10000)
	for k := range at {
		at[k] = r3.Vec{X: 4*rng.Float64() - 2, Y: 4*rng.Float64() - 2, Z: 4*rng.Float64() - 2}
	}
	points := field.PointsOf(at...)
	for _, c := range []struct {
		name string
		want field.Want
	}{{"g", field.WantG}, {"g and estimate", field.WantG | field.WantErr}} {
		b.Run(c.name, func(b *testing.B) {
			v := field.NewValues(len(at), c.want)
			b.ReportAllocs()
			for b.Loop() {
				field.Evaluate(r, v, points, field.Mean)
			}
		})
	}
}
