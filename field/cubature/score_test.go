package cubature_test

import (
	"math"
	"math/rand/v2"
	"sort"
	"testing"

	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

func frobenius(g [6]float64) float64 {
	return math.Sqrt(g[0]*g[0] + g[1]*g[1] + g[2]*g[2] + 2*(g[3]*g[3]+g[4]*g[4]+g[5]*g[5]))
}

// score counts how good values and estimates are.
type score struct {
	points, untrue, unconverged int
	worst                       [3]float64 // errors
	over                        [3][]float64
}

// take compares a value with the reference. The reference counts as rounded by as much as it says itself.
func (s *score) take(t *testing.T, name string, x r3.Vec, v, ref field.Value, want field.Want) {
	t.Helper()
	s.points++
	if v.Status == field.NotConverged {
		s.unconverged++
	}
	var d [6]float64
	for i := range d {
		d[i] = v.Grad[i] - ref.Grad[i]
	}
	got := [3]float64{math.Abs(v.Phi - ref.Phi), r3.Norm(r3.Sub(v.G, ref.G)), frobenius(d)}
	est := [3]float64{v.ErrPhi, v.ErrG, v.ErrGrad}
	own := [3]float64{ref.ErrPhi, ref.ErrG, ref.ErrGrad}
	size := [3]float64{math.Abs(ref.Phi), r3.Norm(ref.G), frobenius(ref.Grad)}
	for k := range got {
		if want&(field.WantPhi<<k) == 0 || k == 1 && v.Status == field.OnEdge || math.IsInf(est[k], 1) {
			continue
		}
		if v.Status != field.NotConverged {
			s.worst[k] = max(s.worst[k], got[k])
		}
		s.over[k] = append(s.over[k], est[k]/max(got[k], u*size[k], 1e-300))
		if !(got[k] <= est[k]+own[k]) {
			s.untrue++
			t.Logf("%s at %v: quantity %d errs by %.3g, estimate %.3g (%v)", name, x, k, got[k], est[k], v.Status)
		}
	}
}

// median returns the median overestimate of a quantity.
func (s *score) median(k int) float64 {
	if len(s.over[k]) == 0 {
		return 0
	}
	sort.Float64s(s.over[k])
	return s.over[k][len(s.over[k])/2]
}

// onSphere returns a random direction, one in three close to a seam of the charts or a pole.
func onSphere(rng *rand.Rand) r3.Vec {
	d := r3.Vec{X: rng.NormFloat64(), Y: rng.NormFloat64(), Z: rng.NormFloat64()}
	if rng.IntN(3) == 0 {
		at := [...]r3.Vec{{Z: 1}, {X: 1, Z: 1}, {X: 1, Y: 1, Z: 1}, {Y: 1}, {Y: 1, Z: 1}, {X: -1, Y: .3, Z: 1}}[rng.IntN(6)]
		d = r3.Add(at, r3.Scale(math.Pow(10, -15*rng.Float64()), d))
	}
	return r3.Unit(d)
}

// offset returns a distance with a random sign and a power of ten between lo and hi.
func offset(rng *rand.Rand, lo, hi float64) float64 {
	d := math.Pow(10, lo+(hi-lo)*rng.Float64())
	if rng.IntN(2) == 0 {
		return -d
	}
	return d
}
