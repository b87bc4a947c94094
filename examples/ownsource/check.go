package main

import (
	"math"

	"example.com/boundpole/verify/law"
	"gonum.org/v1/gonum/spatial/r3"
)

// check holds the wire against the laws of the static field: curl-free, free of divergence off the charge, flux equal to the
// charge inside, decay with the square of the distance, and the rest of what package law knows.
func check(w wire) error {
	length := r3.Norm(r3.Sub(w.b, w.a))
	mid := r3.Scale(0.5, r3.Add(w.a, w.b))
	half := r3.Vec{X: length, Y: length, Z: length}
	return law.Source(w, law.Claims{
		Bounds:   r3.Box{Min: r3.Sub(mid, r3.Scale(0.5, half)), Max: r3.Add(mid, r3.Scale(0.5, half))},
		Clear:    w.distance,
		Total:    &law.Total{Charge: w.density * length, Moment: &r3.Vec{}, About: mid},
		Order:    2,
		Accuracy: 1e-8, // the textbook formula loses digits far beyond the ends of the wire
		Seed:     1,
	})
}

// distance returns the distance of x from the wire.
func (w wire) distance(x r3.Vec) float64 {
	d := r3.Sub(w.b, w.a)
	s := r3.Dot(r3.Sub(x, w.a), d) / r3.Norm2(d)
	s = math.Min(1, math.Max(0, s))
	return r3.Norm(r3.Sub(x, r3.Add(w.a, r3.Scale(s, d))))
}
