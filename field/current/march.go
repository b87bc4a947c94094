package current

import "math"

// panels of a rule: points a panel, and the factor by which panels grow. A panel from x to 3x or 4x is 3.7 or 3 in Bernstein's
// measure away from a singularity at 0, so that 16 or 20 points leave 5e-19 and 8e-20.
type panels struct {
	points int
	growth float64
}

// Two rules without a point or a cut in common, whose difference is the error of the coarser one.
var ruleFine, ruleCoarse = panels{20, 4}, panels{16, 3}

// march visits the panels of a rule on an interval of the given length, from lo to hi as seen from the foot of a point at the
// distance off: they begin at the place next to the point, origin, and grow away from it to both sides, those at equal distances
// up and down together, so that what is odd about the foot can cancel term by term. before may end a panel early.
func march(lo, hi, length, off float64, rule panels, before func(from, to float64) float64,
	visit func(origin, from, to float64, up, down bool)) {
	origin, up, down := 0.0, hi, -lo // how far the panels go up and down
	switch {
	case lo > 0:
		origin, up, down = lo, length, 0
	case hi < 0:
		origin, up, down = hi, 0, length
	}
	long, both := max(up, down), min(up, down)
	step := max(math.Hypot(origin, off), 0x1p-60*long)
	for from := 0.0; from < long; {
		to := min(max(step, rule.growth*from), long)
		if from < both && both < to {
			to = both
		}
		if to = before(from, to); !(to > from) {
			return
		}
		visit(origin, from, to, to <= up, to <= down)
		from = to
	}
}
