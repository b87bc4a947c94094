package handover_test

import (
	"bytes"
	"fmt"
	"strings"

	"example.com/boundpole/field/handover"
	"example.com/boundpole/geom"
	"example.com/boundpole/magnet"
	"gonum.org/v1/gonum/spatial/r3"
)

// A magnet goes to another simulator as a file, and the file is tested before it is used.
func ExampleOf() {
	part, err := magnet.WithRemanence(geom.Box{Size: r3.Vec{X: 20, Y: 10, Z: 5}}, r3.Vec{Z: 1.3})
	if err != nil {
		fmt.Println(err)
		return
	}
	m := magnet.Model{Parts: []magnet.Part{part}, Unit: 1e-3}
	set, err := handover.Of(m.Parts, handover.Settings{Kind: handover.Magnetic, Unit: m.Unit, Names: []string{"magnet"}, Points: 8})
	if err != nil {
		fmt.Println(err)
		return
	}
	var file bytes.Buffer
	if err := set.WriteCSV(&file); err != nil {
		fmt.Println(err)
		return
	}
	received, err := handover.ReadCSV(&file)
	if err != nil {
		fmt.Println(err)
		return
	}
	for _, g := range received.Groups {
		fmt.Printf("%s %s: %.2f A m in %d points\n", g.Part, g.Place, g.Charge, len(g.Points))
	}
	fmt.Printf("moment %.4f A m^2\n", received.Moment.Z)
	_, h := received.At(r3.Vec{Z: 30e-3})
	fmt.Printf("30 mm above: %.4f mT\n", magnet.Mu0*h.Z*1e3)
	fmt.Printf("from the body: %.4f mT\n", m.At(r3.Vec{Z: 30}, 0).B.Z*1e3)
	// Output:
	// magnet -z: -206.90 A m in 64 points
	// magnet +z: 206.90 A m in 64 points
	// moment 1.0345 A m^2
	// 30 mm above: 6.8022 mT
	// from the body: 6.8022 mT
}

// A file in another unit is refused, with the reason.
func ExampleReadCSV() {
	part, err := magnet.WithRemanence(geom.Box{Size: r3.Vec{X: 0.02, Y: 0.01, Z: 0.005}}, r3.Vec{Z: 1.3})
	if err != nil {
		fmt.Println(err)
		return
	}
	set, err := handover.Of([]magnet.Part{part}, handover.Settings{Kind: handover.Magnetic, Points: 1})
	if err != nil {
		fmt.Println(err)
		return
	}
	var file strings.Builder
	if err := set.WriteCSV(&file); err != nil {
		fmt.Println(err)
		return
	}
	_, err = handover.ReadCSV(strings.NewReader(strings.ReplaceAll(file.String(), "\nx[m]", "\nx[mm]")))
	fmt.Println(err)
	// Output:
	// handover: line 18: column "x[mm]"; want "x[m]": convert the numbers and the unit
}
