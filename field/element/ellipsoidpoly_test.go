package element

import (
	"encoding/json"
	"math"
	"math/rand/v2"
	"os"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/gauss"
	"gonum.org/v1/gonum/spatial/r3"
)

// peakOf returns the largest of p on an ellipsoid, of 2000 places.
func peakOf(p field.Polarization, axes r3.Vec) float64 {
	rng, peak := rand.New(rand.NewPCG(1, 1)), 0.0
	for range 2000 {
		n := unit(rng)
		peak = max(peak, r3.Norm(p.At(r3.Vec{X: axes.X * n.X, Y: axes.Y * n.Y, Z: axes.Z * n.Z})))
	}
	return peak
}

// TestPolynomialEllipsoid holds potential, field and estimates against 25 digits (testdata/ellipsoidpoly.py).
func TestPolynomialEllipsoid(t *testing.T) {
	data, err := os.ReadFile("testdata/ellipsoidpoly.json")
	if err != nil {
		t.Fatal(err)
	}
	var cases []struct {
		ellipsoidCase
		P [][3]json.RawMessage
	}
	if err := json.Unmarshal(data, &cases); err != nil {
		t.Fatal(err)
	}
	const tol = 1e-12 // the aim of the contract: 1000 roundings of what 1e-3 of the scale may be the rest of
	var y ellipsoidTally
	for _, c := range cases {
		var p field.Polynomial
		for _, raw := range c.P {
			var term field.Term
			for k, into := range []any{&term.Component, &term.Coefficient, &term.Powers} {
				if err := json.Unmarshal(raw[k], into); err != nil {
					t.Fatal(err)
				}
			}
			p = append(p, term)
		}
		e := must(NewPolynomialEllipsoid(geom.Ellipsoid{SemiAxes: vec(c.Axes)}, p))
		y.see(t, &c.ellipsoidCase, e, peakOf(p, vec(c.Axes)), tol)
	}
	y.judge(t)
}

// randomPolynomial returns a polynomial with terms of degree n and below.
func randomPolynomial(rng *rand.Rand, n, terms int) (p field.Polynomial) {
	for range terms {
		t := field.Term{Component: rng.IntN(3), Coefficient: 2*rng.Float64() - 1}
		for range rng.IntN(n + 1) {
			t.Powers[rng.IntN(3)]++
		}
		p = append(p, t)
	}
	return p
}

// TestPolynomialRule checks that twice as many nodes change nothing that the estimates do not cover.
func TestPolynomialRule(t *testing.T) {
	rng := rand.New(rand.NewPCG(3, 4))
	for _, degree := range []int{2, 6, 12, PolynomialDegree} {
		for _, axes := range []r3.Vec{{X: 1, Y: 1, Z: 1}, {X: 1, Y: 0.75, Z: 0.5}, {X: 1, Y: 0.01, Z: 0.5}, {X: 0.01, Y: 0.01, Z: 1}, {X: 1, Y: 1, Z: 1e-4}} {
			for range 3 {
				p := randomPolynomial(rng, degree, 4)
				p = append(p, field.Term{Component: rng.IntN(3), Coefficient: 1, Powers: [3]int{0, 0, degree}}, field.Term{Coefficient: 1, Powers: [3]int{degree, 0, 0}})
				e := must(NewPolynomialEllipsoid(geom.Ellipsoid{SemiAxes: axes}, p))
				fine := *e
				fine.nodes, fine.weights = gauss.On(2*len(e.nodes), 0, 1)
				fine.inner = fine.interior()
				for range 12 {
					n := unit(rng)
					x := r3.Scale(0.2+math.Exp2(4*rng.Float64()-2), r3.Vec{X: axes.X * n.X, Y: axes.Y * n.Y, Z: axes.Z * n.Z})
					within(t, "twice the nodes", x, at(e, x, field.Mean), at(&fine, x, field.Mean))
				}
			}
		}
	}
}

