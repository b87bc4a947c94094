package verify

import (
	"fmt"
	"math"
	"math/cmplx"

	cf "example.com/boundpole/field/closedform"
	"example.com/boundpole/field/cubature"
	"gonum.org/v1/gonum/spatial/r3"
)

// rate is an observed order of convergence: of two rules, the second finer by the factor that theory raises to the order.
type rate struct {
	name, inputs string
	order, band  float64 // what theory says, and how far the observed order may be from it, relative
	why          string
	coarse, fine func() float64 // errors
	factor       float64        // order = log(coarse/fine)/log(factor)
}

// rates compares the observed orders of the rules with theory: geometric with the nearest singularity for Gauss rules of n
// points, 2n for panels of n points where the integrand is smooth, and the power of the singularity where it is not.
func rates() []trial {
	all := append(append(smoothRates(), mappedRates()...), singularRates()...)
	var trials []trial
	for _, r := range all {
		trials = append(trials, trial{
			"order, " + r.name, Independent, plain("theory of Gauss rules, " + r.why), r.inputs,
			relative(r.band, "next term of the asymptotic error"),
			func(*lab) result { return number(r.order, math.Log(r.coarse()/r.fine())/math.Log(r.factor)) },
		})
	}
	return append(trials, trial{
		"tanh-sinh, edge-singular disc", ClosedForm, published("Takahasi1974", ""), "sigma = 1/sqrt(1 - r^2), z = 0.5: phi on the axis",
		relative(1e-13, "accuracy of cubature.TanhSinh, 1e-14, and what the denominator rounds"),
		func(l *lab) result {
			v, _, err := cubature.TanhSinh(func(r, rest float64) float64 {
				return r / math.Sqrt(rest*(1+r)) / math.Hypot(r, 0.5)
			}, 1, 0)
			l.note(err)
			return number(math.Atan(2), v)
		},
	})
}

// panels is the composite Gauss rule of n points on each of m equal panels of [a, b].
func panels(n, m int, a, b float64, visit func(x, w float64)) {
	rule := cubature.Legendre(n)
	h := (b - a) / float64(m)
	for k := range m {
		for i, t := range rule.X {
			visit(a+h*(float64(k)+(1+t)/2), h/2*rule.W[i])
		}
	}
}

// line integrates f over [a, b].
func line(n, m int, a, b float64, f func(x float64) float64) (sum float64) {
	panels(n, m, a, b, func(x, w float64) { sum += w * f(x) })
	return sum
}

// ellipse returns the sum of the half axes of the ellipse with foci -1, 1 through z: the Gauss rule of n points errs as its
// power -2n where z is the nearest singularity.
func ellipse(z complex128) float64 {
	r := cmplx.Abs(z + cmplx.Sqrt(z*z-1))
	return max(r, 1/r)
}

// squareMiss returns the error of the potential over the centre of the square |x|, |y| <= 1 at the height h by product rules.
func squareMiss(n, m int, h float64) float64 {
	sum := line(n, m, -1, 1, func(x float64) float64 {
		return line(n, m, -1, 1, func(y float64) float64 { return 1 / math.Sqrt(x*x+y*y+h*h) })
	})
	return math.Abs(sum/(4*math.Pi) - cf.RectangleAxisPotential(1, 2, 2, h))
}

// geometric is the factor by which the error of a Gauss rule falls from n to m points, with the nearest singularity at z, like
// (x - z)^power (logarithm: 0): the power m - n of the squared half axes, and n^(-power-1) that goes with it.
func geometric(z complex128, power float64, n, m int) float64 {
	return math.Pow(ellipse(z), float64(2*(m-n))) * math.Pow(float64(m)/float64(n), power+1)
}

// smoothRates are those of integrands without a singularity on the panel.
func smoothRates() []rate {
	var all []rate
	for _, c := range []struct {
		h    float64
		n, m int
	}{{1, 4, 12}, {0.25, 8, 32}} {
		all = append(all, rate{
			fmt.Sprintf("square at the height %g", c.h), fmt.Sprintf("%d and %d points a direction, against theory", c.n, c.m),
			1, 0.04, "half axes of the ellipse through i h, logarithm, [Trefethen2013] theorem 19.3",
			func() float64 { return squareMiss(c.n, 1, c.h) }, func() float64 { return squareMiss(c.m, 1, c.h) },
			geometric(complex(0, c.h), 0, c.n, c.m),
		})
	}
	const z = 0.5
	axis := func(n, m int) float64 {
		sum := line(n, m, 0, 1, func(r float64) float64 { return r / math.Hypot(r, z) }) / 2
		return math.Abs(sum - cf.DiscAxisPotential(1, 1, z))
	}
	for n := 1; n <= 4; n++ {
		all = append(all, rate{
			fmt.Sprintf("disc in panels of %d points", n), "z = 0.5, 8 and 16 panels along the radius", float64(2 * n), 0.03,
			"order 2n of panels", func() float64 { return axis(n, 8) }, func() float64 { return axis(n, 16) }, 2,
		})
	}
	cube := func(n, m int) float64 { // seen from (3, 0, 0)
		return line(n, m, -1, 1, func(x float64) float64 {
			return line(n, m, -1, 1, func(y float64) float64 {
				return line(n, m, -1, 1, func(z float64) float64 { return 1 / r3.Norm(r3.Vec{X: 3 - x, Y: y, Z: z}) })
			})
		})
	}
	missed := func(m int) float64 { return math.Abs(cube(2, m) - cube(24, 1)) } // 24 points: exact to rounding, 4.2^-48
	return append(all, rate{
		"filled cube seen from outside", "2 points a direction on 4 and 8 panels", 4, 0.04, "order 2n of panels",
		func() float64 { return missed(4) }, func() float64 { return missed(8) }, 2,
	})
}

