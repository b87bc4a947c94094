package closedform_test

import (
	"encoding/json"
	"math"
	"os"
	"strconv"
	"strings"
	"testing"

	"example.com/boundpole/field/closedform"
	"gonum.org/v1/gonum/spatial/r3"
)

const mu0 = 1.25663706127e-6 // CODATA 2022

// tableTolerance: the functions claim 1e-14 or better here and the table has 25 digits.
const tableTolerance = 2e-14

type tableEntry struct {
	ID         string
	Recomputed json.RawMessage
}

// values flattens the recomputed value: a string, a list, or an object by the given keys.
func (e tableEntry) values(t *testing.T, keys ...string) []float64 {
	t.Helper()
	var text []string
	var one string
	object := map[string]string{}
	switch {
	case json.Unmarshal(e.Recomputed, &one) == nil:
		text = []string{one}
	case json.Unmarshal(e.Recomputed, &text) == nil:
	case json.Unmarshal(e.Recomputed, &object) == nil:
		for _, k := range keys {
			text = append(text, object[k])
		}
	}
	var out []float64
	for _, s := range text {
		v, err := strconv.ParseFloat(s, 64)
		if err != nil {
			t.Fatalf("%s: %v", e.ID, err)
		}
		out = append(out, v)
	}
	return out
}

// ratios reads the numbers at the end of an entry name.
func ratios(t *testing.T, id, prefix string) []float64 {
	t.Helper()
	var out []float64
	for _, s := range strings.Split(strings.TrimPrefix(id, prefix), "-") {
		v, err := strconv.ParseFloat(s, 64)
		if err != nil {
			t.Fatalf("%s: %v", id, err)
		}
		out = append(out, v)
	}
	return out
}

func vec(v r3.Vec) []float64 { return []float64{v.X, v.Y, v.Z} }

// numbered are the families whose names carry their arguments.
var numbered = map[string]func(a []float64) []float64{
	"prolate-": func(a []float64) []float64 {
		long, _ := closedform.ProlateFactors(a[0])
		return []float64{long}
	},
	"oblate-": func(a []float64) []float64 {
		long, _ := closedform.OblateFactors(a[0])
		return []float64{long}
	},
	"ellipsoid-": func(a []float64) []float64 {
		return vec(closedform.EllipsoidFactors(r3.Vec{X: a[0], Y: a[1], Z: a[2]}))
	},
	"prism-": func(a []float64) []float64 {
		return []float64{closedform.BoxMagnetometricFactor(r3.Vec{X: a[0], Y: a[1], Z: a[2]})}
	},
	"cylinder-Nm-":            func(a []float64) []float64 { return []float64{closedform.CylinderMagnetometricFactor(0.5, a[0])} },
	"cylinder-Nf-":            func(a []float64) []float64 { return []float64{closedform.CylinderFluxmetricFactor(0.5, a[0])} },
	"cylinder-Nm-transverse-": func(a []float64) []float64 { return []float64{closedform.CylinderTransverseFactor(0.5, a[0])} },
	"dielectric-sphere-":      func(a []float64) []float64 { return []float64{closedform.SpherePolarizability(a[0])} },
}

