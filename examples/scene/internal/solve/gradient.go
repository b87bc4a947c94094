package solve

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"example.com/boundpole/magnet"
	"gonum.org/v1/gonum/spatial/r3"
)

// Tensor is a gradient of a field, row i that of component i.
type Tensor [3][3]float64

// Gradient is the gradient of the fields at one point in SI, per metre. What does not exist is nil: on an edge, at a
// point source, on a charged face where the library makes no claim, and where there are no parts of the kind.
type Gradient struct{ E, B *Tensor }

// gradients fills in the gradients of a chunk of records and holds them against the wanted accuracy.
func (s *Setup) gradients(recs []Record, at *field.Points, side field.Side, ways []r3.Vec) {
	for i := range recs {
		recs[i].Gradient = new(Gradient)
	}
	sample := func(parts bound.Assembly) *field.Values {
		return parts.Sample(at, side, ways, field.WantG|field.WantGrad|field.WantErr, r3.Vec{}).Values
	}
	if s.Electric {
		v := sample(s.electric.Parts)
		for i := range recs {
			if s.hidden(at.Vec(i), Charged) {
				continue
			}
			if t := s.tensorOf(&recs[i], v.At(i), "gradient E", at.Vec(i), [2]Kind{Polarized, Charged}); t != nil {
				recs[i].Gradient.E = t.scaled(s.perMetre / epsilon0)
			}
		}
	}
	if s.Magnetic {
		v := sample(s.magnetic.Parts)
		for i := range recs {
			if s.hidden(at.Vec(i), Magnetized) {
				continue
			}
			t := s.tensorOf(&recs[i], v.At(i), "gradient B", at.Vec(i), [2]Kind{Magnetized, Magnetized})
			if t == nil {
				continue
			}
			var way r3.Vec
			if ways != nil {
				way = ways[i]
			}
			if s.addMagnetization(t, at.At(i), way); !t.missing() {
				recs[i].Gradient.B = t.scaled(magnet.Mu0 * s.perMetre)
			}
		}
	}
}

// tensorOf returns the gradient in a value, nil where there is none, and notes under a name in the record where it has missed
// the wanted accuracy: off all faces it should exist. No suite proves gradients, so every estimate is asked.
func (s *Setup) tensorOf(rec *Record, v field.Value, name string, x r3.Vec, kinds [2]Kind) *Tensor {
	g := &v.Grad
	t := &Tensor{{g[0], g[3], g[4]}, {g[3], g[1], g[5]}, {g[4], g[5], g[2]}}
	free := v.Status == field.Regular || v.Status == field.NotConverged
	exists := (free || v.Status == field.OnFace) && !Missing(v.ErrGrad) && !t.missing()
	_, _, scale := s.floors(kinds, x)
	if reached := exists && v.ErrGrad <= s.Scene.Accuracy*max(t.norm(), scale); !reached && (exists || free) {
		rec.Missed = append(rec.Missed, name)
	}
	if !exists {
		return nil
	}
	return t
}

// addMagnetization adds the gradient of the magnetization at a point: on a face that of the side in the direction way, or
// the mean of both sides.
func (s *Setup) addMagnetization(t *Tensor, x field.Point, way r3.Vec) {
	for i := range s.Parts {
		p := &s.Parts[i]
		if p.Kind != Magnetized || p.Charge == nil {
			continue
		}
		if degree, ok := degreeOf(p.law); ok && degree == 0 {
			continue
		}
		share := 0.0
		switch place := p.Charge.Locate(x.X, x.Slack); place.Region {
		case geom.Inside:
			share = 1
		case geom.On:
			share = 0.5 * (1 - sign(r3.Dot(place.Normal, way)))
		}
		if share > 0 {
			t.add(turned(p.Pose, gradientOf(p.law, p.Pose.ToLocal(x.X).Value())), share*p.factor)
		}
	}
}

// sign returns -1, 0 or 1; directions that differ from a right angle by rounding alone are taken as such.
func sign(v float64) float64 {
	const rounding = 1e-9
	if math.Abs(v) <= rounding {
		return 0
	}
	return math.Copysign(1, v)
}

// turned returns a tensor of the frame of a pose in the outer frame.
func turned(pose geom.Pose, g [3][3]float64) (out [3][3]float64) {
	var rows [3]r3.Vec // R g^T, row by row of g
	for i, row := range g {
		rows[i] = pose.VectorToOuter(vec(row))
	}
	for k, column := range [3][3]float64{{rows[0].X, rows[1].X, rows[2].X}, {rows[0].Y, rows[1].Y, rows[2].Y}, {rows[0].Z, rows[1].Z, rows[2].Z}} {
		v := pose.VectorToOuter(vec(column))
		out[0][k], out[1][k], out[2][k] = v.X, v.Y, v.Z
	}
	return out
}

func (t *Tensor) add(g [3][3]float64, factor float64) {
	for i := range t {
		for k := range t[i] {
			t[i][k] += factor * g[i][k]
		}
	}
}

func (t *Tensor) scaled(factor float64) *Tensor {
	out := new(Tensor)
	out.add(*t, factor)
	return out
}

// norm returns the Frobenius norm.
func (t *Tensor) norm() float64 {
	n := 0.0
	for _, row := range t {
		n = math.Hypot(n, r3.Norm(vec(row)))
	}
	return n
}

func (t *Tensor) missing() bool { return Missing(t.norm()) }
