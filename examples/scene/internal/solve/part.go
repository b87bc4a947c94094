package solve

import (
	"errors"
	"fmt"
	"math"
	"strings"

	"example.com/boundpole/charge"
	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"example.com/boundpole/magnet"
	"gonum.org/v1/gonum/spatial/r3"
)

// made is a part in its own frame, built once for all its copies: as given, and reversed when a copy asks for it.
type made struct {
	part     int
	kind     Kind
	body     geom.Body
	sheet    geom.Sheet
	charge   [2]*bound.Charge // as given, reversed
	density  float64
	gradient r3.Vec
	point    float64
	moment   r3.Vec // C m or A m^2
	peak     float64
}

// make builds part i of the scene in its own frame. Its errors are those of the scene file.
func (s *Setup) make(i int) (*made, error) {
	part := &s.Scene.Parts[i]
	at := fmt.Sprintf("/parts/%d", i)
	m := &made{part: i}
	m.body, m.sheet = shapeOf(part.Shape)
	if m.body != nil {
		if err := m.body.Check(); err != nil {
			return nil, s.Scene.ErrorAt(at, plainWords(err), "")
		}
	}
	if m.sheet != nil {
		if err := m.sheet.Check(); err != nil {
			return nil, s.Scene.ErrorAt(at, plainWords(err), "")
		}
	}
	var err error
	switch {
	case part.Polarized != nil:
		m.kind = Polarized
		err = m.polarize(part, part.Polarized)
		at += "/polarized"
	case part.Magnetized != nil:
		m.kind = Magnetized
		err = m.polarize(part, part.Magnetized)
		at += "/magnetized"
	case part.Charged != nil:
		m.kind = Charged
		err = m.give(part)
		at += "/charged"
	}
	switch {
	case errors.Is(err, bound.ErrUnsupported):
		problem, remedy := unsupported(part)
		return nil, s.Scene.ErrorAt(at, problem, remedy)
	case err != nil:
		return nil, s.Scene.ErrorAt(at, plainWords(err), "")
	}
	return m, nil
}

// unsupported says which law on which shape has no integrator, and what would be right.
func unsupported(part *scenefile.Part) (problem, remedy string) {
	shape := strings.ReplaceAll(part.Kind, "_", " ")
	if part.Charged != nil {
		return "a gradient of the density on a sheet of shape " + shape + " is not supported yet", "give a constant density, or cut the sheet into polygons"
	}
	remedy = "give a uniform polarization"
	if part.Kind == "cylinder" || part.Kind == "tube" {
		remedy += ", or an affine one whose z component alone grows along z"
	}
	return "an affine polarization like this on a body of shape " + shape + " is not supported yet", remedy
}

// errOverflow is what is wrong with a polarization or charge whose numbers are finite each, but not together.
var errOverflow = errors.New("what the part carries overflows float64, its scale included; give smaller numbers")

// polarize computes the bound charge of a body, or the moment of a point.
func (m *made) polarize(part *scenefile.Part, p *scenefile.Polarization) error {
	if m.body == nil {
		m.moment = r3.Scale(part.Scale, *p.Moment)
		m.peak = r3.Norm(m.moment)
		return finite(m.peak)
	}
	law := polarizationOf(p)
	m.peak = math.Abs(part.Scale) * peak(m.body, law)
	if err := finite(m.peak); err != nil {
		return err
	}
	for k, sign := range [2]float64{part.Scale, -part.Scale} {
		if k == 1 && (part.Copies == nil || !part.Copies.Alternate) {
			break
		}
		var err error
		m.charge[k], err = bound.Of(m.body, field.Times{Polarization: law, Factor: sign})
		if err != nil {
			return err
		}
	}
	return nil
}

// give computes the real charge of a sheet or a point.
func (m *made) give(part *scenefile.Part) error {
	if m.sheet == nil {
		m.point = part.Scale * *part.Charged.Charge
		return finite(m.point)
	}
	m.density, m.gradient = part.Scale**part.Charged.Density, r3.Scale(part.Scale, part.Charged.Gradient)
	for _, x := range corners(m.sheet.Bounds()) {
		m.peak = max(m.peak, math.Abs(m.density+r3.Dot(m.gradient, x)))
	}
	if err := finite(m.peak); err != nil {
		return err
	}
	_, err := charge.Sheet(m.sheet, m.density, m.gradient)
	return err
}

func finite(v float64) error {
	if Missing(v) {
		return errOverflow
	}
	return nil
}

// peak returns the largest |p| over a body; over its box, where it is round.
func peak(body geom.Body, law field.Polarization) float64 {
	at := corners(body.Bounds())
	if flat, ok := body.(geom.Flat); ok {
		at = flat.Polyhedron().Vertices
	}
	largest := 0.0
	for _, x := range at {
		largest = math.Max(largest, r3.Norm(law.At(x))) // NaN stays
	}
	return largest
}

