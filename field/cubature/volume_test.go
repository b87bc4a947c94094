package cubature_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/cubature"
	"example.com/boundpole/field/element"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

func newVolume(t testing.TB, b []geom.Block, density func(x r3.Vec) float64) *cubature.Volume {
	t.Helper()
	v, err := cubature.NewVolume(b, density, nil)
	if err != nil {
		t.Fatal(err)
	}
	return v
}

func one(_ r3.Vec) float64 { return 1 }

// chargedBox is uniform unit charge in a box about the origin: the polarization (-x, 0, 0), less its charge on two faces.
func chargedBox(h r3.Vec) field.Source {
	box := geom.Box{Size: r3.Scale(2, h)}
	s := field.Sum{element.NewPolyhedron(box.Polyhedron(), field.Affine{Gradient: [3][3]float64{{-1}}})}
	for _, x := range [2]float64{-h.X, h.X} {
		face := geom.Polygon{Vertices: []r3.Vec{{X: x, Y: -h.Y, Z: -h.Z}, {X: x, Y: h.Y, Z: -h.Z}, {X: x, Y: h.Y, Z: h.Z}, {X: x, Y: -h.Y, Z: h.Z}}}
		s = append(s, element.NewPolygon(face, h.X, r3.Vec{}))
	}
	return s
}

// chargedCylinder is uniform unit charge in the cylinder of radius 1 and height 2 h, made likewise.
func chargedCylinder(t *testing.T, h float64) field.Source {
	t.Helper()
	body, err := element.NewCylinder(geom.Cylinder{Radius: 1, Height: 2 * h}, r3.Vec{}, -1)
	if err != nil {
		t.Fatal(err)
	}
	s := field.Sum{body}
	for _, z := range [2]float64{-h, h} {
		d, err := element.NewDisc(geom.Disc{Radius: 1, Z: z}, h)
		if err != nil {
			t.Fatal(err)
		}
		s = append(s, d)
	}
	return s
}

// linearBall is the charge rho = z in the unit ball: phi = z/6 - z r^2/10 inside, z/(15 r^3) outside.
type linearBall struct{}

func (linearBall) Field(x r3.Vec) r3.Vec {
	r := r3.Norm(x)
	if r <= 1 {
		return r3.Sub(r3.Scale(x.Z/5, x), r3.Vec{Z: 1.0/6 - r*r/10})
	}
	return r3.Sub(r3.Scale(x.Z/(5*r*r*r*r*r), x), r3.Vec{Z: 1 / (15 * r * r * r)})
}

func (s linearBall) Evaluate(dst *field.Values, at *field.Points, _ field.Side) {
	field.Fill(dst, at, func(p field.Point, _ field.Want) field.Value {
		x := p.X.Value()
		r := r3.Norm(x)
		phi := x.Z/6 - x.Z*r*r/10
		if r > 1 {
			phi = x.Z / (15 * r * r * r)
		}
		return field.Value{Phi: phi, G: s.Field(x), ErrPhi: 8 * u, ErrG: 8 * u, ErrGrad: math.Inf(1)}
	})
}

