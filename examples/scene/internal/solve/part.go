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
	"example.com/boundpole/magnet/grade"
	"gonum.org/v1/gonum/spatial/r3"
)

// made is a part in its own frame, built once for all its copies: as given, and reversed when a copy asks for it.
type made struct {
	part     int
	kind     Kind
	body     geom.Body
	sheet    geom.Sheet
	charge   [2]*bound.Charge   // as given, reversed
	law      field.Polarization // of a body, before scaling
	singular singular
	proven   float64
	material grade.Material // of a magnet with a grade
	chi      *float64
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
	m.responds(part)
	var err error
	switch {
	case part.Polarized != nil:
		m.kind = Polarized
		err = m.polarize(part, part.Polarized)
		at += "/polarized"
	case part.Magnetized != nil:
		m.kind = Magnetized
		at += "/magnetized"
		if part.Magnetized.Grade != "" {
			m.material, err = part.Magnetized.Data.At(s.Scene.Temperature)
			if err != nil {
				return nil, s.Scene.ErrorAt(at+"/grade", plainWords(err), "")
			}
		}
		err = m.polarize(part, part.Magnetized)
	case part.Circulating != nil:
		m.kind = Circulating
		err = m.bind(part, field.Uniform{P: r3.Vec{Z: *part.Circulating}})
		at += "/circulating"
	case part.Charged != nil:
		m.kind = Charged
		err = m.give(part)
		at += "/charged"
	}
	var placed *fault
	switch {
	case errors.As(err, &placed):
		return nil, s.Scene.ErrorAt(at+placed.under, placed.problem, placed.remedy)
	case err != nil:
		return nil, s.Scene.ErrorAt(at, plainWords(err), "")
	}
	return m, nil
}

// responds takes over how a part responds.
func (m *made) responds(part *scenefile.Part) {
	switch {
	case part.Permittivity != nil:
		chi := float64(*part.Permittivity) - 1
		m.chi, m.kind = &chi, Polarized
	case part.Permeability != nil:
		chi := float64(*part.Permeability) - 1
		m.chi, m.kind = &chi, Magnetized
	}
}

// fault is an error that knows its place below the key of what the part carries.
type fault struct{ under, problem, remedy string }

func (f *fault) Error() string { return f.problem + "; " + f.remedy }

// errOverflow is what is wrong with a polarization or charge whose numbers are finite each, but not together.
var errOverflow = errors.New("what the part carries overflows float64, its scale included; give smaller numbers")

// polarize computes the bound charge of a body, or the moment of a point.
func (m *made) polarize(part *scenefile.Part, p *scenefile.Polarization) error {
	if m.body == nil {
		m.moment = r3.Scale(part.Scale, *p.Moment)
		m.peak = r3.Norm(m.moment)
		return finite(m.peak)
	}
	if p.Grade != "" {
		br := r3.Scale(m.material.Br.Value(), r3.Unit(direction(*p.Along)))
		return m.bind(part, field.Uniform{P: magnet.Remanence(br)})
	}
	return m.bind(part, polarizationOf(p))
}

// bind computes the bound charge of a body for a law, as given and reversed.
func (m *made) bind(part *scenefile.Part, law field.Polarization) error {
	m.law = law
	if m.singular = singularOf(m.body, m.law); m.singular.met && m.singular.power < 0 {
		return m.singular.fault()
	}
	m.peak = math.Abs(part.Scale) * largest(m.body, m.law)
	m.proven = proven(m.body, m.law)
	if err := finite(m.peak); err != nil {
		return err
	}
	for k, sign := range [2]float64{part.Scale, -part.Scale} {
		if k == 1 && (part.Copies == nil || !part.Copies.Alternate) {
			break
		}
		var err error
		m.charge[k], err = bound.Of(m.body, field.Times{Polarization: m.law, Factor: sign})
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
	lo, hi := densities(m.sheet, m.density, m.gradient)
	m.peak = max(math.Abs(lo), math.Abs(hi))
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

// plainWords returns an error of the library without the name of the package in front.
func plainWords(err error) string {
	text := err.Error()
	for _, name := range []string{"geom: ", "bound: ", "charge: ", "element: ", "field: ", "grade: ", "magnet: ", "image: ", "force: ", "flux: ", "current: ", "handover: ", "response: "} {
		text = strings.TrimPrefix(text, name)
	}
	return text
}

// place puts a made part at a pose.
func (s *Setup) place(m *made, name string, pose geom.Pose, sign float64) {
	p := Part{Name: name, Of: m.part, Kind: m.kind, Peak: m.peak, Pose: pose, Centre: pose.Origin().Value(),
		Density: sign * m.density, Gradient: r3.Scale(sign, m.gradient), Point: sign * m.point,
		Moment: pose.VectorToOuter(r3.Scale(sign, m.moment)), proven: closed}
	switch {
	case m.body != nil:
		p.Local = m.body.Bounds()
		p.Body = geom.At(m.body, pose)
		c := m.charge[0]
		if sign < 0 {
			c = m.charge[1]
		}
		if m.chi != nil {
			p.chi, p.law, p.factor, p.proven = m.chi, m.law, sign*s.Scene.Parts[m.part].Scale, math.Inf(1)
		} else if c != nil {
			p.Charge = c.At(pose)
			p.Body = p.Charge.Body()
			p.Member = bound.Member{Charge: p.Charge}
			p.law, p.factor, p.singular, p.proven = m.law, sign*s.Scene.Parts[m.part].Scale, m.singular, m.proven
			p.material = m.material
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
