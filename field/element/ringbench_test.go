package element

import (
	"math"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// ringBench is a source at a point where it is timed.
type ringBench struct {
	name string
	src  field.Evaluator
	x    r3.Vec
}

// ringBenches lists what is timed and held at zero allocations.
func ringBenches() []ringBench {
	p := r3.Vec{X: 0.6, Y: 0.3, Z: -1}
	cone := must(NewCone(geom.Cone{Bottom: 1, Top: 0.5, Height: 1.5}, p))
	affine := must(NewAffineCone(geom.Cone{Bottom: 1, Top: 0.5, Height: 1.5}, someAffine))
	power := must(NewAxialPowerCone(geom.Cone{Bottom: 1, Top: 0.5, Height: 1.5}, 1, 2))
	torus := must(NewTorus(geom.Torus{Major: 1, Minor: 0.25}, p))
	shape := geom.Tube{Outer: 1, Height: 1.5}
	axial, radial, broken := must(NewAxialPower(shape, 1, 2)), must(NewRadialPower(shape, 1, 2)), must(NewRadialPower(shape, 1, 0.5))
	return []ringBench{
		{"cone/0.1", cone, r3.Vec{X: 0.9, Z: 0.1}},
		{"cone/1e-6", cone, r3.Vec{X: 0.75 + 1e-6}},
		{"torus/0.1", torus, r3.Vec{X: 1.35, Z: 0.1}},
		{"torus/1e-6", torus, r3.Vec{X: 1.25 + 1e-6}},
		{"axial/0.1", axial, r3.Vec{X: 1.1, Z: 0.1}},
		{"radial/0.1", radial, r3.Vec{X: 1.1, Z: 0.1}},
		{"radial/inside", radial, r3.Vec{X: 0.4, Z: 0.1}},
		{"broken power/inside", broken, r3.Vec{X: 0.4, Z: 0.1}},
		{"affine cone/0.1", affine, r3.Vec{X: 0.9, Z: 0.1}},
		{"affine cone/1e-6", affine, r3.Vec{X: 0.75 + 1e-6}},
		{"axial cone/0.1", power, r3.Vec{X: 0.9, Z: 0.1}},
		{"axial cone/1e-6", power, r3.Vec{X: 0.75 + 1e-6}},
		{"far", cone, r3.Vec{X: 5}},
	}
}

func BenchmarkRing(b *testing.B) {
	for _, c := range ringBenches() {
		for name, want := range map[string]field.Want{"g": field.WantG | field.WantErr, "all": everyWant} {
			b.Run(c.name+"/"+name, func(b *testing.B) {
				const n = 16
				x := make([]r3.Vec, n)
				for i := range x {
					x[i] = r3.Add(c.x, r3.Vec{Z: float64(i) * 1e-12})
				}
				pts, dst := field.PointsOf(x...), field.NewValues(n, want)
				b.ReportAllocs()
				for b.Loop() {
					c.src.Evaluate(dst, pts, field.Mean)
				}
				b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N)/n, "ns/point")
			})
		}
	}
}

func TestRingAllocs(t *testing.T) {
	for _, c := range ringBenches() {
		pts, dst := field.PointsOf(c.x, c.x), field.NewValues(2, everyWant)
		if n := testing.AllocsPerRun(5, func() { c.src.Evaluate(dst, pts, field.Mean) }); n > 0 {
			t.Errorf("%s: %v allocations", c.name, n)
		}
		f := c.src.(field.Source)
		if n := testing.AllocsPerRun(5, func() { f.Field(c.x) }); n > 0 {
			t.Errorf("%s: Field makes %v allocations", c.name, n)
		}
	}
}

// TestRingScale checks that bodies and points scaled by a power of two give the same bits.
func TestRingScale(t *testing.T) {
	p := r3.Vec{X: 0.6, Y: 0.3, Z: -1}
	build := func(s float64) []field.Source {
		shape := geom.Tube{Inner: 0.25 * s, Outer: s, Height: 1.5 * s}
		return []field.Source{
			must(NewCone(geom.Cone{Bottom: s, Top: 0.5 * s, Height: 1.5 * s}, p)),
			must(NewTorus(geom.Torus{Major: s, Minor: 0.25 * s}, p)),
			must(NewAxialPower(shape, 1/(s*s), 2)),
			must(NewRadialPower(shape, 1/(s*s), 2)),
			must(NewAxialPowerCone(geom.Cone{Bottom: s, Top: 0.5 * s, Height: 1.5 * s}, 1/(s*s), 2)),
			must(NewAffineCone(geom.Cone{Bottom: s, Top: 0.5 * s, Height: 1.5 * s}, field.Affine{Value: p, Gradient: [3][3]float64{{0: 1 / s, 2: 2 / s}, 2: {1: 1 / s}}})),
		}
	}
	one := build(1)
	for _, power := range []int{-120, -1, 3, 150} { // within 1e-60 and 1e60
		s := math.Ldexp(1, power)
		for i, src := range build(s) {
			for _, x := range []r3.Vec{{X: 0.9, Y: 0.1, Z: 0.3}, {X: 0.74, Z: 1e-7}, {X: 1.25, Z: 1e-9}, {}, {X: 0.3, Z: 0.75}, {X: 3, Y: 2, Z: 5}} {
				a, b := field.At(one[i], x, field.Mean, everyWant), field.At(src, r3.Scale(s, x), field.Mean, everyWant)
				if a.G != b.G || a.Phi*s != b.Phi || a.Status != b.Status || a.Grad[1] != b.Grad[1]*s && a.Grad[1] == a.Grad[1] || a.ErrG != b.ErrG {
					t.Errorf("source %d times 2^%d at %v: %v, want %v", i, power, x, b, a)
				}
			}
		}
	}
}

