package solve

import (
	"context"
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/force"
	"example.com/boundpole/field/response"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"example.com/boundpole/magnet"
	"gonum.org/v1/gonum/spatial/r3"
)

// responding is the parts of one kind that respond to the field, and what they carry.
type responding struct {
	parts    []int // of the setup, in the order of the bodies
	response *response.Response
}

// index returns the number of a part among the bodies, or -1.
func (r *responding) index(part int) int {
	for k, i := range r.parts {
		if i == part {
			return k
		}
	}
	return -1
}

// force returns what acts on a part that responds.
func (r *responding) force(part int, about r3.Vec) (force.Result, error) {
	f, t, err := r.response.Force(r.index(part), about)
	if err != nil {
		return force.Result{}, err
	}
	return force.Result{Force: f.Value, Torque: t.Value, Error: force.Bounds{Force: f.Estimate, Torque: t.Estimate},
		Size: force.Bounds{Force: r3.Norm(f.Value), Torque: r3.Norm(t.Value)}}, nil
}

// Respond solves for the parts that respond to the field. It comes before all answers; a scene of rigid parts has nothing to
// solve.
func (s *Setup) Respond(ctx context.Context) error {
	for _, kind := range []Kind{Charged, Magnetized} {
		r := &responding{}
		var bodies []geom.Body
		var materials []response.Material
		for i := range s.Parts {
			p := &s.Parts[i]
			if p.chi == nil || family(p.Kind) != kind {
				continue
			}
			m := response.Material{Chi: *p.chi}
			if p.law != nil {
				m.Fixed = field.Times{Polarization: p.law, Factor: p.factor}
			}
			r.parts, bodies, materials = append(r.parts, i), append(bodies, p.Body), append(materials, m)
		}
		if len(bodies) == 0 {
			continue
		}
		if err := s.respond(ctx, kind, r, bodies, materials); err != nil {
			return err
		}
	}
	return nil
}

// checkResponding refuses what stands in a part that responds, and planes beside one.
func (s *Setup) checkResponding() error {
	refuse := func(i, other int) error {
		return s.Scene.ErrorAt(fmt.Sprintf("/parts/%d", s.Parts[i].Of), fmt.Sprintf("%s responds to the field and %s stands in it", s.Parts[i].Name, s.Parts[other].Name),
			"move them apart")
	}
	for i := range s.Parts {
		if s.Parts[i].chi == nil {
			continue
		}
		if s.images(field.Sum{}, family(s.Parts[i].Kind)) != nil {
			return s.Scene.ErrorAt("/planes", "planes beside parts that respond are not supported yet", "leave the plane out, or make the parts rigid")
		}
		for _, two := range s.overlaps {
			switch i {
			case two[0]:
				return refuse(i, two[1])
			case two[1]:
				return refuse(i, two[0])
			}
		}
		for k := range s.Parts {
			p := &s.Parts[k]
			if p.Body == nil && p.Sheet == nil && s.Parts[i].Body.Locate(pair.VecOf(p.Centre), 0).Region != geom.Outside {
				return refuse(i, k)
			}
		}
	}
	return nil
}

// respond solves for the parts of one kind and adds what they carry to the models.
func (s *Setup) respond(ctx context.Context, kind Kind, r *responding, bodies []geom.Body, materials []response.Material) error {
	refuse := func(err error) error {
		if ctx.Err() != nil {
			return ctx.Err()
		}
		return s.Scene.ErrorAt(fmt.Sprintf("/parts/%d", s.Parts[r.parts[0]].Of), "the response cannot be solved: "+plainWords(err), "")
	}
	system, err := response.Prepare(ctx, bodies, nil)
	if err != nil {
		return refuse(err)
	}
	applied := s.rigid(kind)
	if r.response, err = system.Solve(ctx, materials, applied); err != nil {
		return refuse(err)
	}
	for k, i := range r.parts {
		p := &s.Parts[i]
		p.Peak = r3.Norm(r.response.Moment(k).Value) / p.Body.Volume()
		p.induced = r
		if k == 0 { // the field of all of them together
			p.Member = bound.Member{Source: r.response, Body: anyOf{bodies[0], bodies}}
		}
	}
	member := bound.Member{Source: r.response, Body: anyOf{bodies[0], bodies}}
	if kind == Magnetized {
		s.magnetic.Parts = append(s.magnetic.Parts, member)
	} else {
		s.electric.Parts = append(s.electric.Parts, member)
	}
	s.slow = true
	return nil
}

