package closedform

import "math"

// SlantedEnd returns the surface density p cos(tilt) of the end face of a straight bar,
// polarized along its length by p, whose end is cut at the angle tilt from the square
// cut, the area A/cos(tilt) of that face, and its charge p A, which is independent of
// the tilt.
//
// Units: density as p, area as section, charge as p times section.
// Frame: any; section is the area A across the bar.
// Domain: section > 0, |tilt| < pi/2, all finite. NaN otherwise.
// Singular: the face area grows without bound as |tilt| approaches pi/2.
// Accuracy: relative error <= 1e-15 (worst 1.2e-16 of 3 points, TestReference).
// Source: [Griffiths2013] section 4.2.1 (the obliquely cut tube).
func SlantedEnd(p, section, tilt float64) (density, area, charge float64) {
	if !finite(p) || !positive(section) || !(math.Abs(tilt) < math.Pi/2) {
		return math.NaN(), math.NaN(), math.NaN()
	}
	c := math.Cos(tilt)
	return p * c, section / c, p * section
}

// ContactPull returns p^2 A/2, the attraction over the area A of two long bars that meet
// with opposite poles, or of one long bar on a plate of infinite permeability. With
// p = Br/mu0 and times mu0 it is Br^2 A/(2 mu0).
//
// Units: p squared times area (times mu0, or over eps0).
// Frame: any; a magnitude.
// Domain: area > 0, all finite. NaN otherwise.
// Singular: nowhere.
// Accuracy: relative error <= 1e-15 (worst 0 of 2 points, TestReference).
// Source: [Maxwell1873] vol. 2 art. 642 (tension p^2/2 of the full induction p); limit
// d -> 0 of DiscPairForce.
func ContactPull(p, area float64) float64 {
	if !finite(p) || !positive(area) {
		return math.NaN()
	}
	return p * p / 2 * area
}
