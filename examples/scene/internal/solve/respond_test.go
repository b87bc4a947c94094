package solve_test

import (
	"context"
	"math"
	"strings"
	"testing"

	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/examples/scene/internal/solve"
	"example.com/boundpole/field/codata"
	"gonum.org/v1/gonum/spatial/r3"
)

// solvedFor parses, builds and solves a scene with parts that respond.
func solvedFor(t *testing.T, text string) *solve.Setup {
	t.Helper()
	scene, err := scenefile.Parse("scene.json", []byte(text), nil)
	if err != nil {
		t.Fatal(err)
	}
	s, err := solve.Build(scene)
	if err != nil {
		t.Fatal(err)
	}
	if err := s.Respond(context.Background()); err != nil {
		t.Fatal(err)
	}
	return s
}

// TestDielectricBall: eps_r 3 in 1 MV/m: 0.6 MV/m inside, moment 4 pi a^3 eps0 (eps_r - 1)/(eps_r + 2) E0 (textbook).
func TestDielectricBall(t *testing.T) {
	s := solvedFor(t, `{"length":"mm","accuracy":1e-5,"applied":{"E":[0,0,1e6]},"parts":[{"name":"ball","shape":"sphere","radius":2,"permittivity":3}]}`)
	if got := s.Charges()[0]; math.Abs(got.Moment.Z-4*math.Pi*8e-9*codata.Epsilon0*0.4e6) > 1e-8*got.Moment.Z || got.Total != 0 { // measured 1e-10, with a hundredfold reserve
		t.Errorf("moment %v, total %v", got.Moment, got.Total)
	}
	in := field(t, s, r3.Vec{X: 0.5, Z: 0.25})
	if e, d := in.Electric.E.Z, in.Electric.D.Z; math.Abs(e-0.6e6) > 1e-6*e || math.Abs(d-3*codata.Epsilon0*e) > 1e-12*d || len(in.Missed) > 0 { // the estimate is above that
		t.Errorf("inside E %v, D %v, missed %q, want 0.6e6 and eps0 eps_r E", e, d, in.Missed)
	}
	on := func(side scenefile.Side) (rec solve.Record) {
		q := &scenefile.Request{Kind: "points", Points: []r3.Vec{{Z: 2}}, Side: side}
		if err := s.Records(context.Background(), q, func(_ int, r *solve.Record) error { rec = *r; return nil }); err != nil {
			t.Fatal(err)
		}
		return rec
	}
	inner, outer := on("inside"), on("outside")
	if math.Abs(inner.Electric.E.Z-0.6e6) > 1 || math.Abs(outer.Electric.E.Z-1.8e6) > 1 || math.Abs(inner.Electric.D.Z-outer.Electric.D.Z) > 1e-6*inner.Electric.D.Z { // 1e-6: the density on the face
		t.Errorf("on the pole: inside %+v, outside %+v", inner.Electric, outer.Electric)
	}
}

// TestIronAndMagnet: action is reaction between a magnet and soft iron, and iron draws the magnet.
func TestIronAndMagnet(t *testing.T) {
	s := solvedFor(t, `{"length":"mm","accuracy":1e-3,"parts":[{"name":"iron","shape":"cylinder","radius":3,"height":4,"permeability":1000},
		{"name":"m","shape":"cylinder","radius":4,"height":3,"centre":[0,0,8],"magnetized":{"remanence":[0,0,1.3]}}],
		"wanted":[{"force":{"on":"iron","about":[0,0,0]}},{"force":{"on":"m"}},{"energy":["m","iron"]},{"linkage":{"circle":{"centre":[0,0,1],"normal":[0,0,1],"radius":2}}}]}`)
	var all []*solve.Answer
	for i := range s.Scene.Wanted {
		a, err := s.Answer(context.Background(), &s.Scene.Wanted[i])
		if err != nil {
			t.Fatal(err)
		}
		all = append(all, a)
	}
	iron, m := all[0].Find("force"), all[1].Find("force")
	if sum := iron.Value[2] + m.Value[2]; !(iron.Value[2] > 0.1) || math.Abs(sum) > *iron.Estimate+*m.Estimate || math.Abs(sum) > 1e-3*iron.Value[2] {
		t.Errorf("on the iron %v, on the magnet %v N", iron.Value, m.Value)
	}
	if all[2].Status == "" || !math.IsNaN(all[2].Find("energy").Value[0]) || !strings.Contains(all[3].Status, "reaches into") {
		t.Errorf("energy %+v, coil round the inside of the iron %+v", all[2], all[3])
	}
}

// TestRecoil: a sphere of mu_rec 1.05 works at the crossing of its load line and recoil line: H = -(Br/mu0) N/(1 + N chi).
func TestRecoil(t *testing.T) {
	s := solvedFor(t, `{"length":"mm","accuracy":1e-5,"parts":[{"name":"m","shape":"sphere","radius":5,"magnetized":{"remanence":[0,0,1.3]},"permeability":1.05}]}`)
	h := -1.3 / codata.Mu0 / 3 / (1 + 0.05/3)
	got := field(t, s, r3.Vec{X: 1, Y: 1}).Magnetic
	if b := 1.3 + codata.Mu0*1.05*h; math.Abs(got.H.Z-h) > 1e-8*math.Abs(h) || math.Abs(got.B.Z-b) > 1e-8*b { // measured 1e-10
		t.Errorf("H %v, B %v, want %v and %v", got.H.Z, got.B.Z, h, b)
	}
}

func TestResponseRefusals(t *testing.T) {
	for text, want := range map[string]string{
		`{"parts":[{"name":"a","shape":"sphere","radius":1,"permittivity":3},{"name":"b","shape":"sphere","radius":1,"centre":[1,0,0],"permittivity":2}]}`:       "a responds to the field and b stands in it",
		`{"parts":[{"name":"a","shape":"sphere","radius":1,"centre":[0,0,3],"permeability":3}],"planes":[{"kind":"iron","point":[0,0,0],"normal":[0,0,1]}]}`:     "planes beside parts that respond",
		`{"parts":[{"name":"a","shape":"sphere","radius":1,"permeability":30},{"name":"b","shape":"point","centre":[0.1,0,0],"magnetized":{"moment":[0,0,1]}}]}`: "a responds to the field and b stands in it",
	} {
		scene, err := scenefile.Parse("scene.json", []byte(text), nil)
		if err != nil {
			t.Fatal(err)
		}
		if _, err := solve.Build(scene); err == nil || !strings.Contains(err.Error(), want) || !strings.Contains(err.Error(), "scene.json:") {
			t.Errorf("%s: %v, want %q", text, err, want)
		}
	}
}
