package element

import (
	"math"
	"math/big"
	"math/rand/v2"
	"slices"
	"sync"
	"testing"

	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

const bits = 300 // of the reference arithmetic

func num(x float64) *big.Float { return new(big.Float).SetPrec(bits).SetFloat64(x) }
func mul(a ...*big.Float) *big.Float {
	p := num(1)
	for _, f := range a {
		p.Mul(p, f)
	}
	return p
}
func add(a ...*big.Float) *big.Float {
	s := num(0)
	for _, f := range a {
		s.Add(s, f)
	}
	return s
}

// fourPi by Machin's formula, pi = 16 atan(1/5) - 4 atan(1/239).
var fourPi = sync.OnceValue(func() *big.Float {
	atanInv := func(n float64) *big.Float {
		sum, power := num(0), new(big.Float).Quo(num(1), num(n))
		for k := 1.0; k < 450; k += 2 {
			term := new(big.Float).Quo(power, num(k))
			if int(k)%4 == 1 {
				sum.Add(sum, term)
			} else {
				sum.Sub(sum, term)
			}
			power.Quo(power, num(n*n))
		}
		return sum
	}
	return mul(num(4), new(big.Float).Sub(mul(num(16), atanInv(5)), mul(num(4), atanInv(239))))
})

// multipole returns phi, g and its gradient of a charge and a dipole at c, in multiprecision from the textbook sums
// over d = x - c without a unit vector.
func multipole(c r3.Vec, charge float64, moment, x r3.Vec) [10]*big.Float {
	sub := func(a, b float64) *big.Float { return new(big.Float).SetPrec(bits).Sub(num(a), num(b)) }
	d := [3]*big.Float{sub(x.X, c.X), sub(x.Y, c.Y), sub(x.Z, c.Z)}
	m := [3]*big.Float{num(moment.X), num(moment.Y), num(moment.Z)}
	q := num(charge)
	r2 := add(mul(d[0], d[0]), mul(d[1], d[1]), mul(d[2], d[2]))
	r := new(big.Float).SetPrec(bits).Sqrt(r2)
	inv := func(n int) *big.Float { // 1/(4 pi r^n)
		f := new(big.Float).Quo(num(1), fourPi())
		for range n {
			f.Quo(f, r)
		}
		return f
	}
	md := add(mul(m[0], d[0]), mul(m[1], d[1]), mul(m[2], d[2]))
	var v [10]*big.Float
	v[0] = add(mul(q, inv(1)), mul(md, inv(3)))
	for i := range 3 {
		v[1+i] = add(mul(q, d[i], inv(3)), mul(num(3), md, d[i], inv(5)), mul(num(-1), m[i], inv(3)))
	}
	for k, ij := range [6][2]int{{0, 0}, {1, 1}, {2, 2}, {0, 1}, {0, 2}, {1, 2}} {
		i, j := ij[0], ij[1]
		delta := num(0)
		if i == j {
			delta = num(1)
		}
		v[4+k] = add(mul(q, delta, inv(3)), mul(num(-3), q, d[i], d[j], inv(5)),
			mul(num(3), add(mul(m[i], d[j]), mul(m[j], d[i]), mul(delta, md)), inv(5)), mul(num(-15), md, d[i], d[j], inv(7)))
	}
	return v
}

func TestPointDipoleReference(t *testing.T) {
	rng := rand.New(rand.NewPCG(3, 4))
	for _, c := range []struct {
		name string
		tol  float64 // 18 u: 12 roundings of up to 1.5 u for the gradient of a charge; 27 u: half as many again for a dipole
	}{{"Point", 2e-15}, {"Dipole", 3e-15}} {
		var worst [3]float64
		var over [3][]float64
		for range 4000 {
			at0 := r3.Vec{X: rng.NormFloat64(), Y: rng.NormFloat64(), Z: rng.NormFloat64()}
			x := r3.Add(at0, r3.Scale(math.Exp2(40*rng.Float64()-20), unit(rng)))
			charge, moment := rng.NormFloat64(), r3.Vec{}
			var src field.Evaluator = Point{at0, charge}
			if c.name == "Dipole" {
				charge, moment = 0, r3.Vec{X: rng.NormFloat64(), Y: rng.NormFloat64(), Z: rng.NormFloat64()}
				src = Dipole{at0, moment}
			}
			v, ref := at(src, x, field.Mean), multipole(at0, charge, moment, x)
			diff := func(got float64, k int) (d, size float64) {
				size, _ = ref[k].Float64()
				d, _ = add(num(got), mul(num(-1), ref[k])).Float64()
				return d, size
			}
			got := [10]float64{v.Phi, v.G.X, v.G.Y, v.G.Z, v.Grad[0], v.Grad[1], v.Grad[2], v.Grad[3], v.Grad[4], v.Grad[5]}
			var err, size [3]float64
			for k := range got {
				group, weight := 0, 1.0
				if k > 0 {
					group = 1
				}
				if k > 3 {
					group = 2
				}
				if k > 6 {
					weight = math.Sqrt2 // twice in the Frobenius norm
				}
				d, s := diff(got[k], k)
				err[group], size[group] = math.Hypot(err[group], weight*d), math.Hypot(size[group], weight*s)
			}
			for k, estimate := range [3]float64{v.ErrPhi, v.ErrG, v.ErrGrad} {
				worst[k] = max(worst[k], err[k]/size[k])
				if err[k] > c.tol*size[k] || err[k] > estimate {
					t.Errorf("%s %v at %v: quantity %d (phi, g, grad): error %.3g of %.3g, estimate %.3g, tolerance %g",
						c.name, src, x, k, err[k], size[k], estimate, c.tol)
				}
				over[k] = append(over[k], estimate/max(err[k], u*size[k]))
			}
		}
		for k := range over {
			slices.Sort(over[k])
			if m := over[k][len(over[k])/2]; m > 100 { // 100: the contract on estimates
				t.Errorf("%s: median overestimate of quantity %d is %.3g, want at most 100", c.name, k, m)
			}
		}
		t.Logf("%s: worst phi %.2g, g %.2g, grad %.2g", c.name, worst[0], worst[1], worst[2])
	}
}

func TestAtPoint(t *testing.T) {
	c := r3.Vec{X: 0.1, Y: -3, Z: 7}
	for name, src := range map[string]field.Evaluator{"Point": Point{c, 1}, "Dipole": Dipole{c, r3.Vec{Z: 1}}} {
		if v := at(src, c, field.Mean); v.Status != field.AtPoint || v.Phi == v.Phi || v.G.X == v.G.X {
			t.Errorf("%s at itself: phi %v, g %v, status %v; want NaN and %v", name, v.Phi, v.G, v.Status, field.AtPoint)
		}
		near := *field.PointsOf(c)
		near.XLo, near.YLo, near.ZLo = []float64{1e-30}, []float64{0}, []float64{0}
		if v := evaluate(src, near, field.Mean); v.Status != field.Regular || !(v.G.X > 0) != (name == "Dipole") {
			t.Errorf("%s 1e-30 beside itself: g %v, status %v; want a regular value", name, v.G, v.Status)
		}
		near.Slack = []float64{1e-29}
		if v := evaluate(src, near, field.Mean); v.Status != field.AtPoint {
			t.Errorf("%s within the slack: status %v, want %v", name, v.Status, field.AtPoint)
		}
	}
}
