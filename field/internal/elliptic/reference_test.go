package elliptic

import (
	"encoding/json"
	"math"
	"math/big"
	"os"
	"strconv"
	"testing"
)

// hexFloat is a float64 written in hexadecimal in a JSON string.
type hexFloat float64

func (h *hexFloat) UnmarshalJSON(b []byte) error {
	s, err := strconv.Unquote(string(b))
	if err != nil {
		return err
	}
	v, err := strconv.ParseFloat(s, 64)
	*h = hexFloat(v)
	return err
}

// digits is a decimal reference value of 25 digits.
type digits struct{ *big.Float }

func (d *digits) UnmarshalJSON(b []byte) error {
	s, err := strconv.Unquote(string(b))
	if err != nil {
		return err
	}
	d.Float, _, err = big.ParseFloat(s, 10, 100, big.ToNearestEven)
	return err
}

// relErr returns |got - d|/|d|, and for d = 0 whether got is 0, as 0 or +Inf.
func (d digits) relErr(got float64) float64 {
	if d.Sign() == 0 {
		if got == 0 {
			return 0
		}
		return math.Inf(1)
	}
	if math.IsNaN(got) || math.IsInf(got, 0) {
		return math.Inf(1)
	}
	x := new(big.Float).SetPrec(100).SetFloat64(got)
	x.Quo(x.Sub(x, d.Float), d.Float)
	e, _ := x.Float64()
	return math.Abs(e)
}

// load reads a table made by testdata/reference.py.
func load[T any](t testing.TB, name string) []T {
	t.Helper()
	b, err := os.ReadFile("testdata/" + name)
	if err != nil {
		t.Fatal(err)
	}
	var rows []T
	if err := json.Unmarshal(b, &rows); err != nil {
		t.Fatalf("%s: %v", name, err)
	}
	if len(rows) < 100 {
		t.Fatalf("%s: %d rows, want at least 100", name, len(rows))
	}
	return rows
}

// worst keeps the largest relative error and where it was met.
type worst struct {
	err float64
	at  any
}

func (w *worst) see(err float64, at any) {
	if !(err <= w.err) {
		w.err, w.at = err, at
	}
}

// check logs the largest error and compares it with the documented bound.
func (w *worst) check(t *testing.T, name string, bound float64) {
	t.Helper()
	t.Logf("%-22s worst relative error %.2e", name, w.err)
	if !(w.err <= bound) {
		t.Errorf("%s: relative error %.2e at %+v, documented bound %.1e", name, w.err, w.at, bound)
	}
}
