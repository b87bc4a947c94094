package bound_test

import (
	"fmt"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// A box whose polarization grows along x carries charge on its faces and inside; the sum is zero.
func ExampleOf() {
	p := field.Affine{Value: r3.Vec{X: 1}, Gradient: [3][3]float64{{0.5, 0, 0}}}
	c, err := bound.Of(geom.Box{Size: r3.Vec{X: 2, Y: 1, Z: 1}}, p)
	if err != nil {
		fmt.Println(err)
		return
	}
	for _, l := range c.Layers[:2] {
		fmt.Printf("face %s: %+.2f\n", l.Face.Name, l.Charge)
	}
	fmt.Printf("inside: %+.2f\n", c.Volumes[0].Charge)
	fmt.Printf("sum: %g, moment: %.1f\n", c.Total(), c.Moment.X)
	// Output:
	// face -x: -0.50
	// face +x: +1.50
	// inside: -1.00
	// sum: 0, moment: 2.0
}