func corners(b r3.Box) []r3.Vec {
	var out []r3.Vec
	for k := range 8 {
		c := b.Min
		if k&1 != 0 {
			c.X = b.Max.X
		}
		if k&2 != 0 {
			c.Y = b.Max.Y
		}
		if k&4 != 0 {
			c.Z = b.Max.Z
		}
		out = append(out, c)
	}
	return out
}

// plainWords returns an error of the library without the name of the package in front.
func plainWords(err error) string {
	text := err.Error()
	for _, name := range []string{"geom: ", "bound: ", "charge: ", "element: ", "field: "} {
		text = strings.TrimPrefix(text, name)
	}
	return text
}

// place puts a made part at a pose.
func (s *Setup) place(m *made, name string, pose geom.Pose, sign float64) {
	p := Part{Name: name, Of: m.part, Kind: m.kind, Peak: m.peak, Pose: pose, Centre: pose.Origin().Value(),
		Density: sign * m.density, Gradient: r3.Scale(sign, m.gradient), Point: sign * m.point,
		Moment: pose.VectorToOuter(r3.Scale(sign, m.moment))}
	switch {
	case m.body != nil:
		p.Local = m.body.Bounds()
		p.Body = geom.At(m.body, pose)
		c := m.charge[0]
		if sign < 0 {
			c = m.charge[1]
		}
		if c != nil {
			p.Charge = c.At(pose)
			p.Body = p.Charge.Body()
			p.Member = bound.Member{Charge: p.Charge}
		}
	case m.sheet != nil:
		p.Local = m.sheet.Bounds()
		p.Sheet = geom.SheetAt(m.sheet, pose)
		if m.kind == Charged {
			// cannot fail: the same sheet passed in its own frame
			p.Member, _ = charge.Sheet(p.Sheet, p.Density, p.Gradient)
		}
	case m.kind != Charged:
		p.Member = charge.Dipole(p.Centre, r3.Scale(s.perMetre*s.perMetre*s.perMetre, p.Moment))
	default:
		p.Member = charge.Point(p.Centre, p.Point*s.perMetre*s.perMetre)
	}
	s.Parts = append(s.Parts, p)
}

// shapeOf returns the body or the sheet of a shape; neither for a point.
func shapeOf(shape any) (geom.Body, geom.Sheet) {
	switch v := shape.(type) {
	case *scenefile.Box:
		return geom.Box{Size: vec(v.Size)}, nil
	case *scenefile.Cylinder:
		return geom.Cylinder{Radius: v.Radius, Height: v.Height}, nil
	case *scenefile.Tube:
		return geom.Tube{Inner: v.Inner, Outer: v.Outer, Height: v.Height}, nil
	case *scenefile.Sphere:
		return geom.Sphere{Radius: v.Radius}, nil
	case *scenefile.HollowSphere:
		return geom.HollowSphere{Inner: v.Inner, Outer: v.Outer}, nil
	case *scenefile.Ellipsoid:
		return geom.Ellipsoid{SemiAxes: vec(v.Semiaxes)}, nil
	case *scenefile.Prism:
		base := make([][2]float64, len(v.Base))
		for i, b := range v.Base {
			base[i] = [2]float64{b.X, b.Y}
		}
		return geom.Prism{Base: base, Height: v.Height, BottomSlope: [2]float64{v.BottomSlope.X, v.BottomSlope.Y},
			TopSlope: [2]float64{v.TopSlope.X, v.TopSlope.Y}}, nil
	case *scenefile.Polyhedron:
		return geom.Polyhedron{Vertices: v.Vertices, Loops: v.Faces}, nil
	case *scenefile.Polygon:
		return nil, geom.Polygon{Vertices: v.Vertices}
	case *scenefile.Disc:
		return nil, geom.Disc{Radius: v.Radius}
	case *scenefile.Annulus:
		return nil, geom.Annulus{Inner: v.Inner, Outer: v.Outer}
	}
	return nil, nil
}

func vec(a [3]float64) r3.Vec { return r3.Vec{X: a[0], Y: a[1], Z: a[2]} }

// polarizationOf returns the law of a polarization in C/m^2 or a magnetization in A/m.
func polarizationOf(p *scenefile.Polarization) field.Polarization {
	switch {
	case p.Remanence != nil:
		return field.Uniform{P: magnet.Remanence(*p.Remanence)}
	case p.Affine != nil:
		a := field.Affine{Value: p.Affine.Value, About: p.Affine.About}
		for i, row := range p.Affine.Gradient {
			a.Gradient[i] = [3]float64{row.X, row.Y, row.Z}
		}
		return a
	}
	return field.Uniform{P: *p.Uniform}
}
