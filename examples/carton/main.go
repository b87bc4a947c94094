// Command carton asks what a carton of magnets does at the distances at which air freight is measured: packed all alike, or
// turned over in a checkerboard, with moments that scatter from piece to piece.
//
//	go run ./examples/carton -scatter "3 %" -trials 400 -seed 1
//
// For planning only: a package is measured, by a competent person with a suitable instrument and the current regulations.
package main

import (
	"flag"
	"fmt"
	"io"
	"math"
	"math/rand/v2"
	"os"
	"slices"

	"example.com/boundpole/examples/internal/given"
	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"example.com/boundpole/magnet"
	"gonum.org/v1/gonum/spatial/r3"
)

func main() {
	if err := run(os.Args[1:], os.Stdout); err != nil {
		fmt.Fprintln(os.Stderr, "carton:", err)
		os.Exit(1)
	}
}

const rows, columns = 4, 6

func run(args []string, w io.Writer) error {
	set := flag.NewFlagSet("carton", flag.ContinueOnError)
	diameter := given.Flag(set, "diameter", given.Length, "20mm", "diameter of a disc")
	height := given.Flag(set, "height", given.Length, "10mm", "height of a disc")
	br := given.Flag(set, "remanence", given.Flux, "1.30T", "remanence along the axis")
	pitch := given.Flag(set, "pitch", given.Length, "25mm", "distance between neighbours")
	scatter := given.Flag(set, "scatter", given.Share, "3%", "standard deviation of the moments")
	trials := set.Int("trials", 400, "cartons that are drawn")
	seed := set.Uint64("seed", 1, "seed of the draw")
	if err := set.Parse(args); err != nil {
		return err
	}
	if err := given.Positive(set, "diameter", "height", "remanence", "pitch"); err != nil {
		return err
	}
	if *trials < 10 || *scatter < 0 || *pitch < *diameter {
		return fmt.Errorf("want at least 10 trials, a scatter of at least 0 %%, and a pitch of at least the diameter")
	}
	part, err := magnet.WithRemanence(geom.Cylinder{Radius: *diameter / 2, Height: *height}, r3.Vec{Z: *br})
	if err != nil {
		return err
	}
	c := carton{disc: part.Charge, pitch: *pitch}
	moment := part.Charge.Moment.Z
	fmt.Fprintf(w, "Carton of %d discs %.6g x %.6g mm, Br %.6g T, %.6g mm apart; moment %.3f A m2 each, scatter %.2g %%.\n\n",
		rows*columns, *diameter*1e3, *height*1e3, *br, *pitch*1e3, moment, 100**scatter)
	var checks given.Checks
	for _, l := range magnet.Limits() {
		if l.Distance == 0 {
			continue
		}
		alike, _ := c.greatest(l.Distance, func(int, int) float64 { return 1 })
		board, way := c.greatest(l.Distance, checkerboard)
		rms, high := c.draw(l.Distance, *scatter, *trials, *seed)
		fmt.Fprintf(w, "%.3g uT at %.1f m (%s)\n", l.FluxDensity*1e6, l.Distance, l.What)
		fmt.Fprintf(w, "  all alike                      %10.4g uT   %s\n", alike*1e6, verdict(alike, l.FluxDensity))
		fmt.Fprintf(w, "  checkerboard, ideal            %10.4g nT   %s, worst towards (%.2f, %.2f, %.2f)\n", board*1e9, verdict(board, l.FluxDensity), way.X, way.Y, way.Z)
		fmt.Fprintf(w, "  checkerboard, along the discs' axis  %.4g nT rms over %d cartons, 99 of 100 below %.4g nT\n", rms*1e9, *trials, high*1e9)
		r3d := l.Distance * l.Distance * l.Distance
		checks.Add(fmt.Sprintf("all alike at %.1f m, one dipole", l.Distance), 2e-7*moment*rows*columns/r3d*1e6, alike*1e6, "uT", 0.03)
		hand := 2e-7 * moment * math.Sqrt(rows*columns) * *scatter / r3d
		checks.Add(fmt.Sprintf("scatter at %.1f m, root of the number", l.Distance), hand*1e9, rms*1e9, "nT", 4/math.Sqrt(2*float64(*trials)))
		if l.Distance < 3 {
			in := r3.Norm(c.field(r3.Scale(l.Distance/math.Sqrt2, r3.Vec{X: 1, Y: 1}), checkerboard))
			checks.Add("checkerboard at 45 degrees in the plane", 6**pitch**pitch*moment*7.5*1e-7/math.Pow(l.Distance, 5)*1e9, in*1e9, "nT", 0.01)
		}
	}
	if !checks.Print(w) {
		return fmt.Errorf("a hand check was missed")
	}
	fmt.Fprintln(w, "\nLimits, as data:")
	for _, l := range magnet.Limits() {
		fmt.Fprintf(w, "  %9.3g T  %s; %s\n", l.FluxDensity, l.What, l.Source)
	}
	fmt.Fprintln(w, "\nFor planning only, not a clearance and not a shipping decision: cancellation depends on tolerance; measure the finished package.")
	fmt.Fprintln(w, "Fields of about 0.5 to 1 mT may affect implants; such magnets attract suddenly, pinch and shatter.")
	return nil
}

