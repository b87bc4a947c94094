// Package refsource builds the source that a reference case of package refcase describes: body, pose and polarization.
//
// Units are natural (package field). Sources are immutable and safe for concurrent use.
package refsource

import (
	"fmt"
	"maps"
	"slices"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/element"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"example.com/boundpole/verify/refcase"
	"gonum.org/v1/gonum/spatial/r3"
)

// Of returns the source of a case, in the outer frame. The error wraps that of bound.Of or of the element, or names the
// body or polarization that is not known here (flux tubes).
func Of(c *refcase.Case) (field.Source, error) {
	switch c.Body.Type {
	case "point":
		return element.Point{At: refcase.Vec(c.Body.Centre), Charge: c.Polarization.C}, nil
	case "dipole":
		return element.Dipole{At: refcase.Vec(c.Body.Centre), Moment: refcase.Vec(c.Polarization.P)}, nil
	case "polygon", "disc", "annulus":
		return sheet(c)
	}
	shape, err := shapeOf(&c.Body)
	if err != nil {
		return nil, err
	}
	pose, err := c.Pose()
	if err != nil {
		return nil, err
	}
	p, err := polarization(c, pose)
	if err != nil {
		return nil, err
	}
	return bound.Of(geom.At(shape, pose), p)
}

// sheet returns the field of a charged sheet.
func sheet(c *refcase.Case) (field.Source, error) {
	b, q := &c.Body, &c.Polarization
	if b.Type == "polygon" {
		shape := geom.Polygon{Vertices: vectors(b.Vertices)}
		return element.NewPolygon(shape, q.A, refcase.Vec(q.B)), shape.Check()
	}
	pose, err := c.Pose()
	if err != nil {
		return nil, err
	}
	gradient := refcase.Vec(q.B)
	sum := pair.VecOf(gradient).Dot(pair.VecOf(refcase.Vec(b.Centre))) // far from the origin the terms cancel
	density := sum.AddFloat(q.A).Value()
	gradient = pose.VectorToLocal(gradient)
	disc, annulus := geom.Disc{Radius: b.Radius}, geom.Annulus{Inner: b.R1, Outer: b.R2}
	var src field.Source
	switch {
	case b.Type == "disc" && gradient == r3.Vec{}:
		src, err = element.NewDisc(disc, density)
	case b.Type == "disc":
		src, err = element.NewLinearDisc(disc, density, gradient)
	case gradient == r3.Vec{}:
		src, err = element.NewAnnulus(annulus, density)
	default:
		src, err = element.NewLinearAnnulus(annulus, density, gradient)
	}
	return field.Posed{Source: src, Pose: pose}, err
}

// shapeOf returns the body in its own frame.
func shapeOf(b *refcase.Body) (geom.Body, error) {
	switch b.Type {
	case "box":
		return geom.Box{Size: r3.Scale(2, refcase.Vec(*b.Half))}, nil
	case "prism":
		return geom.Prism{Base: b.Base, Height: b.Height, BottomSlope: b.BottomSlope, TopSlope: b.TopSlope}, nil
	case "polyhedron":
		return geom.Polyhedron{Vertices: vectors(b.Vertices), Loops: b.Faces}, nil
	case "cylinder":
		return geom.Cylinder{Radius: b.Radius, Height: 2 * b.HalfLen}, nil
	case "tube":
		return geom.Tube{Inner: b.R1, Outer: b.R2, Height: 2 * b.HalfLen}, nil
	case "sphere":
		return geom.Sphere{Radius: b.Radius}, nil
	case "spherical_shell":
		return geom.HollowSphere{Inner: b.R1, Outer: b.R2}, nil
	case "ellipsoid":
		return geom.Ellipsoid{SemiAxes: refcase.Vec(*b.SemiAxes)}, nil
	case "tube_sector":
		return geom.Arc{Inner: b.R1, Outer: b.R2, Height: 2 * b.HalfLen, From: b.Phi1, To: b.Phi2}, nil
	case "truncated_cone":
		return geom.Cone{Bottom: b.Bottom, Top: b.Top, Height: 2 * b.HalfLen}, nil
	case "torus":
		return geom.Torus{Major: b.Major, Minor: b.Minor}, nil
	}
	return nil, fmt.Errorf("refsource: body type %q is not known here; see shapeOf", b.Type)
}

