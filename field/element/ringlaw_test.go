package element

import (
	"fmt"
	"math"
	"math/rand/v2"
	"testing"

	"example.com/boundpole/field"
	"example.com/boundpole/field/internal/elliptic"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

const everyWant = field.WantPhi | field.WantG | field.WantGrad | field.WantErr

// apart returns the errors of got against want in potential, field and gradient.
func apart(got, want field.Value) (phi, g, grad float64) {
	for k := range got.Grad {
		grad = math.Hypot(grad, got.Grad[k]-want.Grad[k])
	}
	return math.Abs(got.Phi - want.Phi), r3.Norm(r3.Sub(got.G, want.G)), grad
}

// slopeOf returns the norm of the gradient.
func slopeOf(v field.Value) (slope float64) {
	for _, h := range v.Grad {
		slope = math.Hypot(slope, h)
	}
	return slope
}

// sumOf adds values; slope is the sum of the norms of their gradients.
func sumOf(parts ...field.Value) (v field.Value, slope float64) {
	for _, p := range parts {
		slope += slopeOf(p)
		v.Phi += p.Phi
		v.G = r3.Add(v.G, p.G)
		for k := range v.Grad {
			v.Grad[k] += p.Grad[k]
		}
		v.ErrPhi += p.ErrPhi
		v.ErrG += p.ErrG
		v.ErrGrad += p.ErrGrad
		v.Status = max(v.Status, p.Status)
	}
	return v, slope
}

// around returns points at distances from 1e-12 to 1 off places of the half plane of the axis, at any azimuth.
func around(rng *rand.Rand, places [][2]float64) []r3.Vec {
	var all []r3.Vec
	for _, q := range places {
		for _, d := range []float64{1e-12, 1e-9, 1e-6, 1e-3, 0.03, 0.3, 1} {
			for range 4 {
				f, a := 2*math.Pi*rng.Float64(), 2*math.Pi*rng.Float64()
				rho, z := math.Abs(q[0]+d*math.Cos(f)), q[1]+d*math.Sin(f)
				all = append(all, r3.Vec{X: rho * math.Cos(a), Y: rho * math.Sin(a), Z: z})
			}
		}
	}
	return all
}

// agree holds two ways to the same field against each other: to tol, and to what both claim. slope is the norm of the
// gradient, or the sum of those that add up to it.
func agree(t *testing.T, name string, x r3.Vec, got, want field.Value, slope, tol float64) {
	t.Helper()
	if got.Status >= field.OnFace || want.Status >= field.OnFace {
		return
	}
	phi, g, grad := apart(got, want)
	move := 4 * u * r3.Norm(x) * slope
	if !(phi <= tol && g <= tol*(1+r3.Norm(want.G))+move && grad <= 1e-9*(1+slope)) { // the contract on gradients
		t.Errorf("%s at %v: off by %.2g, %.2g, %.2g; got %v %v %v, want %v %v %v", name, x, phi, g, grad,
			got.Phi, got.G, got.Grad, want.Phi, want.G, want.Grad)
	}
	if phi > got.ErrPhi+want.ErrPhi || g > got.ErrG+want.ErrG+move || grad > got.ErrGrad+want.ErrGrad+move*slope {
		t.Errorf("%s at %v: off by %.2g, %.2g, %.2g, claimed %.2g, %.2g, %.2g", name, x, phi, g, grad,
			got.ErrPhi+want.ErrPhi, got.ErrG+want.ErrG+move, got.ErrGrad+want.ErrGrad)
	}
}

// TestConeIsCylinder holds cones with equal ends against the closed form of the cylinder.
func TestConeIsCylinder(t *testing.T) {
	rng := rand.New(rand.NewPCG(1, 1))
	p := r3.Vec{X: 0.6, Y: 0.3, Z: -1}
	cone := must(NewCone(geom.Cone{Bottom: 1, Top: 1, Height: 1.5}, p))
	cylinder := must(NewCylinder(geom.Cylinder{Radius: 1, Height: 1.5}, p, 0))
	for _, x := range around(rng, [][2]float64{{1, 0.25}, {1, 0.75}, {0, 0.75}, {0, 0}, {0.5, -0.75}, {1.5, 0.75}, {3, 3}}) {
		for _, side := range []field.Side{field.Mean, field.Inside, field.Outside} {
			want := field.At(cylinder, x, side, everyWant)
			agree(t, "cone", x, field.At(cone, x, side, everyWant), want, slopeOf(want), 2e-14) // 100 u
		}
	}
}

// TestConeCut holds a cone against the two cones it is cut into: near the tip, the rims, the wall and the cut.
func TestConeCut(t *testing.T) {
	rng := rand.New(rand.NewPCG(2, 1))
	for _, p := range []r3.Vec{{Z: 1}, {X: 1}, {X: 0.3, Y: -0.4, Z: 0.6}} {
		whole := must(NewCone(geom.Cone{Bottom: 1, Top: 0, Height: 2}, p))
		low := must(NewCone(geom.Cone{Bottom: 1, Top: 0.625, Height: 0.75}, p)) // from -1 to -0.25
		high := must(NewCone(geom.Cone{Bottom: 0.625, Top: 0, Height: 1.25}, p))
		places := [][2]float64{{0, 1}, {0.625, -0.25}, {1, -1}, {0.25, 0.5}, {0, 0}, {0.3, -0.25}, {0.5, -1}, {2, 0}, {0.75, 1}}
		for _, x := range around(rng, places) {
			a := field.At(whole, x, field.Mean, everyWant)
			l, h := r3.Vec{X: x.X, Y: x.Y, Z: x.Z + 0.625}, r3.Vec{X: x.X, Y: x.Y, Z: x.Z - 0.375}
			if l.Z-0.625 != x.Z || h.Z+0.375 != x.Z {
				continue // the parts would see another point
			}
			b, slope := sumOf(field.At(low, l, field.Mean, everyWant), field.At(high, h, field.Mean, everyWant))
			agree(t, "cut cone", x, b, a, slope, 3e-14) // 100 u, twice
		}
	}
}

// TestPowersAreTubes holds the powers 0 and 1 along the axis against the closed forms of uniform and linear polarization.
func TestPowersAreTubes(t *testing.T) {
	rng := rand.New(rand.NewPCG(3, 1))
	places := [][2]float64{{1, 0.25}, {1, 0.75}, {0.5, 0.75}, {0.5, -0.1}, {0, 0.75}, {0, 0}, {0.75, -0.75}, {0.75, 0.1}, {1.5, 0.75}, {3, 3}}
	for _, inner := range []float64{0, 0.5} {
		shape := geom.Tube{Inner: inner, Outer: 1, Height: 1.5}
		for n := range 2 {
			b := must(NewAxialPower(shape, 2, n))
			tube := must(newTube(inner, 1, 1.5, r3.Vec{Z: 2 * float64(1-n)}, 2*float64(n)))
			for _, x := range around(rng, places) {
				for _, side := range []field.Side{field.Mean, field.Inside, field.Outside} {
					want := field.At(tube, x, side, everyWant)
					agree(t, "axial power", x, field.At(b, x, side, everyWant), want, slopeOf(want), 4e-14) // 200 u
				}
			}
		}
	}
}

// TestPowersNested holds a cylinder against an inner cylinder and a tube round it.
func TestPowersNested(t *testing.T) {
	rng := rand.New(rand.NewPCG(4, 1))
	build := func(shape geom.Tube, i int) field.Source {
		if i < 3 {
			return must(NewAxialPower(shape, 1.5, i+2))
		}
		return must(NewRadialPower(shape, 1.5, []float64{1, 2, 0.5, 0, 3.25}[i-3]))
	}
	places := [][2]float64{{1, 0.25}, {1, 0.75}, {0.5, 0.75}, {0.5, -0.1}, {0, 0.75}, {0, 0}, {0.75, -0.75}, {0.75, 0.1}, {1.5, 0.75}, {3, 3}}
	for i := range 8 {
		whole := build(geom.Tube{Outer: 1, Height: 1.5}, i)
		in, out := build(geom.Tube{Outer: 0.5, Height: 1.5}, i), build(geom.Tube{Inner: 0.5, Outer: 1, Height: 1.5}, i)
		for _, x := range around(rng, places) {
			a := field.At(whole, x, field.Mean, everyWant)
			b, slope := sumOf(field.At(in, x, field.Mean, everyWant), field.At(out, x, field.Mean, everyWant))
			agree(t, "nested power", x, b, a, slope, 5e-14) // 200 u, twice
		}
	}
}

// differs holds potential, field and gradient of a source against each other by differences of sixth order, at points where
// the next charge is farther than clear.
func differs(t *testing.T, name string, src field.Source, x r3.Vec, clear float64) {
	t.Helper()
	h := clear / 16
	v := field.At(src, x, field.Mean, everyWant)
	axes := [3]r3.Vec{{X: 1}, {Y: 1}, {Z: 1}}
	index := [3][3]int{{0, 3, 4}, {3, 1, 5}, {4, 5, 2}}
	for i, e := range axes {
		var dphi float64
		var dg r3.Vec
		for k, w := range [3]float64{45, -9, 1} {
			s := float64(k+1) * h
			a := field.At(src, r3.Add(x, r3.Scale(s, e)), field.Mean, everyWant)
			b := field.At(src, r3.Sub(x, r3.Scale(s, e)), field.Mean, everyWant)
			dphi += w * (a.Phi - b.Phi) / (60 * h)
			dg = r3.Add(dg, r3.Scale(w/(60*h), r3.Sub(a.G, b.G)))
		}
		// error (h/clear)^6 36/7 of the function's size there: 3e-7
		if e := math.Abs(dphi + r3.Dot(v.G, e)); !(e < 2e-7*(1+r3.Norm(v.G))+1e-14/h) {
			t.Errorf("%s at %v: dphi %v, g %v", name, x, dphi, v.G)
		}
		for j, f := range axes {
			if e := math.Abs(r3.Dot(dg, f) - v.Grad[index[i][j]]); !(e < 2e-7*(slopeOf(v)+1/clear)+1e-13/h) {
				t.Errorf("%s at %v: slope %d %d of g %v, gradient %v", name, x, i, j, dg, v.Grad)
			}
		}
	}
}

// TestRingDifferences checks that potential, field and gradient belong together, close to slanted and bent surfaces and in
// the volume.
func TestRingDifferences(t *testing.T) {
	rng := rand.New(rand.NewPCG(5, 1))
	p := r3.Vec{X: 0.6, Y: 0.3, Z: -1}
	near := func(rho, z, d, f float64) r3.Vec {
		a := 2 * math.Pi * rng.Float64()
		rho += d * math.Cos(f)
		return r3.Vec{X: rho * math.Cos(a), Y: rho * math.Sin(a), Z: z + d*math.Sin(f)}
	}
	cone := must(NewCone(geom.Cone{Bottom: 1, Top: 0.25, Height: 2}, p))
	slope := math.Atan2(0.75, 2) // of the normal over the plane
	for _, major := range []float64{1, 0.27} {
		torus := must(NewTorus(geom.Torus{Major: major, Minor: 0.25}, p))
		for _, d := range []float64{0.4, 0.1, 0.02, 2e-3, 1e-5, -1e-5, -2e-3, -0.02, -0.1, -0.24} {
			for range 5 {
				f := 2 * math.Pi * rng.Float64()
				x := near(major+0.25*math.Cos(f), 0.25*math.Sin(f), d, f)
				clear := math.Hypot(math.Hypot(x.X, x.Y)-major, x.Z) - 0.25 // the nearer side may be that across the axis
				differs(t, "torus", torus, x, math.Abs(clear))
			}
		}
	}
	for _, d := range []float64{0.4, 0.1, 0.02, 2e-3, 1e-5, -1e-5, -2e-3, -0.02, -0.1} {
		for range 5 {
			z := 1.2*rng.Float64() - 0.6
			differs(t, "cone", cone, near(0.625-0.375*z, z, d, slope), math.Abs(d))
		}
	}
	shape := geom.Tube{Inner: 0.4, Outer: 1, Height: 1.5}
	for i, b := range []field.Source{must(NewAxialPower(shape, 1.5, 3)), must(NewRadialPower(shape, 1.5, 2)), must(NewRadialPower(shape, 1.5, -0.5))} {
		for _, d := range []float64{0.3, 0.1, 0.02, 2e-3, 1e-5, -1e-5, -2e-3, -0.02, -0.1} {
			differs(t, fmt.Sprint("power", i), b, near(1, 0.5*rng.Float64(), d, 0), min(0.25, math.Abs(d)))
			differs(t, fmt.Sprint("power", i), b, near(0.6+0.2*rng.Float64(), 0.75, d, math.Pi/2), min(0.2, math.Abs(d)))
			differs(t, fmt.Sprint("power", i), b, near(1, 0.75, math.Abs(d), 0.7), min(0.2, math.Abs(d)))
		}
	}
}

// TestPowersAreRings holds powers against rings of charge spread over ends, walls and volume, at points well outside.
func TestPowersAreRings(t *testing.T) {
	rng := rand.New(rand.NewPCG(6, 1))
	for _, c := range []struct {
		inner, n float64
		radial   bool
	}{{0, 3, false}, {0.3, 2, false}, {0.3, 12, false}, {0, 2, true}, {0, 0.5, true}, {0, 0, true}, {0.3, 1.5, true}, {0.1, -0.5, true},
		{0.1, -1, true}, {0.1, -2.5, true}, {0.2, -9, true}, {0, 11.5, true}} {
		const h, outer, factor = 0.75, 1, 1.5
		shape := geom.Tube{Inner: c.inner, Outer: outer, Height: 2 * h}
		var src field.Source
		var p, charge func(q float64) float64
		var radii func(visit func(s, w float64))
		peak := factor * math.Pow(h, c.n)
		if c.radial {
			b := must(NewRadialPower(shape, factor, c.n))
			src, p, charge, radii, peak = b, b.power, b.charge, b.radii, b.peak
		} else {
			b := must(NewAxialPower(shape, factor, int(c.n)))
			src, p, charge = b, b.power, b.charge
			radii = func(visit func(s, w float64)) { powerPanels(c.inner, outer, 8, visit) }
		}
		for range 8 {
			rho, z := 2.4*rng.Float64(), 1.2+rng.Float64()
			var phi, radial, axial float64
			ring := func(s, zeta, w float64) {
				v, _, s3, c3 := elliptic.Ring(s, rho, z-zeta, (s-rho)*(s-rho)+(z-zeta)*(z-zeta))
				phi += over4P * w * v
				radial += over4P * w * s * (rho*s3 - s*c3)
				axial += over4P * w * s * (z - zeta) * s3
			}
			radii(func(s, ws float64) {
				if !c.radial {
					ring(s, h, ws*p(h))
					ring(s, -h, -ws*p(-h))
				}
				powerPanels(-h, h, 16, func(zeta, wz float64) {
					if c.radial {
						ring(s, zeta, ws*wz*charge(s))
					} else {
						ring(s, zeta, ws*wz*charge(zeta))
					}
				})
			})
			if c.radial {
				powerPanels(-h, h, 16, func(zeta, wz float64) {
					ring(outer, zeta, wz*p(outer))
					if c.inner > 0 {
						ring(c.inner, zeta, -wz*p(c.inner))
					}
				})
			}
			got := field.At(src, r3.Vec{X: 0.6 * rho, Y: 0.8 * rho, Z: z}, field.Mean, everyWant)
			want := r3.Vec{X: 0.6 * radial, Y: 0.8 * radial, Z: axial}
			d, e := math.Abs(got.Phi-phi), r3.Norm(r3.Sub(got.G, want))
			if tol := 3e-15 * peak * (1 + math.Abs(c.n)); !(d < tol && e < tol) { // 30 u of the charge, which cancels
				t.Errorf("%+v at rho %v z %v: phi %v, rings %v; g %v, rings %v: %.2g, %.2g of %.2g", c, rho, z, got.Phi, phi, got.G, want, d, e, peak)
			}
		}
	}
}

// TestRingGradientClose checks that the gradient does not lose its digits as a point comes close to a slanted or bent
// surface: from 1e-12 to 1e-9 off it changes by 1e-9 times its own slope.
func TestRingGradientClose(t *testing.T) {
	rng := rand.New(rand.NewPCG(7, 1))
	p := r3.Vec{X: 0.6, Y: 0.3, Z: -1}
	cone, torus := must(NewCone(geom.Cone{Bottom: 1, Top: 0.25, Height: 2}, p)), must(NewTorus(geom.Torus{Major: 1, Minor: 0.25}, p))
	slope := math.Atan2(0.75, 2)
	for range 40 {
		azimuth, f, z := 2*math.Pi*rng.Float64(), 2*math.Pi*rng.Float64(), 1.6*rng.Float64()-0.8
		for _, c := range []struct {
			name   string
			src    field.Source
			rho, z float64
			normal float64
		}{
			{"cone", cone, 0.625 - 0.375*z, z, slope},
			{"torus", torus, 1 + 0.25*math.Cos(f), 0.25 * math.Sin(f), f},
		} {
			at := func(d float64) field.Value {
				rho := c.rho + d*math.Cos(c.normal)
				return field.At(c.src, r3.Vec{X: rho * math.Cos(azimuth), Y: rho * math.Sin(azimuth), Z: c.z + d*math.Sin(c.normal)}, field.Mean, everyWant)
			}
			for _, side := range []float64{-1, 1} {
				a, b := at(side*1e-12), at(side*1e-9)
				if _, _, e := apart(a, b); e > 3e-7 || a.ErrGrad > 1e-11 { // third derivatives below 300
					t.Errorf("%s at %v %v: gradients %v and %v, claimed %.2g", c.name, c.rho, c.z, a.Grad, b.Grad, a.ErrGrad)
				}
			}
		}
	}
}
