package bound_test

import (
	"encoding/json"
	"errors"
	"math"
	"os"
	"path/filepath"
	"sort"
	"strings"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/element"
	"example.com/boundpole/geom"
	"example.com/boundpole/verify/refcase"
	"example.com/boundpole/verify/refsource"
	"gonum.org/v1/gonum/spatial/r3"
)

// slopes is the file of gradients: points of reference cases, and points and dipoles.
type slopes struct {
	Cases   []slopesRow
	Singles []struct {
		Kind         string
		At, M, Point [3]float64
		Q            float64
		Gradient     [6]string
	}
}

// slopesRow holds gradients at points of a reference case.
type slopesRow struct {
	File, ID    string
	Size, Scale float64 // greatest extent; greatest |p|, of sheets |sigma|
	Index       []int
	Gradient    [][6]string
}

// gradientTally is what came out for a family.
type gradientTally struct {
	points, moot, open, mute int  // compared; too near to a face for a gradient; said to be worse; without a claim
	patches                  bool // integrated over faces and cells: the bar is not held where the estimate is above it
	worst                    float64
	where                    string
	claims                   tally
}

// gradientCheck collects comparisons by family.
type gradientCheck struct {
	t        *testing.T
	families map[string]*gradientTally
	all      gradientTally
}

// of returns the tally of a family.
func (g *gradientCheck) of(family string) *gradientTally {
	if g.families[family] == nil {
		g.families[family] = new(gradientTally)
	}
	return g.families[family]
}

// compare holds one gradient against the reference: |error| <= 1e-9 max(|grad g|, floor), and the trace against rho.
func (g *gradientCheck) compare(y *gradientTally, id string, x r3.Vec, v *field.Value, want [6]string, floor, rho float64) {
	if v.Status == field.OnFace {
		y.moot++
		return
	}
	var d, ref [6]float64
	for k := range d {
		d[k], ref[k] = refcase.Difference(v.Grad[k], want[k]), -refcase.Difference(0, want[k])
	}
	err, norm := frobenius(d), frobenius(ref)
	size := max(norm, floor)
	g.claim(y, id, x, err, v.ErrGrad, norm)
	y.points++
	g.all.points++
	if y.patches && (v.Status == field.NotConverged || v.ErrGrad > 1e-9*size) {
		y.open++
		return
	}
	if !(err <= y.worst*size) {
		y.worst, y.where = err/size, id
	}
	if !(err <= 1e-9*size) {
		g.t.Errorf("%s %v: gradient off by %.3g of %.3g, claim %.3g: %v want %v", id, x, err, size, v.ErrGrad, v.Grad, want)
	}
	if trace := v.Grad[0] + v.Grad[1] + v.Grad[2] - rho; !(math.Abs(trace) <= 2e-9*size) { // a trace is at most sqrt 3 of the norm
		g.t.Errorf("%s %v: trace - rho = %.3g, size %.3g", id, x, trace, size)
	}
}

// claim counts an estimate, where one is made.
func (g *gradientCheck) claim(y *gradientTally, id string, x r3.Vec, err, claim, norm float64) {
	if math.IsInf(claim, 1) {
		y.mute++
		g.all.mute++
		return
	}
	y.claims.see(err, claim, norm)
	g.all.claims.see(err, claim, norm)
	if !(err <= claim) {
		g.t.Logf("%s %v: error %.3g, claim %.3g of %.3g", id, x, err, claim, norm)
	}
}

// report logs the families, the worst last.
func (g *gradientCheck) report() {
	var names []string
	for name, y := range g.families {
		if y.claims.claims > 0 {
			names = append(names, name)
		}
	}
	sort.Slice(names, func(i, j int) bool { return g.families[names[i]].worst < g.families[names[j]].worst })
	for _, name := range names {
		y := g.families[name]
		g.t.Logf("%-28s %3d points, worst %8.2e (%s), %d broken, median overestimate %.3g, %d on a face, %d said to be worse, %d without claim",
			name, y.points, y.worst, y.where, y.claims.broken, y.claims.median(), y.moot, y.open, y.mute)
	}
	c := &g.all.claims
	g.t.Logf("%d points, %d claims, %d broken, median overestimate %.3g", g.all.points, c.claims, c.broken, c.median())
	if 1000*c.broken > c.claims {
		g.t.Errorf("%d of %d estimates are below the true error, more than 1 in 1000", c.broken, c.claims)
	}
	if m := c.median(); m > 100 {
		g.t.Errorf("median overestimate %.3g, want at most 100", m)
	}
	if 10*g.all.mute > g.all.points {
		g.t.Errorf("%d of %d points without a claim", g.all.mute, g.all.points)
	}
}

