package charge

import "math"

// Air by Townsend's two constants, in SI, and what measurements say where that curve does not hold. All from memory:
// 15/(cm Torr) and 365 V/(cm Torr) as tabulated by [Raizer1991], the yield 0.01 of metal cathodes, the least voltage by
// [Paschen1889] and later work; the field of microgaps is common practice.
const (
	atmosphere  = 101325.0         // Pa
	torr        = atmosphere / 760 // Pa
	townsendA   = 15 * 100 / torr  // 1/(m Pa)
	townsendB   = 365 * 100 / torr // V/(m Pa)
	secondYield = 0.01             // electrons an ion
	leastSpark  = 327.0            // V, least breakdown voltage of air, at 7.5 um and one atmosphere
	microgap    = 350e6            // V/m, field of breakdown below about 1 um
	longestGap  = 0.01 * atmosphere
)

// BreakdownVoltage returns the voltage in V at which a plane gap of dry air is expected to spark: a warning value, no limit
// of safety. Dust, humidity, edges and charge on insulators lower it.
//
// Units: gap in m, pressure in Pa; 0 stands for one atmosphere.
// Domain: gap > 0, pressure >= 0, gap times pressure up to 1 cm times one atmosphere; NaN otherwise.
// Accuracy: about 15 %; Townsend's curve lies low up to 0.1 mm and high from 1 mm on, at one atmosphere.
// Source: Paschen's law V = B p d/(ln(A p d) - ln ln(1 + 1/gamma)) [Paschen1889]. It is kept from falling below the least
// voltage measured, which also stands for narrower gaps because longer ways beside them break down first, down to the gap in
// which 350 V/um give less.
func BreakdownVoltage(gap, pressure float64) float64 {
	if pressure == 0 {
		pressure = atmosphere
	}
	pd := pressure * gap
	if !(gap > 0 && pressure > 0 && pd <= longestGap*(1+1e-12)) {
		return math.NaN()
	}
	v := leastSpark
	// beyond the least voltage of the curve it rises; before it, its other branch is not for gaps with open sides
	if excess := math.Log(townsendA*pd) - math.Log(math.Log1p(1/secondYield)); excess > 1 {
		v = max(v, townsendB*pd/excess)
	}
	return min(v, microgap*gap)
}
