package verify

import (
	"fmt"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	cf "example.com/boundpole/field/closedform"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// gradedAlong is p = (value + slope z) along z.
func gradedAlong(value, slope float64) field.Affine {
	a := field.Affine{Value: r3.Vec{Z: value}}
	a.Gradient[2][2] = slope
	return a
}

// roundBodies checks tubes and cylinders on their axes.
func roundBodies() []trial {
	tube := geom.Tube{Inner: 1, Outer: 2, Height: 3}
	axial := func(l *lab) *bound.Charge { return l.uniform(tube, r3.Vec{Z: 2}) }
	var all []trial
	for _, z := range []float64{0, 1, 1.75, 5} {
		all = append(all, trial{
			fmt.Sprintf("tube g, z=%g", z), ClosedForm, published("Griffiths2013", "prob. 2.6, two annuli"),
			"radii 1 and 2, L = 3, p = 2 along the axis",
			contract(2),
			func(l *lab) result { return l.axisAt(axial(l), z, cf.TubeAxisField(2, 1, 2, 3, z)) },
		}, trial{
			fmt.Sprintf("tube phi, z=%g", z), ClosedForm, published("Griffiths2013", "prob. 2.25, two annuli"), "the same",
			contract(4),
			func(l *lab) result { return l.phiAt(axial(l), r3.Vec{Z: z}, cf.TubeAxisPotential(2, 1, 2, 3, z)) },
		})
	}
	for _, z := range []float64{-0.5, 0.75, 2, 6} {
		all = append(all, trial{
			fmt.Sprintf("linear p, z=%g", z), ClosedForm, published("Griffiths2013", "sec. 4.2"),
			"cylinder a = 1, L = 2, p = 3 z along the axis: ends and rho = -3",
			limit{5e-12, 3e-3, "accuracy contract 1e-12 and 2e-12 of the closed form"},
			func(l *lab) result {
				return l.axisAt(l.charge(geom.Cylinder{Radius: 1, Height: 2}, gradedAlong(0, 3)), z, cf.LinearCylinderAxisField(3, 1, 2, z))
			},
		}, trial{
			fmt.Sprintf("volume charge, z=%g", z), ClosedForm, published("Griffiths2013", "prob. 2.27"),
			"the same body with discs that cancel its ends: a cylinder of rho = -3",
			limit{2e-12, 3e-3, "accuracy contract 1e-12 of body and discs"},
			func(l *lab) result {
				src := field.Sum{l.charge(geom.Cylinder{Radius: 1, Height: 2}, gradedAlong(0, 3)), l.disc(1, 1, -3), l.disc(1, -1, -3)}
				return l.axisAt(src, z, cf.ChargedCylinderAxisField(-3, 1, 2, z))
			},
		})
	}
	return append(all, trial{
		"across the axis, centre", ClosedForm, published("Jackson1999", "prob. 5.19 and trace 1"),
		"cylinder a = 1, L = 3, p = 1 along x: g = -(1 - N)/2",
		contract(1),
		func(l *lab) result {
			n := (1 - cf.CylinderCentreFactor(1, 3)) / 2
			return l.fieldAt(l.uniform(geom.Cylinder{Radius: 1, Height: 3}, r3.Vec{X: 1}), r3.Vec{}, r3.Vec{X: -n})
		},
	})
}
