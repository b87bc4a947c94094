package cubature_test

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/cubature"
	"example.com/boundpole/field/element"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

const all = field.WantPhi | field.WantG | field.WantGrad | field.WantErr

func newLayer(t testing.TB, c []geom.Chart, density func(x, n r3.Vec) float64, s *cubature.Settings) *cubature.Layer {
	t.Helper()
	l, err := cubature.NewLayer(c, density, s)
	if err != nil {
		t.Fatal(err)
	}
	return l
}

func sphere() []geom.Chart { return ellipsoid(r3.Vec{X: 1, Y: 1, Z: 1}) }

// TestSphereDistances holds a sphere of charts against closed forms from 1e-12 off the surface to 1e6 radii, and on it.
func TestSphereDistances(t *testing.T) {
	ball := geom.Sphere{Radius: 1}
	for _, c := range []struct {
		name    string
		charts  []geom.Chart
		density func(x, n r3.Vec) float64
		ref     field.Source
		neutral bool
	}{
		{"uniform", sphere(), func(_, _ r3.Vec) float64 { return 1 }, element.ChargedSphere{Shape: ball, Density: 1}, false},
		{"cosine", sphere(), func(_, n r3.Vec) float64 { return n.Z }, element.Sphere{Shape: ball, P: r3.Vec{Z: 1}}, true},
		{"cosine with tips", []geom.Chart{globe{0, 0.5}, globe{0.5, 1}}, func(_, n r3.Vec) float64 { return n.Z },
			element.Sphere{Shape: ball, P: r3.Vec{Z: 1}}, true},
	} {
		l := newLayer(t, c.charts, c.density, &cubature.Settings{Neutral: c.neutral})
		for _, e := range []r3.Vec{{X: .36, Y: .48, Z: .8}, {X: 1, Z: 1}, {X: 1, Y: 1, Z: 1}, {X: 1e-7, Y: 1e-12, Z: 1}} {
			for _, d := range []float64{0, 1e-12, -1e-12, 1e-9, -1e-6, 1e-3, -0.1, 0.5, 2, 10, 1e3, 1e6} {
				x := r3.Scale(1+d, r3.Unit(e))
				v, ref := field.At(l, x, field.Mean, all), field.At(c.ref, x, field.Mean, all)
				at := 1 / (1 + max(d, 0))
				tol := 1e-12
				if len(c.charts) == 2 {
					tol = 1e-11 // beside the tip seams are placed to u/1e-7
				}
				phi0, g0 := at, at*at // the natural scales; one power less where the charge is neutral
				if c.neutral {
					phi0, g0 = phi0*at, g0*at
				}
				if v.Status != ref.Status {
					t.Errorf("%s at %v, height %v: status %v, want %v", c.name, e, d, v.Status, ref.Status)
				}
				if ep := math.Abs(v.Phi - ref.Phi); !(ep <= tol*phi0) { // the claim
					t.Errorf("%s at %v, height %v: phi %v, want %v, error %.3g", c.name, e, d, v.Phi, ref.Phi, ep)
				}
				if eg := r3.Norm(r3.Sub(v.G, ref.G)); !(eg <= tol*g0) { // the claim
					t.Errorf("%s at %v, height %v: g %v, want %v, error %.3g", c.name, e, d, v.G, ref.G, eg)
				}
			}
		}
	}
}

// TestSides checks the three limits on a charged face.
func TestSides(t *testing.T) {
	l := newLayer(t, sphere(), func(_, n r3.Vec) float64 { return n.Z }, nil)
	ref := element.Sphere{Shape: geom.Sphere{Radius: 1}, P: r3.Vec{Z: 1}}
	x := r3.Vec{X: .36, Y: .48, Z: .8}
	for _, side := range []field.Side{field.Mean, field.Inside, field.Outside} {
		v, w := field.At(l, x, side, all), field.At(ref, x, side, all)
		if e := r3.Norm(r3.Sub(v.G, w.G)); v.Status != field.OnFace || e > 1e-13 { // 1e3 u: the sum runs over 37 powers of e
			t.Errorf("side %v: status %v, g %v, want %v, error %.3g", side, v.Status, v.G, w.G, e)
		}
	}
}

