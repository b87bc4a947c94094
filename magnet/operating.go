package magnet

import (
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"example.com/boundpole/magnet/grade"
	"gonum.org/v1/gonum/spatial/r3"
)

// OperatingPoint is where the material of a magnet works at one place, along its magnetization.
type OperatingPoint struct {
	grade.Point
	X        r3.Vec  // in the frame and unit of the model
	N        float64 // local demagnetizing factor -H/M of the part's own field
	Applied  float64 // A/m, field of everything else along the magnetization
	Estimate float64 // A/m, of the numerical error of H
}

// OperatingMap is the operating points over a magnet.
type OperatingMap struct {
	Points []OperatingPoint // inner nodes first, then the face nodes, on the inside
	Inner  int              // number of inner nodes
	Worst  int              // index of the point with the greatest Use
	MeanH  float64          // A/m, mean over the volume
	Passed bool             // somewhere the limit of the material is passed: expect loss there
}

// Operating returns the operating points of part i over its volume and just under its faces, n points a direction in each
// cell and on each face. The material recoils from the remanence mu0 |M| that the part was given, in the field of the rigid
// magnets: each place as if the recoil were the same everywhere, which is wrong by the order of mu_rec - 1 times the
// variation of H over the body.
//
// The mean alone hides what happens: the middle and the faces of a flat magnet work lower than its mean.
//
// Domain: a part that is a magnetized body, 1 <= n <= 16; an error otherwise. Points where M is zero are left out.
// Source: grade.Material.Operating at each point.
func (m Model) Operating(i int, mat grade.Material, n int) (OperatingMap, error) {
	var out OperatingMap
	if i < 0 || i >= len(m.Parts) {
		return out, fmt.Errorf("magnet: part %d of %d; count from 0", i, len(m.Parts))
	}
	c := m.Parts[i].Charge
	switch {
	case c == nil:
		return out, fmt.Errorf("magnet: part %d is no magnetized body; an operating point needs one", i)
	case n < 1 || n > 16:
		return out, fmt.Errorf("magnet: %d points a direction; want 1 to 16", n)
	}
	body := c.Body()
	var inner, weights, outer = []r3.Vec{}, []float64{}, []r3.Vec{}
	for _, cell := range body.Cells() {
		cell.Nodes(n, func(x r3.Vec, w float64) {
			if body.Locate(pair.VecOf(x), 0).Region == geom.Inside {
				inner, weights = append(inner, x), append(weights, w)
			}
		})
	}
	for _, f := range body.Faces() {
		f.Surface.Nodes(n, func(x, _ r3.Vec, _ float64) { outer = append(outer, x) })
	}
	out.Points = append(m.operating(i, mat, inner, field.Mean), m.operating(i, mat, outer, field.Inside)...)
	out.Inner = len(inner)
	var volume float64
	points := out.Points[:0]
	for k, p := range out.Points {
		if math.IsNaN(p.H) {
			if k < len(inner) {
				out.Inner--
			}
			continue
		}
		if k < len(inner) {
			out.MeanH += weights[k] * p.H
			volume += weights[k]
		}
		points = append(points, p)
	}
	out.Points = points
	out.MeanH /= volume
	for k, p := range out.Points {
		if p.Use > out.Points[out.Worst].Use {
			out.Worst = k
		}
		out.Passed = out.Passed || p.Margin < 0
	}
	return out, nil
}

// operating returns the operating points of part i at given places; NaN where it has no magnetization.
func (m Model) operating(i int, mat grade.Material, x []r3.Vec, side field.Side) []OperatingPoint {
	c := m.Parts[i].Charge
	at := field.PointsOf(x...)
	own := field.NewValues(len(x), field.WantG|field.WantErr)
	field.Evaluate(c, own, at, side)
	others := m
	others.Parts = append(append(others.Parts[:0:0], m.Parts[:i]...), m.Parts[i+1:]...)
	rest := field.NewValues(len(x), field.WantG|field.WantErr)
	others.Parts.Evaluate(rest, at, field.Mean)
	out := make([]OperatingPoint, len(x))
	for k := range x {
		pol := c.Polarization(pair.VecOf(x[k]))
		size := r3.Norm(pol)
		way := r3.Scale(1/size, pol)
		applied := r3.Dot(r3.Add(rest.At(k).G, r3.Scale(1/Mu0, m.Applied)), way)
		p := OperatingPoint{X: x[k], N: -r3.Dot(own.At(k).G, way) / size, Applied: applied}
		p.Point = mat.Operating(Mu0*size, p.N, applied)
		p.Estimate = own.At(k).ErrG + rest.At(k).ErrG
		out[k] = p
	}
	return out
}
