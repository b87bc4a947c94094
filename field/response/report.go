package response

import (
	"math"
)

// Report says how the solution went.
type Report struct {
	Unknowns [3]int     // of the three meshes
	Steps    [3]int     // of the iteration
	Residual [3]float64 // relative
	Leak     float64    // largest |charge - the charge it is to have| of a body over the integral of |sigma| over it
}

func (r *Response) report() {
	for k := range r.layers {
		r.Report.Unknowns[k] = len(r.system.levels[k].x)
		r.Report.Steps[k], r.Report.Residual[k] = r.layers[k].steps, r.layers[k].residual
	}
	for body, m := range r.materials {
		net, all := -m.Charge, 0.0
		for c, p := range r.system.parts {
			if p.body == body {
				r.system.nodesOf(&r.system.levels[2], c, func(i int) {
					net += r.layers[2].charge[i]
					all += math.Abs(r.layers[2].charge[i])
				})
			}
		}
		if all > 0 {
			r.Report.Leak = max(r.Report.Leak, math.Abs(net)/all)
		}
	}
}
