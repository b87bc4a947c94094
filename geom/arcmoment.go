package geom

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// The radius and the azimuth of a point of an arc, taken at random by volume, are independent. With m the mean of the
// radii, d half their difference, t the angle of the arc and the azimuth counted from its middle,
//
//	E r = m + d^2/(3m),  E r^2 = m^2 + d^2,  Var r = d^2/3 (1 - d^2/(3m^2))
//	E cos = sin(t/2)/(t/2),  E sin^2 = 1/2 - sin t/(2t),  Var cos = 1/2 + sin t/(2t) - 2 (1 - cos t)/t^2
//
// The last two cancel for small t and are summed as series; up to t = 2 pi the largest term is 8 times the sum.

// spread returns E sin^2 and Var cos of an azimuth that is spread evenly over the angle t.
func spread(t float64) (sin2, varCos float64) {
	term := 1.0                 // t^2k/(2k+1)!
	for k := 1.0; k < 26; k++ { // (2 pi)^50/51! = 5e-27
		term *= -t * t / (2 * k * (2*k + 1))
		sin2 -= term / 2
		varCos += term * (k - 1) / (2*k + 2)
	}
	return sin2, varCos
}

// radii returns E r, E r^2 and Var r.
func (a Arc) radii() (mean, square, variance float64) {
	m, d := (a.Outer+a.Inner)/2, (a.Outer-a.Inner)/2
	return m + d/m*d/3, m*m + d*d, d * d / 3 * (1 - d/m*d/m/3)
}

// Centroid returns the centre of volume: on the line to the middle of the arc, at the distance E r E cos.
func (a Arc) Centroid() r3.Vec {
	if a.Full() {
		return r3.Vec{}
	}
	half := a.Angle() / 2
	r, _, _ := a.radii()
	r *= math.Sin(half) / half
	e := a.span().middle()
	return r3.Vec{X: r * e.cos, Y: r * e.sin}
}

// SecondMoment returns the second moment about the centroid: V (Var r E cos^2 + (E r)^2 Var cos) along the line to the
// middle of the arc, V E r^2 E sin^2 across it, and V h^2/12 along the axis.
func (a Arc) SecondMoment() (m [3][3]float64) {
	if a.Full() {
		return a.Tube().SecondMoment()
	}
	v := a.Volume()
	r, square, variance := a.radii()
	sin2, varCos := spread(a.Angle())
	out, side := v*(variance*(1-sin2)+r*r*varCos), v*square*sin2
	e := a.span().middle()
	m[0][0] = out*e.cos*e.cos + side*e.sin*e.sin
	m[1][1] = out*e.sin*e.sin + side*e.cos*e.cos
	m[0][1] = (out - side) * e.cos * e.sin
	m[1][0] = m[0][1]
	m[2][2] = v * a.Height * a.Height / 12
	return m
}
