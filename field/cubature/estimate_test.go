package cubature_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/element"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/integrate/quad"
	"gonum.org/v1/gonum/spatial/r3"

	"example.com/boundpole/field/cubature"
)

// TestEstimates holds estimates against closed forms at 3000 random points, most of them close to faces, rims, seams and tips.
func TestEstimates(t *testing.T) {
	rng := rand.New(rand.NewPCG(7, 8))
	few, many := 100, 700
	if testing.Short() {
		few, many = 50, 150
	}
	disc, err := element.NewDisc(geom.Disc{Radius: 1}, 1)
	if err != nil {
		t.Fatal(err)
	}
	p := r3.Vec{X: 0.3, Y: -0.5, Z: 0.8}
	h := r3.Vec{X: 0.5, Y: 0.35, Z: 0.8}
	box := geom.Box{Size: r3.Scale(2, h)}
	sphere := newLayer(t, sphere(), func(_, n r3.Vec) float64 { return r3.Dot(p, n) }, &cubature.Settings{Neutral: true})
	tips := newLayer(t, []geom.Chart{globe{0, 0.5}, globe{0.5, 1}}, func(_, n r3.Vec) float64 { return r3.Dot(p, n) }, &cubature.Settings{Neutral: true})
	ball := element.Sphere{Shape: geom.Sphere{Radius: 1}, P: p}
	off := func() r3.Vec { return r3.Scale(1+offset(rng, -12, 0.5), onSphere(rng)) }
	var sum score
	for _, c := range []struct {
		name     string
		src, ref field.Source
		points   int
		at       func() r3.Vec
	}{
		{"sphere", sphere, ball, few, off},
		{"sphere with tips", tips, ball, few, off},
		{"disc", newLayer(t, ring(0, 0, 1, 0), func(_, _ r3.Vec) float64 { return 1 }, nil), disc, many, func() r3.Vec {
			f := 2 * math.Pi * rng.Float64()
			r := []float64{1 + offset(rng, -12, 0), 2 * rng.Float64(), math.Pow(10, -12*rng.Float64())}[rng.IntN(3)]
			return r3.Vec{X: r * math.Cos(f), Y: r * math.Sin(f), Z: offset(rng, -12, 0.5)}
		}},
		{"box", newLayer(t, boxFaces(h), func(_, n r3.Vec) float64 { return r3.Dot(p, n) }, &cubature.Settings{Neutral: true}),
			element.NewPolyhedron(box.Polyhedron(), field.Affine{Value: p}), many, func() r3.Vec {
				c := [3]float64{h.X, h.Y, h.Z}
				for k := range c {
					if rng.IntN(2) == 0 {
						c[k] += offset(rng, -12, 0)
					} else {
						c[k] *= 2*rng.Float64() - 1
					}
				}
				return vec(c)
			}},
	} {
		var s score
		want := field.WantPhi | field.WantG | field.WantErr
		for range c.points {
			x := c.at()
			s.take(t, c.name, x, field.At(c.src, x, field.Mean, want), field.At(c.ref, x, field.Mean, want), want)
		}
		t.Logf("%s: %d of %d untrue, %d unconverged, median overestimate %.0f of phi, %.0f of g, worst %.2g, %.2g", c.name, s.untrue, s.points,
			s.unconverged, s.median(0), s.median(1), s.worst[0], s.worst[1])
		sum.untrue, sum.points = sum.untrue+s.untrue, sum.points+s.points
		if s.median(0) > 100 || s.median(1) > 100 { // the contract
			t.Errorf("%s: median overestimate %.3g of phi, %.3g of g; both at most 100", c.name, s.median(0), s.median(1))
		}
	}
	if sum.untrue > sum.points/1000 { // the contract
		t.Errorf("%d of %d estimates are below the error; at most one in a thousand", sum.untrue, sum.points)
	}
}

// TestAllocations: nothing is allocated once tables and work space are there.
func TestAllocations(t *testing.T) {
	l := newLayer(t, sphere(), func(_, n r3.Vec) float64 { return n.Z }, nil)
	v := newVolume(t, []geom.Block{brick{r3.Vec{X: 1, Y: 1, Z: 1}}}, one)
	for name, src := range map[string]field.Evaluator{"layer": l, "volume": v} {
		dst := field.NewValues(3, all)
		at := field.PointsOf(r3.Vec{X: 0.5, Y: 0.3, Z: 0.9}, r3.Vec{X: 1.3, Y: 0.4}, r3.Vec{X: 30})
		src.Evaluate(dst, at, field.Mean)
		if n := testing.AllocsPerRun(3, func() { src.Evaluate(dst, at, field.Mean) }); n > 0 {
			t.Errorf("%s: %v allocations for three points, want 0", name, n)
		}
	}
}

