package handover_test

import (
	"bytes"
	"fmt"
	"io"
	"math"
	"slices"
	"strings"
	"sync"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/codata"
	"example.com/boundpole/field/cubature"
	"example.com/boundpole/field/element"
	"example.com/boundpole/field/handover"
	"example.com/boundpole/geom"
	"github.com/google/go-cmp/cmp"
	"gonum.org/v1/gonum/spatial/r3"
)

// body returns a part with bound charge.
func body(t testing.TB, b geom.Body, p field.Polarization) bound.Member {
	t.Helper()
	c, err := bound.Of(b, p)
	if err != nil {
		t.Fatal(err)
	}
	return bound.Member{Charge: c}
}

// tilted returns a pose that is along no axis.
func tilted(t testing.TB, shift r3.Vec) geom.Pose {
	t.Helper()
	p, err := geom.Turn(r3.Vec{X: 1, Y: 2, Z: 3}, 37)
	if err != nil {
		t.Fatal(err)
	}
	return p.Then(geom.Translate(shift))
}

// graded returns p = k (x, y, z)/3 plus v.
func graded(v r3.Vec, k float64) field.Affine {
	a := field.Affine{Value: v}
	for i := range 3 {
		a.Gradient[i][i] = k / 3
	}
	return a
}

// scene is an assembly with what is to be known of it.
type scene struct {
	name     string
	parts    bound.Assembly
	settings handover.Settings
	total    float64
	moment   r3.Vec // about the centre; zero where the total is not
}

var made struct {
	sync.Once
	scenes []scene
}

// scenes returns the scenes of the tests, made once.
func scenes(t testing.TB) []scene {
	t.Helper()
	made.Do(func() { made.scenes = makeScenes(t) })
	return slices.Clone(made.scenes)
}

func makeScenes(t testing.TB) []scene {
	t.Helper()
	block := geom.Box{Size: r3.Vec{X: 20, Y: 10, Z: 5}}
	disc := geom.Disc{Radius: 2}
	sheet := func(s geom.Sheet, src field.Source, err error) bound.Member {
		if err != nil {
			t.Fatal(err)
		}
		return bound.Member{Source: src, Sheet: s}
	}
	pose := tilted(t, r3.Vec{X: 30, Y: -7, Z: 11})
	flat, err := element.NewLinearDisc(disc, 3e-6, r3.Vec{X: 1e-6})
	foil := sheet(geom.SheetAt(disc, pose), field.Posed{Source: flat, Pose: pose}, err)
	const p0, thick = 0.065, 0.028 // p_z = p0 z/t from the bottom
	rising := field.Affine{Value: r3.Vec{Z: p0 / 2}}
	rising.Gradient[2][2] = p0 / thick
	cubic := field.Polynomial{{Component: 2, Coefficient: 1e-3, Powers: [3]int{0, 0, 3}}, {Component: 0, Coefficient: 2e-3, Powers: [3]int{1, 2, 0}}}
	corner := geom.Prism{Base: [][2]float64{{0, 0}, {3, 0}, {3, 1}, {1, 1}, {1, 3}, {0, 3}}, Height: 2}
	return []scene{
		{"magnet", bound.Assembly{body(t, block, field.Uniform{P: r3.Vec{Z: 1e6}})},
			handover.Settings{Kind: handover.Magnetic, Unit: 1e-3}, 0, r3.Vec{Z: 1e6 * 1e-6}},
		{"bead", bound.Assembly{body(t, geom.Sphere{Radius: 1e-3}, graded(r3.Vec{}, 0.6))}, handover.Settings{}, 0, r3.Vec{}},
		{"film", bound.Assembly{body(t, geom.At(geom.Cylinder{Radius: 4, Height: thick}, pose), rising)},
			handover.Settings{Unit: 1e-3, Names: []string{"film"}, Points: 6},
			0, r3.Scale(4*4*math.Pi*thick*p0/2*1e-9, pose.VectorToOuter(r3.Vec{Z: 1}))},
		{"ring", bound.Assembly{body(t, geom.Tube{Inner: 10, Outer: 20, Height: 8}, field.RadialPower{Coefficient: 3e5})},
			handover.Settings{Kind: handover.Magnetic, Unit: 1e-3}, 0, r3.Vec{}},
		{"corner", bound.Assembly{body(t, corner, cubic)}, handover.Settings{Points: 7}, 0,
			r3.Vec{X: 0.07 / 3}}, // 2 (2e-3) (9/2 1/3 + 1/2 26/3)
		{"charges", bound.Assembly{
			{Source: element.Point{At: r3.Vec{X: 1}, Charge: 2e-9}},
			{},
			{Source: field.Posed{Source: field.Scaled{Source: field.Sum{element.Dipole{Moment: r3.Vec{X: 1e-12}}, element.Point{Charge: -1e-9}}, Factor: 2}, Pose: pose}},
			foil,
		}, handover.Settings{}, 3e-6 * math.Pi * 4, r3.Vec{}},
	}
}

