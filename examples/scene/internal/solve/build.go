// Package solve turns a scene into models of the library and answers what the scene wants.
//
// Geometry is computed in the length unit of the file; records and tables are in SI. A Setup is immutable once built.
package solve

import (
	"math"
	"sync"

	"example.com/boundpole/charge"
	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/image"
	"example.com/boundpole/geom"
	"example.com/boundpole/magnet"
	"example.com/boundpole/magnet/grade"
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

	Circulating Kind = "circulating"
)

// Part is one placed body, sheet or point: a part of the scene or one of its copies.
type Part struct {
	Name   string
	Of     int // part of the scene that it is, or is a copy of
	Kind   Kind
	Body   geom.Body     // nil for sheets and points
	Sheet  geom.Sheet    // nil for bodies and points
	Charge *bound.Charge // bound charge of a body, nil if it carries nothing
	Member bound.Member  // what makes its field
	Centre r3.Vec        // origin of its frame, in the scene
	Pose   geom.Pose
	Local  r3.Box  // of a body or sheet, in its own frame
	Peak   float64 // largest |p| or |sigma|, in SI

	Density  float64 // of a charged sheet, in its own frame
	Gradient r3.Vec
	Point    float64 // charge of a point, C
	Moment   r3.Vec  // moment of a point in the scene frame, C m or A m^2

	law      field.Polarization // of a polarized body, in its own frame and the unit of the file, before factor
	factor   float64
	singular singular
	chi      *float64       // of a part that responds, else nil
	induced  *responding    // what it carries with others, once solved
	proven   float64        // accuracy that needs no estimate, see proven
	material grade.Material // of a magnet with a grade
}

// Setup is a scene ready to be asked.
type Setup struct {
	Scene    *scenefile.Scene
	Unit     float64 // metres
	perMetre float64 // units in a metre, exact
	Parts    []Part
	Warnings []string

	Electric, Magnetic bool // kinds that the records have
	Guiding            bool // circulating flux: records have A
	Responds           bool // some parts respond to the field
	slow               bool // a part is integrated
	electric           charge.Model
	magnetic           magnet.Model
	guides             bound.Assembly // charge M_A.n of circulating parts
	walls              []image.Plane
	overlaps           [][2]int       // pairs of parts
	places             bound.Assembly // all parts, for sides and for telling where a point is
	surface            func() (volts float64, of *Part)
}

// Build places the parts of a scene. Its errors are those of the scene file, with the place in it.
func Build(scene *scenefile.Scene) (*Setup, error) {
	s := &Setup{Scene: scene, Unit: scene.Length.Metres()}
	s.perMetre = math.Round(1 / s.Unit)
	s.surface = sync.OnceValues(s.surfaceVolts)
	for i := range scene.Parts {
		if err := s.addPart(i); err != nil {
			return nil, err
		}
	}
	if err := s.addPlanes(); err != nil {
		return nil, err
	}
	s.assemble()
	if err := s.checkSides(); err != nil {
		return nil, err
	}
	s.warnOverlaps()
	if err := s.checkResponding(); err != nil {
		return nil, err
	}
	s.warnOperating()
	return s, nil
}

// assemble makes the models of the parts as they are placed.
func (s *Setup) assemble() {
	s.electric, s.magnetic = charge.Model{Unit: s.Unit}, magnet.Model{Unit: s.Unit}
	s.guides, s.places = nil, nil
	if a := s.Scene.Applied; a != nil {
		if a.E != nil {
			s.electric.Applied = *a.E
		}
		if a.B != nil {
			s.magnetic.Applied = *a.B
		}
	}
	for i := range s.Parts {
		p := &s.Parts[i]
		s.slow = s.slow || p.integrated()
		s.places = append(s.places, bound.Member{Charge: p.Charge, Body: p.Body, Sheet: p.Sheet})
		if p.chi != nil {
			s.Responds = true
			s.Electric, s.Magnetic = s.Electric || p.Kind != Magnetized, s.Magnetic || p.Kind == Magnetized
			continue
		}
		switch p.Kind {
		case Magnetized:
			s.Magnetic = true
			s.magnetic.Parts = append(s.magnetic.Parts, p.Member)
		case Polarized, Charged:
			s.Electric = true
			s.electric.Parts = append(s.electric.Parts, p.Member)
		case Circulating:
			s.Guiding = true
			s.guides = append(s.guides, p.Member)
		}
	}
	s.electric.Parts = s.mirrored(s.electric.Parts, Charged)
	s.magnetic.Parts = s.mirrored(s.magnetic.Parts, Magnetized)
}

// addPart places part i of the scene and its copies.
func (s *Setup) addPart(i int) error {
	part := &s.Scene.Parts[i]
	pose, err := s.poseOf(i)
	if err != nil {
		return err
	}
	made, err := s.make(i)
	if err != nil {
		return err
	}
	names := part.Names()
	if part.Copies == nil {
		s.place(made, names[0], pose, 1)
		return nil
	}
	for k, name := range names {
		moved, err := s.copyOf(i, k, pose)
		if err != nil {
			return err
		}
		sign := 1.0
		if part.Copies.Alternate && k%2 == 1 {
			sign = -1
		}
		s.place(made, name, moved, sign)
	}
	return nil
}