// TestRingPlaces checks statuses and sides on faces, rims and tips.
func TestRingPlaces(t *testing.T) {
	p := r3.Vec{X: 0.6, Z: -1}
	tip := must(NewCone(geom.Cone{Bottom: 1, Top: 0, Height: 2}, p))
	straight := must(NewCone(geom.Cone{Bottom: 1, Top: 1, Height: 2}, r3.Vec{Z: 1}))
	torus := must(NewTorus(geom.Torus{Major: 1, Minor: 0.25}, p))
	shape := geom.Tube{Inner: 0.5, Outer: 1, Height: 2}
	axial, radial := must(NewAxialPower(shape, 2, 3)), must(NewRadialPower(shape, 2, 2))
	affine := must(NewAffineCone(geom.Cone{Bottom: 1, Top: 0, Height: 2}, field.Affine{Value: p, Gradient: [3][3]float64{0: {0: 1}, 2: {1: 2}}}))
	power := must(NewAxialPowerCone(geom.Cone{Bottom: 1, Top: 0, Height: 2}, 2, 2))
	none := must(NewRadialPower(shape, 0, 2))
	s := 1 / math.Sqrt(5)
	for _, c := range []struct {
		name   string
		src    field.Source
		x      r3.Vec
		status field.Status
		normal r3.Vec
		sigma  float64
	}{
		{"tip", tip, r3.Vec{Z: 1}, field.OnEdge, r3.Vec{}, 0},
		{"rim of the bottom", tip, r3.Vec{Y: 1, Z: -1}, field.OnEdge, r3.Vec{}, 0},
		{"bottom", tip, r3.Vec{Y: 0.5, Z: -1}, field.OnFace, r3.Vec{Z: -1}, 1},
		{"slanted wall", tip, r3.Vec{X: 0.5}, field.OnFace, r3.Vec{X: 2 * s, Z: s}, 1.2*s - s},
		{"in the plane of the bottom", tip, r3.Vec{Y: 1.5, Z: -1}, field.Regular, r3.Vec{}, 0},
		{"wall without charge", straight, r3.Vec{X: 1}, field.Regular, r3.Vec{}, 0},
		{"rim of the top", straight, r3.Vec{X: 1, Z: 1}, field.OnEdge, r3.Vec{}, 0},
		{"tip, affine", affine, r3.Vec{Z: 1}, field.OnEdge, r3.Vec{}, 0},
		{"rim, affine", affine, r3.Vec{Y: 1, Z: -1}, field.OnEdge, r3.Vec{}, 0},
		{"bottom, affine", affine, r3.Vec{Y: 0.5, Z: -1}, field.OnFace, r3.Vec{Z: -1}, 0},
		{"slanted wall, affine", affine, r3.Vec{X: 0.5}, field.OnFace, r3.Vec{X: 2 * s, Z: s}, 2.2*s - s},
		{"in the plane of the bottom, affine", affine, r3.Vec{Y: 1.5, Z: -1}, field.Regular, r3.Vec{}, 0},
		{"tip, power", power, r3.Vec{Z: 1}, field.OnEdge, r3.Vec{}, 0},
		{"bottom, power", power, r3.Vec{Y: 0.5, Z: -1}, field.OnFace, r3.Vec{Z: -1}, -2},
		{"slanted wall, power", power, r3.Vec{Y: 0.25, Z: 0.5}, field.OnFace, r3.Vec{Y: 2 * s, Z: s}, 0.5 * s},
		{"outer side of the torus", torus, r3.Vec{X: 1.25}, field.OnFace, r3.Vec{X: 1}, 0.6},
		{"inner side of the torus", torus, r3.Vec{X: 0.75}, field.OnFace, r3.Vec{X: -1}, -0.6},
		{"top of the torus", torus, r3.Vec{Y: 1, Z: 0.25}, field.OnFace, r3.Vec{Z: 1}, -1},
		{"within the torus", torus, r3.Vec{Y: 1}, field.Regular, r3.Vec{}, 0},
		{"top", axial, r3.Vec{X: 0.75, Z: 1}, field.OnFace, r3.Vec{Z: 1}, 2},
		{"bottom of an odd power", axial, r3.Vec{X: 0.75, Z: -1}, field.OnFace, r3.Vec{Z: -1}, 2},
		{"wall of an axial power", axial, r3.Vec{X: 1}, field.Regular, r3.Vec{}, 0},
		{"rim of an axial power", axial, r3.Vec{X: 0.5, Z: 1}, field.OnEdge, r3.Vec{}, 0},
		{"outer wall", radial, r3.Vec{X: 1}, field.OnFace, r3.Vec{X: 1}, 2},
		{"inner wall", radial, r3.Vec{X: 0.5}, field.OnFace, r3.Vec{X: -1}, -0.5},
		{"end of a radial power", radial, r3.Vec{X: 0.75, Z: 1}, field.Regular, r3.Vec{}, 0},
		{"no charge", none, r3.Vec{X: 1, Z: 1}, field.Regular, r3.Vec{}, 0},
		{"no number", radial, r3.Vec{X: math.NaN()}, field.BadInput, r3.Vec{}, 0},
	} {
		mean := field.At(c.src, c.x, field.Mean, everyWant)
		if mean.Status != c.status {
			t.Errorf("%s: status %v, want %v", c.name, mean.Status, c.status)
		}
		if c.status < field.BadInput && !(math.Abs(mean.Phi) < 10) {
			t.Errorf("%s: phi %v, want a finite value", c.name, mean.Phi)
		}
		if c.status != field.OnFace {
			continue
		}
		in, out := field.At(c.src, c.x, field.Inside, everyWant), field.At(c.src, c.x, field.Outside, everyWant)
		jump, half := r3.Sub(out.G, in.G), r3.Scale(0.5, r3.Add(out.G, in.G))
		if e := r3.Norm(r3.Sub(jump, r3.Scale(c.sigma, c.normal))); e > 1e-14 { // 50 u of both sides
			t.Errorf("%s: the field steps by %v, want %v along %v", c.name, jump, c.sigma, c.normal)
		}
		if e := r3.Norm(r3.Sub(half, mean.G)); e > 1e-14 { // as above
			t.Errorf("%s: mean %v, want %v", c.name, mean.G, half)
		}
		const d = 1e-9
		for sign, want := range map[float64]field.Value{1: out, -1: in} {
			got := field.At(c.src, r3.Add(c.x, r3.Scale(sign*d, c.normal)), field.Mean, everyWant)
			if e := r3.Norm(r3.Sub(got.G, want.G)); e > 20*d || got.Status != field.Regular { // |grad g| is below 20
				t.Errorf("%s: at %v off the face %v, on it %v", c.name, sign*d, got.G, want.G)
			}
		}
	}
}

