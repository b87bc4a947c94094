package force

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// TestBoxesRounding scales boxes of any slenderness by 1.37, which rounds everything anew: the difference stays below the estimate.
func TestBoxesRounding(t *testing.T) {
	rnd := rand.New(rand.NewPCG(1, 2))
	vec := func() [3]float64 { return [3]float64{rnd.NormFloat64(), rnd.NormFloat64(), rnd.NormFloat64()} }
	norm := func(v [3]float64) float64 { return math.Sqrt(v[0]*v[0] + v[1]*v[1] + v[2]*v[2]) }
	for i := range 2000 {
		slender := math.Pow(10, 3*float64(i)/2000)
		var c corners
		for k := range 3 {
			c.on[k], c.from[k] = math.Pow(slender, rnd.Float64())*(0.5+rnd.Float64()), math.Pow(slender, rnd.Float64())*(0.5+rnd.Float64())
			c.d[k] = 2 * (rnd.Float64() - 0.5) * (c.on[k] + c.from[k])
		}
		k := rnd.IntN(3)
		c.d[k] = (c.on[k] + c.from[k]) * (1 + 2*rnd.Float64()*rnd.Float64())
		p, q := vec(), vec()
		b := c
		const s = 1.37
		for k := range 3 {
			b.on[k], b.from[k], b.d[k] = s*c.on[k], s*c.from[k], s*c.d[k]
		}
		c.sum(&p, &q)
		b.sum(&p, &q)
		n := norm(p) * norm(q) * lost
		var df, dt [3]float64
		for k := range 3 {
			df[k], dt[k] = b.force[k]/(s*s)-c.force[k], b.torque[k]/(s*s*s)-c.torque[k]
		}
		if norm(df) > n*c.sizes2 || norm(dt) > n*c.sizes3 || math.Abs(b.energy/(s*s*s)-c.energy) > n*c.sizes3 {
			t.Fatalf("%+v: rounding %.3g %.3g beyond the estimates %.3g %.3g", c, norm(df), norm(dt), n*c.sizes2, n*c.sizes3)
		}
	}
}

// TestBoxesFaces compares the closed form with integration over faces, for any polarizations, apart and in contact, from both sides.
func TestBoxesFaces(t *testing.T) {
	d := draw{rand.New(rand.NewPCG(3, 4))}
	turn, err := geom.Turn(d.vec(), 50)
	if err != nil {
		t.Fatal(err)
	}
	for _, space := range []float64{0, 0, 0.1, 0.5, 1.5} {
		size := func() r3.Vec { return r3.Vec{X: d.in(0.3, 1.2), Y: d.in(0.3, 1.2), Z: d.in(0.3, 1.2)} }
		s1, s2 := size(), size()
		at := r3.Vec{X: d.in(-0.3, 0.3), Y: d.in(-0.3, 0.3), Z: (s1.Z+s2.Z)/2 + space}
		a := uniform(t, geom.At(geom.Box{Size: s1}, geom.Translate(at).Then(turn)), d.vec())
		b := uniform(t, geom.At(geom.Box{Size: s2}, turn), d.vec())
		p, _ := partOf(a)
		q, _ := partOf(b)
		g, set := goal{accuracy: 1e-8, reach: 1}, Settings{Accuracy: 1e-8, About: d.vec(), MaxNodes: 200_000}
		one, ok := boxes(&p, &other{src: b, factor: 1, charge: b}, g, set.About)
		two, ok2 := boxes(&q, &other{src: a, factor: 1, charge: a}, g, set.About)
		if !ok || !ok2 {
			t.Fatalf("no closed form at %g", space)
		}
		two = two.reaction()
		integrated, err := acting(a, b, set)
		if err != nil {
			t.Fatal(err)
		}
		for _, o := range []outcome{two, integrated} {
			miss := one.total.distance(&o.total, 1, false)
			for k, e := range miss {
				if e > one.error[k]+o.error[k] {
					t.Errorf("at %g: quantity %d differs by %.3g, estimates %.3g and %.3g", space, k, e, one.error[k], o.error[k])
				}
			}
			if v := one.total.values(1, false); miss[0] > 1e-7*v[0] { // asked for 1e-8
				t.Errorf("at %g: force differs by %.3g of %.3g", space, miss[0], v[0])
			}
		}
	}
}
