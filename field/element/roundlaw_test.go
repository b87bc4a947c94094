package element

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// roundSource is a source with what the laws need to know of it.
type roundSource struct {
	name   string
	src    field.Evaluator
	bound  float64
	scale  float64 // largest density
	centre float64
	charge float64
}

func must[T any](v T, err error) T {
	if err != nil {
		panic(err)
	}
	return v
}

// roundSources returns one source of each kind and zone.
func roundSources() []roundSource {
	p := r3.Vec{X: 0.3, Y: -0.8, Z: 0.5}
	return []roundSource{
		{"disc", must(NewDisc(geom.Disc{Radius: 0.8, Z: 0.25}, 1.5)), 0.8, 1.5, 0.25, 1.5 * math.Pi * 0.64},
		{"annulus", must(NewAnnulus(geom.Annulus{Inner: 0.3, Outer: 0.8, Z: -1}, 2)), 0.8, 2, -1, 2 * math.Pi * 0.55},
		{"narrow annulus", must(NewAnnulus(geom.Annulus{Inner: 0.799, Outer: 0.8}, 2)), 0.8, 2, 0, 2 * math.Pi * 0.001 * 1.599},
		{"wall", must(NewWall(geom.Wall{Radius: 0.7, Z1: -0.3, Z2: 0.9}, 1, 0.5, -0.25)), math.Hypot(0.7, 0.6), 1.6, 0.3, 2 * math.Pi * 0.7 * 1.2},
		{"short wall", must(NewWall(geom.Wall{Radius: 0.7, Z1: 0, Z2: 0.001}, 1, 0.5, -0.25)), 0.7, 1.6, 0.0005, 2 * math.Pi * 0.7 * 0.001},
		{"cylinder", must(NewCylinder(geom.Cylinder{Radius: 0.6, Height: 1.5}, p, 0.7)), math.Hypot(0.6, 0.75), 1.6, 0, 0},
		{"plate", must(NewCylinder(geom.Cylinder{Radius: 0.9, Height: 0.002}, p, 30)), 0.9, 1.1, 0, 0},
		{"rod", must(NewCylinder(geom.Cylinder{Radius: 0.02, Height: 20}, p, 0.05)), 10, 1.6, 0, 0},
		{"tube", must(NewTube(geom.Tube{Inner: 0.4, Outer: 0.9, Height: 1}, p, -0.5)), math.Hypot(0.9, 0.5), 1.3, 0, 0},
		{"thin tube", must(NewTube(geom.Tube{Inner: 0.899, Outer: 0.9, Height: 1}, p, -0.5)), math.Hypot(0.9, 0.5), 1.3, 0, 0},
		{"ring", must(NewTube(geom.Tube{Inner: 0.899, Outer: 0.9, Height: 0.002}, p, -5)), 0.9, 1.1, 0, 0},
	}
}

// somewhere returns a point at 0.01 to 10 bounding radii.
func (s *roundSource) somewhere(rng *rand.Rand) r3.Vec {
	d := r3.Unit(r3.Vec{X: rng.NormFloat64(), Y: rng.NormFloat64(), Z: rng.NormFloat64()})
	x := r3.Scale(s.bound*math.Pow(10, 3*rng.Float64()-2), d)
	x.Z += s.centre
	return x
}

func TestRoundTurn(t *testing.T) {
	rng := rand.New(rand.NewPCG(1, 2))
	shape := geom.Tube{Inner: 0.4, Outer: 0.9, Height: 1}
	for range 200 {
		f := rng.Float64() * 2 * math.Pi
		sin, cos := math.Sincos(f)
		turn := func(v r3.Vec) r3.Vec { return r3.Vec{X: cos*v.X - sin*v.Y, Y: sin*v.X + cos*v.Y, Z: v.Z} }
		p := r3.Vec{X: 0.6, Y: 0.3, Z: -1}
		a, b := must(NewTube(shape, p, 0.4)), must(NewTube(shape, turn(p), 0.4))
		x := r3.Vec{X: rng.NormFloat64(), Y: rng.NormFloat64(), Z: rng.NormFloat64()}
		got, want := b.Field(turn(x)), turn(a.Field(x))
		if e := r3.Norm(r3.Sub(got, want)); e > 1e-13 { // 2e-16 of x times |grad g|, which is below 300 here
			t.Errorf("turned by %v at %v: got %v want %v, error %.2g", f, x, got, want, e)
		}
	}
}

