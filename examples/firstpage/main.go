// Command firstpage is the first page of the README: a disc magnet, its poles, and the field at a sensor.
package main

import (
	"fmt"
	"log"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"example.com/boundpole/magnet"
	"gonum.org/v1/gonum/spatial/r3"
)

func main() {
	// A disc magnet of 8 x 3 mm, remanence 1.30 T along its axis, placed 4 mm above the origin.
	disc := geom.At(geom.Cylinder{Radius: 4, Height: 3}, geom.Translate(r3.Vec{Z: 4}))
	part, err := magnet.WithRemanence(disc, r3.Vec{Z: 1.30})
	if err != nil {
		log.Fatal(err) // says what is wrong with the body, where, and what would be right
	}

	// What each face carries: the equivalent charge.
	for _, layer := range part.Charge.Layers {
		fmt.Printf("%-6s  %8.1f kA/m  pole strength %9.4f A m\n", layer.Face.Name, layer.Max/1e3, layer.Charge*1e-6)
	}

	// The field, anywhere, with a bound on its numerical error.
	model := magnet.Model{Parts: []magnet.Part{part}, Unit: 1e-3} // lengths in mm
	for _, z := range []float64{0, 2.5, 4} {
		r := model.At(r3.Vec{Z: z}, field.Outside)
		fmt.Printf("z = %3.1f mm  B = %7.3f mT  (error below %.0e)\n", z, r.B.Z*1e3, r.ErrB*1e3)
	}
}
