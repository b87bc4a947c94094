package response_test

import (
	"context"
	"errors"
	"math"
	"math/rand/v2"
	"runtime"
	"slices"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/closedform"
	"example.com/boundpole/field/element"
	"example.com/boundpole/field/image"
	"example.com/boundpole/field/response"
	"example.com/boundpole/geom"
	"example.com/boundpole/verify/law"
	"gonum.org/v1/gonum/mat"
	"gonum.org/v1/gonum/spatial/r3"
)

// spherePair returns the moment, over the volume, of each of two equal spheres of radius 1 and relative permittivity eps at a gap,
// in a unit field along the line of centres, by multipoles of each about its own centre, expanded about the other's.
//
// Source: [Own]; the same unknowns as the bispherical series of [Jeffery1912].
func spherePair(gap, eps float64, terms int) float64 {
	d := 2 + gap
	a, b := mat.NewDense(terms, terms, nil), mat.NewVecDense(terms, nil)
	lg := func(n int) float64 { v, _ := math.Lgamma(float64(n + 1)); return v }
	for n := 1; n <= terms; n++ {
		k := 1.0
		if !math.IsInf(eps, 1) {
			k = float64(n) * (eps - 1) / (float64(n)*eps + float64(n) + 1)
		}
		if n == 1 {
			b.SetVec(0, k)
		}
		for m := 1; m <= terms; m++ {
			v := -k * math.Exp(lg(n+m)-lg(n)-lg(m)-float64(n+m+1)*math.Log(d))
			if n == m {
				v++
			}
			a.Set(n-1, m-1, v)
		}
	}
	var x mat.VecDense
	if err := x.SolveVec(a, b); err != nil {
		return math.NaN()
	}
	return 3 * x.AtVec(0)
}

func TestTwoSpheres(t *testing.T) {
	for _, c := range []struct {
		gap       float64
		set       response.Settings
		eps       float64
		tolerance float64
	}{
		{0.1, response.Settings{Order: 6}, 11, 3e-5},             // order 6
		{1e-3, response.Settings{Order: 6, Gap: 1.3}, inf, 1e-4}, // 1e-4 is the bar
	} {
		if testing.Short() && c.gap < 0.1 {
			continue
		}
		s := prepare(t, &c.set, geom.Sphere{Radius: 1}, geom.At(geom.Sphere{Radius: 1}, geom.Translate(r3.Vec{Z: 2 + c.gap})))
		m := response.Material{Chi: c.eps - 1}
		r := solve(t, s, up, m, m)
		want := spherePair(c.gap, c.eps, 300) * 4 * math.Pi / 3
		judge(t, "moment", along(r.Moment(0), up.G), want, want, c.tolerance, 0)
		if q := r.Charge(0); math.Abs(q.Value) > 1e-10 {
			t.Errorf("charge %v", q.Value)
		}
	}
}

// TestHalfSpace puts a dipole 1 above a block of 80 x 80 x 40, whose far faces change the field by (1/40)^3.
func TestHalfSpace(t *testing.T) {
	block := geom.At(geom.Box{Size: r3.Vec{X: 80, Y: 80, Z: 40}}, geom.Translate(r3.Vec{Z: -20}))
	dipole := element.Dipole{At: r3.Vec{Z: 1}, Moment: r3.Vec{X: 0.6, Z: 0.8}}
	s := prepare(t, &response.Settings{Order: 6, Near: []r3.Vec{dipole.At}}, block)
	for _, eps := range []float64{0.5, inf} {
		r := solve(t, s, dipole, response.Material{Chi: eps - 1})
		mirror := image.Image{Source: dipole, Plane: image.Plane{Normal: r3.Vec{Z: 1}, Ratio: eps}}
		for _, x := range []r3.Vec{{Z: 1}, {X: 0.5, Y: 0.2, Z: 0.3}} {
			got, want := field.At(r, x, field.Mean, field.WantG|field.WantErr), mirror.Field(x)
			if miss := r3.Norm(r3.Sub(got.G, want)); miss > 1e-3*r3.Norm(want) || miss > got.ErrG+2e-4*r3.Norm(want) { // order 6, finite block
				t.Errorf("eps %g at %v: got %v, want %v, estimate %.1e", eps, x, got.G, want, got.ErrG)
			}
		}
	}
}

