package field

import (
	"example.com/boundpole/geom/pair"
	"gonum.org/v1/gonum/spatial/r3"
)

// Points is a batch of field points as a structure of arrays, len(X) == len(Y) == len(Z).
//
// XLo, YLo, ZLo are nil, or hold what rounding the coordinates to float64 left out: a source seen through a turned
// frame keeps its digits that way. Slack is nil, or holds for each point the distance within which it counts as on a
// face beside 4 u (|x| + |c| + size); Posed fills it from the coordinates of the outer frame.
type Points struct {
	X, Y, Z       []float64
	XLo, YLo, ZLo []float64
	Slack         []float64
}

// PointsOf returns a batch with the given points.
func PointsOf(x ...r3.Vec) *Points {
	p := &Points{X: make([]float64, len(x)), Y: make([]float64, len(x)), Z: make([]float64, len(x))}
	for i, v := range x {
		p.X[i], p.Y[i], p.Z[i] = v.X, v.Y, v.Z
	}
	return p
}

// Len returns the number of points.
func (p *Points) Len() int { return len(p.X) }

// At returns point i.
func (p *Points) At(i int) Point {
	q := Point{X: pair.Vec{X: pair.Of(p.X[i]), Y: pair.Of(p.Y[i]), Z: pair.Of(p.Z[i])}}
	if p.XLo != nil {
		q.X.X.Lo, q.X.Y.Lo, q.X.Z.Lo = p.XLo[i], p.YLo[i], p.ZLo[i]
	}
	if p.Slack != nil {
		q.Slack = p.Slack[i]
	}
	return q
}

// Vec returns point i rounded to float64.
func (p *Points) Vec(i int) r3.Vec { return r3.Vec{X: p.X[i], Y: p.Y[i], Z: p.Z[i]} }

// Slice returns the points lo <= i < hi; it shares memory with p.
func (p *Points) Slice(lo, hi int) *Points {
	q := p.slice(lo, hi)
	return &q
}

func (p *Points) slice(lo, hi int) Points {
	cut := func(a []float64) []float64 {
		if a == nil {
			return nil
		}
		return a[lo:hi]
	}
	return Points{X: p.X[lo:hi], Y: p.Y[lo:hi], Z: p.Z[lo:hi],
		XLo: cut(p.XLo), YLo: cut(p.YLo), ZLo: cut(p.ZLo), Slack: cut(p.Slack)}
}

// check panics where the lengths of the arrays disagree, which only a programming mistake can cause.
func (p *Points) check() {
	n := len(p.X)
	if len(p.Y) != n || len(p.Z) != n ||
		p.XLo != nil && (len(p.XLo) != n || len(p.YLo) != n || len(p.ZLo) != n) ||
		p.Slack != nil && len(p.Slack) != n {
		panic("field: arrays of Points differ in length")
	}
}

// Values receives results as a structure of arrays, each nil (not computed) or as long as the batch.
//
//	Phi               potential
//	GX, GY, GZ        components of g = -grad phi (all three or none)
//	Grad              gradient of g: xx, yy, zz, xy, xz, yz (all six or none); no claim is made on a charged face
//	ErrPhi, ErrG, ErrGrad  bounds on the Euclidean norm of the numerical error; +Inf where no claim is made
//	Status            what each value is worth
//
// A value that does not exist is NaN.
type Values struct {
	Phi                   []float64
	GX, GY, GZ            []float64
	Grad                  [6][]float64
	ErrPhi, ErrG, ErrGrad []float64
	Status                []Status
}

// NewValues returns arrays for n points for what is wanted; Status is always there.
func NewValues(n int, want Want) *Values {
	v := &Values{Status: make([]Status, n)}
	if want&WantPhi != 0 {
		v.Phi = make([]float64, n)
	}
	if want&WantG != 0 {
		v.GX, v.GY, v.GZ = make([]float64, n), make([]float64, n), make([]float64, n)
	}
	if want&WantGrad != 0 {
		for k := range v.Grad {
			v.Grad[k] = make([]float64, n)
		}
	}
	if want&WantErr != 0 {
		v.ErrPhi, v.ErrG, v.ErrGrad = make([]float64, n), make([]float64, n), make([]float64, n)
	}
	return v
}

