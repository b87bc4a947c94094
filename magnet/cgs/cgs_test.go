package cgs_test

import (
	"math"
	"testing"

	"example.com/boundpole/magnet/cgs"
)

// TestConversions holds every factor against the table of [Bennett1978] as it is commonly printed.
func TestConversions(t *testing.T) {
	const pi4 = 4 * math.Pi
	for _, c := range []struct {
		name      string
		to, back  func(float64) float64
		one, want float64
		printed   float64 // relative uncertainty of the printed digits
	}{
		{"G to T", cgs.Gauss, cgs.ToGauss, 1, 1e-4, 0},
		{"Oe to A/m", cgs.Oersted, cgs.ToOersted, 1, 79.5775, 1e-6},
		{"emu to A m2", cgs.EMU, cgs.ToEMU, 1, 1e-3, 0},
		{"emu/cm3 to A/m", cgs.EMUPerCubicCentimetre, cgs.ToEMUPerCubicCentimetre, 1, 1e3, 0},
		{"emu/g to A m2/kg", cgs.EMUPerGram, cgs.ToEMUPerGram, 1, 1, 0},
		{"MGOe to J/m3", cgs.MegagaussOersted, cgs.ToMegagaussOersted, 1, 7957.75, 1e-6},
		{"Mx to Wb", cgs.Maxwell, cgs.ToMaxwell, 1, 1e-8, 0},
		{"chi", cgs.Susceptibility, cgs.ToSusceptibility, 1, pi4, 0},
		{"N", cgs.DemagnetizingFactor, cgs.ToDemagnetizingFactor, pi4, 1, 0},
	} {
		const u = 0x1p-53
		tol := c.printed + 4*u // the digits printed, and a few roundings
		if got := c.to(c.one); math.Abs(got-c.want) > tol*c.want {
			t.Errorf("%s: %v gives %v, want %v within %v", c.name, c.one, got, c.want, tol)
		}
		for _, x := range []float64{-3.7e5, 0, 0.0123, 8e11} {
			if got := c.back(c.to(x)); math.Abs(got-x) > 4*u*math.Abs(x) { // two multiplications
				t.Errorf("%s: there and back %v gives %v", c.name, x, got)
			}
		}
	}
}

// TestSample repeats a measured stubby cylinder: 1.51875 emu in 0.0212058 cm3 are 71.620 kA/m (recomputed by hand).
func TestSample(t *testing.T) {
	m := cgs.EMUPerCubicCentimetre(1.51875 / 0.0212058)
	if math.Abs(m-71.620e3) > 0.5 { // the last printed digit
		t.Errorf("M = %v A/m, want 71620", m)
	}
	if got := cgs.MagnetizationOfSpecific(92, 5200); got != 92*5200 { // a ferrite powder: exact in float64
		t.Errorf("92 emu/g at 5200 kg/m3 is %v A/m, want %v", got, 92.0*5200)
	}
}