// TestSpheroids holds flat and long ellipsoids against the closed form, gradient included.
func TestSpheroids(t *testing.T) {
	rng := rand.New(rand.NewPCG(1, 1))
	for _, semi := range []r3.Vec{{X: 1, Y: 1, Z: 0.3}, {X: 0.4, Y: 0.5, Z: 1}} {
		p := r3.Vec{X: 0.3, Y: -0.5, Z: 0.8}
		ref, err := element.NewEllipsoid(geom.Ellipsoid{SemiAxes: semi}, p)
		if err != nil {
			t.Fatal(err)
		}
		l := newLayer(t, ellipsoid(semi), func(_, n r3.Vec) float64 { return r3.Dot(p, n) }, &cubature.Settings{Neutral: true})
		var s score
		for range 25 {
			e := onSphere(rng)
			foot := r3.Vec{X: e.X * semi.X, Y: e.Y * semi.Y, Z: e.Z * semi.Z}
			n := r3.Unit(r3.Vec{X: e.X / semi.X, Y: e.Y / semi.Y, Z: e.Z / semi.Z})
			x := r3.Add(foot, r3.Scale(offset(rng, -12, 0), n))
			s.take(t, "spheroid", x, field.At(l, x, field.Mean, all), field.At(ref, x, field.Mean, all), all)
		}
		if s.untrue > 0 || s.unconverged > 0 || s.worst[0] > 1e-12 || s.worst[1] > 1e-12 || s.worst[2] > 1e-9 { // the contract
			t.Errorf("%v: %d estimates untrue, %d unconverged, worst errors %.2g of phi, %.2g of g, %.2g of the gradient", semi, s.untrue, s.unconverged,
				s.worst[0], s.worst[1], s.worst[2])
		}
	}
}

// TestBoxFaces holds the faces of a box as charts against the polyhedron, beside faces, edges and vertices.
func TestBoxFaces(t *testing.T) {
	h := r3.Vec{X: 0.5, Y: 0.35, Z: 0.8}
	p := r3.Vec{X: 0.3, Y: -0.5, Z: 0.8}
	box := geom.Box{Size: r3.Scale(2, h)}
	ref := element.NewPolyhedron(box.Polyhedron(), field.Affine{Value: p})
	l := newLayer(t, boxFaces(h), func(_, n r3.Vec) float64 { return r3.Dot(p, n) }, &cubature.Settings{Neutral: true})
	for _, c := range []struct {
		name string
		x    r3.Vec
		tol  float64 // 1e-12, and 8 u/d where an edge at distance d is placed by rounded charts
	}{
		{"centre", r3.Vec{}, 1e-12},
		{"above a face", r3.Vec{X: 0.1, Y: 0.2, Z: 0.8 + 1e-12}, 1e-12},
		{"below a face", r3.Vec{X: 0.1, Y: 0.2, Z: 0.8 - 1e-9}, 1e-12},
		{"in a face's plane", r3.Vec{X: 0.7, Y: 0.2, Z: 0.8}, 1e-12},
		{"beside an edge", r3.Vec{X: 0.5 + 1e-3, Y: 0.35, Z: 0.1}, 1e-12},
		{"close to an edge", r3.Vec{X: 0.5 + 1e-6, Y: 0.35 + 1e-6, Z: 0.1}, 8 * u / 1e-6},
		{"grazing an edge", r3.Vec{X: 0.5 + 1e-12, Y: 0.35, Z: 0.1}, 8 * u / 1e-12},
		{"beside a vertex", r3.Vec{X: 0.5 + 1e-4, Y: 0.35 + 1e-4, Z: 0.8 + 1e-4}, 8 * u / 1e-4},
		{"beyond a vertex", r3.Vec{X: 0.6, Y: 0.5, Z: 0.9}, 1e-12},
	} {
		v, w := field.At(l, c.x, field.Mean, all), field.At(ref, c.x, field.Mean, all)
		ep, eg := math.Abs(v.Phi-w.Phi), r3.Norm(r3.Sub(v.G, w.G))
		if !(ep <= 1e-12 && eg <= c.tol) || ep > v.ErrPhi+w.ErrPhi || eg > v.ErrG+w.ErrG {
			t.Errorf("%s %v: error phi %.3g estimate %.3g, g %.3g estimate %.3g, tolerance %.3g (%v)", c.name, c.x, ep, v.ErrPhi, eg, v.ErrG, c.tol, v.Status)
		}
	}
	on := field.At(l, r3.Vec{X: 0.5, Y: 0.35, Z: 0.1}, field.Mean, all)
	w := field.At(ref, r3.Vec{X: 0.5, Y: 0.35, Z: 0.1}, field.Mean, all)
	if on.Status != field.OnEdge || !math.IsNaN(on.G.X) || math.Abs(on.Phi-w.Phi) > 1e-12 || !(math.Abs(on.Phi-w.Phi) <= on.ErrPhi+w.ErrPhi) {
		t.Errorf("on an edge: status %v, g %v, phi %v, want %v, estimate %v", on.Status, on.G, on.Phi, w.Phi, on.ErrPhi)
	}
}

