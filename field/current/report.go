package current

import (
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// Layer is what one face carries.
type Layer struct {
	Face    geom.Face // in the outer frame
	Area    float64
	Current r3.Vec  // integral of m x n: current times length
	Density r3.Vec  // m x n where it is the same all over the face
	Uniform bool    // it is
	Largest float64 // greatest |m x n| at the points of a quadrature rule
}

// Volume is what one cell carries.
type Volume struct {
	Cell    geom.Cell // in the outer frame
	Size    float64
	Current r3.Vec  // integral of curl m: current times length
	Largest float64 // greatest |curl m| at the points of a quadrature rule
}

// ledger gathers the sums over faces and cells in the outer frame.
type ledger struct {
	total, totalSize   r3.Vec // int j
	moment, momentSize r3.Vec // half int r x j
	wanted             r3.Vec // int m
}

func (l *ledger) add(x, j r3.Vec, w float64) {
	j = r3.Scale(w, j)
	t := r3.Scale(0.5, r3.Cross(x, j))
	l.total, l.moment = r3.Add(l.total, j), r3.Add(l.moment, t)
	l.totalSize = r3.Add(l.totalSize, absolute(j))
	l.momentSize = r3.Add(l.momentSize, r3.Vec{
		X: 0.5 * (math.Abs(x.Y*j.Z) + math.Abs(x.Z*j.Y)),
		Y: 0.5 * (math.Abs(x.Z*j.X) + math.Abs(x.X*j.Z)),
		Z: 0.5 * (math.Abs(x.X*j.Y) + math.Abs(x.Y*j.X)),
	})
}

func absolute(v r3.Vec) r3.Vec { return r3.Vec{X: math.Abs(v.X), Y: math.Abs(v.Y), Z: math.Abs(v.Z)} }

// fill reports layers, volumes and what must vanish. The sums are taken in the body's own frame, where they cancel best.
func (b *Bound) fill() error {
	local := b.body
	if at, ok := b.body.(geom.Placed); ok {
		local = at.Body
	}
	n := 20
	_, uniform := b.m.(field.Uniform)
	if a, ok := b.m.(field.Affine); ok {
		n, uniform = 6, a.Gradient == [3][3]float64{}
	} else if uniform {
		n = 6
	}
	var sums, coarse ledger
	outer, cells := b.body.Faces(), b.body.Cells()
	for i, f := range local.Faces() {
		l := Layer{Face: outer[i], Area: f.Surface.Area(), Uniform: uniform}
		first := true
		f.Surface.Nodes(n, func(x, normal r3.Vec, w float64) {
			k := r3.Cross(b.m.At(x), r3.Scale(f.Sign(), normal))
			sums.add(x, k, w)
			l.Current = r3.Add(l.Current, r3.Scale(w, k))
			l.Largest = max(l.Largest, r3.Norm(k))
			if first {
				l.Density, first = k, false
			}
			l.Uniform = l.Uniform && k == l.Density
		})
		f.Surface.Nodes(n*3/5, func(x, normal r3.Vec, w float64) {
			coarse.add(x, r3.Cross(b.m.At(x), r3.Scale(f.Sign(), normal)), w)
		})
		if !l.Uniform {
			l.Density = r3.Vec{}
		} else {
			l.Current = r3.Scale(l.Area, l.Density)
		}
		l.Current, l.Density = b.pose.VectorToOuter(l.Current), b.pose.VectorToOuter(l.Density)
		b.Layers = append(b.Layers, l)
	}
	for i, c := range local.Cells() {
		v := Volume{Cell: cells[i], Size: c.Volume()}
		c.Nodes(n, func(x r3.Vec, w float64) {
			j := curl(b.axes, x)
			sums.add(x, j, w)
			sums.wanted = r3.Add(sums.wanted, r3.Scale(w, b.m.At(x)))
			v.Current = r3.Add(v.Current, r3.Scale(w, j))
			v.Largest = max(v.Largest, r3.Norm(j))
		})
		c.Nodes(n*3/5, func(x r3.Vec, w float64) {
			coarse.add(x, curl(b.axes, x), w)
			coarse.wanted = r3.Add(coarse.wanted, r3.Scale(w, b.m.At(x)))
		})
		v.Current = b.pose.VectorToOuter(v.Current)
		b.Volumes = append(b.Volumes, v)
	}
	b.Moment = b.pose.VectorToOuter(sums.wanted)
	b.Identities = sums.identities(&coarse)
	for _, id := range b.Identities {
		if !id.Holds() {
			return fmt.Errorf("current: %s does not hold: %.17g against %.17g; the faces of the body do not belong to its cells, or m is "+
				"not smooth inside", id.Law, id.Left, id.Right)
		}
	}
	return nil
}

// identities states the two laws, with what a coarser rule differs by added to the tolerance.
func (l *ledger) identities(coarse *ledger) []bound.Identity {
	const slack = 1e-12 // as for charges: quadrature nodes and weights carry about 1e-15, thin bodies cancel
	closed := bound.Identity{Law: "the currents of a body sum to zero", Left: r3.Norm(l.total), Miss: r3.Norm(l.total),
		Scale: r3.Norm(l.totalSize)}
	closed.Tolerance = slack*closed.Scale + 10*r3.Norm(r3.Sub(l.total, coarse.total))
	moment := bound.Identity{Law: "half the integral of r x j is the integral of m", Left: r3.Norm(l.moment), Right: r3.Norm(l.wanted),
		Miss: r3.Norm(r3.Sub(l.moment, l.wanted)), Scale: r3.Norm(l.momentSize)}
	moment.Tolerance = slack*moment.Scale + 10*r3.Norm(r3.Sub(r3.Sub(l.moment, l.wanted), r3.Sub(coarse.moment, coarse.wanted)))
	return []bound.Identity{closed, moment}
}
