package bound_test

import (
	"maps"
	"math"
	"os"
	"slices"
	"sort"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/element"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
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
	case "tube_sector":
		body = geom.Arc{Inner: b.R1, Outer: b.R2, Height: 2 * b.HalfLen, From: b.Phi1, To: b.Phi2}
	case "truncated_cone":
		body = geom.Cone{Bottom: b.Bottom, Top: b.Top, Height: 2 * b.HalfLen}
	case "torus":
		body = geom.Torus{Major: b.Major, Minor: b.Minor}
	default:
		return nil, p, false
	}
	power := func(p field.Polarization) (geom.Body, field.Polarization, bool) { return geom.At(body, pose), p, true }
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
		p.Value = pose.VectorToLocal(affineAt(q.P0, g, pose.Origin()))
		m := pose.Matrix()
		for i := range 9 {
			for j := range 9 {
				p.Gradient[i/3][i%3] += m[j/3][i/3] * g[j/3][j%3] * m[j%3][i%3]
			}
		}
	case "ball_r":
		return power(field.CentralPower{Coefficient: q.C, Power: 1})
	case "ball_r2":
		return power(field.CentralPower{Coefficient: q.C, Power: 2})
	case "central_power":
		return power(field.CentralPower{Coefficient: q.C, Power: q.N})
	case "radial_unit":
		return power(field.RadialPower{Coefficient: q.C})
	case "radial_s":
		return power(field.RadialPower{Coefficient: q.C, Power: 1})
	case "radial_s2":
		return power(field.RadialPower{Coefficient: q.C, Power: 2})
	case "radial_power":
		return power(field.RadialPower{Coefficient: q.C, Power: q.N})
	case "axial_z2":
		return power(field.AxialPower{Coefficient: q.C, Power: 2})
	case "axial_power":
		return power(field.AxialPower{Coefficient: q.C, Power: int(q.N)})
	case "polynomial":
		var poly field.Polynomial
		for _, t := range q.Terms {
			poly = append(poly, field.Term{Component: t.Component, Coefficient: t.Coefficient, Powers: t.Powers})
		}
		if !pose.Turned() && pose.Origin().Value() == (r3.Vec{}) {
			return power(poly)
		}
		return power(composed(poly, pose)) // the powers are global
	default:
		return nil, p, false
	}
	return geom.At(body, pose), p, true
}

// composed returns a polynomial of the outer frame as seen in that of a pose.
func composed(p field.Polynomial, pose geom.Pose) field.Polynomial {
	m, o := pose.Matrix(), pose.Origin().Value()
	linear := [3]map[[3]int]float64{}
	for i, c := range [3]float64{o.X, o.Y, o.Z} {
		linear[i] = map[[3]int]float64{{}: c, {1, 0, 0}: m[i][0], {0, 1, 0}: m[i][1], {0, 0, 1}: m[i][2]}
	}
	var all [3]map[[3]int]float64
	for i := range all {
		all[i] = map[[3]int]float64{}
	}
	for _, t := range p {
		f := map[[3]int]float64{{}: t.Coefficient}
		for i, n := range t.Powers {
			for range n {
				next := map[[3]int]float64{}
				for a, u := range f {
					for b, v := range linear[i] {
						next[[3]int{a[0] + b[0], a[1] + b[1], a[2] + b[2]}] += u * v
					}
				}
				f = next
			}
		}
		for powers, v := range f {
			for i := range 3 { // components turn back
				all[i][powers] += m[t.Component][i] * v
			}
		}
	}
	var q field.Polynomial
	for i := range all {
		for _, powers := range slices.SortedFunc(maps.Keys(all[i]), func(a, b [3]int) int { return slices.Compare(a[:], b[:]) }) {
			if c := all[i][powers]; c != 0 {
				q = append(q, field.Term{Component: i, Coefficient: c, Powers: powers})
			}
		}
	}
	return q
}

// affineAt returns p0 + g x, with the sum taken in pairs: far from the origin its terms cancel.
func affineAt(p0 [3]float64, g [3][3]float64, x pair.Vec) r3.Vec {
	var v [3]float64
	for i := range v {
		sum := pair.Of(p0[i])
		for j, c := range [3]pair.Float{x.X, x.Y, x.Z} {
			sum = sum.Add(c.Scale(g[i][j]))
		}
		v[i] = sum.Value()
	}
	return r3.Vec{X: v[0], Y: v[1], Z: v[2]}
}

// integratedCase reports whether a case needs a quadrature, and whether that is over faces and cells.
func integratedCase(c *refcase.Case) (quadrature, patches bool) {
	kind := c.Polarization.Kind
	switch c.Body.Type {
	case "box": // polynomials are exact: integers come as their own kinds
		patches = kind == "radial_s2" || kind == "radial_unit" || kind == "ball_r2"
		quadrature = kind != "uniform" && kind != "affine" && !patches
	case "ellipsoid":
		patches = kind == "affine"
	case "tube_sector", "truncated_cone", "torus":
		quadrature = true
	case "disc", "annulus":
		quadrature = true
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

// referenceSource returns the source of a case, nil for what is not computed here.
func referenceSource(t *testing.T, c *refcase.Case) (field.Source, error) {
	t.Helper()
	if b := &c.Body; b.Type == "disc" || b.Type == "annulus" {
		pose, err := c.Pose()
		if err != nil {
			t.Fatal(err)
		}
		gradient := refcase.Vec(c.Polarization.B)
		sum := pair.VecOf(gradient).Dot(pair.VecOf(refcase.Vec(b.Centre))) // far from the origin the terms cancel
		density := sum.AddFloat(c.Polarization.A).Value()
		var src field.Source
		if gradient = pose.VectorToLocal(gradient); b.Type == "disc" {
			src, err = element.NewLinearDisc(geom.Disc{Radius: b.Radius}, density, gradient)
		} else {
			src, err = element.NewLinearAnnulus(geom.Annulus{Inner: b.R1, Outer: b.R2}, density, gradient)
		}
		return field.Posed{Source: src, Pose: pose}, err
	}
	body, p, ok := referenceBody(t, c)
	if !ok {
		return nil, nil
	}
	return bound.Of(body, p)
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
			if !want(c) {
				continue
			}
			src, err := referenceSource(t, c)
			if err != nil {
				t.Errorf("%s: %v", c.ID, err)
				continue
			}
			if src == nil {
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
	bodies := []string{"more-box-radial_s2", "more-box-radial_unit", "more-ellipsoid-affine-oblate"}
	compareAll(t, 1e-10, 11, func(c *refcase.Case) bool {
		_, patches := integratedCase(c)
		return patches && slices.Contains(bodies, c.ID)
	}, "more.json")
}

func frobenius(g [6]float64) float64 {
	return math.Sqrt(g[0]*g[0] + g[1]*g[1] + g[2]*g[2] + 2*(g[3]*g[3]+g[4]*g[4]+g[5]*g[5]))
}
