package verify

import (
	"fmt"
	"math"

	"example.com/boundpole/field"
	cf "example.com/boundpole/field/closedform"
	"example.com/boundpole/field/element"
	"gonum.org/v1/gonum/spatial/r3"
)

// pointsAndDipoles checks the singular sources and what they do to each other.
func pointsAndDipoles() []trial {
	at := r3.Vec{X: 0.5, Y: -1, Z: 0.25}
	m := r3.Vec{X: 0.3, Y: -0.7, Z: 1.1}
	point, dipole := element.Point{At: at, Charge: 2.5}, element.Dipole{At: at, Moment: m}
	claim := relative(5e-15, "accuracy of point and dipole, 3e-15, and of the closed form")
	coulomb, law := published("Jackson1999", "sec. 1.2"), published("Jackson1999", "eq. 4.13")
	var all []trial
	for _, s := range []float64{0x1p-20, 1, 0x1p20} {
		d := r3.Scale(s, r3.Vec{X: 2, Y: 1, Z: -2})
		x := r3.Add(at, d)
		inputs := fmt.Sprintf("%.3g away", r3.Norm(d))
		name := func(what string) string { return fmt.Sprintf("%s at %.3g", what, r3.Norm(d)) }
		all = append(all,
			trial{name("point g"), ClosedForm, coulomb, inputs, claim,
				func(l *lab) result { return l.fieldAt(point, x, cf.PointField(2.5, d)) }},
			trial{name("point phi"), ClosedForm, coulomb, inputs, claim,
				func(l *lab) result { return l.phiAt(point, x, cf.PointPotential(2.5, d)) }},
			trial{name("dipole g"), ClosedForm, law, inputs, claim,
				func(l *lab) result { return l.fieldAt(dipole, x, cf.DipoleField(m, d)) }},
			trial{name("dipole phi"), ClosedForm, published("Jackson1999", "sec. 4.1"), inputs, claim,
				func(l *lab) result { return l.phiAt(dipole, x, cf.DipolePotential(m, d)) }},
			trial{name("dipole gradient"), ClosedForm, published("Jackson1999", "eq. 4.13, derivative"), inputs, claim,
				func(l *lab) result {
					return matrix(cf.DipoleGradient(m, d), l.evaluate(dipole, x, field.Mean, field.WantGrad).Grad)
				}},
		)
	}
	other, d := r3.Vec{X: -0.4, Y: 0.9, Z: 0.2}, r3.Vec{X: 1, Y: 2, Z: -2}
	first := element.Dipole{Moment: m}
	return append(all,
		trial{"force between dipoles", ClosedForm, published("Jackson1999", "sec. 5.7"), "F = m2.grad g1", claim,
			func(l *lab) result {
				return vector(cf.DipoleForce(m, other, d), l.force(first, d, other))
			}},
		trial{"torque on a dipole", ClosedForm, published("Jackson1999", "sec. 5.7"), "N = m2 x g1", claim,
			func(l *lab) result {
				return vector(cf.DipoleTorque(m, other, d), r3.Cross(other, l.g(first, d)))
			}},
		trial{"energy of two dipoles", ClosedForm, published("Jackson1999", "eq. 4.26"), "W = -m2.g1",
			relative(3e-14, "3e-15 of the field; the product is a fifth of |m2||g1|"), func(l *lab) result {
				return number(cf.DipoleEnergy(m, other, d), -r3.Dot(other, l.g(first, d)))
			}},
	)
}

// force returns m.grad g at x.
func (l *lab) force(src field.Source, x, m r3.Vec) r3.Vec {
	g := l.evaluate(src, x, field.Mean, field.WantGrad).Grad
	return r3.Vec{
		X: g[0]*m.X + g[3]*m.Y + g[4]*m.Z,
		Y: g[3]*m.X + g[1]*m.Y + g[5]*m.Z,
		Z: g[4]*m.X + g[5]*m.Y + g[2]*m.Z,
	}
}

// matrix compares two symmetric matrices in the Frobenius norm.
func matrix(want [3][3]float64, g [6]float64) result {
	got := [3][3]float64{{g[0], g[3], g[4]}, {g[3], g[1], g[5]}, {g[4], g[5], g[2]}}
	var a, b, c float64
	for i := range 9 {
		w, v := want[i/3][i%3], got[i/3][i%3]
		a, b, c = math.Hypot(a, w), math.Hypot(b, v), math.Hypot(c, v-w)
	}
	return result{a, b, c, math.NaN()}
}