// TestBatch: a batch gives the same bits as its points one by one, whatever else is asked for.
func TestBatch(t *testing.T) {
	l := newLayer(t, sphere(), func(_, n r3.Vec) float64 { return n.Z }, nil)
	x := []r3.Vec{{X: 1.1}, {X: 0.3, Y: 0.4, Z: 0.86}, {Z: 7}}
	dst := field.NewValues(len(x), field.WantG)
	l.Evaluate(dst, field.PointsOf(x...), field.Mean)
	for i := range x {
		if g := l.Field(x[i]); g != dst.At(i).G {
			t.Errorf("at %v: %v in the batch, %v alone", x[i], dst.At(i).G, g)
		}
	}
}

// nested integrates g of the sphere with cosine charge by one-dimensional rules within rules, n points each, as is done
// without a library.
func nested(charts []geom.Chart, x r3.Vec, n int) (g r3.Vec) {
	for _, c := range charts {
		for k := range 3 {
			v := quad.Fixed(func(a float64) float64 {
				return quad.Fixed(func(b float64) float64 {
					r, xu, xv := c.At(a, b)
					d := r3.Sub(x, r)
					area := r3.Cross(xu, xv)
					q := r3.Norm(d)
					return r.Z * r3.Norm(area) * [3]float64{d.X, d.Y, d.Z}[k] / (4 * math.Pi * q * q * q)
				}, 0, 1, n, nil, 0)
			}, 0, 1, n, nil, 0)
			switch k {
			case 0:
				g.X += v
			case 1:
				g.Y += v
			case 2:
				g.Z += v
			}
		}
	}
	return g
}

// closeBy is a point a tenth of the size off the sphere.
var closeBy = r3.Scale(1.1, r3.Vec{X: 0.36, Y: 0.48, Z: 0.8})

// TestNested says how many points a nested rule needs for 1e-9 at closeBy, which the benchmark uses.
func TestNested(t *testing.T) {
	want := element.Sphere{Shape: geom.Sphere{Radius: 1}, P: r3.Vec{Z: 1}}.Field(closeBy)
	if e := r3.Norm(r3.Sub(nested(sphere(), closeBy, nestedPoints), want)); e > 1e-9 {
		t.Errorf("%d nested points err by %.3g", nestedPoints, e)
	}
	if e := r3.Norm(r3.Sub(nested(sphere(), closeBy, nestedPoints*8/10), want)); e < 1e-9 {
		t.Errorf("%d nested points would do: error %.3g", nestedPoints*8/10, e)
	}
}

const nestedPoints = 66

func BenchmarkNested(b *testing.B) {
	c := sphere()
	b.ResetTimer()
	for range b.N {
		nested(c, closeBy, nestedPoints)
	}
}

func BenchmarkLayerNear(b *testing.B) {
	l := newLayer(b, sphere(), func(_, n r3.Vec) float64 { return n.Z }, &cubature.Settings{Accuracy: 1e-9})
	l.Field(closeBy)
	b.ReportAllocs()
	b.ResetTimer()
	for range b.N {
		l.Field(closeBy)
	}
}

func BenchmarkLayerNearDefault(b *testing.B) {
	l := newLayer(b, sphere(), func(_, n r3.Vec) float64 { return n.Z }, nil)
	l.Field(closeBy)
	b.ResetTimer()
	for range b.N {
		l.Field(closeBy)
	}
}

func BenchmarkVolumeInside(b *testing.B) {
	v := newVolume(b, []geom.Block{brick{r3.Vec{X: 1, Y: 1, Z: 1}}}, one)
	v.Field(r3.Vec{X: 0.2, Y: 0.3, Z: 0.5})
	b.ReportAllocs()
	b.ResetTimer()
	for range b.N {
		v.Field(r3.Vec{X: 0.2, Y: 0.3, Z: 0.5})
	}
}
