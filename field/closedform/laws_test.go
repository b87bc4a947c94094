package closedform_test

import (
	"math"
	"reflect"
	"regexp"
	"strings"
	"testing"

	"example.com/boundpole/field/closedform"
	"gonum.org/v1/gonum/spatial/r3"
)

// u is the unit of rounding.
const u = 0x1p-53

// headings of a doc comment, in order.
var headings = []string{"\nUnits: ", "\nFrame: ", "\nDomain: ", "\nSingular: ", "\nAccuracy: ", "\nSource: "}

func TestDoc(t *testing.T) {
	funcs, pkg := docs(t)
	if len(funcs) < 45 {
		t.Errorf("%d functions, want at least 45", len(funcs))
	}
	key := regexp.MustCompile(`\[(Own|DLMF|[A-Z][a-z]+\d{4})\]`)
	cited := map[string]bool{}
	for name, doc := range funcs {
		if catalogue[name] == nil {
			t.Errorf("%s: not in the catalogue of the tests", name)
		}
		at := 0
		for _, h := range headings {
			i := strings.Index(doc, h)
			if i < at {
				t.Errorf("%s: heading %q is missing or out of order", name, strings.TrimSpace(h))
			}
			at = i
		}
		if !strings.HasPrefix(doc, name+" returns ") {
			t.Errorf("%s: comment does not begin with %q", name, name+" returns")
		}
		source := doc[strings.LastIndex(doc, "\nSource: ")+1:]
		if strings.Contains(source, "dlmf.nist.gov") {
			cited["[DLMF]"] = true
		}
		keys := key.FindAllString(source, -1)
		if len(keys) == 0 && !strings.Contains(source, "Coulomb") && !strings.Contains(source, "dlmf.nist.gov") {
			t.Errorf("%s: source names no reference: %s", name, source)
		}
		for _, k := range keys {
			cited[k] = true
			if !strings.Contains(pkg, "- "+k+" ") {
				t.Errorf("%s: %s is not in the references of the package", name, k)
			}
		}
	}
	for _, k := range key.FindAllString(pkg, -1) {
		if !cited[k] {
			t.Errorf("reference %s is cited by no function", k)
		}
	}
	for name := range catalogue {
		if funcs[name] == "" {
			t.Errorf("%s: listed in the tests, not exported by the package", name)
		}
	}
}

// sample holds one good list of arguments for every function, taken from the reference.
func sample(t *testing.T) map[string][]float64 {
	out := map[string][]float64{}
	for _, c := range readReference(t).Cases {
		if out[c.F] == nil {
			out[c.F] = []float64{}
			for _, v := range c.X {
				out[c.F] = append(out[c.F], number(t, v))
			}
		}
	}
	return out
}

// TestNaN puts a NaN into every argument of every function: all results are NaN.
func TestNaN(t *testing.T) {
	for name, x := range sample(t) {
		isInt := map[int]bool{}
		for i, at := 0, 0; i < reflect.TypeOf(catalogue[name]).NumIn(); i++ {
			switch reflect.TypeOf(catalogue[name]).In(i) {
			case reflect.TypeFor[r3.Vec]():
				at += 3
			case reflect.TypeFor[int]():
				isInt[at] = true
				at++
			default:
				at++
			}
		}
		for i := range x {
			if isInt[i] {
				continue
			}
			bad := append([]float64(nil), x...)
			bad[i] = math.NaN()
			for _, y := range call(t, name, bad) {
				if !math.IsNaN(y) {
					t.Errorf("%s%v = %v, want NaN", name, bad, y)
				}
			}
		}
	}
}