// within checks that two values differ by no more than their estimates.
func within(t *testing.T, name string, x r3.Vec, got, want field.Value) {
	t.Helper()
	phi, g, grad := apart(got, want)
	if !(phi <= got.ErrPhi+want.ErrPhi && g <= got.ErrG+want.ErrG && grad <= got.ErrGrad+want.ErrGrad) || got.Status != want.Status {
		t.Errorf("%s at %v: off by %.2g, %.2g, %.2g, claimed %.2g, %.2g, %.2g; got %v, want %v", name, x, phi, g, grad,
			got.ErrPhi+want.ErrPhi, got.ErrG+want.ErrG, got.ErrGrad+want.ErrGrad, got, want)
	}
}

// TestPolynomialIsAffine holds polynomials of degree 1 against the affine form, gradient and sides included.
func TestPolynomialIsAffine(t *testing.T) {
	p := field.Polynomial{{Component: 0, Coefficient: 0.5, Powers: [3]int{1, 0, 0}}, {Component: 0, Coefficient: -1.25, Powers: [3]int{0, 1, 0}},
		{Component: 2, Coefficient: 2, Powers: [3]int{1, 0, 0}}, {Component: 1, Coefficient: 0.75, Powers: [3]int{0, 0, 1}}, {Component: 2, Coefficient: 1.5},
		{Component: 2, Coefficient: -0.75, Powers: [3]int{0, 0, 1}}, {Component: 1, Coefficient: 0.25}}
	affine := field.Affine{Value: p.At(r3.Vec{}), Gradient: [3][3]float64{{0.5, -1.25, 0}, {0, 0, 0.75}, {2, 0, -0.75}}}
	rng := rand.New(rand.NewPCG(9, 10))
	for _, axes := range []r3.Vec{{X: 1.25, Y: 1.25, Z: 1.25}, {X: 0.75, Y: 3, Z: 2}, {X: 1, Y: 1, Z: 0.01}, {X: 0.02, Y: 0.01, Z: 1}, {X: 1e-9, Y: 3e-9, Z: 2e-9}} {
		shape := geom.Ellipsoid{SemiAxes: axes}
		a, b := must(NewPolynomialEllipsoid(shape, p)), must(NewAffineEllipsoid(shape, affine))
		for range 300 {
			n := unit(rng)
			x := r3.Vec{X: axes.X * n.X, Y: axes.Y * n.Y, Z: axes.Z * n.Z}
			switch rng.IntN(3) {
			case 0:
				x = r3.Scale(rng.Float64(), x)
			case 1:
				x = r3.Scale(1+math.Exp2(80*rng.Float64()-40), x)
			}
			for _, side := range []field.Side{field.Mean, field.Inside, field.Outside} {
				within(t, "affine", x, at(a, x, side), at(b, x, side))
			}
		}
	}
}

// TestPolynomialSeries holds the series of a sphere against the integral that serves ellipsoids, out to where that takes over.
func TestPolynomialSeries(t *testing.T) {
	rng := rand.New(rand.NewPCG(13, 14))
	for _, degree := range []int{2, 5, 12, PolynomialDegree} {
		e := must(NewPolynomialEllipsoid(geom.Ellipsoid{SemiAxes: r3.Vec{X: 1.5, Y: 1.5, Z: 1.5}}, randomPolynomial(rng, degree, 30)))
		general := *e
		general.round = polyTable{}
		for range 100 {
			x := r3.Scale(1.5*math.Exp2(10*rng.Float64()), unit(rng))
			within(t, "sphere", x, at(e, x, field.Mean), at(&general, x, field.Mean))
		}
	}
}

