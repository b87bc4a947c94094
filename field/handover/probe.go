package handover

import (
	"fmt"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"gonum.org/v1/gonum/spatial/r3"
)

// probeWays are the directions from the centre and the distances in bounding radii at which probes stand: off all planes of
// symmetry that bodies have, and outside every body.
var probeWays = [3]struct {
	way      r3.Vec
	distance float64
}{
	{r3.Vec{X: 0.36, Y: 0.48, Z: 0.8}, 1.5},
	{r3.Vec{X: -0.64, Y: 0.6, Z: 0.48}, 2},
	{r3.Vec{X: 0.48, Y: -0.64, Z: -0.6}, 3},
}

// probe fills in what the exact source gives, and how far the points are from it.
func (b *builder) probe(parts bound.Assembly) error {
	s := b.set
	s.Moment = r3.Add(r3.Scale(b.unit*b.unit*b.unit, b.moment), r3.Vec{})
	t := s.sums()
	s.Total, s.Magnitudes = b.total, t.magnitudes // bound charge has the total zero
	var at []r3.Vec
	for _, w := range probeWays {
		at = append(at, r3.Add(b.centre, r3.Scale(w.distance*b.radius, w.way)))
	}
	v := field.NewValues(len(at), field.WantPhi|field.WantG)
	field.Evaluate(parts, v, field.PointsOf(at...), field.Mean)
	for i, x := range at {
		one := v.At(i)
		if one.Phi-one.Phi != 0 || r3.Norm2(one.G)-r3.Norm2(one.G) != 0 {
			return fmt.Errorf("handover: the exact source has no value at the probe %v: %v; hand its parts over one by one", x, one.Status)
		}
		s.Probes[i] = Probe{
			At:        b.length(x),
			Potential: one.Phi*b.unit/s.divisor() + 0,
			Field:     r3.Add(r3.Scale(1/s.divisor(), one.G), r3.Vec{}),
		}
	}
	s.Within = s.miss(&t)
	return nil
}

// miss returns how far the points are from what the set says of the exact source.
func (s *Set) miss(t *sums) Within {
	w := Within{Moment: r3.Norm(r3.Sub(t.moment, s.Moment))}
	src := s.Source()
	for _, p := range s.Probes {
		v, f := s.at(src, p.At)
		w.Potential = larger(w.Potential, v-p.Potential)
		w.Field = larger(w.Field, r3.Norm(r3.Sub(f, p.Field)))
	}
	return w
}
