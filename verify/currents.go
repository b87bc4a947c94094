package verify

import (
	"context"
	"fmt"
	"math"
	"math/rand/v2"

	"example.com/boundpole/field"
	cf "example.com/boundpole/field/closedform"
	"example.com/boundpole/field/current"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// ampere is a magnetized body for the comparison of the two pictures.
type ampere struct {
	name   string
	body   geom.Body
	m      field.Polarization
	limit  float64
	points int // those integrated over charts take longer
}

// amperes returns bodies with uniform, affine and radial magnetization.
func amperes() []ampere {
	uniform := field.Uniform{P: sheared.Value}
	ell := [][2]float64{{-1, -1}, {1, -1}, {1, 0}, {0, 0}, {0, 1}, {-1, 1}}
	box, flat := geom.Box{Size: r3.Vec{X: 2, Y: 1.5, Z: 1}}, geom.Box{Size: r3.Vec{X: 2, Y: 1.5, Z: 0.001}}
	cylinder, tube := geom.Cylinder{Radius: 1, Height: 1.5}, geom.Tube{Inner: 0.5, Outer: 1, Height: 1.5}
	const closed, integrated = 1e-11, 1e-9
	return []ampere{
		{"box", box, uniform, closed, 200},
		{"flat box", flat, field.Uniform{P: r3.Vec{Z: 1}}, closed, 200},
		{"box affine", box, sheared, closed, 200},
		{"L prism", geom.Prism{Base: ell, Height: 1.5, TopSlope: [2]float64{0.25, -0.125}}, uniform, closed, 200},
		{"cylinder", cylinder, uniform, closed, 200},
		{"tube", tube, uniform, closed, 200},
		{"hollow sphere", geom.HollowSphere{Inner: 0.25, Outer: 1}, uniform, closed, 200},
		{"sphere affine", geom.Sphere{Radius: 1}, sheared, closed, 200},
		{"ellipsoid", geom.Ellipsoid{SemiAxes: r3.Vec{X: 1, Y: 0.75, Z: 0.5}}, uniform, closed, 200},
		{"arc", geom.ArcDegrees(0.5, 1, 0.75, 20, 130), uniform, integrated, 100},
		{"cylinder affine", cylinder, sheared, integrated, 60},
		{"cylinder radial", cylinder, field.RadialPower{Coefficient: 1}, integrated, 100},
		{"tube radial square", tube, field.RadialPower{Coefficient: 1, Power: 2}, integrated, 100},
		{"cylinder axial square", cylinder, field.AxialPower{Coefficient: 1, Power: 2}, integrated, 100},
	}
}

// currents holds the Amperian picture against the poles, and free currents against textbook forms.
func currents() []trial {
	var all []trial
	for _, a := range amperes() {
		all = append(all, trial{
			"poles and currents, " + a.name, Independent, plain("b = h + m, charges of m and of e x m"),
			fmt.Sprintf("worst |b - h - m| over max(|b|, m_max/100) at %d random points, half of them within 1e-6 of a face", a.points),
			within(a.limit, "two evaluators without a charge in common: 1e-11 in closed form, 1e-9 integrated"),
			func(l *lab) result { return atMost(l.apart(a)) },
		})
	}
	loop := func(l *lab, radius, z float64) *current.Loop {
		c, err := current.NewLoop(geom.Disc{Radius: radius, Z: z}, 2.5)
		l.note(err)
		return c
	}
	exact := "rounding of both sides"
	for _, z := range []float64{0, 0.5, -20, 1e6} {
		all = append(all, trial{
			fmt.Sprintf("loop on its axis, z = %g", z), ClosedForm, published("Griffiths2013", "eq. 5.41"), "radius 1.5, current 2.5",
			relative(5e-15, exact), func(l *lab) result {
				return l.axisAt(loop(l, 1.5, 0), z, cf.LoopAxisField(2.5, 1.5, z))
			}})
	}
	for _, c := range [][3]float64{{1, 1, 1}, {1, 0.5, 0.125}, {2, 3, 0.25}, {1, 0.25, 50}} {
		a, b, d := c[0], c[1], c[2]
		all = append(all, trial{
			fmt.Sprintf("coaxial loops, a = %g, b = %g, d = %g", a, b, d), ClosedForm, published("Maxwell1873", "vol. 2, art. 701"),
			"flux of a loop with current 2.5 through another, as the loop integral of a",
			relative(2e-14, exact+" and of the loop integral"), func(l *lab) result {
				return l.linked(loop(l, a, 0), current.Circle{Radius: b, Pose: geom.Translate(r3.Vec{Z: d})}, 2.5*cf.CoaxialLoopInductance(a, b, d))
			}})
	}
	for _, s := range []float64{1e-9, 0.25, 3} {
		all = append(all, trial{
			fmt.Sprintf("segment, distance %g", s), ClosedForm, published("Griffiths2013", "eq. 5.37"), "middle of a piece of length 2, current 2.5",
			relative(5e-15, exact), func(l *lab) result {
				w, err := current.NewSegment(r3.Vec{Z: -1}, r3.Vec{Z: 1}, 2.5)
				l.note(err)
				return l.fieldAt(w, r3.Vec{X: s}, r3.Vec{Y: cf.SegmentField(2.5, 2, s)})
			}})
	}
	for _, z := range []float64{0, 0.5, 1, 4} {
		all = append(all, trial{
			fmt.Sprintf("solenoid on its axis, z = %g", z), ClosedForm, published("Griffiths2013", "problem 5.11"), "radius 0.75, height 2, current by length 3",
			contract(3), func(l *lab) result {
				s, err := current.NewSolenoid(geom.Cylinder{Radius: 0.75, Height: 2}, 3)
				l.note(err)
				return l.axisAt(s, z, cf.CylinderAxisInduction(3, 0.75, 2, z))
			}})
	}
	return append(all, guides()...)
}

// guides checks the loop integrals of A of tubes in whose wall flux circulates.
func guides() []trial {
	guide := func(l *lab, make func() (*current.Guide, error)) *current.Guide {
		g, err := make()
		l.note(err)
		return g
	}
	arc := func() (*current.Guide, error) {
		return current.NewArcGuide(geom.ArcDegrees(1, 2, 1, 0, 360), geom.Pose{}, 0.5)
	}
	straight := func() (*current.Guide, error) { return current.NewGuide(geom.Cylinder{Radius: 0.5, Height: 4}, 1.5) }
	path := func(z0, z1, s0, s1 float64) current.Path {
		return current.Path{{X: s0, Z: z0}, {X: s0, Z: z1}, {X: s1, Z: z1}, {X: s1, Z: z0}}
	}
	tight := limit{1e-11, 1, "1e-11 of the flux of the tube"}
	var all []trial
	for _, c := range []struct {
		name  string
		make  func() (*current.Guide, error)
		curve current.Curve
		flux  float64
	}{
		{"through the wall", straight, path(-1.25, 0.75, 0.25, 1), 3},
		{"round an end", straight, path(-1, 3, 0.125, 0.75), 4.5},
		{"beside the tube", straight, path(-1, 1, 0.75, 2), 0},
		{"closed tube, in the bore", arc, current.Circle{Radius: 1.5}, math.Pi},
		{"closed tube, outside", arc, current.Circle{Radius: 2.5}, 0},
	} {
		all = append(all, trial{
			"circulating flux, " + c.name, Law, plain("Stokes's theorem"), "loop integral of A against the flux enclosed", tight,
			func(l *lab) result { return l.linked(guide(l, c.make), c.curve, c.flux) },
		})
	}
	for _, z := range []float64{0, 0.5, 4} {
		const height, flux = 0x1p-10, 1.5
		all = append(all, trial{
			fmt.Sprintf("ring of flux on its axis, z = %g", z), Identity, plain("Phi R^2/(2 (z^2 + R^2)^(3/2)), the loop's formula one storey up"),
			"a tube of radius 1 and height 2^-10 with the flux 1.5 in all", relative(1e-6, "theory: (height/radius)^2"), func(l *lab) result {
				g := guide(l, func() (*current.Guide, error) {
					return current.NewGuide(geom.Cylinder{Radius: 1, Height: height}, flux/height)
				})
				if l.err != nil {
					return result{}
				}
				v := g.At(r3.Vec{Z: z}, field.Outside)
				r := vector(r3.Vec{Z: cf.LoopAxisField(flux, 1, z)}, v.A)
				return r
			},
		})
	}
	return all
}

// linked compares a loop integral with a flux.
func (l *lab) linked(src current.Source, curve current.Curve, flux float64) result {
	if l.err != nil {
		return result{}
	}
	got, estimate, err := current.LoopIntegral(context.Background(), src, curve, 0)
	l.note(err)
	r := number(flux, got)
	r.estimate = estimate
	return r
}

// apart returns the worst difference of the two pictures over random points of a body, half of them close to its faces.
func (l *lab) apart(a ampere) float64 {
	poles := l.charge(a.body, a.m)
	amp, err := current.Of(a.body, a.m)
	l.note(err)
	if l.err != nil {
		return math.NaN()
	}
	rng := rand.New(rand.NewPCG(5, 8))
	x := scatter(a.body, a.points, rng)
	peak := 0.0
	for _, c := range amp.Body().Cells() {
		c.Nodes(4, func(x r3.Vec, _ float64) { peak = max(peak, r3.Norm(a.m.At(x))) })
	}
	v := current.NewValues(len(x))
	amp.Induction(v, field.PointsOf(x...), field.Mean)
	worst := 0.0
	for i := range x {
		b := v.At(i)
		if b.Status == field.OnFace || b.Status == field.OnEdge {
			continue
		}
		want := l.g(poles, x[i])
		if poles.Locate(pair.VecOf(x[i]), 0).Region == geom.Inside {
			want = r3.Add(want, a.m.At(x[i]))
		}
		miss := r3.Norm(r3.Sub(b.B, want)) / max(r3.Norm(want), 0.01*peak)
		if !(miss <= worst) {
			worst = miss
		}
	}
	return worst
}

// scatter returns n random points, half of them within 1e-6 of a face of a body of about 2 in size, the others around it.
func scatter(body geom.Body, n int, rng *rand.Rand) []r3.Vec {
	var out []r3.Vec
	for _, f := range body.Faces() {
		f.Surface.Nodes(6, func(x, normal r3.Vec, _ float64) {
			off := 1e-6 * math.Pow(10, -4*rng.Float64()) * float64(1-2*rng.IntN(2))
			out = append(out, r3.Add(x, r3.Scale(off, normal)))
		})
	}
	rng.Shuffle(len(out), func(i, j int) { out[i], out[j] = out[j], out[i] })
	out = out[:min(len(out), n/2)]
	for len(out) < n {
		s := 1.5 * math.Pow(10, max(0, 5*rng.Float64()-4))
		r := func() float64 { return s * (2*rng.Float64() - 1) }
		out = append(out, r3.Vec{X: r(), Y: r(), Z: r()})
	}
	return out
}
