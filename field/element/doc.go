// Package element holds the sources of whole shapes. Closed forms: points and dipoles, plane sheets and bodies with plane
// faces, discs, annuli and round walls, cylinders and tubes, spheres and ellipsoids. With one direction in closed form and one
// quadrature: arcs, tubes and cylinders with any affine polarization, discs and annuli with linear charge (sector files);
// cones, tori, axial and radial powers (ring files). One concept a file.
//
// Units are natural (package field): g in the unit of the density or polarization, phi in that times the length unit. Each
// source stands in its own frame; field.Posed moves it. Types without preparation are plain structs; the others are built by
// a New function, which fails where Check of the shape fails or a density is not finite, and are immutable. All are safe for
// concurrent use, allocate nothing when evaluated, and give the same bits in a batch as point by point, whatever else is
// asked for beside.
//
// Error estimates bound rounding: a small multiple of u = 2^-53 times the sum of the magnitudes of the terms, with what
// rounded geometry adds near edges; those of the quadratures add what a rule leaves out, from a second rule or from the last
// coefficients of the first. Lengths may lie between 1e-60 and 1e60.
//
// The package knows no bodies with polarization of the caller's choice: bound.Of chooses the element. It has no
// integrator for arbitrary faces: see field/cubature.
package element
