package element

import (
	"encoding/json"
	"math"
	"math/rand/v2"
	"os"
	"slices"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/internal/elliptic"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// TestConfocalIntegrals checks the integrals against R_D, against the sums that integrating d(1/D) and d(w_m/D) gives, and by
// partial fractions: together they fix all nine.
func TestConfocalIntegrals(t *testing.T) {
	rng := rand.New(rand.NewPCG(5, 6))
	for range 4000 {
		spread := []float64{1e-3, 0.1, 3, 20, 40}[rng.IntN(5)]
		var a [3]float64
		for i := range a {
			a[i] = math.Exp2(spread * (rng.Float64() - 0.5))
		}
		o := confocalIntegralsOf(a)
		const tol = 16 * u // about 8 roundings of each side
		check := func(what string, got, want, tol float64) {
			t.Helper()
			if !(math.Abs(got-want) <= tol*want) {
				t.Errorf("%s of %v: %v, want %v, relative error %.2g of %.2g", what, a, got, want, got/want-1, tol)
			}
		}
		d := math.Sqrt(a[0]) * math.Sqrt(a[1]) * math.Sqrt(a[2])
		check("sum of one", o.one[0]+o.one[1]+o.one[2], 2/d, tol)
		for i := range 3 {
			j, k := (i+1)%3, (i+2)%3
			check("one", o.one[i], elliptic.RD(a[j], a[k], a[i])*2/3, tol)
			check("sum of two", 3*o.two[i][i]+o.two[i][j]+o.two[i][k], 2/(a[i]*d), tol)
			if lo, hi := min(a[i], a[j]), max(a[i], a[j]); hi > 2*lo {
				check("two", o.two[i][j], math.Abs((o.one[i]-o.one[j])/(a[j]-a[i])), 4*tol) // the difference loses two bits
			}
			if o.two[i][j] != o.two[j][i] {
				t.Errorf("two of %v is not symmetric", a)
			}
		}
	}
}

// TestAffineEllipsoid holds potential, field and estimates against 25 digits for extreme axes (testdata/ellipsoid.py).
func TestAffineEllipsoid(t *testing.T) {
	data, err := os.ReadFile("testdata/ellipsoid.json")
	if err != nil {
		t.Fatal(err)
	}
	var cases []struct {
		ellipsoidCase
		P        [3]float64
		Gradient [3][3]float64
	}
	if err := json.Unmarshal(data, &cases); err != nil {
		t.Fatal(err)
	}
	const tol = 1e-13 // the contract is 1e-12; 30 roundings of terms that may be 30 times the floor of 1e-3
	var y ellipsoidTally
	for _, c := range cases {
		p := field.Affine{Value: vec(c.P), Gradient: c.Gradient}
		e := must(NewAffineEllipsoid(geom.Ellipsoid{SemiAxes: vec(c.Axes)}, p))
		peak := 0.0
		for _, s := range [][3]float64{{1, 0, 0}, {0, 1, 0}, {0, 0, 1}, {-1, 0, 0}, {0, -1, 0}, {0, 0, -1}} { // at least
			peak = max(peak, r3.Norm(p.At(r3.Vec{X: s[0] * c.Axes[0], Y: s[1] * c.Axes[1], Z: s[2] * c.Axes[2]})))
		}
		y.see(t, &c.ellipsoidCase, e, peak, tol)
	}
	y.judge(t)
}

// ellipsoidCase is points of an ellipsoid with values of 25 digits.
type ellipsoidCase struct {
	ID     string
	Axes   [3]float64
	Points [][3]float64
	Phi    []string
	G      [][3]string
}

// ellipsoidTally counts how the estimates of all cases came out.
type ellipsoidTally struct {
	over          []float64
	claims, short int
}

// see holds a source against a case: errors to tol of the value or of 1e-3 of the scale that goes with the largest polarization.
func (y *ellipsoidTally) see(t *testing.T, c *ellipsoidCase, e field.Evaluator, peak, tol float64) {
	t.Helper()
	size := slices.Max(c.Axes[:])
	worstPhi, worstG := 0.0, 0.0
	for i := range c.Points {
		v := at(e, vec(c.Points[i]), field.Mean)
		q := min(1, size/r3.Norm(vec(c.Points[i])))
		ePhi, phi := minus(t, v.Phi, c.Phi[i])
		eG, g := offBy(t, v.G, c.G[i])
		ePhi, phi = math.Abs(ePhi), math.Abs(phi)
		rPhi := ePhi / max(phi, 1e-3*peak*size*q*q)
		rG := eG / max(g, 1e-3*peak*q*q*q)
		worstPhi, worstG = max(worstPhi, rPhi), max(worstG, rG)
		if !(rPhi <= tol && rG <= tol) || v.Status != field.Regular {
			t.Errorf("%s point %d %v: phi %v, want %s, error %.2g; g %v, want %v, error %.2g; tolerance %g; %v", c.ID, i, c.Points[i],
				v.Phi, c.Phi[i], rPhi, v.G, c.G[i], rG, tol, v.Status)
		}
		y.over = append(y.over, v.ErrPhi/max(ePhi, u*phi), v.ErrG/max(eG, u*g))
		y.claims += 2
		if ePhi > v.ErrPhi {
			y.short++
			t.Logf("%s point %d: phi off by %.3g, estimate %.3g", c.ID, i, ePhi, v.ErrPhi)
		}
		if eG > v.ErrG {
			y.short++
			t.Logf("%s point %d: g off by %.3g, estimate %.3g", c.ID, i, eG, v.ErrG)
		}
	}
	t.Logf("%-16s worst phi %.2g, g %.2g", c.ID, worstPhi, worstG)
}

// judge demands that every estimate holds and that they are not far above the errors.
func (y *ellipsoidTally) judge(t *testing.T) {
	t.Helper()
	slices.Sort(y.over)
	if median := y.over[len(y.over)/2]; y.short > 0 || median > 100 { // the contract on estimates
		t.Errorf("%d of %d estimates too small, median overestimate %.3g", y.short, y.claims, median)
	} else {
		t.Logf("%d estimates hold, median overestimate %.3g", y.claims, median)
	}
}

// TestAffineEllipsoidIsSphere checks an ellipsoid of equal axes against the sphere with affine polarization, gradient included,
// out to where the ellipsoid is a quadrupole.
func TestAffineEllipsoidIsSphere(t *testing.T) {
	p := field.Affine{Value: r3.Vec{X: 0.25, Y: -0.5, Z: 1}, About: r3.Vec{X: 0.1, Z: 0.3},
		Gradient: [3][3]float64{{0.5, -1.25, 0.75}, {2, -0.25, 1.5}, {-1, 0.625, 1.75}}}
	for _, value := range []r3.Vec{p.Value, r3.Sub(p.Value, p.At(r3.Vec{}))} {
		p.Value = value
		e := must(NewAffineEllipsoid(geom.Ellipsoid{SemiAxes: r3.Vec{X: 1.25, Y: 1.25, Z: 1.25}}, p))
		s := must(NewAffineSphere(0, 1.25, p))
		rng := rand.New(rand.NewPCG(9, 10))
		for range 2000 {
			x := r3.Scale(1.25*(1+math.Exp2(60*rng.Float64()-25)), unit(rng))
			if rng.IntN(3) == 0 {
				x = r3.Scale(1.25*rng.Float64(), unit(rng))
			}
			v, w := at(e, x, field.Mean), at(s, x, field.Mean)
			if d := r3.Norm(r3.Sub(v.G, w.G)); !(d <= v.ErrG+w.ErrG) {
				t.Errorf("at %v: g %v, sphere %v, estimates %g and %g", x, v.G, w.G, v.ErrG, w.ErrG)
			}
			if d := math.Abs(v.Phi - w.Phi); !(d <= v.ErrPhi+w.ErrPhi) {
				t.Errorf("at %v: phi %v, sphere %v, estimates %g and %g", x, v.Phi, w.Phi, v.ErrPhi, w.ErrPhi)
			}
			for k := range v.Grad {
				if d := math.Abs(v.Grad[k] - w.Grad[k]); !(d <= v.ErrGrad+w.ErrGrad) {
					t.Errorf("at %v: grad[%d] %v, sphere %v, estimates %g and %g", x, k, v.Grad[k], w.Grad[k], v.ErrGrad, w.ErrGrad)
				}
			}
		}
	}
}

// TestAffineEllipsoidFar checks that the dipole and quadrupole take over without a step.
func TestAffineEllipsoidFar(t *testing.T) {
	p := field.Affine{Gradient: [3][3]float64{{0.5, -1.25, 0.75}, {2, -0.25, 1.5}, {-1, 0.625, 1.75}}}
	e := must(NewAffineEllipsoid(geom.Ellipsoid{SemiAxes: r3.Vec{X: 0.75, Y: 0.01, Z: 0.25}}, p))
	n := r3.Unit(r3.Vec{X: 1, Y: -2, Z: 0.5})
	near := at(e, r3.Scale(ellipsoidFar*(1-0x1p-40), n), field.Mean)
	far := at(e, r3.Scale(ellipsoidFar*(1+0x1p-40), n), field.Mean)
	const tol = 0x1p-36 // the points differ by 2^-39, the field falls like R^-4
	if d := r3.Norm(r3.Sub(near.G, far.G)); !(d <= tol*r3.Norm(far.G)) {
		t.Errorf("g steps from %v to %v", near.G, far.G)
	}
	if d := math.Abs(near.Phi - far.Phi); !(d <= tol*math.Abs(far.Phi)) {
		t.Errorf("phi steps from %v to %v", near.Phi, far.Phi)
	}
}

func TestAffineEllipsoidRefuses(t *testing.T) {
	p := field.Affine{Gradient: [3][3]float64{{math.Inf(1)}}}
	if _, err := NewAffineEllipsoid(geom.Ellipsoid{SemiAxes: r3.Vec{X: 1, Y: 1, Z: 1}}, p); err == nil {
		t.Error("an infinite polarization gradient was taken, want an error")
	}
}

func BenchmarkEllipsoid(b *testing.B) {
	shape := geom.Ellipsoid{SemiAxes: r3.Vec{X: 1, Y: 0.5, Z: 0.01}}
	p := field.Affine{Value: r3.Vec{X: 0.25, Y: -0.5, Z: 1}, Gradient: [3][3]float64{{0.5, -1.25, 0.75}, {2, -0.25, 1.5}, {-1, 0.625, 1.75}}}
	for name, src := range map[string]field.Evaluator{"uniform": must(NewEllipsoid(shape, p.Value)), "affine": must(NewAffineEllipsoid(shape, p))} {
		b.Run(name, func(b *testing.B) {
			at, dst := field.PointsOf(r3.Vec{X: 0.5, Y: 0.25, Z: 0.1}), field.NewValues(1, everyWant)
			b.ReportAllocs()
			for b.Loop() {
				src.Evaluate(dst, at, field.Mean)
			}
		})
	}
}
