package element

import (
	"math"

	"example.com/boundpole/geom/pair"
)

// ringView is a generatrix, a straight line or a circular arc in the half plane of the axis, seen from a field point at
// rho in the same half plane. The frame is that of the foot, the place on the generatrix next to the point: n the normal
// there, pointing out of the body, and the tangent (-n.z, n.rho). Places on the generatrix are counted from the foot, by
// length on a line and by angle on an arc, so that they and the distances keep their digits however close the point is.
//
// A ring at s is at (-d, s) from the point on a line, on an arc of radius b at (-d - 2 b sin^2(s/2), b sin s).
type ringView struct {
	rho, d float64 // d: distance of the point from the line or arc, positive on the side of n
	nr, nz float64
	bend   float64 // radius of the arc, 0 for a line
	lo, hi float64
	rhoLo  float64 // radii of the rings at the ends of a line
	rhoHi  float64
}

// unit returns the length of a unit of s.
func (v *ringView) unit() float64 {
	if v.bend > 0 {
		return v.bend
	}
	return 1
}

// length returns the length of the generatrix.
func (v *ringView) length() float64 { return v.unit() * (v.hi - v.lo) }

// at returns the ring at s as a rim, and the normal of the surface there.
func (v *ringView) at(s float64) (r rim, nr, nz float64) {
	if v.bend == 0 {
		gap, z := -s*v.nz-v.d*v.nr, v.d*v.nz-s*v.nr
		a := v.rhoLo - v.nz*(s-v.lo)
		if s-v.lo > v.hi-s { // from the nearer end, which may be a tip
			a = v.rhoHi + v.nz*(v.hi-s)
		}
		return rimAt(a, v.rho, gap, z), v.nr, v.nz
	}
	sh, ch := math.Sincos(0.5 * s)
	sin, versed := 2*sh*ch, 2*sh*sh
	x, y := -v.d-v.bend*versed, v.bend*sin
	gap, z := x*v.nr-y*v.nz, -(x*v.nz + y*v.nr)
	cos := 1 - versed
	return rimAt(v.rho+gap, v.rho, gap, z), v.nr*cos - v.nz*sin, v.nz*cos + v.nr*sin
}

// path returns the march along the generatrix with the singularities of the ring integrals: at zero distance, and where the
// distance of the opposite point of the ring, that of the mirror image of the field point in the axis, is zero.
func (v *ringView) path() (m march) {
	m.lo, m.hi = v.lo, v.hi
	if v.bend == 0 {
		m.put(0, v.d)
		m.put(2*v.rho*v.nz, v.d-2*v.rho*v.nr)
		return m
	}
	m.longest, m.degree = 2, 3 // the sine and cosine on half an ellipse of 3.5
	m.put(0, math.Log1p(max(v.d/v.bend, -1)))
	// from the centre of the arc, in the frame of the foot
	x, y := v.bend+v.d-2*v.rho*v.nr, 2*v.rho*v.nz
	beside := math.Log(math.Hypot(x, y) / v.bend)
	angle := math.Atan2(y, x)
	for turn := -1.0; turn <= 1; turn++ {
		m.put(angle+2*math.Pi*turn, beside)
	}
	return m
}

// arcView returns the full circle of radius b about a point at the distance centre from the axis, seen from p.
func arcView(p *roundPoint, centre, b float64) ringView {
	x := p.rho2.Sqrt().AddFloat(-centre)
	r2 := x.Mul(x).Add(p.z.Mul(p.z))
	r := r2.Sqrt().Value()
	d := r2.Sub(pair.Product(b, b)).Value() / (r + b)
	v := ringView{rho: p.rho, d: d, nr: 1, bend: b, lo: -math.Pi, hi: math.Pi}
	if r > 0 {
		v.nr, v.nz = x.Value()/r, p.z.Value()/r
	}
	return v
}

// line is a straight generatrix from (rho1, z1) to (rho2, z2), with its direction and normal in pairs.
type line struct {
	rho1, z1, rho2, z2 float64
	nr, nz             pair.Float
}

// newLine returns the line with the normal to the right of its direction, away from the axis if it goes up.
func newLine(rho1, z1, rho2, z2 float64) line {
	dr, dz := pair.Sum(rho2, -rho1), pair.Sum(z2, -z1)
	length := dr.Mul(dr).Add(dz.Mul(dz)).Sqrt()
	return line{rho1, z1, rho2, z2, dz.Div(length), dr.Div(length).Neg()}
}

// view returns the line seen from p.
func (l *line) view(p *roundPoint) ringView {
	rho := p.rho2.Sqrt()
	place := func(r, z float64) (along, off float64) { // of the end, of the point
		x, y := rho.AddFloat(-r), p.z.AddFloat(-z)
		return x.Mul(l.nz).Sub(y.Mul(l.nr)).Value(), x.Mul(l.nr).Add(y.Mul(l.nz)).Value()
	}
	v := ringView{rho: p.rho, nr: l.nr.Value(), nz: l.nz.Value(), rhoLo: l.rho1, rhoHi: l.rho2}
	v.lo, v.d = place(l.rho1, l.z1)
	v.hi, _ = place(l.rho2, l.z2)
	return v
}
