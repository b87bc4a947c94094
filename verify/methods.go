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

// independentMethods compares the library with other ways to the same field.
func independentMethods() []trial {
	var all []trial
	for _, s := range samples() {
		all = append(all, trial{
			"dipole sum, " + s.name, Independent, plain("Gauss sum of point dipoles"),
			"g at (3, -2, 2.5) against p dV in 16^3 points a cell",
			relative(1e-11, "rule beyond 3 radii: 3^-32; accuracy contract; cells of an L overlap with both signs"),
			func(l *lab) result {
				x := r3.Vec{X: 3, Y: -2, Z: 2.5}
				return l.fieldAt(s.build(l, geom.Pose{}), x, dipoleSum(s, x))
			},
		})
	}
	for _, c := range []struct {
		name string
		body geom.Body
		x    r3.Vec
	}{
		{"box, inside", geom.Box{Size: r3.Vec{X: 2, Y: 1.5, Z: 1}}, r3.Vec{X: 0.125, Y: -0.125, Z: 0.0625}},
		{"box, outside", geom.Box{Size: r3.Vec{X: 2, Y: 1.5, Z: 1}}, r3.Vec{X: 1, Y: 1.5, Z: 1}},
		{"cylinder, inside", geom.Cylinder{Radius: 1, Height: 2}, r3.Vec{X: 0.125, Y: -0.125, Z: 0.25}},
		{"cylinder, outside", geom.Cylinder{Radius: 1, Height: 2}, r3.Vec{X: 1, Y: 1.5, Z: 1}},
		{"tube, bore", geom.Tube{Inner: 1, Outer: 2, Height: 2}, r3.Vec{X: 0.125, Y: -0.125, Z: 0.25}},
		{"sphere, inside", geom.Sphere{Radius: 1}, r3.Vec{X: 0.125, Y: -0.125, Z: 0.25}},
	} {
		all = append(all, trial{
			"currents, " + c.name, Independent, plain("Biot-Savart sum of the bound currents"),
			"g + p against K = p x n on the faces, 96 Gauss points a direction",
			relative(1e-11, "rule: converged, measured below 1e-12; accuracy contract"), func(l *lab) result {
				p := sheared.Value
				got := l.g(l.uniform(c.body, p), c.x)
				if c.name[len(c.name)-6:] == "inside" {
					got = r3.Add(got, p)
				}
				return vector(currentSum(c.body, p, c.x), got)
			},
		})
	}
	all = append(all, decompositions()...)
	for _, n := range []int{16, 32} {
		miss := func(l *lab, n int) float64 {
			x := r3.Vec{X: 0.5, Y: 1.5, Z: 1}
			a := l.g(l.uniform(geom.Prism{Base: ngon(n), Height: 2}, sheared.Value), x)
			return r3.Norm(r3.Sub(a, l.bare(l.uniform(geom.Cylinder{Radius: 1, Height: 2}, sheared.Value), x)))
		}
		all = append(all, trial{
			fmt.Sprintf("many-sided prism, %d to %d sides", n, 2*n), Independent, plain("theory: order 2"),
			"log2 of the ratio of what prisms differ from the cylinder",
			within(10/float64(n*n), "next term: of the order 1/n^2"),
			func(l *lab) result { return number(2, math.Log2(miss(l, n)/miss(l, 2*n))) },
		})
	}
	for _, s := range samples() {
		all = append(all, trial{
			"expansion, " + s.name, Independent, plain("multipoles up to order 24"),
			"g at (3, 0, 4) from the moments of the dipole density",
			relative(1e-11, "(1.6/5)^25 = 4e-13; accuracy contract"),
			func(l *lab) result {
				c, x := s.build(l, geom.Pose{}), r3.Vec{X: 3, Y: 0, Z: 4}
				if l.err != nil {
					return result{}
				}
				return l.fieldAt(c, x, l.bare(c.Expand(r3.Vec{}, 24), x))
			},
		}, trial{
			"gradient, " + s.name, Independent, plain("differences of the field, order 6"),
			"grad g against six points at +-h, 2h, 3h, h = 1/64",
			relative(1e-9, "rule: of the order (3h/d)^6 with d = 1.5; u/h"), func(l *lab) result {
				c, x := s.build(l, geom.Pose{}), r3.Vec{X: 2, Y: -1.5, Z: 1.75}
				return matrix(l.differences(c, x, 1.0/64), l.evaluate(c, x, field.Mean, field.WantGrad).Grad)
			},
		})
	}
	return all
}

// dipoleSum returns the field of point dipoles p dV.
func dipoleSum(s sample, x r3.Vec) (g r3.Vec) {
	for _, cell := range s.body.Cells() {
		cell.Nodes(16, func(r r3.Vec, w float64) { g = r3.Add(g, cf.DipoleField(r3.Scale(w, s.p.At(r)), r3.Sub(x, r))) })
	}
	return g
}

