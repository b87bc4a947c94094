package element

import (
	"math"

	"example.com/boundpole/field/internal/logatan"
)

// segment is a straight line of charge of unit density seen from a point: t counts along it from the foot of the point,
// w2 is the squared distance of its line. The length is given apart, so that short ones keep their digits.
type segment struct{ t0, t1, length, w2, r0, r1 float64 }

// log returns the integral of dt/R.
func (s *segment) log() float64 {
	switch {
	case s.w2 == 0 && s.t0*s.t1 <= 0:
		return 0 // on the segment: the factor of the logarithm vanishes
	case s.t0 >= 0:
		return logatan.Log1pRatio(s.length*(1+(s.t0+s.t1)/(s.r0+s.r1)), s.r0+s.t0)
	case s.t1 <= 0:
		return logatan.Log1pRatio(s.length*(1-(s.t0+s.t1)/(s.r0+s.r1)), s.r1-s.t1)
	case s.w2 > s.length*s.length: // short: the product below would be close to w2
		return logatan.Log1pRatio(2*s.length, s.r0+s.r1-s.length)
	}
	return logatan.LogRatio((s.r1+s.t1)*(s.r0-s.t0), s.w2)
}

// cube returns the integral of dt/R^3, without cancellation beyond the ends.
func (s *segment) cube() float64 {
	if s.t0*s.t1 > 0 {
		return s.length * (s.t1 + s.t0) / (s.r0 * s.r1 * (s.t1*s.r0 + s.t0*s.r1))
	}
	return (s.t1*s.r0 - s.t0*s.r1) / (s.r0 * s.r1 * s.w2)
}

// rise returns R1 - R0.
func (s *segment) rise() float64 { return s.length * (s.t0 + s.t1) / (s.r0 + s.r1) }

// inverse returns 1/R1 - 1/R0.
func (s *segment) inverse() float64 { return -s.rise() / (s.r0 * s.r1) }

// square returns the integral of R dt.
func (s *segment) square(log float64) float64 { return 0.5 * (s.t1*s.r1 - s.t0*s.r0 + s.w2*log) }

// angle returns the integral of d/(R (R + h)) dt with w2 = d^2 + h^2, h >= 0.
func (s *segment) angle(d, h float64) float64 {
	if d == 0 {
		return 0
	}
	return math.Atan2(d*s.t1, s.w2+h*s.r1) - math.Atan2(d*s.t0, s.w2+h*s.r0)
}
