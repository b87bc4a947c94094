package solve

import (
	"math"
	"slices"
	"strings"
	"testing"

	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// built reads and builds a scene.
func built(t *testing.T, text string) *Setup {
	t.Helper()
	scene, err := scenefile.Parse("scene.json", []byte(text), nil)
	if err != nil {
		t.Fatal(err)
	}
	s, err := Build(scene)
	if err != nil {
		t.Fatal(err)
	}
	return s
}

// records answers request k of a scene.
func records(t *testing.T, s *Setup, k int) []Record {
	t.Helper()
	var out []Record
	err := s.Records(t.Context(), &s.Scene.Wanted[k], func(i int, r *Record) error {
		if i != len(out) {
			t.Errorf("record %d came as number %d", i, len(out))
		}
		out = append(out, *r)
		return nil
	})
	if err != nil {
		t.Fatal(err)
	}
	return out
}

// close fails unless two vectors agree to within tol.
func close(t *testing.T, what string, got, want r3.Vec, tol float64) {
	t.Helper()
	if !(r3.Norm(r3.Sub(got, want)) <= tol) {
		t.Errorf("%s: got %v, want %v within %g", what, got, want, tol)
	}
}

// TestPoses holds poses against rotations made by hand: where the tip (1, 2, 3) of a part goes.
func TestPoses(t *testing.T) {
	for _, c := range []struct {
		name, keys string
		want       r3.Vec
	}{
		{"none", `"centre": [10, 0, 0]`, r3.Vec{X: 11, Y: 2, Z: 3}},
		{"z by 90", `"rotations": [{"axis": [0,0,5], "degrees": 90}]`, r3.Vec{X: -2, Y: 1, Z: 3}},
		{"z by 90, then x by 90, axes fixed in the scene", `"rotations": [{"axis": [0,0,1], "degrees": 90}, {"axis": [1,0,0], "degrees": 90}]`,
			r3.Vec{X: -2, Y: -3, Z: 1}},
		{"turned before it is moved", `"centre": [10, 20, 30], "rotations": [{"axis": [1,0,0], "degrees": 180}]`, r3.Vec{X: 11, Y: 18, Z: 27}},
		{"about a diagonal", `"rotations": [{"axis": [1,1,1], "degrees": 120}]`, r3.Vec{X: 3, Y: 1, Z: 2}},
		{"axis too small to square", `"rotations": [{"axis": [0,0,1e-300], "degrees": -90}]`, r3.Vec{X: 2, Y: -1, Z: 3}},
		{"frame", `"frame": {"z": [7,0,0], "x": [1,0,4]}`, r3.Vec{X: 3, Y: -2, Z: 1}},
		{"frame without x takes the axis least aligned", `"frame": {"z": [0,0,1e-320]}`, r3.Vec{X: 1, Y: 2, Z: 3}},
	} {
		s := built(t, `{"parts": [{"name": "a", "shape": "sphere", "radius": 1, `+c.keys+`}]}`)
		got := s.Parts[0].Pose.ToOuter(pair.VecOf(r3.Vec{X: 1, Y: 2, Z: 3})).Value()
		close(t, c.name, got, c.want, 1e-15) // one rounding of a number below 4; multiples of 90 degrees are exact
	}
}

// TestCopies checks that copy i is turned i times about the scene axis and then shifted i steps, with reversals.
func TestCopies(t *testing.T) {
	s := built(t, `{"length": "mm", "parts": [{"name": "a", "shape": "box", "size": [1,1,2], "centre": [3,0,0], "scale": 2,
		"magnetized": {"uniform": [1,0,0]},
		"copies": {"count": 4, "step": [0,0,5], "rotation": {"axis": [0,0,1], "degrees": 90, "about": [1,0,0]}, "alternate": true}}]}`)
	centres := []r3.Vec{{X: 3}, {X: 1, Y: 2, Z: 5}, {X: -1, Z: 10}, {X: 1, Y: -2, Z: 15}}
	moments := []r3.Vec{{X: 1}, {Y: -1}, {X: -1}, {Y: 1}} // direction turned, every second reversed
	charges := s.Charges()
	for i, p := range s.Parts {
		if want := []string{"a 1", "a 2", "a 3", "a 4"}[i]; p.Name != want {
			t.Errorf("copy %d is called %q, want %q", i, p.Name, want)
		}
		close(t, p.Name+" stands", p.Centre, centres[i], 0)
		close(t, p.Name+" moment", charges[i].Moment, r3.Scale(4e-9, moments[i]), 4e-24) // 2 A/m in 2 mm^3, a rounding
	}
}

// TestReversedCopies checks that every second copy is reversed whatever it carries.
func TestReversedCopies(t *testing.T) {
	copies := `, "copies": {"count": 2, "step": [9,0,0], "alternate": true}}`
	s := built(t, `{"parts": [{"name": "disc", "shape": "disc", "radius": 1, "charged": {"density": 3}`+copies+`,
		{"name": "sheet", "shape": "polygon", "vertices": [[0,0,0],[1,0,0],[1,1,0],[0,1,0]], "charged": {"density": 3, "gradient": [1,0,0]}`+copies+`,
		{"name": "ion", "shape": "point", "charged": {"charge": 2}`+copies+`,
		{"name": "dipole", "shape": "point", "polarized": {"moment": [0,0,2]}`+copies+`,
		{"name": "rod", "shape": "cylinder", "radius": 1, "height": 1, "polarized": {"affine": {"value": [0,0,1], "gradient": [[0,0,0],[0,0,0],[0,0,1]]}}`+copies+`]}`)
	c := s.Charges()
	for i := 0; i < len(c); i += 2 {
		a, b := c[i], c[i+1]
		if a.Total != -b.Total || a.Inside != -b.Inside || a.Moment != r3.Scale(-1, b.Moment) || a.Total == 0 && a.Moment == (r3.Vec{}) {
			t.Errorf("%s carries %+v and its copy %+v, want the reverse", s.Parts[i].Name, a, b)
		}
		at := field.PointsOf(r3.Add(s.Parts[i].Centre, r3.Vec{X: 0.3, Y: 0.2, Z: 4}), r3.Add(s.Parts[i+1].Centre, r3.Vec{X: 0.3, Y: 0.2, Z: 4}))
		one := func(k int) r3.Vec {
			v := field.NewValues(1, field.WantG)
			bound.Assembly{s.Parts[i+k].Member}.Evaluate(v, at.Slice(k, k+1), field.Mean)
			return v.At(0).G
		}
		if g := one(0); g == (r3.Vec{}) {
			t.Errorf("%s makes no field", s.Parts[i].Name)
		} else {
			close(t, "field of the copy of "+s.Parts[i].Name, one(1), r3.Scale(-1, g), 1e-14*r3.Norm(g)) // coordinates of 9.3 in 53 bits
		}
	}
}

// film on a magnet: they share the plane z = 1.
const filmOnMagnet = `{"parts": [
	{"name": "magnet", "shape": "cylinder", "radius": 2, "height": 2, "magnetized": {"remanence": [0,0,1]}},
	{"name": "film", "shape": "cylinder", "radius": 2, "height": 0.2, "centre": [0,0,1.1], "polarized": {"uniform": [0,0,1e-6]}},
	{"name": "sheet", "shape": "disc", "radius": 1, "centre": [0,0,3], "charged": {"density": 1e-9}}],
	"wanted": [{"points": [[0.5,0,1]], "side": "inside"}, {"points": [[0.5,0,1]], "side": "outside"}, {"points": [[0.5,0,1],[2,0,1],[0,0,3],[1,0,3],[0,0,0]]},
		{"points": [[0,0,3]], "side": "outside"}, {"points": [[0,0,3]], "side": "inside"}]}`

// TestSides checks points on faces of several parts of different kinds: the first in file order decides.
func TestSides(t *testing.T) {
	s := built(t, filmOnMagnet)
	const m = 1 / 1.25663706127e-6 // A/m
	in, out, mean := records(t, s, 0)[0], records(t, s, 1)[0], records(t, s, 2)[0]
	name := func(r Record) string {
		if r.Inside < 0 {
			return "none"
		}
		return s.Parts[r.Inside].Name
	}
	if got := []string{name(in), name(out), name(mean)}; !slices.Equal(got, []string{"magnet", "none", "none"}) {
		t.Errorf("parts that contain the joint for inside, outside, mean: %q", got)
	}
	// The inside of the magnet is the outside of the film: no P there. The outside of the magnet is in the film.
	jump := r3.Sub(out.Magnetic.H, in.Magnetic.H)
	close(t, "jump of H", jump, r3.Vec{Z: m}, 1e-9) // A/m, 1e-15 of M
	close(t, "B is the same", out.Magnetic.B, in.Magnetic.B, 1e-15)
	close(t, "D is the same", out.Electric.D, in.Electric.D, 1e-21)
	close(t, "jump of E", r3.Sub(out.Electric.E, in.Electric.E), r3.Vec{Z: -1e-6 / epsilon0}, 1e-9)
	close(t, "mean E", mean.Electric.E, r3.Scale(0.5, r3.Add(out.Electric.E, in.Electric.E)), 1e-9)
	close(t, "mean B", mean.Magnetic.B, in.Magnetic.B, 1e-15)
	all := records(t, s, 2)
	for i, want := range []field.Status{field.OnFace, field.OnEdge, field.OnFace, field.OnEdge, field.Regular} {
		if all[i].Status != want {
			t.Errorf("point %d: %v, want %v", i, all[i].Status, want)
		}
	}
	rim := all[1]
	if !MissingVec(rim.Magnetic.H) || !MissingVec(rim.Electric.D) || Missing(rim.Magnetic.Vm) || len(rim.Missed) > 0 {
		t.Errorf("rim: %+v, want potentials only, and nothing missed", rim)
	}
	if e := all[3].Electric.E; !MissingVec(e) || MissingVec(all[3].Magnetic.B) {
		t.Errorf("edge of the sheet: E %v B %v, want only B", e, all[3].Magnetic.B)
	}
	up, down := records(t, s, 3)[0], records(t, s, 4)[0]
	close(t, "jump over the sheet", r3.Sub(up.Electric.E, down.Electric.E), r3.Vec{Z: 1e-9 / epsilon0}, 1e-12)
}

// TestApplied checks that applied fields add to field and potential, which is zero at the origin.
func TestApplied(t *testing.T) {
	s := built(t, `{"length": "mm", "parts": [{"name": "a", "shape": "sphere", "radius": 1, "magnetized": {"uniform": [0,0,3]}},
		{"name": "b", "shape": "disc", "radius": 1, "centre": [50,0,0], "charged": {"density": 0}}],
		"applied": {"E": [2,0,0], "B": [0,0.5,0]}, "wanted": [{"points": [[3,4,0]]}]}`)
	r := records(t, s, 0)[0]
	if !s.Electric || !s.Magnetic {
		t.Fatalf("kinds: %t %t, want both", s.Electric, s.Magnetic)
	}
	if alone := built(t, `{"parts": [{"name": "a", "shape": "sphere", "radius": 1, "magnetized": {"uniform": [0,0,3]}}],
		"applied": {"E": [2,0,0]}, "wanted": [{"points": [[3,4,0]]}]}`); alone.Electric {
		t.Error("a scene without electric parts has electric records")
	}
	close(t, "E", r.Electric.E, r3.Vec{X: 2}, 0)
	close(t, "D", r.Electric.D, r3.Vec{X: 2 * epsilon0}, 1e-27)
	if math.Abs(r.Electric.V+6e-3) > 1e-18 {
		t.Errorf("V = %v, want -E.x = -6 mV", r.Electric.V)
	}
	h := 0.5/1.25663706127e-6 - 0 // the sphere adds M a^3/(3 r^3) along -z
	close(t, "H", r.Magnetic.H, r3.Vec{Y: h, Z: -3. / (3 * 125)}, 1e-9)
	if want := -h * 4e-3; math.Abs(r.Magnetic.Vm-want) > 1e-12*math.Abs(want) {
		t.Errorf("Vm = %v, want -H.x = %v", r.Magnetic.Vm, want)
	}
}

// TestByPart checks that contributions add up to the whole, inert parts left out.
func TestByPart(t *testing.T) {
	s := built(t, strings.Replace(filmOnMagnet, `"wanted": [`, `"wanted": [{"points": [[0.3,0.4,0.2],[5,5,5],[0,0,1.05]], "by_part": true}, `, 1))
	for _, r := range records(t, s, 0) {
		var e, d, b r3.Vec
		for _, c := range r.ByPart {
			e, d, b = r3.Add(e, c.E), r3.Add(d, c.D), r3.Add(b, c.B)
		}
		close(t, "sum of E", e, r.Electric.E, 1e-15*1e-6/epsilon0) // a rounding of P/eps0
		close(t, "sum of D", d, r.Electric.D, 1e-21)
		close(t, "sum of B", b, r.Magnetic.B, 1e-15)
		if len(r.ByPart) != 3 {
			t.Errorf("%d contributions, want 3", len(r.ByPart))
		}
	}
}

// TestDefaults checks that a scene that wants nothing gets the charges, and a part that carries nothing is in it.
func TestDefaults(t *testing.T) {
	s := built(t, `{"parts": [{"name": "a", "shape": "box", "size": [1,2,3]}, {"name": "b", "shape": "disc", "radius": 1}]}`)
	if len(s.Scene.Wanted) != 1 || s.Scene.Wanted[0].Kind != "charges" || s.Electric || s.Magnetic {
		t.Errorf("wanted %+v, kinds %t %t; want charges and no kind", s.Scene.Wanted, s.Electric, s.Magnetic)
	}
	c := s.Charges()
	if len(c) != 2 || c[0].Volume != 6 || len(c[0].Faces) != 6 || c[0].Faces[5].Area != 2 || c[0].Total != 0 {
		t.Errorf("charges %+v, want those of an empty box", c)
	}
}