func TestRoundHalves(t *testing.T) {
	rng := rand.New(rand.NewPCG(3, 4))
	p, slope := r3.Vec{X: 0.6, Y: 0.3, Z: -1}, 0.8
	whole := must(NewTube(geom.Tube{Inner: 0.25, Outer: 1, Height: 2}, p, slope))
	half := geom.Tube{Inner: 0.25, Outer: 1, Height: 1}
	up := must(NewTube(half, r3.Add(p, r3.Vec{Z: 0.5 * slope}), slope))
	down := must(NewTube(half, r3.Sub(p, r3.Vec{Z: 0.5 * slope}), slope))
	for range 300 {
		x := r3.Scale(math.Pow(10, 1.5*rng.Float64()-0.7), r3.Unit(r3.Vec{X: rng.NormFloat64(), Y: rng.NormFloat64(), Z: rng.NormFloat64()}))
		want := field.NewValues(1, field.WantPhi|field.WantG)
		parts := [2]*field.Values{field.NewValues(1, field.WantPhi|field.WantG), field.NewValues(1, field.WantPhi|field.WantG)}
		whole.Evaluate(want, field.PointsOf(x), field.Mean)
		up.Evaluate(parts[0], field.PointsOf(r3.Sub(x, r3.Vec{Z: 0.5})), field.Mean)
		down.Evaluate(parts[1], field.PointsOf(r3.Add(x, r3.Vec{Z: 0.5})), field.Mean)
		w, a, b := want.At(0), parts[0].At(0), parts[1].At(0)
		if e := r3.Norm(r3.Sub(w.G, r3.Add(a.G, b.G))); e > 1e-13 { // shifting x costs u|x| times |grad g|
			t.Errorf("g at %v: whole %v, halves %v and %v", x, w.G, a.G, b.G)
		}
		if e := math.Abs(w.Phi - a.Phi - b.Phi); e > 1e-14 { // sums of terms of order one
			t.Errorf("phi at %v: whole %v, halves %v and %v", x, w.Phi, a.Phi, b.Phi)
		}
	}
}

// TestRoundFlux holds the flux of g through a sphere about all of the source against its charge.
func TestRoundFlux(t *testing.T) {
	for _, s := range roundSources() {
		const n = 48 // Gauss points in cos(theta), trapezoid in the azimuth: exact to degree 95
		r := 1.5 * s.bound
		flux, size := 0.0, 0.0
		f := s.src.(field.Source)
		for i := range n / 16 {
			for _, g := range gauss16 {
				for _, c := range [2]float64{-g.x, g.x} {
					z := (float64(2*i+1)+c)*16/n - 1
					rho := math.Sqrt(1 - z*z)
					for k := range n {
						a := 2 * math.Pi * (float64(k) + 0.3) / n
						d := r3.Vec{X: rho * math.Cos(a), Y: rho * math.Sin(a), Z: z}
						x := r3.Scale(r, d)
						x.Z += s.centre
						v := f.Field(x)
						w := g.w * 16 / n * 2 * math.Pi / n * r * r
						flux += w * r3.Dot(v, d)
						size += w * r3.Norm(v)
					}
				}
			}
		}
		if e := math.Abs(flux - s.charge); !(e < 1e-9*size) { // the rule leaves (1/1.5)^n of the field of degree n: measured
			t.Errorf("%s: flux %v, charge %v, of |flux| %v", s.name, flux, s.charge, size)
		}
	}
}

