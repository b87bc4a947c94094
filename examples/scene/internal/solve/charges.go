package solve

import (
	"math"

	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// PartCharge is what one part carries, in SI: C or A m, per square and cubic metre, C m or A m^2.
type PartCharge struct {
	Part   int
	Faces  []FaceCharge
	Volume float64 // m^3; 0 for sheets and points
	Solid  bool    // the part has a volume
	Inside float64 // charge of the volume
	Min    float64 // extremes of the volume density
	Max    float64
	// Infinite names the place, "axis" or "centre", where the volume density is infinite, and so one extreme; "" for none.
	Infinite string
	Total    float64
	Moment   r3.Vec  // scene frame; about the part's centre if not neutral
	Scale    float64 // sum of the magnitudes of the charges: what cancels
	Checked  []bound.Identity
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
		case p.induced != nil:
			out[i] = s.responseCharge(p, i)
		case p.Charge != nil:
			out[i] = s.bodyCharge(p)
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

// rightAngle is what the rounding of a normal that is kept in pairs of float64 leaves of p.n where both are at right angles.
const rightAngle = 0x1p-100

// bodyCharge converts the bound charge of a body.
func (s *Setup) bodyCharge(p *Part) PartCharge {
	c := p.Charge
	n, n2, n3 := s.perMetre, s.perMetre*s.perMetre, s.perMetre*s.perMetre*s.perMetre
	out := PartCharge{Solid: true, Total: c.Total() / n2, Moment: over(c.Moment, n3), Checked: c.Identities}
	for i := range c.Layers {
		y := &c.Layers[i]
		f := FaceCharge{Face: y.Face.Name, Area: y.Area / n2, Charge: y.Charge / n2, Min: y.Min, Max: y.Max}
		if size := max(math.Abs(f.Min), math.Abs(f.Max)); size <= rightAngle*p.Peak {
			f.Charge, f.Min, f.Max = 0, 0, 0
		}
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
	if _, linear := degreeOf(p.law); !linear { // summed over points: symmetric bodies leave roundings
		size := p.Peak * out.Volume
		out.Moment = r3.Vec{X: clean(out.Moment.X, size), Y: clean(out.Moment.Y, size), Z: clean(out.Moment.Z, size)}
	}
	if p.singular.met && p.singular.coefficient*p.factor != 0 {
		out.unbounded(p, n)
	}
	out.Scale += math.Abs(out.Inside)
	if len(c.Identities) > 0 { // the first says that the total is zero; one face may carry both signs
		out.Scale = max(out.Scale, c.Identities[0].Scale/n2)
	}
	return out
}

// unbounded sets what a volume density that is infinite at one place gives: the extreme there, that at the farthest point,
// and the charge, which no rule of points finds to the last digit, from the flux of p through the faces.
func (c *PartCharge) unbounded(p *Part, perMetre float64) {
	c.Infinite = p.singular.place
	rho := -p.factor * p.law.Divergence(r3.Vec{X: extent(p.Charge.Body(), c.Infinite)}) * perMetre
	c.Min, c.Max = rho, math.Inf(1)
	if rho < 0 {
		c.Min, c.Max = math.Inf(-1), rho
	}
	c.Inside, c.Total = 0, 0
	for _, f := range c.Faces {
		c.Inside -= f.Charge
	}
}

// extent returns the greatest distance of a body from its axis or its centre; of shapes that are not round about that, over
// a sample of the faces.
func extent(body geom.Body, from string) float64 {
	if at, ok := body.(geom.Placed); ok {
		body = at.Body
	}
	switch b := body.(type) {
	case geom.Cylinder:
		return b.Radius
	case geom.Arc:
		return b.Outer
	case geom.Sphere:
		return b.Radius
	}
	far := 0.0
	for _, f := range body.Faces() {
		f.Surface.Nodes(8, func(x, _ r3.Vec, _ float64) {
			if from == "axis" {
				x.Z = 0
			}
			far = max(far, r3.Norm(x))
		})
	}
	return far
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
	f := FaceCharge{Face: "sheet", Area: sheet.Area() / n2}
	f.Min, f.Max = densities(sheet, p.Density, p.Gradient)
	density := func(x r3.Vec) float64 { return p.Density + r3.Dot(p.Gradient, x) }
	var q, size, arm float64
	var m, n r3.Vec
	sheet.Nodes(4, func(x, normal r3.Vec, w float64) {
		q += w * density(x)
		size, arm = size+math.Abs(w*density(x)), arm+math.Abs(w*density(x))*r3.Norm(x)
		m = r3.Add(m, r3.Scale(w*density(x), x))
		n = normal
	})
	n = r3.Add(p.Pose.VectorToOuter(n), r3.Vec{})
	f.Normal, f.Charge = &n, clean(q, size)/n2
	m = r3.Vec{X: clean(m.X, arm), Y: clean(m.Y, arm), Z: clean(m.Z, arm)}
	return PartCharge{Faces: []FaceCharge{f}, Total: f.Charge, Scale: size / n2, Moment: over(p.Pose.VectorToOuter(m), n3)}
}

// densities returns the extremes of a + b.x over a sheet: at corners, or at the two ends of a diameter along b.
func densities(sheet geom.Sheet, a float64, b r3.Vec) (lo, hi float64) {
	var round float64
	switch s := sheet.(type) {
	case geom.Polygon:
		lo, hi = math.Inf(1), math.Inf(-1)
		for _, v := range s.Vertices {
			d := a + r3.Dot(b, v)
			lo, hi = min(lo, d), max(hi, d)
		}
		return lo, hi
	case geom.Disc:
		round = s.Radius
	case geom.Annulus:
		round = s.Outer
	}
	swing := round * math.Hypot(b.X, b.Y)
	return a - swing, a + swing
}

// clean returns exactly zero for what only rounding has left of a sum whose terms have the magnitude size.
func clean(v, size float64) float64 {
	if math.Abs(v) <= 64*0x1p-53*size {
		return 0
	}
	return v
}

func over(v r3.Vec, n float64) r3.Vec { return r3.Vec{X: v.X / n, Y: v.Y / n, Z: v.Z / n} }
