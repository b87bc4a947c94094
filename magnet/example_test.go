package magnet_test

import (
	"fmt"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"example.com/boundpole/magnet"
	"gonum.org/v1/gonum/spatial/r3"
)

// A magnetized iron rod as two poles: its pole strength is M A, and the field on its axis that of the two ends.
func ExampleModel() {
	rod, err := magnet.Magnetized(geom.Cylinder{Radius: 1e-3, Height: 0.1}, field.Uniform{P: r3.Vec{Z: 800e3}})
	if err != nil {
		fmt.Println(err)
		return
	}
	m := magnet.Model{Parts: []magnet.Part{rod}}
	north := rod.Charge.Layers[1]
	fmt.Printf("%s pole: %.4f A m\n", north.Face.Name, north.Charge)
	fmt.Printf("B 20 mm past the end: %.4f mT\n", m.At(r3.Vec{Z: 0.07}, field.Mean).B.Z*1e3)
	// Output:
	// top pole: 2.5133 A m
	// B 20 mm past the end: 0.6097 mT
}

func ExampleRemanence() {
	fmt.Printf("%.2f kA/m\n", magnet.Remanence(r3.Vec{Z: 1.2}).Z/1e3)
	// Output: 954.93 kA/m
}
