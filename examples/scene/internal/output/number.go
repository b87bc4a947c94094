package output

import (
	"math"
	"strconv"
)

// appendNumber appends the shortest decimal form that reads back to the same float64, valid in JSON and CSV alike, or
// missing where v is no number.
func appendNumber(b []byte, v float64, missing string) []byte {
	if math.IsNaN(v) || math.IsInf(v, 0) {
		return append(b, missing...)
	}
	var room [32]byte
	long := strconv.AppendFloat(room[:0], v, 'e', -1, 64)
	e := exponent(long)
	long = trimmed(long)
	if e >= -7 && e <= 20 { // beyond, the zeros alone make the form without exponent longer
		start := len(b)
		b = strconv.AppendFloat(b, v, 'f', -1, 64)
		if len(b)-start <= len(long) {
			return b
		}
		b = b[:start]
	}
	return append(b, long...)
}

// exponent returns the exponent of a number in the form of format 'e'.
func exponent(text []byte) int {
	e, sign, k := 0, 1, len(text)-1
	for k > 0 && text[k] != 'e' {
		k--
	}
	for _, c := range text[k+1:] {
		switch c {
		case '-':
			sign = -1
		case '+':
		default:
			e = 10*e + int(c-'0')
		}
	}
	return sign * e
}

// trimmed shortens 1e-06 to 1e-6 and 1e+21 to 1e21, in place.
func trimmed(text []byte) []byte {
	k := len(text) - 1
	for text[k] != 'e' {
		k--
	}
	out, rest := text[:k+1], text[k+1:]
	if rest[0] == '-' {
		out = append(out, '-')
	}
	rest = rest[1:]
	for len(rest) > 1 && rest[0] == '0' {
		rest = rest[1:]
	}
	return append(out, rest...)
}
