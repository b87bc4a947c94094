package magnet_test

import (
	"math"
	"strings"
	"testing"

	"example.com/boundpole/field/closedform"
	"example.com/boundpole/geom"
	"example.com/boundpole/magnet"
	"example.com/boundpole/magnet/grade"
	"gonum.org/v1/gonum/spatial/r3"
)

// TestOperatingMap: a sensor disc of 8 mm by 3 mm, 1.3 T. The volume mean, the middle and the middle of a face have hand
// values; the map tells where the worst place is.
func TestOperatingMap(t *testing.T) {
	const radius, height, br = 4e-3, 3e-3, 1.3
	part, err := magnet.WithRemanence(geom.Cylinder{Radius: radius, Height: height}, r3.Vec{Z: br})
	if err != nil {
		t.Fatal(err)
	}
	mat := grade.Material{Br: grade.Range{Typical: br}, HcJ: grade.Range{Min: 955e3}, Recoil: 1}
	got, err := magnet.Model{Parts: []magnet.Part{part}}.Operating(0, mat, 8)
	if err != nil {
		t.Fatal(err)
	}
	mean := closedform.CylinderMagnetometricFactor(radius, height) * br / magnet.Mu0
	if math.Abs(got.MeanH+mean) > 2e-3*mean { // eight points a direction and a logarithmic rim
		t.Errorf("mean H %v A/m, want %v", got.MeanH, -mean)
	}
	worst := got.Points[got.Worst]
	face := 1 - height/(2*math.Hypot(height, radius)) // N in the middle of a face, on the inside; no node is there
	if worst.N < face-1e-3 || got.Worst < got.Inner {
		t.Errorf("worst N %v at %v, want a face point with about %v", worst.N, worst.X, face)
	}
	if got.Passed != (worst.Margin < 0) || worst.Use < 0.7 {
		t.Errorf("worst use %v, margin %v, passed %v", worst.Use, worst.Margin, got.Passed)
	}
	for _, p := range got.Points {
		if math.Abs(p.B-magnet.Mu0*(p.H+p.M)) > 1e-14*br || p.Estimate > 1e-9*br/magnet.Mu0 { // roundings
			t.Fatalf("%+v", p)
		}
	}
}

// TestOperatingBesideOthers: in an opposing field the magnet works lower by it.
func TestOperatingBesideOthers(t *testing.T) {
	part, err := magnet.WithRemanence(geom.Sphere{Radius: 1}, r3.Vec{X: 1.2})
	if err != nil {
		t.Fatal(err)
	}
	mat := grade.Material{HcJ: grade.Range{Min: 955e3}, Hk: 700e3, Recoil: 1.05}
	m := magnet.Model{Parts: []magnet.Part{part}, Applied: r3.Vec{X: -0.5}}
	got, err := m.Operating(0, mat, 3)
	if err != nil {
		t.Fatal(err)
	}
	want := -(1.2/3 + 0.5) / magnet.Mu0 / (1 + 0.05/3)
	for _, p := range got.Points {
		if math.Abs(p.H-want) > 1e-12*math.Abs(want) || math.Abs(p.N-1.0/3) > 1e-13 { // a few roundings
			t.Fatalf("H %v, N %v, want %v and 1/3", p.H, p.N, want)
		}
	}
	if !got.Passed {
		t.Errorf("H %v A/m is past Hk 700 kA/m, but there is no warning", want)
	}
	for _, c := range []struct {
		i, n int
		want string
	}{{1, 3, "part 1 of 1"}, {-1, 3, "part -1"}, {0, 0, "1 to 16"}} {
		if _, err := m.Operating(c.i, mat, c.n); err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("part %d, %d points: %v, want %q", c.i, c.n, err, c.want)
		}
	}
	dipole := magnet.Model{Parts: []magnet.Part{magnet.Dipole(r3.Vec{}, r3.Vec{Z: 1})}}
	if _, err := dipole.Operating(0, mat, 2); err == nil {
		t.Error("a dipole has an operating point")
	}
}
