package solve

import (
	"context"
	"errors"
	"math"

	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/field"
	"example.com/boundpole/field/element"
	"example.com/boundpole/field/force"
	"example.com/boundpole/geom/pair"
	"example.com/boundpole/magnet"
	"gonum.org/v1/gonum/spatial/r3"
)

// part returns the index of a part by its name; the reader has seen to it that there is one.
func (s *Setup) part(name string) int {
	for i := range s.Parts {
		if s.Parts[i].Name == name {
			return i
		}
	}
	return 0
}

// family returns the kinds that act on each other.
func family(k Kind) Kind {
	if k == Polarized {
		return Charged
	}
	return k
}

// natural returns what a force in natural units is multiplied with: newtons of charge times field in the unit of the file.
func (s *Setup) natural(k Kind) float64 {
	n2 := s.perMetre * s.perMetre
	if family(k) == Magnetized {
		return magnet.Mu0 / n2
	}
	return 1 / epsilon0 / n2
}

// others returns all that acts on part i: the other parts of its kind, the images of all of them and its own, and the
// applied field.
func (s *Setup) others(i int) field.Source {
	kind := family(s.Parts[i].Kind)
	var rest, all field.Sum
	for k := range s.Parts {
		p := &s.Parts[k]
		if family(p.Kind) != kind || p.chi != nil {
			continue
		}
		all = append(all, p.source())
		if k != i {
			rest = append(rest, p.source())
		}
	}
	if images := s.images(all, kind); images != nil {
		rest = append(rest, images)
	}
	if g := s.appliedTo(kind); g != (r3.Vec{}) {
		rest = append(rest, field.Constant{G: g})
	}
	if r := s.response(kind); r != nil {
		rest = append(rest, r.response)
	}
	return rest
}

// response returns what the responding parts of a kind carry, nil for none.
func (s *Setup) response(kind Kind) *responding {
	for i := range s.Parts {
		if p := &s.Parts[i]; p.induced != nil && family(p.Kind) == kind {
			return p.induced
		}
	}
	return nil
}

// source returns what makes the field of a part.
func (p *Part) source() field.Source {
	if p.Charge != nil {
		return p.Charge
	}
	return p.Member.Source
}

// on returns what a field does to a part, in natural units.
func (s *Setup) on(ctx context.Context, p *Part, others field.Source, about r3.Vec) (force.Result, error) {
	set := &force.Settings{About: about, Accuracy: max(s.Scene.Accuracy, 1e-12) / 2}
	switch {
	case p.Charge != nil:
		return force.On(ctx, p.Charge, others, set)
	case p.Sheet != nil:
		density := func(x r3.Vec) float64 { return p.Density + r3.Dot(p.Gradient, p.toLocal(x)) }
		return force.OnSheet(ctx, p.Sheet, density, others, set)
	}
	switch src := p.Member.Source.(type) {
	case element.Dipole:
		return force.OnDipole(src, others, set)
	case element.Point:
		return force.OnPoint(src, others, set)
	}
	return force.Result{}, nil // circulating parts are bodies
}

// force answers force and torque on a part.
func (s *Setup) force(ctx context.Context, q *scenefile.Force) (*Answer, error) {
	i := s.part(q.On)
	p := &s.Parts[i]
	about := p.Centre
	if q.About != nil {
		about = *q.About
	}
	var r force.Result
	var err error
	switch {
	case p.Kind == Circulating: // flux that circulates acts on nothing at rest
	case p.induced != nil:
		r, err = p.induced.force(i, about)
	default:
		r, err = s.on(ctx, p, s.others(i), about)
	}
	k := s.natural(p.Kind)
	at := s.metres(about)
	kT := k / s.perMetre
	a := &Answer{Quantities: []Quantity{
		{Name: "on", Text: p.Name},
		given("about", "L", at.X, at.Y, at.Z),
		vector("force", "F", r3.Scale(k, r.Force), k*r.Error.Force),
		vector("torque", "T", r3.Scale(kT, r.Torque), kT*r.Error.Torque),
	}}
	a.Missed = !s.kept(r.Error.Force, r3.Norm(r.Force), r.Size.Force) || !s.kept(r.Error.Torque, r3.Norm(r.Torque), r.Size.Torque)
	return a, err
}

// kept reports whether an error keeps the wanted accuracy of a value, or is no more than the rounding of the magnitudes that
// cancel in it.
func (s *Setup) kept(err, value, magnitudes float64) bool {
	const rounding = 256 * 0x1p-53 // a field of some dozen roundings, times its arm
	return err <= max(s.Scene.Accuracy*max(value, cancels*magnitudes), rounding*magnitudes)
}

// cancels is the part of the sum of the magnitudes below which a force is not held to its own size.
const cancels = 1e-6

// energy answers the interaction energy of two parts; exactly 0 for parts that do not act on each other.
func (s *Setup) energy(ctx context.Context, one, two string) (*Answer, error) {
	a, b := &s.Parts[s.part(one)], &s.Parts[s.part(two)]
	var r force.Result
	var err error
	switch {
	case a.chi != nil || b.chi != nil:
		err = errors.New("a part that responds has no energy of a pair; ask for the force")
	case family(a.Kind) == family(b.Kind) && a.Kind != Circulating:
		r, err = s.on(ctx, a, b.source(), a.Centre)
	}
	k := s.natural(a.Kind) / s.perMetre
	answer := &Answer{Quantities: []Quantity{number("energy", "W", k*r.Energy, k*r.Error.Energy)}}
	answer.Missed = !s.kept(r.Error.Energy, math.Abs(r.Energy), r.Size.Energy)
	return answer, err
}

// toLocal returns a point of the scene in the part's own frame.
func (p *Part) toLocal(x r3.Vec) r3.Vec { return p.Pose.ToLocal(pair.VecOf(x)).Value() }
