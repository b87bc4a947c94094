package cubature

import "math"

// lineRule interpolates from Gauss points and compares at points in between: what tells a resolved panel.
type lineRule struct {
	at, probe []float64   // on [-1, 1]
	weight    [][]float64 // of the values at at, one row a probe
}

// smoothPoints is the number of points by which a resolved function is known along a line.
const smoothPoints = 14

// newLineRule makes the barycentric interpolation from Gauss points to probes. The ends are among the probes.
func newLineRule() *lineRule {
	g := legendre(smoothPoints)
	r := &lineRule{at: g.X}
	r.probe = append(r.probe, -0.9995)
	for i := 1; i < len(g.X); i++ {
		r.probe = append(r.probe, 0.45*g.X[i]+0.55*g.X[i-1])
	}
	r.probe = append(r.probe, 0.9995)
	bary := make([]float64, len(g.X))
	for i, x := range g.X {
		bary[i] = math.Sqrt((1-x*x)*g.W[i]) * float64(1-2*(i%2))
	}
	for _, t := range r.probe {
		row := make([]float64, len(g.X))
		sum := 0.0
		for i, x := range g.X {
			row[i] = bary[i] / (t - x)
			sum += row[i]
		}
		for i := range row {
			row[i] /= sum
		}
		r.weight = append(r.weight, row)
	}
	return r
}

// defect returns the greatest error of interpolation over the probes, component by component, and the greatest values.
func (r *lineRule) defect(f func(t float64, dst []float64), defect, size []float64) {
	m := len(defect)
	known := make([]float64, m*len(r.at))
	for i, t := range r.at {
		f(t, known[m*i:m*i+m])
	}
	value, guess := make([]float64, m), make([]float64, m)
	for k, t := range r.probe {
		f(t, value)
		clear(guess)
		for i, w := range r.weight[k] {
			for c := range guess {
				guess[c] += w * known[m*i+c]
			}
		}
		for c := range guess {
			size[c] = max(size[c], math.Abs(value[c]))
			d := math.Abs(value[c] - guess[c])
			if !(d <= defect[c]) {
				defect[c] = d
			}
		}
	}
}
