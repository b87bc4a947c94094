package closedform

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

const fourPi = 4 * math.Pi

// finite reports whether no value is NaN or infinite.
func finite(v ...float64) bool {
	for _, x := range v {
		if math.IsNaN(x - x) {
			return false
		}
	}
	return true
}

// positive reports whether every value is finite and greater than zero.
func positive(v ...float64) bool {
	for _, x := range v {
		if !(x > 0) {
			return false
		}
	}
	return finite(v...)
}

// finiteVec reports whether every component of every vector is finite.
func finiteVec(v ...r3.Vec) bool {
	for _, x := range v {
		if !finite(x.X, x.Y, x.Z) {
			return false
		}
	}
	return true
}

// nanVec returns a vector of three NaN.
func nanVec() r3.Vec {
	nan := math.NaN()
	return r3.Vec{X: nan, Y: nan, Z: nan}
}

// sign returns -1, 0 or 1.
func sign(x float64) float64 {
	switch {
	case x > 0:
		return 1
	case x < 0:
		return -1
	}
	return 0
}

// contrast returns (eps-1)/(eps+k), and its limit 1 at eps = +Inf.
func contrast(eps, k float64) float64 {
	if math.IsInf(eps, 1) {
		return 1
	}
	return (eps - 1) / (eps + k)
}

// norm returns |x| without overflow of the squares.
func norm(x r3.Vec) float64 {
	return math.Hypot(math.Hypot(x.X, x.Y), x.Z)
}
