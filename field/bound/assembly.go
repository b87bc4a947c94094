package bound

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// Member is one part of an assembly: a polarized body (Charge), or any other source, with the place of its sheet if it has
// one. A body without charge or source only takes part in telling where a point is.
type Member struct {
	Charge *Charge      // bound charge of a body, or nil
	Source field.Source // what else makes the field, if Charge is nil; nil for nothing
	Sheet  geom.Sheet   // where that source is a charged sheet, or nil
	Body   geom.Body    // where a part is that carries nothing, or nil
}

// source returns what makes the field of the member.
func (m *Member) source() field.Source {
	switch {
	case m.Charge != nil:
		return m.Charge
	case m.Source != nil:
		return m.Source
	}
	return field.Sum(nil)
}

// locate tells where x lies with respect to the member; a source without a place is nowhere.
func (m *Member) locate(p field.Point) geom.Place {
	switch {
	case m.Charge != nil:
		return m.Charge.place.Locate(p.X, p.Slack)
	case m.Sheet != nil:
		return m.Sheet.Locate(p.X, p.Slack)
	case m.Body != nil:
		return m.Body.Locate(p.X, p.Slack)
	}
	return geom.Place{Face: -1}
}

// Assembly is several parts in one frame: a source whose sides are those of a place in space. A point on faces of several
// parts takes its side from the first of them: Outside is where the outward normal of that part's face points (a sheet's
// own normal), and every other part is evaluated for the same side of its own face.
type Assembly []Member

// Field returns g at x, the mean of both sides on a face.
func (a Assembly) Field(x r3.Vec) r3.Vec {
	var g r3.Vec
	for i := range a {
		g = r3.Add(g, a[i].source().Field(x))
	}
	return g
}

// Evaluate computes the arrays of dst; see field.Evaluator.
func (a Assembly) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	a.sum().Evaluate(dst, at, side)
	if side == field.Mean {
		return
	}
	for i := range at.Len() {
		p := at.At(i)
		if way, faces := a.Way(p, side); faces > 1 {
			dst.Set(i, a.towards(p, way, dst.Want()))
		}
	}
}

// Bounds returns a box that holds all charge.
func (a Assembly) Bounds() r3.Box { return a.sum().Bounds() }

func (a Assembly) sum() field.Sum {
	s := make(field.Sum, len(a))
	for i := range a {
		s[i] = a[i].source()
	}
	return s
}

// Way returns the direction in which the wanted side of a point lies and on how many parts' faces the point is. The
// direction is zero where the mean is wanted, where no part has a face there, or where the first has an edge.
func (a Assembly) Way(p field.Point, side field.Side) (way r3.Vec, faces int) {
	if side == field.Mean {
		return way, 0
	}
	for i := range a {
		place := a[i].locate(p)
		if place.Region != geom.On {
			continue
		}
		if faces == 0 {
			switch side {
			case field.Inside:
				way = r3.Scale(-1, place.Normal)
			case field.Outside:
				way = place.Normal
			}
		}
		faces++
	}
	return way, faces
}

// sideTowards returns the side of a face with normal n that lies in the direction way.
func sideTowards(n, way r3.Vec) field.Side {
	switch d := r3.Dot(n, way); {
	case d > 1e-9:
		return field.Outside
	case d < -1e-9:
		return field.Inside
	}
	return field.Mean
}

// towards evaluates one point for the side that lies in the direction way, on every part that has a face there.
func (a Assembly) towards(p field.Point, way r3.Vec, want field.Want) field.Value {
	at := &field.Points{
		X: []float64{p.X.X.Hi}, Y: []float64{p.X.Y.Hi}, Z: []float64{p.X.Z.Hi},
		XLo: []float64{p.X.X.Lo}, YLo: []float64{p.X.Y.Lo}, ZLo: []float64{p.X.Z.Lo}, Slack: []float64{p.Slack},
	}
	total, part := field.NewValues(1, want), field.NewValues(1, want)
	for k := range a {
		side := field.Mean
		if place := a[k].locate(p); place.Region == geom.On {
			side = sideTowards(place.Normal, way)
		}
		field.Evaluate(a[k].source(), part, at, side)
		total.Add(part)
	}
	return total.At(0)
}

// ContentTowards returns the sum of the polarizations at a point, and the first part that contains it, -1 if none. On faces
// it is that of the side that lies in the direction way, or the mean of both for a zero direction, which lies in no part;
// NaN components on an edge of a polarized body, where more than two values meet.
func (a Assembly) ContentTowards(p field.Point, way r3.Vec) (pol r3.Vec, inside int) {
	inside = -1
	for i := range a {
		place := a[i].locate(p)
		var share float64
		switch place.Region {
		case geom.Inside:
			share = 1
		case geom.On:
			share = shareOf(place, way)
		}
		if inside < 0 && share == 1 && a[i].Sheet == nil {
			inside = i
		}
		if c := a[i].Charge; c != nil && share != 0 {
			pol = r3.Add(pol, r3.Scale(share, c.Polarization(p.X)))
		}
	}
	return pol, inside
}

// shareOf returns how much of a body's polarization counts at a point of its surface.
func shareOf(place geom.Place, way r3.Vec) float64 {
	if place.Edge {
		return math.NaN()
	}
	switch sideTowards(place.Normal, way) {
	case field.Outside:
		return 0
	case field.Inside:
		return 1
	}
	return 0.5
}

// Sample is what an assembly gives at a batch of points.
type Sample struct {
	Values *field.Values
	P      []r3.Vec // sum of the polarizations there
	Inside []int    // first part that contains the point, -1 if none
}

// Sample evaluates the assembly in a uniform field applied from outside, and the polarization at the points. Where parts
// outside the assembly decide the side of a point, ways gives for each point the direction in which it lies (zero: the
// mean); ways is nil otherwise.
func (a Assembly) Sample(at *field.Points, side field.Side, ways []r3.Vec, want field.Want, applied r3.Vec) Sample {
	s := Sample{Values: field.NewValues(at.Len(), want), P: make([]r3.Vec, at.Len()), Inside: make([]int, at.Len())}
	a.sum().Evaluate(s.Values, at, side)
	if applied != (r3.Vec{}) {
		out := field.NewValues(at.Len(), want)
		field.Constant{G: applied}.Evaluate(out, at, side)
		s.Values.Add(out)
	}
	for i := range at.Len() {
		p := at.At(i)
		var way r3.Vec
		if ways != nil {
			way = ways[i]
		} else {
			way, _ = a.Way(p, side)
		}
		if way != (r3.Vec{}) {
			v := a.towards(p, way, want)
			v.G, v.Phi = r3.Add(v.G, applied), v.Phi-r3.Dot(applied, p.X.Value())
			s.Values.Set(i, v)
		}
		s.P[i], s.Inside[i] = a.ContentTowards(p, way)
		if math.IsNaN(s.P[i].X) {
			s.Values.Status[i] = max(s.Values.Status[i], field.OnEdge)
		}
	}
	return s
}
