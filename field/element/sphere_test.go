package element

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// TestSurfaceSides checks the limits on the surfaces and that points 1e-12 sizes off them are on their side.
func TestSurfaceSides(t *testing.T) {
	p := r3.Vec{X: 0.25, Y: -0.5, Z: 1}
	const a, b = 0.7, 1.3
	e, err := NewEllipsoid(geom.Ellipsoid{SemiAxes: r3.Vec{X: 1, Y: 0.001, Z: 0.3}}, p)
	if err != nil {
		t.Fatal(err)
	}
	ellipsoidNormal := func(d r3.Vec) (x, n r3.Vec) {
		s := e.shape.SemiAxes
		x = r3.Vec{X: s.X * d.X, Y: s.Y * d.Y, Z: s.Z * d.Z}
		return x, r3.Unit(r3.Vec{X: d.X / s.X, Y: d.Y / s.Y, Z: d.Z / s.Z})
	}
	ball := func(r, sign float64) func(d r3.Vec) (x, n r3.Vec) {
		return func(d r3.Vec) (x, n r3.Vec) { return r3.Scale(r, d), r3.Scale(sign, d) }
	}
	for _, c := range []struct {
		name    string
		src     field.Evaluator
		surface func(d r3.Vec) (x, n r3.Vec) // the surface point for a direction, and the outward normal
		sigma   func(n r3.Vec) float64
	}{
		{"Sphere", Sphere{geom.Sphere{Radius: a}, p}, ball(a, 1), func(n r3.Vec) float64 { return r3.Dot(p, n) }},
		{"HollowSphere inner", HollowSphere{geom.HollowSphere{Inner: a, Outer: b}, p}, ball(a, -1),
			func(n r3.Vec) float64 { return r3.Dot(p, n) }},
		{"HollowSphere outer", HollowSphere{geom.HollowSphere{Inner: a, Outer: b}, p}, ball(b, 1),
			func(n r3.Vec) float64 { return r3.Dot(p, n) }},
		{"ChargedSphere", ChargedSphere{geom.Sphere{Radius: a}, 1.5}, ball(a, 1), func(r3.Vec) float64 { return 1.5 }},
		{"Ellipsoid", e, ellipsoidNormal, func(n r3.Vec) float64 { return r3.Dot(p, n) }},
	} {
		rng := rand.New(rand.NewPCG(5, 6))
		for range 200 {
			x, n := c.surface(unit(rng))
			sigma := c.sigma(n)
			in, out, mean := at(c.src, x, field.Inside), at(c.src, x, field.Outside), at(c.src, x, field.Mean)
			if in.Status != field.OnFace || out.Status != field.OnFace || mean.Status != field.OnFace {
				t.Errorf("%s on the surface at %v: statuses %v, %v, %v, want %v", c.name, x, in.Status, out.Status, mean.Status, field.OnFace)
				continue
			}
			// 4e-13: on the sharp rim of the flat ellipsoid the normal turns by 1e3 u for a rounding of x.
			const tol = 4e-13
			jump := r3.Sub(out.G, in.G)
			if d := r3.Norm(r3.Sub(jump, r3.Scale(sigma, n))); d > tol {
				t.Errorf("%s at %v: jump of g %v, want sigma n = %v, tolerance %g", c.name, x, jump, r3.Scale(sigma, n), tol)
			}
			if d := r3.Norm(r3.Sub(mean.G, r3.Scale(0.5, r3.Add(in.G, out.G)))); d > 4*u { // two roundings
				t.Errorf("%s at %v: mean %v of %v and %v", c.name, x, mean.G, in.G, out.G)
			}
			if d := math.Abs(in.Phi - out.Phi); d > 16*u { // either is good to 8 u
				t.Errorf("%s at %v: potential jumps by %g", c.name, x, d)
			}
			if !math.IsInf(mean.ErrGrad, 1) {
				t.Errorf("%s at %v: gradient has the bound %v on the surface, want no claim", c.name, x, mean.ErrGrad)
			}
			for _, h := range []float64{1e-12, 1e-9} {
				for side, limit := range map[float64]field.Value{1: out, -1: in} {
					y := r3.Add(x, r3.Scale(side*h, n))
					v := at(c.src, y, field.Mean)
					// the field of the flat rim varies over 1e-6: h/1e-6 of the field
					if d := r3.Norm(r3.Sub(v.G, limit.G)); v.Status != field.Regular || d > 10*h/1e-6 {
						t.Errorf("%s %g off %v: g %v, status %v; want near %v and regular", c.name, side*h, x, v.G, v.Status, limit.G)
					}
				}
			}
		}
		x, _ := c.surface(r3.Unit(r3.Vec{X: 1, Y: 2, Z: 3}))
		near := *field.PointsOf(r3.Scale(1+1e-9, x))
		if v := evaluate(c.src, near, field.Mean); v.Status != field.Regular {
			t.Errorf("%s 1e-9 off the surface: status %v, want regular", c.name, v.Status)
		}
		near.Slack = []float64{1e-8}
		if v := evaluate(c.src, near, field.Mean); v.Status != field.OnFace {
			t.Errorf("%s within the slack of the surface: status %v, want %v", c.name, v.Status, field.OnFace)
		}
	}
}

