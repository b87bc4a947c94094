package force

import (
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// uniform returns a uniformly polarized body.
func uniform(t testing.TB, b geom.Body, p r3.Vec) *bound.Charge {
	return polarized(t, b, field.Uniform{P: p})
}

func polarized(t testing.TB, b geom.Body, p field.Polarization) *bound.Charge {
	t.Helper()
	c, err := bound.Of(b, p)
	if err != nil {
		t.Fatal(err)
	}
	return c
}
