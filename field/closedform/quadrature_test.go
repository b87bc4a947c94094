package closedform_test

import (
	"math"
	"testing"

	"example.com/boundpole/field/closedform"
	"gonum.org/v1/gonum/integrate/quad"
	"gonum.org/v1/gonum/spatial/r3"
)

// integral is a Gauss-Legendre sum of 60 points over every interval between the marks.
func integral(f func(float64) float64, marks ...float64) float64 {
	s := 0.0
	for i := 1; i < len(marks); i++ {
		s += quad.Fixed(f, marks[i-1], marks[i], 60, quad.Legendre{}, 0)
	}
	return s
}

// TestQuadrature integrates the defining charge distributions in float64.
func TestQuadrature(t *testing.T) {
	const z = 1.75
	semi := r3.Vec{X: 1, Y: 1.5, Z: 2}
	ring := func(s, u float64) float64 { return closedform.RingAxisField(1, s, u) } // unit line density
	cube := func(x, y, w float64) float64 { return 1 / (4 * math.Pi * math.Hypot(math.Hypot(x, y), w)) }
	for _, c := range []struct {
		name      string
		got, want float64
		tol       float64 // relative
	}{
		{"disc field by rings", closedform.DiscAxisField(2, 1.5, z),
			integral(func(s float64) float64 { return 2 * ring(s, z) }, 0, 1.5), 1e-14}, // smooth integrand, sum of 60 roundings
		{"annulus potential by rings", closedform.AnnulusAxisPotential(2, 0.5, 1.5, z),
			integral(func(s float64) float64 { return 2 * closedform.RingAxisPotential(1, s, z) }, 0.5, 1.5), 1e-14}, // as above
		{"charged cylinder by discs", closedform.ChargedCylinderAxisField(2, 1.5, 3, z),
			integral(func(w float64) float64 { return closedform.DiscAxisField(2, 1.5, z-w) }, -1.5, 0, 1.5), 1e-14}, // as above
		{"linear cylinder by discs", closedform.LinearCylinderAxisField(2, 1.5, 3, z),
			closedform.DiscAxisField(3, 1.5, z-1.5) + closedform.DiscAxisField(3, 1.5, z+1.5) -
				integral(func(w float64) float64 { return closedform.DiscAxisField(2, 1.5, z-w) }, -1.5, 0, 1.5), 1e-13}, // cancels by ten
		{"radial tube by bands and discs", closedform.RadialTubeAxisField(2, 0.5, 1.5, 3, z),
			integral(func(w float64) float64 {
				return 2*(ring(1.5, z-w)-ring(0.5, z-w)) - integral(func(s float64) float64 { return 2 * ring(s, z-w) / s }, 0.5, 0.8, 1.5)
			}, -1.5, 0, 1.2, 1.5), 1e-13}, // near-singular at w = z, a quarter off
		{"rectangle potential by segments", closedform.RectangleAxisPotential(2, 1.5, 3, z),
			integral(func(x float64) float64 { return closedform.SegmentPotential(2, 3, math.Hypot(x, z), 0) }, -0.75, 0, 0.75), 1e-14}, // smooth
		{"box potential by rectangles", closedform.BoxCentrePotential(2, r3.Vec{X: 1, Y: 2, Z: 3}),
			2 * integral(func(w float64) float64 { return closedform.RectangleAxisPotential(2, 1, 2, w) }, 0, 0.1, 0.5, 1.5), 1e-12}, // w log w at 0
		{"cube corner in one octant", closedform.CubeCornerPotential(1, 2),
			// three congruent pyramids about the corner; (x, y, w) = w (a, b, 1)
			3 * integral(func(w float64) float64 { return w * w }, 0, 2) * integral(func(a float64) float64 {
				return integral(func(b float64) float64 { return cube(a, b, 1) }, 0, 1)
			}, 0, 1) * (2.0 * 2 / 2) / (8.0 / 3), 1e-14}, // w^2 dw/w instead of w^2 dw: 2 against 8/3
		{"disc self energy by potentials", closedform.DiscSelfEnergy(2, 1.5),
			integral(func(s float64) float64 { return closedform.DiscRimPotential(2, s) * 2 * math.Pi * s * 2 }, 0, 1.5), 1e-14}, // quadratic, exact
		{"disc force as slope of the energy", closedform.DiscPairForce(2, 3, 1.5, z),
			slope(func(d float64) float64 { return -closedform.DiscPairEnergy(2, 3, 1.5, d) }, z), 1e-9}, // difference quotient
		{"magnetometric factor as mean of ballistic", closedform.CylinderMagnetometricFactor(1.5, 3),
			// mean over sections at w of [flux of both end discs] = (1/L) int_0^L 2 F(w)/A dw
			integral(func(w float64) float64 { return 2 * closedform.DiscPairForce(1, 1, 1.5, w) / (math.Pi * 1.5 * 1.5) }, 0, 1e-4, 1e-2, 0.3, 3) / 3, 1e-8}, // w log w at 0
		{"ellipsoid flux jump", closedform.EllipsoidAxisField(1, semi, 1+1e-12),
			1 - closedform.EllipsoidFactors(semi).X, 1e-11}, // 1e-12 off the face
		{"Halbach slab by layers", closedform.HalbachArrayField(2, 3, 0.5, 0.25),
			integral(func(w float64) float64 { return 2 * 2 * math.Pi / 3 * math.Exp(-2*math.Pi/3*(0.25+w)) }, 0, 0.5), 1e-14}, // smooth
		{"segment by points", closedform.SegmentPotential(2, 3, 0.5, 2),
			integral(func(w float64) float64 { return closedform.PointPotential(2, r3.Vec{X: 0.5, Z: 2 - w}) }, -1.5, 0, 1, 1.5), 1e-13}, // near-singular
		{"induction by current loops", closedform.CylinderAxisInduction(2, 1.5, 3, z),
			integral(func(w float64) float64 { return 2 * 1.5 * 1.5 / 2 / math.Pow(math.Hypot(1.5, z-w), 3) }, -1.5, 0, 1.5), 1e-14}, // smooth
	} {
		if d := math.Abs(c.got-c.want) / math.Abs(c.want); !(d <= c.tol) {
			t.Errorf("%s: got %.17g, want %.17g, relative difference %.2g > %.2g", c.name, c.got, c.want, d, c.tol)
		}
	}
}

