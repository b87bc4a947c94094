package solve

import (
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"

	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

// TestGradients holds gradients against differences of the fields of the same scene, outside and inside bodies whose
// magnetization varies, in the unit of the file and in turned frames.
func TestGradients(t *testing.T) {
	const h = 1e-4 // mm
	for _, c := range []struct{ name, keys string }{
		{"arc", `"shape": "arc", "inner": 0.5, "outer": 1, "height": 1.5, "from": -30, "to": 60, "%s": {"affine": {"value": [1,0,2], "gradient": [[1,2,0],[0,1,0],[3,0,-1]]}}`},
		{"cone", `"shape": "cone", "bottom": 1, "top": 0.5, "height": 1, "%s": {"uniform": [1,0,2]}`},
		{"torus", `"shape": "torus", "major": 0.75, "minor": 0.5, "%s": {"uniform": [1,0,2]}`},
		{"cylinder axial", `"shape": "cylinder", "radius": 1, "height": 1.5, "%s": {"axial_power": {"coefficient": 2, "power": 2}}, "scale": -3`},
		{"cylinder radial", `"shape": "cylinder", "radius": 1, "height": 1.5, "%s": {"radial_power": {"coefficient": 2, "power": 1.5}}`},
		{"hollow sphere", `"shape": "hollow_sphere", "inner": 0.5, "outer": 1, "%s": {"central_power": {"coefficient": 2, "power": -1}}`},
	} {
		for _, kind := range []string{"polarized", "magnetized"} {
			part := fmt.Sprintf(`{"name": "a", "rotations": [{"axis": [0,0,1], "degrees": 180}, {"axis": [1,2,3], "degrees": 180}], `+c.keys+`}`, kind)
			for _, x := range []r3.Vec{{X: 0.5, Y: 0.5, Z: 0.25}, {X: 0.75, Z: 0.125}, {X: -2, Y: 1, Z: 0.5}} {
				var points []string
				for _, e := range []r3.Vec{{}, {X: h}, {X: -h}, {Y: h}, {Y: -h}, {Z: h}, {Z: -h}} {
					p := r3.Add(x, e)
					points = append(points, fmt.Sprintf("[%.17g,%.17g,%.17g]", p.X, p.Y, p.Z))
				}
				s := built(t, `{"length": "mm", "parts": [`+part+`], "wanted": [{"points": [`+strings.Join(points, ",")+`], "gradient": true}]}`)
				all := records(t, s, 0)
				got, of, scale := all[0].Gradient.B, func(r *Record) r3.Vec { return r.Magnetic.B }, mu0Times(1e3)
				if kind == "polarized" {
					got, of, scale = all[0].Gradient.E, func(r *Record) r3.Vec { return r.Electric.E }, 1e3/epsilon0
				}
				if got == nil || len(all[0].Missed) > 0 {
					t.Fatalf("%s %s at %v: gradient %v, missed %q", c.name, kind, x, got, all[0].Missed)
				}
				for k := range 3 {
					d := r3.Scale(1/(2*h*1e-3), r3.Sub(of(&all[1+2*k]), of(&all[2+2*k])))
					for i, want := range [3]float64{d.X, d.Y, d.Z} {
						if math.Abs(got[i][k]-want) > 1e-5*got.norm()+1e-10*scale { // (h/distance of a face)^2 with the least about 0.05; u/h
							t.Errorf("%s %s at %v: gradient[%d][%d] = %v, differences say %v", c.name, kind, x, i, k, got[i][k], want)
						}
					}
				}
			}
		}
	}
}

// TestNoGradient checks where there is none: on charged faces, edges and at point sources; that is no miss.
func TestNoGradient(t *testing.T) {
	s := built(t, `{"parts": [{"name": "a", "shape": "cylinder", "radius": 1, "height": 2, "magnetized": {"axial_power": {"coefficient": 1, "power": 2}}},
		{"name": "ion", "shape": "point", "centre": [9,0,0], "charged": {"charge": 1}}],
		"wanted": [{"points": [[0,0,1],[1,0,1],[9,0,0],[3,0,0],[0.5,0,0.5]], "gradient": true}, {"points": [[3,0,0]]}]}`)
	all := records(t, s, 0)
	for i, want := range []bool{false, false, true, true, true} { // the ion is no source of B
		if got := all[i].Gradient.B != nil; got != want || len(all[i].Missed) > 0 {
			t.Errorf("point %d: gradient of B there: %t, want %t; missed %q", i, got, want, all[i].Missed)
		}
	}
	for i, want := range []bool{true, true, false, true, true} {
		if got := all[i].Gradient.E != nil; got != want {
			t.Errorf("point %d: gradient of E there: %t, want %t", i, got, want)
		}
	}
	if records(t, s, 1)[0].Gradient != nil {
		t.Error("a gradient that nobody asked for")
	}
}

// TestTraces checks div B = 0 and curl E = 0 where the magnetization varies.
func TestTraces(t *testing.T) {
	s := built(t, `{"parts": [{"name": "m", "shape": "cylinder", "radius": 1, "height": 1.5, "magnetized": {"radial_power": {"coefficient": 1e6, "power": 2}}},
		{"name": "e", "shape": "hollow_sphere", "inner": 0.5, "outer": 1, "centre": [3,0,0], "polarized": {"central_power": {"coefficient": 1, "power": 2}}}],
		"wanted": [{"points": [[0.5,0.25,0.125],[3.7,0,0],[1.5,0,0]], "gradient": true}]}`)
	for i, r := range records(t, s, 0) {
		b, e := r.Gradient.B, r.Gradient.E
		if div := b[0][0] + b[1][1] + b[2][2]; math.Abs(div) > 1e-11*(b.norm()+mu0Times(1e6)) { // a few roundings, through rotations
			t.Errorf("point %d: div B = %g of %g", i, div, b.norm())
		}
		for k := range 3 {
			for j := range k {
				if e[j][k] != e[k][j] {
					t.Errorf("point %d: E is not free of curl: %v", i, *e)
				}
			}
		}
	}
}

func mu0Times(v float64) float64 { return 1.25663706127e-6 * v }

// TestDoubtful checks whose estimates are asked: at an accuracy that closed forms keep by proof only those of integrated
// bodies, and a record is held against them.
func TestDoubtful(t *testing.T) {
	const parts = `"parts": [{"name": "ball", "shape": "sphere", "radius": 1, "magnetized": {"uniform": [0,0,1]}},
		{"name": "bar", "shape": "box", "size": [1,1,1], "centre": [5,0,0], "magnetized": {"axial_power": {"coefficient": 1, "power": 2}}}]}`
	kinds := [2]Kind{Magnetized, Magnetized}
	for _, c := range []struct {
		accuracy string
		want     int
	}{{"1e-9", 1}, {"1e-12", 1}, {"1e-13", 2}} {
		s := built(t, `{"accuracy": `+c.accuracy+`, `+parts)
		if got := s.doubtful(kinds); len(got) != c.want {
			t.Errorf("accuracy %s: %d doubtful parts, want %d", c.accuracy, len(got), c.want)
		}
	}
	s := built(t, `{"accuracy": 1e-9, `+parts)
	x := r3.Vec{X: 5, Z: 2}
	r := &reach{parts: s.magnetic.Parts, kinds: kinds, names: [2]string{"Vm", "H"}, x: x, phi: 1, g: r3.Vec{Z: 1}, errPhi: 1e-8, errG: 1e-8}
	var rec Record
	if s.held(&rec, r); len(rec.Missed) > 0 {
		t.Errorf("missed %q by the estimate of a closed form", rec.Missed)
	}
	s.Parts[0].proven = math.Inf(1)
	r.errPhi, r.errG = 1e-8, 1e-8
	if s.held(&rec, r); !slices.Equal(rec.Missed, []string{"Vm", "H"}) {
		t.Errorf("missed %q, want both", rec.Missed)
	}
	rec = Record{}
	if s.held(&rec, &reach{status: field.OnEdge}); len(rec.Missed) > 0 {
		t.Errorf("missed %q on an edge", rec.Missed)
	}
}
