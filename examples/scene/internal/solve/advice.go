package solve

import (
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/magnet"
	"gonum.org/v1/gonum/spatial/r3"
)

// Watch gathers over all answers what the cautions depend on.
type Watch struct {
	Volts float64 // largest |V| seen
	Air   float64 // largest |E| outside all parts, V/m
}

// See takes in one record.
func (w *Watch) See(r *Record) {
	if v := math.Abs(r.Electric.V); v > w.Volts {
		w.Volts = v
	}
	if e := r3.Norm(r.Electric.E); r.Inside < 0 && r.Status == field.Regular && e > w.Air {
		w.Air = e
	}
}

// limits from trade practice and, for air, the breakdown strength of long gaps at sea level: common practice, no source.
const (
	touchVolts = 60  // V
	airLimit   = 3e6 // V/m
)

// Cautions returns what has to be said beside the numbers, only where it applies.
func (s *Setup) Cautions(w Watch) []string {
	var out []string
	pull, name := s.contactPull()
	if name != "" {
		out = append(out,
			fmt.Sprintf("Attracts suddenly; may pinch or shatter. Bound on contact pull to thick iron, Br²A/2µ0: %s N (%s). "+
				"Keep from children; if swallowed, get medical help at once.", Digits(pull, 2), name),
			"Fields of about 0.5–1 mT may affect implants: follow the clinician and the device maker.")
	}
	if v := max(w.Volts, s.surfaceVolts()); v > touchVolts {
		out = append(out, fmt.Sprintf("%s V; may damage inputs, spark, ignite vapours.", Digits(v, 2)))
	}
	if w.Air > airLimit {
		out = append(out, fmt.Sprintf("%s MV/m outside the parts: air would break down; this field is not sustained.", Digits(w.Air/1e6, 2)))
	}
	return out
}

// contactPull returns the largest bound on the pull of one magnet on thick iron, mu0 M^2 A/2 with A the pole strength over M,
// and whose it is.
func (s *Setup) contactPull() (newtons float64, name string) {
	for i := range s.Parts {
		p := &s.Parts[i]
		if p.Kind != Magnetized {
			continue
		}
		var north, m float64
		if p.Charge != nil {
			for _, y := range p.Charge.Layers {
				north += max(y.Charge, 0)
				m = max(m, math.Abs(y.Max), math.Abs(y.Min))
			}
			north *= s.Unit * s.Unit
		}
		if f := magnet.Mu0 * m * north / 2; f > newtons || name == "" {
			newtons, name = f, p.Name
		}
	}
	return newtons, name
}

// surfaceVolts returns the largest potential difference between points of the surface of one polarized or charged part.
func (s *Setup) surfaceVolts() float64 {
	largest := 0.0
	for i := range s.Parts {
		if p := &s.Parts[i]; p.Kind == Polarized && p.Charge != nil {
			largest = max(largest, s.voltsAcross(p.Charge))
		}
	}
	return largest
}

// voltsAcross returns the largest potential difference between face nodes of a body, of that body alone.
func (s *Setup) voltsAcross(c *bound.Charge) float64 {
	var x []r3.Vec
	for _, y := range c.Layers {
		y.Face.Surface.Nodes(1, func(p, _ r3.Vec, _ float64) { x = append(x, p) })
	}
	at := field.PointsOf(x...)
	v := field.NewValues(at.Len(), field.WantPhi)
	c.Evaluate(v, at, field.Mean)
	lo, hi := math.Inf(1), math.Inf(-1)
	for _, phi := range v.Phi {
		lo, hi = min(lo, phi), max(hi, phi)
	}
	return (hi - lo) * s.Unit / epsilon0
}

// LeftOut returns what the model does not contain and how much it would matter, in the reader's terms.
func (s *Setup) LeftOut() []string {
	var out []string
	if line := s.recoil(); line != "" {
		out = append(out, line)
	}
	electric := false
	for i := range s.Parts {
		electric = electric || s.Parts[i].Kind == Polarized || s.Parts[i].Kind == Charged
	}
	if electric {
		v := s.surfaceVolts()
		line := "No dielectric or metal response: polarization and charge are taken as given."
		if v > 0 {
			line = fmt.Sprintf("No dielectric or metal response: %s V is taken as the measured surface potential, so the outside "+
				"field is right for a thin film and the inside field is nominal.", Digits(v, 2))
		}
		out = append(out, line)
	}
	if len(out) == 0 {
		out = append(out, "No response of any part to the field: all are rigid.")
	}
	return out
}

// recoil says what the recoil of the strongest magnet would take away: with the mean demagnetizing factor N along its
// magnetization, M falls by N (mu_rec - 1)/(1 + N (mu_rec - 1)).
func (s *Setup) recoil() string {
	const permeability = 1.05 // sintered magnets, common practice, no source
	var strongest *Part
	best := 0.0
	for i := range s.Parts {
		p := &s.Parts[i]
		if p.Kind != Magnetized || p.Charge == nil {
			continue
		}
		if m := r3.Norm(p.Charge.Moment); strongest == nil || m > best {
			strongest, best = p, m
		}
	}
	if strongest == nil {
		return ""
	}
	n := demagnetizing(strongest.Charge)
	if !(n > 0 && n < 1) {
		return "No recoil, no iron: magnets are rigid."
	}
	k := n * (permeability - 1)
	return fmt.Sprintf("No recoil: at µrec %.2f (N %.3f, Pc %.2f) the %s would be about %.1f %% weaker.", permeability, n, (1-n)/n,
		strongest.Name, 100*k/(1+k))
}

// demagnetizing returns the mean of -H.M/M^2 over a body in its own field.
func demagnetizing(c *bound.Charge) float64 {
	var x []r3.Vec
	var w []float64
	for _, v := range c.Volumes {
		v.Cell.Nodes(8, func(p r3.Vec, weight float64) { x, w = append(x, p), append(w, weight) })
	}
	at := field.PointsOf(x...)
	g := field.NewValues(at.Len(), field.WantG)
	c.Evaluate(g, at, field.Mean)
	var up, down float64
	for i := range x {
		p := c.Polarization(at.At(i).X)
		up -= w[i] * r3.Dot(p, r3.Vec{X: g.GX[i], Y: g.GY[i], Z: g.GZ[i]})
		down += w[i] * r3.Dot(p, p)
	}
	return up / down
}
