package geom

import (
	"errors"
	"fmt"
	"math"

	"gonum.org/v1/gonum/num/dual"
	"gonum.org/v1/gonum/spatial/r3"
)

// Patch is a caller's piece of surface: the image of the unit square under a smooth function. Its normal is along the cross
// product of the derivatives by u and v; it may vanish on a side of the square that is drawn together into a point.
//
// A piece of a turn about an axis is best kept to a quarter, by Parts or by several patches. The functions are called
// from several goroutines at once.
type Patch struct {
	Point    func(u, v float64) r3.Vec          // for 0 <= u, v <= 1
	Tangents func(u, v float64) (xu, xv r3.Vec) // derivatives of Point by u and v; nil for differences, good to 1e-12
	Parts    [2]int                             // into how many charts the square is cut along u and v; 0 counts as 1
}

// DualPatch returns the patch of a function of dual numbers, from which its derivatives follow exactly.
func DualPatch(point func(u, v dual.Number) (x, y, z dual.Number)) Patch {
	along := func(u, v dual.Number) (x, d r3.Vec) {
		a, b, c := point(u, v)
		return r3.Vec{X: a.Real, Y: b.Real, Z: c.Real}, r3.Vec{X: a.Emag, Y: b.Emag, Z: c.Emag}
	}
	return Patch{
		Point: func(u, v float64) r3.Vec {
			x, _ := along(dual.Number{Real: u}, dual.Number{Real: v})
			return x
		},
		Tangents: func(u, v float64) (xu, xv r3.Vec) {
			_, xu = along(dual.Number{Real: u, Emag: 1}, dual.Number{Real: v})
			_, xv = along(dual.Number{Real: u}, dual.Number{Real: v, Emag: 1})
			return xu, xv
		},
	}
}

// Check refuses a patch without a function, points and derivatives that are not finite or out of range, derivatives that
// do not belong to the points, and places inside where the patch has no normal.
func (p Patch) Check() error {
	if p.Point == nil {
		return errors.New("geom: patch has no function Point; give one")
	}
	if p.Parts[0] < 0 || p.Parts[1] < 0 {
		return fmt.Errorf("geom: patch has parts %v; give positive numbers or 0 for one", p.Parts)
	}
	difference := Patch{Point: p.Point}
	for _, at := range chartSamples {
		u, v := at[0], at[1]
		x := p.Point(u, v)
		for i, c := range [3]float64{x.X, x.Y, x.Z} {
			if err := checkCoordinate(fmt.Sprintf("patch point at (%v, %v) coordinate %c", u, v, 'x'+i), c); err != nil {
				return err
			}
		}
		xu, xv := p.tangents(u, v)
		if !finite(xu) || !finite(xv) {
			return fmt.Errorf("geom: patch has the derivatives %v and %v at (%v, %v); give a function smooth on the whole square", xu, xv, u, v)
		}
		du, dv := difference.tangents(u, v)
		if off, size := r3.Norm(r3.Sub(xu, du))+r3.Norm(r3.Sub(xv, dv)), r3.Norm(du)+r3.Norm(dv); off > 1e-6*size {
			return fmt.Errorf("geom: patch has the derivatives %v and %v at (%v, %v), differences give %v and %v; correct Tangents or leave it out", xu, xv, u, v, du, dv)
		}
		if inner(u) && inner(v) && r3.Norm(r3.Cross(xu, xv)) <= 1e-12*r3.Norm(xu)*r3.Norm(xv) {
			return fmt.Errorf("geom: patch has no normal at (%v, %v), where its derivatives are %v and %v; cut it there", u, v, xu, xv)
		}
	}
	return nil
}

// inner reports whether a parameter is off the sides of the square.
func inner(t float64) bool { return t > 0 && t < 1 }

// chartSamples are the parameters where a patch is tried.
var chartSamples = [...][2]float64{
	{0, 0}, {0.5, 0}, {1, 0}, {0, 0.5}, {1, 0.5}, {0, 1}, {0.5, 1}, {1, 1},
	{0.5, 0.5}, {0.21, 0.33}, {0.78, 0.29}, {0.32, 0.81}, {0.69, 0.74}, {0.03, 0.52}, {0.48, 0.97},
}

