package verify

import (
	"fmt"
	"math"

	cf "example.com/boundpole/field/closedform"
	"gonum.org/v1/gonum/spatial/r3"
)

// chargedSheets checks sheets on their axes and where the potential has a plain value.
func chargedSheets() []trial {
	const sigma = 1.5
	on := published("Griffiths2013", "prob. 2.6")
	potential := published("Griffiths2013", "prob. 2.25")
	kellogg := published("Kellogg1929", "")
	var all []trial
	for _, z := range []float64{-0.25, 1, 50} {
		x := r3.Vec{Z: z}
		add := func(what string, source Source, run func(l *lab) result) {
			all = append(all, trial{fmt.Sprintf("%s, z=%g", what, z), ClosedForm, source, "on the axis, sigma = 1.5",
				contract(sigma), run})
		}
		add("disc a=2 g", on, func(l *lab) result { return l.axisAt(l.disc(2, 0, sigma), z, cf.DiscAxisField(sigma, 2, z)) })
		add("disc a=2 phi", potential, func(l *lab) result { return l.phiAt(l.disc(2, 0, sigma), x, cf.DiscAxisPotential(sigma, 2, z)) })
		add("annulus 1-2 g", on, func(l *lab) result {
			return l.axisAt(l.annulus(1, 2, 0, sigma), z, cf.AnnulusAxisField(sigma, 1, 2, z))
		})
		add("annulus 1-2 phi", potential, func(l *lab) result {
			return l.phiAt(l.annulus(1, 2, 0, sigma), x, cf.AnnulusAxisPotential(sigma, 1, 2, z))
		})
		add("rectangle 2x3 g", kellogg, func(l *lab) result {
			return l.axisAt(rectangle(2, 3, 0, sigma), z, cf.RectangleAxisField(sigma, 2, 3, z))
		})
		add("rectangle 2x3 phi", kellogg, func(l *lab) result {
			return l.phiAt(rectangle(2, 3, 0, sigma), x, cf.RectangleAxisPotential(sigma, 2, 3, z))
		})
	}
	return append(all,
		trial{"disc 1e6 a away", ClosedForm, on, "the disc as a point: closed form on the axis",
			relative(1e-12, "accuracy contract"),
			func(l *lab) result {
				return l.axisAt(l.disc(1, 0, sigma), 1e6, cf.DiscAxisField(sigma, 1, 1e6))
			}},
		trial{"narrow annulus as a ring", ClosedForm, published("Griffiths2013", "prob. 2.5"),
			"radii 1 and 1 + 2^-30, z = 0.75; ring of the same charge",
			relative(2e-9, "width over radius, 1e-9"), func(l *lab) result {
				const w = 0x1p-30
				return number(cf.RingAxisField(1+w/2, 1, 0.75), l.g(l.annulus(1, 1+w, 0, 1/w), r3.Vec{Z: 0.75}).Z)
			}},
		trial{"off the axis of a far disc", ClosedForm, published("Jackson1999", "sec. 1.2"),
			"a disc of charge pi at (3e5, 4e5, 0) a: a point charge",
			relative(1e-11, "quadrupole part (a/R)^2 = 4e-12"), func(l *lab) result {
				x := r3.Vec{X: 3e5, Y: 4e5}
				return vector(cf.PointField(math.Pi, x), l.g(l.disc(1, 0, 1), x))
			}},
	)
}
