package element

import (
	"math"
	"sync"

	"example.com/boundpole/field"
	"gonum.org/v1/gonum/spatial/r3"
)

const (
	sectorReach = 3  // radii of the bounding sphere beyond which the expansion serves
	sectorOrder = 38 // 3^-38 = 7e-19
)

// sectorFar is the expansion of a sector, made when first asked for.
type sectorFar struct {
	once sync.Once
	m    *field.Moments
}

// covers reports whether the expansion is to be used at x.
func (b *sector) covers(x field.Point) bool {
	k := 1 / b.unit
	d := r3.Sub(r3.Scale(k, r3.Vec{X: x.X.X.Hi, Y: x.X.Y.Hi, Z: x.X.Z.Hi}), b.centre)
	limit := sectorReach * b.size
	return !(r3.Norm2(d) <= limit*limit)
}

// enclose sets a small sphere about the body: of the centres along the middle azimuth the best.
func (b *sector) enclose() {
	half := 0.5 * (b.level[1] - b.level[0])
	inner, outer := b.radius[0], b.radius[1]
	b.centre = r3.Vec{Z: 0.5 * (b.level[0] + b.level[1])}
	b.size = math.Hypot(outer, half)
	if b.full || b.wide {
		return
	}
	sin, cos := math.Sincos(0.5 * b.angle)
	across := func(m float64) float64 {
		d := max(outer-m, math.Abs(inner-m))
		for _, a := range b.radius {
			d = max(d, math.Hypot(a*cos-m, a*sin))
		}
		return d
	}
	best, at := outer, 0.0
	for k := range 65 {
		m := outer * float64(k) / 64
		if d := across(m); d < best {
			best, at = d, m
		}
	}
	mid := b.from + 0.5*b.angle
	b.centre.X, b.centre.Y = at*math.Cos(mid), at*math.Sin(mid)
	b.size = math.Hypot(best, half) * (1 + 8*u)
}

// afar returns the value of the expansion. The estimates allow for the sum over thousands of nodes, twice
// what Moments does, and for the rounding of their positions, which counts where the body is small and far from the axis.
func (b *sector) afar(x field.Point, want field.Want) field.Value {
	v := b.moments().Value(x, want)
	if want&field.WantErr == 0 {
		return v
	}
	shift := 2 * u * b.unit * (r3.Norm(b.centre) + b.size)
	r := r3.Norm(r3.Sub(x.X.Value(), r3.Scale(b.unit, b.centre)))
	v.ErrPhi = 2*v.ErrPhi + shift*3*math.Abs(v.Phi)/r
	v.ErrG = 2*v.ErrG + shift*4*r3.Norm(v.G)/r
	if want&field.WantGrad != 0 {
		size := 0.0
		for _, g := range v.Grad {
			size += 2 * g * g
		}
		v.ErrGrad += shift * 5 * math.Sqrt(size) / r
	}
	return v
}

func (b *sector) moments() *field.Moments {
	b.far.once.Do(b.expand)
	return b.far.m
}

// expand fills the body with dipoles, or the sheet with charges, on a rule whose error is below that of the order.
func (b *sector) expand() {
	m := field.NewMoments(r3.Scale(b.unit, b.centre), b.size*b.unit, sectorOrder)
	p := b.affine
	put := func(y r3.Vec, w float64) {
		at := r3.Scale(b.unit, y)
		v := p.At(y)
		if b.sheet {
			m.AddCharge(at, v.Z*w*b.unit*b.unit)
			return
		}
		if b.radial != 0 {
			s := math.Hypot(y.X, y.Y)
			v = r3.Add(v, r3.Vec{X: b.radial * y.X / s, Y: b.radial * y.Y / s})
		}
		m.AddDipole(at, r3.Scale(w*b.unit*b.unit*b.unit, v))
	}
	heights := []sectorStation{{at: b.level[1], w: 1}}
	if !b.sheet {
		heights = stations(b.level[0], b.level[1], b.size)
	}
	for _, f := range b.azimuths() {
		sin, cos := math.Sincos(f.at)
		for _, s := range stations(b.radius[0], b.radius[1], b.size) {
			for _, z := range heights {
				put(r3.Vec{X: s.at * cos, Y: s.at * sin, Z: z.at}, f.w*s.w*s.at*z.w)
			}
		}
	}
	b.settleMoments(m)
	b.far.m = m
}