func TestCapacitance(t *testing.T) {
	const a, b, c = 1, 2, 3.0
	s := prepare(t, &response.Settings{Order: 6}, geom.Sphere{Radius: a}, geom.HollowSphere{Inner: b, Outer: c})
	metal := []response.Material{{Chi: inf}, {Chi: inf}}
	got, err := s.Capacitance(context.Background(), metal)
	if err != nil {
		t.Fatal(err)
	}
	k := 4 * math.Pi * a * b / (b - a)
	want := [2][2]float64{{k, -k}, {-k, k + 4*math.Pi*c}} // [Jackson1999] section 1.11, elementary for spheres
	for i := range want {
		for j := range want[i] {
			judge(t, "capacitance", got[i][j], want[i][j], k, 1e-6, 0) // order 6
		}
	}
	r, err := s.Hold(context.Background(), metal, []float64{2, -1}, nil)
	if err != nil {
		t.Fatal(err)
	}
	judge(t, "charge", r.Charge(0), 3*k, k, 1e-6, 0)
	for body, v := range []float64{2, -1} {
		p, err := r.Potential(body)
		if err != nil {
			t.Fatal(err)
		}
		judge(t, "potential", p, v, 1, 1e-6, 1e-8) // the held potential is that of the capacitances
	}
}

// TestCavity puts a charge into the cavity of an uncharged metal shell: outside it looks as if in the centre.
func TestCavity(t *testing.T) {
	charge := element.Point{At: r3.Vec{X: 0.4}, Charge: 2}
	s := prepare(t, &response.Settings{Order: 6, Near: []r3.Vec{charge.At}}, geom.HollowSphere{Inner: 1, Outer: 1.5})
	for _, m := range []response.Material{{Chi: inf}, {Chi: inf, Charge: -5}} {
		r := solve(t, s, charge, m)
		x := r3.Vec{Y: 3}
		got := field.At(field.Sum{r, charge}, x, field.Mean, field.WantG|field.WantErr)
		want := r3.Vec{Y: (2 + m.Charge) / (4 * math.Pi * 9)}
		if miss := r3.Norm(r3.Sub(got.G, want)); miss > 1e-5*r3.Norm(want) || miss > got.ErrG { // order 6
			t.Errorf("outside: got %v, want %v, estimate %.1e", got.G, want, got.ErrG)
		}
		inside := field.At(field.Sum{r, charge}, r3.Vec{Z: 1.25}, field.Mean, field.WantG)
		if r3.Norm(inside.G) > 1e-5*charge.Charge { // order 6
			t.Errorf("in the metal: %v", inside.G)
		}
	}
	r := solve(t, s, up, response.Material{Chi: -1})
	v := field.At(r, r3.Vec{X: 0.2, Z: 0.1}, field.Mean, field.WantG)
	if d := r3.Norm(r3.Add(v.G, up.G)); d > 1e-5 { // chi = -1 lets nothing into a cavity; order 6
		t.Errorf("cavity of an ideal diamagnet has the field %v", r3.Add(v.G, up.G))
	}
}

func TestFixed(t *testing.T) {
	s := prepare(t, &response.Settings{Order: 6}, geom.Sphere{Radius: 1})
	for _, chi := range []float64{-0.5, 0.05, 3, 1e4} {
		r := solve(t, s, nil, response.Material{Chi: chi, Fixed: field.Uniform{P: r3.Vec{X: 1}}})
		want := 1 / (1 + chi/3)                                                                  // p = p0 + chi g, g = -p/3
		judge(t, "moment", along(r.Moment(0), r3.Vec{X: 1}), want*4*math.Pi/3, want, 1e-6, 1e-9) // order 6
		v := field.At(r, r3.Vec{Y: 0.3}, field.Mean, field.WantG|field.WantErr)
		if d := r3.Norm(r3.Add(v.G, r3.Vec{X: want / 3})); d > 1e-5*want || d > v.ErrG+1e-9 { // order 6
			t.Errorf("chi %g: inner field %v, want %v", chi, v.G.X, -want/3)
		}
		ball := solve(t, s, nil, response.Material{Chi: chi, Fixed: field.CentralPower{Coefficient: 1, Power: 1}})
		in, out := ball.Field(r3.Vec{Z: 0.5}), ball.Field(r3.Vec{Z: 2})
		if d := math.Abs(in.Z + 0.5/(1+chi)); d > 1e-9 || r3.Norm(out) > 1e-9 { // p = -g = p0/(1 + chi): no induced layer at all
			t.Errorf("chi %g: radial p0 gives %v inside, %v outside", chi, in, out)
		}
	}
}

