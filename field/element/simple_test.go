package element

import (
	"encoding/json"
	"fmt"
	"math"
	"math/big"
	"math/rand/v2"
	"os"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// simpleCase is a body, its points and the reference values, all in the outer frame.
type simpleCase struct {
	ID   string
	Body struct {
		Type              string
		Radius, R1, R2    float64
		Axes              [3]float64 `json:"semi_axes_e1_e2_e3"`
		Centre, Axis, Ref [3]float64
	}
	P      [3]float64
	Points [][3]float64
	Phi    []string
	G      [][3]string
}

func vec(a [3]float64) r3.Vec { return r3.Vec{X: a[0], Y: a[1], Z: a[2]} }

// source returns the source of the case in its own frame, the pose, and the bounding radius.
func (c *simpleCase) source(t *testing.T) (src field.Evaluator, pose geom.Pose, a float64) {
	t.Helper()
	pose, err := geom.Frame(vec(c.Body.Axis), vec(c.Body.Ref))
	if err != nil {
		t.Fatalf("%s: %v", c.ID, err)
	}
	p := pose.VectorToLocal(vec(c.P))
	pose = pose.Then(geom.Translate(vec(c.Body.Centre)))
	switch c.Body.Type {
	case "sphere":
		return Sphere{geom.Sphere{Radius: c.Body.Radius}, p}, pose, c.Body.Radius
	case "spherical_shell":
		return HollowSphere{geom.HollowSphere{Inner: c.Body.R1, Outer: c.Body.R2}, p}, pose, c.Body.R2
	case "ellipsoid":
		e, err := NewEllipsoid(geom.Ellipsoid{SemiAxes: vec(c.Body.Axes)}, p)
		if err != nil {
			t.Fatalf("%s: %v", c.ID, err)
		}
		return e, pose, max(c.Body.Axes[0], c.Body.Axes[1], c.Body.Axes[2])
	}
	t.Fatalf("%s: body %q is not known here", c.ID, c.Body.Type)
	return nil, pose, 0
}

// minus returns got - want, want given in decimal, without rounding want to float64 first.
func minus(t *testing.T, got float64, want string) (diff, rounded float64) {
	t.Helper()
	w, _, err := big.ParseFloat(want, 10, 120, big.ToNearestEven)
	if err != nil {
		t.Fatalf("reference value %q: %v", want, err)
	}
	if math.IsNaN(got) || math.IsInf(got, 0) {
		return math.Inf(1), 0
	}
	rounded, _ = w.Float64()
	diff, _ = new(big.Float).SetPrec(200).Sub(big.NewFloat(got), w).Float64()
	return diff, rounded
}

func TestSimpleReference(t *testing.T) {
	// g: 45 u, for the 20 to 30 roundings on the way from the coordinates; R_D adds about 5 u. phi of an ellipsoid is a
	// sum whose terms may be 300 times the floor of 1e-3 phi0 when they cancel: 300 times 1.5 u.
	const tolG, tolPhi = 5e-15, 5e-14
	data, err := os.ReadFile("testdata/simple.json")
	if err != nil {
		t.Fatal(err)
	}
	var cases []simpleCase
	if err := json.Unmarshal(data, &cases); err != nil {
		t.Fatal(err)
	}
	short, all := 0, 0
	for _, c := range cases {
		t.Run(c.ID, func(t *testing.T) {
			src, pose, a := c.source(t)
			p0 := r3.Norm(vec(c.P))
			floor := 1e-3 // of the contract
			if c.Body.Type != "ellipsoid" && !pose.Turned() {
				floor = 0 // no sum cancels
			}
			worstPhi, worstG := 0.0, 0.0
			for i, x := range c.Points {
				v := evaluate(src, local(pose, vec(x)), field.Mean)
				g := pose.VectorToOuter(v.G)
				ePhi, phi := minus(t, v.Phi, c.Phi[i])
				ex, gx := minus(t, g.X, c.G[i][0])
				ey, gy := minus(t, g.Y, c.G[i][1])
				ez, gz := minus(t, g.Z, c.G[i][2])
				eG, ref := r3.Norm(r3.Vec{X: ex, Y: ey, Z: ez}), r3.Norm(r3.Vec{X: gx, Y: gy, Z: gz})
				q := min(1, a/r3.Norm(r3.Sub(vec(x), vec(c.Body.Centre))))
				rPhi := math.Abs(ePhi) / max(math.Abs(phi), floor*p0*a*q*q, 0x1p-1000)
				rG := eG / max(ref, floor*p0*q*q*q, 0x1p-1000)
				worstPhi, worstG = max(worstPhi, rPhi), max(worstG, rG)
				if rPhi > tolPhi || rG > tolG {
					t.Errorf("point %d %v: phi %v (want %s, error %.2g), g %v (want %v, error %.2g), tolerances %g %g",
						i, x, v.Phi, c.Phi[i], rPhi, g, c.G[i], rG, tolPhi, tolG)
				}
				all++
				turned := 4 * u * r3.Norm(g) // turning g into the outer frame and p into the own one
				if math.Abs(ePhi) > v.ErrPhi+2*u*p0*a*q*q || eG > v.ErrG+turned+2*u*p0*q*q*q {
					short++
					t.Logf("point %d: error of phi %.2g, estimate %.2g; of g %.2g, estimate %.2g", i, ePhi, v.ErrPhi, eG, v.ErrG)
				}
				if v.Status != field.Regular {
					t.Errorf("point %d %v: status %v, want regular: it is 1e-12 sizes or more off the surface", i, x, v.Status)
				}
			}
			t.Logf("%d points: worst phi %.2g, g %.2g", len(c.Points), worstPhi, worstG)
		})
	}
	if 1000*short > all {
		t.Errorf("estimates too small at %d of %d points, want at most 1 in 1000", short, all)
	}
}

// local returns the point of the own frame of a pose, with its low parts.
func local(pose geom.Pose, x r3.Vec) field.Points {
	y := pose.ToLocal(pair.VecOf(x))
	return field.Points{X: []float64{y.X.Hi}, Y: []float64{y.Y.Hi}, Z: []float64{y.Z.Hi},
		XLo: []float64{y.X.Lo}, YLo: []float64{y.Y.Lo}, ZLo: []float64{y.Z.Lo}}
}

// evaluate returns everything the source says at the one point of at.
func evaluate(src field.Evaluator, at field.Points, side field.Side) field.Value {
	v := field.NewValues(1, field.WantPhi|field.WantG|field.WantGrad|field.WantErr)
	src.Evaluate(v, &at, side)
	return v.At(0)
}

// at returns everything the source says at x.
func at(src field.Evaluator, x r3.Vec, side field.Side) field.Value {
	return evaluate(src, *field.PointsOf(x), side)
}

// every is one source of each type of this file's kind, near the origin and of size about 1.
func every(t *testing.T) map[string]field.Evaluator {
	t.Helper()
	p := r3.Vec{X: 0.25, Y: -0.5, Z: 1}
	e, err := NewEllipsoid(geom.Ellipsoid{SemiAxes: r3.Vec{X: 0.75, Y: 1, Z: 0.5}}, p)
	if err != nil {
		t.Fatal(err)
	}
	return map[string]field.Evaluator{
		"Point":         Point{At: r3.Vec{X: 0.125}, Charge: 2},
		"Dipole":        Dipole{At: r3.Vec{Y: 0.125}, Moment: p},
		"Sphere":        Sphere{geom.Sphere{Radius: 1}, p},
		"HollowSphere":  HollowSphere{geom.HollowSphere{Inner: 0.5, Outer: 1}, p},
		"ChargedBall":   ChargedBall{geom.Sphere{Radius: 1}, 1.5},
		"ChargedSphere": ChargedSphere{geom.Sphere{Radius: 1}, 1.5},
		"Ellipsoid":     e,
		"affine": must(NewAffineEllipsoid(geom.Ellipsoid{SemiAxes: r3.Vec{X: 0.75, Y: 1, Z: 0.5}},
			field.Affine{Value: p, Gradient: [3][3]float64{{0.5, -1.25, 0.75}, {2, -0.25, 1.5}, {-1, 0.625, 1.75}}})),
	}
}

func TestGradientDifferences(t *testing.T) {
	// Tolerance: central differences with step 2^-12 and one Richardson step are good to h^4 |g|/d^5, d the distance
	// (at least 0.2) to what is singular, and to u |g|/h: 1e-8 covers both.
	rng := rand.New(rand.NewPCG(1, 2))
	const h = 0x1p-12
	for name, src := range every(t) {
		for range 300 {
			x := r3.Scale(0.2+3*rng.Float64(), unit(rng))
			if r := r3.Norm(x); r < 1.2 && r > 0.2 && (name == "Point" || name == "Dipole" || r > 0.3) {
				x = r3.Scale(1.2/r, x)
			}
			v := at(src, x, field.Mean)
			if v.Status != field.Regular || r3.Norm(x) < 0.3 && (name == "Point" || name == "Dipole") {
				continue
			}
			var cols [3]r3.Vec
			for k, e := range [3]r3.Vec{{X: 1}, {Y: 1}, {Z: 1}} {
				slope := func(h float64) r3.Vec {
					a := src.(field.Source).Field(r3.Add(x, r3.Scale(h, e)))
					b := src.(field.Source).Field(r3.Sub(x, r3.Scale(h, e)))
					return r3.Scale(1/(2*h), r3.Sub(a, b))
				}
				cols[k] = r3.Scale(1.0/3, r3.Sub(r3.Scale(4, slope(h)), slope(2*h)))
			}
			want := [6]float64{cols[0].X, cols[1].Y, cols[2].Z, cols[1].X, cols[2].X, cols[2].Y}
			size := 0.0
			for _, w := range want {
				size = max(size, math.Abs(w))
			}
			for k := range want {
				if tol := 1e-8 * max(size, 1e-3); math.Abs(v.Grad[k]-want[k]) > tol {
					t.Errorf("%s at %v: grad[%d] = %v, differences %v, tolerance %g", name, x, k, v.Grad[k], want[k], tol)
				}
			}
		}
	}
}

func unit(rng *rand.Rand) r3.Vec {
	return r3.Unit(r3.Vec{X: rng.NormFloat64(), Y: rng.NormFloat64(), Z: rng.NormFloat64()})
}

func TestNotFinite(t *testing.T) {
	for name, src := range every(t) {
		for _, x := range []r3.Vec{{X: math.NaN()}, {Y: math.Inf(1)}, {Z: math.Inf(-1)}} {
			if g := src.(field.Source).Field(x); g.X == g.X || g.Y == g.Y || g.Z == g.Z {
				t.Errorf("%s.Field(%v) = %v, want NaN in all components", name, x, g)
			}
			if v := at(src, x, field.Mean); v.Status != field.BadInput || v.Phi == v.Phi {
				t.Errorf("%s at %v: phi %v, status %v, want NaN and %v", name, x, v.Phi, v.Status, field.BadInput)
			}
		}
	}
}

func TestDirection(t *testing.T) {
	d := r3.Vec{X: 0.3, Y: -0.4, Z: 1.2}
	n, r := direction(d)
	if math.Abs(r-1.3) > 3*u*r { // 2.5 u and the rounding of d
		t.Errorf("direction(%v): length %v, want 1.3", d, r)
	}
	for _, k := range []int{-1000, -600, -3, 5, 600, 1000} {
		f := math.Ldexp(1, k)
		if m, l := direction(r3.Scale(f, d)); m != n || l != f*r {
			t.Errorf("direction(2^%d %v) = %v, %v; want %v, %v", k, d, m, l, n, f*r)
		}
	}
	if n, r := direction(r3.Vec{}); n != (r3.Vec{}) || r != 0 {
		t.Errorf("direction(0) = %v, %v; want 0, 0", n, r)
	}
}

func TestHugeAndTiny(t *testing.T) {
	// No coordinate may overflow or underflow on the way to a finite, correct number.
	for name, src := range every(t) {
		for _, r := range []float64{0x1p100, 0x1p500, 0x1p600, 0x1p1000} {
			x := r3.Scale(r, r3.Vec{X: 0.5, Y: 0.25, Z: -0.5})
			v := at(src, x, field.Mean)
			if v.Status != field.Regular || math.IsNaN(v.Phi) || math.IsInf(v.Phi, 0) || math.IsNaN(r3.Norm(v.G)) {
				t.Errorf("%s at %v: %+v, want finite values", name, x, v)
			}
		}
	}
	// Powers of two scale bit for bit.
	for _, k := range []float64{0x1p-150, 0x1p-3, 0x1p7, 0x1p150} {
		p := r3.Vec{X: 0.25, Y: -0.5, Z: 1}
		one, _ := NewEllipsoid(geom.Ellipsoid{SemiAxes: r3.Vec{X: 0.7, Y: 1.1, Z: 0.3}}, p)
		big, err := NewEllipsoid(geom.Ellipsoid{SemiAxes: r3.Scale(k, r3.Vec{X: 0.7, Y: 1.1, Z: 0.3})}, p)
		if err != nil {
			t.Fatal(err)
		}
		for _, x := range []r3.Vec{{X: 0.1, Y: 0.2, Z: 0.1}, {X: 0.8, Y: -0.3, Z: 0.7}, {X: 12, Y: 5, Z: -9}} {
			a, b := at(one, x, field.Mean), at(big, r3.Scale(k, x), field.Mean)
			if a.G != b.G || a.Phi*k != b.Phi || a.Grad[3]/k != b.Grad[3] {
				t.Errorf("ellipsoid scaled by %g at %v: %v %v, want %v %v", k, x, b.Phi, b.G, a.Phi*k, a.G)
			}
		}
		s, r := Sphere{geom.Sphere{Radius: 1}, p}, Sphere{geom.Sphere{Radius: k}, p}
		x := r3.Vec{X: 0.8, Y: -0.3, Z: 0.7}
		if a, b := s.Field(x), r.Field(r3.Scale(k, x)); a != b {
			t.Errorf("sphere scaled by %g at %v: %v, want %v", k, x, b, a)
		}
	}
}

func TestNoAllocations(t *testing.T) {
	at := field.PointsOf(r3.Vec{X: 0.3, Y: 0.1, Z: 0.2}, r3.Vec{X: 0.6, Y: 0.3, Z: 0.2}, r3.Vec{X: 1}, r3.Vec{X: 3, Y: 2, Z: 1})
	dst := field.NewValues(at.Len(), field.WantPhi|field.WantG|field.WantGrad|field.WantErr)
	for name, src := range every(t) {
		s := src.(field.Source)
		if n := testing.AllocsPerRun(50, func() { s.Field(at.Vec(3)) }); n != 0 {
			t.Errorf("%s.Field allocates %v times, want 0", name, n)
		}
		if n := testing.AllocsPerRun(50, func() { src.Evaluate(dst, at, field.Mean) }); n != 0 {
			t.Errorf("%s.Evaluate allocates %v times, want 0", name, n)
		}
	}
}

func BenchmarkSimple(b *testing.B) {
	p := r3.Vec{X: 0.25, Y: -0.5, Z: 1}
	e, err := NewEllipsoid(geom.Ellipsoid{SemiAxes: r3.Vec{X: 0.75, Y: 1, Z: 0.5}}, p)
	if err != nil {
		b.Fatal(err)
	}
	for _, src := range []field.Source{Point{Charge: 1}, Dipole{Moment: p}, Sphere{geom.Sphere{Radius: 1}, p}, e} {
		b.Run(fmt.Sprintf("%T", src), func(b *testing.B) {
			b.ReportAllocs()
			for i := range b.N {
				src.Field(r3.Vec{X: 1.5, Y: 0.25, Z: float64(i % 3)})
			}
		})
	}
}
