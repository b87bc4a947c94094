package current_test

import (
	"encoding/json"
	"math"
	"math/rand/v2"
	"os"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/current"
	"example.com/boundpole/geom"
	"example.com/boundpole/verify/law"
	"example.com/boundpole/verify/refcase"
	"gonum.org/v1/gonum/spatial/r3"
)

// referenceCurrent is a free current with values to 25 digits (testdata/gen.py).
type referenceCurrent struct {
	Kind, Name string
	Radius     float64
	Points     [][3]float64
	Closed     bool
	Values     []struct {
		X    [3]float64
		A, B [3]string
		Grad [6]string
	}
}

func references(t *testing.T) []referenceCurrent {
	t.Helper()
	raw, err := os.ReadFile("testdata/reference.json")
	if err != nil {
		t.Fatal(err)
	}
	var file struct{ Cases []referenceCurrent }
	if err := json.Unmarshal(raw, &file); err != nil {
		t.Fatal(err)
	}
	return file.Cases
}

func (r *referenceCurrent) build(t *testing.T) current.Free {
	t.Helper()
	var src current.Free
	var err error
	switch r.Kind {
	case "loop":
		src, err = current.NewLoop(geom.Disc{Radius: r.Radius}, 1)
	case "wire":
		var p []r3.Vec
		for _, x := range r.Points {
			p = append(p, refcase.Vec(x))
		}
		src, err = current.NewWire(p, r.Closed, 1)
	}
	if err != nil {
		t.Fatal(err)
	}
	return src
}

// off returns |got - want| and |want|.
func off(got []float64, want []string) (miss, size float64) {
	for i, g := range got {
		miss = math.Hypot(miss, refcase.Difference(g, want[i]))
		size = math.Hypot(size, refcase.Difference(0, want[i]))
	}
	return miss, size
}

func list(v r3.Vec) []float64 { return []float64{v.X, v.Y, v.Z} }

// frobenius weighs the six components of a symmetric tensor.
func frobenius(got [6]float64, want [6]string) (miss, size float64) {
	for i, g := range got {
		w := 1.0
		if i > 2 {
			w = math.Sqrt2
		}
		miss = math.Hypot(miss, w*refcase.Difference(g, want[i]))
		size = math.Hypot(size, w*refcase.Difference(0, want[i]))
	}
	return miss, size
}

// holdReference holds a, b, the gradient and the estimates against the values of the wanted kind.
func holdReference(t *testing.T, kind string, tolA, tolB, tolGrad float64) {
	n := 0
	for _, r := range references(t) {
		if r.Kind != kind {
			continue
		}
		src := r.build(t)
		var worst [3]float64
		var over []float64
		for _, c := range r.Values {
			n++
			x := refcase.Vec(c.X)
			v := current.At(src, x, field.Mean)
			g := field.At(src, x, field.Mean, field.WantG|field.WantGrad|field.WantErr)
			if g.G != v.B || src.Field(x) != v.B {
				t.Errorf("%s %s at %v: b is %v, %v and %v", kind, r.Name, x, v.B, g.G, src.Field(x))
			}
			hold := func(k int, what string, miss, size, claim, tol float64) {
				if !(miss <= claim) {
					t.Errorf("%s %s at %v: %s misses by %.3g, estimate %.3g", kind, r.Name, x, what, miss, claim)
				}
				if size == 0 {
					return
				}
				over = append(over, claim/max(miss, u*size))
				worst[k] = max(worst[k], miss/size)
				if !(miss <= tol*size) && !(kind == "wire" && miss <= claim) {
					t.Errorf("%s %s at %v: %s misses by %.3g of %.3g", kind, r.Name, x, what, miss, size)
				}
			}
			miss, size := off(list(v.A), c.A[:])
			hold(0, "a", miss, size, v.ErrA, tolA)
			miss, size = off(list(v.B), c.B[:])
			hold(1, "b", miss, size, v.ErrB, tolB)
			miss, size = frobenius(g.Grad, c.Grad)
			hold(2, "grad b", miss, size, g.ErrGrad, tolGrad)
		}
		t.Logf("%s %s: worst of a %.2g, of b %.2g, of its gradient %.2g; median overestimate %.3g", kind, r.Name,
			worst[0], worst[1], worst[2], median(over))
		if m := median(over); m > 100 {
			t.Errorf("%s %s: median overestimate %.3g, want at most 100", kind, r.Name, m)
		}
	}
	if n < 40 {
		t.Fatalf("%d reference values of kind %s, want at least 40", n, kind)
	}
}

