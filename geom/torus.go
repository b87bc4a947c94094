package geom

import (
	"fmt"
	"math"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Torus is a ring of circular cross-section about the z axis, centred at the origin. Face: surface.
type Torus struct {
	Major float64 // distance of the centre of the cross-section from the axis
	Minor float64 // radius of the cross-section, below Major
}

// Check refuses radii that are not positive lengths and a minor radius that closes the hole.
func (t Torus) Check() error {
	if err := first(checkLength("torus major radius", t.Major), checkLength("torus minor radius", t.Minor)); err != nil {
		return err
	}
	switch {
	case t.Minor >= t.Major:
		return fmt.Errorf("geom: torus minor radius %v is not below the major radius %v; the hole is closed, exchange or correct them", t.Minor, t.Major)
	case t.Major-t.Minor < grain*t.Major:
		return fmt.Errorf("geom: torus hole between the radii %v and %v is narrower than their rounding; lessen the minor radius", t.Major, t.Minor)
	case t.Minor < grain*t.Major:
		return fmt.Errorf("geom: torus minor radius %v is below the rounding of the major radius %v; make it thicker", t.Minor, t.Major)
	}
	return nil
}

// Bounds returns the smallest box along the axes, up to rounding.
func (t Torus) Bounds() r3.Box {
	outer := pair.Sum(t.Major, t.Minor)
	reach := max(outer.Hi, away(outer.Hi, outer.Lo))
	return roundBounds(reach, 2*t.Minor)
}

// Volume returns 2 pi^2 R r^2.
func (t Torus) Volume() float64 { return 2 * math.Pi * math.Pi * t.Major * t.Minor * t.Minor }

// Centroid returns the origin.
func (t Torus) Centroid() r3.Vec { return r3.Vec{} }

// SecondMoment returns V (R^2/2 + 3 r^2/8) across the axis and V r^2/4 along it.
func (t Torus) SecondMoment() (m [3][3]float64) {
	v := t.Volume()
	m[0][0] = v * (t.Major*t.Major/2 + 3*t.Minor*t.Minor/8)
	m[1][1] = m[0][0]
	m[2][2] = v * t.Minor * t.Minor / 4
	return m
}

// Locate tells where x lies.
func (t Torus) Locate(x pair.Vec, slack float64) Place {
	bounds, v := t.Bounds(), x.Value()
	tol := OnTolerance(bounds, v, slack)
	if beyond(bounds, v, tol) {
		return outside()
	}
	out := x.X.Mul(x.X).Add(x.Y.Mul(x.Y)).Sqrt().AddFloat(-t.Major)
	switch d := aboveRound(out.Mul(out).Add(x.Z.Mul(x.Z)), t.Minor); {
	case d > tol:
		return outside()
	case d < -tol:
		return inside()
	}
	e, s, z := radial(v), out.Value(), v.Z
	l := math.Hypot(s, z)
	return Place{Region: On, Normal: r3.Vec{X: s / l * e.X, Y: s / l * e.Y, Z: z / l}}
}

// Faces returns the surface.
func (t Torus) Faces() []Face { return []Face{{Name: "surface", Surface: TorusSurface(t)}} }

// Cells returns the torus itself.
func (t Torus) Cells() []Cell { return []Cell{t} }

// Nodes visits the points of the rule that is Gauss in the radius of the cross-section and equally spaced in both angles.
// The Jacobian r (R + r cos) takes a degree in the angle and one in the radius; its second, at the highest power of r, goes
// with an odd function of the angle.
func (t Torus) Nodes(n int, visit func(x r3.Vec, weight float64)) {
	n = max(n, 1)
	ring, section := circle(2*n), circle(2*n)
	step := 2 * math.Pi / float64(len(ring)) * 2 * math.Pi / float64(len(section))
	for _, rho := range legendre(n, 0, t.Minor) {
		for _, c := range section {
			s := t.Major + rho.x*c.cos
			for _, d := range ring {
				visit(r3.Vec{X: s * d.cos, Y: s * d.sin, Z: rho.x * c.sin}, step*rho.w*rho.x*s)
			}
		}
	}
}

// TorusSurface is the surface of a torus about the z axis, centred at the origin, with the normal outward.
type TorusSurface struct {
	Major, Minor float64 // radii of the ring and of its cross-section
}

// Area returns 4 pi^2 R r.
func (t TorusSurface) Area() float64 { return 4 * math.Pi * math.Pi * t.Major * t.Minor }

// Bounds returns the smallest box along the axes, up to rounding.
func (t TorusSurface) Bounds() r3.Box { return Torus(t).Bounds() }

// Nodes visits the points of the rule that is equally spaced in both angles. The normal and the area take a degree each
// in the angle of the cross-section; the highest is odd under inversion, where the rule is even.
func (t TorusSurface) Nodes(n int, visit func(x, normal r3.Vec, weight float64)) {
	n = max(n, 1)
	ring, section := circle(2*n), circle(2*n)
	step := 2 * math.Pi / float64(len(ring)) * 2 * math.Pi / float64(len(section)) * t.Minor
	for _, c := range section {
		s := t.Major + t.Minor*c.cos
		for _, d := range ring {
			visit(r3.Vec{X: s * d.cos, Y: s * d.sin, Z: t.Minor * c.sin}, r3.Vec{X: c.cos * d.cos, Y: c.cos * d.sin, Z: c.sin}, step*s)
		}
	}
}
