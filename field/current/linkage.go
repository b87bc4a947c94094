package current

import (
	"context"
	"errors"
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/cubature"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// ErrNotConverged is returned beside the best value where a loop integral did not reach the accuracy asked for, mostly because
// the loop touches a wire or an edge. Move the loop, cut it at the place, or ask for less.
var ErrNotConverged = errors.New("current: loop integral not converged")

// Curve is a closed curve in pieces: the integral is taken piece by piece, so that kinks belong at their ends.
type Curve interface {
	// Pieces returns the number of smooth pieces.
	Pieces() int
	// At returns the point of piece k at 0 <= t <= 1 and its derivative by t.
	At(k int, t float64) (x, dx r3.Vec)
}

// Circle is a circle run through right-handed about the z axis of its frame, which Pose takes to the outer one.
type Circle struct {
	Radius float64
	Pose   geom.Pose
}

// Pieces returns 4: quarters, so that values that jump at a plane through the axis do it between them.
func (c Circle) Pieces() int { return 4 }

// At returns a point of the circle and its derivative.
func (c Circle) At(k int, t float64) (x, dx r3.Vec) {
	const quarter = math.Pi / 2
	sin, cos := math.Sincos(quarter * t)
	e, f := r3.Vec{X: c.Radius * cos, Y: c.Radius * sin}, r3.Vec{X: -c.Radius * sin, Y: c.Radius * cos}
	for range k {
		e, f = r3.Vec{X: -e.Y, Y: e.X}, r3.Vec{X: -f.Y, Y: f.X}
	}
	return c.Pose.ToOuter(pair.VecOf(e)).Value(), c.Pose.VectorToOuter(r3.Scale(quarter, f))
}

// Path is the closed polygon through its points, back to the first.
type Path []r3.Vec

// Pieces returns the number of sides.
func (p Path) Pieces() int { return len(p) }

// At returns a point of side k and its derivative.
func (p Path) At(k int, t float64) (x, dx r3.Vec) {
	a, b := p[k], p[(k+1)%len(p)]
	d := r3.Sub(b, a)
	if t > 0.5 { // from the nearer end
		return r3.Sub(b, r3.Scale(1-t, d)), d
	}
	return r3.Add(a, r3.Scale(t, d)), d
}

// LoopIntegral returns the integral of a along a closed curve: the flux of b through it, by Stokes, and so the flux linkage of a
// loop of one turn. In SI it is multiplied by mu0; that of a Guide is the flux that circulates round the curve. Of a source without
// a vector potential package flux takes the flux through a surface.
//
// accuracy is the wanted error relative to the integral of |a| |dl|; 0 means 1e-12, the range is 1e-14 to 1e-2. The estimate
// bounds the error: that of the integration and, through their own estimates, of the values. Where a jumps across the curve,
// the interval is halved down to the jump; a curve that is cut there takes less time.
//
// It refuses an empty curve, stops with the error of ctx, and returns ErrNotConverged with the best value after 2000 intervals.
func LoopIntegral(ctx context.Context, src Source, curve Curve, accuracy float64) (value, estimate float64, err error) {
	if accuracy == 0 {
		accuracy = 1e-12
	}
	if !(accuracy >= 1e-14 && accuracy <= 1e-2) {
		return math.NaN(), math.Inf(1), fmt.Errorf("current: accuracy %v is not between 1e-14 and 1e-2; leave it 0 for 1e-12", accuracy)
	}
	if curve.Pieces() == 0 {
		return math.NaN(), math.Inf(1), errors.New("current: curve without pieces; give at least one")
	}
	l := &lineIntegral{src: src, curve: curve, values: NewValues(lineNodes)}
	l.values.BX, l.values.BY, l.values.BZ, l.values.ErrB = nil, nil, nil, nil
	var spans []span
	for k := range curve.Pieces() {
		spans = append(spans, l.span(k, 0, 1))
	}
	const most = 2000
	for len(spans) < most {
		if ctx.Err() != nil {
			return math.NaN(), math.Inf(1), fmt.Errorf("current: loop integral stopped after %d intervals: %w", len(spans), ctx.Err())
		}
		miss, size, worst := 0.0, 0.0, 0
		for i, s := range spans {
			miss, size = miss+s.miss, size+s.size
			if s.miss > spans[worst].miss {
				worst = i
			}
		}
		s := spans[worst]
		middle := 0.5 * (s.from + s.to)
		if !(miss > 0.1*accuracy*size) || !(s.from < middle && middle < s.to) || s.to-s.from < 1e-15 {
			break
		}
		spans[worst] = l.span(s.piece, s.from, middle)
		spans = append(spans, l.span(s.piece, middle, s.to))
	}
	var size, miss float64
	var sum pair.Float
	for _, s := range spans {
		sum = sum.AddFloat(s.value)
		size, miss, estimate = size+s.size, miss+s.miss, estimate+s.claim
	}
	estimate += miss + 8*u*size
	value = sum.Value()
	if !(miss <= accuracy*size) {
		err = ErrNotConverged
	}
	return value, estimate, err
}

// lineNodes is the number of points of the finer rule; the difference from the coarser one bounds the error.
const lineNodes, lineCoarse = 16, 12

// lineIntegral is one integration.
type lineIntegral struct {
	src    Source
	curve  Curve
	values *Values
	points field.Points
}

// span is an interval of a piece with its integral, the difference of two rules, the integral of |a| |dl| and of the estimates.
type span struct {
	piece             int
	from, to          float64
	value, miss, size float64
	claim             float64
}

func (l *lineIntegral) span(piece int, from, to float64) span {
	s := span{piece: piece, from: from, to: to}
	s.value, s.size, s.claim = l.rule(cubature.Legendre(lineNodes), s)
	coarse, _, _ := l.rule(cubature.Legendre(lineCoarse), s)
	s.miss = math.Abs(s.value - coarse)
	if s.value-s.value != 0 { // on a wire or an edge
		s.miss = math.Inf(1)
	}
	return s
}

// rule integrates over a span.
func (l *lineIntegral) rule(g cubature.Rule, s span) (value, size, claim float64) {
	n := len(g.X)
	p := &l.points
	p.X, p.Y, p.Z = p.X[:0], p.Y[:0], p.Z[:0]
	var along [lineNodes]r3.Vec
	middle, half := 0.5*(s.from+s.to), 0.5*(s.to-s.from)
	for i, t := range g.X {
		x, dx := l.curve.At(s.piece, middle+half*t)
		p.X, p.Y, p.Z = append(p.X, x.X), append(p.Y, x.Y), append(p.Z, x.Z)
		along[i] = r3.Scale(half*g.W[i], dx)
	}
	v := l.values.slice(0, n)
	l.src.Induction(&v, p, field.Mean)
	for i := range n {
		w := v.At(i)
		f := r3.Dot(w.A, along[i])
		value += f
		size += r3.Norm(w.A) * r3.Norm(along[i])
		claim += w.ErrA * r3.Norm(along[i])
	}
	return value, size, claim
}