func median(v []float64) float64 {
	rest := append([]float64(nil), v...)
	for range len(rest) / 2 { // few enough
		k := 0
		for i := range rest {
			if rest[i] > rest[k] {
				k = i
			}
		}
		rest[k] = rest[len(rest)-1]
		rest = rest[:len(rest)-1]
	}
	m := 0.0
	for _, x := range rest {
		m = max(m, x)
	}
	return m
}

// TestLoopReference: twice the worst measured.
func TestLoopReference(t *testing.T) { holdReference(t, "loop", 3e-15, 5e-15, 1e-14) }

// TestWireReference: relative to b; where the segments cancel, the estimate is what is claimed.
func TestWireReference(t *testing.T) { holdReference(t, "wire", 1e-13, 1e-13, 1e-13) }

// TestOnWire asks for values on the wires themselves, and of points that are not finite.
func TestOnWire(t *testing.T) {
	loop, err := current.NewLoop(geom.Disc{Radius: 5, Z: 1}, 2)
	if err != nil {
		t.Fatal(err)
	}
	square, err := current.NewWire([]r3.Vec{{}, {X: 1}, {X: 1, Y: 1}, {Y: 1}}, true, 2)
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range []struct {
		src current.Free
		x   r3.Vec
	}{{loop, r3.Vec{X: 3, Y: 4, Z: 1}}, {square, r3.Vec{X: 0.25}}, {square, r3.Vec{X: 1, Y: 1}}} {
		if v := current.At(c.src, c.x, field.Mean); v.Status != field.AtPoint || !math.IsNaN(v.A.X) || !math.IsNaN(v.B.X) || !math.IsInf(v.ErrB, 1) {
			t.Errorf("%T on the wire at %v: %+v", c.src, c.x, v)
		}
		if v := current.At(c.src, r3.Vec{X: math.NaN()}, field.Mean); v.Status != field.BadInput || !math.IsNaN(v.A.Z) {
			t.Errorf("%T at NaN: %+v", c.src, v)
		}
		if v := field.At(c.src, r3.Vec{X: 9}, field.Mean, field.WantPhi|field.WantG); v.Status != field.NoPotential || !math.IsNaN(v.Phi) || v.G.Z == 0 {
			t.Errorf("%T has a potential: %+v", c.src, v)
		}
	}
}