// single are the entries with arguments in their text.
func single(t *testing.T, e tableEntry) (got, want []float64) {
	f := func(v ...float64) []float64 { return v }
	want = e.values(t)
	switch e.ID {
	case "coated-sphere-10-2-0.5", "coated-sphere-1-5-0.8":
		a := ratios(t, e.ID, "coated-sphere-")
		want = e.values(t, "alpha", "core_field_over_E0")
		got = f(closedform.CoatedSpherePolarizability(a[0], a[1], a[2], 1), closedform.CoatedSphereCoreRatio(a[0], a[1], a[2], 1))
	case "ellipsoid-self-energy-1-1.5-2":
		got = f(closedform.EllipsoidSelfEnergy(r3.Vec{X: 0.3, Y: -0.7, Z: 1.1}, r3.Vec{X: 1, Y: 1.5, Z: 2}))
	case "ellipsoid-self-energy-5-1-0.2":
		got = f(closedform.EllipsoidSelfEnergy(r3.Vec{X: 1, Y: 1, Z: 1}, r3.Vec{X: 5, Y: 1, Z: 0.2}))
	case "disc-rim-potential":
		got = f(closedform.DiscRimPotential(1, 1))
	case "disc-self-energy":
		got = f(closedform.DiscSelfEnergy(1, 1))
	case "square-centre-potential":
		got = f(closedform.SquareCentrePotential(1, 1))
	case "cube-volume-potential":
		want = e.values(t, "centre_4piphi", "corner_4piphi")
		got = f(4*math.Pi*closedform.CubeCentrePotential(1, 1), 4*math.Pi*closedform.CubeCornerPotential(1, 1))
	case "cube-centre-N":
		got = f(closedform.BoxCentreFactor(r3.Vec{X: 1, Y: 1, Z: 1}))
	case "cylinder-centre-N-1-1":
		got = f(closedform.CylinderCentreFactor(0.5, 1))
	case "cylinder-centre-N-2-1":
		got = f(closedform.CylinderCentreFactor(0.5, 2))
	case "axis-field-D10-L5-z1":
		got = f(closedform.CylinderAxisInduction(1.3, 5, 5, 3.5))
	case "axis-field-D10-L5-z10":
		got = f(closedform.CylinderAxisInduction(1.3, 5, 5, 12.5))
	case "axis-field-D20-L20-z50":
		got = f(closedform.CylinderAxisInduction(1, 10, 20, 60))
	case "force-coaxial-1-2-1-2-gap0.5", "force-image-cylinder-1-2-d0.25":
		got = f(closedform.CoaxialCylinderForce(1, 1, 1, 2, 2, 0.5))
	case "force-coaxial-1-1-1-1-gap0.01":
		got = f(closedform.CoaxialCylinderForce(1, 1, 1, 1, 1, 0.01))
	case "force-image-cylinder-1-1-d1":
		got = f(closedform.CoaxialCylinderForce(1, 1, 1, 1, 1, 2))
	case "force-image-dipole-0", "force-image-dipole-45", "force-image-dipole-90":
		a := ratios(t, e.ID, "force-image-dipole-")
		got = f(closedform.ImageDipoleForce(1, 1, 1, a[0]*math.Pi/180))
	case "dipole-torque":
		got = vec(closedform.FieldTorque(r3.Vec{X: 1, Y: 2, Z: 3}, r3.Vec{X: 0.1, Y: -0.2, Z: 0.3}))
	case "dipole-dipole-axial":
		got = f(closedform.DipoleForce(r3.Vec{Z: 1}, r3.Vec{Z: 1}, r3.Vec{Z: 1}).Z)
	case "air-transport-0.418", "air-transport-0.159":
		a := ratios(t, e.ID, "air-transport-")
		m := e.values(t, "axial_dipole_moment_reaching_it_A_m2")
		want = f(map[float64]float64{0.418: 4.6, 0.159: 2.1}[a[0]]) // m, the distance in the text of the entry
		got = f(closedform.DipoleAxialDistance(m[0], a[0]))
	case "fluxtube-biot-savart-0_0_0-a0.5":
		want = list(t, e, "A_from_charges")
		got = f(0, 0, closedform.CylinderAxisInduction(1, 0.5, 4, 0))
	}
	return got, want
}

// list reads a list inside an object.
func list(t *testing.T, e tableEntry, key string) []float64 {
	t.Helper()
	var object map[string]json.RawMessage
	if err := json.Unmarshal(e.Recomputed, &object); err != nil {
		t.Fatalf("%s: %v", e.ID, err)
	}
	return tableEntry{ID: e.ID, Recomputed: object[key]}.values(t)
}

