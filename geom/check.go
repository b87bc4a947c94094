package geom

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// Lengths are kept in a range where fifth powers (SecondMoment) neither overflow nor underflow.
const (
	shortest = 1e-60
	longest  = 1e60
)

// checkLength refuses what is not a positive length in range.
func checkLength(what string, v float64) error {
	switch {
	case math.IsNaN(v) || math.IsInf(v, 0):
		return fmt.Errorf("geom: %s is %v; give a finite positive length", what, v)
	case v <= 0:
		return fmt.Errorf("geom: %s is %v; give a positive length", what, v)
	case v < shortest || v > longest:
		return fmt.Errorf("geom: %s is %v, out of the range %v to %v; choose another unit of length", what, v, shortest, longest)
	}
	return nil
}

// checkCoordinate refuses what is not a coordinate in range.
func checkCoordinate(what string, v float64) error {
	if math.IsNaN(v) || math.IsInf(v, 0) {
		return fmt.Errorf("geom: %s is %v; give a finite number", what, v)
	}
	if math.Abs(v) > longest {
		return fmt.Errorf("geom: %s is %v, beyond %v; choose another unit of length", what, v, longest)
	}
	return nil
}

// checkSpan refuses an inner radius that is not below the outer one.
func checkSpan(what string, inner, outer float64) error {
	if inner >= outer {
		return fmt.Errorf("geom: %s inner radius %v is not below the outer radius %v; the wall has no thickness, exchange or correct them", what, inner, outer)
	}
	if outer-inner < grain*outer {
		return fmt.Errorf("geom: %s wall from %v to %v is thinner than the rounding of its radii; make it thicker", what, inner, outer)
	}
	return nil
}

// grain times a coordinate is the distance below which two points count as one: four times the tolerance of
// OnTolerance for a point at that coordinate.
const grain = 16 * 0x1p-53

// first returns the first error that is not nil.
func first(errs ...error) error {
	for _, err := range errs {
		if err != nil {
			return err
		}
	}
	return nil
}

// checkPoints refuses vertices out of range and low parts that are not what rounding left out.
func checkPoints(what string, vertices, low []r3.Vec) error {
	if len(low) != 0 && len(low) != len(vertices) {
		return fmt.Errorf("geom: %s has %d low parts for %d vertices; give one for each, or none", what, len(low), len(vertices))
	}
	for i, v := range vertices {
		hi := [3]float64{v.X, v.Y, v.Z}
		for j, axis := range [3]string{"x", "y", "z"} {
			if err := checkCoordinate(fmt.Sprintf("%s vertex %d coordinate %s", what, i, axis), hi[j]); err != nil {
				return err
			}
		}
		if len(low) == 0 {
			continue
		}
		lo := [3]float64{low[i].X, low[i].Y, low[i].Z}
		for j, axis := range [3]string{"x", "y", "z"} {
			if !(math.Abs(lo[j]) <= 2*0x1p-53*math.Abs(hi[j])) {
				return fmt.Errorf("geom: %s vertex %d coordinate %s has low part %v beside %v; a low part is what rounding left out, at most 2^-52 of it", what, i, axis, lo[j], hi[j])
			}
		}
	}
	return nil
}

// largest returns the largest magnitude of a coordinate.
func largest(vertices []r3.Vec) float64 {
	m := 0.0
	for _, v := range vertices {
		m = max(m, math.Abs(v.X), math.Abs(v.Y), math.Abs(v.Z))
	}
	return m
}