// near fails unless got is within tol of want.
func near(t *testing.T, what string, got, want, tol float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tol) {
		t.Errorf("%s: got %.12g, want %.12g within %.3g", what, got, want, tol)
	}
}

// of makes the set of a scene.
func of(t testing.TB, s scene) *handover.Set {
	t.Helper()
	set, err := handover.Of(s.parts, s.settings)
	if err != nil {
		t.Fatalf("%s: %v", s.name, err)
	}
	return set
}

// TestTotals holds totals and probes against the assembly itself.
func TestTotals(t *testing.T) {
	for _, s := range scenes(t) {
		set := of(t, s)
		near(t, s.name+" total", set.Total, s.total, 1e-14*set.Magnitudes) // rounding
		size := 0.0
		for _, g := range set.Groups {
			size += math.Abs(g.Charge)
		}
		if set.Magnitudes < size*(1-1e-12) {
			t.Errorf("%s: magnitudes %v, less than those of the groups, %v", s.name, set.Magnitudes, size)
		}
		if s.total == 0 {
			near(t, s.name+" moment", r3.Norm(r3.Sub(set.Moment, s.moment)), 0, 1e-13*set.Magnitudes*r3.Norm(r3.Sub(set.Probes[0].At, set.About))) // rounding
		}
		unit, divisor := s.settings.Unit, codata.Epsilon0
		if unit == 0 {
			unit = 1
		}
		if s.settings.Kind == handover.Magnetic {
			divisor = 1
		}
		for i, p := range set.Probes {
			at := field.PointsOf(r3.Scale(1/unit, p.At))
			v := field.NewValues(1, field.WantPhi|field.WantG|field.WantErr)
			field.Evaluate(s.parts, v, at, field.Mean)
			scale := set.Magnitudes / (4 * math.Pi * divisor) // 1e-13 of what the magnitudes make: the place is rounded once more
			r := r3.Norm(r3.Sub(p.At, set.About))
			near(t, s.name+" potential", p.Potential, v.Phi[0]*unit/divisor, 1e-13*scale/r)
			near(t, s.name+" field", r3.Norm(r3.Sub(p.Field, r3.Scale(1/divisor, v.At(0).G))), 0, 1e-13*scale/r/r)
			got, f := set.At(p.At)
			if d := math.Abs(got - p.Potential); d > set.Within.Potential {
				t.Errorf("%s: the potential at probe %d is off by %v, within says %v", s.name, i, d, set.Within.Potential)
			}
			if d := r3.Norm(r3.Sub(f, p.Field)); d > set.Within.Field {
				t.Errorf("%s: the field at probe %d is off by %v, within says %v", s.name, i, d, set.Within.Field)
			}
		}
	}
}

// TestPoints checks that more points are better, geometrically.
func TestPoints(t *testing.T) {
	for _, s := range scenes(t) {
		last := math.Inf(1)
		for _, n := range []int{1, 2, 4, 8} {
			s.settings.Points = n
			set := of(t, s) // checks that the charges of all faces and cells come out even from one point
			if n > 2 && set.Within.Field > last/20 && s.name != "charges" {
				t.Errorf("%s: %d points a direction leave %v of the field, half as many %v", s.name, n, set.Within.Field, last)
			}
			last = set.Within.Field
		}
		set := of(t, s)
		scale := set.Magnitudes / (4 * math.Pi)
		if s.settings.Kind == handover.Electric {
			scale /= codata.Epsilon0
		}
		r := r3.Norm(r3.Sub(set.Probes[0].At, set.About))
		near(t, s.name+" at 8 points a direction", set.Within.Field, 0, 1e-7*scale/(r*r)) // measured: at most 2e-8
	}
}

