package bound

import (
	"math"

	"example.com/boundpole/field"
	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// Accuracies below which a value counts as converged, relative to the natural scale of the body or the value itself. Gradients are
// differences of large terms: two digits less, as in package cubature.
const (
	converged     = 1e-10
	gradConverged = 1e-8
)

// peak returns the greatest |p| at inner nodes.
func (c *Charge) peak() (most float64) {
	for _, cell := range c.local.Cells() {
		cell.Nodes(8, func(x r3.Vec, _ float64) {
			if p := r3.Norm(c.p.At(x)); p < math.Inf(1) {
				most = max(most, p)
			}
		})
	}
	return most
}

// judge gives a value the status NotConverged if its estimates are above the accuracy. What one face does not reach by its own scale
// may be reached by that of the body.
func (s *integrated) judge(v *field.Value, x r3.Vec, want field.Want) {
	if v.Status != field.Regular && v.Status != field.OnFace || want&field.WantErr == 0 {
		return
	}
	t := min(1, s.radius/r3.Norm(r3.Sub(x, s.centre)))
	bad := want&field.WantPhi != 0 && !(v.ErrPhi <= converged*max(s.peak*s.radius*t*t, math.Abs(v.Phi)))
	bad = bad || want&field.WantG != 0 && !(v.ErrG <= converged*max(s.peak*t*t*t, r3.Norm(v.G)))
	if want&field.WantGrad != 0 && !math.IsInf(v.ErrGrad, 1) { // infinite where there is no claim
		bad = bad || !(v.ErrGrad <= gradConverged*max(s.peak/s.radius*t*t*t*t, norm6(&v.Grad)))
	}
	if bad {
		v.Status = field.NotConverged
	}
}

// judgeAll judges the values of a batch whose faces and cells have judged for themselves.
func (s *integrated) judgeAll(dst *field.Values, at *field.Points) {
	if dst.Status == nil {
		return
	}
	want := dst.Want()
	for i := range at.Len() {
		v := dst.At(i)
		if v.Status == field.NotConverged && want&field.WantErr != 0 {
			v.Status = field.Regular
			if p := at.At(i); s.charge.inner.Locate(p.X, p.Slack).Region == geom.On {
				v.Status = field.OnFace
			}
		}
		s.judge(&v, at.Vec(i), want)
		dst.Status[i] = v.Status
	}
}

// norm6 returns the norm of a symmetric tensor given as xx, yy, zz, xy, xz, yz.
func norm6(t *[6]float64) float64 {
	return math.Sqrt(t[0]*t[0] + t[1]*t[1] + t[2]*t[2] + 2*(t[3]*t[3]+t[4]*t[4]+t[5]*t[5]))
}