// TestRefused demands an error for every kind of bad number.
func TestRefused(t *testing.T) {
	nan := math.NaN()
	for name, err := range map[string]error{
		"radius":      second(current.NewLoop(geom.Disc{Radius: -1}, 1)),
		"current":     second(current.NewLoop(geom.Disc{Radius: 1}, nan)),
		"one point":   second(current.NewWire([]r3.Vec{{}}, false, 1)),
		"two closed":  second(current.NewWire([]r3.Vec{{}, {X: 1}}, true, 1)),
		"same point":  second(current.NewWire([]r3.Vec{{}, {X: 1}, {X: 1}}, false, 1)),
		"repeated":    second(current.NewWire([]r3.Vec{{}, {X: 1}, {Y: 1}, {}}, true, 1)),
		"not finite":  second(current.NewSegment(r3.Vec{}, r3.Vec{X: nan}, 1)),
		"infinite":    second(current.NewSegment(r3.Vec{}, r3.Vec{X: 1}, math.Inf(1))),
		"no height":   second(current.NewSolenoid(geom.Cylinder{Radius: 1}, 1)),
		"density":     second(current.NewSolenoid(geom.Cylinder{Radius: 1, Height: 1}, nan)),
		"no body":     second(current.Of(nil, sheared)),
		"magnetized":  second(current.Of(geom.Sphere{Radius: 1}, field.Uniform{P: r3.Vec{X: nan}})),
		"round bore":  second(current.NewGuide(geom.Sphere{Radius: 1}, 1)),
		"flux":        second(current.NewGuide(geom.Cylinder{Radius: 1, Height: 1}, nan)),
		"wedge":       second(current.NewArcGuide(geom.ArcDegrees(0, 1, 1, 0, 90), geom.Pose{}, 1)),
		"arc flux":    second(current.NewArcGuide(geom.ArcDegrees(0.5, 1, 1, 0, 90), geom.Pose{}, nan)),
		"thick":       second(current.NewThickGuide(geom.Tube{Inner: 1, Outer: 1, Height: 1}, geom.Pose{}, 1)),
		"thick flux":  second(current.NewThickGuide(geom.Tube{Inner: 1, Outer: 2, Height: 1}, geom.Pose{}, nan)),
		"tilted ends": second(current.NewGuide(geom.Prism{Base: [][2]float64{{0, 0}, {1, 0}, {0, 1}}, Height: 2, TopSlope: [2]float64{0.1, 0}}, 1)),
	} {
		if err == nil {
			t.Errorf("%s was accepted", name)
		}
	}
}

func second[T any](_ T, err error) error { return err }

// TestSolenoid holds the solenoid against the magnet that it stands for and its sheet against Ampere's law: b inside less b
// outside is the density.
func TestSolenoid(t *testing.T) {
	shape := geom.Cylinder{Radius: 0.75, Height: 2}
	s, err := current.NewSolenoid(shape, 3)
	if err != nil {
		t.Fatal(err)
	}
	// many loops: the sheet as the trapezoid rule of 2 n loops, error of the order of 1/n^2 of the density near the ends
	rng := rand.New(rand.NewPCG(3, 4))
	for range 10 {
		x := r3.Vec{X: 2*rng.Float64() - 1, Y: 2*rng.Float64() + 1, Z: 2*rng.Float64() - 1}
		var a, b r3.Vec
		const n = 400
		for k := range n {
			l, err := current.NewLoop(geom.Disc{Radius: 0.75, Z: -1 + (float64(k)+0.5)*2/n}, 3*2.0/n)
			if err != nil {
				t.Fatal(err)
			}
			v := current.At(l, x, field.Mean)
			a, b = r3.Add(a, v.A), r3.Add(b, v.B)
		}
		v := current.At(s, x, field.Mean)
		if d := r3.Norm(r3.Sub(v.A, a)); d > 3e-5*r3.Norm(a) { // h^2/24 of the second derivative, h = 1/200
			t.Errorf("a at %v: %v, by loops %v", x, v.A, a)
		}
		if d := r3.Norm(r3.Sub(v.B, b)); d > 3e-5*r3.Norm(b) {
			t.Errorf("b at %v: %v, by loops %v", x, v.B, b)
		}
		g := field.At(s, x, field.Mean, field.WantGrad|field.WantErr).Grad
		const h = 0x1p-13
		up, down := s.Field(r3.Add(x, r3.Vec{Z: h})), s.Field(r3.Sub(x, r3.Vec{Z: h}))
		slope := r3.Scale(0.5/h, r3.Sub(up, down))
		if d := r3.Norm(r3.Sub(slope, r3.Vec{X: g[4], Y: g[5], Z: g[2]})); d > 1e-6 { // h^2 of the third derivative, about 10
			t.Errorf("gradient at %v off by %.3g", x, d)
		}
	}
	wall := r3.Vec{X: 0.75, Z: 0.3}
	in, out := current.At(s, wall, field.Inside), current.At(s, wall, field.Outside)
	if d := r3.Sub(in.B, out.B); in.Status != field.OnFace || math.Abs(d.Z-3) > 1e-14 || math.Hypot(d.X, d.Y) > 1e-14 {
		t.Errorf("jump across the sheet %v, want 3 z; %v", d, in.Status)
	}
	if v := current.At(s, r3.Vec{X: 0.3, Z: 1}, field.Mean); v.Status != field.Regular {
		t.Errorf("the open end is %v", v.Status)
	}
	rim := current.At(s, r3.Vec{X: 0.75, Z: 1}, field.Mean)
	if rim.Status != field.OnEdge || !math.IsNaN(rim.B.X) || !(rim.A.Y > 0) {
		t.Errorf("rim: %+v", rim)
	}
}

