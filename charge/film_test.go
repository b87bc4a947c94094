package charge_test

import (
	"math"
	"strings"
	"testing"

	"example.com/boundpole/charge"
	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// half is half a unit of the last digit of a value printed with so many decimals.
func half(decimals int) float64 { return 0.5 * math.Pow(10, -float64(decimals)) * (1 + 1e-9) }

// TestMicrophone holds a capsule against values worked by hand from the formulas: a foil of 12.5 um, eps_r 2.1,
// -0.30 mC/m^2, gap 20 um, radius 3 mm.
func TestMicrophone(t *testing.T) {
	film := charge.Film{Thickness: 12.5e-6, Permittivity: 2.1, Density: -0.30e-3}
	gap := charge.Gap{Film: film, Width: 20e-6}
	area := math.Pi * 3e-3 * 3e-3
	// tolerances: half of the last digit printed
	near(t, "surface potential, V", film.SurfacePotential(), -201.68, half(2))
	near(t, "field in the gap, MV/m", gap.Field()*1e-6, -7.7712, half(4))
	near(t, "voltage of the gap, V", gap.Voltage(), -155.4, half(1))
	near(t, "pressure, Pa", gap.Pressure(), 267.36, half(2))
	near(t, "force, mN", gap.Force(area)*1e3, 7.559, half(3))
	near(t, "capacitance, pF", gap.Capacitance()*area*1e12, 9.646, half(3))
	near(t, "mV for 10 nm", gap.Sensitivity()*10e-9*1e3, -77.7, half(1))
	near(t, "negative stiffness, N/m", gap.Stiffness()*area, 582.6, half(1))
	near(t, "use of the least voltage of air", gap.BreakdownUse(0), 155.4/347.3, 1e-3) // Townsend's curve at 20 um: 347.3 V
}

// TestFilmValues holds other films of the trade against values worked by hand.
func TestFilmValues(t *testing.T) {
	harvester := charge.Film{Thickness: 15e-6, Permittivity: 2.1, Density: 0.5e-3}
	gap := charge.Gap{Film: harvester, Width: 30e-6}
	near(t, "0.5 mC/m2, V", harvester.SurfacePotential(), 403.36, half(2))
	near(t, "charge induced, mC/m2", gap.Induced()*1e3, -0.096154, half(6))
	near(t, "over 0.5 cm2, nC", gap.Induced()*0.5e-4*1e9, -4.808, half(3))
	near(t, "gap, MV/m", gap.Field()*1e-6, 10.86, half(2))
	near(t, "gap, V", gap.Voltage(), 325.8, half(1))
	harvester.Density = 1e-3
	near(t, "1 mC/m2, V", harvester.SurfacePotential(), 806.7, half(1))
	back := charge.FilmOfPotential(403.36, 15e-6, 2.1)
	near(t, "density from the potential, mC/m2", back.Density*1e3, 0.5, 1e-5) // 403.36 has five digits
	pvdf := charge.Pyroelectric{Coefficient: -27e-6, Thickness: 28e-6, Permittivity: 12}
	near(t, "PVDF by 10 K, V", pvdf.OpenVoltage(10), -71.2, half(1))
	tantalate := charge.Pyroelectric{Coefficient: -190e-6, Thickness: 1e-3, Permittivity: 45}
	near(t, "LiTaO3 by 20 K, kV", tantalate.OpenVoltage(20)*1e-3, -9.54, half(2))
	near(t, "its charge, mC/m2", tantalate.Density(20)*1e3, -3.8, 1e-12) // rounding
}

// TestGapLaws solves the gap from Gauss's law on the surface and the voltage round the circuit, and differences pressure and
// voltage.
func TestGapLaws(t *testing.T) {
	for _, g := range []charge.Gap{
		{Film: charge.Film{Thickness: 12.5e-6, Permittivity: 2.1, Density: -0.3e-3}, Width: 20e-6},
		{Film: charge.Film{Thickness: 25e-6, Permittivity: 3.5, Density: 1e-3}, Width: 80e-6, Bias: 120},
		{Film: charge.Film{Thickness: 5e-6, Permittivity: 1, Density: 0}, Width: 3e-6, Bias: -40},
	} {
		d, eps := g.Film.Thickness, g.Film.Permittivity
		air := g.Field()
		film := (charge.Epsilon0*air - g.Film.Density) / (charge.Epsilon0 * eps) // Gauss
		scale := math.Abs(g.Film.SurfacePotential()) + math.Abs(g.Bias)
		near(t, "voltage round the circuit", -film*d-air*g.Width, g.Bias, 1e-14*scale) // a few roundings
		h := 1e-4 * g.Width
		wide, narrow := g, g
		wide.Width, narrow.Width = g.Width+h, g.Width-h
		near(t, "stiffness", -(wide.Pressure()-narrow.Pressure())/(2*h), g.Stiffness(), 1e-7*g.Stiffness()) // (h/g)^2 and more
		// with the charge -eps0 E kept, U is V_s - E (g + d/eps_r)
		voltage := func(g charge.Gap) float64 {
			return g.Film.SurfacePotential() - air*charge.Epsilon0/g.Capacitance()
		}
		near(t, "sensitivity", -(voltage(wide)-voltage(narrow))/(2*h), g.Sensitivity(), 1e-9*math.Abs(air)) // u V/h
	}
}

// TestFilmRefusals checks that what is no film is named, and that its methods then give NaN.
func TestFilmRefusals(t *testing.T) {
	good := charge.Gap{Film: charge.Film{Thickness: 1e-5, Permittivity: 2, Density: 1e-4}, Width: 1e-5}
	if err := good.Check(); err != nil {
		t.Fatalf("a good gap is refused: %v", err)
	}
	for _, c := range []struct {
		word  string
		spoil func(g *charge.Gap)
	}{
		{"thickness", func(g *charge.Gap) { g.Film.Thickness = 0 }},
		{"thickness", func(g *charge.Gap) { g.Film.Thickness = math.NaN() }},
		{"permittivity", func(g *charge.Gap) { g.Film.Permittivity = 0.5 }},
		{"density", func(g *charge.Gap) { g.Film.Density = math.Inf(1) }},
		{"width", func(g *charge.Gap) { g.Width = -1e-6 }},
		{"bias", func(g *charge.Gap) { g.Bias = math.NaN() }},
	} {
		g := good
		c.spoil(&g)
		if err := g.Check(); err == nil || !strings.Contains(err.Error(), c.word) {
			t.Errorf("bad %s: error %v", c.word, err)
		}
		for k, v := range []float64{g.Field(), g.Voltage(), g.Induced(), g.Pressure(), g.Capacitance(), g.Stiffness(), g.BreakdownUse(0)} {
			if !math.IsNaN(v) {
				t.Errorf("bad %s: quantity %d is %v, want NaN", c.word, k, v)
			}
		}
	}
	if v := (charge.Pyroelectric{Coefficient: 1e-5, Permittivity: 10}).OpenVoltage(1); !math.IsNaN(v) {
		t.Errorf("plate without thickness: %v, want NaN", v)
	}
}

// TestBreakdownVoltage checks the least voltage, the curve, the microgap and the domain.
func TestBreakdownVoltage(t *testing.T) {
	near(t, "7.5 um", charge.BreakdownVoltage(7.5e-6, 0), 327, 0)
	near(t, "4 um", charge.BreakdownVoltage(4e-6, 0), 327, 0)
	near(t, "0.5 um", charge.BreakdownVoltage(0.5e-6, 0), 175, 1e-9)        // 350 V/um
	near(t, "17 um", charge.BreakdownVoltage(17e-6, 0), 328.64925, 1e-4)    // the curve, just above the least voltage
	near(t, "20 um", charge.BreakdownVoltage(20e-6, 0), 347.3095, 1e-4)     // the curve at 20 digits
	near(t, "1 mm", charge.BreakdownVoltage(1e-3, 0), 5034.9894, 1e-4)      // likewise
	near(t, "1 cm", charge.BreakdownVoltage(1e-2, 101325), 35509.333, 1e-3) // likewise
	near(t, "similarity", charge.BreakdownVoltage(1e-3, 2000), charge.BreakdownVoltage(1e-4, 20000), 1e-10)
	last := 0.0
	for g := 1e-7; g < 1e-2; g *= 1.03 {
		v := charge.BreakdownVoltage(g, 0)
		if v < last {
			t.Errorf("falls to %v V at a gap of %v m", v, g)
		}
		last = v
	}
	for _, c := range [][2]float64{{0, 0}, {-1, 0}, {1e-5, -1}, {0.011, 0}, {math.NaN(), 0}, {1e-5, math.NaN()}} {
		if v := charge.BreakdownVoltage(c[0], c[1]); !math.IsNaN(v) {
			t.Errorf("gap %v, pressure %v: %v, want NaN", c[0], c[1], v)
		}
	}
}

// TestGradedFerroelectric is a film with P_z = P0 z/t from its bottom: the charge inside it halves the open voltage of the
// uniform one. The film's own permittivity enters by P/eps_r.
func TestGradedFerroelectric(t *testing.T) {
	const p0, thick, eps, radius = 0.065, 28e-6, 12.0, 0.1
	graded := field.Affine{Value: r3.Vec{Z: p0 / 2}}
	graded.Gradient[2][2] = p0 / thick
	for _, c := range []struct {
		name        string
		p           field.Polarization
		top, bottom float64
		rho, volts  float64
	}{
		{"graded", graded, p0, 0, -2321.43, 8564.7},
		{"uniform", field.Uniform{P: r3.Vec{Z: p0}}, p0, -p0, 0, 17129},
	} {
		part, err := charge.Polarized(geom.Cylinder{Radius: radius, Height: thick}, c.p)
		if err != nil {
			t.Fatal(err)
		}
		layers := part.Charge.Layers
		near(t, c.name+" sigma on top", layers[1].Max, c.top, 1e-15)
		near(t, c.name+" sigma at the bottom", layers[0].Max, c.bottom, 1e-15)
		near(t, c.name+" rho", part.Charge.Volumes[0].Max, c.rho, half(2))
		near(t, c.name+" total", part.Charge.Total(), 0, 0)
		free, err := charge.Polarized(geom.Cylinder{Radius: radius, Height: thick}, field.Times{Polarization: c.p, Factor: 1 / eps})
		if err != nil {
			t.Fatal(err)
		}
		m := charge.Model{Parts: []charge.Part{free}}
		across := m.At(r3.Vec{Z: thick / 2}, field.Mean).V - m.At(r3.Vec{Z: -thick / 2}, field.Mean).V
		near(t, c.name+" open voltage", across, c.volts, 5e-4*c.volts) // the edge takes thick/radius
	}
}

// TestRadialBead is a bead with P = k r: without its charge inside it would have a field outside.
func TestRadialBead(t *testing.T) {
	const radius, k = 1e-3, 0.2
	p := field.Affine{}
	for i := range 3 {
		p.Gradient[i][i] = k
	}
	part, err := charge.Polarized(geom.Sphere{Radius: radius}, p)
	if err != nil {
		t.Fatal(err)
	}
	c := part.Charge
	near(t, "sigma", c.Layers[0].Max, 2e-4, 1e-18)
	near(t, "rho", c.Volumes[0].Max, -0.6, 1e-15)
	m := charge.Model{Parts: []charge.Part{part}}
	near(t, "E under the surface, MV/m", m.At(r3.Vec{X: radius}, field.Inside).E.X*1e-6, -22.588, half(3))
	near(t, "E outside", r3.Norm(m.At(r3.Vec{Y: 2 * radius}, field.Mean).E), 0, 1e-5) // u sigma/eps0
	const r = 2 * radius
	near(t, "E with the charge inside dropped, MV/m", c.Layers[0].Charge/(4*math.Pi*charge.Epsilon0*r*r)*1e-6, 5.647, half(3))
}
