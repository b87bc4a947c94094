package element

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

const sectorWant = field.WantPhi | field.WantG | field.WantErr

// differ returns how far two values are apart, and the size of the first.
func differ(a, b field.Value) (phi, g, size float64) {
	return math.Abs(a.Phi - b.Phi), r3.Norm(r3.Sub(a.G, b.G)), r3.Norm(a.G)
}

// spread returns a point in a cube of the half side 2.
func spread(rng *rand.Rand) r3.Vec {
	return r3.Vec{X: 4*rng.Float64() - 2, Y: 4*rng.Float64() - 2, Z: 4*rng.Float64() - 2}
}

// The engine agrees with the closed forms where both serve.
func TestSectorClosed(t *testing.T) {
	disc, _ := NewDisc(geom.Disc{Radius: 1, Z: 0.25}, 1.5)
	linear, err := NewLinearDisc(geom.Disc{Radius: 1, Z: 0.25}, 1.5, r3.Vec{})
	if err != nil {
		t.Fatal(err)
	}
	ring, _ := NewAnnulus(geom.Annulus{Inner: 0.5, Outer: 1, Z: 0.25}, 1.5)
	linearRing, _ := NewLinearAnnulus(geom.Annulus{Inner: 0.5, Outer: 1, Z: 0.25}, 1.5, r3.Vec{})
	shape := geom.Tube{Inner: 0.5, Outer: 1, Height: 1.5}
	p := field.Affine{Value: r3.Vec{X: 0.5, Y: -1, Z: 0.75}, Gradient: [3][3]float64{2: {0, 0, 0.5}}}
	tube, _ := NewTube(shape, p.Value, 0.5)
	affine, _ := NewAffineTube(shape, p, 0)
	solid := geom.Cylinder{Radius: 1, Height: 1.5}
	cylinder, _ := NewCylinder(solid, p.Value, 0.5)
	affineCylinder, _ := NewAffineCylinder(solid, p, 0)
	rng := rand.New(rand.NewPCG(1, 1))
	for _, c := range []struct {
		name string
		a, b field.Evaluator
	}{{"disc", disc, linear}, {"annulus", ring, linearRing}, {"tube", tube, affine}, {"cylinder", cylinder, affineCylinder}} {
		worst, worstPhi, worstGrad := 0.0, 0.0, 0.0
		for k := range 2000 {
			x := spread(rng)
			if k%3 == 1 { // close to the rim
				f, d := 2*math.Pi*rng.Float64(), math.Pow(10, -12*rng.Float64())
				x = r3.Vec{X: math.Cos(f) * (1 + d*(rng.Float64()-0.5)), Y: math.Sin(f) * (1 + d*(rng.Float64()-0.5)), Z: 0.75 + d*(rng.Float64()-0.5)}
			}
			if k%3 == 2 {
				x = r3.Scale(math.Pow(10, 3*rng.Float64()), x)
			}
			want := sectorWant
			if k%5 == 0 {
				want |= field.WantGrad
			}
			a, b := field.At(c.a.(field.Source), x, field.Mean, want), field.At(c.b.(field.Source), x, field.Mean, want)
			phi, g, size := differ(a, b)
			near := min(1, 1/r3.Norm2(x))
			worst, worstPhi = max(worst, g/max(size, 1e-3*near)), max(worstPhi, phi/max(math.Abs(a.Phi), 1e-3*near))
			if g > a.ErrG+b.ErrG || phi > a.ErrPhi+b.ErrPhi {
				t.Errorf("%s at %v: g %.3g phi %.3g apart, claims %.3g %.3g, %.3g %.3g", c.name, x, g, phi, a.ErrG, b.ErrG, a.ErrPhi, b.ErrPhi)
			}
			if want&field.WantGrad != 0 {
				off, scale := 0.0, 0.0
				for i := range a.Grad {
					off += (a.Grad[i] - b.Grad[i]) * (a.Grad[i] - b.Grad[i])
					scale += a.Grad[i] * a.Grad[i]
				}
				off, scale = math.Sqrt(off), math.Sqrt(scale)
				worstGrad = max(worstGrad, off/scale)
				if off > 1.5*(a.ErrGrad+b.ErrGrad) {
					t.Errorf("%s at %v: gradients %.3g of %.3g apart, claims %.3g %.3g", c.name, x, off, scale, a.ErrGrad, b.ErrGrad)
				}
			}
		}
		t.Logf("%s: relative difference g %.2g, phi %.2g, gradient %.2g", c.name, worst, worstPhi, worstGrad)
		if !(worst < 2e-14 && worstPhi < 1e-11 && worstGrad < 1e-13) { // three times the worst; phi passes through 0
			t.Errorf("%s: relative difference g %.2g, phi %.2g, gradient %.2g", c.name, worst, worstPhi, worstGrad)
		}
	}
}