func TestRoundAxis(t *testing.T) {
	const a, h, p = 0.75, 1.25, 1.0
	c := must(NewCylinder(geom.Cylinder{Radius: a, Height: 2 * h}, r3.Vec{Z: p}, 0))
	for _, z := range []float64{0, 0.1, 1, 1.2499, 1.2501, 2, 5, 100} {
		g := c.Field(r3.Vec{Z: z})
		in := 0.0
		if math.Abs(z) < h {
			in = p
		}
		want := 0.5*p*((z+h)/math.Hypot(z+h, a)-(z-h)/math.Hypot(z-h, a)) - in
		if g.X != 0 || g.Y != 0 {
			t.Errorf("z = %v: g %v has a part across the axis", z, g)
		}
		if e := math.Abs(g.Z - want); e > 4e-16 { // the differences in want
			t.Errorf("z = %v: g_z %v, want %v", z, g.Z, want)
		}
	}
	d := must(NewDisc(geom.Disc{Radius: a}, 2))
	for _, z := range []float64{1e-12, 0.3, 3} {
		if got, want := d.Field(r3.Vec{Z: z}).Z, 1-z/math.Hypot(z, a); math.Abs(got-want) > 4e-16 {
			t.Errorf("disc, z = %v: g_z %v, want %v", z, got, want)
		}
	}
}

// TestRoundGradient holds the gradient and its estimate against central differences of g.
func TestRoundGradient(t *testing.T) {
	rng := rand.New(rand.NewPCG(5, 6))
	for _, s := range roundSources() {
		f := s.src.(field.Source)
		for range 200 {
			x := s.somewhere(rng)
			v := field.NewValues(1, field.WantG|field.WantGrad|field.WantErr)
			s.src.Evaluate(v, field.PointsOf(x), field.Mean)
			got := v.At(0)
			norm := 0.0
			for k, g := range got.Grad {
				w := 1.0
				if k > 2 {
					w = 2
				}
				norm += w * g * g
				if g-g != 0 {
					t.Errorf("%s at %v: gradient %v", s.name, x, got.Grad)
				}
			}
			norm = math.Sqrt(norm)
			if got.ErrGrad > 1e-3*norm { // close to a rim of the thin sources: nothing to compare with
				continue
			}
			h := 1e-4 * r3.Norm(r3.Sub(x, r3.Vec{Z: s.centre}))
			var worst float64
			for k, e := range [3]r3.Vec{{X: 1}, {Y: 1}, {Z: 1}} {
				slope := func(h float64) r3.Vec {
					return r3.Scale(0.5/h, r3.Sub(f.Field(r3.Add(x, r3.Scale(h, e))), f.Field(r3.Sub(x, r3.Scale(h, e)))))
				}
				d := r3.Sub(r3.Scale(4.0/3, slope(h)), r3.Scale(1.0/3, slope(2*h)))
				row := [3][3]int{{0, 3, 4}, {3, 1, 5}, {4, 5, 2}}[k]
				w := r3.Vec{X: got.Grad[row[0]], Y: got.Grad[row[1]], Z: got.Grad[row[2]]}
				worst = max(worst, r3.Norm(r3.Sub(d, w)))
			}
			// h^4 terms where a face or rim is some 30 h away, and u |g|/h
			if tol := 1e-6*norm + 1e-11*s.scale/r3.Norm(x) + 2*got.ErrGrad; worst > tol {
				t.Errorf("%s at %v: gradient %v off by %.2g of %.2g, claim %.2g", s.name, x, got.Grad, worst, norm, got.ErrGrad)
			}
		}
	}
}

