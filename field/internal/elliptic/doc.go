// Package elliptic holds the elliptic integrals behind circles of charge:
// Carlson's symmetric integrals, complete integrals of Legendre and Bulirsch,
// and the integrals over a circle that rings, discs and cylinder walls are
// made of.
//
// Arguments are given in the form that keeps digits: the complementary modulus
// kc² = 1 - k² as itself, never as a difference; for a circle of radius a and
// a target at distance rho from its axis also gap = a - rho and
// q1 = gap² + z², which the caller may know better than a and rho.
//
// The circle integrals run through one arithmetic-geometric mean with positive
// terms only; the derivations stand in circle.go, disc.go and smooth.go. Carlson's forms
// serve general arguments and check the others in the tests.
//
// NaN in, NaN out; arguments outside the stated domain give NaN. Lengths must
// lie within 1e±70, so that their fourth powers neither overflow nor
// underflow. No product is followed by a sum without rounding in between, so
// the bits do not depend on the architecture. Nothing allocates.
package elliptic
