package response_test

import (
	"context"
	"math"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/closedform"
	"example.com/boundpole/field/response"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

var (
	inf = math.Inf(1)
	up  = field.Constant{G: r3.Vec{Z: 1}}
)

func prepare(t *testing.T, set *response.Settings, bodies ...geom.Body) *response.System {
	t.Helper()
	s, err := response.Prepare(context.Background(), bodies, set)
	if err != nil {
		t.Fatal(err)
	}
	return s
}

func solve(t *testing.T, s *response.System, applied field.Source, materials ...response.Material) *response.Response {
	t.Helper()
	r, err := s.Solve(context.Background(), materials, applied)
	if err != nil {
		t.Fatal(err)
	}
	if !(r.Report.Leak <= 1e-10) { // the bar; rounding alone is 1e-15
		t.Errorf("materials %v: leak %.1e", materials, r.Report.Leak)
	}
	return r
}

// judge checks a value against what is known: the error against a tolerance, and the estimate against the error.
func judge(t *testing.T, what string, got response.Value, want, scale, tolerance, digits float64) {
	t.Helper()
	miss := math.Abs(got.Value - want)
	if !(miss <= tolerance*scale) {
		t.Errorf("%s: got %.12g, want %.12g, error %.1e of %.1e", what, got.Value, want, miss/scale, tolerance)
	}
	if !(miss <= got.Estimate+digits*scale) {
		t.Errorf("%s: error %.1e above its estimate %.1e", what, miss/scale, got.Estimate/scale)
	}
	if !(got.Estimate <= 100*tolerance*scale) {
		t.Errorf("%s: estimate %.1e of no use", what, got.Estimate/scale)
	}
}

func along(v response.Vector, d r3.Vec) response.Value {
	return response.Value{Value: r3.Dot(v.Value, d), Estimate: v.Estimate}
}

func polarizability(n, chi float64) float64 {
	if math.IsInf(chi, 1) {
		return 1 / n
	}
	return chi / (1 + n*chi)
}

func TestSphere(t *testing.T) {
	s := prepare(t, nil, geom.Sphere{Radius: 1})
	for _, chi := range []float64{-1, -0.9, -0.1, 1e-6, 0.05, 1, 10, 1e5, inf} {
		r := solve(t, s, up, response.Material{Chi: chi})
		want := polarizability(1.0/3, chi) * 4 * math.Pi / 3
		judge(t, "moment", along(r.Moment(0), up.G), want, math.Abs(want), 1e-9, 1e-15) // 1e-10 measured
		energy := -want / 2
		judge(t, "energy", r.Energy(), energy, math.Abs(want), 1e-9, 1e-15) // as the moment
		for _, x := range []r3.Vec{{}, {X: 0.5, Y: 0.3, Z: -0.6}, {X: 0.999}, {Z: 1 - 1e-12}, {Y: 1.2}, {X: 1 + 1e-9}, {X: 30, Z: 40}, {X: 3e5, Y: 1e6}} {
			v := field.At(r, x, field.Mean, field.WantG|field.WantErr|field.WantPhi)
			p := r3.Vec{Z: polarizability(1.0/3, chi)}
			ref := closedform.SphereField(p, 1, x)
			miss, scale := r3.Norm(r3.Sub(v.G, ref)), p.Z*min(1, math.Pow(r3.Norm(x), -3))
			if !(miss <= 2e-7*math.Abs(scale)) { // 6e-8 measured on the face, where the density counts; 5e-12 in the middle
				t.Errorf("chi %g at %v: got %v, want %v, error %.1e", chi, x, v.G, ref, miss/scale)
			}
			if miss > v.ErrG {
				t.Errorf("chi %g at %v: error %.1e above estimate %.1e", chi, x, miss/scale, v.ErrG/scale)
			}
			phi := closedform.SpherePotential(p, 1, x)
			if d := math.Abs(v.Phi - phi); !(d <= v.ErrPhi) || !(v.ErrPhi <= 1e-6*math.Abs(p.Z)) { // mesh
				t.Errorf("chi %g at %v: potential %v, want %v, estimate %.1e", chi, x, v.Phi, phi, v.ErrPhi)
			}
		}
	}
}

func TestSides(t *testing.T) {
	r := solve(t, prepare(t, &response.Settings{Order: 6}, geom.Sphere{Radius: 1}), up, response.Material{Chi: 3})
	x := r3.Vec{X: 0.36, Y: 0.48, Z: 0.8}
	in, out, mean := field.At(r, x, field.Inside, field.WantG), field.At(r, x, field.Outside, field.WantG), field.At(r, x, field.Mean, field.WantG)
	if in.Status != field.OnFace || out.Status != field.OnFace || mean.Status != field.OnFace {
		t.Errorf("status %v, %v, %v on the face", in.Status, out.Status, mean.Status)
	}
	sigma := 1.5 * x.Z                                                           // p = 3 chi/(3 + chi)
	if d := r3.Norm(r3.Sub(r3.Sub(out.G, in.G), r3.Scale(sigma, x))); d > 1e-4 { // order 6 on 24 panels: density 1e-4
		t.Errorf("jump %v, want %v along the normal", r3.Sub(out.G, in.G), sigma)
	}
	if d := r3.Norm(r3.Sub(mean.G, r3.Scale(0.5, r3.Add(in.G, out.G)))); d > 1e-12 { // two roundings of the same values
		t.Errorf("mean %v is not between %v and %v", mean.G, in.G, out.G)
	}
}

func TestRim(t *testing.T) {
	r := solve(t, prepare(t, &response.Settings{Order: 6}, geom.Cylinder{Radius: 1, Height: 2}), up, response.Material{Chi: 3})
	v := field.At(r, r3.Vec{X: 1, Z: 1}, field.Mean, field.WantG|field.WantPhi)
	near := field.At(r, r3.Vec{X: 1 + 1e-5, Z: 1 + 1e-5}, field.Mean, field.WantPhi)
	if v.Status != field.OnEdge || !math.IsNaN(v.G.X) || !(math.Abs(v.Phi-near.Phi) < 1e-3) { // g grows like 1e-5 to the power -1/3 at most
		t.Errorf("on the rim: %+v, potential beside it %v", v, near.Phi)
	}
}

func TestEllipsoid(t *testing.T) {
	e := geom.Ellipsoid{SemiAxes: r3.Vec{X: 1, Y: 2, Z: 3}}
	s := prepare(t, &response.Settings{Order: 7}, e)
	n := closedform.EllipsoidFactors(e.SemiAxes)
	for _, chi := range []float64{-1, inf} {
		for _, c := range []struct {
			d r3.Vec
			n float64
		}{{r3.Vec{X: 1}, n.X}, {r3.Vec{Z: 1}, n.Z}} {
			r := solve(t, s, field.Constant{G: c.d}, response.Material{Chi: chi})
			want := polarizability(c.n, chi) * e.Volume()
			judge(t, "moment", along(r.Moment(0), c.d), want, math.Abs(want), 1e-6, 0) // 1e-6 is the bar; 8e-10 measured with the default order
			v := field.At(r, r3.Vec{X: 0.2, Y: -0.5, Z: 1}, field.Mean, field.WantG|field.WantErr)
			p := want / e.Volume()
			if d := r3.Norm(r3.Add(v.G, r3.Scale(c.n*p, c.d))); d > v.ErrG || d > 1e-5*math.Abs(p) { // 1e-4 is the bar
				t.Errorf("chi %g: inner field off by %.1e, estimate %.1e", chi, d, v.ErrG)
			}
		}
	}
}

func TestShell(t *testing.T) {
	for _, c := range []struct {
		wall, tolerance float64
		order           int
	}{{0.3, 1e-6, 6}, {0.02, 1e-6, 7}} { // 1e-6 is the bar
		shell := geom.HollowSphere{Inner: 1 - c.wall, Outer: 1}
		s := prepare(t, &response.Settings{Order: c.order}, shell)
		for _, mu := range []float64{0.1, 1e5} {
			r := solve(t, s, up, response.Material{Chi: mu - 1})
			want := closedform.SphericalShieldMoment(mu, shell.Inner, 1) * 4 * math.Pi / 3
			judge(t, "moment", along(r.Moment(0), up.G), want, math.Abs(want), c.tolerance, 0)
			v := field.At(r, r3.Vec{X: 0.3, Z: 0.4}, field.Mean, field.WantG|field.WantErr)
			ratio := closedform.SphericalShieldRatio(mu, shell.Inner, 1)
			judge(t, "shielding", response.Value{Value: 1 + v.G.Z, Estimate: v.ErrG}, ratio, 1, c.tolerance, 0)
		}
	}
}

func TestCoated(t *testing.T) {
	s := prepare(t, &response.Settings{Order: 6}, geom.HollowSphere{Inner: 0.7, Outer: 1}, geom.Sphere{Radius: 0.7})
	for _, c := range [][2]float64{{2, 10}, {10, 2}, {1e5, 0.3}, {3, 3}} {
		core, coat := c[0], c[1]
		r := solve(t, s, up, response.Material{Chi: coat - 1}, response.Material{Chi: core - 1})
		want := closedform.CoatedSpherePolarizability(core, coat, 0.7, 1) * 4 * math.Pi / 3
		judge(t, "moment", along(r.Total(), up.G), want, math.Abs(want), 1e-6, 0) // order 6
		v := field.At(r, r3.Vec{X: 0.1, Z: 0.2}, field.Mean, field.WantG|field.WantErr)
		judge(t, "core", response.Value{Value: 1 + v.G.Z, Estimate: v.ErrG}, closedform.CoatedSphereCoreRatio(core, coat, 0.7, 1), 1, 1e-6, 0)
	}
	if _, _, err := solve(t, s, up, response.Material{Chi: 1}, response.Material{Chi: 2}).Force(0, r3.Vec{}); err == nil {
		t.Error("a force between bodies that share a face")
	}
}

// TestCube holds the polarizability of the cube against [Helsing2013] (chi = inf, from memory) and the values that the
// total-potential equation with plane panels and one Richardson step gave, which are good to 1e-4 (3e-4 at high contrast).
func TestCube(t *testing.T) {
	s := prepare(t, nil, geom.Box{Size: r3.Vec{X: 1, Y: 1, Z: 1}})
	for _, c := range []struct{ chi, want, tolerance, digits float64 }{
		{inf, 3.644305190268, 2e-5, 0}, // 1e-4 is the bar
		{9, 2.5112, 1e-4, 3e-5},
		{1, 0.760151, 1e-4, 3e-6}, // from the next order, 0.7601484
		{-0.9, -1.3647, 1e-4, 3e-5},
		{-1, -1.638416, 1e-4, 1e-5},
	} {
		r := solve(t, s, up, response.Material{Chi: c.chi})
		judge(t, "moment", along(r.Moment(0), up.G), c.want, math.Abs(c.want), c.tolerance, c.digits)
	}
}

// TestCylinder holds the magnetometric factor 1/<p> - 1/chi against values from exact solid angles of bands, extrapolated to
// seven digits ([Chen1991] has three to four of them).
func TestCylinder(t *testing.T) {
	chis := []float64{-1, 1, 10, inf}
	for _, c := range []struct {
		ratio float64
		n     []float64
	}{
		{0.1, []float64{0.8294864, 0.7839877, 0.7602701, 0.7502827}},
		{1, []float64{0.3692299, 0.2941317, 0.2679628, 0.2589733}},
	} {
		if testing.Short() && c.ratio != 1 {
			continue
		}
		body := geom.Cylinder{Radius: 1, Height: 2 * c.ratio}
		s := prepare(t, nil, body)
		for k, chi := range chis {
			r := solve(t, s, up, response.Material{Chi: chi})
			m := along(r.Moment(0), up.G)
			p := m.Value / body.Volume()
			n := response.Value{Value: 1/p - 1/chi, Estimate: m.Estimate / body.Volume() / (p * p)}
			judge(t, "factor", n, c.n[k], 1, 1e-5, 1e-7) // 1e-5 is the bar, the table has seven digits
		}
	}
}