func TestForce(t *testing.T) {
	const q, d = 1.5, 2.0
	charge := element.Point{At: r3.Vec{Z: d}, Charge: q}
	ball := prepare(t, nil, geom.Sphere{Radius: 1})
	r := solve(t, ball, charge, response.Material{Chi: inf})
	f, _, err := r.Force(0, r3.Vec{})
	if err != nil {
		t.Fatal(err)
	}
	// image q' = -q/d at 1/d and -q' in the centre, [Jackson1999] section 2.3
	want := q * q / d / (4 * math.Pi) * (1/math.Pow(d-1/d, 2) - 1/(d*d))
	judge(t, "force", along(f, r3.Vec{Z: 1}), want, want, 1e-5, 0) // point charge at one radius from the face, panels of 45 degrees
	judge(t, "reaction", response.Value{Value: -q * r.Field(charge.At).Z, Estimate: f.Estimate}, want, want, 1e-5, 1e-6)

	// a magnet with recoil beside a soft block: forces balance, and so do torques about one point
	pair := prepare(t, &response.Settings{Order: 6}, geom.Box{Size: r3.Vec{X: 1, Y: 1, Z: 1}}, geom.At(geom.Box{Size: r3.Vec{X: 1, Y: 2, Z: 0.5}}, geom.Translate(r3.Vec{X: 0.2, Z: 1.2})))
	two := solve(t, pair, nil, response.Material{Chi: 0.05, Fixed: field.Uniform{P: r3.Vec{Z: 1}}}, response.Material{Chi: 100})
	f1, t1, err1 := two.Force(0, r3.Vec{X: 1})
	f2, t2, err2 := two.Force(1, r3.Vec{X: 1})
	if err := errors.Join(err1, err2); err != nil {
		t.Fatal(err)
	}
	if d := r3.Norm(r3.Add(f1.Value, f2.Value)); d > 1e-3*r3.Norm(f1.Value) || d > f1.Estimate+f2.Estimate { // order 6
		t.Errorf("forces %v and %v, estimates %.1e", f1.Value, f2.Value, f1.Estimate)
	}
	if d := r3.Norm(r3.Add(t1.Value, t2.Value)); d > 1e-3*r3.Norm(f1.Value) || d > t1.Estimate+t2.Estimate { // order 6
		t.Errorf("torques %v and %v, estimates %.1e", t1.Value, t2.Value, t1.Estimate)
	}
}

// TestAxis holds an anisotropic ellipsoid with a fixed part, turned, against p_i = (p0 + chi_i g)_i/(1 + n_i chi_i).
func TestAxis(t *testing.T) {
	e := geom.Ellipsoid{SemiAxes: r3.Vec{X: 1, Y: 1.5, Z: 0.8}}
	pose, err := geom.Turn(r3.Vec{X: 1, Y: 2, Z: -1}, 40)
	if err != nil {
		t.Fatal(err)
	}
	s := prepare(t, &response.Settings{Order: 6}, geom.At(e, pose))
	n := closedform.EllipsoidFactors(e.SemiAxes)
	for _, along := range []float64{0.02, 5} {
		m := response.Material{Chi: 0.1, Axis: r3.Vec{Z: 2}, Along: along, Fixed: field.Uniform{P: r3.Vec{Y: 1, Z: 1}}}
		g := r3.Vec{X: 1, Y: -0.5, Z: 2} // in the frame of the body
		r := solve(t, s, response.Uniform{G: pose.VectorToOuter(g)}, m)
		want := r3.Vec{X: m.Chi * g.X / (1 + n.X*m.Chi), Y: (1 + m.Chi*g.Y) / (1 + n.Y*m.Chi), Z: (1 + along*g.Z) / (1 + n.Z*along)}
		got := r.Moment(0)
		if d := r3.Norm(r3.Sub(pose.VectorToLocal(got.Value), r3.Scale(e.Volume(), want))); d > 1e-5*r3.Norm(got.Value) || d > got.Estimate { // order 6
			t.Errorf("along %g: moment off by %.1e, estimate %.1e", along, d, got.Estimate)
		}
	}
}

func TestReciprocity(t *testing.T) {
	s := prepare(t, &response.Settings{Order: 6}, geom.Cylinder{Radius: 1, Height: 1}, geom.At(geom.Sphere{Radius: 0.5}, geom.Translate(r3.Vec{X: 1, Z: 1.4})))
	a, b := response.Uniform{G: r3.Vec{X: 1, Z: 1}}, element.Point{At: r3.Vec{X: -2, Y: 1}, Charge: 3}
	ab, ba, err := s.Reciprocity(context.Background(), []response.Material{{Chi: 20}, {Chi: -0.7}}, a, b)
	if err != nil {
		t.Fatal(err)
	}
	if d := math.Abs(ab.Value - ba.Value); d > 1e-4*math.Abs(ab.Value) || d > ab.Estimate+ba.Estimate { // order 6
		t.Errorf("%v and %v", ab, ba)
	}
}

