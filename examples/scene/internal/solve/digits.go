package solve

import (
	"math"
	"strconv"

	"example.com/boundpole/charge"
)

const epsilon0 = charge.Epsilon0

// Digits returns v rounded to n significant digits, without an exponent where it can be read without one.
func Digits(v float64, n int) string {
	if v == 0 {
		return "0"
	}
	rounded, _ := strconv.ParseFloat(strconv.FormatFloat(v, 'e', n-1, 64), 64)
	e := int(math.Floor(math.Log10(math.Abs(rounded))))
	if e < -4 || e > 6 {
		return strconv.FormatFloat(rounded, 'e', n-1, 64)
	}
	return strconv.FormatFloat(rounded, 'f', max(n-1-e, 0), 64)
}
