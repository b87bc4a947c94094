package element

import (
	"encoding/json"
	"errors"
	"io/fs"
	"math"
	"os"
	"slices"
	"strings"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// ringCase is one body of revolution of a reference file.
type ringCase struct {
	ID   string
	Body struct {
		Type              string
		Radius            float64
		Bottom            float64 `json:"radius_bottom_at_z=-half_length"`
		Top               float64 `json:"radius_top_at_z=+half_length"`
		Inner             float64 `json:"r1"`
		Outer             float64 `json:"r2"`
		Major             float64 `json:"major_radius"`
		Minor             float64 `json:"minor_radius"`
		HalfLength        float64 `json:"half_length"`
		Centre, Axis, Ref [3]float64
	}
	Polarization struct {
		Kind string
		C, N float64
		P    [3]float64
	}
	Points [][3]float64
	Phi    []string
	G      [][3]string
	Tags   []string
}

// build returns the source in its own frame, the pose, the bounding radius and the largest polarization; nil if it is none
// of this package's integrated bodies.
func (c *ringCase) build(t *testing.T) (src field.Evaluator, pose geom.Pose, bound, pmax float64) {
	t.Helper()
	turn, err := geom.Frame(vec(c.Body.Axis), vec(c.Body.Ref))
	if err != nil {
		t.Fatal(err)
	}
	pose = turn.Then(geom.Translate(vec(c.Body.Centre)))
	b, q := c.Body, c.Polarization
	p := turn.VectorToLocal(vec(q.P))
	switch {
	case b.Type == "truncated_cone" && q.Kind == "uniform":
		src, err = NewCone(geom.Cone{Bottom: b.Bottom, Top: b.Top, Height: 2 * b.HalfLength}, p)
		bound, pmax = math.Hypot(max(b.Bottom, b.Top), b.HalfLength), r3.Norm(p)
	case strings.HasPrefix(q.Kind, "axial_"):
		tube, n := c.tube(), int(c.power())
		src, err = NewAxialPower(tube, q.C, n)
		bound, pmax = math.Hypot(tube.Outer, b.HalfLength), math.Abs(q.C)*math.Pow(b.HalfLength, float64(n))
	case strings.HasPrefix(q.Kind, "radial_"):
		tube, n := c.tube(), c.power()
		src, err = NewRadialPower(tube, q.C, n)
		bound, pmax = math.Hypot(tube.Outer, b.HalfLength), math.Abs(q.C)*math.Pow(tube.Outer, n)
	case b.Type == "torus" && q.Kind == "uniform":
		src, err = NewTorus(geom.Torus{Major: b.Major, Minor: b.Minor}, p)
		bound, pmax = b.Major+b.Minor, r3.Norm(p)
	}
	if err != nil {
		t.Fatal(err)
	}
	return src, pose, bound, pmax
}

// power returns the power of a power law: n, or the digit at the end of its name, or 1.
func (c *ringCase) power() float64 {
	kind := c.Polarization.Kind
	switch last := kind[len(kind)-1]; {
	case strings.HasSuffix(kind, "_power"):
		return c.Polarization.N
	case last >= '0' && last <= '9':
		return float64(last - '0')
	}
	return 1
}

// tube returns the shape of a cylinder or tube.
func (c *ringCase) tube() geom.Tube {
	b := c.Body
	return geom.Tube{Inner: b.Inner, Outer: max(b.Radius, b.Outer), Height: 2 * b.HalfLength}
}

// loadRings returns the cases of all reference files of verify.
func loadRings(t *testing.T) (all []ringCase) {
	t.Helper()
	for _, name := range []string{"dev.json", "hard.json", "more.json"} {
		data, err := os.ReadFile("../../verify/testdata/" + name)
		if errors.Is(err, fs.ErrNotExist) {
			continue
		}
		if err != nil {
			t.Fatal(err)
		}
		var cases []ringCase
		if err := json.Unmarshal(data, &cases); err != nil {
			t.Fatal(err)
		}
		all = append(all, cases...)
	}
	return all
}

// TestRingReference holds potential, field and estimates against reference values, by the contract of integrated shapes.
func TestRingReference(t *testing.T) {
	cases := loadRings(t)
	var over []float64
	under, claims, found := 0, 0, 0
	for _, c := range cases {
		if !slices.Contains([]string{"truncated_cone", "torus", "cylinder", "tube"}, c.Body.Type) {
			continue
		}
		src, pose, a, pmax := c.build(t)
		if src == nil {
			continue
		}
		found++
		worst, worstPhi := 0.0, 0.0
		for i := range c.Points {
			x := vec(c.Points[i])
			v := roundAt(src, pose, x, a, field.Mean, field.WantPhi|field.WantG|field.WantErr)
			near := min(1, a/r3.Norm(r3.Sub(x, vec(c.Body.Centre))))
			phi0, g0 := pmax*a*near*near, pmax*near*near*near
			judge := func(what string, e, size, floor, claim float64, worst *float64) {
				aim := 3e-12 // what the docs say
				if c.Polarization.Kind == "axial_z2" && c.Body.HalfLength < 0.005*c.Body.Radius {
					aim = 1e-10 // a plate, as the docs say: the contract of integrated shapes
				}
				ratio := e / (aim * max(size, 1e-3*floor))
				if !(ratio < 1) {
					t.Errorf("%s at %v (%s): %s off by %.3g, %.2g of the tolerance; got %v, %v", c.ID, x, c.Tags[i], what, e, ratio, v.Phi, v.G)
				}
				*worst = max(*worst, ratio)
				claims++
				if e > claim {
					under++
					t.Logf("%s at %v (%s): %s off by %.3g, claim %.3g", c.ID, x, c.Tags[i], what, e, claim)
				}
				if size > 0 {
					over = append(over, claim/max(e, u*size))
				}
			}
			d, f := minus(t, v.Phi, c.Phi[i])
			judge("phi", math.Abs(d), math.Abs(f), phi0, v.ErrPhi, &worstPhi)
			if v.Status == field.OnEdge {
				continue
			}
			e, size := offBy(t, v.G, c.G[i])
			judge("g", e, size, g0, v.ErrG, &worst)
		}
		t.Logf("%-34s worst of the aim: phi %.2g, g %.2g", c.ID, worstPhi, worst)
	}
	if found < 2 {
		t.Fatalf("only %d cases", found)
	}
	slices.Sort(over)
	t.Logf("%d of %d estimates too small; overestimate: median %.3g, 99 %% %.3g", under, claims, over[len(over)/2], over[len(over)*99/100])
	if 1000*under > claims || over[len(over)/2] > 100 { // the contract on estimates
		t.Errorf("%d of %d estimates too small, median overestimate %.3g", under, claims, over[len(over)/2])
	}
}