// TestPolynomialSphere holds hollow and full spheres against the closed form of central powers, and the outside against none.
func TestPolynomialSphere(t *testing.T) {
	cube := field.Polynomial{} // r^2 x
	for i := range 3 {
		for j := range 3 {
			term := field.Term{Component: i, Coefficient: 0.7}
			term.Powers[i]++
			term.Powers[j] += 2
			cube = append(cube, term)
		}
	}
	rng := rand.New(rand.NewPCG(15, 16))
	for _, inner := range []float64{0, 0.5, 1.2, 1.25 * (1 - 1e-9)} {
		a, b := must(NewPolynomialSphere(inner, 1.25, cube)), must(NewCentralPower(inner, 1.25, 0.7, 3))
		for range 500 {
			x := r3.Scale(inner+(1.25-inner)*(2*rng.Float64()-0.5), unit(rng))
			if rng.IntN(3) == 0 {
				x = r3.Scale([]float64{inner, 1.25}[rng.IntN(2)]*(1+math.Exp2(-50*rng.Float64())), unit(rng))
			}
			for _, side := range []field.Side{field.Mean, field.Inside, field.Outside} {
				got, want := at(a, x, side), at(b, x, side)
				move := 2 * u * 1.25 * 3 * 0.7 * 1.25 * 1.25 // dp/dr times the rounding of the radius
				want.ErrG, want.ErrPhi = want.ErrG+move, want.ErrPhi+2*move
				within(t, "central power", x, got, want)
			}
		}
	}
}

// TestPolynomialFar checks that the dipole takes over without a step, where there is one.
func TestPolynomialFar(t *testing.T) {
	p := field.Polynomial{{Component: 0, Coefficient: 1, Powers: [3]int{2, 0, 0}}, {Component: 2, Coefficient: 0.5, Powers: [3]int{0, 2, 4}}}
	for _, axes := range []r3.Vec{{X: 1, Y: 0.25, Z: 0.5}, {X: 1, Y: 1, Z: 1}} {
		e := must(NewPolynomialEllipsoid(geom.Ellipsoid{SemiAxes: axes}, p))
		n := r3.Unit(r3.Vec{X: 1, Y: -2, Z: 0.5})
		near := at(e, r3.Scale(2*polyFar*(1-0x1p-40), n), field.Mean)
		far := at(e, r3.Scale(2*polyFar*(1+0x1p-40), n), field.Mean)
		const tol = 0x1p-36 // the points differ by 2^-39, the field falls like R^-3
		if d := r3.Norm(r3.Sub(near.G, far.G)); !(d <= tol*r3.Norm(far.G)) || far.Phi == 0 {
			t.Errorf("axes %v: g steps from %v to %v", axes, near.G, far.G)
		}
		if d := math.Abs(near.Phi - far.Phi); !(d <= tol*math.Abs(far.Phi)) {
			t.Errorf("axes %v: phi steps from %v to %v", axes, near.Phi, far.Phi)
		}
	}
}

// TestPolynomialJudged holds Chebyshev's polynomial of degree 20, whose terms are 2e7 times its size: the estimates are above the
// contract and the status says so, whatever is asked for, on the surface too.
func TestPolynomialJudged(t *testing.T) {
	var p field.Polynomial
	c := 0x1p19 // T_n = sum c_k z^(n-2k), c_(k+1)/c_k = -(n-2k)(n-2k-1)/(4 (k+1)(n-k-1))
	for k := 0; 2*k <= 20; k++ {
		p = append(p, field.Term{Component: 2, Coefficient: c, Powers: [3]int{0, 0, 20 - 2*k}})
		c *= -float64((20-2*k)*(19-2*k)) / float64(4*(k+1)*(19-k))
	}
	ball := must(NewPolynomialEllipsoid(geom.Ellipsoid{SemiAxes: r3.Vec{X: 1, Y: 1, Z: 1}}, p))
	general := *ball
	general.round = polyTable{}
	shell := must(NewPolynomialSphere(0.5, 1, p))
	for _, x := range []r3.Vec{{Z: 1}, {Z: 0.96875}, {X: 0.25, Z: 1}, {X: 0.25}, {X: 8, Z: 1}} {
		for _, src := range []field.Source{ball, shell} {
			for _, want := range []field.Want{everyWant, field.WantG} {
				if v := field.At(src, x, field.Mean, want); v.Status != field.NotConverged {
					t.Errorf("%T at %v: status %v, want not converged; estimate of g %.2g", src, x, v.Status, v.ErrG)
				}
			}
		}
		if x != (r3.Vec{Z: 1}) { // there is no gradient
			within(t, "Chebyshev", x, at(ball, x, field.Mean), at(&general, x, field.Mean))
		}
	}
}

