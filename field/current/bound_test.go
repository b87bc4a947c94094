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

// magnet is a body with its magnetization and the accuracy that is due: closed forms on both sides, or integrals.
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
		{"tube radial square", geom.Tube{Inner: 0.5, Outer: 1, Height: 1.5}, field.RadialPower{Coefficient: 1, Power: 2}, integrated, true},
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
		n := 400
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
		peak := 0.0
		for i := range n {
			peak = max(peak, r3.Norm(c.m.At(at.Vec(i))))
		}
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
		}
		t.Logf("%-24s worst %.2g (%s) built %v, h %v, a and b %v", c.name, worst, where, built, timeH, timeB)
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

const u = 0x1p-53

func pointOf(x r3.Vec) pair.Vec { return pair.VecOf(x) }
