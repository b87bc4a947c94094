package handover

import (
	"fmt"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/cubature"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// filling is the charge of a cell in the frame and unit of the assembly.
type filling struct {
	cell    geom.Cell
	uniform bool
	charge  float64
	density func(x r3.Vec) float64
}

// fillingOf returns the charge of one cell of a body. A density that varies is differenced from the polarization, to about
// 1e-11 of it; the charge of the cell as a whole is the exact one.
func fillingOf(c *bound.Charge, v bound.Volume) filling {
	f := filling{cell: v.Cell, uniform: v.Min == v.Max, charge: v.Charge}
	if f.uniform {
		f.density = func(r3.Vec) float64 { return v.Min }
		return f
	}
	var area float64
	for _, l := range c.Layers {
		area += l.Area
	}
	thickness := 2 * c.Body().Volume() / area // of a plate; of other bodies about a third of the size
	p := field.Func{Size: thickness, P: func(x r3.Vec) [3]float64 {
		v := c.Polarization(pair.VecOf(x))
		return [3]float64{v.X, v.Y, v.Z}
	}}
	f.density = func(x r3.Vec) float64 { return -p.Divergence(x) }
	return f
}

// addFilling adds the group of a charged cell: its points and its hexahedra.
func (b *builder) addFilling(g Group, f filling) error {
	g.Charge = b.charge(f.charge)
	var l lumps
	f.cell.Nodes(b.points, func(x r3.Vec, w float64) { l.add(x, w, w*f.density(x)) })
	l.settle(f.charge)
	g.Points = b.lumped(&l)
	blocked, ok := f.cell.(geom.Blocked)
	if !ok || len(blocked.Blocks()) == 0 {
		return fmt.Errorf("handover: %s of %s has no blocks; use a cell that is Blocked", g.Place, g.Part)
	}
	var pieces lumps
	for _, k := range blocked.Blocks() {
		m := b.pieces
		if f.uniform && straightBlock(k) {
			m = 1
		}
		for n := range m * m * m {
			f.cut(k, [3]int{n % m, n / m % m, n / (m * m)}, m, &g, &pieces)
		}
	}
	pieces.settle(f.charge)
	for k := range g.Cells {
		c := &g.Cells[k]
		for i, x := range c.Corners {
			c.Corners[i] = b.length(x)
		}
		c.Charge = b.charge(pieces.q[k])
		size := volume(&c.Corners)
		if size < 0 { // a left-handed block: its charge counts as negative
			x := &c.Corners
			x[0], x[1], x[2], x[3], x[4], x[5], x[6], x[7] = x[4], x[5], x[6], x[7], x[0], x[1], x[2], x[3]
			size = volume(x)
		}
		c.Rho = c.Charge / size
	}
	b.set.Groups = append(b.set.Groups, g)
	return nil
}

// cube holds the parameters of the corners of a cell, in their order.
var cube = [8][3]float64{{0, 0, 0}, {1, 0, 0}, {1, 1, 0}, {0, 1, 0}, {0, 0, 1}, {1, 0, 1}, {1, 1, 1}, {0, 1, 1}}

// cut adds the piece of a block that has the index at among m in each direction.
func (f *filling) cut(k geom.Block, at [3]int, m int, g *Group, pieces *lumps) {
	step := 1 / float64(m)
	parameter := func(i int, t float64) float64 { return (float64(at[i]) + t) * step }
	var c Cell
	for i, t := range cube {
		c.Corners[i], _, _, _ = k.At(parameter(0, t[0]), parameter(1, t[1]), parameter(2, t[2]))
	}
	rule := cubature.Legendre(fine)
	var q, w pair.Float
	for i, a := range rule.X {
		for j, b := range rule.X {
			for l, e := range rule.X {
				x, xu, xv, xw := k.At(parameter(0, (1+a)/2), parameter(1, (1+b)/2), parameter(2, (1+e)/2))
				size := rule.W[i] * rule.W[j] * rule.W[l] / 8 * step * step * step * r3.Dot(r3.Cross(xu, xv), xw)
				w = w.AddFloat(size)
				q = q.AddFloat(size * f.density(x))
			}
		}
	}
	g.Cells = append(g.Cells, c)
	pieces.add(c.Corners[0], w.Value(), q.Value())
}

// straightBlock reports whether a block is drawn trilinearly between its corners: then it is a cell itself.
func straightBlock(k geom.Block) bool {
	var x [8]r3.Vec
	for i, t := range cube {
		x[i], _, _, _ = k.At(t[0], t[1], t[2])
	}
	size := 0.0
	for i := range x {
		size = larger(size, r3.Norm(r3.Sub(x[i], x[0])))
	}
	for _, t := range [...][3]float64{{0.5, 0.5, 0.5}, {0.25, 0.625, 0.375}, {0.5, 0, 0}, {1, 0.5, 0}, {0, 0, 0.5}, {0.5, 0, 1}, {1, 0.5, 1}} {
		got, _, _, _ := k.At(t[0], t[1], t[2])
		want, _, _, _ := trilinear(&x, t)
		if r3.Norm(r3.Sub(got, want)) > flatness*size {
			return false
		}
	}
	return true
}
