package verify

import (
	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// sample is a body of each kind with a polarization that exercises it. All are about 2 in size, at the origin.
type sample struct {
	name  string
	body  geom.Body
	p     field.Affine
	reach float64 // lower bound for the distance of the nodes of order 2 on its faces from its edges
}

// sheared is a full affine polarization.
var sheared = field.Affine{
	Value:    r3.Vec{X: 0.3, Y: -0.7, Z: 1.1},
	Gradient: [3][3]float64{{0.5, -0.25, 0.125}, {0.75, -1, 0.5}, {-0.125, 0.25, 0.875}},
}

// samples returns the bodies.
func samples() []sample {
	oblique := field.Affine{Value: sheared.Value}
	linear := field.Affine{Value: sheared.Value}
	linear.Gradient[2][2] = -0.5
	wedge := geom.Polyhedron{
		Vertices: []r3.Vec{{X: -1, Y: -1, Z: -0.5}, {X: 1, Y: -1, Z: -0.5}, {X: 0, Y: 1, Z: -0.5}, {Z: 1}},
		Loops:    [][]int{{0, 2, 1}, {0, 1, 3}, {1, 2, 3}, {2, 0, 3}},
	}
	ell := [][2]float64{{-1, -1}, {1, -1}, {1, 0}, {0, 0}, {0, 1}, {-1, 1}}
	return []sample{
		{"box", geom.Box{Size: r3.Vec{X: 2, Y: 1.5, Z: 1}}, oblique, 0.125},
		{"box affine", geom.Box{Size: r3.Vec{X: 2, Y: 1.5, Z: 1}}, sheared, 0.125},
		{"tetrahedron affine", wedge, sheared, 0.0625},
		{"L prism", geom.Prism{Base: ell, Height: 1.5, TopSlope: [2]float64{0.25, -0.125}}, oblique, 0.0625},
		{"cylinder", geom.Cylinder{Radius: 1, Height: 1.5}, oblique, 0.125},
		{"cylinder linear", geom.Cylinder{Radius: 1, Height: 1.5}, linear, 0.125},
		{"tube linear", geom.Tube{Inner: 0.5, Outer: 1, Height: 1.5}, linear, 0.0625},
		{"sphere", geom.Sphere{Radius: 1}, oblique, 0.5},
		{"hollow sphere", geom.HollowSphere{Inner: 0.25, Outer: 1}, oblique, 0.25},
		{"ellipsoid", geom.Ellipsoid{SemiAxes: r3.Vec{X: 1, Y: 0.75, Z: 0.5}}, oblique, 0.25},
		{"cylinder axial", geom.Cylinder{Radius: 1, Height: 1.5}, gradedAlong(1.25, 0), 0.125},
	}
}

// build returns the bound charge of a sample, standing in a pose.
func (s sample) build(l *lab, pose geom.Pose) *bound.Charge {
	return l.charge(geom.At(s.body, pose), s.p)
}

// tilted is a pose without any special direction.
func tilted(l *lab) geom.Pose {
	turn, err := geom.Turn(r3.Vec{X: 1, Y: 2, Z: -3}, 40)
	l.note(err)
	return turn.Then(geom.Translate(r3.Vec{X: 0.25, Y: -0.5, Z: 2}))
}

// around are points inside and outside the samples, off all faces.
var around = []r3.Vec{
	{X: 0.1, Y: 0.2, Z: 0.3}, {X: 0.7, Y: -0.15, Z: 0.2}, {X: -0.6, Y: -0.35, Z: -0.1}, {X: 1.2, Y: 0.4, Z: -0.3},
	{X: -0.2, Y: 1.4, Z: 0.6}, {X: 0.3, Y: -0.4, Z: 2.5}, {X: -7, Y: 5, Z: 3}, {X: 60, Y: -80, Z: 20},
}
