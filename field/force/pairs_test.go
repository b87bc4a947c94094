package force

import (
	"context"
	"errors"
	"flag"
	"fmt"
	"math/rand/v2"
	"slices"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

var pairs = flag.Int("pairs", 50, "how many random pairs of bodies are compared both ways")
var firstPair = flag.Int("first", 0, "seed of the first of them")

// draw makes random bodies.
type draw struct{ *rand.Rand }

func (d draw) in(lo, hi float64) float64 { return lo + (hi-lo)*d.Float64() }
func (d draw) vec() r3.Vec               { return r3.Vec{X: d.in(-1, 1), Y: d.in(-1, 1), Z: d.in(-1, 1)} }

// body returns one of the shapes, of size about 1, and the height of its lowest point in its own frame.
func (d draw) body() (geom.Body, string) {
	l := func() float64 { return d.in(0.3, 1.2) }
	switch d.IntN(11) {
	case 0:
		return geom.Box{Size: r3.Vec{X: l(), Y: l(), Z: l()}}, "box"
	case 1:
		r := l() / 2
		return geom.Cylinder{Radius: r, Height: l()}, "cylinder"
	case 2:
		r := l() / 2
		return geom.Tube{Inner: r * d.in(0.2, 0.8), Outer: r, Height: l()}, "tube"
	case 3:
		r := l()
		return geom.ArcDegrees(r*d.in(0.3, 0.8), r, l(), 0, d.in(30, 200)), "arc"
	case 4:
		return geom.Cone{Bottom: l() / 2, Top: l() / 3, Height: l()}, "cone"
	case 5:
		r := l() / 2
		return geom.Torus{Major: r, Minor: r * d.in(0.2, 0.7)}, "torus"
	case 6:
		return geom.Sphere{Radius: l() / 2}, "sphere"
	case 7:
		r := l() / 2
		return geom.HollowSphere{Inner: r * d.in(0.2, 0.8), Outer: r}, "hollow sphere"
	case 8:
		return geom.Ellipsoid{SemiAxes: r3.Vec{X: l() / 2, Y: l() / 2, Z: l() / 2}}, "ellipsoid"
	case 9:
		a, b, c := l(), l(), l()
		return geom.Prism{Base: [][2]float64{{0, 0}, {a, 0}, {d.in(-0.3, 0.3), b}}, Height: c}, "prism"
	}
	v := []r3.Vec{{}, {X: l()}, {Y: l()}, {Z: l()}}
	return geom.Polyhedron{Vertices: v, Loops: [][]int{{0, 2, 1}, {0, 1, 3}, {1, 2, 3}, {0, 3, 2}}}, "tetrahedron"
}

func (d draw) polarization(kind string) (field.Polarization, string) {
	if d.IntN(3) > 0 || kind == "cone" || kind == "torus" || kind == "ellipsoid" {
		return field.Uniform{P: d.vec()}, "uniform"
	}
	a := field.Affine{Value: d.vec()}
	for i := range a.Gradient {
		for j := range a.Gradient[i] {
			a.Gradient[i][j] = d.in(-1, 1)
		}
	}
	return a, "affine"
}

// pairCase is two bodies that do not overlap.
type pairCase struct {
	name    string
	a, b    *bound.Charge
	contact bool
}

// pair draws two bodies and puts the first above the second at a random distance, or into contact.
func (d draw) pair() (c pairCase, err error) {
	ba, na := d.body()
	bb, nb := d.body()
	pa, ka := d.polarization(na)
	pb, kb := d.polarization(nb)
	gaps := []float64{0, 0.02, 0.1, 0.3, 1, 3, 10, 100, 1e4}
	space := gaps[d.IntN(len(gaps))]
	c.contact = space == 0
	turnA, err := geom.Turn(r3.Vec{Z: 1}, d.in(0, 360))
	if err != nil {
		return c, err
	}
	turnB := geom.Pose{}
	if !c.contact {
		if turnA, err = geom.Turn(d.vec(), d.in(0, 360)); err != nil {
			return c, err
		}
		if turnB, err = geom.Turn(d.vec(), d.in(0, 360)); err != nil {
			return c, err
		}
	}
	placedB := geom.At(bb, turnB)
	boxA, boxB := geom.At(ba, turnA).Bounds(), placedB.Bounds()
	shift := r3.Vec{X: d.in(-0.3, 0.3), Y: d.in(-0.3, 0.3), Z: boxB.Max.Z - boxA.Min.Z + space}
	c.name = fmt.Sprintf("%s %s over %s %s at %g", ka, na, kb, nb, space)
	if c.a, err = bound.Of(geom.At(ba, turnA.Then(geom.Translate(shift))), pa); err != nil {
		return c, err
	}
	c.b, err = bound.Of(placedB, pb)
	return c, err
}

// TestPairs compares the force of a on b with that of b on a, each integrated over the body that it acts on, in random pairs of all
// shapes: action and reaction agree within the estimates, and so do torque about a common point and energy.
//
//	go test ./field/force -run TestPairs -pairs 1000 -timeout 2h
func TestPairs(t *testing.T) {
	n := *pairs
	if testing.Short() {
		n = min(n, 10)
	}
	var ratios []float64
	for seed := *firstPair; seed < *firstPair+n; seed++ {
		d := draw{rand.New(rand.NewPCG(uint64(seed), 7))}
		c, err := d.pair()
		if err != nil {
			t.Fatal(seed, c.name, err)
		}
		set := Settings{Accuracy: 1e-6, About: d.vec(), MaxNodes: 60_000, Overlaps: true}
		one, err := acting(c.a, c.b, set)
		if err != nil {
			t.Error(seed, c.name, err)
			continue
		}
		two, err := acting(c.b, c.a, set)
		if err != nil {
			t.Error(seed, c.name, err)
			continue
		}
		two = two.reaction()
		free, err := On(context.Background(), c.a, c.b, &Settings{Accuracy: 1e-6, About: set.About, MaxNodes: 60_000, Overlaps: true})
		if err != nil && !errors.Is(err, ErrNotConverged) {
			t.Error(seed, c.name, err)
		}
		third := outcome{error: free.Error.quad()}
		third.total.push(free.Force, free.Torque, free.Energy)
		for _, q := range [2]*outcome{&two, &third} {
			miss := one.total.distance(&q.total, 1, false)
			for k, what := range [3]string{"force", "torque", "energy"} {
				bound := one.error[k] + q.error[k]
				if !(miss[k] <= bound) {
					t.Errorf("seed %d, %s: %s differs by %.3g, estimates %.3g and %.3g, sizes %.3g", seed, c.name, what, miss[k], one.error[k], q.error[k], one.total.values(1, false)[k])
				}
				if bound > 0 {
					ratios = append(ratios, bound/max(miss[k], 0x1p-53*bound))
				}
			}
		}
		if testing.Verbose() {
			t.Logf("%d %s: |F| %.3g, estimates %.2g %.2g %.2g of it, nodes %d %d %d", seed, c.name, r3.Norm(free.Force),
				one.error[0]/r3.Norm(free.Force), two.error[0]/r3.Norm(free.Force), third.error[0]/r3.Norm(free.Force), one.nodes, two.nodes, free.Nodes)
		}
	}
	slices.Sort(ratios)
	if len(ratios) > 0 {
		t.Logf("sum of the estimates over the difference: least %.3g, median %.3g", ratios[0], ratios[len(ratios)/2])
	}
}

// acting integrates over the faces of a in the field of b, whatever else would do.
func acting(a, b *bound.Charge, set Settings) (outcome, error) {
	p, ok := partOf(a)
	if !ok {
		return outcome{}, errors.New("no charts")
	}
	o := other{src: b, factor: 1, charge: b}
	return faces(context.Background(), &p, &o, goal{accuracy: set.Accuracy}, set)
}
