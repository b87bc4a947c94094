package force_test

import (
	"context"
	"fmt"
	"log"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/codata"
	"example.com/boundpole/field/force"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// A disc magnet of 10 x 4 mm is 3 mm over a block of 20 x 20 x 5 mm 1 mm off its middle, and they repel each other; 950 kA/m both, numbers invented.
func Example() {
	const mm = 1e-3
	disc, err := bound.Of(geom.At(geom.Cylinder{Radius: 5 * mm, Height: 4 * mm}, geom.Translate(r3.Vec{X: 1 * mm, Z: 7.5 * mm})),
		field.Uniform{P: r3.Vec{Z: -950e3}})
	if err != nil {
		log.Fatal(err)
	}
	block, err := bound.Of(geom.Box{Size: r3.Vec{X: 20 * mm, Y: 20 * mm, Z: 5 * mm}}, field.Uniform{P: r3.Vec{Z: 950e3}})
	if err != nil {
		log.Fatal(err)
	}
	r, err := force.On(context.Background(), disc, block, &force.Settings{About: disc.Body().Centroid(), Stiffness: true})
	if err != nil {
		log.Fatal(err)
	}
	const mu0 = codata.Mu0
	fmt.Printf("force %.4f N up, %.4f N sideways\n", mu0*r.Force.Z, mu0*r.Force.X)
	fmt.Printf("torque %.4f N mm\n", mu0*r.Torque.Y/mm)
	fmt.Printf("energy %.4f mJ\n", mu0*r.Energy/1e-3)
	fmt.Printf("stiffness %.1f N/m up, %.1f and %.1f N/m sideways\n", mu0*r.Stiffness[2][2], mu0*r.Stiffness[0][0], mu0*r.Stiffness[1][1])
	fmt.Printf("accuracy asked for 1e-6: %v\n", r.Error.Force < 1e-6*r3.Norm(r.Force))
	// Output:
	// force 5.8983 N up, 0.2930 N sideways
	// torque -3.2486 N mm
	// energy 44.6419 mJ
	// stiffness 593.1 N/m up, -309.5 and -283.6 N/m sideways
	// accuracy asked for 1e-6: true
}
