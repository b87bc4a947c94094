package charge_test

import (
	"fmt"

	"example.com/boundpole/charge"
	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// A uniformly polarized bead: E = -P/(3 eps0) inside.
func ExampleModel() {
	bead, err := charge.Polarized(geom.Sphere{Radius: 1e-3}, field.Uniform{P: r3.Vec{Z: 1e-6}})
	if err != nil {
		fmt.Println(err)
		return
	}
	m := charge.Model{Parts: []charge.Part{bead}}
	in, out := m.At(r3.Vec{}, field.Mean), m.At(r3.Vec{Z: 2e-3}, field.Mean)
	fmt.Printf("inside  %9.2f V/m\n", in.E.Z)
	fmt.Printf("outside %9.2f V/m, %.4f V\n", out.E.Z, out.V)
	// Output:
	// inside  -37646.97 V/m
	// outside   9411.74 V/m, 9.4117 V
}

// Trapped charge on a film, and the field on both of its sides.
func ExampleSheet() {
	film, err := charge.Sheet(geom.Disc{Radius: 0.01}, 1e-6, r3.Vec{})
	if err != nil {
		fmt.Println(err)
		return
	}
	m := charge.Model{Parts: []charge.Part{film}}
	x := r3.Vec{X: 1e-3}
	fmt.Printf("above %.1f kV/m, below %.1f kV/m\n", m.At(x, field.Outside).E.Z/1e3, m.At(x, field.Inside).E.Z/1e3)
	// Output: above 56.5 kV/m, below -56.5 kV/m
}
