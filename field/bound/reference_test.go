package bound_test

import (
	"math"
	"os"
	"sort"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"example.com/boundpole/verify/refcase"
	"gonum.org/v1/gonum/spatial/r3"
)

// referenceBody returns the placed body and its polarization of a reference case, ok false for sheets and for families that
// need integrators.
func referenceBody(t *testing.T, c *refcase.Case) (body geom.Body, pol field.Polarization, ok bool) {
	t.Helper()
	var p field.Affine
	b, q := &c.Body, &c.Polarization
	pose, err := c.Pose()
	if err != nil {
		t.Fatal(err)
	}
	switch b.Type {
	case "box":
		body = geom.Box{Size: r3.Scale(2, refcase.Vec(*b.Half))}
	case "polyhedron":
		v := make([]r3.Vec, len(b.Vertices))
		for i := range v {
			v[i] = refcase.Vec(b.Vertices[i])
		}
		body = geom.Polyhedron{Vertices: v, Loops: b.Faces}
	case "cylinder":
		body = geom.Cylinder{Radius: b.Radius, Height: 2 * b.HalfLen}
	case "tube":
		body = geom.Tube{Inner: b.R1, Outer: b.R2, Height: 2 * b.HalfLen}
	case "sphere":
		body = geom.Sphere{Radius: b.Radius}
	case "spherical_shell":
		body = geom.HollowSphere{Inner: b.R1, Outer: b.R2}
	case "ellipsoid":
		body = geom.Ellipsoid{SemiAxes: refcase.Vec(*b.SemiAxes)}
	default:
		return nil, p, false
	}
	switch q.Kind {
	case "uniform":
		p.Value = pose.VectorToLocal(refcase.Vec(q.P))
	case "axial_z":
		p.Gradient[2][2] = q.C
	case "affine":
		g, err := q.Gradient()
		if err != nil {
			t.Fatal(err)
		}
		global := field.Affine{Value: refcase.Vec(q.P0), Gradient: g}
		p.Value = pose.VectorToLocal(global.At(pose.Origin().Value()))
		m := pose.Matrix()
		for i := range 9 {
			for j := range 9 {
				p.Gradient[i/3][i%3] += m[j/3][i/3] * g[j/3][j%3] * m[j%3][i%3]
			}
		}
	case "ball_r":
		return geom.At(body, pose), field.CentralPower{Coefficient: q.C, Power: 1}, true
	case "ball_r2":
		return geom.At(body, pose), field.CentralPower{Coefficient: q.C, Power: 2}, true
	default:
		return nil, p, false
	}
	return geom.At(body, pose), p, true
}

// TestReference walks the whole path from body to field for every reference body: the accuracy contract is 1e-12.
func TestReference(t *testing.T) {
	files := []string{"../../verify/testdata/dev.json", "../../verify/testdata/hard.json"}
	worst, where := map[string]float64{}, map[string]string{}
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
			body, p, ok := referenceBody(t, c)
			if !ok {
				continue
			}
			src, err := bound.Of(body, p)
			if err != nil {
				t.Errorf("%s: %v", c.ID, err)
				continue
			}
			for k := range c.Points {
				x := refcase.Vec(c.Points[k])
				v := field.At(src, x, field.Mean, field.WantPhi|field.WantG|field.WantGrad|field.WantErr)
				m, err := c.Compare(k, v.Phi, v.G, 1e-12, frobenius(v.Grad))
				if err != nil {
					t.Fatal(err)
				}
				key := c.Body.Type + " " + c.Tags[k]
				if v.Status == field.OnFace { // nearer than 4 u: the reference is of one side, the value the mean
					continue
				}
				if r := m.Ratio(); !(r <= worst[key]) {
					worst[key], where[key] = r, c.ID
				}
				if !(m.Ratio() <= 1) {
					t.Errorf("%s point %d %v (%s): error phi %.3g of %.3g, g %.3g of %.3g; phi %v want %.18s, g %v want %.19s",
						c.ID, k, x, c.Tags[k], m.Phi, m.TolPhi, m.G, m.TolG, v.Phi, c.Phi[k], v.G, c.G[k])
				} else if m.G > v.ErrG || m.Phi > v.ErrPhi {
					t.Errorf("%s point %d %v (%s): error phi %.3g above estimate %.3g, or g %.3g above %.3g", c.ID, k, x, c.Tags[k],
						m.Phi, v.ErrPhi, m.G, v.ErrG)
				}
			}
		}
	}
	var keys []string
	for key := range worst {
		if worst[key] > 0.1 {
			keys = append(keys, key)
		}
	}
	sort.Strings(keys)
	for _, key := range keys {
		t.Logf("%-48s %8.2e of the tolerance (%s)", key, worst[key], where[key])
	}
}

func frobenius(g [6]float64) float64 {
	return math.Sqrt(g[0]*g[0] + g[1]*g[1] + g[2]*g[2] + 2*(g[3]*g[3]+g[4]*g[4]+g[5]*g[5]))
}