// TestVolumeForms holds volumes against closed forms inside, outside, on faces and 1e-12 off them, in tips too.
func TestVolumeForms(t *testing.T) {
	h := r3.Vec{X: 0.5, Y: 0.35, Z: 0.8}
	flat := []r3.Vec{{}, {X: 0.1, Y: 0.2, Z: -0.3}, {X: 0.1, Y: 0.2, Z: 0.79}, {X: 0.1, Y: 0.2, Z: 0.8 - 1e-12}, {X: 0.1, Y: 0.2, Z: 0.8},
		{X: 0.1, Y: 0.2, Z: 0.8 + 1e-12}, {X: 0.1, Y: 0.2, Z: 0.8001}, {X: 0.1, Y: 0.2, Z: 1.5}, {X: 0.5 + 1e-9, Y: 0.35, Z: 0.1}, {X: 3, Y: 4, Z: 1e5}}
	round := []r3.Vec{{X: 0.1, Y: 0.2, Z: 0.3}, {X: 0.3, Y: -0.2, Z: 1e-9}, {X: 0.6, Y: 0.8}, {X: 1 + 1e-10, Z: 0.1}, {X: 1.2, Y: -0.3, Z: 0.5}, {X: 4, Y: 2, Z: -9}}
	for _, c := range []struct {
		name    string
		blocks  []geom.Block
		density func(x r3.Vec) float64
		ref     field.Source
		at      []r3.Vec
	}{
		{"box", []geom.Block{brick{h}}, one, chargedBox(h), flat},
		{"cylinder", cylinderBlocks(0.6), one, chargedCylinder(t, 0.6), append(round, r3.Vec{}, r3.Vec{X: 1e-9, Z: 0.2})},
		{"ball", ballBlocks(), one, element.ChargedBall{Shape: geom.Sphere{Radius: 1}, Density: 1}, append(round[:1:1], r3.Vec{X: 0.999}, r3.Vec{X: 9})},
		{"linear ball", ballBlocks(), func(x r3.Vec) float64 { return x.Z }, linearBall{}, append(round[4:], r3.Vec{X: 0.1, Y: 0.2, Z: 0.999})},
	} {
		v := newVolume(t, c.blocks, c.density)
		for _, x := range c.at {
			want := field.WantPhi | field.WantG | field.WantErr
			got, ref := field.At(v, x, field.Mean, want), field.At(c.ref, x, field.Mean, want)
			scale := 1 / (1 + r3.Norm2(x))
			ep, eg := math.Abs(got.Phi-ref.Phi), r3.Norm(r3.Sub(got.G, ref.G))
			if !(ep <= 1e-12*math.Sqrt(scale) && eg <= 1e-12*scale) || ep > got.ErrPhi+ref.ErrPhi || eg > got.ErrG+ref.ErrG || got.Status != field.Regular {
				t.Errorf("%s at %v: phi errs by %.3g, estimate %.3g, g by %.3g, estimate %.3g; want 1e-12 of the scale (%v)", c.name, x, ep, got.ErrPhi, eg,
					got.ErrG, got.Status)
			}
		}
	}
}

// TestVolumeGradient holds the gradient in and about a box against the closed form: its trace is the charge inside, 0 outside.
func TestVolumeGradient(t *testing.T) {
	h := r3.Vec{X: 0.5, Y: 0.35, Z: 0.8}
	v, ref := newVolume(t, []geom.Block{brick{h}}, one), chargedBox(h)
	for _, x := range []r3.Vec{{X: 0.1, Y: 0.2, Z: -0.3}, {X: 0.1, Y: 0.2, Z: 0.8 - 1e-12}, {X: 0.1, Y: 0.2, Z: 0.8 + 1e-9}, {X: 0.6, Y: 0.2, Z: 0.9}} {
		got, w := field.At(v, x, field.Mean, all), field.At(ref, x, field.Mean, all)
		var d [6]float64
		for i := range d {
			d[i] = got.Grad[i] - w.Grad[i]
		}
		if e := frobenius(d); e > 1e-12 || e > got.ErrGrad+w.ErrGrad { // 1e4 u of the density
			t.Errorf("at %v: gradient %v, want %v, error %.3g, estimate %.3g", x, got.Grad, w.Grad, e, got.ErrGrad)
		}
	}
	if on := field.At(v, r3.Vec{X: 0.1, Y: 0.2, Z: 0.8}, field.Mean, all); !math.IsInf(on.ErrGrad, 1) {
		t.Errorf("on the boundary: a claim of %v on the gradient, which jumps", on.ErrGrad)
	}
}

// TestVolumeCut: a box with a smooth density gives the same whether it is one block or eight unequal ones, within both estimates.
func TestVolumeCut(t *testing.T) {
	density := func(x r3.Vec) float64 { return math.Exp(x.X-x.Z/2) * (1 + x.Y*x.Y) }
	h := r3.Vec{X: 0.5, Y: 0.35, Z: 0.8}
	var parts []geom.Block
	at := [3]float64{0.3, 0.55, 0.6}
	for k := range 8 {
		var lo, hi [3]float64
		for i := range 3 {
			lo[i], hi[i] = 0, at[i]
			if k>>i&1 == 1 {
				lo[i], hi[i] = at[i], 1
			}
		}
		parts = append(parts, part{brick{h}, lo, hi})
	}
	whole, cut := newVolume(t, []geom.Block{brick{h}}, density), newVolume(t, parts, density)
	rng := rand.New(rand.NewPCG(5, 6))
	for range 12 {
		x := r3.Vec{X: rng.Float64() - 0.5, Y: 0.35 + offset(rng, -6, 0), Z: 1.6*rng.Float64() - 0.8}
		want := field.WantPhi | field.WantG | field.WantErr
		a, b := field.At(whole, x, field.Mean, want), field.At(cut, x, field.Mean, want)
		ep, eg := math.Abs(a.Phi-b.Phi), r3.Norm(r3.Sub(a.G, b.G))
		if ep > a.ErrPhi+b.ErrPhi || eg > a.ErrG+b.ErrG || ep > 1e-12 || eg > 1e-12 { // the claim
			t.Errorf("at %v: phi differs by %.3g, estimates %.3g and %.3g, g by %.3g, estimates %.3g and %.3g", x, ep, a.ErrPhi, b.ErrPhi, eg, a.ErrG, b.ErrG)
		}
	}
}

