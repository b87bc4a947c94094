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
	Scale   float64 // sum of the magnitudes of the charges: what cancels
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
	n, n2, n3 := s.perMetre, s.perMetre*s.perMetre, s.perMetre*s.perMetre*s.perMetre
	out := PartCharge{Solid: true, Total: c.Total() / n2, Moment: over(c.Moment, n3), Checked: c.Identities}
	for i := range c.Layers {
		y := &c.Layers[i]
		f := FaceCharge{Face: y.Face.Name, Area: y.Area / n2, Charge: y.Charge / n2, Min: y.Min, Max: y.Max}
		if y.Plane {
			n := r3.Add(y.Normal, r3.Vec{}) // no negative zeros
			f.Normal = &n
		}
		out.Faces = append(out.Faces, f)
		out.Scale += math.Abs(f.Charge)
	}
	out.Min, out.Max = math.Inf(1), math.Inf(-1)
	for _, v := range c.Volumes {
		out.Volume += v.Size / n3
		out.Inside += v.Charge / n2
		out.Min, out.Max = min(out.Min, v.Min*n), max(out.Max, v.Max*n)
	}
	out.Scale += math.Abs(out.Inside)
	if len(c.Identities) > 0 { // the first says that the total is zero; one face may carry both signs
		out.Scale = max(out.Scale, c.Identities[0].Scale/n2)
	}
	return out
}

// emptyBody is a body that carries nothing.
func (s *Setup) emptyBody(b geom.Body) PartCharge {
	n2 := s.perMetre * s.perMetre
	out := PartCharge{Solid: true, Volume: b.Volume() / (n2 * s.perMetre)}
	for _, f := range b.Faces() {
		out.Faces = append(out.Faces, FaceCharge{Face: f.Name, Area: f.Surface.Area() / n2})
	}
	return out
}

// sheetCharge integrates the density of a sheet; the moment is about the part's centre.
func (s *Setup) sheetCharge(p *Part) PartCharge {
	n2, n3 := s.perMetre*s.perMetre, s.perMetre*s.perMetre*s.perMetre
	sheet := p.Sheet.(geom.PlacedSheet).Sheet
	f := FaceCharge{Face: "sheet", Area: sheet.Area() / n2, Min: math.Inf(1), Max: math.Inf(-1)}
	density := func(x r3.Vec) float64 { return p.Density + r3.Dot(p.Gradient, x) }
	var q, size, arm float64
	var m, n r3.Vec
	sheet.Nodes(4, func(x, normal r3.Vec, w float64) {
		q += w * density(x)
		size, arm = size+math.Abs(w*density(x)), arm+math.Abs(w*density(x))*r3.Norm(x)
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
	f.Normal, f.Charge = &n, clean(q, size)/n2
	m = r3.Vec{X: clean(m.X, arm), Y: clean(m.Y, arm), Z: clean(m.Z, arm)}
	return PartCharge{Faces: []FaceCharge{f}, Total: f.Charge, Scale: size / n2, Moment: over(p.Pose.VectorToOuter(m), n3)}
}

// clean returns exactly zero for what only rounding has left of a sum whose terms have the magnitude size.
func clean(v, size float64) float64 {
	if math.Abs(v) <= 64*0x1p-53*size {
		return 0
	}
	return v
}

func over(v r3.Vec, n float64) r3.Vec { return r3.Vec{X: v.X / n, Y: v.Y / n, Z: v.Z / n} }