func TestTables(t *testing.T) {
	data, err := os.ReadFile("testdata/tables.json")
	if err != nil {
		t.Fatal(err)
	}
	var table struct{ Entries []tableEntry }
	if err := json.Unmarshal(data, &table); err != nil {
		t.Fatal(err)
	}
	if len(table.Entries) < 80 {
		t.Fatalf("%d entries, want at least 80", len(table.Entries))
	}
	for _, e := range table.Entries {
		got, want := single(t, e)
		if got == nil {
			prefix := ""
			for p := range numbered {
				if strings.HasPrefix(e.ID, p) && len(p) > len(prefix) {
					prefix = p
				}
			}
			if prefix == "" {
				t.Errorf("%s: no function answers", e.ID)
				continue
			}
			got, want = numbered[prefix](ratios(t, e.ID, prefix)), e.values(t)
		}
		if d := relative(got, want); !(d <= tableTolerance) {
			t.Errorf("%s: got %v, want %v, relative error %.2g > %g", e.ID, got, want, d, tableTolerance)
		}
	}
}

// TestWorkedExamples holds the functions to hand values of the trade, each to half a unit
// of its last printed digit.
func TestWorkedExamples(t *testing.T) {
	const eps0 = 8.8541878188e-12 // CODATA 2022
	first := func(a, _ float64) float64 { return a }
	second := func(_, b float64) float64 { return b }
	disc := func(z float64) float64 { return 1300 * closedform.CylinderAxisInduction(1, 4, 3, z+1.5) } // mT, mm
	ring := func(z float64) float64 { return 400 * closedform.RadialTubeAxisField(1, 10, 20, 8, z) }
	pull := func(gap float64) float64 {
		p := 1.3 / mu0
		return -mu0 * closedform.CoaxialCylinderForce(p, p, 5e-3, 5e-3, 5e-3, gap)
	}
	latch := func(gap float64) float64 { // the plate at d acts like the twin at 2 d
		p := 1.3 / mu0
		return -mu0 * closedform.CoaxialCylinderForce(p, p, 6e-3, 4e-3, 4e-3, 2*gap)
	}
	cubeSide := r3.Vec{X: 0.05, Y: 0.05, Z: 0.05}
	volume := cubeSide.X * cubeSide.Y * cubeSide.Z
	for _, c := range []struct {
		name      string
		got, want float64
		half      float64 // half a unit of the last printed digit
	}{
		{"sensor disc at 2.5 mm, mT", disc(2.5), 181.179, 5e-4},
		{"sensor disc at 2.2 mm, mT", disc(2.2), 201.958, 5e-4},
		{"sensor disc at 2.8 mm, mT", disc(2.8), 162.338, 5e-4},
		{"sensor disc magnetometric factor", closedform.CylinderMagnetometricFactor(4, 3), 0.54340, 5e-6},
		{"sensor disc centre factor", closedform.CylinderCentreFactor(4, 3), 0.64888, 5e-6},
		{"sensor disc load line", closedform.PermeanceCoefficient(closedform.CylinderMagnetometricFactor(4, 3)), 0.8403, 5e-5},
		{"sensor disc working B, T", first(closedform.OperatingPoint(1.3, closedform.CylinderMagnetometricFactor(4, 3), 1.05)), 0.5779, 5e-5},
		{"sensor disc working H, kA/m", second(closedform.OperatingPoint(1.3/mu0/1e3, closedform.CylinderMagnetometricFactor(4, 3), 1.05)), -547.3, 0.05},
		{"L = D load line", closedform.PermeanceCoefficient(closedform.CylinderMagnetometricFactor(0.5, 1)), 2.209, 5e-4},
		{"radial ring at 6 mm, mT", ring(6), -59.277, 5e-4},
		{"radial ring at 10 mm, mT", ring(10), -56.523, 5e-4},
		{"radial ring at 14 mm, mT", ring(14), -41.027, 5e-4},
		{"radial ring at 20 mm, mT", ring(20), -21.825, 5e-4},
		{"radial bead inside, MV/m", closedform.CentralPowerField(0.2, 1, 1e-3, 1e-3*(1-0x1p-52)) / eps0 / 1e6, -22.588, 5e-4},
		{"radial bead sigma only at 2 mm, MV/m", closedform.ChargedShellField(2e-4, 1e-3, 2e-3) / eps0 / 1e6, 5.647, 5e-4},
		{"graded film, V", closedform.AxialPowerSlabVoltage(0.065/28e-6, 1, 0, 28e-6) / eps0 / 12, 8564.7, 0.05},
		{"graded film, C/m3", closedform.AxialPowerDensity(0.065/28e-6, 1, 14e-6), -2321.43, 5e-3},
		{"D10x5 pair at 1 mm, N", pull(1e-3), 19.00, 5e-3},
		{"D10x5 pair at 5 mm, N", pull(5e-3), 4.921, 5e-4},
		{"D10x5 pair at 20 mm, N", pull(20e-3), 0.22239, 5e-6},
		{"D10x5 pair at 60 mm, N", pull(60e-3), 5.4392e-3, 5e-8},
		{"D10x5 pair near contact, N", pull(1e-9), 33.22, 5e-3},
		{"latch at 0.5 mm, N", latch(0.5e-3), 21.094, 5e-4},
		{"latch at 4 mm, N", latch(4e-3), 2.836, 5e-4},
		{"latch full contact, N", mu0 * closedform.ContactPull(1.3/mu0, math.Pi*36e-6), 76.05, 5e-3},
		{"50 mm cube at 120 mm, mT", 1300 * closedform.BoxAxisInduction(1, 50, 50, 50, 95), 14.872, 5e-4},
		{"50 mm cube, 0.5 mT distance, m", closedform.DipoleAxialDistance(1.3/mu0*volume, 5e-4/mu0), 0.373, 5e-4},
		{"cuboid 20x10x5 along 5", closedform.BoxMagnetometricFactor(r3.Vec{X: 20, Y: 10, Z: 5}), 0.56294, 5e-6},
		{"cuboid 20x10x5 along 20", closedform.BoxMagnetometricFactor(r3.Vec{X: 10, Y: 5, Z: 20}), 0.14314, 5e-6},
		{"cuboid 20x10x5 along 10", closedform.BoxMagnetometricFactor(r3.Vec{X: 5, Y: 20, Z: 10}), 0.29392, 5e-6},
		{"shield mu 20000, 50/51 mm", 1 / closedform.SphericalShieldRatio(20000, 50, 51), 257.3, 0.05},
		{"Halbach 20/45 mm, T", closedform.HalbachField(1.3, 20, 45), 1.05421, 5e-6},
		{"Halbach 20/45/120 mm, T", closedform.HalbachCentreField(1.3, 20, 45, 120), 1.03243, 5e-6},
		{"Halbach 12 sectors", closedform.HalbachSegmentFactor(12), 0.95493, 5e-6},
		{"Halbach array 40/10 mm at 5 mm, 4 blocks, T", closedform.HalbachArrayField(1.3, 40, 10, 5) * math.Sin(math.Pi/4) / (math.Pi / 4), 0.4227, 5e-5},
		{"quadrupole 10/30 mm, T/m", 1e3 * closedform.HalbachQuadrupoleGradient(1.18, 10, 30) * 0.93741, 147.49, 1e-2}, // the factor itself has 5 digits
		{"electret 12.5 um, V", closedform.ElectretPotential(0.3e-3, 12.5e-6, 2.1) / eps0, 201.68, 5e-3},
		{"electret gap 20 um, MV/m", closedform.ElectretGapField(0.3e-3, 12.5e-6, 2.1, 20e-6) / eps0 / 1e6, 7.7712, 5e-5},
		{"dielectric sphere eps 3", closedform.SphereInnerRatio(3), 0.6, 1e-15},
	} {
		if d := math.Abs(c.got - c.want); !(d <= c.half) {
			t.Errorf("%s: got %.8g, want %.8g +- %g", c.name, c.got, c.want, c.half)
		}
	}
}