// TestLaws holds free currents against the laws of a field without charge.
func TestLaws(t *testing.T) {
	room := r3.Box{Min: r3.Vec{X: -3, Y: -3, Z: -3}, Max: r3.Vec{X: 3, Y: 3, Z: 3}}
	loop, err := current.NewLoop(geom.Disc{Radius: 1}, 2)
	if err != nil {
		t.Fatal(err)
	}
	wire, err := current.NewWire([]r3.Vec{{X: 1}, {Y: 1}, {X: -1}, {Y: -1}}, true, 2)
	if err != nil {
		t.Fatal(err)
	}
	coil, err := current.NewSolenoid(geom.Cylinder{Radius: 1, Height: 1}, 2)
	if err != nil {
		t.Fatal(err)
	}
	// a loop round the wire would find its current, so that balls keep to one side: off the rim and the sheet
	for name, src := range map[string]current.Free{"loop": loop, "wire": wire, "solenoid": coil} {
		err := law.Source(src, law.Claims{Region: room, Order: 3, Accuracy: 1e-11, Samples: 12, Seed: 3, Total: &law.Total{},
			Clear: func(x r3.Vec) float64 { return r3.Norm(x) - 1.2 }})
		if err != nil {
			t.Errorf("%s: %v", name, err)
		}
	}
}

// TestPosed turns and moves a loop and a wire: a and b turn along.
func TestPosed(t *testing.T) {
	turn, err := geom.Turn(r3.Vec{X: 1, Y: 2, Z: -3}, 40)
	if err != nil {
		t.Fatal(err)
	}
	pose := turn.Then(geom.Translate(r3.Vec{X: 3, Y: -1, Z: 0.5}))
	corners := []r3.Vec{{X: 1}, {X: 0.25, Y: 1, Z: 0.5}, {X: -1, Y: 0.25}}
	var moved []r3.Vec
	for _, c := range corners {
		moved = append(moved, pose.ToOuter(pointOf(c)).Value())
	}
	a, err := current.NewWire(corners, true, 1.5)
	if err != nil {
		t.Fatal(err)
	}
	b, err := current.NewWire(moved, true, 1.5)
	if err != nil {
		t.Fatal(err)
	}
	at := field.PointsOf(r3.Vec{X: 3, Y: 0.2, Z: 0.7}, r3.Vec{X: 2, Y: -2, Z: 1}, r3.Vec{X: 40, Y: 7, Z: -9})
	v, w := current.NewValues(3), current.NewValues(3)
	posed := current.Posed{Source: a, Pose: pose}
	posed.Induction(v, at, field.Mean)
	b.Induction(w, at, field.Mean)
	for i := range 3 {
		p, q := v.At(i), w.At(i)
		if r3.Norm(r3.Sub(p.A, q.A)) > 1e-14*r3.Norm(q.A) || r3.Norm(r3.Sub(p.B, q.B)) > 1e-14*r3.Norm(q.B) { // corners were rounded
			t.Errorf("point %d: %+v, moved wire %+v", i, p, q)
		}
		if g := posed.Field(at.Vec(i)); r3.Norm(r3.Sub(g, p.B)) > 4*u*r3.Norm(g) {
			t.Errorf("point %d: Field %v, b %v", i, g, p.B)
		}
	}
}