// tangents returns the derivatives by u and v.
func (p Patch) tangents(u, v float64) (xu, xv r3.Vec) {
	if p.Tangents != nil {
		return p.Tangents(u, v)
	}
	return slope(func(t float64) r3.Vec { return p.Point(t, v) }, u), slope(func(t float64) r3.Vec { return p.Point(u, t) }, v)
}

// slopePoints is the number of points of a difference formula, slopeWidth the part of the unit interval that they take.
const (
	slopePoints = 14
	slopeWidth  = 0.25
)

// slope returns the derivative at t of a function on the unit interval: that of the polynomial through the Chebyshev points
// of a window about t, which lies within the interval.
//
// For a whole turn over the interval the polynomial is off by (pi/4)^14/(2^13 14!) = 5e-17, its derivative by some 1e-13
// of the whole; rounding adds at most 14^2 u/(slopeWidth/2) = 2e-13, and a hundredth of that away from the ends.
func slope(f func(t float64) r3.Vec, t float64) r3.Vec {
	start := min(max(t-slopeWidth/2, 0), 1-slopeWidth)
	s := (t-start)/(slopeWidth/2) - 1
	weights := slopeWeights(s)
	at := func(j int) r3.Vec {
		return f(start + slopeWidth/2*(1+math.Cos(math.Pi*(float64(j)+0.5)/slopePoints)))
	}
	middle := at(slopePoints / 2) // taken off before the sum, so that a place far from the origin costs no more digits
	var sum r3.Vec
	for j, w := range weights {
		if j != slopePoints/2 {
			sum = r3.Add(sum, r3.Scale(w, r3.Sub(at(j), middle)))
		}
	}
	return r3.Scale(2/slopeWidth, sum)
}

// slopeWeights returns the weights of values at the Chebyshev points of [-1, 1] in the derivative at s:
// 2/n sum over k of k U_(k-1)(s) T_k(point), since T_k' = k U_(k-1).
func slopeWeights(s float64) (weights [slopePoints]float64) {
	for j := range weights {
		point := math.Cos(math.Pi * (float64(j) + 0.5) / slopePoints)
		before, t := 1.0, point
		under, u := 0.0, 1.0
		for k := 1; k < slopePoints; k++ {
			weights[j] += 2.0 / slopePoints * float64(k) * u * t
			before, t = t, 2*point*t-before
			under, u = u, 2*s*u-under
		}
	}
	return weights
}

// patchChart is a part of a patch.
type patchChart struct {
	patch          Patch
	u0, v0, du, dv float64
}

// At returns the point and its derivatives.
func (c patchChart) At(u, v float64) (x, xu, xv r3.Vec) {
	u, v = c.u0+u*c.du, c.v0+v*c.dv
	xu, xv = c.patch.tangents(u, v)
	return c.patch.Point(u, v), r3.Scale(c.du, xu), r3.Scale(c.dv, xv)
}

// Charts returns the parts of the patch.
func (p Patch) Charts() []Chart {
	n, m := max(p.Parts[0], 1), max(p.Parts[1], 1)
	charts := make([]Chart, 0, n*m)
	for i := range n {
		for j := range m {
			u0, v0 := float64(i)/float64(n), float64(j)/float64(m)
			charts = append(charts, patchChart{p, u0, v0, float64(i+1)/float64(n) - u0, float64(j+1)/float64(m) - v0})
		}
	}
	return charts
}

// Area returns the area by quadrature.
func (p Patch) Area() float64 {
	area := 0.0
	p.Nodes(16, func(_, _ r3.Vec, weight float64) { area += weight })
	return area
}

// Bounds returns a box along the axes that contains the patch. It is found from points on a grid and is wider than the
// patch by about the square of their spacing.
func (p Patch) Bounds() r3.Box {
	box := nothing()
	for _, c := range p.Charts() {
		part := sampleChart(c).box
		box = include(include(box, part.Min), part.Max)
	}
	return box
}

// Nodes visits the points of product Gauss rules on the charts, with ten points more than n a direction: there quarter
// turns are exact to rounding.
func (p Patch) Nodes(n int, visit func(x, normal r3.Vec, weight float64)) {
	rule := legendre(max(n, 1)+10, 0, 1)
	for _, c := range p.Charts() {
		for _, u := range rule {
			for _, v := range rule {
				x, xu, xv := c.At(u.x, v.x)
				area := r3.Cross(xu, xv)
				a := r3.Norm(area)
				visit(x, r3.Scale(1/a, area), a*u.w*v.w)
			}
		}
	}
}
