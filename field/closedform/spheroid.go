package closedform

import "math"

// ProlateFactors returns the demagnetizing factors of a prolate spheroid with the ratio
// m = long/short of its axes: along the long axis
// (m log(m + sqrt(m^2-1))/sqrt(m^2-1) - 1)/(m^2-1), and across it half of the rest.
//
// Units: none.
// Frame: any; long is the axis of revolution.
// Domain: m finite, m >= 1, up to 1e150. NaN otherwise.
// Singular: nowhere; 1/3 at m = 1, where the logarithmic form cancels and the series in the
// eccentricity (1-e^2) sum e^(2k)/(2k+3) is used.
// Accuracy: relative error <= 1e-14 (worst 2.9e-15 of 57 points, TestReference).
// Source: [Osborn1945], [Stoner1945].
func ProlateFactors(m float64) (long, short float64) {
	if !(m >= 1 && m <= 1e150) {
		return math.NaN(), math.NaN()
	}
	f2 := (m - 1) * (m + 1)
	if m < 1.05 {
		long = spheroidSeries(f2/m/m) / (m * m)
	} else {
		long = (m*(math.Acosh(m)/math.Sqrt(f2)) - 1) / f2
	}
	return long, (1 - long) / 2
}

// OblateFactors returns the demagnetizing factors of an oblate spheroid with the ratio
// m = long/short of its axes: along the short axis
// (m^2/(m^2-1)) (1 - asin(sqrt(m^2-1)/m)/sqrt(m^2-1)), and along a long one half of the rest.
//
// Units: none.
// Frame: any; short is the axis of revolution.
// Domain: m finite, m >= 1, up to 1e150. NaN otherwise.
// Singular: nowhere; 1/3 at m = 1, where the arcsine form cancels and the series
// (1+f^2) sum (-f^2)^k/(2k+3), f^2 = m^2-1, is used.
// Accuracy: relative error <= 1e-14 (worst 2.9e-15 of 57 points, TestReference).
// Source: [Osborn1945], [Stoner1945]; the arcsine is atan(f), which keeps its digits.
func OblateFactors(m float64) (long, short float64) {
	if !(m >= 1 && m <= 1e150) {
		return math.NaN(), math.NaN()
	}
	f2 := (m - 1) * (m + 1)
	if f2 < 0.1 {
		short = m * m * spheroidSeries(-f2)
		return (1 - short) / 2, short
	}
	f := math.Sqrt(f2)
	short = m / f * (m / f) * (1 - math.Atan(f)/f)
	long = (m/f*(m/f)*math.Atan(f) - 1/f) / f / 2
	return long, short
}

// spheroidSeries returns sum over k >= 0 of q^k/(2k+3), |q| <= 0.1: 18 terms.
func spheroidSeries(q float64) float64 {
	s := 0.0
	for k := 17; k >= 0; k-- {
		s = 1/float64(2*k+3) + q*s
	}
	return s
}
