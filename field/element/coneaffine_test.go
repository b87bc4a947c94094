package element

import (
	"fmt"
	"math"
	"math/rand/v2"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// someAffine is a polarization with all its parts.
var someAffine = field.Affine{Value: r3.Vec{X: 0.25, Y: -0.5, Z: 1}, About: r3.Vec{X: 0.125, Z: 0.25},
	Gradient: [3][3]float64{{0.5, -1.25, 0.75}, {2, -0.25, 1.5}, {-1, 0.625, 1.75}}}

// nearCone returns points about a cone: at all distances from 1e-12 to 8 from wall, rims and ends, inside and outside.
func nearCone(rng *rand.Rand, c geom.Cone) r3.Vec {
	t := rng.Float64()
	if rng.IntN(4) == 0 {
		t = float64(rng.IntN(2)) // a rim
	}
	at := r3.Vec{X: c.Bottom + t*(c.Top-c.Bottom), Z: c.Height * (t - 0.5)}
	if rng.IntN(4) == 0 { // on an end
		at = r3.Vec{X: c.Bottom * rng.Float64(), Z: -c.Height / 2}
	}
	turn := 2 * math.Pi * rng.Float64()
	d := math.Pow(10, 12*rng.Float64()-12+0.9*rng.Float64())
	at.X += d * math.Cos(turn)
	at.Z += d * math.Sin(turn)
	sin, cos := math.Sincos(2 * math.Pi * rng.Float64())
	return r3.Vec{X: at.X * cos, Y: at.X * sin, Z: at.Z}
}

// twins holds two sources of one field against each other about a cone, and their statuses.
func twins(t *testing.T, name string, b, twin field.Evaluator, shape geom.Cone, peak float64) {
	t.Helper()
	rng := rand.New(rand.NewPCG(3, 4))
	worst, worstGrad, open := 0.0, 0.0, 0
	for range 300 {
		x := nearCone(rng, shape)
		v, w := at(b, x, field.Mean), at(twin, x, field.Mean)
		if v.Status != w.Status {
			t.Errorf("%s at %v: status %v, twin %v", name, x, v.Status, w.Status)
		}
		if v.Status != field.Regular {
			open++
			continue
		}
		dG, dPhi := r3.Norm(r3.Sub(v.G, w.G)), math.Abs(v.Phi-w.Phi)
		worst = max(worst, dG/(1e-3*peak+r3.Norm(w.G)))
		if !(dG <= v.ErrG+w.ErrG && dPhi <= v.ErrPhi+w.ErrPhi) {
			t.Errorf("%s at %v: phi %v, twin %v, estimates %.2g, %.2g; g %v, twin %v, off %.2g, estimates %.2g, %.2g", name, x, v.Phi, w.Phi,
				v.ErrPhi, w.ErrPhi, v.G, w.G, dG, v.ErrG, w.ErrG)
		}
		off := 0.0
		for k := range v.Grad {
			off = max(off, math.Abs(v.Grad[k]-w.Grad[k]))
		}
		worstGrad = max(worstGrad, off/(v.ErrGrad+w.ErrGrad))
		if !(off <= v.ErrGrad+w.ErrGrad) {
			t.Errorf("%s at %v: grad off by %.2g, estimates %.2g, %.2g", name, x, off, v.ErrGrad, w.ErrGrad)
		}
	}
	t.Logf("%s: worst g %.2g, grad %.2g of the estimates; %d points not regular", name, worst, worstGrad, open)
	if open > 30 {
		t.Errorf("%s: %d of 300 points are not regular, want at most 30", name, open)
	}
}

// TestAffineConeTwins holds cones of equal radii against the cylinder, and uniform polarization against Cone.
func TestAffineConeTwins(t *testing.T) {
	straight := geom.Cone{Bottom: 1, Top: 1, Height: 1.5}
	b := must(NewAffineCone(straight, someAffine))
	twins(t, "cylinder", b, must(NewAffineCylinder(geom.Cylinder{Radius: 1, Height: 1.5}, someAffine, 0)), straight, b.largest())
	uniform := field.Affine{Value: someAffine.Value}
	for name, shape := range someCones {
		b := must(NewAffineCone(shape, uniform))
		twins(t, name, b, must(NewCone(shape, uniform.Value)), shape, b.largest())
	}
}

var someCones = map[string]geom.Cone{
	"tip": {Bottom: 1, Height: 1}, "frustum": {Bottom: 0.5, Top: 1.25, Height: 0.75}, "needle": {Bottom: 0.05, Top: 0.01, Height: 3},
	"plate": {Bottom: 1, Top: 0.75, Height: 0.01},
}

// TestAxialPowerConeTwins holds cones of equal radii against the cylinder, and p = c z against AffineCone.
func TestAxialPowerConeTwins(t *testing.T) {
	straight := geom.Cone{Bottom: 1, Top: 1, Height: 1.5}
	for _, n := range []int{0, 2, 5} {
		b := must(NewAxialPowerCone(straight, 1.5, n))
		twins(t, fmt.Sprint("cylinder ", n), b, must(NewAxialPower(geom.Tube{Outer: 1, Height: 1.5}, 1.5, n)), straight, b.peak)
	}
	linear := field.Affine{Gradient: [3][3]float64{2: {2: 1.5}}}
	for name, shape := range someCones {
		b := must(NewAxialPowerCone(shape, 1.5, 1))
		twins(t, name, b, must(NewAffineCone(shape, linear)), shape, b.peak)
	}
}

// TestAxialPowerConeCut cuts a cone with p = c z^2 k in two: in the frame of a part p is c z^2 and an affine rest.
func TestAxialPowerConeCut(t *testing.T) {
	whole := geom.Cone{Bottom: 1, Top: 0.25, Height: 1.5}
	lower, upper := geom.Cone{Bottom: 1, Top: 0.75, Height: 0.5}, geom.Cone{Bottom: 0.75, Top: 0.25, Height: 1}
	const c = 1.5
	part := func(shape geom.Cone, z float64) field.Sum {
		pose := geom.Translate(r3.Vec{Z: z})
		rest := field.Affine{Value: r3.Vec{Z: c * z * z}, Gradient: [3][3]float64{2: {2: 2 * c * z}}}
		return field.Sum{field.Posed{Source: must(NewAxialPowerCone(shape, c, 2)), Pose: pose},
			field.Posed{Source: must(NewAffineCone(shape, rest)), Pose: pose}}
	}
	both := append(part(lower, -0.5), part(upper, 0.25)...)
	b := must(NewAxialPowerCone(whole, c, 2))
	twins(t, "cut", b, both, whole, b.peak)
}