// TestLocateAgrees holds the side of points a little nearer and farther than the tolerance against the body's own answer.
func TestLocateAgrees(t *testing.T) {
	p := r3.Vec{Z: 1}
	rng := rand.New(rand.NewPCG(11, 12))
	for _, axes := range []r3.Vec{{X: 1, Y: 1, Z: 1}, {X: 0.01, Y: 0.01, Z: 1}, {X: 1, Y: 0.75, Z: 0.01}, {X: 0.7, Y: 0.3, Z: 0.1}} {
		shape := geom.Ellipsoid{SemiAxes: axes}
		e, err := NewEllipsoid(shape, p)
		if err != nil {
			t.Fatal(err)
		}
		for range 500 {
			d := unit(rng)
			x := r3.Vec{X: axes.X * d.X, Y: axes.Y * d.Y, Z: axes.Z * d.Z}
			n := r3.Unit(r3.Vec{X: d.X / axes.X, Y: d.Y / axes.Y, Z: d.Z / axes.Z})
			for _, h := range []float64{-1.2, -0.8, 0.8, 1.2} {
				off := r3.Scale(h*geom.OnTolerance(shape.Bounds(), x, 0), n)
				q := field.Point{X: pair.WithLow(x, off)}
				want := shape.Locate(q.X, 0).Region
				if got := e.locate(q.X.Scale(pair.Of(1/e.unit)), q); got != want {
					t.Errorf("ellipsoid %v, %v + %v: region %v, want %v", axes, x, off, got, want)
				}
				if axes.X != axes.Z {
					continue
				}
				ball := geom.Sphere{Radius: axes.X}
				want = ball.Locate(q.X, 0).Region
				if _, got := height(q, r3.Norm(x), axes.X, ball.Bounds()); got != want {
					t.Errorf("sphere, %v + %v: region %v, want %v", x, off, got, want)
				}
			}
		}
	}
}

func TestChargedSpheres(t *testing.T) {
	const a, density = 1.25, 0.75
	ball, shell := ChargedBall{geom.Sphere{Radius: a}, density}, ChargedSphere{geom.Sphere{Radius: a}, density}
	rng := rand.New(rand.NewPCG(7, 8))
	const tol = 2e-15 // 18 u: ten roundings on either way
	same := func(name string, x r3.Vec, got, want field.Value) {
		t.Helper()
		if d := math.Abs(got.Phi - want.Phi); d > tol*math.Abs(want.Phi) {
			t.Errorf("%s at %v: phi %v, want %v, tolerance %g", name, x, got.Phi, want.Phi, tol)
		}
		if d := r3.Norm(r3.Sub(got.G, want.G)); d > tol*r3.Norm(want.G) {
			t.Errorf("%s at %v: g %v, want %v, tolerance %g", name, x, got.G, want.G, tol)
		}
	}
	for range 500 {
		x := r3.Scale(a*(1+math.Exp2(30*rng.Float64()-15)), unit(rng))
		same("ball outside", x, at(ball, x, field.Mean), at(Point{Charge: 4 * math.Pi / 3 * a * a * a * density}, x, field.Mean))
		same("sphere outside", x, at(shell, x, field.Mean), at(Point{Charge: 4 * math.Pi * a * a * density}, x, field.Mean))
		x = r3.Scale(a*rng.Float64(), unit(rng))
		same("ball inside", x, at(ball, x, field.Mean),
			field.Value{Phi: density * (a*a/2 - r3.Norm2(x)/6), G: r3.Scale(density/3, x)})
		same("sphere inside", x, at(shell, x, field.Mean), field.Value{Phi: density * a})
	}
	if v := at(ball, r3.Vec{Z: a}, field.Mean); v.Status != field.Regular || !math.IsInf(v.ErrGrad, 1) {
		t.Errorf("ball on its surface: status %v, gradient bound %v; want regular (g is continuous) and no claim", v.Status, v.ErrGrad)
	}
}
