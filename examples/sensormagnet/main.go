// Command sensormagnet asks what flux density a Hall plate sees before a small round magnet over gap, tolerance and
// temperature, and whether the magnet survives the heat.
//
//	go run ./examples/sensormagnet -gap 2.5mm -stack 0.3mm -hot 125C
//	go run ./examples/sensormagnet -grade material.json
package main

import (
	"bytes"
	_ "embed"
	"flag"
	"fmt"
	"io"
	"math"
	"os"

	"example.com/boundpole/examples/internal/given"
	"example.com/boundpole/field"
	"example.com/boundpole/field/closedform"
	"example.com/boundpole/geom"
	"example.com/boundpole/magnet"
	"example.com/boundpole/magnet/grade"
	"gonum.org/v1/gonum/spatial/r3"
)

//go:embed grade.json
var invented []byte

func main() {
	if err := run(os.Args[1:], os.Stdout); err != nil {
		fmt.Fprintln(os.Stderr, "sensormagnet:", err)
		os.Exit(1)
	}
}

// job is the inputs.
type job struct {
	diameter, height, gap, stack float64 // m
	cold, hot                    float64 // °C
	material                     *grade.Grade
}

func run(args []string, w io.Writer) error {
	set := flag.NewFlagSet("sensormagnet", flag.ContinueOnError)
	diameter := given.Flag(set, "diameter", given.Length, "8mm", "diameter of the magnet")
	height := given.Flag(set, "height", given.Length, "3mm", "height of the magnet")
	gap := given.Flag(set, "gap", given.Length, "2.5mm", "distance of the Hall plate from its face, on the axis")
	stack := given.Flag(set, "stack", given.Length, "0.3mm", "tolerance of that distance, to both sides")
	cold := given.Flag(set, "cold", given.Celsius, "-40C", "lowest temperature")
	hot := given.Flag(set, "hot", given.Celsius, "125C", "highest temperature")
	file := set.String("grade", "", "file of grade data instead of the invented material")
	if err := set.Parse(args); err != nil {
		return err
	}
	if err := given.Positive(set, "diameter", "height", "gap"); err != nil {
		return err
	}
	if !(*stack >= 0 && *stack < *gap) {
		return fmt.Errorf("-stack has to be from 0 to below -gap")
	}
	data := invented
	if *file != "" {
		var err error
		if data, err = os.ReadFile(*file); err != nil {
			return err
		}
	}
	material, err := grade.Read(bytes.NewReader(data))
	if err != nil {
		return err
	}
	return job{*diameter, *height, *gap, *stack, *cold, *hot, material}.report(w)
}

func (j job) report(w io.Writer) error {
	at20, err := j.material.At(j.material.Reference)
	if err != nil {
		return err
	}
	fmt.Fprintf(w, "Sensor magnet: disc %.6g x %.6g mm of %s (%s), Hall plate %.6g +- %.6g mm before its face.\n\n",
		j.diameter*1e3, j.height*1e3, j.material.Name, j.material.Source, j.gap*1e3, j.stack*1e3)
	br := at20.Br.Value()
	fmt.Fprintf(w, "  Br %.4g T at %.4g °C\n  gap mm      B mT\n", br, j.material.Reference)
	for _, g := range []float64{j.gap - j.stack, j.gap, j.gap + j.stack} {
		b, err := j.before(br, g)
		if err != nil {
			return err
		}
		fmt.Fprintf(w, "  %6.3f  %8.3f\n", g*1e3, b*1e3)
	}
	if err := j.tolerance(w, at20); err != nil {
		return err
	}
	fmt.Fprintln(w, "\n  temperature °C    Br T   B mT     N mean   |H|/limit, mean   worst in the map   where, mm from the middle")
	var checks given.Checks
	for _, t := range []float64{j.cold, j.material.Reference, j.hot} {
		if err := j.atTemperature(w, t, &checks); err != nil {
			return err
		}
	}
	if !checks.Print(w) {
		return fmt.Errorf("a hand check was missed")
	}
	fmt.Fprintln(w, "\nMay attract suddenly, pinch or shatter; keep from children. Fields of about 0.5 to 1 mT may affect implants.")
	return nil
}