// part is a part of a block.
type part struct {
	b      geom.Block
	lo, hi [3]float64
}

func (p part) At(u, v, w float64) (x, xu, xv, xw r3.Vec) {
	s := [3]float64{p.hi[0] - p.lo[0], p.hi[1] - p.lo[1], p.hi[2] - p.lo[2]}
	x, xu, xv, xw = p.b.At(p.lo[0]+u*s[0], p.lo[1]+v*s[1], p.lo[2]+w*s[2])
	return x, r3.Scale(s[0], xu), r3.Scale(s[1], xv), r3.Scale(s[2], xw)
}

// TestVolumeEstimates holds estimates against closed forms at random points in, on and about a box and a cylinder.
func TestVolumeEstimates(t *testing.T) {
	rng := rand.New(rand.NewPCG(9, 4))
	h := r3.Vec{X: 0.5, Y: 0.35, Z: 0.8}
	for _, c := range []struct {
		name   string
		v      *cubature.Volume
		ref    field.Source
		at     func() r3.Vec
		points int
		want   field.Want
	}{
		{"box", newVolume(t, []geom.Block{brick{h}}, one), chargedBox(h), func() r3.Vec {
			return r3.Vec{X: 2*rng.Float64() - 1, Y: 0.35 + offset(rng, -10, 0), Z: 0.8 + offset(rng, -3, 0)}
		}, 40, all},
		{"cylinder", newVolume(t, cylinderBlocks(0.6), one), chargedCylinder(t, 0.6), func() r3.Vec {
			return r3.Vec{X: 1 + offset(rng, -10, 0), Y: offset(rng, -4, -1), Z: 0.6 + offset(rng, -3, 0)}
		}, 40, field.WantPhi | field.WantG | field.WantErr},
	} {
		var s score
		for range c.points {
			x := c.at()
			s.take(t, c.name, x, field.At(c.v, x, field.Mean, c.want), field.At(c.ref, x, field.Mean, c.want), c.want)
		}
		t.Logf("%s: %d unconverged, median overestimate %.0f of phi, %.0f of g, %.0f of the gradient, worst %.2g, %.2g, %.2g", c.name, s.unconverged,
			s.median(0), s.median(1), s.median(2), s.worst[0], s.worst[1], s.worst[2])
		if s.untrue > 0 || s.worst[0] > 1e-12 || s.worst[1] > 1e-12 { // the contract
			t.Errorf("%s: %d estimates untrue, worst errors %.3g of phi, %.3g of g", c.name, s.untrue, s.worst[0], s.worst[1])
		}
		if s.median(0) > 100 || s.median(1) > 100 || s.median(2) > 300 { // the contract; the gradient is bound by its terms
			t.Errorf("%s: median overestimate %.3g of phi, %.3g of g, %.3g of the gradient", c.name, s.median(0), s.median(1), s.median(2))
		}
	}
}

func TestVolumeRefuses(t *testing.T) {
	mirror := part{brick{r3.Vec{X: 1, Y: 1, Z: 1}}, [3]float64{1, 0, 0}, [3]float64{0, 1, 1}}
	for name, f := range map[string]func() error{
		"no blocks":   func() error { _, err := cubature.NewVolume(nil, one, nil); return err },
		"no density":  func() error { _, err := cubature.NewVolume(ballBlocks(), nil, nil); return err },
		"nil block":   func() error { _, err := cubature.NewVolume([]geom.Block{nil}, one, nil); return err },
		"left-handed": func() error { _, err := cubature.NewVolume([]geom.Block{mirror}, one, nil); return err },
	} {
		if f() == nil {
			t.Errorf("%s: no error", name)
		}
	}
}
