package geom

import (
	"fmt"
	"strconv"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Prism is a polygon in the plane z = 0 drawn out along z from -Height/2 to +Height/2, with ends that may slope: the
// bottom is the plane z = -Height/2 + a x + b y, the top z = +Height/2 + a x + b y. Faces: bottom top, then side 0,
// side 1 ... with side k over the edge from base point k to the next.
//
// The vertices are held in pairs, so slopes lose nothing to rounding.
type Prism struct {
	Base        [][2]float64 // simple polygon, in either sense
	Height      float64
	BottomSlope [2]float64 // a, b
	TopSlope    [2]float64 // a, b
}

// Check refuses a base that is not a simple polygon, a height that is not a positive length, and slopes that bring the
// ends together.
func (p Prism) Check() error {
	if len(p.Base) < 3 {
		return fmt.Errorf("geom: prism base has %d vertices; give at least 3", len(p.Base))
	}
	base := make([]r3.Vec, len(p.Base))
	for k, b := range p.Base {
		base[k] = flatVec(b)
	}
	if err := first(
		checkLength("prism height", p.Height),
		checkCoordinate("prism bottom slope a", p.BottomSlope[0]),
		checkCoordinate("prism bottom slope b", p.BottomSlope[1]),
		checkCoordinate("prism top slope a", p.TopSlope[0]),
		checkCoordinate("prism top slope b", p.TopSlope[1]),
		checkPoints("prism base", base, nil),
	); err != nil {
		return err
	}
	if err := (loop{vertices: base}).check("prism base"); err != nil {
		return err
	}
	return p.checkEnds()
}

// checkEnds refuses ends that meet. The height between them is linear, so it is least at a vertex of the base.
func (p Prism) checkEnds() error {
	for k, b := range p.Base {
		bottom, top := p.end(-1, p.BottomSlope, b), p.end(1, p.TopSlope, b)
		for _, z := range [2]pair.Float{bottom, top} {
			if err := checkCoordinate(fmt.Sprintf("prism height at base vertex %d", k), z.Value()); err != nil {
				return err
			}
		}
		if height := top.Sub(bottom); height.Sign() <= 0 {
			return fmt.Errorf("geom: prism ends meet at base vertex %d (%v, %v), where the height is %v; lessen the slopes or raise the height", k, b[0], b[1], height.Value())
		}
	}
	return nil
}

// end returns the height of the plane of an end over a point; sign is -1 for the bottom and +1 for the top.
func (p Prism) end(sign float64, slope, at [2]float64) pair.Float {
	return pair.Product(slope[0], at[0]).Add(pair.Product(slope[1], at[1])).AddFloat(sign * p.Height / 2)
}

// clockwise reports whether the base runs clockwise.
func (p Prism) clockwise() bool { return signedArea(p.points()).Sign() < 0 }

// points returns the base.
func (p Prism) points() []flat {
	points := make([]flat, len(p.Base))
	for k, b := range p.Base {
		points[k] = flat{pair.Of(b[0]), pair.Of(b[1])}
	}
	return points
}

// Polyhedron returns the prism as a polyhedron: vertex k is base point k at the bottom, vertex len(Base) + k the same
// at the top.
func (p Prism) Polyhedron() Polyhedron {
	n := len(p.Base)
	q := Polyhedron{Vertices: make([]r3.Vec, 2*n), Low: make([]r3.Vec, 2*n)}
	bottom, top := make([]int, n), make([]int, n)
	for k, b := range p.Base {
		for e, z := range [2]pair.Float{p.end(-1, p.BottomSlope, b), p.end(1, p.TopSlope, b)} {
			v := pair.Vec{X: pair.Of(b[0]), Y: pair.Of(b[1]), Z: z}
			q.Vertices[e*n+k], q.Low[e*n+k] = v.Value(), v.Low()
		}
		bottom[n-1-k], top[k] = k, n+k
	}
	q.Loops = append(make([][]int, 0, n+2), bottom, top)
	for k := range n {
		next := (k + 1) % n
		q.Loops = append(q.Loops, []int{k, next, n + next, n + k})
	}
	if p.clockwise() {
		for _, f := range q.Loops {
			reverse(f)
		}
	}
	return q
}

// reverse turns the sense of a face, keeping its first vertex.
func reverse(f []int) {
	for i, j := 1, len(f)-1; i < j; i, j = i+1, j-1 {
		f[i], f[j] = f[j], f[i]
	}
}

// Bounds returns the smallest box along the axes.
func (p Prism) Bounds() r3.Box {
	box := nothing()
	for _, b := range p.Base {
		for _, z := range [2]pair.Float{p.end(-1, p.BottomSlope, b), p.end(1, p.TopSlope, b)} {
			v := r3.Vec{X: b[0], Y: b[1], Z: z.Value()}
			box = include(include(box, v), r3.Vec{X: b[0], Y: b[1], Z: away(z.Hi, z.Lo)})
		}
	}
	return box
}

// Volume returns the volume.
func (p Prism) Volume() float64 { return p.Polyhedron().Volume() }

// Centroid returns the centre of volume.
func (p Prism) Centroid() r3.Vec { return p.Polyhedron().Centroid() }

// SecondMoment returns the second moment about the centroid.
func (p Prism) SecondMoment() [3][3]float64 { return p.Polyhedron().SecondMoment() }

// Locate tells where x lies. It makes the polyhedron for points within the bounds; who asks often asks LocatorOf(p).
func (p Prism) Locate(x pair.Vec, slack float64) Place {
	bounds, v := p.Bounds(), x.Value()
	if beyond(bounds, v, OnTolerance(bounds, v, slack)) {
		return outside()
	}
	return p.Polyhedron().Locate(x, slack)
}

// Faces returns the two ends and the sides.
func (p Prism) Faces() []Face {
	faces := p.Polyhedron().Faces()
	for f := range faces {
		faces[f].Name = prismFace(f)
	}
	return faces
}

// prismFace returns the name of face f.
func prismFace(f int) string {
	switch f {
	case 0:
		return "bottom"
	case 1:
		return "top"
	}
	return "side " + strconv.Itoa(f-2)
}
