package current

import (
	"errors"
	"fmt"
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// Guide is a tube in whose thin wall flux circulates: curl A is the flux density in the wall, and nothing else. What current
// is to b, that flux is to A; so A is the field of a charge, that of a field M_A in the bore with curl M_A = the flux density:
//
//	A = g outside, g + M_A in the bore,   g = -grad chi,   chi the potential of the charge M_A.n, -div M_A.
//
// Where M_A is free of divergence and runs along the wall, as here, only the ends of the tube are charged, with M_A.n; a tube
// closed on itself has no charge and no A outside. The charge is M_A.n, not A.n, which passes through the end steadily.
//
// A is in Coulomb gauge, and that is all that is claimed of it at a point: only its closed loop integrals (LoopIntegral) and
// its curl are free of a choice of gauge. Outside the wall the flux density is zero. Everything is static: a tube does nothing
// to charges at rest; a change of its flux would.
//
// Units: natural; A, M_A and the flux by length of the wall in one unit, chi in that times length. In SI T m and T m^2.
// Frame: that of the body.
// Domain: as the bound charge of the bore. NaN in, NaN out. Built by NewGuide, NewArcGuide and NewThickGuide; immutable.
// Singular: |A| grows as log(1/d) at distance d from the rims of the ends; on them A is NaN, Chi finite, field.OnEdge. On the wall
// A jumps along the tube: the mean of both sides, or the side asked for.
// Accuracy: straight: 1e-12 max(|A|, 1e-3 A0 min(1, (a/R)^3)), a the bounding radius, and chi likewise (TestGuideReference).
// Arcs 1e-12 of the same (TestArcGuideEdges), thick walls 1e-10 (TestThickGuide).
// Source: Helmholtz's theorem: A = (1/4pi) int B x (x-r)/|x-r|^3 dV for the flux density B [own derivation]; the ends as
// [Jackson1999] sec. 5.9 has the poles of a magnet.
type Guide struct {
	body   geom.Body
	place  geom.Locator
	pose   geom.Pose
	m      field.Polarization // M_A, in the frame of the bore
	ends   field.Source       // charge of the ends, in the outer frame
	direct *Bound             // the wall's flux as a current, nil where A is g + M_A only
}

// NewGuide returns the straight tube whose bore is the body: flux by length flux, in T m if A is, circulates in its wall right-handed
// about the body's own z axis, so that far from the ends A is flux along z in the bore. The body is a cylinder or tube, a prism
// with level ends or a box. In the wall round the hole of a tube the flux circulates the other way round.
func NewGuide(bore geom.Body, flux float64) (*Guide, error) {
	if err := straight(bore); err != nil {
		return nil, err
	}
	m := field.Uniform{P: r3.Vec{Z: flux}}
	c, err := bound.Of(bore, m)
	if err != nil {
		return nil, err
	}
	direct, err := Of(bore, m)
	if err != nil {
		return nil, err
	}
	return &Guide{body: bore, place: c, pose: direct.pose, m: m, ends: c, direct: direct}, nil
}

// straight refuses what is no straight tube along its z axis.
func straight(bore geom.Body) error {
	if at, ok := bore.(geom.Placed); ok {
		bore = at.Body
	}
	switch b := bore.(type) {
	case geom.Cylinder, geom.Tube, geom.Box:
		return nil
	case geom.Prism:
		if b.BottomSlope == [2]float64{} && b.TopSlope == [2]float64{} {
			return nil
		}
		return fmt.Errorf("current: bore with sloping ends %v, %v; give level ones", b.BottomSlope, b.TopSlope)
	}
	return fmt.Errorf("current: a bore of type %T is no straight tube along z; give a cylinder, tube, box or prism", bore)
}

// NewArcGuide returns the bent tube whose bore is the arc: flux webers by radian, in T m^2 if A is in T m, circulate in its wall,
// so that M_A = flux/s along phi in the bore, s the distance from the z axis. A full turn is closed: A = M_A in the bore and zero
// elsewhere.
func NewArcGuide(bore geom.Arc, pose geom.Pose, flux float64) (*Guide, error) {
	if err := bore.Check(); err != nil {
		return nil, err
	}
	if flux-flux != 0 {
		return nil, fmt.Errorf("current: flux %v by radian is not finite; give a finite number", flux)
	}
	if bore.Inner == 0 {
		return nil, errors.New("current: the bore of an arc reaches the axis, where its flux would be infinite; give an inner radius")
	}
	body := geom.At(bore, pose)
	g := &Guide{body: body, pose: pose, m: vortex(flux), ends: field.Sum{}, place: geom.LocatorOf(body)}
	if bore.Full() || flux == 0 {
		return g, nil
	}
	ends, err := newArcEnds(bore, flux)
	if err != nil {
		return nil, err
	}
	g.ends = field.Posed{Source: ends, Pose: pose}
	return g, nil
}

// NewThickGuide returns the straight tube with a wall of some thickness, the body of wall, in which the flux density is the same all
// over, right-handed about z: M_A is density times the thickness in the bore and falls to zero across the wall. No value of A is
// given on the two circles where bore and wall meet in an end, although it exists.
func NewThickGuide(wall geom.Tube, pose geom.Pose, density float64) (*Guide, error) {
	if err := wall.Check(); err != nil {
		return nil, err
	}
	m := taper{wall.Inner, wall.Outer, density}
	bore := geom.Cylinder{Radius: wall.Inner, Height: wall.Height}
	inner, err := bound.Of(geom.At(bore, pose), field.Uniform{P: m.At(r3.Vec{})})
	if err != nil {
		return nil, err
	}
	outer, err := bound.Of(geom.At(wall, pose), m)
	if err != nil {
		return nil, err
	}
	body := geom.At(geom.Cylinder{Radius: wall.Outer, Height: wall.Height}, pose)
	return &Guide{body: body, place: geom.LocatorOf(body), pose: pose, m: m, ends: field.Sum{inner, outer}}, nil
}

// taper is the field along z that falls from the inner to the outer radius with the slope density.
type taper struct{ inner, outer, density float64 }

// At returns the vector at x.
func (t taper) At(x r3.Vec) r3.Vec {
	return r3.Vec{Z: t.density * max(0, t.outer-max(t.inner, math.Hypot(x.X, x.Y)))}
}

// Divergence returns 0.
func (t taper) Divergence(r3.Vec) float64 { return 0 }

// curl returns the flux density at x.
func (t taper) curl(x r3.Vec) r3.Vec {
	s := math.Hypot(x.X, x.Y)
	if s < t.inner || s > t.outer {
		return r3.Vec{}
	}
	return r3.Scale(t.density/s, r3.Vec{X: -x.Y, Y: x.X})
}

// vortex is the field of strength/s along phi.
type vortex float64

// At returns the vector at x.
func (v vortex) At(x r3.Vec) r3.Vec {
	k := float64(v) / (x.X*x.X + x.Y*x.Y)
	return r3.Vec{X: -k * x.Y, Y: k * x.X}
}

// Divergence returns 0.
func (v vortex) Divergence(r3.Vec) float64 { return 0 }

// Body returns the bore as it was given.
func (g *Guide) Body() geom.Body { return g.body }

// Ends returns the charge of the ends as a source of its own: chi is its potential, and A outside is its g.
func (g *Guide) Ends() field.Source { return g.ends }

// Bounds returns the box of the bore.
func (g *Guide) Bounds() r3.Box { return g.body.Bounds() }

// GuideValue is what a guide gives at a point.
type GuideValue struct {
	Chi          float64 // the potential of the ends
	A            r3.Vec
	ErrChi, ErrA float64 // bounds on the numerical error; +Inf where no claim is made
	Inside       bool    // in the bore, wall and ends included if that side was asked for
	Status       field.Status
}

// At returns the value at x.
func (g *Guide) At(x r3.Vec, side field.Side) GuideValue {
	return g.Values(field.PointsOf(x), side)[0]
}

// Values returns the values at a batch of points.
func (g *Guide) Values(at *field.Points, side field.Side) []GuideValue {
	n := at.Len()
	charge := field.NewValues(n, field.WantPhi|field.WantG|field.WantErr)
	field.Evaluate(g.ends, charge, at, side)
	var flux *Values
	if g.direct != nil {
		flux = NewValues(n)
		g.direct.Induction(flux, at, side)
	}
	out := make([]GuideValue, n)
	for i := range out {
		c := charge.At(i)
		v := GuideValue{Chi: c.Phi, ErrChi: c.ErrPhi, Status: c.Status}
		if c.Status == field.BadInput {
			v.A, v.ErrA = c.G, c.ErrG
			out[i] = v
			continue
		}
		p := at.At(i)
		place := g.place.Locate(p.X, p.Slack)
		share := shareOf(place.Region, side)
		v.Inside = share == 1
		if flux != nil { // A is to the flux in the wall what b is to a current
			f := flux.At(i)
			v.A, v.ErrA, v.Status = f.B, f.ErrB, f.Status
		} else {
			v.A, v.ErrA = c.G, c.ErrG
			if place.Edge && share != 0 {
				v.A, v.ErrA, v.Status = field.Nowhere(field.OnEdge).G, math.Inf(1), max(v.Status, field.OnEdge)
			} else if share != 0 {
				m := g.pose.VectorToOuter(g.m.At(g.pose.ToLocal(p.X).Value()))
				v.A = r3.Add(v.A, r3.Scale(share, m))
				v.ErrA += 8 * u * (r3.Norm(m) + r3.Norm(v.A))
			}
			if place.Region == geom.On {
				v.Status = max(v.Status, field.OnFace)
			}
		}
		out[i] = v
	}
	return out
}

// shareOf returns how much of M_A counts.
func shareOf(region geom.Region, side field.Side) float64 {
	switch {
	case region == geom.Inside, region == geom.On && side == field.Inside:
		return 1
	case region == geom.On && side == field.Mean:
		return 0.5
	}
	return 0
}

// Induction computes A as the vector potential and the flux density as its curl: zero but in the wall, NaN on a wall without
// thickness. See Source.
func (g *Guide) Induction(dst *Values, at *field.Points, side field.Side) {
	for i, v := range g.Values(at, side) {
		r := Value{A: v.A, ErrA: v.ErrA, Status: v.Status}
		if t, ok := g.m.(taper); ok && v.Inside {
			r.B = g.pose.VectorToOuter(t.curl(g.pose.ToLocal(at.At(i).X).Value()))
			r.ErrB = 8 * u * r3.Norm(r.B)
		} else if v.Status != field.Regular {
			n := nowhere(v.Status)
			r.B, r.ErrB = n.B, n.ErrB
		}
		dst.Set(i, r)
	}
}
