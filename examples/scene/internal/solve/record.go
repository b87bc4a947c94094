package solve

import (
	"context"
	"math"
	"runtime"
	"sync"

	"example.com/boundpole/charge"
	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"example.com/boundpole/magnet"
	"gonum.org/v1/gonum/spatial/r3"
)

// Record is what the scene gives at one point, in SI.
type Record struct {
	X        r3.Vec // metres
	Inside   int    // first part that contains the point, -1 if none
	Electric charge.Reading
	Magnetic magnet.Reading
	Guide    Guide
	Status   field.Status
	Note     string         // why values do not exist, where the status does not say so
	Missed   []string       // names of the values that did not reach the wanted accuracy
	ByPart   []Contribution // if asked for
	Gradient *Gradient      // if asked for
}

// Guide is the vector potential of the circulating parts.
type Guide struct {
	A      r3.Vec  // T m, Coulomb gauge
	ErrA   float64 // bound on the numerical error
	Status field.Status
}

// Contribution is the field of one part alone.
type Contribution struct {
	Part int
	V    float64
	E, D r3.Vec
	Vm   float64
	H, B r3.Vec
	A    r3.Vec
}

// How many points are evaluated at a time; the result does not depend on it. It is few where a part is integrated, so that all
// processors have work.
const (
	chunkSize  = 1024
	chunkOfFew = 4
)

// Records calls visit for every point of a point request, in order. Points are evaluated in parallel, chunk by chunk; when
// ctx is done it stops between chunks and returns its error.
func (s *Setup) Records(ctx context.Context, q *scenefile.Request, visit func(i int, rec *Record) error) error {
	n := q.Count()
	point := pointOf(q)
	side := SideOf(q.Side)
	size := chunkSize
	if s.slow {
		size = chunkOfFew
	}
	stride := size * runtime.GOMAXPROCS(0)
	recs := make([]Record, min(stride, n))
	for lo := 0; lo < n; lo += stride {
		if ctx.Err() != nil {
			return ctx.Err()
		}
		hi := min(lo+stride, n)
		clear(recs)
		var wait sync.WaitGroup
		for a := lo; a < hi; a += size {
			b := min(a+size, hi)
			wait.Go(func() { s.fill(recs[a-lo:b-lo], batch(point, a, b), side, q) })
		}
		wait.Wait()
		for i := range hi - lo {
			if err := visit(lo+i, &recs[i]); err != nil {
				return err
			}
		}
	}
	return nil
}

// SideOf returns the side that a request names.
func SideOf(s scenefile.Side) field.Side {
	switch s {
	case "inside":
		return field.Inside
	case "outside":
		return field.Outside
	}
	return field.Mean
}

// fill evaluates one chunk.
func (s *Setup) fill(recs []Record, at *field.Points, side field.Side, q *scenefile.Request) {
	ways := s.ways(at, side)
	if s.Electric {
		for i, v := range s.electric.ReadingsTowards(at, side, ways) {
			recs[i].Electric = v
		}
	}
	if s.Magnetic {
		for i, v := range s.magnetic.ReadingsTowards(at, side, ways) {
			recs[i].Magnetic = v
		}
	}
	if s.Guiding {
		for i, v := range s.guided(s.guides, at, side, ways) {
			recs[i].Guide = v
		}
	}
	for i := range recs {
		rec := &recs[i]
		var way r3.Vec
		if ways != nil {
			way = ways[i]
		}
		rec.X = s.metres(at.Vec(i))
		rec.Inside = s.inside(at.At(i), side, way)
		rec.Status = max(rec.Electric.Status, rec.Magnetic.Status, rec.Guide.Status)
		s.addContent(rec, at.Slice(i, i+1), side, way)
		s.blank(rec, at.Vec(i))
		s.judge(rec, at.Vec(i), side)
		if q.ByPart {
			rec.ByPart = s.contributions(at.Slice(i, i+1), side, ways, i)
		}
	}
	if q.Gradient {
		s.gradients(recs, at, side, ways)
	}
}

