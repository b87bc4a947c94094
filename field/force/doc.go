// Package force computes what fields do to rigid charge: force, torque about a point, interaction energy and the stiffness of a
// part in the field of others.
//
// Units are natural (package field): F = int sigma g dA + int rho g dV, torques in that times length, energy W = int sigma phi dA +
// int rho phi dV with F = -grad W. Electric values are these over eps0, magnetic ones times mu0. Frame: that in which the part and
// the others are given. Results are the same bits for any GOMAXPROCS; nothing is shared between calls.
//
// The field is that of the others only. Touching faces give the limit of a gap that closes. Bodies that stand in each other are
// refused (ErrOverlap); a body in a cavity of another is not.
//
// Ways, in the order in which they are tried: exact forms for applied fields, points, boxes with parallel edges and coaxial
// cylinders polarized along the axis; far away the dipole density of both bodies at Gauss points, which does not cancel; a body
// small against its distance as dipoles in the gradient; else adaptive Gauss rules over the faces of one body in the closed-form
// field of the other. Every way takes two rules, and the estimate is their difference with what the field itself claims.
//
// Check computes the same by virtual work and by the stress in the air, two ways that share no integral with the first.
//
// The package does not solve for induced charge, and it knows no units.
package force
