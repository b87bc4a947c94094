package verify

import (
	"fmt"
	"math"

	"example.com/boundpole/charge"
	"example.com/boundpole/field"
	cf "example.com/boundpole/field/closedform"
	"example.com/boundpole/field/element"
	"example.com/boundpole/geom"
	"example.com/boundpole/magnet"
	"gonum.org/v1/gonum/spatial/r3"
)

// magnetOf returns a magnet in millimetres.
func magnetOf(l *lab, body geom.Body, j r3.Vec) magnet.Model {
	part, err := magnet.WithRemanence(body, j)
	l.note(err)
	return magnet.Model{Parts: []magnet.Part{part}, Unit: 1e-3}
}

// outsideB returns B in tesla at a point outside all magnets, from H.
func outsideB(l *lab, m magnet.Model, x r3.Vec) r3.Vec { return r3.Scale(magnet.Mu0, l.g(m, x)) }

// workedExamples returns jobs with magnets, with electrets and dielectrics, and with forces.
func workedExamples() []trial {
	return append(append(magnetJobs(), electricJobs()...), workedForces()...)
}

func magnetJobs() []trial {
	solenoid := published("Jackson1999", "prob. 5.19")
	claim := relative(2e-12, "accuracy contract 1e-12; the closed form loses z/L")
	disc := func(l *lab) magnet.Model { return magnetOf(l, geom.Cylinder{Radius: 4, Height: 3}, r3.Vec{Z: 1.3}) }
	var all []trial
	for _, z := range []float64{2.2, 2.5, 2.8} {
		all = append(all, trial{
			fmt.Sprintf("sensor magnet B, z=%g mm", z), ClosedForm, solenoid, "tesla; disc D8 x 3 mm, Br 1.30 T, z above the face",
			claim,
			func(l *lab) result {
				return number(cf.CylinderAxisInduction(1.3, 4, 3, 1.5+z), outsideB(l, disc(l), r3.Vec{Z: 1.5 + z}).Z)
			},
		})
	}
	for _, c := range []struct {
		id                      string
		remanence, a, length, z float64
	}{
		{"axis-field-D10-L5-z1", 1.3, 5, 5, 1}, {"axis-field-D10-L5-z10", 1.3, 5, 5, 10}, {"axis-field-D20-L20-z50", 1, 10, 20, 50},
	} {
		all = append(all, trial{c.id, ClosedForm, solenoid, "tesla, on the axis above the face", claim, func(l *lab) result {
			m := magnetOf(l, geom.Cylinder{Radius: c.a, Height: c.length}, r3.Vec{Z: c.remanence})
			return number(recomputed(c.id, ""), outsideB(l, m, r3.Vec{Z: c.length/2 + c.z}).Z)
		}})
	}
	factor := func(l *lab) float64 { // magnetometric, of the sensor magnet
		src := l.uniform(geom.Cylinder{Radius: 4, Height: 3}, r3.Vec{Z: 1})
		return 2.0 / 3 * mean(graded(), func(u node) float64 { return 2 * u.x * l.phi(src, r3.Vec{X: 4 * u.x, Z: 1.5}) })
	}
	working := func(name string, pick func(b, h float64) float64, scale float64, unit string) trial {
		return trial{"sensor magnet " + name, ClosedForm, published("Chen1991", "N_m; crossing of load and recoil line"), unit + "; mu_rec 1.05, N_m from the library's potential",
			relative(2e-11, integrated), func(l *lab) result {
				return number(scale*pick(cf.OperatingPoint(1.3, cf.CylinderMagnetometricFactor(4, 3), 1.05)), scale*pick(cf.OperatingPoint(1.3, factor(l), 1.05)))
			}}
	}
	dipoles := func(x r3.Vec) (sum r3.Vec) {
		eachOfCarton(func(at r3.Vec) { sum = r3.Add(sum, cf.DipoleField(r3.Vec{Z: 1.3 * math.Pi * 1000}, r3.Sub(x, at))) })
		return sum
	}
	return append(all,
		working("working B", func(b, _ float64) float64 { return b }, 1, "tesla"),
		working("working H", func(_, h float64) float64 { return h }, 1/magnet.Mu0, "A/m"),
		trial{"sensor magnet dB/dz", ClosedForm, published("Jackson1999", "prob. 5.19, derivative"), "T/mm at 2.5 mm",
			relative(1e-11, "gradients: ten times the contract"),
			func(l *lab) result {
				slope := func(u float64) float64 { return 0.65 * 16 / math.Pow(u*u+16, 1.5) }
				g := l.evaluate(l.uniform(geom.Cylinder{Radius: 4, Height: 3}, r3.Vec{Z: 1.3}), r3.Vec{Z: 4}, field.Mean, field.WantGrad).Grad
				return number(slope(5.5)-slope(2.5), g[2])
			}},
		trial{"sensor magnet B at its centre", ClosedForm, solenoid, "tesla, inside: B = mu0 (H + M)",
			relative(4e-15, "u of H and M, which are of the size of B"),
			func(l *lab) result {
				m := disc(l)
				if l.err != nil {
					return result{}
				}
				r := m.At(r3.Vec{}, field.Mean)
				v := number(cf.CylinderAxisInduction(1.3, 4, 3, 0), r.B.Z)
				v.estimate = claimed(r.ErrB)
				return v
			}},
		trial{"cube 50 mm, B at 120 mm", ClosedForm, published("Kellogg1929", "solid angle of a rectangle"),
			"tesla, Br 1.30 T, from the centre",
			claim,
			func(l *lab) result {
				m := magnetOf(l, geom.Box{Size: r3.Vec{X: 50, Y: 50, Z: 50}}, r3.Vec{Z: 1.3})
				return number(cf.BoxAxisInduction(1.3, 50, 50, 50, 95), outsideB(l, m, r3.Vec{Z: 120}).Z)
			}},
		trial{"latch pull at 0.5 mm", ClosedForm, published("Eason1955", "I(1,1;-1), with its mirror image"),
			"newtons; disc D12 x 4 mm, Br 1.30 T, on ideal iron",
			relative(2e-11, integrated),
			func(l *lab) result {
				src := l.uniform(geom.Cylinder{Radius: 6, Height: 4}, r3.Vec{Z: 1.3})
				end := func(z float64) float64 {
					return 36 * math.Pi * mean(graded(), func(u node) float64 { return 2 * u.x * l.g(src, r3.Vec{X: 6 * u.x, Z: z}).Z })
				}
				newton := 1.3e-6 / magnet.Mu0
				return number(-1.3*newton*cf.CoaxialCylinderForce(1, 1, 6, 4, 4, 1), newton*(end(3)-end(7)))
			}},
		trial{"carton of 24 magnets at 2.1 m", Independent, plain("24 point dipoles"),
			"tesla; discs D20 x 10 mm, Br 1.30 T, 4 x 6, pitch 25 mm, along the axis",
			relative(1e-4, "finite size of each magnet: of the order (D/r)^2 = 9e-5"), func(l *lab) result {
				sum := field.Sum{}
				eachOfCarton(func(at r3.Vec) {
					sum = append(sum, l.uniform(geom.At(geom.Cylinder{Radius: 10, Height: 10}, geom.Translate(at)), r3.Vec{Z: 1.3}))
				})
				x := r3.Vec{Z: 2100}
				return vector(dipoles(x), l.g(sum, x))
			}},
	)
}

