package geom

import (
	"errors"
	"math"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Arc is a part of a tube between two azimuths, counted about the z axis from +x towards +y; the full tube is centred at
// the origin. Faces: bottom top inner outer from to; a full turn has no from and to, the inner radius 0 no inner.
//
// From and To are in radians, or in degrees if Degrees is set; ends in degrees are taken exactly, so that a quarter turn
// ends on an axis. A range that differs from one turn by rounding is a full turn.
type Arc struct {
	Inner, Outer float64 // radii; Inner may be 0, for a wedge with its edge on the axis
	Height       float64
	From, To     float64 // From < To <= From + one turn
	Degrees      bool    // From and To are in degrees
}

// ArcDegrees returns the arc between two azimuths in degrees.
func ArcDegrees(inner, outer, height, from, to float64) Arc {
	return Arc{Inner: inner, Outer: outer, Height: height, From: from, To: to, Degrees: true}
}

func (a Arc) span() span { return span{a.From, a.To, a.Degrees} }

// Full reports whether the arc is a full turn: the tube.
func (a Arc) Full() bool { return a.span().full() }

// Tube returns the full tube.
func (a Arc) Tube() Tube { return Tube{Inner: a.Inner, Outer: a.Outer, Height: a.Height} }

// Angle returns To - From in radians.
func (a Arc) Angle() float64 { return a.span().angle() }

// Ends returns the unit vectors away from the axis at the azimuths From and To.
func (a Arc) Ends() (from, to pair.Vec) { return a.span().ends() }

// Check refuses dimensions that are not positive lengths, a wall without thickness, azimuths out of order or more than
// a turn apart, and a full turn without a bore.
func (a Arc) Check() error {
	if err := first(
		checkRadius("arc inner radius", a.Inner),
		checkLength("arc outer radius", a.Outer),
		checkLength("arc height", a.Height),
		checkSpan("arc", a.Inner, a.Outer),
		a.span().check("arc"),
	); err != nil {
		return err
	}
	if a.Inner == 0 && a.Full() {
		return errors.New("geom: arc of a full turn has inner radius 0; give a cylinder")
	}
	return nil
}

// checkRadius refuses what is neither zero nor a positive length in range.
func checkRadius(what string, v float64) error {
	if v == 0 {
		return nil
	}
	return checkLength(what, v)
}

// Bounds returns the smallest box along the axes, up to rounding.
func (a Arc) Bounds() r3.Box {
	if a.Full() {
		return roundBounds(a.Outer, a.Height)
	}
	return a.span().bounds(a.Inner, a.Outer, -a.Height/2, a.Height/2)
}

// Volume returns (b^2 - a^2) h angle/2.
func (a Arc) Volume() float64 { return a.area() * a.Height }

// area returns the area across the axis.
func (a Arc) area() float64 {
	if a.Full() {
		return math.Pi * (a.Outer - a.Inner) * (a.Outer + a.Inner)
	}
	return a.Angle() / 2 * (a.Outer - a.Inner) * (a.Outer + a.Inner)
}

// Locate tells where x lies. The faces meet at right angles, but for from and to on the axis where there is no bore.
func (a Arc) Locate(x pair.Vec, slack float64) Place {
	if a.Full() {
		return a.Tube().Locate(x, slack)
	}
	bounds, v := a.Bounds(), x.Value()
	tol := OnTolerance(bounds, v, slack)
	if beyond(bounds, v, tol) {
		return outside()
	}
	q := x.X.Mul(x.X).Add(x.Y.Mul(x.Y))
	bore, wall, inner := math.Inf(-1), aboveRound(q, a.Outer), 0
	if a.Inner > 0 {
		bore, inner = -aboveRound(q, a.Inner), 1
	}
	across, end, both := a.span().distance(x, tol)
	region, near := meet([3]float64{above(x.Z, a.Height/2), max(bore, wall), across}, tol)
	switch {
	case region == Outside:
		return outside()
	case region == Inside:
		return inside()
	case near < 0 || both:
		return onEdge()
	case near == 0 && v.Z < 0:
		return Place{Region: On, Face: 0, Normal: along(-1)}
	case near == 0:
		return Place{Region: On, Face: 1, Normal: along(1)}
	case near == 1 && bore > wall:
		return Place{Region: On, Face: 2, Normal: r3.Scale(-1, radial(v))}
	case near == 1:
		return Place{Region: On, Face: 2 + inner, Normal: radial(v)}
	}
	return Place{Region: On, Face: 3 + inner + end, Normal: a.span().outward(end)}
}

// Faces returns the two sectors, the walls and the two rectangles at the ends.
func (a Arc) Faces() []Face {
	if a.Full() {
		return a.Tube().Faces()
	}
	half := a.Height / 2
	sector := Sector{Inner: a.Inner, Outer: a.Outer, From: a.From, To: a.To, Degrees: a.Degrees}
	wall := WallSector{Z1: -half, Z2: half, From: a.From, To: a.To, Degrees: a.Degrees}
	bottom, top, inner, outer := sector, sector, wall, wall
	bottom.Z, top.Z, inner.Radius, outer.Radius = -half, half, a.Inner, a.Outer
	faces := append(make([]Face, 0, 6), Face{Name: "bottom", Surface: bottom, Inward: true}, Face{Name: "top", Surface: top})
	if a.Inner > 0 {
		faces = append(faces, Face{Name: "inner", Surface: inner, Inward: true})
	}
	from, to := a.Ends()
	return append(faces,
		Face{Name: "outer", Surface: outer},
		Face{Name: "from", Surface: a.end(from, half)},
		Face{Name: "to", Surface: a.end(to, -half)},
	)
}

// end returns the rectangle at an end, from the height -half to half; the sign of half turns its normal.
func (a Arc) end(e pair.Vec, half float64) Polygon {
	p := Polygon{Vertices: make([]r3.Vec, 4), Low: make([]r3.Vec, 4)}
	for k, corner := range [4]struct{ radius, z float64 }{{a.Inner, -half}, {a.Outer, -half}, {a.Outer, half}, {a.Inner, half}} {
		v := e.Scale(pair.Of(corner.radius))
		v.Z = pair.Of(corner.z)
		p.Vertices[k], p.Low[k] = v.Value(), v.Low()
	}
	return p
}

// Cells returns the arc itself.
func (a Arc) Cells() []Cell { return []Cell{a} }

// Nodes visits the points of the rule that is Gauss along radius, axis and azimuth.
func (a Arc) Nodes(n int, visit func(x r3.Vec, weight float64)) {
	if a.Full() {
		visitTube(n, a.Inner, a.Outer, a.Height, visit)
		return
	}
	axial := legendre(n, -a.Height/2, a.Height/2)
	visitSector(n, a.Inner, a.Outer, a.span(), func(x r3.Vec, weight float64) {
		for _, z := range axial {
			visit(r3.Vec{X: x.X, Y: x.Y, Z: z.x}, weight*z.w)
		}
	})
}
