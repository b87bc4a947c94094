package response_test

import (
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/response"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// TestAllocations leaves out points within 1e-6 of a face, for which the nearest point is looked up.
func TestAllocations(t *testing.T) {
	r := solve(t, prepare(t, &response.Settings{Order: 6}, geom.Sphere{Radius: 1}), up, response.Material{Chi: 2})
	at := field.PointsOf(r3.Vec{X: 0.3}, r3.Vec{Z: 1.01}, r3.Vec{X: 50})
	v := field.NewValues(at.Len(), field.WantG|field.WantErr|field.WantPhi|field.WantGrad)
	if n := testing.AllocsPerRun(20, func() { r.Evaluate(v, at, field.Mean) }); n > 0 {
		t.Errorf("%v allocations for %d points", n, at.Len())
	}
}
