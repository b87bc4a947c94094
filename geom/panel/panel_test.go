package panel_test

import (
	"errors"
	"math"
	"testing"

	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"example.com/boundpole/geom/panel"
	"gonum.org/v1/gonum/integrate/quad"
	"gonum.org/v1/gonum/spatial/r3"
)

func bodies(t *testing.T) map[string]geom.Body {
	t.Helper()
	turn, err := geom.Turn(r3.Vec{X: 1, Y: 1}, 30)
	if err != nil {
		t.Fatal(err)
	}
	return map[string]geom.Body{
		"box":       geom.Box{Size: r3.Vec{X: 1, Y: 2, Z: 3}},
		"turned":    geom.At(geom.Box{Size: r3.Vec{X: 1, Y: 2, Z: 3}}, turn),
		"prism":     geom.Prism{Base: [][2]float64{{0, 0}, {2, 0}, {2, 1}, {1, 1}, {1, 2}, {0, 2}}, Height: 1},
		"cylinder":  geom.Cylinder{Radius: 1, Height: 0.5},
		"tube":      geom.Tube{Inner: 0.5, Outer: 1, Height: 1},
		"arc":       geom.ArcDegrees(0.5, 1, 0.4, 10, 200),
		"cone":      geom.Cone{Bottom: 1, Top: 0, Height: 2},
		"torus":     geom.Torus{Major: 2, Minor: 0.5},
		"sphere":    geom.Sphere{Radius: 2},
		"shell":     geom.HollowSphere{Inner: 1, Outer: 1.1},
		"ellipsoid": geom.Ellipsoid{SemiAxes: r3.Vec{X: 1, Y: 2, Z: 3}},
	}
}

// TestClosed integrates over the panels: the area is that of the faces, the normal sums to zero, x.n to three times the volume,
// with the normals outward.
func TestClosed(t *testing.T) {
	x, w := make([]float64, 16), make([]float64, 16)
	quad.Legendre{}.FixedLocations(x, w, 0, 1)
	for name, b := range bodies(t) {
		panels, err := panel.Of(b, panel.Settings{})
		if err != nil {
			t.Errorf("%s: %v", name, err)
			continue
		}
		var area, volume, want float64
		var normal r3.Vec
		for _, p := range panels {
			for i := range x {
				for j := range x {
					at, xs, xt := p.At(x[i], x[j])
					n := r3.Scale(w[i]*w[j], r3.Cross(xs, xt))
					area += r3.Norm(n)
					volume += r3.Dot(at, n) / 3
					normal = r3.Add(normal, n)
					if place := b.Locate(pair.VecOf(at), 1e-12); place.Region != geom.On || !place.Edge && r3.Dot(place.Normal, n) <= 0 {
						t.Fatalf("%s: panel on face %d has %v with the normal %v: %+v", name, p.Face, at, n, place)
					}
				}
			}
		}
		for _, f := range b.Faces() {
			want += f.Surface.Area()
		}
		if math.Abs(area-want) > 1e-10*want || math.Abs(volume-b.Volume()) > 1e-10*b.Volume() || r3.Norm(normal) > 1e-10*want { // 16 points on 50 degrees
			t.Errorf("%s: area %v, want %v; volume %v, want %v; normal %v", name, area, want, volume, b.Volume(), normal)
		}
	}
}

func TestParts(t *testing.T) {
	for name, b := range bodies(t) {
		panels, err := panel.Of(b, panel.Settings{})
		if err != nil {
			t.Fatal(err)
		}
		parts, edged, plane := 0, 0, 0
		for _, p := range panels {
			parts = max(parts, p.Part+1)
			if p.Edged() {
				edged++
			}
			if p.Plane {
				plane++
			}
		}
		wantParts := 1
		if name == "shell" {
			wantParts = 2
		}
		if parts != wantParts {
			t.Errorf("%s: %d connected parts, want %d", name, parts, wantParts)
		}
		smooth := name == "torus" || name == "sphere" || name == "shell" || name == "ellipsoid"
		if smooth != (edged == 0) || smooth && plane > 0 {
			t.Errorf("%s: %d of %d panels at edges, %d plane", name, edged, len(panels), plane)
		}
		if (name == "box" || name == "turned") && (plane != len(panels) || len(panels) != 24) {
			t.Errorf("%s: %d panels, %d plane; want 24", name, len(panels), plane)
		}
	}
}

// TestGraded demands that the distance from an edge is the cube of the parameter.
func TestGraded(t *testing.T) {
	panels, err := panel.Of(geom.Cylinder{Radius: 1, Height: 2}, panel.Settings{})
	if err != nil {
		t.Fatal(err)
	}
	found := false
	for _, p := range panels {
		x := p.Point(0.5, 0.1)
		if d := 1 - math.Abs(x.Z); math.Abs(d-1e-3) < 1e-12 { // (1/10)^3 of the half height
			found = true
		}
	}
	if !found {
		t.Error("no panel is graded by the cube")
	}
}

type bare struct{ geom.Surface }

type uncharted struct{ geom.Body }

func (u uncharted) Faces() []geom.Face {
	faces := u.Body.Faces()
	faces[0].Surface = bare{faces[0].Surface}
	return faces
}

func TestErrors(t *testing.T) {
	if _, err := panel.Of(uncharted{geom.Sphere{Radius: 1}}, panel.Settings{}); !errors.Is(err, panel.ErrCharts) {
		t.Errorf("surface without charts: %v", err)
	}
	if _, err := panel.Of(geom.Sphere{Radius: -1}, panel.Settings{}); err == nil {
		t.Error("a sphere of negative radius passed")
	}
}
