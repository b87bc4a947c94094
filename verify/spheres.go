package verify

import (
	"fmt"

	"example.com/boundpole/field"
	cf "example.com/boundpole/field/closedform"
	"example.com/boundpole/field/element"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// spheres checks hollow spheres and balls and shells of charge.
func spheres() []trial {
	p := r3.Vec{X: 1, Y: -2, Z: 2}
	hollow := func(l *lab) field.Source { return l.uniform(geom.HollowSphere{Inner: 1, Outer: 2}, p) }
	claim := relative(1e-14, "accuracy of hollow sphere, ball and shell 4e-15; the closed form rounds")
	example := published("Griffiths2013", "ex. 4.2, two spheres")
	var all []trial
	for _, r := range []float64{1.25, 1.875, 2.5, 40} {
		x := r3.Scale(r/3, r3.Vec{X: 2, Y: -1, Z: 2})
		inputs := "radii 1 and 2, p = (1, -2, 2)"
		all = append(all,
			trial{fmt.Sprintf("hollow sphere g, r=%g", r), ClosedForm, example, inputs, claim,
				func(l *lab) result { return l.fieldAt(hollow(l), x, cf.HollowSphereField(p, 1, 2, x)) }},
			trial{fmt.Sprintf("hollow sphere phi, r=%g", r), ClosedForm, example, inputs,
				relative(3e-14, "2e-14 of the closed form"),
				func(l *lab) result { return l.phiAt(hollow(l), x, cf.HollowSpherePotential(p, 1, 2, x)) }},
		)
	}
	all = append(all, trial{"cavity of the hollow sphere", ClosedForm, example, "g at (0.25, -0.5, 0.5)",
		within(3e-15, "u of two fields of size 1"),
		func(l *lab) result { return l.fieldAt(hollow(l), r3.Vec{X: 0.25, Y: -0.5, Z: 0.5}, r3.Vec{}) }})
	shell := element.ChargedSphere{Shape: geom.Sphere{Radius: 2}, Density: 3}
	ball := element.ChargedBall{Shape: geom.Sphere{Radius: 2}, Density: 3}
	for _, r := range []float64{0.75, 3, 100} {
		x := r3.Scale(r/3, r3.Vec{X: 2, Y: -1, Z: 2})
		out := func(g float64) r3.Vec { return r3.Scale(g/r, x) }
		add := func(what string, source Source, run func(l *lab) result) {
			all = append(all, trial{fmt.Sprintf("%s, r=%g", what, r), ClosedForm, source, "radius 2, density 3", claim, run})
		}
		add("shell g", published("Griffiths2013", "ex. 2.7"), func(l *lab) result { return l.fieldAt(shell, x, out(cf.ChargedShellField(3, 2, r))) })
		add("shell phi", published("Griffiths2013", "ex. 2.7"), func(l *lab) result { return l.phiAt(shell, x, cf.ChargedShellPotential(3, 2, r)) })
		add("ball g", published("Griffiths2013", "ex. 2.3"), func(l *lab) result { return l.fieldAt(ball, x, out(cf.ChargedSphereField(3, 2, r))) })
		add("ball phi", published("Griffiths2013", "prob. 2.21"), func(l *lab) result { return l.phiAt(ball, x, cf.ChargedSpherePotential(3, 2, r)) })
	}
	bead := field.Sum{element.ChargedSphere{Shape: geom.Sphere{Radius: 1}, Density: 2}, element.ChargedBall{Shape: geom.Sphere{Radius: 1}, Density: -6}}
	for _, r := range []float64{0.5, 1.5} {
		x := r3.Vec{Y: r}
		all = append(all, trial{
			fmt.Sprintf("radial p = 2 r, r=%g", r), ClosedForm, published("Griffiths2013", "prob. 4.10"),
			"sigma = 2 on a sphere of radius 1, rho = -6 inside: g = -p, 0 outside",
			within(1e-15, "u of two fields of size 1"),
			func(l *lab) result { return l.fieldAt(bead, x, r3.Vec{Y: cf.CentralPowerField(2, 1, 1, r)}) },
		})
	}
	return all
}