// TestDomain puts one argument out of its domain.
func TestDomain(t *testing.T) {
	for _, c := range []struct {
		name string
		args []float64
	}{
		{"PointPotential", []float64{1, 0, 0, 0}},
		{"PointField", []float64{1, 0, 0, 0}},
		{"PointGradient", []float64{1, 0, 0, 0}},
		{"TwoPolePotential", []float64{1, 2, 0, 0, 1}},
		{"TwoPoleField", []float64{1, -2, 0, 0, 3}},
		{"DipoleField", []float64{1, 0, 0, 0, 0, 0}},
		{"DipoleForce", []float64{1, 0, 0, 1, 0, 0, 0, 0, 0}},
		{"SphereField", []float64{1, 0, 0, 0, 1, 1, 1}},
		{"HollowSphereField", []float64{1, 0, 0, 2, 1, 1, 1, 1}},
		{"ChargedShellField", []float64{1, 1, -1}},
		{"CentralPowerField", []float64{1, -2, 1, 0.5}},
		{"CentralPowerField", []float64{1, 0, 1, 0}},
		{"CentralPowerPotential", []float64{1, -1, 1, 0}},
		{"RadialPowerField", []float64{1, -1, 1, 0.5}},
		{"RadialPowerCharge", []float64{1, -1, 0, 1, 1}},
		{"AxialPowerCharge", []float64{1, -1, 0, 1, 1}},
		{"AxialPowerCharge", []float64{1, 1, 1, 0, 1}},
		{"AnnulusAxisField", []float64{1, 2, 1, 0.5}},
		{"DiscPairForce", []float64{1, 1, 1, 0}},
		{"RadialTubeAxisField", []float64{1, 0, 1, 1, 1}},
		{"SegmentPotential", []float64{1, 2, 0, 0.5}},
		{"SlantedEnd", []float64{1, 1, math.Pi / 2}},
		{"PermeanceCoefficient", []float64{0}},
		{"OperatingPoint", []float64{1, 1.5, 1}},
		{"EllipsoidFactors", []float64{1, 1, 0}},
		{"EllipsoidAxisField", []float64{1, 1, 1, 1, 0.5}},
		{"ProlateFactors", []float64{0.5}},
		{"OblateFactors", []float64{0.5}},
		{"BoxMagnetometricFactor", []float64{1, -1, 1}},
		{"BoxAxisInduction", []float64{1, 1, 1, 1, -0.5}},
		{"ImageFactor", []float64{-1}},
		{"ImageChargeForce", []float64{1, 2, 1}},
		{"ImageDipoleForce", []float64{1, 1, 0, 0}},
		{"EllipsoidPolarizability", []float64{0, math.Inf(1)}},
		{"EllipsoidPolarizability", []float64{1, 0}},
		{"CoatedSpherePolarizability", []float64{0, 0, 1, 2}},
		{"SphericalShieldRatio", []float64{1, 2, 1}},
		{"HalbachSegmentFactor", []float64{2}},
	} {
		for _, y := range call(t, c.name, c.args) {
			if !math.IsNaN(y) {
				t.Errorf("%s%v = %v, want NaN", c.name, c.args, y)
			}
		}
	}
}

