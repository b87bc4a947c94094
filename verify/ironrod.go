package verify

import (
	"fmt"
	"math"

	cf "example.com/boundpole/field/closedform"
	"example.com/boundpole/geom"
	"example.com/boundpole/magnet"
	"gonum.org/v1/gonum/spatial/r3"
)

// The rod, in millimetres and tesla.
const (
	ironJ      = 2.15 // T, about the saturation of iron
	ironRadius = 5
	ironLength = 200
)

// iron returns the rod as a magnetic model.
func iron(l *lab) magnet.Model {
	part, err := magnet.WithRemanence(geom.Cylinder{Radius: ironRadius, Height: ironLength}, r3.Vec{Z: ironJ})
	l.note(err)
	return magnet.Model{Parts: []magnet.Part{part}, Unit: 1e-3}
}

// ironB returns B at the distance d beyond the north end, from H outside.
func ironB(l *lab, d float64) float64 {
	return magnet.Mu0 * l.g(iron(l), r3.Vec{Z: ironLength/2 + d}).Z
}

// ironRod checks pole strength and B, exact and by two poles of strength M A.
func ironRod() []trial {
	const area = math.Pi * ironRadius * ironRadius // mm2
	poles := func(x r3.Vec) float64 { return cf.TwoPoleField(ironJ*area, ironLength, x).Z }
	all := []trial{
		{"pole strength = M A", ClosedForm, published("Maxwell1873", "vol. 2, part III, chapter 1"),
			"ampere metres, M = 2.15 T/mu0, A = 78.54 mm2",
			relative(4e-15, exact), func(l *lab) result {
				c := iron(l).Parts[0].Charge
				return number(ironJ/magnet.Mu0*area*1e-6, l.layer(c, 1).Charge*1e-6)
			}},
		{"pole strength of the south end", ClosedForm, published("Maxwell1873", "vol. 2, part III, chapter 1"),
			"ampere metres: -M A",
			relative(4e-15, exact), func(l *lab) result {
				c := iron(l).Parts[0].Charge
				return number(-ironJ/magnet.Mu0*area*1e-6, l.layer(c, 0).Charge*1e-6)
			}},
		{"flux of the pole = J A", Identity, plain("mu0 M A"), "webers", relative(4e-15, exact), func(l *lab) result {
			return number(ironJ*area*1e-6, magnet.PoleFlux(l.layer(iron(l).Parts[0].Charge, 1).Charge*1e-6))
		}},
	}
	for _, d := range []float64{1, 10, 50, 200, 2000} {
		z := ironLength/2 + d
		all = append(all, trial{
			fmt.Sprintf("B on the axis, d=%g mm", d), ClosedForm, published("Jackson1999", "prob. 5.19"),
			"tesla, d beyond the north end",
			relative(2e-12, "accuracy contract 1e-12; the closed form loses z/L"),
			func(l *lab) result {
				return number(cf.CylinderAxisInduction(ironJ, ironRadius, ironLength, z), ironB(l, d))
			},
		})
	}
	for _, d := range []float64{20, 40, 80, 160} {
		x := ironRadius / d
		all = append(all, trial{
			fmt.Sprintf("two poles, d=%g mm", d), Independent, published("Maxwell1873", "vol. 2, part III, chapter 1"),
			"tesla, B of two point poles of strength M A at the ends; the end discs act 3/4 (a/d)^2 weaker",
			relative(x*x, "theory: (3/4)(a/d)^2, a little more where the south pole counts"),
			func(l *lab) result { return number(poles(r3.Vec{Z: ironLength/2 + d}), ironB(l, d)) },
		})
	}
	far := func(l *lab, r float64) float64 {
		x := r3.Vec{Z: r}
		return 1 - magnet.Mu0*l.g(iron(l), x).Z/cf.DipoleField(r3.Vec{Z: ironJ * area * ironLength}, x).Z
	}
	miss := func(l *lab, d float64) float64 { return 1 - ironB(l, d)/poles(r3.Vec{Z: ironLength/2 + d}) }
	for _, d := range []float64{20, 40} {
		all = append(all, trial{
			fmt.Sprintf("order of the two poles, d=%g to %g mm", d, 2*d), Identity, plain("theory: order 2"),
			"log2 of the ratio of the misses at d and 2 d",
			within(0.1, "(a/d)^2 = 0.06 from the next term, and the south pole"),
			func(l *lab) result { return number(2, math.Log2(miss(l, d)/miss(l, 2*d))) },
		})
	}
	return append(all, trial{
		"order of the dipole, r=4 to 8 m", Identity, plain("theory: order 2"),
		"log2 of the ratio of the misses of m = M V at r and 2 r",
		within(2e-3, "next term: (L/r)^2/2 = 1.3e-3"),
		func(l *lab) result { return number(2, math.Log2(far(l, 4000)/far(l, 8000))) },
	})
}
