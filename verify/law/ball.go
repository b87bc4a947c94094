package law

import (
	"fmt"
	"math"

	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

// means are integrals of g and phi over a sphere, divided by its area.
type means struct {
	g       r3.Vec
	normal  float64       // of g.n
	radial  r3.Vec        // of (g.n) n
	tensor  [3][3]float64 // of g_i n_j
	phi     float64
	largest float64 // |g|
	phiMax  float64
}

// over evaluates the source on a sphere.
func (k *kit) over(b ball, rule []node) means {
	x := make([]r3.Vec, len(rule))
	for i, p := range rule {
		x[i] = r3.Add(b.x, r3.Scale(b.radius, p.n))
	}
	v := k.values(x, field.WantPhi|field.WantG, field.Mean)
	var m means
	for i, p := range rule {
		y := v.At(i)
		k.regular(x[i], y, k.phi)
		m.g = r3.Add(m.g, r3.Scale(p.w, y.G))
		m.normal += p.w * r3.Dot(y.G, p.n)
		m.radial = r3.Add(m.radial, r3.Scale(p.w*r3.Dot(y.G, p.n), p.n))
		for r, gr := range [3]float64{y.G.X, y.G.Y, y.G.Z} {
			for c, nc := range [3]float64{p.n.X, p.n.Y, p.n.Z} {
				m.tensor[r][c] += p.w * gr * nc
			}
		}
		m.phi += p.w * y.Phi
		m.largest = max(m.largest, r3.Norm(y.G))
		m.phiMax = max(m.phiMax, math.Abs(y.Phi))
	}
	return m
}

// regular holds a value at a point away from all charge against its status.
func (k *kit) regular(x r3.Vec, v field.Value, phi bool) {
	finite := !math.IsNaN(r3.Norm(v.G)) && !math.IsInf(r3.Norm(v.G), 0)
	if phi {
		finite = finite && !math.IsNaN(v.Phi) && !math.IsInf(v.Phi, 0)
	}
	wrong := v.Status != field.Regular && (v.Status != field.NoPotential || phi)
	if !finite || wrong {
		k.fail(Finite, []r3.Vec{x}, fmt.Sprintf("g %s, phi %v, status %v", digits(v.G), v.Phi, v.Status), "finite values and the status regular",
			"none (the claims put no charge here)")
	}
}

// ball checks the laws that hold within an empty ball.
func (k *kit) ball(b ball) {
	axes := k.axes()
	few, many := k.over(b, sphere(coarse, axes)), k.over(b, sphere(fine, axes))
	at := k.values([]r3.Vec{b.x}, field.WantPhi|field.WantG|field.WantGrad|field.WantErr, field.Mean).At(0)
	k.regular(b.x, at, k.phi)
	x := []r3.Vec{b.x}
	scale := max(many.largest, k.floor(b.x))
	base := (k.Accuracy + rounding(b)) * scale
	tol := func(d float64) float64 { return base + min(math.Abs(d), ballBound*scale) }
	why := fmt.Sprintf("accuracy %.3g of |g| = %.3g, rounded points, two Gauss rules; ball of radius %.17g", k.Accuracy, scale, b.radius)

	k.near(Divergence, x, many.normal, 0, tol(many.normal-few.normal), "flux over area: "+why)
	k.nearVec(Harmonic, x, at.G, many.g, 2*tol(r3.Norm(r3.Sub(many.g, few.g))), why)
	k.curl(x, &few, &many, tol, why)
	k.cube(b, axes, base, why)
	k.loop(b, axes, 2*coarse, 2*fine, loopBound, k.floor(b.x))
	if k.eval != nil {
		k.gradient(b, &at, &many, tol, why)
		k.estimates(x, &at)
	}
	if k.phi {
		k.potential(b, at.Phi, &few, &many, base, why)
	}
}

// curl holds the antisymmetric part of the gradient, which is 3/radius of the means of g_i n_j, against zero.
func (k *kit) curl(x []r3.Vec, few, many *means, tol func(float64) float64, why string) {
	of := func(m *means) r3.Vec {
		t := &m.tensor
		return r3.Vec{X: t[2][1] - t[1][2], Y: t[0][2] - t[2][0], Z: t[1][0] - t[0][1]}
	}
	c := of(many)
	k.nearVec(Curl, x, c, r3.Vec{}, 2*tol(r3.Norm(r3.Sub(c, of(few)))), "mean of n x g over a sphere: "+why)
}

// gradient holds the gradient that is offered against 3/radius times the means of g_i n_j.
func (k *kit) gradient(b ball, at *field.Value, m *means, tol func(float64) float64, why string) {
	if math.IsInf(at.ErrGrad, 1) {
		return // no claim is made
	}
	t := tol(math.Inf(1)) * 3 / b.radius
	names := [6]string{"xx", "yy", "zz", "xy", "xz", "yz"}
	for c, ij := range [6][2]int{{0, 0}, {1, 1}, {2, 2}, {0, 1}, {0, 2}, {1, 2}} {
		want := 1.5 / b.radius * (m.tensor[ij[0]][ij[1]] + m.tensor[ij[1]][ij[0]])
		k.near(Gradient, []r3.Vec{b.x}, at.Grad[c], want, 2*t, names[c]+" from the means of g n over a sphere: "+why)
	}
	size := 0.0
	for _, g := range at.Grad {
		size = max(size, math.Abs(g))
	}
	trace := at.Grad[0] + at.Grad[1] + at.Grad[2]
	k.near(Gradient, []r3.Vec{b.x}, trace, 0, 3*k.Accuracy*max(size, k.floor(b.x)/b.radius)+at.ErrGrad,
		"trace; accuracy of its three parts and their estimate")
}

// estimates holds the estimates at a regular point against what an estimate can be.
func (k *kit) estimates(x []r3.Vec, v *field.Value) {
	for _, e := range [3]float64{v.ErrPhi, v.ErrG, v.ErrGrad} {
		if !(e >= 0) {
			k.fail(Estimate, x, fmt.Sprintf("of phi %v, of g %v, of its gradient %v", v.ErrPhi, v.ErrG, v.ErrGrad), "numbers from 0 to +Inf", "none")
			return
		}
	}
}

// cube holds the flux out of a cube inscribed in the ball against zero.
func (k *kit) cube(b ball, axes [3]r3.Vec, base float64, why string) {
	half := b.radius / math.Sqrt(3)
	flux := func(n int) float64 { // divided by the area
		s, w := gauss(n, -1, 1)
		var x, normal []r3.Vec
		var weight []float64
		for f := range 6 {
			e := r3.Scale(float64(1-2*(f%2)), axes[f/2])
			p, q := axes[(f/2+1)%3], axes[(f/2+2)%3]
			for i := range s {
				for j := range s {
					d := r3.Add(e, r3.Add(r3.Scale(s[i], p), r3.Scale(s[j], q)))
					x, normal = append(x, r3.Add(b.x, r3.Scale(half, d))), append(normal, e)
					weight = append(weight, w[i]*w[j]/24)
				}
			}
		}
		v := k.values(x, field.WantG, field.Mean)
		sum := 0.0
		for i := range x {
			sum += weight[i] * r3.Dot(v.At(i).G, normal[i])
		}
		return sum
	}
	f := flux(coarse)
	k.near(Divergence, []r3.Vec{b.x}, f, 0, base*(1+ballBound/k.Accuracy), "flux out of a cube over its area: "+why)
}

// loop holds the circulation round a circle, divided by its length, against zero. The trapezoid rules have few and many
// points; bound is that of the first, floor the size of g held to no relative accuracy.
func (k *kit) loop(b ball, axes [3]r3.Vec, few, many int, bound, floor float64) {
	circulation := func(n int) (c, largest float64) {
		rule := circle(n, axes)
		x := make([]r3.Vec, n)
		for i, p := range rule {
			x[i] = r3.Add(b.x, r3.Scale(b.radius, p.n))
		}
		v := k.values(x, field.WantG, field.Mean)
		for i, p := range rule {
			g := v.At(i).G
			c += p.w * r3.Dot(g, r3.Cross(axes[2], p.n))
			largest = max(largest, r3.Norm(g))
		}
		return c, largest
	}
	first, _ := circulation(few)
	second, largest := circulation(many)
	scale := max(largest, floor)
	tol := (k.Accuracy+rounding(b))*scale + min(math.Abs(second-first), bound*scale)
	k.near(Curl, []r3.Vec{b.x}, second, 0, tol,
		fmt.Sprintf("accuracy %.3g of |g| = %.3g, rounded points, trapezoid rules of %d and %d points; circulation over length of a circle of radius %.17g, axis %s",
			k.Accuracy, scale, few, many, b.radius, digits(axes[2])))
}

// rounding returns the relative error of a field that varies by itself over a radius, at points rounded by u |x|.
func rounding(b ball) float64 { return 4 * u * (r3.Norm(b.x) + b.radius) / b.radius }

// potential holds phi in the ball against its mean and against g along a diameter.
func (k *kit) potential(b ball, centre float64, few, many *means, base float64, why string) {
	scale := max(many.phiMax, k.phiFloor(b.x))
	tol := 2*k.Accuracy*scale + base*b.radius
	k.near(Harmonic, []r3.Vec{b.x}, centre, many.phi, tol+min(math.Abs(many.phi-few.phi), ballBound*scale), "phi: "+why)
	e := k.direction()
	from, to := r3.Sub(b.x, r3.Scale(b.radius, e)), r3.Add(b.x, r3.Scale(b.radius, e))
	k.along([]r3.Vec{from, to}, tol, why)
}

// along holds the difference of phi between the ends of a polygonal path against the integral of g along it, taken with
// one Gauss rule a leg: a leg whose charge is half its length off or more leaves an error below 4^-32.
func (k *kit) along(path []r3.Vec, tol float64, why string) {
	s, w := gauss(fine, 0, 1)
	from, to := path[0], path[len(path)-1]
	x := []r3.Vec{from, to}
	var weight []r3.Vec
	for leg := range path[1:] {
		d := r3.Sub(path[leg+1], path[leg])
		for i := range s {
			x = append(x, r3.Add(path[leg], r3.Scale(s[i], d)))
			weight = append(weight, r3.Scale(w[i], d))
		}
	}
	v := k.values(x, field.WantPhi|field.WantG, field.Mean)
	sum := 0.0
	for i, d := range weight {
		sum += r3.Dot(v.At(i+2).G, d)
	}
	k.near(Potential, []r3.Vec{from, to}, v.Phi[1]-v.Phi[0], -sum, tol, why)
}
