// Package cgs converts magnetic quantities between SI and the Gaussian (CGS-EMU) units that instruments, data sheets and
// older tables still print. It is the border: nothing else in the module speaks CGS.
//
// Every function is named by the unit that goes in; a second function with To takes the SI value back. SI units stand in the
// comments. The factors are exact powers of ten and 4 pi by the definition of the EMU system, in which mu0 is 4 pi 1e-7 H/m;
// the mu0 of CODATA 2022 differs from that by 1.3e-10 of itself, which no conversion here uses.
//
// Source: [Bennett1978], the table of magnetic units of the US National Bureau of Standards.
package cgs

import "math"

const (
	perGauss   = 1e-4                 // T
	perOersted = 1000 / (4 * math.Pi) // A/m
	perMGOe    = perGauss * perOersted * 1e6
)

// Gauss returns the flux density in T of b gauss. It is also the magnetic polarization J = 4 pi M in gauss.
func Gauss(b float64) float64 { return b * perGauss }

// ToGauss returns the flux density in gauss of b tesla.
func ToGauss(b float64) float64 { return b / perGauss }

// Oersted returns the field in A/m of h oersted.
func Oersted(h float64) float64 { return h * perOersted }

// ToOersted returns the field in oersted of h A/m.
func ToOersted(h float64) float64 { return h / perOersted }

// EMU returns the magnetic moment in A m^2 of m emu (erg/G).
func EMU(m float64) float64 { return m * 1e-3 }

// ToEMU returns the moment in emu of m A m^2.
func ToEMU(m float64) float64 { return m / 1e-3 }

// EMUPerCubicCentimetre returns the magnetization in A/m of m emu/cm^3.
func EMUPerCubicCentimetre(m float64) float64 { return m * 1e3 }

// ToEMUPerCubicCentimetre returns the magnetization in emu/cm^3 of m A/m.
func ToEMUPerCubicCentimetre(m float64) float64 { return m / 1e3 }

// EMUPerGram returns the specific magnetization in A m^2/kg of s emu/g: the same number.
func EMUPerGram(s float64) float64 { return s }

// ToEMUPerGram returns the specific magnetization in emu/g of s A m^2/kg: the same number.
func ToEMUPerGram(s float64) float64 { return s }

// MagnetizationOfSpecific returns the magnetization in A/m of material with s emu/g and a density in kg/m^3.
func MagnetizationOfSpecific(s, density float64) float64 { return s * density }

// MegagaussOersted returns the energy product in J/m^3 of e MGOe.
func MegagaussOersted(e float64) float64 { return e * perMGOe }

// ToMegagaussOersted returns the energy product in MGOe of e J/m^3.
func ToMegagaussOersted(e float64) float64 { return e / perMGOe }

// Maxwell returns the flux in Wb of f maxwell.
func Maxwell(f float64) float64 { return f * 1e-8 }

// ToMaxwell returns the flux in maxwell of f weber.
func ToMaxwell(f float64) float64 { return f / 1e-8 }

// Susceptibility returns the SI volume susceptibility of chi emu/(cm^3 Oe): 4 pi times it.
func Susceptibility(chi float64) float64 { return 4 * math.Pi * chi }

// ToSusceptibility returns the volume susceptibility in emu/(cm^3 Oe) of the SI value.
func ToSusceptibility(chi float64) float64 { return chi / (4 * math.Pi) }

// DemagnetizingFactor returns the SI demagnetizing factor, trace 1, of one in the CGS convention, trace 4 pi.
func DemagnetizingFactor(n float64) float64 { return n / (4 * math.Pi) }

// ToDemagnetizingFactor returns the CGS demagnetizing factor, trace 4 pi, of the SI one.
func ToDemagnetizingFactor(n float64) float64 { return n * (4 * math.Pi) }
