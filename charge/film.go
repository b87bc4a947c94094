package charge

import (
	"fmt"
	"math"
)

// Film is a dielectric film on a backplate, with trapped charge on its free surface: a parallel-plate electret, far from its
// edges. Charge trapped deeper counts by its depth, so Density is then the effective one that a surface potential shows.
//
// The methods count with the backplate at 0 V and the direction from film to air positive, and give NaN where Check refuses.
//
// A charged film keeps hundreds to thousands of volts; see the caution of the package.
type Film struct {
	Thickness    float64 // m
	Permittivity float64 // relative, >= 1
	Density      float64 // C/m^2, either sign
}

// FilmOfPotential returns the film whose surface potential, as a field meter reads it, is v volts.
// Source: [Sessler1987], solved for sigma.
func FilmOfPotential(v, thickness, permittivity float64) Film {
	return Film{Thickness: thickness, Permittivity: permittivity, Density: Epsilon0 * permittivity * v / thickness}
}

// Check refuses a thickness that is not a positive length, a permittivity below 1 and a density that is not finite.
func (f Film) Check() error {
	switch {
	case !positive(f.Thickness):
		return fmt.Errorf("charge: film thickness %v; give a positive length in m", f.Thickness)
	case !(f.Permittivity >= 1) || math.IsInf(f.Permittivity, 0):
		return fmt.Errorf("charge: relative permittivity %v of the film; give 1 or more", f.Permittivity)
	case f.Density-f.Density != 0:
		return fmt.Errorf("charge: film density %v; give a finite number in C/m^2", f.Density)
	}
	return nil
}

// checked returns x, NaN for a film that Check refuses.
func (f Film) checked(x float64) float64 {
	if f.Check() != nil {
		return math.NaN()
	}
	return x
}

// SurfacePotential returns V_s = sigma d/(eps0 eps_r) in V: of the surface with nothing above it.
// Source: [Sessler1987] (parallel-plate electret).
func (f Film) SurfacePotential() float64 {
	return f.checked(f.Density * f.Thickness / (Epsilon0 * f.Permittivity))
}

// Field returns E = -sigma/(eps0 eps_r) in V/m inside the film, with nothing above it. It is what the material has to
// stand: hold it against its own breakdown field.
// Source: [Sessler1987] (parallel-plate electret).
func (f Film) Field() float64 { return f.checked(-f.Density / (Epsilon0 * f.Permittivity)) }

// Gap is a Film across a gap of air (eps_r 1) from a second electrode, parallel to the backplate and far from the edges.
//
// Edges add to forces and capacitances of electrodes of radius R by the order of (Width + Thickness)/R; a Model of sheets and
// bodies has them.
type Gap struct {
	Film  Film
	Width float64 // m, from the film's surface to the electrode
	Bias  float64 // V of the second electrode against the backplate; 0: both joined
}

// Check refuses a film that is none, a width that is not a positive length and a bias that is not finite.
func (g Gap) Check() error {
	switch {
	case !positive(g.Width):
		return fmt.Errorf("charge: gap width %v; give a positive length in m", g.Width)
	case g.Bias-g.Bias != 0:
		return fmt.Errorf("charge: bias %v; give a finite number in V", g.Bias)
	}
	return g.Film.Check()
}

// checked returns x, NaN for a gap that Check refuses.
func (g Gap) checked(x float64) float64 {
	if g.Check() != nil {
		return math.NaN()
	}
	return x
}

// length returns g + d/eps_r: the gap of air that has the capacitance of gap and film in series.
func (g Gap) length() float64 { return g.Width + g.Film.Thickness/g.Film.Permittivity }

// Field returns E = (V_s - U)/(g + d/eps_r) in V/m in the gap, from the film to the second electrode; with U = 0 that is
// sigma d/(eps0 (d + eps_r g)).
// Source: [Sessler1987] (parallel-plate electret), with the bias by superposition.
func (g Gap) Field() float64 { return g.checked((g.Film.SurfacePotential() - g.Bias) / g.length()) }

// Voltage returns E g in V: the potential of the film's surface less that of the second electrode.
// Source: as Field.
func (g Gap) Voltage() float64 { return g.Field() * g.Width }

// Induced returns the charge density -eps0 E in C/m^2 on the second electrode. A gap that opens and shuts, or an electrode
// that slides, moves the difference through the circuit.
// Source: Gauss's law.
func (g Gap) Induced() float64 { return -Epsilon0 * g.Field() }

// Pressure returns eps0 E^2/2 in Pa, by which the second electrode is drawn to the film; never negative.
// Source: Maxwell's stress on a conductor, [Jackson1999] sec. 1.11.
func (g Gap) Pressure() float64 {
	e := g.Field()
	return Epsilon0 * e * e / 2
}

// Force returns the attraction in N of an electrode of an area in m^2: the pressure times the area.
func (g Gap) Force(area float64) float64 { return g.Pressure() * area }

// Capacitance returns eps0/(g + d/eps_r) in F/m^2, between the electrodes.
// Source: film and gap in series.
func (g Gap) Capacitance() float64 { return g.checked(Epsilon0 / g.length()) }

// Sensitivity returns -dU/dg = E in V/m, with U the voltage of the second electrode while its charge is kept (a high load):
// the signal of a microphone a metre of travel. Stray capacitance C_s lowers it by C/(C + C_s).
// Source: derivative of U = V_s - E (g + d/eps_r) at constant E.
func (g Gap) Sensitivity() float64 { return g.Field() }

// Stiffness returns eps0 (V_s - U)^2/(g + d/eps_r)^3 in N/m^3, newtons per metre and square metre: how fast the attraction
// grows as the gap closes at constant voltage. It counts against the stiffness of the suspension, which must be greater.
// Source: derivative of Pressure by g.
func (g Gap) Stiffness() float64 { return 2 * g.Pressure() / g.length() }

// BreakdownUse returns |Voltage| over BreakdownVoltage of the gap at a pressure in Pa, 0 for one atmosphere: from about 0.5
// think again, at 1 the charge will not stay.
func (g Gap) BreakdownUse(pressure float64) float64 {
	return math.Abs(g.Voltage()) / BreakdownVoltage(g.Width, pressure)
}

// positive reports whether x is a finite number above zero.
func positive(x float64) bool { return x > 0 && x <= math.MaxFloat64 }
