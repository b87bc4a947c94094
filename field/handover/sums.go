package handover

import (
	"fmt"
	"math"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// sums is what the points of a set add up to.
type sums struct {
	total, magnitudes float64
	moment            r3.Vec  // about Set.About
	arms              float64 // sum of the magnitudes that add up to the moment
}

// sums adds up the points.
func (s *Set) sums() sums {
	var total, magnitudes, arms pair.Float
	var moment pair.Vec
	for i := range s.Groups {
		for _, p := range s.Groups[i].Points {
			arm := r3.Sub(p.At, s.About)
			total = total.AddFloat(p.Charge)
			magnitudes = magnitudes.AddFloat(math.Abs(p.Charge))
			moment = moment.Add(pair.VecOf(r3.Scale(p.Charge, arm)))
			arms = arms.AddFloat(math.Abs(p.Charge) * r3.Norm(arm))
		}
		for _, d := range s.Groups[i].Dipoles {
			moment = moment.Add(pair.VecOf(d.Moment))
			arms = arms.AddFloat(r3.Norm(d.Moment))
		}
	}
	return sums{total.Value(), magnitudes.Value(), moment.Value(), arms.Value()}
}

// checkSums compares total, magnitudes, moment and probes with the points.
func (s *Set) checkSums() error {
	t := s.sums()
	if err := agree("handover: the magnitudes of all points sum to", t.magnitudes, s.Magnitudes, agreement*t.magnitudes); err != nil {
		return err
	}
	if err := agree("handover: the charges of all points sum to", t.total, s.Total, agreement*t.magnitudes); err != nil {
		return err
	}
	if err := agreeVec("handover: the moment of the points is", t.moment, s.Moment, s.Within.Moment+agreement*t.arms); err != nil {
		return err
	}
	src := s.Source()
	for i, p := range s.Probes {
		v, f := s.at(src, p.At)
		sizeV, sizeF := s.sizes(p.At)
		if v-v != 0 || sizeF-sizeF != 0 {
			return fmt.Errorf("handover: probe %d at %v is on a point; probes are outside", i, p.At)
		}
		if err := agree(fmt.Sprintf("handover: the potential of the points at probe %d is", i), v, p.Potential, s.Within.Potential+agreement*sizeV); err != nil {
			return err
		}
		if err := agreeVec(fmt.Sprintf("handover: the field of the points at probe %d is", i), f, p.Field, s.Within.Field+agreement*sizeF); err != nil {
			return err
		}
	}
	return nil
}

// sizes returns the sums of the magnitudes that add up to potential and field at x.
func (s *Set) sizes(x r3.Vec) (potential, f float64) {
	for i := range s.Groups {
		for _, p := range s.Groups[i].Points {
			r := r3.Norm(r3.Sub(x, p.At))
			potential += math.Abs(p.Charge) / r
			f += math.Abs(p.Charge) / (r * r)
		}
		for _, d := range s.Groups[i].Dipoles {
			r, m := r3.Norm(r3.Sub(x, d.At)), r3.Norm(d.Moment)
			potential += m / (r * r)
			f += 2 * m / (r * r * r)
		}
	}
	scale := 1 / (4 * math.Pi * s.divisor())
	return scale * potential, scale * f
}

// agreeVec is agree for vectors.
func agreeVec(what string, got, said r3.Vec, tolerance float64) error {
	if r3.Norm(r3.Sub(got, said)) <= tolerance {
		return nil
	}
	along := r3.Dot(got, said) / r3.Norm2(said)
	if !(r3.Norm(r3.Sub(got, r3.Scale(along, said))) <= 1e-6*r3.Norm(got)) {
		along = math.NaN() // not along each other: no common factor
	}
	return fmt.Errorf("%s %v, and %v is stated; %s", what, got, said, reason(along))
}
