package pair

import (
	"math"
	"math/big"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"
)

// vector returns a vector whose components differ by up to 2^spread around a common magnitude within 2^(+-reach).
func vector(rng *rand.Rand, reach, spread int) Vec {
	scale := math.Ldexp(1, rng.IntN(2*reach+1)-reach)
	component := func() Float { return number(rng, spread).Scale(scale) }
	return Vec{component(), component(), component()}
}

func (a Vec) parts() [3]Float { return [3]Float{a.X, a.Y, a.Z} }

// combination returns the sum of a[i] b[j] over pairs of indices, the second half subtracted, and that of the magnitudes.
func combination(a, b Vec, plus, minus [][2]int) (sum, size *big.Float) {
	sum, size = ref(), ref()
	p, q := a.parts(), b.parts()
	for _, k := range plus {
		t := ref().Mul(p[k[0]].exact(), q[k[1]].exact())
		sum.Add(sum, t)
		size.Add(size, t.Abs(t))
	}
	for _, k := range minus {
		t := ref().Mul(p[k[0]].exact(), q[k[1]].exact())
		sum.Sub(sum, t)
		size.Add(size, t.Abs(t))
	}
	return sum, size
}

// Dot and Cross keep their bounds also where the products cancel.
func TestDotCross(t *testing.T) {
	rng := rand.New(rand.NewPCG(7, 7))
	dots, crosses := 0.0, 0.0
	for k := range rounds / 2 {
		a, b := vector(rng, 150, 20), vector(rng, 150, 20)
		switch k % 3 {
		case 1: // nearly parallel
			b = a.Scale(number(rng, 60)).Add(vector(rng, 1, 1).Scale(a.Norm().Scale(0x1p-70)))
		case 2: // nearly at right angles
			b = Vec{a.Y, a.X.Neg(), a.Z.Scale(0x1p-90)}
		}
		want, size := combination(a, b, [][2]int{{0, 0}, {1, 1}, {2, 2}}, nil)
		if e := off(a.Dot(b), want, size); !(e <= 12) { // the bound of the documentation
			t.Fatalf("%v . %v: error %.3g u^2", a, b, e)
		} else {
			dots = max(dots, e)
		}
		for i, got := range a.Cross(b).parts() {
			j, l := (i+1)%3, (i+2)%3
			want, size := combination(a, b, [][2]int{{j, l}}, [][2]int{{l, j}})
			if e := off(got, want, size); !(e <= 9) { // the bound of the documentation
				t.Fatalf("%v x %v: component %d: error %.3g u^2", a, b, i, e)
			} else {
				crosses = max(crosses, e)
			}
		}
	}
	t.Logf("worst %.2f u^2 for Dot, %.2f u^2 for Cross of %d", dots, crosses, rounds/2)
}

// The cross product of vectors of plain numbers keeps its digits where they are parallel but for the last bits.
func TestCrossOfPlain(t *testing.T) {
	rng := rand.New(rand.NewPCG(8, 8))
	for range rounds / 2 {
		a := vector(rng, 50, 3).Value()
		b := r3.Scale(rng.NormFloat64(), a) // parallel up to rounding
		got := VecOf(a).Cross(VecOf(b))
		for i, c := range got.parts() {
			j, l := (i+1)%3, (i+2)%3
			want, _ := combination(VecOf(a), VecOf(b), [][2]int{{j, l}}, [][2]int{{l, j}})
			if e := relative(c, want); !(e <= 4) { // the bound of the documentation
				t.Fatalf("%v x %v: component %d: error %.3g u^2", a, b, i, e)
			}
		}
	}
}

// square returns |a|^2 in the reference precision.
func square(a Vec) *big.Float {
	s, _ := combination(a, a, [][2]int{{0, 0}, {1, 1}, {2, 2}}, nil)
	return s
}

