package solve

import (
	"context"
	"errors"
	"math"

	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/field"
	"example.com/boundpole/field/current"
	"example.com/boundpole/field/flux"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"example.com/boundpole/magnet"
	"gonum.org/v1/gonum/spatial/r3"
)

// linkage answers the flux linkage of a coil: the loop integral of A for bodies and dipoles, the flux through an area within
// the coil for images, and the applied field times the area.
func (s *Setup) linkage(ctx context.Context, l *scenefile.Linkage) (*Answer, error) {
	a := &Answer{Quantities: []Quantity{number("linkage", "Wb", 0, 0)}}
	curve, area, err := coil(l)
	if err != nil {
		return a, err
	}
	n2 := s.perMetre * s.perMetre
	var sum, estimate, size float64
	add := func(factor, value, err float64) {
		sum, estimate, size = sum+factor*value, estimate+math.Abs(factor*err), size+math.Abs(factor*value)
	}
	var failed error
	for i := range s.Parts {
		p := &s.Parts[i]
		src, factor, err := s.currentOf(p)
		if err != nil {
			return a, err
		}
		if src == nil {
			continue
		}
		value, e, err := current.LoopIntegral(ctx, src, curve, min(s.Scene.Accuracy, 1e-3)/4)
		add(factor, value, e)
		if err != nil {
			failed = err
		}
	}
	if r := s.response(Magnetized); r != nil {
		if s.crosses(area, r) {
			return a, errors.New("the coil reaches into a part that responds; lead it round the part")
		}
		for _, face := range area {
			got, err := flux.Through(ctx, r.response, face, field.Mean, flux.Settings{Accuracy: max(s.Scene.Accuracy/4, 1e-8)})
			add(magnet.Mu0/n2, got.Value, got.Estimate)
			if err != nil {
				failed = err
			}
		}
	}
	if images := s.images(s.poles(), Magnetized); s.Magnetic && images != nil {
		for _, face := range area {
			r, err := flux.Through(ctx, images, face, field.Mean, flux.Settings{Accuracy: s.Scene.Accuracy / 4})
			add(magnet.Mu0/n2, r.Value, r.Estimate)
			if err != nil {
				failed = err
			}
		}
	}
	if b := s.Scene.Applied; b != nil && b.B != nil {
		add(1/n2, r3.Dot(*b.B, areaOf(l)), 0)
	}
	a.Quantities[0] = number("linkage", "Wb", l.Turns*sum, l.Turns*(estimate+0x1p-50*size))
	a.Missed = estimate > s.Scene.Accuracy*max(math.Abs(sum), floorShare*size)
	return a, failed
}

// crosses reports whether an area passes through a body that responds.
func (s *Setup) crosses(area []geom.Charted, r *responding) (hit bool) {
	for _, face := range area {
		face.Nodes(24, func(x, _ r3.Vec, _ float64) {
			for _, i := range r.parts {
				hit = hit || s.Parts[i].Body.Locate(pair.VecOf(x), 0).Region == geom.Inside
			}
		})
	}
	return hit
}

// poles returns all magnetized parts without their images.
func (s *Setup) poles() field.Sum {
	var all field.Sum
	for i := range s.Parts {
		if p := &s.Parts[i]; p.Kind == Magnetized && p.chi == nil {
			all = append(all, p.source())
		}
	}
	return all
}

// currentOf returns what makes the vector potential of a part, nil for nothing, and what its loop integral is multiplied with
// to be in webers.
func (s *Setup) currentOf(p *Part) (current.Source, float64, error) {
	n2 := s.perMetre * s.perMetre
	switch {
	case p.chi != nil:
		return nil, 0, nil
	case p.Kind == Circulating:
		g, err := current.NewGuide(p.Body, p.factor*p.law.At(r3.Vec{}).Z)
		return g, 1 / s.perMetre, err
	case p.Kind == Magnetized && p.Charge != nil:
		b, err := current.Of(p.Body, field.Times{Polarization: p.law, Factor: p.factor})
		return b, magnet.Mu0 / n2, err
	case p.Kind == Magnetized:
		m := r3.Scale(s.perMetre*s.perMetre*s.perMetre, p.Moment)
		return dipole{p.Centre, m}, magnet.Mu0 / n2, nil
	}
	return nil, 0, nil
}

// coil returns the curve of a coil and an area within it, in pieces.
func coil(l *scenefile.Linkage) (current.Curve, []geom.Charted, error) {
	if c := l.Circle; c != nil {
		turn, err := geom.Frame(direction(c.Normal), r3.Vec{})
		if err != nil {
			return nil, nil, err
		}
		pose := turn.Then(geom.Translate(c.Centre))
		return current.Circle{Radius: c.Radius, Pose: pose}, []geom.Charted{geom.SheetAt(geom.Disc{Radius: c.Radius}, pose)}, nil
	}
	var area []geom.Charted
	for i := 1; i+1 < len(l.Polygon); i++ {
		corners := []r3.Vec{l.Polygon[0], l.Polygon[i], l.Polygon[i+1]}
		if r3.Norm(r3.Cross(r3.Sub(corners[1], corners[0]), r3.Sub(corners[2], corners[0]))) > 0 {
			area = append(area, geom.Polygon{Vertices: corners})
		}
	}
	return current.Path(l.Polygon), area, nil
}

// areaOf returns the vector area of a coil.
func areaOf(l *scenefile.Linkage) r3.Vec {
	if c := l.Circle; c != nil {
		return r3.Scale(math.Pi*c.Radius*c.Radius, r3.Unit(direction(c.Normal)))
	}
	var area r3.Vec
	for i, a := range l.Polygon {
		b := l.Polygon[(i+1)%len(l.Polygon)]
		area = r3.Add(area, r3.Scale(0.5, r3.Cross(r3.Sub(a, l.Polygon[0]), r3.Sub(b, l.Polygon[0]))))
	}
	return area
}

// dipole is a point dipole as a current: a = m x r/(4 pi r^3).
type dipole struct{ at, moment r3.Vec }

// Induction computes the arrays of dst; see current.Source.
func (d dipole) Induction(dst *current.Values, at *field.Points, _ field.Side) {
	current.Fill(dst, at, func(p field.Point) current.Value {
		r := p.X.Sub(pair.VecOf(d.at)).Value()
		n := r3.Norm(r)
		if n == 0 {
			nan := math.NaN()
			return current.Value{A: r3.Vec{X: nan, Y: nan, Z: nan}, ErrA: math.Inf(1), Status: field.AtPoint}
		}
		u := r3.Scale(1/n, r)
		a := r3.Scale(1/(4*math.Pi*n*n), r3.Cross(d.moment, u))
		return current.Value{A: a, ErrA: 0x1p-49 * r3.Norm(d.moment) / (4 * math.Pi * n * n)} // a dozen roundings
	})
}
