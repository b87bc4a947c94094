// Package element holds the closed-form sources: points and dipoles, plane sheets and bodies with plane faces, discs, annuli
// and round walls, cylinders and tubes, spheres and ellipsoids. One concept a file.
//
// Units are natural (package field): g in the unit of the density or polarization, phi in that times the length unit. Each
// source stands in its own frame; field.Posed moves it. Types without preparation are plain structs; the others are built by
// a New function, which fails where Check of the shape fails or a density is not finite, and are immutable. All are safe for
// concurrent use, allocate nothing when evaluated, and give the same bits in a batch as point by point, whatever else is
// asked for beside.
//
// Error estimates bound rounding: a small multiple of u = 2^-53 times the sum of the magnitudes of the terms, with what
// rounded geometry adds near edges. Lengths may lie between 1e-60 and 1e60.
//
// The package knows no bodies with polarization of the caller's choice: bound.Of chooses the element. It has no numeric
// integrator for arbitrary faces.
package element
