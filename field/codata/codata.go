// Package codata holds the physical constants, in one place: CODATA 2022 recommended values with their standard
// uncertainties.
//
// Source: [Mohr2025]; the digits are those of the NIST table of fundamental constants.
package codata

const (
	// Epsilon0 is the vacuum electric permittivity in F/m.
	Epsilon0 = 8.8541878188e-12
	// Epsilon0Uncertainty is its standard uncertainty in F/m.
	Epsilon0Uncertainty = 0.0000000014e-12

	// Mu0 is the vacuum magnetic permeability in H/m. It differs from 4 pi 1e-7 by about 1e-10 of itself.
	Mu0 = 1.25663706127e-6
	// Mu0Uncertainty is its standard uncertainty in H/m.
	Mu0Uncertainty = 0.00000000020e-6
)
