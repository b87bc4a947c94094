package solve

import (
	"math"

	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// PartCharge is what one part carries, in SI: C or A m, per square and cubic metre, C m or A m^2.
type PartCharge struct {
	Part    int
	Faces   []FaceCharge
	Volume  float64 // m^3; 0 for sheets and points
	Solid   bool    // the part has a volume
	Inside  float64 // charge of the volume
	Min     float64 // extremes of the volume density
	Max     float64
	Total   float64
	Moment  r3.Vec  // scene frame; about the part's centre if not neutral
	Scale   float64 // sum of the magnitudes of the charges
	Checked []bound.Identity
}

// FaceCharge is what one face carries.
type FaceCharge struct {
	Face     string
	Area     float64
	Normal   *r3.Vec // scene frame; nil where the face is not flat
	Charge   float64
	Min, Max float64 // extremes of the density
}

// Charges returns what every part carries.
func (s *Setup) Charges() []PartCharge {
	out := make([]PartCharge, len(s.Parts))
	for i := range s.Parts {
		p := &s.Parts[i]
		switch {
		case p.Charge != nil:
			out[i] = s.bodyCharge(p.Charge)
		case p.Sheet != nil:
			out[i] = s.sheetCharge(p)
		case p.Body != nil:
			out[i] = s.emptyBody(p.Body)
		default:
			out[i] = PartCharge{Total: p.Point, Moment: p.Moment, Scale: math.Abs(p.Point)}
		}
		out[i].Part = i
	}
	return out
}

// bodyCharge converts the bound charge of a body.
func (s *Setup) bodyCharge(c *bound.Charge) PartCharge {
	l, l2, l3 := s.Unit, s.Unit*s.Unit, s.Unit*s.Unit*s.Unit
	out := PartCharge{Solid: true, Total: c.Total() * l2, Moment: r3.Scale(l3, c.Moment), Checked: c.Identities}
	for i := range c.Layers {
		y := &c.Layers[i]
		f := FaceCharge{Face: y.Face.Name, Area: y.Area * l2, Charge: y.Charge * l2, Min: y.Min, Max: y.Max}
		if y.Plane {
			n := r3.Add(y.Normal, r3.Vec{}) // no negative zeros
			f.Normal = &n
		}
		out.Faces = append(out.Faces, f)
		out.Scale += math.Abs(f.Charge)
	}
	out.Min, out.Max = math.Inf(1), math.Inf(-1)
	for _, v := range c.Volumes {
		out.Volume += v.Size * l3
		out.Inside += v.Charge * l2
		out.Min, out.Max = min(out.Min, v.Min/l), max(out.Max, v.Max/l)
	}
	out.Scale += math.Abs(out.Inside)
	return out
}

// emptyBody is a body that carries nothing.
func (s *Setup) emptyBody(b geom.Body) PartCharge {
	l2 := s.Unit * s.Unit
	out := PartCharge{Solid: true, Volume: b.Volume() * l2 * s.Unit}
	for _, f := range b.Faces() {
		out.Faces = append(out.Faces, FaceCharge{Face: f.Name, Area: f.Surface.Area() * l2})
	}
	return out
}

// sheetCharge integrates the density of a sheet; the moment is about the part's centre.
func (s *Setup) sheetCharge(p *Part) PartCharge {
	l2, l3 := s.Unit*s.Unit, s.Unit*s.Unit*s.Unit
	sheet := p.Sheet.(geom.PlacedSheet).Sheet
	f := FaceCharge{Face: "sheet", Area: sheet.Area() * l2, Min: math.Inf(1), Max: math.Inf(-1)}
	density := func(x r3.Vec) float64 { return p.Density + r3.Dot(p.Gradient, x) }
	var q float64
	var m, n r3.Vec
	sheet.Nodes(4, func(x, normal r3.Vec, w float64) {
		q += w * density(x)
		m = r3.Add(m, r3.Scale(w*density(x), x))
		n = normal
	})
	see := func(x r3.Vec) { f.Min, f.Max = min(f.Min, density(x)), max(f.Max, density(x)) }
	if poly, ok := sheet.(geom.Polygon); ok {
		for _, v := range poly.Vertices {
			see(v)
		}
	} else {
		see(r3.Vec{})
	}
	n = r3.Add(p.Pose.VectorToOuter(n), r3.Vec{})
	f.Normal, f.Charge = &n, q*l2
	return PartCharge{Faces: []FaceCharge{f}, Total: f.Charge, Scale: math.Abs(f.Charge),
		Moment: p.Pose.VectorToOuter(r3.Scale(l3, m))}
}
