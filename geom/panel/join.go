package panel

import (
	"math"

	"gonum.org/v1/gonum/spatial/r3"
)

// meet is how near corners of charts must be to count as one point, in units of the size of the body.
const meet = 1e-9

// markPlanes finds the charts whose face is plane, from the points of their grid of 3 x 3 and the normal in the middle.
func markPlanes(whole []*Panel, size float64) {
	flat := map[int]bool{}
	origin, normal := map[int]r3.Vec{}, map[int]r3.Vec{}
	for _, p := range whole {
		if _, ok := flat[p.Face]; !ok {
			x, xs, xt := p.At(0.5, 0.5)
			flat[p.Face], origin[p.Face], normal[p.Face] = true, x, r3.Unit(r3.Cross(xs, xt))
		}
		for k := range 9 {
			d := r3.Sub(p.Point(float64(k%3)/2, float64(k/3)/2), origin[p.Face])
			if math.Abs(r3.Dot(d, normal[p.Face])) > 1e-13*size {
				flat[p.Face] = false
			}
		}
	}
	for _, p := range whole {
		p.Plane = flat[p.Face]
	}
}

// join numbers the connected parts of the boundary: charts that have a corner in common belong together.
func join(whole []*Panel, size float64) {
	parent := make([]int, len(whole))
	for k := range parent {
		parent[k] = k
	}
	root := func(k int) int {
		for parent[k] != k {
			k = parent[k]
		}
		return k
	}
	cells := map[[3]int][]int{} // a corner stands in every cell that it may share with one as near as meet
	corners := make([][4]r3.Vec, len(whole))
	for k, p := range whole {
		for c := range 4 {
			x := p.Point(float64(c%2), float64(c/2))
			corners[k][c] = x
			for _, cell := range around(x, 8*meet*size) {
				for _, other := range cells[cell] {
					if near(&corners[other], x, meet*size) {
						parent[root(k)] = root(other)
					}
				}
				cells[cell] = append(cells[cell], k)
			}
		}
	}
	number := map[int]int{}
	for k, p := range whole {
		r := root(k)
		if _, ok := number[r]; !ok {
			number[r] = len(number)
		}
		p.Part = number[r]
	}
}

// near reports whether one of the corners is within the distance of x.
func near(corners *[4]r3.Vec, x r3.Vec, distance float64) bool {
	for _, c := range corners {
		if r3.Norm(r3.Sub(c, x)) <= distance {
			return true
		}
	}
	return false
}

// around returns the cells of a grid that points within an eighth of the step of x may lie in.
func around(x r3.Vec, step float64) [][3]int {
	cells := [][3]int{{}}
	for axis, c := range [3]float64{x.X, x.Y, x.Z} {
		low, high := int(math.Floor(c/step-0.125)), int(math.Floor(c/step+0.125))
		n := len(cells)
		for k := range n {
			cells[k][axis] = low
			if high != low {
				other := cells[k]
				other[axis] = high
				cells = append(cells, other)
			}
		}
	}
	return cells
}
