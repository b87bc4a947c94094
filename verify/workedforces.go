package verify

import (
	"context"
	"fmt"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"example.com/boundpole/field/force"
	"example.com/boundpole/field/image"
	"example.com/boundpole/geom"
	"example.com/boundpole/magnet"
	"gonum.org/v1/gonum/spatial/r3"
)

// on returns what a field does to a charge, in natural units.
func (l *lab) on(c *bound.Charge, others field.Source, accuracy float64) force.Result {
	if l.err != nil {
		return force.Result{}
	}
	r, err := force.On(context.Background(), c, l.altered(others), &force.Settings{Accuracy: accuracy, Overlaps: true})
	l.note(err)
	return r
}

// workedForces returns jobs with forces and torques, against values that were computed by hand or by brute force before
// the library had forces, to the digits that were noted.
func workedForces() []trial {
	return append(append(latchPulls(), couplingTorques()...), voiceCoil()...)
}

func noted(half float64) limit { return within(half, "half a unit of the last digit noted") }

// latchPulls is a disc D12 x 4 mm, Br 1.30 T, on thick ideal iron: the pull of the image at twice the gap.
func latchPulls() []trial {
	var all []trial
	for _, c := range []struct{ gap, want, half float64 }{
		{0, 36.793, 5e-4}, {0.1, 31.24, 5e-3}, {0.25, 26.43, 5e-3}, {0.5, 21.094, 5e-4}, {1, 14.542, 5e-4}, {2, 7.853, 5e-4}, {4, 2.836, 5e-4},
	} {
		all = append(all, trial{
			fmt.Sprintf("latch, gap %g mm", c.gap), Reference, plain("series of Bessel integrals by hand"), "newtons; disc D12 x 4 mm, Br 1.30 T, image in ideal iron",
			noted(c.half), func(l *lab) result {
				m := l.uniform(geom.At(geom.Cylinder{Radius: 6, Height: 4}, geom.Translate(r3.Vec{Z: 2 + c.gap})), r3.Vec{Z: 1.3 / magnet.Mu0})
				wall := image.Image{Source: m, Plane: image.Iron(r3.Vec{}, r3.Vec{Z: 1})}
				r := l.on(m, wall, 1e-8)
				return number(c.want, -1e-6*magnet.Mu0*r.Force.Z)
			},
		})
	}
	return all
}

// couplingTorques is two facing rings of twelve sectors, 15 to 30 mm, 8 mm thick, 4 mm apart, poles +-1.25 T.
func couplingTorques() []trial {
	ring := func(l *lab, z, degrees float64) (all bound.Assembly) {
		sector := geom.Arc{Inner: 15, Outer: 30, Height: 8, From: 0, To: 30, Degrees: true}
		poles := [2]*bound.Charge{l.uniform(sector, r3.Vec{Z: 1.25 / magnet.Mu0}), l.uniform(sector, r3.Vec{Z: -1.25 / magnet.Mu0})}
		if l.err != nil {
			return nil
		}
		for i := range 12 {
			turn, err := geom.Turn(r3.Vec{Z: 1}, 30*float64(i)+degrees)
			l.note(err)
			all = append(all, bound.Member{Charge: poles[i%2].At(geom.Translate(r3.Vec{Z: z}).Then(turn))})
		}
		return all
	}
	torque := func(l *lab, degrees float64) float64 {
		top := ring(l, 12, degrees)
		if l.err != nil {
			return 0
		}
		return 12 * 1e-9 * magnet.Mu0 * l.on(top[0].Charge, ring(l, 0, 0), 1e-5).Torque.Z // every sector alike
	}
	return []trial{
		{"pump coupling, half a pole", Reference, plain("sum over point charges by brute force"), "newton metres at 15 degrees; rings of 12 poles, gap 4 mm, Br 1.25 T",
			within(0.003, "scatter of the brute-force sum"), func(l *lab) result { return number(-4.866, torque(l, 15)) }},
		{"pump coupling, poles facing", Identity, plain("symmetry"), "newton metres at 0 degrees",
			within(1e-4, "1e-5 of the sum of magnitudes that cancel"), func(l *lab) result { return number(0, torque(l, 0)) }},
	}
}

// voiceCoil is a ring 10 to 20 mm, 8 mm high, magnetized outwards with 0.40 T: B on its axis, volume charge included.
func voiceCoil() []trial {
	var all []trial
	for _, c := range []struct{ z, want float64 }{{6, -59.277}, {10, -56.523}, {14, -41.027}, {20, -21.825}} {
		all = append(all, trial{
			fmt.Sprintf("voice coil ring, z=%g mm", c.z), Reference, plain("direct integration by hand"), "millitesla on the axis; ring 10/20 x 8 mm, radial 0.40 T",
			noted(5e-4), func(l *lab) result {
				ring := l.charge(geom.Tube{Inner: 10, Outer: 20, Height: 8}, field.RadialPower{Coefficient: 0.4 / magnet.Mu0})
				return number(c.want, 1e3*magnet.Mu0*l.g(ring, r3.Vec{Z: c.z}).Z)
			},
		})
	}
	return all
}