func verdict(b, limit float64) string {
	if b > limit {
		return "above it"
	}
	return "not above it"
}

// carton is discs with their axes along z in a grid about the origin.
type carton struct {
	disc  *bound.Charge
	pitch float64
}

func checkerboard(i, j int) float64 { return float64(1 - 2*((i+j)%2)) }

// place returns where disc (i, j) stands.
func (c carton) place(i, j int) r3.Vec {
	return r3.Vec{X: c.pitch * (float64(j) - float64(columns-1)/2), Y: c.pitch * (float64(i) - float64(rows-1)/2)}
}

// field returns B at x with the moments multiplied by the weights: that of one disc at the places that the others see x.
func (c carton) field(x r3.Vec, weight func(i, j int) float64) r3.Vec {
	at := make([]r3.Vec, 0, rows*columns)
	for i := range rows {
		for j := range columns {
			at = append(at, r3.Sub(x, c.place(i, j)))
		}
	}
	v := field.NewValues(len(at), field.WantG)
	c.disc.Evaluate(v, field.PointsOf(at...), field.Mean)
	var h r3.Vec
	for k := range at {
		h = r3.Add(h, r3.Scale(weight(k/columns, k%columns), v.At(k).G))
	}
	return r3.Scale(magnet.Mu0, h)
}

// greatest returns the greatest |B| at a distance, over directions 3 degrees apart, and the direction.
func (c carton) greatest(distance float64, weight func(i, j int) float64) (b float64, way r3.Vec) {
	const step = 3
	for polar := 0; polar <= 180; polar += step {
		st, ct := math.Sincos(float64(polar) * math.Pi / 180)
		for azimuth := 0; azimuth < 360; azimuth += step {
			sp, cp := math.Sincos(float64(azimuth) * math.Pi / 180)
			u := r3.Vec{X: st * cp, Y: st * sp, Z: ct}
			if size := r3.Norm(c.field(r3.Scale(distance, u), weight)); size > b*(1+1e-12) {
				b, way = size, u
			}
			if polar == 0 || polar == 180 {
				break
			}
		}
	}
	return b, way
}

// draw returns the root mean square and the 99 % point of |B| on the axis of a checkerboard whose moments scatter.
func (c carton) draw(distance, scatter float64, trials int, seed uint64) (rms, high float64) {
	rng := rand.New(rand.NewPCG(seed, uint64(rows*columns)))
	all := make([]float64, trials)
	for t := range all {
		var weights [rows][columns]float64
		for i := range rows {
			for j := range columns {
				weights[i][j] = checkerboard(i, j) * (1 + scatter*rng.NormFloat64())
			}
		}
		all[t] = r3.Norm(c.field(r3.Vec{Z: distance}, func(i, j int) float64 { return weights[i][j] }))
		rms += all[t] * all[t]
	}
	slices.Sort(all)
	return math.Sqrt(rms / float64(trials)), all[int(0.99*float64(trials))]
}
