package cubature_test

import (
	"math"

	"example.com/boundpole/geom"
	"gonum.org/v1/gonum/spatial/r3"
)

// cubeFace is a sixth of an ellipsoid: a face of a cube blown up, with equal angles along its parameters.
type cubeFace struct {
	face int
	semi r3.Vec
}

func (c cubeFace) At(u, v float64) (x, xu, xv r3.Vec) {
	// tan of an angle counted from the nearer end keeps the digits of 1-u
	a, da := tanQuarter(u)
	b, db := tanQuarter(v)
	q := 1 / math.Sqrt(1+a*a+b*b)
	p := [3]float64{a * q, b * q, q}
	k := q * q * q
	pu := [3]float64{da * k * (1 + b*b), -da * k * a * b, -da * k * a}
	pv := [3]float64{-db * k * a * b, db * k * (1 + a*a), -db * k * b}
	s := 1.0
	if c.face%2 == 1 {
		s = -1
	}
	turn := func(p [3]float64) r3.Vec {
		p[2] *= s
		var o [3]float64
		for i := range 3 {
			o[(i+c.face/2)%3] = p[i]
		}
		return r3.Vec{X: o[0] * c.semi.X, Y: o[1] * c.semi.Y, Z: o[2] * c.semi.Z}
	}
	x, xu, xv = turn(p), turn(pu), turn(pv)
	return x, xu, xv
}

// tanQuarter returns tan((2u-1) pi/4) and its derivative by u.
func tanQuarter(u float64) (t, dt float64) {
	t = math.Tan((2*u - 1) * math.Pi / 4)
	return t, (1 + t*t) * math.Pi / 2
}

// flipped turns the normal.
type flipped struct{ c geom.Chart }

func (f flipped) At(u, v float64) (x, xu, xv r3.Vec) {
	x, xv, xu = f.c.At(v, u)
	return x, xu, xv
}

// ellipsoid returns six charts with outward normals.
func ellipsoid(semi r3.Vec) []geom.Chart {
	var c []geom.Chart
	for f := range 6 {
		k := geom.Chart(cubeFace{f, semi})
		x, xu, xv := k.At(0.5, 0.5)
		if r3.Dot(x, r3.Cross(xu, xv)) < 0 {
			k = flipped{k}
		}
		c = append(c, k)
	}
	return c
}

// globe is a sphere by two angles: tips at the poles.
type globe struct{ from, to float64 } // longitudes in turns

func (g globe) At(u, v float64) (x, xu, xv r3.Vec) {
	var s, c float64
	if u < 0.5 {
		s, c = math.Sincos(math.Pi * u)
	} else {
		s, c = math.Sincos(math.Pi * (1 - u))
		c = -c
	}
	k := 2 * math.Pi * (g.to - g.from)
	sf, cf := math.Sincos(2 * math.Pi * (g.from + (g.to-g.from)*v))
	x = r3.Vec{X: s * cf, Y: s * sf, Z: c}
	xu = r3.Vec{X: math.Pi * c * cf, Y: math.Pi * c * sf, Z: -math.Pi * s}
	xv = r3.Vec{X: -k * s * sf, Y: k * s * cf}
	return x, xu, xv
}

// parallelogram is a flat chart.
type parallelogram struct{ corner, a, b r3.Vec }

func (p parallelogram) At(u, v float64) (x, xu, xv r3.Vec) {
	return r3.Add(p.corner, r3.Add(r3.Scale(u, p.a), r3.Scale(v, p.b))), p.a, p.b
}

// boxFaces returns the six faces of the box about the origin with the half sizes, normals outward.
func boxFaces(h r3.Vec) []geom.Chart {
	var c []geom.Chart
	s := [3]float64{h.X, h.Y, h.Z}
	for k := range 3 {
		for _, sign := range [2]float64{-1, 1} {
			i, j := (k+1)%3, (k+2)%3
			if sign < 0 {
				i, j = j, i
			}
			var o, a, b [3]float64
			o[k], o[i], o[j] = sign*s[k], -s[i], -s[j]
			a[i], b[j] = 2*s[i], 2*s[j]
			c = append(c, parallelogram{vec(o), vec(a), vec(b)})
		}
	}
	return c
}

func vec(a [3]float64) r3.Vec { return r3.Vec{X: a[0], Y: a[1], Z: a[2]} }

// ringPart is a part of a disc or annulus, or of a cylinder wall or frustum: a generatrix from (r0, z0) to (r1, z1) turned.
type ringPart struct{ r0, z0, r1, z1, from, to float64 }

func (a ringPart) At(u, v float64) (x, xu, xv r3.Vec) {
	r, z := a.r0+u*(a.r1-a.r0), a.z0+u*(a.z1-a.z0)
	k := 2 * math.Pi * (a.to - a.from)
	s, c := math.Sincos(2 * math.Pi * (a.from + (a.to-a.from)*v))
	return r3.Vec{X: r * c, Y: r * s, Z: z}, r3.Vec{X: (a.r1 - a.r0) * c, Y: (a.r1 - a.r0) * s, Z: a.z1 - a.z0},
		r3.Vec{X: -k * r * s, Y: k * r * c}
}

func ring(r0, z0, r1, z1 float64) []geom.Chart {
	var c []geom.Chart
	for k := range 4 {
		c = append(c, ringPart{r0, z0, r1, z1, float64(k) / 4, float64(k+1) / 4})
	}
	return c
}