// before returns B on the axis, gap before the face, for a remanence.
func (j job) before(br, gap float64) (float64, error) {
	m, err := j.model(br)
	if err != nil {
		return 0, err
	}
	return m.At(r3.Vec{Z: j.height/2 + gap}, field.Mean).B.Z, nil
}

func (j job) model(br float64) (magnet.Model, error) {
	part, err := magnet.WithRemanence(geom.Cylinder{Radius: j.diameter / 2, Height: j.height}, r3.Vec{Z: br})
	return magnet.Model{Parts: []magnet.Part{part}}, err
}

// tolerance prints what gap and remanence do together.
func (j job) tolerance(w io.Writer, mat grade.Material) error {
	br := mat.Br.Value()
	middle, err := j.before(br, j.gap)
	if err != nil {
		return err
	}
	m, err := j.model(br)
	if err != nil {
		return err
	}
	grad := field.At(m.Parts, r3.Vec{Z: j.height/2 + j.gap}, field.Mean, field.WantGrad).Grad[2] * magnet.Mu0
	lo, hi := mat.Br.Min, mat.Br.Max
	if lo == 0 {
		lo = br
	}
	if hi == 0 {
		hi = br
	}
	low, err := j.before(lo, j.gap+j.stack)
	if err != nil {
		return err
	}
	high, err := j.before(hi, j.gap-j.stack)
	if err != nil {
		return err
	}
	byBr := middle * max(hi/br-1, 1-lo/br)
	byGap := math.Abs(grad) * j.stack
	fmt.Fprintf(w, "  dB/dgap %.2f mT/mm; worst case %.1f to %.1f mT, root of squares +-%.1f mT (gap %.1f, Br %.1f)\n",
		grad, low*1e3, high*1e3, math.Hypot(byBr, byGap)*1e3, byGap*1e3, byBr*1e3)
	return nil
}

// atTemperature prints one row and adds its hand values.
func (j job) atTemperature(w io.Writer, t float64, checks *given.Checks) error {
	mat, err := j.material.At(t)
	if err != nil {
		return err
	}
	br := mat.Br.Value()
	b, err := j.before(br, j.gap)
	if err != nil {
		return err
	}
	m, err := j.model(br)
	if err != nil {
		return err
	}
	work, err := m.Operating(0, mat, 8)
	if err != nil {
		return err
	}
	n := closedform.CylinderMagnetometricFactor(j.diameter/2, j.height)
	mean := mat.Operating(br, n, 0)
	worst := work.Points[work.Worst]
	limit, name := mat.Limit()
	note := ""
	if work.Passed {
		note = fmt.Sprintf("   past %s, %.0f kA/m: expect a lasting loss", name, limit/1e3)
	}
	fmt.Fprintf(w, "  %14.1f  %6.4f %8.3f %8.4f  %15.3f %18.3f   r %.2f, z %+.2f%s\n", t, br, b*1e3, n, mean.Use, worst.Use,
		math.Hypot(worst.X.X, worst.X.Y)*1e3, worst.X.Z*1e3, note)
	r, l, g := j.diameter/2, j.height, j.gap
	hand := br / 2 * ((g+l)/math.Hypot(g+l, r) - g/math.Hypot(g, r))
	checks.Add(fmt.Sprintf("B at %.4g °C, two discs on the axis", t), hand*1e3, b*1e3, "mT", 1e-9)
	centre := mat.Operating(br, closedform.CylinderCentreFactor(r, l), 0)
	at := -field.At(m.Parts, r3.Vec{}, field.Mean, field.WantG).G.Z / (br / magnet.Mu0)
	checks.Add(fmt.Sprintf("|H|/%s at %.4g °C, in the middle", name, t), centre.Use, mat.Operating(br, at, 0).Use, "", 1e-9)
	return nil
}
