package solve

import (
	"fmt"
	"math"
	"slices"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
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
	case s.has(Polarized, Charged):
		out = append(out, "No dielectric or metal response: polarization and charge are taken as they are given.")
	}
	if len(out) == 0 {
		out = append(out, "No response of any part to the field: all are rigid.")
	}
	return out
}

// film returns the surface potential of the scene's electric part with the largest, if that is a thin polarized film.
func (s *Setup) film() (string, bool) {
	v, p := s.surfaceVolts()
	if p == nil || p.Charge == nil {
		return "", false
	}
	size := r3.Sub(p.Local.Max, p.Local.Min)
	edges := []float64{size.X, size.Y, size.Z}
	slices.Sort(edges)
	const thin = 0.1 // thickness over width
	return volts(v), edges[0] <= thin*edges[1]
}

// recoil says what the recoil of the strongest magnet would take away: with the mean demagnetizing factor N along its
// magnetization, M falls by N (mu_rec - 1)/(1 + N (mu_rec - 1)).
func (s *Setup) recoil() string {
	const permeability = 1.05 // sintered magnets, common practice, no source
	const rigid = "No recoil, no iron: magnets are rigid."
	var strongest *Part
	best := 0.0
	s.originals(func(p *Part) {
		if p.Kind != Magnetized || p.Charge == nil {
			return
		}
		if m := r3.Norm(p.Charge.Moment); strongest == nil || m > best {
			strongest, best = p, m
		}
	})
	if strongest == nil {
		if s.has(Magnetized) {
			return rigid
		}
		return ""
	}
	n := demagnetizing(strongest.Charge)
	if !(n > 0 && n < 1) {
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

// demagnetizing returns the mean of -H.M/M^2 over a body in its own field. The integral of -H.M is the energy of the
// charges in their own potential, so nodes on the faces do, and the potential is smooth there.
func demagnetizing(c *bound.Charge) float64 {
	at := &field.Points{}
	var charge []float64
	add := func(x r3.Vec, q float64) {
		if q != 0 {
			at.X, at.Y, at.Z, charge = append(at.X, x.X), append(at.Y, x.Y), append(at.Z, x.Z), append(charge, q)
		}
	}
	n := 8
	for n > 1 && n*n*len(c.Layers) > 10*mostFaces {
		n--
	}
	if len(c.Layers) > 10*mostFaces {
		return math.NaN() // too many for words
	}
	for _, y := range c.Layers {
		y.Face.Surface.Nodes(n, func(x, normal r3.Vec, w float64) { add(x, w*c.Density(x, r3.Scale(y.Face.Sign(), normal))) })
	}
	var down float64
	for _, v := range c.Volumes {
		v.Cell.Nodes(max(n/2, 2), func(x r3.Vec, w float64) {
			p := c.Polarization(field.PointsOf(x).At(0).X)
			down += w * r3.Dot(p, p)
			add(x, w*v.Charge/v.Size) // the divergence of an affine polarization is constant
		})
	}
	phi := field.NewValues(at.Len(), field.WantPhi)
	c.Evaluate(phi, at, field.Mean)
	var up float64
	for i, q := range charge {
		up += q * phi.Phi[i]
	}
	return up / down
}
