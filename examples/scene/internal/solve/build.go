// Package solve turns a scene into models of the library and answers what the scene wants.
//
// Geometry is computed in the length unit of the file; records and tables are in SI. A Setup is immutable once built.
package solve

import (
	"errors"
	"fmt"

	"example.com/boundpole/charge"
	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"example.com/boundpole/magnet"
	"gonum.org/v1/gonum/spatial/r3"
)

// Kind is what a part carries.
type Kind string

// The kinds.
const (
	Inert      Kind = ""
	Polarized  Kind = "polarized"
	Magnetized Kind = "magnetized"
	Charged    Kind = "charged"
)

// Part is one placed body, sheet or point: a part of the scene or one of its copies.
type Part struct {
	Name   string
	Kind   Kind
	Shape  string
	Body   geom.Body     // nil for sheets and points
	Sheet  geom.Sheet    // nil for bodies and points
	Charge *bound.Charge // bound charge of a body, nil if it carries nothing
	Member bound.Member  // what makes its field
	Centre r3.Vec        // origin of its frame, in the scene
	Pose   geom.Pose

	Density  float64 // of a charged sheet, in its own frame
	Gradient r3.Vec
	Point    float64 // charge of a point, C
	Moment   r3.Vec  // moment of a point in the scene frame, C m or A m^2
}

// Setup is a scene ready to be asked.
type Setup struct {
	Scene    *scenefile.Scene
	Unit     float64 // metres
	Parts    []Part
	Warnings []string

	Electric, Magnetic bool // kinds that the records have
	electric           charge.Model
	magnetic           magnet.Model
	fromElectric       []int // index in Parts of each part of the model
	fromMagnetic       []int
	places             bound.Assembly // all parts, for sides and for telling where a point is
}

// Build places the parts of a scene. Its errors are those of the scene file, with the place in it.
func Build(scene *scenefile.Scene) (*Setup, error) {
	s := &Setup{Scene: scene, Unit: scene.Length.Metres()}
	for i := range scene.Parts {
		if err := s.addPart(i); err != nil {
			return nil, err
		}
	}
	s.electric.Unit, s.magnetic.Unit = s.Unit, s.Unit
	if a := scene.Applied; a != nil {
		if a.E != nil {
			s.electric.Applied, s.Electric = *a.E, true
		}
		if a.B != nil {
			s.magnetic.Applied, s.Magnetic = *a.B, true
		}
	}
	for i := range s.Parts {
		p := &s.Parts[i]
		s.places = append(s.places, bound.Member{Charge: p.Charge, Body: p.Body, Sheet: p.Sheet})
		switch p.Kind {
		case Magnetized:
			s.Magnetic = true
			s.magnetic.Parts = append(s.magnetic.Parts, p.Member)
			s.fromMagnetic = append(s.fromMagnetic, i)
		case Polarized, Charged:
			s.Electric = true
			s.electric.Parts = append(s.electric.Parts, p.Member)
			s.fromElectric = append(s.fromElectric, i)
		}
	}
	s.warnOverlaps()
	return s, nil
}

// addPart places part i of the scene and its copies.
func (s *Setup) addPart(i int) error {
	part := &s.Scene.Parts[i]
	at := fmt.Sprintf("/parts/%d", i)
	pose, err := poseOf(part)
	if err != nil {
		return s.Scene.ErrorAt(at, err.Error(), "")
	}
	made, err := s.make(part)
	if err != nil {
		return s.refused(at, part, err)
	}
	names := part.Names()
	if part.Copies == nil {
		s.place(made, names[0], pose, 1)
		return nil
	}
	c := part.Copies
	for k, name := range names {
		moved := pose
		if c.Rotation != nil && k > 0 {
			turn, err := geom.Turn(c.Rotation.Axis, c.Rotation.Degrees*float64(k))
			if err != nil {
				return s.Scene.ErrorAt(at+"/copies/rotation", err.Error(), "")
			}
			moved = moved.Then(turn.About(c.Rotation.About))
		}
		n := float64(k)
		step := pair.Vec{X: pair.Product(n, c.Step.X), Y: pair.Product(n, c.Step.Y), Z: pair.Product(n, c.Step.Z)}
		moved = moved.Then(geom.Shift(step))
		sign := 1.0
		if c.Alternate && k%2 == 1 {
			sign = -1
		}
		s.place(made, name, moved, sign)
	}
	return nil
}

