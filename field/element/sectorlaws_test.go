package element

import (
	"math"
	"math/rand/v2"
	"slices"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"example.com/boundpole/verify/law"
	"gonum.org/v1/gonum/spatial/r3"
)

// affineAndRadial is what an Arc may carry.
type affineAndRadial struct {
	field.Affine
	radial float64
}

func (p affineAndRadial) At(x r3.Vec) r3.Vec {
	s := math.Hypot(x.X, x.Y)
	return r3.Add(p.Affine.At(x), r3.Vec{X: p.radial * x.X / s, Y: p.radial * x.Y / s})
}

func (p affineAndRadial) Divergence(x r3.Vec) float64 {
	return p.Affine.Divergence(x) + p.radial/math.Hypot(x.X, x.Y)
}

// clearOf returns the distance from the surface for points outside, 0 inside.
func (b *sector) clearOf(x r3.Vec) float64 {
	p := b.at(field.Point{X: pair.VecOf(r3.Scale(1/b.unit, x))})
	if p.within > 0 && !b.sheet {
		return 0
	}
	return b.unit * p.clear(b)
}

// The conformance kit finds nothing wrong.
func TestSectorLaws(t *testing.T) {
	for _, c := range []struct {
		name   string
		shape  geom.Arc
		p      field.Affine
		radial float64
	}{
		{"affine", geom.Arc{Inner: 0.5, Outer: 1, Height: 0.75, From: 0, To: 1}, sectorAffine, 0},
		{"radial", geom.Arc{Inner: 0.5, Outer: 1, Height: 0.75, From: 20, To: 130, Degrees: true}, field.Affine{}, 1},
		{"wide", geom.Arc{Inner: 0.25, Outer: 1, Height: 2, From: -150, To: 150, Degrees: true}, sectorAffine, 0.5},
		{"wedge", geom.Arc{Outer: 3, Height: 2, From: -30, To: 90, Degrees: true}, sectorAffine, 0.5},
	} {
		a, err := NewArc(c.shape, c.p, c.radial)
		if err != nil {
			t.Fatal(err)
		}
		p := affineAndRadial{c.p, c.radial}
		zero := r3.Vec{}
		_, moment := a.sector.totals()
		moment = r3.Scale(math.Pow(a.sector.unit, 3), moment)
		total := law.Total{Moment: &moment, About: zero}
		faces := slices.DeleteFunc(law.FacesOf(c.shape, p, 2, 0.004*c.shape.Height), func(f law.Face) bool { return math.Abs(f.Sigma) < 1e-9 })
		claims := law.Claims{Clear: a.sector.clearOf, Total: &total, Faces: faces,
			Order: 3, Accuracy: 1e-11, Potential: true, Samples: 4, Seed: 3}
		if err := law.Source(a, claims); err != nil {
			t.Errorf("%s: %v", c.name, err)
		}
	}
	disc, err := NewLinearDisc(geom.Disc{Radius: 1, Z: 0.5}, 0.5, r3.Vec{X: 1})
	if err != nil {
		t.Fatal(err)
	}
	faces := []law.Face{{X: r3.Vec{X: 0.25, Y: 0.25, Z: 0.5}, Normal: r3.Vec{Z: 1}, Sigma: 0.75, Reach: 0.25}}
	claims := law.Claims{Clear: disc.sector.clearOf, Total: &law.Total{Charge: 0.5 * math.Pi}, Faces: faces, Order: 2, Accuracy: 1e-11,
		Potential: true, Samples: 4, Seed: 3}
	if err := law.Source(disc, claims); err != nil {
		t.Errorf("disc: %v", err)
	}
}

