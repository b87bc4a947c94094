package geom

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// TestNearest: the nearest point lies on the surface, no node of the surface is nearer, and the way to it is normal to the
// surface where it is not on an edge.
func TestNearest(t *testing.T) {
	turned, err := Turn(r3.Vec{X: 1, Y: 2, Z: 3}, 40)
	if err != nil {
		t.Fatal(err)
	}
	turned = turned.Then(Translate(r3.Vec{X: 5, Y: -2, Z: 1}))
	bodies := map[string]Body{
		"box":           Box{Size: r3.Vec{X: 1, Y: 2, Z: 3}},
		"L prism":       Prism{Base: ell, Height: 1.5},
		"cylinder":      Cylinder{Radius: 1.5, Height: 0.7},
		"tube":          Tube{Inner: 1, Outer: 2, Height: 1},
		"arc":           Arc{Inner: 1, Outer: 2, Height: 1, From: 20, To: 110, Degrees: true},
		"reflex arc":    Arc{Inner: 1, Outer: 2, Height: 1, From: -100, To: 200, Degrees: true},
		"cone":          Cone{Bottom: 2, Top: 0.5, Height: 1},
		"torus":         Torus{Major: 2, Minor: 0.5},
		"sphere":        Sphere{Radius: 2},
		"hollow sphere": HollowSphere{Inner: 1, Outer: 2},
		"ellipsoid":     Ellipsoid{SemiAxes: r3.Vec{X: 3, Y: 1, Z: 0.2}},
		"spheroid":      Ellipsoid{SemiAxes: r3.Vec{X: 2, Y: 2, Z: 1}},
		"turned box":    At(Box{Size: r3.Vec{X: 1, Y: 2, Z: 3}}, turned),
		"turned arc":    At(Arc{Inner: 1, Outer: 2, Height: 1, From: 20, To: 110, Degrees: true}, turned),
	}
	for name, body := range bodies {
		rng := rand.New(rand.NewPCG(7, 11))
		box := body.Bounds()
		size := r3.Norm(r3.Sub(box.Max, box.Min))
		centre := r3.Scale(0.5, r3.Add(box.Min, box.Max))
		var nodes []r3.Vec
		for _, f := range body.Faces() {
			f.Surface.Nodes(20, func(x, _ r3.Vec, _ float64) { nodes = append(nodes, x) })
		}
		points := []r3.Vec{centre}
		for range 200 {
			way := r3.Vec{X: rng.NormFloat64(), Y: rng.NormFloat64(), Z: rng.NormFloat64()}
			if rng.IntN(3) == 0 {
				way.Z = 0 // middle planes of most bodies
			}
			points = append(points, r3.Add(centre, r3.Scale(size*math.Exp(2*rng.NormFloat64()-1), way)))
		}
		for _, x := range points {
			at, d := Nearest(body, x)
			tol := 1e-12 * max(d, size) // roundings of the projection
			if math.Abs(r3.Norm(r3.Sub(x, at))-d) > tol {
				t.Fatalf("%s at %v: distance %v is not that of %v", name, x, d, at)
			}
			place := body.Locate(pair.VecOf(at), 1e-12*size)
			if place.Region != On {
				t.Errorf("%s at %v: nearest point %v is not on the surface", name, x, at)
				continue
			}
			for _, p := range nodes {
				if near := r3.Norm(r3.Sub(x, p)); near < d-tol {
					t.Errorf("%s at %v: %v at %v is nearer than %v at %v", name, x, p, near, at, d)
					break
				}
			}
			if slip := r3.Norm(r3.Cross(place.Normal, r3.Sub(x, at))); !place.Edge && slip > 1e-7*max(d, size) { // a root of the rounding of d
				t.Errorf("%s at %v: the way to %v leaves the normal %v by %v", name, x, at, place.Normal, slip)
			}
		}
	}
}

// TestNearestParametric holds the search over charts against the closed form for the same ellipsoid.
func TestNearestParametric(t *testing.T) {
	axes := r3.Vec{X: 2, Y: 1.5, Z: 1}
	e := Ellipsoid{SemiAxes: axes}
	rng := rand.New(rand.NewPCG(3, 5))
	for range 100 {
		x := r3.Scale(3, r3.Vec{X: rng.NormFloat64(), Y: rng.NormFloat64(), Z: rng.NormFloat64()})
		_, want := Nearest(e, x)
		if _, d := Nearest(charted{e}, x); math.Abs(d-want) > 1e-6*want+1e-9 { // of the distance, as documented; a root near the surface
			t.Errorf("at %v: %v over charts, %v in closed form", x, d, want)
		}
	}
}

// charted hides which surface a body has, but not its charts.
type charted struct{ Body }

func (c charted) Faces() []Face {
	faces := c.Body.Faces()
	for i := range faces {
		faces[i].Surface = onlyCharts{faces[i].Surface.(Charted)}
	}
	return faces
}

type onlyCharts struct{ Charted }
