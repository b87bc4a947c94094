package charge

import "math"

// Pyroelectric is a plate of pyroelectric material between electrodes, heated or cooled as a whole.
//
// Open, it may give kilovolts: keep the electrodes joined while heating, storing and shipping; see the caution of the package.
type Pyroelectric struct {
	Coefficient  float64 // dP/dT in C/(m^2 K), either sign
	Thickness    float64 // m
	Permittivity float64 // relative, >= 1
}

// Density returns p dT in C/m^2: the charge that joined electrodes exchange as the temperature changes by dT kelvin.
// Source: definition of the coefficient.
func (p Pyroelectric) Density(dT float64) float64 { return p.Coefficient * dT }

// OpenVoltage returns p dT t/(eps0 eps_r) in V between open electrodes, with no leakage and no stray capacitance; NaN for a
// thickness that is not positive or a permittivity below 1.
// Source: the plate as a capacitor that holds the charge of Density.
func (p Pyroelectric) OpenVoltage(dT float64) float64 {
	if !positive(p.Thickness) || !(p.Permittivity >= 1) {
		return math.NaN()
	}
	return p.Density(dT) * p.Thickness / (Epsilon0 * p.Permittivity)
}