// TestRoundSides holds the step across charged faces, the mean, and the status.
func TestRoundSides(t *testing.T) {
	p, slope := r3.Vec{X: 0.6, Y: 0.3, Z: -1}, 0.8
	tube := must(NewTube(geom.Tube{Inner: 0.25, Outer: 1, Height: 2}, p, slope))
	wall := must(NewWall(geom.Wall{Radius: 0.5, Z1: -1, Z2: 1}, 2, 1, 0))
	axial := must(NewCylinder(geom.Cylinder{Radius: 0.5, Height: 1}, r3.Vec{Z: 1}, 0))
	for _, c := range []struct {
		name   string
		src    field.Evaluator
		x, n   r3.Vec
		sigma  float64
		status field.Status
	}{
		{"top", tube, r3.Vec{X: 0.5, Y: 0.25, Z: 1}, r3.Vec{Z: 1}, -1 + 0.8, field.OnFace},
		{"bottom", tube, r3.Vec{X: -0.5, Y: 0.25, Z: -1}, r3.Vec{Z: -1}, 1 + 0.8, field.OnFace},
		{"outer", tube, r3.Vec{X: 0.6, Y: 0.8, Z: 0.5}, r3.Vec{X: 0.6, Y: 0.8}, 0.6, field.OnFace},
		{"inner", tube, r3.Vec{X: 0.25, Z: 0.5}, r3.Vec{X: -1}, -0.6, field.OnFace},
		{"wall", wall, r3.Vec{X: -0.3, Y: 0.4}, r3.Vec{X: -0.6, Y: 0.8}, 2 - 0.6, field.OnFace},
		{"uncharged", axial, r3.Vec{X: 0.3, Y: 0.4}, r3.Vec{X: 0.6, Y: 0.8}, 0, field.Regular},
	} {
		in, out := field.At(c.src.(field.Source), c.x, field.Inside, 3), field.At(c.src.(field.Source), c.x, field.Outside, 3)
		mean := field.At(c.src.(field.Source), c.x, field.Mean, 3)
		if mean.Status != c.status {
			t.Errorf("%s: status %v, want %v", c.name, mean.Status, c.status)
		}
		step := r3.Sub(r3.Sub(out.G, in.G), r3.Scale(c.sigma, c.n))
		if e := r3.Norm(step); e > 2e-15 { // sums of terms of order one
			t.Errorf("%s: step %v, want %v along %v", c.name, r3.Sub(out.G, in.G), c.sigma, c.n)
		}
		if e := r3.Norm(r3.Sub(mean.G, r3.Scale(0.5, r3.Add(in.G, out.G)))); e > 2e-15 {
			t.Errorf("%s: mean %v of %v and %v", c.name, mean.G, in.G, out.G)
		}
		near := field.At(c.src.(field.Source), r3.Add(c.x, r3.Scale(1e-12, c.n)), field.Mean, 3)
		if e := r3.Norm(r3.Sub(near.G, out.G)); e > 1e-10 { // 1e-12 times the gradient
			t.Errorf("%s: %v just outside, limit %v", c.name, near.G, out.G)
		}
		if e := math.Abs(in.Phi-out.Phi) + math.Abs(near.Phi-out.Phi); e > 1e-11 {
			t.Errorf("%s: phi %v, %v, %v", c.name, in.Phi, out.Phi, near.Phi)
		}
	}
}

func TestRoundRims(t *testing.T) {
	tube := must(NewTube(geom.Tube{Inner: 0.25, Outer: 1, Height: 2}, r3.Vec{X: 1}, 0))
	bare := must(NewCylinder(geom.Cylinder{Radius: 1, Height: 2}, r3.Vec{Z: -1}, 1)) // the top face carries no charge
	for _, c := range []struct {
		name string
		src  field.Source
		x    r3.Vec
		want field.Status
	}{
		{"tube outer", tube, r3.Vec{X: 0.6, Y: 0.8, Z: 1}, field.OnEdge},
		{"tube inner", tube, r3.Vec{Y: 0.25, Z: -1}, field.OnEdge},
		{"uncharged", bare, r3.Vec{X: 0.6, Y: 0.8, Z: 1}, field.Regular},
		{"charged", bare, r3.Vec{X: 0.6, Y: 0.8, Z: -1}, field.OnEdge},
		{"disc", must(NewDisc(geom.Disc{Radius: 1}, 1)), r3.Vec{X: 0.6, Y: 0.8}, field.OnEdge},
		{"annulus", must(NewAnnulus(geom.Annulus{Inner: 0.5, Outer: 1}, 1)), r3.Vec{X: 0.3, Y: 0.4}, field.OnEdge},
		{"wall", must(NewWall(geom.Wall{Radius: 1, Z1: 0, Z2: 1}, 1, 0, 0)), r3.Vec{X: 0.6, Y: 0.8}, field.OnEdge},
	} {
		v := field.At(c.src, c.x, field.Mean, field.WantPhi|field.WantG)
		if v.Status != c.want {
			t.Errorf("%s: status %v, want %v", c.name, v.Status, c.want)
		}
		if nan := math.IsNaN(v.G.X); nan != (c.want == field.OnEdge) {
			t.Errorf("%s: g %v", c.name, v.G)
		}
		near := field.At(c.src, r3.Add(c.x, r3.Vec{Z: 1e-11}), field.Mean, field.WantPhi)
		if !(math.Abs(v.Phi-near.Phi) < 1e-9) { // 1e-11 times the field, some 25/4 pi
			t.Errorf("%s: phi %v on the rim, %v beside it", c.name, v.Phi, near.Phi)
		}
	}
}