// Want returns what the arrays ask for.
func (v *Values) Want() Want {
	var w Want
	if v.Phi != nil {
		w |= WantPhi
	}
	if v.GX != nil {
		w |= WantG
	}
	if v.Grad[0] != nil {
		w |= WantGrad
	}
	if v.ErrPhi != nil || v.ErrG != nil || v.ErrGrad != nil {
		w |= WantErr
	}
	return w
}

// At returns value i; what was not computed is zero.
func (v *Values) At(i int) Value {
	var r Value
	if v.Phi != nil {
		r.Phi = v.Phi[i]
	}
	if v.GX != nil {
		r.G = r3.Vec{X: v.GX[i], Y: v.GY[i], Z: v.GZ[i]}
	}
	if v.Grad[0] != nil {
		for k := range r.Grad {
			r.Grad[k] = v.Grad[k][i]
		}
	}
	if v.ErrPhi != nil {
		r.ErrPhi = v.ErrPhi[i]
	}
	if v.ErrG != nil {
		r.ErrG = v.ErrG[i]
	}
	if v.ErrGrad != nil {
		r.ErrGrad = v.ErrGrad[i]
	}
	if v.Status != nil {
		r.Status = v.Status[i]
	}
	return r
}

// Set stores value i in the arrays that are there.
func (v *Values) Set(i int, r Value) { v.set(i, &r) }

func (v *Values) set(i int, r *Value) {
	if v.Phi != nil {
		v.Phi[i] = r.Phi
	}
	if v.GX != nil {
		v.GX[i], v.GY[i], v.GZ[i] = r.G.X, r.G.Y, r.G.Z
	}
	if v.Grad[0] != nil {
		for k := range r.Grad {
			v.Grad[k][i] = r.Grad[k]
		}
	}
	if v.ErrPhi != nil {
		v.ErrPhi[i] = r.ErrPhi
	}
	if v.ErrG != nil {
		v.ErrG[i] = r.ErrG
	}
	if v.ErrGrad != nil {
		v.ErrGrad[i] = r.ErrGrad
	}
	if v.Status != nil {
		v.Status[i] = r.Status
	}
}

// Slice returns the arrays cut to lo <= i < hi; they share memory with v.
func (v *Values) Slice(lo, hi int) *Values {
	r := v.slice(lo, hi)
	return &r
}

// slice is Slice by value.
func (v *Values) slice(lo, hi int) Values {
	cut := func(a []float64) []float64 {
		if a == nil {
			return nil
		}
		return a[lo:hi]
	}
	r := Values{Phi: cut(v.Phi), GX: cut(v.GX), GY: cut(v.GY), GZ: cut(v.GZ),
		ErrPhi: cut(v.ErrPhi), ErrG: cut(v.ErrG), ErrGrad: cut(v.ErrGrad)}
	for k := range r.Grad {
		r.Grad[k] = cut(v.Grad[k])
	}
	if v.Status != nil {
		r.Status = v.Status[lo:hi]
	}
	return r
}

// check panics where an array has not the length of the batch.
func (v *Values) check(n int) {
	for _, a := range [...][]float64{v.Phi, v.GX, v.GY, v.GZ, v.Grad[0], v.Grad[1], v.Grad[2], v.Grad[3], v.Grad[4], v.Grad[5],
		v.ErrPhi, v.ErrG, v.ErrGrad} {
		if a != nil && len(a) != n {
			panic("field: an array of Values has not the length of the batch")
		}
	}
	if v.Status != nil && len(v.Status) != n {
		panic("field: Values.Status has not the length of the batch")
	}
}

// Fill evaluates a source that is written for one point at a time: it is what the Evaluate method of such a source
// calls. Points that are not finite get BadInput without a call.
func Fill(dst *Values, at *Points, one func(p Point, want Want) Value) {
	at.check()
	dst.check(at.Len())
	want := dst.Want()
	for i := range at.X {
		p := at.At(i)
		var r Value
		if d := at.X[i] - at.X[i] + (at.Y[i] - at.Y[i]) + (at.Z[i] - at.Z[i]); d != 0 {
			r = Nowhere(BadInput)
		} else {
			r = one(p, want)
		}
		dst.set(i, &r)
	}
}