// settleMoments makes total charge and moment exact, which the sum over many nodes leaves with its rounding.
func (b *sector) settleMoments(m *field.Moments) {
	up := b.unit * b.unit
	total, moment := b.totals()
	if b.sheet {
		m.AddCharge(m.Centre(), up*total-m.Charge())
		moment = r3.Sub(moment, r3.Scale(total, b.centre))
	}
	m.AddDipole(m.Centre(), r3.Sub(r3.Scale(up*b.unit, moment), m.Dipole()))
}

// totals returns the integral of p over the body, for a sheet the charge and its first moment about the origin.
func (b *sector) totals() (charge float64, moment r3.Vec) {
	in, out := b.radius[0], b.radius[1]
	ring := 0.5 * (out - in) * (out + in) // integrals of s, s^2 and s^3
	cubic := (out - in) * (out*out + out*in + in*in) / 3
	fourth := 0.5 * ring * (out*out + in*in)
	angle, c, s, cc, ss, cs := 2*math.Pi, 0.0, 0.0, math.Pi, math.Pi, 0.0 // integrals over the azimuth of 1, cos, sin ...
	if !b.full {
		f, t := b.end[0].Value(), b.end[1].Value()
		angle, c, s = b.angle, t.Y-f.Y, f.X-t.X
		cs = 0.5 * (t.Y - f.Y) * (t.Y + f.Y)
		turn := 0.5 * (t.X*t.Y - f.X*f.Y)
		cc, ss = 0.5*angle+turn, 0.5*angle-turn
	}
	p := b.affine
	if b.sheet {
		z := b.level[1]
		sigma, gx, gy := p.At(r3.Vec{Z: z}).Z, b.grad[2][0], b.grad[2][1]
		charge = sigma*ring*angle + cubic*(gx*c+gy*s)
		moment = r3.Vec{X: sigma*cubic*c + fourth*(gx*cc+gy*cs), Y: sigma*cubic*s + fourth*(gx*cs+gy*ss), Z: charge * z}
		return charge, moment
	}
	height := b.level[1] - b.level[0]
	volume := ring * angle * height
	centroid := r3.Vec{X: cubic * c * height / volume, Y: cubic * s * height / volume, Z: 0.5 * (b.level[0] + b.level[1])}
	moment = r3.Scale(volume, p.At(centroid))
	return 0, r3.Add(moment, r3.Scale(b.radial*ring*height, r3.Vec{X: c, Y: s}))
}

// sectorStation is a coordinate of a rule with its weight.
type sectorStation struct{ at, w float64 }

// stations returns a rule for a range inside a sphere of the radius size, for integrands regular up to three times that.
func stations(lo, hi, size float64) (s []sectorStation) {
	mid, half := 0.5*(lo+hi), 0.5*(hi-lo)
	rule := gauss16[:]
	if half < 0.25*size { // (2 * 2/0.25)^-16 = 5e-20
		rule = gauss8[:]
	}
	for _, g := range rule {
		s = append(s, sectorStation{mid - half*g.x, half * g.w}, sectorStation{mid + half*g.x, half * g.w})
	}
	return s
}

// azimuths returns a rule for the azimuth.
func (b *sector) azimuths() (s []sectorStation) {
	if b.full {
		const n = 2*sectorOrder + 4 // exact for all harmonics of the order, with those of an affine density
		for k := range n {
			s = append(s, sectorStation{2 * math.Pi * float64(k) / n, 2 * math.Pi / n})
		}
		return s
	}
	n := math.Ceil(b.angle / 1.2)
	for k := range int(n) {
		s = append(s, stations(b.from+b.angle*float64(k)/n, b.from+b.angle*float64(k+1)/n, b.size/b.radius[1])...)
	}
	return s
}
