// Package law checks a source of static field against the laws of that field, with no reference values.
//
// Any field.Source can be checked, of this library or not:
//
//	err := law.Source(src, law.Claims{Clear: distance, Total: &law.Total{Charge: q}, Faces: faces})
//
// The error joins one *Violation for each law broken: the law as a sentence, the input, what came out, what should
// have, the tolerance and where it comes from, and the seed that repeats the run. What a claim leaves open is not
// checked; nil means that every law that could be tried held.
//
// Units and frame are those of the source. Everything follows from Claims.Seed; nothing is random beyond it. The
// package calls the source from one goroutine; it does not look for data races (go test -race does).
package law

import (
	"errors"
	"fmt"
	"math"
	"math/rand/v2"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// Claims is what is known about a source. The zero value fits a source with a method Bounds that tells a box of some
// size, and checks what holds for all sources.
type Claims struct {
	// Bounds is a box outside which there is no charge. Zero: the source's own Bounds, else those of Bodies.
	Bounds r3.Box
	// Region is where points are taken. Zero: Bounds and its diagonal all around. Needed where Bounds has no size.
	Region r3.Box
	// Bodies hold all the charge. Only their Bounds are used, to tell where there is none.
	Bodies []geom.Body
	// Clear returns a lower bound for the distance of x from all charge: faces, charged volumes, points. Zero where
	// nothing is known. nil: the distance from the boxes of Bodies, else from Bounds.
	Clear func(x r3.Vec) float64
	// Total is the net charge and the moment; nil if not known.
	Total *Total
	// Faces are points on charged faces; see FacesOf.
	Faces []Face
	// Order is the power with which |g| falls far away: 2 with net charge, 3 with a moment. Zero: any integer from 2.
	Order int
	// Accuracy is the error of g relative to max(|g|, 1e-3 g0 min(1, (a/R)^Order)), g0 the largest |g| on the sphere
	// R = 1.25 a round the bounds; of phi relative to that times R. Default 1e-10; range 1e-13 to 1e-3.
	Accuracy float64
	// Potential says that the source must offer its potential. If false, what is offered is checked all the same.
	Potential bool
	// Samples is the number of empty balls in which the field is checked. Default 24.
	Samples int
	// Seed selects the points.
	Seed uint64
}

// Total is the integral of the charge and its first moment about a point. Units: density times area; times length.
type Total struct {
	Charge float64
	Moment *r3.Vec // nil: not known
	About  r3.Vec  // to which Moment refers
}

// Source checks src against the laws, and returns nil or the joined violations. Of each law it reports the first three
// and the number of the others. Claims that cannot be used give an error that is no *Violation.
func Source(src field.Source, c Claims) error {
	k, err := newKit(src, c)
	if err != nil {
		return err
	}
	k.repeat() // first: it keeps the answers that are asked for again at the end
	k.badInput()
	k.farField()
	k.enclosed()
	for _, b := range k.balls() {
		k.ball(b)
	}
	k.largeLoops()
	k.paths()
	for _, f := range k.Faces {
		k.face(f)
	}
	k.batch()
	k.repeated()
	return k.result()
}

// kit is one run.
type kit struct {
	Claims
	src    field.Source
	eval   field.Evaluator // nil if src is none
	phi    bool            // the potential is offered
	rng    *rand.Rand
	centre r3.Vec
	size   float64 // bounding radius a of the charge; if it has none, 1/64 of that of the region
	g0     float64
	order  float64 // power of the far field: claimed, else measured and rounded
	first  memory
	broken []broken
}

type broken struct {
	law   Law
	first []error
	more  int
}

func newKit(src field.Source, c Claims) (*kit, error) {
	k := &kit{Claims: c, src: src}
	k.eval, _ = src.(field.Evaluator)
	if k.Accuracy == 0 {
		k.Accuracy = 1e-10
	}
	if !(k.Accuracy >= 1e-13 && k.Accuracy <= 1e-3) {
		return nil, fmt.Errorf("law: accuracy %v is outside 1e-13 to 1e-3; claim what the source should hold", k.Accuracy)
	}
	if k.Samples <= 0 {
		k.Samples = 24
	}
	k.rng = rand.New(rand.NewPCG(c.Seed, 0x1aa))
	if k.Bounds == (r3.Box{}) {
		if b, ok := field.BoundsOf(src); ok {
			k.Bounds = b
		} else if len(c.Bodies) > 0 {
			k.Bounds = union(c.Bodies)
		}
	}
	half := r3.Scale(0.5, r3.Sub(k.Bounds.Max, k.Bounds.Min))
	k.centre = r3.Add(k.Bounds.Min, half)
	k.size = r3.Norm(half)
	if !(k.size >= 0) || math.IsInf(k.size, 0) {
		return nil, fmt.Errorf("law: bounds %v of the charge are not a finite box; give Claims.Bounds", k.Bounds)
	}
	if k.Region == (r3.Box{}) {
		if k.size == 0 {
			return nil, errors.New("law: the bounds of the charge have no size, so there is no scale of length; give Claims.Region")
		}
		d := r3.Vec{X: 2 * k.size, Y: 2 * k.size, Z: 2 * k.size}
		k.Region = r3.Box{Min: r3.Sub(k.Bounds.Min, d), Max: r3.Add(k.Bounds.Max, d)}
	}
	reach := r3.Norm(r3.Sub(k.Region.Max, k.Region.Min)) / 2
	if !(reach > 0) || math.IsInf(reach, 0) {
		return nil, fmt.Errorf("law: region %v is not a finite box; give Claims.Region with Min below Max", k.Region)
	}
	k.size = max(k.size, reach/64)
	for i, f := range k.Faces {
		if n := r3.Norm(f.Normal); !(math.Abs(n-1) < 1e-9) {
			return nil, fmt.Errorf("law: normal %v of face point %d has length %v; give a unit vector", f.Normal, i, n)
		}
	}
	k.scales()
	return k, nil
}

// scales measures g0, and finds out whether the potential is offered.
func (k *kit) scales() {
	var x []r3.Vec
	for range 64 {
		x = append(x, k.around(1.25))
	}
	v := k.values(x, field.WantPhi|field.WantG, field.Mean)
	for i := range x {
		if g := r3.Norm(v.At(i).G); g > k.g0 && !math.IsInf(g, 0) {
			k.g0 = g
		}
		if v.Status[i] != field.NoPotential {
			k.phi = true
		}
	}
	if k.Potential && !k.phi {
		k.fail(Offered, x[:1], field.NoPotential, "a potential", "no tolerance")
	}
}

// values evaluates src.
func (k *kit) values(x []r3.Vec, want field.Want, side field.Side) *field.Values {
	v := field.NewValues(len(x), want)
	field.Evaluate(k.src, v, field.PointsOf(x...), side)
	return v
}

// floor returns the size below which g at x is held to no relative accuracy.
func (k *kit) floor(x r3.Vec) float64 {
	q := min(1, k.size/r3.Norm(r3.Sub(x, k.centre)))
	return 1e-3 * k.g0 * math.Pow(q, max(2, k.order))
}

// phiFloor returns the size below which phi at x is held to no relative accuracy.
func (k *kit) phiFloor(x r3.Vec) float64 {
	return k.floor(x) * max(k.size, r3.Norm(r3.Sub(x, k.centre)))
}

// clear returns a lower bound for the distance of x from all charge.
func (k *kit) clear(x r3.Vec) float64 {
	switch {
	case k.Clear != nil:
		return max(k.Clear(x), toBox(k.Bounds, x))
	case len(k.Bodies) > 0:
		d := math.Inf(1)
		for _, b := range k.Bodies {
			d = min(d, toBox(b.Bounds(), x))
		}
		return d
	}
	return toBox(k.Bounds, x)
}

// toBox returns the distance of x from a box, zero inside.
func toBox(b r3.Box, x r3.Vec) float64 {
	d := func(x, lo, hi float64) float64 { return max(lo-x, x-hi, 0) }
	return r3.Norm(r3.Vec{X: d(x.X, b.Min.X, b.Max.X), Y: d(x.Y, b.Min.Y, b.Max.Y), Z: d(x.Z, b.Min.Z, b.Max.Z)})
}

func union(bodies []geom.Body) r3.Box {
	box := bodies[0].Bounds()
	for _, body := range bodies[1:] {
		b := body.Bounds()
		box.Min = r3.Vec{X: min(box.Min.X, b.Min.X), Y: min(box.Min.Y, b.Min.Y), Z: min(box.Min.Z, b.Min.Z)}
		box.Max = r3.Vec{X: max(box.Max.X, b.Max.X), Y: max(box.Max.Y, b.Max.Y), Z: max(box.Max.Z, b.Max.Z)}
	}
	return box
}
