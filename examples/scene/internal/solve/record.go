package solve

import (
	"math"
	"runtime"
	"sync"

	"example.com/boundpole/charge"
	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/magnet"
	"gonum.org/v1/gonum/spatial/r3"
)

// Record is what the scene gives at one point, in SI.
type Record struct {
	X        r3.Vec // metres
	Inside   int    // first part that contains the point, -1 if none
	Electric charge.Reading
	Magnetic magnet.Reading
	Status   field.Status
	ByPart   []Contribution // if asked for
}

// Contribution is the field of one part alone.
type Contribution struct {
	Part int
	V    float64
	E    r3.Vec
	Vm   float64
	H    r3.Vec
}

// chunkSize is how many points are evaluated at a time; the result does not depend on it.
const chunkSize = 2048

// Records calls visit for every point of a point request, in order. Points are evaluated in parallel, chunk by chunk.
func (s *Setup) Records(r *scenefile.Request, visit func(i int, rec *Record) error) error {
	n := r.Count()
	all := pointsOf(r)
	batch := chunkSize * runtime.GOMAXPROCS(0)
	for lo := 0; lo < n; lo += batch {
		hi := min(lo+batch, n)
		recs := make([]Record, hi-lo)
		var wait sync.WaitGroup
		for a := lo; a < hi; a += chunkSize {
			b := min(a+chunkSize, hi)
			wait.Go(func() { s.fill(recs[a-lo:b-lo], all.Slice(a, b), sideOf(r.Side), r.ByPart) })
		}
		wait.Wait()
		for i := range recs {
			if err := visit(lo+i, &recs[i]); err != nil {
				return err
			}
		}
	}
	return nil
}

func sideOf(s scenefile.Side) field.Side {
	switch s {
	case "inside":
		return field.Inside
	case "outside":
		return field.Outside
	}
	return field.Mean
}

// pointsOf returns the points of a request, in the unit of the file.
func pointsOf(r *scenefile.Request) *field.Points {
	switch r.Kind {
	case "line":
		return field.Line(r.Line.From, r.Line.To, r.Line.Count)
	case "plane":
		return field.Plane(r.Plane.Corner, r.Plane.Edge1, r.Plane.Edge2, r.Plane.Counts[0], r.Plane.Counts[1])
	case "grid":
		c := r.Grid.Counts
		return field.Grid(r3.Box{Min: r.Grid.Min, Max: r.Grid.Max}, c[0], c[1], c[2])
	}
	return field.PointsOf(r.Points...)
}

// fill evaluates one chunk.
func (s *Setup) fill(recs []Record, at *field.Points, side field.Side, byPart bool) {
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
	for i := range recs {
		p := at.At(i)
		var way r3.Vec
		if ways != nil {
			way = ways[i]
		}
		_, inside := s.places.ContentTowards(p, way)
		recs[i].X = r3.Scale(s.Unit, at.Vec(i))
		recs[i].Inside = inside
		recs[i].Status = max(recs[i].Electric.Status, recs[i].Magnetic.Status)
		if byPart {
			recs[i].ByPart = s.contributions(at.Slice(i, i+1), side, ways, i)
		}
	}
}

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

// contributions returns the field of every part alone at one point.
func (s *Setup) contributions(at *field.Points, side field.Side, ways []r3.Vec, i int) []Contribution {
	if ways != nil {
		ways = ways[i : i+1]
	}
	var out []Contribution
	for k := range s.Parts {
		p := &s.Parts[k]
		c := Contribution{Part: k}
		alone := bound.Assembly{p.Member}
		switch p.Kind {
		case Polarized, Charged:
			v := charge.Model{Parts: alone, Unit: s.Unit}.ReadingsTowards(at, side, ways)[0]
			c.V, c.E = v.V, v.E
		case Magnetized:
			v := magnet.Model{Parts: alone, Unit: s.Unit}.ReadingsTowards(at, side, ways)[0]
			c.Vm, c.H = v.Vm, v.H
		}
		out = append(out, c)
	}
	return out
}

// Missing reports whether a value of a record does not exist.
func Missing(v float64) bool { return math.IsNaN(v) || math.IsInf(v, 0) }
