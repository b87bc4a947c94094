package verify

import (
	"math"
	"sync"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

const everything = field.WantPhi | field.WantG | field.WantGrad | field.WantErr

// sameBits counts values that differ in a bit where none may.
func sameBits() []trial {
	claim := within(0, "the same operations in the same order")
	var all []trial
	for _, s := range samples() {
		add := func(what, source string, run func(l *lab, src field.Source) int) {
			all = append(all, trial{what + ", " + s.name, Identity, plain(source),
				"phi, g, gradient and estimates at 512 points in and round the body",
				claim,
				func(l *lab) result {
					return number(0, float64(run(l, s.build(l, tilted(l)))))
				}})
		}
		add("batch = single", "batch equals single points", func(l *lab, src field.Source) int {
			at := cloud()
			batch, single := l.batch(src, at), field.NewValues(at.Len(), everything)
			for i := range at.Len() {
				single.Set(i, l.batch(src, at.Slice(i, i+1)).At(0))
			}
			return different(batch, single)
		})
		add("1, 2, 7 workers", "any number of goroutines", func(l *lab, src field.Source) int {
			one := l.shared(src, 1)
			return different(one, l.shared(src, 2)) + different(one, l.shared(src, 7))
		})
		all = append(all, trial{"scale 2^20, " + s.name, Identity, plain("lengths times 2^k: the same bits"),
			"body and points 2^20 times as large: g and phi/2^20",
			claim,
			func(l *lab) result {
				return number(0, float64(scaleMiss(l, s, 0x1p20)))
			}})
	}
	return all
}

// cloud returns points in and round the samples, some of them on their planes of symmetry.
func cloud() *field.Points {
	return field.Grid(r3.Box{Min: r3.Vec{X: -1.75, Y: -1.75, Z: -1.75}, Max: r3.Vec{X: 1.75, Y: 1.75, Z: 1.75}}, 8, 8, 8)
}

func (l *lab) batch(src field.Source, at *field.Points) *field.Values {
	v := field.NewValues(at.Len(), everything)
	if l.err == nil {
		field.Evaluate(l.altered(src), v, at, field.Mean)
	}
	return v
}

// shared evaluates the cloud by several goroutines, each a piece of it.
func (l *lab) shared(src field.Source, workers int) *field.Values {
	at := cloud()
	n := at.Len()
	pieces := make([]*field.Values, workers)
	var all sync.WaitGroup
	for w := range workers {
		all.Go(func() { pieces[w] = l.batch(src, at.Slice(n*w/workers, n*(w+1)/workers)) })
	}
	all.Wait()
	v := field.NewValues(n, everything)
	for w, piece := range pieces {
		for i := range piece.Phi {
			v.Set(n*w/workers+i, piece.At(i))
		}
	}
	return v
}

// different counts the values that are not the same bits.
func different(a, b *field.Values) (n int) {
	arrays := func(v *field.Values) [][]float64 {
		return append([][]float64{v.Phi, v.GX, v.GY, v.GZ, v.ErrPhi, v.ErrG, v.ErrGrad}, v.Grad[:]...)
	}
	x, y := arrays(a), arrays(b)
	for k := range x {
		for i := range x[k] {
			if math.Float64bits(x[k][i]) != math.Float64bits(y[k][i]) {
				n++
			}
		}
	}
	for i := range a.Status {
		if a.Status[i] != b.Status[i] {
			n++
		}
	}
	return n
}

// scaleMiss counts values of phi and g that change with the unit of length.
func scaleMiss(l *lab, s sample, k float64) (n int) {
	p := s.p
	for i := range 9 {
		p.Gradient[i/3][i%3] /= k
	}
	small, large := s.build(l, geom.Pose{}), l.charge(scaled(s.body, k), p)
	for _, x := range around {
		a, b := l.at(small, x, field.Mean), l.at(large, r3.Scale(k, x), field.Mean)
		for _, pair := range [][2]float64{{a.Phi, b.Phi / k}, {a.G.X, b.G.X}, {a.G.Y, b.G.Y}, {a.G.Z, b.G.Z}} {
			if math.Float64bits(pair[0]) != math.Float64bits(pair[1]) {
				n++
			}
		}
	}
	return n
}

// scaled returns a sample's body with all lengths multiplied.
func scaled(body geom.Body, k float64) geom.Body {
	switch b := body.(type) {
	case geom.Box:
		return geom.Box{Size: r3.Scale(k, b.Size)}
	case geom.Polyhedron:
		v := make([]r3.Vec, len(b.Vertices))
		for i := range v {
			v[i] = r3.Scale(k, b.Vertices[i])
		}
		return geom.Polyhedron{Vertices: v, Loops: b.Loops}
	case geom.Prism:
		base := make([][2]float64, len(b.Base))
		for i := range base {
			base[i] = [2]float64{k * b.Base[i][0], k * b.Base[i][1]}
		}
		return geom.Prism{Base: base, Height: k * b.Height, BottomSlope: b.BottomSlope, TopSlope: b.TopSlope}
	case geom.Cylinder:
		return geom.Cylinder{Radius: k * b.Radius, Height: k * b.Height}
	case geom.Tube:
		return geom.Tube{Inner: k * b.Inner, Outer: k * b.Outer, Height: k * b.Height}
	case geom.Sphere:
		return geom.Sphere{Radius: k * b.Radius}
	case geom.HollowSphere:
		return geom.HollowSphere{Inner: k * b.Inner, Outer: k * b.Outer}
	case geom.Ellipsoid:
		return geom.Ellipsoid{SemiAxes: r3.Scale(k, b.SemiAxes)}
	}
	return body
}
