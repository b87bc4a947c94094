package verify

import (
	_ "embed"
	"fmt"
	"math"
	"slices"
	"strings"
	"sync"

	"example.com/boundpole/field"
	"example.com/boundpole/verify/refcase"
	"example.com/boundpole/verify/refsource"
)

//go:embed testdata/dev.json
var devFile []byte

//go:embed testdata/hard.json
var hardFile []byte

var referenceCases = sync.OnceValue(func() []refcase.Case {
	var all []refcase.Case
	for name, content := range map[string][]byte{"dev.json": devFile, "hard.json": hardFile} {
		cases, err := refcase.Parse(name, content)
		if err != nil {
			return nil // the files are part of the package; a test demands their cases
		}
		all = append(all, cases...)
	}
	slices.SortStableFunc(all, func(a, b refcase.Case) int { return strings.Compare(a.ID, b.ID) })
	return all
})

// inScope lists the bodies and the polarizations that the library integrates.
var inScope = struct{ bodies, polarizations []string }{
	[]string{"box", "polyhedron", "polygon", "disc", "annulus", "cylinder", "tube", "sphere", "spherical_shell", "ellipsoid"},
	[]string{"uniform", "affine", "axial_z", "sheet_linear"},
}

// referenceValues returns a case for each reference body: its worst point.
func referenceValues() []trial {
	var all []trial
	for i := range referenceCases() {
		c := &referenceCases()[i]
		if !slices.Contains(inScope.bodies, c.Body.Type) || !slices.Contains(inScope.polarizations, c.Polarization.Kind) {
			continue
		}
		all = append(all, trial{
			c.ID, Reference, plain("mpmath, 60 digits, two methods"),
			fmt.Sprintf("%s, %s; error of phi and g over what the contract allows, worst of %d points", c.Body.Type, c.Polarization.Kind, len(c.Points)),
			within(1, "accuracy contract: 1e-12 of the larger of |value| and 1e-3 of the body's scale; 8 u |x-c| |grad g| for turned bodies"),
			func(l *lab) result { return worstPoint(l, c) },
		})
	}
	return all
}

// worstPoint returns the greatest ratio of error to tolerance over the points of a case.
func worstPoint(l *lab, c *refcase.Case) result {
	src, err := refsource.Of(c)
	l.note(err)
	sheet := c.Polarization.Kind == "sheet_linear"
	worst := 0.0
	for k := range c.Points {
		ratio := math.Inf(1)
		for _, side := range []field.Side{field.Mean, field.Inside, field.Outside} {
			v := l.evaluate(src, refcase.Vec(c.Points[k]), side, field.WantPhi|field.WantG|field.WantGrad)
			m, err := c.Compare(k, v.Phi, v.G, 1e-12, frobenius(v.Grad))
			l.note(err)
			if r := m.Ratio(); !(r >= ratio) {
				ratio = r
			}
			if sheet || v.Status != field.OnFace {
				break // a body's point nearer to a face than 4 u counts as on it: the reference is of one of the sides
			}
		}
		if !(ratio <= worst) {
			worst = ratio
		}
	}
	return atMost(worst)
}

func frobenius(g [6]float64) float64 {
	return math.Sqrt(g[0]*g[0] + g[1]*g[1] + g[2]*g[2] + 2*(g[3]*g[3]+g[4]*g[4]+g[5]*g[5]))
}