// refused puts an error of the library at the place in the file that it concerns.
func (s *Setup) refused(at string, part *scenefile.Part, err error) error {
	if errors.Is(err, bound.ErrUnsupported) {
		key := "polarized"
		switch {
		case part.Magnetized != nil:
			key = "magnetized"
		case part.Charged != nil:
			key = "charged"
		}
		return s.Scene.ErrorAt(at+"/"+key, err.Error(), "")
	}
	return s.Scene.ErrorAt(at, err.Error(), "")
}

// poseOf returns where the frame of a part stands in the scene.
func poseOf(part *scenefile.Part) (geom.Pose, error) {
	var pose geom.Pose
	for _, r := range part.Rotations {
		turn, err := geom.Turn(r.Axis, r.Degrees)
		if err != nil {
			return pose, err
		}
		pose = pose.Then(turn)
	}
	if f := part.Frame; f != nil {
		var x r3.Vec
		if f.X != nil {
			x = *f.X
		}
		turn, err := geom.Frame(f.Z, x)
		if err != nil {
			return pose, err
		}
		pose = turn
	}
	return pose.Then(geom.Translate(part.Centre)), nil
}

// made is a part in its own frame, built once for all its copies: as given, and reversed when a copy asks for it.
type made struct {
	kind     Kind
	shape    string
	body     geom.Body
	sheet    geom.Sheet
	charge   [2]*bound.Charge // as given, reversed
	density  float64
	gradient r3.Vec
	point    float64
	moment   r3.Vec // C m or A m^2
	unit     float64
}

// make builds a part in its own frame.
func (s *Setup) make(part *scenefile.Part) (*made, error) {
	m := &made{shape: part.Kind, unit: s.Unit}
	m.body, m.sheet = shapeOf(part.Shape)
	var p *scenefile.Polarization
	switch {
	case part.Polarized != nil:
		m.kind, p = Polarized, part.Polarized
	case part.Magnetized != nil:
		m.kind, p = Magnetized, part.Magnetized
	case part.Charged != nil:
		m.kind = Charged
		if part.Charged.Charge != nil {
			m.point = part.Scale * *part.Charged.Charge
		} else {
			m.density, m.gradient = part.Scale**part.Charged.Density, r3.Scale(part.Scale, part.Charged.Gradient)
		}
	}
	if m.sheet != nil {
		_, err := charge.Sheet(m.sheet, m.density, m.gradient)
		return m, err
	}
	if p != nil && p.Moment != nil {
		m.moment = r3.Scale(part.Scale, *p.Moment)
	}
	if m.body == nil {
		return m, nil
	}
	if p == nil {
		return m, m.body.Check()
	}
	law := polarizationOf(p)
	for k, sign := range [2]float64{part.Scale, -part.Scale} {
		if k == 1 && (part.Copies == nil || !part.Copies.Alternate) {
			break
		}
		var err error
		m.charge[k], err = bound.Of(m.body, field.Times{Polarization: law, Factor: sign})
		if err != nil {
			return nil, err
		}
	}
	return m, nil
}

// place puts a made part at a pose.
func (s *Setup) place(m *made, name string, pose geom.Pose, sign float64) {
	p := Part{Name: name, Kind: m.kind, Shape: m.shape, Pose: pose, Centre: pose.Origin().Value(),
		Density: sign * m.density, Gradient: r3.Scale(sign, m.gradient), Point: sign * m.point,
		Moment: pose.VectorToOuter(r3.Scale(sign, m.moment))}
	l := m.unit
	switch {
	case m.body != nil:
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
		p.Sheet = geom.SheetAt(m.sheet, pose)
		if m.kind == Charged {
			// cannot fail: the same sheet passed in its own frame
			p.Member, _ = charge.Sheet(p.Sheet, p.Density, p.Gradient)
		}
	case m.moment != r3.Vec{}:
		p.Member = charge.Dipole(p.Centre, r3.Scale(1/(l*l*l), p.Moment))
	default:
		p.Member = charge.Point(p.Centre, p.Point/(l*l))
	}
	if p.Member.Charge == nil && p.Member.Source == nil {
		p.Kind = Inert
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
