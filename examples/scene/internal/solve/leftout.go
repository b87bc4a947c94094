package solve

import (
	"fmt"
	"math"
	"slices"

	"gonum.org/v1/gonum/spatial/r3"
)

// LeftOut returns what the model does not contain and how much it would matter, in the reader's terms.
func (s *Setup) LeftOut() []string {
	var out []string
	if line := s.recoil(); line != "" {
		out = append(out, line)
	}
	switch volts, film := s.film(); {
	case film:
		out = append(out, fmt.Sprintf("No dielectric or metal response: %s is taken as the measured surface potential, so the outside "+
			"field is right for a thin film and the inside field is nominal.", volts))
	case s.hasRigid(Polarized, Charged):
		out = append(out, "No dielectric or metal response: polarization and charge are taken as they are given.")
	}
	if s.Responds {
		out = append(out, "Response is linear: no saturation, no loss, no hysteresis.")
	}
	if len(out) == 0 {
		out = append(out, "No response of any part to the field: all are rigid.")
	}
	return out
}

// film returns the surface potential of the scene's electric part with the largest, if that is a thin polarized film.
func (s *Setup) film() (string, bool) {
	v, p := s.surface()
	if p == nil || p.Charge == nil {
		return "", false
	}
	size := r3.Sub(p.Local.Max, p.Local.Min)
	edges := []float64{size.X, size.Y, size.Z}
	slices.Sort(edges)
	const thin = 0.1 // thickness over width
	moment := p.Pose.VectorToLocal(p.Charge.Moment)
	through := moment.X // along the thickness
	switch edges[0] {
	case size.Z:
		through = moment.Z
	case size.Y:
		through = moment.Y
	}
	return volts(v), edges[0] <= thin*edges[1] && math.Abs(through) >= strength(p.Charge)/2
}

// recoil says what the recoil of the strongest magnet would take away: with the mean demagnetizing factor N along its
// magnetization, M falls by N (mu_rec - 1)/(1 + N (mu_rec - 1)).
func (s *Setup) recoil() string {
	const permeability = 1.05 // sintered magnets, common practice, no source
	const rigid = "No recoil, no iron: magnets are rigid."
	var strongest *Part
	best := 0.0
	s.originals(func(p *Part) {
		if p.Kind != Magnetized || p.Charge == nil || p.chi != nil {
			return
		}
		if m := strength(p.Charge); strongest == nil || m > best {
			strongest, best = p, m
		}
	})
	if strongest == nil {
		if s.hasRigid(Magnetized) {
			return rigid
		}
		return ""
	}
	n, ok := demagnetizing(strongest)
	if !ok {
		return rigid
	}
	k := n * (permeability - 1)
	which := ""
	if s.magnets() > 1 {
		which = fmt.Sprintf(" (%s, the strongest)", strongest.Name)
	}
	return fmt.Sprintf("No recoil: at µrec %.2f (N %.3f, Pc %.2f) the magnet would be about %.1f %% weaker%s.", permeability, n, (1-n)/n,
		100*k/(1+k), which)
}

// hasRigid reports whether any part of one of the kinds is rigid.
func (s *Setup) hasRigid(kinds ...Kind) bool {
	for i := range s.Parts {
		if p := &s.Parts[i]; p.chi == nil && slices.Contains(kinds, p.Kind) {
			return true
		}
	}
	return false
}

// magnets returns the number of magnetized parts, copies counted.
func (s *Setup) magnets() int {
	n := 0
	for i := range s.Parts {
		if s.Parts[i].Kind == Magnetized {
			n++
		}
	}
	return n
}
