package verify

import (
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// identities checks neutrality, moment, flux, motion, scale and reciprocity.
func identities() []trial {
	var all []trial
	for _, s := range samples() {
		posed := func(l *lab) *bound.Charge { return s.build(l, tilted(l)) }
		all = append(all, trial{
			"neutral, " + s.name, Identity, plain("sum of all bound charge = 0"),
			"charge of all faces and cells over the sum of magnitudes",
			within(1e-14, "u of sums of a few terms"),
			func(l *lab) result {
				var sum, size float64
				if c := posed(l); l.err == nil {
					for _, f := range c.Layers {
						sum, size = sum+f.Charge, size+f.Area*max(math.Abs(f.Min), math.Abs(f.Max))
					}
					for _, v := range c.Volumes {
						sum, size = sum+v.Charge, size+math.Abs(v.Charge)
					}
				}
				return number(0, sum/size)
			},
		}, trial{
			"moment, " + s.name, Identity, plain("moment of the charge = integral of p"),
			"sigma r over the faces and rho r over the cells against p over the volume, in a turned frame",
			relative(1e-13, "rounding of sums of a few hundred nodes"), func(l *lab) result {
				c := posed(l)
				if l.err != nil {
					return result{}
				}
				return vector(c.Moment, momentOfCharge(c, s.p))
			},
		}, trial{
			"closed flux, " + s.name, Law, plain("Gauss's law: no net charge"),
			"flux of g through a sphere of radius 3 round the body, 40 x 80 points",
			within(1e-10, "(1.6/3)^40 = 1e-11 of p a^2; accuracy contract"),
			func(l *lab) result { return number(0, l.flux(s.build(l, geom.Pose{}), r3.Vec{}, 3, 40)) },
		}, trial{
			"rigid motion, " + s.name, Identity, plain("g turns with the body"),
			"largest deviation over eight points, relative to the field there",
			within(1e-11, "accuracy contract, of both; 8 u |x-c| |grad g|"),
			func(l *lab) result { return number(0, motionMiss(l, s)) },
		}, trial{
			"superposition, " + s.name, Identity, plain("field is linear in p"),
			"body with p1 + p2 less the two bodies, relative",
			within(3e-12, "accuracy contract, of all three"),
			func(l *lab) result { return number(0, linearMiss(l, s)) },
		})
	}
	for _, c := range []struct{ one, two int }{{0, 4}, {1, 5}, {4, 9}, {6, 7}} {
		a, b := samples()[c.one], samples()[c.two]
		all = append(all, trial{
			fmt.Sprintf("mutual, %s, %s", a.name, b.name), Identity, plain("int p1.g2 dV = int p2.g1 dV"),
			"over both volumes, 6 apart, 14^3 points a cell",
			relative(1e-10, "rule: (1.3/4.6)^27 = 1e-15; accuracy contract; the sum is a tenth of its terms"),
			func(l *lab) result {
				shift := r3.Vec{X: 4, Y: 3, Z: -3}
				one, two := a.build(l, geom.Pose{}), b.build(l, geom.Translate(shift))
				return number(l.work(one, two), l.work(two, one))
			},
		})
	}
	return all
}

// momentOfCharge integrates sigma r and rho r.
func momentOfCharge(c *bound.Charge, p field.Affine) (m r3.Vec) {
	for _, f := range c.Layers {
		f.Face.Surface.Nodes(12, func(x, n r3.Vec, w float64) {
			m = r3.Add(m, r3.Scale(w*c.Density(x, r3.Scale(f.Face.Sign(), n)), x))
		})
	}
	for _, v := range c.Volumes {
		v.Cell.Nodes(12, func(x r3.Vec, w float64) { m = r3.Sub(m, r3.Scale(w*p.Divergence(x), x)) })
	}
	return m
}

// motionMiss compares the field of a turned body with the turned field. Only the turned body is altered.
func motionMiss(l *lab, s sample) float64 {
	pose := tilted(l)
	still, moved := s.build(l, geom.Pose{}), s.build(l, pose)
	var worst float64
	for _, x := range around {
		want := pose.VectorToOuter(l.bare(still, x))
		got := l.g(moved, pose.ToOuter(pair.VecOf(x)).Value())
		worst = max(worst, r3.Norm(r3.Sub(got, want))/r3.Norm(want))
	}
	return worst
}

// linearMiss compares a body with the sum of p and another polarization with the sum of both bodies. Only the sum is
// altered.
func linearMiss(l *lab, s sample) float64 {
	other := r3.Vec{X: -0.5, Y: 0.25, Z: 0.75}
	both := s.p
	both.Value = r3.Add(both.Value, other)
	whole, first, second := l.charge(s.body, both), s.build(l, geom.Pose{}), l.uniform(s.body, other)
	var worst float64
	for _, x := range around {
		a, b := l.bare(first, x), l.bare(second, x)
		miss := r3.Sub(l.g(whole, x), r3.Add(a, b))
		worst = max(worst, r3.Norm(miss)/(r3.Norm(a)+r3.Norm(b)))
	}
	return worst
}

// work returns the integral of p of the first over the field of the second.
func (l *lab) work(of, in *bound.Charge) (w float64) {
	for _, v := range of.Volumes {
		v.Cell.Nodes(14, func(x r3.Vec, dv float64) { w += dv * r3.Dot(of.Polarization(pair.VecOf(x)), l.g(in, x)) })
	}
	return w
}