// Statuses, sides and special places.
func TestSectorPlaces(t *testing.T) {
	shape := geom.ArcDegrees(0.5, 1, 1.25, 0, 90)
	all := must(NewArc(shape, sectorAffine, 0.5))
	axial := must(NewArc(shape, field.Affine{Value: r3.Vec{Z: 1}}, 0))
	radial := must(NewArc(shape, field.Affine{}, 1))
	wedge := must(NewArc(geom.ArcDegrees(0, 1, 1.25, 0, 90), field.Affine{Value: r3.Vec{X: 1}}, 0))
	for _, c := range []struct {
		name   string
		src    *Arc
		x      r3.Vec
		status field.Status
		normal r3.Vec
	}{
		{"top", all, r3.Vec{X: 0.5, Y: 0.5, Z: 0.625}, field.OnFace, r3.Vec{Z: 1}},
		{"bottom", all, r3.Vec{X: 0.5, Y: 0.5, Z: -0.625}, field.OnFace, r3.Vec{Z: -1}},
		{"outer wall", all, r3.Vec{X: 0.6, Y: 0.8, Z: 0.125}, field.OnFace, r3.Vec{X: 0.6, Y: 0.8}},
		{"inner wall", all, r3.Vec{X: 0.3, Y: 0.4, Z: 0.125}, field.OnFace, r3.Vec{X: -0.6, Y: -0.8}},
		{"beginning", all, r3.Vec{X: 0.75, Z: 0.125}, field.OnFace, r3.Vec{Y: -1}},
		{"end", all, r3.Vec{Y: 0.75, Z: 0.125}, field.OnFace, r3.Vec{X: -1}},
		{"top of the axial one", axial, r3.Vec{X: 0.5, Y: 0.5, Z: 0.625}, field.OnFace, r3.Vec{Z: 1}},
		{"uncharged wall", axial, r3.Vec{X: 0.6, Y: 0.8, Z: 0.125}, field.Regular, r3.Vec{}},
		{"uncharged edge", axial, r3.Vec{X: 1, Z: 0.125}, field.Regular, r3.Vec{}},
		{"uncharged radial edge", radial, r3.Vec{X: 0.75, Z: 0.625}, field.Regular, r3.Vec{}},
		{"uncharged top", radial, r3.Vec{X: 0.5, Y: 0.5, Z: 0.625}, field.Regular, r3.Vec{}},
		{"charged wall", radial, r3.Vec{X: 0.6, Y: 0.8, Z: 0.125}, field.OnFace, r3.Vec{X: 0.6, Y: 0.8}},
		{"rim", all, r3.Vec{X: 0.6, Y: 0.8, Z: 0.625}, field.OnEdge, r3.Vec{}},
		{"radial edge", all, r3.Vec{X: 0.75, Z: 0.625}, field.OnEdge, r3.Vec{}},
		{"vertical edge", all, r3.Vec{X: 1, Z: 0.125}, field.OnEdge, r3.Vec{}},
		{"corner", all, r3.Vec{Y: 0.5, Z: -0.625}, field.OnEdge, r3.Vec{}},
		{"rim of the radial one", radial, r3.Vec{X: 0.6, Y: 0.8, Z: 0.625}, field.OnEdge, r3.Vec{}},
		{"axis of the wedge", wedge, r3.Vec{Z: 0.125}, field.OnEdge, r3.Vec{}},
		{"axis", all, r3.Vec{Z: 0.125}, field.Regular, r3.Vec{}},
		{"plane of the beginning", all, r3.Vec{X: -0.75, Z: 0.125}, field.Regular, r3.Vec{}},
		{"plane of the top", all, r3.Vec{X: -0.75, Y: 0.25, Z: 0.625}, field.Regular, r3.Vec{}},
		{"extended wall", all, r3.Vec{X: 0.6, Y: -0.8, Z: 0.125}, field.Regular, r3.Vec{}},
		{"extended wall above", all, r3.Vec{X: 0.6, Y: 0.8, Z: 1}, field.Regular, r3.Vec{}},
	} {
		var v [3]field.Value
		for side := range v {
			v[side] = field.At(c.src, c.x, field.Side(side), sectorWant|field.WantGrad)
			if v[side].Status != c.status {
				t.Errorf("%s: status %v, want %v", c.name, v[side].Status, c.status)
			}
		}
		if c.status == field.OnEdge {
			if !math.IsNaN(v[0].G.X) || math.IsNaN(v[0].Phi) || math.IsInf(v[0].Phi, 0) {
				t.Errorf("%s: g %v, phi %v, want NaN and a finite number", c.name, v[0].G, v[0].Phi)
			}
		}
		if math.IsNaN(v[0].Phi+v[0].ErrPhi) || c.status != field.OnEdge && math.IsNaN(v[0].G.X+v[0].ErrG) {
			t.Errorf("%s: %+v", c.name, v[0])
		}
		if c.status == field.Regular && c.name != "uncharged radial edge" && !(v[0].ErrGrad < 1e-10) {
			t.Errorf("%s: gradient %v +- %v", c.name, v[0].Grad, v[0].ErrGrad)
		}
		// The potential is continuous, and so is the field but for the step.
		const d = 1e-7
		rng := rand.New(rand.NewPCG(1, 2))
		for range 6 {
			n := r3.Unit(r3.Vec{X: rng.NormFloat64(), Y: rng.NormFloat64(), Z: rng.NormFloat64()})
			w := field.At(c.src, r3.Add(c.x, r3.Scale(d, n)), field.Mean, sectorWant)
			if e := math.Abs(w.Phi - v[0].Phi); !(e < 20*d) { // d times |g|, with the logarithm of d
				t.Errorf("%s: phi %v, beside it %v", c.name, v[0].Phi, w.Phi)
			}
			near := v[0]
			if c.status == field.OnFace {
				near = v[1]
				if r3.Dot(n, c.normal) > 0 {
					near = v[2]
				}
			}
			if e := r3.Norm(r3.Sub(w.G, near.G)); c.status != field.OnEdge && !(e < 60*d) { // the same for the gradient
				t.Errorf("%s: g %v, beside it %v", c.name, near.G, w.G)
			}
		}
	}
}

