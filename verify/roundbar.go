package verify

import (
	"fmt"
	"math"

	"example.com/boundpole/charge"
	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	cf "example.com/boundpole/field/closedform"
	"example.com/boundpole/geom"
	"example.com/boundpole/magnet"
	"gonum.org/v1/gonum/spatial/r3"
)

const exact = "sums and products of a few terms"

// uniformCylinder checks the charges of the cylinder a = 2, L = 3 with p = 5 along its axis, and the field at its ends.
func uniformCylinder() []trial {
	const a, length, p = 2, 3, 5
	body := geom.Cylinder{Radius: a, Height: length}
	axial := func(l *lab) *bound.Charge { return l.uniform(body, r3.Vec{Z: p}) }
	section := published("Griffiths2013", "sec. 4.2.1")
	jackson := published("Jackson1999", "prob. 5.19")
	density := func(name string, i int, expected float64) trial {
		return trial{name, ClosedForm, section, "sigma = p.n, least and greatest on the face", relative(1e-15, exact),
			func(l *lab) result {
				f := l.layer(axial(l), i)
				r := number(expected, f.Max)
				r.miss = max(r.miss, math.Abs(f.Min-expected))
				return r
			}}
	}
	all := []trial{
		density("sigma on top = +p", 1, p),
		density("sigma at the bottom = -p", 0, -p),
		{"sigma on the wall = 0", ClosedForm, section, "sigma = p.n", within(0, "n is exactly across p"),
			func(l *lab) result {
				w := l.layer(axial(l), 2)
				return number(0, max(math.Abs(w.Min), math.Abs(w.Max)))
			}},
		{"charge inside = 0", ClosedForm, section, "rho = -div p of a uniform p", within(0, "exact"), func(l *lab) result {
			c := axial(l)
			if l.err != nil {
				return result{}
			}
			v := c.Volumes[0]
			return number(0, max(math.Abs(v.Min), math.Abs(v.Max), math.Abs(v.Charge)))
		}},
		{"charge of the top = p A", ClosedForm, section, "integral of sigma", relative(4e-15, exact), func(l *lab) result {
			return number(p*math.Pi*a*a, l.layer(axial(l), 1).Charge)
		}},
		{"moment = p V", Identity, plain("integral of p over the volume"), "dipole moment", relative(4e-15, exact),
			func(l *lab) result {
				return vector(r3.Vec{Z: p * math.Pi * a * a * length}, axial(l).Moment)
			}},
		{"across: sigma = p cos(azimuth)", ClosedForm, section, "p across the axis: greatest sigma on the wall",
			relative(4e-15, exact),
			func(l *lab) result {
				c := l.uniform(body, r3.Vec{X: p})
				return number(p, l.layer(c, 2).Max)
			}},
	}
	for _, z := range []float64{0, 1.25, 1.75, 6, 40} {
		all = append(all, trial{
			fmt.Sprintf("g on the axis, z=%g", z), ClosedForm, jackson, "a = 2, L = 3, p = 5; the face is at z = 1.5",
			contract(p),
			func(l *lab) result { return l.axisAt(axial(l), z, cf.CylinderAxisField(p, a, length, z)) },
		}, trial{
			fmt.Sprintf("phi on the axis, z=%g", z), ClosedForm, published("Griffiths2013", "prob. 2.25, twice"), "the same",
			contract(p * a),
			func(l *lab) result { return l.phiAt(axial(l), r3.Vec{Z: z}, cf.CylinderAxisPotential(p, a, length, z)) },
		})
	}
	return append(all, trial{
		"jump across the top", Law, plain("g_n outside - inside = sigma"), "at (1, -1.5, 1.5) on the upper end",
		relative(4e-15, exact),
		func(l *lab) result {
			c, x := axial(l), r3.Vec{X: 1, Y: -1.5, Z: length / 2.0}
			return vector(r3.Vec{Z: p}, r3.Sub(l.at(c, x, field.Outside).G, l.at(c, x, field.Inside).G))
		},
	}, trial{
		"g + p at the face centre", ClosedForm, jackson, "the same from both sides", contract(p),
		func(l *lab) result {
			c, x := axial(l), r3.Vec{Z: length / 2.0}
			in, out := l.at(c, x, field.Inside).G.Z+p, l.at(c, x, field.Outside).G.Z
			r := number(cf.FaceCentreInduction(p, a, length), in)
			r.miss = max(r.miss, math.Abs(out-r.expected))
			return r
		},
	})
}