// TestRigid demands that a body without susceptibility is its bound charge.
func TestRigid(t *testing.T) {
	box := geom.Box{Size: r3.Vec{X: 1, Y: 1, Z: 1}}
	p := field.Uniform{P: r3.Vec{Z: 1}}
	c, err := bound.Of(box, p)
	if err != nil {
		t.Fatal(err)
	}
	r := solve(t, prepare(t, &response.Settings{Order: 6}, box), nil, response.Material{Fixed: p})
	for _, n := range r.Layer(0) {
		if n.Charge != 0 {
			t.Fatalf("charge %v at %v without susceptibility", n.Charge, n.X)
		}
	}
	x := r3.Vec{X: 0.7, Y: 0.2, Z: 0.1}
	if d := r3.Norm(r3.Sub(r.Field(x), c.Field(x))); d > 1e-15 { // the induced layer is exactly zero
		t.Errorf("field %v, of bound charge %v", r.Field(x), c.Field(x))
	}
}

// TestBits demands the same bits for any number of processors.
func TestBits(t *testing.T) {
	var first r3.Vec
	old := runtime.GOMAXPROCS(0)
	defer runtime.GOMAXPROCS(old)
	for k, n := range []int{1, 2, 7} {
		runtime.GOMAXPROCS(n)
		r := solve(t, prepare(t, &response.Settings{Order: 6}, geom.Cylinder{Radius: 1, Height: 1}), up, response.Material{Chi: 20})
		g := r.Field(r3.Vec{X: 0.3, Y: 0.9, Z: 0.7})
		if k == 0 {
			first = g
		}
		if g != first {
			t.Errorf("%d processors: %v, one: %v", n, g, first)
		}
	}
}

func TestErrors(t *testing.T) {
	ctx := context.Background()
	ball := geom.Sphere{Radius: 1}
	small := &response.Settings{Order: 6}
	touching := geom.At(ball, geom.Translate(r3.Vec{X: 2}))
	for _, c := range []struct {
		name   string
		bodies []geom.Body
		set    *response.Settings
		want   error
	}{
		{"none", nil, nil, nil},
		{"touching", []geom.Body{ball, touching}, small, response.ErrOverlap},
		{"overlapping", []geom.Body{ball, geom.Box{Size: r3.Vec{X: 1, Y: 1, Z: 1}}}, small, response.ErrOverlap},
		{"open", []geom.Body{geom.Sphere{Radius: -1}}, nil, nil},
		{"large", []geom.Body{ball}, &response.Settings{Halve: 3}, response.ErrTooLarge},
		{"order", []geom.Body{ball}, &response.Settings{Order: 2}, nil},
	} {
		_, err := response.Prepare(ctx, c.bodies, c.set)
		if err == nil || c.want != nil && !errors.Is(err, c.want) {
			t.Errorf("%s: error %v, want %v", c.name, err, c.want)
		}
	}
	s := prepare(t, small, ball)
	for _, c := range []struct {
		name    string
		m       []response.Material
		applied field.Source
		want    error
	}{
		{"chi", []response.Material{{Chi: -1.5}}, up, response.ErrMaterial},
		{"nan", []response.Material{{Chi: math.NaN()}}, up, response.ErrMaterial},
		{"charge", []response.Material{{Chi: 2, Charge: 1}}, up, response.ErrMaterial},
		{"fixed", []response.Material{{Chi: -1, Fixed: field.Uniform{P: up.G}}}, nil, response.ErrMaterial},
		{"number", nil, up, response.ErrMaterial},
		{"inside", []response.Material{{Chi: 1}}, element.Point{Charge: 1}, response.ErrSourceInside},
	} {
		if _, err := s.Solve(ctx, c.m, c.applied); !errors.Is(err, c.want) {
			t.Errorf("%s: error %v, want %v", c.name, err, c.want)
		}
	}
	stopped, cancel := context.WithCancel(ctx)
	cancel()
	if _, err := response.Prepare(stopped, []geom.Body{ball}, small); !errors.Is(err, context.Canceled) {
		t.Errorf("stopped: error %v", err)
	}
	r := solve(t, s, up, response.Material{Chi: 1})
	if v := field.At(r, r3.Vec{X: math.NaN()}, field.Mean, field.WantG); v.Status != field.BadInput {
		t.Errorf("NaN: status %v", v.Status)
	}
}

