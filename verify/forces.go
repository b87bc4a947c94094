package verify

import (
	"fmt"
	"math"
	"strings"

	cf "example.com/boundpole/field/closedform"
	"example.com/boundpole/field/element"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// forces checks forces: the integral of sigma g over the charged ends of the second body.
func forces() []trial {
	// onDiscs is the axial force of a cylinder of radius 1 on the ends of another of the given radius.
	onDiscs := func(l *lab, length1, radius, length2, gap float64) float64 {
		src := l.uniform(geom.Cylinder{Radius: 1, Height: length1}, r3.Vec{Z: 1})
		end := func(z float64) float64 {
			return math.Pi * radius * radius * mean(graded(), func(u node) float64 {
				return 2 * u.x * l.g(src, r3.Vec{X: radius * u.x, Z: z}).Z
			})
		}
		z := length1/2 + gap
		return end(z+length2) - end(z)
	}
	claim := relative(2e-11, integrated+"; the two ends cancel")
	var all []trial
	for _, c := range []struct {
		id                           string
		source                       Source
		length1, radius, length, gap float64
	}{
		{"force-coaxial-1-2-1-2-gap0.5", published("Eason1955", "I(1,1;-1), four pairs"), 2, 1, 2, 0.5},
		{"force-coaxial-1-1-0.5-1-gap0.25", plain("quadrature of the disc potential, 25 digits"), 1, 0.5, 1, 0.25},
		{"force-coaxial-1-1-1-1-gap0.01", published("Eason1955", "I(1,1;-1), four pairs"), 1, 1, 1, 0.01},
		{"force-image-cylinder-1-2-d0.25", published("Jackson1999", "sec. 2.2, images"), 2, 1, 2, 0.5},
		{"force-image-cylinder-1-1-d1", published("Jackson1999", "sec. 2.2, images"), 1, 1, 1, 2},
	} {
		all = append(all, trial{
			c.id, ClosedForm, c.source, fmt.Sprintf("lengths %g, %g, radii 1, %g, gap %g, p = 1, natural units", c.length1, c.length, c.radius, c.gap),
			claim,
			func(l *lab) result {
				return number(recomputed(c.id, ""), onDiscs(l, c.length1, c.radius, c.length, c.gap))
			},
		})
	}
	for _, d := range []float64{0.25, 2} {
		all = append(all, trial{
			fmt.Sprintf("disc pair, d=%g a", d), ClosedForm, published("Eason1955", "I(1,1;-1)"),
			"repulsion of two discs of radius 1, sigma = 1",
			relative(1e-11, integrated),
			func(l *lab) result {
				src := l.disc(1, 0, 1)
				got := math.Pi * mean(graded(), func(u node) float64 { return 2 * u.x * l.g(src, r3.Vec{X: u.x, Z: d}).Z })
				return number(cf.DiscPairForce(1, 1, 1, d), got)
			},
		})
	}
	for _, dx := range []float64{0, 10} {
		id := fmt.Sprintf("force-cuboids-akoun-yonnet-dx%g", dx)
		all = append(all, trial{
			id, ClosedForm, published("Akoun1984", "geometry of the example"),
			fmt.Sprintf("20x12x6 on 12x20x6 mm, centres (%g, -4, 8) mm apart, p = 1, mm2", dx-4),
			relative(1e-10, "64 x 64 Gauss points on each end: measured below 1e-11 at the gap of 2 mm"),
			func(l *lab) result {
				src := l.uniform(geom.Box{Size: r3.Vec{X: 20, Y: 12, Z: 6}}, r3.Vec{Z: 1})
				var sum r3.Vec
				for _, end := range []float64{-1, 1} {
					rectangleShape(12, 20, 3*end).Nodes(64, func(x, _ r3.Vec, w float64) {
						sum = r3.Add(sum, r3.Scale(end*w, l.g(src, r3.Add(x, r3.Vec{X: dx - 4, Y: -4, Z: 8}))))
					})
				}
				return vector(recomputedVec(id, "natural_mm2"), sum)
			},
		})
	}
	for _, angle := range []float64{0, 45, 90} {
		id := fmt.Sprintf("force-image-dipole-%g", angle)
		all = append(all, trial{
			id, ClosedForm, published("Jackson1999", "sec. 2.2, images"),
			"unit dipole 1 from an ideal iron plane, by its mirror image",
			relative(5e-15, "accuracy of the dipole's gradient"),
			func(l *lab) result {
				s, c := math.Sincos(angle * math.Pi / 180)
				image := element.Dipole{At: r3.Vec{Z: -2}, Moment: r3.Vec{X: -s, Z: c}} // ideal iron: the part along the plane reverses
				return number(recomputed(id, ""), l.force(image, r3.Vec{}, r3.Vec{X: s, Z: c}).Z)
			},
		})
	}
	return append(all, trial{
		"dipole-dipole-axial", PublishedTable, published("Jackson1999", "sec. 5.7: -3/(2 pi)"),
		"coaxial parallel unit dipoles 1 apart",
		relative(5e-15, "accuracy of the dipole's gradient"),
		func(l *lab) result {
			return number(recomputed("dipole-dipole-axial", ""), l.force(element.Dipole{Moment: r3.Vec{Z: 1}}, r3.Vec{Z: 1}, r3.Vec{Z: 1}).Z)
		},
	}, trial{
		"contact of long bars", ClosedForm, published("Maxwell1873", "vol. 2, art. 642"),
		"end discs of two rods 1e-6 a apart: p^2 A/2",
		relative(1e-5, "theory: of the order (gap/a) log(a/gap)"),
		func(l *lab) result {
			src := l.disc(1, 0, 1)
			got := math.Pi * mean(graded(), func(u node) float64 { return 2 * u.x * l.g(src, r3.Vec{X: u.x, Z: 1e-6}).Z })
			return number(cf.ContactPull(1, math.Pi), got)
		},
	})
}

// fluxTubes checks the vector potential in Coulomb gauge of a straight tube: A = g outside and g + p inside.
func fluxTubes() []trial {
	var all []trial
	_, ids := table()
	for _, id := range ids {
		rest, ok := strings.CutPrefix(id, "fluxtube-biot-savart-")
		if !ok {
			continue
		}
		var x r3.Vec
		var radius float64
		if n, err := fmt.Sscanf(strings.ReplaceAll(rest, "_", " "), "%g %g %g-a%g", &x.X, &x.Y, &x.Z, &radius); n != 4 || err != nil {
			continue // a test counts the entries that are used
		}
		half, a0 := 2.0, 1.0
		if radius == 1.5 {
			half, a0 = 0.375, 3
		}
		all = append(all, trial{
			rest, Independent, plain("Biot-Savart integral over the flux, 20 digits"),
			fmt.Sprintf("A at (%g, %g, %g), tube radius %g, length %g, A0 = %g", x.X, x.Y, x.Z, radius, 2*half, a0),
			limit{2e-12, 1e-3 * a0, "accuracy contract 1e-12 of g, and of p beside it"}, func(l *lab) result {
				a := l.g(l.uniform(geom.Cylinder{Radius: radius, Height: 2 * half}, r3.Vec{Z: a0}), x)
				if math.Hypot(x.X, x.Y) < radius && math.Abs(x.Z) < half {
					a.Z += a0
				}
				return vector(recomputedVec(id, "A_biot_savart"), a)
			},
		})
	}
	return append(all, trial{
		"octupole-free cylinder", Identity, plain("l = 3 moment of a cylinder: h^2 - 3 a^2/4"),
		"phi over the dipole's, less 1, at 100 radii on the axis, L = D",
		relative(1e-3, "next term: of the order (a/r)^2 = 1e-4, here 3.5 times that"), func(l *lab) result {
			m, z := r3.Vec{Z: 2 * math.Pi}, r3.Vec{Z: 100}
			phi := l.phi(l.uniform(geom.Cylinder{Radius: 1, Height: 2}, r3.Vec{Z: 1}), z)
			return number(0.25e-4, phi/cf.DipolePotential(m, z)-1)
		},
	}, trial{
		"octupole-free cylinder, L = 0.866 D", Identity, plain("l = 3 moment of a cylinder: h^2 - 3 a^2/4"),
		"the same at 100 radii: no l = 3 part",
		within(1e-8, "l = 5 part: (a/r)^4"), func(l *lab) result {
			length := math.Sqrt(3)
			m, z := r3.Vec{Z: math.Pi * length}, r3.Vec{Z: 100}
			phi := l.phi(l.uniform(geom.Cylinder{Radius: 1, Height: length}, r3.Vec{Z: 1}), z)
			return number(0, phi/cf.DipolePotential(m, z)-1)
		},
	})
}
