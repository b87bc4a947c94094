package field_test

import (
	"math"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/element"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// plain hides every upgrade of a source.
type plain struct{ field.Source }

func (p plain) Field(x r3.Vec) r3.Vec { return p.Source.Field(x) }

const everything = field.WantPhi | field.WantG | field.WantGrad | field.WantErr

func distance(a, b field.Value) (phi, g, grad float64) {
	for k := range a.Grad {
		grad = max(grad, math.Abs(a.Grad[k]-b.Grad[k]))
	}
	return math.Abs(a.Phi - b.Phi), r3.Norm(r3.Sub(a.G, b.G)), grad
}

// TestPosed checks that a turned and moved dipole is the dipole with turned moment at the moved place.
func TestPosed(t *testing.T) {
	turn, err := geom.Turn(r3.Vec{X: 1, Y: 2, Z: -1}, 37)
	if err != nil {
		t.Fatal(err)
	}
	shift := r3.Vec{X: 3, Y: -1, Z: 0.5}
	pose := turn.Then(geom.Translate(shift))
	m := r3.Vec{X: 0.3, Y: -1, Z: 2}
	posed := field.Posed{Source: element.Dipole{Moment: m}, Pose: pose}
	direct := element.Dipole{At: shift, Moment: pose.VectorToOuter(m)}
	for _, x := range []r3.Vec{{X: 3.1, Y: -1, Z: 0.5}, {X: 5, Y: 2}, {X: -100, Y: 40, Z: 7}} {
		a, b := field.At(posed, x, field.Mean, everything), field.At(direct, x, field.Mean, everything)
		phi, g, grad := distance(a, b)
		// a few roundings of the moment and of the turned vectors: 10 u of the values
		if size := r3.Norm(b.G); phi > 1e-15*(math.Abs(b.Phi)+size) || g > 2e-15*size || grad > 1e-14*size/r3.Norm(r3.Sub(x, shift)) {
			t.Errorf("at %v: posed %+v, direct %+v", x, a, b)
		}
		if f := posed.Field(x); f != a.G {
			t.Errorf("at %v: Field %v is not the bits of Evaluate %v", x, f, a.G)
		}
	}
}

// TestPlainSource checks the fallback for a source that offers nothing but Field: agreement with the source itself, no
// potential, no claim.
func TestPlainSource(t *testing.T) {
	src := element.Point{At: r3.Vec{X: 0.2, Y: -0.1, Z: 0.3}, Charge: 2}
	x := r3.Vec{X: 1, Y: 0.5, Z: -0.25}
	full, bare := field.At(src, x, field.Mean, everything), field.At(plain{src}, x, field.Mean, everything)
	if bare.G != full.G {
		t.Errorf("field %v, want %v", bare.G, full.G)
	}
	if !math.IsNaN(bare.Phi) || bare.Status != field.NoPotential || !math.IsInf(bare.ErrG, 1) {
		t.Errorf("got %+v, want no potential, no claim", bare)
	}
	if _, _, grad := distance(bare, full); grad > 1e-8*r3.Norm(full.G) { // step error h^4 = 2^-52 and u/h = 2^-40
		t.Errorf("gradient %v, want %v", bare.Grad, full.Grad)
	}
	both := field.At(field.Sum{src, plain{src}}, x, field.Mean, everything)
	if both.Status != field.NoPotential || !math.IsInf(both.ErrG, 1) || both.G != r3.Scale(2, full.G) {
		t.Errorf("sum with a plain source: %+v", both)
	}
}

// TestSum checks superposition over more points than one chunk, the gravest status, and the empty sum.
func TestSum(t *testing.T) {
	a, b := element.Point{Charge: 1}, field.Scaled{Source: element.Point{At: r3.Vec{X: 1}, Charge: 3}, Factor: -0.5}
	sum := field.Sum{a, b}
	at := field.Line(r3.Vec{X: -2, Y: 0.25}, r3.Vec{X: 3, Y: -0.5}, 301)
	v := field.NewValues(at.Len(), everything)
	sum.Evaluate(v, at, field.Mean)
	for i := range at.Len() {
		va, vb := field.At(a, at.Vec(i), field.Mean, everything), field.At(b, at.Vec(i), field.Mean, everything)
		got := v.At(i)
		if got.Phi != va.Phi+vb.Phi || got.G != r3.Add(va.G, vb.G) || got.ErrG != va.ErrG+vb.ErrG || got.ErrPhi != va.ErrPhi+vb.ErrPhi {
			t.Fatalf("point %d: got %+v, want the sum of %+v and %+v", i, got, va, vb)
		}
	}
	if s := field.At(sum, r3.Vec{X: 1}, field.Mean, everything).Status; s != field.AtPoint {
		t.Errorf("status on a point charge: %v, want %v", s, field.AtPoint)
	}
	if s := field.At(sum, r3.Vec{X: math.NaN()}, field.Mean, everything).Status; s != field.BadInput {
		t.Errorf("status of NaN: %v, want %v", s, field.BadInput)
	}
	if z := field.At(field.Sum{}, r3.Vec{X: 1}, field.Mean, everything); z.G != (r3.Vec{}) || z.Phi != 0 || z.Status != field.Regular {
		t.Errorf("empty sum: %+v", z)
	}
}

// TestBounds checks the boxes of combinations.
func TestBounds(t *testing.T) {
	ball := element.Sphere{Shape: geom.Sphere{Radius: 1}, P: r3.Vec{Z: 1}}
	sum := field.Sum{ball, field.Posed{Source: ball, Pose: geom.Translate(r3.Vec{X: 5})}}
	want := r3.Box{Min: r3.Vec{X: -1, Y: -1, Z: -1}, Max: r3.Vec{X: 6, Y: 1, Z: 1}}
	if got, ok := field.BoundsOf(sum); !ok || got != want {
		t.Errorf("got %v, want %v", got, want)
	}
	if got := (field.Sum{ball, plain{ball}}).Bounds(); !math.IsInf(got.Max.X, 1) {
		t.Errorf("a sum with a source that does not tell: %v, want all of space", got)
	}
}

// TestNoAllocation holds the hot paths at zero allocations.
func TestNoAllocation(t *testing.T) {
	if testing.Short() {
		t.Skip("run without -short: under the race detector pools are emptied at random")
	}
	posed := field.Posed{Source: element.Dipole{Moment: r3.Vec{Z: 1}}, Pose: geom.Translate(r3.Vec{X: 1})}
	at := field.Line(r3.Vec{Y: 1}, r3.Vec{Y: 2}, 200)
	v := field.NewValues(at.Len(), field.WantPhi|field.WantG)
	sum := field.Sum{posed, element.Point{Charge: 1}}
	for name, f := range map[string]func(){
		"Posed.Field":    func() { posed.Field(r3.Vec{Z: 3}) },
		"Posed.Evaluate": func() { posed.Evaluate(v, at, field.Mean) },
		"Sum.Evaluate":   func() { sum.Evaluate(v, at, field.Mean) },
	} {
		if n := testing.AllocsPerRun(50, f); n > 0 {
			t.Errorf("%s: %g allocations, want 0", name, n)
		}
	}
}

// TestSampling checks that the ends of lines, planes and grids are exact and that x runs fastest.
func TestSampling(t *testing.T) {
	a, b := r3.Vec{X: 0.1, Y: 0.2, Z: 0.3}, r3.Vec{X: 0.7, Y: -0.3, Z: 1.1}
	line := field.Line(a, b, 4)
	if line.Vec(0) != a || line.Vec(3) != b {
		t.Errorf("ends of the line: %v, %v", line.Vec(0), line.Vec(3))
	}
	if one := field.Line(a, b, 1); one.Len() != 1 || one.Vec(0) != a {
		t.Errorf("line of one point: %v", one.Vec(0))
	}
	grid := field.Grid(r3.Box{Min: a, Max: r3.Vec{X: 0.7, Y: 0.9, Z: 1.1}}, 3, 2, 2)
	if grid.Len() != 12 || grid.Vec(1).Y != 0.2 || grid.Vec(3).Y != 0.9 || grid.Vec(11) != (r3.Vec{X: 0.7, Y: 0.9, Z: 1.1}) {
		t.Errorf("grid: %v", grid)
	}
	plane := field.Plane(a, r3.Vec{X: 1}, r3.Vec{Y: 2}, 2, 3)
	if plane.Len() != 6 || plane.Vec(1) != (r3.Vec{X: 1.1, Y: 0.2, Z: 0.3}) || plane.Vec(2).Y != 1.2 {
		t.Errorf("plane: %v", plane)
	}
}