func TestPolynomialRefuses(t *testing.T) {
	ball := geom.Ellipsoid{SemiAxes: r3.Vec{X: 1, Y: 1, Z: 1}}
	for name, p := range map[string]field.Polynomial{
		"degree": {{Powers: [3]int{PolynomialDegree, 1, 0}, Coefficient: 1}}, "not finite": {{Coefficient: math.NaN()}},
		"component": {{Component: 3}}, "overflow": {{Coefficient: 1e308, Powers: [3]int{2, 0, 0}}, {Coefficient: 1e308, Powers: [3]int{2, 0, 0}}},
	} {
		if _, err := NewPolynomialEllipsoid(ball, p); err == nil {
			t.Errorf("%s: taken, want an error", name)
		}
	}
	if _, err := NewPolynomialEllipsoid(geom.Ellipsoid{}, nil); err == nil {
		t.Error("an ellipsoid without size was taken, want an error")
	}
	for _, r := range [][2]float64{{1, 1}, {-1, 1}, {0, math.Inf(1)}, {math.NaN(), 1}} {
		if _, err := NewPolynomialSphere(r[0], r[1], nil); err == nil {
			t.Errorf("radii %v were taken, want an error", r)
		}
	}
}

// TestPolynomialAllocates nothing.
func TestPolynomialAllocates(t *testing.T) {
	p := field.Polynomial{{Component: 1, Coefficient: 1, Powers: [3]int{2, 1, 0}}}
	for _, src := range []field.Evaluator{must(NewPolynomialEllipsoid(geom.Ellipsoid{SemiAxes: r3.Vec{X: 1, Y: 2, Z: 3}}, p)), must(NewPolynomialSphere(0.5, 1, p))} {
		at, dst := field.PointsOf(r3.Vec{X: 0.75}, r3.Vec{X: 4}), field.NewValues(2, everyWant)
		if n := testing.AllocsPerRun(20, func() { src.Evaluate(dst, at, field.Mean) }); n > 0 {
			t.Errorf("%T allocates %v times, want 0", src, n)
		}
	}
}

func BenchmarkPolynomialEllipsoid(b *testing.B) {
	rng := rand.New(rand.NewPCG(3, 4))
	axial := field.Polynomial{{Component: 2, Coefficient: 1, Powers: [3]int{0, 0, 8}}}
	for _, c := range []struct {
		name string
		p    field.Polynomial
	}{{"cubic", randomPolynomial(rng, 3, 8)}, {"axial 8", axial}, {"dense 12", randomPolynomial(rng, 12, 2000)}} {
		flat := must(NewPolynomialEllipsoid(geom.Ellipsoid{SemiAxes: r3.Vec{X: 1, Y: 0.5, Z: 0.01}}, c.p))
		shell := must(NewPolynomialSphere(0.5, 1, c.p))
		for _, w := range []struct {
			name string
			src  field.Evaluator
			x    r3.Vec
			want field.Want
		}{
			{"flat inside", flat, r3.Vec{X: 0.25}, everyWant}, {"flat outside", flat, r3.Vec{X: 0.25, Z: 0.01}, everyWant},
			{"flat outside g", flat, r3.Vec{X: 0.25, Z: 0.01}, field.WantG},
			{"shell wall", shell, r3.Vec{X: 0.5, Z: 0.375}, everyWant}, {"shell outside", shell, r3.Vec{X: 1, Z: 1}, everyWant},
		} {
			b.Run(c.name+"/"+w.name, func(b *testing.B) {
				at, dst := field.PointsOf(w.x), field.NewValues(1, w.want)
				b.ReportAllocs()
				for b.Loop() {
					w.src.Evaluate(dst, at, field.Mean)
				}
			})
		}
	}
}
