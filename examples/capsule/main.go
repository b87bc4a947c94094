// Command capsule computes a condenser microphone with a charged foil: surface potential, gap field and voltage, electrostatic
// pull, sensitivity and negative stiffness, and what edge and air allow.
//
//	go run ./examples/capsule -film 12.5um -density "-0.30mC/m2" -gap 20um
//
// Charged films keep hundreds of volts: they may damage inputs, spark and ignite vapours.
package main

import (
	"flag"
	"fmt"
	"io"
	"math"
	"os"

	"example.com/boundpole/charge"
	"example.com/boundpole/examples/internal/given"
	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

func main() {
	if err := run(os.Args[1:], os.Stdout); err != nil {
		fmt.Fprintln(os.Stderr, "capsule:", err)
		os.Exit(1)
	}
}

func run(args []string, w io.Writer) error {
	set := flag.NewFlagSet("capsule", flag.ContinueOnError)
	thickness := given.Flag(set, "film", given.Length, "12.5um", "thickness of the foil")
	permittivity := set.Float64("permittivity", 2.1, "relative permittivity of the foil")
	density := given.Flag(set, "density", given.Density, "-0.30mC/m2", "trapped charge on its surface")
	width := given.Flag(set, "gap", given.Length, "20um", "width of the gap")
	radius := given.Flag(set, "radius", given.Length, "3mm", "radius of the diaphragm")
	travel := given.Flag(set, "travel", given.Length, "0.01um", "travel of the diaphragm for the signal")
	if err := set.Parse(args); err != nil {
		return err
	}
	if err := given.Positive(set, "film", "gap", "radius", "travel"); err != nil {
		return err
	}
	gap := charge.Gap{Film: charge.Film{Thickness: *thickness, Permittivity: *permittivity, Density: *density}, Width: *width}
	if err := gap.Check(); err != nil {
		return err
	}
	area := math.Pi * *radius * *radius
	fmt.Fprintf(w, "Microphone capsule: foil %.6g um, eps_r %.6g, %.6g mC/m2; gap %.6g um, radius %.6g mm, electrodes joined through the load.\n\n",
		*thickness*1e6, *permittivity, *density*1e3, *width*1e6, *radius*1e3)
	v := gap.Film.SurfacePotential()
	fmt.Fprintf(w, "  surface potential         %10.2f V\n", v)
	fmt.Fprintf(w, "  field in the gap          %10.4f MV/m\n", gap.Field()*1e-6)
	fmt.Fprintf(w, "  voltage across the gap    %10.2f V, %.0f %% of what air of that gap stands (Paschen, 1 atm)\n", gap.Voltage(), 100*gap.BreakdownUse(0))
	fmt.Fprintf(w, "  pressure on the diaphragm %10.2f Pa\n", gap.Pressure())
	fmt.Fprintf(w, "  pull                      %10.4f mN\n", gap.Force(area)*1e3)
	fmt.Fprintf(w, "  capacitance               %10.4f pF\n", gap.Capacitance()*area*1e12)
	fmt.Fprintf(w, "  signal for %5.1f nm       %10.3f mV\n", *travel*1e9, math.Abs(gap.Sensitivity())**travel*1e3)
	fmt.Fprintf(w, "  negative stiffness        %10.2f N/m, which the diaphragm has to exceed\n\n", gap.Stiffness()*area)
	if err := tilt(w, *density, *radius); err != nil {
		return err
	}

	d, e := *thickness, *permittivity
	const eps0 = charge.Epsilon0
	field := *density * d / (eps0 * (d + e**width))
	var checks given.Checks
	checks.Add("surface potential, sigma d/(eps0 eps_r)", *density*d/(eps0*e), v, "V", 1e-12)
	checks.Add("gap field, sigma d/(eps0 (d + eps_r g))", field*1e-6, gap.Field()*1e-6, "MV/m", 1e-12)
	checks.Add("pressure, eps0 E^2/2", eps0*field*field/2, gap.Pressure(), "Pa", 1e-12)
	checks.Add("capacitance, eps0 A/(g + d/eps_r)", eps0*area/(*width+d/e)*1e12, gap.Capacitance()*area*1e12, "pF", 1e-12)
	checks.Add("stiffness, eps0 A V^2/(g + d/eps_r)^3", eps0*area*v*v/math.Pow(*width+d/e, 3), gap.Stiffness()*area, "N/m", 1e-12)
	if !checks.Print(w) {
		return fmt.Errorf("a hand check was missed")
	}
	fmt.Fprintf(w, "\n%.0f V on the foil; may damage inputs, spark, ignite vapours. Charging is work for trained staff under local electrical codes.\n", math.Abs(v))
	return nil
}

// tilt shows the edge of the foil as a free sheet, and a charge that grows by 5 % across it.
func tilt(w io.Writer, density, radius float64) error {
	fmt.Fprintln(w, "  free foil, 20 um above it, from the middle to past the rim (even charge; charge 5 % higher at one rim)")
	fmt.Fprintln(w, "     r/R    E along the axis, MV/m    radial, MV/m    with 5 % tilt, MV/m")
	disc := geom.Disc{Radius: radius}
	even, err := charge.Sheet(disc, density, r3.Vec{})
	if err != nil {
		return err
	}
	leaning, err := charge.Sheet(disc, density, r3.Vec{X: 0.05 * density / radius})
	if err != nil {
		return err
	}
	for _, share := range []float64{0, 0.5, 0.9, 0.99, 1.01, 1.1} {
		x := r3.Vec{X: share * radius, Z: 20e-6}
		a := charge.Model{Parts: []charge.Part{even}}.At(x, field.Mean).E
		b := charge.Model{Parts: []charge.Part{leaning}}.At(x, field.Mean).E
		fmt.Fprintf(w, "    %4.2f %20.4f %19.4f %19.4f\n", share, a.Z*1e-6, a.X*1e-6, b.Z*1e-6)
	}
	return nil
}
