package geom

import (
	"math"
	"math/rand/v2"
	"testing"

	"gonum.org/v1/gonum/spatial/r3"
)

// What the types of this package are.
var (
	_ = []Flat{Box{}, Prism{}, Polyhedron{}}
	_ = []Body{Cylinder{}, Tube{}, Arc{}, Cone{}, Sphere{}, HollowSphere{}, Ellipsoid{}, Torus{}, Placed{}}
	_ = []Sheet{Polygon{}, Disc{}, Annulus{}, PlacedSheet{}}
	_ = []Charted{Polygon{}, Disc{}, Annulus{}, Sector{}, Wall{}, WallSector{}, ConeWall{}, SphereSurface{}, EllipsoidSurface{}, TorusSurface{}}
	_ = []Charted{PlacedSurface{}, PlacedSheet{}}
	_ = []Blocked{Box{}, Prism{}, Pyramid{}, Cylinder{}, Tube{}, Arc{}, Cone{}, Sphere{}, HollowSphere{}, Ellipsoid{}, Torus{}, PlacedCell{}}
)

// u is the unit roundoff.
const u = 0x1p-53

// ell is an L of unit squares, counter-clockwise.
var ell = [][2]float64{{0, 0}, {2, 0}, {2, 1}, {1, 1}, {1, 2}, {0, 2}}

// star is not convex, runs clockwise and has decimals that are not exact.
var star = [][2]float64{{0.1, 1.3}, {0.4, 0.3}, {1.2, 0.1}, {0.5, -0.3}, {0.3, -1.1}, {-0.2, -0.4}, {-1.3, 0.2}, {-0.3, 0.35}}

// cavity returns a cube of edge 4 with a cubic cavity of edge 2.
func cavity() Polyhedron {
	p := Box{Size: r3.Vec{X: 4, Y: 4, Z: 4}}.Polyhedron()
	q := Box{Size: r3.Vec{X: 2, Y: 2, Z: 2}}.Polyhedron()
	for _, face := range q.Loops {
		f := make([]int, len(face))
		for k, i := range face {
			f[len(f)-1-k] = i + 8
		}
		p.Loops = append(p.Loops, f)
	}
	p.Vertices = append(p.Vertices, q.Vertices...)
	return p
}

// tetrahedron returns a corner of a cube.
func tetrahedron() Polyhedron {
	return Polyhedron{
		Vertices: []r3.Vec{{}, {X: 1}, {Y: 1}, {Z: 1}},
		Loops:    [][]int{{0, 2, 1}, {0, 1, 3}, {0, 3, 2}, {1, 2, 3}},
	}
}

// triangulated returns the box with every face cut in two.
func triangulated(b Box) Polyhedron {
	p := b.Polyhedron()
	var loops [][]int
	for _, f := range p.Loops {
		loops = append(loops, []int{f[0], f[1], f[2]}, []int{f[0], f[2], f[3]})
	}
	p.Loops = loops
	return p
}

// named is a body with its name in messages.
type named struct {
	name string
	body Body
}

// bodies returns one body of each kind, with awkward numbers.
func bodies() []named {
	return []named{
		{"box", Box{Size: r3.Vec{X: 0.3, Y: 1.1, Z: 0.7}}},
		{"film", Box{Size: r3.Vec{X: 1.1, Y: 0.9, Z: 1e-6}}},
		{"cylinder", Cylinder{Radius: 0.7, Height: 1.3}},
		{"tube", Tube{Inner: 0.3, Outer: 0.7, Height: 1.3}},
		{"thin tube", Tube{Inner: 0.6999, Outer: 0.7, Height: 1.3}},
		{"sphere", Sphere{Radius: 1.1}},
		{"hollow sphere", HollowSphere{Inner: 0.3, Outer: 1.1}},
		{"ellipsoid", Ellipsoid{SemiAxes: r3.Vec{X: 0.3, Y: 1.1, Z: 0.7}}},
		{"arc", Arc{Inner: 0.3, Outer: 0.7, Height: 1.3, From: 0.3, To: 2.1}},
		{"half arc", ArcDegrees(0.3, 0.7, 1.3, -30, 150)},
		{"wide arc", ArcDegrees(0.5, 0.7, 0.4, -100, 170)},
		{"slit tube", Arc{Inner: 0.3, Outer: 0.7, Height: 1.3, From: -3, To: 3.2}},
		{"arc of a turn", Arc{Inner: 0.3, Outer: 0.7, Height: 1.3, From: 0.1, To: 0.1 + 2*math.Pi}},
		{"wedge", Arc{Outer: 0.7, Height: 1.3, From: 4, To: 4.9}},
		{"wide wedge", ArcDegrees(0, 0.7, 1.3, 0, 270)},
		{"truncated cone", Cone{Bottom: 0.7, Top: 0.3, Height: 1.3}},
		{"flat cone", Cone{Bottom: 0.3, Top: 1.9, Height: 1.4}},
		{"cone", Cone{Bottom: 0.9, Height: 0.7}},
		{"cone on its tip", Cone{Top: 0.3, Height: 1.1}},
		{"torus", Torus{Major: 1.1, Minor: 0.3}},
		{"prism", Prism{Base: ell, Height: 0.3}},
		{"sloped prism", Prism{Base: star, Height: 1.1, BottomSlope: [2]float64{0.1, -0.2}, TopSlope: [2]float64{0.3, 0.07}}},
		{"tetrahedron", tetrahedron()},
		{"cube with cavity", cavity()},
		{"triangulated box", triangulated(Box{Size: r3.Vec{X: 0.3, Y: 1.1, Z: 0.7}})},
	}
}

