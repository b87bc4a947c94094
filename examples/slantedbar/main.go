// Command slantedbar shows what slanted ends do to the poles of a magnetized bar: the pole density follows the tilt alone,
// the pole strength stays, and far away only the lean of the moment arm is left.
package main

import (
	"fmt"
	"math"
	"os"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"example.com/boundpole/magnet"
	"gonum.org/v1/gonum/spatial/r3"
)

// The bar of an invented reed trimmer: 2 mm square, 12 mm long at its middle, J = 0.38 T along the bar.
const (
	side, length = 2.0, 12.0 // mm
	remanence    = 0.38      // T
)

func main() {
	if err := run(); err != nil {
		fmt.Fprintln(os.Stderr, "slantedbar:", err)
		os.Exit(1)
	}
}

func run() error {
	fmt.Printf("Bar %g x %g x %g mm, J = %g T along the bar; the top end is tilted, the bottom end stays square.\n\n",
		side, side, length, remanence)
	fmt.Println("  tilt   M cos(tilt)   top density   top area   pole strength    sum    5 mm past the end, B along   across")
	fmt.Println("   deg           A/m           A/m       mm^2             A m    A m                          mT       mT")
	for k := range 10 {
		if err := row(5 * float64(k)); err != nil {
			return err
		}
	}
	fmt.Println("\nThe density is M cos(tilt) and the area grows by 1/cos(tilt): the pole strength does not see the tilt.")
	return nil
}

// row prints the bar with one tilt.
func row(degrees float64) error {
	slope := math.Tan(degrees * math.Pi / 180)
	h := side / 2
	bar := geom.Prism{
		Base:     [][2]float64{{-h, -h}, {h, -h}, {h, h}, {-h, h}},
		Height:   length,
		TopSlope: [2]float64{slope, 0},
	}
	part, err := magnet.WithRemanence(bar, r3.Vec{Z: remanence})
	if err != nil {
		return fmt.Errorf("tilt %g degrees: %w", degrees, err)
	}
	const mm2 = 1e-6
	top := part.Charge.Layers[1]
	model := magnet.Model{Parts: []magnet.Part{part}, Unit: 1e-3}
	b := model.At(r3.Vec{Z: length/2 + 5}, field.Mean).B
	fmt.Printf("%6.0f %13.0f %13.0f %10.4f %15.6f %6.1g %27.4f %8.4f\n", degrees,
		remanence/magnet.Mu0*math.Cos(degrees*math.Pi/180), top.Max, top.Area, top.Charge*mm2, part.Charge.Total()*mm2, b.Z*1e3, b.X*1e3)
	return nil
}
