package current_test

import (
	"encoding/json"
	"math"
	"math/rand/v2"
	"os"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/cubature"
	"example.com/boundpole/field/current"
	"example.com/boundpole/geom"
	"example.com/boundpole/verify/refcase"
	"gonum.org/v1/gonum/spatial/r3"
)

// TestGuideReference holds chi, g and A of the tubes of dev.json to the contract of closed forms.
func TestGuideReference(t *testing.T) {
	raw, err := os.ReadFile("../../verify/testdata/dev.json")
	if err != nil {
		t.Fatal(err)
	}
	cases, err := refcase.Parse("dev.json", raw)
	if err != nil {
		t.Fatal(err)
	}
	var potentials []struct{ A [][3]string }
	if err := json.Unmarshal(raw, &potentials); err != nil {
		t.Fatal(err)
	}
	points := 0
	for i := range cases {
		c := &cases[i]
		if c.Polarization.Kind != "flux_tube" {
			continue
		}
		pose, err := c.Pose()
		if err != nil {
			t.Fatal(err)
		}
		g, err := current.NewGuide(geom.At(geom.Cylinder{Radius: c.Body.Radius, Height: 2 * c.Body.HalfLen}, pose), c.Polarization.A0)
		if err != nil {
			t.Fatal(err)
		}
		centre, a := refcase.Vec(c.Body.Centre), math.Hypot(c.Body.Radius, c.Body.HalfLen)
		var worst [3]float64
		for k := range c.Points {
			x := refcase.Vec(c.Points[k])
			v := g.At(x, field.Mean)
			charge := field.At(g.Ends(), x, field.Mean, field.WantG|field.WantGrad|field.WantErr)
			far := min(1, a/r3.Norm(r3.Sub(x, centre)))
			slack := 0.0 // what one rounding of the coordinates does to a turned body
			if pose.Turned() {
				slack = 8 * u * r3.Norm(r3.Sub(x, centre))
			}
			hold := func(k int, what string, got []float64, want []string, scale, steep, claim float64) {
				miss, size := off(got, want)
				tol := 1e-12*max(size, 1e-3*scale) + slack*steep
				worst[k] = max(worst[k], miss/tol)
				if !(miss <= tol) || !(miss <= claim+slack*steep) {
					t.Errorf("%s at %v (%s): %s misses by %.3g of %.3g, estimate %.3g", c.ID, x, c.Tags[k], what, miss, tol, claim)
				}
			}
			a0 := c.Polarization.A0
			hold(0, "chi", []float64{v.Chi}, []string{c.Phi[k]}, a0*a*far*far, r3.Norm(charge.G), v.ErrChi)
			hold(1, "g", list(charge.G), c.G[k][:], a0*far*far*far, norm6(charge.Grad), charge.ErrG)
			hold(2, "A", list(v.A), potentials[i].A[k][:], a0*far*far*far, norm6(charge.Grad), v.ErrA)
			if inside := c.Region[k] == "inside"; inside != v.Inside {
				t.Errorf("%s at %v: inside %v, want %s", c.ID, x, v.Inside, c.Region[k])
			}
			points++
		}
		t.Logf("%s: worst chi %.2g, g %.2g, A %.2g of the tolerance", c.ID, worst[0], worst[1], worst[2])
	}
	if points < 100 {
		t.Fatalf("%d points of flux tubes, want at least 100", points)
	}
}

func norm6(g [6]float64) float64 {
	return math.Sqrt(g[0]*g[0] + g[1]*g[1] + g[2]*g[2] + 2*(g[3]*g[3]+g[4]*g[4]+g[5]*g[5]))
}