// TestRoundFaces holds disc, annulus and wall against their closed forms, off rims as well.
func TestRoundFaces(t *testing.T) {
	disc, err := element.NewDisc(geom.Disc{Radius: 1}, 1)
	if err != nil {
		t.Fatal(err)
	}
	annulus, err := element.NewAnnulus(geom.Annulus{Inner: 0.5, Outer: 1}, 1)
	if err != nil {
		t.Fatal(err)
	}
	wall, err := element.NewWall(geom.Wall{Radius: 1, Z1: -0.5, Z2: 0.7}, 1, 0, 0)
	if err != nil {
		t.Fatal(err)
	}
	one := func(_, _ r3.Vec) float64 { return 1 }
	var outward []geom.Chart
	for _, c := range ring(1, -0.5, 1, 0.7) {
		outward = append(outward, cubature.Reversed{Chart: c})
	}
	rng := rand.New(rand.NewPCG(2, 3))
	for _, c := range []struct {
		name   string
		charts []geom.Chart
		ref    field.Source
		near   func() r3.Vec
	}{
		{"disc", ring(0, 0, 1, 0), disc, func() r3.Vec {
			return r3.Vec{X: 1 + offset(rng, -6, 0), Y: offset(rng, -9, -1), Z: offset(rng, -9, 0)}
		}},
		{"annulus", ring(0.5, 0, 1, 0), annulus, func() r3.Vec {
			return r3.Vec{X: offset(rng, -6, -1), Y: 0.5 + offset(rng, -6, -1), Z: offset(rng, -9, 0)}
		}},
		{"wall", outward, wall, func() r3.Vec {
			return r3.Vec{X: 1 + offset(rng, -9, 0), Y: offset(rng, -9, -1), Z: 0.7 + offset(rng, -6, -1)}
		}},
	} {
		l := newLayer(t, c.charts, one, nil)
		var s score
		for range 60 {
			x := c.near()
			s.take(t, c.name, x, field.At(l, x, field.Mean, all), field.At(c.ref, x, field.Mean, all), all)
		}
		if s.untrue > 0 || s.worst[0] > 1e-12 || s.worst[1] > 1e-9 { // 8 u/d within 1e-6 of a rim
			t.Errorf("%s: %d estimates untrue, %d unconverged, worst errors %.2g of phi, %.2g of g, %.2g of the gradient", c.name, s.untrue,
				s.unconverged, s.worst[0], s.worst[1], s.worst[2])
		}
	}
}