// TestRoundExtremes holds that points at any distance give finite values, and bad input is refused.
func TestRoundExtremes(t *testing.T) {
	for _, s := range roundSources() {
		f := s.src.(field.Source)
		for _, x := range []r3.Vec{
			{X: 1e200, Y: 1e200, Z: -1e200}, {X: 1e150, Z: 1}, {X: 1e-200, Y: 1e-210, Z: 0.3}, {Z: 1e300},
			{X: 1e-170, Y: -1e-160, Z: s.centre}, {X: 5e-324}, {Z: s.centre}, {X: 1e8}, {Y: -1e100, Z: 1e-300},
		} {
			v := field.At(f, x, field.Mean, field.WantPhi|field.WantG|field.WantGrad|field.WantErr)
			sum := v.Phi + v.G.X + v.G.Y + v.G.Z + v.ErrPhi + v.ErrG
			for _, g := range v.Grad {
				sum += g
			}
			if sum-sum != 0 || v.Status != field.Regular && v.Status != field.OnFace {
				t.Errorf("%s at %v: %+v", s.name, x, v)
			}
		}
		if v := field.At(f, r3.Vec{X: math.NaN()}, field.Mean, 3); v.Status != field.BadInput || !math.IsNaN(v.G.X) {
			t.Errorf("%s: NaN gave %+v", s.name, v)
		}
		if g := f.Field(r3.Vec{Z: math.Inf(1)}); !math.IsNaN(g.Z) {
			t.Errorf("%s: infinity gave %v", s.name, g)
		}
	}
}

func TestRoundRefusals(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	for name, make := range map[string]func() error{
		"disc radius":    func() error { _, err := NewDisc(geom.Disc{Radius: -1}, 1); return err },
		"disc density":   func() error { _, err := NewDisc(geom.Disc{Radius: 1}, nan); return err },
		"annulus radii":  func() error { _, err := NewAnnulus(geom.Annulus{Inner: 2, Outer: 1}, 1); return err },
		"annulus charge": func() error { _, err := NewAnnulus(geom.Annulus{Inner: 1, Outer: 2}, inf); return err },
		"wall ends":      func() error { _, err := NewWall(geom.Wall{Radius: 1, Z1: 1, Z2: 0}, 1, 0, 0); return err },
		"wall radius":    func() error { _, err := NewWall(geom.Wall{Radius: nan, Z1: 0, Z2: 1}, 1, 0, 0); return err },
		"wall charge":    func() error { _, err := NewWall(geom.Wall{Radius: 1, Z1: 0, Z2: 1}, 1, nan, 0); return err },
		"tube radii":     func() error { _, err := NewTube(geom.Tube{Inner: 2, Outer: 1, Height: 1}, r3.Vec{}, 0); return err },
		"tube slope":     func() error { _, err := NewTube(geom.Tube{Inner: 1, Outer: 2, Height: 1}, r3.Vec{}, inf); return err },
		"cylinder p": func() error {
			_, err := NewCylinder(geom.Cylinder{Radius: 1, Height: 1}, r3.Vec{X: nan}, 0)
			return err
		},
		"cylinder size": func() error { _, err := NewCylinder(geom.Cylinder{Radius: 1}, r3.Vec{X: 1}, 0); return err },
	} {
		if make() == nil {
			t.Errorf("%s: no error", name)
		}
	}
}
