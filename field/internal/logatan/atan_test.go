package logatan

import (
	"math"
	"testing"
)

func TestAtan2Reference(t *testing.T) {
	const n = 100000
	y, x := logPairs(n, 41)
	rnd := seeded(43)
	var tr, flat, one track
	for i := range y {
		if i%3 == 0 { // near the edges of the reduction: 0, 1/4, 1/2, 1, 4
			c := []float64{0x1p-30, 0.25, 0.5, 1, 4}[rnd.IntN(5)]
			y[i] = c * x[i] * (1 + math.Ldexp(rnd.Float64()-0.5, -rnd.IntN(53)))
		}
		y[i] = math.Copysign(y[i], rnd.Float64()-0.5)
		x[i] = math.Copysign(x[i], rnd.Float64()-0.5)
		if math.IsInf(y[i], 0) || y[i] == 0 {
			continue
		}
		got, want := Atan2(y[i], x[i]), bigAtan2(y[i], x[i])
		tr.see(y[i], x[i], got, want)
		if math.Abs(got) < 0.24 { // no constant
			flat.see(y[i], x[i], got, want)
		}
		if i%8 == 0 {
			one.see(y[i], 1, Atan(y[i]), bigAtan2(y[i], 1))
		}
	}
	tr.check(t, "Atan2", twoRoundings)
	flat.check(t, "Atan2 near 0", oneRounding)
	one.check(t, "Atan", twoRoundings)
}

// TestAtan2Special compares with the special cases of IEEE 754 as math.Atan2
// has them, on every pair of 0, tiny, 1, huge, infinite and NaN.
func TestAtan2Special(t *testing.T) {
	inf, nan := math.Inf(1), math.NaN()
	v := []float64{0, math.Copysign(0, -1), 1, -1, 0x1p-1074, -0x1p-1074, math.MaxFloat64, -math.MaxFloat64, inf, -inf, nan}
	for _, y := range v {
		for _, x := range v {
			// math.Atan2 loses the sign of y where y/x underflows and x < 0.
			got, want := Atan2(y, x), math.Copysign(math.Atan2(y, x), y)
			if !same(got, want) && !(math.Abs(got-want) <= 0x1p-52*math.Abs(want)) { // one ulp of math.Atan2
				t.Errorf("Atan2(%v, %v) = %v, want %v", y, x, got, want)
			}
		}
		if got, want := Atan(y), math.Atan(y); !same(got, want) {
			t.Errorf("Atan(%v) = %v, want %v", y, got, want)
		}
	}
}

// TestAtan2Symmetry: signs are exact mirrors in y; a common power of two
// changes no bit.
func TestAtan2Symmetry(t *testing.T) {
	rnd := seeded(51)
	for range 5000 {
		y, x := rnd.NormFloat64(), rnd.NormFloat64()
		a := Atan2(y, x)
		if b := Atan2(-y, x); !same(a, -b) {
			t.Fatalf("Atan2(%x, %x) = %x, mirrored %x", y, x, a, b)
		}
		if b := Atan2(0x1p300*y, 0x1p300*x); !same(a, b) {
			t.Fatalf("Atan2(%x, %x) = %x, scaled %x", y, x, a, b)
		}
		if b := Atan2(0x1p600*y, 0x1p600*x); !same(a, b) {
			t.Fatalf("Atan2(%x, %x) = %x, scaled %x", y, x, a, b)
		}
	}
}

// TestConstants: the pairs of the table are the angles they stand for.
func TestConstants(t *testing.T) {
	for i, o := range octants {
		y, x, h, sign := 0.0, 1.0, 0.0, 1.0
		if i&1 != 0 {
			y, x, h = 1, 2, 0.5
		}
		if i&2 != 0 {
			y, x, sign = x, y, -sign
		}
		if i&4 != 0 {
			x, sign = -x, -sign
		}
		if i&8 != 0 {
			y, sign = -y, -sign
		}
		want := bigAtan2(y, x)
		hi, _ := want.Float64()
		lo, _ := sub(want, bf(hi)).Float64()
		if o.hi != hi || o.lo != lo || o.h != h || o.sign != sign {
			t.Errorf("octants[%d] = %x, want %v, %v, %x, %x", i, o, h, sign, hi, lo)
		}
	}
	hi, _ := bigLn2.Float64()
	if lo, _ := sub(bigLn2, bf(hi)).Float64(); hi != ln2 || lo != ln2Lo {
		t.Errorf("ln2 = %x + %x, want %x + %x", ln2, ln2Lo, hi, lo)
	}
}