// TestRoundTrip writes every set in both formats, reads it back, and writes the same bytes again.
func TestRoundTrip(t *testing.T) {
	for _, s := range scenes(t) {
		set := of(t, s)
		bare := *set
		bare.Groups = nil
		for _, g := range set.Groups {
			g.Facets, g.Cells = nil, nil
			bare.Groups = append(bare.Groups, g)
		}
		for _, f := range []struct {
			name  string
			write func(*handover.Set, io.Writer) error
			read  func(io.Reader) (*handover.Set, error)
			want  *handover.Set
		}{
			{"JSON", (*handover.Set).WriteJSON, handover.ReadJSON, set},
			{"CSV", (*handover.Set).WriteCSV, handover.ReadCSV, &bare},
		} {
			var first, second bytes.Buffer
			if err := f.write(set, &first); err != nil {
				t.Fatalf("%s %s: %v", s.name, f.name, err)
			}
			got, err := f.read(bytes.NewReader(first.Bytes()))
			if err != nil {
				t.Fatalf("%s %s: %v", s.name, f.name, err)
			}
			if d := cmp.Diff(f.want, got); d != "" {
				t.Errorf("%s %s: read back another set (-want +got):\n%s", s.name, f.name, d)
			}
			if err := f.write(got, &second); err != nil {
				t.Fatalf("%s %s: %v", s.name, f.name, err)
			}
			if !bytes.Equal(first.Bytes(), second.Bytes()) {
				t.Errorf("%s %s: other bytes the second time", s.name, f.name)
			}
			spoilt := append([]byte("\ufeff"), bytes.ReplaceAll(first.Bytes(), []byte("\n"), []byte("\r\n"))...)
			if _, err := f.read(bytes.NewReader(spoilt)); err != nil {
				t.Errorf("%s %s with CR LF and a byte order mark: %v", s.name, f.name, err)
			}
		}
	}
}

// TestReceiver rebuilds the field from what a receiver gets: from facets and cells of flat bodies exactly, from those of
// curved ones about as well as they are inscribed.
func TestReceiver(t *testing.T) {
	cube := body(t, geom.At(geom.Box{Size: r3.Vec{X: 1, Y: 2, Z: 3}}, tilted(t, r3.Vec{X: 5})), graded(r3.Vec{}, 1))
	for _, c := range []struct {
		scene
		tol float64 // of the field
	}{
		{scenes(t)[0], 1e-13}, // rounding
		{scene{name: "cube", parts: bound.Assembly{cube}}, 1e-5}, // the rule in cellField
		{scenes(t)[2], 3e-2}, // inscribed in a cylinder by twelve sides
	} {
		set := of(t, c.scene)
		for i, p := range set.Probes {
			var g r3.Vec
			for _, group := range set.Groups {
				for _, f := range group.Facets {
					g = r3.Add(g, element.NewPolygon(geom.Polygon{Vertices: f.Vertices}, f.Sigma, r3.Vec{}).Field(p.At))
				}
				for _, cell := range group.Cells {
					g = r3.Add(g, cellField(&cell, p.At))
				}
			}
			if set.Kind == handover.Electric {
				g = r3.Scale(1/codata.Epsilon0, g)
			}
			near(t, c.name+" probe", r3.Norm(r3.Sub(g, p.Field))/r3.Norm(p.Field), 0, c.tol)
			if t.Failed() {
				t.Fatalf("%s, probe %d", c.name, i)
			}
		}
	}
}

