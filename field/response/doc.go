// Package response finds what bodies that respond to a field carry: p = p0 + chi g in each, in the field of sources from
// outside, of their own and of each other. It covers dielectrics, soft iron and magnets with recoil, diamagnets down to
// chi = -1, and conductors (chi = +Inf), floating, charged, or held at potentials.
//
//	system, err := response.Prepare(ctx, bodies, nil)             // geometry: once
//	r, err := system.Solve(ctx, materials, applied)               // any susceptibilities, any field
//	field.Evaluate(field.Sum{applied, r}, values, points, side)   // r is the bodies' own field
//
// Units are natural (package field): g in the unit of p, chi without unit, chi = eps_r - 1 or mu_r - 1; charge in the unit of p
// times length^2. Frame: that of the bodies. Normals point outward. Results are the same bits for any GOMAXPROCS; they are
// immutable and safe for concurrent use.
//
// # Method
//
// A homogeneous body carries induced charge on its boundary only, sigma', and beside that the charge of p0/(1 + chi). With
// e = 1 + chi inside and f beyond, e g.n is continuous but for the fixed part, so that on every part of a boundary
//
//	(e + f)/2 sigma' - (e - f) K' sigma' = (e - f) n.g,   K' sigma = PV int sigma(y) n(x).(x - y)/(4 pi |x - y|^3) dA(y),
//
// with g the field of the sources and of all fixed charge just outside. Panels are pieces of the exact boundary (package
// geom/panel), graded towards edges; the unknowns are the charges of the nodes of a Gauss rule on each, so that the density may
// grow without bound at an edge [Bremer2012]; near a panel the kernel is integrated on pieces halved until none is longer than
// 1.4 times its distance, and on the panel itself by the map of [Duffy1982]. What the rules miss of Gauss's law is taken off
// every column, so that no charge leaks at any contrast. The system is solved by [Saad1986] to 1e-13.
//
// # Accuracy
//
// Three meshes give every number: the values are those of the finest (integrals over it: of what the three tend to), and the
// estimate is what the three let expect, times 3. With the default settings, measured by the tests: sphere 1e-10; ellipsoid
// 1:2:3 1e-9; spherical shell with a wall of 0.02, mu_r = 1e5, 1e-7, its inside included; cube 1e-5 from chi = -1 to +Inf;
// cylinders of length 0.1 to 10 diameters 1e-5 of the magnetometric factor; two spheres of metal 0.001 radii apart 3e-7. The field
// of the result is as good as that off the faces; on a face and near an edge the density counts directly: 1e-7 on a sphere; on
// the faces of a cube 1e-4, 1e-3 at 0.001 of the side from an edge, 5e-3 at 0.0001. Estimates held at all of 14400 points in and
// around a sphere, an ellipsoid, a cube, a cylinder, a cone and a prism with a reentrant edge, with medians of estimate over error
// from 3 to 150; with order 6, whose first mesh has 2 nodes a direction, up to 1300.
// A job of 3200 unknowns takes 4 s on two processors, its field at 10000 points 0.3 s, with estimates 1 s.
//
// # Not covered
//
// Materials that saturate or vary inside a body; anisotropy other than along one axis, and that beyond the affine share of it
// (Material.Axis). Bodies that touch in a part of a face: only whole closed parts may be shared, a core and its coat. Currents
// as sources do well outside bodies, but for a core of high permeability that links a coil, sum and source nearly cancel inside,
// and the field there is good to the estimate in absolute terms only, as is that inside any body of high chi (its p, moment
// and outer field are not affected). Sources inside a body. Meshes of thousands of facets: each takes 9 unknowns or more.
package response