// polarization turns the polarization of a case into the body's own frame.
func polarization(c *refcase.Case, pose geom.Pose) (field.Polarization, error) {
	q := &c.Polarization
	switch q.Kind {
	case "uniform":
		return field.Affine{Value: pose.VectorToLocal(refcase.Vec(q.P))}, nil
	case "axial_z":
		return field.Affine{Gradient: [3][3]float64{2: {2: q.C}}}, nil
	case "affine":
		return affine(c, pose)
	case "ball_r":
		return field.CentralPower{Coefficient: q.C, Power: 1}, nil
	case "ball_r2":
		return field.CentralPower{Coefficient: q.C, Power: 2}, nil
	case "central_power":
		return field.CentralPower{Coefficient: q.C, Power: q.N}, nil
	case "radial_unit":
		return field.RadialPower{Coefficient: q.C}, nil
	case "radial_s":
		return field.RadialPower{Coefficient: q.C, Power: 1}, nil
	case "radial_s2":
		return field.RadialPower{Coefficient: q.C, Power: 2}, nil
	case "radial_power":
		return field.RadialPower{Coefficient: q.C, Power: q.N}, nil
	case "axial_z2":
		return field.AxialPower{Coefficient: q.C, Power: 2}, nil
	case "axial_power":
		return field.AxialPower{Coefficient: q.C, Power: int(q.N)}, nil
	case "polynomial":
		return polynomial(q, pose), nil
	}
	return nil, fmt.Errorf("refsource: polarization %q is not known here; see polarization", q.Kind)
}

// affine returns p0 + G x, given in the outer frame.
func affine(c *refcase.Case, pose geom.Pose) (p field.Affine, err error) {
	g, err := c.Polarization.Gradient()
	if err != nil {
		return p, err
	}
	p.Value = pose.VectorToLocal(affineAt(c.Polarization.P0, g, pose.Origin()))
	m := pose.Matrix()
	for i := range 9 {
		for j := range 9 {
			p.Gradient[i/3][i%3] += m[j/3][i/3] * g[j/3][j%3] * m[j%3][i%3]
		}
	}
	return p, nil
}

// affineAt returns p0 + g x, with the sum taken in pairs: far from the origin its terms cancel.
func affineAt(p0 [3]float64, g [3][3]float64, x pair.Vec) r3.Vec {
	var v [3]float64
	for i := range v {
		sum := pair.Of(p0[i])
		for j, c := range [3]pair.Float{x.X, x.Y, x.Z} {
			sum = sum.Add(c.Scale(g[i][j]))
		}
		v[i] = sum.Value()
	}
	return r3.Vec{X: v[0], Y: v[1], Z: v[2]}
}

// polynomial returns a polynomial whose powers are of outer coordinates.
func polynomial(q *refcase.Polarization, pose geom.Pose) field.Polarization {
	var p field.Polynomial
	for _, t := range q.Terms {
		p = append(p, field.Term{Component: t.Component, Coefficient: t.Coefficient, Powers: t.Powers})
	}
	if !pose.Turned() && pose.Origin().Value() == (r3.Vec{}) {
		return p
	}
	return composed(p, pose)
}

// composed returns a polynomial of the outer frame as seen in that of a pose.
func composed(p field.Polynomial, pose geom.Pose) field.Polynomial {
	m, o := pose.Matrix(), pose.Origin().Value()
	linear := [3]map[[3]int]float64{}
	for i, c := range [3]float64{o.X, o.Y, o.Z} {
		linear[i] = map[[3]int]float64{{}: c, {1, 0, 0}: m[i][0], {0, 1, 0}: m[i][1], {0, 0, 1}: m[i][2]}
	}
	var all [3]map[[3]int]float64
	for i := range all {
		all[i] = map[[3]int]float64{}
	}
	for _, t := range p {
		f := map[[3]int]float64{{}: t.Coefficient}
		for i, n := range t.Powers {
			for range n {
				next := map[[3]int]float64{}
				for _, a := range ordered(f) { // the same sums, to the bit, every time
					for _, b := range ordered(linear[i]) {
						next[[3]int{a[0] + b[0], a[1] + b[1], a[2] + b[2]}] += f[a] * linear[i][b]
					}
				}
				f = next
			}
		}
		for powers, v := range f {
			for i := range 3 { // components turn back
				all[i][powers] += m[t.Component][i] * v // once a term: the order of powers does not matter
			}
		}
	}
	var q field.Polynomial
	for i := range all {
		for _, powers := range ordered(all[i]) {
			if c := all[i][powers]; c != 0 {
				q = append(q, field.Term{Component: i, Coefficient: c, Powers: powers})
			}
		}
	}
	return q
}

// ordered returns the keys of a polynomial in a fixed order.
func ordered(p map[[3]int]float64) [][3]int {
	return slices.SortedFunc(maps.Keys(p), func(a, b [3]int) int { return slices.Compare(a[:], b[:]) })
}

func vectors(list [][3]float64) []r3.Vec {
	out := make([]r3.Vec, len(list))
	for i, v := range list {
		out[i] = refcase.Vec(v)
	}
	return out
}
