package elliptic

import (
	"math"
	"testing"
)

func TestCarlsonReference(t *testing.T) {
	type row struct {
		Arg   [4]hexFloat
		Value [4]digits // RF(x,y,z), RC(x,p), RD(x,y,z), RJ(x,y,z,p)
	}
	var w [4]worst
	for _, r := range load[row](t, "carlson.json") {
		x, y, z, p := float64(r.Arg[0]), float64(r.Arg[1]), float64(r.Arg[2]), float64(r.Arg[3])
		for i, v := range [...]float64{RF(x, y, z), RC(x, p), RD(x, y, z), RJ(x, y, z, p)} {
			w[i].see(r.Value[i].relErr(v), r.Arg)
		}
	}
	w[0].check(t, "RF", 1e-15) // documented bounds
	w[1].check(t, "RC", 1e-15)
	w[2].check(t, "RD", 1e-15)
	w[3].check(t, "RJ", 2e-15)
}

func TestCompleteReference(t *testing.T) {
	type row struct {
		Kc2   hexFloat
		Value [4]digits // K, E, B, D
	}
	var w [4]worst
	for _, r := range load[row](t, "complete.json") {
		x := float64(r.Kc2)
		k, e, b, d := Complete(x)
		for i, v := range [...]float64{k, e, b, d} {
			w[i].see(r.Value[i].relErr(v), r.Kc2)
		}
		if K(x) != k || E(x) != e || B(x) != b || D(x) != d {
			t.Fatalf("kc²=%v: K, E, B, D = %v %v %v %v, want Complete's %v %v %v %v", x, K(x), E(x), B(x), D(x), k, e, b, d)
		}
	}
	for i, name := range []string{"K", "E", "B", "D"} {
		w[i].check(t, name, 1.5e-15) // documented bound
	}
}

func TestCelReference(t *testing.T) {
	type row struct {
		Arg   [4]hexFloat // kc, p, a, b
		Value digits
	}
	var w worst
	for _, r := range load[row](t, "cel.json") {
		kc, p, a, b := float64(r.Arg[0]), float64(r.Arg[1]), float64(r.Arg[2]), float64(r.Arg[3])
		w.see(r.Value.relErr(Cel(kc, p, a, b)), r.Arg)
		if v := Cel(-kc, p, a, b); v != Cel(kc, p, a, b) {
			t.Errorf("Cel(%v, ...) = %v differs from its mirror", -kc, v)
		}
	}
	w.check(t, "Cel", 2e-15) // documented bound
}

func TestIntegralsSpecial(t *testing.T) {
	inf, nan := math.Inf(1), math.NaN()
	complete := func(i int) func(x float64) float64 {
		return func(x float64) float64 {
			k, e, b, d := Complete(x)
			return [...]float64{k, e, b, d}[i]
		}
	}
	for _, c := range []struct {
		name      string
		got, want float64
	}{
		{"K(0)", K(0), inf}, {"E(0)", E(0), 1}, {"B(0)", B(0), 1}, {"D(0)", D(0), inf},
		{"K(Inf)", complete(0)(inf), 0}, {"E(Inf)", complete(1)(inf), inf}, {"B(Inf)", complete(2)(inf), 0}, {"D(Inf)", complete(3)(inf), 0},
		{"K(-1)", K(-1), nan}, {"E(NaN)", E(nan), nan},
		{"RF(1,1,1)", RF(1, 1, 1), 1}, {"RF(0,0,1)", RF(0, 0, 1), nan}, {"RF(-1,1,1)", RF(-1, 1, 1), nan}, {"RF(NaN,1,1)", RF(nan, 1, 1), nan}, {"RF(Inf,1,1)", RF(inf, 1, 1), nan},
		{"RC(4,4)", RC(4, 4), 0.5}, {"RC(1,0)", RC(1, 0), nan}, {"RC(1,-1)", RC(1, -1), nan}, {"RC(NaN,1)", RC(nan, 1), nan},
		{"RD(4,4,4)", RD(4, 4, 4), 0.125}, {"RD(0,1,0)", RD(0, 1, 0), nan}, {"RD(1,1,0)", RD(1, 1, 0), nan}, {"RD(1,NaN,1)", RD(1, nan, 1), nan},
		{"RJ(4,4,4,4)", RJ(4, 4, 4, 4), 0.125}, {"RJ(1,1,1,0)", RJ(1, 1, 1, 0), nan}, {"RJ(1,1,1,-1)", RJ(1, 1, 1, -1), nan}, {"RJ(1,1,1,NaN)", RJ(1, 1, 1, nan), nan},
		{"Cel(0,1,1,1)", Cel(0, 1, 1, 1), nan}, {"Cel(1,0,1,1)", Cel(1, 0, 1, 1), nan}, {"Cel(NaN,1,1,1)", Cel(nan, 1, 1, 1), nan}, {"Cel(1,1,NaN,1)", Cel(1, 1, nan, 1), nan},
	} {
		if !(c.got == c.want || c.got != c.got && c.want != c.want) {
			t.Errorf("%s = %v, want %v", c.name, c.got, c.want)
		}
	}
}