// randomPose returns a pose turned about a random axis and shifted by about reach.
func randomPose(t *testing.T, rng *rand.Rand, reach float64) Pose {
	t.Helper()
	turn, err := Turn(randomVec(rng), 360*rng.Float64())
	if err != nil {
		t.Fatal(err)
	}
	return turn.Then(Translate(r3.Scale(reach, randomVec(rng))))
}

func randomVec(rng *rand.Rand) r3.Vec {
	return r3.Vec{X: rng.NormFloat64(), Y: rng.NormFloat64(), Z: rng.NormFloat64()}
}

// diameter returns the diagonal of the bounds.
func diameter(b r3.Box) float64 { return r3.Norm(r3.Sub(b.Max, b.Min)) }

// near reports whether got is within tol of want, absolutely.
func near(got, want, tol float64) bool { return math.Abs(got-want) <= tol }

func TestBodiesPass(t *testing.T) {
	for _, b := range bodies() {
		if err := b.body.Check(); err != nil {
			t.Errorf("%s: %v", b.name, err)
		}
	}
}

func TestFaceNames(t *testing.T) {
	want := map[string][]string{
		"box":             {"-x", "+x", "-y", "+y", "-z", "+z"},
		"cylinder":        {"bottom", "top", "wall"},
		"tube":            {"bottom", "top", "inner", "outer"},
		"arc":             {"bottom", "top", "inner", "outer", "from", "to"},
		"arc of a turn":   {"bottom", "top", "inner", "outer"},
		"wedge":           {"bottom", "top", "outer", "from", "to"},
		"truncated cone":  {"bottom", "top", "wall"},
		"cone":            {"bottom", "wall"},
		"cone on its tip": {"top", "wall"},
		"torus":           {"surface"},
		"sphere":          {"surface"},
		"hollow sphere":   {"inner", "outer"},
		"ellipsoid":       {"surface"},
		"prism":           {"bottom", "top", "side 0", "side 1", "side 2", "side 3", "side 4", "side 5"},
		"tetrahedron":     {"0", "1", "2", "3"},
	}
	for _, b := range bodies() {
		names, ok := want[b.name]
		if !ok {
			continue
		}
		faces := b.body.Faces()
		if len(faces) != len(names) {
			t.Fatalf("%s: %d faces, want %d", b.name, len(faces), len(names))
		}
		for i, f := range faces {
			if f.Name != names[i] {
				t.Errorf("%s: face %d is %q, want %q", b.name, i, f.Name, names[i])
			}
		}
	}
}

// Box faces carry the normals that their names promise, sides of a prism stand over their base edge in either sense.
func TestFaceNormals(t *testing.T) {
	for i, f := range (Box{Size: r3.Vec{X: 1, Y: 2, Z: 3}}).Faces() {
		n := f.Surface.(Polygon).Normal().Value()
		want := [6]r3.Vec{{X: -1}, {X: 1}, {Y: -1}, {Y: 1}, {Z: -1}, {Z: 1}}[i]
		if n != want {
			t.Errorf("box face %s: normal %v, want %v", f.Name, n, want)
		}
	}
	reversed := make([][2]float64, len(ell))
	for k, b := range ell {
		reversed[len(ell)-1-k] = b
	}
	for _, base := range [][][2]float64{ell, reversed} {
		p := Prism{Base: base, Height: 1}
		faces := p.Faces()
		if n := faces[0].Surface.(Polygon).Normal().Value(); n != (r3.Vec{Z: -1}) {
			t.Errorf("bottom normal %v, want -z", n)
		}
		if n := faces[1].Surface.(Polygon).Normal().Value(); n != (r3.Vec{Z: 1}) {
			t.Errorf("top normal %v, want +z", n)
		}
		for k, b := range base {
			next := base[(k+1)%len(base)]
			middle := r3.Vec{X: (b[0] + next[0]) / 2, Y: (b[1] + next[1]) / 2}
			if c := faces[k+2].Surface.(Polygon).Centroid(); r3.Norm(r3.Sub(c, middle)) > u { // one rounding
				t.Errorf("side %d is centred at %v, want %v", k, c, middle)
			}
		}
	}
}