// TestFaces checks the mean on charged faces, exact zeros and both-sided limits.
func TestFaces(t *testing.T) {
	p := r3.Vec{X: 1, Y: -2, Z: 3}
	for _, c := range []struct {
		name            string
		args            []float64 // on the face
		at              int       // argument that is moved across it
		below, onto, up []float64
	}{
		{"ChargedShellField", []float64{2, 1, 1}, 2, []float64{0}, []float64{1}, []float64{2}},
		{"CentralPowerField", []float64{2, 1, 1, 1}, 3, []float64{-2}, []float64{-1}, []float64{0}},
		{"RadialPowerField", []float64{2, 3, 1, 1}, 3, []float64{-2}, []float64{-1}, []float64{0}},
		{"AxialPowerSlabField", []float64{2, 2, -1, 1, 1}, 4, []float64{-2}, []float64{-1}, []float64{0}},
		{"AxialPowerSlabField", []float64{2, 2, -1, 1, -1}, 4, []float64{0}, []float64{-1}, []float64{-2}},
		{"PlaneField", []float64{2, 0}, 1, []float64{-1}, []float64{0}, []float64{1}},
		{"DiscAxisField", []float64{2, 1, 0}, 2, []float64{-1}, []float64{0}, []float64{1}},
		{"RectangleAxisField", []float64{2, 1, 1, 0}, 3, []float64{-1}, []float64{0}, []float64{1}},
		{"SlabField", []float64{p.X, p.Y, p.Z, 2, 1}, 4, []float64{0, 0, -3}, []float64{0, 0, -1.5}, []float64{0, 0, 0}},
		{"SphereField", []float64{0, 0, 3, 1, 0, 0, 1}, 6, []float64{0, 0, -1}, []float64{0, 0, 0.5}, []float64{0, 0, 2}},
		{"HollowSphereField", []float64{0, 0, 3, 1, 2, 0, 0, 1}, 7, []float64{0, 0, 0}, []float64{0, 0, -1.5}, []float64{0, 0, -3}},
		{"HollowSphereField", []float64{0, 0, 3, 1, 2, 0, 0, 2}, 7, []float64{0, 0, -1.25}, []float64{0, 0, 0.25}, []float64{0, 0, 1.75}},
		{"EndlessCylinderField", []float64{3, 0, 9, 1, 1, 0, 5}, 4, []float64{-1.5, 0, 0}, []float64{0, 0, 0}, []float64{1.5, 0, 0}},
		{"CylinderAxisField", []float64{1, 3, 4, 2}, 3, []float64{-0.6}, []float64{-0.1}, []float64{0.4}},
		{"CylinderAxisInduction", []float64{1, 3, 4, 2}, 3, []float64{0.4}, []float64{0.4}, []float64{0.4}},
		{"TwoDiscAxisField", []float64{1, 3, 4, 2}, 3, []float64{-0.6}, []float64{-0.1}, []float64{0.4}},
	} {
		for k, want := range [][]float64{c.below, c.onto, c.up} {
			x := append([]float64(nil), c.args...)
			x[c.at] += float64(k-1) * 0x1p-50
			if got := call(t, c.name, x); !near(got, want, 0x1p-46) { // 2^-50 off the face, field changes by a few of it
				t.Errorf("%s%v = %v, want %v", c.name, x, got, want)
			}
		}
	}
	zero := closedform.HollowSphereField(p, 1, 2, r3.Vec{X: 0.3, Y: 0.2})
	if zero != (r3.Vec{}) {
		t.Errorf("cavity of a hollow sphere: %v, want exactly 0", zero)
	}
}

func near(got, want []float64, tol float64) bool {
	for i := range want {
		if !(math.Abs(got[i]-want[i]) <= tol) {
			return false
		}
	}
	return len(got) == len(want)
}

// TestTraces: the three factors of any body sum to 1.
func TestTraces(t *testing.T) {
	sum := func(v r3.Vec) float64 { return v.X + v.Y + v.Z }
	for _, s := range []r3.Vec{{X: 1, Y: 1, Z: 1}, {X: 0.5, Y: 0.35, Z: 0.8}, {X: 20, Y: 10, Z: 5}, {X: 1, Y: 1, Z: 1e3}, {X: 1e-8, Y: 1, Z: 2}, {X: 1e-20, Y: 1e-10, Z: 1}, {X: 2e-30, Y: 1, Z: 1}} {
		cyclic := func(f func(r3.Vec) float64) float64 {
			return f(s) + f(r3.Vec{X: s.Y, Y: s.Z, Z: s.X}) + f(r3.Vec{X: s.Z, Y: s.X, Z: s.Y})
		}
		for name, got := range map[string]float64{
			"box mean":   cyclic(closedform.BoxMagnetometricFactor),
			"box centre": cyclic(closedform.BoxCentreFactor),
			"ellipsoid":  sum(closedform.EllipsoidFactors(s)),
		} {
			if !(math.Abs(got-1) <= 64*u) { // about twenty terms below 1, each a few u
				t.Errorf("%s %v: trace - 1 = %g", name, s, got-1)
			}
		}
	}
	for _, v := range []r3.Vec{closedform.SphereFactors(), closedform.EndlessCylinderFactors(), closedform.PlateFactors(), closedform.EllipticCylinderFactors(3, 7)} {
		if !(math.Abs(sum(v)-1) <= 2*u) { // three roundings
			t.Errorf("trace of %v is not 1", v)
		}
	}
	for _, L := range []float64{1e-20, 1e-3, 0.5, 1.99, 2.01, 7, 1e3, 1e20} {
		a, b := closedform.CylinderMagnetometricFactor(1, L), closedform.CylinderTransverseFactor(1, L)
		if !(math.Abs(a+2*b-1) <= 16*u) { // the two come from different branches' roundings
			t.Errorf("cylinder L = %g: trace - 1 = %g", L, a+2*b-1)
		}
	}
}

