package verify

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/element"
	"example.com/boundpole/geom"
	"example.com/boundpole/verify/law"
	"gonum.org/v1/gonum/spatial/r3"
)

// laws holds one source of each kind against verify/law.
func laws() []trial {
	var all []trial
	add := func(name string, make func(l *lab) (field.Source, law.Claims)) {
		all = append(all, trial{
			name, Law, plain("laws of static fields"),
			"violations of curl, divergence, means, flux, jumps, far decay, gradient, batches",
			within(0, "each law has its tolerance in verify/law"), func(l *lab) result {
				src, claims := make(l)
				if l.err != nil {
					return result{}
				}
				claims.Potential, claims.Seed, claims.Samples = true, 7, 4
				err := law.Source(l.altered(src), claims)
				broken := law.Violations(err)
				if len(broken) == 0 {
					l.note(err) // claims that cannot be used
				}
				return number(0, float64(len(broken)))
			},
		})
	}
	for _, s := range samples() {
		add(s.name, func(l *lab) (field.Source, law.Claims) {
			c := s.build(l, geom.Pose{})
			return c, law.Claims{
				Bodies: []geom.Body{s.body}, Bounds: s.body.Bounds(), Total: &law.Total{Moment: &c.Moment}, Order: 3,
				Faces: law.FacesOf(s.body, s.p, 2, s.reach), Accuracy: 1e-11,
			}
		})
	}
	point, dipole := element.Point{Charge: 2}, element.Dipole{Moment: sheared.Value}
	room := r3.Box{Min: r3.Vec{X: -2, Y: -2, Z: -2}, Max: r3.Vec{X: 2, Y: 2, Z: 2}}
	add("point charge", func(*lab) (field.Source, law.Claims) {
		return point, law.Claims{Region: room, Clear: r3.Norm, Total: &law.Total{Charge: 2}, Order: 2, Accuracy: 1e-12}
	})
	add("dipole", func(*lab) (field.Source, law.Claims) {
		return dipole, law.Claims{Region: room, Clear: r3.Norm, Total: &law.Total{Moment: &dipole.Moment}, Order: 3, Accuracy: 1e-12}
	})
	sheet := func(name string, make func(l *lab) field.Source, charge, sigma float64, at r3.Vec, radius float64) {
		add(name, func(l *lab) (field.Source, law.Claims) {
			return make(l), law.Claims{
				Region: room, Clear: func(x r3.Vec) float64 { return max(math.Abs(x.Z), math.Hypot(x.X, x.Y)-radius) },
				Total: &law.Total{Charge: charge}, Order: 2, Accuracy: 1e-11,
				Faces: []law.Face{{X: at, Normal: r3.Vec{Z: 1}, Sigma: sigma, Reach: 0.25}},
			}
		})
	}
	sheet("disc", func(l *lab) field.Source { return l.disc(1, 0, 1.5) }, 1.5*math.Pi, 1.5, r3.Vec{X: 0.25, Y: -0.5}, 1)
	sheet("annulus", func(l *lab) field.Source { return l.annulus(0.25, 1, 0, 1.5) }, 1.5*math.Pi*0.9375, 1.5, r3.Vec{X: 0.375, Y: -0.5}, 1)
	sheet("polygon", func(*lab) field.Source { return rectangle(2, 1.5, 0, 1.5) }, 4.5, 1.5, r3.Vec{X: 0.25, Y: -0.25}, 1.25)
	sheet("polygon, linear charge", func(*lab) field.Source {
		return element.NewPolygon(rectangleShape(2, 1.5, 0), 1, r3.Vec{X: 0.5, Y: -1})
	}, 3, 1.375, r3.Vec{X: 0.25, Y: -0.25}, 1.25)
	add("assembly of turned bodies", func(l *lab) (field.Source, law.Claims) {
		pose := tilted(l)
		a, b := samples()[4].build(l, pose), samples()[1].build(l, geom.Translate(r3.Vec{X: -3}))
		moment := r3.Add(a.Moment, b.Moment)
		return field.Sum{a, b}, law.Claims{
			Bodies: []geom.Body{a.Body(), b.Body()}, Total: &law.Total{Moment: &moment}, Order: 3, Accuracy: 1e-11,
		}
	})
	return all
}
