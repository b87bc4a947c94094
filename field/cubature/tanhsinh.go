package cubature

import (
	"errors"
	"math"
)

// ErrNotConverged is returned beside the best value where an integral did not reach the accuracy asked for. Ask for less,
// split the interval at the singularity, or allow more points.
var ErrNotConverged = errors.New("cubature: integral not converged; split at the singularity or ask for less accuracy")

// TanhSinh integrates f over an interval of the given length with the double exponential rule, for functions with any
// integrable singularity at either end.
//
// f is given the distances of the point from both ends, so that it loses no digits at an end where the coordinate does not
// start from 0: near the right end use right. tol is the wanted accuracy relative to the integral of |f|; 0 means 1e-14.
// The estimate is ten times the difference of the last two levels plus rounding. Values of f that are not finite count as 0
// within 1e-300 lengths of an end, elsewhere they make the result NaN.
//
// Accuracy: 1e-14 relative for s^a log(s)^m with a >= -1/2 (TestTanhSinh).
// Source: [Takahasi1974].
func TanhSinh(f func(left, right float64) float64, length, tol float64) (value, estimate float64, err error) {
	if tol <= 0 {
		tol = 1e-14
	}
	const first, last = 2, 10 // steps 2^-first to 2^-last
	var sum, size float64
	prev := math.NaN()
	for level := first; level <= last; level++ {
		h := math.Ldexp(1, -level)
		from, step := 0, 1
		if level > first { // only the points between those of the level before
			from, step = 1, 2
		}
		for k := from; float64(k)*h <= 6.1; k += step {
			t := float64(k) * h
			v, a := doubleExponential(f, length, t)
			sum, size = sum+v, size+a
		}
		value = h * sum
		estimate = 10*math.Abs(value-prev) + 4*0x1p-53*h*size
		if math.Abs(value-prev) <= 0.1*tol*h*size {
			return value, estimate, nil
		}
		prev = value
	}
	return value, estimate, ErrNotConverged
}

// doubleExponential returns the terms of +t and -t and their magnitude: near = length/(1 + exp(pi sinh t)) from an end.
func doubleExponential(f func(left, right float64) float64, length, t float64) (v, size float64) {
	e := math.Exp(-math.Pi * math.Sinh(t))
	near, far := length*e/(1+e), length/(1+e)
	w := math.Pi * math.Cosh(t) * near / (1 + e)
	if w == 0 || near == 0 {
		return 0, 0
	}
	a := w * endValue(f, near, far, near/length)
	if t == 0 {
		return a, math.Abs(a)
	}
	b := w * endValue(f, far, near, near/length)
	return a + b, math.Abs(a) + math.Abs(b)
}

func endValue(f func(left, right float64) float64, left, right, relative float64) float64 {
	v := f(left, right)
	if v-v != 0 && relative < 1e-300 {
		return 0
	}
	return v
}
