package force

import (
	"math"

	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/internal/elliptic"
	"example.com/boundpole/geom"
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// stack is uniformly charged discs about one axis: cylinders and tubes polarized along it.
type stack struct {
	origin pair.Vec
	axis   r3.Vec
	discs  []charged
}

// charged is a disc at a height on the axis with charge per area; the hole of an annulus is a disc too.
type charged struct{ radius, z, sigma float64 }

// stackOf returns the discs of c, if all its charge is on discs and annuli and uniform on each.
func stackOf(c *bound.Charge) (s stack, ok bool) {
	for _, v := range c.Volumes {
		if v.Min != 0 || v.Max != 0 {
			return s, false
		}
	}
	var pose geom.Pose
	if at, placed := c.Body().(geom.Placed); placed {
		pose = at.Pose
	}
	s.origin, s.axis = pose.Origin(), pose.VectorToOuter(r3.Vec{Z: 1})
	for i := range c.Layers {
		l := &c.Layers[i]
		if l.Min == 0 && l.Max == 0 {
			continue
		}
		if l.Min != l.Max {
			return s, false
		}
		surface := l.Face.Surface
		if at, placed := surface.(geom.PlacedSurface); placed {
			surface = at.Surface
		}
		switch f := surface.(type) {
		case geom.Disc:
			s.discs = append(s.discs, charged{f.Radius, f.Z, l.Min})
		case geom.Annulus:
			s.discs = append(s.discs, charged{f.Outer, f.Z, l.Min}, charged{f.Inner, f.Z, -l.Min})
		default:
			return s, false
		}
	}
	return s, len(s.discs) > 0
}

func (s stack) mirrored(o *other) stack {
	if o.plane == nil {
		return s
	}
	t := stack{origin: o.plane.Reflect(s.origin), axis: o.plane.Mirror(s.axis)}
	for _, d := range s.discs {
		d.sigma *= o.plane.Factor()
		t.discs = append(t.discs, d)
	}
	return t
}

// coaxial returns what one stack of discs does to another about the same axis; ok is false if they are no such stacks, or so far
// apart that the form loses too many digits.
func coaxial(p *part, o *other, g goal, about r3.Vec) (out outcome, ok bool) {
	if p.charge == nil || o.charge == nil || g.stiff {
		return out, false
	}
	a, ok := stackOf(p.charge)
	if !ok {
		return out, false
	}
	b, ok := stackOf(o.charge)
	if !ok {
		return out, false
	}
	b = b.mirrored(o)
	d := a.origin.Sub(b.origin).Value()
	along := r3.Dot(d, b.axis)
	size := p.reach + r3.Norm(d)
	if r3.Norm(r3.Cross(a.axis, b.axis)) > 8*0x1p-53 || r3.Norm(r3.Sub(d, r3.Scale(along, b.axis))) > 8*0x1p-53*size {
		return out, false
	}
	turn := math.Copysign(1, r3.Dot(a.axis, b.axis))
	middle := func(s *stack) (lo, hi float64) {
		lo, hi = math.Inf(1), math.Inf(-1)
		for _, e := range s.discs {
			lo, hi = min(lo, e.z), max(hi, e.z)
		}
		return lo, hi
	}
	alo, ahi := middle(&a)
	blo, bhi := middle(&b)
	above := math.Copysign(1, along+turn*(alo+ahi)/2-(blo+bhi)/2)
	var axial float64
	s := &out.total
	for _, e := range a.discs {
		for _, f := range b.discs {
			q := e.sigma * f.sigma
			z := along + turn*e.z - f.z
			if math.Abs(z) <= closeTo*size { // the limit from the side on which the part is
				z = 0
			}
			w := discs(f.radius, e.radius, math.Abs(z))
			side := above
			if z != 0 {
				side = math.Copysign(1, z)
			}
			axial += q * side * w.force
			s.v[atEnergy] += q * w.energy
			s.err.Force += math.Abs(q) * w.force0 * 16 * 0x1p-53
			s.err.Energy += math.Abs(q) * w.energy0 * 32 * 0x1p-53
			s.size.Force += math.Abs(q) * w.force
			s.size.Energy += math.Abs(q) * w.energy
		}
	}
	force := r3.Scale(axial, b.axis)
	arm := r3.Sub(a.origin.Value(), about)
	s.push(force, r3.Cross(arm, force), 0)
	s.size.Torque, s.err.Torque = s.size.Force*r3.Norm(arm), s.err.Force*r3.Norm(arm)
	return out, out.settle(s, s, g)
}

// discPair is what happens between two coaxial discs of unit charge per area: repulsion and energy, and the sizes of their terms.
type discPair struct{ force, energy, force0, energy0 float64 }

// discs returns that for the radii a and b at the distance z >= 0; at z = 0 the limit.
//
// With S of elliptic.Circle, the integral of the radial field b S = int_0^z T1, and the potentials I of either disc at the other's rim,
//
//	4 pi F = 2 pi^2 min(a,b)^2 - 2 pi b^2 S,   4 pi W = (2 pi a^2 I_b(a, z) + 2 pi b^2 I_a(b, z) - 4 pi z F)/3.
//
// Source: [Eason1955] I(1,1;-1) for the force; the energy is a homogeneous function of the third degree in a, b and z, and Euler's
// theorem gives it by its derivatives. Against another form in TestReference.
func discs(a, b, z float64) discPair {
	const k = 1 / (4 * math.Pi)
	gap := a - b
	least := min(a, b)
	most := 2 * math.Pi * math.Pi * least * least
	pull := 0.0
	if z > 0 {
		pull = 2 * math.Pi * b * b * elliptic.OfCircle(a, b, z, gap, gap*gap+z*z).S
	}
	f := most - pull
	one, one0 := rimPotential(a, b, z)
	two, two0 := rimPotential(b, a, z)
	c := 2 * math.Pi / 3
	return discPair{
		force: k * f, force0: k * (most + pull),
		energy:  k * (c*(a*a*two+b*b*one) - z*f/3),
		energy0: k * (c*(a*a*two0+b*b*one0) + z*(most+pull)/3),
	}
}

// rimPotential returns 4 pi times the potential of the disc of radius a at the radius b and height z, and the size of its terms.
func rimPotential(a, b, z float64) (value, size float64) {
	gap := a - b
	if gap == 0 && z == 0 {
		return 4 * a, 4 * a
	}
	u, t1, omega := elliptic.Disc(a, b, z, gap, gap*gap+z*z)
	return a*u - b*t1 - z*omega, a*u + b*t1 + z*omega
}