// cellField sums a cell by a Gauss rule.
func cellField(c *handover.Cell, x r3.Vec) r3.Vec {
	at := func(u, v, w float64) r3.Vec {
		line := func(a, b r3.Vec, t float64) r3.Vec { return r3.Add(r3.Scale((1-t)/2, a), r3.Scale((1+t)/2, b)) }
		k := &c.Corners
		low := line(line(k[0], k[1], u), line(k[3], k[2], u), v)
		high := line(line(k[4], k[5], u), line(k[7], k[6], u), v)
		return line(low, high, w)
	}
	var g r3.Vec
	rule := cubature.Legendre(6)
	const h = 0.5 // the point is linear in each parameter: any step gives the derivative
	for i, u := range rule.X {
		for j, v := range rule.X {
			for k, w := range rule.X {
				du, dv, dw := r3.Sub(at(u+h, v, w), at(u-h, v, w)), r3.Sub(at(u, v+h, w), at(u, v-h, w)), r3.Sub(at(u, v, w+h), at(u, v, w-h))
				q := c.Rho * rule.W[i] * rule.W[j] * rule.W[k] * r3.Dot(r3.Cross(du, dv), dw)
				g = r3.Add(g, element.Point{At: at(u, v, w), Charge: q}.Field(x))
			}
		}
	}
	return g
}

// TestSource checks that a set is a source whose batch, potential and box are those of its points.
func TestSource(t *testing.T) {
	var src field.Source = of(t, scenes(t)[0])
	set := src.(*handover.Set)
	near(t, "box", r3.Norm(r3.Sub(set.Bounds().Max, r3.Vec{X: 0.01, Y: 0.005, Z: 0.0025})), 0, 2e-3) // Gauss points lie inside the face
	at := field.PointsOf(set.Probes[0].At, set.Probes[1].At)
	v := field.NewValues(2, field.WantPhi|field.WantG|field.WantErr)
	field.Evaluate(src, v, at, field.Mean)
	for i := range 2 {
		phi, h := set.At(at.Vec(i))
		if phi != v.Phi[i] || h != v.At(i).G || src.Field(at.Vec(i)) != h { // magnetic: natural units are those of H
			t.Errorf("point %d: %v and %v in a batch, %v and %v alone", i, v.Phi[i], v.At(i).G, phi, h)
		}
		if v.Status[i] != field.Regular || v.ErrG[i] > 1e-12*r3.Norm(h) {
			t.Errorf("point %d: status %v, estimate %v of %v", i, v.Status[i], v.ErrG[i], h)
		}
	}
}

// TestPieces checks that flat uniform faces are one facet each, outward, and that what is curved closes.
func TestPieces(t *testing.T) {
	set := of(t, scenes(t)[0])
	for _, g := range set.Groups {
		if len(g.Facets) != 1 || math.Abs(g.Facets[0].Normal.Z) != 1 || g.Facets[0].Normal.Z*g.Facets[0].Sigma != 1e6 {
			t.Errorf("face %s of the magnet: %+v, want one facet with its outward normal and sigma", g.Place, g.Facets)
		}
	}
	bead := scenes(t)[1]
	bead.settings.Pieces = 6
	var sum r3.Vec
	var area float64
	for _, g := range of(t, bead).Groups {
		for _, f := range g.Facets {
			a := f.Charge / f.Sigma
			sum, area = r3.Add(sum, r3.Scale(a, f.Normal)), area+a
			if r3.Dot(f.Normal, f.Vertices[0]) <= 0 {
				t.Fatalf("facet %+v of the bead looks inward", f)
			}
		}
		if g.Form == handover.Volume {
			v := 0.0
			for _, c := range g.Cells {
				v += c.Charge / c.Rho
			}
			near(t, "volume of the cells", v, 4*math.Pi/3*1e-9, 0.04*4*math.Pi/3*1e-9) // inscribed: about 2 (pi/24)^2
		}
	}
	near(t, "the surface closes", r3.Norm(sum), 0, 1e-14*area)     // rounding
	near(t, "its area", area, 4*math.Pi*1e-6, 0.02*4*math.Pi*1e-6) // about (pi/24)^2
}

