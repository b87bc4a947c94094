package element

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Close to faces, edges and corners the gradient is the difference of g over pairs of points a 512th of the distance
// apart, and its claim holds.
func TestSectorGradientNear(t *testing.T) {
	rng := rand.New(rand.NewPCG(21, 1))
	for _, c := range []struct {
		name   string
		p      field.Affine
		radial float64
	}{{"affine", sectorAffine, 0}, {"radial", field.Affine{}, 1}} {
		a := must(NewArc(geom.ArcDegrees(0.5, 1, 1.25, -15, 60), c.p, c.radial))
		worst, worstClaim, count := 0.0, 0.0, 0
		for range 300 {
			q := field.Point{X: pair.VecOf(sectorNear(rng))}
			p := a.sector.at(q)
			v := a.sector.value(q, field.Mean, field.WantG|field.WantGrad|field.WantErr)
			d := p.clear(a.sector)
			if v.Status != field.Regular || d < 1e-13 || a.sector.covers(q) {
				continue
			}
			h := math.Ldexp(1, math.Ilogb(d)-9)
			var slope [3]r3.Vec
			for k := range slope {
				var g [4]r3.Vec
				for j, s := range [4]float64{h, -h, 2 * h, -2 * h} {
					y := q
					switch k {
					case 0:
						y.X.X = y.X.X.AddFloat(s)
					case 1:
						y.X.Y = y.X.Y.AddFloat(s)
					case 2:
						y.X.Z = y.X.Z.AddFloat(s)
					}
					g[j] = a.sector.value(y, field.Mean, field.WantG).G
				}
				one, two := r3.Scale(0.5/h, r3.Sub(g[0], g[1])), r3.Scale(0.25/h, r3.Sub(g[2], g[3]))
				slope[k] = r3.Add(one, r3.Scale(1.0/3, r3.Sub(one, two)))
			}
			want := [6]float64{slope[0].X, slope[1].Y, slope[2].Z, slope[0].Y, slope[0].Z, slope[1].Z}
			off := 0.0
			for i := range want {
				off = max(off, math.Abs(want[i]-v.Grad[i]))
			}
			count++
			scale := max(1, r3.Norm(v.G)) / d
			worst, worstClaim = max(worst, off/scale), max(worstClaim, v.ErrGrad/scale)
			if !(off < 1e-10*scale) { // the differences leave 4 (1/512)^4, rounding is 512 u
				t.Errorf("%s at %v: gradient %v, by differences %v", c.name, q.X.Value(), v.Grad, want)
			}
		}
		if count < 150 || !(worstClaim < 1e-12) { // 1e-9 is the contract
			t.Errorf("%s: %d points, claims up to %.2g of |g|/distance", c.name, count, worstClaim)
		}
		t.Logf("%s: gradient off by %.2g of |g|/distance, claims up to %.2g, %d points", c.name, worst, worstClaim, count)
	}
}