// uniformSphere checks the sphere of radius 2 with p = (1, -2, 2): |p| = 3.
func uniformSphere() []trial {
	const a = 2
	p := r3.Vec{X: 1, Y: -2, Z: 2}
	body := geom.Sphere{Radius: a}
	example := published("Griffiths2013", "ex. 4.2")
	sphere := func(l *lab) *bound.Charge { return l.uniform(body, p) }
	var all []trial
	for _, degrees := range []float64{0, 30, 60, 90, 120, 180} {
		s, c := math.Sincos(degrees * math.Pi / 180)
		if degrees == 90 {
			s, c = 1, 0
		}
		across := r3.Vec{X: 2, Y: 2, Z: 1} // across p, length 3
		n := r3.Add(r3.Scale(c/3, p), r3.Scale(s/3, across))
		all = append(all, trial{
			fmt.Sprintf("sigma at theta=%g deg", degrees), ClosedForm, example, "sigma = p cos(theta), p = 3",
			within(3*4e-16, "rounding of n"),
			func(l *lab) result {
				q := sphere(l)
				if l.err != nil {
					return result{}
				}
				return number(3*c, q.Density(r3.Scale(a, n), n))
			},
		})
	}
	for _, x := range []r3.Vec{{}, {X: 0.5, Y: 1, Z: -1}, {X: 1.999}} {
		all = append(all, trial{
			fmt.Sprintf("inside g = -p/3, r=%.4g", r3.Norm(x)), ClosedForm, example,
			fmt.Sprintf("at (%g, %g, %g), a = 2", x.X, x.Y, x.Z),
			relative(4e-15, "accuracy of the sphere: 2e-15"),
			func(l *lab) result { return l.fieldAt(sphere(l), x, r3.Scale(-1.0/3, p)) },
		})
	}
	for _, x := range []r3.Vec{{X: 2.001}, {X: 3, Y: -1, Z: 4}, {Y: 2000}, {X: 1e6, Z: 1e6}} {
		m := r3.Scale(4*math.Pi*a*a*a/3, p)
		all = append(all, trial{
			fmt.Sprintf("outside a dipole, r=%.4g", r3.Norm(x)), ClosedForm, example,
			fmt.Sprintf("g at (%g, %g, %g), a = 2", x.X, x.Y, x.Z),
			relative(4e-15, "accuracy of the sphere: 2e-15"),
			func(l *lab) result { return l.fieldAt(sphere(l), x, cf.DipoleField(m, x)) },
		}, trial{
			fmt.Sprintf("outside phi, r=%.4g", r3.Norm(x)), ClosedForm, example, "m.x/(4 pi r^3) at the same point",
			relative(4e-15, "accuracy of the sphere: 2e-15; p.x rounds"),
			func(l *lab) result { return l.phiAt(sphere(l), x, cf.DipolePotential(m, x)) },
		})
	}
	return append(all, trial{
		"E inside, SI", ClosedForm, published("Griffiths2013", "ex. 4.2, eq. 4.14"), "P = 3 uC/m2, V/m",
		relative(4e-15, "accuracy of the sphere"),
		func(l *lab) result {
			part, err := charge.Polarized(geom.Sphere{Radius: 2e-3}, field.Uniform{P: r3.Vec{X: 3e-6}})
			l.note(err)
			return vector(r3.Vec{X: -1e-6 / charge.Epsilon0}, l.g(charge.Model{Parts: []charge.Part{part}}, r3.Vec{Y: 1e-3}))
		},
	}, trial{
		"B inside = 2/3 mu0 M, SI", ClosedForm, published("Jackson1999", "sec. 5.10"), "mu0 M = 1.2 T, tesla",
		relative(4e-15, "accuracy of the sphere"),
		func(l *lab) result {
			part, err := magnet.WithRemanence(geom.Sphere{Radius: 2e-3}, r3.Vec{Z: 1.2})
			l.note(err)
			if l.err != nil {
				return result{}
			}
			return vector(r3.Vec{Z: 0.8}, magnet.Model{Parts: []magnet.Part{part}}.At(r3.Vec{Y: 1e-3}, field.Mean).B)
		},
	})
}
