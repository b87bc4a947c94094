package current_test

import (
	"fmt"
	"math"
	"math/rand/v2"
	"testing"
	"time"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/current"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

var oblique = r3.Vec{X: 0.3, Y: -0.7, Z: 1.1}

// sheared is a full affine magnetization with curl (-0.25, 0.25, 1).
var sheared = field.Affine{
	Value:    oblique,
	Gradient: [3][3]float64{{0.5, -0.25, 0.125}, {0.75, -1, 0.5}, {-0.125, 0.25, 0.875}},
}

// magnetized is a body with its magnetization and the accuracy that is due: closed forms on both sides, or integrals.
type magnetized struct {
	name string
	body geom.Body
	m    field.Polarization
	tol  float64
	slow bool
}

func magnets(t testing.TB) []magnetized {
	turn, err := geom.Turn(r3.Vec{X: 1, Y: 2, Z: -3}, 40)
	if err != nil {
		t.Fatal(err)
	}
	pose := turn.Then(geom.Translate(r3.Vec{X: 0.25, Y: -0.5, Z: 2}))
	wedge := geom.Polyhedron{
		Vertices: []r3.Vec{{X: -1, Y: -1, Z: -0.5}, {X: 1, Y: -1, Z: -0.5}, {X: 0, Y: 1, Z: -0.5}, {Z: 1}},
		Loops:    [][]int{{0, 2, 1}, {0, 1, 3}, {1, 2, 3}, {2, 0, 3}},
	}
	ell := [][2]float64{{-1, -1}, {1, -1}, {1, 0}, {0, 0}, {0, 1}, {-1, 1}}
	const closed, integrated = 1e-11, 1e-9
	u := field.Uniform{P: oblique}
	return []magnetized{
		{"box", geom.Box{Size: r3.Vec{X: 2, Y: 1.5, Z: 1}}, u, closed, false},
		{"flat box", geom.Box{Size: r3.Vec{X: 2, Y: 1.5, Z: 0.001}}, field.Uniform{P: r3.Vec{Z: 1}}, closed, false},
		{"turned box affine", geom.At(geom.Box{Size: r3.Vec{X: 2, Y: 1.5, Z: 1}}, pose), sheared, closed, false},
		{"tetrahedron affine", wedge, sheared, closed, false},
		{"L prism", geom.Prism{Base: ell, Height: 1.5, TopSlope: [2]float64{0.25, -0.125}}, u, closed, false},
		{"cylinder", geom.Cylinder{Radius: 1, Height: 1.5}, u, closed, false},
		{"turned tube", geom.At(geom.Tube{Inner: 0.5, Outer: 1, Height: 1.5}, pose), u, closed, false},
		{"cylinder affine", geom.Cylinder{Radius: 1, Height: 1.5}, sheared, integrated, false},
		{"arc", geom.ArcDegrees(0.5, 1, 0.75, 20, 130), u, integrated, false},
		{"hollow sphere", geom.HollowSphere{Inner: 0.25, Outer: 1}, u, closed, false},
		{"sphere affine", geom.Sphere{Radius: 1}, sheared, closed, false},
		{"ellipsoid", geom.Ellipsoid{SemiAxes: r3.Vec{X: 1, Y: 0.75, Z: 0.5}}, u, closed, false},
		{"cone", geom.Cone{Bottom: 1, Top: 0.5, Height: 1}, u, integrated, false},
		{"torus", geom.Torus{Major: 1, Minor: 0.4}, u, integrated, false},
		{"cylinder radial", geom.Cylinder{Radius: 1, Height: 1.5}, field.RadialPower{Coefficient: 1}, integrated, true},
		{"turned tube radial square", geom.At(geom.Tube{Inner: 0.5, Outer: 1, Height: 1.5}, pose), field.RadialPower{Coefficient: 1, Power: 2}, integrated, true},
		{"cylinder axial square", geom.Cylinder{Radius: 1, Height: 1.5}, field.AxialPower{Coefficient: 1, Power: 2}, integrated, true},
		{"ball central square", geom.Sphere{Radius: 1}, field.CentralPower{Coefficient: 1, Power: 2}, closed, false},
	}
}

// pointsOf returns n random points: half all around, half within 1e-6 sizes of a face.
func pointsOf(body geom.Body, n int, rng *rand.Rand) []r3.Vec {
	box := body.Bounds()
	centre, half := r3.Scale(0.5, r3.Add(box.Min, box.Max)), r3.Scale(0.5, r3.Sub(box.Max, box.Min))
	size := r3.Norm(half)
	var near []r3.Vec
	for _, f := range body.Faces() {
		f.Surface.Nodes(5, func(x, normal r3.Vec, _ float64) {
			d := 1e-6 * size * math.Pow(10, -4*rng.Float64()) * float64(1-2*rng.IntN(2))
			near = append(near, r3.Add(x, r3.Scale(d, normal)))
		})
	}
	out := make([]r3.Vec, n)
	for i := range out {
		if i%2 == 0 {
			out[i] = near[rng.IntN(len(near))]
			continue
		}
		r := func() float64 { return 2*rng.Float64() - 1 }
		s := 1.5 * math.Pow(10, 2*max(0, rng.Float64()-0.8)/0.2*0.5)
		out[i] = r3.Add(centre, r3.Vec{X: s * r() * size, Y: s * r() * size, Z: s * r() * size})
	}
	return out
}

// largest returns the greatest magnetization at the nodes of a rule.
func largest(c magnetized) float64 {
	body := c.body
	if at, ok := body.(geom.Placed); ok {
		body = at.Body
	}
	peak := 0.0
	for _, cell := range body.Cells() {
		cell.Nodes(4, func(x r3.Vec, _ float64) { peak = max(peak, r3.Norm(c.m.At(x))) })
	}
	return peak
}

// TestAgainstPoles holds b of the currents against h + m of the poles, which share no charge.
func TestAgainstPoles(t *testing.T) {
	for _, c := range magnets(t) {
		start := time.Now()
		poles, err := bound.Of(c.body, c.m)
		if err != nil {
			t.Fatalf("%s: %v", c.name, err)
		}
		amp, err := current.Of(c.body, c.m)
		if err != nil {
			t.Fatalf("%s: %v", c.name, err)
		}
		built := time.Since(start)
		n := 200
		if c.slow {
			n = 24
		}
		at := field.PointsOf(pointsOf(c.body, n, rand.New(rand.NewPCG(1, 2)))...)
		h := field.NewValues(n, field.WantG|field.WantErr)
		start = time.Now()
		poles.Evaluate(h, at, field.Mean)
		timeH := time.Since(start) / time.Duration(n)
		v := current.NewValues(n)
		start = time.Now()
		amp.Induction(v, at, field.Mean)
		timeB := time.Since(start) / time.Duration(n)
		worst, where := 0.0, ""
		var over []float64
		peak := largest(c)
		for i := range n {
			x := at.Vec(i)
			got, want := v.At(i), h.At(i).G
			if got.Status == field.OnFace || got.Status == field.OnEdge {
				continue
			}
			if poles.Locate(pair.VecOf(x), 0).Region == geom.Inside {
				want = r3.Add(want, poles.Polarization(pair.VecOf(x)))
			}
			err := r3.Norm(r3.Sub(got.B, want))
			if r := err / max(r3.Norm(want), 1e-2*peak); !(r <= worst) {
				worst, where = r, fmt.Sprint(x, got.B, want, got.Status)
			}
			if !(err <= c.tol*r3.Norm(want)+1e-13*peak) {
				t.Errorf("%s at %v: b %v, h + m %v, off by %.3g, %v", c.name, x, got.B, want, err, got.Status)
			}
			if claim := got.ErrB + h.ErrG[i] + 2*u*r3.Norm(want); !(err <= claim) {
				t.Errorf("%s at %v: error %.3g above the claims %.3g", c.name, x, err, claim)
			}
			if size := max(err, u*r3.Norm(want)); size > 0 {
				over = append(over, got.ErrB/size)
			}
		}
		t.Logf("%-24s worst %.2g (%s), estimate %.3g times too large, built in %v, h %v, a and b %v a point", c.name, worst, where,
			median(over), built, timeH, timeB)
		if m := median(over); m > 100 {
			t.Errorf("%s: median overestimate %.3g, want at most 100", c.name, m)
		}
		for _, id := range amp.Identities {
			if !id.Holds() {
				t.Errorf("%s: %+v", c.name, id)
			}
		}
		if d := r3.Norm(r3.Sub(amp.Moment, poles.Moment)); d > 1e-12*r3.Norm(poles.Moment)+1e-14*peak {
			t.Errorf("%s: moment %v, of poles %v", c.name, amp.Moment, poles.Moment)
		}
	}
}

// TestPotential holds a against the integral of the currents over faces and cells, three sizes away, and its curl against b.
func TestPotential(t *testing.T) {
	for _, c := range magnets(t) {
		amp, err := current.Of(c.body, c.m)
		if err != nil {
			t.Fatal(err)
		}
		box := c.body.Bounds()
		centre, size := r3.Scale(0.5, r3.Add(box.Min, box.Max)), r3.Norm(r3.Sub(box.Max, box.Min))
		for _, d := range []r3.Vec{{X: 1, Y: 1, Z: -1}, {X: -2, Y: 0.5, Z: 1}} {
			x := r3.Add(centre, r3.Scale(size, d))
			var want r3.Vec
			add := func(y, j r3.Vec, w float64) {
				want = r3.Add(want, r3.Scale(w/(4*math.Pi*r3.Norm(r3.Sub(x, y))), j))
			}
			for _, f := range c.body.Faces() {
				f.Surface.Nodes(24, func(y, n r3.Vec, w float64) { add(y, amp.Surface(y, r3.Scale(f.Sign(), n)), w) })
			}
			for _, cell := range c.body.Cells() {
				cell.Nodes(16, func(y r3.Vec, w float64) { add(y, amp.Volume(y), w) })
			}
			v := current.At(amp, x, field.Mean)
			miss := r3.Norm(r3.Sub(v.A, want))
			if miss > 1e-9*r3.Norm(want)+1e-13*largest(c) { // the rule converges; a kink in the density on the axis is left
				t.Errorf("%s at %v: a %v, by integration %v, off by %.3g", c.name, x, v.A, want, miss)
			}
			if c.slow {
				continue
			}
			const h = 0x1p-9
			step := func(e r3.Vec) r3.Vec {
				return r3.Scale(0.5/h, r3.Sub(current.At(amp, r3.Add(x, r3.Scale(h, e)), field.Mean).A, current.At(amp, r3.Sub(x, r3.Scale(h, e)), field.Mean).A))
			}
			dx, dy, dz := step(r3.Vec{X: 1}), step(r3.Vec{Y: 1}), step(r3.Vec{Z: 1})
			curl := r3.Vec{X: dy.Z - dz.Y, Y: dz.X - dx.Z, Z: dx.Y - dy.X}
			if d := r3.Norm(r3.Sub(curl, v.B)); d > 1e-5*r3.Norm(v.B)+1e-12 { // h^2 by distance squared
				t.Errorf("%s at %v: curl a %v, b %v", c.name, x, curl, v.B)
			}
			if div := dx.X + dy.Y + dz.Z; math.Abs(div) > 1e-5*r3.Norm(v.B)+1e-12 {
				t.Errorf("%s at %v: div a %v", c.name, x, div)
			}
		}
	}
}

// TestJumps: across a face b jumps by K x n, K = m x n, and a not at all; the mean is in the middle.
func TestJumps(t *testing.T) {
	for _, c := range magnets(t) {
		amp, err := current.Of(c.body, c.m)
		if err != nil {
			t.Fatal(err)
		}
		peak, seen := largest(c), 0
		for _, f := range c.body.Faces() {
			f.Surface.Nodes(2, func(x, n r3.Vec, _ float64) {
				if seen++; seen > 8 || c.slow && seen > 3 {
					return
				}
				n = r3.Scale(f.Sign(), n)
				k := amp.Surface(x, n)
				in, out, mean := current.At(amp, x, field.Inside), current.At(amp, x, field.Outside), current.At(amp, x, field.Mean)
				if in.Status == field.Regular && r3.Norm(k) > 1e-12*peak { // a node is off the face by rounding
					return
				}
				if d := r3.Norm(r3.Sub(r3.Sub(out.B, in.B), r3.Cross(k, n))); !(d <= 1e-10*peak) {
					t.Errorf("%s, face %s at %v: b jumps by %v, want %v", c.name, f.Name, x, r3.Sub(out.B, in.B), r3.Cross(k, n))
				}
				if d := r3.Norm(r3.Sub(r3.Scale(0.5, r3.Add(out.B, in.B)), mean.B)); !(d <= 1e-10*peak) {
					t.Errorf("%s, face %s at %v: mean %v of %v and %v", c.name, f.Name, x, mean.B, in.B, out.B)
				}
				if d := r3.Norm(r3.Sub(out.A, in.A)); !(d <= 1e-12*peak) {
					t.Errorf("%s, face %s at %v: a jumps by %.3g", c.name, f.Name, x, d)
				}
			})
		}
	}
}

// TestFlatBody: in a plate a millionth as thick as wide b is that of the current round its edge; h + m, a difference of ones, cannot
// have more than ten digits of it.
func TestFlatBody(t *testing.T) {
	const thin = 0x1p-20
	plate := geom.Box{Size: r3.Vec{X: 2, Y: 1.5, Z: thin}}
	m := field.Uniform{P: r3.Vec{Z: 1}}
	amp, err := current.Of(plate, m)
	if err != nil {
		t.Fatal(err)
	}
	edge, err := current.NewWire([]r3.Vec{{X: 1, Y: -0.75}, {X: 1, Y: 0.75}, {X: -1, Y: 0.75}, {X: -1, Y: -0.75}}, true, thin)
	if err != nil {
		t.Fatal(err)
	}
	poles, err := bound.Of(plate, m)
	if err != nil {
		t.Fatal(err)
	}
	x := r3.Vec{X: 0.25, Y: -0.125}
	v, want := current.At(amp, x, field.Mean), edge.Field(x)
	if d := r3.Norm(r3.Sub(v.B, want)); d > 1e-12*want.Z || v.ErrB > 1e-14 { // (thin/0.6)^2/24 = 1e-13 is left out
		t.Errorf("b %v, of the edge %v, off by %.3g, estimate %.3g", v.B, want, d, v.ErrB)
	}
	h := field.At(poles, x, field.Mean, field.WantG|field.WantErr)
	t.Logf("b %.3g: by currents off by %.2g, estimate %.2g; by poles off by %.2g, estimate %.2g", want.Z, v.B.Z-want.Z, v.ErrB, h.G.Z+1-want.Z, h.ErrG)
}

// TestReport reads what faces and cells carry.
func TestReport(t *testing.T) {
	amp, err := current.Of(geom.At(geom.Cylinder{Radius: 1, Height: 2}, geom.Translate(r3.Vec{X: 5})), field.Uniform{P: r3.Vec{Z: 3}})
	if err != nil {
		t.Fatal(err)
	}
	bottom, wall := amp.Layers[0], amp.Layers[2]
	if !bottom.Uniform || bottom.Density != (r3.Vec{}) || bottom.Largest != 0 || wall.Uniform || math.Abs(wall.Largest-3) > 1e-15 || r3.Norm(wall.Current) > 1e-14 {
		t.Errorf("bottom %+v, wall %+v", bottom, wall)
	}
	if k := amp.Surface(r3.Vec{X: 6}, r3.Vec{X: 1}); k != (r3.Vec{Y: 3}) {
		t.Errorf("surface current %v, want 3 along y", k)
	}
	box, err := current.Of(geom.Box{Size: r3.Vec{X: 2, Y: 1.5, Z: 1}}, sheared)
	if err != nil {
		t.Fatal(err)
	}
	want := r3.Vec{X: 0.25 - 0.5, Y: 0.125 + 0.125, Z: 0.75 + 0.25}
	if j := box.Volume(r3.Vec{X: 0.3}); j != want || r3.Norm(r3.Sub(box.Volumes[0].Current, r3.Scale(3, want))) > 1e-14 || math.Abs(box.Volumes[0].Largest-r3.Norm(want)) > 1e-15 {
		t.Errorf("volume current %v, want %v; %+v", j, want, box.Volumes[0])
	}
	flat, err := current.Of(geom.Box{Size: r3.Vec{X: 2, Y: 1.5, Z: 1}}, field.Uniform{P: r3.Vec{Z: 2}})
	if err != nil {
		t.Fatal(err)
	}
	if l := flat.Layers[1]; l.Face.Name != "+x" || !l.Uniform || l.Density != (r3.Vec{Y: 2}) || l.Current != (r3.Vec{Y: 3}) {
		t.Errorf("face %+v", l)
	}
}

// TestBatch: a batch gives the same bits as its points one by one, and nothing is allocated.
func TestBatch(t *testing.T) {
	loop, err := current.NewLoop(geom.Disc{Radius: 1}, 1)
	if err != nil {
		t.Fatal(err)
	}
	wire, err := current.NewWire([]r3.Vec{{X: 1}, {Y: 1}, {Z: 1}}, true, 1)
	if err != nil {
		t.Fatal(err)
	}
	sources := map[string]current.Source{"loop": loop, "wire": wire, "posed": current.Posed{Source: loop, Pose: geom.Translate(r3.Vec{X: 1})}}
	for _, c := range magnets(t) {
		if sources[c.name], err = current.Of(c.body, c.m); err != nil {
			t.Fatal(err)
		}
	}
	rng := rand.New(rand.NewPCG(9, 9))
	for name, src := range sources {
		const n = 150
		var x []r3.Vec
		for range n {
			x = append(x, r3.Vec{X: 8*rng.Float64() - 4, Y: 8*rng.Float64() - 4, Z: 8*rng.Float64() - 4})
		}
		at, v := field.PointsOf(x...), current.NewValues(n)
		src.Induction(v, at, field.Mean)
		for i := range x {
			if a, b := current.At(src, x[i], field.Mean), v.At(i); a != b {
				t.Errorf("%s point %d: alone %+v, in the batch %+v", name, i, a, b)
				break
			}
		}
		if got := testing.AllocsPerRun(3, func() { src.Induction(v, at, field.Mean) }); got > 2 { // a pool may be emptied in between
			t.Errorf("%s: %v allocations", name, got)
		}
		if b := current.At(src, r3.Vec{X: math.NaN()}, field.Mean); b.Status != field.BadInput || !math.IsNaN(b.B.Y) || !math.IsNaN(b.A.X) {
			t.Errorf("%s at NaN: %+v", name, b)
		}
	}
}

const u = 0x1p-53

func pointOf(x r3.Vec) pair.Vec { return pair.VecOf(x) }
