package magnet

import (
	"context"
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/flux"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// Factors is the magnetometric demagnetizing tensor of a body, uniformly magnetized (chi = 0): H = -N M on the mean over the
// volume. It is symmetric with the trace 1.
type Factors struct {
	N        [3][3]float64
	Estimate float64 // of the error of each component, absolute
}

// Along returns N along a direction of any length.
func (f Factors) Along(way r3.Vec) float64 {
	w := r3.Unit(way)
	v := [3]float64{w.X, w.Y, w.Z}
	var n float64
	for i := range v {
		for j := range v {
			n += v[i] * f.N[i][j] * v[j]
		}
	}
	return n
}

// Demagnetizing returns the demagnetizing tensor of any body by its own field:
// N_ij = (1/V) times the integral of phi_j n_i over the surface, with phi_j the potential of the body magnetized along
// axis j with strength 1.
//
// Units: none.
// Frame: that of the body; a placed body's is the outer one.
// Domain: bodies that bound.Of takes and whose faces have charts; an error otherwise.
// Singular: nowhere.
// Accuracy: Estimate, by default below 1e-8 (TestDemagnetizing). A susceptibility other than 0 changes the mean factor of
// every shape but the ellipsoid: see the tables of [Chen1991].
// Source: the mean of -H by Gauss's theorem, [Own].
func Demagnetizing(ctx context.Context, body geom.Body) (Factors, error) {
	var f Factors
	if err := body.Check(); err != nil {
		return f, err
	}
	volume := body.Volume()
	for j, axis := range []r3.Vec{{X: 1}, {Y: 1}, {Z: 1}} {
		c, err := bound.Of(body, field.Uniform{P: turnedBack(body, axis)})
		if err != nil {
			return f, err
		}
		for _, face := range body.Faces() {
			s, ok := face.Surface.(geom.Charted)
			if !ok {
				return f, fmt.Errorf("magnet: face %s of the %T has no charts; use a surface that is Charted", face.Name, body)
			}
			for i := range 3 {
				r, err := flux.Over(ctx, s, potentialTimesNormal(c, i), flux.Settings{Accuracy: 1e-9, Edges: true})
				if err != nil {
					return f, err
				}
				f.N[i][j] += face.Sign() * r.Value / volume
				f.Estimate = max(f.Estimate, 0) + r.Estimate/volume
			}
		}
	}
	for i := range 3 {
		for j := range i {
			mean := (f.N[i][j] + f.N[j][i]) / 2
			f.N[i][j], f.N[j][i] = mean, mean
		}
	}
	return f, nil
}

// turnedBack returns a direction of the outer frame in the frame in which the body's polarization is given.
func turnedBack(body geom.Body, v r3.Vec) r3.Vec {
	if p, ok := body.(geom.Placed); ok {
		return p.Pose.VectorToLocal(v)
	}
	return v
}

// potentialTimesNormal is the integrand phi n_i.
func potentialTimesNormal(src field.Source, i int) flux.Integrand {
	return func(x, n []r3.Vec, value, err []float64) {
		v := field.NewValues(len(x), field.WantPhi|field.WantErr)
		field.Evaluate(src, v, field.PointsOf(x...), field.Mean)
		for k := range x {
			component := [3]float64{n[k].X, n[k].Y, n[k].Z}[i]
			at := v.At(k)
			value[k], err[k] = at.Phi*component, at.ErrPhi*math.Abs(component)
		}
	}
}

// LoopPoint is a point of a measured magnetization curve.
type LoopPoint struct {
	H float64 // A/m, applied or inner field
	M float64 // A/m
}

// Sheared returns the points of a loop measured in an open circuit against the inner field H - N M: the demagnetization
// correction. N has to fit the instrument: the magnetometric factor where the whole moment is measured, the fluxmetric one
// where the flux through the middle is.
//
// Domain: 0 <= n <= 1; an error otherwise.
func Sheared(loop []LoopPoint, n float64) ([]LoopPoint, error) {
	if !(n >= 0 && n <= 1) {
		return nil, fmt.Errorf("magnet: demagnetizing factor %v; want 0 to 1 (SI; a CGS factor is 4 pi times that)", n)
	}
	out := make([]LoopPoint, len(loop))
	for i, p := range loop {
		if math.IsNaN(p.H-p.M) || math.IsInf(p.H-p.M, 0) {
			return nil, fmt.Errorf("magnet: loop point %d is H %v, M %v; want finite numbers", i, p.H, p.M)
		}
		out[i] = LoopPoint{H: p.H - n*p.M, M: p.M}
	}
	return out, nil
}

// Susceptibility returns the susceptibility M/(H - N M) of a material whose sample of factor n shows the apparent one M/H:
// +Inf where the sample shows 1/n, the most that it can, and NaN beyond.
func Susceptibility(apparent, n float64) float64 {
	switch d := 1 - n*apparent; {
	case d > 0:
		return apparent / d
	case d == 0:
		return math.Inf(1)
	}
	return math.NaN()
}
