package solve

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"gonum.org/v1/gonum/spatial/r3"
)

// trusted is the relative accuracy that the closed forms keep by proof: the suite holds every one of them to 1e-12 of
// max(size, floor) against independent references. From there up the estimates, which overestimate, are not asked.
const trusted = 1e-12

// floorShare is the part of a source's own field scale below which its errors are not held to the size of the value.
const floorShare = 1e-3

// judge notes which values of a record did not reach the accuracy that the scene wants: the error estimate is above
// accuracy x max(size, floor) and above what one rounding of the point's coordinates changes. A value that does not exist
// where it should has missed it too; on edges and at point sources there is none.
func (s *Setup) judge(rec *Record, x r3.Vec, side field.Side) {
	if s.Electric {
		v := &rec.Electric
		s.held(rec, &reach{parts: s.electric.Parts, kinds: [2]Kind{Polarized, Charged}, names: [2]string{"V", "E"}, x: x, side: side,
			phi: v.V * epsilon0 / s.Unit, g: r3.Scale(epsilon0, v.E), errPhi: v.ErrV * epsilon0 / s.Unit, errG: v.ErrE * epsilon0, status: v.Status})
	}
	if s.Magnetic {
		v := &rec.Magnetic
		s.held(rec, &reach{parts: s.magnetic.Parts, kinds: [2]Kind{Magnetized, Magnetized}, names: [2]string{"Vm", "H"}, x: x, side: side,
			phi: v.Vm / s.Unit, g: v.H, errPhi: v.ErrVm / s.Unit, errG: v.ErrH, status: v.Status})
	}
}

// reach is what is held against the wanted accuracy, in natural units.
type reach struct {
	parts        bound.Assembly
	kinds        [2]Kind
	names        [2]string // of the potential and the field
	x            r3.Vec
	side         field.Side
	phi          float64
	g            r3.Vec
	errPhi, errG float64
	status       field.Status
}

// held notes what a reading has missed.
func (s *Setup) held(rec *Record, r *reach) {
	if r.status == field.OnEdge || r.status == field.AtPoint {
		return
	}
	phiOK := !Missing(r.phi) && r.status <= field.OnFace
	gOK := !MissingVec(r.g) && r.status <= field.OnFace
	if want := s.Scene.Accuracy; want < trusted && phiOK && gOK {
		phi0, g0 := s.floors(r)
		step := 0x1p-53 * r3.Norm(r.x)
		phiOK = r.errPhi <= want*max(math.Abs(r.phi), phi0) || r.errPhi <= step*r3.Norm(r.g)
		gOK = r.errG <= want*max(r3.Norm(r.g), g0) || r.errG <= step*steepness(r)
	}
	if !phiOK {
		rec.Missed = append(rec.Missed, r.names[0])
	}
	if !gOK {
		rec.Missed = append(rec.Missed, r.names[1])
	}
}

// floors returns the sizes below which errors are absolute: with a the bounding radius of a part, R the distance from its
// centre and p the largest polarization, 1e-3 of p a min(1, (a/R)^2) for the potential and 1e-3 of p min(1, (a/R)^3) for
// the field, one power less for a charged sheet, none for a point, summed over the parts.
func (s *Setup) floors(r *reach) (phi, g float64) {
	for i := range s.Parts {
		p := &s.Parts[i]
		if p.Kind != r.kinds[0] && p.Kind != r.kinds[1] || p.Body == nil && p.Sheet == nil {
			continue
		}
		a := r3.Norm(r3.Sub(p.Local.Max, p.Local.Min)) / 2
		centre := r3.Add(p.Centre, p.Pose.VectorToOuter(r3.Scale(0.5, r3.Add(p.Local.Min, p.Local.Max))))
		near := 1.0
		if d := r3.Norm(r3.Sub(r.x, centre)); d > a {
			near = a / d
		}
		if p.Sheet != nil {
			phi, g = phi+p.Peak*a*near, g+p.Peak*near*near
		} else {
			phi, g = phi+p.Peak*a*near*near, g+p.Peak*near*near*near
		}
	}
	return floorShare * phi, floorShare * g
}

// steepness returns the norm of the gradient of the field, 0 where there is no telling.
func steepness(r *reach) float64 {
	v := field.NewValues(1, field.WantG|field.WantGrad)
	r.parts.Evaluate(v, field.PointsOf(r.x), r.side)
	sum := 0.0
	for k := range v.Grad {
		twice := 1.0
		if k >= 3 {
			twice = 2 // off the diagonal
		}
		sum += twice * v.Grad[k][0] * v.Grad[k][0]
	}
	if Missing(sum) {
		return 0
	}
	return math.Sqrt(sum)
}