// wallFlux integrates A = (1/4pi) int K_B x (x-r)/R^3 dA over the walls of an arc that carries c webers by radian: K_B = (c/s) phi x n.
func wallFlux(b geom.Arc, c float64, x r3.Vec) r3.Vec {
	var sum r3.Vec
	add := func(s, phi, z float64, n r3.Vec, w float64) {
		sin, cos := math.Sincos(phi)
		r := r3.Vec{X: s * cos, Y: s * sin, Z: z}
		k := r3.Cross(r3.Scale(c/s, r3.Vec{X: -sin, Y: cos}), n)
		d := r3.Sub(x, r)
		sum = r3.Add(sum, r3.Scale(w/(4*math.Pi*math.Pow(r3.Norm(d), 3)), r3.Cross(k, d)))
	}
	g := cubature.Legendre(40)
	from, angle, half := b.From, b.To-b.From, b.Height/2
	if b.Degrees {
		from, angle = from*math.Pi/180, angle*math.Pi/180
	}
	const turns = 12
	for part := range turns {
		for i, p := range g.X {
			phi := from + angle*(float64(part)+0.5*(1+p))/turns
			wp := 0.5 * g.W[i] * angle / turns
			sin, cos := math.Sincos(phi)
			out := r3.Vec{X: cos, Y: sin}
			for j, q := range g.X {
				z, wz := half*q, half*g.W[j]
				add(b.Outer, phi, z, out, wp*wz*b.Outer)
				add(b.Inner, phi, z, r3.Scale(-1, out), wp*wz*b.Inner)
				s, ws := 0.5*(b.Inner+b.Outer)+0.5*(b.Outer-b.Inner)*q, 0.5*(b.Outer-b.Inner)*g.W[j]
				add(s, phi, half, r3.Vec{Z: 1}, wp*ws*s)
				add(s, phi, -half, r3.Vec{Z: -1}, wp*ws*s)
			}
		}
	}
	return sum
}

// TestArcGuide holds the bent tube against the integral of the flux in its walls, the closed one against zero outside.
func TestArcGuide(t *testing.T) {
	const flux = 0.5
	for _, arc := range []geom.Arc{geom.ArcDegrees(1, 2, 1, 20, 130), {Inner: 1, Outer: 2, Height: 1, From: -1, To: 1}, geom.ArcDegrees(1, 2, 1, 0, 360)} {
		g, err := current.NewArcGuide(arc, geom.Pose{}, flux)
		if err != nil {
			t.Fatal(err)
		}
		in := r3.Vec{X: 1.5 * math.Cos(0.8), Y: 1.5 * math.Sin(0.8), Z: 0.1}
		scale := flux / 1.5
		for _, x := range []r3.Vec{in, {X: 0.2, Y: 0.1, Z: 0.3}, {X: 2, Y: 2.25, Z: -0.5}, {X: -1.5, Y: -0.5, Z: 0.75}, {X: 0.25, Y: -1, Z: 1.25}, {X: 6, Y: -2, Z: 3}} {
			want, v := wallFlux(arc, flux, x), g.At(x, field.Mean)
			miss := r3.Norm(r3.Sub(v.A, want))
			if miss > 1e-10*max(r3.Norm(want), 1e-3*scale) {
				t.Errorf("arc from %v to %v at %v: A %v, by the walls %v, off by %.3g", arc.From, arc.To, x, v.A, want, miss)
			}
			if v.Inside != (x == in) || v.Status != field.Regular {
				t.Errorf("at %v: inside %v, %v", x, v.Inside, v.Status)
			}
			if arc.Full() && !v.Inside && (v.A != r3.Vec{} || r3.Norm(want) > 1e-11*scale) {
				t.Errorf("closed tube at %v: A %v, by the walls %v, want zero", x, v.A, want)
			}
			t.Logf("%v..%v at %v: |A| %.3g, off by %.2g, estimate %.2g", arc.From, arc.To, x, r3.Norm(v.A), miss, v.ErrA)
		}
	}
}

// TestArcGuideEnds: A passes through the ends of a bent tube steadily, and jumps by M_A on its walls.
func TestArcGuideEnds(t *testing.T) {
	turn, err := geom.Turn(r3.Vec{X: 1, Z: 1}, 30)
	if err != nil {
		t.Fatal(err)
	}
	g, err := current.NewArcGuide(geom.ArcDegrees(1, 2, 1, 0, 90), turn, 1.5)
	if err != nil {
		t.Fatal(err)
	}
	at := func(x r3.Vec) r3.Vec { return turn.VectorToOuter(x) }
	end := r3.Vec{X: 1.25, Z: 0.125}
	in, out := g.At(at(r3.Add(end, r3.Vec{Y: 1e-9})), field.Mean), g.At(at(r3.Sub(end, r3.Vec{Y: 1e-9})), field.Mean)
	on := g.At(at(end), field.Mean)
	if d := r3.Norm(r3.Sub(in.A, out.A)); !in.Inside || out.Inside || d > 1e-7 { // 2e-9 of slope 1 to 2, a log beside
		t.Errorf("A jumps by %.3g through the end", d)
	}
	if d := r3.Norm(r3.Sub(on.A, in.A)); d > 1e-7 {
		t.Errorf("A on the end off by %.3g", d)
	}
	wall := r3.Vec{X: 1 / math.Sqrt2, Y: 1 / math.Sqrt2}
	in, out = g.At(at(wall), field.Inside), g.At(at(wall), field.Outside)
	want := turn.VectorToOuter(r3.Scale(1.5, r3.Vec{X: -wall.Y, Y: wall.X}))
	if d := r3.Norm(r3.Sub(r3.Sub(in.A, out.A), want)); d > 1e-14 || in.Status != field.OnFace {
		t.Errorf("jump on the wall %v, want %v; %v", r3.Sub(in.A, out.A), want, in.Status)
	}
}