// eachOfCarton visits the places of 4 x 6 magnets.
func eachOfCarton(visit func(at r3.Vec)) {
	for i := range 24 {
		visit(r3.Vec{X: 25 * (float64(i%4) - 1.5), Y: 25 * (float64(i/4) - 2.5)})
	}
}

func electricJobs() []trial {
	const sigma, d, eps, gap, radius = -0.30e-3, 12.5, 2.1, 20.0, 3000.0 // C/m2, micrometres
	const eps0 = charge.Epsilon0
	// foil is the charged foil with the polarization and electrode charges that its field e (V/m, in the foil) asks for.
	foil := func(l *lab, e, top float64) charge.Model {
		var m charge.Model
		m.Unit = 1e-6
		sheet := func(z, density float64) {
			p, err := charge.Sheet(geom.SheetAt(geom.Disc{Radius: radius}, geom.Translate(r3.Vec{Z: z})), density, r3.Vec{})
			l.note(err)
			m.Parts = append(m.Parts, p)
		}
		body, err := charge.Polarized(geom.At(geom.Cylinder{Radius: radius, Height: d}, geom.Translate(r3.Vec{Z: d / 2})),
			field.Uniform{P: r3.Vec{Z: eps0 * (eps - 1) * e}})
		l.note(err)
		m.Parts = append(m.Parts, body)
		sheet(0, eps0*eps*e)
		sheet(d, sigma)
		sheet(d+gap, top)
		return m
	}
	inGap := cf.ElectretGapField(sigma, d, eps, gap) / eps0
	shorted := func(l *lab) charge.Model { return foil(l, -inGap*gap/d, -eps0*inGap) }
	sessler := published("Sessler1987", "plate electret")
	all := []trial{
		{"capsule, field in the gap", ClosedForm, sessler, "V/m; foil 12.5 um, eps 2.1, -0.30 mC/m2, gap 20 um, shorted, R 3 mm",
			relative(2e-6, "theory: edge of the order (32.5 um/R)^3"),
			func(l *lab) result { return number(inGap, l.g(shorted(l), r3.Vec{Z: d + gap/2}).Z) }},
		{"capsule, voltage of the short", Identity, plain("both electrodes at one potential"),
			"V between the electrodes, of 202 V",
			within(202*2e-6, "theory: edge of the order (32.5 um/R)^3"),
			func(l *lab) result {
				m := shorted(l)
				if l.err != nil {
					return result{}
				}
				return number(0, m.At(r3.Vec{Z: d + gap}, field.Mean).V-m.At(r3.Vec{}, field.Mean).V)
			}},
		{"open foil, surface voltage", ClosedForm, sessler, "V; the same foil on its electrode, nothing above",
			relative(d/radius, "theory: edge of the order d/R"),
			func(l *lab) result {
				m := foil(l, -sigma/(eps0*eps), 0)
				if l.err != nil {
					return result{}
				}
				return number(cf.ElectretPotential(sigma, d, eps)/eps0*1e-6, m.At(r3.Vec{Z: d}, field.Mean).V-m.At(r3.Vec{}, field.Mean).V)
			}},
	}
	all = append(all, gradedFilm()...)
	for _, entry := range []float64{0, 2, 4, 10, 80} {
		id := fmt.Sprintf("dielectric-sphere-%g", entry)
		all = append(all, trial{
			id, ClosedForm, published("Griffiths2013", "ex. 4.7, eq. 4.49"),
			fmt.Sprintf("E inside over E0 = 3/(eps + 2), eps = %g: a sphere with its P in the applied field", entry),
			relative(1e-14, "E is the applied field less most of it: u (eps + 2)/3"), func(l *lab) result {
				const e0 = 1e6
				part, err := charge.Polarized(geom.Sphere{Radius: 1e-3}, field.Uniform{P: r3.Vec{Z: eps0 * recomputed(id, "") * e0}})
				l.note(err)
				m := charge.Model{Parts: []charge.Part{part}, Applied: r3.Vec{Z: e0}}
				return number(cf.SphereInnerRatio(entry), l.g(m, r3.Vec{X: 2e-4, Z: 3e-4}).Z/e0)
			},
		})
	}
	return all
}

