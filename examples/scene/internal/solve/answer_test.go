package solve_test

import (
	"context"
	"fmt"
	"math"
	"strings"
	"testing"
	"testing/fstest"

	"example.com/boundpole/examples/scene/internal/scenefile"
	"example.com/boundpole/examples/scene/internal/solve"
	"example.com/boundpole/field/codata"
	"gonum.org/v1/gonum/spatial/r3"
)

// answers solves a scene and answers its requests.
func answers(t *testing.T, text string, files fstest.MapFS) (*solve.Setup, []*solve.Answer) {
	t.Helper()
	scene, err := scenefile.Parse("scene.json", []byte(text), files)
	if err != nil {
		t.Fatal(err)
	}
	s, err := solve.Build(scene)
	if err != nil {
		t.Fatal(err)
	}
	var all []*solve.Answer
	for i := range scene.Wanted {
		a, err := s.Answer(context.Background(), &scene.Wanted[i])
		if err != nil {
			t.Fatal(err)
		}
		all = append(all, a)
	}
	return s, all
}

// holds compares a component of a quantity (0 for a number) with a value to half a unit of the last digit, and the estimate
// with a bound.
func holds(t *testing.T, what string, a *solve.Answer, name string, component int, want, half float64) {
	t.Helper()
	q := a.Find(name)
	if q == nil {
		t.Errorf("%s: no %s", what, name)
		return
	}
	if got := q.Value[component]; !(math.Abs(got-want) <= half) || a.Missed || a.Status != "" {
		t.Errorf("%s: %s[%d] = %v, want %v within %v; status %q, missed %v", what, name, component, got, want, half, a.Status, a.Missed)
	}
	if q.Estimate == nil || !(*q.Estimate <= half+1e-9*math.Abs(want)) {
		t.Errorf("%s: estimate of %s is %v", what, name, q.Estimate)
	}
}

// TestCoaxialForce: D10 x 5 mm, 1.30 T, computed by hand from Bessel integrals.
func TestCoaxialForce(t *testing.T) {
	for _, c := range []struct{ gap, want, half float64 }{
		{0, 33.22, 5e-3}, {1, 19.00, 5e-3}, {5, 4.921, 5e-4}, {20, 0.22239, 5e-6}, {60, 5.4392e-3, 5e-8},
	} {
		_, a := answers(t, fmt.Sprintf(`{"length":"mm","parts":[
			{"name":"low","shape":"cylinder","radius":5,"height":5,"magnetized":{"remanence":[0,0,1.3]}},
			{"name":"high","shape":"cylinder","radius":5,"height":5,"centre":[0,0,%g],"magnetized":{"remanence":[0,0,1.3]}}],
			"wanted":[{"force":{"on":"high"}},{"force":{"on":"low"}}]}`, 5+c.gap), nil)
		holds(t, fmt.Sprintf("gap %g mm", c.gap), a[0], "force", 2, -c.want, c.half)
		holds(t, fmt.Sprintf("gap %g mm, the other", c.gap), a[1], "force", 2, c.want, c.half)
	}
}