// TestArcGuideEdges holds A of a bent tube close to the edges of its ends against testdata/arc.py.
func TestArcGuideEdges(t *testing.T) {
	g, err := current.NewArcGuide(geom.ArcDegrees(1, 2, 1, 0, 90), geom.Pose{}, 0.5)
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range []struct {
		x r3.Vec
		a [3]string
	}{
		{r3.Vec{X: 1.5, Y: -1e-3, Z: 0.25}, [3]string{"-0.025728557211984937245", "0.16219090404282529817", "-0.043839010163850775836"}},
		{r3.Vec{X: 1.5, Y: 1e-6, Z: 0.25}, [3]string{"-0.025835338222014441185", "0.16253494864597045913", "-0.043838721337341136094"}},
		{r3.Vec{X: 1.25, Y: -1e-9}, [3]string{"0.019126446959407801429", "0.1945089842451527109", "0"}},
		{r3.Vec{X: 1.0 - 1e-6, Y: -1e-6, Z: 0.1}, [3]string{"0.99595778879563796569", "0.055387216958035919311", "-0.010936749567760261"}},
		{r3.Vec{X: 2.0 + 1e-9, Y: -1e-9, Z: 0.1}, [3]string{"-0.80596336830200035539", "0.028722361749429719628", "-0.0085637387271559607062"}},
		{r3.Vec{X: 1.5, Y: 1e-6, Z: 0.5 - 1e-6}, [3]string{"-0.013403860103022255008", "0.2044335178604555854", "-0.68981580795760629098"}},
		{r3.Vec{X: 1.999999, Y: 1e-3, Z: 0.499}, [3]string{"-0.15981258304548628596", "0.20064213465073400723", "-0.13346918821286535015"}},
	} {
		v := g.At(c.x, field.Mean)
		miss, size := off(list(v.A), c.a[:])
		if miss > 1e-13*size || miss > v.ErrA || v.ErrA > 1e-13 || v.Status != field.Regular {
			t.Errorf("at %v: A %v misses by %.3g of %.3g, estimate %.3g, %v", c.x, v.A, miss, size, v.ErrA, v.Status)
		}
	}
	// far away the charges of the ends cancel: the field of the dipole int M_A dV = c h (b - a) (-1 + ..), to one order in a/R
	far := r3.Vec{X: 1e6, Y: 2e6, Z: 3e5}
	v := g.At(far, field.Mean)
	m := r3.Scale(0.5, r3.Vec{X: -1, Y: 1}) // c (b - a) h times the integral of phi over a quarter turn
	n := r3.Unit(far)
	r := r3.Norm(far)
	want := r3.Scale(1/(4*math.Pi*r*r*r), r3.Sub(r3.Scale(3*r3.Dot(m, n), n), m))
	if d := r3.Norm(r3.Sub(v.A, want)); d > 5e-6*r3.Norm(want) || v.ErrA > 1e-12*r3.Norm(want) {
		t.Errorf("far away: A %v, dipole %v, estimate %.3g", v.A, want, v.ErrA)
	}
	rim := g.At(r3.Vec{X: 2, Z: 0.25}, field.Mean)
	if rim.Status != field.OnEdge || !math.IsNaN(rim.A.X) || math.IsNaN(rim.Chi) {
		t.Errorf("on an edge: %+v", rim)
	}
	if d := field.At(g.Ends(), r3.Vec{X: 3, Y: 1}, field.Mean, field.WantG|field.WantGrad).Grad; math.Abs(d[0]+d[1]+d[2]) > 1e-12 || d[0] == 0 {
		t.Errorf("gradient %v", d)
	}
}

