package geom

import (
	"math"
	"math/rand/v2"
	"strings"
	"testing"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// pairs is the relative error of a few operations in pairs: u^2 = 1.2e-32, times a few tens.
const pairs = 1e-30

var (
	axisX, axisY, axisZ = r3.Vec{X: 1}, r3.Vec{Y: 1}, r3.Vec{Z: 1}
	frameAxes           = [3]r3.Vec{axisX, axisY, axisZ}
)

func mustTurn(t *testing.T, axis r3.Vec, degrees float64) Pose {
	t.Helper()
	p, err := Turn(axis, degrees)
	if err != nil {
		t.Fatal(err)
	}
	return p
}

func mustFrame(t *testing.T, z, x r3.Vec) Pose {
	t.Helper()
	p, err := Frame(z, x)
	if err != nil {
		t.Fatal(err)
	}
	return p
}

// apartBy returns |a - b|.
func apartBy(a, b pair.Vec) float64 { return a.Sub(b).Norm().Value() }

// checkRotation demands R R^T = 1 and determinant 1 to the precision of pairs.
func checkRotation(t *testing.T, what string, p Pose) {
	t.Helper()
	r := p.turn
	for i := range r {
		for j := range r {
			want := 0.0
			if i == j {
				want = 1
			}
			if e := r[i].Dot(r[j]).AddFloat(-want).Value(); !(math.Abs(e) <= pairs) { // a few operations in pairs
				t.Errorf("%s: rows %d and %d: R R^T differs from 1 by %v", what, i, j, e)
			}
		}
	}
	if e := r[0].Cross(r[1]).Dot(r[2]).AddFloat(-1).Value(); !(math.Abs(e) <= pairs) { // the same
		t.Errorf("%s: determinant differs from 1 by %v", what, e)
	}
}

// Quarter turns about the frame axes move the other two axes exactly, right-handed, for any length of the axis.
func TestTurnQuarters(t *testing.T) {
	for i, axis := range frameAxes {
		second, third := frameAxes[(i+1)%3], frameAxes[(i+2)%3]
		for k := -5; k <= 5; k++ {
			for _, length := range []float64{1, 0.3, 1e-310, 1e300} {
				for _, sense := range []float64{1, -1} {
					p := mustTurn(t, r3.Scale(sense*length, axis), sense*90*float64(k))
					q := (k%4 + 4) % 4
					want := [4]r3.Vec{second, third, r3.Scale(-1, second), r3.Scale(-1, third)}
					for d, from := range []r3.Vec{second, third} {
						if got := p.ToOuter(pair.VecOf(from)); got != pair.VecOf(want[(q+d)%4]) {
							t.Errorf("%d quarters about %v: %v goes to %v, want %v", k, axis, from, got, want[(q+d)%4])
						}
					}
					if got := p.ToOuter(pair.VecOf(axis)); got != pair.VecOf(axis) {
						t.Errorf("%d quarters about %v move it to %v", k, axis, got)
					}
				}
			}
		}
	}
}

// A rotation keeps its axis, turns by its angle, and is a rotation, all to the precision of pairs.
func TestTurn(t *testing.T) {
	rng := rand.New(rand.NewPCG(31, 1))
	for range 300 {
		axis, degrees := r3.Scale(math.Exp(20*rng.NormFloat64()), randomVec(rng)), 720*(rng.Float64()-0.5)
		p := mustTurn(t, axis, degrees)
		checkRotation(t, "turn", p)
		k := pair.VecOf(axis).Unit()
		if d := apartBy(p.ToOuter(k), k); !(d <= pairs) { // a few operations in pairs
			t.Errorf("%v by %v: axis moved by %v", axis, degrees, d)
		}
		s, c := pair.SinCosDegrees(degrees)
		v := pair.VecOf(randomVec(rng))
		v = v.Sub(k.Scale(v.Dot(k))).Unit()
		want := v.Scale(c).Add(k.Cross(v).Scale(s)) // right-handed
		if d := apartBy(p.ToOuter(v), want); !(d <= pairs) {
			t.Errorf("%v by %v: a vector across the axis is %v off", axis, degrees, d)
		}
	}
}

// Rotations with a matrix of ninths, and a third of a turn about the diagonal, are right to the last bits of a pair.
func TestTurnExact(t *testing.T) {
	ninth := func(n float64) pair.Float { return pair.Of(n).Div(pair.Of(9)) }
	p := mustTurn(t, r3.Vec{X: 2, Y: -1, Z: 2}, 180) // 2 k k^T - 1
	for i, row := range [3]r3.Vec{{X: -1, Y: -4, Z: 8}, {X: -4, Y: -7, Z: -4}, {X: 8, Y: -4, Z: -1}} {
		want := pair.Vec{X: ninth(row.X), Y: ninth(row.Y), Z: ninth(row.Z)}
		if d := apartBy(p.turn[i], want); !(d <= 40*u*u) { // tens of roundings of u^2
			t.Errorf("row %d is %v, want %v", i, p.turn[i], want)
		}
	}
	q := mustTurn(t, r3.Vec{X: 1, Y: 1, Z: 1}, 120)
	for i := range frameAxes {
		if d := apartBy(q.ToOuter(pair.VecOf(frameAxes[i])), pair.VecOf(frameAxes[(i+1)%3])); !(d <= 40*u*u) { // the same
			t.Errorf("a third of a turn leaves axis %d %v off", i, d)
		}
	}
}

// The axes (2,-1,2)/3, (2,2,-1)/3 and (-1,2,2)/3 are those of a frame of rational numbers.
func TestFramePythagorean(t *testing.T) {
	third := func(x, y, z float64) pair.Vec {
		return pair.VecOf(r3.Vec{X: x, Y: y, Z: z}).Scale(pair.Of(1).Div(pair.Of(3)))
	}
	for _, x := range []r3.Vec{{X: 2, Y: 2, Z: -1}, {X: 20, Y: 20, Z: -10}, {X: 2 + 2*8, Y: 2 - 8, Z: -1 + 2*8}} { // the last leans along z
		for _, length := range []float64{1, 0x1p-900, 0x1p900} {
			p := mustFrame(t, r3.Scale(length, r3.Vec{X: 2, Y: -1, Z: 2}), r3.Scale(length, x))
			for i, want := range []pair.Vec{third(2, 2, -1), third(-1, 2, 2), third(2, -1, 2)} {
				if d := apartBy(p.ToOuter(pair.VecOf(frameAxes[i])), want); !(d <= 20*u*u) { // tens of roundings of u^2
					t.Errorf("x %v: axis %d is %v off", x, i, d)
				}
			}
		}
	}
}

func TestFrame(t *testing.T) {
	rng := rand.New(rand.NewPCG(31, 2))
	for k := range 300 {
		z := r3.Scale(math.Exp(20*rng.NormFloat64()), randomVec(rng))
		x := r3.Scale(math.Exp(20*rng.NormFloat64()), randomVec(rng))
		if k%3 == 0 { // nearly parallel: 1e-13 to 1
			lean := math.Pow(10, -13*rng.Float64())
			x = r3.Add(r3.Unit(z), r3.Scale(lean, randomVec(rng)))
		}
		p := mustFrame(t, z, x)
		checkRotation(t, "frame", p)
		e1, e3 := p.ToOuter(pair.VecOf(axisX)), p.ToOuter(pair.VecOf(axisZ))
		if d := apartBy(e3, pair.VecOf(z).Unit()); !(d <= pairs) { // a few operations in pairs
			t.Errorf("z %v: the z axis is %v off", z, d)
		}
		// x lies in the half plane of e1 and e3: no part along e2, and one along e1
		e2 := p.ToOuter(pair.VecOf(axisY))
		unit := pair.VecOf(x).Unit()
		lean := unit.Dot(e1).Value()
		if e := unit.Dot(e2).Value(); !(lean > 0) || !(math.Abs(e) <= pairs) {
			t.Errorf("z %v, x %v: the part of x along the x axis is %v, along the y axis %v", z, x, lean, e)
		}
	}
}

// Without x the scene axis least aligned with z serves, the first of several.
func TestFrameWithoutX(t *testing.T) {
	for _, c := range []struct{ z, x r3.Vec }{
		{axisX, axisY}, {axisY, axisX}, {axisZ, axisX}, {r3.Scale(-1, axisZ), axisX},
		{r3.Vec{X: 1, Y: 1, Z: 1}, axisX}, {r3.Vec{X: 2, Y: 1, Z: 1}, axisY}, {r3.Vec{X: 2, Y: -2, Z: 1}, axisZ},
		{r3.Vec{X: -0.1, Y: 5, Z: 0.2}, axisX}, {r3.Vec{X: 1e-300, Y: 1e300, Z: 1e300}, axisX},
	} {
		if got, want := mustFrame(t, c.z, r3.Vec{}), mustFrame(t, c.z, c.x); got != want {
			t.Errorf("z %v: frame %v, want that of x %v: %v", c.z, got, c.x, want)
		}
	}
	if got := mustFrame(t, axisZ, r3.Vec{}); got.turn != mustTurn(t, axisZ, 0).turn {
		t.Errorf("the frame of z is %v, want no rotation", got)
	}
}

// Rotations are about axes fixed in the scene: z by 90 degrees, then x by 90 degrees, takes the part's x axis to scene z.
func TestThenOrder(t *testing.T) {
	p := mustTurn(t, axisZ, 90).Then(mustTurn(t, axisX, 90))
	for i, want := range []r3.Vec{axisZ, r3.Scale(-1, axisX), r3.Scale(-1, axisY)} {
		if got := p.ToOuter(pair.VecOf(frameAxes[i])); got != pair.VecOf(want) {
			t.Errorf("axis %d goes to %v, want %v", i, got, want)
		}
	}
	q := Translate(axisX).Then(mustTurn(t, axisZ, 90)) // moved first, then turned about the origin
	if got := q.Origin(); got != pair.VecOf(axisY) {
		t.Errorf("the origin goes to %v, want %v", got, axisY)
	}
}

// Then is one pose after the other, in all combinations of turned and not.
func TestThen(t *testing.T) {
	rng := rand.New(rand.NewPCG(31, 3))
	kinds := func() []Pose {
		return []Pose{{}, Translate(randomVec(rng)), mustTurn(t, randomVec(rng), 360*rng.Float64()), randomPose(t, rng, 10)}
	}
	for range 50 {
		x := pair.VecOf(r3.Scale(10, randomVec(rng)))
		for _, p := range kinds() {
			for _, q := range kinds() {
				both := p.Then(q)
				got, want := both.ToOuter(x), q.ToOuter(p.ToOuter(x))
				if d := apartBy(got, want); !(d <= 100*pairs) { // lengths of some tens
					t.Errorf("%v then %v: %v, want %v", p, q, got, want)
				}
				if both.Turned() != (p.Turned() || q.Turned()) {
					t.Errorf("%v then %v: turned is %v", p, q, both.Turned())
				}
			}
		}
	}
	var none Pose
	if got := none.Then(none); got != none {
		t.Errorf("nothing then nothing is %v", got)
	}
	if p := randomPose(t, rng, 1); p.Then(none) != p {
		t.Errorf("nothing after a pose changes it")
	}
}

// About keeps the centre where it is and turns like the pose.
func TestAbout(t *testing.T) {
	rng := rand.New(rand.NewPCG(31, 4))
	for range 100 {
		c := r3.Scale(math.Exp(5*rng.NormFloat64()), randomVec(rng))
		turn := mustTurn(t, randomVec(rng), 360*rng.Float64())
		p := turn.About(c)
		if d := apartBy(p.ToOuter(pair.VecOf(c)), pair.VecOf(c)); !(d <= pairs*r3.Norm(c)) { // a few operations in pairs
			t.Errorf("the centre %v moves by %v", c, d)
		}
		if p.Matrix() != turn.Matrix() {
			t.Errorf("about %v the rotation is another", c)
		}
		d := r3.Scale(1e-20, randomVec(rng))
		shift := Shift(pair.WithLow(d, r3.Scale(u/4, d))) // its low part is below the last digit of c in pairs
		if got := shift.About(c); got != shift {
			t.Errorf("a translation about %v is %v, want %v", c, got, shift)
		}
	}
	p := mustTurn(t, axisZ, 90).About(r3.Vec{X: 0.1, Y: 0.7})
	if got := p.ToOuter(pair.VecOf(r3.Vec{X: 0.1 + 1, Y: 0.7})); got != (pair.Vec{X: pair.Of(0.1), Y: pair.Of(0.7).Add(pair.Of(1.1).AddFloat(-0.1))}) {
		t.Errorf("a quarter turn about (0.1, 0.7) takes (1.1, 0.7) to %v", got)
	}
}

// Points go to the outer frame and back to 1e-30 of the lengths; translations go exactly.
func TestRoundTrip(t *testing.T) {
	rng := rand.New(rand.NewPCG(31, 5))
	for range 500 {
		x := pair.VecOf(r3.Scale(math.Exp(5*rng.NormFloat64()), randomVec(rng)))
		p := randomPose(t, rng, math.Exp(5*rng.NormFloat64()))
		size := r3.Norm(x.Value()) + r3.Norm(p.Origin().Value())
		if d := apartBy(p.ToLocal(p.ToOuter(x)), x); !(d <= pairs*size) { // a few operations in pairs
			t.Errorf("%v came back %v off", x.Value(), d)
		}
		if d := apartBy(p.ToOuter(p.ToLocal(x)), x); !(d <= pairs*size) { // the same
			t.Errorf("%v came back %v off", x.Value(), d)
		}
		v := x.Value()
		if d := r3.Norm(r3.Sub(p.VectorToLocal(p.VectorToOuter(v)), v)); !(d <= 4*u*r3.Norm(v)) { // two roundings of three components
			t.Errorf("vector %v came back %v off", v, d)
		}
		if got, want := p.VectorToOuter(v), p.ToOuter(x).Sub(p.Origin()); !(apartBy(pair.VecOf(got), want) <= 2*u*r3.Norm(v)) { // one rounding
			t.Errorf("vector %v goes to %v, want %v", v, got, want.Value())
		}
		d := pair.WithLow(randomVec(rng), r3.Scale(u/4, randomVec(rng)))
		if got := Shift(d).ToOuter(pair.Vec{}); got != d || Shift(d).Origin() != d || Shift(d).Turned() {
			t.Errorf("a shift by %v moves by %v", d, got)
		}
		if got := Translate(v).VectorToOuter(v); got != v || Translate(v).VectorToLocal(v) != v {
			t.Errorf("a translation turns %v to %v", v, got)
		}
	}
}

// Matrix agrees with what the pose does to the axes, and is the unit matrix without a rotation.
func TestMatrix(t *testing.T) {
	rng := rand.New(rand.NewPCG(31, 6))
	for _, p := range []Pose{{}, Translate(axisX), randomPose(t, rng, 0)} {
		m := p.Matrix()
		for j, axis := range frameAxes {
			if got := p.VectorToOuter(axis); got != (r3.Vec{X: m[0][j], Y: m[1][j], Z: m[2][j]}) {
				t.Errorf("column %d of %v, want %v", j, m, got)
			}
		}
	}
}

func TestPoseErrors(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	for _, c := range []struct {
		name  string
		try   func() (Pose, error)
		wants []string
	}{
		{"turn about nothing", func() (Pose, error) { return Turn(r3.Vec{}, 10) }, []string{"rotation axis {0 0 0} has no direction", "give a finite vector other than zero"}},
		{"turn about NaN", func() (Pose, error) { return Turn(r3.Vec{X: nan}, 10) }, []string{"rotation axis {NaN 0 0}"}},
		{"turn about infinity", func() (Pose, error) { return Turn(r3.Vec{Z: inf}, 10) }, []string{"rotation axis {0 0 +Inf}"}},
		{"turn by NaN", func() (Pose, error) { return Turn(axisX, nan) }, []string{"rotation angle NaN", "finite"}},
		{"turn by infinity", func() (Pose, error) { return Turn(axisX, -inf) }, []string{"rotation angle -Inf"}},
		{"frame of nothing", func() (Pose, error) { return Frame(r3.Vec{}, axisX) }, []string{"frame axis z {0 0 0} has no direction"}},
		{"frame z NaN", func() (Pose, error) { return Frame(r3.Vec{Y: nan}, axisX) }, []string{"frame axis z {0 NaN 0}"}},
		{"frame x infinite", func() (Pose, error) { return Frame(axisZ, r3.Vec{Y: inf}) }, []string{"frame axis x {0 +Inf 0} is not finite"}},
		{"frame parallel", func() (Pose, error) { return Frame(r3.Vec{X: 0.1, Y: 0.2, Z: 0.3}, r3.Vec{X: 0.3, Y: 0.6, Z: 0.9}) }, []string{"frame axis x {0.3 0.6 0.9} is parallel to z {0.1 0.2 0.3}", "give a vector that is not"}},
		{"frame opposite", func() (Pose, error) { return Frame(r3.Scale(1e200, axisZ), r3.Scale(-1e-200, axisZ)) }, []string{"is parallel to z"}},
	} {
		p, err := c.try()
		if err == nil {
			t.Errorf("%s: no error", c.name)
			continue
		}
		if p != (Pose{}) {
			t.Errorf("%s: pose %v beside the error", c.name, p)
		}
		for _, w := range append(c.wants, "geom: ") {
			if !strings.Contains(err.Error(), w) {
				t.Errorf("%s: %q does not say %q", c.name, err, w)
			}
		}
	}
}

func TestPoseAllocatesNothing(t *testing.T) {
	p := randomPose(t, rand.New(rand.NewPCG(31, 7)), 1)
	x := pair.VecOf(axisX)
	if n := testing.AllocsPerRun(20, func() {
		q, _ := Turn(axisY, 30)
		x = p.Then(q).About(axisX).ToLocal(p.ToOuter(x))
		PosedBox(r3.Box{Max: p.VectorToOuter(axisX)}, p)
	}); n != 0 {
		t.Errorf("%v allocations", n)
	}
}
