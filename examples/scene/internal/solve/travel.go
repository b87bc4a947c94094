package solve

import (
	"fmt"
	"strings"

	"example.com/boundpole/charge"
	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Position is one position of a travel.
type Position struct {
	Setup   *Setup
	Shift   r3.Vec  // metres
	Degrees float64 // of a rotation
}

// At returns position k of a travel, the scene with one part moved: share k/(count - 1) of the shift or the rotation, nothing
// for a count of 1.
func (s *Setup) At(t *scenefile.Travel, k int) (Position, error) {
	part := share(k, t.Count)
	var move geom.Pose
	var at Position
	if t.Rotation != nil {
		turn, err := turnBy(t.Rotation, part)
		if err != nil {
			return at, fmt.Errorf("scene: travel of %s: %s", t.Part, plainWords(err))
		}
		move, at.Degrees = turn, part*t.Rotation.Degrees
	} else {
		step := pair.Vec{X: pair.Product(part, t.Shift.X), Y: pair.Product(part, t.Shift.Y), Z: pair.Product(part, t.Shift.Z)}
		move, at.Shift = geom.Shift(step), s.metres(r3.Scale(part, t.Shift))
	}
	moved := *s
	moved.Parts = append([]Part(nil), s.Parts...)
	moved.Warnings = nil
	for k := range moved.Parts {
		moved.Parts[k].induced = nil
	}
	i := s.part(t.Part)
	moved.Parts[i] = moved.Parts[i].moved(move, s.perMetre)
	moved.assemble()
	if err := moved.checkSides(); err != nil {
		return at, err
	}
	if s.Responds {
		moved.warnOverlaps()
		if err := moved.checkResponding(); err != nil {
			return at, err
		}
	}
	at.Setup = &moved
	return at, nil
}

// moved returns the part at another place.
func (p Part) moved(by geom.Pose, perMetre float64) Part {
	p.Pose = p.Pose.Then(by)
	p.Centre = p.Pose.Origin().Value()
	p.Moment = by.VectorToOuter(p.Moment)
	switch {
	case p.Charge != nil:
		p.Charge = p.Charge.At(by)
		p.Body = p.Charge.Body()
		p.Member = bound.Member{Charge: p.Charge}
	case p.Body != nil:
		p.Body = geom.At(p.Body, by)
	case p.Sheet != nil:
		p.Sheet = geom.SheetAt(p.Sheet, by)
		if p.Kind == Charged {
			p.Member, _ = charge.Sheet(p.Sheet, p.Density, p.Gradient) // the same sheet passed before
		}
	case p.Kind == Charged:
		p.Member = charge.Point(p.Centre, p.Point*perMetre*perMetre)
	default:
		p.Member = charge.Dipole(p.Centre, r3.Scale(perMetre*perMetre*perMetre, p.Moment))
	}
	return p
}

// Moved is what one request gave at a position of a travel: an answer, or the first record of points.
type Moved struct {
	Request *scenefile.Request
	Answer  *Answer
	First   *Record
}

// Columns hands on the numbers of a table.
func (m *Moved) Columns(s *Setup, put func(name, ladder string, v ...float64)) {
	prefix := ""
	if m.Request.Name != "" {
		prefix = scenefile.OneLine(m.Request.Name) + " "
	}
	switch {
	case m.Answer != nil:
		for i := range m.Answer.Quantities {
			if q := &m.Answer.Quantities[i]; q.Estimate != nil {
				put(prefix+strings.ReplaceAll(q.Name, "_", " "), q.Ladder, q.Value...)
			}
		}
	case m.First != nil:
		v := func(name string, x r3.Vec) { put(prefix+name, name, x.X, x.Y, x.Z) }
		if s.Magnetic {
			v("B", m.First.Magnetic.B)
		}
		if s.Electric {
			v("E", m.First.Electric.E)
		}
		if s.Guiding {
			v("A", m.First.Guide.A)
		}
	}
}
