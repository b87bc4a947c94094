// Package grade describes permanent-magnet material as it is bought: the numbers of a data sheet with where they come from,
// the material at a temperature, and the operating point on its recoil line.
//
// Units: remanence in T, coercivities and fields in A/m, temperatures in °C, temperature coefficients per kelvin, relative
// recoil permeability. Along the magnetization, fields that demagnetize are negative. Values are immutable and safe for
// concurrent use.
//
// Temperature coefficients are chords, not slopes: they hold between the reference temperature and the ends of the range
// for which they are stated, and outside of it the package refuses to answer (common practice, no source). It knows the
// reversible part only: past the knee a warning is all that it gives, no loss.
package grade

import (
	"fmt"
	"math"
)

// Range is a quantity as data sheets print it; a zero is a value that is not stated.
type Range struct {
	Min, Typical, Max float64
}

// Value returns the typical value, or the middle of the stated ones, 0 if there is none.
func (r Range) Value() float64 {
	switch {
	case r.Typical != 0:
		return r.Typical
	case r.Min != 0 && r.Max != 0:
		return (r.Min + r.Max) / 2
	case r.Min != 0:
		return r.Min
	}
	return r.Max
}

// Least returns the smallest stated value, 0 if there is none: the one that a supplier guarantees.
func (r Range) Least() float64 {
	switch {
	case r.Min != 0:
		return r.Min
	case r.Typical != 0:
		return r.Typical
	}
	return r.Max
}

// scaled returns the range times k.
func (r Range) scaled(k float64) Range { return Range{r.Min * k, r.Typical * k, r.Max * k} }

// check returns an error if the stated values are not positive, finite and in order.
func (r Range) check(what, unit string) error {
	last, name := 0.0, ""
	for _, v := range []struct {
		name  string
		value float64
	}{{"min", r.Min}, {"typical", r.Typical}, {"max", r.Max}} {
		switch {
		case v.value == 0:
			continue
		case !(v.value > 0) || math.IsInf(v.value, 1):
			return fmt.Errorf("grade: %s: %s is %v %s; want a positive number, or leave it out", what, v.name, v.value, unit)
		case v.value < last:
			return fmt.Errorf("grade: %s: %s %v %s is below %s %v %s; want min <= typical <= max", what, v.name, v.value, unit, name, last, unit)
		}
		last, name = v.value, v.name
	}
	return nil
}

// Grade is a permanent-magnet material with the provenance of its numbers.
type Grade struct {
	Name      string
	Source    string  // who states the numbers, where, which edition; never empty
	Reference float64 // °C at which they hold
	Br        Range   // T, remanence
	HcJ       Range   // A/m, intrinsic coercivity
	Hk        float64 // A/m, field at which J has fallen to 0.9 Br, as a magnitude; 0: not stated
	Recoil    float64 // relative recoil permeability, >= 1
	Alpha     float64 // 1/K, reversible coefficient of Br
	Beta      float64 // 1/K, reversible coefficient of HcJ and Hk
	From, To  float64 // °C between which Alpha and Beta hold; both 0: Reference only
}

// Check returns an error that names the first number that cannot be, its value and the remedy.
func (g *Grade) Check() error {
	if g.Source == "" {
		return fmt.Errorf("grade: %q states no source; say who states the numbers, where and in which edition", g.Name)
	}
	if err := g.Br.check("remanence", "T"); err != nil {
		return err
	}
	if g.Br.Value() == 0 {
		return fmt.Errorf("grade: %q states no remanence; give at least one of min, typical, max in tesla", g.Name)
	}
	const strongest = 3 // T, above the saturation of every known material: 2.4 T for cobalt-iron, common practice, no source
	if v := max(g.Br.Min, g.Br.Typical, g.Br.Max); v > strongest {
		return fmt.Errorf("grade: remanence %v T is above %v T; remanence is in tesla, not gauss or kilogauss", v, strongest)
	}
	if err := g.HcJ.check("coercivity", "A/m"); err != nil {
		return err
	}
	switch {
	case !(g.Hk >= 0) || math.IsInf(g.Hk, 1):
		return fmt.Errorf("grade: knee field %v A/m; want the magnitude of Hk, or leave it out", g.Hk)
	case g.Hk != 0 && g.HcJ.Value() != 0 && g.Hk > max(g.HcJ.Min, g.HcJ.Typical, g.HcJ.Max):
		return fmt.Errorf("grade: knee field %v A/m is above the coercivity; J passes 0.9 Br before it passes 0", g.Hk)
	case !(g.Recoil >= 1) || g.Recoil > 10:
		return fmt.Errorf("grade: recoil permeability %v; want the relative one, 1 to 10 (1.02 to 1.1 for sintered magnets)", g.Recoil)
	}
	return g.checkTemperatures()
}

// checkTemperatures returns an error if the coefficients or their range cannot be.
func (g *Grade) checkTemperatures() error {
	const cold, hot = -273.15, 1500.0 // °C
	for _, t := range []float64{g.Reference, g.From, g.To} {
		if !(t >= cold && t <= hot) {
			return fmt.Errorf("grade: temperature %v °C; want %v to %v", t, cold, hot)
		}
	}
	if g.Alpha == 0 && g.Beta == 0 && g.From == 0 && g.To == 0 {
		return nil
	}
	if !(g.From <= g.Reference && g.Reference <= g.To) {
		return fmt.Errorf("grade: the coefficients hold from %v to %v °C, which leaves out the reference temperature %v °C", g.From, g.To, g.Reference)
	}
	for _, c := range []struct {
		name  string
		value float64
	}{{"remanence", g.Alpha}, {"coercivity", g.Beta}} {
		if math.IsNaN(c.value) || math.Abs(c.value) > 0.02 {
			return fmt.Errorf("grade: temperature coefficient of %s is %v %%/K; want at most 2 %%/K in size (-0.12 is usual for sintered magnets)",
				c.name, 100*c.value)
		}
		for _, t := range []float64{g.From, g.To} {
			if 1+c.value*(t-g.Reference) <= 0 {
				return fmt.Errorf("grade: %s is gone at %v °C by its coefficient %v %%/K; shorten the range in which the coefficient holds",
					c.name, t, 100*c.value)
			}
		}
	}
	return nil
}

// Material is a grade at one temperature.
type Material struct {
	Temperature float64 // °C
	Br          Range   // T
	HcJ         Range   // A/m
	Hk          float64 // A/m; 0: not stated
	Recoil      float64 // relative permeability
}

// At returns the material at a temperature in °C: Br and HcJ change by their reversible coefficients, Hk with HcJ, the
// recoil permeability not at all (common practice, no source). A temperature outside the range of the coefficients is an
// error.
func (g *Grade) At(temperature float64) (Material, error) {
	if err := g.Check(); err != nil {
		return Material{}, err
	}
	d := temperature - g.Reference
	from, to := g.From, g.To
	if from == 0 && to == 0 {
		from, to = g.Reference, g.Reference
	}
	if !(temperature >= from && temperature <= to) {
		return Material{}, fmt.Errorf("grade: %q is stated from %v to %v °C, not at %v °C; coefficients are chords and are not extrapolated",
			g.Name, from, to, temperature)
	}
	kr, kc := 1+g.Alpha*d, 1+g.Beta*d
	return Material{
		Temperature: temperature, Br: g.Br.scaled(kr), HcJ: g.HcJ.scaled(kc), Hk: g.Hk * kc, Recoil: g.Recoil,
	}, nil
}
