package verify

import (
	"fmt"
	"math"
	"sync"

	"example.com/boundpole/field"
	cf "example.com/boundpole/field/closedform"
	"example.com/boundpole/field/cubature"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// integrators holds the integration over faces and cells against the textbook forms and the elements, which share nothing with
// it, and the rules that it is made of against the orders of convergence that theory gives.
func integrators() []trial {
	return append(append(overSheets(), overBodies()...), rates()...)
}

// shared returns a source that is built once for many cases.
func shared(build func(l *lab) field.Source) func(l *lab) field.Source {
	once := sync.OnceValues(func() (field.Source, error) {
		var l lab
		src := build(&l)
		return src, l.err
	})
	return func(l *lab) field.Source {
		src, err := once()
		l.note(err)
		return src
	}
}

// integrated is the field of a body by integration over all its charged faces and cells, whatever closed form there is.
func (l *lab) integrated(body geom.Body, p field.Polarization) field.Source {
	sum := field.Sum{}
	c := l.charge(body, p)
	for _, y := range c.Layers {
		if charted, ok := y.Face.Surface.(geom.Charted); ok && (y.Min != 0 || y.Max != 0) {
			sign := y.Face.Sign()
			sum = append(sum, l.charts(charted, func(x, n r3.Vec) float64 { return sign * r3.Dot(p.At(x), n) }))
		}
	}
	for _, y := range c.Volumes {
		if blocked, ok := y.Cell.(geom.Blocked); ok && (y.Min != 0 || y.Max != 0) {
			sum = append(sum, l.blocks(blocked, func(x r3.Vec) float64 { return -p.Divergence(x) }))
		}
	}
	return sum
}

// charts returns the field of a surface density by integration.
func (l *lab) charts(s geom.Charted, density func(x, n r3.Vec) float64) field.Source {
	y, err := cubature.NewLayer(s.Charts(), density, nil)
	if err != nil {
		l.note(err)
		return field.Sum{}
	}
	return y
}

// blocks returns the field of a volume density by integration.
func (l *lab) blocks(c geom.Blocked, density func(x r3.Vec) float64) field.Source {
	y, err := cubature.NewVolume(c.Blocks(), density, nil)
	if err != nil {
		l.note(err)
		return field.Sum{}
	}
	return y
}

// filled returns the cells of a body, filled with charge of density 1.
func (l *lab) filled(body geom.Body) field.Source {
	sum := field.Sum{}
	for _, c := range body.Cells() {
		sum = append(sum, l.blocks(c.(geom.Blocked), func(r3.Vec) float64 { return 1 })) // the cells of all shapes used here have blocks
	}
	return sum
}

// integral is the accuracy claimed for what is integrated, on the scale of the case.
func integral(scale float64) limit {
	return within(1e-10*scale, "accuracy contract of integrated shapes: 1e-10 of the natural scale")
}

// overSheets compares sheets and volumes of charge with textbook forms, from afar to 1e-6 off the charge.
func overSheets() []trial {
	var all []trial
	add := func(name string, source Source, run func(l *lab) result) {
		all = append(all, trial{name, ClosedForm, source, "sizes of 1 to 2, density 1", integral(1), run})
	}
	sheet := func(s geom.Charted) func(l *lab) field.Source {
		return shared(func(l *lab) field.Source { return l.charts(s, func(_, _ r3.Vec) float64 { return 1 }) })
	}
	solid := func(b geom.Body) func(l *lab) field.Source {
		return shared(func(l *lab) field.Source { return l.filled(b) })
	}
	kellogg := published("Kellogg1929", "")
	disc, annulus := sheet(geom.Disc{Radius: 1}), sheet(geom.Annulus{Inner: 0.5, Outer: 1})
	plate, cylinder := sheet(rectangleShape(2, 1.5, 0)), solid(geom.Cylinder{Radius: 1, Height: 1.5})
	for _, z := range []float64{-1e-6, 0.01, 0.5, 3} {
		axis := func(name string, src func(l *lab) field.Source, source Source, want float64) {
			add(fmt.Sprintf("%s g, z=%g", name, z), source, func(l *lab) result { return l.axisAt(src(l), z, want) })
		}
		axis("disc", disc, published("Griffiths2013", "prob. 2.6"), cf.DiscAxisField(1, 1, z))
		axis("annulus", annulus, published("Griffiths2013", "prob. 2.6"), cf.AnnulusAxisField(1, 0.5, 1, z))
		axis("rectangle", plate, kellogg, cf.RectangleAxisField(1, 2, 1.5, z))
		axis("filled cylinder", cylinder, published("Griffiths2013", "prob. 2.27"), cf.ChargedCylinderAxisField(1, 1, 1.5, z))
		add(fmt.Sprintf("annulus phi, z=%g", z), published("Griffiths2013", "prob. 2.25"), func(l *lab) result {
			return l.phiAt(annulus(l), r3.Vec{Z: z}, cf.AnnulusAxisPotential(1, 0.5, 1, z))
		})
		add(fmt.Sprintf("rectangle phi, z=%g", z), kellogg, func(l *lab) result {
			return l.phiAt(plate(l), r3.Vec{Z: z}, cf.RectangleAxisPotential(1, 2, 1.5, z))
		})
	}
	square, box := sheet(rectangleShape(2, 2, 0)), r3.Vec{X: 2, Y: 1.5, Z: 1}
	brick, cube := solid(geom.Box{Size: box}), solid(geom.Box{Size: r3.Vec{X: 1, Y: 1, Z: 1}})
	shell := sheet(geom.Sphere{Radius: 1}.Faces()[0].Surface.(geom.Charted)) // a sphere has charts
	ball := solid(geom.Sphere{Radius: 1})
	add("disc phi on the rim", kellogg, func(l *lab) result { return l.phiAt(disc(l), r3.Vec{X: 1}, cf.DiscRimPotential(1, 1)) })
	add("square phi in the centre", kellogg, func(l *lab) result { return l.phiAt(square(l), r3.Vec{}, cf.SquareCentrePotential(1, 2)) })
	add("filled box phi in the centre", published("Hummer1996", ""), func(l *lab) result {
		return l.phiAt(brick(l), r3.Vec{}, cf.BoxCentrePotential(1, box))
	})
	add("filled cube phi at a corner", published("Hummer1996", ""), func(l *lab) result {
		return l.phiAt(cube(l), r3.Vec{X: 0.5, Y: 0.5, Z: -0.5}, cf.CubeCornerPotential(1, 1))
	})
	for _, r := range []float64{0.4, 1 + 1e-6, 20} {
		x := r3.Scale(r/3, r3.Vec{X: 2, Y: -1, Z: 2})
		add(fmt.Sprintf("shell g, r=%g", r), published("Griffiths2013", "ex. 2.7"), func(l *lab) result {
			return l.fieldAt(shell(l), x, r3.Scale(cf.ChargedShellField(1, 1, r)/r, x))
		})
		add(fmt.Sprintf("shell phi, r=%g", r), published("Griffiths2013", "ex. 2.7"), func(l *lab) result {
			return l.phiAt(shell(l), x, cf.ChargedShellPotential(1, 1, r))
		})
		add(fmt.Sprintf("ball g, r=%g", r), published("Griffiths2013", "ex. 2.3"), func(l *lab) result {
			return l.fieldAt(ball(l), x, r3.Scale(cf.ChargedSphereField(1, 1, r)/r, x))
		})
	}
	return all
}

// overBodies compares polarized bodies, integrated, with textbook forms where there is one and with the elements elsewhere.
func overBodies() []trial {
	var all []trial
	p := r3.Vec{X: 0.3, Y: -0.7, Z: 1.1}
	oblique, along := field.Uniform{P: p}, field.Uniform{P: r3.Vec{Z: 1}}
	whole := func(body geom.Body, p field.Polarization) func(l *lab) field.Source {
		return shared(func(l *lab) field.Source { return l.integrated(body, p) })
	}
	add := func(name string, source Source, run func(l *lab) result) {
		all = append(all, trial{name, ClosedForm, source, "sizes of 1 to 2, p of 1 to 2", integral(2), run})
	}
	axis := func(name string, src func(l *lab) field.Source, source Source, zs []float64, want func(z float64) float64) {
		for _, z := range zs {
			add(fmt.Sprintf("%s g, z=%g", name, z), source, func(l *lab) result { return l.axisAt(src(l), z, want(z)) })
		}
	}
	griffiths, zs := published("Griffiths2013", "sec. 4.2"), []float64{0.2, 0.7501, 2}
	cylinder, tube := geom.Cylinder{Radius: 1, Height: 1.5}, geom.Tube{Inner: 0.5, Outer: 1, Height: 1.5}
	axis("cylinder", whole(cylinder, along), griffiths, zs, func(z float64) float64 { return cf.CylinderAxisField(1, 1, 1.5, z) })
	axis("cylinder p = z", whole(cylinder, field.AxialPower{Coefficient: 1, Power: 1}), griffiths, zs,
		func(z float64) float64 { return cf.LinearCylinderAxisField(1, 1, 1.5, z) })
	axis("tube", whole(tube, along), griffiths, zs, func(z float64) float64 { return cf.TubeAxisField(1, 0.5, 1, 1.5, z) })
	axis("tube radial p", whole(tube, field.RadialPower{Coefficient: 1}), plain("own derivation in field/closedform"), zs,
		func(z float64) float64 { return cf.RadialTubeAxisField(1, 0.5, 1, 1.5, z) })
	axis("box", whole(geom.Box{Size: r3.Vec{X: 2, Y: 1.5, Z: 1}}, along), published("Kellogg1929", ""), []float64{0.5001, 0.75, 3},
		func(z float64) float64 { return cf.BoxAxisInduction(1, 2, 1.5, 1, z-0.5) })
	sphere, hollow := whole(geom.Sphere{Radius: 1}, oblique), whole(geom.HollowSphere{Inner: 0.5, Outer: 1}, oblique)
	central := whole(geom.Sphere{Radius: 1}, field.CentralPower{Coefficient: 1, Power: 2})
	for _, r := range []float64{0.75, 1 - 1e-6, 3} {
		x := r3.Scale(r/3, r3.Vec{X: 2, Y: -1, Z: 2})
		add(fmt.Sprintf("sphere g, r=%g", r), published("Griffiths2013", "ex. 4.2"), func(l *lab) result {
			return l.fieldAt(sphere(l), x, cf.SphereField(p, 1, x))
		})
		add(fmt.Sprintf("hollow sphere phi, r=%g", r), published("Griffiths2013", "ex. 4.2"), func(l *lab) result {
			return l.phiAt(hollow(l), x, cf.HollowSpherePotential(p, 0.5, 1, x))
		})
		add(fmt.Sprintf("sphere p = r^2 g, r=%g", r), published("Griffiths2013", "prob. 4.10"), func(l *lab) result {
			return l.fieldAt(central(l), x, r3.Scale(cf.CentralPowerField(1, 2, 1, r)/r, x))
		})
	}
	semi := r3.Vec{X: 1, Y: 0.75, Z: 0.5}
	add("ellipsoid inside", published("Osborn1945", ""), func(l *lab) result {
		return l.fieldAt(l.integrated(geom.Ellipsoid{SemiAxes: semi}, oblique), r3.Vec{X: 0.3, Y: -0.2, Z: 0.1}, cf.EllipsoidInnerField(p, semi))
	})
	add("ellipsoid on its long axis", published("Stratton1941", "sec. 3.27"), func(l *lab) result {
		x := r3.Vec{X: 1.001}
		return l.fieldAt(l.integrated(geom.Ellipsoid{SemiAxes: semi}, field.Uniform{P: r3.Vec{X: 1}}), x, r3.Vec{X: cf.EllipsoidAxisField(1, semi, x.X)})
	})
	return append(all, againstElements()...)
}

// againstElements compares bodies without a textbook form with the element that is made for them; the elements are not altered.
func againstElements() []trial {
	oblique := field.Affine{Value: sheared.Value}
	bodies := []struct {
		name string
		body geom.Body
		p    field.Polarization
	}{
		{"cone", geom.Cone{Bottom: 1, Top: 0.4, Height: 1.5}, oblique},
		{"torus", geom.Torus{Major: 0.8, Minor: 0.3}, oblique},
		{"arc", geom.Arc{Inner: 0.5, Outer: 1, Height: 1.5, From: 0.25, To: 2.5}, sheared},
		{"cylinder p = s^2", geom.Cylinder{Radius: 1, Height: 1.5}, field.RadialPower{Coefficient: 1, Power: 2}},
		{"tube p = z^3", geom.Tube{Inner: 0.5, Outer: 1, Height: 1.5}, field.AxialPower{Coefficient: 1, Power: 3}},
	}
	for _, s := range samples() {
		bodies = append(bodies, struct {
			name string
			body geom.Body
			p    field.Polarization
		}{s.name, s.body, s.p})
	}
	var all []trial
	for _, b := range bodies {
		src := shared(func(l *lab) field.Source { return l.integrated(b.body, b.p) })
		for k, i := range []int{1, 3} {
			x := around[i]
			all = append(all, trial{
				fmt.Sprintf("%s against its element, point %d", b.name, k+1), Independent, plain("the element made for the body"),
				fmt.Sprintf("g at (%g, %g, %g)", x.X, x.Y, x.Z), integral(2),
				func(l *lab) result { return l.fieldAt(src(l), x, l.bare(l.charge(b.body, b.p), x)) },
			})
		}
	}
	for _, k := range []int{3, 5, 8, 12} {
		asked := math.Pow(10, -float64(k))
		all = append(all, trial{
			fmt.Sprintf("accuracy asked for, 1e-%d", k), Independent, plain("the element made for the body"),
			"worst error of g of an ellipsoid over 8 points, relative to p",
			within(asked, "cubature.Settings.Accuracy, relative to the natural scale"),
			func(l *lab) result { return atMost(worstAsked(l, asked)) },
		})
	}
	return all
}

// worstAsked is the worst error relative to p of the ellipsoid of samples, integrated to an accuracy.
func worstAsked(l *lab, accuracy float64) float64 {
	body, p := geom.Ellipsoid{SemiAxes: r3.Vec{X: 1, Y: 0.75, Z: 0.5}}, sheared.Value
	charted := body.Faces()[0].Surface.(geom.Charted) // an ellipsoid has charts
	src, err := cubature.NewLayer(charted.Charts(), func(_, n r3.Vec) float64 { return r3.Dot(p, n) },
		&cubature.Settings{Accuracy: accuracy, Neutral: true})
	if err != nil {
		l.note(err)
		return math.NaN()
	}
	exact, worst := l.uniform(body, p), 0.0
	for _, x := range around {
		worst = max(worst, r3.Norm(r3.Sub(l.g(src, x), l.bare(exact, x)))/r3.Norm(p))
	}
	return worst
}