// TestArcGuideLayers holds the charge of the ends against cubature over them, which the gradient comes from.
func TestArcGuideLayers(t *testing.T) {
	rng := rand.New(rand.NewPCG(4, 4))
	for _, arc := range []geom.Arc{geom.ArcDegrees(1, 2, 1, 20, 130), geom.ArcDegrees(0.01, 1, 0.125, -10, 200), geom.ArcDegrees(1, 1.01, 2, 0, 300)} {
		g, err := current.NewArcGuide(arc, geom.Pose{}, 1)
		if err != nil {
			t.Fatal(err)
		}
		worst := 0.0
		for range 40 {
			r := func() float64 { return 4*rng.Float64() - 2 }
			x := r3.Vec{X: r(), Y: r(), Z: r()}
			a := field.At(g.Ends(), x, field.Mean, field.WantPhi|field.WantG|field.WantErr)
			b := field.At(g.Ends(), x, field.Mean, field.WantPhi|field.WantG|field.WantGrad|field.WantErr)
			miss := r3.Norm(r3.Sub(a.G, b.G))
			worst = max(worst, miss/r3.Norm(b.G))
			if miss > a.ErrG+b.ErrG || math.Abs(a.Phi-b.Phi) > a.ErrPhi+b.ErrPhi || a.ErrG > 1e-11/arc.Inner {
				t.Errorf("%+v at %v: g %v, by cubature %v, off by %.3g, estimates %.3g, %.3g; phi %v and %v", arc, x, a.G, b.G, miss, a.ErrG, b.ErrG, a.Phi, b.Phi)
			}
		}
		t.Logf("%+v: worst %.2g of g", arc, worst)
	}
}

// TestThickGuide holds a wall of some thickness against thin ones one inside the other.
func TestThickGuide(t *testing.T) {
	wall := geom.Tube{Inner: 0.5, Outer: 1, Height: 2}
	g, err := current.NewThickGuide(wall, geom.Translate(r3.Vec{Z: 3}), 2)
	if err != nil {
		t.Fatal(err)
	}
	rule := cubature.Legendre(24)
	for _, x := range []r3.Vec{{X: 0.125, Z: 0.25}, {X: -0.25, Y: 0.125, Z: 0.75}, {X: 1.5, Y: 1}, {Z: -2}, {X: 0.6, Z: 0.3}} {
		var want r3.Vec
		s0 := math.Hypot(x.X, x.Y)
		for _, part := range [][2]float64{{0.5, math.Min(math.Max(s0, 0.5), 1)}, {math.Min(math.Max(s0, 0.5), 1), 1}} { // A of a thin tube jumps at its radius
			for i, p := range rule.X {
				w := 0.5 * (part[1] - part[0]) * rule.W[i]
				if w == 0 {
					continue
				}
				thin, err := current.NewGuide(geom.Cylinder{Radius: 0.5*(part[0]+part[1]) + 0.5*(part[1]-part[0])*p, Height: 2}, 2*w)
				if err != nil {
					t.Fatal(err)
				}
				want = r3.Add(want, thin.At(x, field.Mean).A)
			}
		}
		v := g.At(r3.Add(x, r3.Vec{Z: 3}), field.Mean)
		if miss := r3.Norm(r3.Sub(v.A, want)); miss > 1e-11 || miss > v.ErrA+1e-13 || v.Status != field.Regular { // of A of about 1
			t.Errorf("at %v: A %v, by thin tubes %v, off by %.3g, estimate %.3g, %v", x, v.A, want, miss, v.ErrA, v.Status)
		}
	}
	if b := current.At(g, r3.Vec{X: 0.75, Z: 3}, field.Mean).B; b != (r3.Vec{Y: 2}) {
		t.Errorf("flux density in the wall %v, want 2 along phi", b)
	}
}

