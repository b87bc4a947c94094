package field_test

import (
	"fmt"

	"example.com/boundpole/field"
	"example.com/boundpole/field/element"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// Sources add up, move and scale; the result is a source again.
func ExampleSum() {
	plus := element.Point{At: r3.Vec{Z: 0.5}, Charge: 1}
	minus := field.Scaled{Source: element.Point{At: r3.Vec{Z: -0.5}, Charge: 1}, Factor: -1}
	pair := field.Sum{plus, minus}
	v := field.At(pair, r3.Vec{Z: 10}, field.Mean, field.WantPhi|field.WantG|field.WantErr)
	fmt.Printf("phi %.6f, g %.6f, known to 13 digits: %t\n", v.Phi, v.G.Z, v.ErrG < 1e-13*v.G.Z)
	// Output: phi 0.000798, g 0.000160, known to 13 digits: true
}

func ExamplePosed() {
	up := element.Dipole{Moment: r3.Vec{Z: 1}}
	turn, err := geom.Turn(r3.Vec{Y: 1}, 90) // z to x
	if err != nil {
		fmt.Println(err)
		return
	}
	g := field.Posed{Source: up, Pose: turn}.Field(r3.Vec{X: 1})
	fmt.Printf("%.4f\n", g.X)
	// Output: 0.1592
}

// Evaluate fills the arrays that are there, for many points at once.
func ExampleEvaluate() {
	at := field.Line(r3.Vec{X: 1}, r3.Vec{X: 2}, 3)
	v := field.NewValues(at.Len(), field.WantPhi)
	field.Evaluate(element.Point{Charge: 1}, v, at, field.Mean)
	fmt.Printf("%.4f\n", v.Phi)
	// Output: [0.0796 0.0531 0.0398]
}