// TestEdgeSingularDensity: a disc at unit potential has density 2/(pi sqrt(1 - r^2)) on each side; a hundred panels follow it to
// 2^-24 of the rim, and what is lost there is in the estimate.
func TestEdgeSingularDensity(t *testing.T) {
	density := func(x, _ r3.Vec) float64 {
		r := math.Hypot(x.X, x.Y)
		return 4 / math.Pi / math.Sqrt(max((1-r)*(1+r), 1e-16))
	}
	l := newLayer(t, ring(0, 0, 1, 0), density, &cubature.Settings{MaxPanels: 100})
	for _, x := range []r3.Vec{{X: 0.3, Z: 0.4}, {X: 0.2, Y: 0.1, Z: 1e-6}, {Z: 3}} {
		v := field.At(l, x, field.Mean, all)
		s := x.X*x.X + x.Y*x.Y + x.Z*x.Z - 1
		want := 2 / math.Pi * math.Atan(math.Sqrt(2/(s+math.Sqrt(s*s+4*x.Z*x.Z)))) // oblate coordinates, recalled from memory
		if e := math.Abs(v.Phi - want); e > v.ErrPhi || e > 3e-4 {                 // sqrt(2^-24) of the charge is in the last panels
			t.Errorf("at %v: phi %v, want %v, error %.3g, estimate %.3g (%v)", x, v.Phi, want, e, v.ErrPhi, v.Status)
		}
	}
	if l.Unresolved() == 0 {
		t.Error("an endpoint singularity counts as resolved")
	}
}

// rough is a chart whose derivatives are wrong by a relative 1e-9, as differences may be.
type rough struct{ c geom.Chart }

func (r rough) At(u, v float64) (x, xu, xv r3.Vec) {
	x, xu, xv = r.c.At(u, v)
	return x, r3.Scale(1+1e-9, xu), xv
}

// TestRoughDerivatives: derivatives that do not belong to the places are found out and enter the estimate.
func TestRoughDerivatives(t *testing.T) {
	var charts []geom.Chart
	for _, c := range sphere() {
		charts = append(charts, rough{c})
	}
	l := newLayer(t, charts, func(_, _ r3.Vec) float64 { return 1 }, nil)
	ref := element.ChargedSphere{Shape: geom.Sphere{Radius: 1}, Density: 1}
	for _, x := range []r3.Vec{{X: 0.3, Y: 0.2}, {X: 1 + 1e-7}, {X: 2}, {Y: 50}} {
		v, w := field.At(l, x, field.Mean, all), field.At(ref, x, field.Mean, all)
		ep, eg := math.Abs(v.Phi-w.Phi), r3.Norm(r3.Sub(v.G, w.G))
		if ep > v.ErrPhi || eg > v.ErrG || v.ErrPhi > 1e-7 { // 100 times what the derivatives err by
			t.Errorf("at %v: phi errs by %.3g, estimate %.3g, g by %.3g, estimate %.3g", x, ep, v.ErrPhi, eg, v.ErrG)
		}
	}
}

func TestLayerRefuses(t *testing.T) {
	one := func(_, _ r3.Vec) float64 { return 1 }
	for name, f := range map[string]func() error{
		"no charts":  func() error { _, err := cubature.NewLayer(nil, one, nil); return err },
		"no density": func() error { _, err := cubature.NewLayer(sphere(), nil, nil); return err },
		"nil chart":  func() error { _, err := cubature.NewLayer([]geom.Chart{nil}, one, nil); return err },
		"bad density": func() error {
			_, err := cubature.NewLayer(sphere(), func(_, _ r3.Vec) float64 { return math.NaN() }, nil)
			return err
		},
		"accuracy": func() error { _, err := cubature.NewLayer(sphere(), one, &cubature.Settings{Accuracy: 1}); return err },
	} {
		if f() == nil {
			t.Errorf("%s: no error", name)
		}
	}
	v := field.At(newLayer(t, sphere(), one, nil), r3.Vec{X: math.NaN()}, field.Mean, all)
	if v.Status != field.BadInput || !math.IsNaN(v.Phi) {
		t.Errorf("NaN gives %v, %v", v.Phi, v.Status)
	}
}
