package geom

import (
	"math"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// outside returns the place of a point off the body.
func outside() Place { return Place{Region: Outside, Face: -1} }

// inside returns the place of a point in the body.
func inside() Place { return Place{Region: Inside, Face: -1} }

// onEdge returns the place of a point with several normals.
func onEdge() Place { return Place{Region: On, Face: -1, Edge: true} }

// beyond reports whether x is farther than tol outside the box, or not finite (tol then is not either). Bodies ask it
// first, so that the products after it neither overflow nor meet a NaN.
func beyond(b r3.Box, x r3.Vec, tol float64) bool {
	return !(tol <= math.MaxFloat64 && x.X >= b.Min.X-tol && x.X <= b.Max.X+tol &&
		x.Y >= b.Min.Y-tol && x.Y <= b.Max.Y+tol &&
		x.Z >= b.Min.Z-tol && x.Z <= b.Max.Z+tol)
}

// extent is what OnTolerance needs to know of bounds.
type extent struct {
	box          r3.Box
	centre, half float64 // distance of the centre from the origin, half diagonal
}

func extentOf(b r3.Box) extent {
	return extent{b, r3.Norm(r3.Scale(0.5, r3.Add(b.Min, b.Max))), r3.Norm(r3.Scale(0.5, r3.Sub(b.Max, b.Min)))}
}

// tolerance is OnTolerance.
func (e *extent) tolerance(x r3.Vec, slack float64) float64 {
	return slack + 4*0x1p-53*(r3.Norm(x)+e.centre+e.half)
}

// meet tells where a point lies from its signed distances (positive outside, -Inf for none) to faces that meet at
// right angles: the region, and for On the one distance that is within tol, -1 if several are.
func meet(d [3]float64, tol float64) (Region, int) {
	out, near, count := 0.0, -1, 0
	for i, v := range d {
		if v > 0 {
			out = math.Hypot(out, v)
		}
		if v >= -tol {
			near = i
			count++
		}
	}
	switch {
	case !(out <= tol):
		return Outside, -1
	case count == 0:
		return Inside, -1
	case count == 1:
		return On, near
	}
	return On, -1
}

// aboveRound returns the distance of a point outside a circle or sphere of radius a, negative inside, from the square
// q of its distance from the centre. The difference q - a^2 is taken in pairs, so no digit is lost at the surface.
func aboveRound(q pair.Float, a float64) float64 {
	return q.Sub(pair.Product(a, a)).Value() / (math.Sqrt(q.Hi) + a)
}

// above returns |z| - half in pairs: the distance beyond the ends of a body symmetric in z.
func above(z pair.Float, half float64) float64 { return z.Abs().AddFloat(-half).Value() }

// radial returns the unit vector of x away from the z axis.
func radial(x r3.Vec) r3.Vec {
	s := math.Hypot(x.X, x.Y)
	return r3.Vec{X: x.X / s, Y: x.Y / s}
}

// along returns the unit vector along z with the sign of s.
func along(s float64) r3.Vec { return r3.Vec{Z: math.Copysign(1, s)} }