// TestGradientReference holds the gradient of g against differences of the field in 80 digits and more
// (verify/testdata/gradient), at points of every family with weight on edges, rims, tips and faces at 1e-12 to 1e-3 sizes:
// |error| <= 1e-9 max(|grad g|, 1e-3 p/size min(1, (size/R)^4)), trace = rho, estimates true in 99.9 % of cases. Of bodies that are
// integrated over faces and cells a sample, and the first only where the estimate says so.
func TestGradientReference(t *testing.T) {
	data := readSlopes(t, "gradient/gradient.json")
	g := &gradientCheck{t: t, families: map[string]*gradientTally{}}
	for _, s := range data.Singles {
		var src field.Source = element.Point{At: refcase.Vec(s.At), Charge: s.Q}
		if s.Kind == "dipole" {
			src = element.Dipole{At: refcase.Vec(s.At), Moment: refcase.Vec(s.M)}
		}
		x := refcase.Vec(s.Point)
		v := field.At(src, x, field.Mean, field.WantGrad|field.WantErr)
		g.compare(g.of(s.Kind), s.Kind, x, &v, s.Gradient, 0, 0)
	}
	files, patched := map[string]map[string]*refcase.Case{}, 0
	for i := range data.Cases {
		row := &data.Cases[i]
		if files[row.File] == nil {
			files[row.File] = casesOf(t, row.File)
		}
		c := files[row.File][row.ID]
		if c == nil {
			t.Fatalf("%s holds no case %s", row.File, row.ID)
		}
		if _, patches := integratedCase(c); patches { // seconds a point: a sample
			if patched++; testing.Short() || patched%6 != 0 {
				continue
			}
			row.Index = row.Index[:1]
		}
		g.row(c, row)
	}
	g.report()
	if least := 600; g.all.points < least && !testing.Short() {
		t.Errorf("%d points, want %d", g.all.points, least)
	}
}

// row compares the points of a case.
func (g *gradientCheck) row(c *refcase.Case, row *slopesRow) {
	centre, _, err := c.Ball()
	if err != nil {
		g.t.Fatal(err)
	}
	family, src, rho := gradientSource(g.t, c)
	if src == nil {
		return // a body that is refused, such as a box with infinite charge on its axis
	}
	y := g.of(family)
	_, y.patches = integratedCase(c)
	for k, i := range row.Index {
		x := refcase.Vec(c.Points[i])
		v := field.At(src, x, field.Mean, field.WantGrad|field.WantErr)
		floor := 1e-3 * row.Scale / row.Size * math.Pow(min(1, row.Size/r3.Norm(r3.Sub(x, centre))), 4)
		at := 0.0
		if c.Region[i] == "inside" {
			at = rho(x)
		}
		g.compare(y, c.ID+" "+c.Tags[i], x, &v, row.Gradient[k], floor, at)
	}
}

// gradientSource is referenceSource with polygons and prisms, the name of the family and the volume charge density; the source is
// nil where the library refuses the body.
func gradientSource(t *testing.T, c *refcase.Case) (family string, src field.Source, rho func(x r3.Vec) float64) {
	t.Helper()
	family, rho = c.Body.Type+" "+c.Polarization.Kind, func(r3.Vec) float64 { return 0 }
	if c.Body.Type == "polygon" {
		v := make([]r3.Vec, len(c.Body.Vertices))
		for i := range v {
			v[i] = refcase.Vec(c.Body.Vertices[i])
		}
		return family, element.NewPolygon(geom.Polygon{Vertices: v}, c.Polarization.A, refcase.Vec(c.Polarization.B)), rho
	}
	var err error
	if body := prismOf(c); body != nil && c.Polarization.Kind == "uniform" {
		family = "prism uniform"
		src, err = bound.Of(body, field.Uniform{P: refcase.Vec(c.Polarization.P)})
	} else {
		src, err = refsource.Of(c)
	}
	if errors.Is(err, bound.ErrUnsupported) {
		return family, nil, rho
	}
	if err != nil || src == nil {
		t.Fatalf("%s: no source: %v", c.ID, err)
	}
	if charge, ok := src.(*bound.Charge); ok {
		rho = charge.VolumeDensity
	}
	return family, src, rho
}

// prismOf returns the prism that a polyhedron of the reference is, if it stands upright along z; else nil.
func prismOf(c *refcase.Case) geom.Body {
	v, n := c.Body.Vertices, len(c.Body.Vertices)/2
	if c.Body.Type != "polyhedron" || len(v) != 2*n || len(c.Body.Faces) != n+2 {
		return nil
	}
	base := make([][2]float64, n)
	for k := range base {
		base[k] = [2]float64{v[k][0], v[k][1]}
		if v[k] != [3]float64{v[k+n][0], v[k+n][1], v[0][2]} || v[k+n][2] != v[n][2] {
			return nil
		}
	}
	lift := geom.Translate(r3.Vec{Z: (v[0][2] + v[n][2]) / 2})
	return geom.At(geom.Prism{Base: base, Height: v[n][2] - v[0][2]}, lift)
}

func casesOf(t *testing.T, file string) map[string]*refcase.Case {
	t.Helper()
	if strings.HasPrefix(file, "triples/") {
		file += ".gz" // packed
	}
	raw, err := os.ReadFile(filepath.Join("../../verify/testdata", file))
	if err != nil {
		t.Fatal(err)
	}
	cases, err := refcase.Parse(file, raw)
	if err != nil {
		t.Fatal(err)
	}
	byID := map[string]*refcase.Case{}
	for i := range cases {
		byID[cases[i].ID] = &cases[i]
	}
	return byID
}

func readSlopes(t *testing.T, file string) *slopes {
	t.Helper()
	raw, err := os.ReadFile(filepath.Join("../../verify/testdata", file))
	if err != nil {
		t.Fatal(err)
	}
	data := new(slopes)
	if err := json.Unmarshal(raw, data); err != nil {
		t.Fatal(err)
	}
	return data
}
