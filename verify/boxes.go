package verify

import (
	"fmt"

	"example.com/boundpole/field"
	cf "example.com/boundpole/field/closedform"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// boxes checks the box 2 x 3 x 4 and the cube.
func boxes() []trial {
	size := r3.Vec{X: 2, Y: 3, Z: 4}
	kellogg := published("Kellogg1929", "solid angle of a rectangle")
	var all []trial
	for _, d := range []float64{0.125, 1, 8, 100} {
		all = append(all, trial{
			fmt.Sprintf("axis d=%g", d), ClosedForm, kellogg, "box 2 x 3 x 4, p = 1 along z, d above its face",
			limit{2e-12, 1e-3 * min(1, 20/(d*d*d)), "accuracy contract 1e-12; the closed form loses z/L"},
			func(l *lab) result {
				return l.axisAt(l.uniform(geom.Box{Size: size}, r3.Vec{Z: 1}), 2+d, cf.BoxAxisInduction(1, 2, 3, 4, d))
			},
		})
	}
	centre := func(name string, size r3.Vec) trial {
		return trial{name, ClosedForm, kellogg, fmt.Sprintf("-g_z/p at the centre of %g x %g x %g", size.X, size.Y, size.Z),
			contract(1),
			func(l *lab) result {
				return number(cf.BoxCentreFactor(size), -l.g(l.uniform(geom.Box{Size: size}, r3.Vec{Z: 1}), r3.Vec{}).Z)
			}}
	}
	all = append(all,
		centre("centre 2x3x4", size),
		centre("centre of a plate 100x100x1", r3.Vec{X: 100, Y: 100, Z: 1}),
		centre("centre of a bar 1x1x50", r3.Vec{X: 1, Y: 1, Z: 50}),
		trial{"cube-centre-N", PublishedTable, plain("symmetry: 1/3"), "-g_z/p at the centre of a cube", contract(1),
			func(l *lab) result {
				return number(recomputed("cube-centre-N", ""), -l.g(l.uniform(geom.Box{Size: r3.Vec{X: 1, Y: 1, Z: 1}}, r3.Vec{Z: 1}), r3.Vec{}).Z)
			}},
		trial{"trace of N at the centre", Law, plain("N_x + N_y + N_z = 1 inside"), "box 2 x 3 x 4",
			within(3e-12, "accuracy contract, three times"),
			func(l *lab) result {
				var sum float64
				for _, e := range []r3.Vec{{X: 1}, {Y: 1}, {Z: 1}} {
					sum -= r3.Dot(e, l.g(l.uniform(geom.Box{Size: size}, e), r3.Vec{X: 0.25, Y: -0.5, Z: 1.5}))
				}
				return number(1, sum)
			}},
		trial{"trace of N outside", Law, plain("N_x + N_y + N_z = 0 outside"), "box 2 x 3 x 4",
			within(3e-12, "accuracy contract, three times"),
			func(l *lab) result {
				var sum float64
				for _, e := range []r3.Vec{{X: 1}, {Y: 1}, {Z: 1}} {
					sum -= r3.Dot(e, l.g(l.uniform(geom.Box{Size: size}, e), r3.Vec{X: 1.25, Y: -0.5, Z: 1.5}))
				}
				return number(0, sum)
			}},
	)
	for _, c := range []struct {
		name string
		x    r3.Vec
		want float64
	}{
		{"filled cube, phi at the centre", r3.Vec{}, cf.CubeCentrePotential(1, 1)},
		{"filled cube, phi at a corner", r3.Vec{X: 0.5, Y: -0.5, Z: 0.5}, cf.CubeCornerPotential(1, 1)},
	} {
		all = append(all, trial{c.name, ClosedForm, published("Hummer1996", ""),
			"unit cube, rho = 1: p = -r/3 with sheets that cancel its faces",
			relative(3e-12, "accuracy contract of body and six sheets"),
			func(l *lab) result { return l.phiAt(filledCube(l), c.x, c.want) }})
	}
	box := r3.Vec{X: 1, Y: 2, Z: 3}
	return append(all, trial{"filled box, phi at the centre", ClosedForm, published("Kellogg1929", ""),
		"box 1 x 2 x 3, rho = 1, made the same way",
		relative(3e-12, "accuracy contract of body and six sheets"), func(l *lab) result {
			return l.phiAt(filledBox(l, box), r3.Vec{}, cf.BoxCentrePotential(1, box))
		}})
}

// filledCube is a unit cube with rho = 1.
func filledCube(l *lab) field.Source { return filledBox(l, r3.Vec{X: 1, Y: 1, Z: 1}) }

// filledBox is a box with rho = 1: p = -r/3 has div p = -1, and its faces carry -size/6, which six sheets cancel.
func filledBox(l *lab, size r3.Vec) field.Source {
	p := field.Affine{}
	for i := range 3 {
		p.Gradient[i][i] = -1.0 / 3
	}
	body := geom.Box{Size: size}
	sum := field.Sum{l.charge(body, p)}
	for _, f := range body.Faces() {
		sheet := f.Surface.(geom.Polygon) // the faces of a box are rectangles
		v := sheet.Centroid()
		sum = append(sum, polygonSheet(sheet, r3.Norm(v)/3))
	}
	return sum
}