// TestPlanes: a latch on iron by its own image, a charge and a dipole before a conductor and a dielectric (Coulomb).
func TestPlanes(t *testing.T) {
	for _, c := range []struct{ gap, want float64 }{{0, 36.793}, {0.5, 21.094}, {2, 7.853}} {
		s, a := answers(t, fmt.Sprintf(`{"length":"mm","parts":[{"name":"m","shape":"cylinder","radius":6,"height":4,"centre":[0,0,%g],"magnetized":{"remanence":[0,0,1.3]}}],
			"planes":[{"kind":"iron","point":[0,0,0],"normal":[0,0,2]}],"wanted":[{"force":{"on":"m"}}]}`, 2+c.gap), nil)
		holds(t, fmt.Sprintf("latch %g mm", c.gap), a[0], "force", 2, -c.want, 5e-4)
		if b := field(t, s, r3.Vec{X: 3}).Magnetic.B; math.Abs(b.X) > 1e-12 { // on ideal iron B stands normal; T
			t.Errorf("B on the plate is %v", b)
		}
		if b := field(t, s, r3.Vec{Z: -1}); !math.IsNaN(b.Magnetic.B.Z) || b.State() != "behind a plane" || len(b.Missed) > 0 {
			t.Errorf("behind the plate: %v, %q, missed %v", b.Magnetic.B, b.State(), b.Missed)
		}
	}
	const q, d = 2e-9, 0.01
	coulomb := q * q / (16 * math.Pi * codata.Epsilon0 * d * d)
	_, a := answers(t, `{"parts":[{"name":"q","shape":"point","centre":[0.01,0,5],"charged":{"charge":2e-9}}],
		"planes":[{"kind":"conductor","point":[0,0,0],"normal":[1,0,0]}],"wanted":[{"force":{"on":"q"}}]}`, nil)
	holds(t, "charge before a conductor", a[0], "force", 0, -coulomb, 1e-12*coulomb) // a few roundings
	_, a = answers(t, `{"parts":[{"name":"q","shape":"point","centre":[0.01,0,5],"charged":{"charge":2e-9}}],
		"planes":[{"kind":"dielectric","point":[0,0,0],"normal":[1,0,0],"permittivity":4}],"wanted":[{"force":{"on":"q"}}]}`, nil)
	holds(t, "charge before a dielectric", a[0], "force", 0, -coulomb*3/5, 1e-12*coulomb)
	// In a corner of two conductors: images -q, -q and +q.
	_, a = answers(t, `{"parts":[{"name":"q","shape":"point","centre":[0.01,0.01,0],"charged":{"charge":2e-9}}],
		"planes":[{"kind":"conductor","point":[0,0,0],"normal":[1,0,0]},{"kind":"conductor","point":[0,0,0],"normal":[0,1,0]}],"wanted":[{"force":{"on":"q"}}]}`, nil)
	holds(t, "charge in a corner", a[0], "force", 0, -coulomb*(1-1/math.Sqrt(8)), 1e-11*coulomb)
}

// field returns the record at a point in the unit of the file.
func field(t *testing.T, s *solve.Setup, x r3.Vec) (rec solve.Record) {
	t.Helper()
	q := &scenefile.Request{Kind: "points", Points: []r3.Vec{x}, Side: "mean"}
	err := s.Records(context.Background(), q, func(_ int, r *solve.Record) error { rec = *r; return nil })
	if err != nil {
		t.Fatal(err)
	}
	return rec
}

// TestSphereAnswers: outside, a uniform sphere is a dipole; every answer has a closed form.
func TestSphereAnswers(t *testing.T) {
	const radius, br = 0.004, 1.2
	m := 4 * math.Pi / 3 * radius * radius * radius * br / codata.Mu0
	_, a := answers(t, `{"length":"mm","parts":[
		{"name":"s","shape":"sphere","radius":4,"magnetized":{"remanence":[0,0,1.2]}},
		{"name":"d","shape":"point","centre":[0,0,30],"magnetized":{"moment":[0,0,0.5]}},
		{"name":"far","shape":"sphere","radius":1,"centre":[0,1e6,0],"polarized":{"uniform":[0,0,1e-9]}}],
		"wanted":[
		{"energy":["s","d"]},{"force":{"on":"d"}},{"force":{"on":"s","about":[0,0,30]}},{"energy":["s","far"]},
		{"linkage":{"circle":{"centre":[0,0,12],"normal":[0,0,3],"radius":5},"turns":7}},
		{"linkage":{"polygon":[[5,0,12],[0,5,12],[-5,0,12],[0,-5,12]]}},
		{"reach":{"flux_density":0.01}},{"reach":{"flux_density":5}}]}`, nil)
	_, alone := answers(t, `{"length":"mm","parts":[{"name":"s","shape":"sphere","radius":4,"magnetized":{"remanence":[0,0,1.2]}}],"wanted":[{"reach":{"flux_density":0.9}}]}`, nil)
	w := -codata.Mu0 / (2 * math.Pi) * m * 0.5 / math.Pow(0.03, 3)
	holds(t, "energy", a[0], "energy", 0, w, 1e-12*math.Abs(w))
	holds(t, "force", a[1], "force", 2, 3*w/0.03, 1e-11*math.Abs(3*w/0.03))
	holds(t, "reaction", a[2], "force", 2, -3*w/0.03, 1e-9*math.Abs(3*w/0.03))
	holds(t, "energy of strangers", a[3], "energy", 0, 0, 0)
	loop := func(m, z, r float64) float64 { return codata.Mu0 * m * r * r / 2 / math.Pow(r*r+z*z, 1.5) }
	phi := 7 * (loop(m, 0.012, 0.005) + loop(0.5, 0.018, 0.005))
	holds(t, "linkage", a[4], "linkage", 0, phi, 1e-11*phi)
	if square := a[5].Find("linkage").Value[0] * 7; !(square > 0.6*phi && square < phi) { // the inscribed square has 2/pi of the area
		t.Errorf("square coil: %v, round one %v", square, phi)
	}
	if a[6].Missed || a[6].Find("distance").Value[0] < 0.02 {
		t.Errorf("reach: %+v", a[6])
	}
	near := math.Cbrt(codata.Mu0 * 0.5 / (2 * math.Pi * 5)) // from the dipole along its axis, where the sphere adds 1e-3 T
	if off := a[7].Find("from_surface").Value[0]; math.Abs(off-near) > 1e-3*near {
		t.Errorf("5 T reaches %v from the dipole, want %v", off, near)
	}
	if q := alone[0].Find("distance"); alone[0].Status == "" || !math.IsNaN(q.Value[0]) || alone[0].Missed { // outside a sphere B is at most 2/3 of Br
		t.Errorf("0.9 T outside a sphere of 1.2 T: %+v", alone[0])
	}
}