// mappedRates are those of maps that move the singularity away.
func mappedRates() []rate {
	const h = 0.01
	top := math.Asinh(1 / h)
	mapped := func(n int) float64 { // x = h sinh u, y = h sinh v
		sum := line(n, 1, -top, top, func(u float64) float64 {
			return line(n, 1, -top, top, func(v float64) float64 {
				x, y := h*math.Sinh(u), h*math.Sinh(v)
				return h * h * math.Cosh(u) * math.Cosh(v) / math.Sqrt(x*x+y*y+h*h)
			})
		})
		return math.Abs(sum/(4*math.Pi) - cf.RectangleAxisPotential(1, 2, 2, h))
	}
	centre := func(n int) float64 { // four triangles about the centre, y = x v
		sum := 4 * line(n, 1, -1, 1, func(v float64) float64 { return 1 / math.Sqrt(1+v*v) })
		return math.Abs(sum/(4*math.Pi) - cf.SquareCentrePotential(1, 2))
	}
	return []rate{
		{"square at the height 0.01, sinh map", "16 and 40 points a direction, against theory", 1, 0.04,
			"ellipse through (i pi/2)/asinh(1/h), logarithm times the zero of cosh, [Johnston2005]",
			func() float64 { return mapped(16) }, func() float64 { return mapped(40) },
			geometric(complex(0, math.Pi/2/top), 1, 16, 40)},
		{"square at its centre, polar coordinates", "3 and 12 points across a triangle, against theory", 1, 0.04,
			"ellipse through i, inverse square root, [Duffy1982]",
			func() float64 { return centre(3) }, func() float64 { return centre(12) }, geometric(1i, -0.5, 3, 12)},
	}
}

// singularRates are those of integrands with a singularity on the panel, where the rules lose their order.
func singularRates() []rate {
	const z = 0.5
	edge := func(power float64) func(n, m int) float64 { // sigma = (1 - r^2)^power, potential on the axis
		want := math.Atan(1/z) / 2
		if power > 0 {
			want = ((1+z*z)*math.Atan(1/z) - z) / 4
		}
		return func(n, m int) float64 {
			return math.Abs(line(n, m, 0, 1, func(r float64) float64 {
				return math.Pow((1-r)*(1+r), power) * r / math.Hypot(r, z)
			})/2 - want)
		}
	}
	var all []rate
	for _, power := range []float64{-0.5, 0.5} {
		e := edge(power)
		all = append(all,
			rate{fmt.Sprintf("disc with an edge of power %g, panels", power), "z = 0.5, 3 points on 16 and 32 panels", 1 + power, 0.03,
				"1 + power of panels", func() float64 { return e(3, 16) }, func() float64 { return e(3, 32) }, 2},
			rate{fmt.Sprintf("disc with an edge of power %g, points", power), "z = 0.5, 24 and 48 points", 2 + 2*power, 0.05,
				"2 + 2 power of points, [Davis1984] section 4.8", func() float64 { return e(24, 1) }, func() float64 { return e(48, 1) }, 2},
		)
	}
	centre := func(m int) float64 { return squareMiss(3, m, 0) }
	solid := func(m int) float64 {
		sum := line(3, m, -0.5, 0.5, func(x float64) float64 {
			return line(3, m, -0.5, 0.5, func(y float64) float64 {
				return line(3, m, -0.5, 0.5, func(z float64) float64 { return 1 / r3.Norm(r3.Vec{X: x, Y: y, Z: z}) })
			})
		})
		return math.Abs(sum/(4*math.Pi) - cf.CubeCentrePotential(1, 1))
	}
	return append(all,
		rate{"square at its centre, panels", "3 points a direction on 16 and 32 panels", 1, 0.03,
			"2 - 1 where 1/R stands at a corner of panels", func() float64 { return centre(16) }, func() float64 { return centre(32) }, 2},
		rate{"filled cube at its centre, panels", "3 points a direction on 4 and 8 panels", 2, 0.03,
			"3 - 1 where 1/R stands at a corner of panels", func() float64 { return solid(4) }, func() float64 { return solid(8) }, 2},
	)
}