// TestCylindricalShield holds the middle of a long tube across the field against the endless one: with 12 diameters the ends change
// the ratio by 1e-3 of the applied field at most.
func TestCylindricalShield(t *testing.T) {
	if testing.Short() {
		t.Skip("a large mesh")
	}
	tube := geom.Tube{Inner: 0.9, Outer: 1, Height: 24}
	s := prepare(t, &response.Settings{Order: 4}, tube)
	r := solve(t, s, response.Uniform{G: r3.Vec{X: 1}}, response.Material{Chi: 49})
	v := field.At(r, r3.Vec{}, field.Mean, field.WantG|field.WantErr)
	judge(t, "ratio", response.Value{Value: 1 + v.G.X, Estimate: v.ErrG}, closedform.CylindricalShieldRatio(50, 0.9, 1), 1, 1e-3, 1e-3) // the ends
}

// octahedron returns the regular octahedron with vertices at distance 1, without its last faces.
func octahedron(without int) geom.Polyhedron {
	loops := [][]int{{0, 2, 4}, {2, 1, 4}, {1, 3, 4}, {3, 0, 4}, {2, 0, 5}, {1, 2, 5}, {3, 1, 5}, {0, 3, 5}}
	return geom.Polyhedron{Vertices: []r3.Vec{{X: 1}, {X: -1}, {Y: 1}, {Y: -1}, {Z: 1}, {Z: -1}}, Loops: loops[:8-without]}
}

// TestMesh holds the polarizability of an octahedron of metal, as a mesh of triangles, against 3.5507 of its volume
// ([Sihvola2004], recalled), and the plain panels against the graded ones.
func TestMesh(t *testing.T) {
	body := octahedron(0)
	m := response.Material{Chi: inf}
	graded := along(solve(t, prepare(t, &response.Settings{Order: 6}, body), up, m).Moment(0), up.G)
	judge(t, "graded", graded, 3.5507*body.Volume(), body.Volume(), 2e-3, 1e-3) // recalled digits
	plain := along(solve(t, prepare(t, &response.Settings{Order: 4, Plain: true}, body), up, m).Moment(0), up.G)
	judge(t, "plain", plain, graded.Value, body.Volume(), 0.2, 1e-3) // 0.1 measured: no grading at edges
	if _, err := response.Prepare(context.Background(), []geom.Body{octahedron(1)}, nil); err == nil {
		t.Error("an open mesh passed")
	}
}

// TestLaws checks the result as a source: nothing of it is taken for granted.
func TestLaws(t *testing.T) {
	body := geom.Cylinder{Radius: 1, Height: 1}
	r := solve(t, prepare(t, &response.Settings{Order: 6}, body), response.Uniform{G: r3.Vec{X: 0.3, Z: 1}}, response.Material{Chi: 5})
	m := r.Moment(0).Value
	clear := func(x r3.Vec) float64 {
		_, d := geom.Nearest(body, x)
		return d
	}
	err := law.Source(r, law.Claims{Clear: clear, Total: &law.Total{Moment: &m}, Order: 3, Potential: true, Accuracy: 1e-4, Seed: 3}) // the moment's estimate
	if err != nil {
		t.Error(err)
	}
}

// TestEstimate holds the estimates of the default mesh against a finer one.
func TestEstimate(t *testing.T) {
	app := response.Uniform{G: r3.Vec{X: 0.5, Z: 1}}
	for _, body := range []geom.Body{geom.Sphere{Radius: 1}, geom.Box{Size: r3.Vec{X: 1, Y: 1, Z: 1}}} {
		coarse, fine := prepare(t, &response.Settings{Order: 7}, body), prepare(t, &response.Settings{Order: 9}, body)
		for _, chi := range []float64{-1, 10} {
			r, ref := solve(t, coarse, app, response.Material{Chi: chi}), solve(t, fine, app, response.Material{Chi: chi})
			rng := rand.New(rand.NewPCG(5, 6))
			var over []float64
			for range 200 {
				x := r3.Vec{X: 3*rng.Float64() - 1.5, Y: 3*rng.Float64() - 1.5, Z: 3*rng.Float64() - 1.5}
				v := field.At(r, x, field.Mean, field.WantG|field.WantErr)
				miss := r3.Norm(r3.Sub(v.G, ref.Field(x)))
				over = append(over, v.ErrG/miss)
			}
			slices.Sort(over)
			if over[0] < 1 || over[len(over)/2] > 300 { // true everywhere; 100 is the aim, smooth bodies converge faster than three meshes tell
				t.Errorf("%T, chi %g: estimates over errors from %.2g, median %.3g", body, chi, over[0], over[len(over)/2])
			}
		}
	}
}