// TestReading: the mean over a disc on the axis of a dipole is its flux over the area; over a rectangle, that of its quarters.
func TestReading(t *testing.T) {
	_, a := answers(t, `{"length":"cm","parts":[{"name":"d","shape":"point","magnetized":{"moment":[0,0,2]}}],"wanted":[
		{"reading":{"at":[0,0,3],"normal":[0,0,-1],"disc":1}},
		{"reading":{"at":[1,1,3],"normal":[0,0,1],"rectangle":[4,2],"along":[1,1,0]}},
		{"reading":{"at":[2,2,3],"normal":[0,0,1],"rectangle":[2,2],"along":[1,1,0]}}]}`, nil)
	b := codata.Mu0 * 2 / (2 * math.Pi) / math.Pow(0.01*0.01+0.03*0.03, 1.5)
	holds(t, "disc", a[0], "mean", 0, -b, 1e-11*b)
	if a[1].Missed || a[2].Missed || a[1].Find("mean").Value[0] <= a[2].Find("mean").Value[0] {
		t.Errorf("rectangles: %+v, %+v", a[1], a[2])
	}
}

// TestCirculating: within a long tube of flux A is A0 along the axis, round its wall the loop integral is the flux.
func TestCirculating(t *testing.T) {
	s, a := answers(t, `{"length":"mm","parts":[{"name":"g","shape":"cylinder","radius":2,"height":1000,"circulating":3e-6}],"wanted":[
		{"linkage":{"polygon":[[0,0,-10],[0,0,10],[10,0,10],[10,0,-10]]}},{"force":{"on":"g"}},{"reading":{"at":[0,0,0],"normal":[0,0,1],"disc":1}}]}`, nil)
	flux := 3e-6 * 0.02 // A0 times the length of wall that the loop encloses
	holds(t, "round the wall", a[0], "linkage", 0, flux, 1e-10*flux)
	holds(t, "force", a[1], "force", 2, 0, 0)
	holds(t, "mean of A", a[2], "mean", 0, 3e-6, 1e-5*3e-6) // the ends take (radius/half length)^2/2 away
	if got := field(t, s, r3.Vec{X: 1}).Guide.A; math.Abs(got.Z-3e-6) > 1e-5*3e-6 {
		t.Errorf("A inside is %v", got)
	}
	if got := field(t, s, r3.Vec{X: 5}).Guide.A; r3.Norm(got) > 1e-4*3e-6 {
		t.Errorf("A outside is %v", got)
	}
}

