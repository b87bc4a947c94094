package verify

import (
	"fmt"
	"math"

	"example.com/boundpole/field/bound"
	cf "example.com/boundpole/field/closedform"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// centreFactor returns -g_k/p at the centre of an ellipsoid polarized along axis k.
func centreFactor(l *lab, axes r3.Vec, k int) float64 {
	p := unit(k)
	return -r3.Dot(p, l.g(l.uniform(geom.Ellipsoid{SemiAxes: axes}, p), r3.Vec{}))
}

func unit(k int) r3.Vec {
	return [3]r3.Vec{{X: 1}, {Y: 1}, {Z: 1}}[k]
}

// ellipsoidFactors checks spheroids and ellipsoids.
func ellipsoidFactors() []trial {
	osborn := published("Osborn1945", "")
	var all []trial
	entries, args := numbered("prolate-")
	for i, e := range entries {
		m := args[i][0]
		all = append(all, e.tabled(ClosedForm, osborn, fmt.Sprintf("along the long axis, long/short = %g", m), contract(1),
			func(l *lab) float64 {
				return centreFactor(l, r3.Vec{X: 1, Y: 1, Z: m}, 2)
			})...)
	}
	entries, args = numbered("oblate-")
	for i, e := range entries {
		m := args[i][0]
		all = append(all, e.tabled(ClosedForm, osborn, fmt.Sprintf("along a long axis, long/short = %g", m), contract(1),
			func(l *lab) float64 {
				return centreFactor(l, r3.Vec{X: m, Y: m, Z: 1}, 0)
			})...)
	}
	entries, args = numbered("ellipsoid-")
	for i, e := range entries {
		axes := r3.Vec{X: args[i][0], Y: args[i][1], Z: args[i][2]}
		all = append(all, trial{
			e.ID, ClosedForm, published("Stoner1945", ""), "all three factors", contract(1), func(l *lab) result {
				return vector(recomputedVec(e.ID, ""), r3.Vec{X: centreFactor(l, axes, 0), Y: centreFactor(l, axes, 1), Z: centreFactor(l, axes, 2)})
			},
		})
	}
	for _, m := range []float64{1.001, 3} {
		all = append(all, trial{
			fmt.Sprintf("prolate-%g across", m), ClosedForm, published("Stoner1945", ""), "across the long axis",
			contract(1),
			func(l *lab) result {
				_, short := cf.ProlateFactors(m)
				return number(short, centreFactor(l, r3.Vec{X: 1, Y: 1, Z: m}, 0))
			},
		}, trial{
			fmt.Sprintf("oblate-%g along", m), ClosedForm, published("Stoner1945", ""), "along the short axis", contract(1),
			func(l *lab) result {
				_, short := cf.OblateFactors(m)
				return number(short, centreFactor(l, r3.Vec{X: m, Y: m, Z: 1}, 2))
			},
		})
	}
	for _, x := range []float64{3.01, 5, 100} {
		axes := r3.Vec{X: 3, Y: 2, Z: 1}
		all = append(all, trial{
			fmt.Sprintf("outside on the axis, x=%g", x), ClosedForm, published("Stratton1941", "sec. 3.27"),
			"ellipsoid 3 : 2 : 1, p along 3",
			limit{1e-12, 1e-3 * min(1, 27/(x*x*x)), "accuracy contract"}, func(l *lab) result {
				return l.fieldAt(l.uniform(geom.Ellipsoid{SemiAxes: axes}, r3.Vec{X: 1}), r3.Vec{X: x}, r3.Vec{X: cf.EllipsoidAxisField(1, axes, x)})
			},
		})
	}
	return append(all, trial{
		"inside uniform", ClosedForm, osborn, "ellipsoid 3 : 2 : 1, p = (1, -2, 3), g off the centre", contract(1),
		func(l *lab) result {
			axes, p := r3.Vec{X: 3, Y: 2, Z: 1}, r3.Vec{X: 1, Y: -2, Z: 3}
			return l.fieldAt(l.uniform(geom.Ellipsoid{SemiAxes: axes}, p), r3.Vec{X: 1.5, Y: -1, Z: 0.5}, cf.EllipsoidInnerField(p, axes))
		},
	})
}

const integrated = "integrated from values good to 1e-12, by a rule exact to 1e-14"

// boxFactor returns the magnetometric factor along z: the energy integral of the potential on the upper face, by symmetry
// four times that over a quarter, twice for both faces, over p^2 V.
func boxFactor(l *lab, size r3.Vec) float64 {
	src := l.uniform(geom.Box{Size: size}, r3.Vec{Z: 1})
	rule := graded()
	phi := mean(rule, func(u node) float64 {
		return mean(rule, func(v node) float64 {
			return l.phi(src, r3.Vec{X: size.X / 2 * u.x, Y: size.Y / 2 * v.x, Z: size.Z / 2})
		})
	})
	return 2 * phi / size.Z
}

// prismFactors checks Aharoni's factors.
func prismFactors() []trial {
	aharoni := published("Aharoni1998", "eq. 1")
	var all []trial
	entries, args := numbered("prism-")
	for i, e := range entries {
		size := r3.Vec{X: args[i][0], Y: args[i][1], Z: args[i][2]}
		kind, source := ClosedForm, aharoni
		if args[i][0] == args[i][1] && args[i][1] == args[i][2] {
			kind, source = PublishedTable, published("Aharoni1998", "cube: 1/3")
		}
		all = append(all, e.tabled(kind, source, "mean of -g_z/p, edges "+e.ID[len("prism-"):], relative(1e-11, integrated),
			func(l *lab) float64 { return boxFactor(l, size) })...)
	}
	return append(all, trial{
		"plate 20x10x5, sum", Law, plain("N_x + N_y + N_z = 1"), "magnetometric factors along 20, 10 and 5",
		within(3e-11, integrated),
		func(l *lab) result {
			return number(1, boxFactor(l, r3.Vec{X: 10, Y: 5, Z: 20})+boxFactor(l, r3.Vec{X: 5, Y: 20, Z: 10})+boxFactor(l, r3.Vec{X: 20, Y: 10, Z: 5}))
		},
	}, trial{
		"plate 20x10x5 by cells", ClosedForm, aharoni, "mean of -g_z/p over 12^3 Gauss points of the volume",
		within(3e-3, "measured: the field has a logarithm at the edges"),
		func(l *lab) result {
			body := geom.Box{Size: r3.Vec{X: 20, Y: 10, Z: 5}}
			src := l.uniform(body, r3.Vec{Z: 1})
			var sum float64
			body.Nodes(12, func(x r3.Vec, w float64) { sum -= w * l.g(src, x).Z })
			return number(cf.BoxMagnetometricFactor(body.Size), sum/body.Volume())
		},
	})
}

// cylinderFactors checks the factors of cylinders of diameter 1.
func cylinderFactors() []trial {
	body := func(l *lab, length float64, p r3.Vec) *bound.Charge {
		return l.uniform(geom.Cylinder{Radius: 0.5, Height: length}, p)
	}
	// The area element s ds is taken as d(s^2)/2 over the disc of radius 1/2: the mean over the disc is that of 2 u du.
	overDisc := func(f func(s float64) float64) float64 {
		return mean(graded(), func(u node) float64 { return 2 * u.x * f(0.5*u.x) })
	}
	axial := func(l *lab, length float64) float64 {
		src := body(l, length, r3.Vec{Z: 1})
		return 2 / length * overDisc(func(s float64) float64 { return l.phi(src, r3.Vec{X: s, Z: length / 2}) })
	}
	// On the wall sigma and phi go as cos(azimuth): the mean of cos^2 is 1/2, wall over volume 4.
	across := func(l *lab, length float64) float64 {
		src := body(l, length, r3.Vec{X: 1})
		return 2 * mean(graded(), func(u node) float64 { return l.phi(src, r3.Vec{X: 0.5, Z: length / 2 * u.x}) })
	}
	flux := func(l *lab, length float64) float64 {
		src := body(l, length, r3.Vec{Z: 1})
		return -overDisc(func(s float64) float64 { return l.g(src, r3.Vec{X: s}).Z })
	}
	var all []trial
	for _, c := range []struct {
		prefix, inputs string
		source         Source
		claim          limit
		got            func(l *lab, length float64) float64
	}{
		{"cylinder-Nm-", "magnetometric, along the axis, chi = 0, length/diameter = %g", published("Chen1991", ""), relative(1e-11, integrated), axial},
		{"cylinder-Nf-", "fluxmetric, mean over the middle plane, length/diameter = %g", published("Joseph1966", ""), relative(1e-11, integrated), flux},
		{"cylinder-Nm-transverse-", "magnetometric, across the axis, length/diameter = %g", published("Nagaoka1909", "and trace 1"), relative(1e-11, integrated), across},
	} {
		entries, args := numbered(c.prefix)
		for i, e := range entries {
			length := args[i][0]
			all = append(all, e.tabled(ClosedForm, c.source, fmt.Sprintf(c.inputs, length), c.claim,
				func(l *lab) float64 { return c.got(l, length) })...)
		}
	}
	for _, length := range []float64{1, 2} {
		id := fmt.Sprintf("cylinder-centre-N-%g-1", length)
		byID, _ := table()
		all = append(all, byID[id].tabled(ClosedForm, published("Jackson1999", "prob. 5.19 at the centre"),
			"-g_z/p at the centre, L/D = "+fmt.Sprint(length),
			contract(1),
			func(l *lab) float64 { return -l.g(body(l, length, r3.Vec{Z: 1}), r3.Vec{}).Z })...)
	}
	return append(all, trial{
		"mean of g over the volume", Independent, plain("volume mean of -g_z against energy of the faces"),
		"L/D = 2, 40 x 80 Gauss points over radius and height",
		within(2e-4, "measured: the field has a logarithm at the rims"), func(l *lab) result {
			src := body(l, 2, r3.Vec{Z: 1})
			along, radial := gauss(80), gauss(40)
			volume := mean(along, func(z node) float64 {
				return mean(radial, func(s node) float64 { return -2 * s.x * l.g(src, r3.Vec{X: 0.5 * s.x, Z: 2*z.x - 1}).Z })
			})
			return number(axial(l, 2), volume)
		},
	})
}

// energies checks energies of sheets and bodies.
func energies() []trial {
	disc := func(l *lab, z float64) float64 { // (1/2) int phi dA over a disc of radius 1 at height z, by rings
		src := l.disc(1, 0, 1)
		return math.Pi * mean(graded(), func(u node) float64 { return u.x * l.phi(src, r3.Vec{X: u.x, Z: z}) })
	}
	square := func(l *lab, a, b float64) float64 {
		src := rectangle(a, b, 0, 1)
		rule := graded()
		return a * b / 2 * mean(rule, func(u node) float64 {
			return mean(rule, func(v node) float64 { return l.phi(src, r3.Vec{X: a / 2 * u.x, Y: b / 2 * v.x}) })
		})
	}
	claim := relative(1e-11, integrated)
	classical := plain("classical: 1/pi, polar coordinates about the rim")
	all := []trial{
		{"disc rim potential", PublishedTable, classical, "radius 1, sigma = 1", relative(1e-12, "accuracy contract"),
			func(l *lab) result {
				return l.phiAt(l.disc(1, 0, 1), r3.Vec{X: 1}, recomputed("disc-rim-potential", ""))
			}},
		{"disc self energy", PublishedTable, plain("classical: 2/3, rings brought to the rim"),
			"radius 1, sigma = 1: (1/2) int sigma phi dA",
			claim,
			func(l *lab) result {
				return number(recomputed("disc-self-energy", ""), disc(l, 0))
			}},
		{"square centre potential", PublishedTable, published("Hummer1996", ""), "side 1, sigma = 1: log(1 + sqrt 2)/pi",
			relative(1e-12, "accuracy contract"),
			func(l *lab) result {
				return l.phiAt(rectangle(1, 1, 0, 1), r3.Vec{}, recomputed("square-centre-potential", ""))
			}},
		{"cube-volume-potential, centre", ClosedForm, published("Hummer1996", ""),
			"4 pi phi at the centre of a unit cube, rho = 1",
			relative(3e-12, "accuracy contract of body and six sheets"),
			func(l *lab) result {
				return number(recomputed("cube-volume-potential", "centre_4piphi"), 4*math.Pi*l.phi(filledCube(l), r3.Vec{}))
			}},
		{"cube-volume-potential as printed", TableFromMemory, published("Hummer1996", ""), "the same: 2.38007...",
			within(1e-5, "one unit of the last digit printed"),
			func(l *lab) result { return number(2.38007, 4*math.Pi*l.phi(filledCube(l), r3.Vec{})) }},
		{"rectangle self energy 1x3", ClosedForm, published("Aharoni1998", "leading term"), "(1/2) int sigma phi dA", claim,
			func(l *lab) result {
				return number(cf.RectangleSelfEnergy(1, 1, 3), square(l, 1, 3))
			}},
	}
	for _, d := range []float64{0.125, 1, 8} {
		all = append(all, trial{
			fmt.Sprintf("disc pair energy, d=%g a", d), ClosedForm, published("Eason1955", "I(1,1;-2)"),
			"two discs of radius 1, sigma = 1: int sigma2 phi1 dA",
			claim,
			func(l *lab) result { return number(cf.DiscPairEnergy(1, 1, 1, d), 2*disc(l, d)) },
		})
	}
	for _, c := range []struct {
		id      string
		p, axes r3.Vec
	}{
		{"ellipsoid-self-energy-1-1.5-2", r3.Vec{X: 0.3, Y: -0.7, Z: 1.1}, r3.Vec{X: 1, Y: 1.5, Z: 2}},
		{"ellipsoid-self-energy-5-1-0.2", r3.Vec{X: 1, Y: 1, Z: 1}, r3.Vec{X: 5, Y: 1, Z: 0.2}},
	} {
		all = append(all, trial{
			c.id, ClosedForm, published("Osborn1945", "energy V/2 sum N p^2"), "(1/2) int sigma phi dA over the surface",
			relative(1e-11, "accuracy contract; the rule is exact, phi is linear"),
			func(l *lab) result {
				body := geom.Ellipsoid{SemiAxes: c.axes}
				src := l.uniform(body, c.p)
				var sum float64
				body.Faces()[0].Surface.Nodes(8, func(x, n r3.Vec, w float64) {
					sum += w / 2 * r3.Dot(c.p, n) * l.phi(src, x)
				})
				return number(recomputed(c.id, ""), sum)
			},
		})
	}
	return all
}