// TestRingRefusals checks that what is no body or polarization is refused.
func TestRingRefusals(t *testing.T) {
	refuse := func(name string, err error) {
		t.Helper()
		if err == nil {
			t.Errorf("%s: accepted", name)
		}
	}
	shape := geom.Tube{Outer: 1, Height: 1}
	_, err := NewCone(geom.Cone{Bottom: 1, Top: -1, Height: 1}, r3.Vec{})
	refuse("cone of negative radius", err)
	_, err = NewCone(geom.Cone{Bottom: 1, Top: 1, Height: 1}, r3.Vec{X: math.Inf(1)})
	refuse("infinite polarization", err)
	_, err = NewTorus(geom.Torus{Major: 1, Minor: 1}, r3.Vec{})
	refuse("closed torus", err)
	_, err = NewAffineCone(geom.Cone{Bottom: 1, Top: -1, Height: 1}, field.Affine{})
	refuse("affine cone of negative radius", err)
	_, err = NewAffineCone(geom.Cone{Bottom: 1, Height: 1}, field.Affine{Gradient: [3][3]float64{{math.NaN()}}})
	refuse("gradient that is no number", err)
	_, err = NewAxialPowerCone(geom.Cone{Bottom: 1, Height: 1}, 1, -1)
	refuse("negative axial power of a cone", err)
	_, err = NewAxialPowerCone(geom.Cone{Bottom: 1, Height: 1}, math.Inf(1), 2)
	refuse("infinite factor", err)
	_, err = NewAxialPower(shape, 1, -1)
	refuse("negative axial power", err)
	_, err = NewRadialPower(shape, 1, -1)
	refuse("negative radial power on the axis", err)
	_, err = NewRadialPower(shape, math.NaN(), 1)
	refuse("factor that is no number", err)
	_, err = NewRadialPower(shape, 1, math.NaN())
	refuse("power that is no number", err)
	_, err = NewAxialPower(geom.Tube{Inner: 2, Outer: 1, Height: 1}, 1, 1)
	refuse("tube turned inside out", err)
}