// gradedFilm returns the film with P_z = P0 z/t from its bottom, and the bead with P = k r.
func gradedFilm() []trial {
	const p0, t, radius, eps0 = 0.065, 28.0, 1e5, charge.Epsilon0 // C/m2, micrometres
	model := func(l *lab) charge.Model {
		part, err := charge.Polarized(geom.Cylinder{Radius: radius, Height: t}, gradedAlong(p0/2, p0/t))
		l.note(err)
		return charge.Model{Parts: []charge.Part{part}, Unit: 1e-6}
	}
	section := published("Griffiths2013", "sec. 4.2")
	inside := published("Griffiths2013", "sec. 4.3, slab")
	film := "P_z = P0 z/t, P0 0.065 C/m2, t 28 um, R 100 mm"
	edge := "theory: edge of the order t/R"
	bead := field.Sum{
		element.ChargedSphere{Shape: geom.Sphere{Radius: 1e-3}, Density: 2e-4},
		element.ChargedBall{Shape: geom.Sphere{Radius: 1e-3}, Density: -0.6},
	}
	return []trial{
		{"graded film, sigma on top", ClosedForm, section, "C/m2; " + film, relative(4e-15, exact), func(l *lab) result {
			return number(p0, l.layer(model(l).Parts[0].Charge, 1).Max)
		}},
		{"graded film, sigma at the bottom", ClosedForm, section, "C/m2; " + film, within(p0*1e-15, exact),
			func(l *lab) result {
				return number(0, l.layer(model(l).Parts[0].Charge, 0).Max)
			}},
		{"graded film, rho", ClosedForm, section, "C/m3; " + film, relative(4e-15, exact), func(l *lab) result {
			m := model(l)
			if l.err != nil {
				return result{}
			}
			return number(cf.AxialPowerDensity(p0/(t*1e-6), 1, 0), m.Parts[0].Charge.Volumes[0].Max*1e6)
		}},
		{"graded film, voltage", ClosedForm, inside, "V between the faces, unscreened; " + film, relative(t/radius, edge),
			func(l *lab) result {
				m := model(l)
				if l.err != nil {
					return result{}
				}
				v := m.At(r3.Vec{Z: t / 2}, field.Mean).V - m.At(r3.Vec{Z: -t / 2}, field.Mean).V
				return number(cf.AxialPowerSlabVoltage(p0/t, 1, 0, t)/eps0*1e-6, v)
			}},
		{"graded film, E at mid-height", ClosedForm, inside, "V/m; E = -P/eps0 inside", relative(t/radius, edge),
			func(l *lab) result {
				return number(cf.AxialPowerSlabField(p0/t, 1, 0, t, t/2)/eps0, l.g(model(l), r3.Vec{}).Z)
			}},
		{"bead P = k r, E inside", ClosedForm, published("Griffiths2013", "prob. 4.10"),
			"V/m just below the surface; R 1 mm, k 0.2 C/m3",
			relative(1e-14, "accuracy of ball and shell"),
			func(l *lab) result {
				const r = 0.999e-3
				return number(cf.CentralPowerField(0.2, 1, 1e-3, r)/eps0, l.g(bead, r3.Vec{Z: r}).Z/eps0)
			}},
		{"bead P = k r, E outside", ClosedForm, published("Griffiths2013", "prob. 4.10"), "V/m at 2 mm: nothing",
			within(5.6e6*4e-15, "u of the 5.6 MV/m that sphere and ball give each"),
			func(l *lab) result {
				return number(cf.CentralPowerField(0.2, 1, 1e-3, 2e-3), l.g(bead, r3.Vec{Z: 2e-3}).Z/eps0)
			}},
	}
}
