package verify

import (
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	cf "example.com/boundpole/field/closedform"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// tilts of the end face from the square cut, in degrees.
var tilts = []float64{0, 5, 15, 25, 30, 40, 45, 55, 65, 75}

const barMoment = 3 // p along the bar

// cutBar returns a bar along z whose ends lean by a tilt, the top towards the given direction, the bottom the other way.
func cutBar(l *lab, base [][2]float64, length, tilt, towards float64) *bound.Charge {
	slope := math.Tan(tilt * math.Pi / 180)
	top := [2]float64{slope * math.Cos(towards), slope * math.Sin(towards)}
	bar := geom.Prism{Base: base, Height: length, TopSlope: top, BottomSlope: [2]float64{-top[0], -top[1]}}
	return l.uniform(bar, r3.Vec{Z: barMoment})
}

var (
	square   = [][2]float64{{-1, -0.5}, {1, -0.5}, {1, 0.5}, {-1, 0.5}} // area 2
	triangle = [][2]float64{{-1, -1}, {2, 0}, {-0.5, 1}}
)

const cutLength = 16

// slantedBar checks density and pole strength of slanted ends.
func slantedBar() []trial {
	tube := published("Griffiths2013", "sec. 4.2.1, obliquely cut tube")
	const rounding = "u of the slope tan(tilt) and of sums over four vertices"
	var all []trial
	for _, tilt := range tilts {
		density, _, charge := cf.SlantedEnd(barMoment, 2, tilt*math.Pi/180)
		all = append(all, trial{
			fmt.Sprintf("sigma tilt=%g deg", tilt), ClosedForm, tube,
			"density of the upper end of a bar of section 2 x 1, M = 3 along it", relative(1e-14, rounding),
			func(l *lab) result {
				top := l.layer(cutBar(l, square, cutLength, tilt, 0), 1)
				r := number(density, top.Max)
				r.miss = max(r.miss, math.Abs(top.Min-density))
				return r
			},
		}, trial{
			fmt.Sprintf("pole strength tilt=%g deg", tilt), ClosedForm, tube,
			"charge of the upper end of the same bar: M A", relative(1e-14, rounding),
			func(l *lab) result { return number(charge, l.layer(cutBar(l, square, cutLength, tilt, 0), 1).Charge) },
		})
	}
	for _, tilt := range []float64{15, 45, 65} {
		all = append(all, trial{
			fmt.Sprintf("other section, tilt=%g deg", tilt), Identity, plain("sigma depends on the tilt alone"),
			"density of a triangular bar twice as long, leaning to another side, against the bar above", relative(1e-14, rounding),
			func(l *lab) result {
				a := l.layer(cutBar(l, square, cutLength, tilt, 0), 1)
				return number(a.Max, l.layer(cutBar(l, triangle, 2*cutLength, tilt, 2), 1).Max)
			},
		})
	}
	for _, tilt := range []float64{0, 30, 60} {
		all = append(all, trial{
			fmt.Sprintf("flux round the end, tilt=%g deg", tilt), Law, plain("Gauss's law"),
			"flux of g through a sphere of radius 4 round the upper end, cut by the bar: M A whatever the tilt",
			relative(1e-10, "64 x 64 points on a sphere whose charge reaches to half its radius: (1/2)^64 and rounding"),
			func(l *lab) result {
				c := cutBar(l, square, cutLength, tilt, 0)
				flux := l.flux(c, r3.Vec{Z: cutLength / 2}, 4, 64)
				return number(2*barMoment, flux)
			},
		})
	}
	return append(all, trial{
		"sides carry nothing", Identity, plain("sigma = M.n with n across M"),
		"largest |sigma| on the four sides, tilt 40 degrees", within(0, "n is exactly across M"),
		func(l *lab) result {
			var most float64
			c := cutBar(l, square, cutLength, 40, 1)
			for i := range 4 {
				s := l.layer(c, 2+i)
				most = max(most, math.Abs(s.Min), math.Abs(s.Max))
			}
			return number(0, most)
		},
	})
}

// flux returns the flux of g out of a sphere, by the product rule of n by 2 n points.
func (l *lab) flux(src field.Source, centre r3.Vec, radius float64, n int) float64 {
	var sum float64
	geom.SphereSurface{Radius: radius}.Nodes(n, func(x, normal r3.Vec, w float64) {
		sum += w * r3.Dot(l.g(src, r3.Add(centre, x)), normal)
	})
	return sum
}
