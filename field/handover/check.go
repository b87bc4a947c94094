package handover

import (
	"errors"
	"fmt"
	"math"
	"strings"
	"unicode"
	"unicode/utf8"

	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

const (
	// agreement is how far, relative to the sum of magnitudes, what a set says may be from what follows from its numbers. Free:
	// far above rounding, far below any fault, and met by files with eleven digits.
	agreement = 1e-10
	// constantRange is how far epsilon0 or mu0 may be from the CODATA 2022 value: older values and 4 pi 1e-7 are within it.
	constantRange = 1e-8
	// mostRows is the greatest number of points, of facets and of cells in a set.
	mostRows = 1000000
	// longestName is the greatest length of a name in bytes.
	longestName = 200
)

// Check recomputes what a set says of itself from its numbers: the charge of every facet, cell and group, total, magnitudes,
// moment, and potential and field at the probes. Its error names what does not agree, where, and the likely cause.
func (s *Set) Check() error {
	if err := s.checkHead(); err != nil {
		return err
	}
	seen := map[[2]string]bool{}
	var points, facets, cells int
	for i := range s.Groups {
		g := &s.Groups[i]
		if err := g.check(); err != nil {
			return fmt.Errorf("handover: %s %q of part %q: %w", g.Form, g.Place, g.Part, err)
		}
		key := [2]string{g.Part, g.Place}
		if seen[key] {
			return fmt.Errorf("handover: %s %q of part %q stands twice; give every face and cell of a part a name of its own", g.Form, g.Place, g.Part)
		}
		seen[key] = true
		points, facets, cells = points+len(g.Points)+len(g.Dipoles), facets+len(g.Facets), cells+len(g.Cells)
	}
	if most := max(points, facets, cells); most > mostRows {
		return fmt.Errorf("handover: %d points, %d facets, %d cells; a set has at most %d of each: hand over fewer points a direction, or part by part",
			points, facets, cells, mostRows)
	}
	return s.checkSums()
}

// checkHead checks what is not in groups.
func (s *Set) checkHead() error {
	if s.Kind != Electric && s.Kind != Magnetic {
		return fmt.Errorf("handover: kind %d; give Electric or Magnetic", s.Kind)
	}
	u := s.Kind.units()
	if !(math.Abs(s.Constant-u.value) <= constantRange*u.value) {
		return fmt.Errorf("handover: %s is %v; want about %v %s: is the file in SI units?", u.constant, s.Constant, u.value, u.constantUnit)
	}
	if !(s.Within.Moment >= 0 && s.Within.Potential >= 0 && s.Within.Field >= 0) {
		return errors.New("handover: a number of within is negative or not finite; give the greatest differences as they were measured")
	}
	if len(s.Groups) == 0 {
		return errors.New("handover: no groups; a set has at least one face, cell, sheet or point")
	}
	all := []float64{s.Total, s.Magnitudes, s.Within.Moment, s.Within.Potential, s.Within.Field}
	all = append(all, components(s.About, s.Moment)...)
	for _, p := range s.Probes {
		all = append(append(all, p.Potential), components(p.At, p.Field)...)
	}
	for _, x := range all {
		if x-x != 0 {
			return fmt.Errorf("handover: %v in the totals, within or probes; all numbers are finite", x)
		}
	}
	return nil
}

func components(vs ...r3.Vec) []float64 {
	var out []float64
	for _, v := range vs {
		out = append(out, v.X, v.Y, v.Z)
	}
	return out
}

// check checks a group; the error says nothing of its place.
func (g *Group) check() error {
	for _, name := range []string{g.Part, g.Place} {
		if err := checkName(name); err != nil {
			return err
		}
	}
	empty := len(g.Points) == 0
	switch g.Form {
	case Face, Sheet, Volume:
		if len(g.Dipoles) > 0 {
			return errors.New("has dipoles; only a group of points has")
		}
		if g.Form == Volume && len(g.Facets) > 0 || g.Form != Volume && len(g.Cells) > 0 {
			return errors.New("has facets and cells mixed up; faces and sheets have facets, cells have cells")
		}
	case Points:
		if len(g.Facets)+len(g.Cells) > 0 {
			return errors.New("has facets or cells; a group of points has none")
		}
		empty = empty && len(g.Dipoles) == 0
	default:
		return fmt.Errorf("form %q is not known; want face, cell, sheet or points", g.Form)
	}
	if empty {
		return errors.New("has no points; a row is lost, or leave the group out")
	}
	if err := g.checkPoints(); err != nil {
		return err
	}
	if err := g.checkFacets(); err != nil {
		return err
	}
	return g.checkCells()
}

// checkName refuses names that would not survive a line of CSV.
func checkName(name string) error {
	bad := func(r rune) bool { return !unicode.IsPrint(r) || strings.ContainsRune(`,;"#`, r) }
	switch {
	case name == "" || name != strings.TrimSpace(name):
		return fmt.Errorf("name %q is empty or has space at an end; give names without", name)
	case len(name) > longestName:
		return fmt.Errorf("a name of %d bytes; at most %d", len(name), longestName)
	case !utf8.ValidString(name) || strings.IndexFunc(name, bad) >= 0:
		return fmt.Errorf("name %q; use printable characters other than , ; \" #", name)
	}
	return nil
}

// checkPoints checks that the points are finite and carry the charge of the group.
func (g *Group) checkPoints() error {
	var total, size pair.Float
	for i, p := range g.Points {
		if x := p.At.X + p.At.Y + p.At.Z + p.Charge; x-x != 0 {
			return fmt.Errorf("point %d is not finite: %v, charge %v", i, p.At, p.Charge)
		}
		total, size = total.AddFloat(p.Charge), size.AddFloat(math.Abs(p.Charge))
	}
	for i, d := range g.Dipoles {
		if x := d.At.X + d.At.Y + d.At.Z + d.Moment.X + d.Moment.Y + d.Moment.Z; x-x != 0 {
			return fmt.Errorf("dipole %d is not finite: %v, moment %v", i, d.At, d.Moment)
		}
		if d.Moment == (r3.Vec{}) {
			return fmt.Errorf("dipole %d has no moment; leave it out", i)
		}
	}
	return agree("the charges of the points sum to", total.Value(), g.Charge, agreement*size.Value())
}

// checkFacets checks normals and charges of facets.
func (g *Group) checkFacets() error {
	var total, size pair.Float
	for i, f := range g.Facets {
		if len(f.Vertices) != 3 && len(f.Vertices) != 4 {
			return fmt.Errorf("facet %d has %d vertices; want 3 or 4", i, len(f.Vertices))
		}
		n := area(f.Vertices)
		a := r3.Norm(n)
		if !(a > 0) || a-a != 0 {
			return fmt.Errorf("facet %d has the area %v; its vertices are to span a finite one", i, a)
		}
		switch d := r3.Norm(r3.Sub(r3.Scale(1/a, n), f.Normal)); {
		case d <= 1e-9:
		case d >= 2-1e-9 && d <= 2+1e-9:
			return fmt.Errorf("facet %d: the normal points to the other side of its vertices: give the outward normal, and the vertices counter-clockwise seen from outside", i)
		default:
			return fmt.Errorf("facet %d: the normal %v is not the unit normal %v of its vertices", i, f.Normal, r3.Scale(1/a, n))
		}
		if len(f.Vertices) == 4 {
			if err := checkPlane(i, f.Vertices, f.Normal); err != nil {
				return err
			}
		}
		if err := agree(fmt.Sprintf("facet %d: sigma times area is", i), f.Sigma*a, f.Charge, agreement*math.Abs(f.Sigma*a)); err != nil {
			return err
		}
		total, size = total.AddFloat(f.Charge), size.AddFloat(math.Abs(f.Charge))
	}
	if len(g.Facets) == 0 {
		return nil
	}
	return agree("the charges of the facets sum to", total.Value(), g.Charge, agreement*size.Value())
}

// checkPlane refuses a facet whose fourth vertex is off the plane of the others.
func checkPlane(i int, x []r3.Vec, n r3.Vec) error {
	size := max(r3.Norm(r3.Sub(x[2], x[0])), r3.Norm(r3.Sub(x[3], x[1])))
	for k := 1; k < 4; k++ {
		if d := r3.Dot(n, r3.Sub(x[k], x[0])); !(math.Abs(d) <= agreement*(size+r3.Norm(x[0]))) {
			return fmt.Errorf("facet %d: vertex %d is %v m off the plane of the facet; give triangles", i, k, d)
		}
	}
	return nil
}

// checkCells checks the charges of cells.
func (g *Group) checkCells() error {
	var total, size pair.Float
	for i := range g.Cells {
		c := &g.Cells[i]
		v := volume(&c.Corners)
		if !(v > 0) || v-v != 0 {
			return fmt.Errorf("cell %d has the volume %v; give the corners of the bottom counter-clockwise seen from above, then those of the top", i, v)
		}
		if err := agree(fmt.Sprintf("cell %d: rho times volume is", i), c.Rho*v, c.Charge, agreement*math.Abs(c.Rho*v)); err != nil {
			return err
		}
		total, size = total.AddFloat(c.Charge), size.AddFloat(math.Abs(c.Charge))
	}
	if len(g.Cells) == 0 {
		return nil
	}
	return agree("the charges of the cells sum to", total.Value(), g.Charge, agreement*size.Value())
}

// agree compares what follows from the numbers with what is said, and guesses at the reason if they differ.
func agree(what string, got, said, tolerance float64) error {
	if math.Abs(got-said) <= tolerance {
		return nil
	}
	return fmt.Errorf("%s %v, and %v is stated; %s", what, got, said, reason(got/said))
}

// reason guesses why a number is a multiple of what it should be.
func reason(ratio float64) string {
	near := func(x float64) bool { return math.Abs(ratio-x) <= 1e-6*math.Abs(x) }
	if near(-1) {
		return "the signs are turned: sigma is p.n with the outward normal, rho is -div p"
	}
	for e := -15; e <= 15; e++ {
		if x := math.Pow(10, float64(e)); e != 0 && near(x) {
			return fmt.Sprintf("they differ by the factor 1e%d: lengths are in m, charges in C or A m", e)
		}
	}
	for _, c := range []struct {
		factor float64
		words  string
	}{
		{4 * math.Pi, "4 pi"}, {Electric.units().value, "epsilon0"}, {Magnetic.units().value, "mu0"},
	} {
		if near(c.factor) || near(1/c.factor) {
			return fmt.Sprintf("they differ by %s: use the units that the convention names", c.words)
		}
	}
	return "a row is lost, repeated or changed"
}