// Batches, single points and what else is wanted give the same bits; nothing allocates.
func TestSectorBits(t *testing.T) {
	rng := rand.New(rand.NewPCG(8, 8))
	for name, src := range sectorBodies(t) {
		var at []r3.Vec
		for range 20 {
			at = append(at, spread(rng))
		}
		p := field.PointsOf(at...)
		everything := field.NewValues(len(at), sectorWant|field.WantGrad)
		src.Evaluate(everything, p, field.Mean)
		for i, x := range at {
			v := everything.At(i)
			if g := src.(field.Source).Field(x); g != v.G {
				t.Errorf("%s at %v: g %v alone, %v with all else", name, x, g, v.G)
			}
			if phi := field.At(src.(field.Source), x, field.Mean, field.WantPhi).Phi; phi != v.Phi {
				t.Errorf("%s at %v: phi %v alone, %v with all else", name, x, phi, v.Phi)
			}
		}
		if n := testing.AllocsPerRun(10, func() { src.Evaluate(everything, p, field.Mean) }); n > 0 {
			t.Errorf("%s: %v allocations", name, n)
		}
	}
}

// A body scaled by a power of two has the same field, bit for bit.
func TestSectorScale(t *testing.T) {
	rng := rand.New(rand.NewPCG(9, 9))
	for _, k := range []float64{0x1p-160, 0x1p-20, 0x1p30, 0x1p150} {
		p := sectorAffine
		for i := range p.Gradient {
			for j := range p.Gradient {
				p.Gradient[i][j] /= k
			}
		}
		p.About = r3.Scale(k, p.About)
		a := must(NewArc(geom.Arc{Inner: 0.5, Outer: 1, Height: 1.25, From: -0.25, To: 1}, sectorAffine, 0.5))
		b := must(NewArc(geom.Arc{Inner: 0.5 * k, Outer: k, Height: 1.25 * k, From: -0.25, To: 1}, p, 0.5))
		for range 40 {
			x := r3.Scale(2, spread(rng))
			v, w := field.At(a, x, field.Mean, sectorWant|field.WantGrad), field.At(b, r3.Scale(k, x), field.Mean, sectorWant|field.WantGrad)
			if v.G != w.G || v.Phi*k != w.Phi || v.ErrG != w.ErrG || v.ErrPhi*k != w.ErrPhi {
				t.Fatalf("scaled by %v at %v: %+v, %+v", k, x, v, w)
			}
			for i := range v.Grad {
				if v.Grad[i] != w.Grad[i]*k {
					t.Fatalf("scaled by %v at %v: gradient %v, %v", k, x, v.Grad, w.Grad)
				}
			}
		}
	}
}

func TestSectorRefused(t *testing.T) {
	nan := math.NaN()
	if _, err := NewArc(geom.Arc{Inner: 1, Outer: 0.5, Height: 1, To: 1}, field.Affine{}, 0); err == nil {
		t.Error("an inverted arc was taken")
	}
	if _, err := NewArc(geom.Arc{Inner: 0.5, Outer: 1, Height: 1, To: 1}, field.Affine{}, nan); err == nil {
		t.Error("a NaN was taken")
	}
	if _, err := NewLinearSector(geom.Sector{Inner: 0.5, Outer: 1, From: 1, To: 0}, 1, r3.Vec{}); err == nil {
		t.Error("an inverted sector was taken")
	}
	a := must(NewArc(geom.Arc{Inner: 0.5, Outer: 1, Height: 1, To: 1}, sectorAffine, 1))
	if v := field.At(a, r3.Vec{X: nan}, field.Mean, sectorWant); v.Status != field.BadInput || !math.IsNaN(v.G.Y) {
		t.Errorf("NaN gives %+v", v)
	}
}
