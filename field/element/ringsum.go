package element

import (
	"math"

	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

// ringSurface is the surface of a body along one generatrix. Its charge is axial times z^power times n.z and, with cos(phi),
// n.rho for a unit of transverse polarization.
type ringSurface struct {
	axial, across float64 // the polarization: along the axis, size of the transverse part
	power         int     // not 0 only on a line
	bottom        float64 // z of the lower end, needed for a power
	gradient      bool    // the second derivatives are wanted
	left          float64 // what the rules may have left out of the field
}

// newRingSurface returns the surface of a body polarized with p.
func newRingSurface(p r3.Vec, want field.Want) ringSurface {
	return ringSurface{axial: p.Z, across: math.Hypot(p.X, p.Y), gradient: want&field.WantGrad != 0}
}

// evaluate adds the surface to the two harmonics. On the surface, on, it gives the side asked for.
func (o *ringSurface) evaluate(v *ringView, c *constant, k *cosine, on bool, side field.Side) {
	if least := ringLeast * max(v.length(), v.rho); math.Abs(v.d) < least {
		v.d = math.Copysign(least, v.d)
	}
	o.add(v, c, k)
	if !on {
		return
	}
	f := 2 * math.Pi * (sign(v.d) - sideSign(side)) // the normal derivative falls by 4 pi of the charge from side to side
	q, _ := o.density(v, min(max(0, v.lo), v.hi))
	axial := f * q * v.nz
	c.rho += axial * v.nr
	c.z += axial * v.nz
	if o.across != 0 {
		k.tau += f * v.nr * v.nr
		k.z += f * v.nr * v.nz
	}
}

// density returns the axial polarization at s and its derivative.
func (o *ringSurface) density(v *ringView, s float64) (q, slope float64) {
	if o.power == 0 {
		return o.axial, 0
	}
	z := o.bottom + v.nr*(s-v.lo)
	f := o.axial * powInt(z, o.power-1)
	return f * z, float64(o.power) * f * v.nr
}

// ringLeast is the distance, in sizes, below which a point is taken to be that far off: on the surface, the limit.
const ringLeast = 0x1p-60

// add integrates over the generatrix.
func (o *ringSurface) add(v *ringView, c *constant, k *cosine) {
	m := v.path()
	if o.power > 0 {
		m.degree, m.longest = float64(o.power), v.length()/(1+float64(o.power)/4)
	}
	unit := v.unit()
	var one constant
	var two cosine
	var along ringAlong
	near := o.gradient && v.grazes()
	m.each(math.Abs(v.d) < v.length(), func(s, w float64) (p, q float64) {
		r, nr, nz := v.at(s)
		if !(r.a > 0) { // a tip, to rounding
			return 0, 0
		}
		w *= unit
		i := r.values(needLoop)
		axial, slope := o.density(v, s)
		if o.axial != 0 {
			f := axial * nz
			x, y := one.addRing(&r, &i, f*w)
			p, q = p+f*x, q+f*y
		}
		if o.across != 0 {
			x, y := two.addRing(&r, &i, nr*w)
			f := o.across * nr
			p, q = p+f*x, q+f*y
		}
		if o.gradient {
			h := ringFifthOf(&r, &i)
			if o.axial != 0 {
				one.addSecond(&r, &i, &h, axial*nz*w, near)
			}
			if o.across != 0 {
				two.addSecond(&r, &i, &h, nr*w, near)
			}
			if near {
				along.add(v, &r, &i, &h, nr, nz, axial*w, slope*w, w)
			}
		}
		return p, q
	})
	o.left = m.left * unit
	leave := o.left / (rounding * u)
	length := v.length()
	one.sizeU += leave * length
	one.sizeG += leave
	if near {
		one.sizeH += leave / length
	} else {
		one.sizeH += 4 * leave / math.Abs(v.d)
	}
	if near {
		if v.bend == 0 {
			along.addEnds(v, o)
		}
		along.turn(v, &one, &two)
	}
	c.join(&one)
	k.join(&two)
}

// settled returns v with the status that tells if the rules have left out too much.
func (o *ringSurface) settled(v field.Value) field.Value {
	if o.left > 1e-10*max(math.Abs(o.axial), o.across) && v.Status == field.Regular {
		v.Status = field.NotConverged
	}
	return v
}

// addRing adds the ring of charge w an unit of length. It returns the derivatives of the potential of a unit.
func (c *constant) addRing(r *rim, v *rimValues, w float64) (rho, z float64) {
	rho, z = r.d*v.s3a-r.a*v.d3a, -r.z*v.s3a
	c.u += w * v.u
	c.rho += w * rho
	c.z += w * z
	w = math.Abs(w)
	c.sizeU += w * v.u
	c.sizeG += w * (r.a*math.Abs(v.d3a) + (math.Abs(r.d)+math.Abs(r.z))*v.s3a)
	return rho, z
}

// addRing adds the ring of charge w cos(phi); see that of constant.
func (k *cosine) addRing(r *rim, v *rimValues, w float64) (rho, z float64) {
	k.s += w * v.t1r
	k.tau += w * (v.bz - 2*v.t1r)
	k.z -= w * v.br
	w = math.Abs(w)
	k.sizeS += w * v.t1r
	k.sizeG += w * (2*v.t1r + math.Abs(r.d)*v.s3a + r.rho*math.Abs(v.d3a) + math.Abs(v.br))
	return v.bz - v.t1r, -v.br
}