// currentSum returns (1/4pi) int K x (x-r)/|x-r|^3 dA with K = p x n.
func currentSum(body geom.Body, p, x r3.Vec) (b r3.Vec) {
	for _, f := range body.Faces() {
		f.Surface.Nodes(96, func(r, n r3.Vec, w float64) {
			k := r3.Scale(f.Sign()*w, r3.Cross(p, n))
			b = r3.Add(b, r3.Cross(k, cf.PointField(1, r3.Sub(x, r))))
		})
	}
	return b
}

// differences returns the gradient of g by central differences of order 6, of the source that is not altered.
func (l *lab) differences(src field.Source, x r3.Vec, h float64) (m [3][3]float64) {
	for j := range 3 {
		var d r3.Vec
		for k, w := range []float64{45, -9, 1} {
			step := r3.Scale(float64(k+1)*h, unit(j))
			d = r3.Add(d, r3.Scale(w/(60*h), r3.Sub(l.bare(src, r3.Add(x, step)), l.bare(src, r3.Sub(x, step)))))
		}
		m[0][j], m[1][j], m[2][j] = d.X, d.Y, d.Z
	}
	return m
}

// ngon is a regular polygon of n sides in the unit circle.
func ngon(n int) [][2]float64 {
	base := make([][2]float64, n)
	for k := range base {
		s, c := math.Sincos(2 * math.Pi * float64(k) / float64(n))
		base[k] = [2]float64{c, s}
	}
	return base
}

// decompositions compares a body with others that add up to it. The parts are not altered.
func decompositions() []trial {
	p := sheared.Value
	claim := limit{3e-12, 1e-3, "accuracy contract of the whole and of its parts"}
	var all []trial
	add := func(name, source string, whole func(l *lab) field.Source, parts func(l *lab) field.Source) {
		for i, x := range around[:6] {
			all = append(all, trial{
				fmt.Sprintf("%s, point %d", name, i+1), Independent, plain(source),
				fmt.Sprintf("g at (%g, %g, %g)", x.X, x.Y, x.Z),
				claim,
				func(l *lab) result { return l.fieldAt(whole(l), x, l.bare(parts(l), x)) },
			})
		}
	}
	box := geom.Box{Size: r3.Vec{X: 2, Y: 1.5, Z: 1}}
	boxOf := func(l *lab) field.Source { return l.uniform(box, p) }
	add("box, its six sheets", "six charged rectangles", boxOf, func(*lab) field.Source {
		sum := field.Sum{}
		for _, f := range box.Faces() {
			sheet := f.Surface.(geom.Polygon) // the faces of a box are rectangles
			sum = append(sum, polygonSheet(sheet, r3.Dot(p, sheet.Normal().Value())*f.Sign()))
		}
		return sum
	})
	add("tube, two cylinders", "cylinder less cylinder", func(l *lab) field.Source {
		return l.uniform(geom.Tube{Inner: 0.5, Outer: 1, Height: 1.5}, p)
	}, func(l *lab) field.Source {
		return field.Sum{l.uniform(geom.Cylinder{Radius: 1, Height: 1.5}, p), l.uniform(geom.Cylinder{Radius: 0.5, Height: 1.5}, r3.Scale(-1, p))}
	})
	add("ellipsoid, a sphere", "sphere", func(l *lab) field.Source {
		return l.uniform(geom.Ellipsoid{SemiAxes: r3.Vec{X: 1, Y: 1, Z: 1}}, p)
	}, func(l *lab) field.Source { return l.uniform(geom.Sphere{Radius: 1}, p) })
	half := func(l *lab, p field.Affine, z float64) *bound.Charge {
		p.Value = p.At(r3.Vec{Z: z}) // in the frame of the half
		return l.charge(geom.At(geom.Box{Size: r3.Vec{X: 2, Y: 1.5, Z: 0.5}}, geom.Translate(r3.Vec{Z: z})), p)
	}
	add("split box, affine", "two halves", func(l *lab) field.Source { return l.charge(box, sheared) }, func(l *lab) field.Source {
		return field.Sum{half(l, sheared, 0.25), half(l, sheared, -0.25)}
	})
	add("split cylinder", "two halves", func(l *lab) field.Source { return l.uniform(geom.Cylinder{Radius: 1, Height: 1.5}, p) }, func(l *lab) field.Source {
		part := geom.Cylinder{Radius: 1, Height: 0.75}
		return field.Sum{l.uniform(geom.At(part, geom.Translate(r3.Vec{Z: 0.375})), p), l.uniform(geom.At(part, geom.Translate(r3.Vec{Z: -0.375})), p)}
	})
	return all
}
