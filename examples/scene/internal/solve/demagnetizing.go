package solve

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// strength returns the root of int p.p dV times the volume: the moment of a body whose polarization had its mean square
// everywhere and one direction.
func strength(c *bound.Charge) float64 {
	var squares, volume float64
	const even = 4
	for _, v := range c.Volumes {
		volume += v.Size
		v.Cell.Nodes(even, func(x r3.Vec, w float64) { squares += w * r3.Norm2(c.Polarization(pair.VecOf(x))) })
	}
	return math.Sqrt(squares * volume)
}

// demagnetizing returns the mean demagnetizing factor N = -int H.M dV / int M.M dV of a body in its own field, along its
// magnetization. It is not ok where two rules of integration do not agree to the digits that are printed, where nothing
// demagnetizes, and for bodies that are integrated: the hundreds of points would take longer than what the scene asks for.
func demagnetizing(p *Part) (n float64, ok bool) {
	if p.integrated() {
		return 0, false
	}
	const digits = 5e-4
	fine, coarse := 12, 8
	for len(p.Charge.Layers)*fine*fine > 10*mostFaces && fine > 1 {
		fine-- // of so many small faces a few points each will do
		coarse = fine
	}
	if len(p.Charge.Layers) > 10*mostFaces {
		return 0, false // too many for words
	}
	n = demagnetizingBy(p, fine)
	if coarse != fine && !(math.Abs(n-demagnetizingBy(p, coarse)) <= digits) {
		return n, false
	}
	const rounding = 1e-9 // a closed shell with poles on both sides has N = 1
	return min(n, 1), digits < n && n < 1+rounding
}

// demagnetizingBy integrates with n points a direction. The integral of -H.M is the energy of the charges in their
// own potential, so nodes on the faces do, and the potential is smooth there.
func demagnetizingBy(p *Part, n int) float64 {
	c := p.Charge
	at := &field.Points{}
	var charge []float64
	add := func(x r3.Vec, q float64) {
		if q != 0 {
			at.X, at.Y, at.Z, charge = append(at.X, x.X), append(at.Y, x.Y), append(at.Z, x.Z), append(charge, q)
		}
	}
	for _, y := range c.Layers {
		y.Face.Surface.Nodes(n, func(x, normal r3.Vec, w float64) { add(x, w*c.Density(x, r3.Scale(y.Face.Sign(), normal))) })
	}
	var down float64
	for _, v := range c.Volumes {
		v.Cell.Nodes(max(n/2, 2), func(x r3.Vec, w float64) {
			at := pair.VecOf(x)
			m := c.Polarization(at)
			down += w * r3.Dot(m, m)
			add(x, -w*p.factor*p.law.Divergence(p.Pose.ToLocal(at).Value()))
		})
	}
	phi := field.NewValues(at.Len(), field.WantPhi)
	c.Evaluate(phi, at, field.Mean)
	var up float64
	for i, q := range charge {
		up += q * phi.Phi[i]
	}
	return up / down
}
