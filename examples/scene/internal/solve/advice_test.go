package solve

import (
	"strings"
	"testing"

	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

// TestOverlaps checks who is warned of: overlap, not touch, not a body in another's cavity.
func TestOverlaps(t *testing.T) {
	box := `{"name": "a", "shape": "box", "size": [2,2,2], "magnetized": {"uniform": [0,0,1]}}`
	for _, c := range []struct {
		name, parts string
		want        int
	}{
		{"apart", box + `,{"name": "b", "shape": "sphere", "radius": 1, "centre": [5,0,0]}`, 0},
		{"faces that touch", box + `,{"name": "b", "shape": "box", "size": [2,2,2], "centre": [2,0,0]}`, 0},
		{"faces that touch but for a rounding", box + `,{"name": "b", "shape": "box", "size": [2,2,2], "centre": [1.9999999999999998,0,0]}`, 0},
		{"faces that touch to ten digits", box + `,{"name": "b", "shape": "box", "size": [2,2,2], "centre": [1.9999999999,0,0]}`, 0},
		{"a corner after a turn", box + `,{"name": "b", "shape": "box", "size": [2,2,2], "centre": [1.2071067811865475,1.2071067811865475,0],
			"rotations": [{"axis": [0,0,1], "degrees": 45}]}`, 1},
		{"cylinder that touches", box + `,{"name": "b", "shape": "cylinder", "radius": 1, "height": 9, "centre": [2,0,0]}`, 0},
		{"deep", box + `,{"name": "b", "shape": "sphere", "radius": 1, "centre": [1.5,0,0]}`, 1},
		{"a little", box + `,{"name": "b", "shape": "box", "size": [2,2,2], "centre": [1.999,0,0]}`, 1},
		{"the same twice", box + `,{"name": "b", "shape": "box", "size": [2,2,2]}`, 1},
		{"three in one place", strings.TrimSuffix(box, "}") + `, "copies": {"count": 3}}`, 3},
		{"one in the other", box + `,{"name": "b", "shape": "sphere", "radius": 0.01}`, 1},
		{"in a cavity", `{"name": "a", "shape": "hollow_sphere", "inner": 2, "outer": 3},{"name": "b", "shape": "sphere", "radius": 2}`, 0},
		{"in a bore", `{"name": "a", "shape": "tube", "inner": 2, "outer": 3, "height": 1},{"name": "b", "shape": "cylinder", "radius": 1.9, "height": 5}`, 0},
		{"thin crossed bars", `{"name": "a", "shape": "box", "size": [100,1,1]},{"name": "b", "shape": "box", "size": [1,100,1], "centre": [23.7,11,0.3]}`, 1},
		{"thin slanted bars", `{"name": "a", "shape": "box", "size": [100,1,1], "rotations": [{"axis": [0,0,1], "degrees": 30}]},
			{"name": "b", "shape": "box", "size": [100,1,1], "rotations": [{"axis": [0,0,1], "degrees": -30}]}`, 1},
		{"a sheet in a body", box + `,{"name": "b", "shape": "disc", "radius": 5, "charged": {"density": 1}}`, 0},
	} {
		if s := built(t, `{"parts": [`+c.parts+`]}`); len(s.Warnings) != c.want {
			t.Errorf("%s: %d warnings %q, want %d", c.name, len(s.Warnings), s.Warnings, c.want)
		}
	}
}

// TestCautions checks that cautions stand only where they apply.
func TestCautions(t *testing.T) {
	magnet := `{"name": "m", "shape": "box", "size": [0.01,0.01,0.01], "magnetized": {"remanence": [0,0,1]}}`
	electret := func(p string) string {
		return `{"name": "f", "shape": "box", "size": [0.01,0.01,1e-5], "polarized": {"uniform": [0,0,` + p + `]}}`
	}
	air := Record{Inside: -1}
	air.Electric.E = r3.Vec{Z: 4e6}
	inFilm := air
	inFilm.Inside = 0
	for _, c := range []struct {
		name, parts string
		rec         *Record
		want        []string
	}{
		{"inert", `{"name": "i", "shape": "sphere", "radius": 1}`, nil, nil},
		{"magnet", magnet, nil, []string{"40 N (m)", "implants"}}, // (1 T)^2 (1 cm)^2/(2 mu0) = 39.8 N
		{"magnetic point", `{"name": "p", "shape": "point", "magnetized": {"moment": [0,0,1]}}`, nil, []string{"pinch or shatter. Keep", "implants"}},
		{"weak film", electret("5e-6"), nil, nil},               // 5.6 V
		{"film", electret("1e-4"), nil, []string{"110 V; may"}}, // P t/eps0 = 113 V
		{"air", electret("5e-6"), &air, []string{"4.0 MV/m"}},
		{"not air", electret("5e-6"), &inFilm, nil},
		{"charged sheet", `{"name": "s", "shape": "disc", "radius": 0.1, "charged": {"density": 1e-6}}`, nil, []string{"5600 V; may"}}, // sigma R/(2 eps0) = 5647 V
	} {
		s := built(t, `{"parts": [`+c.parts+`]}`)
		var w Watch
		if c.rec != nil {
			w.See(c.rec, field.Mean)
		}
		got := s.Cautions(w)
		ok := len(got) == len(c.want)
		for i := range min(len(got), len(c.want)) {
			ok = ok && strings.Contains(got[i], c.want[i])
		}
		if !ok {
			t.Errorf("%s: cautions %q, want %q", c.name, got, c.want)
		}
	}
}

// TestLeftOut checks the words on what the model leaves out; N of the cube is 1/3 exactly, by symmetry.
func TestLeftOut(t *testing.T) {
	cube := built(t, `{"parts": [{"name": "m", "shape": "box", "size": [1,1,1], "magnetized": {"remanence": [0,0,1]}}]}`).LeftOut()
	if want := "No recoil: at µrec 1.05 (N 0.333, Pc 2.00) the magnet would be about 1.6 % weaker."; len(cube) != 1 || cube[0] != want {
		t.Errorf("cube: %q, want %q", cube, want)
	}
	// A cylinder as long as wide: N 0.31158, from published tables of the magnetometric factor.
	rod := built(t, `{"parts": [{"name": "m", "shape": "cylinder", "radius": 1, "height": 2, "magnetized": {"remanence": [0,0,1]}}]}`).LeftOut()
	if len(rod) != 1 || !strings.Contains(rod[0], "N 0.312") {
		t.Errorf("cylinder: %q, want N 0.312", rod)
	}
	bead := built(t, `{"parts": [{"name": "e", "shape": "sphere", "radius": 1, "polarized": {"uniform": [0,0,1]}}]}`).LeftOut()
	if len(bead) != 1 || strings.Contains(bead[0], "thin film") {
		t.Errorf("bead: %q, want no word of a film", bead)
	}
}

// TestAccuracy checks the floors and what counts as missed.
func TestAccuracy(t *testing.T) {
	s := built(t, `{"accuracy": 1e-13, "parts": [{"name": "a", "shape": "sphere", "radius": 1, "centre": [3,0,0], "polarized": {"uniform": [0,0,2e-6]}}]}`)
	r := reach{kinds: [2]Kind{Polarized, Charged}, x: r3.Vec{X: 3, Z: 3}}
	phi, g, _ := s.floors(r.kinds, r.x)
	a := 1.7320508075688772 // half diagonal of the box of the sphere
	if want := 1e-3 * 2e-6 * (a / 3) * (a / 3) * (a / 3); g < 0.999*want || g > 1.001*want {
		t.Errorf("floor of the field %g, want %g", g, want)
	}
	if want := 1e-3 * 2e-6 * a * (a / 3) * (a / 3); phi < 0.999*want || phi > 1.001*want {
		t.Errorf("floor of the potential %g, want %g", phi, want)
	}
	for _, c := range []struct {
		name       string
		errV, errE float64
		status     field.Status
		want       int
	}{
		{"good", 1e-15, 1e-15, field.Regular, 0},
		{"bad potential", 1, 1e-15, field.Regular, 1},
		{"both bad", 1, 1, field.OnFace, 2},
		{"edge", 1, 1, field.OnEdge, 0},
		{"not converged", 1, 1, field.NotConverged, 2},
		{"not converged, but as good as wanted", 1e-15, 1e-15, field.NotConverged, 0},
	} {
		rec := &Record{}
		rec.Electric.V, rec.Electric.E = 1, r3.Vec{X: 1}
		rec.Electric.ErrV, rec.Electric.ErrE, rec.Electric.Status = c.errV, c.errE, c.status
		s.judge(rec, r3.Vec{X: 3, Z: 3}, field.Mean)
		if len(rec.Missed) != c.want {
			t.Errorf("%s: missed %q, want %d", c.name, rec.Missed, c.want)
		}
	}
}
