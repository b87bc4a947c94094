package geom

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// corners returns the corners of a box.
func corners(b r3.Box) (c [8]r3.Vec) {
	for i := range c {
		c[i] = b.Min
		if i&1 != 0 {
			c[i].X = b.Max.X
		}
		if i&2 != 0 {
			c[i].Y = b.Max.Y
		}
		if i&4 != 0 {
			c[i].Z = b.Max.Z
		}
	}
	return c
}

// The box contains the corners to the last bit and touches them: a number inward of any side leaves one out.
func TestPosedBox(t *testing.T) {
	rng := rand.New(rand.NewPCG(32, 1))
	for range 500 {
		b := include(include(nothing(), r3.Scale(math.Exp(3*rng.NormFloat64()), randomVec(rng))), randomVec(rng))
		for _, p := range []Pose{{}, Translate(randomVec(rng)), mustTurn(t, axisY, 90), randomPose(t, rng, 100)} {
			box := PosedBox(b, p)
			var low, high [3]int // corners beyond the number inward of each side
			for _, c := range corners(b) {
				x := p.ToOuter(pair.VecOf(c))
				for i, v := range [3]pair.Float{x.X, x.Y, x.Z} {
					min, max := [3]float64{box.Min.X, box.Min.Y, box.Min.Z}[i], [3]float64{box.Max.X, box.Max.Y, box.Max.Z}[i]
					slip := pairs * (math.Abs(min) + math.Abs(max) + 1e3) // the corner itself is rounded in pairs
					if v.AddFloat(-min).Value() < -slip || v.AddFloat(-max).Value() > slip {
						t.Fatalf("corner %v is outside %v", x, box)
					}
					if v.Less(pair.Of(math.Nextafter(min, math.Inf(1)))) {
						low[i]++
					}
					if pair.Of(math.Nextafter(max, math.Inf(-1))).Less(v) {
						high[i]++
					}
				}
			}
			for i := range low {
				if low[i] == 0 || high[i] == 0 {
					t.Fatalf("%v posed by %v: %v does not touch the corners along axis %d", b, p, box, i)
				}
			}
		}
	}
}

func TestPosedBoxSpecial(t *testing.T) {
	inf, nan := math.Inf(1), math.NaN()
	all := r3.Box{Min: r3.Vec{X: -inf, Y: -inf, Z: -inf}, Max: r3.Vec{X: inf, Y: inf, Z: inf}}
	slab := r3.Box{Min: r3.Vec{X: -inf, Y: -inf, Z: -1}, Max: r3.Vec{X: inf, Y: inf, Z: 1}}
	half := r3.Box{Min: r3.Vec{X: 2, Y: -inf, Z: -inf}, Max: r3.Vec{X: inf, Y: inf, Z: inf}}
	quarter, lean := mustTurn(t, axisY, 90), mustTurn(t, r3.Vec{X: 1, Y: 1, Z: 3}, 40)
	for _, c := range []struct {
		name    string
		b, want r3.Box
		pose    Pose
	}{
		{"all of space, moved", all, all, Translate(axisX)},
		{"all of space, turned", all, all, lean},
		{"slab, moved", slab, r3.Box{Min: r3.Vec{X: -inf, Y: -inf, Z: 2}, Max: r3.Vec{X: inf, Y: inf, Z: 4}}, Translate(r3.Vec{X: 7, Z: 3})},
		{"slab, a quarter turn", slab, r3.Box{Min: r3.Vec{X: -1, Y: -inf, Z: -inf}, Max: r3.Vec{X: 1, Y: inf, Z: inf}}, quarter},
		{"slab, turned", slab, all, lean},
		{"half space, a quarter turn", half, r3.Box{Min: r3.Vec{X: -inf, Y: -inf, Z: -inf}, Max: r3.Vec{X: inf, Y: inf, Z: -2}}, quarter},
		{"half space, half a turn", half, r3.Box{Min: all.Min, Max: r3.Vec{X: -2, Y: inf, Z: inf}}, mustTurn(t, axisZ, 180)},
		{"empty", nothing(), nothing(), lean},
		{"empty along y", r3.Box{Min: r3.Vec{Y: 1}, Max: r3.Vec{X: 1, Z: 1}}, r3.Box{Min: r3.Vec{Y: 1}, Max: r3.Vec{X: 1, Z: 1}}, lean},
		{"a point", r3.Box{Min: axisX, Max: axisX}, r3.Box{Min: r3.Vec{Z: -1}, Max: r3.Vec{Z: -1}}, quarter},
	} {
		if got := PosedBox(c.b, c.pose); got != c.want {
			t.Errorf("%s: %v, want %v", c.name, got, c.want)
		}
	}
	if got := PosedBox(r3.Box{Max: r3.Vec{X: nan}}, lean); !math.IsNaN(got.Max.X) {
		t.Errorf("a box with NaN became %v", got)
	}
}
