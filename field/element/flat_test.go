package element_test

import (
	"math"
	"os"
	"sort"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/element"
	"example.com/boundpole/geom"
	"example.com/boundpole/verify/refcase"
	"gonum.org/v1/gonum/spatial/r3"
)

// flatSource builds the source of a case with plane faces, in the outer frame; nil for other families.
func flatSource(t *testing.T, c *refcase.Case) field.Source {
	t.Helper()
	b := &c.Body
	pose, err := c.Pose()
	if err != nil {
		t.Fatal(err)
	}
	var body geom.Polyhedron
	switch b.Type {
	case "box":
		box := geom.Box{Size: r3.Scale(2, refcase.Vec(*b.Half))}
		body = box.Polyhedron()
	case "polyhedron":
		body = geom.Polyhedron{Vertices: vecs(b.Vertices), Loops: b.Faces}
	case "polygon":
		return element.NewPolygon(geom.Polygon{Vertices: vecs(b.Vertices)}, c.Polarization.A, refcase.Vec(c.Polarization.B))
	default:
		return nil
	}
	p := field.Affine{Value: refcase.Vec(c.Polarization.P)}
	if c.Polarization.Kind == "affine" {
		p = localAffine(t, c, pose)
	} else {
		p.Value = pose.VectorToLocal(p.Value)
	}
	return field.Posed{Source: element.NewPolyhedron(body, p), Pose: pose}
}

// localAffine turns the global affine polarization of a case into the frame of its body.
func localAffine(t *testing.T, c *refcase.Case, pose geom.Pose) field.Affine {
	t.Helper()
	g, err := c.Polarization.Gradient()
	if err != nil {
		t.Fatal(err)
	}
	global := field.Affine{Value: refcase.Vec(c.Polarization.P0), Gradient: g}
	p := field.Affine{Value: pose.VectorToLocal(global.At(pose.Origin().Value()))}
	m := pose.Matrix()
	for i := range 3 {
		for j := range 3 {
			for k := range 3 {
				for l := range 3 {
					p.Gradient[i][j] += m[k][i] * g[k][l] * m[l][j]
				}
			}
		}
	}
	return p
}

func vecs(a [][3]float64) []r3.Vec {
	v := make([]r3.Vec, len(a))
	for i := range a {
		v[i] = refcase.Vec(a[i])
	}
	return v
}

// TestFlatReference holds every element with plane faces against the reference, values to the contract of 1e-12 and
// estimates to being true.
func TestFlatReference(t *testing.T) {
	files := []string{"../../verify/testdata/dev.json", "../../verify/testdata/hard.json"}
	worst := map[string]float64{}
	where := map[string]string{}
	for _, file := range files {
		raw, err := os.ReadFile(file)
		if err != nil {
			t.Fatal(err)
		}
		cases, err := refcase.Parse(file, raw)
		if err != nil {
			t.Fatal(err)
		}
		for i := range cases {
			c := &cases[i]
			src := flatSource(t, c)
			if src == nil {
				continue
			}
			for k := range c.Points {
				x := refcase.Vec(c.Points[k])
				v := field.At(src, x, field.Mean, field.WantPhi|field.WantG|field.WantGrad|field.WantErr)
				m, err := c.Compare(k, v.Phi, v.G, 1e-12, frobenius(v.Grad))
				if err != nil {
					t.Fatal(err)
				}
				if v.Status == field.OnFace && c.Body.Type != "polygon" {
					continue // nearer than 4 u: the reference is of one side, the value the mean
				}
				if r := m.Ratio(); !(r <= worst[c.Tags[k]]) {
					worst[c.Tags[k]] = r
					where[c.Tags[k]] = c.ID
				}
				if !(m.Ratio() <= 1) {
					t.Errorf("%s point %d %v (%s): error phi %.3g of %.3g, g %.3g of %.3g; phi %v want %s, g %v want %v",
						c.ID, k, x, c.Tags[k], m.Phi, m.TolPhi, m.G, m.TolG, v.Phi, c.Phi[k], v.G, c.G[k])
				}
				if v.Status != field.OnFace && (m.G > v.ErrG || m.Phi > v.ErrPhi) {
					t.Errorf("%s point %d %v (%s): error phi %.3g above estimate %.3g, or g %.3g above %.3g", c.ID, k, x, c.Tags[k],
						m.Phi, v.ErrPhi, m.G, v.ErrG)
				}
			}
		}
	}
	var tags []string
	for tag := range worst {
		tags = append(tags, tag)
	}
	sort.Strings(tags)
	for _, tag := range tags {
		t.Logf("%-26s %8.2e of the tolerance (%s)", tag, worst[tag], where[tag])
	}
}

func frobenius(g [6]float64) float64 {
	return math.Sqrt(g[0]*g[0] + g[1]*g[1] + g[2]*g[2] + 2*(g[3]*g[3]+g[4]*g[4]+g[5]*g[5]))
}

// TestPolyhedronAbout: the place about which an affine polarization is given is a way of writing it.
func TestPolyhedronAbout(t *testing.T) {
	body := geom.Box{Size: r3.Vec{X: 1, Y: 2, Z: 3}}.Polyhedron()
	p := field.Affine{Value: r3.Vec{X: 1, Y: -2, Z: 0.5}, Gradient: [3][3]float64{{0.5, 1, 0}, {0, -1, 2}, {0.25, 0, 1}}, About: r3.Vec{X: 0.5, Y: -1, Z: 2}}
	q := field.Affine{Value: p.At(r3.Vec{}), Gradient: p.Gradient}
	for _, x := range []r3.Vec{{X: 0.25, Y: 0.5, Z: 1}, {X: 2, Y: 1, Z: -1}, {X: 40, Y: 3, Z: 5}} {
		got, want := element.NewPolyhedron(body, p).Field(x), element.NewPolyhedron(body, q).Field(x)
		if d := r3.Norm(r3.Sub(got, want)); d > 1e-13*r3.Norm(want) { // roundings of the densities
			t.Errorf("at %v: %v about %v, %v about the origin", x, got, p.About, want)
		}
	}
}
