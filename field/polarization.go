package field

import "gonum.org/v1/gonum/spatial/r3"

// Polarization is a vector field p in the frame of a body: an electric polarization P (C/m^2) or a magnetization M
// (A/m), or anything whose divergence acts as charge. The bound charge is sigma = p.n on faces and rho = -div p inside.
type Polarization interface {
	// At returns p at x.
	At(x r3.Vec) r3.Vec
	// Divergence returns div p at x.
	Divergence(x r3.Vec) float64
}

// Uniform is the same polarization everywhere.
type Uniform struct{ P r3.Vec }

// At returns P.
func (u Uniform) At(r3.Vec) r3.Vec { return u.P }

// Divergence returns 0.
func (u Uniform) Divergence(r3.Vec) float64 { return 0 }

// Affine is p = Value + Gradient (x - About); row i of Gradient is the gradient of component i, per length.
type Affine struct {
	Value    r3.Vec
	Gradient [3][3]float64
	About    r3.Vec
}

// At returns p at x.
func (a Affine) At(x r3.Vec) r3.Vec {
	d := r3.Sub(x, a.About)
	g := &a.Gradient
	return r3.Vec{
		X: a.Value.X + (g[0][0]*d.X + g[0][1]*d.Y + g[0][2]*d.Z),
		Y: a.Value.Y + (g[1][0]*d.X + g[1][1]*d.Y + g[1][2]*d.Z),
		Z: a.Value.Z + (g[2][0]*d.X + g[2][1]*d.Y + g[2][2]*d.Z),
	}
}

// Divergence returns the trace of the gradient.
func (a Affine) Divergence(r3.Vec) float64 {
	return a.Gradient[0][0] + a.Gradient[1][1] + a.Gradient[2][2]
}

// Times is a polarization multiplied by a factor.
type Times struct {
	Polarization Polarization
	Factor       float64
}

// At returns Factor p(x).
func (t Times) At(x r3.Vec) r3.Vec { return r3.Scale(t.Factor, t.Polarization.At(x)) }

// Divergence returns Factor div p(x).
func (t Times) Divergence(x r3.Vec) float64 { return t.Factor * t.Polarization.Divergence(x) }
