package current_test

import (
	"context"
	"fmt"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/current"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// The same magnet as poles and as currents: inside, b is h + m, although the two have no charge in common.
func ExampleOf() {
	body, m := geom.Box{Size: r3.Vec{X: 20, Y: 10, Z: 5}}, field.Uniform{P: r3.Vec{Z: 1}}
	currents, err := current.Of(body, m)
	if err != nil {
		fmt.Println(err)
		return
	}
	poles, err := bound.Of(body, m)
	if err != nil {
		fmt.Println(err)
		return
	}
	side := currents.Layers[1]
	fmt.Printf("face %s carries %v\n", side.Face.Name, side.Density)
	x := r3.Vec{X: 4, Y: 2, Z: 1}
	h, v := poles.Field(x), current.At(currents, x, field.Mean)
	fmt.Printf("h + m = %.12f\n", h.Z+1)
	fmt.Printf("b     = %.12f, a = (%.6f, %.6f, %.6f)\n", v.B.Z, v.A.X, v.A.Y, v.A.Z)
	// Output:
	// face +x carries {0 1 0}
	// h + m = 0.367860729293
	// b     = 0.367860729293, a = (-0.507219, 0.294667, 0.000000)
}

// The mutual inductance of two coaxial loops, by mu0: the flux of one through the other.
func ExampleLoopIntegral() {
	loop, err := current.NewLoop(geom.Disc{Radius: 1}, 1)
	if err != nil {
		fmt.Println(err)
		return
	}
	flux, estimate, err := current.LoopIntegral(context.Background(), loop, current.Circle{Radius: 1, Pose: geom.Translate(r3.Vec{Z: 1})}, 0)
	fmt.Printf("%.12f %v %v\n", flux, estimate < 1e-14, err)
	// Output:
	// 0.393175148372 true <nil>
}

// A closed tube of flux: the vector potential is all in the bore, and its loop integral is the flux.
func ExampleNewArcGuide() {
	g, err := current.NewArcGuide(geom.ArcDegrees(1, 2, 1, 0, 360), geom.Pose{}, 0.5)
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Println(g.At(r3.Vec{X: 1.25}, field.Mean).A, g.At(r3.Vec{X: 3}, field.Mean).A)
	flux, _, err := current.LoopIntegral(context.Background(), g, current.Circle{Radius: 1.5}, 0)
	fmt.Printf("%.6f %v\n", flux, err)
	// Output:
	// {0 0.4 0} {0 0 0}
	// 3.141593 <nil>
}