// slope is a central difference of fourth order.
func slope(f func(float64) float64, x float64) float64 {
	const h = 1e-3
	return (8*(f(x+h)-f(x-h)) - (f(x+2*h) - f(x-2*h))) / (12 * h)
}

// TestGradients: g = -grad phi for every pair of a potential and a field in space.
func TestGradients(t *testing.T) {
	p, x := r3.Vec{X: 1, Y: -2, Z: 0.5}, r3.Vec{X: 0.75, Y: 0.5, Z: 1.125}
	for name, c := range map[string]struct {
		phi func(r3.Vec) float64
		g   func(r3.Vec) r3.Vec
	}{
		"point":        {func(x r3.Vec) float64 { return closedform.PointPotential(2, x) }, func(x r3.Vec) r3.Vec { return closedform.PointField(2, x) }},
		"two poles":    {func(x r3.Vec) float64 { return closedform.TwoPolePotential(2, 1, x) }, func(x r3.Vec) r3.Vec { return closedform.TwoPoleField(2, 1, x) }},
		"dipole":       {func(x r3.Vec) float64 { return closedform.DipolePotential(p, x) }, func(x r3.Vec) r3.Vec { return closedform.DipoleField(p, x) }},
		"sphere out":   {func(x r3.Vec) float64 { return closedform.SpherePotential(p, 1, x) }, func(x r3.Vec) r3.Vec { return closedform.SphereField(p, 1, x) }},
		"sphere in":    {func(x r3.Vec) float64 { return closedform.SpherePotential(p, 2, x) }, func(x r3.Vec) r3.Vec { return closedform.SphereField(p, 2, x) }},
		"hollow out":   {func(x r3.Vec) float64 { return closedform.HollowSpherePotential(p, 0.5, 1, x) }, func(x r3.Vec) r3.Vec { return closedform.HollowSphereField(p, 0.5, 1, x) }},
		"hollow wall":  {func(x r3.Vec) float64 { return closedform.HollowSpherePotential(p, 1, 2, x) }, func(x r3.Vec) r3.Vec { return closedform.HollowSphereField(p, 1, 2, x) }},
		"endless out":  {func(x r3.Vec) float64 { return closedform.EndlessCylinderPotential(p, 0.5, x) }, func(x r3.Vec) r3.Vec { return closedform.EndlessCylinderField(p, 0.5, x) }},
		"endless in":   {func(x r3.Vec) float64 { return closedform.EndlessCylinderPotential(p, 2, x) }, func(x r3.Vec) r3.Vec { return closedform.EndlessCylinderField(p, 2, x) }},
		"cylinder":     onAxis(func(z float64) float64 { return closedform.CylinderAxisPotential(2, 1, 2, z) }, func(z float64) float64 { return closedform.CylinderAxisField(2, 1, 2, z) }),
		"tube":         onAxis(func(z float64) float64 { return closedform.TubeAxisPotential(2, 1, 1.5, 2, z) }, func(z float64) float64 { return closedform.TubeAxisField(2, 1, 1.5, 2, z) }),
		"disc":         onAxis(func(z float64) float64 { return closedform.DiscAxisPotential(2, 1, z) }, func(z float64) float64 { return closedform.DiscAxisField(2, 1, z) }),
		"annulus":      onAxis(func(z float64) float64 { return closedform.AnnulusAxisPotential(2, 1, 2, z) }, func(z float64) float64 { return closedform.AnnulusAxisField(2, 1, 2, z) }),
		"rectangle":    onAxis(func(z float64) float64 { return closedform.RectangleAxisPotential(2, 1, 2, z) }, func(z float64) float64 { return closedform.RectangleAxisField(2, 1, 2, z) }),
		"ring":         onAxis(func(z float64) float64 { return closedform.RingAxisPotential(2, 1, z) }, func(z float64) float64 { return closedform.RingAxisField(2, 1, z) }),
		"plane":        onAxis(func(z float64) float64 { return closedform.PlanePotential(2, z) }, func(z float64) float64 { return closedform.PlaneField(2, z) }),
		"line":         onAxis(func(z float64) float64 { return closedform.LinePotential(2, z, 3) }, func(z float64) float64 { return closedform.LineField(2, z) }),
		"shell":        onAxis(func(z float64) float64 { return closedform.ChargedShellPotential(2, 1, z) }, func(z float64) float64 { return closedform.ChargedShellField(2, 1, z) }),
		"ball":         onAxis(func(z float64) float64 { return closedform.ChargedSpherePotential(2, 3, z) }, func(z float64) float64 { return closedform.ChargedSphereField(2, 3, z) }),
		"central":      onAxis(func(z float64) float64 { return closedform.CentralPowerPotential(2, 1.5, 3, z) }, func(z float64) float64 { return closedform.CentralPowerField(2, 1.5, 3, z) }),
		"radial":       onAxis(func(z float64) float64 { return closedform.RadialPowerPotential(2, 1.5, 3, z) }, func(z float64) float64 { return closedform.RadialPowerField(2, 1.5, 3, z) }),
		"slab":         onAxis(func(z float64) float64 { return closedform.SlabPotential(p, 3, z) }, func(z float64) float64 { return closedform.SlabField(p, 3, z).Z }),
		"two-disc rod": onAxis(func(z float64) float64 { return closedform.CylinderAxisPotential(2, 1, 2, z) }, func(z float64) float64 { return closedform.TwoDiscAxisField(2, 1, 2, z) }),
	} {
		var want r3.Vec
		want.X = -slope(func(h float64) float64 { return c.phi(r3.Vec{X: h, Y: x.Y, Z: x.Z}) }, x.X)
		want.Y = -slope(func(h float64) float64 { return c.phi(r3.Vec{X: x.X, Y: h, Z: x.Z}) }, x.Y)
		want.Z = -slope(func(h float64) float64 { return c.phi(r3.Vec{X: x.X, Y: x.Y, Z: h}) }, x.Z)
		got := c.g(x)
		if d := r3.Norm(r3.Sub(got, want)) / r3.Norm(got); !(d <= 1e-9) { // h^4 phi^(5) of order 1e-10
			t.Errorf("%s: g = %v, -grad phi = %v, relative difference %.2g", name, got, want, d)
		}
	}
}

// onAxis lifts functions of the height to vectors along z.
func onAxis(phi, g func(float64) float64) struct {
	phi func(r3.Vec) float64
	g   func(r3.Vec) r3.Vec
} {
	return struct {
		phi func(r3.Vec) float64
		g   func(r3.Vec) r3.Vec
	}{
		func(x r3.Vec) float64 { return phi(x.Z) },
		func(x r3.Vec) r3.Vec { return r3.Vec{Z: g(x.Z)} },
	}
}
