package geom

import (
	"math/rand/v2"
	"testing"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// The bounds of a placed body contain the nodes of its faces and cells.
func TestPlacedBounds(t *testing.T) {
	rng := rand.New(rand.NewPCG(19, 20))
	for _, b := range bodies() {
		for _, pose := range []Pose{{}, Translate(randomVec(rng)), randomPose(t, rng, 2)} {
			body := At(b.body, pose)
			box := body.Bounds()
			for _, face := range body.Faces() {
				part := face.Surface.Bounds()
				tol := 8 * u * (diameter(box) + r3.Norm(box.Max)) // rounding of the nodes
				face.Surface.Nodes(4, func(x, _ r3.Vec, _ float64) {
					if beyond(box, x, tol) || beyond(part, x, tol) {
						t.Errorf("%s %s: node %v is outside %v or %v", b.name, face.Name, x, box, part)
					}
				})
			}
		}
	}
}

// Bounds are tight in the own frame: each side is met by a node or a vertex to 1/4 of the size.
func TestBoundsTight(t *testing.T) {
	for _, b := range bodies() {
		box, seen := b.body.Bounds(), nothing()
		for _, face := range b.body.Faces() {
			face.Surface.Nodes(12, func(x, _ r3.Vec, _ float64) { seen = include(seen, x) })
		}
		size := r3.Sub(box.Max, box.Min)
		for _, d := range []r3.Vec{r3.Sub(seen.Min, box.Min), r3.Sub(box.Max, seen.Max)} {
			if d.X > size.X/4 || d.Y > size.Y/4 || d.Z > size.Z/4 {
				t.Errorf("%s: bounds %v, nodes reach %v", b.name, box, seen)
			}
		}
	}
}

// Placing twice joins the poses, and the frame of the body is reached by both ways.
func TestAtTwice(t *testing.T) {
	rng := rand.New(rand.NewPCG(21, 22))
	p, q := randomPose(t, rng, 1), randomPose(t, rng, 1)
	body := At(At(Sphere{Radius: 1}, p), q)
	if _, nested := body.Body.(Placed); nested {
		t.Error("a placed body is nested")
	}
	want := q.ToOuter(p.ToOuter(pair.Vec{})).Value()
	if d := r3.Norm(r3.Sub(body.Centroid(), want)); d > 2*u*r3.Norm(want) { // one rounding a component
		t.Errorf("centroid %v, want %v", body.Centroid(), want)
	}
	sheet := SheetAt(SheetAt(Disc{Radius: 1, Z: 0.5}, p), q)
	if _, nested := sheet.Sheet.(PlacedSheet); nested {
		t.Error("a placed sheet is nested")
	}
	want = q.ToOuter(p.ToOuter(pair.VecOf(r3.Vec{Z: 0.5}))).Value()
	if d := r3.Norm(r3.Sub(sheet.Centroid(), want)); d > 2*u*r3.Norm(want) { // one rounding a component
		t.Errorf("sheet centroid %v, want %v", sheet.Centroid(), want)
	}
}

// A box moved by an amount that no decimal of its corner survives keeps its faces: the points on the faces are found
// though the corners in the outer frame are rounded.
func TestPlacedFarAway(t *testing.T) {
	b := Box{Size: r3.Vec{X: 0.1, Y: 0.2, Z: 0.3}}
	body := At(b, Translate(r3.Vec{X: 1e6 + 0.1, Y: -3e5, Z: 0.7}))
	for f, face := range body.Faces() {
		face.Surface.Nodes(2, func(x, normal r3.Vec, _ float64) {
			if got := body.Locate(pair.VecOf(x), 0); got.Region != On || got.Face != f || got.Normal != normal {
				t.Errorf("%v: got %+v, want on face %d", x, got, f)
			}
			in, out := r3.Add(x, r3.Scale(-1e-8, normal)), r3.Add(x, r3.Scale(1e-8, normal)) // coordinates round at 1e-10
			if got := body.Locate(pair.VecOf(in), 0); got.Region != Inside {
				t.Errorf("%v: got %+v, want inside", in, got)
			}
			if got := body.Locate(pair.VecOf(out), 0); got.Region != Outside {
				t.Errorf("%v: got %+v, want outside", out, got)
			}
		})
	}
}