// TestGradeInScene: remanence at the scene's temperature, and the warning past the limit of the material.
func TestGradeInScene(t *testing.T) {
	files := fstest.MapFS{"k.json": {Data: []byte(`{"format":"boundpole magnet grade","version":1,"name":"K","source":"invented","reference_temperature_C":20,
		"remanence_T":{"typical":1.3},"intrinsic_coercivity_A_per_m":{"min":955e3},"recoil_permeability":1.05,
		"remanence_percent_per_K":-0.12,"coercivity_percent_per_K":-0.75,"coefficients_hold_C":{"from":-40,"to":125}}`)}}
	scene := func(temperature float64) string {
		return fmt.Sprintf(`{"length":"mm","temperature":%g,"parts":[{"name":"m","shape":"cylinder","radius":4,"height":3,
			"magnetized":{"grade":"k.json","along":[0,0,2]}}]}`, temperature)
	}
	for _, c := range []struct {
		temperature, want float64
		warns             bool
	}{{-40, 194.224, false}, {20, 181.179, false}, {125, 158.351, true}} { // mT, by hand
		s, _ := answers(t, scene(c.temperature), files)
		if b := 1e3 * field(t, s, r3.Vec{Z: 4}).Magnetic.B.Z; math.Abs(b-c.want) > 5e-4 { // the printed digits
			t.Errorf("at %v °C %v mT, want %v", c.temperature, b, c.want)
		}
		if warned := strings.Contains(strings.Join(s.Warnings, " "), "past its HcJ"); warned != c.warns {
			t.Errorf("at %v °C warnings %q", c.temperature, s.Warnings)
		}
	}
	parsed, err := scenefile.Parse("scene.json", []byte(scene(200)), files)
	if err != nil {
		t.Fatal(err)
	}
	if _, err := solve.Build(parsed); err == nil || !strings.Contains(err.Error(), "/parts/0/magnetized/grade") || !strings.Contains(err.Error(), "not extrapolated") {
		t.Errorf("at 200 °C: %v", err)
	}
}

// TestTravel: the last position is the scene with the part placed there.
func TestTravel(t *testing.T) {
	scene := func(centre, turn string) string {
		return `{"length":"mm","parts":[{"name":"a","shape":"box","size":[2,3,4],"magnetized":{"uniform":[0,0,1e6]}},
			{"name":"b","shape":"box","size":[2,2,1],` + turn + `"centre":` + centre + `,"magnetized":{"uniform":[5e5,0,5e5]}}],"wanted":[{"force":{"on":"b"}}]}`
	}
	for _, c := range []struct{ travel, centre, turn string }{
		{`{"part":"b","shift":[1,2,3],"count":4,"ask":[{"charges":true}]}`, "[7,2,3]", ""},
		{`{"part":"b","rotation":{"axis":[0,0,1],"degrees":90,"about":[0,0,0]},"count":3,"ask":[{"charges":true}]}`, "[0,6,0]", `"rotations":[{"axis":[0,0,1],"degrees":90}],`},
	} {
		start, _ := answers(t, strings.TrimSuffix(scene("[6,0,0]", ""), `]}`)+`,{"travel":`+c.travel+`}]}`, nil)
		move := start.Scene.Wanted[1].Travel
		at, err := start.At(move, move.Count-1)
		if err != nil {
			t.Fatal(err)
		}
		got, err := at.Setup.Answer(context.Background(), &start.Scene.Wanted[0])
		if err != nil {
			t.Fatal(err)
		}
		_, want := answers(t, scene(c.centre, c.turn), nil)
		for _, name := range []string{"about", "force", "torque"} {
			g, w := got.Find(name).Value, want[0].Find(name).Value
			for i := range w {
				if math.Abs(g[i]-w[i]) > 1e-9*(math.Abs(w[0])+math.Abs(w[1])+math.Abs(w[2])) { // the accuracy of the scene
					t.Errorf("%s: %s = %v, want %v", c.travel, name, g, w)
				}
			}
		}
	}
}

func TestPlaneRefusals(t *testing.T) {
	for scene, want := range map[string]string{
		`{"parts":[{"name":"m","shape":"sphere","radius":1,"magnetized":{"uniform":[0,0,1]}}],"planes":[{"kind":"iron","point":[0,0,0],"normal":[0,0,1]}]}`: "/parts/0: m reaches",
		`{"parts":[{"name":"m","shape":"sphere","radius":1,"centre":[5,5,5],"magnetized":{"uniform":[0,0,1]}}],"planes":[{"kind":"iron","point":[0,0,0],"normal":[0,0,1]},
			{"kind":"iron","point":[0,0,0],"normal":[0,1,1]}]}`: "/planes/1/normal: the plane is not at right angles to plane 0",
	} {
		parsed, err := scenefile.Parse("scene.json", []byte(scene), nil)
		if err != nil {
			t.Fatal(err)
		}
		if _, err := solve.Build(parsed); err == nil || !strings.Contains(err.Error(), want) {
			t.Errorf("%v, want %q", err, want)
		}
	}
}
