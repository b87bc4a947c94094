package bound_test

import (
	"math"
	"os"
	"slices"
	"sort"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/verify/refcase"
	"example.com/boundpole/verify/refsource"
	"gonum.org/v1/gonum/spatial/r3"
)

// integratedCase reports whether a case needs a quadrature, and whether that is over faces and cells.
func integratedCase(c *refcase.Case) (quadrature, patches bool) {
	kind := c.Polarization.Kind
	switch c.Body.Type {
	case "box":
		patches = kind == "radial_s2" || kind == "radial_unit" || kind == "ball_r2"
		quadrature = kind != "uniform" && kind != "affine" && !patches
	case "tube_sector", "truncated_cone", "torus":
		quadrature = true
	case "disc", "annulus":
		quadrature = c.Polarization.B != [3]float64{}
	case "cylinder", "tube":
		quadrature = kind != "uniform" && kind != "axial_z"
	}
	return quadrature || patches, patches
}

// tally counts how the claims of estimates came out.
type tally struct {
	claims, broken int
	over           []float64 // estimate over the larger of the error and u |value|
}

func (y *tally) see(err, claim, size float64) {
	y.claims++
	if !(err <= claim) {
		y.broken++
	}
	y.over = append(y.over, claim/max(err, 0x1p-53*size, 1e-300))
}

func (y *tally) median() float64 {
	sort.Float64s(y.over)
	return y.over[len(y.over)/2]
}

// compareAll holds phi, g and estimates of the cases of the files that are wanted against the reference with accuracy acc,
// taking every step-th point.
func compareAll(t *testing.T, acc float64, step int, want func(c *refcase.Case) bool, files ...string) *tally {
	t.Helper()
	worst, where := map[string]float64{}, map[string]string{}
	claims, open := new(tally), 0
	for _, file := range files {
		raw, err := os.ReadFile("../../verify/testdata/" + file)
		if err != nil {
			t.Fatal(err)
		}
		cases, err := refcase.Parse(file, raw)
		if err != nil {
			t.Fatal(err)
		}
		for i := range cases {
			c := &cases[i]
			if c.Polarization.Kind == "flux_tube" || !want(c) {
				continue
			}
			src, err := refsource.Of(c)
			if err != nil {
				t.Errorf("%s: %v", c.ID, err)
				continue
			}
			for k := 0; k < len(c.Points); k += step {
				x := refcase.Vec(c.Points[k])
				v := field.At(src, x, field.Mean, field.WantPhi|field.WantG|field.WantGrad|field.WantErr)
				m, err := c.Compare(k, v.Phi, v.G, acc, frobenius(v.Grad))
				if err != nil {
					t.Fatal(err)
				}
				if c.Tags[k] == "axis" && (c.Polarization.Kind == "radial_unit" || c.Polarization.Kind == "radial_power" && c.Polarization.N == 0) {
					continue // the unit vector away from the axis has no direction on it
				}
				if v.Status == field.OnFace { // nearer than 4 u: the reference is of one side, the value the mean
					continue
				}
				key := c.Body.Type + " " + c.Polarization.Kind + " " + c.Tags[k]
				if v.Status == field.NotConverged { // no claim on the accuracy, but one on the error
					open++
					m.TolG, m.TolPhi = v.ErrG, v.ErrPhi
				}
				if r := m.Ratio(); !(r <= worst[key]) {
					worst[key], where[key] = r, c.ID
				}
				if !(m.Ratio() <= 1) {
					t.Errorf("%s point %d %v (%s): error phi %.3g of %.3g, g %.3g of %.3g; phi %v want %.18s, g %v want %.19s, %v",
						c.ID, k, x, c.Tags[k], m.Phi, m.TolPhi, m.G, m.TolG, v.Phi, c.Phi[k], v.G, c.G[k], v.Status)
				}
				claims.see(m.G, v.ErrG, r3.Norm(v.G))
				claims.see(m.Phi, v.ErrPhi, math.Abs(v.Phi))
				if m.G > v.ErrG || m.Phi > v.ErrPhi {
					t.Logf("%s point %d %v (%s): error phi %.3g, claim %.3g, g %.3g, claim %.3g", c.ID, k, x, c.Tags[k],
						m.Phi, v.ErrPhi, m.G, v.ErrG)
				}
			}
		}
	}
	if claims.claims == 0 {
		t.Fatal("no case was found")
	}
	var keys []string
	for key := range worst {
		if worst[key] > 0.1 {
			keys = append(keys, key)
		}
	}
	sort.Strings(keys)
	for _, key := range keys {
		t.Logf("%-64s %8.2e of the tolerance (%s)", key, worst[key], where[key])
	}
	t.Logf("%d claims, %d broken, median overestimate %.3g; %d points not converged", claims.claims, claims.broken, claims.median(), open)
	if 1000*claims.broken > claims.claims {
		t.Errorf("%d of %d estimates are below the true error, more than 1 in 1000", claims.broken, claims.claims)
	}
	if m := claims.median(); m > 100 && claims.claims >= 100 {
		t.Errorf("median overestimate %.3g, want at most 100", m)
	}
	return claims
}

// TestReference walks the whole path from body to field for every reference body that has a closed form: the accuracy contract
// is 1e-12.
func TestReference(t *testing.T) {
	compareAll(t, 1e-12, 1, func(c *refcase.Case) bool { q, _ := integratedCase(c); return !q }, "dev.json", "hard.json", "more.json")
}

// TestIntegratedReference does the same for bodies with one quadrature; the contract is 1e-10.
func TestIntegratedReference(t *testing.T) {
	step := 1
	if testing.Short() {
		step = 5
	}
	compareAll(t, 1e-10, step, func(c *refcase.Case) bool { q, patches := integratedCase(c); return q && !patches },
		"dev.json", "hard.json", "more.json")
}

// TestPatchReference does the same for bodies that are integrated over faces and cells, which takes milliseconds to a second a
// point: a sample of bodies and points.
func TestPatchReference(t *testing.T) {
	if testing.Short() {
		t.Skip("takes seconds; run without -short")
	}
	bodies := []string{"more-box-radial_s2", "more-box-radial_unit"}
	compareAll(t, 1e-10, 11, func(c *refcase.Case) bool {
		_, patches := integratedCase(c)
		return patches && slices.Contains(bodies, c.ID)
	}, "more.json")
}

func frobenius(g [6]float64) float64 {
	return math.Sqrt(g[0]*g[0] + g[1]*g[1] + g[2]*g[2] + 2*(g[3]*g[3]+g[4]*g[4]+g[5]*g[5]))
}