// guided returns A of circulating parts: g of the charge M_A.n on the ends, and M_A itself in the bore.
func (s *Setup) guided(parts bound.Assembly, at *field.Points, side field.Side, ways []r3.Vec) []Guide {
	v := parts.Sample(at, side, ways, field.WantG|field.WantErr, r3.Vec{})
	out := make([]Guide, at.Len())
	for i := range out {
		one := v.Values.At(i)
		out[i] = Guide{A: r3.Add(one.G, v.P[i]), ErrA: one.ErrG + 0x1p-53*r3.Norm(v.P[i]), Status: one.Status}
	}
	return out
}

// blank takes away what a plane hides: behind it the image means nothing.
func (s *Setup) blank(rec *Record, x r3.Vec) {
	nan := math.NaN()
	none := r3.Vec{X: nan, Y: nan, Z: nan}
	if s.Electric && s.hidden(x, Charged) {
		rec.Electric.V, rec.Electric.E, rec.Electric.D, rec.Note = nan, none, none, "behind a plane"
	}
	if s.Magnetic && s.hidden(x, Magnetized) {
		rec.Magnetic.Vm, rec.Magnetic.H, rec.Magnetic.B, rec.Note = nan, none, none, "behind a plane"
	}
}

// State says what a record's values are worth, "" where they are regular.
func (r *Record) State() string {
	switch {
	case r.Note != "":
		return r.Note
	case r.Status == field.Regular:
		return ""
	}
	return r.Status.String()
}

// metres converts a vector from the unit of the file; division by an exact number rounds once.
func (s *Setup) metres(v r3.Vec) r3.Vec { return over(v, s.perMetre) }

// ways returns, where a side is wanted, the direction of that side at every point, decided by the first part in file order
// that has a face there, whatever its kind; nil for the mean.
func (s *Setup) ways(at *field.Points, side field.Side) []r3.Vec {
	if side == field.Mean {
		return nil
	}
	ways := make([]r3.Vec, at.Len())
	for i := range ways {
		ways[i], _ = s.places.Way(at.At(i), side)
	}
	return ways
}

// inside returns the first part in file order that contains a point: on a face the part for side Inside, else none.
func (s *Setup) inside(p field.Point, side field.Side, way r3.Vec) int {
	_, first := s.places.ContentTowards(p, way)
	if side != field.Outside || first < 0 {
		return first
	}
	for i := first; i < len(s.Parts); i++ { // what lies outside one face may lie inside another that touches it
		if b := s.Parts[i].Body; b != nil && b.Locate(p.X, p.Slack).Region == geom.Inside {
			return i
		}
	}
	return -1
}

// contributions returns the field of every part that makes one, alone, at one point.
func (s *Setup) contributions(at *field.Points, side field.Side, ways []r3.Vec, i int) []Contribution {
	if ways != nil {
		ways = ways[i : i+1]
	}
	out := make([]Contribution, 0, len(s.Parts))
	for k := range s.Parts {
		p := &s.Parts[k]
		if p.induced != nil && p.induced.index(k) > 0 {
			continue // the first stands for all that respond
		}
		c := Contribution{Part: k}
		alone := bound.Assembly{p.Member}
		switch p.Kind {
		case Polarized, Charged:
			v := charge.Model{Parts: alone, Unit: s.Unit}.ReadingsTowards(at, side, ways)[0]
			c.V, c.E, c.D = v.V, v.E, v.D
		case Magnetized:
			v := magnet.Model{Parts: alone, Unit: s.Unit}.ReadingsTowards(at, side, ways)[0]
			c.Vm, c.H, c.B = v.Vm, v.H, v.B
		case Circulating:
			c.A = s.guided(alone, at, side, ways)[0].A
		default:
			continue
		}
		out = append(out, c)
	}
	return out
}

// Missing reports whether a value does not exist.
func Missing(v float64) bool { return math.IsNaN(v) || math.IsInf(v, 0) }

// MissingVec reports whether a vector does not exist: it is whole or not at all.
func MissingVec(v r3.Vec) bool { return Missing(v.X) || Missing(v.Y) || Missing(v.Z) }
