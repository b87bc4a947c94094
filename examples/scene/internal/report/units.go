package report

import (
	"math"
	"strconv"
	"strings"

	"gonum.org/v1/gonum/spatial/r3"
)

// scale is a unit of the trade.
type scale struct {
	unit   string
	factor float64 // SI per unit
}

// ladders list the units of a quantity from large to small; the first in which the value is at least 1 is taken, the last
// for anything smaller.
var ladders = map[string][]scale{
	"B":  {{"mT", 1e-3}, {"µT", 1e-6}, {"nT", 1e-9}, {"pT", 1e-12}},
	"H":  {{"kA/m", 1e3}, {"A/m", 1}, {"mA/m", 1e-3}, {"µA/m", 1e-6}},
	"Vm": {{"kA", 1e3}, {"A", 1}, {"mA", 1e-3}, {"µA", 1e-6}, {"nA", 1e-9}},
	"E":  {{"MV/m", 1e6}, {"kV/m", 1e3}, {"V/m", 1}, {"mV/m", 1e-3}, {"µV/m", 1e-6}},
	"D":  {{"C/m²", 1}, {"mC/m²", 1e-3}, {"µC/m²", 1e-6}, {"nC/m²", 1e-9}, {"pC/m²", 1e-12}, {"fC/m²", 1e-15}},
	"V":  {{"kV", 1e3}, {"V", 1}, {"mV", 1e-3}, {"µV", 1e-6}, {"nV", 1e-9}},
	"q":  {{"C", 1}, {"mC", 1e-3}, {"µC", 1e-6}, {"nC", 1e-9}, {"pC", 1e-12}, {"fC", 1e-15}},
	"g":  {{"kA·m", 1e3}, {"A·m", 1}, {"mA·m", 1e-3}, {"µA·m", 1e-6}},
	"Wb": {{"Wb", 1}, {"mWb", 1e-3}, {"µWb", 1e-6}, {"nWb", 1e-9}},
	"A":  {{"T·m", 1}, {"mT·m", 1e-3}, {"µT·m", 1e-6}, {"nT·m", 1e-9}, {"pT·m", 1e-12}},
	"MA": {{"T·m", 1}, {"mT·m", 1e-3}, {"µT·m", 1e-6}, {"nT·m", 1e-9}},
	"qA": {{"T·m³", 1}, {"mT·m³", 1e-3}, {"µT·m³", 1e-6}, {"nT·m³", 1e-9}, {"pT·m³", 1e-12}, {"fT·m³", 1e-15}},
	"dA": {{"T", 1}},
	"mA": {{"T·m⁴", 1}, {"mT·m⁴", 1e-3}, {"µT·m⁴", 1e-6}, {"nT·m⁴", 1e-9}, {"pT·m⁴", 1e-12}, {"fT·m⁴", 1e-15}, {"aT·m⁴", 1e-18}},
	"F":  {{"kN", 1e3}, {"N", 1}, {"mN", 1e-3}, {"µN", 1e-6}, {"nN", 1e-9}, {"pN", 1e-12}},
	"T":  {{"N·m", 1}, {"mN·m", 1e-3}, {"µN·m", 1e-6}, {"nN·m", 1e-9}, {"pN·m", 1e-12}},
	"W":  {{"J", 1}, {"mJ", 1e-3}, {"µJ", 1e-6}, {"nJ", 1e-9}, {"pJ", 1e-12}, {"fJ", 1e-15}},
	"L":  {{"m", 1}, {"mm", 1e-3}, {"µm", 1e-6}, {"nm", 1e-9}},
	"M":  {{"kA/m", 1e3}, {"A/m", 1}, {"mA/m", 1e-3}},
	"P":  {{"C/m²", 1}, {"mC/m²", 1e-3}, {"µC/m²", 1e-6}, {"nC/m²", 1e-9}},
	"dM": {{"MA/m²", 1e6}, {"kA/m²", 1e3}, {"A/m²", 1}},
	"dP": {{"kC/m³", 1e3}, {"C/m³", 1}, {"mC/m³", 1e-3}, {"µC/m³", 1e-6}},
	"gB": {{"T/m", 1}, {"mT/m", 1e-3}, {"µT/m", 1e-6}, {"nT/m", 1e-9}},
	"gE": {{"GV/m²", 1e9}, {"MV/m²", 1e6}, {"kV/m²", 1e3}, {"V/m²", 1}, {"mV/m²", 1e-3}},
	"m":  {{"A·m²", 1}, {"mA·m²", 1e-3}, {"µA·m²", 1e-6}, {"nA·m²", 1e-9}},
	"p":  {{"C·m", 1}, {"mC·m", 1e-3}, {"µC·m", 1e-6}, {"nC·m", 1e-9}, {"pC·m", 1e-12}, {"fC·m", 1e-15}, {"aC·m", 1e-18}},
}

// pick returns the unit of a quantity in which a value of the size reads well.
func pick(quantity string, size float64) scale {
	steps := ladders[quantity]
	for _, s := range steps {
		if size >= 0.9995*s.factor {
			return s
		}
	}
	if size == 0 {
		return steps[0]
	}
	return steps[len(steps)-1]
}

// places returns how many decimals show a size with n significant digits.
func places(size float64, n int) int {
	if size == 0 || math.IsNaN(size) || math.IsInf(size, 0) {
		return 0
	}
	return min(max(n-1-int(math.Floor(math.Log10(size))), 0), 12)
}

// significant digits of the report: what inputs of three or four digits deserve, and one more to see rounding.
const significant = 5

// fixed prints v with the decimals of a value of the given size; of what is too small for those, only 0. Sizes that need
// many zeros are printed with an exponent.
func fixed(v, size float64) string {
	if math.IsNaN(v) || math.IsInf(v, 0) {
		return "none"
	}
	var text string
	if size != 0 && (size < 1e-3 || size >= 1e7) {
		if math.Abs(v) < size*math.Pow(10, -significant)/2 {
			return "0"
		}
		return strconv.FormatFloat(v, 'e', significant-1, 64)
	}
	text = strconv.FormatFloat(v, 'f', places(size, significant), 64)
	if strings.Trim(text, "-0.") == "" {
		return "0"
	}
	return text
}

// plain prints a number that the reader typed.
func plain(v float64) string { return strconv.FormatFloat(v, 'g', 7, 64) }

// value prints a number with its unit.
func value(quantity string, v float64) string {
	s := pick(quantity, math.Abs(v))
	switch {
	case math.IsNaN(v) || math.IsInf(v, 0):
		return "none"
	case v == 0:
		return "0"
	}
	return fixed(v/s.factor, math.Abs(v)/s.factor) + " " + s.unit
}

// vector prints three components in a common unit, the norm, and the unit; a vector that does not exist has no unit.
func vector(quantity string, v r3.Vec) (x, y, z, norm, unit string) {
	n := r3.Norm(v)
	switch {
	case math.IsNaN(n) || math.IsInf(n, 0):
		return "none", "none", "none", "none", ""
	case n == 0:
		return "0", "0", "0", "0", ""
	}
	s := pick(quantity, n)
	size := n / s.factor
	return fixed(v.X/s.factor, size), fixed(v.Y/s.factor, size), fixed(v.Z/s.factor, size), fixed(size, size), s.unit
}
