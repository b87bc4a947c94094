package charge_test

import (
	"fmt"
	"math"

	"example.com/boundpole/charge"
)

// The capsule of an electret microphone: foil, gap, and what the diaphragm feels.
func ExampleGap() {
	foil := charge.Film{Thickness: 12.5e-6, Permittivity: 2.1, Density: -0.30e-3}
	capsule := charge.Gap{Film: foil, Width: 20e-6}
	area := math.Pi * 3e-3 * 3e-3
	fmt.Printf("surface potential %.2f V\n", foil.SurfacePotential())
	fmt.Printf("gap %.4f MV/m, %.1f V\n", capsule.Field()*1e-6, capsule.Voltage())
	fmt.Printf("pressure %.2f Pa, force %.3f mN\n", capsule.Pressure(), capsule.Force(area)*1e3)
	fmt.Printf("capacitance %.3f pF\n", capsule.Capacitance()*area*1e12)
	fmt.Printf("10 nm give %.1f mV\n", math.Abs(capsule.Sensitivity())*10e-9*1e3)
	fmt.Printf("negative stiffness %.1f N/m\n", capsule.Stiffness()*area)
	fmt.Printf("%.0f %% of the voltage at which air may spark\n", 100*capsule.BreakdownUse(0))
	// Output:
	// surface potential -201.68 V
	// gap -7.7712 MV/m, -155.4 V
	// pressure 267.36 Pa, force 7.559 mN
	// capacitance 9.646 pF
	// 10 nm give 77.7 mV
	// negative stiffness 582.6 N/m
	// 45 % of the voltage at which air may spark
}

// What a field meter reads tells the charge.
func ExampleFilmOfPotential() {
	film := charge.FilmOfPotential(-240, 25e-6, 2.1)
	fmt.Printf("%.3f mC/m^2\n", film.Density*1e3)
	// Output: -0.179 mC/m^2
}

// An open film of PVDF that warms by ten kelvin.
func ExamplePyroelectric() {
	film := charge.Pyroelectric{Coefficient: -27e-6, Thickness: 28e-6, Permittivity: 12}
	fmt.Printf("%.1f V\n", film.OpenVoltage(10))
	// Output: -71.2 V
}

// A gap of 20 um of air, and the least voltage at which air sparks at all.
func ExampleBreakdownVoltage() {
	fmt.Printf("%.0f V, %.0f V\n", charge.BreakdownVoltage(20e-6, 0), charge.BreakdownVoltage(7.5e-6, 0))
	// Output: 347 V, 327 V
}