func TestNormUnit(t *testing.T) {
	rng := rand.New(rand.NewPCG(9, 9))
	norms, units := 0.0, 0.0
	for range rounds / 2 {
		a := vector(rng, 860, 30) // squares leave the range of float64
		norm := ref().Sqrt(square(a))
		e := relative(a.Norm(), norm)
		if !(e <= 10) { // the bound of the documentation
			t.Fatalf("|%v| = %v, want %v: error %.3g u^2", a, a.Norm(), norm, e)
		}
		norms = max(norms, e)
		p, q := a.parts(), a.Unit().parts()
		for i := range p {
			e := relative(q[i], ref().Quo(p[i].exact(), norm))
			if !(e <= 22) { // the bound of the documentation
				t.Fatalf("unit vector of %v: component %d: error %.3g u^2", a, i, e)
			}
			units = max(units, e)
		}
	}
	t.Logf("worst %.2f u^2 for Norm, %.2f u^2 for Unit of %d", norms, units, rounds/2)
}

// Norm and Unit work at the ends of the range.
func TestNormUnitExtremes(t *testing.T) {
	for _, c := range []struct{ length, tol float64 }{
		{1.5e308 / 3, 0}, {1e300, 0}, {0x1p1021, 0}, {0x1p-1022, 0}, {1e-310, 0}, {math.SmallestNonzeroFloat64, 0},
	} {
		v := VecOf(r3.Vec{X: 2 * c.length, Y: -c.length, Z: 2 * c.length})
		if got := v.Norm().Value(); got != 3*c.length { // a Pythagorean quadruple: exact
			t.Errorf("|%v| = %v, want %v", v.Value(), got, 3*c.length)
		}
		third := Of(1).Div(Of(3))
		want := Vec{third.Scale(2), third.Neg(), third.Scale(2)}
		if got := v.Unit(); got != want {
			t.Errorf("unit vector of %v: %v, want %v", v.Value(), got, want)
		}
	}
	if got := (Vec{}).Norm(); got != (Float{}) {
		t.Errorf("|0| = %v", got)
	}
	inf, nan := math.Inf(1), math.NaN()
	for _, bad := range []r3.Vec{{}, {X: inf}, {Y: -inf}, {Z: nan}, {X: inf, Y: nan}} {
		got := VecOf(bad).Unit()
		for _, p := range got.parts() {
			if !math.IsNaN(p.Value()) {
				t.Errorf("unit vector of %v: %v, want NaN in all components", bad, got)
			}
		}
		if n := VecOf(bad).Norm().Value(); bad != (r3.Vec{}) && !math.IsNaN(n-n) {
			t.Errorf("|%v| = %v", bad, n)
		}
	}
}

// Value and Low take a vector apart, and WithLow puts it together again.
func TestVecParts(t *testing.T) {
	rng := rand.New(rand.NewPCG(10, 10))
	for range rounds / 2 {
		a := vector(rng, 100, 50)
		if got := WithLow(a.Value(), a.Low()); got != a {
			t.Fatalf("%v became %v", a, got)
		}
		if got := a.Add(a.Neg()); got != (Vec{}) {
			t.Fatalf("%v less itself is %v", a, got)
		}
		if got := a.Sub(Vec{}).Scale(Of(1)); got != a {
			t.Fatalf("%v became %v", a, got)
		}
	}
	loose := Vec{Float{1, 0x1p-53 + 0x1p-80}, Float{1, 1}, Float{0, 3}} // low parts that belong in the leading ones
	if v, low := loose.Value(), loose.Low(); v != (r3.Vec{X: 1 + 0x1p-52, Y: 2, Z: 3}) || low != (r3.Vec{X: -0x1p-53 + 0x1p-80}) {
		t.Errorf("%v came apart into %v and %v", loose, v, low)
	}
}

func TestVecAllocatesNothing(t *testing.T) {
	a, b := VecOf(r3.Vec{X: 1, Y: 2, Z: 3}), VecOf(r3.Vec{X: -3, Y: 0.1, Z: 7})
	var c Vec
	if n := testing.AllocsPerRun(20, func() {
		c = a.Cross(b).Unit().Scale(a.Dot(b).Add(b.Norm())).Add(a).Sub(b).Neg()
		c = WithLow(c.Value(), c.Low())
	}); n != 0 {
		t.Errorf("%v allocations", n)
	}
}
