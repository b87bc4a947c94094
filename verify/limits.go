package verify

import (
	"fmt"
	"math"

	cf "example.com/boundpole/field/closedform"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// limits checks how finite bodies approach endless ones: the deviation, and that it halves or quarters as it should.
func limits() []trial {
	// A plate t = 1 of radius a: at the centre g = -p (1 - t/sqrt(t^2 + 4 a^2)), which leaves t/(2a).
	plate := func(l *lab, a float64) float64 {
		g := l.g(l.uniform(geom.Cylinder{Radius: a, Height: 1}, r3.Vec{Z: 1}), r3.Vec{}).Z
		return g - cf.SlabField(r3.Vec{Z: 1}, 1, 0).Z
	}
	// A rod of radius 1 and length L across its axis: g = -p (1 - N)/2 at the centre, N = 2/L^2.
	across := func(l *lab, length float64) float64 {
		g := l.g(l.uniform(geom.Cylinder{Radius: 1, Height: length}, r3.Vec{X: 1}), r3.Vec{}).X
		return g - cf.EndlessCylinderField(r3.Vec{X: 1}, 1, r3.Vec{}).X
	}
	slab, rodAcross := published("Griffiths2013", "sec. 4.3"), published("Griffiths2013", "prob. 4.13")
	var all []trial
	for _, a := range []float64{10, 100, 1000} {
		all = append(all, trial{
			fmt.Sprintf("plate to slab, a=%g t", a), ClosedForm, slab,
			"g at the centre of a disc of thickness t polarized across; a slab has -p",
			within(0.5/a, "theory: it lacks t/(2a)"), func(l *lab) result { return number(-1, -1+plate(l, a)) },
		}, trial{
			fmt.Sprintf("order of that, a=%g to %g t", a, 2*a), Identity, plain("theory: order 1"),
			"log2 of the ratio of the deviations",
			within(0.5/(a*a)+4e-12*a, "next term (t/2a)^2; accuracy contract over the deviation"), func(l *lab) result {
				return number(1, math.Log2(plate(l, a)/plate(l, 2*a)))
			},
		})
	}
	for _, length := range []float64{20, 80} {
		all = append(all, trial{
			fmt.Sprintf("rod across, L=%g a", length), ClosedForm, rodAcross,
			"g at the centre of a rod polarized across; an endless one has -p/2",
			within(1/(length*length), "theory: it lacks (a/L)^2"),
			func(l *lab) result { return number(-0.5, -0.5+across(l, length)) },
		}, trial{
			fmt.Sprintf("order of that, L=%g to %g a", length, 2*length), Identity, plain("theory: order 2"),
			"log2 of the ratio of the deviations",
			within(8/(length*length)+1e-11*length*length, "next term (a/L)^4; accuracy contract over the deviation"),
			func(l *lab) result {
				return number(2, math.Log2(across(l, length)/across(l, 2*length)))
			},
		})
	}
	return append(all,
		trial{"endless rod outside", ClosedForm, rodAcross, "rod L = 4000 a across, g at (3, 2, 0) a",
			within(1e-6, "theory: of the order (a/L)^2 and (r/L)^2"),
			func(l *lab) result {
				x := r3.Vec{X: 3, Y: 2}
				return vector(cf.EndlessCylinderField(r3.Vec{X: 1}, 1, x), l.g(l.uniform(geom.Cylinder{Radius: 1, Height: 4000}, r3.Vec{X: 1}), x))
			}},
		trial{"long rod, face centre", ClosedForm, published("Jackson1999", "prob. 5.19 at the face"),
			"L = 1000 a: half the induction",
			within(0.5e-6, "theory: (1/4)(a/L)^2"), func(l *lab) result {
				return number(0.5, 0.5+l.g(l.uniform(geom.Cylinder{Radius: 1, Height: 1000}, r3.Vec{Z: 1}), r3.Vec{Z: 500}).Z)
			}},
		trial{"large sheet", ClosedForm, published("Griffiths2013", "sec. 2.2"),
			"square sheet of side 2e6, height 1: sigma/2",
			within(1e-6, "theory: of the order height/side"),
			func(l *lab) result {
				return number(cf.PlaneField(1, 1), l.g(rectangle(2e6, 2e6, 0, 1), r3.Vec{Z: 1}).Z)
			}},
		trial{"flat spheroid to slab", ClosedForm, slab, "oblate spheroid 1000 : 1 polarized across",
			within(2e-3, "theory: pi/2 of the ratio"),
			func(l *lab) result {
				return number(-1, l.g(l.uniform(geom.Ellipsoid{SemiAxes: r3.Vec{X: 1000, Y: 1000, Z: 1}}, r3.Vec{Z: 1}), r3.Vec{}).Z)
			}},
		trial{"elliptic cylinder", ClosedForm, published("Osborn1945", "limit of one endless axis"),
			"ellipsoid 2 : 1 : 1e4 polarized along 2: N = 1/3",
			within(1e-6, "theory: (a/c)^2 log(c/a)"), func(l *lab) result {
				n := cf.EllipticCylinderFactors(2, 1).X
				return number(n, -l.g(l.uniform(geom.Ellipsoid{SemiAxes: r3.Vec{X: 2, Y: 1, Z: 1e4}}, r3.Vec{X: 1}), r3.Vec{}).X)
			}},
	)
}
