package handover

import (
	"errors"
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// Settings say how an assembly is handed over; the zero value is the default.
type Settings struct {
	Kind   Kind
	Unit   float64  // metres in a unit of length of the assembly; 0 counts as 1
	Names  []string // of the parts, one each; nil: "part 0", "part 1" ...
	Points int      // points a direction on each face and in each cell, 1 to 32; 0 counts as 4
	Pieces int      // pieces a direction of each chart or block that is curved or graded, 1 to 32; 0 counts as 3
}

const (
	defaultPoints, defaultPieces = 4, 3
	mostPoints                   = 32
)

// Of returns the equivalent charges of the parts of an assembly and measures how well its points stand for them. Densities
// count in C/m^2 or A/m whatever the unit of length, gradients per unit of length, as in the models of charge and magnet.
//
// Domain: polarized bodies whose faces have charts and whose charged cells have blocks, sheets of a source that tells its
// two sides, point charges and dipoles, also placed, scaled and summed; parts that carry nothing are left out. An error names
// the part otherwise.
// Accuracy: Set.Within. Sums of charges are those of the exact source to rounding, for any number of points.
// Source: Gauss rules; corrected by a uniform density where a rule does not give the charge of a face or cell.
func Of(parts bound.Assembly, settings Settings) (*Set, error) {
	b, err := newBuilder(parts, settings)
	if err != nil {
		return nil, err
	}
	for i := range parts {
		if err := b.add(b.name(i), &parts[i]); err != nil {
			return nil, err
		}
	}
	if len(b.set.Groups) == 0 {
		return nil, errors.New("handover: no part carries charge; there is nothing to hand over")
	}
	if err := b.probe(parts); err != nil {
		return nil, err
	}
	if err := b.set.Check(); err != nil {
		return nil, err
	}
	return b.set, nil
}

// builder makes a set. Its lengths are those of the assembly; what goes into the set is converted.
type builder struct {
	set            *Set
	unit           float64
	names          []string
	points, pieces int
	centre         r3.Vec
	radius         float64
	total          float64 // of what is no bound charge, converted
	moment         r3.Vec  // about the centre
}

func newBuilder(parts bound.Assembly, s Settings) (*builder, error) {
	b := &builder{unit: s.Unit, names: s.Names, points: s.Points, pieces: s.Pieces}
	if b.unit == 0 {
		b.unit = 1
	}
	if b.points == 0 {
		b.points = defaultPoints
	}
	if b.pieces == 0 {
		b.pieces = defaultPieces
	}
	switch {
	case s.Kind != Electric && s.Kind != Magnetic:
		return nil, fmt.Errorf("handover: kind %d; give Electric or Magnetic", s.Kind)
	case !(b.unit > 0) || math.IsInf(b.unit, 0):
		return nil, fmt.Errorf("handover: unit of %v m; give a positive number of metres", s.Unit)
	case s.Names != nil && len(s.Names) != len(parts):
		return nil, fmt.Errorf("handover: %d names for %d parts; give one each, or none", len(s.Names), len(parts))
	case b.points < 1 || b.points > mostPoints:
		return nil, fmt.Errorf("handover: %d points a direction; give 1 to %d", s.Points, mostPoints)
	case b.pieces < 1 || b.pieces > mostPoints:
		return nil, fmt.Errorf("handover: %d pieces a direction; give 1 to %d", s.Pieces, mostPoints)
	}
	box, err := boundsOf(parts)
	if err != nil {
		return nil, err
	}
	b.centre = r3.Scale(0.5, r3.Add(box.Min, box.Max))
	b.radius = r3.Norm(r3.Sub(box.Max, box.Min)) / 2
	if b.radius == 0 {
		b.radius = 1 // a single point has no size
	}
	b.set = &Set{Kind: s.Kind, Constant: s.Kind.units().value, About: b.length(b.centre)}
	return b, nil
}

// boundsOf returns the box of all charge.
func boundsOf(parts bound.Assembly) (box r3.Box, err error) {
	first := true
	for i, m := range parts {
		var own r3.Box
		switch {
		case m.Charge != nil:
			own = m.Charge.Bounds()
		case m.Source == nil:
			continue
		case m.Sheet != nil:
			own = m.Sheet.Bounds()
		default:
			var ok bool
			own, ok = field.BoundsOf(m.Source)
			if size := r3.Norm(r3.Sub(own.Max, own.Min)); !ok || size-size != 0 {
				return box, unsupported(i, m.Source)
			}
		}
		if first {
			box, first = own, false
		}
		box.Min = r3.Vec{X: min(box.Min.X, own.Min.X), Y: min(box.Min.Y, own.Min.Y), Z: min(box.Min.Z, own.Min.Z)}
		box.Max = r3.Vec{X: max(box.Max.X, own.Max.X), Y: max(box.Max.Y, own.Max.Y), Z: max(box.Max.Z, own.Max.Z)}
	}
	return box, nil
}

func unsupported(part int, src field.Source) error {
	return fmt.Errorf("handover: part %d, a %T, is no polarized body, sheet, point charge or dipole; leave it out", part, src)
}

// name returns the name of part i.
func (b *builder) name(i int) string {
	if b.names != nil {
		return b.names[i]
	}
	return fmt.Sprintf("part %d", i)
}

// length returns a place in metres.
func (b *builder) length(x r3.Vec) r3.Vec { return r3.Add(r3.Scale(b.unit, x), r3.Vec{}) }

// charge returns a charge in C or A m.
func (b *builder) charge(q float64) float64 { return q*b.unit*b.unit + 0 }

// add adds the groups of one part.
func (b *builder) add(name string, m *bound.Member) error {
	switch {
	case m.Charge != nil:
		return b.addBody(name, m.Charge)
	case m.Source == nil:
		return nil
	case m.Sheet != nil:
		return b.addSheet(name, m.Sheet, m.Source)
	}
	return b.addPoints(name, m.Source)
}

// addBody adds the charged faces and cells of a body.
func (b *builder) addBody(name string, c *bound.Charge) error {
	for _, l := range c.Layers {
		if l.Min == 0 && l.Max == 0 {
			continue
		}
		s := skin{surface: l.Face.Surface, sign: l.Face.Sign(), uniform: l.Min == l.Max, charge: l.Charge, density: c.Density}
		if err := b.addSkin(Group{Part: name, Place: l.Face.Name, Form: Face}, s); err != nil {
			return err
		}
	}
	for k, v := range c.Volumes {
		if v.Min == 0 && v.Max == 0 {
			continue
		}
		place := "inside"
		if len(c.Volumes) > 1 {
			place = fmt.Sprintf("cell %d", k)
		}
		if err := b.addFilling(Group{Part: name, Place: place, Form: Volume}, fillingOf(c, v)); err != nil {
			return err
		}
	}
	b.moment = r3.Add(b.moment, c.Moment)
	return nil
}

// addSheet adds the charge of a sheet, as the jump of the field of its source tells it.
func (b *builder) addSheet(name string, sheet geom.Sheet, src field.Source) error {
	s := skin{surface: sheet, sign: 1, density: jump(src, b.radius)}
	const n = 12 // points a direction for charge and moment: exact for densities up to degree 21
	var err error
	sheet.Nodes(n, func(x, normal r3.Vec, w float64) {
		q := w * s.density(x, normal)
		if q-q != 0 && err == nil {
			err = fmt.Errorf("handover: the source of sheet %s, a %T, does not tell its two sides at %v; give an Evaluator", name, src, x)
		}
		s.charge += q
		b.moment = r3.Add(b.moment, r3.Scale(q, r3.Sub(x, b.centre)))
	})
	if err != nil {
		return err
	}
	b.total += b.charge(s.charge)
	return b.addSkin(Group{Part: name, Place: "sheet", Form: Sheet}, s)
}

// jump returns the density of a charged sheet: how far g.n jumps across it. It is NaN where the source knows no face.
func jump(src field.Source, size float64) func(x, n r3.Vec) float64 {
	return func(x, n r3.Vec) float64 {
		at := field.PointsOf(x)
		at.Slack = []float64{64 * 0x1p-53 * (r3.Norm(x) + size)} // nodes of a turned sheet are rounded
		out, in := field.NewValues(1, field.WantG), field.NewValues(1, field.WantG)
		field.Evaluate(src, out, at, field.Outside)
		field.Evaluate(src, in, at, field.Inside)
		if out.Status[0] != field.OnFace {
			return math.NaN()
		}
		return r3.Dot(n, r3.Sub(out.At(0).G, in.At(0).G))
	}
}