// TestLimits joins functions that must agree in a limit.
func TestLimits(t *testing.T) {
	long, short := closedform.ProlateFactors(3)
	e := closedform.EllipsoidFactors(r3.Vec{X: 1, Y: 1, Z: 3})
	long30, _ := closedform.ProlateFactors(1e29)
	e30 := closedform.EllipsoidFactors(r3.Vec{X: 1, Y: 1, Z: 1e29})
	flatLong, flatShort := closedform.OblateFactors(4)
	o := closedform.EllipsoidFactors(r3.Vec{X: 4, Y: 4, Z: 1})
	a := 2.0
	for _, c := range []struct {
		name      string
		got, want float64
		tol       float64 // relative
	}{
		{"prolate long", long, e.Z, 64 * u},      // claims of both
		{"prolate short", short, e.X, 64 * u},    // claims of both
		{"prolate 1e29", long30, e30.Z, 64 * u},  // claims of both
		{"oblate long", flatLong, o.X, 64 * u},   // claims of both
		{"oblate short", flatShort, o.Z, 64 * u}, // claims of both
		{"disc force at contact", closedform.DiscPairForce(3, 3, a, 1e-18), closedform.ContactPull(3, math.Pi*a*a), 1e-15},                                                   // d log d
		{"disc force far", closedform.DiscPairForce(3, 3, a, 1e8), math.Pow(3*math.Pi*a*a, 2) / (4 * math.Pi * 1e16), 1e-15},                                                 // next order 1e-16
		{"disc energy at contact", closedform.DiscPairEnergy(3, 3, a, 1e-18), 2 * closedform.DiscSelfEnergy(3, a), 1e-15},                                                    // d
		{"disc energy far", closedform.DiscPairEnergy(3, 3, a, 1e8), math.Pow(3*math.Pi*a*a, 2) / (4 * math.Pi * 1e8), 1e-15},                                                // next order 1e-16
		{"long rod face", closedform.FaceCentreInduction(1, 1, 1e9), 0.5, 1e-15},                                                                                             // (a/L)^2
		{"face of the axis field", closedform.FaceCentreInduction(1, a, 3), closedform.CylinderAxisInduction(1, a, 3, 1.5), 4 * u},                                           // same closed form
		{"tube as cylinder difference", closedform.TubeAxisField(1, 1, 2, 3, 4), closedform.CylinderAxisField(1, 2, 3, 4) - closedform.CylinderAxisField(1, 1, 3, 4), 1e-14}, // cancels by 3
		{"rod by poles far off", closedform.TwoPoleField(math.Pi, 3, r3.Vec{Z: 1e8}).Z, closedform.CylinderAxisField(1, 1, 3, 1e8), 1e-14},                                   // (L/z)^2
		{"long bar of a box", closedform.BoxMagnetometricFactor(r3.Vec{X: 2, Y: 3, Z: 1e18}), 2 * closedform.RectangleSelfEnergy(1, 2, 3) * 2 / 6e18, 1e-15},                 // a/L
		{"cube by box", closedform.BoxCentrePotential(2, r3.Vec{X: 3, Y: 3, Z: 3}), closedform.CubeCentrePotential(2, 3), 16 * u},                                            // claims of both
		{"square by rectangle", closedform.SquareCentrePotential(2, 3), closedform.RectangleAxisPotential(2, 3, 3, 0), 8 * u},                                                // claims of both
		{"sphere by ellipsoid axis", closedform.EllipsoidAxisField(2, r3.Vec{X: 1, Y: 1, Z: 1}, 1.5), closedform.SphereField(r3.Vec{X: 2}, 1, r3.Vec{X: 1.5}).X, 8 * u},      // claims of both
		{"coated sphere of one stuff", closedform.CoatedSpherePolarizability(3, 3, 1, 2), closedform.SpherePolarizability(3), 8 * u},                                         // same closed form
		{"shield by coated sphere", closedform.CoatedSphereCoreRatio(1, 7, 1, 2), closedform.SphericalShieldRatio(7, 1, 2), 8 * u},                                           // same system
		{"shield moment by coated sphere", closedform.CoatedSpherePolarizability(1, 7, 1, 2), closedform.SphericalShieldMoment(7, 1, 2), 8 * u},                              // same system
		{"ellipsoid of factor 1/3", closedform.EllipsoidPolarizability(1.0/3, 5), closedform.SpherePolarizability(5), 8 * u},                                                 // same closed form
		{"image dipole", closedform.ImageDipoleForce(2, 1, 0.5, 0), closedform.DipoleForce(r3.Vec{Z: 2}, r3.Vec{Z: 2}, r3.Vec{Z: 1}).Z, 8 * u},                               // twin at 2 d
		{"load line", closedform.PermeanceCoefficient(0.2), 4, 4 * u},
		{"finite Halbach tube, long", closedform.HalbachCentreField(1, 1, 2, 1e9), closedform.HalbachField(1, 1, 2), 1e-15}, // (r/L)^2
		{"segment far", closedform.SegmentPotential(2, 3, 1e9, 0), closedform.PointPotential(6, r3.Vec{X: 1e9}), 1e-15},     // (L/r)^2
	} {
		if d := math.Abs(c.got-c.want) / math.Abs(c.want); !(d <= c.tol) {
			t.Errorf("%s: got %v, want %v, relative difference %.2g > %.2g", c.name, c.got, c.want, d, c.tol)
		}
	}
}

