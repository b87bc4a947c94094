package force

import (
	"context"
	"errors"
	"math"
	"strings"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/element"
	"example.com/boundpole/field/image"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

func near(a, b r3.Vec, tol float64) bool { return r3.Norm(r3.Sub(a, b)) <= tol*r3.Norm(b) }

func on(t testing.TB, c *bound.Charge, by field.Source, s *Settings) Result {
	t.Helper()
	r, err := On(context.Background(), c, by, s)
	if err != nil {
		t.Fatal(err)
	}
	return r
}

// TestConstant: a uniform field does not push a neutral body, exactly, and turns it by p x g.
func TestConstant(t *testing.T) {
	p, g := r3.Vec{X: 1, Y: -2, Z: 0.5}, r3.Vec{X: 0.3, Y: 0.1, Z: -0.7}
	c := uniform(t, geom.At(geom.Cylinder{Radius: 0.5, Height: 2}, geom.Translate(r3.Vec{X: 5})), p)
	r := on(t, c, field.Constant{G: g}, nil)
	m := r3.Scale(math.Pi/2, p)
	if r.Force != (r3.Vec{}) {
		t.Errorf("force %v, want exactly zero", r.Force)
	}
	if !near(r.Torque, r3.Cross(m, g), 1e-15) || math.Abs(r.Energy+r3.Dot(m, g)) > 1e-15*r3.Norm(m) { // a few roundings
		t.Errorf("torque %v, want %v; energy %v, want %v", r.Torque, r3.Cross(m, g), r.Energy, -r3.Dot(m, g))
	}
}

// TestSums: the force by several parts is the sum, the part itself is left out, and factors and images count.
func TestSums(t *testing.T) {
	z := r3.Vec{Z: 1}
	a := uniform(t, geom.At(geom.Box{Size: r3.Vec{X: 1, Y: 1, Z: 1}}, geom.Translate(r3.Vec{Z: 1.5})), z)
	b := uniform(t, geom.Box{Size: r3.Vec{X: 1, Y: 1, Z: 1}}, z)
	c := uniform(t, geom.At(geom.Sphere{Radius: 0.5}, geom.Translate(r3.Vec{X: 2})), z)
	one, two := on(t, a, b, nil), on(t, a, c, nil)
	got := on(t, a, bound.Assembly{{Charge: a}, {Charge: b}, {Source: field.Scaled{Source: c, Factor: -2}}}, nil)
	want := r3.Sub(one.Force, r3.Scale(2, two.Force))
	if !near(got.Force, want, 2e-6) { // each asked for 1e-6
		t.Errorf("force %v, want %v", got.Force, want)
	}
}

// TestPointsAndSheets: a charged disc in the field of a point is pushed like the point by the disc; so is a body by points and dipoles.
func TestPointsAndSheets(t *testing.T) {
	disc := geom.Disc{Radius: 1}
	src, err := element.NewDisc(disc, 1.5)
	if err != nil {
		t.Fatal(err)
	}
	q := element.Point{At: r3.Vec{X: 0.4, Y: 0.1, Z: 0.3}, Charge: 0.7}
	set := &Settings{Accuracy: 1e-10, About: r3.Vec{X: 1, Y: 2, Z: 3}}
	a, err := OnSheet(context.Background(), disc, func(r3.Vec) float64 { return 1.5 }, q, set)
	if err != nil {
		t.Fatal(err)
	}
	b, err := OnPoint(q, src, set)
	if err != nil {
		t.Fatal(err)
	}
	const tol = 2e-10 // asked for 1e-10
	if !near(r3.Scale(-1, a.Force), b.Force, tol) || !near(r3.Scale(-1, a.Torque), b.Torque, tol) || math.Abs(a.Energy-b.Energy) > tol*math.Abs(b.Energy) {
		t.Errorf("disc by point %v %v %v, point by disc %v %v %v", a.Force, a.Torque, a.Energy, b.Force, b.Torque, b.Energy)
	}
	body := uniform(t, geom.At(geom.Cylinder{Radius: 0.5, Height: 0.5}, geom.Translate(r3.Vec{Z: 1})), r3.Vec{X: 1, Z: 1})
	d := element.Dipole{At: r3.Vec{X: 0.1, Z: -0.2}, Moment: r3.Vec{X: 1, Y: 2, Z: -1}}
	for _, by := range []field.Source{q, d} {
		exact := on(t, body, by, set)
		hidden := on(t, body, veiled{by}, set) // integrated
		if !near(hidden.Force, exact.Force, tol) || !near(hidden.Torque, exact.Torque, tol) || math.Abs(hidden.Energy-exact.Energy) > tol*math.Abs(exact.Energy) {
			t.Errorf("%T: integrated %v %v %v, by reaction %v %v %v", by, hidden.Force, hidden.Torque, hidden.Energy, exact.Force, exact.Torque, exact.Energy)
		}
	}
}

// veiled is a source of unknown type.
type veiled struct{ field.Source }

func (v veiled) Evaluate(dst *field.Values, at *field.Points, side field.Side) {
	field.Evaluate(v.Source, dst, at, side)
}

// plain is a source that offers nothing but its field.
type plain struct{ src field.Source }

func (p plain) Field(x r3.Vec) r3.Vec { return p.src.Field(x) }

// TestPlain: without potential and estimates force and torque come without a claim, and the energy is NaN.
func TestPlain(t *testing.T) {
	a := uniform(t, geom.At(geom.Box{Size: r3.Vec{X: 1, Y: 1, Z: 1}}, geom.Translate(r3.Vec{Z: 1.5})), r3.Vec{X: 1, Z: 1})
	b := uniform(t, geom.Cylinder{Radius: 0.7, Height: 1}, r3.Vec{Z: 1})
	want := on(t, a, b, &Settings{Accuracy: 1e-9})
	got := on(t, a, plain{b}, &Settings{Accuracy: 1e-8})
	if !near(got.Force, want.Force, 2e-8) || !near(got.Torque, want.Torque, 2e-8) { // asked for 1e-8
		t.Errorf("force %v, want %v; torque %v, want %v", got.Force, want.Force, got.Torque, want.Torque)
	}
	if !math.IsInf(got.Error.Force, 1) || !math.IsNaN(got.Energy) {
		t.Errorf("error %v, want +Inf; energy %v, want NaN", got.Error.Force, got.Energy)
	}
}

// TestOverlap: bodies that stand in each other are named with a place; a body in a cavity and bodies that touch are not refused.
func TestOverlap(t *testing.T) {
	z := r3.Vec{Z: 1}
	box := uniform(t, geom.Box{Size: r3.Vec{X: 1, Y: 1, Z: 1}}, z)
	for name, c := range map[string]*bound.Charge{
		"corner":   uniform(t, geom.At(geom.Box{Size: r3.Vec{X: 1, Y: 1, Z: 1}}, geom.Translate(r3.Vec{X: 0.999, Y: 0.999, Z: 0.999})), z),
		"cylinder": uniform(t, geom.At(geom.Cylinder{Radius: 0.2, Height: 5}, geom.Translate(r3.Vec{X: 0.6})), z),
		"inside":   uniform(t, geom.Sphere{Radius: 0.1}, z),
		"same":     uniform(t, geom.Box{Size: r3.Vec{X: 1, Y: 1, Z: 1}}, z),
	} {
		_, err := On(context.Background(), c, box, nil)
		if !errors.Is(err, ErrOverlap) || !strings.Contains(err.Error(), "box about (0, 0, 0)") {
			t.Errorf("%s: error %v, want ErrOverlap that names the box", name, err)
		}
	}
	shell := uniform(t, geom.HollowSphere{Inner: 2, Outer: 3}, z)
	if r := on(t, box, shell, nil); r3.Norm(r.Force) > 1e-12 { // no field in the cavity of a uniform shell
		t.Errorf("force %v in a hollow sphere, want 0", r.Force)
	}
	for name, c := range map[string]*bound.Charge{
		"face":   uniform(t, geom.At(geom.Box{Size: r3.Vec{X: 1, Y: 1, Z: 1}}, geom.Translate(r3.Vec{Z: 1})), z),
		"edge":   uniform(t, geom.At(geom.Box{Size: r3.Vec{X: 1, Y: 1, Z: 1}}, geom.Translate(r3.Vec{X: 1, Z: 1})), z),
		"corner": uniform(t, geom.At(geom.Box{Size: r3.Vec{X: 1, Y: 1, Z: 1}}, geom.Translate(r3.Vec{X: 1, Y: 1, Z: 1})), z),
		"deep":   uniform(t, geom.At(geom.Box{Size: r3.Vec{X: 1, Y: 1, Z: 1}}, geom.Translate(r3.Vec{Z: 1 - 1e-11})), z),
	} {
		if r := on(t, c, box, nil); !(r3.Norm(r.Force) > 0.001) {
			t.Errorf("%s: force %v", name, r.Force)
		}
	}
}

// TestTouching: a gap that closes, poses that were rounded and a turn in the plane of contact all lead to the same limit. For the ends
// of bars of length 40 the pull is p^2 A/2 but for the far ends ([Maxwell1873] art. 642).
func TestTouching(t *testing.T) {
	bar := func(foot float64, turn geom.Pose) *bound.Charge {
		return uniform(t, geom.At(geom.Box{Size: r3.Vec{X: 1, Y: 1, Z: 40}}, turn.Then(geom.Translate(r3.Vec{Z: foot + 20}))), r3.Vec{Z: 1})
	}
	turn, err := geom.Turn(r3.Vec{Z: 1}, 90)
	if err != nil {
		t.Fatal(err)
	}
	below := bar(-40, geom.Pose{})
	want := on(t, bar(0, geom.Pose{}), below, nil).Force.Z
	if math.Abs(want+0.5) > 1e-3 { // far ends: 1/(4 pi 40^2) and twice 1/(4 pi 80^2)
		t.Errorf("pull %v, want about -1/2", want)
	}
	for _, foot := range []float64{1e-12, -1e-12, -3e-11} {
		p := bar(foot, turn)
		set := Settings{Accuracy: 1e-6, MaxNodes: 400_000}
		o, err := acting(p, below, set)
		if err != nil {
			t.Fatal(err)
		}
		if got := o.total.force().Z; math.Abs(got-want) > 1e-6 { // asked for 1e-6
			t.Errorf("at %v: %v, want %v", foot, got, want)
		}
	}
}

// TestBeforePlane: a box before iron is pulled like by its mirror twin, with half the energy; in contact too.
func TestBeforePlane(t *testing.T) {
	iron := image.Iron(r3.Vec{}, r3.Vec{Z: 1})
	for _, h := range []float64{0, 0.3} {
		box := uniform(t, geom.At(geom.Box{Size: r3.Vec{X: 1, Y: 0.8, Z: 0.6}}, geom.Translate(r3.Vec{Z: 0.3 + h})), r3.Vec{X: 0.5, Z: 1})
		twin := uniform(t, geom.At(geom.Box{Size: r3.Vec{X: 1, Y: 0.8, Z: 0.6}}, geom.Translate(r3.Vec{Z: -0.3 - h})), r3.Vec{X: -0.5, Z: 1})
		got, err := BeforePlane(context.Background(), box, iron, nil)
		if err != nil {
			t.Fatal(err)
		}
		want := on(t, box, twin, nil)
		if !near(got.Force, want.Force, 1e-12) || !near(got.Torque, want.Torque, 1e-11) || math.Abs(2*got.Energy-want.Energy) > 1e-12*math.Abs(want.Energy) { // closed forms
			t.Errorf("at %v: %v %v %v, want %v %v %v", h, got.Force, got.Torque, got.Energy, want.Force, want.Torque, want.Energy/2)
		}
		p, ok := partOf(box)
		if !ok {
			t.Fatal("no charts")
		}
		o := apart(image.Image{Source: box, Plane: iron}, box)
		out, err := faces(context.Background(), &p, &o[0], goal{accuracy: 1e-6}, Settings{MaxNodes: 400_000})
		if err != nil || !near(out.total.force(), want.Force, 1e-6) { // asked for 1e-6
			t.Errorf("at %v by faces: %v, want %v; %v", h, out.total.force(), want.Force, err)
		}
	}
	low := uniform(t, geom.At(geom.Box{Size: r3.Vec{X: 1, Y: 0.8, Z: 0.6}}, geom.Translate(r3.Vec{Z: 0.2})), r3.Vec{Z: 1})
	if _, err := BeforePlane(context.Background(), low, iron, nil); !errors.Is(err, ErrOverlap) {
		t.Errorf("a box through the plane: error %v, want ErrOverlap", err)
	}
}

func TestRefusals(t *testing.T) {
	c := uniform(t, geom.Sphere{Radius: 1}, r3.Vec{Z: 1})
	for _, s := range []Settings{{Accuracy: 1}, {Accuracy: -1}, {Accuracy: math.NaN()}, {MaxNodes: 3}, {About: r3.Vec{X: math.Inf(1)}}} {
		if _, err := On(context.Background(), c, c, &s); err == nil {
			t.Errorf("%+v was not refused", s)
		}
	}
	if _, err := On(context.Background(), nil, c, nil); err == nil {
		t.Error("nil charge was not refused")
	}
	if _, err := OnPoint(element.Point{Charge: 1}, element.Point{Charge: 1}, nil); err == nil {
		t.Error("a point on a point was not refused")
	}
	done, cancel := context.WithCancel(context.Background())
	cancel()
	far := uniform(t, geom.At(geom.Cone{Bottom: 1, Top: 0.2, Height: 1}, geom.Translate(r3.Vec{X: 2.05})), r3.Vec{X: 1})
	box := uniform(t, geom.Box{Size: r3.Vec{X: 2, Y: 2, Z: 2}}, r3.Vec{X: 1})
	if _, err := On(done, far, box, &Settings{Accuracy: 1e-9}); !errors.Is(err, context.Canceled) {
		t.Errorf("error %v, want that of the context", err)
	}
	if _, err := On(context.Background(), far, box, &Settings{Accuracy: 1e-13, MaxNodes: 2000}); !errors.Is(err, ErrNotConverged) {
		t.Errorf("error %v, want ErrNotConverged", err)
	}
}

// TestDipolePair checks the pair sums against energies of moved dipoles and against OnDipole.
func TestDipolePair(t *testing.T) {
	a := element.Dipole{At: r3.Vec{X: 0.3, Y: 0.2, Z: 1}, Moment: r3.Vec{X: 1, Y: -2, Z: 0.5}}
	b := element.Dipole{Moment: r3.Vec{X: 0.2, Y: 0.4, Z: -1}}
	about := r3.Vec{X: 1, Y: 1}
	s := between(&dipoles{[]r3.Vec{a.At}, []r3.Vec{a.Moment}}, &dipoles{[]r3.Vec{b.At}, []r3.Vec{b.Moment}}, about, true)
	want, err := OnDipole(a, b, &Settings{About: about})
	if err != nil {
		t.Fatal(err)
	}
	if !near(s.force(), want.Force, 1e-14) || !near(s.torque(), want.Torque, 1e-14) || math.Abs(s.v[atEnergy]-want.Energy) > 1e-14 { // a few roundings
		t.Errorf("pair %v %v %v, dipole %v %v %v", s.force(), s.torque(), s.v[atEnergy], want.Force, want.Torque, want.Energy)
	}
}

// TestDeterminism: the same bits twice.
func TestDeterminism(t *testing.T) {
	a := uniform(t, geom.At(geom.Cone{Bottom: 0.5, Top: 0.3, Height: 1}, geom.Translate(r3.Vec{X: 0.1, Z: 1.2})), r3.Vec{X: 1, Z: 1})
	b := uniform(t, geom.Box{Size: r3.Vec{X: 1, Y: 1, Z: 1}}, r3.Vec{Z: 1})
	if one, two := on(t, a, b, nil), on(t, a, b, nil); one != two {
		t.Errorf("%+v, then %+v", one, two)
	}
}
