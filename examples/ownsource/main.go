// Command ownsource adds a source that the library does not have, a straight charged wire, to an electret disc, and holds
// the wire against the laws of the static field before it is believed.
package main

import (
	"fmt"
	"math"
	"os"

	"example.com/boundpole/charge"
	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// wire is a straight, uniformly charged wire. All that the library asks of a source is the method Field.
type wire struct {
	a, b    r3.Vec  // ends
	density float64 // charge per length, C/m
}

// Field returns g = eps0 E: the field of a line of charge, rho the distance from its line, s the coordinates of the ends
// along it.
func (w wire) Field(x r3.Vec) r3.Vec {
	d := r3.Sub(w.b, w.a)
	t := r3.Unit(d)
	sa, sb := r3.Dot(r3.Sub(w.a, x), t), r3.Dot(r3.Sub(w.b, x), t)
	foot := r3.Add(x, r3.Scale(sa, t)) // the end a, seen from the foot of x
	away := r3.Sub(foot, w.a)          // from the wire to x
	rho := r3.Norm(away)
	ra, rb := math.Hypot(sa, rho), math.Hypot(sb, rho)
	k := w.density / (4 * math.Pi)
	across := k * (sb/rb - sa/ra) / (rho * rho)
	return r3.Add(r3.Scale(across, away), r3.Scale(k*(1/rb-1/ra), t))
}

func main() {
	if err := run(); err != nil {
		fmt.Fprintln(os.Stderr, "ownsource:", err)
		os.Exit(1)
	}
}

func run() error {
	corona := wire{a: r3.Vec{X: -0.02, Z: 0.015}, b: r3.Vec{X: 0.02, Z: 0.015}, density: -2e-9}
	if err := check(corona); err != nil {
		return err
	}
	disc, err := charge.Polarized(geom.Cylinder{Radius: 0.008, Height: 0.0005}, field.Uniform{P: r3.Vec{Z: 2e-6}})
	if err != nil {
		return err
	}
	model := charge.Model{Parts: []charge.Part{disc, {Source: corona}}}
	fmt.Println("The wire obeys the laws of the static field (package verify/law).")
	fmt.Println("Electret disc 16 mm x 0.5 mm, P = 2 uC/m^2, below a wire of 40 mm at 15 mm that carries -2 nC/m.")
	fmt.Println("\n  height       E of both      of the disc      of the wire")
	fmt.Println("      mm            kV/m             kV/m             kV/m")
	for _, mm := range []float64{1, 2, 4, 6, 8, 10, 12} {
		x := r3.Vec{Z: mm * 1e-3}
		both := model.At(x, field.Mean).E.Z
		own := corona.Field(x).Z / charge.Epsilon0
		fmt.Printf("%8.0f %15.4f %16.4f %16.4f\n", mm, both/1e3, (both-own)/1e3, own/1e3)
	}
	fmt.Println("\nThe wire offers no potential, so V of the sum is not given:", model.At(r3.Vec{Z: 0.001}, field.Mean).Status)
	return nil
}
