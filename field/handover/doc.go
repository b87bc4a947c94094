// Package handover writes the equivalent charges of bodies down for other simulators, and reads them back, checked.
//
// A Set holds everything in SI units, lengths in metres, in one right-handed frame. It comes from bound.Assembly by Of, and
// says the same things in three ways, so that a receiver may take what he can use and test it with the rest:
//
//   - facets, flat pieces of charged faces with vertices, outward normal and sigma, and cells, straight-edged hexahedra with
//     rho. On curved faces they are inscribed, and sigma is such that each carries the charge of its piece of the face;
//   - points: the points of a Gauss rule on each face and in each cell, each with its share of the charge. Point charges and
//     dipoles stand as such;
//   - totals: charge, sum of magnitudes, dipole moment, and potential and field of the exact source at three probe points
//     outside, with a measure of how well the points reproduce them.
//
// # Kinds
//
//	electric   charge C, sigma C/m^2, rho C/m^3, moment C m,   V in V,   E in V/m   V = (1/(4 pi epsilon0)) sum q/r
//	magnetic   charge A m, sigma A/m, rho A/m^2, moment A m^2, Vm in A,  H in A/m   Vm = (1/(4 pi)) sum q/r, B = mu0 H outside
//
// with sigma = p.n, n outward, rho = -div p, and sigma the charge trapped on a sheet. Other simulators may want the magnetic
// charge in webers: mu0 times that of the file, with mu0 as it stands there.
//
// # JSON
//
// One object; all keys are required but facets, cells, points and dipoles, no others are known, none may stand twice.
//
//	format       "boundpole equivalent charge"
//	version      1
//	kind         "electric" or "magnetic"
//	convention   the sentence that fixes the signs, as this package writes it
//	units        {"length": "m", "charge": "C", "sigma": "C/m^2", "rho": "C/m^3", "moment": "C m", "potential": "V", "field": "V/m"}
//	constant     {"name": "epsilon0", "unit": "F/m", "value": 8.8541878188e-12}, or mu0 in H/m
//	about        [x, y, z], the point about which the moment counts
//	total        sum of the charges
//	magnitudes   sum of the magnitudes of the charges of the points
//	moment       [x, y, z], of the exact source
//	within       {"moment", "potential", "field"}: greatest difference between the points and the exact source
//	probes       three of {"at": [x, y, z], "potential", "field": [x, y, z]}, of the exact source
//	groups       a list of {"part", "place", "form", "charge", "facets", "cells", "points", "dipoles"}
//
// A group is a face, a cell, a sheet or a source of points (form "face", "cell", "sheet" or "points") of a part; "place" names
// it. Its facets are {"vertices": [[x, y, z], ...], "normal", "sigma", "charge"} with three or four vertices, counter-clockwise
// seen from outside; its cells {"corners": [eight], "rho", "charge"}, with the four corners of the bottom counter-clockwise
// seen from above and then those above them, some of which may coincide; its points [x, y, z, q]; its dipoles
// [x, y, z, px, py, pz]. Where a body is not convex, cells and points may overlap and carry charge of either sign: their sum
// counts. Faces and cells without charge have no group.
//
// # CSV
//
// Lines "# key,values" in a fixed set, a header, and a row for each point; decimal points, commas between columns, LF. There
// are no facets and no cells.
//
//	# format,boundpole equivalent charge,1
//	# kind,electric
//	# convention,...
//	# units,length m,charge C,...
//	# epsilon0[F/m],8.8541878188e-12
//	# about[m],x,y,z
//	# total[C],q
//	# magnitudes[C],q
//	# moment[C m],x,y,z
//	# within moment[C m],p
//	# within potential[V],v
//	# within field[V/m],e
//	# probe[m;V;V/m],x,y,z,potential,x,y,z          three times
//	# group,part,place,form,points,dipoles,charge   once a group
//	x[m],y[m],z[m],charge[C],part,face
//
// If there are dipoles the columns px[C m],py[C m],pz[C m] stand before part, and every row is either a charge or a dipole.
//
// # Reading
//
// Readers take at most 128 MiB and a million points, facets and cells each. They recompute the charge of every group, facet and
// cell, total, magnitudes, moment and the values at the probes, and refuse a set that does not agree to 1e-10 of what is
// summed: a lost row, a wrong unit, a turned sign. Errors name the line or the place and the remedy. Writing is deterministic,
// and reading gives the same bits back.
//
// Sets are values without hidden state, safe for concurrent use while nobody writes to them. The package does not hand over
// fields applied from outside, and it does not read what it has not defined.
package handover
