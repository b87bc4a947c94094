// Command latch computes how hard a round magnet pulls on a thick iron plate, over the gap that paint, coating and dirt
// leave: the pull of the magnet by its own image.
//
//	go run ./examples/latch -diameter 12mm -height 4mm -remanence 1.30T
//
// Rated pull falls with gap, paint, thin steel, shear and heat; lifting gear follows its own standards and safety factors.
package main

import (
	"context"
	"flag"
	"fmt"
	"io"
	"math"
	"os"

	"example.com/boundpole/examples/internal/given"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/closedform"
	"example.com/boundpole/field/force"
	"example.com/boundpole/field/image"
	"example.com/boundpole/geom"
	"example.com/boundpole/magnet"
	"gonum.org/v1/gonum/spatial/r3"
)

func main() {
	if err := run(os.Args[1:], os.Stdout); err != nil {
		fmt.Fprintln(os.Stderr, "latch:", err)
		os.Exit(1)
	}
}

func run(args []string, w io.Writer) error {
	set := flag.NewFlagSet("latch", flag.ContinueOnError)
	diameter := given.Flag(set, "diameter", given.Length, "12mm", "diameter of the magnet")
	height := given.Flag(set, "height", given.Length, "4mm", "height of the magnet")
	br := given.Flag(set, "remanence", given.Flux, "1.30T", "remanence along the axis")
	travel := given.Flag(set, "travel", given.Length, "10mm", "gap at which the door is taken as open")
	if err := set.Parse(args); err != nil {
		return err
	}
	if err := given.Positive(set, "diameter", "height", "remanence", "travel"); err != nil {
		return err
	}
	r, area := *diameter/2, math.Pi**diameter**diameter/4
	part, err := magnet.WithRemanence(geom.Cylinder{Radius: r, Height: *height}, r3.Vec{Z: *br})
	if err != nil {
		return err
	}
	fmt.Fprintf(w, "Door latch: disc %.6g x %.6g mm, Br %.6g T, on a thick iron plate that does not saturate.\n\n", *diameter*1e3, *height*1e3, *br)
	fmt.Fprintln(w, "  gap mm     pull N   error at most N   dF/dgap N/mm")
	var checks given.Checks
	for _, gap := range []float64{0, 0.1e-3, 0.25e-3, 0.5e-3, 1e-3, 2e-3, 4e-3} {
		pull, atMost, slope, err := onPlate(part.Charge, gap, gap > 0)
		if err != nil {
			return err
		}
		fmt.Fprintf(w, "  %6.2f  %9.4f   %15.1g   %12.4f\n", gap*1e3, pull, atMost, slope*1e-3)
		m := *br / magnet.Mu0
		if gap == 0.1e-3 || gap == 0.5e-3 || gap == 2e-3 {
			hand := -magnet.Mu0 * closedform.CoaxialCylinderForce(m, m, r, *height, *height, 2*gap)
			checks.Add(fmt.Sprintf("pull of the image, %.6g mm away", 2e3*gap), math.Abs(hand), pull, "N", 1e-6)
		}
	}
	work, err := release(part.Charge, *travel)
	if err != nil {
		return err
	}
	rule := *br * *br * area / (2 * magnet.Mu0)
	contact, _, _, err := onPlate(part.Charge, 0, false)
	if err != nil {
		return err
	}
	fmt.Fprintf(w, "\n  work to open to %.6g mm: %.2f mJ\n", *travel*1e3, work*1e3)
	fmt.Fprintf(w, "  the rule Br^2 A/(2 mu0) says %.2f N at contact: %.2f times too much for so short a magnet\n", rule, rule/contact)
	if !checks.Print(w) {
		return fmt.Errorf("a hand check was missed")
	}
	fmt.Fprintln(w, "\nMay attract suddenly, pinch or shatter; keep from children. A calculation, not a rating: thin or painted steel holds less.")
	return nil
}

// onPlate returns the pull of a magnet with its axis along z on the plate below it, a bound on its error, and its slope.
func onPlate(c *bound.Charge, gap float64, stiff bool) (pull, atMost, slope float64, err error) {
	height := c.Body().Bounds().Max.Z - c.Body().Bounds().Min.Z
	placed := c.At(geom.Translate(r3.Vec{Z: gap + height/2}))
	wall := image.Image{Source: placed, Plane: image.Iron(r3.Vec{}, r3.Vec{Z: 1})}
	r, err := force.On(context.Background(), placed, wall, &force.Settings{Accuracy: 1e-8, Stiffness: stiff})
	if err != nil {
		return 0, 0, 0, err
	}
	// The image moves towards the magnet as the magnet moves towards it: the slope is twice that for a plate that stands.
	return -magnet.Mu0 * r.Force.Z, magnet.Mu0 * r.Error.Force, 2 * magnet.Mu0 * r.Stiffness[2][2], nil
}

// release returns the work against the pull from contact to a gap: half the energy of the pair with the image changes.
func release(c *bound.Charge, gap float64) (float64, error) {
	var w [2]float64
	for i, g := range []float64{0, gap} {
		height := c.Body().Bounds().Max.Z - c.Body().Bounds().Min.Z
		placed := c.At(geom.Translate(r3.Vec{Z: g + height/2}))
		wall := image.Image{Source: placed, Plane: image.Iron(r3.Vec{}, r3.Vec{Z: 1})}
		r, err := force.On(context.Background(), placed, wall, &force.Settings{Accuracy: 1e-8})
		if err != nil {
			return 0, err
		}
		w[i] = magnet.Mu0 * r.Energy / 2
	}
	return w[1] - w[0], nil
}
