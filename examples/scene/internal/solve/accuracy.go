package solve

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/field/bound"
	"gonum.org/v1/gonum/spatial/r3"
)

// floorShare is the part of a source's own field scale below which its errors are not held to the size of the value.
const floorShare = 1e-3

// judge notes which values of a record did not reach the accuracy that the scene wants: the error estimate is above
// accuracy x max(size, floor) and above what one rounding of the point's coordinates changes. Estimates of sources that are
// proven to keep the accuracy are not asked, those of integrated ones and of what has not converged always. A value that
// does not exist where it should has missed it too; on edges and at point sources there is none.
func (s *Setup) judge(rec *Record, x r3.Vec, side field.Side) {
	if s.Electric && !s.hidden(x, Charged) {
		v := &rec.Electric
		s.held(rec, &reach{parts: s.electric.Parts, kinds: [2]Kind{Polarized, Charged}, names: [2]string{"V", "E"}, x: x, side: side,
			phi: v.V * epsilon0 / s.Unit, g: r3.Scale(epsilon0, v.E), errPhi: v.ErrV * epsilon0 / s.Unit, errG: v.ErrE * epsilon0, status: v.Status})
	}
	if s.Magnetic && !s.hidden(x, Magnetized) {
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
	exists := r.status <= field.OnFace || r.status == field.NotConverged
	phiOK := exists && !Missing(r.phi)
	gOK := exists && !MissingVec(r.g)
	doubtful := s.doubtful(r.kinds)
	if phiOK && gOK && (len(doubtful) > 0 || r.status == field.NotConverged) {
		phi0, g0, _ := s.floors(r.kinds, r.x)
		step := 0x1p-53 * r3.Norm(r.x)
		want := s.Scene.Accuracy
		reached := func() (phi, g bool) {
			phi = r.errPhi <= want*max(math.Abs(r.phi), phi0) || r.errPhi <= step*r3.Norm(r.g)
			g = r.errG <= want*max(r3.Norm(r.g), g0) || r.errG <= step*steepness(r)
			return phi, g
		}
		phiOK, gOK = reached()
		if !(phiOK && gOK) && r.status != field.NotConverged && len(doubtful) < len(r.parts) {
			r.errPhi, r.errG = errorsOf(doubtful, r.x, r.side) // of the others the estimate is not asked
			phiOK, gOK = reached()
		}
	}
	if !phiOK {
		rec.Missed = append(rec.Missed, r.names[0])
	}
	if !gOK {
		rec.Missed = append(rec.Missed, r.names[1])
	}
}

// doubtful returns the parts of two kinds whose estimates are asked: what they keep by proof is not as good as the scene
// wants.
func (s *Setup) doubtful(kinds [2]Kind) (parts bound.Assembly) {
	for i := range s.Parts {
		if p := &s.Parts[i]; (p.Kind == kinds[0] || p.Kind == kinds[1]) && p.proven > s.Scene.Accuracy {
			parts = append(parts, p.Member)
		}
	}
	return parts
}

// errorsOf returns the estimates of some parts alone.
func errorsOf(parts bound.Assembly, x r3.Vec, side field.Side) (phi, g float64) {
	v := field.NewValues(1, field.WantPhi|field.WantG|field.WantErr)
	parts.Evaluate(v, field.PointsOf(x), side)
	return v.ErrPhi[0], v.ErrG[0]
}

// floors returns the sizes below which errors are absolute: with a the bounding radius of a part, R the distance from its
// centre and p the largest polarization, 1e-3 of p a min(1, (a/R)^2) for the potential and 1e-3 of p min(1, (a/R)^3) for
// the field, one power less for a charged sheet, none for a point, summed over the parts. For the gradient it is the whole
// of the natural scale, p/a min(1, (a/R)^4).
func (s *Setup) floors(kinds [2]Kind, x r3.Vec) (phi, g, gradient float64) {
	for i := range s.Parts {
		p := &s.Parts[i]
		if p.Kind != kinds[0] && p.Kind != kinds[1] || p.Body == nil && p.Sheet == nil {
			continue
		}
		a := r3.Norm(r3.Sub(p.Local.Max, p.Local.Min)) / 2
		centre := r3.Add(p.Centre, p.Pose.VectorToOuter(r3.Scale(0.5, r3.Add(p.Local.Min, p.Local.Max))))
		near := 1.0
		if d := r3.Norm(r3.Sub(x, centre)); d > a {
			near = a / d
		}
		size := p.Peak * near
		if p.Sheet == nil {
			size *= near
		}
		phi, g, gradient = phi+size*a, g+size*near, gradient+size*near*near/a
	}
	return floorShare * phi, floorShare * g, gradient
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
