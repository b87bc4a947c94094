package elliptic

import (
	"encoding/json"
	"math"
	"math/rand/v2"
	"os/exec"
	"path/filepath"
	"slices"
	"testing"

	"example.com/boundpole/field/internal/logatan"
	"gonum.org/v1/gonum/mathext"
)

// The judges are general-purpose libraries: gonum's mathext and the GNU Scientific Library. Neither is more accurate than the
// code here, so the tolerances are theirs; the bounds documented here are held by the high-precision tests.

// TestGonum compares with gonum's mathext.
func TestGonum(t *testing.T) {
	rnd := rand.New(rand.NewPCG(11, 13))
	got := map[string]*worst{}
	see := func(name string, a, b float64, at any) {
		if got[name] == nil {
			got[name] = new(worst)
		}
		got[name].see(math.Abs(a-b)/math.Abs(b), at)
	}
	for range 4000 {
		kc2 := math.Ldexp(float64(1+rnd.IntN(1<<20)), -20) // 1 - kc² is exact
		k, e, b, d := Complete(kc2)
		see("K", k, mathext.CompleteK(1-kc2), kc2)
		see("E", e, mathext.CompleteE(1-kc2), kc2)
		see("B", b, mathext.CompleteB(1-kc2), kc2)
		see("D", d, mathext.CompleteD(1-kc2), kc2)
		x, y, z := math.Exp2(30*rnd.Float64()-20), math.Exp2(30*rnd.Float64()-20), math.Exp2(30*rnd.Float64()-20)
		if rnd.IntN(4) == 0 {
			x = 0
		}
		see("RF", RF(x, y, z), mathext.EllipticRF(x, y, z), [3]float64{x, y, z})
		see("RD", RD(x, y, z), mathext.EllipticRD(x, y, z), [3]float64{x, y, z})
	}
	for name, w := range got {
		w.check(t, name, 2e-15) // mathext: a few units of the last digit
	}
}

// judged is a value of the GNU Scientific Library.
type judged struct {
	F     string
	Arg   []hexFloat
	Value hexFloat
	Error hexFloat // the library's estimate, relative; 0 for sums of its values
}

// ours is the same value by this package.
func (j *judged) ours() float64 {
	var a [5]float64
	for i, v := range j.Arg {
		a[i] = float64(v)
	}
	switch j.F {
	case "RF":
		return RF(a[0], a[1], a[2])
	case "RC":
		return RC(a[0], a[1])
	case "RD":
		return RD(a[0], a[1], a[2])
	case "RJ":
		return RJ(a[0], a[1], a[2], a[3])
	case "K":
		return K(a[0])
	case "E":
		return E(a[0])
	case "D":
		return D(a[0])
	case "Cel":
		return Cel(a[0], a[1], a[2], a[3])
	case "U":
		return OfCircle(a[0], a[1], a[2], a[3], a[4]).U
	case "S3":
		return OfCircle(a[0], a[1], a[2], a[3], a[4]).S3
	case "Omega":
		return OfCircle(a[0], a[1], a[2], a[3], a[4]).Omega
	case "Log1pRatio":
		return logatan.Log1pRatio(a[0], 1)
	}
	return math.NaN()
}

// TestGSL compares with values of the GNU Scientific Library 2.7.1, stored by testdata/judge/gsl.c.
func TestGSL(t *testing.T) {
	rows := load[judged](t, "gsl.json")
	got := map[string]*worst{}
	for i := range rows {
		j := &rows[i]
		if got[j.F] == nil {
			got[j.F] = new(worst)
		}
		want := float64(j.Value)
		got[j.F].see(math.Abs(j.ours()-want)/math.Abs(want), j.Arg)
	}
	for name, w := range got {
		tol := 2e-15 // its values: a few units of the last digit
		switch name {
		case "E", "Omega": // its E is RF less k² RD/3; the parts of Omega cancel up to 8 times
			tol = 6e-15
		}
		w.check(t, name, tol)
	}
}

// TestGSLStored makes the stored values anew where the library is installed.
func TestGSLStored(t *testing.T) {
	cc, err := exec.LookPath("cc")
	if err != nil {
		t.Skip("no C compiler: the stored values are not made anew")
	}
	program := filepath.Join(t.TempDir(), "gsl")
	if out, err := exec.Command(cc, "testdata/judge/gsl.c", "-lgsl", "-lgslcblas", "-lm", "-o", program).CombinedOutput(); err != nil {
		t.Skipf("the GNU Scientific Library is not installed: the stored values are not made anew (%v, %.80s)", err, out)
	}
	out, err := exec.Command(program).Output()
	if err != nil {
		t.Fatal(err)
	}
	var fresh []judged
	if err := json.Unmarshal(out, &fresh); err != nil {
		t.Fatal(err)
	}
	stored := load[judged](t, "gsl.json")
	if len(fresh) != len(stored) {
		t.Fatalf("%d values, stored are %d", len(fresh), len(stored))
	}
	for i, j := range fresh {
		if s := stored[i]; s.F != j.F || !slices.Equal(s.Arg, j.Arg) ||
			!(math.Abs(float64(s.Value-j.Value)) <= 1e-15*math.Abs(float64(s.Value))) { // another version may round otherwise
			t.Errorf("row %d: stored %s%v = %v, made anew %s%v = %v", i, s.F, s.Arg, s.Value, j.F, j.Arg, j.Value)
		}
	}
}