// TestBodies hands over every kind of body with charge on all faces and inside.
func TestBodies(t *testing.T) {
	patch := geom.Patch{Parts: [2]int{4, 2}, Point: func(u, v float64) r3.Vec {
		sp, cp := math.Sincos(2 * math.Pi * u)
		st, ct := math.Sincos(math.Pi * v)
		return r3.Vec{X: 1.2 * st * cp, Y: st * -sp, Z: 0.8 * ct}
	}}
	egg, err := geom.NewParametric([]geom.Face{{Name: "egg", Surface: patch}})
	if err != nil {
		t.Fatal(err)
	}
	for _, b := range []geom.Body{
		geom.Box{Size: r3.Vec{X: 1, Y: 1.5, Z: 2}}, geom.Cylinder{Radius: 1, Height: 2}, geom.Tube{Inner: 0.5, Outer: 1, Height: 1},
		geom.ArcDegrees(0.5, 1, 1, 20, 140), geom.Cone{Bottom: 1, Top: 0.5, Height: 1}, geom.Cone{Bottom: 1, Height: 1},
		geom.Sphere{Radius: 1}, geom.HollowSphere{Inner: 0.5, Outer: 1}, geom.Ellipsoid{SemiAxes: r3.Vec{X: 1, Y: 0.8, Z: 0.6}},
		geom.Torus{Major: 1, Minor: 0.4},
		geom.Prism{Base: [][2]float64{{0, 0}, {1, 0}, {1, 0.4}, {0.4, 0.4}, {0.4, 1}, {0, 1}}, Height: 1, TopSlope: [2]float64{0.2, 0.1}},
		geom.Prism{Base: [][2]float64{{0, 0}, {1, 0}, {1, 0.2}, {0.2, 0.2}, {0.2, 1}, {0, 1}}, Height: 1}.Polyhedron(), egg,
	} {
		s := scene{name: fmt.Sprintf("%T", b), parts: bound.Assembly{body(t, geom.At(b, tilted(t, r3.Vec{X: 3})), graded(r3.Vec{X: 2, Y: 3, Z: 4}, 1))},
			settings: handover.Settings{Points: 8}}
		set := of(t, s)
		field := r3.Norm(set.Probes[0].Field)
		near(t, s.name+": miss of the field", set.Within.Field/field, 0, 1e-4) // measured: at most 2e-5, of the torus
		surface := map[bool]int{}
		for _, g := range set.Groups {
			surface[g.Form == handover.Face] += len(g.Facets) + len(g.Cells)
		}
		if surface[true] == 0 || surface[false] == 0 {
			t.Errorf("%s: %d facets and %d cells, want some of both", s.name, surface[true], surface[false])
		}
	}
}

// TestOfRefuses checks that what cannot be handed over is named.
func TestOfRefuses(t *testing.T) {
	magnet := scenes(t)[0].parts
	disc := geom.Disc{Radius: 1}
	for _, c := range []struct {
		name, word string
		parts      bound.Assembly
		settings   handover.Settings
	}{
		{"nothing", "no part carries charge", bound.Assembly{{}}, handover.Settings{}},
		{"no kind", "kind 7", magnet, handover.Settings{Kind: 7}},
		{"bad unit", "unit of -1", magnet, handover.Settings{Unit: -1}},
		{"names", "2 names for 1 parts", magnet, handover.Settings{Names: []string{"a", "b"}}},
		{"name with a comma", "printable characters", magnet, handover.Settings{Names: []string{"a,b"}}},
		{"one name for two", "stands twice", append(magnet[:1:1], magnet[0]), handover.Settings{Names: []string{"a", "a"}}},
		{"points", "40 points", magnet, handover.Settings{Points: 40}},
		{"pieces", "-1 pieces", magnet, handover.Settings{Pieces: -1}},
		{"uniform field", "part 0, a field.Constant", bound.Assembly{{Source: field.Constant{G: r3.Vec{X: 1}}}}, handover.Settings{}},
		{"expansion", "part 0, a *field.Moments", bound.Assembly{{Source: magnet[0].Charge.Expand(r3.Vec{}, 3)}}, handover.Settings{}},
		{"sheet without sides", "two sides", bound.Assembly{{Source: element.Point{At: r3.Vec{Z: 1}, Charge: 1}, Sheet: disc}}, handover.Settings{}},
	} {
		if _, err := handover.Of(c.parts, c.settings); err == nil || !strings.Contains(err.Error(), c.word) {
			t.Errorf("%s: error %v, want one with %q", c.name, err, c.word)
		}
	}
}