// anyOf is several bodies as the place of one source.
type anyOf struct {
	geom.Body // the first
	all       []geom.Body
}

// Locate tells where a point lies with respect to the first body that it is in or on.
func (a anyOf) Locate(x pair.Vec, slack float64) geom.Place {
	for _, b := range a.all {
		if place := b.Locate(x, slack); place.Region != geom.Outside {
			return place
		}
	}
	return geom.Place{Face: -1}
}

// Responds reports whether a part responds to the field.
func (p *Part) Responds() bool { return p.chi != nil }

// rigid returns what parts of a kind respond to: the rigid ones and the applied field.
func (s *Setup) rigid(kind Kind) field.Source {
	var all field.Sum
	for i := range s.Parts {
		if p := &s.Parts[i]; family(p.Kind) == kind && p.chi == nil {
			all = append(all, p.source())
		}
	}
	if g := s.appliedTo(kind); g != (r3.Vec{}) {
		all = append(all, field.Constant{G: g})
	}
	return all
}

// appliedTo returns the applied field that acts on parts of a kind, in natural units.
func (s *Setup) appliedTo(kind Kind) r3.Vec {
	switch a := s.Scene.Applied; {
	case a == nil:
	case kind == Magnetized && a.B != nil:
		return r3.Scale(1/magnet.Mu0, *a.B)
	case kind == Charged && a.E != nil:
		return r3.Scale(epsilon0, *a.E)
	}
	return r3.Vec{}
}

// content returns p0 + chi g of a responding part at a point, g the whole field on its inside. In a conductor D is zero; B
// in iron without limit is not determined.
func (p *Part) content(x pair.Vec, g r3.Vec) r3.Vec {
	if math.IsInf(*p.chi, 1) {
		if p.Kind == Magnetized {
			nan := math.NaN()
			return r3.Vec{X: nan, Y: nan, Z: nan}
		}
		return r3.Scale(-1, g)
	}
	out := r3.Scale(*p.chi, g)
	if p.law != nil {
		fixed := p.law.At(p.Pose.ToLocal(x).Value())
		out = r3.Add(out, r3.Scale(p.factor, p.Pose.VectorToOuter(fixed)))
	}
	return out
}

// addContent adds to D and B of a record what responding parts carry at its point: on their faces that of the wanted side,
// or half.
func (s *Setup) addContent(rec *Record, at *field.Points, side field.Side, way r3.Vec) {
	x := at.At(0)
	for i := range s.Parts {
		p := &s.Parts[i]
		if p.induced == nil {
			continue
		}
		place := p.Body.Locate(x.X, x.Slack)
		share := 0.0
		switch place.Region {
		case geom.Inside:
			share = 1
		case geom.On:
			share = 0.5 * (1 - sign(r3.Dot(place.Normal, way)))
		}
		if share == 0 {
			continue
		}
		inner := []r3.Vec{{}}
		if place.Region == geom.On {
			inner[0] = r3.Scale(-1, place.Normal)
		}
		if p.Kind == Magnetized {
			h := s.magnetic.ReadingsTowards(at, field.Inside, inner)[0].H
			rec.Magnetic.B = r3.Add(rec.Magnetic.B, r3.Scale(share*magnet.Mu0, p.content(x.X, h)))
			continue
		}
		e := s.electric.ReadingsTowards(at, field.Inside, inner)[0].E
		rec.Electric.D = r3.Add(rec.Electric.D, r3.Scale(share, p.content(x.X, r3.Scale(epsilon0, e))))
	}
}

// responseCharge returns what a responding part carries, as a whole: its induced charge has no density of its own that one
// could name face by face.
func (s *Setup) responseCharge(p *Part, part int) PartCharge {
	out := s.emptyBody(p.Body)
	k := p.induced.index(part)
	r := p.induced.response
	n2 := s.perMetre * s.perMetre
	for i := range out.Faces {
		f := &out.Faces[i]
		f.Charge, f.Min, f.Max = math.NaN(), math.NaN(), math.NaN()
	}
	q := r.Charge(k)
	out.Total, out.Moment = q.Value/n2, over(r.Moment(k).Value, n2*s.perMetre)
	if math.Abs(q.Value) <= q.Estimate {
		out.Total = 0
	}
	out.Scale = math.NaN()
	return out
}
