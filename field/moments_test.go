package field_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/element"
	"gonum.org/v1/gonum/spatial/r3"
)

// charges is a seeded set of charges and dipoles within the unit ball, as a sum and as moments.
func charges(order int) (field.Sum, *field.Moments) {
	rng := rand.New(rand.NewPCG(3, 5))
	centre := r3.Vec{X: 0.5, Y: -2, Z: 1}
	m := field.NewMoments(centre, 1, order)
	var sum field.Sum
	random := func() r3.Vec { return r3.Vec{X: rng.NormFloat64(), Y: rng.NormFloat64(), Z: rng.NormFloat64()} }
	for range 20 {
		at := r3.Add(centre, r3.Scale(rng.Float64(), r3.Unit(random())))
		q, p := rng.NormFloat64(), random()
		m.AddCharge(at, q)
		m.AddDipole(at, p)
		sum = append(sum, element.Point{At: at, Charge: q}, element.Dipole{At: at, Moment: p})
	}
	return sum, m
}

// TestMoments checks potential, field and gradient of the expansion against the charges themselves, for every order: the
// error falls like (1/R)^(order+1), and the estimates are true.
func TestMoments(t *testing.T) {
	rng := rand.New(rand.NewPCG(7, 1))
	for _, order := range []int{4, 8, 16, 32} {
		sum, m := charges(order)
		for range 40 {
			far := 1.8 * math.Pow(300, rng.Float64())
			d := r3.Unit(r3.Vec{X: rng.NormFloat64(), Y: rng.NormFloat64(), Z: rng.NormFloat64()})
			x := r3.Add(m.Centre(), r3.Scale(far, d))
			want, got := field.At(sum, x, field.Mean, everything), field.At(m, x, field.Mean, everything)
			phi, g, grad := distance(got, want)
			if phi > got.ErrPhi+want.ErrPhi || g > got.ErrG+want.ErrG || grad > got.ErrGrad+want.ErrGrad {
				t.Errorf("order %d, R = %.3g: errors %.2g, %.2g, %.2g above estimates %.2g, %.2g, %.2g", order, far, phi, g, grad,
					got.ErrPhi, got.ErrG, got.ErrGrad)
			}
			// 20 dipoles of size about 2 and the first order left out; 1e3 for the power n^2 of the gradient
			left := math.Pow(far, -float64(order+1)) + 1e-15
			if scale := 40 / (far * far); phi > 10*scale*left || g > 1e2*scale*left || grad > 1e4*scale*left {
				t.Errorf("order %d, R = %.3g: errors %.2g, %.2g, %.2g", order, far, phi, g, grad)
			}
		}
	}
}

// TestMomentsInside checks that a point among the charges gets no number.
func TestMomentsInside(t *testing.T) {
	_, m := charges(4)
	if v := field.At(m, m.Centre(), field.Mean, everything); v.Status != field.NotConverged || !math.IsNaN(v.Phi) {
		t.Errorf("at the centre: %+v, want NaN and %v", v, field.NotConverged)
	}
}

// TestGraded checks that charge graded by order stands for volume charge: over the faces of a cube, h/(n+3) rho is the cube.
func TestGraded(t *testing.T) {
	const rho, n = 1.5, 24
	faces, cells := field.NewMoments(r3.Vec{}, math.Sqrt(3), 6), field.NewMoments(r3.Vec{}, math.Sqrt(3), 6)
	step := 2.0 / n
	at := func(i int) float64 { return -1 + step*(float64(i)+0.5) }
	for i := range n {
		for j := range n {
			for _, s := range []float64{-1, 1} {
				w := rho * step * step // h = 1
				faces.AddGraded(r3.Vec{X: s, Y: at(i), Z: at(j)}, 0, w)
				faces.AddGraded(r3.Vec{X: at(i), Y: s, Z: at(j)}, 0, w)
				faces.AddGraded(r3.Vec{X: at(i), Y: at(j), Z: s}, 0, w)
			}
			for k := range n {
				cells.AddCharge(r3.Vec{X: at(i), Y: at(j), Z: at(k)}, rho*step*step*step)
			}
		}
	}
	x := r3.Vec{X: 3, Y: 2, Z: 5}
	a, b := field.At(faces, x, field.Mean, everything), field.At(cells, x, field.Mean, everything)
	if phi, g, _ := distance(a, b); phi > 1e-5*b.Phi || g > 1e-5*r3.Norm(b.G) { // midpoint rule, step^2/24 of the order-4 part
		t.Errorf("faces %+v, cells %+v", a, b)
	}
	if math.Abs(faces.Charge()-rho*8) > 1e-12 {
		t.Errorf("charge %v, want %v", faces.Charge(), rho*8)
	}
}