// TestLoopIntegral: the loop integral of A is the flux through the loop, of guides, of wires and of magnets.
func TestLoopIntegral(t *testing.T) {
	guide, err := current.NewGuide(geom.Cylinder{Radius: 0.5, Height: 4}, 1.5)
	if err != nil {
		t.Fatal(err)
	}
	closed, err := current.NewArcGuide(geom.ArcDegrees(1, 2, 1, 0, 360), geom.Pose{}, 0.5)
	if err != nil {
		t.Fatal(err)
	}
	thick, err := current.NewThickGuide(geom.Tube{Inner: 0.5, Outer: 1, Height: 2}, geom.Pose{}, 2)
	if err != nil {
		t.Fatal(err)
	}
	round := func(z0, z1, s0, s1 float64) current.Path { // up at s0, down at s1
		return current.Path{{X: s0, Z: z0}, {X: s0, Z: z1}, {X: s1, Z: z1}, {X: s1, Z: z0}}
	}
	wire, err := current.NewSegment(r3.Vec{Z: -1e9}, r3.Vec{Z: 1e9}, 3)
	if err != nil {
		t.Fatal(err)
	}
	ball, err := current.Of(geom.Sphere{Radius: 1}, field.Uniform{P: r3.Vec{Z: 3}})
	if err != nil {
		t.Fatal(err)
	}
	turn, err := geom.Turn(r3.Vec{X: 1, Y: 2, Z: -3}, 40)
	if err != nil {
		t.Fatal(err)
	}
	l, err := current.NewLoop(geom.Disc{Radius: 1}, 1)
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range []struct {
		name  string
		src   current.Source
		curve current.Curve
		want  float64
	}{
		{"through the wall of a tube", guide, round(-1.25, 0.75, 0.25, 1), 1.5 * 2},
		{"round the end of a tube", guide, round(-1, 3, 0.125, 0.75), 1.5 * 3},
		{"beside a tube", guide, round(-1, 1, 0.75, 2), 0},
		{"inside a tube", guide, round(-1, 1, 0.125, 0.375), 0},
		{"in the bore of a closed tube", closed, current.Circle{Radius: 1.5}, 2 * math.Pi * 0.5},
		{"outside a closed tube", closed, current.Circle{Radius: 2.5}, 0},
		{"half the thickness of a wall", thick, round(-0.5, 0.5, 0.25, 0.75), 0.5},
		{"beside a wire", wire, current.Path{{X: 1}, {X: 2}, {X: 2, Z: 1}, {X: 1, Z: 1}}, -3 / (2 * math.Pi) * math.Log(2)},
		{"equator of a magnetized ball, b = 2/3 m", ball, current.Circle{Radius: 1, Pose: turn.Then(geom.Pose{})}, math.NaN()},
		{"middle of a magnetized ball", ball, current.Circle{Radius: 0.5}, 2 * math.Pi * 0.25},
		{"coaxial loops", l, current.Circle{Radius: 1, Pose: geom.Translate(r3.Vec{Z: 1})}, coaxial(1, 1, 1)},
	} {
		if math.IsNaN(c.want) { // a tilted great circle: the flux is that of the projected disc
			c.want = 2 * math.Pi * turn.VectorToOuter(r3.Vec{Z: 1}).Z
		}
		got, estimate, err := current.LoopIntegral(t.Context(), c.src, c.curve, 0)
		if miss := math.Abs(got - c.want); err != nil || miss > 1e-11*max(math.Abs(c.want), 1) || miss > estimate+4*u*math.Abs(c.want) {
			t.Errorf("%s: %.15g, want %.15g, off by %.3g, estimate %.3g, %v", c.name, got, c.want, miss, estimate, err)
		} else {
			t.Logf("%s: %.15g off by %.2g, estimate %.2g", c.name, got, miss, estimate)
		}
	}
	if _, _, err := current.LoopIntegral(t.Context(), l, current.Circle{Radius: 1}, 0); err == nil {
		t.Error("the flux of a loop through itself is infinite and was accepted")
	}
	if _, _, err := current.LoopIntegral(t.Context(), l, current.Path{}, 0); err == nil {
		t.Error("an empty curve was accepted")
	}
	if _, _, err := current.LoopIntegral(t.Context(), l, current.Circle{Radius: 2}, 1); err == nil {
		t.Error("accuracy 1 was accepted")
	}
}

// coaxial returns the mutual inductance by mu0 of two coaxial loops, by the mean of cos(phi)/R over the angle between them [Maxwell1873]:
// the periodic midpoint rule.
func coaxial(a, b, z float64) float64 {
	const n = 400
	sum := 0.0
	for k := range n {
		c := math.Cos(2 * math.Pi * (float64(k) + 0.5) / n)
		sum += c / math.Sqrt(a*a+b*b-2*a*b*c+z*z)
	}
	return a * b / 2 * sum * 2 * math.Pi / n
}