// TestDipoleLaws: actio and reactio, balance of torque, trace and symmetry.
func TestDipoleLaws(t *testing.T) {
	m1, m2, x := r3.Vec{X: 1, Y: -2, Z: 0.5}, r3.Vec{X: 0.25, Y: 3, Z: -1}, r3.Vec{X: 2, Y: 0.5, Z: -1.5}
	back := r3.Scale(-1, x)
	f, g := closedform.DipoleForce(m1, m2, x), closedform.DipoleForce(m2, m1, back)
	scale := r3.Norm(f)
	if r3.Norm(r3.Add(f, g)) > 32*u*scale { // three products of three terms each
		t.Errorf("forces %v and %v do not cancel", f, g)
	}
	torque := r3.Add(r3.Add(closedform.DipoleTorque(m1, m2, x), closedform.DipoleTorque(m2, m1, back)), r3.Cross(x, f))
	if r3.Norm(torque) > 64*u*scale*r3.Norm(x) { // as above, once more multiplied
		t.Errorf("torques leave %v", torque)
	}
	for name, h := range map[string][3][3]float64{"dipole": closedform.DipoleGradient(m1, x), "point": closedform.PointGradient(2, x)} {
		size := math.Abs(h[0][0]) + math.Abs(h[1][1]) + math.Abs(h[2][2])
		if tr := h[0][0] + h[1][1] + h[2][2]; math.Abs(tr) > 16*u*size { // three entries of a few u
			t.Errorf("%s: trace %g", name, tr)
		}
		for i := range h {
			for j := range h {
				if h[i][j] != h[j][i] {
					t.Errorf("%s: entries %d%d and %d%d differ", name, i, j, j, i)
				}
			}
		}
	}
}

// TestNeutral: the bound charges of every power law sum to zero.
func TestNeutral(t *testing.T) {
	for _, name := range []string{"CentralPowerCharge", "RadialPowerCharge", "AxialPowerCharge"} {
		for _, c := range readReference(t).Cases {
			if c.F != name {
				continue
			}
			var x []float64
			for _, v := range c.X {
				x = append(x, number(t, v))
			}
			var sum, size float64
			for _, q := range call(t, name, x) {
				sum += q
				size += math.Abs(q)
			}
			if math.Abs(sum) > 8*u*size { // three terms of a few u
				t.Errorf("%s%v: total charge %g of %g", name, x, sum, size)
			}
		}
	}
}
