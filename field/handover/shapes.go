package handover

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// area returns the area of a polygon times its unit normal.
func area(x []r3.Vec) r3.Vec {
	var n r3.Vec
	for k := 1; k+1 < len(x); k++ {
		n = r3.Add(n, r3.Cross(r3.Sub(x[k], x[0]), r3.Sub(x[k+1], x[0])))
	}
	return r3.Scale(0.5, n)
}

// trilinear returns the point of a hexahedron at parameters 0 <= t <= 1 and its derivatives by them.
func trilinear(corners *[8]r3.Vec, t [3]float64) (x, xu, xv, xw r3.Vec) {
	for i, c := range cube {
		var f, d [3]float64
		for k := range f {
			f[k], d[k] = 1-t[k], -1
			if c[k] == 1 {
				f[k], d[k] = t[k], 1
			}
		}
		x = r3.Add(x, r3.Scale(f[0]*f[1]*f[2], corners[i]))
		xu = r3.Add(xu, r3.Scale(d[0]*f[1]*f[2], corners[i]))
		xv = r3.Add(xv, r3.Scale(f[0]*d[1]*f[2], corners[i]))
		xw = r3.Add(xw, r3.Scale(f[0]*f[1]*d[2], corners[i]))
	}
	return x, xu, xv, xw
}

// volume returns the signed volume of a hexahedron, by the rule of two points a direction: the determinant is of degree 2 in
// each parameter. Corners count from the first one, so that places far from the origin lose nothing.
func volume(corners *[8]r3.Vec) float64 {
	var local [8]r3.Vec
	for i, c := range corners {
		local[i] = r3.Sub(c, corners[0])
	}
	half := 0.5 / math.Sqrt(3)
	var v float64
	for _, t := range cube {
		for k := range t {
			t[k] = 0.5 + (2*t[k]-1)*half
		}
		_, xu, xv, xw := trilinear(&local, t)
		v += r3.Dot(r3.Cross(xu, xv), xw) / 8
	}
	return v
}

// larger returns the larger of a and |x|; NaN counts as the largest.
func larger(a, x float64) float64 {
	if x = math.Abs(x); !(x <= a) {
		return x
	}
	return a
}
