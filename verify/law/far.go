package law

import (
	"fmt"
	"math"

	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

// outer rules: on a sphere of at least 2.5 bounding radii the term of degree l is at most (l+1) 0.4^l of the field.
const (
	outerCoarse, outerFine = 18, 24
	outerBound             = 2e-13 // (2n+1) 0.4^(2n) for n = outerCoarse
)

// farField measures the power with which |g| falls, and holds phi far away against g.
//
// The mean of |g|^2 over a sphere is a sum of terms R^(-2l-4) without mixed ones (the terms of different degree are
// orthogonal), so that the power measured between R and 2R is off by c (a/R)^2, and one Richardson step leaves (a/R)^4.
func (k *kit) farField() {
	const first = 8
	axes := k.axes()
	size := func(e int) float64 { // root mean square of |g| at R = 2^e a
		r := math.Ldexp(k.size, e)
		var x []r3.Vec
		rule := sphere(6, axes) // beyond degree 6 nothing is left: (1/256)^6 = 4e-15
		for _, p := range rule {
			x = append(x, r3.Add(k.centre, r3.Scale(r, p.n)))
		}
		v := k.values(x, field.WantG, field.Mean)
		sum := 0.0
		for i, p := range rule {
			sum = math.Hypot(sum, math.Sqrt(p.w)*r3.Norm(v.At(i).G))
		}
		return sum
	}
	a, b, c := size(first), size(first+1), size(first+2)
	k.order = max(2, float64(k.Order))
	if a == 0 && b == 0 && c == 0 {
		return // no field outside: nothing to measure
	}
	p, q := math.Log2(a/b), math.Log2(b/c)
	power := (4*q - p) / 3
	want, law := float64(k.Order), "claimed"
	if k.Order == 0 {
		want, law = max(2, math.Round(power)), "nearest integer from 2"
		if math.IsNaN(power) {
			want = 2
		}
		k.order = want
	}
	tol := 1e-4 + 8*k.Accuracy // log2 amplifies the accuracy of two values by 1/ln 2, Richardson by 5/3
	k.near(Decay, []r3.Vec{k.centre}, power, want, tol,
		fmt.Sprintf("%s; powers %.8g and %.8g from R = %d to %d bounding radii, Richardson", law, p, q, 1<<first, 1<<(first+2)))
	if k.phi {
		k.vanishes()
	}
}

// vanishes holds phi far away against the leading term, R g.n/(order-1).
func (k *kit) vanishes() {
	const e = 16
	r := math.Ldexp(k.size, e)
	for range 4 {
		n := k.direction()
		x := r3.Add(k.centre, r3.Scale(r, n))
		v := k.values([]r3.Vec{x}, field.WantPhi|field.WantG, field.Mean).At(0)
		scale := r * max(r3.Norm(v.G), 1e3*k.floor(x))
		k.near(Vanishes, []r3.Vec{x}, v.Phi, r*r3.Dot(v.G, n)/(k.order-1), (16*math.Ldexp(1, -e)+2*k.Accuracy)*scale,
			fmt.Sprintf("R g.n/(order-1) with order %g at R = 2^%d bounding radii a; terms of relative size a/R left out", k.order, e))
	}
}

// enclosed holds flux and moment through spheres round all the charge against the claims, or against each other.
func (k *kit) enclosed() {
	type total struct {
		q, tolQ float64
		m       r3.Vec
		tolM    float64
	}
	measure := func(factor float64) total {
		axes, r := k.axes(), factor*k.size
		b := ball{k.centre, r}
		few, many := k.over(b, sphere(outerCoarse, axes)), k.over(b, sphere(outerFine, axes))
		scale := max(many.largest, k.floor(r3.Add(k.centre, r3.Vec{X: r})))
		area, acc := 4*math.Pi*r*r, (k.Accuracy+rounding(b))*scale
		return total{
			q: area * many.normal, tolQ: area * (acc + min(math.Abs(many.normal-few.normal), outerBound*scale)),
			m:    r3.Scale(1.5*r*area, many.radial),
			tolM: 1.5 * r * area * (acc + min(r3.Norm(r3.Sub(many.radial, few.radial)), outerBound*scale)),
		}
	}
	x := []r3.Vec{k.centre}
	inner, outer := measure(2.5), measure(5)
	why := func(what string) string {
		return fmt.Sprintf("accuracy %.3g of |g| times area, two Gauss rules; %s", k.Accuracy, what)
	}
	spheres := fmt.Sprintf("spheres of radius %.17g and %.17g", 2.5*k.size, 5*k.size)
	k.near(Charge, x, inner.q, outer.q, inner.tolQ+outer.tolQ, why(spheres))
	k.nearVec(Moment, x, inner.m, outer.m, inner.tolM+outer.tolM, why(spheres))
	if k.Total == nil {
		return
	}
	k.near(Charge, x, inner.q, k.Total.Charge, inner.tolQ+k.Accuracy*math.Abs(k.Total.Charge), why(spheres+", the first against the claim"))
	if k.Total.Moment == nil {
		return
	}
	want := r3.Add(*k.Total.Moment, r3.Scale(k.Total.Charge, r3.Sub(k.Total.About, k.centre)))
	k.nearVec(Moment, x, inner.m, want, inner.tolM+k.Accuracy*r3.Norm(want), why(spheres+", the first against the claim, about the centre"))
}

// largeLoops holds the circulation round circles that surround all the charge against zero.
func (k *kit) largeLoops() {
	for i := range 8 {
		b := ball{k.centre, k.size * (2 + float64(i)*k.rng.Float64())}
		// the term of degree l is at most (l+1) 2^-l: 97 2^-96 is nothing
		k.loop(b, k.axes(), 96, 128, 1e-26, k.floor(r3.Add(k.centre, r3.Vec{X: b.radius})))
	}
}

// paths holds phi against g along straight lines between empty places, through no charge.
func (k *kit) paths() {
	if !k.phi {
		return
	}
	d := r3.Sub(k.Region.Max, k.Region.Min)
	for range k.Samples {
		from := r3.Add(k.Region.Min, r3.Vec{X: d.X * k.rng.Float64(), Y: d.Y * k.rng.Float64(), Z: d.Z * k.rng.Float64()})
		to := k.around(1.5 * math.Exp2(3*k.rng.Float64()))
		path, ok := k.walk(from, to)
		if !ok {
			continue
		}
		v := k.values(path, field.WantPhi|field.WantG, field.Mean)
		tol := 2 * k.Accuracy * (k.phiFloor(from) + k.phiFloor(to) + math.Abs(v.Phi[0]) + math.Abs(v.Phi[len(path)-1]))
		for i := range path[1:] {
			g := max(r3.Norm(v.At(i).G), r3.Norm(v.At(i+1).G), k.floor(path[i]))
			tol += 2 * k.Accuracy * g * r3.Norm(r3.Sub(path[i+1], path[i]))
		}
		k.along(path, tol, fmt.Sprintf("accuracy %.3g of phi at the ends and of |g| along the line, %d legs of Gauss", k.Accuracy, len(path)-1))
	}
}

// walk returns the way from a to b in legs of half the distance from charge at their start; ok is false if it meets any.
func (k *kit) walk(a, b r3.Vec) (path []r3.Vec, ok bool) {
	const most = 200
	path = []r3.Vec{a}
	for range most {
		at := path[len(path)-1]
		left := r3.Norm(r3.Sub(b, at))
		c := k.clear(at)
		if c < 1e-3*k.size {
			return nil, false
		}
		if c/2 >= left {
			return append(path, b), true
		}
		path = append(path, r3.Add(at, r3.Scale(c/2/left, r3.Sub(b, at))))
	}
	return nil, false
}
