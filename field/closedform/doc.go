// Package closedform is a catalogue of textbook closed forms for the field of
// charge, dipoles, polarized bodies and currents. It is the yardstick against which
// numeric kernels are checked, so it shares no code with them: every function
// is a few lines of elementary algebra, written after the printed formula and
// rearranged only where that formula loses digits.
//
// # Units
//
// Natural units: no eps0, no mu0.
//
//	phi(x) = (1/4pi) [ int sigma/|x-r| dA + int rho/|x-r| dV ],   g = -grad phi
//	sigma = p.n on a face with outward normal n,  rho = -div p inside
//
// Electric reading: V = phi/eps0, E = g/eps0, p = P. Magnetic reading:
// H = g, p = M, B = mu0 (g + p). "Induction" in a name means g + p. Forces and
// energies are to be multiplied by mu0 (magnetic) or divided by eps0 (electric).
// Lengths may have any unit as long as all have the same.
//
// # Frames
//
// Every body stands in its own frame: right-handed, centre at the origin, axis
// along z, unless the function says otherwise. On-axis functions return the z
// component.
//
// # Arguments
//
// The order is always: strength (charge, density, polarization), shape,
// position. Lengths, radii and semi-axes are finite and positive. Anything
// outside the stated domain, and any NaN, gives NaN in all results; nothing
// panics. On a charged face the mean of the two sides is returned. Where the
// quantity does not exist (a point source, an edge) the result is NaN.
//
// # Accuracy
//
// The Accuracy line of a function bounds the relative error; for a vector, a
// tensor or a list of results it is the norm of the error over the norm of the
// result. The figure in parentheses is the worst one measured against
// testdata/reference.json, computed in 40 digits from a defining integral or
// another formulation (for the plainest laws from the law itself); TestReference
// reads the bound from the comment and holds the function to it. Lengths from
// 1e-69 to 1e69 are safe from overflow and underflow; beyond, nothing is claimed.
//
// All functions are pure and may be called from any number of goroutines. No
// bit-for-bit promise is made between processor architectures. The package
// does no numeric integration and knows no poses, meshes or units.
//
// # References
//
// All cited from memory; every formula was confirmed numerically as above.
//
//   - [Aharoni1998] A. Aharoni, Demagnetizing factors for rectangular
//     ferromagnetic prisms, J. Appl. Phys. 83 (1998) 3432, doi:10.1063/1.367113
//   - [Akoun1984] G. Akoun, J.-P. Yonnet, 3D analytical calculation of the forces
//     exerted between two cuboidal magnets, IEEE Trans. Magn. 20 (1984) 1962
//   - [Chen1991] D.-X. Chen, J. A. Brug, R. B. Goldfarb, Demagnetizing factors for
//     cylinders, IEEE Trans. Magn. 27 (1991) 3601, doi:10.1109/20.102932
//   - [DLMF] NIST Digital Library of Mathematical Functions, https://dlmf.nist.gov
//   - [Eason1955] G. Eason, B. Noble, I. N. Sneddon, On certain integrals of
//     Lipschitz-Hankel type involving products of Bessel functions, Phil. Trans.
//     R. Soc. A 247 (1955) 529
//   - [Griffiths2013] D. J. Griffiths, Introduction to Electrodynamics, 4th ed. (2013)
//   - [Halbach1980] K. Halbach, Design of permanent multipole magnets with oriented
//     rare earth cobalt material, Nucl. Instrum. Methods 169 (1980) 1
//   - [Hummer1996] G. Hummer, Electrostatic potential of a homogeneously charged
//     square and cube in two and three dimensions, J. Electrostat. 36 (1996) 285
//   - [Jackson1999] J. D. Jackson, Classical Electrodynamics, 3rd ed. (1999)
//   - [Joseph1966] R. I. Joseph, Ballistic demagnetizing factor in uniformly
//     magnetized cylinders, J. Appl. Phys. 37 (1966) 4639
//   - [Kellogg1929] O. D. Kellogg, Foundations of Potential Theory (1929)
//   - [Landau1984] L. D. Landau, E. M. Lifshitz, L. P. Pitaevskii, Electrodynamics
//     of Continuous Media, 2nd ed. (1984), sections 4 and 8
//   - [Lundin1985] R. Lundin, A handbook formula for the inductance of a
//     single-layer circular coil, Proc. IEEE 73 (1985) 1428
//   - [Maxwell1873] J. C. Maxwell, A Treatise on Electricity and Magnetism (1873)
//   - [Nagaoka1909] H. Nagaoka, The inductance coefficients of solenoids, J. Coll.
//     Sci. Imp. Univ. Tokyo 27 (1909) art. 6
//   - [Osborn1945] J. A. Osborn, Demagnetizing factors of the general ellipsoid,
//     Phys. Rev. 67 (1945) 351, doi:10.1103/PhysRev.67.351
//   - [Robertson2012] W. Robertson, B. Cazzolato, A. Zander, Axial force between a
//     thick coil and a cylindrical permanent magnet: optimizing the geometry of an
//     electromagnetic actuator, IEEE Trans. Magn. 48 (2012) 2479
//   - [Sessler1987] G. M. Sessler (ed.), Electrets, 2nd ed. (1987)
//   - [Sihvola1999] A. Sihvola, Electromagnetic Mixing Formulas and Applications (1999)
//   - [Stoner1945] E. C. Stoner, The demagnetizing factors for ellipsoids, Phil.
//     Mag. 36 (1945) 803
//   - [Stratton1941] J. A. Stratton, Electromagnetic Theory (1941)
//   - [Own] derived here; the derivation stands in a comment above the code.
package closedform
