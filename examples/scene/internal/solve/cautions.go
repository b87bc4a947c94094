package solve

import (
	"fmt"
	"math"
	"slices"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/magnet"
	"gonum.org/v1/gonum/spatial/r3"
)

// Watch gathers over all answers what the cautions depend on.
type Watch struct {
	Volts float64 // largest |V| seen
	Air   float64 // largest |E| seen outside all parts, V/m
	Reach bool    // a reach was asked for
}

// See takes in one record of a request for a side.
func (w *Watch) See(r *Record, side field.Side) {
	if v := math.Abs(r.Electric.V); v > w.Volts {
		w.Volts = v
	}
	outside := r.Inside < 0 && (r.Status == field.Regular || r.Status == field.NotConverged || r.Status == field.OnFace && side == field.Outside)
	if e := r3.Norm(r.Electric.E); outside && e > w.Air {
		w.Air = e
	}
}

// limits of the cautions: common practice, no source; for air, the breakdown strength of long gaps at sea level.
const (
	touchVolts = 60  // V
	airLimit   = 3e6 // V/m
)

// Cautions returns what has to be said beside the numbers, only where it applies.
func (s *Setup) Cautions(w Watch) []string {
	var out []string
	if s.has(Magnetized) {
		bound := ""
		if pull, name := s.contactPull(); pull > 0 {
			bound = fmt.Sprintf(" Bound on contact pull to thick iron, Br²A/2µ0: %s (%s).", newtons(pull), name)
		}
		out = append(out,
			"Attracts suddenly; may pinch or shatter."+bound+" Keep from children; if swallowed, get medical help at once.",
			"Fields of about 0.5–1 mT may affect implants: follow the clinician and the device maker.")
	}
	surface, _ := s.surface()
	if w.Reach {
		out = append(out, "Rigid parts only, no iron nearby; for planning, not a clearance; measure.")
	}
	if v := max(w.Volts, surface); v > touchVolts {
		out = append(out, volts(v)+"; may damage inputs, spark, ignite vapours.")
	}
	if w.Air > airLimit {
		out = append(out, fmt.Sprintf("%s MV/m outside the parts: air would break down; this field is not sustained.", Digits(w.Air/1e6, 2)))
	}
	return out
}

func newtons(f float64) string {
	switch {
	case f >= 9950:
		return Digits(f/1e3, 2) + " kN"
	case f >= 0.0995:
		return Digits(f, 2) + " N"
	}
	return Digits(f*1e3, 2) + " mN"
}

func volts(v float64) string {
	if v >= 9950 {
		return Digits(v/1e3, 2) + " kV"
	}
	return Digits(v, 2) + " V"
}

// has reports whether any part is of one of the kinds.
func (s *Setup) has(kinds ...Kind) bool {
	for i := range s.Parts {
		if slices.Contains(kinds, s.Parts[i].Kind) {
			return true
		}
	}
	return false
}

// originals calls visit for every part that is not a copy of the one before: copies carry the same, in either sense.
func (s *Setup) originals(visit func(p *Part)) {
	for i := range s.Parts {
		if i == 0 || s.Parts[i].Of != s.Parts[i-1].Of {
			visit(&s.Parts[i])
		}
	}
}

// contactPull returns the largest bound on the pull of one magnetized body on thick iron, mu0 M^2 A/2 with A the pole
// strength over M, and whose it is.
func (s *Setup) contactPull() (newtons float64, name string) {
	s.originals(func(p *Part) {
		if p.Kind != Magnetized || p.Charge == nil {
			return
		}
		var poles, m float64
		for _, y := range p.Charge.Layers {
			poles += math.Abs(y.Charge) / 2
			m = max(m, math.Abs(y.Max), math.Abs(y.Min))
		}
		if signed := p.Charge.Identities; len(signed) > 0 {
			poles = max(poles, signed[0].Scale/2) // a face may carry both signs
		}
		if f := magnet.Mu0 * m * poles / (s.perMetre * s.perMetre) / 2; f > newtons {
			newtons, name = f, p.Name
		}
	})
	return newtons, name
}

// surfaceVolts returns the largest potential difference between points of the surface of one polarized body or, for a
// charged sheet, against far away, each in its own field alone; and the part.
func (s *Setup) surfaceVolts() (largest float64, of *Part) {
	s.originals(func(p *Part) {
		if p.Kind != Polarized && p.Kind != Charged {
			return
		}
		if v := s.voltsAcross(p); v > largest {
			largest, of = v, p
		}
	})
	return largest, of
}

func (s *Setup) voltsAcross(p *Part) float64 {
	at := &field.Points{}
	add := func(x, _ r3.Vec, _ float64) {
		at.X, at.Y, at.Z = append(at.X, x.X), append(at.Y, x.Y), append(at.Z, x.Z)
	}
	lo, hi := math.Inf(1), math.Inf(-1)
	switch {
	case p.Charge != nil:
		layers, looks := p.Charge.Layers, 1
		if degree, ok := degreeOf(p.law); !p.integrated() && !(ok && degree <= 1) {
			looks = 4
		}
		for i := 0; i < len(layers); i += 1 + len(layers)/mostFaces {
			layers[i].Face.Surface.Nodes(looks, add)
		}
	case p.Sheet != nil:
		p.Sheet.Nodes(2, add)
		lo, hi = 0, 0
	default:
		return 0
	}
	v := field.NewValues(at.Len(), field.WantPhi)
	bound.Assembly{p.Member}.Evaluate(v, at, field.Mean)
	for _, phi := range v.Phi {
		if !Missing(phi) {
			lo, hi = min(lo, phi), max(hi, phi)
		}
	}
	return max(hi-lo, 0) * s.Unit / epsilon0
}

// mostFaces is about how many faces of a body are looked at for what is said in words.
const mostFaces = 200
