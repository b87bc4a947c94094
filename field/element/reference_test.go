package element

import (
	"math"
	"slices"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// referencePoints are the points of a case of a reference file, with the values there, in the outer frame.
type referencePoints struct {
	Points [][3]float64
	Phi    []string
	G      [][3]string
	Tags   []string
}

// referenceCase is a source with what it is held against.
type referenceCase struct {
	id     string
	src    field.Evaluator // in its own frame
	pose   geom.Pose
	centre [3]float64
	bound  float64 // bounding radius
	peak   float64 // largest density or polarization
	sheet  bool    // charge that need not be neutral: the floors fall one power slower
	aim    float64 // tolerance, of the value or of 1e-3 of what the density could give there
	*referencePoints
}

// judge holds sources against reference values and counts how their estimates come out.
type judge struct {
	over          []float64 // estimate over the larger of the error and u times the value
	under, claims int
}

// hold judges one case.
func (j *judge) hold(t *testing.T, c *referenceCase) {
	t.Helper()
	worst, worstPhi := 0.0, 0.0
	for i := range c.Points {
		x := vec(c.Points[i])
		v := roundAt(c.src, c.pose, x, c.bound, field.Mean, field.WantPhi|field.WantG|field.WantErr)
		near := min(1, c.bound/r3.Norm(r3.Sub(x, vec(c.centre))))
		phi0, g0 := c.peak*c.bound*near*near, c.peak*near*near*near
		if c.sheet {
			phi0, g0 = phi0/near, g0/near
		}
		see := func(what string, e, size, floor, claim float64, worst *float64) {
			ratio := e / (c.aim * max(size, 1e-3*floor))
			if !(ratio < 1) {
				t.Errorf("%s at %v (%s): %s off by %.3g, %.2g of the tolerance; got %v, %v", c.id, x, c.Tags[i], what, e, ratio, v.Phi, v.G)
			}
			*worst = max(*worst, ratio)
			j.claims++
			if e > claim {
				j.under++
				t.Logf("%s at %v (%s): %s off by %.3g, claim %.3g", c.id, x, c.Tags[i], what, e, claim)
			}
			if size > 0 {
				j.over = append(j.over, claim/max(e, u*size))
			}
		}
		d, f := minus(t, v.Phi, c.Phi[i])
		see("phi", math.Abs(d), math.Abs(f), phi0, v.ErrPhi, &worstPhi)
		if v.Status == field.OnEdge {
			continue
		}
		e, size := offBy(t, v.G, c.G[i])
		if v.Status == field.OnFace { // a turned reference point may lie 1e-16 off the face and be one-sided
			for _, s := range []field.Side{field.Inside, field.Outside} {
				o, _ := offBy(t, roundAt(c.src, c.pose, x, c.bound, s, field.WantG).G, c.G[i])
				e = min(e, o)
			}
		}
		see("g", e, size, g0, v.ErrG, &worst)
	}
	t.Logf("%-34s worst of the tolerance: phi %.2g, g %.2g", c.id, worstPhi, worst)
}

// settle holds the estimates against the contract: true in 99.9 % of cases, with a median overestimate of at most 100.
func (j *judge) settle(t *testing.T) {
	t.Helper()
	if len(j.over) == 0 {
		t.Fatal("nothing was judged")
	}
	slices.Sort(j.over)
	n := len(j.over)
	t.Logf("%d of %d estimates too small; overestimate: median %.3g, 99 %% %.3g", j.under, j.claims, j.over[n/2], j.over[n*99/100])
	if 1000*j.under > j.claims || j.over[n/2] > 100 {
		t.Errorf("%d of %d estimates too small, median overestimate %.3g", j.under, j.claims, j.over[n/2])
	}
}
