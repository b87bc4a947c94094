package bound

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/internal/powerrule"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Expand returns the multipole expansion about a centre, up to an order between 1 and 40, from the dipole density.
//
// Accuracy: the moments of polynomial p are exact but for rounding, as are those of radial powers in cylinders, tubes and arcs
// and of central powers in spheres (TestExpandFar); those of other p as good as the cells' rules, which are made for polynomials.
func (c *Charge) Expand(centre r3.Vec, order int) *field.Moments {
	order = min(max(order, 1), 40)
	m := field.NewMoments(centre, reach(c.body.Bounds(), centre), order)
	nodes := order/2 + 2 // exact to degree 2 nodes - 2
	if p, ok := c.p.(field.Polynomial); ok {
		nodes += (p.Degree() + 1) / 2
	}
	switch p := c.p.(type) {
	case field.AxialPower:
		nodes += (p.Power + 1) / 2
	case field.RadialPower:
		if b, ok := c.local.(geom.Cylinder); ok {
			if s, w, ok := powerrule.Of(nodes, p.Power); ok {
				c.expandRadial(m, b, p, s, w)
				return m
			}
		}
		nodes += besideAxis(c.local)
	case field.CentralPower:
		switch c.local.(type) {
		case geom.Sphere, geom.HollowSphere: // no field outside
			return m
		}
	}
	for _, v := range c.Volumes {
		v.Cell.Nodes(nodes, func(x r3.Vec, w float64) { m.AddDipole(x, r3.Scale(w, c.Polarization(pair.VecOf(x)))) })
	}
	return m
}

// besideAxis returns how many more nodes across a tube the powers of the distance from the axis take, which are singular there:
// with B the sum of the semi-axes of the Bernstein ellipse through the axis, B^-2n is left.
func besideAxis(body geom.Body) int {
	var inner, outer float64
	switch b := body.(type) {
	case geom.Tube:
		inner, outer = b.Inner, b.Outer
	case geom.Arc:
		inner, outer = b.Inner, b.Outer
	}
	if inner == 0 {
		return 0
	}
	x := (outer + inner) / (outer - inner)
	return int(min(20/math.Log(x+math.Sqrt(x*x-1)), 40))
}

// expandRadial adds the dipoles of a cylinder with p = c s^n on the rule for the weight s^n on 0..1.
func (c *Charge) expandRadial(m *field.Moments, b geom.Cylinder, p field.RadialPower, place, weight []float64) {
	peak := p.Coefficient * math.Pow(b.Radius, p.Power)
	n := len(place)
	around := 2 * n
	step := 2 * math.Pi / float64(around)
	height, share, _ := powerrule.Of(n, 0)
	for k := range n {
		z, wz := b.Height*(height[k]-0.5), b.Height*share[k]
		for i := range place {
			s := b.Radius * place[i]
			w := peak * weight[i] * b.Radius * s * wz * step
			for j := range around {
				sin, cos := math.Sincos((float64(j) + 0.5) * step)
				at := c.pose.ToOuter(pair.VecOf(r3.Vec{X: s * cos, Y: s * sin, Z: z})).Value()
				m.AddDipole(at, c.pose.VectorToOuter(r3.Vec{X: w * cos, Y: w * sin}))
			}
		}
	}
}

// reach returns the greatest distance of the box from a point.
func reach(b r3.Box, c r3.Vec) float64 {
	far := func(lo, hi, c float64) float64 { return max(math.Abs(lo-c), math.Abs(hi-c)) }
	return r3.Norm(r3.Vec{X: far(b.Min.X, b.Max.X, c.X), Y: far(b.Min.Y, b.Max.Y, c.Y), Z: far(b.Min.Z, b.Max.Z, c.Z)})
}
