package verify

import (
	"fmt"
	"math"

	"example.com/boundpole/field"
	cf "example.com/boundpole/field/closedform"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// rod is a cylinder of radius 1 with p = 1 along its axis.
func rod(l *lab, length float64) field.Source {
	return l.uniform(geom.Cylinder{Radius: 1, Height: length}, r3.Vec{Z: 1})
}

// endDiscs are the two charged discs at its ends.
func endDiscs(l *lab, length float64) field.Source {
	return field.Sum{l.disc(1, length/2, 1), l.disc(1, -length/2, -1)}
}

// endless is a length from whose far end nothing is felt.
const endless = 1e6

// thinRod compares the rod with its two discs, on and off its axis, and with two poles. On the axis at the distance d from
// an end the disc gives (1 - 3/4 x^2 + 5/8 x^4 ...) of the pole, x = a/d.
func thinRod() []trial {
	var all []trial
	lengths := []float64{4, 20, 100, 1000}
	for _, length := range lengths {
		for _, d := range []float64{0.5, 2} {
			z := length/2 + d
			all = append(all, trial{
				fmt.Sprintf("axis L=%g a, d=%g a", length, d), ClosedForm, published("Griffiths2013", "prob. 2.6, twice"),
				fmt.Sprintf("g_z on the axis, d = %g a beyond the end of a rod of length %g a", d, length), contract(1),
				func(l *lab) result { return l.axisAt(rod(l, length), z, cf.TwoDiscAxisField(1, 1, length, z)) },
			})
		}
	}
	for _, length := range lengths {
		for _, c := range []struct {
			name string
			x    r3.Vec
		}{
			{"off axis", r3.Vec{X: 0.75, Y: 1.5, Z: length/2 + 0.5}},
			{"next to rim", r3.Vec{X: 1 + 0x1p-20, Z: length / 2}},
			{"inside", r3.Vec{X: 0.5, Z: length / 8}},
		} {
			x := c.x
			all = append(all, trial{
				fmt.Sprintf("discs, %s, L=%g a", c.name, length), Independent, plain("rod less its two discs"),
				fmt.Sprintf("g at (%g, %g, %g) a of the body and of two discs with sigma = +p, -p", x.X, x.Y, x.Z), contract(1),
				func(l *lab) result {
					discs := l.bare(endDiscs(l, length), x)
					return l.fieldAt(rod(l, length), x, discs)
				},
			})
		}
	}
	for _, d := range []float64{4, 8, 16, 32} {
		x := 1 / d
		all = append(all, trial{
			fmt.Sprintf("two poles off by, d=%g a", d), Identity, plain("theory: 3/4 (a/d)^2 - 5/8 (a/d)^4"),
			fmt.Sprintf("1 - g/g(poles +-pA) on the axis, d = %g a beyond the end of a rod of 1e6 a", d),
			within(math.Pow(x, 6)+1e-11, "next term 35/64 (a/d)^6; accuracy contract; the far end is 1e-9 of it"),
			func(l *lab) result {
				return number(0.75*x*x-0.625*x*x*x*x, poleMiss(l, endless, r3.Vec{Z: endless/2 + d}))
			},
		})
	}
	for _, d := range []float64{8, 16, 32} {
		all = append(all, trial{
			fmt.Sprintf("order in a/d, d=%g to %g a", d, 2*d), Identity, plain("theory: order 2"),
			"log2 of the ratio of the misses of the two-pole model at d and 2 d",
			within(1/(d*d), "next term of the series: 0.9 (a/d)^2"),
			func(l *lab) result {
				return number(2, math.Log2(poleMiss(l, endless, r3.Vec{Z: endless/2 + d})/poleMiss(l, endless, r3.Vec{Z: endless/2 + 2*d})))
			},
		})
	}
	for _, length := range []float64{16, 32, 64} {
		miss := func(l *lab, length float64) float64 { return poleMiss(l, length, r3.Vec{X: length}) }
		all = append(all, trial{
			fmt.Sprintf("order in a/L, L=%g to %g a", length, 2*length), Identity, plain("theory: order 2"),
			"log2 of the ratio of the misses of the two-pole model beside the rods, one length off the middle",
			within(4/(length*length), "next term of the series: of the order (a/L)^2"),
			func(l *lab) result { return number(2, math.Log2(miss(l, length)/miss(l, 2*length))) },
		})
	}
	for _, length := range lengths {
		all = append(all, trial{
			fmt.Sprintf("centre L=%g a", length), ClosedForm, published("Jackson1999", "prob. 5.19 at the centre"),
			"-g_z at the centre of the rod, which vanishes as 2 (a/L)^2", contract(1),
			func(l *lab) result {
				return number(cf.CylinderCentreFactor(1, length), -l.g(rod(l, length), r3.Vec{}).Z)
			},
		})
	}
	return all
}

// poleMiss returns by how much of itself the two-pole model is off.
func poleMiss(l *lab, length float64, x r3.Vec) float64 {
	poles := cf.TwoPoleField(math.Pi, length, x)
	return r3.Norm(r3.Sub(l.g(rod(l, length), x), poles)) / r3.Norm(poles)
}
