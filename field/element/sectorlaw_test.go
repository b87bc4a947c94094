package element

import (
	"math"
	"math/rand/v2"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

var sectorAffine = field.Affine{Value: r3.Vec{X: 0.5, Y: 0.25, Z: -1},
	Gradient: [3][3]float64{{0.25, 0.5, -0.375}, {-0.125, 0.75, 0.3125}, {0.625, -0.5, -0.25}}, About: r3.Vec{X: 0.25, Z: 0.5}}

// sectorBodies is a choice of arcs with all kinds of polarization.
func sectorBodies(t *testing.T) map[string]field.Evaluator {
	t.Helper()
	all := map[string]field.Evaluator{}
	add := func(name string, inner, from, to float64, p field.Affine, radial float64) {
		a, err := NewArc(geom.Arc{Inner: inner, Outer: 1, Height: 1.25, From: from, To: to}, p, radial)
		if err != nil {
			t.Fatal(err)
		}
		all[name] = a
	}
	uniform := field.Affine{Value: sectorAffine.Value}
	add("uniform", 0.5, -0.25, 1, uniform, 0)
	add("affine", 0.5, -0.25, 1, sectorAffine, 0)
	add("radial", 0.5, -0.25, 1, field.Affine{}, 1)
	add("wide", 0.25, -2.5, 3, sectorAffine, 0.5)
	add("wedge", 0, -0.5, 2, sectorAffine, 0.5)
	add("tube", 0.5, -math.Pi, math.Pi, sectorAffine, 0.5)
	disc, err := NewLinearDisc(geom.Disc{Radius: 1, Z: 0.25}, 0.5, r3.Vec{X: 1, Y: -0.5})
	if err != nil {
		t.Fatal(err)
	}
	all["disc"] = disc
	sheet, err := NewLinearSector(geom.Sector{Inner: 0.5, Outer: 1, From: -1, To: 2.5, Z: 0.25}, 0.5, r3.Vec{X: 1, Y: -0.5})
	if err != nil {
		t.Fatal(err)
	}
	all["sheet"] = sheet
	return all
}

// Field and gradient are the derivatives of potential and field.
func TestSectorDerivatives(t *testing.T) {
	for name, src := range sectorBodies(t) {
		rng := rand.New(rand.NewPCG(2, 3))
		worst, worstGrad := 0.0, 0.0
		for range 60 {
			x := r3.Scale(0.8, spread(rng))
			v := field.At(src.(field.Source), x, field.Mean, sectorWant|field.WantGrad)
			const h = 0x1p-10
			var g r3.Vec
			var grad [3]r3.Vec
			for k, e := range [3]r3.Vec{{X: 1}, {Y: 1}, {Z: 1}} {
				var d [2]field.Value
				for j, s := range [2]float64{h, 2 * h} {
					a := field.At(src.(field.Source), r3.Add(x, r3.Scale(s, e)), field.Mean, sectorWant)
					b := field.At(src.(field.Source), r3.Sub(x, r3.Scale(s, e)), field.Mean, sectorWant)
					d[j] = field.Value{Phi: (a.Phi - b.Phi) / (2 * s), G: r3.Scale(1/(2*s), r3.Sub(a.G, b.G))}
				}
				p := (4*d[0].Phi - d[1].Phi) / 3
				grad[k] = r3.Scale(1.0/3, r3.Sub(r3.Scale(4, d[0].G), d[1].G))
				switch k {
				case 0:
					g.X = -p
				case 1:
					g.Y = -p
				case 2:
					g.Z = -p
				}
			}
			want := [6]float64{grad[0].X, grad[1].Y, grad[2].Z, grad[0].Y, grad[0].Z, grad[1].Z}
			off := 0.0
			for i := range want {
				off = max(off, math.Abs(want[i]-v.Grad[i]))
			}
			e := r3.Norm(r3.Sub(g, v.G))
			if !(e < 1e-8 && off < 1e-7) { // what the differences leave out at the nearest of the points
				t.Errorf("%s at %v: g %v, want %v; grad %v, want %v", name, x, v.G, g, v.Grad, want)
			}
			worst, worstGrad = max(worst, e), max(worstGrad, off)
		}
		t.Logf("%s: g off by %.2g, gradient by %.2g", name, worst, worstGrad)
	}
}

// sectorNear returns a point at a distance from 1 to 1e-12 from an edge, a face, the cut or the axis of an arc between 0.5
// and 1, the height 1.25 and the azimuths -15, 22.5 (cut) and 60 degrees.
func sectorNear(rng *rand.Rand) r3.Vec {
	off := func() float64 { return (2*rng.Float64() - 1) * math.Pow(10, -12*rng.Float64()) }
	radius := [4]float64{0.5, 0.75, 1, 1.5 * rng.Float64()}[rng.IntN(4)]
	azimuth := [5]float64{-15, 22.5, 60, 360 * rng.Float64(), 360 * rng.Float64()}[rng.IntN(5)] * math.Pi / 180
	z := [3]float64{0.625, -0.625, 1.5 * (rng.Float64() - 0.5)}[rng.IntN(3)]
	d := off()
	radius += d * rng.Float64()
	azimuth += d * (rng.Float64() - 0.5)
	return r3.Vec{X: radius * math.Cos(azimuth), Y: radius * math.Sin(azimuth), Z: z + d*(rng.Float64()-0.5)}
}

// An arc is the sum of its parts, at any distance from the cut and its edges; the difference judges the estimates too.
func TestSectorCut(t *testing.T) {
	rng := rand.New(rand.NewPCG(5, 7))
	for _, c := range []struct {
		name   string
		p      field.Affine
		radial float64
	}{{"uniform", field.Affine{Value: sectorAffine.Value}, 0}, {"affine", sectorAffine, 0}, {"radial", field.Affine{}, 1}} {
		arc := func(inner, outer, from, to float64) *Arc {
			a, err := NewArc(geom.Arc{Inner: inner, Outer: outer, Height: 1.25, From: from, To: to, Degrees: true}, c.p, c.radial)
			if err != nil {
				t.Fatal(err)
			}
			return a
		}
		whole := arc(0.5, 1, -15, 60)
		parts := map[string]field.Sum{
			"azimuth": {arc(0.5, 1, -15, 22.5), arc(0.5, 1, 22.5, 60)},
			"radius":  {arc(0.5, 0.75, -15, 60), arc(0.75, 1, -15, 60)},
			"rest":    {arc(0.5, 1, -15, 345), field.Scaled{Source: arc(0.5, 1, 60, 345), Factor: -1}},
		}
		for name, sum := range parts {
			worst, worstPhi, worstGrad, under, count, most := 0.0, 0.0, 0.0, 0, 0, 0.0
			for k := range 400 {
				x := sectorNear(rng)
				want := sectorWant
				if k%4 == 0 {
					want |= field.WantGrad
				}
				a, b := field.At(whole, x, field.Mean, want), field.At(sum, x, field.Mean, want)
				if a.Status != field.Regular || b.Status != field.Regular {
					continue
				}
				phi, g, size := differ(a, b)
				worst, worstPhi = max(worst, g/max(size, 1e-2)), max(worstPhi, phi)
				count += 2
				for _, e := range [2][2]float64{{g, a.ErrG + b.ErrG}, {phi, a.ErrPhi + b.ErrPhi}} {
					if e[0] > e[1] {
						under++
						most = max(most, e[0]/e[1])
					}
				}
				if want&field.WantGrad == 0 {
					continue
				}
				off, scale := 0.0, 0.0
				for i := range a.Grad {
					off += (a.Grad[i] - b.Grad[i]) * (a.Grad[i] - b.Grad[i])
					scale += a.Grad[i] * a.Grad[i]
				}
				off, scale = math.Sqrt(off), math.Sqrt(scale)
				count++
				worstGrad = max(worstGrad, off/(max(1, scale, 1e-3*(a.ErrGrad+b.ErrGrad)/u)))
				if off > a.ErrGrad+b.ErrGrad {
					under++
					most = max(most, off/(a.ErrGrad+b.ErrGrad))
				}
			}
			t.Logf("%s cut by %s: relative difference g %.2g, phi %.2g, gradient %.2g; %d of %d claims too small, up to %.2g", c.name, name, worst,
				worstPhi, worstGrad, under, count, most)
			if !(worst < 1e-11 && worstPhi < 1e-14 && worstGrad < 1e-12) { // three times the worst: parts of size 1 cancel to 1e-2
				t.Errorf("%s cut by %s: differences g %.2g, phi %.2g, gradient %.2g", c.name, name, worst, worstPhi, worstGrad)
			}
			if 1000*under > count {
				t.Errorf("%s cut by %s: %d of %d claims too small", c.name, name, under, count)
			}
		}
	}
}
