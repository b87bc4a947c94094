package solve

import (
	"context"
	"errors"
	"math"

	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/field"
	"example.com/boundpole/field/current"
	"example.com/boundpole/field/flux"
	"example.com/boundpole/field/force"
	"example.com/boundpole/geom"
	"example.com/boundpole/magnet"
	"gonum.org/v1/gonum/spatial/r3"
)

// Answer is what a request gives that is not for points, in SI.
type Answer struct {
	Quantities []Quantity
	Status     string // why quantities do not exist, or what they are worth; "" where all is well
	Missed     bool   // the wanted accuracy was not reached
}

// Quantity is a number or a vector of an answer.
type Quantity struct {
	Name     string
	Ladder   string    // of the units that people read, see report
	Value    []float64 // one number or three; NaN for what does not exist
	Estimate *float64  // of the error, absolute; nil for what is no result
	Text     string    // instead of a value
}

// number and vector make quantities with an estimate, given those without.
func number(name, ladder string, v, estimate float64) Quantity {
	return Quantity{Name: name, Ladder: ladder, Value: []float64{v}, Estimate: &estimate}
}

func vector(name, ladder string, v r3.Vec, estimate float64) Quantity {
	return Quantity{Name: name, Ladder: ladder, Value: []float64{v.X, v.Y, v.Z}, Estimate: &estimate}
}

func given(name, ladder string, v ...float64) Quantity {
	return Quantity{Name: name, Ladder: ladder, Value: v}
}

// Find returns a quantity by its name, nil if there is none.
func (a *Answer) Find(name string) *Quantity {
	for i := range a.Quantities {
		if a.Quantities[i].Name == name {
			return &a.Quantities[i]
		}
	}
	return nil
}

// CheckAnswer holds one hand check against an answer.
func CheckAnswer(h *scenefile.HandCheck, a *Answer) Check {
	q := a.Find(h.Quantity.Name)
	if q == nil {
		return held(h, math.NaN())
	}
	value := q.Value
	if len(value) == 3 {
		value = component(r3.Vec{X: value[0], Y: value[1], Z: value[2]}, h.Quantity.Of)
	}
	c := held(h, value...)
	c.Ladder = q.Ladder
	return c
}

// Answer answers a request that is not for points and no travel. Its error is that of the context alone: what cannot be
// computed is said in the answer.
func (s *Setup) Answer(ctx context.Context, q *scenefile.Request) (*Answer, error) {
	var a *Answer
	var err error
	switch q.Kind {
	case "reading":
		a, err = s.reading(ctx, q.Reading)
	case "linkage":
		a, err = s.linkage(ctx, q.Linkage)
	case "force":
		a, err = s.force(ctx, q.Force)
	case "energy":
		a, err = s.energy(ctx, q.Energy[0], q.Energy[1])
	case "reach":
		a, err = s.reach(q.Reach.FluxDensity)
	}
	switch {
	case errors.Is(err, context.Canceled) || errors.Is(err, context.DeadlineExceeded):
		return nil, err
	case errors.Is(err, flux.ErrNotConverged) || errors.Is(err, force.ErrNotConverged) || errors.Is(err, current.ErrNotConverged):
		if a.Missed { // what the request asks for may have converged all the same
			a.Status = "not converged"
		}
	case err != nil:
		a.Missed, a.Status = true, plainWords(err)
		for i := range a.Quantities {
			if q := &a.Quantities[i]; q.Estimate != nil {
				nothing(q.Value)
				q.Estimate = nil
			}
		}
	}
	return a, nil
}

func nothing(v []float64) {
	for i := range v {
		v[i] = math.NaN()
	}
}

// reach answers how far the flux density of the magnets reaches, without that of images and of the applied field.
func (s *Setup) reach(b float64) (*Answer, error) {
	m := magnet.Model{Unit: s.Unit}
	for i := range s.Parts {
		switch p := &s.Parts[i]; {
		case p.Kind == Magnetized && p.chi == nil:
			m.Parts = append(m.Parts, p.Member)
		case p.Body != nil:
			m.Parts = append(m.Parts, magnet.Part{Body: p.Body})
		}
	}
	r, err := m.Reach(b)
	nan := math.NaN()
	none := r3.Vec{X: nan, Y: nan, Z: nan}
	a := &Answer{}
	if err == nil && !r.Reached {
		r.At, r.FromAt, r.Distance, r.FromSurface, r.ErrDistance = none, none, nan, nan, nan
		a.Status = "not reached outside the bodies"
	}
	at, from := s.metres(r.At), s.metres(r.FromAt)
	n := s.perMetre
	a.Quantities = []Quantity{
		given("flux_density", "B", b),
		number("distance", "L", r.Distance/n, r.ErrDistance/n),
		given("point", "L", at.X, at.Y, at.Z),
		number("from_surface", "L", r.FromSurface/n, r.ErrDistance/n),
		given("from_surface_point", "L", from.X, from.Y, from.Z),
	}
	if r.Reached && r.ErrDistance > s.Scene.Accuracy*r.Distance {
		a.Missed = true
	}
	return a, err
}

// reading answers what a sensor reads.
func (s *Setup) reading(ctx context.Context, r *scenefile.Reading) (*Answer, error) {
	sheet, err := s.sensor(r)
	if err != nil {
		return &Answer{Quantities: []Quantity{number("mean", "B", math.NaN(), math.NaN())}}, err
	}
	ladder := "B"
	switch {
	case s.Magnetic:
	case s.Electric:
		ladder = "E"
	default:
		ladder = "A"
	}
	f := s.along(ladder)
	got, err := flux.Over(ctx, sheet, f, flux.Settings{Accuracy: min(s.Scene.Accuracy, 1e-3) / 4})
	area := sheet.Area()
	a := &Answer{Quantities: []Quantity{number("mean", ladder, got.Value/area, got.Estimate/area)}}
	a.Missed = got.Estimate > s.Scene.Accuracy*max(math.Abs(got.Value), floorShare*got.Size)
	return a, err
}

// along is the component of B, E or A along the normal.
func (s *Setup) along(ladder string) flux.Integrand {
	return func(x, n []r3.Vec, value, err []float64) {
		at := field.PointsOf(x...)
		switch ladder {
		case "B":
			for i, v := range s.magnetic.Readings(at, field.Mean) {
				value[i], err[i] = r3.Dot(v.B, n[i]), v.ErrB
			}
		case "E":
			for i, v := range s.electric.Readings(at, field.Mean) {
				value[i], err[i] = r3.Dot(v.E, n[i]), v.ErrE
			}
		case "A":
			for i, v := range s.guided(s.guides, at, field.Mean, nil) {
				value[i], err[i] = r3.Dot(v.A, n[i]), v.ErrA
			}
		}
	}
}

// sensor returns the area of a sensor in the scene.
func (s *Setup) sensor(r *scenefile.Reading) (geom.PlacedSheet, error) {
	var x r3.Vec
	if r.Along != nil {
		x = direction(*r.Along)
	}
	turn, err := geom.Frame(direction(r.Normal), x)
	if err != nil {
		return geom.PlacedSheet{}, err
	}
	pose := turn.Then(geom.Translate(r.At))
	if r.Disc != nil {
		return geom.SheetAt(geom.Disc{Radius: *r.Disc}, pose), nil
	}
	w, h := r.Rectangle[0]/2, r.Rectangle[1]/2
	return geom.SheetAt(geom.Polygon{Vertices: []r3.Vec{{X: -w, Y: -h}, {X: w, Y: -h}, {X: w, Y: h}, {X: -w, Y: h}}}, pose), nil
}
