package bound_test

import (
	"fmt"
	"math"
	"math/rand/v2"
	"strings"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/num/dual"
	"gonum.org/v1/gonum/spatial/r3"
)

// spoiled is a polarization whose divergence has been tampered with.
type spoiled struct {
	field.Polarization
	tamper func(x r3.Vec, d float64) float64
}

func (s spoiled) Divergence(x r3.Vec) float64 { return s.tamper(x, s.Polarization.Divergence(x)) }

// random returns a seeded polynomial of degree 3 in all components.
func random(rng *rand.Rand) field.Polynomial {
	var p field.Polynomial
	for c := range 3 {
		for range 4 {
			p = append(p, field.Term{Component: c, Coefficient: rng.NormFloat64(),
				Powers: [3]int{rng.IntN(2) + 1, rng.IntN(2), rng.IntN(2)}})
		}
	}
	return p
}

// bodies are the shapes on which divergences are tried.
var bodies = []geom.Body{
	geom.Box{Size: r3.Vec{X: 1, Y: 2, Z: 0.5}},
	geom.Cylinder{Radius: 0.7, Height: 1.1},
	geom.Tube{Inner: 0.4, Outer: 0.9, Height: 0.3},
	geom.Sphere{Radius: 0.8},
	geom.Ellipsoid{SemiAxes: r3.Vec{X: 0.5, Y: 0.9, Z: 1.4}},
}

// TestWrongDivergence checks that 50 seeded wrong divergences are refused in words, each by its place.
func TestWrongDivergence(t *testing.T) {
	rng := rand.New(rand.NewPCG(11, 4))
	kinds := []struct {
		name   string
		tamper func(p field.Polynomial, x r3.Vec, d float64) float64
	}{
		{"sign", func(_ field.Polynomial, _ r3.Vec, d float64) float64 { return -d }},
		{"factor", func(_ field.Polynomial, _ r3.Vec, d float64) float64 { return 1.001 * d }},
		{"dropped term", func(p field.Polynomial, x r3.Vec, _ float64) float64 { return p[1:].Divergence(x) }},
		{"added x y z", func(_ field.Polynomial, x r3.Vec, d float64) float64 { return d + 1e-3*x.X*x.Y*x.Z }},
		{"forgotten", func(field.Polynomial, r3.Vec, float64) float64 { return 0 }},
	}
	for i := range 50 {
		p := random(rng)
		kind := kinds[i%len(kinds)]
		body := bodies[i/len(kinds)%len(bodies)]
		wrong := spoiled{p, func(x r3.Vec, d float64) float64 { return kind.tamper(p, x, d) }}
		_, err := bound.Of(body, wrong)
		if err == nil || !strings.Contains(err.Error(), "divergence") {
			t.Errorf("case %d, %s on %T: got error %v, want one that names the divergence", i, kind.name, body, err)
		}
	}
}

// accepted reports whether Of found nothing wrong with the divergence; having no integrator is another matter.
func accepted(body geom.Body, p field.Polarization) error {
	_, err := bound.Of(body, p)
	if err != nil && !strings.Contains(err.Error(), "no integrator") {
		return err
	}
	return nil
}

// TestRightDivergence checks that no right divergence is refused, given, derived by dual numbers or by differences.
func TestRightDivergence(t *testing.T) {
	rng := rand.New(rand.NewPCG(5, 9))
	laws := map[string]field.Polarization{
		"axial power 3":     field.AxialPower{Coefficient: 1.5, Power: 3},
		"radial power 0":    field.RadialPower{Coefficient: 1},
		"radial power 0.5":  field.RadialPower{Coefficient: 2, Power: 0.5},
		"radial power 2":    field.RadialPower{Coefficient: -1, Power: 2},
		"central power 0":   field.CentralPower{Coefficient: 1},
		"central power 2.5": field.CentralPower{Coefficient: 1, Power: 2.5},
		"by differences": field.Func{P: func(x r3.Vec) [3]float64 {
			return [3]float64{math.Sin(x.X * x.Y), math.Exp(x.Z), x.X * x.X}
		}},
		"swirl in cylindrical components": field.Func{Components: field.Cylindrical,
			P:   func(x r3.Vec) [3]float64 { return [3]float64{0, math.Hypot(x.X, x.Y), 1} },
			Div: func(r3.Vec) float64 { return 0 }},
		"dual, spherical": field.Func{Components: field.Spherical,
			P: func(x r3.Vec) [3]float64 { n := r3.Norm2(x); return [3]float64{n, 0, 0} },
			Dual: func(x [3]dual.Number) [3]dual.Number {
				n := dual.Add(dual.Add(dual.Mul(x[0], x[0]), dual.Mul(x[1], x[1])), dual.Mul(x[2], x[2]))
				return [3]dual.Number{n, {}, {}}
			}},
	}
	polynomials := 10
	if testing.Short() {
		polynomials = 2
	}
	for i := range polynomials {
		laws[fmt.Sprint("polynomial ", i)] = random(rng)
	}
	for name, p := range laws {
		for _, body := range bodies {
			if err := accepted(body, p); err != nil {
				t.Errorf("%s on %T: %v", name, body, err)
			}
		}
	}
}

// TestDual checks exact derivatives by dual numbers against the formula: p = r^2 r-hat has divergence 4 r.
func TestDual(t *testing.T) {
	p := field.Func{Components: field.Spherical,
		P: func(x r3.Vec) [3]float64 { return [3]float64{r3.Norm2(x), 0, 0} },
		Dual: func(x [3]dual.Number) [3]dual.Number {
			n := dual.Add(dual.Add(dual.Mul(x[0], x[0]), dual.Mul(x[1], x[1])), dual.Mul(x[2], x[2]))
			return [3]dual.Number{n, {}, {}}
		}}
	x := r3.Vec{X: 0.3, Y: -0.4, Z: 1.2}                   // r = 1.3
	if got := p.Divergence(x); math.Abs(got-5.2) > 1e-14 { // a few u
		t.Errorf("got %v, want 5.2", got)
	}
	p.Dual = nil
	if got := p.Divergence(x); math.Abs(got-5.2) > 1e-10 { // differences
		t.Errorf("by differences %v, want 5.2", got)
	}
}
