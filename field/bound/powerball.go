package bound

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/cubature"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// powerBall is the volume charge rho = -c (n+2) r^(n-1) in a ball about the origin, n > -2: the part of a central power law that is not
// smooth, by Gauss's law.
//
//	g = -c r^n inside, -c a^(n+2)/r^2 outside, along r;  phi = -c (a^(n+1) + (a^(n+1) - r^(n+1))/(n+1)) inside, -c a^(n+2)/r outside
type powerBall struct{ radius, c, n float64 }

// Field returns g at x.
func (b powerBall) Field(x r3.Vec) r3.Vec {
	return b.value(field.Point{X: pair.VecOf(x)}, field.WantG).G
}

// Evaluate computes the arrays of dst; see field.Evaluator.
func (b powerBall) Evaluate(dst *field.Values, at *field.Points, _ field.Side) {
	field.Fill(dst, at, b.value)
}

func (b powerBall) value(p field.Point, _ field.Want) field.Value {
	x := r3.Add(p.X.Value(), p.X.Low())
	r := r3.Norm(x)
	if r == 0 && b.n <= 0 { // no direction
		v := field.Nowhere(field.AtPoint)
		v.Phi = b.inside(0)
		return v
	}
	var v field.Value
	var f, k float64 // g = f x, grad g = f (1 + k e e^T)
	if r < b.radius {
		v.Phi = b.inside(r)
		f, k = -b.c*math.Pow(r, b.n-1), b.n-1
	} else {
		q := -b.c * math.Pow(b.radius, b.n+2)
		v.Phi = q / r
		f, k = q/(r*r*r), -3
	}
	if r == 0 {
		if b.n < 1 {
			v.Grad[0], v.ErrGrad = math.NaN(), math.Inf(1)
		} else if b.n == 1 {
			v.Grad = [6]float64{-b.c, -b.c, -b.c}
		}
		return v
	}
	v.G = r3.Scale(f, x)
	e := r3.Scale(1/r, x)
	v.Grad = [6]float64{f * (1 + k*e.X*e.X), f * (1 + k*e.Y*e.Y), f * (1 + k*e.Z*e.Z), f * k * e.X * e.Y, f * k * e.X * e.Z, f * k * e.Y * e.Z}
	const u = 0x1p-53
	v.ErrPhi, v.ErrG, v.ErrGrad = 16*u*math.Abs(v.Phi), 16*u*math.Abs(f)*r, 16*u*math.Abs(f)*(1+math.Abs(k))
	return v
}

func (b powerBall) inside(r float64) float64 {
	a := math.Log(b.radius) - math.Log(r)
	if m := b.n + 1; m != 0 {
		a = (math.Pow(b.radius, m) - math.Pow(r, m)) / m
	}
	return -b.c * (math.Pow(b.radius, b.n+1) + a)
}

// beyond is the space between a ball about the origin and a chart.
type beyond struct {
	chart  geom.Chart
	radius float64
}

// At returns the point and its derivatives.
func (s beyond) At(u, v, w float64) (x, xu, xv, xw r3.Vec) {
	x, xu, xv = s.chart.At(u, v)
	r := r3.Norm(x)
	in := s.radius / r
	t := in + w*(1-in)
	slope := func(d r3.Vec) r3.Vec { // in changes by -in (x.d)/r^2
		return r3.Sub(r3.Scale(t, d), r3.Scale((1-w)*in*r3.Dot(x, d)/(r*r), x))
	}
	return r3.Scale(t, x), slope(xu), slope(xv), r3.Scale(1-in, x)
}

// aroundOrigin returns the volume charge of a central power law as a ball and the rest, on which it is smooth; nil where the origin is not
// well inside or a face looks back at it.
func (c *Charge) aroundOrigin() (field.Sum, error) {
	q, ok := c.p.(field.CentralPower)
	if !ok {
		return nil, nil
	}
	least := math.Inf(1) // distance of the tangent planes
	var charts []geom.Chart
	for _, f := range c.local.Faces() {
		surface, ok := f.Surface.(geom.Charted)
		if !ok {
			return nil, nil
		}
		f.Surface.Nodes(12, func(x, n r3.Vec, _ float64) { least = min(least, f.Sign()*r3.Dot(x, n)) })
		charts = append(charts, outward(f, surface.Charts())...)
	}
	a := 0.5 * least
	if !(a > 0.02*c.reachOfKink(kink{})) {
		return nil, nil
	}
	var blocks []geom.Block
	for _, chart := range charts {
		blocks = append(blocks, beyond{chart, a})
	}
	rest, err := cubature.NewVolume(blocks, c.rho, nil)
	if err != nil {
		return nil, err
	}
	return field.Sum{powerBall{a, q.Coefficient, q.Power}, rest}, nil
}
