// Package cubature integrates charge numerically over curved faces (geom.Chart) and curved cells (geom.Block): potential,
// field and gradient anywhere, near, on and far from the charge, each with an estimate of its error.
//
// NewLayer and NewVolume make sources of a density that is a function of the place. They are used on their own or by bound.Of
// where no closed form exists. The one-dimensional tools they stand on are exported: Legendre, Pieces, TanhSinh.
//
// Units are natural (package field): g in the unit of the density times length for volumes, of the density for layers. Frame:
// that of the charts or blocks. Normals: a chart's own, xu x xv; Reversed turns it. Densities are called from many goroutines
// at once and must give the same value each time. Sources are immutable once built and safe for concurrent use, allocate
// nothing when evaluated, and give the same bits in a batch as point by point.
//
// Every integral is taken by two rules that share neither points nor, where an interval is cut, cuts, and the estimate is ten
// times their difference, with the rounding of the sum and what the rounding of the chart itself does beside an edge. A density that is not smooth is cut
// into panels when the source is built; what stays unresolved there enters every estimate.
//
// What float64 parameters cannot say is in the estimate too: an edge, or a seam where charts meet, is placed by a few u of its
// coordinates, and near a side at parameter 1 a chart has steps of u where near 0 it has none. A chart with a tip does best
// with the tip at parameter 0.
//
// Facets is the exception to all this: the polynomial charge of a body with plane faces, whose integrals are known.
//
// The package does not know which charge a body has.
package cubature
