package cubature

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// farReach is the distance in bounding radii beyond which the multipole expansion is used, farOrder its order: 4^-26 = 2e-16.
const (
	farReach = 4
	farOrder = 25
)

// include takes the magnitudes of a panel or block into the whole.
func (c *cloud) include(centre r3.Vec, radius, scale, peak, charge, loose float64) {
	b := r3.Box{Min: r3.Sub(centre, r3.Vec{X: radius, Y: radius, Z: radius}), Max: r3.Add(centre, r3.Vec{X: radius, Y: radius, Z: radius})}
	if c.radius == 0 {
		c.bounds = b
	}
	c.bounds.Min = r3.Vec{X: min(c.bounds.Min.X, b.Min.X), Y: min(c.bounds.Min.Y, b.Min.Y), Z: min(c.bounds.Min.Z, b.Min.Z)}
	c.bounds.Max = r3.Vec{X: max(c.bounds.Max.X, b.Max.X), Y: max(c.bounds.Max.Y, b.Max.Y), Z: max(c.bounds.Max.Z, b.Max.Z)}
	c.radius = math.Inf(1) // until finish
	c.scale = max(c.scale, scale)
	c.peak = max(c.peak, peak)
	c.charge += charge
	c.loose += loose
}

// finish sets centre and radius from the balls of the parts.
func (c *cloud) finish(each func(visit func(x r3.Vec, radius float64))) {
	c.centre = r3.Scale(0.5, r3.Add(c.bounds.Min, c.bounds.Max))
	c.radius = 0
	each(func(x r3.Vec, radius float64) { c.radius = max(c.radius, r3.Norm(r3.Sub(x, c.centre))+radius) })
}

// expansion returns the multipole expansion, made when it is first asked for from the charges that gather hands on.
func (c *cloud) expansion() *field.Moments {
	c.once.Do(func() {
		c.far = field.NewMoments(c.centre, c.radius, farOrder)
		c.gather(c.expand)
		c.settle()
	})
	return c.far
}

// expand adds charges to the expansion.
func (c *cloud) expand(set *nodeSet) {
	for i, q := range set.q {
		if q != 0 {
			c.far.AddCharge(r3.Vec{X: set.x[i], Y: set.y[i], Z: set.z[i]}, q)
			c.sum = c.sum.AddFloat(q)
		}
	}
}

// settle takes out of the expansion what the long sum has rounded off the total charge, and makes it exact where it is known.
func (c *cloud) settle() {
	c.far.AddCharge(c.centre, c.sum.AddFloat(-c.far.Charge()).Value())
	if c.settings.Neutral {
		c.far.Neutral()
	}
}

// total returns the charge and the bound on its error.
func (c *cloud) total() (charge, estimate float64) {
	return c.expansion().Charge(), 8*u*c.charge + c.loose
}

func (c *cloud) isFar(x r3.Vec) bool { return r3.Norm(r3.Sub(x, c.centre)) > farReach*c.radius }

// farValue evaluates the expansion.
func (c *cloud) farValue(p field.Point, want field.Want) field.Value {
	v := c.expansion().Value(p, want)
	r := r3.Norm(r3.Sub(p.X.Value(), c.centre)) - c.radius
	unknown := over4Pi * (c.loose + c.slip*c.charge)
	if !c.settings.Neutral {
		unknown += over4Pi * 4 * u * c.charge // nodes and weights
	}
	v.ErrPhi += unknown / r
	v.ErrG += unknown / (r * r)
	v.ErrGrad += 3 * unknown / (r * r * r)
	return v
}

// tolerance is geom.OnTolerance for the bounds.
func (c *cloud) tolerance(x r3.Vec, slack float64) float64 {
	return geom.OnTolerance(c.bounds, x, slack)
}

// natural returns the natural scales of potential, field and gradient of a layer at x.
func (c *cloud) natural(x r3.Vec) gap {
	t := min(1, c.radius/r3.Norm(r3.Sub(x, c.centre)))
	return gap{c.peak * c.radius * t, c.peak * t * t, c.peak / c.radius * t * t * t}
}

// judge sets the status NotConverged where an estimate is above the accuracy asked for.
func (c *cloud) judge(v *field.Value, scale *gap, want field.Want) {
	if v.Status != field.Regular && v.Status != field.OnFace {
		return
	}
	a := c.settings.Accuracy
	bad := want&field.WantPhi != 0 && !(v.ErrPhi <= a*max(scale.phi, math.Abs(v.Phi)))
	bad = bad || want&field.WantG != 0 && !(v.ErrG <= a*max(scale.g, r3.Norm(v.G)))
	if want&field.WantGrad != 0 && !math.IsInf(v.ErrGrad, 1) { // differences of large terms: two digits less
		bad = bad || !(v.ErrGrad <= 100*a*max(scale.t, frobenius(&v.Grad)))
	}
	if bad {
		v.Status = field.NotConverged
	}
}
